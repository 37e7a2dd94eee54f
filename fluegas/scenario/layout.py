"""Where values, headers and blocks stand in the text of a scenario file, to the character.

A mark is put in the place of a value in a fresh copy of the document and the copy is written out: what stands before
and behind the mark are the same characters as before and behind the value. So an edit can replace exactly the value.
A block is a header with its keys, the comments directly above it, and the blank lines behind it.
"""

from collections.abc import Mapping
from dataclasses import dataclass
from typing import Any

from fluegas.scenario.lines import Path

_MARK = "fluegas-mark"


@dataclass(frozen=True)
class Block:
    """A table with a header of its own: its path, where its comments, its header and the next block start."""

    path: Path
    start: int
    header: int
    end: int


def newline_of(text: str) -> str:
    """Return how `text` ends its lines."""
    first = text.find("\n")
    return "\r\n" if first > 0 and text[first - 1] == "\r" else "\n"


def line_start(text: str, position: int) -> int:
    """Return where the line of `position` starts."""
    return text.rfind("\n", 0, position) + 1


def line_end(text: str, position: int) -> int:
    """Return where the line behind that of `position` starts, the length of `text` if there is none."""
    found = text.find("\n", position)
    return len(text) if found < 0 else found + 1


def document_of(text: str) -> Any:
    """Return the document in `text`, every table, array and value with its form."""
    import tomlkit

    return tomlkit.parse(text)


def item_at(document: Any, path: Path) -> Any:
    """Return the item at `path`, None if there is none."""
    item = document
    for part in path:
        if isinstance(item, str) or (isinstance(part, int) and part < 0):
            return None
        try:
            item = item[part]
        except (KeyError, IndexError, TypeError):
            return None
    return item


def is_value(item: Any) -> bool:
    """Return whether an item stands behind an equals sign or in an array, unlike tables with headers or dotted keys."""
    from tomlkit.items import AoT, InlineTable

    return isinstance(item, InlineTable) or not isinstance(item, Mapping | AoT)


def _unused_mark(text: str) -> str:
    mark = _MARK
    while mark in text:
        mark += "-"
    return mark


def span_of(text: str, path: Path, document: Any = None) -> tuple[int, int]:
    """Return where the value at `path` starts and ends. Raises LookupError if its place cannot be told.

    A `document` of `text` that the caller needs no more saves reading it anew; it is spoilt.
    """
    import tomlkit

    document, mark = tomlkit.parse(text) if document is None else document, _unused_mark(text)
    parent: Any = item_at(document, path[:-1])
    if parent is None or item_at(parent, path[-1:]) is None:
        raise LookupError(path)
    parent[path[-1]] = mark
    before, found, behind = tomlkit.dumps(document).partition(f'"{mark}"')
    start, end = len(before), len(text) - len(behind)
    if not found or start >= end or not text.startswith(before) or not text.endswith(behind):
        raise LookupError(path)
    return start, end


def blocks_of(text: str) -> tuple[Block, ...]:
    """Return the blocks of `text` in their order; what stands before the first belongs to none."""
    import tomlkit

    document, mark, paths = tomlkit.parse(text), _unused_mark(text), list[Path]()
    _mark_headers(document.body, (), mark, paths)
    starts, offset = [], 0
    for line, marked in zip(text.split("\n"), tomlkit.dumps(document).split("\n"), strict=True):
        if mark in marked:
            path = paths[int(marked.partition(mark)[2].partition(".")[0])]
            starts.append((path, _with_comments(text, offset), offset))
        offset += len(line) + 1
    ends = [start for _, start, _ in starts[1:]] + [len(text)]
    return tuple(Block(path, start, header, end) for (path, start, header), end in zip(starts, ends, strict=True))


def _mark_headers(body: Any, path: Path, mark: str, paths: list[Path]) -> None:
    """Mark every header below `body` in its comment; a mark's number is the place of its path in `paths`."""
    from tomlkit.items import AoT, Table

    for key, item in body:
        tables: list[tuple[Path, Any]] = []
        if isinstance(item, AoT):
            tables = [((*path, key.key, place), row) for place, row in enumerate(item.body)]
        elif isinstance(item, Table):
            tables = [((*path, key.key), item)]
        for here, table in tables:
            table.comment(f"{mark}{len(paths)}.")
            paths.append(here)
            _mark_headers(table.value.body, here, mark, paths)


def _with_comments(text: str, header: int) -> int:
    """Return where the comments directly above a header start; the header itself if there are none."""
    start = header
    while start > 0:
        above = line_start(text, start - 1)
        if not text[above:start].lstrip(" \t").startswith("#"):
            break
        start = above
    while start < header and not _complete(text[:start]):
        start = line_end(text, start)
    return start


def _complete(text: str) -> bool:
    """Return whether `text` may end here: not within a text of several lines, whose lines may look like comments."""
    import tomllib

    try:
        tomllib.loads(text)
    except tomllib.TOMLDecodeError:
        return False
    return True
