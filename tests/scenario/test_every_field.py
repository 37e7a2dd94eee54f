"""Every declared input: a valid form is read, and what is wrong is answered with a message that names it."""

from typing import Any

import pytest

from fluegas.scenario.field import Field
from fluegas.scenario.fields import FIELDS, FIELDS_OF
from fluegas.scenario.library import library_names
from fluegas.scenario.model import Table
from fluegas.scenario.reading import parse_scenario
from fluegas.scenario.result import work_out
from fluegas.thermo.species import species
from fluegas.units import display_unit, example, from_si
from tests.scenario.documents import AIR, COAL, GAS, OIL, Document, document, problems_of, setting, text_of

IDS = [field.name for field in FIELDS]
QUANTITIES = [field for field in FIELDS if field.kind in ("quantity", "quantity or word") and not field.later]
WRITTEN = [field for field in FIELDS if field.kind not in ("table", "rows") and not field.later]
ARRAYS = ("setting", "readings", "ash_stream", "part")
LIQUID_ONLY = {"mass_percent", "analysis_basis", "specific_heat"}
SOLID_ONLY = {"fuel.mass_percent", "fuel.analysis_basis", "fuel.specific_heat", "fuel.ash_stream"}

LIBRARY_FUEL = library_names()[0]

VALID: dict[str, Any] = {
    "fluegas": 1,
    "title": "Autumn audit",
    "basis": "net",
    "fuel.state": "gas",
    "fuel.kind": "natural gas",
    "fuel.analysis_basis": "dry",
    "fuel.heating_value_at": "constant pressure",
    "fuel.gross_heating_value": "52.9 MJ/kg",
    "fuel.net_heating_value": "47.7 MJ/kg",
    "plant.kind": "kiln",
    "plant.surface_loss": "1.1 %",
    "plant.annual_fuel": "14000 MWh",
    "air.preheat_from": "flue",
    "air.wet_bulb": "16 degC",
    "air.dew_point": "9 degC",
    "setting.baseline": True,
    "setting.compare_with": "Less air",
    "setting.o2_basis": "wet",
    "setting.load": "60 %",
    "fuel.mass_percent": {"carbon": 86.0, "hydrogen": 14.0},
    "fuel.mole_percent": {"methane": 100},
    "fuel.ash_stream": [{"name": "Grate", "ash_share": "100 %", "carbon": "5 %"}],
    "fuel.ash_stream.ash_share": "100 %",
    "fuel.library": LIBRARY_FUEL,
    "fuel.part": [
        {"share": "60 %", "share_of": "heat", **GAS},
        {"share": "40 %", "share_of": "heat", **COAL},
    ],
    "fuel.part.share": "60 %",
    "fuel.part.share_of": "mass",
    "fuel.part.state": "gas",
    "fuel.part.mass_percent": OIL["mass_percent"],
    "setting.air": {"temperature": "30 degC"},
    "setting.fuel": {"temperature": "30 degC"},
    "setting.recirculation": {"share": "10 %"},
    "setting.readings": [{"no": "40 ppm"}, {"no": "42 ppm"}],
    "plant": {"name": "Boiler 2"},
    "fuel": GAS,
    "air": AIR,
    "accuracy": {"o2": {"shared": "0.2 vol%"}},
    "limits": {"carbon_monoxide": "80 ppm"},
    "setting": [setting("As found")],
    "plant.other_losses": {"Blow-down": "0.6 %"},
}
"""A valid value where neither the field's default nor its example nor its dimension gives one."""

BESIDE: dict[str, Document] = {
    "air.burner_temperature": {"preheat_from": "outside"},
    "air.preheat_from": {"burner_temperature": "280 degC"},
    "setting.condensate": {"heat_input": "3 MW", "flue_temperature": "40 degC"},
    "setting.readings.condensate": {"heat_input": "3 MW"},
    "setting.recirculation.temperature": {"share": "10 %"},
    "fuel.ash_stream.name": {"ash_share": "100 %", "carbon": "5 %"},
    "fuel.ash_stream.ash_share": {"carbon": "5 %"},
    "fuel.ash_stream.carbon": {"ash_share": "100 %"},
}
"""What must stand beside a key."""

INSTEAD = (
    {"relative_humidity", "wet_bulb", "dew_point"},
    {"pressure", "altitude"},
    {"o2", "excess_air"},
    {"gross_heating_value", "net_heating_value"},
)
"""Keys that take each other's place."""


def whole_of(field: Field) -> Document:
    """Return a sound document in which the field may stand."""
    fuel: Document = COAL if {field.name, field.table} & SOLID_ONLY else GAS
    if field.name.startswith("fuel.part"):
        part = OIL if field.key in LIQUID_ONLY else GAS
        fuel = {"part": [{"share": "60 %", "share_of": "mass", **part}, {"share": "40 %", "share_of": "mass", **COAL}]}
    if field.key == "library":
        fuel = {key: value for key, value in fuel.items() if key == "part"}
        for key in GAS if fuel else ():
            del fuel["part"][0][key]
    return document(fuel, setting("As found"), setting("Less air", o2="4 %"))


def table_of(whole: Document, field: Field) -> Document:
    """Return the table in the document `whole` where the field stands, made if need be."""
    here = whole
    for part in [] if field.table == "top" else field.table.split("."):
        here = here.setdefault(part, [{}])[0] if part in ARRAYS else here.setdefault(part, {})
    return here


def text_with(field: Field, value: Any, key: str | None = None) -> str:
    """Return the text of a document in which the field, or another `key` in its place, has `value`."""
    whole = whole_of(field)
    table = table_of(whole, field)
    for others in INSTEAD:
        if field.key in others:
            for other in others:
                table.pop(other, None)
    if field.table == "setting.readings":
        whole["setting"][0].pop(field.key, None)
        if field.key == "o2":
            whole["setting"][0].pop("excess_air", None)
    table.update(BESIDE.get(field.name, {}))
    if field.name == "setting.o2_basis":
        table["o2"] = "5 %"
    table[key or field.key] = value
    return text_of(whole)


def valid(field: Field) -> Any:
    for name in (
        field.name,
        field.name.replace("setting.readings", "setting"),
        field.name.replace("fuel.part", "fuel"),
    ):
        if name in VALID:
            return VALID[name]
    if field.kind == "text":
        return "Some words"
    if field.kind == "percent":
        return 2
    return field.default or field.example or example(field.dimensions[0])


def key_of(field: Field) -> str:
    """Return the dotted key in messages about the field: tables in arrays are numbered."""
    tables = [] if field.table == "top" else field.table.split(".")
    numbered = [f"{table}[1]" if table in ARRAYS else table for table in tables]
    return ".".join([*numbered, quoted_key(field.key)])


def quoted_key(key: str) -> str:
    return f"'{key}'" if " " in key else key


def said(field: Field, text: str) -> str:
    """Return what is said about the field, as one text."""
    about = [problem.message for problem in problems_of(text) if problem.key == key_of(field)]
    return "\n".join(about)


@pytest.mark.parametrize("field", FIELDS, ids=IDS)
def test_the_declaration_is_complete(field: Field) -> None:
    assert 0 < len(field.label) <= 24
    assert field.help.endswith(".")
    assert field.kind != "choice" or field.choices
    assert field.kind != "quantity" or field.dimensions or field.later
    if field.default is not None and field.kind == "choice":
        assert field.default in field.choices


@pytest.mark.parametrize("field", [field for field in FIELDS if not field.later], ids=lambda field: field.name)
def test_a_valid_value_is_read_and_worked_out(field: Field) -> None:
    text = text_with(field, valid(field))
    scenario = parse_scenario(text)
    work_out(scenario)
    table = scenario.top
    for part in [] if field.table == "top" else field.table.split("."):
        rows = table.rows(part)
        inner = rows[0] if rows else table.table(part)
        assert isinstance(inner, Table)
        table = inner
    entry = table.entries[field.key]
    if field.kind in ("text", "choice", "flag", "whole", "percent"):
        assert entry == valid(field)
    elif field.kind in ("quantity", "price", "quantity or word"):
        assert getattr(entry, "text", None) == valid(field)


@pytest.mark.parametrize("field", [field for field in FIELDS if field.later], ids=lambda field: field.name)
@pytest.mark.parametrize("value", ["natural gas", {"a": 1}, [{"a": 1}]], ids=["text", "table", "rows"])
def test_what_comes_later_says_so(field: Field, value: Any) -> None:
    assert said(field, text_with(field, value)).startswith("not yet supported: ")


@pytest.mark.parametrize("field", QUANTITIES, ids=lambda field: field.name)
@pytest.mark.parametrize("bare", [7, 7.5, "7", "7,5"], ids=repr)
def test_a_number_without_a_unit_is_questioned(field: Field, bare: Any) -> None:
    message = said(field, text_with(field, bare))
    assert "has no unit; write" in message
    assert "\n" not in message


@pytest.mark.parametrize("field", QUANTITIES, ids=lambda field: field.name)
@pytest.mark.parametrize("value", [True, ["7 K"], {"value": 7}], ids=["true", "list", "table"])
def test_what_is_no_text_is_refused(field: Field, value: Any) -> None:
    assert said(field, text_with(field, value)).startswith("must be text with a unit, e.g. ")


@pytest.mark.parametrize("field", QUANTITIES, ids=lambda field: field.name)
def test_a_unit_of_another_dimension_is_refused_with_the_one_needed(field: Field) -> None:
    wrong = "5 K" if "temperature" not in field.dimensions else "5 kg/h"
    message = said(field, text_with(field, wrong))
    assert "is a unit of " in message
    assert "is needed, e.g. " in message


@pytest.mark.parametrize("field", QUANTITIES, ids=lambda field: field.name)
def test_limits_are_kept_in_every_dimension(field: Field) -> None:
    assert field.low is not None
    assert field.high is not None
    assert field.low < field.high
    for dimension in field.dimensions:
        unit = display_unit(dimension, "si")
        mass = 1.0
        if dimension == "mass_concentration":
            assert field.species is not None
            mass = species(field.species).molar_mass
        step = (field.high - field.low) * 1e-6
        for limit, beyond, word in ((field.low, field.low - step, "least"), (field.high, field.high + step, "most")):
            at = f"{from_si(limit * mass, dimension, unit):.15g} {unit}"
            assert "out of range" not in said(field, text_with(field, at)), at
            outside = f"{from_si(beyond * mass, dimension, unit):.15g} {unit}"
            message = said(field, text_with(field, outside))
            assert f"is out of range: it must be at {word} " in message or "is too large to be meant" in message, (
                outside
            )


@pytest.mark.parametrize("field", QUANTITIES, ids=lambda field: field.name)
def test_what_messages_suggest_is_accepted(field: Field) -> None:
    suggestion = said(field, text_with(field, 7)).partition('e.g. "')[2].rpartition('"')[0]
    assert suggestion
    assert said(field, text_with(field, suggestion)) == ""


@pytest.mark.parametrize("field", WRITTEN, ids=lambda field: field.name)
def test_a_misspelt_key_is_answered_with_the_right_one(field: Field) -> None:
    wrong = field.key[:1] + field.key
    found = problems_of(text_with(field, valid(field), key=wrong))
    messages = [problem.message for problem in found if problem.key.endswith(quoted_key(wrong))]
    assert messages == [f"unknown key; did you mean {field.key!r}?"]


@pytest.mark.parametrize("field", [field for field in FIELDS if field.kind in ("table", "rows")], ids=lambda f: f.name)
def test_a_word_in_the_place_of_a_table_is_refused(field: Field) -> None:
    message = said(field, text_with(field, "none"))
    assert message.startswith(
        "not yet" if field.later else "must be a table: [" if field.kind == "table" else "must be"
    )
    assert "\n" not in message


@pytest.mark.parametrize("field", [field for field in FIELDS if field.kind == "percent"], ids=lambda f: f.name)
def test_percents_of_an_analysis_are_plain_numbers_from_zero_up(field: Field) -> None:
    assert "is not a plain number" in said(field, text_with(field, "7 %"))
    assert "is not a plain number" in said(field, text_with(field, True))
    assert "is negative" in said(field, text_with(field, -0.1))
    assert "it must be at most 1000" in said(field, text_with(field, 1000.1))
    assert said(field, text_with(field, float("nan"))) == "is not a finite number"
    assert said(field, text_with(field, float("inf"))) == "is not a finite number"


@pytest.mark.parametrize("field", [field for field in FIELDS if field.kind == "choice"], ids=lambda f: f.name)
def test_a_choice_takes_its_words_alone(field: Field) -> None:
    for word in field.choices:
        assert "is not one of" not in said(field, text_with(field, word))
    for wrong in ("quite another", 7, True, [field.choices[0]], field.choices[0].upper()):
        assert f"is not one of {', '.join(field.choices)}" in said(field, text_with(field, wrong))


@pytest.mark.parametrize("field", [field for field in WRITTEN if field.kind == "text"], ids=lambda f: f.name)
def test_a_text_is_text_of_bounded_length_without_control_characters(field: Field) -> None:
    longest = 10_000 if field.key == "note" else 200
    assert said(field, text_with(field, 7)) == "must be text in quotation marks"
    assert said(field, text_with(field, "x" * (longest + 1))).endswith(f"at most {longest} are kept")
    assert "holds control characters" in said(field, text_with(field, "a\x1b[31mb"))
    assert "holds control characters" in said(field, text_with(field, "a\u202eb"))
    if field.key not in ("compare_with", "library"):  # which name something that must be there
        assert said(field, text_with(field, "x" * longest)) == ""


def test_every_kind_of_field_is_covered() -> None:
    kinds = {"quantity", "text", "choice", "flag", "whole", "percent", "price", "quantity or word", "table", "rows"}
    assert {field.kind for field in FIELDS} == kinds
    assert sum(len(fields) for fields in FIELDS_OF.values()) == len(FIELDS)
