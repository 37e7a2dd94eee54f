"""The table of dimensions and spellings, and the factors that pint gives for them."""

import re
import tomllib
from collections.abc import Mapping
from dataclasses import dataclass
from fractions import Fraction
from functools import cache
from typing import TYPE_CHECKING, Any

from fluegas.errors import DataError
from fluegas.resources import data_text
from fluegas.units._number import SPACES

if TYPE_CHECKING:
    from pint import UnitRegistry

_LETTERS = str.maketrans(
    {"³": "3", "²": "2", "º": "°", "˚": "°", "µ": "u", "μ": "u", "℃": "°C", "℉": "°F"}
    | dict.fromkeys("().^*·⋅" + SPACES)
)
_PER_TIME = re.compile(r"/(hours?|hrs?|years?|yr|y|days?|seconds?|sec|minutes?)(?![A-Za-z])", re.IGNORECASE)
_TIME_WORDS = {"h": "/h", "y": "/a", "d": "/d", "s": "/s", "m": "/min"}
# Where only the case of a letter tells milli from mega (or gram from giga), that letter is kept as it was written.
_CASED_PREFIX = re.compile(r"(?<![A-Za-z])(?:m(?=(?:wh?|wth|j|g|m|l|s|bara?|pa|cal|mol)(?![A-Za-z]))|g(?=cal))", re.I)


def plain_form(unit: str) -> str:
    """Return a unit as spellings are compared: no blanks, brackets, points or superscripts, "/h" and not "/hr"."""
    unit = unit.translate(_LETTERS)
    if "/" in unit:
        unit = _PER_TIME.sub(lambda match: _TIME_WORDS[match[1][0].lower()], unit)
    return unit


def folded_form(unit: str) -> str:
    """Return a plain form in lower case but for letters that tell one SI prefix from another."""
    kept = {match.start() for match in _CASED_PREFIX.finditer(unit)}
    return "".join(letter if place in kept else letter.casefold() for place, letter in enumerate(unit))


@dataclass(frozen=True)
class Dimension:
    """A kind of quantity, its units and the words for them.

    `expressions` maps an accepted spelling to an expression of the units in `data/units.txt`; `plain` and `folded` lead
    from `plain_form` and `folded_form` of a text to the spelling. `ambient` names the dimension of the same thing per
    volume of gas at unstated conditions, `normal` the spellings that state them ("" where there is none).
    """

    name: str
    label: str
    si: str
    display: Mapping[str, str]
    example: str
    ambient: str
    normal: str
    expressions: Mapping[str, str]
    plain: Mapping[str, str]
    folded: Mapping[str, str]

    def find(self, unit: str) -> str | None:
        """Return the accepted spelling that `unit` stands for, None if there is none."""
        if unit in self.expressions:
            return unit
        plain = plain_form(unit)
        return self.plain.get(plain) or self.folded.get(folded_form(plain))


@dataclass(frozen=True)
class Table:
    """All dimensions by name, and the refused spellings (folded to lower case) with what is said to each."""

    dimensions: Mapping[str, Dimension]
    refused: Mapping[str, str]


@cache
def table() -> Table:
    """Return the table of `data/spellings.toml`.

    Raises DataError if the file is damaged.
    """
    try:
        content = tomllib.loads(data_text("spellings.toml"))
        refused = {plain_form(spelling).casefold(): said for spelling, said in content.pop("refused").items()}
        made = {name: _dimension(name, entry, content) for name, entry in content.items()}
    except (tomllib.TOMLDecodeError, KeyError, TypeError, AttributeError) as error:
        raise DataError(f"the data file 'spellings.toml' is damaged: {error!r}") from error
    return Table(made, refused)


def _dimension(name: str, entry: dict[str, Any], content: dict[str, Any]) -> Dimension:
    units = content[entry["same_units_as"]]["units"] if "same_units_as" in entry else entry["units"]
    expressions = {spelling: expression for expression, listed in units.items() for spelling in listed}
    plain: dict[str, str] = {}
    folded: dict[str, str] = {}
    for spelling in expressions:
        plain.setdefault(plain_form(spelling), spelling)
        folded.setdefault(folded_form(plain_form(spelling)), spelling)
    return Dimension(
        name=name,
        label=entry["label"],
        si=entry["si"],
        display=entry["display"],
        example=entry["example"],
        ambient=entry.get("ambient", ""),
        normal=entry.get("normal", ""),
        expressions=expressions,
        plain=plain,
        folded=folded,
    )


def dimension(name: str) -> Dimension:
    """Return the dimension `name`. Raises KeyError, with the known names, if the program has none of that name."""
    known = table().dimensions
    try:
        return known[name]
    except KeyError:
        raise KeyError(f"no dimension {name!r}; there are {', '.join(known)}") from None


@cache
def scale(name: str, spelling: str) -> tuple[float, float]:
    """Return factor and offset of an accepted spelling: SI value = number * factor + offset.

    Both are worked out in exact fractions and rounded once.
    """
    kind = dimension(name)
    quantity, si = _registry().Quantity, kind.expressions[kind.si]
    expression = kind.expressions[spelling]
    zero: Fraction = quantity(Fraction(0), expression).to(si).magnitude
    step = f"delta_{expression}" if zero else expression
    one: Fraction = quantity(Fraction(1), step).to(si).magnitude
    return float(one), float(zero)


@cache
def _registry() -> "UnitRegistry[Any]":
    """Return the program's one pint registry, which knows the units of `data/units.txt` and no others."""
    from pint import UnitRegistry  # takes a quarter of a second, and only a conversion needs it

    registry: UnitRegistry[Any] = UnitRegistry(None, non_int_type=Fraction)
    registry.load_definitions(data_text("units.txt").splitlines())
    return registry
