"""A quantity as typed, its SI value, and conversions between SI and the accepted spellings."""

from dataclasses import dataclass
from typing import TYPE_CHECKING, overload

from fluegas.errors import QuantityError
from fluegas.units import _refusal
from fluegas.units._number import MINUS, NUMBER_START, SPACES, checked_length, parse_number, shown
from fluegas.units._table import Dimension, dimension, scale, table

if TYPE_CHECKING:
    import numpy as np
    from numpy.typing import NDArray

_PLAIN_SPACES = str.maketrans(dict.fromkeys(SPACES, " ") | {MINUS: "-"})


@dataclass(frozen=True)
class Measure:
    """A quantity that a person wrote.

    `value` is in the SI unit of `dimension`, `unit` the accepted spelling that was recognised, `text` what was typed.
    """

    value: float
    unit: str
    dimension: str
    text: str


def parse(text: str, name: str, *others: str) -> Measure:
    """Return the quantity in `text`, which must have a unit of the dimension `name` or of one of `others`.

    A unit that fits several of them is taken in the order given.

    Raises QuantityError if `text` has no number, no unit, a unit that is unknown, ambiguous or of another dimension, or
    a temperature below absolute zero; KeyError if there is no such dimension.
    """
    kinds = (dimension(name), *map(dimension, others))
    stripped = checked_length(text)
    if not stripped:
        raise _refusal.no_value(kinds)
    start = NUMBER_START.match(stripped)
    if start is None:
        raise _refusal.no_number(stripped, kinds)
    number = start[0]
    value = parse_number(number)
    unit = stripped[start.end() :].lstrip(SPACES)
    if not unit:
        raise _refusal.no_unit(number.translate(_PLAIN_SPACES), kinds)
    kind, spelling = find_unit(unit, kinds)
    factor, offset = scale(kind.name, spelling)
    si = value * factor + offset
    if kind.name == "temperature" and si < 0.0:
        raise QuantityError(
            f"{shown(stripped)} is below absolute zero ({from_si(0.0, kind.name, spelling):g} {spelling})"
        )
    return Measure(si, spelling, kind.name, text)


def find_unit(unit: str, kinds: tuple[Dimension, ...], suggestion: str = "") -> tuple[Dimension, str]:
    """Return the first of `kinds` that knows `unit`, and its accepted spelling.

    Raises QuantityError, with `suggestion` as what would be right, if none does.
    """
    for kind in kinds:
        spelling = kind.find(unit)
        if spelling is not None:
            return kind, spelling
    raise _refusal.unfit_unit(unit, kinds, suggestion)


@overload
def to_si(value: float, name: str, unit: str) -> float: ...
@overload
def to_si(value: "NDArray[np.float64]", name: str, unit: str) -> "NDArray[np.float64]": ...
def to_si(value: "float | NDArray[np.float64]", name: str, unit: str) -> "float | NDArray[np.float64]":
    """Return `value`, a number or an array of any shape in `unit`, in the SI unit of the dimension `name`.

    Raises QuantityError if the dimension has no such unit, KeyError if there is no such dimension.
    """
    kind, spelling = find_unit(unit, (dimension(name),))
    factor, offset = scale(kind.name, spelling)
    return value * factor + offset


@overload
def from_si(value: float, name: str, unit: str) -> float: ...
@overload
def from_si(value: "NDArray[np.float64]", name: str, unit: str) -> "NDArray[np.float64]": ...
def from_si(value: "float | NDArray[np.float64]", name: str, unit: str) -> "float | NDArray[np.float64]":
    """Return `value`, a number or an array of any shape in the SI unit of the dimension `name`, in `unit`.

    Raises QuantityError if the dimension has no such unit, KeyError if there is no such dimension.
    """
    kind, spelling = find_unit(unit, (dimension(name),))
    factor, offset = scale(kind.name, spelling)
    return (value - offset) / factor


def dimensions() -> tuple[str, ...]:
    """Return the names of all dimensions."""
    return tuple(table().dimensions)


def label(name: str) -> str:
    """Return the dimension `name` in words. Raises KeyError if there is no such dimension."""
    return dimension(name).label


def example(name: str) -> str:
    """Return a text that `parse` accepts for the dimension `name`. Raises KeyError if there is no such dimension."""
    return dimension(name).example


def si_unit(name: str) -> str:
    """Return the spelling of the SI unit of the dimension `name`. Raises KeyError if there is no such dimension."""
    return dimension(name).si


def display_unit(name: str, system: str) -> str:
    """Return the unit in which tables for people show the dimension `name` in the `system` "si" or "us".

    Raises KeyError if there is no such dimension or system.
    """
    return dimension(name).display[system]


def spellings(name: str) -> tuple[str, ...]:
    """Return the accepted spellings of units of the dimension `name`. Raises KeyError if there is no such dimension."""
    return tuple(dimension(name).expressions)
