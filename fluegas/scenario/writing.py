"""Editing a scenario: each change gives a new scenario, read anew from a text that differs in that change alone.

Only what a person wrote is in the text; defaults never enter it. A change is made in the text and, apart from it, in
the plain data that the text stands for; the new text must read as that data, so that an unusual way of writing a file
can lead to a refusal but never to a wrong file.
"""

import re
from collections.abc import Callable, Mapping
from copy import deepcopy
from typing import Any

from fluegas.errors import InputError, QuantityError, SavingError
from fluegas.scenario.field import Field
from fluegas.scenario.fields import FIELDS_OF
from fluegas.scenario.layout import newline_of
from fluegas.scenario.lines import Path, round_trip_problem
from fluegas.scenario.model import Scenario
from fluegas.scenario.reading import dotted, parse_scenario
from fluegas.scenario.splicing import (
    Entry,
    row_text,
    with_entry,
    with_row,
    with_row_moved,
    with_value,
    without_entry,
)
from fluegas.units import parse_number

_SETTINGS: Path = ("setting",)
_NUMBER = re.compile(r"[-+]?(0|[1-9][0-9]*)(\.[0-9]+)?([eE][-+]?[0-9]+)?")
_WHOLE_ACCURACIES = (("accuracy", "seed"), ("accuracy", "draws"))

Data = dict[str, Any]


def edited(scenario: Scenario, path: Path, entry: Entry) -> Scenario:
    """Return the scenario with `entry` at `path`, such as ("setting", 1, "o2").

    A quantity is kept as the text that was typed ("412 degF"). Where the format wants a bare number or true or false,
    a text that is one is written as that. A new key comes behind the last one of its table, a table that is missing
    is made, and a place one past the last row adds a row of repeat readings or ash streams.

    Raises ScenarioError if the new file would not be valid, InputError if there is no such place, SavingError if the
    file is written in a way that cannot be edited.
    """
    return changed(scenario, {path: entry})


def without(scenario: Scenario, path: Path) -> Scenario:
    """Return the scenario without the key, row or table at `path`. Raises as `edited` does."""
    return changed(scenario, {path: None})


def changed(scenario: Scenario, changes: Mapping[Path, Entry | None]) -> Scenario:
    """Return the scenario with several changes made one after the other, None taking an entry out.

    Only the outcome must be valid: O2 may give way to excess air in one step. Raises as `edited` does.
    """

    def change(text: str, data: Data) -> str:
        for path, entry in changes.items():
            text = _changed(text, data, path, entry)
        return text

    return _finished(scenario, change, ", ".join(dotted(path) for path in changes))


def with_setting(
    scenario: Scenario,
    place: int,
    *,
    name: str,
    copy_of: int | None = None,
    entries: Mapping[str, Entry] | None = None,
) -> Scenario:
    """Return the scenario with a new setting at `place`, a copy of another one or made of `entries`.

    A copy is never the baseline; `entries` replace its own. Raises as `edited` does: ScenarioError for a name that is
    taken, or for a setting without a flue temperature or anything that tells its excess air.
    """
    _there(scenario, place, len(scenario.settings) + 1)
    if copy_of is not None:
        _there(scenario, copy_of, len(scenario.settings))

    given = {"name": name, **(entries or {})}

    def change(text: str, data: Data) -> str:
        block, row = f"[[setting]]{newline_of(text)}", Data()
        if copy_of is not None:
            block, row = row_text(text, _SETTINGS, copy_of), deepcopy(data["setting"][copy_of])
        alone: Data = {"setting": [row]}
        if "baseline" in row:
            block = _changed(block, alone, ("setting", 0, "baseline"), None)
        for key, entry in given.items():
            block = _changed(block, alone, ("setting", 0, key), entry)
        data["setting"].insert(place, row)
        return with_row(text, _SETTINGS, place, block.rstrip("\r\n"))

    return _finished(scenario, change, f"setting {name!r}")


def moved_setting(scenario: Scenario, place: int, target: int) -> Scenario:
    """Return the scenario with the setting at `place` moved to `target`, the comments above it going along.

    The first setting is the baseline unless another one says that it is, so a move may change the baseline.
    """
    for each in (place, target):
        _there(scenario, each, len(scenario.settings))

    def change(text: str, data: Data) -> str:
        data["setting"].insert(target, data["setting"].pop(place))
        return with_row_moved(text, _SETTINGS, place, target)

    return scenario if place == target else _finished(scenario, change, dotted(("setting", place)))


def renamed_setting(scenario: Scenario, place: int, name: str) -> Scenario:
    """Return the scenario with another name for a setting; those that are compared with it follow."""
    _there(scenario, place, len(scenario.settings))
    before = scenario.settings[place].text("name")
    changes: dict[Path, Entry | None] = {("setting", place, "name"): name}
    for other, setting in enumerate(scenario.settings):
        if setting.text("compare_with") == before:
            changes["setting", other, "compare_with"] = name
    return changed(scenario, changes)


def _there(scenario: Scenario, place: int, count: int) -> None:
    if not 0 <= place < count:
        raise InputError(f"{scenario.name}: there is no place {place + 1} among {len(scenario.settings)} settings")


def _changed(text: str, data: Data, path: Path, entry: Entry | None) -> str:
    """Make one change in `data` and return `text` with it."""
    parent = _parent(data, path, make=entry is not None)
    if entry is None:
        del parent[path[-1]]
        return without_entry(text, path)
    written, value = _as_wanted(path, entry)
    if path[-1] == len(parent):
        parent.append(value)
    else:
        parent[path[-1]] = value
    text = with_entry(text, path, value)
    return text if written is None else with_value(text, path, written)


def _parent(data: Data, path: Path, *, make: bool) -> Any:
    """Return the table or list that holds the last part of `path`; missing ones are made or refused."""
    item: Any = data
    for place, part in enumerate(path):
        is_last = place + 1 == len(path)
        if isinstance(item, dict) and isinstance(part, str):
            if part not in item and make and not is_last:
                item[part] = [] if isinstance(path[place + 1], int) else {}
            found = part in item or (make and is_last)
        else:
            if isinstance(item, list) and part == len(item) and make and not is_last:
                item.append({})
            last = len(item) + (make and is_last) if isinstance(item, list) else 0
            found = isinstance(part, int) and 0 <= part < last
        if not found:
            break
        if is_last:
            return item
        item = item[part]
    raise InputError(f"there is no {dotted(path) or 'empty place'} in the file")


def _as_wanted(path: Path, entry: Entry) -> tuple[str | None, Entry]:
    """Return an entry as its field wants it: typed text as a bare number, with its digits, or as true or false."""
    if not isinstance(entry, str):
        return None, entry
    field, typed = _field_at(path), entry.strip()
    kind = "" if field is None else field.kind
    if kind == "flag" and typed in ("true", "false"):
        return None, typed == "true"
    if kind not in ("percent", "whole") and path not in _WHOLE_ACCURACIES:
        return None, entry
    if _NUMBER.fullmatch(typed):
        return typed, int(typed) if typed.lstrip("+-").isdigit() else float(typed)
    try:
        return None, parse_number(typed)
    except QuantityError:
        return None, entry


def _field_at(path: Path) -> Field | None:
    """Return the field that is declared for a path, None if there is none."""
    table, field = "top", None
    for part in path:
        if isinstance(part, int):
            continue
        field = FIELDS_OF.get(table, {}).get(part)
        name = part if table == "top" else f"{table}.{part}"
        table = name if name in FIELDS_OF else name.removeprefix("setting.")
    return field


def _finished(scenario: Scenario, change: Callable[[str, Data], str], what: str) -> Scenario:
    """Return the scenario of the changed text, after making sure that it says what the changed data say."""
    import tomllib

    reason = round_trip_problem(scenario.source)
    if reason is not None:
        raise SavingError(f"{scenario.name}: cannot be edited: {reason}")
    data = tomllib.loads(scenario.source)
    try:
        text = change(scenario.source, data)
        written = tomllib.loads(text)
    except (LookupError, tomllib.TOMLDecodeError) as error:
        raise _unplaced(scenario, what) from error
    new = parse_scenario(text, scenario.name)
    if _without_empty(written) != _without_empty(data):
        raise _unplaced(scenario, what)
    return new


def _unplaced(scenario: Scenario, what: str) -> SavingError:
    return SavingError(
        f"{scenario.name}: {what}: cannot be changed in the way the file is written; change it in the file itself"
    )


def _without_empty(data: Any) -> Any:
    """Return plain data without empty tables: one made of dotted keys goes with its last key."""
    if isinstance(data, dict):
        inner = {key: _without_empty(value) for key, value in data.items()}
        return {key: value for key, value in inner.items() if value != {}}
    return [_without_empty(each) for each in data] if isinstance(data, list) else data
