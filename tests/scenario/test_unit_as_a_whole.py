"""Heat input, fuel rates, prices and yearly fuel in their several forms, comparison, ash, recirculation, condensate."""

import numpy as np
import pytest

from fluegas.errors import ScenarioError
from fluegas.scenario.result import Result
from tests.scenario.documents import COAL, GAS, OIL, Document, assert_alike, document, figure, result_of, setting

MOLAR_VOLUME = 22.413969545e-3
"""Of an ideal gas at 0 degC and 101.325 kPa [m3/mol], CODATA 2018."""
STANDARD_CUBIC_FOOT = 0.028316846592 * (273.15 / 288.7055555555556) / MOLAR_VOLUME
"""Moles in a cubic foot (0.3048 m cubed) at 60 degF and 101.325 kPa."""
MWH, YEAR_HOURS = 3.6e9, 5200.0


def pair(fuel: Document = GAS, **plant: object) -> Document:
    """Return a unit as found and with less air."""
    return document(
        fuel, setting("As found"), setting("Less air", o2="3.2 %", flue_temperature="222 degC"), plant=plant
    )


def gas_rates() -> dict[str, str]:
    """Return the fuel rates that carry 3.2 MW gross of the gas, by unit."""
    fuel = result_of(document(GAS)).case.columns[0].fuel
    mass = 3.2e6 / float(fuel.gross_heating_value)
    moles = mass * float(np.sum(fuel.gases))
    return {
        "kg/h": f"{mass * 3600:.12f} kg/h",
        "lb/h": f"{mass * 3600 / 0.45359237:.12f} lb/h",
        "Nm3/h": f"{moles * MOLAR_VOLUME * 3600:.12f} Nm3/h",
        "Sm3/h": f"{moles * MOLAR_VOLUME * 288.15 / 273.15 * 3600:.12f} Sm3/h",
        "scf/h": f"{moles / STANDARD_CUBIC_FOOT * 3600:.9f} scf/h",
        "scf/d": f"{moles / STANDARD_CUBIC_FOOT * 86400:.9f} scf/d",
    }


# Heat input.


@pytest.mark.parametrize("unit", ["kg/h", "lb/h", "Nm3/h", "Sm3/h", "scf/h", "scf/d"])
def test_a_fuel_rate_equals_the_heat_input_it_carries(unit: str) -> None:
    by_rate = result_of(pair(fuel_rate=gas_rates()[unit]))
    by_heat = result_of(pair(heat_input="3.2 MW"))
    np.testing.assert_allclose(by_rate.ledger.heat_input, by_heat.ledger.heat_input, rtol=1e-8)
    assert by_heat.ledger.heat_input[0] == pytest.approx(3.2e6)


def test_heat_input_is_on_the_basis_of_the_file() -> None:
    gross, net = (
        result_of({**document(GAS), "basis": basis, "plant": {"fuel_rate": "230 kg/h"}}) for basis in ("gross", "net")
    )
    fuel = gross.case.columns[0].fuel
    ratio = float(fuel.net_heating_value / fuel.gross_heating_value)
    assert net.ledger.heat_input[0] / gross.ledger.heat_input[0] == pytest.approx(ratio, rel=1e-12)
    assert net.ledger.account["efficiency.net"] == pytest.approx(gross.ledger.account["efficiency.net"], rel=1e-12)


def test_a_setting_without_heat_input_gives_the_baseline_s_useful_heat() -> None:
    result = result_of(pair(heat_input="3.2 MW", surface_loss="1.1 %"))
    useful = result.ledger.account["efficiency.gross"] * result.ledger.heat_input
    assert useful[1] == pytest.approx(useful[0], rel=1e-12)


def test_a_setting_with_its_own_heat_input_loses_the_same_power_from_its_surface() -> None:
    whole = pair(heat_input="3.2 MW", surface_loss="1.1 %")
    whole["setting"][1]["heat_input"] = "1.6 MW"
    result = result_of(whole)
    assert result.ledger.heat_input == pytest.approx([3.2e6, 1.6e6])
    assert result.ledger.account["losses.gross.surface"] == pytest.approx([0.011, 0.022], rel=1e-12)


def test_repeat_readings_of_a_fuel_meter_are_averaged() -> None:
    whole = pair(heat_input="3.2 MW", surface_loss="1.1 %")
    whole["setting"][1] |= {"readings": [{"fuel_rate": "99 kg/h"}, {"fuel_rate": "101 kg/h"}]}
    one = pair(heat_input="3.2 MW", surface_loss="1.1 %")
    one["setting"][1]["fuel_rate"] = "100 kg/h"
    assert_alike(whole, one)
    np.testing.assert_allclose(result_of(whole).ledger.heat_input, result_of(one).ledger.heat_input, rtol=1e-12)
    whole["setting"][1]["readings"] = [{"heat_input": "1.5 MW"}, {"heat_input": "1.7 MW"}]
    assert result_of(whole).ledger.heat_input[1] == pytest.approx(1.6e6)


def test_repeat_readings_of_a_heat_input_and_a_fuel_rate_are_one_too_many() -> None:
    whole = pair()
    whole["setting"][1] |= {"heat_input": "1 MW", "readings": [{"fuel_rate": "99 kg/h"}, {"fuel_rate": "101 kg/h"}]}
    with pytest.raises(ScenarioError, match=r"setting\[2\]\.fuel_rate: beside heat_input"):
        result_of(whole)


# Money and a year's fuel.


def savings(result: Result) -> tuple[float, float, float]:
    comparison = result.ledger.comparison
    return float(comparison.heat[1]), float(comparison.cost[1]), float(comparison.carbon_dioxide[1])


def test_a_price_by_heat_by_mass_and_by_volume_costs_the_same() -> None:
    """41 EUR/MWh on the gross value, worked out per kilogram and per normal cubic metre by hand."""
    fuel = result_of(document(GAS)).case.columns[0].fuel
    per_kilogram = 41.0 / MWH * float(fuel.gross_heating_value)
    per_cubic_metre = per_kilogram / (float(np.sum(fuel.gases)) * MOLAR_VOLUME)
    costs = []
    for price in ("41 EUR/MWh", f"{per_kilogram:.12f} EUR/kg", f"{per_cubic_metre:.12f} EUR/Nm3"):
        result = result_of(pair({**GAS, "price": price}, heat_input="3.2 MW", operating_hours=f"{YEAR_HOURS} h"))
        costs.append(savings(result)[1])
        assert result.case.currency == "EUR"
    fuel_change = result.ledger.comparison.fuel[1]
    assert costs == pytest.approx([3.2 * YEAR_HOURS * fuel_change * 41.0] * 3, rel=1e-9)
    assert costs[0] < 0


def test_a_year_s_fuel_by_heat_mass_and_volume_is_the_same() -> None:
    fuel = result_of(document(GAS)).case.columns[0].fuel
    heat = 3.2e6 * YEAR_HOURS * 3600
    mass = heat / float(fuel.gross_heating_value)
    volume = mass * float(np.sum(fuel.gases)) * MOLAR_VOLUME
    expected = savings(result_of(pair({**GAS, "price": "41 EUR/MWh"}, heat_input="3.2 MW", operating_hours="5200 h")))
    for annual in (f"{heat / MWH:.9f} MWh", f"{mass / 1000:.9f} t", f"{volume:.9f} Nm3"):
        found = savings(result_of(pair({**GAS, "price": "41 EUR/MWh"}, annual_fuel=annual)))
        assert found == pytest.approx(expected, rel=1e-9), annual


def test_a_year_s_fuel_leads_over_the_hours() -> None:
    both = result_of(pair(heat_input="3.2 MW", operating_hours="5200 h", annual_fuel="1000 MWh"))
    alone = result_of(pair(annual_fuel="1000 MWh"))
    assert both.ledger.comparison.heat[1] == pytest.approx(alone.ledger.comparison.heat[1], rel=1e-12)


def test_without_price_or_hours_there_is_no_cost_and_no_year() -> None:
    comparison = result_of(pair(heat_input="3.2 MW")).ledger.comparison
    assert np.isnan(comparison.heat[1])
    assert np.isnan(comparison.cost[1])
    assert comparison.fuel[1] < 0


def test_percents_of_losses_are_on_the_basis_of_the_file() -> None:
    plant = {"surface_loss": "2 %", "other_losses": {"Blow-down": "1 %"}}
    for basis in ("gross", "net"):
        account = result_of({**document(GAS), "basis": basis, "plant": plant}).ledger.account
        assert account[f"losses.{basis}.surface"] == pytest.approx([0.02], rel=1e-12)
        assert account[f"losses.{basis}.other"] == pytest.approx([0.01], rel=1e-12)


# Comparison.


def test_settings_are_compared_with_the_one_they_name_else_with_the_baseline() -> None:
    high, clean = setting("High"), setting("High, clean", flue_temperature="200 degC")
    low, low_clean = (
        setting("Low", o2="8 %"),
        setting("Low, clean", o2="8 %", flue_temperature="200 degC", compare_with="Low"),
    )
    result = result_of(document(GAS, high, clean, low, low_clean))
    assert result.ledger.comparison.compared_with == (0, 0, 0, 2)
    eta = result.ledger.account["efficiency.gross"]
    assert result.ledger.comparison.fuel[3] == pytest.approx(eta[2] / eta[3] - 1, rel=1e-12)
    assert result.ledger.comparison.fuel[1] == pytest.approx(eta[0] / eta[1] - 1, rel=1e-12)


def test_the_baseline_may_stand_anywhere() -> None:
    result = result_of(document(GAS, setting("A", o2="3 %"), setting("B", baseline=True), setting("C", o2="4 %")))
    assert result.scenario.baseline_index == 1
    assert result.ledger.comparison.compared_with == (1, 1, 1)
    assert result.ledger.comparison.fuel[1] == 0.0


# Ash, condensate, recirculation, reference temperature.


def ash(*streams: tuple[str, str]) -> list[dict[str, str]]:
    return [
        {"name": f"Ash {place}", "ash_share": share, "carbon": carbon} for place, (share, carbon) in enumerate(streams)
    ]


def test_ash_streams_give_the_carbon_that_did_not_burn() -> None:
    """Residues of 6 % and 18 % carbon: by hand, 10 % ash times (0.7*6/94 + 0.3*18/82) over 67 % carbon."""
    streams = {**COAL, "ash_stream": ash(("70 %", "6 %"), ("30 %", "18 %"))}
    by_hand = 0.10 * (0.7 * 6 / 94 + 0.3 * 18 / 82) / 0.67
    assert by_hand == pytest.approx(0.0164977, rel=1e-4)
    assert_alike(document(streams), document(COAL, setting(unburned_carbon=f"{100 * by_hand:.12f} %")), rel=1e-10)
    loss = figure(document(streams), "losses.gross.unburned_carbon")
    gross = float(result_of(document(COAL)).case.columns[0].fuel.gross_heating_value)
    assert loss == pytest.approx(by_hand * 0.67 * 33.7e6 / gross, rel=1e-3)


def test_a_measured_condensate_replaces_the_rule_of_saturation() -> None:
    cold = setting(o2="3 %", flue_temperature="40 degC")
    by_rule = document(GAS, cold, plant={"heat_input": "1 MW"})
    assert figure(by_rule, "losses.gross.condensation") < -0.03
    half = document(GAS, {**cold, "condensate": "25 kg/h"}, plant={"heat_input": "1 MW"})
    double = document(GAS, {**cold, "condensate": "50 kg/h"}, plant={"heat_input": "1 MW"})
    given = figure(half, "losses.gross.condensation")
    assert given == pytest.approx(-25 / 3600 * 2.406e6 / 1e6, rel=2e-3)  # heat of evaporation at 40 degC, IAPWS
    assert figure(double, "losses.gross.condensation") == pytest.approx(2 * given, rel=1e-12)
    repeats = document(
        GAS, {**cold, "readings": [{"condensate": "20 kg/h"}, {"condensate": "30 kg/h"}]}, plant={"heat_input": "1 MW"}
    )
    assert_alike(repeats, half)


def test_recirculated_gas_cools_the_flame_and_leaves_the_account() -> None:
    plain = document(GAS)
    led_back = document(GAS, setting(recirculation={"share": "20 %"}))
    hot = document(GAS, setting(recirculation={"share": "20 %", "temperature": "400 degC"}))
    assert figure(led_back, "efficiency.gross") == pytest.approx(figure(plain, "efficiency.gross"), rel=1e-12)
    flame = [figure(each, "flame_temperature.complete") for each in (plain, hot, led_back)]
    assert flame[0] > flame[1] + 50 > flame[2] + 60
    same = document(GAS, setting(recirculation={"share": "0.2 kg/kg", "temperature": "231 degC"}))
    assert_alike(same, led_back)


@pytest.mark.parametrize("temperature", ["0 degC", "15 degC", "60 degF"])
def test_another_reference_temperature_moves_heat_between_lines_and_leaves_the_useful_heat(temperature: str) -> None:
    """The useful heat of a kilogram is the enthalpy that goes in less what goes out, whatever it is counted from."""
    usual = document({**GAS, "temperature": "15 degC"})
    other = {**usual, "reference_temperature": temperature}
    assert figure(other, "losses.gross.dry_gas") > figure(usual, "losses.gross.dry_gas")
    assert figure(other, "credits.gross.air") > figure(usual, "credits.gross.air")
    useful = []
    for each in (usual, other):
        result = result_of(each)
        useful.append(
            float(result.ledger.account["efficiency.gross"][0] * result.case.columns[0].fuel.gross_heating_value)
        )
    assert useful[1] == pytest.approx(useful[0], rel=1e-9)


def test_the_metal_temperature_of_a_setting_leads_over_the_file_s() -> None:
    whole = document(
        {**OIL, "mass_percent": {**OIL["mass_percent"], "sulfur": 2.0}},
        setting("A"),
        setting("B", metal_temperature="190 degC"),
        setting("C", readings=[{"metal_temperature": "180 degC"}, {"metal_temperature": "200 degC"}]),
        limits={"metal_temperature": "100 degC"},
    )
    codes = [[caution.code for caution in cautions] for cautions in result_of(whole).cautions]
    assert "acid_dew_point_metal" in codes[0]
    assert "acid_dew_point_metal" not in codes[1]
    assert "acid_dew_point_metal" not in codes[2]


def test_an_estimated_surface_loss_follows_the_rated_output() -> None:
    """EN 12952-15 form: 0.0113 times 2.8 MW to the power 0.7 of heat, over 3.2 MW of heat input."""
    result = result_of(pair(heat_input="3.2 MW", rated_output="2.8 MW", surface_loss="estimate"))
    assert result.ledger.account["losses.gross.surface"][0] == pytest.approx(0.0113 * 2.8**0.7 / 3.2, rel=1e-9)
