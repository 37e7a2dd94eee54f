"""On which lines the tables and keys of a scenario file stand.

One pass over the tokens of a text that has parsed as TOML, so every line is that of the key itself: in inline tables,
in arrays over several lines, and where other tables stand between those of an array. Only files with problems pay for
it.
"""

import re
import tomllib
from collections.abc import Iterable, Iterator

Path = tuple[str | int, ...]

DEEPEST = 10
"""Parts of the longest path that is looked at; no entry of a scenario lies deeper than 6."""

_TOKEN = re.compile(
    r"""(?P<blank>[ \t]+|\#[^\n]*)
    |(?P<end>\n)
    |(?P<text>\"{3}(?:[^"\\]|\\.|"{1,2}(?!"))*+\"{3,5}|'{3}(?:[^']|'{1,2}(?!'))*+'{3,5}|"(?:[^"\\\n]|\\.)*+"|'[^'\n]*+')
    |(?P<mark>[]\[{}=,.])
    |(?P<bare>[^\s"'#\[\]{}=,.]+)""",
    re.VERBOSE | re.DOTALL,
)


def lines_of(source: str, paths: Iterable[Path]) -> dict[Path, int | None]:
    """Return the line (from 1) of the key or table at each of `paths` in the TOML text `source`.

    What is missing is answered with the line of the nearest table that it belongs to, None if that is the whole file.
    A table without a header of its own is answered with its first entry.
    """
    known = _Scan(source).lines
    return {path: _nearest(known, path) for path in paths}


def _nearest(known: dict[Path, int], path: Path) -> int | None:
    return next((known[path[:size]] for size in range(len(path), 0, -1) if path[:size] in known), None)


def _tokens(source: str) -> Iterator[tuple[str, str, int]]:
    """Yield kind, text and line of each token that is neither blank nor a comment."""
    line = 1
    for match in _TOKEN.finditer(source.replace("\r\n", "\n")):
        kind, text = match.lastgroup or "", match[0]
        if kind != "blank":
            yield kind, text, line
        line += text.count("\n")
    yield "end", "", line


class _Scan:
    """Walks the tokens of a valid TOML text; `lines` has the line of every path in it."""

    def __init__(self, source: str) -> None:
        self.lines: dict[Path, int] = {}
        self.tokens = list(_tokens(source))
        self.place = 0
        self.rows: dict[Path, int] = {}
        """How many tables each array of tables has so far."""
        table: Path = ()
        while self.place < len(self.tokens):
            kind, text, _ = self.tokens[self.place]
            if kind == "end":
                self.place += 1
            elif text == "[":
                table = self.header()
            else:
                self.entry(table)

    def next_is(self, text: str) -> bool:
        return self.tokens[self.place][1] == text

    def header(self) -> Path:
        """Read [a.b] or [[a.b]] and return the path of the table that it opens."""
        line = self.tokens[self.place][2]
        self.place += 1
        is_row = self.next_is("[")
        self.place += is_row
        path: Path = ()
        *above, last = self.key()
        self.place += 1 + is_row
        for part in above:
            path = self.newest((*path, part)[:DEEPEST])
            self.lines.setdefault(path, line)
        path = (*path, last)[:DEEPEST]
        if is_row:
            self.lines.setdefault(path, line)
            self.rows[path] = self.rows.get(path, 0) + 1
            path = self.newest(path)
        self.lines[path] = line
        return path

    def newest(self, path: Path) -> Path:
        """Return `path`, or its newest table if it is an array of tables."""
        return (*path, self.rows[path] - 1)[:DEEPEST] if path in self.rows else path

    def key(self) -> list[str]:
        """Read a key, dotted or not, and return its parts."""
        parts = [self.word()]
        while self.next_is("."):
            self.place += 1
            parts.append(self.word())
        return parts

    def word(self) -> str:
        kind, text, _ = self.tokens[self.place]
        self.place += 1
        return str(tomllib.loads(f"key = {text}")["key"]) if kind == "text" else text

    def entry(self, table: Path) -> None:
        """Read key = value inside `table`."""
        line = self.tokens[self.place][2]
        path = table
        for part in self.key():
            path = (*path, part)[:DEEPEST]
            self.lines.setdefault(path, line)
        self.place += 1
        self.value(path)

    def value(self, path: Path) -> None:
        if len(path) == DEEPEST and self.tokens[self.place][1] in ("[", "{"):
            self.skip()
        elif self.next_is("["):
            self.array(path)
        elif self.next_is("{"):
            self.inline_table(path)
        else:
            while self.tokens[self.place][0] != "end" and self.tokens[self.place][1] not in ",]}":
                self.place += 1

    def skip(self) -> None:
        """Pass over an array or inline table, whatever lies in it."""
        depth = 0
        while True:
            depth += {"[": 1, "{": 1, "]": -1, "}": -1}.get(self.tokens[self.place][1], 0)
            self.place += 1
            if depth == 0:
                return

    def array(self, path: Path) -> None:
        self.place += 1
        count = 0
        while not self.next_is("]"):
            kind, text, line = self.tokens[self.place]
            if kind == "end" or text == ",":
                self.place += 1
                continue
            self.lines[(*path, count)] = line
            self.value((*path, count))
            count += 1
        self.place += 1

    def inline_table(self, path: Path) -> None:
        self.place += 1
        while not self.next_is("}"):
            if self.next_is(","):
                self.place += 1
            else:
                self.entry(path)
        self.place += 1


def round_trip_problem(source: str) -> str | None:
    """Return why `source` cannot be saved without being rearranged, None if it can."""
    import tomlkit
    from tomlkit.exceptions import TOMLKitError

    try:
        if tomlkit.dumps(tomlkit.parse(source)) == source:
            return None
    except (TOMLKitError, RecursionError, ValueError) as error:
        return f"it cannot be read: {error}"
    return "its tables stand in an order that writing would change; put all [[setting]] tables one after the other"
