"""The [accuracy] table: how far instruments and other inputs may be off. Checked here; nothing uses it yet."""

import re
from collections.abc import Iterator, Mapping

from fluegas.errors import QuantityError
from fluegas.scenario.fields import FIELDS_OF
from fluegas.scenario.lines import Path
from fluegas.scenario.wording import listed, nearest, quoted
from fluegas.units import parse, parse_number

_OF_READING = re.compile(r"(.+?)\s*%\s+of\s+reading")
_POINTS = re.compile(r"(.+?)\s*points?")
_NUMBERS = {"seed": (0, 2**63 - 1), "draws": (2, 2**24)}
_SHARES = ("saving_threshold", "confidence")
_RELATIVE = ("heating_value", "heat_input", "fuel_rate", "price", "useful_heat", "condensate")
_AIR = ("air_temperature", "relative_humidity", "wet_bulb", "dew_point", "pressure")
_PARTS = ("shared", "random", "kind")


def known_keys() -> tuple[str, ...]:
    """Return every key that the table may have, fuel components as "fuel.methane"."""
    readings = tuple(key for key, field in FIELDS_OF["setting"].items() if field.measured)
    components = (*FIELDS_OF["fuel.mole_percent"], *FIELDS_OF["fuel.mass_percent"])
    fuels = tuple(f"fuel.{name}" for name in dict.fromkeys(components))
    return (*dict.fromkeys((*readings, *_RELATIVE, *_AIR, "moisture", *_SHARES, *_NUMBERS)), *fuels)


def accuracy_problems(table: Mapping[str, object]) -> Iterator[tuple[Path, str]]:
    """Yield path and message of every problem in the [accuracy] table."""
    for key, given in _flat(table):
        path = ("accuracy", *key)
        name = ".".join(key)
        if name not in known_keys():
            yield path, f"unknown key {quoted(name)}{nearest(name, known_keys())}"
        elif name in _NUMBERS:
            low, high = _NUMBERS[name]
            if isinstance(given, bool) or not isinstance(given, int) or not low <= given <= high:
                yield path, f"{quoted(given)} is not a whole number from {low} to {high}"
        elif name in _SHARES:
            message = _share(given)
            if message:
                yield path, message
        else:
            yield from _entry(path, name, given)


def _flat(table: Mapping[str, object]) -> Iterator[tuple[tuple[str, ...], object]]:
    for key, given in table.items():
        if key == "fuel" and isinstance(given, Mapping):
            for component, inner in given.items():
                yield ("fuel", str(component)), inner
        else:
            yield (key,), given


def _share(given: object) -> str | None:
    try:
        if not isinstance(given, str):
            return f'{quoted(given)} has no unit; write it as text with one, e.g. "95 %"'
        value = parse(given, "fraction").value
    except QuantityError as error:
        return str(error)
    return None if 0 <= value < 1 else f"{quoted(given)} is out of range: it must be at least 0 % and below 100 %"


def _entry(path: Path, name: str, given: object) -> Iterator[tuple[Path, str]]:
    if not isinstance(given, Mapping):
        yield path, f'must be a table such as {{ shared = "{_example(name)}" }}'
        return
    if set(given) <= {"kind"}:
        yield path, f'says neither shared nor random; write e.g. {{ shared = "{_example(name)}" }}'
    for part, value in given.items():
        where = (*path, str(part))
        if part not in _PARTS:
            yield where, f"unknown key {quoted(part)}; it may have {listed(_PARTS)}{nearest(str(part), _PARTS)}"
        elif part == "kind":
            if value not in ("limits", "standard"):
                yield where, f"{quoted(value)} is not one of limits, standard"
        else:
            members = value if isinstance(value, list) else [value]
            for member in members or [""]:
                message = _amount(name, member)
                if message:
                    yield where, message


def _dimensions(name: str) -> tuple[str, ...]:
    if name in ("air_temperature", "wet_bulb", "dew_point") or name.endswith("_temperature"):
        return ("temperature_difference",)
    if name == "pressure":
        return ("pressure",)
    field = FIELDS_OF["setting"].get(name)
    return ("fraction",) if field is None else tuple(each for each in field.dimensions if each != "mass_concentration")


def _example(name: str) -> str:
    kinds = _dimensions(name)
    if name in _RELATIVE:
        return "2 %"
    if kinds == ("fraction",):
        return "0.2 vol%" if name in FIELDS_OF["setting"] else "2 points"
    return {"pressure": "3 mbar", "temperature_difference": "2 K"}.get(kinds[0], "2 %")


def _amount(name: str, given: object) -> str | None:
    """Return what is wrong with one amount of doubt, None if it can be used."""
    if isinstance(given, bool) or not isinstance(given, str):
        return f'{quoted(given)} has no unit; write it as text with one, e.g. "{_example(name)}"'
    try:
        for pattern in (_OF_READING, _POINTS):
            matched = pattern.fullmatch(given.strip())
            if matched:
                return None if parse_number(matched[1]) >= 0 else f"{quoted(given)} is negative"
        dimensions = _dimensions(name)
        measure = parse(given, *(("fraction",) if name in _RELATIVE else ()), *dimensions)
    except QuantityError as error:
        if name in _RELATIVE or _dimensions(name) != ("fraction",):
            return str(error)
        # The suggestion for a share is a bare percent, which is refused here.
        wrong = str(error).partition("; write e.g.")[0].partition(", e.g. ")[0]
        return f'{wrong}; write e.g. "{_example(name)}"'
    if measure.unit == "%" and name not in _RELATIVE:
        return (
            f'{quoted(given)} may be of the reading or of the gas; write "... vol%", "... points" or "... % of reading"'
        )
    return None if measure.value >= 0 else f"{quoted(given)} is negative"
