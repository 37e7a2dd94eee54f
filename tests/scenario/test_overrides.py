"""What a setting changes of the file's air and fuel, and inputs that may be given in several forms."""

from typing import Any

import numpy as np
import pytest

from fluegas.scenario.result import Result
from tests.scenario.documents import AIR, COAL, GAS, OIL, Document, assert_alike, document, figure, result_of, setting

ALIKE = ("efficiency.gross", "efficiency.net", "flue_gas.wet.H2O", "dew_point.water", "air_per_fuel")


def values(result: Result, name: str) -> list[float]:
    return [float(value) for value in result.ledger.account[name]]


def solid(moisture: float, **changes: Any) -> Document:
    """Return coal whose dry analysis is fixed while its moisture [mass percent] changes."""
    dry = {key: value for key, value in COAL["mass_percent"].items() if key != "moisture"}
    total = sum(dry.values())
    mass = {key: 100 * value / total for key, value in dry.items()}
    return {**COAL, "analysis_basis": "dry", "mass_percent": {**mass, "moisture": moisture}, **changes}


# Fuel.


def test_another_moisture_wets_the_same_dry_fuel() -> None:
    own = document(solid(8.0), setting("Dry"), setting("Wet", fuel={"mass_percent": {"moisture": 30.0}}))
    wet = document(solid(30.0), setting("Wet"))
    result, expected = result_of(own), result_of(wet)
    for name in expected.ledger.account:
        np.testing.assert_allclose(
            result.ledger.account[name][1], expected.ledger.account[name][0], rtol=1e-12, atol=1e-15, err_msg=name
        )
    gross = [float(column.fuel.gross_heating_value) for column in result.case.columns]
    assert gross[1] == pytest.approx(gross[0] * (100 - 30) / (100 - 8), rel=1e-12)


def test_moisture_of_an_as_fired_analysis_changes_what_is_as_fired() -> None:
    """Drier coal: the ratio of carbon to ash stays, the heating value grows with the dry mass."""
    result = result_of(document(COAL, setting("8 %"), setting("2 %", fuel={"mass_percent": {"moisture": 2.0}})))
    first, drier = (column.fuel for column in result.case.columns)
    assert float(drier.element("C") / drier.ash) == pytest.approx(float(first.element("C") / first.ash), rel=1e-12)
    assert float(drier.gross_heating_value) == pytest.approx(float(first.gross_heating_value) * 98 / 92, rel=1e-12)
    assert values(result, "efficiency.gross")[1] > values(result, "efficiency.gross")[0]


def test_an_analysis_of_its_own_is_another_fuel_of_which_nothing_else_holds() -> None:
    gas = {**GAS, "temperature": "60 degC", "price": "40 EUR/MWh", "gross_heating_value": "50 MJ/kg"}
    own = document(gas, setting("Gas"), setting("Oil", fuel=OIL))
    result = result_of(own)
    alone = result_of(document(OIL, setting("Oil")))
    for name in alone.ledger.account:
        np.testing.assert_allclose(
            result.ledger.account[name][1], alone.ledger.account[name][0], rtol=1e-12, err_msg=name
        )
    assert result.case.columns[1].fuel_temperature == 298.15
    assert np.isnan(result.case.columns[1].price)


def test_a_heating_value_in_a_setting_replaces_both_of_the_file() -> None:
    """Oil with a gross value in the file and a net one in the setting: the file's gross value does not lead there."""
    result = result_of(document(OIL, setting("A"), setting("B", fuel={"net_heating_value": "41.0 MJ/kg"})))
    net = [float(column.fuel.net_heating_value) for column in result.case.columns]
    assert net[1] == pytest.approx(41.0e6, rel=1e-12)
    assert net[0] > 42e6


def test_other_keys_of_the_fuel_replace_those_of_the_file() -> None:
    fuel = {**OIL, "temperature": "20 degC", "price": "0.9 EUR/kg", "so3_share": "2 %"}
    change = {"temperature": "90 degC", "so3_share": "4 %"}
    result = result_of(document(fuel, setting("Cold"), setting("Hot", fuel=change)))
    fuel_heat = values(result, "credits.gross.fuel")
    # 2.0 kJ/kg K from 25 degC, moisture (0.1 %) at 4.19 beside it; the default heat capacities of the account.
    per_kelvin = (0.999 * 2000 + 0.001 * 4190) / 45.5e6
    assert fuel_heat == pytest.approx([-5 * per_kelvin, 65 * per_kelvin], rel=2e-3)
    assert values(result, "dew_point.acid")[1] > values(result, "dew_point.acid")[0]
    assert result.case.columns[1].price == result.case.columns[0].price


# Air.


def test_another_form_of_humidity_replaces_the_file_s() -> None:
    own = document(GAS, setting("A"), setting("B", air={"dew_point": "2 degC"}))
    alone = document(GAS, setting("B"), air={"temperature": "22 degC", "dew_point": "2 degC", "pressure": "1013 mbar"})
    for name in ALIKE:
        assert figure(own, name, 1) == pytest.approx(figure(alone, name), rel=1e-12)
    assert figure(own, "losses.gross.air_moisture", 1) < figure(own, "losses.gross.air_moisture")


def test_another_air_temperature_keeps_the_file_s_relative_humidity() -> None:
    own = document(GAS, setting("A"), setting("B", air={"temperature": "35 degC"}))
    alone = document(GAS, setting("B"), air={**AIR, "temperature": "35 degC"})
    for name in ALIKE:
        assert figure(own, name, 1) == pytest.approx(figure(alone, name), rel=1e-12)


def test_an_altitude_in_a_setting_replaces_the_file_s_pressure() -> None:
    own = document(GAS, setting("A"), setting("B", air={"altitude": "1500 m"}))
    assert result_of(own).case.columns[1].air.pressure == pytest.approx(84_556, rel=1e-4)  # ISO 2533, table 1


@pytest.mark.parametrize(
    ("altitude", "pressure"),
    [("0 m", 101_325), ("500 m", 95_461), ("1000 m", 89_875), ("2000 m", 79_495), ("3280.84 ft", 89_875)],
)
def test_altitude_gives_the_pressure_of_the_standard_atmosphere(altitude: str, pressure: float) -> None:
    """ISO 2533 (ICAO standard atmosphere), table of pressures; from memory, to five figures."""
    by_altitude = document(GAS, air={"temperature": "22 degC", "altitude": altitude})
    assert result_of(by_altitude).case.columns[0].air.pressure == pytest.approx(pressure, rel=2e-5)
    by_pressure = document(GAS, air={"temperature": "22 degC", "pressure": f"{pressure} Pa"})
    assert_alike(by_altitude, by_pressure, rel=1e-4)


def test_air_without_humidity_is_dry_and_says_so() -> None:
    result = result_of(document(GAS, air={"temperature": "22 degC"}))
    assert values(result, "losses.gross.air_moisture") == [0.0]
    assert "air_assumed_dry" in [caution.code for caution in result.cautions[0]]


def test_without_an_air_table_the_reference_temperature_is_taken_and_said() -> None:
    whole = document(GAS)
    del whole["air"]
    result = result_of(whole)
    assert values(result, "credits.gross.air") == pytest.approx([0.0], abs=1e-15)
    assert {"air_assumed_dry", "air_temperature_assumed"} <= {caution.code for caution in result.cautions[0]}


def test_air_preheated_from_outside_is_a_credit_and_from_the_flue_gas_is_none() -> None:
    preheated = {**AIR, "burner_temperature": "180 degC"}
    plain = figure(document(GAS), "efficiency.gross")
    by_flue = document(GAS, air={**preheated, "preheat_from": "flue"})
    outside = document(GAS, air={**preheated, "preheat_from": "outside"})
    assert figure(by_flue, "efficiency.gross") == pytest.approx(plain, rel=1e-12)
    assert figure(outside, "efficiency.gross") > plain + 0.04
    assert figure(outside, "flame_temperature.complete") == pytest.approx(
        figure(by_flue, "flame_temperature.complete"), rel=1e-12
    )


def test_oxygen_enriched_air_takes_less_of_it() -> None:
    rich = document(GAS, setting(o2=None, excess_air="20 %"), air={**AIR, "oxygen": "30 %"})
    plain = document(GAS, setting(o2=None, excess_air="20 %"))
    ratio = figure(rich, "air_per_fuel") / figure(plain, "air_per_fuel")
    # Molar masses of air with 30 % and with 20.95 % oxygen: 29.312 and 28.965 g/mol.
    assert ratio == pytest.approx(0.2095 / 0.30 * 29.312 / 28.965, rel=1e-4)


# Readings.


def test_repeat_readings_are_averaged_first() -> None:
    repeats = [
        {"o2": "6.0 %", "co": "40 ppm", "flue_temperature": "230 degC"},
        {"o2": "6.8 %", "co": "50 ppm", "flue_temperature": "232 degC"},
        {"o2": "6.4 %"},
    ]
    own = document(GAS, {"name": "A", "readings": repeats})
    assert_alike(own, document(GAS, setting("A")))


def test_repeat_readings_in_mixed_units_are_averaged_as_shares() -> None:
    """CO 28.010 g/mol, molar volume 22.414 dm3/mol at 0 degC and 101.325 kPa: 1 ppm is 1.2497 mg/Nm3."""
    own = document(GAS, setting("A", co=None, readings=[{"co": "40 ppm"}, {"co": "62.484 mg/Nm3"}]))
    assert_alike(own, document(GAS, setting("A", co="45 ppm")), rel=1e-5)


@pytest.mark.parametrize(
    ("key", "share", "mass"),
    [
        ("co", "80 ppm", "99.972 mg/Nm3"),  # 28.010 g/mol
        ("h2", "80 ppm", "7.1953 mg/Nm3"),  # 2.016
        ("ch4", "80 ppm", "57.262 mg/Nm3"),  # 16.043
        ("no", "80 ppm", "107.10 mg/Nm3"),  # 30.006
    ],
)
def test_a_gas_by_mass_per_normal_volume_equals_its_share(key: str, share: str, mass: str) -> None:
    """Share times molar mass over 22.41397 dm3/mol; molar masses IUPAC."""
    assert_alike(document(GAS, setting(**{key: share})), document(GAS, setting(**{key: mass})), rel=3e-5)


def test_a_limit_of_carbon_monoxide_may_be_given_by_mass() -> None:
    """60 ppm undiluted stand above 62 mg/Nm3 (50 ppm) and below 87 mg/Nm3 (70 ppm)."""
    found = {}
    for limit in ("62 mg/Nm3", "87 mg/Nm3"):
        result = result_of(document(GAS, setting(o2="0.1 %", co="60 ppm"), limits={"carbon_monoxide": limit}))
        found[limit] = [caution.code for caution in result.cautions[0]]
    assert found == {"62 mg/Nm3": ["carbon_monoxide_flag"], "87 mg/Nm3": []}


def test_oxygen_wet_dry_carbon_dioxide_and_excess_air_lead_to_one_another() -> None:
    dry = document(GAS)
    account = result_of(dry).ledger.account
    for reading, value in (
        ({"o2_basis": "wet"}, f"{100 * account['flue_gas.wet.O2'][0]:.12f} %"),
        ({"o2": None, "co2": f"{100 * account['flue_gas.dry.CO2'][0]:.12f} %"}, None),
        ({"o2": None, "excess_air": f"{100 * account['excess_air'][0]:.12f} %"}, None),
    ):
        changes = reading if value is None else {**reading, "o2": value}
        assert_alike(document(GAS, setting(**changes)), dry, rel=1e-9)


def test_oxygen_leads_where_carbon_dioxide_stands_beside_it() -> None:
    assert_alike(document(GAS, setting(co2="3 %")), document(GAS))
