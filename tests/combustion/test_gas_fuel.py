"""Gas fuels from their analysis: amounts, scaling, cautions, what cannot be."""

import numpy as np
import pytest

from fluegas.combustion.fuel import ELEMENTS, FUEL_GASES, fuel_gases, stack_fuels
from fluegas.combustion.gas_fuel import element_matrix, gas_fuel
from fluegas.errors import AnalysisError, InputError
from fluegas.thermo.mixture import GasSet
from fluegas.thermo.species import species

PIPELINE = {"methane": 0.931, "ethane": 0.042, "propane": 0.008, "nitrogen": 0.012, "carbon dioxide": 0.007}


def test_one_kilogram_has_the_amounts_of_its_molar_mass() -> None:
    fuel = gas_fuel(PIPELINE)
    assert float(fuel.gases @ fuel_gases().molar_mass) == pytest.approx(1.0, rel=1e-14)
    methane, ethane = (float(fuel.gases[FUEL_GASES.index(gas)]) for gas in ("CH4", "C2H6"))
    assert methane / ethane == pytest.approx(0.931 / 0.042)


def test_elements_are_those_of_the_gases() -> None:
    fuel = gas_fuel({"CH4": 0.5, "H2S": 0.1, "HCN": 0.1, "COS": 0.1, "Ar": 0.1, "He": 0.1, "H2O": 0.1})
    for symbol in ELEMENTS:
        expected = sum(
            float(fuel.gases[place]) * species(gas).elements.get(symbol, 0)
            for place, gas in enumerate(FUEL_GASES)
            if gas != "H2O"
        )
        assert float(fuel.element(symbol)) == pytest.approx(expected, rel=1e-13)
    assert float(fuel.moisture) == pytest.approx(float(fuel.gases[FUEL_GASES.index("H2O")]))
    assert element_matrix().shape == (len(ELEMENTS), len(FUEL_GASES))


def test_names_and_symbols_mean_the_same() -> None:
    by_symbol = gas_fuel({"CH4": 0.931, "C2H6": 0.042, "C3H8": 0.008, "N2": 0.012, "CO2": 0.007})
    assert np.array_equal(gas_fuel(PIPELINE).gases, by_symbol.gases)


def test_a_gas_named_twice_is_added_up() -> None:
    twice = gas_fuel({"methane": 0.5, "CH4": 0.3, "nitrogen": 0.2})
    np.testing.assert_allclose(twice.gases, gas_fuel({"methane": 0.8, "nitrogen": 0.2}).gases, rtol=1e-14)


def test_arrays_of_analyses_give_arrays_of_fuels() -> None:
    shares = np.array([[0.9, 0.8, 0.7]])
    together = gas_fuel({"methane": shares, "nitrogen": 1 - shares})
    assert together.gross_heating_value.shape == (1, 3)
    for place, share in enumerate(shares[0]):
        single = gas_fuel({"methane": share, "nitrogen": 1 - share})
        assert float(together.net_heating_value[0, place]) == pytest.approx(float(single.net_heating_value), rel=1e-13)
        np.testing.assert_allclose(together.elements[:, 0, place], single.elements, rtol=1e-13)


def test_sensible_heat_is_integrated() -> None:
    fuel = gas_fuel({"methane": 0.9, "H2O": 0.1}, reference_temperature=288.15)
    gases = GasSet.of("CH4", "H2O").mixture([float(fuel.gases[FUEL_GASES.index(gas)]) for gas in ("CH4", "H2O")])
    t = np.array([288.15, 350.0, 600.0])
    np.testing.assert_allclose(fuel.sensible_heat(t), gases.enthalpy_change(288.15, t), rtol=1e-10, atol=1e-6)


@pytest.mark.parametrize("factor", [0.9951, 1.0, 1.0049])
def test_a_sum_near_one_hundred_is_no_caution(factor: float) -> None:
    fuel = gas_fuel({name: factor * share for name, share in PIPELINE.items()})
    assert fuel.cautions == ()
    assert float(fuel.gross_heating_value) == pytest.approx(float(gas_fuel(PIPELINE).gross_heating_value), rel=1e-13)


@pytest.mark.parametrize(("factor", "said"), [(0.9949, "99.49"), (1.02, "102"), (100.0, "1e+04")])
def test_another_sum_is_scaled_and_told(factor: float, said: str) -> None:
    fuel = gas_fuel({name: factor * share for name, share in PIPELINE.items()})
    (caution,) = fuel.cautions
    assert caution.code == "analysis_sum"
    assert caution.message == f"the fuel analysis sums to {said} %, not 100 %; it was scaled to 100 %"
    assert caution.value == pytest.approx(factor)
    assert caution.limit == 1.0
    assert float(fuel.gross_heating_value) == pytest.approx(float(gas_fuel(PIPELINE).gross_heating_value), rel=1e-13)


def test_the_worst_sum_of_an_array_is_told() -> None:
    (caution,) = gas_fuel({"methane": np.array([1.0, 0.97, 1.01])}).cautions
    assert caution.value == pytest.approx(0.97)


def test_a_stated_gross_value_leads() -> None:
    computed = float(gas_fuel(PIPELINE).gross_heating_value)
    fuel = gas_fuel(PIPELINE, gross_heating_value=1.004 * computed)
    assert float(fuel.gross_heating_value) == pytest.approx(1.004 * computed, rel=1e-14)
    assert fuel.cautions == ()


def test_a_stated_net_value_is_taken_up() -> None:
    plain = gas_fuel(PIPELINE)
    fuel = gas_fuel(PIPELINE, net_heating_value=plain.net_heating_value)
    assert float(fuel.gross_heating_value) == pytest.approx(float(plain.gross_heating_value), rel=1e-13)
    assert fuel.cautions == ()


def test_a_stated_value_far_from_the_analysis_is_told() -> None:
    computed = float(gas_fuel(PIPELINE).gross_heating_value)
    (caution,) = gas_fuel(PIPELINE, gross_heating_value=0.9 * computed).cautions
    assert caution.code == "heating_value_disagrees"
    assert caution.value == pytest.approx(-0.1)
    assert caution.limit == 0.01
    assert caution.message == (
        f"the stated heating value, {0.9 * computed / 1e6:.4g} MJ/kg, is -10 % off that of the analysis, from "
        f"enthalpies of formation, {computed / 1e6:.4g} MJ/kg; the stated one was used"
    )


def test_gross_and_net_that_disagree_are_told() -> None:
    plain = gas_fuel(PIPELINE)
    gross, net = plain.gross_heating_value, plain.net_heating_value
    (caution,) = gas_fuel(PIPELINE, gross_heating_value=gross, net_heating_value=1.006 * net).cautions
    assert caution.code == "heating_value_disagrees"
    assert "that of the gross value less the latent heat" in caution.message
    assert gas_fuel(PIPELINE, gross_heating_value=gross, net_heating_value=1.004 * net).cautions == ()


@pytest.mark.parametrize(
    ("fractions", "message"),
    [
        ({}, "the gas analysis is empty; give at least one gas"),
        ({"methane": 0.0}, "the gas analysis is empty; give at least one gas"),
        ({"methane": float("nan")}, "the gas analysis is empty; give at least one gas"),
        ({"methane": 1.1, "ethane": -0.1}, "ethane is -0.1 in the analysis; a share cannot be negative"),
        ({"methane": 0.9, "sulfur dioxide": 0.1}, "sulfur dioxide is not among the gases that a fuel gas may contain"),
        ({"nitrogen": 0.9, "carbon dioxide": 0.1}, "the gas analysis has nothing that burns"),
        ({"H2O": 1.0}, "the gas analysis has nothing that burns"),
    ],
)
def test_what_cannot_be_is_told(fractions: dict[str, float], message: str) -> None:
    with pytest.raises(AnalysisError) as caught:
        gas_fuel(fractions)
    assert str(caught.value) == message


@pytest.mark.parametrize("name", ["marsh gas", "SO2", "liquid water"])
def test_an_unknown_gas_is_told(name: str) -> None:
    with pytest.raises(InputError, match=rf"^no gas named '{name}' in the species table$"):
        gas_fuel({name: 1.0})


def test_fuels_are_stacked() -> None:
    first, second = gas_fuel(PIPELINE), gas_fuel({"hydrogen": 1.0})
    stacked = stack_fuels([first, second])
    assert stacked.elements.shape == (len(ELEMENTS), 2)
    np.testing.assert_array_equal(stacked.gases[:, 1], second.gases)
    np.testing.assert_allclose(
        stacked.sensible_heat(np.array([400.0, 500.0])),
        [float(first.sensible_heat(400.0)), float(second.sensible_heat(500.0))],
        rtol=1e-12,
    )
    assert float(stacked.theoretical_oxygen[0]) == pytest.approx(float(first.theoretical_oxygen))


def test_fuels_of_different_references_are_not_stacked() -> None:
    with pytest.raises(InputError, match=r"must share one reference temperature, not \[288\.15, 298\.15\]$"):
        stack_fuels([gas_fuel(PIPELINE), gas_fuel(PIPELINE, reference_temperature=288.15)])
