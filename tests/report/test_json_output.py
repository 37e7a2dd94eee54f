"""`account --json` is a contract: its keys, SI units, nulls, and that any JSON reader can read it."""

import json
from typing import Any

import numpy as np
import pytest

from fluegas import __version__
from fluegas.report.json_output import json_object, json_text
from tests.scenario.documents import COAL, GAS, OIL, Document, document, result_of, setting

LOSSES = {
    "dry_gas",
    "fuel_water",
    "air_moisture",
    "condensation",
    "carbon_monoxide",
    "hydrogen",
    "methane",
    "unburned_carbon",
    "surface",
    "other",
}
SETTING = {
    "name",
    "excess_air",
    "air_ratio",
    "air_per_fuel",
    "flue_gas",
    "losses",
    "credits",
    "efficiency",
    "efficiency_all_input",
    "stack_loss_from_air",
    "available_heat",
    "flame_temperature",
    "dew_point",
    "emissions",
    "against_baseline",
    "doubt",
    "cautions",
}
BOTH = {"gross", "net"}


def strict(text: str) -> Any:
    def refuse(name: str) -> None:
        raise AssertionError(f"{name} is no JSON")

    return json.loads(text, parse_constant=refuse)


def object_of(plain: Document) -> Any:
    return strict(json_text(result_of(plain)))


def three() -> Document:
    """Return a unit in three settings with other losses, a price and a year."""
    return document(
        {**GAS, "price": "38 EUR/MWh"},
        setting("As found"),
        setting("Trimmed", o2="3.2 %", flue_temperature="222 degC"),
        setting("Chamber", chamber_temperature="1000 degC", compare_with="Trimmed"),
        title="Autumn audit",
        plant={
            "heat_input": "3.2 MW",
            "operating_hours": "5200 h",
            "surface_loss": "1.1 %",
            "other_losses": {"Blow-down": "0.6 %", "Door": "0.2 %"},
        },
    )


def test_the_top_holds_what_was_promised() -> None:
    whole = object_of(three())
    assert whole["fluegas"] == __version__
    assert whole["format"] == 1
    assert whole["title"] == "Autumn audit"
    assert whole["basis"] == "gross"
    # Between methane's 55.5 and 50.0 MJ/kg gross and net less the nitrogen and carbon dioxide, about 5 percent by mass.
    assert whole["fuel"]["gross_heating_value"] == pytest.approx(53.1e6, rel=5e-3)
    assert whole["fuel"]["net_heating_value"] == pytest.approx(47.9e6, rel=5e-3)
    assert [each["name"] for each in whole["settings"]] == ["As found", "Trimmed", "Chamber"]


def test_every_setting_holds_every_key() -> None:
    for each in object_of(three())["settings"]:
        assert set(each) >= SETTING
        assert set(each["losses"]) == set(each["credits"]) == set(each["efficiency"]) == BOTH
        assert set(each["efficiency_all_input"]) == set(each["available_heat"]) == BOTH
        for basis in BOTH:
            assert set(each["losses"][basis]) == LOSSES
            assert set(each["losses"][basis]["other"]) == {"Blow-down", "Door"}
            assert set(each["credits"][basis]) == {"air", "air_moisture", "fuel"}
        assert set(each["flue_gas"]) == {"dry", "wet"}
        assert set(each["flue_gas"]["dry"]) >= {"CO2", "CO", "SO2", "N2", "Ar", "O2"}
        assert set(each["flue_gas"]["wet"]) == set(each["flue_gas"]["dry"]) | {"H2O"}
        assert set(each["stack_loss_from_air"]) == {"rigorous", "short_formula"}
        assert set(each["flame_temperature"]) == {"complete", "equilibrium"}
        assert set(each["dew_point"]) == {"water", "acid"}
        assert set(each["against_baseline"]) >= {"compared_with", "fuel", "heat", "cost", "currency", "co2"}
        assert isinstance(each["emissions"], dict)
        assert each["doubt"] is None


def test_figures_are_si_and_fractions_of_one() -> None:
    first = object_of(three())["settings"][0]
    assert 0.39 < first["excess_air"] < 0.40
    assert first["air_ratio"] == pytest.approx(1 + first["excess_air"], rel=1e-12)
    assert 22 < first["air_per_fuel"] < 24
    for basis in ("dry", "wet"):
        assert sum(first["flue_gas"][basis].values()) == pytest.approx(1, abs=1e-9)
    assert first["flue_gas"]["dry"]["O2"] == pytest.approx(0.064, rel=1e-9)
    assert first["flue_gas"]["dry"]["CO"] == pytest.approx(45e-6, rel=1e-9)
    assert 1700 < first["flame_temperature"]["complete"] < 2000
    assert 320 < first["dew_point"]["water"] < 335
    assert first["losses"]["gross"]["surface"] == pytest.approx(0.011, rel=1e-12)
    assert first["losses"]["gross"]["other"] == pytest.approx({"Blow-down": 0.006, "Door": 0.002}, rel=1e-12)


def test_the_account_closes_on_both_bases() -> None:
    whole = object_of(three())
    fuel = whole["fuel"]
    for each in whole["settings"]:
        for basis in BOTH:
            losses = dict(each["losses"][basis])
            lost = sum(losses.pop("other").values()) + sum(losses.values())
            gained = sum(each["credits"][basis].values())
            assert each["efficiency"][basis] == pytest.approx(1 - lost + gained, abs=1e-12)
        ratio = fuel["gross_heating_value"] / fuel["net_heating_value"]
        assert each["efficiency"]["net"] == pytest.approx(each["efficiency"]["gross"] * ratio, rel=1e-12)
        assert each["losses"]["net"]["other"]["Door"] == pytest.approx(0.002 * ratio, rel=1e-12)


def test_what_does_not_exist_is_null() -> None:
    first, _, chamber = object_of(three())["settings"]
    assert first["available_heat"] == {"gross": None, "net": None}
    assert first["flame_temperature"]["equilibrium"] is None
    assert first["dew_point"]["acid"] is None
    assert first["stack_loss_from_air"]["short_formula"] is None
    assert 0 < chamber["available_heat"]["gross"] < chamber["available_heat"]["net"] < 1


def test_the_baseline_is_held_against_itself_with_zeros() -> None:
    first = object_of(three())["settings"][0]["against_baseline"]
    assert first["compared_with"] == "As found"
    assert [first[key] for key in ("fuel", "heat", "cost", "co2")] == [0, 0, 0, 0]
    assert first["currency"] == "EUR"
    alone = object_of(document(GAS))["settings"][0]["against_baseline"]
    assert [alone[key] for key in ("fuel", "heat", "cost", "co2")] == [0, 0, 0, 0]
    assert alone["currency"] is None


def test_savings_are_negative_and_a_year_s() -> None:
    _, trimmed, chamber = object_of(three())["settings"]
    against = trimmed["against_baseline"]
    year = 3.2e6 * 5200 * 3600
    assert against["fuel"] < 0
    assert against["heat"] == pytest.approx(year * against["fuel"], rel=1e-12)
    assert against["cost"] == pytest.approx(against["heat"] * 38 / 3.6e9, rel=1e-12)
    assert against["co2"] == pytest.approx(against["heat"] * 5.04e-8, rel=2e-2)  # 50.4 g/MJ gross, methane-rich gas
    assert chamber["against_baseline"]["compared_with"] == "Trimmed"
    assert chamber["against_baseline"]["fuel"] > 0


def test_a_year_that_is_not_known_is_null() -> None:
    against = object_of(document(GAS, setting("A"), setting("B", o2="3 %")))["settings"][1]["against_baseline"]
    assert (against["heat"], against["cost"], against["co2"], against["currency"]) == (None, None, None, None)
    assert against["fuel"] < 0


def test_a_fuel_rich_setting_has_an_account_of_nulls_and_a_caution() -> None:
    plain = document(GAS, setting("A"), setting("Rich", o2=None, excess_air="-10 %", co=None))
    rich = object_of(plain)["settings"][1]
    assert rich["air_ratio"] == pytest.approx(0.9)
    assert rich["efficiency"] == {"gross": None, "net": None}
    assert rich["against_baseline"]["fuel"] is None
    (caution,) = [each for each in rich["cautions"] if each["code"] == "fuel_rich_unread"]
    assert set(caution) == {"code", "message", "value", "limit", "source"}
    assert caution["value"] == pytest.approx(0.9)
    assert caution["limit"] == 1.0


@pytest.mark.parametrize("fuel", [GAS, OIL, COAL], ids=["gas", "oil", "coal"])
@pytest.mark.parametrize("basis", ["gross", "net"])
def test_every_number_is_finite(fuel: Document, basis: str) -> None:
    whole = object_of({**document(fuel, setting("A"), setting("B", air={"wet_bulb": "12 degC"})), "basis": basis})
    assert whole["basis"] == basis

    def check(part: Any) -> None:
        if isinstance(part, dict):
            for key, value in part.items():
                assert isinstance(key, str)
                check(value)
        elif isinstance(part, list):
            for value in part:
                check(value)
        else:
            assert part is None or isinstance(part, str | bool) or np.isfinite(part)

    check(whole)


def test_the_text_is_ascii_and_gives_names_back_whole() -> None:
    title = 'Färberei "2" \\ 染色 [bold]x[/oops]'
    text = json_text(result_of(document(GAS, setting("<b>& 'x'"), title=title)))
    assert text.isascii()
    assert text.endswith("}\n")
    assert strict(text)["title"] == title
    assert strict(text)["settings"][0]["name"] == "<b>& 'x'"


def test_a_scenario_without_a_title_has_none() -> None:
    assert json_object(result_of(document(GAS)))["title"] is None
