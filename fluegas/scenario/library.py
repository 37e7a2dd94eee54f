"""The fuel library: typical fuels by name, read when first asked for, and how a file's own entries lie over them."""

import re
from collections.abc import Mapping
from dataclasses import dataclass
from functools import cache
from types import MappingProxyType

from fluegas.errors import DataError, InputError
from fluegas.resources import data_text
from fluegas.scenario.fields import FIELDS_OF, LONGEST_NAME
from fluegas.scenario.model import Table, Value
from fluegas.scenario.values import RefusedError, value_of
from fluegas.scenario.wording import nearest, quoted

HEATING_VALUE_KEYS = ("gross_heating_value", "net_heating_value", "heating_value_at")
ANALYSIS_KEYS = ("mole_percent", "mass_percent", "analysis_basis", *HEATING_VALUE_KEYS)
"""What belongs together with an analysis: another analysis drops all of it."""


@dataclass(frozen=True)
class LibraryFuel:
    """One fuel of the library: its short `name`, the entries of a [fuel] table and where they come from."""

    name: str
    entry: Table
    origin: str


def library_names() -> tuple[str, ...]:
    """Return the names of all fuels, in the order of the data file. Raises DataError if it is damaged."""
    return tuple(_raw())


def known_name(text: str) -> str | None:
    """Return the name that `text` stands for, whatever its case, hyphens and commas; None if there is none."""
    return _plain_names().get(_plain(text))


def library_fuel(text: str) -> LibraryFuel:
    """Return the fuel named `text`.

    Raises InputError, with the nearest name, if there is none; DataError if the data file is missing or damaged.
    """
    name = known_name(text)
    if name is None:
        raise InputError(no_such_fuel(text))
    return _made(name)


def no_such_fuel(text: str) -> str:
    """Return what is said to a name that the library does not have."""
    of_kind = next((name for name, raw in _raw().items() if raw.get("kind") == text.strip().casefold()), None)
    near = f"; did you mean {of_kind!r}?" if of_kind else nearest(text, library_names())
    hint = near or "; `fluegas fuels` lists them"
    return f"there is no library fuel {quoted(text)}{hint}"


def with_library(entry: Table) -> Table:
    """Return the entries of a [fuel] table with those of its library fuel beneath them, in each part of a blend too.

    Any entry of the file leads. An analysis of its own replaces that of the library with its basis and heating value;
    a heating value replaces both of the library's; moisture alone wets the library's dry fuel anew, since every liquid
    and solid of the library is given dry.

    Raises InputError for a name that the library does not have.
    """
    if entry.rows("part"):
        return _with_parts(entry)
    entries = dict(entry.entries)
    name = entry.text("library")
    if name is None:
        return entry
    beneath = dict(library_fuel(name).entry.entries)
    dropped: tuple[str, ...] = ()
    if has_own_analysis(entry):
        dropped = ANALYSIS_KEYS
    else:
        if any(key in entries for key in HEATING_VALUE_KEYS[:2]):
            dropped = HEATING_VALUE_KEYS
        wetness = entries.pop("mass_percent", None)
        whole = beneath.get("mass_percent")
        if isinstance(wetness, Table) and isinstance(whole, Table):
            beneath["mass_percent"] = Table(MappingProxyType({**whole.entries, **wetness.entries}))
    kept = {key: value for key, value in beneath.items() if key not in dropped}
    return Table(MappingProxyType({**kept, **entries}))


def _with_parts(entry: Table) -> Table:
    """Return a blend's entries with the library beneath its parts, named after them if it has no name."""
    parts = tuple(with_library(part) for part in entry.rows("part"))
    names = [part.text("name") or f"part {place}" for place, part in enumerate(parts, 1)]
    return Table(MappingProxyType({"name": " with ".join(names)[:LONGEST_NAME], **entry.entries, "part": parts}))


def has_own_analysis(entry: Table) -> bool:
    """Return whether a table has an analysis with more in it than another moisture."""
    mass = entry.table("mass_percent")
    return entry.table("mole_percent") is not None or (mass is not None and set(mass.entries) != {"moisture"})


def origin_of(entry: Table) -> str | None:
    """Return where the analysis of an `entry` made by `with_library` comes from, None if it is not the library's.

    Raises InputError for a name that the library does not have.
    """
    name = entry.text("library")
    if name is None:
        return None
    found = library_fuel(name)
    return found.origin if _dry_part(entry) == _dry_part(found.entry) else None


def _dry_part(entry: Table) -> dict[str, Value]:
    analysis = entry.table("mole_percent") or entry.table("mass_percent") or Table()
    return {part: value for part, value in analysis.entries.items() if part != "moisture"}


def _plain(text: str) -> str:
    return " ".join(re.findall(r"[a-z0-9]+", text.casefold()))


@cache
def _raw() -> Mapping[str, Mapping[str, object]]:
    import tomllib

    try:
        data = tomllib.loads(data_text("fuels.toml"))
    except tomllib.TOMLDecodeError as error:
        raise _damaged(str(error)) from error
    for name, entry in data.items():
        if not isinstance(entry, dict) or not isinstance(entry.get("origin"), str):
            raise _damaged(f"{name!r} does not say where it comes from")
    return MappingProxyType(data)


@cache
def _plain_names() -> Mapping[str, str]:
    return MappingProxyType({_plain(name): name for name in _raw()})


@cache
def _made(name: str) -> LibraryFuel:
    raw = dict(_raw()[name])
    origin = str(raw.pop("origin"))
    return LibraryFuel(name, _table("fuel", raw, name), origin)


def _table(table: str, raw: Mapping[str, object], name: str) -> Table:
    entries: dict[str, Value] = {}
    for key, given in raw.items():
        try:
            field = FIELDS_OF[table][key]
            if isinstance(given, dict) and field.kind == "table":
                entries[key] = _table(f"{table}.{key}", given, name)
            else:
                entries[key] = value_of(field, given)
        except (KeyError, RefusedError) as error:
            raise _damaged(f"{name!r}, {key}: {error}") from error
    return Table(MappingProxyType(entries))


def _damaged(what: str) -> DataError:
    return DataError(f"data/fuels.toml is damaged: {what}; install fluegas again")
