"""Reads a scenario file: bounded, as text, every problem at once with its line.

The file is only ever parsed and matched; nothing in it is evaluated. A syntax error stands alone, since nothing
behind it can be trusted.
"""

import re
from collections.abc import Mapping
from os import PathLike
from pathlib import Path as FilePath
from types import MappingProxyType

from fluegas.errors import Problem, ScenarioError
from fluegas.scenario.accuracy import accuracy_problems
from fluegas.scenario.checking import contradictions
from fluegas.scenario.field import Field
from fluegas.scenario.fields import FIELDS_OF, FORMAT, FREE_TABLES, LARGEST_FILE, MOST_SETTINGS
from fluegas.scenario.lines import Path, lines_of
from fluegas.scenario.model import Refused, Scenario, Table, Value
from fluegas.scenario.values import RefusedError, check_name, value_of
from fluegas.scenario.wording import escaped, listed, nearest_word, quoted

MOST_PROBLEMS = 100
"""Problems listed at most; the rest are counted."""
MOST_OTHER_LOSSES = 50

_OTHER_LOSS = Field(
    "plant.other_losses", "other loss", "Other loss", dimensions=("fraction",), low=0.0, high=0.5, example="0.6 %"
)
_DEEP_KEY = re.compile(r"""(?<![\w-])(?:(?:[\w-]++|"(?:[^"\\\n]|\\.)*+"|'[^'\n]*+')[ \t]*+\.[ \t]*+){32}""")
"""A dotted key of more parts than any table has: refused unparsed, since parsing takes memory by their square."""
_PLAINER = {
    "Illegal character '\\n'": "a text in quotation marks is not closed on its line",
    "Cannot overwrite a value": "this key stands there already",
    "Invalid value": 'not a value; texts and quantities stand in quotation marks, e.g. "6.4 %"',
    "Expected newline or end of document after a statement": "the line should end here; texts and quantities stand in "
    'quotation marks, e.g. "6.4 %"',
}
"""Messages of the parser that a person with a mistyped quantity would not understand, and what is said instead."""
_TWICE = re.compile(r"Cannot (?:declare|mutate immutable namespace) \((.*?),?\)(?: twice)?")
_INNER = {
    "setting.air": "air",
    "setting.fuel": "fuel",
    "fuel.part.mole_percent": "fuel.mole_percent",
    "fuel.part.mass_percent": "fuel.mass_percent",
}
_TOO_DEEP = "nests keys, tables or arrays too deep"
_POSITION = re.compile(r"\s*\(at (?:line (\d+), column (\d+)|end of document)\)$")


def read_scenario(path: str | PathLike[str]) -> Scenario:
    """Return the scenario in the file at `path`.

    Raises ScenarioError with every problem found: a file that cannot be read, is too large or no UTF-8 text, a
    syntax error, or all that is wrong with its entries.
    """
    file = FilePath(path)
    name = escaped(str(path))
    try:
        if not file.is_file():
            raise _alone(name, _not_a_file(file))
        with file.open("rb") as stream:
            content = stream.read(LARGEST_FILE + 1)
    except OSError as error:
        raise _alone(name, f"cannot be read: {error.strerror or error}") from error
    if len(content) > LARGEST_FILE:
        raise _alone(name, f"is larger than {LARGEST_FILE // 1000} kB; a scenario file holds far less")
    try:
        text = content.decode("utf-8-sig")
    except UnicodeDecodeError as error:
        line = content[: error.start].count(b"\n") + 1
        raise ScenarioError((Problem(name, line, "", "is not UTF-8 text; save it as UTF-8"),)) from error
    return parse_scenario(text, name)


def _not_a_file(file: FilePath) -> str:
    if file.is_dir():
        return "is a folder; name a scenario file"
    return "is not an ordinary file" if file.exists() else "there is no such file"


def _alone(name: str, message: str) -> ScenarioError:
    return ScenarioError((Problem(name, None, "", message),))


def parse_scenario(text: str, name: str = "scenario") -> Scenario:
    """Return the scenario written in `text`; `name` stands for the file in messages. Raises ScenarioError."""
    if len(text) > LARGEST_FILE:
        raise _alone(name, f"is larger than {LARGEST_FILE // 1000} kB; a scenario file holds far less")
    text = text.removeprefix("\ufeff")
    document = _parsed(text, name)
    if not document:
        raise _alone(name, "is empty; the first line must be: fluegas = 1")
    _refuse_newer_format(document.get("fluegas"), text, name)
    reader = _Reader()
    tables = reader.whole(document)
    problems = [*reader.problems, *contradictions(tables)]
    if problems:
        raise ScenarioError(_placed(problems, text, name))
    part = {key: tables.table(key) or Table() for key in ("plant", "fuel", "air", "limits", "accuracy")}
    return Scenario(name=name, source=text, top=tables, settings=tables.rows("setting"), line_finder=_line, **part)


def _refuse_newer_format(given: object, text: str, name: str) -> None:
    """Raise for a file of a later format, alone: what else looks wrong in it may be right there."""
    if isinstance(given, int) and given > FORMAT:
        number = str(given) if given < 1_000_000 else "of many digits"
        message = f"the file is of format {number}; this fluegas reads format {FORMAT}: a newer fluegas is needed"
        raise ScenarioError((Problem(name, _line(text, ("fluegas",)), "fluegas", message),))


def _line(source: str, path: Path) -> int | None:
    return lines_of(source, [path])[path]


def _parsed(text: str, name: str) -> Mapping[str, object]:
    import tomllib

    if _DEEP_KEY.search(text):
        raise _alone(name, _TOO_DEEP)
    try:
        return tomllib.loads(text)
    except tomllib.TOMLDecodeError as error:
        message = str(error)
        found = _POSITION.search(message)
        line, column = (int(found[1]), f", column {found[2]}") if found and found[1] else (text.count("\n") + 1, "")
        said = escaped(_POSITION.sub("", message))
        said = _PLAINER.get(said, _TWICE.sub(_twice, said))
        key = f"syntax{column}"
        raise ScenarioError((Problem(name, line, key, f"{said[:1].lower()}{said[1:]}"),)) from error
    except RecursionError as error:
        raise _alone(name, _TOO_DEEP) from error
    except ValueError as error:
        raise _alone(name, "holds a number of thousands of digits; nothing measured needs them") from error


def _twice(found: re.Match[str]) -> str:
    table = ".".join(part.strip("' ") for part in found[1].split(","))
    return f"[{table}] stands there already; put its keys together"


def _placed(problems: list[tuple[Path, str]], text: str, name: str) -> tuple[Problem, ...]:
    """Return the problems with their lines, in the order of the file."""
    listed = problems[:MOST_PROBLEMS]
    lines = lines_of(text, [path for path, _ in listed])
    placed = [Problem(name, lines[path] or 1, dotted(path), message) for path, message in listed]
    placed.sort(key=lambda problem: problem.line or 0)
    if len(problems) > MOST_PROBLEMS:
        placed.append(Problem(name, None, "", f"and {len(problems) - MOST_PROBLEMS} more problems"))
    return tuple(placed)


def dotted(path: Path) -> str:
    """Return a path as messages show it: setting[2].co, numbered from 1."""
    out = ""
    for part in path:
        if isinstance(part, int):
            out += f"[{part + 1}]"
        else:
            is_word = len(part) <= 40 and part.replace("_", "").replace("-", "").isalnum()
            word = part if is_word else quoted(part)
            out += f".{word}" if out else word
    return out


class _Reader:
    """Walks the parsed document along the declared fields and collects problems."""

    def __init__(self) -> None:
        self.problems: list[tuple[Path, str]] = []

    def whole(self, document: Mapping[str, object]) -> Table:
        return self.table("top", document, ())

    def table(self, name: str, given: Mapping[str, object], path: Path) -> Table:
        if name == "accuracy":
            self.problems.extend(accuracy_problems(given))
            return _plain(given)
        if name in FREE_TABLES and len(given) > MOST_OTHER_LOSSES:
            self.problems.append((path, f"holds {len(given)} entries; at most {MOST_OTHER_LOSSES} are taken"))
        entries: dict[str, Value] = {}
        for key, value in given.items():
            where = (*path, key)
            field = self.free(key, where) if name in FREE_TABLES else FIELDS_OF[name].get(key)
            if field is not None:
                entries[key] = self.entry(field, value, where)
            elif name not in FREE_TABLES:
                self.problems.append((where, _unknown(key, name)))
                meant = nearest_word(key, FIELDS_OF[name])
                if meant is not None and meant not in given:
                    entries[meant] = Refused()
        return Table(MappingProxyType(entries))

    def free(self, key: str, where: Path) -> Field | None:
        """Return the field of an entry that the user named, None if it cannot be called so."""
        try:
            check_name(key)
        except RefusedError as error:
            self.problems.append((where, str(error)))
            return None
        return _OTHER_LOSS

    def entry(self, field: Field, value: object, where: Path) -> Value:
        if field.later is None and field.kind in ("table", "rows"):
            inner = field.key if field.table == "top" else f"{field.table}.{field.key}"
            return self.inner(field.kind, _INNER.get(inner, inner), value, where)
        try:
            return value_of(field, value)
        except RefusedError as error:
            self.problems.append((where, str(error)))
            return Refused()

    def inner(self, kind: str, name: str, value: object, where: Path) -> Value:
        if kind == "table":
            if isinstance(value, Mapping):
                return self.table(name, value, where)
            self.problems.append((where, f"must be a table: [{name}] or {{ key = ... }}"))
            return Refused()
        if not isinstance(value, list) or not all(isinstance(row, Mapping) for row in value):
            self.problems.append((where, f"must be tables: [[{name}]], one for each"))
            return Refused()
        if len(value) > MOST_SETTINGS:
            self.problems.append((where, f"holds {len(value)} tables; at most {MOST_SETTINGS} are taken"))
            return Refused()
        return tuple(self.table(name, row, (*where, place)) for place, row in enumerate(value))


def _plain(given: Mapping[str, object]) -> Table:
    """Return a table of shortened texts, for what is checked but not used."""
    return Table(MappingProxyType({key: quoted(value) for key, value in given.items()}))


def _unknown(key: str, table: str) -> str:
    known = FIELDS_OF[table]
    others = [name for name, fields in FIELDS_OF.items() if key in fields and name not in (table, "setting.readings")]
    here = nearest_word(key, known, 0.75 if others else 0.6)
    meant = f"; did you mean {here!r}?" if here else ""
    if others:
        places = " or ".join(f"[{name}]" if name != "top" else "the top of the file" for name in others[:3])
        return f"unknown key here; it belongs in {places}{meant}"
    if here:
        return f"unknown key{meant}"
    label = "the top of the file" if table == "top" else f"[{table}]"
    return f"unknown key; {label} may have {listed(list(known)[:40])}"
