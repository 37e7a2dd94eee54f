"""A commented scenario file to start from, for a gas, a liquid or a solid.

The values are invented and plain. Comments, examples and the list of what else may be given are taken from the declared
fields, so the file knows every input that this version does.
"""

from collections.abc import Iterator, Mapping
from textwrap import wrap
from types import MappingProxyType

from fluegas.errors import InputError
from fluegas.scenario.field import Field
from fluegas.scenario.fields import FIELDS_OF, FORMAT
from fluegas.scenario.splicing import Entry, literal
from fluegas.units import example

WIDTH, COLUMN = 100, 40
"""Of the lines, and where the comment behind an entry starts."""

_TOP: Mapping[str, Entry] = {
    "fluegas": FORMAT,
    "title": "My boiler, first audit",
    "basis": "gross",
    "reference_temperature": "25 degC",
}
_PLANT: Mapping[str, Entry] = {
    "name": "Boiler 1",
    "kind": "boiler",
    "heat_input": "2 MW",
    "operating_hours": "4000 h",
    "surface_loss": "1.5 %",
}
_AIR: Mapping[str, Entry] = {"temperature": "20 degC", "relative_humidity": "50 %", "pressure": "1013 mbar"}

_FUELS: Mapping[str, Mapping[str, Entry]] = MappingProxyType(
    {
        "gas": {"name": "Pipeline gas", "kind": "natural gas", "state": "gas", "temperature": "15 degC"},
        "liquid": {
            "name": "Light heating oil",
            "kind": "distillate oil",
            "state": "liquid",
            "temperature": "15 degC",
            "gross_heating_value": "45.5 MJ/kg",
            "so3_share": "2 %",
        },
        "solid": {
            "name": "Wood chips",
            "kind": "wood",
            "state": "solid",
            "analysis_basis": "dry",
            "temperature": "15 degC",
            "gross_heating_value": "20 MJ/kg",
            "so3_share": "1 %",
            "biogenic_share": "100 %",
        },
    }
)
_ANALYSES: Mapping[str, tuple[str, Mapping[str, Entry]]] = MappingProxyType(
    {
        "gas": (
            "mole_percent",
            {"methane": 93.0, "ethane": 4.0, "propane": 1.0, "nitrogen": 1.5, "carbon dioxide": 0.5},
        ),
        "liquid": ("mass_percent", {"carbon": 86.4, "hydrogen": 13.2, "sulfur": 0.1, "oxygen": 0.3}),
        "solid": (
            "mass_percent",
            {
                "carbon": 50.0,
                "hydrogen": 6.1,
                "oxygen": 42.4,
                "nitrogen": 0.2,
                "sulfur": 0.02,
                "ash": 1.28,
                "moisture": 40.0,
            },
        ),
    }
)
_SETTINGS: Mapping[str, tuple[Mapping[str, Entry], Mapping[str, Entry]]] = MappingProxyType(
    {
        "gas": (
            {"name": "As found", "o2": "6.0 %", "co": "20 ppm", "flue_temperature": "210 degC"},
            {"name": "Less air", "o2": "3.5 %", "co": "30 ppm", "flue_temperature": "202 degC"},
        ),
        "liquid": (
            {"name": "As found", "o2": "5.5 %", "co": "30 ppm", "flue_temperature": "240 degC"},
            {"name": "Clean tubes", "o2": "5.5 %", "co": "30 ppm", "flue_temperature": "205 degC"},
        ),
        "solid": (
            {"name": "As found", "o2": "9.0 %", "co": "50 ppm", "flue_temperature": "180 degC"},
            {"name": "Less air", "o2": "7.0 %", "co": "60 ppm", "flue_temperature": "175 degC"},
        ),
    }
)
_NOT_FOR_GAS = frozenset({"analysis_basis", "heating_value_at", "specific_heat"})
_WRITTEN_KINDS = frozenset({"quantity", "choice", "flag", "percent", "price", "quantity or word"})


def starter_text(state: str) -> str:
    """Return a scenario file for a fuel of this state: "gas", "liquid" or "solid".

    Raises InputError for another state.
    """
    if state not in _FUELS:
        raise InputError(f"no starter for {state!r}; the states of a fuel are {', '.join(_FUELS)}")
    return "\n".join(_lines(state)) + "\n"


def _lines(state: str) -> Iterator[str]:
    yield from _comment(
        "A scenario file to start from. The values are invented: put yours in their place. Quantities are text with a "
        "unit, SI or US customary; only analyses are plain numbers. A line with # in front of a key is not in force; "
        "take the # away to use it. 'fluegas check' says what is wrong with a file, 'fluegas account' works it out."
    )
    yield ""
    yield from _table("top", _TOP, others=False)
    yield from ("", "[plant]")
    yield from _table("plant", _PLANT)
    yield from ("", "[fuel]")
    yield from _table("fuel", _FUELS[state], leave_out=_NOT_FOR_GAS if state == "gas" else frozenset())
    analysis, parts = _ANALYSES[state]
    yield from ("", f"[fuel.{analysis}]")
    yield from _comment(FIELDS_OF["fuel"][analysis].help + _scaled(state))
    yield from (f"{_key(name)} = {literal(share)}" for name, share in parts.items())
    yield from _comment("There may also be: " + ", ".join(_missing(f"fuel.{analysis}", parts)) + ".")
    yield from ("", "[air]")
    yield from _table("air", _AIR)
    first, second = _SETTINGS[state]
    yield from ("", *_comment("One table for each way of firing. The first is the baseline unless another says so."))
    yield "[[setting]]"
    yield from _table("setting", first)
    yield from ("", "[[setting]]", *(f"{key} = {literal(value)}" for key, value in second.items()))
    yield from ("", "#[limits]")
    yield from _table("limits", {})


def _scaled(state: str) -> str:
    return " Shares are scaled to 100." + (" Moisture is as fired on every basis." if state != "gas" else "")


def _key(name: str) -> str:
    """Return a key as TOML: in quotation marks where it holds blanks."""
    return name if name.replace("-", "").replace("_", "").isalnum() else literal(name)


def _missing(table: str, given: Mapping[str, Entry]) -> list[str]:
    return [_key(key) for key, field in FIELDS_OF[table].items() if key not in given and _in_force(field)]


def _table(
    table: str, given: Mapping[str, Entry], *, others: bool = True, leave_out: frozenset[str] = frozenset()
) -> Iterator[str]:
    """Yield the entries given, each under its comment, then every other key of the table as a comment."""
    known = FIELDS_OF[table]
    for key, value in given.items():
        yield from _entry(f"{key} = {literal(value)}", _words(known[key]))
    for key, field in known.items():
        if others and key not in given and key not in leave_out and _in_force(field) and field.kind in _WRITTEN_KINDS:
            yield from _entry(f"#{key} = {literal(suggestion(field))}", _words(field))


def _entry(entry: str, words: str) -> Iterator[str]:
    """Yield an entry with its comment behind it, which goes on in the lines below."""
    first, *more = wrap(words, WIDTH - COLUMN - 2, break_on_hyphens=False)
    yield f"{entry.ljust(COLUMN - 1)} # {first}"
    yield from (f"{' ' * COLUMN}# {line}" for line in more)


def _in_force(field: Field) -> bool:
    return field.later is None and not field.unused


def suggestion(field: Field) -> Entry:
    """Return a value that `field` takes, as its declaration gives one."""
    if field.kind == "flag":
        return True
    if field.choices and field.kind == "choice":
        return field.default or field.choices[0]
    return field.example or field.default or example(field.dimensions[0])


def _words(field: Field) -> str:
    said = field.help or f"{field.label}."
    return f"{said} One of: {', '.join(field.choices)}." if field.kind == "choice" else said


def _comment(text: str) -> Iterator[str]:
    yield from (f"# {line}" for line in wrap(text, WIDTH - 2, break_on_hyphens=False))
