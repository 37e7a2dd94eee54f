"""Dew points of water and of sulfuric acid: worked example, correlations by hand, limits."""

import numpy as np
import pytest
from CoolProp.CoolProp import PropsSI
from hypothesis import given
from hypothesis import strategies as st

from fluegas.combustion.dew_point import (
    ACID_DOUBT,
    CORRELATIONS,
    DEFAULT_CORRELATION,
    acid_dew_point,
    water_dew_point,
)
from fluegas.errors import InputError, RangeError
from fluegas.thermo.water import saturation_pressure
from tests.reference.tables import table

ATMOSPHERE = 101_325.0
MILLIMETRE = 133.322
GRID = table("acid_dew_points")


@given(st.floats(200.0, 640.0))
def test_the_water_dew_point_inverts_saturation(temperature: float) -> None:
    pressure = float(saturation_pressure(temperature))
    found = float(water_dew_point(pressure))
    if pressure > 1.0:
        assert found == pytest.approx(temperature, rel=1e-10)
    else:
        assert np.isnan(found)


def test_the_water_dew_point_is_that_of_the_reference_equation() -> None:
    """IAPWS-95 in CoolProp; the industrial formulation is within 0.01 K. Flue gases of 6 to 20 % water at 1 atm."""
    pressures = ATMOSPHERE * np.array([0.06, 0.10, 0.15, 0.20])
    expected = [PropsSI("T", "P", float(p), "Q", 1, "Water") for p in pressures]
    np.testing.assert_allclose(water_dew_point(pressures), expected, atol=0.01)


def test_no_water_has_no_dew_point() -> None:
    found = water_dew_point(np.array([0.0, 5000.0]))
    assert np.isnan(found[0])
    assert found[1] == pytest.approx(306.03, abs=0.01)


def test_water_above_the_critical_pressure_is_told() -> None:
    with pytest.raises(RangeError, match=r"^partial pressure of water is 3e\+07 Pa; it must be between "):
        water_dew_point([1e4, 3e7])


def test_the_worked_example_of_verhoff_and_banchero() -> None:
    """5 % H2O, 80 ppm SO2 of which 2 % is SO3, 15 mm water gauge: a published worked example, fed with its partial
    pressures, 38.1103549 and 0.00097421 mmHg: 383.52498618 K = 110.525 degC."""
    found = float(acid_dew_point(38.1103549 * MILLIMETRE, 0.00097421 * MILLIMETRE))
    assert found == pytest.approx(383.52498618, abs=2e-5)


@pytest.mark.parametrize("row", GRID, ids=[f"{row['water']}-{row['sulfur_trioxide']}" for row in GRID])
@pytest.mark.parametrize("name", ["Okkes", "Verhoff-Banchero", "ZareNezhad"])
def test_the_correlations_give_their_printed_formulas(row: dict[str, str], name: str) -> None:
    water, trioxide = float(row["water"]) * ATMOSPHERE, float(row["sulfur_trioxide"]) * ATMOSPHERE
    found = float(acid_dew_point(water, trioxide, name)) - 273.15
    assert found == pytest.approx(float(row[name]), abs=0.006)


@pytest.mark.parametrize("row", GRID, ids=[f"{row['water']}-{row['sulfur_trioxide']}" for row in GRID])
def test_the_correlations_lie_within_the_stated_doubt(row: dict[str, str]) -> None:
    """Each within 5 K of the one that leads, as the program states, at the usual contents of flue gas."""
    water, trioxide = float(row["water"]) * ATMOSPHERE, float(row["sulfur_trioxide"]) * ATMOSPHERE
    leading = float(acid_dew_point(water, trioxide))
    for name in CORRELATIONS:
        assert abs(float(acid_dew_point(water, trioxide, name)) - leading) < ACID_DOUBT


@pytest.mark.parametrize("name", CORRELATIONS)
def test_more_acid_and_more_water_condense_sooner(name: str) -> None:
    water, trioxide = np.meshgrid(np.linspace(0.04, 0.2, 9), np.logspace(-6, -4, 9), indexing="ij")
    found = acid_dew_point(water * ATMOSPHERE, trioxide * ATMOSPHERE, name)
    assert found.shape == (9, 9)
    assert np.all(np.diff(found, axis=0) > 0)
    assert np.all(np.diff(found, axis=1) > 0)
    assert np.all(found > water_dew_point(water * ATMOSPHERE))


@pytest.mark.parametrize("name", CORRELATIONS)
def test_no_acid_has_no_acid_dew_point(name: str) -> None:
    found = acid_dew_point(np.array([1e4, 0.0, 1e4]), np.array([0.0, 1.0, 1.0]), name)
    assert list(np.isnan(found)) == [True, True, False]


def test_the_leading_correlation() -> None:
    assert DEFAULT_CORRELATION == "Verhoff-Banchero"
    assert float(acid_dew_point(1e4, 1.0)) == float(acid_dew_point(1e4, 1.0, "Verhoff-Banchero"))


def test_an_unknown_correlation_is_told() -> None:
    message = r"^no acid dew point correlation 'rule'; there are Verhoff-Banchero, Okkes, ZareNezhad$"
    with pytest.raises(InputError, match=message):
        acid_dew_point(1e4, 1.0, "rule")
