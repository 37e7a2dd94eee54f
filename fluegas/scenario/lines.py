"""On which lines the tables and keys of a scenario file stand.

Markers are put in the place of values in a fresh copy of the document, the copy is written out, and the line of a
marker is the answer: it holds for inline tables, arrays and headers alike. Only files with problems pay for it.
"""

from collections.abc import Sequence
from typing import Any

Path = tuple[str | int, ...]

_MARK = "fluegas-line-marker-{}-end"
_ROUNDS = 3


def lines_of(source: str, paths: Sequence[Path]) -> dict[Path, int | None]:
    """Return the line (from 1) of the key or table at each of `paths` in the text `source`.

    A key that is missing is answered with the line of the table it belongs to; None if nothing is found.
    """
    import tomlkit
    from tomlkit.exceptions import TOMLKitError

    found: dict[Path, int | None] = {}
    waiting = list(dict.fromkeys(paths))
    try:
        if tomlkit.dumps(tomlkit.parse(source)) != source:
            waiting = []
        for _ in range(_ROUNDS):
            if not waiting:
                break
            document = tomlkit.parse(source)
            waiting = _one_round(document, waiting, found, tomlkit.dumps)
    except (TOMLKitError, RecursionError, ValueError, KeyError, TypeError, AttributeError, IndexError):
        waiting = []
    for path in paths:
        if path not in found:
            found[path] = _by_key(source, path)
    return found


def _one_round(document: Any, paths: list[Path], found: dict[Path, int | None], dumps: Any) -> list[Path]:
    """Mark as many of `paths` as do not hide one another, note their lines, and return the others."""
    marked: list[Path] = []
    replaced: set[Path] = set()
    left: list[Path] = []
    for path in paths:
        if any(path[: len(other)] == other for other in replaced) or any(
            other[: len(path)] == path for other in marked
        ):
            left.append(path)
            continue
        where = _mark(document, path, _MARK.format(len(marked)))
        marked.append(path)
        if where is not None:
            replaced.add(where)
    lines = {mark: number for number, line in enumerate(dumps(document).split("\n"), 1) for mark in _marks_in(line)}
    for place, path in enumerate(marked):
        found[path] = lines.get(_MARK.format(place))
    return left


def _marks_in(line: str) -> list[str]:
    parts = line.split("fluegas-line-marker-")[1:]
    return [_MARK.format(part.split("-end")[0]) for part in parts]


def _mark(document: Any, path: Path, mark: str) -> Path | None:
    """Put `mark` at `path`, or at the nearest table above; return the path of a value that it replaced."""
    from tomlkit.items import AoT, Table

    parent: Any = None
    item: Any = document
    done: Path = ()
    for part in path:
        try:
            child = item[part]
        except (KeyError, IndexError, TypeError):
            break
        parent, item, done = item, child, (*done, part)
    while isinstance(item, AoT) or (isinstance(item, Table) and item.is_super_table()):
        parent, first = item, 0 if isinstance(item, AoT) else str(next(iter(item)))
        item, done = parent[first], (*done, first)
    if isinstance(item, Table):
        before = item.trivia.comment
        item.comment(f"{mark} {before.lstrip('# ')}" if "fluegas-line-marker-" in before else mark)
        return None
    if parent is not None:
        parent[done[-1]] = mark
        return done
    return None


def _by_key(source: str, path: Path) -> int | None:
    """Return the first line that starts with the last key of `path`: the best that can be said of an unusual file."""
    key = next((part for part in reversed(path) if isinstance(part, str)), "")
    for number, line in enumerate(source.splitlines(), 1):
        if key and line.strip().lstrip("[").strip().strip("\"'").startswith(key):
            return number
    return None


def round_trip_problem(source: str) -> str | None:
    """Return why `source` cannot be saved without being rearranged, None if it can."""
    import tomlkit
    from tomlkit.exceptions import TOMLKitError

    try:
        if tomlkit.dumps(tomlkit.parse(source)) == source:
            return None
    except (TOMLKitError, RecursionError) as error:
        return f"it cannot be read: {error}"
    return "its tables stand in an order that writing would change; put all [[setting]] tables one after the other"
