"""Liquid and solid fuels: bases, moisture, sensible heat, carbon in ash, what cannot be."""

import re
from typing import Any

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from fluegas.combustion.fuel import ELEMENTS, Fuel
from fluegas.combustion.solid_fuel import solid_fuel, unburned_carbon_share, with_moisture
from fluegas.errors import AnalysisError
from tests.combustion.drawn import coal, solid_fuels

DRY = {"carbon": 0.7857, "hydrogen": 0.0560, "oxygen": 0.0702, "nitrogen": 0.0111, "sulfur": 0.0118}
ASH = 0.0652
MOISTURE = 0.12
DRY_VALUE = 14_225 * 2326.0
BASES = {"as fired": 1 - MOISTURE, "dry": 1.0, "dry ash-free": 1 / (1 - ASH)}
"""Share of a part on each basis over its share on the dry basis."""


def on_basis(basis: str, scale: float = 1.0, **options: Any) -> Fuel:
    """Return the coal of drawn.coal with 12 % moisture; analysis and heating value stated on `basis`."""
    fractions = {name: scale * share * BASES[basis] for name, share in DRY.items()}
    fractions["ash"] = ASH if basis == "dry ash-free" else scale * ASH * BASES[basis]
    fractions["moisture"] = scale * MOISTURE if basis == "as fired" else MOISTURE
    options = options or {"gross_heating_value": DRY_VALUE * BASES[basis]}
    return solid_fuel(fractions, analysis_basis=basis, **options)


def assert_same(first: Fuel, second: Fuel) -> None:
    for name in ("elements", "moisture", "ash", "gross_heating_value", "net_heating_value", "heat_capacity", "gases"):
        np.testing.assert_allclose(getattr(first, name), getattr(second, name), rtol=1e-12, atol=1e-14, err_msg=name)


@pytest.mark.parametrize("basis", ["dry", "dry ash-free"])
def test_the_basis_of_the_analysis_does_not_matter(basis: str) -> None:
    assert_same(on_basis(basis), on_basis("as fired"))


@pytest.mark.parametrize("basis", BASES)
def test_the_basis_of_a_net_value_does_not_matter(basis: str) -> None:
    """A net value on a basis counts the water of that basis: hydrogen's, and as fired the moisture's."""
    hydrogen = DRY["hydrogen"] / 1.008e-3 * BASES[basis]
    moisture = MOISTURE / 18.015e-3 if basis == "as fired" else 0.0
    latent = (hydrogen / 2 + moisture) * 44_004.09
    by_net = on_basis(basis, net_heating_value=DRY_VALUE * BASES[basis] - latent)
    expected = on_basis(basis)
    assert float(by_net.gross_heating_value) == pytest.approx(float(expected.gross_heating_value), rel=1e-7)
    assert float(by_net.net_heating_value) == pytest.approx(float(expected.net_heating_value), rel=1e-7)


@pytest.mark.parametrize("basis", BASES)
@pytest.mark.parametrize("scale", [0.99, 1.0051])
def test_an_analysis_that_sums_to_something_else_is_the_same_fuel(basis: str, scale: float) -> None:
    """Scaling the shares must not scale the heating value, which is stated per kilogram of the basis."""
    scaled = on_basis(basis, scale)
    assert_same(scaled, on_basis(basis))
    (caution,) = scaled.cautions
    assert caution.code == "analysis_sum"
    assert caution.message == f"the fuel analysis sums to {100 * scale:.4g} %, not 100 %; it was scaled to 100 %"
    assert caution.value == pytest.approx(scale)


@pytest.mark.parametrize("basis", BASES)
@pytest.mark.parametrize("scale", [0.9951, 1.0, 1.0049])
def test_a_sum_near_one_hundred_is_no_caution(basis: str, scale: float) -> None:
    assert on_basis(basis, scale).cautions == ()


def test_the_fuel_as_fired_holds_one_kilogram() -> None:
    fuel = on_basis("dry")
    weights = np.array([12.011, 1.008, 15.999, 14.007, 32.06, 35.45, 39.95, 4.0026]) / 1000
    mass = float(fuel.elements @ weights) + float(fuel.moisture) * 18.015e-3 + float(fuel.ash)
    assert mass == pytest.approx(1.0, abs=1e-12)
    assert float(fuel.moisture) * 18.015e-3 == pytest.approx(MOISTURE)
    assert float(fuel.element("C")) * 12.011e-3 == pytest.approx(0.7857 * (1 - MOISTURE))


@given(solid_fuels(), st.floats(0.0, 0.95), st.floats(0.0, 0.95))
def test_moisture_there_and_back(fuel: Fuel, first: float, second: float) -> None:
    there = with_moisture(fuel, first)
    assert_same(with_moisture(with_moisture(there, second), first), there)
    assert_same(with_moisture(there, float(fuel.moisture) * 18.015e-3), fuel)


@given(solid_fuels(), st.floats(0.0, 0.95))
def test_the_dry_fuel_is_held(fuel: Fuel, moisture: float) -> None:
    wet, dry = with_moisture(fuel, moisture), with_moisture(fuel, 0.0)
    share = 1 - moisture
    np.testing.assert_allclose(wet.elements, dry.elements * share, rtol=1e-12, atol=1e-15)
    assert float(wet.gross_heating_value) == pytest.approx(float(dry.gross_heating_value) * share, rel=1e-12)
    assert float(wet.ash) == pytest.approx(float(dry.ash) * share, rel=1e-12, abs=1e-15)
    assert float(wet.moisture) * 18.015e-3 == pytest.approx(moisture, rel=1e-12, abs=1e-15)
    net = float(dry.net_heating_value) * share - moisture / 18.015e-3 * 44_004.09
    assert float(wet.net_heating_value) == pytest.approx(net, rel=1e-7, abs=1.0)


def test_moisture_of_many_states() -> None:
    wet = with_moisture(coal(), np.array([[0.0, 0.1], [0.3, 0.6]]))
    assert wet.elements.shape == (len(ELEMENTS), 2, 2)
    dried = with_moisture(wet, 0.25)
    for row, column in np.ndindex(2, 2):
        np.testing.assert_allclose(dried.elements[:, row, column], with_moisture(coal(), 0.25).elements, rtol=1e-12)


def test_arrays_of_analyses_give_arrays_of_fuels() -> None:
    hydrogen, moisture = np.array([[0.04], [0.06]]), np.array([0.0, 0.1, 0.3])
    fractions: dict[str, Any] = {"carbon": 0.9 - hydrogen, "hydrogen": hydrogen, "ash": 0.1, "moisture": moisture}
    together = solid_fuel(fractions, analysis_basis="dry")
    assert together.net_heating_value.shape == (2, 3)
    for row, column in np.ndindex(2, 3):
        h = float(hydrogen[row, 0])
        alone: dict[str, Any] = {"carbon": 0.9 - h, "hydrogen": h, "ash": 0.1, "moisture": moisture[column]}
        single = solid_fuel(alone, analysis_basis="dry")
        assert float(together.net_heating_value[row, column]) == pytest.approx(float(single.net_heating_value))
        np.testing.assert_allclose(together.elements[:, row, column], single.elements, rtol=1e-12)


def test_sensible_heat_of_wet_solids_and_of_oil() -> None:
    """1.3 and 2.0 kJ/(kg K) dry and 4.19 for the moisture: common practice, no source."""
    wet = with_moisture(coal(), 0.2)
    assert float(wet.sensible_heat(308.15)) == pytest.approx(10 * (0.8 * 1300 + 0.2 * 4190), rel=1e-12)
    oil = solid_fuel({"carbon": 0.87, "hydrogen": 0.13}, state="liquid")
    assert float(oil.sensible_heat(368.15)) == pytest.approx(70 * 2000)
    stated = solid_fuel({"carbon": 0.87, "hydrogen": 0.13}, state="liquid", heat_capacity=2100.0)
    np.testing.assert_allclose(stated.sensible_heat(np.array([288.15, 298.15])), [-21_000.0, 0.0])


def test_gross_leads_and_a_disagreeing_net_value_is_told() -> None:
    net = float(coal(gross_heating_value=DRY_VALUE).net_heating_value)
    both = coal(gross_heating_value=DRY_VALUE, net_heating_value=1.004 * net)
    assert both.cautions == ()
    assert float(both.gross_heating_value) == DRY_VALUE
    (caution,) = coal(gross_heating_value=DRY_VALUE, net_heating_value=0.98 * net).cautions
    assert caution.code == "heating_value_disagrees"
    assert "that of the net value plus the latent heat, dry" in caution.message


def test_an_estimate_is_told() -> None:
    (caution,) = coal().cautions
    assert caution.code == "heating_value_estimated"
    assert caution.message == (
        "no heating value given: 33.27 MJ/kg dry, gross, estimated from the analysis by Channiwala and Parikh (2002), "
        "average error 1.5 %"
    )
    assert caution.value == pytest.approx(33.27e6, rel=1e-3)


def test_a_stated_value_far_from_the_estimate_is_told() -> None:
    assert coal(gross_heating_value=DRY_VALUE).cautions == ()
    (caution,) = coal(gross_heating_value=0.9 * DRY_VALUE).cautions
    assert caution.code == "heating_value_disagrees"
    assert caution.limit == 0.03
    assert caution.message == (
        "the stated heating value, 29.78 MJ/kg, is -10 % off that of the estimate of Channiwala and Parikh (2002), "
        "dry, 33.27 MJ/kg; the stated one was used"
    )


def test_carbon_in_one_ash_stream() -> None:
    """Closed case: all ash in one stream with carbon c leaves A c/(1-c) of carbon, of 0.60 kg carbon."""
    fuel = solid_fuel({"carbon": 0.60, "hydrogen": 0.05, "oxygen": 0.15, "ash": 0.20})
    share = unburned_carbon_share(fuel, [1.0], [0.10])
    assert float(share) == pytest.approx(0.20 * 0.10 / 0.90 / 0.60, rel=1e-12)


def test_carbon_in_the_refuse_of_1919() -> None:
    """Steam, Its Generation and Use, 35th ed. (1919), table 58: refuse of 10.00 % of the dry coal with 17.9 % of carbon
    holds 1.79 % of the coal as carbon. Counted from the refuse's own ash, 8.21 % of the coal, it is the same carbon."""
    fuel = solid_fuel({"carbon": 0.7857, "hydrogen": 0.0560, "oxygen": 0.0762, "ash": 0.0821}, analysis_basis="dry")
    share = unburned_carbon_share(fuel, [1.0], [0.179])
    assert float(share) * 0.7857 == pytest.approx(0.0179, rel=1e-6)


def test_carbon_in_several_ash_streams_and_states() -> None:
    fuel = with_moisture(coal(), np.array([0.0, 0.3]))
    shares, contents = np.array([[0.15], [0.80]]), np.array([[0.2, 0.1], [0.05, 0.02]])
    found = unburned_carbon_share(fuel, shares, contents)
    for state in (0, 1):
        kept = sum(x * c / (1 - c) for x, c in zip((0.15, 0.80), contents[:, state], strict=True))
        assert float(found[state]) == pytest.approx(ASH * kept / 0.7857, rel=1e-12)


STREAM = "the carbon in an ash stream must be at least 0 and below 100 %"


@pytest.mark.parametrize(
    ("content", "message"),
    [
        (1.0, STREAM),
        (-0.1, STREAM),
        (float("nan"), STREAM),
        (0.95, "the ash streams would carry more carbon than the fuel has; check ash, shares and carbon"),
    ],
)
def test_ash_that_cannot_be_is_told(content: float, message: str) -> None:
    with pytest.raises(AnalysisError, match=f"^{re.escape(message)}$"):
        unburned_carbon_share(coal(), [1.0], [content])


PARTS = "carbon, hydrogen, oxygen, nitrogen, sulfur, chlorine, moisture, ash"
EMPTY = "the fuel analysis is empty; give at least carbon or hydrogen"
SOAKED = "moisture is 100 % or more of the fuel as fired; it must stay below"
ALL_ASH = "ash is 100 % or more of the dry fuel; it must stay below"


@pytest.mark.parametrize(
    ("fractions", "basis", "message"),
    [
        ({"carbon": 0.9, "phosphorus": 0.1}, "dry", f"phosphorus is not a part of a mass analysis; it has {PARTS}"),
        ({"carbon": 1.1, "oxygen": -0.1}, "dry", "oxygen is -0.1 in the analysis; a share cannot be negative"),
        ({"carbon": float("nan")}, "dry", "carbon is nan in the analysis; a share cannot be negative"),
        ({}, "as fired", EMPTY),
        ({"ash": 1.0}, "as fired", EMPTY),
        ({"moisture": 0.5, "ash": 0.5}, "as fired", EMPTY),
        ({"carbon": 1.0, "moisture": 1.0}, "dry", SOAKED),
        ({"carbon": 1.0, "moisture": 1.0}, "as fired", SOAKED),
        ({"carbon": 1.0, "ash": 1.0}, "dry ash-free", ALL_ASH),
        ({"carbon": 1.0}, "air dried", "analysis basis 'air dried' is not one of as fired, dry, dry ash-free"),
        ({"oxygen": 0.8, "nitrogen": 0.2}, "dry", "the fuel analysis has nothing that burns"),
    ],
)
def test_what_cannot_be_is_told(fractions: dict[str, float], basis: str, message: str) -> None:
    with pytest.raises(AnalysisError, match=f"^{re.escape(message)}$"):
        solid_fuel(fractions, analysis_basis=basis)


@pytest.mark.parametrize("moisture", [-0.01, 1.0, float("nan")])
def test_a_moisture_that_cannot_be_is_told(moisture: float) -> None:
    with pytest.raises(AnalysisError, match=r"^moisture must be at least 0 and below 100 % of the fuel as fired$"):
        with_moisture(coal(), [0.1, moisture])
