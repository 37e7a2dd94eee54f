"""Emissions and the days of the year from a scenario file: rows of the table, the JSON object, what is refused."""

from typing import Any

import pytest

from fluegas.accounting.inputs import BASES
from fluegas.errors import ScenarioError
from fluegas.report.json_output import json_object
from fluegas.report.ledger_table import LedgerTable, ledger_table
from fluegas.scenario.reading import parse_scenario
from fluegas.scenario.result import Result, work_out

HEAD = """
fluegas = 1
[plant]
heat_input = "1 MW"
operating_hours = "4000 h"
{plant}
[fuel.mole_percent]
methane = 95
nitrogen = 5
[air]
temperature = "20 degC"
{air}
[[setting]]
name = "A"
o2 = "5 %"
flue_temperature = "200 degC"
{first}
[[setting]]
name = "B"
o2 = "3 %"
flue_temperature = "200 degC"
{second}
"""


def worked_out(plant: str = "", air: str = "", first: str = "", second: str = "") -> Result:
    return work_out(parse_scenario(HEAD.format(plant=plant, air=air, first=first, second=second), "unit.toml"))


def rows(result: Result, group: str, system: str = "si") -> dict[str, tuple[str, tuple[str, ...]]]:
    """Return unit and texts by label of the rows in the group whose title begins so."""
    table: LedgerTable = ledger_table(result, system=system, basis="gross")
    found = [each for each in table.groups if each.title.startswith(group)]
    return {row.label: (row.unit, row.texts) for each in found for row in each.rows}


def emissions_of(result: Result, place: int = 0) -> dict[str, Any]:
    found: dict[str, Any] = json_object(result)["settings"][place]["emissions"]
    return found


def test_only_gases_that_were_read_have_rows() -> None:
    plain = rows(worked_out(), "emissions")
    assert list(plain) == ["Fossil CO2, useful", "Fossil CO2 per input", "Fossil CO2 a year"]
    found = rows(worked_out(first='co = "50 ppm"'), "emissions")
    assert {label.split()[0].rstrip(",") for label in found} == {"Fossil", "Reference", "CO"}
    assert found["CO concentration"] == ("mg/Nm3", ("62.5", "-"))
    assert found["Reference O2"] == ("%", ("3.00", "3.00"))


def test_nitrogen_oxides_stand_for_their_parts_and_say_where_from() -> None:
    found = rows(worked_out(first='no = "50 ppm"\nno2 = "4 ppm"', second='nox = "120 mg/Nm3"'), "emissions")
    assert not [label for label in found if label.startswith(("NO ", "NO2"))]
    assert found["NOx by"] == ("", ("NO + NO2", "reading"))
    assert found["NOx concentration"][1] == ("110.8", "120.0")  # 54 ppm x 2.0525
    assert found["NOx at reference O2"][1] == ("124.7", "120.0")  # x 17.95/15.95


def test_us_rows_are_ppm_and_pounds() -> None:
    found = rows(worked_out(first='co = "50 ppm"'), "emissions", "us")
    assert found["CO share"] == ("ppm", ("50", "-"))
    assert found["CO share, ref. O2"] == ("ppm", ("56", "-"))
    assert found["CO per input"][0] == "lb/MMBtu"
    assert found["CO a year"][0] == "lb"


def test_milligrams_that_were_entered_come_back() -> None:
    for key in ("co", "no", "no2", "nox", "so2"):
        found = emissions_of(worked_out(first=f'{key} = "80 mg/Nm3"'))[key]
        assert found["concentration"] == pytest.approx(80e-6, rel=1e-12), key


def test_the_json_object() -> None:
    found = emissions_of(worked_out(plant='reference_oxygen = "6 %"', first='co = "50 ppm"\nso2 = "2 ppm"'))
    assert found["reference_oxygen"] == pytest.approx(0.06)
    monoxide = found["co"]
    assert monoxide["dry"] == pytest.approx(50e-6)
    assert monoxide["at_reference_oxygen"] == pytest.approx(monoxide["concentration"] * 14.95 / 15.95, rel=1e-9)
    assert set(monoxide["per_input"]) == set(BASES)
    assert monoxide["per_year"] == pytest.approx(monoxide["per_input"]["gross"] * 1e6 * 4000 * 3600, rel=1e-12)
    assert found["co2_per_year"] == pytest.approx(found["co2_per_input"]["gross"] * 1e6 * 4000 * 3600, rel=1e-12)
    assert found["so2"]["origin"] == "reading"
    assert found["nox"]["origin"] is None
    assert found["nox"]["dry"] is None


def test_repeat_readings_are_averaged() -> None:
    repeats = 'readings = [ { nox = "60 ppm", co = "0 ppm" }, { nox = "64 ppm", co = "0 ppm" } ]'
    found = emissions_of(worked_out(first=repeats))
    assert found["nox"]["dry"] == pytest.approx(62e-6)
    assert found["co"]["dry"] == 0.0


def test_biogenic_carbon_shows_beside_fossil() -> None:
    text = HEAD.format(plant="", air="", first="", second="").replace(
        "[fuel.mole_percent]", '[fuel]\nbiogenic_share = "40 %"\n[fuel.mole_percent]'
    )
    found = rows(work_out(parse_scenario(text, "unit.toml")), "emissions")
    fossil, every = (float(found[label][1][0]) for label in ("Fossil CO2 per input", "All CO2 per input"))
    assert fossil == pytest.approx(0.6 * every, abs=0.1)


def test_rows_and_figures_of_the_days() -> None:
    result = worked_out(air='coldest = "-10 degC"\nhottest = "35 degC"')
    found = rows(result, "limits")
    assert found["Excess, coldest day"][0] == "%"
    lean = json_object(result)["settings"][0]
    days = lean["air_density"]
    assert days["o2_hottest"] < lean["flue_gas"]["dry"]["O2"] < days["o2_coldest"]
    assert 1 + days["excess_air_hottest"] == pytest.approx((1 + lean["excess_air"]) * 293.15 / 308.15, rel=1e-9)
    assert not [label for label in rows(worked_out(), "limits") if "day" in label]


def test_a_setting_may_have_days_of_its_own() -> None:
    found = rows(worked_out(second='air = { hottest = "40 degC" }'), "limits")
    assert found["O2, hottest day"][1][0] == "-"
    assert found["O2, hottest day"][1][1] != "-"


def test_a_coldest_day_warmer_than_the_hottest_is_refused() -> None:
    with pytest.raises(ScenarioError, match="coldest day, '30 degC', is warmer than the hottest"):
        worked_out(air='coldest = "30 degC"\nhottest = "10 degC"')


def test_a_reference_oxygen_above_the_oxidant_s_is_refused() -> None:
    with pytest.raises(ScenarioError, match=r"reference oxygen is 0\.15"):
        worked_out(plant='reference_oxygen = "15 %"', air='oxygen = "14 %"')
