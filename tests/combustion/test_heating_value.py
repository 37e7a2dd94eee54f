"""Heating values of gases against ISO 6976, a worked mixture of the standard and a textbook."""

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from fluegas.combustion.fuel import Fuel, latent_heat
from fluegas.combustion.gas_fuel import gas_fuel
from fluegas.combustion.heating_value import (
    at_constant_pressure,
    estimated_gross_heating_value,
    molar_heating_values,
)
from fluegas.combustion.product_gas import ProductGas
from fluegas.combustion.solid_fuel import solid_fuel
from fluegas.thermo.mixture import GasSet
from fluegas.thermo.water import heat_of_evaporation
from tests.combustion.drawn import air, coal, fuels, readings
from tests.reference.tables import table

ISO_6976 = table("iso_6976_gross")
CELSIUS = {"0 degC": 0.0, "15 degC": 15.0, "15.55 degC": 140 / 9, "20 degC": 20.0, "25 degC": 25.0}
FEET_PER_MOLE = 8.31446 * 293.15 / 101_325 / 0.3048**3
"""Cubic feet of one mole at 68 degF and 760 mmHg."""
MMBTU = 1.05506e9


@pytest.mark.parametrize("row", ISO_6976, ids=[row["gas"] for row in ISO_6976])
def test_gross_values_of_gases_are_those_of_iso_6976(row: dict[str, str]) -> None:
    """Within 0.007 % at every temperature, about a third of the standard's own uncertainty or less.

    Methanol's enthalpy of formation differs by 0.14 kJ/mol, as much as the standard's uncertainty: 0.02 %; the heat
    of evaporation alone (the row of water) by 0.009 kJ/mol.
    """
    tolerance = {"CH3OH": 2e-4, "H2O": 3e-4}.get(row["gas"], 7e-5)
    for name, celsius in CELSIUS.items():
        gross, _ = molar_heating_values((row["gas"],), 273.15 + celsius)
        assert gross[0] / 1000 == pytest.approx(float(row[name]), rel=tolerance), name


def worked_mixture(reference_temperature: float = 288.15) -> Fuel:
    """Return the gas of ISO 6976:2016, D.2; its page prints five digits, the sixth is from memory."""
    fractions = {"CH4": 0.933212, "C2H6": 0.025656, "C3H8": 0.015368, "N2": 0.010350, "CO2": 0.015414}
    return gas_fuel(fractions, reference_temperature=reference_temperature)


def test_the_worked_mixture_of_iso_6976() -> None:
    """ISO 6976:2016 D.2 at 15 degC. Molar mass 3.2e-5 higher with today's atomic weights, gross value 1e-5 lower.

    The net value 817.102 kJ/mol was worked out by hand from the standard's table; its latent heat is 0.02 % higher.
    """
    fuel = worked_mixture()
    molar_mass = 1 / float(fuel.gases.sum())
    assert 1000 * molar_mass == pytest.approx(17.3884301, rel=4e-5)
    assert float(fuel.gross_heating_value) * molar_mass / 1000 == pytest.approx(906.1799588, rel=2e-5)
    assert float(fuel.gross_heating_value) / 1e6 == pytest.approx(52.113961, rel=5e-5)
    assert float(fuel.net_heating_value) * molar_mass / 1000 == pytest.approx(817.101846, rel=3e-5)


@pytest.mark.parametrize("row", table("heating_values"), ids=lambda row: row["gas"])
def test_a_textbook_table_is_met(row: dict[str, str]) -> None:
    """Moran and Shapiro, table A-25, printed to 10 kJ/kg; older enthalpies of formation (ethane 0.8 kJ/mol): 0.07 %."""
    fuel = gas_fuel({row["gas"]: 1.0})
    assert float(fuel.gross_heating_value) / 1000 == pytest.approx(float(row["gross"]), rel=7e-4)
    assert float(fuel.net_heating_value) / 1000 == pytest.approx(float(row["net"]), rel=7e-4)


def test_methane_lies_between_two_calorimeters() -> None:
    """Pittam and Pilcher -890.7 +-0.4 kJ/mol, and an older -890.35 +-0.30 kJ/mol (NIST Chemistry WebBook)."""
    gross = float(molar_heating_values(("CH4",), 298.15)[0][0]) / 1000
    assert gross == pytest.approx(890.7, abs=0.4)
    assert gross == pytest.approx(890.35, abs=0.30)


@pytest.mark.parametrize("gas", ["N2", "O2", "Ar", "He", "CO2"])
def test_gases_that_do_not_burn_have_none(gas: str) -> None:
    gross, net = molar_heating_values((gas,), 288.15)
    assert gross[0] == pytest.approx(0.0, abs=1e-6)
    assert net[0] == pytest.approx(0.0, abs=1e-6)


def test_water_vapour_has_its_latent_heat() -> None:
    gross, net = molar_heating_values(("H2O",), 288.15)
    assert (gross[0], net[0]) == (float(heat_of_evaporation(288.15)), 0.0)
    wet, dry = gas_fuel({"CH4": 0.98, "H2O": 0.02}), gas_fuel({"CH4": 1.0})
    per_mole_wet = float(wet.gross_heating_value / wet.gases.sum())
    per_mole_dry = float(dry.gross_heating_value / dry.gases.sum())
    assert per_mole_wet == pytest.approx(0.98 * per_mole_dry + 0.02 * float(heat_of_evaporation(298.15)), rel=1e-12)


@given(fuels)
def test_net_is_gross_less_the_latent_heat_of_all_water(fuel: Fuel) -> None:
    water = fuel.element("H") / 2 + fuel.moisture
    difference = water * heat_of_evaporation(fuel.reference_temperature)
    assert float(fuel.gross_heating_value - fuel.net_heating_value) == pytest.approx(float(difference), rel=1e-10)


@given(st.floats(275.0, 320.0), st.floats(275.0, 320.0))
def test_heating_values_change_with_temperature_by_kirchhoffs_law(first: float, second: float) -> None:
    """Net value of methane: d(net)/dT = cp of CH4 + 2 O2 - CO2 - 2 H2O, integrated by the trapezium rule."""
    t = np.linspace(first, second, 400)
    slope = GasSet.of("CH4", "O2", "CO2", "H2O").mixture([1.0, 2.0, -1.0, -2.0]).heat_capacity(t)
    change = molar_heating_values(("CH4",), second)[1][0] - molar_heating_values(("CH4",), first)[1][0]
    assert change == pytest.approx(float(np.trapezoid(slope, t)), abs=1e-3)


@pytest.mark.parametrize(
    ("elements", "gross", "net"),
    [
        ({"carbon": 8 * 12.011, "hydrogen": 18 * 1.008}, 47_900, 44_430),
        ({"carbon": 12.011, "hydrogen": 4 * 1.008, "oxygen": 15.999}, 22_670, 19_920),
        ({"carbon": 12.011}, 32_770, 32_770),
    ],
    ids=["octane", "methanol", "carbon"],
)
def test_liquids_and_carbon_have_the_textbook_difference(elements: dict[str, float], gross: float, net: float) -> None:
    """Moran and Shapiro, table A-25, printed to 10 kJ/kg: each gives the other to 15 kJ/kg."""
    total = sum(elements.values())
    fractions = {name: mass / total for name, mass in elements.items()}
    up = solid_fuel(fractions, state="liquid", net_heating_value=1000.0 * net)
    down = solid_fuel(fractions, state="liquid", gross_heating_value=1000.0 * gross)
    assert float(up.gross_heating_value) / 1000 == pytest.approx(gross, abs=15)
    assert float(down.net_heating_value) / 1000 == pytest.approx(net, abs=15)


def test_channiwala_parikh_on_a_coal_of_1919() -> None:
    """Measured 14,225 Btu/lb dry; the authors' average error is 1.45 % (from memory). By hand: 33.27 MJ/kg."""
    estimated = float(coal().gross_heating_value) / 1e6
    assert estimated == pytest.approx(33.27, abs=0.005)
    assert estimated == pytest.approx(14_225 * 2326e-6, rel=0.0145)


def test_channiwala_parikh_term_by_term() -> None:
    """The published coefficients, one percent of each at a time (from memory)."""
    coefficients = {"C": 0.3491, "H": 1.1783, "S": 0.1005, "O": -0.1034, "N": -0.0151, "ash": -0.0211}
    for part, coefficient in coefficients.items():
        alone = {name: 0.01 * (name == part) for name in coefficients}
        assert float(estimated_gross_heating_value(alone)) == pytest.approx(1e6 * coefficient, rel=1e-12)


@given(st.floats(0.0, 15.0), st.floats(0.0, 45.0), st.floats(0.0, 3.0), st.floats(0.0, 60.0), st.floats(15e3, 45e3))
def test_bomb_values_are_converted_as_iso_1928_does(h: float, o: float, n: float, moisture: float, bomb: float) -> None:
    """ISO 1928 (from memory), J/g, dry analysis in percent: [q_v - 212 H - 0.8 (O + N)] (1 - 0.01 M) - 24.43 M.

    The tolerance is the rounding of its constants: 212 by 0.5, 0.8 by 0.03 for O and 0.09 for N, 24.43 by 0.005.
    """
    printed = (bomb - 212 * h - 0.8 * (o + n)) * (1 - 0.01 * moisture) - 24.43 * moisture
    fractions = {"hydrogen": h / 100, "oxygen": o / 100, "nitrogen": n / 100, "carbon": 1 - (h + o + n) / 100}
    fuel = solid_fuel(
        {**fractions, "moisture": moisture / 100},
        analysis_basis="dry",
        gross_heating_value=1000 * bomb,
        at_constant_volume=True,
    )
    rounding = 0.5 * h + 0.03 * o + 0.09 * n + 0.005 * moisture + 1e-6 * bomb
    assert abs(float(fuel.net_heating_value) / 1000 - printed) <= rounding


@given(st.floats(0.0, 0.5), st.floats(15e6, 30e6))
def test_bomb_values_net_and_gross_say_the_same(moisture: float, gross: float) -> None:
    """At constant volume the latent heat is smaller by R T for each mole of vapour."""
    fractions = {"carbon": 0.5 * (1 - moisture), "hydrogen": 0.06 * (1 - moisture), "oxygen": 0.44 * (1 - moisture)}
    as_fired = {**fractions, "moisture": moisture}
    water = 0.06 * (1 - moisture) / 2.016e-3 + moisture / 18.015e-3
    net = gross - water * (float(heat_of_evaporation(298.15)) - 8.314462618 * 298.15)
    by_gross = solid_fuel(as_fired, gross_heating_value=gross, at_constant_volume=True)
    by_net = solid_fuel(as_fired, net_heating_value=net, at_constant_volume=True)
    assert float(by_gross.gross_heating_value) == pytest.approx(float(by_net.gross_heating_value), rel=1e-9)


def test_burning_hydrogen_in_a_bomb_gives_less_than_in_the_open() -> None:
    """H2 + 1/2 O2 -> liquid water: the air around does work as 1.5 mol of gas vanish, 3.7 kJ/mol H2, of which half a
    mole of oxygen is counted for a solid fuel's hydrogen: 1.24 kJ/mol H2."""
    open_air = float(at_constant_pressure(0.0, 2.0, 0.0, 0.0, 298.15))
    assert open_air == pytest.approx(0.5 * 8.314462618 * 298.15)


def test_latent_heat_broadcasts() -> None:
    assert latent_heat(np.ones((2, 1)), np.ones(3), 298.15).shape == (2, 3)
    assert float(latent_heat(2.0, 1.0, 298.15)) == pytest.approx(2 * 44_004, rel=1e-4)


@pytest.mark.parametrize("row", table("f_factors"), ids=lambda row: row["fuel"])
def test_f_factors_of_the_us_epa(row: dict[str, str]) -> None:
    """Method 19 and 40 CFR 98. The agency rounds over many gases: Fd and Fc within 2.5 %, CO2 per heat within 1 %."""
    pipeline_gas = {"CH4": 0.931, "C2H6": 0.042, "C3H8": 0.008, "N2": 0.012, "CO2": 0.007}
    composition = {"natural gas": pipeline_gas, "propane": {"C3H8": 1.0}, "butane": {"n-C4H10": 1.0}}[row["fuel"]]
    fuel = gas_fuel(composition)
    gas = ProductGas(fuel, air(), readings(excess_air=0.0))
    per_heat = MMBTU / float(fuel.gross_heating_value)
    assert float(gas.dry_flue_gas) * per_heat * FEET_PER_MOLE == pytest.approx(float(row["Fd"]), rel=0.025)
    assert float(gas.burned_carbon) * per_heat * FEET_PER_MOLE == pytest.approx(float(row["Fc"]), rel=0.025)
    assert float(gas.burned_carbon) * per_heat * 0.04401 == pytest.approx(float(row["carbon_dioxide"]), rel=0.01)
