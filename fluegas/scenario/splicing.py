"""Changes in the text of a scenario file: one value, key, row or block replaced, added, taken out or moved.

Each function takes a text and returns a new one; nothing else in it changes, comments, blank lines and line endings
included. What cannot be placed raises LookupError; whoever calls checks that the text says what was meant.
"""

import re
from collections.abc import Mapping, Sequence
from typing import Any

from fluegas.scenario.layout import (
    blocks_of,
    document_of,
    is_value,
    item_at,
    line_end,
    line_start,
    newline_of,
    span_of,
)
from fluegas.scenario.lines import Path

Entry = str | int | float | bool | Sequence["Entry"] | Mapping[str, "Entry"]
"""What a key may be given: text, a number, a word of truth, a list, or a table that is written in one line."""

_ORDER = ("plant", "fuel", "air", "accuracy", "limits", "setting")
_COMMA = re.compile(r"\s*,[ \t]*")
_REST_OF_ROW = re.compile(r"[ \t]*,?[ \t]*(#[^\n]*)?\r?(\n|$)")


def literal(entry: Entry, newline: str = "\n") -> str:
    """Return an entry as TOML; a text of several lines stays one."""
    import tomlkit

    if isinstance(entry, bool):
        return "true" if entry else "false"
    if isinstance(entry, str):
        lines = [tomlkit.string(line).as_string()[1:-1] for line in entry.split("\n")]
        return f'"{lines[0]}"' if len(lines) == 1 else f'"""{newline}{newline.join(lines)}"""'
    if isinstance(entry, int | float):
        return str(entry) if isinstance(entry, int) else repr(float(entry))
    if isinstance(entry, Mapping):
        inner = ", ".join(f"{_name(key)} = {literal(value, newline)}" for key, value in entry.items())
        return f"{{ {inner} }}" if inner else "{}"
    return f"[{', '.join(literal(value, newline) for value in entry)}]"


def _name(key: str) -> str:
    """Return a key as TOML, quoted where it must be."""
    return key if re.fullmatch(r"[A-Za-z0-9_-]+", key) else literal(key)


def with_value(text: str, path: Path, value: str, document: Any = None) -> str:
    """Return `text` with `value`, which is TOML, in the place of the value at `path`. `document` as in `span_of`."""
    start, end = span_of(text, path, document)
    return text[:start] + value + text[end:]


def with_entry(text: str, path: Path, entry: Entry) -> str:
    """Return `text` with `entry` at `path`: its value replaced, or the key added behind the last one of its table."""
    document, newline = document_of(text), newline_of(text)
    item = item_at(document, path)
    if item is not None:
        if not is_value(item):
            raise LookupError(path)
        return with_value(text, path, literal(entry, newline), document)
    place = next(place for place in range(len(path) - 1, -1, -1) if item_at(document, path[:place]) is not None)
    for part in reversed(path[place + 1 :]):
        entry = [entry] if isinstance(part, int) else {part: entry}
    return _added(text, document, path[: place + 1], entry)


def _added(text: str, document: Any, path: Path, entry: Entry) -> str:
    """Return `text` with an entry at `path`, whose parent is there and which is not."""
    from tomlkit.items import AoT, Array, InlineTable

    parent, newline, last = item_at(document, path[:-1]), newline_of(text), path[-1]
    if isinstance(parent, AoT | Array):
        if last != len(parent):
            raise LookupError(path)
        if isinstance(parent, Array):
            return _with_element(text, path, literal(entry, newline))
        return with_row(text, path[:-1], len(parent), _block(path[:-1], entry, newline, rows=True))
    if isinstance(last, int) or not isinstance(parent, Mapping):
        raise LookupError(path)
    line = f"{_name(last)} = {literal(entry, newline)}"
    if isinstance(parent, InlineTable):
        if not parent:
            return with_value(text, path[:-1], f"{{ {line} }}")
        end = span_of(text, (*path[:-1], list(parent)[-1]))[1]
        return f"{text[:end]}, {line}{text[end:]}"
    if len(path) == 1 and isinstance(entry, Mapping):
        return _with_table(text, last, _block(path, entry, newline))
    return _with_line(text, path, line)


def _block(path: Path, entry: Entry, newline: str, *, rows: bool = False) -> str:
    """Return a header with the keys in `entry`."""
    if not isinstance(entry, Mapping):
        raise LookupError(path)
    header = ".".join(_name(part) for part in path if isinstance(part, str))
    lines = [f"[[{header}]]" if rows else f"[{header}]"]
    return newline.join((*lines, *(f"{_name(key)} = {literal(value, newline)}" for key, value in entry.items())))


def _with_table(text: str, name: str, block: str) -> str:
    """Return `text` with a table of the top level in its usual place: before the tables that usually follow."""
    newline = newline_of(text)
    following = _ORDER[_ORDER.index(name) + 1 :] if name in _ORDER else ()
    for other in blocks_of(text):
        if other.path[0] in following:
            return f"{text[: other.start]}{block}{newline}{newline}{text[other.start :]}"
    gap = newline if text.endswith("\n") else newline + newline
    return f"{text}{gap}{block}{newline}"


def _with_line(text: str, path: Path, line: str) -> str:
    """Return `text` with a line behind the last key of the table that `path` belongs to, before its sub-tables."""
    newline, table = newline_of(text), item_at(document_of(text), path[:-1])
    direct = [key for key in table if is_value(table[key])]
    if direct:
        return _behind(text, (*path[:-1], direct[-1]), 1, line)
    blocks = [block for block in blocks_of(text) if block.path[: len(path) - 1] == path[:-1]]
    if blocks and blocks[0].path == path[:-1]:
        end = line_end(text, blocks[0].header)
        before = text[:end] if text[:end].endswith("\n") else text[:end] + newline
        return f"{before}{line}{newline}{text[end:]}"
    if blocks:
        start, header = blocks[0].start, _block(path[:-1], {}, newline)
        return f"{text[:start]}{header}{newline}{line}{newline}{newline}{text[start:]}"
    inner = path[:-1]
    while not is_value(item := item_at(table, inner[len(path) - 1 :])):
        inner = (*inner, list(item)[-1])
    return _behind(text, inner, len(inner) - len(path) + 1, line)


def _behind(text: str, path: Path, own: int, line: str) -> str:
    """Return `text` with a line behind the value at `path`, under its dotted key but for the last `own` parts."""
    newline, (start, end) = newline_of(text), span_of(text, path)
    written = text[line_start(text, start) : start]
    indent = written[: len(written) - len(written.lstrip())]
    dotted = "".join(f"{_name(part)}." for part in _parts(written)[:-own])
    behind = line_end(text, end)
    before = text[:behind] if text[:behind].endswith("\n") else text[:behind] + newline
    return f"{before}{indent}{dotted}{line}{newline}{text[behind:]}"


def _parts(written: str) -> list[str]:
    """Return the parts of the key in `written`, which ends with an equals sign."""
    import tomllib

    try:
        found: Any = tomllib.loads(written + "0")
    except tomllib.TOMLDecodeError as error:
        raise LookupError(written) from error
    parts = []
    while isinstance(found, dict):
        parts.append(next(iter(found)))
        found = found[parts[-1]]
    return parts


def _with_element(text: str, path: Path, value: str) -> str:
    """Return `text` with a value at the end of the array that `path` belongs to, on a line of its own if all are."""
    array, place = path[:-1], path[-1]
    if not isinstance(place, int):
        raise LookupError(path)
    if place == 0:
        return with_value(text, array, f"[{value}]")
    start, end = span_of(text, (*array, place - 1))
    first, rest = line_start(text, start), _REST_OF_ROW.match(text, end)
    if text[first:start].strip() or rest is None:
        return f"{text[:end]}, {value}{text[end:]}"
    comma = "," if rest[0].lstrip().startswith(",") else ""
    row = f"{text[first:start]}{value}{comma}{newline_of(text)}"
    return f"{text[:end]}{'' if comma else ','}{text[end : rest.end()]}{row}{text[rest.end() :]}"


def without_entry(text: str, path: Path) -> str:
    """Return `text` without what is at `path`: its lines, its place in a row of values, or its blocks."""
    from tomlkit.items import Array, InlineTable

    document = document_of(text)
    parent, item = item_at(document, path[:-1]), item_at(document, path)
    if item is None:
        raise LookupError(path)
    if isinstance(parent, InlineTable | Array):
        return _without_element(text, path, parent)
    if is_value(item):
        start, end = span_of(text, path)
        return text[: line_start(text, start)] + text[line_end(text, end) :]
    blocks = [block for block in blocks_of(text) if block.path[: len(path)] == path]
    for block in reversed(blocks):
        text = _without_block(text, block.start, block.end)
    if not blocks:
        for key in item:
            text = without_entry(text, (*path, key))
    return text


def _without_block(text: str, start: int, end: int) -> str:
    if end < len(text):
        return text[:start] + text[end:]
    return text[:start].rstrip(" \t\r\n") + newline_of(text)


def _without_element(text: str, path: Path, parent: Any) -> str:
    """Return `text` without one value of an array or inline table, with one of the commas beside it."""
    keys = list(range(len(parent))) if isinstance(parent, list) else list(parent)
    place = keys.index(path[-1])
    start, end = span_of(text, path)
    first, rest = line_start(text, start), _REST_OF_ROW.match(text, end)
    if isinstance(parent, list) and not text[first:start].strip() and rest is not None:
        return text[:first] + text[rest.end() :]
    if place > 0:
        return text[: span_of(text, (*path[:-1], keys[place - 1]))[1]] + text[end:]
    opening = span_of(text, path[:-1])[0] + 1
    opening += len(text[opening:start]) - len(text[opening:start].lstrip())
    comma = _COMMA.match(text, end)
    return text[:opening] + text[comma.end() if comma else end :]


def _row_spans(text: str, rows: Path) -> list[tuple[int, int]]:
    """Return where each row of an array of tables starts and ends, its sub-tables included."""
    spans: dict[Path, tuple[int, int]] = {}
    for block in blocks_of(text):
        row = block.path[: len(rows) + 1]
        if len(row) > len(rows) and row[:-1] == rows:
            spans[row] = (spans.get(row, (block.start, 0))[0], block.end)
    if not spans:
        raise LookupError(rows)
    return list(spans.values())


def _core(text: str) -> str:
    return text.rstrip(" \t\r\n")


def row_text(text: str, rows: Path, place: int) -> str:
    """Return one row of an array of tables from its header on, without the comments above it."""
    start, end = _row_spans(text, rows)[place]
    header = next(block.header for block in blocks_of(text) if block.start == start)
    return _core(text[header:end])


def with_row(text: str, rows: Path, place: int, block: str) -> str:
    """Return `text` with the text `block` as row `place` of an array of tables."""
    spans, newline = _row_spans(text, rows), newline_of(text)
    if place < len(spans):
        start = spans[place][0]
        return f"{text[:start]}{block}{newline}{newline}{text[start:]}"
    end = spans[-1][1]
    kept = _core(text[:end])
    return f"{kept}{newline}{newline}{block}{text[len(kept) : end] or newline}{text[end:]}"


def with_row_moved(text: str, rows: Path, place: int, target: int) -> str:
    """Return `text` with row `place` of an array of tables at `target`; the comments above its header go with it."""
    spans = _row_spans(text, rows)
    whole = [text[start:end] for start, end in spans]
    moved = [_core(row) for row in whole]
    moved.insert(target, moved.pop(place))
    gaps = [row[len(_core(row)) :] for row in whole]
    return text[: spans[0][0]] + "".join(map("".join, zip(moved, gaps, strict=True))) + text[spans[-1][1] :]
