"""Temperature from enthalpy: round trips, a general-purpose root finder as oracle, the ends of the range."""

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from scipy.optimize import elementwise

from fluegas.errors import RangeError
from fluegas.thermo.mixture import GasSet
from fluegas.thermo.polynomials import FloatArray
from fluegas.thermo.species import species_table
from fluegas.thermo.temperature import temperature_from_enthalpy

GASES = tuple(symbol for symbol, entry in species_table().items() if entry.is_gas)
ALL = GasSet(GASES)
FLUE = GasSet.of("N2", "CO2", "H2O", "O2", "Ar")
AMOUNTS = (7.2, 1.1, 1.9, 0.5, 0.09)


@given(
    st.lists(st.floats(0, 1), min_size=len(GASES), max_size=len(GASES)).filter(lambda amounts: sum(amounts) > 0.01),
    st.lists(st.floats(200, 6000), min_size=1, max_size=8),
)
def test_enthalpy_gives_its_temperature_back(amounts: list[float], temperatures: list[float]) -> None:
    """To 1e-10 (rounding of radicals' large enthalpies); at 1000 K the ranges join within 1.2e-3 J/mol, 6e-5 K."""
    mixture = ALL.mixture(amounts)
    found = temperature_from_enthalpy(mixture, mixture.enthalpy(temperatures))
    at_joint = np.abs(np.array(temperatures) - 1000.0) < 1e-3
    assert np.all(np.abs(found - temperatures) <= np.where(at_joint, 6e-5, 1e-10 * np.array(temperatures)))


@pytest.mark.parametrize("temperature", [200.0, 200.0000001, 999.9999999, 1000.0, 1000.0000001, 5999.9999, 6000.0])
def test_the_ends_and_the_joint_are_found(temperature: float) -> None:
    """Alone, and beside states that settle sooner."""
    mixture = FLUE.mixture(AMOUNTS)
    assert float(temperature_from_enthalpy(mixture, mixture.enthalpy(temperature))) == pytest.approx(
        temperature, rel=1e-11
    )
    beside = np.array([temperature, 400.0, 1700.0, 2400.0])
    np.testing.assert_allclose(temperature_from_enthalpy(mixture, mixture.enthalpy(beside)), beside, rtol=1e-11)


def test_a_large_batch_settles_as_its_states_do_alone() -> None:
    random = np.random.default_rng(5)
    amounts = random.dirichlet(np.full(len(GASES), 0.1), size=50_000).T
    temperatures = np.exp(random.uniform(np.log(200.001), np.log(5999.9), 50_000))
    mixture = ALL.mixture(amounts)
    found = temperature_from_enthalpy(mixture, mixture.enthalpy(temperatures))
    np.testing.assert_allclose(found, temperatures, rtol=1e-10)


def test_a_general_root_finder_agrees() -> None:
    random = np.random.default_rng(6)
    amounts = random.dirichlet(np.full(5, 0.7), size=400).T
    mixture = FLUE.mixture(amounts)
    low, high = mixture.enthalpy(200.0), mixture.enthalpy(6000.0)
    target = low + random.uniform(0, 1, 400) ** 2 * (high - low)

    def excess(t: FloatArray, wanted: FloatArray, *of_gases: FloatArray) -> FloatArray:
        return FLUE.mixture(np.stack(of_gases)).enthalpy(t) - wanted

    ends = (np.full(400, 200.0), np.full(400, 6000.0))
    oracle = elementwise.find_root(excess, ends, args=(target, *amounts), tolerances={"xrtol": 1e-12})
    assert np.all(oracle.success)
    np.testing.assert_allclose(temperature_from_enthalpy(mixture, target), oracle.x, rtol=1e-10)


def test_shapes_broadcast() -> None:
    one = FLUE.mixture(AMOUNTS)
    three = FLUE.mixture(np.outer(AMOUNTS, [1.0, 2.0, 3.0]))
    assert temperature_from_enthalpy(one, one.enthalpy(900.0)).shape == ()
    assert temperature_from_enthalpy(one, np.full((2, 3), one.enthalpy(900.0))).shape == (2, 3)
    heat = np.array([[1e4], [2e4]]) + three.enthalpy(300.0)
    found = temperature_from_enthalpy(three, heat)
    assert found.shape == (2, 3)
    np.testing.assert_allclose(three.enthalpy(found), heat, rtol=1e-11)


def test_a_missing_enthalpy_stays_missing_and_spoils_no_neighbour() -> None:
    """One mixture and many enthalpies, many mixtures and one enthalpy, one of each, none known."""
    mixture = FLUE.mixture(AMOUNTS)
    heat = np.array([float(mixture.enthalpy(700.0)), np.nan, float(mixture.enthalpy(6000.0))])
    np.testing.assert_allclose(temperature_from_enthalpy(mixture, heat), [700.0, np.nan, 6000.0], rtol=1e-11)
    three = FLUE.mixture(np.outer(AMOUNTS, [1.0, np.nan, 0.5]))
    two_by_three = three.enthalpy(np.array([[700.0], [6000.0]]))
    two_by_three[0, 0] = np.nan
    expected = [[np.nan, np.nan, 700.0], [6000.0, np.nan, 6000.0]]
    np.testing.assert_allclose(temperature_from_enthalpy(three, two_by_three), expected, rtol=1e-11)
    assert np.isnan(temperature_from_enthalpy(mixture, np.nan))
    assert np.all(np.isnan(temperature_from_enthalpy(mixture, np.full((2, 2), np.nan))))


@pytest.mark.parametrize(("end", "beyond"), [(200.0, -1.0), (6000.0, 1.0)])
def test_an_enthalpy_outside_the_range_is_told(end: float, beyond: float) -> None:
    mixture = FLUE.mixture(AMOUNTS)
    low, high = float(mixture.enthalpy(200.0)), float(mixture.enthalpy(6000.0))
    wanted = float(mixture.enthalpy(end)) + beyond
    with pytest.raises(RangeError) as caught:
        temperature_from_enthalpy(mixture, [float(mixture.enthalpy(500.0)), wanted])
    assert str(caught.value) == (
        f"enthalpy of the mixture is {wanted:g} J; it must be between {low:g} and {high:g} J (from 200 to 6000 K)"
    )
    assert caught.value.value == wanted
