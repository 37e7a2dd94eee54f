"""The integration core: identities of thermodynamics, shapes, linearity, limits."""

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from fluegas.errors import InputError, RangeError
from fluegas.thermo.mixture import GasSet, Mixture, Temperature, gases_above
from fluegas.thermo.polynomials import FloatArray
from fluegas.thermo.species import species, species_table

GASES = tuple(symbol for symbol, entry in species_table().items() if entry.is_gas)
ALL = GasSet(GASES)
FLUE = GasSet.of("N2", "CO2", "H2O", "O2", "Ar")
AMOUNTS = (7.2, 1.1, 1.9, 0.5, 0.09)
TEMPERATURES = np.concatenate([np.linspace(201, 999, 60), np.linspace(1001, 5999, 60)])


def each() -> Mixture:
    return ALL.each(1)


def slope(values: FloatArray, step: float) -> FloatArray:
    """Return the fourth-order central difference of values at -2, -1, 1, 2 steps on the first axis."""
    result: FloatArray = (values[0] - 8 * values[1] + 8 * values[2] - values[3]) / (12 * step)
    return result


def around(step: float) -> list[FloatArray]:
    return [TEMPERATURES + k * step for k in (-2, -1, 1, 2)]


def test_heat_capacity_is_the_slope_of_enthalpy() -> None:
    """Central differences with 0.25 K: truncation below 1e-9, rounding of h (1e6 J/mol) 1e-9 J/K."""
    step = 0.25
    differences = slope(np.stack([each().enthalpy(t) for t in around(step)]), step)
    np.testing.assert_allclose(differences, each().heat_capacity(TEMPERATURES), rtol=1e-8)


def test_enthalpy_changes_as_temperature_times_entropy() -> None:
    """dh = T ds at constant pressure."""
    step = 0.25
    differences = slope(np.stack([each().entropy(t) for t in around(step)]), step)
    np.testing.assert_allclose(TEMPERATURES * differences, each().heat_capacity(TEMPERATURES), rtol=1e-8)


def test_gibbs_energy_is_enthalpy_less_temperature_times_entropy() -> None:
    expected = each().enthalpy(TEMPERATURES) - TEMPERATURES * each().entropy(TEMPERATURES)
    np.testing.assert_allclose(each().gibbs_energy(TEMPERATURES), expected, rtol=1e-13, atol=1e-7)


def test_gibbs_energy_falls_with_temperature_by_the_entropy() -> None:
    step = 0.25
    differences = slope(np.stack([each().gibbs_energy(t) for t in around(step)]), step)
    np.testing.assert_allclose(-differences, each().entropy(TEMPERATURES), rtol=1e-8)


@pytest.mark.parametrize("symbol", GASES)
def test_the_ranges_join_at_1000_kelvin(symbol: str) -> None:
    """The report's own precision: 1e-3 J/mol in h, 3e-6 J/(mol K) in cp and s."""
    gas = GasSet.of(symbol).mixture([1.0])
    below, above = 1000.0, float(np.nextafter(1000.0, 2000.0))
    assert float(gas.enthalpy(above) - gas.enthalpy(below)) == pytest.approx(0.0, abs=1.2e-3)
    assert float(gas.heat_capacity(above) - gas.heat_capacity(below)) == pytest.approx(0.0, abs=3e-6)
    assert float(gas.entropy(above) - gas.entropy(below)) == pytest.approx(0.0, abs=3e-6)


def test_the_joint_belongs_to_the_lower_range() -> None:
    gas = FLUE.mixture(AMOUNTS)
    alone, beside = gas.enthalpy(1000.0), gas.enthalpy([1000.0, 1200.0])
    assert alone == beside[0]


@pytest.mark.parametrize("shape", [(), (3,), (2, 3)])
@pytest.mark.parametrize("span", [(300.0, 900.0), (1100.0, 2500.0), (300.0, 2500.0)])
def test_any_shape_gives_the_same_numbers(shape: tuple[int, ...], span: tuple[float, float]) -> None:
    t = np.linspace(*span, int(np.prod(shape, dtype=int))).reshape(shape)
    amounts = np.broadcast_to(np.reshape(AMOUNTS, (5, *(1,) * len(shape))), (5, *shape))
    varied = amounts * (1 + 0.1 * t / 1000)
    mixture = FLUE.mixture(varied)
    for method in ("enthalpy", "heat_capacity", "entropy", "gibbs_energy"):
        together = getattr(mixture, method)(t)
        assert together.shape == shape
        for place in np.ndindex(shape):
            single = getattr(FLUE.mixture(varied[:, *place]), method)(float(t[place]))
            np.testing.assert_allclose(together[place], single, rtol=1e-13)


def test_temperatures_broadcast_against_one_mixture_and_mixtures_against_one_temperature() -> None:
    t = np.linspace(300, 2000, 7)
    one = FLUE.mixture(AMOUNTS)
    np.testing.assert_allclose(one.enthalpy(t), [float(one.enthalpy(x)) for x in t], rtol=1e-13)
    three = FLUE.mixture(np.outer(AMOUNTS, [1.0, 2.0, 3.0]))
    assert three.enthalpy(t[:, np.newaxis]).shape == (7, 3)
    tripled = float(one.enthalpy(700.0)) * np.array([1.0, 2.0, 3.0])
    np.testing.assert_allclose(three.enthalpy(700.0), tripled, rtol=1e-13)


def test_empty_states_give_empty_results() -> None:
    assert FLUE.mixture(AMOUNTS).enthalpy(np.empty(0)).shape == (0,)
    assert FLUE.mixture(np.empty((5, 0))).heat_capacity(np.empty(0)).shape == (0,)


@given(
    st.lists(st.floats(0, 100), min_size=len(GASES), max_size=len(GASES)),
    st.floats(200, 6000),
)
def test_a_mixture_is_the_sum_of_its_gases(amounts: list[float], temperature: float) -> None:
    mixture = ALL.mixture(amounts)
    alone = [GasSet.of(gas).mixture([1.0]) for gas in GASES]
    for method in ("enthalpy", "heat_capacity", "entropy", "gibbs_energy"):
        parts = [n * float(getattr(gas, method)(temperature)) for n, gas in zip(amounts, alone, strict=True)]
        scale = sum(abs(part) for part in parts)
        assert float(getattr(mixture, method)(temperature)) == pytest.approx(sum(parts), rel=1e-12, abs=1e-11 * scale)


def test_a_temperature_may_be_handed_in_again() -> None:
    t = np.linspace(250, 3000, 9)
    mixture, at = FLUE.mixture(AMOUNTS), Temperature(t)
    assert np.array_equal(mixture.enthalpy(at), mixture.enthalpy(t))
    assert np.array_equal(mixture.entropy(at), mixture.entropy(t))


@given(st.floats(200, 6000), st.floats(200, 6000))
def test_enthalpy_change_is_the_integral_of_heat_capacity(start: float, end: float) -> None:
    """Gauss-Legendre quadrature of 40 points on each side of 1000 K as the other way to the integral."""
    mixture = FLUE.mixture(AMOUNTS)
    points, weights = np.polynomial.legendre.leggauss(40)
    total = 0.0
    joint = float(np.clip(1000.0, min(start, end), max(start, end)))
    for low, high in ((start, joint), (joint, end)):
        t = np.clip(0.5 * (high + low) + 0.5 * (high - low) * points, 200.0, 6000.0)
        total += 0.5 * (high - low) * float(weights @ mixture.heat_capacity(t))
    assert float(mixture.enthalpy_change(start, end)) == pytest.approx(total, rel=1e-8, abs=2e-2)


def test_enthalpies_of_a_set_are_those_of_its_gases() -> None:
    t = np.array([[300.0, 800.0, 1500.0]])
    found = FLUE.enthalpies(t)
    assert found.shape == (5, 1, 3)
    for row, symbol in zip(found, FLUE.symbols, strict=True):
        np.testing.assert_allclose(row, GasSet.of(symbol).mixture([1.0]).enthalpy(t), rtol=1e-13)


@pytest.mark.parametrize("reference", [273.15, 298.15, 288.7])
def test_a_referenced_set_counts_from_its_temperature(reference: float) -> None:
    counted = FLUE.referenced(reference)
    assert counted.symbols == FLUE.symbols
    np.testing.assert_allclose(counted.enthalpies(reference), 0.0, atol=1e-9)
    t = np.array([250.0, 900.0, 1800.0])
    change = FLUE.mixture(AMOUNTS).enthalpy_change(reference, t)
    np.testing.assert_allclose(counted.mixture(AMOUNTS).enthalpy(t), change, rtol=1e-11)
    np.testing.assert_allclose(gases_above(FLUE.symbols, reference).mixture(AMOUNTS).enthalpy(t), change, rtol=1e-11)
    np.testing.assert_allclose(counted.mixture(AMOUNTS).heat_capacity(t), FLUE.mixture(AMOUNTS).heat_capacity(t))


def test_a_set_knows_its_order_and_its_molar_masses() -> None:
    assert FLUE.index("H2O") == 2
    np.testing.assert_allclose(FLUE.molar_mass, [species(symbol).molar_mass for symbol in FLUE.symbols])


def test_a_set_takes_gases_only() -> None:
    with pytest.raises(InputError, match=r"^H2O\(l\) is not a gas$"):
        GasSet.of("N2", "H2O(l)")
    with pytest.raises(InputError, match=r"^no species 'N3' in the table"):
        GasSet.of("N3")


@pytest.mark.parametrize("method", ["enthalpy", "heat_capacity", "entropy", "gibbs_energy"])
@pytest.mark.parametrize(("temperature", "said"), [(199.0, "199"), (6001.0, "6001")])
def test_temperatures_outside_the_data_are_told(method: str, temperature: float, said: str) -> None:
    with pytest.raises(RangeError) as caught:
        getattr(FLUE.mixture(AMOUNTS), method)([300.0, temperature])
    assert str(caught.value) == (
        f"temperature is {said} K; it must be between 200 and 6000 K (range of the species data, NASA/TP-2002-211556)"
    )
    assert (caught.value.value, caught.value.low, caught.value.high) == (temperature, 200.0, 6000.0)


def test_a_missing_temperature_is_no_temperature() -> None:
    with pytest.raises(RangeError, match=r"^temperature is nan K; it must be between 200 and 6000 K"):
        FLUE.mixture(AMOUNTS).enthalpy([300.0, float("nan")])
