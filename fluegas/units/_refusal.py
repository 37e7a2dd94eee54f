"""What is said when a text is not a number with a fitting unit: what is wrong, and what would be right."""

import difflib
from collections.abc import Sequence

from fluegas.errors import QuantityError
from fluegas.units._number import shown
from fluegas.units._table import Dimension, plain_form, table


def example_unit(kind: Dimension) -> str:
    """Return the unit of a dimension's example."""
    return kind.example.partition(" ")[2]


def wanted(kinds: Sequence[Dimension], number: str = "") -> str:
    """Return examples of what is wanted: "3.2 MW (power) or ...", with `number` in place of the examples' own."""
    return " or ".join(
        f"{number} {example_unit(kind)} ({kind.label})" if number else f"{kind.example} ({kind.label})"
        for kind in kinds
    )


def no_value(kinds: Sequence[Dimension]) -> QuantityError:
    """Return the answer to an empty text."""
    return QuantityError(f"a value is missing; write e.g. {wanted(kinds)}")


def no_number(text: str, kinds: Sequence[Dimension]) -> QuantityError:
    """Return the answer to a text that does not start with a number."""
    return QuantityError(f"{shown(text)} does not start with a number; write e.g. {wanted(kinds)}")


def no_unit(number: str, kinds: Sequence[Dimension]) -> QuantityError:
    """Return the answer to a bare number; `number` has passed as one."""
    return QuantityError(f"{number} has no unit; write e.g. {wanted(kinds, number)}")


def unfit_unit(unit: str, kinds: Sequence[Dimension], suggestion: str = "") -> QuantityError:
    """Return the answer to a unit that none of `kinds` knows.

    `suggestion` stands in for the examples of the kinds.
    """
    plain = plain_form(unit)
    said = table().refused.get(plain.casefold())
    if said is not None:
        return QuantityError(said)
    for other in table().dimensions.values():
        spelling = other.find(unit)
        if spelling is not None:
            return QuantityError(_other_dimension(spelling, other, kinds, suggestion))
    return QuantityError(_unknown(unit, plain, kinds, suggestion))


def _other_dimension(spelling: str, other: Dimension, kinds: Sequence[Dimension], suggestion: str) -> str:
    liquid = any(measure in other.expressions[spelling] for measure in ("litre", "gallon"))
    for kind in kinds:
        if other.name == kind.ambient and not liquid:
            return f"{spelling} does not say which normal volume; write {kind.normal}"
    *first, last = [kind.label for kind in kinds]
    needed = f"{', '.join(first)} or {last}" if first else last
    article = "an" if needed[0] in "aeiou" else "a"
    suggestion = suggestion or " or ".join(kind.example for kind in kinds)
    return f"{spelling} is a unit of {other.label}; here {article} {needed} is needed, e.g. {suggestion}"


def _unknown(unit: str, plain: str, kinds: Sequence[Dimension], suggestion: str) -> str:
    start = f"unknown unit {shown(unit)}"
    known: dict[str, list[str]] = {}
    for kind in kinds:
        for text, spelling in kind.plain.items():
            known.setdefault(text.casefold(), []).append(spelling)
    twins = known.get(plain.casefold())
    if twins:
        meant = f"did you mean {' or '.join(twins)}?"
        return f"{start}; capital and small letters are different prefixes (M a million, m a thousandth), {meant}"
    near = difflib.get_close_matches(plain.casefold(), known, 1, 0.6)
    if near:
        return f"{start}; did you mean {known[near[0]][0]}?"
    return f"{start}; write e.g. {suggestion or wanted(kinds)}"
