"""One value of a scenario file: checked against its field and turned into what the snapshot holds."""

from math import isfinite

from fluegas.errors import InputError, QuantityError
from fluegas.scenario.field import Field
from fluegas.scenario.fields import LONGEST_NAME
from fluegas.scenario.model import Value
from fluegas.scenario.wording import is_plain, listed, nearest, quoted
from fluegas.thermo.species import species
from fluegas.units import Measure, example, from_si, parse, parse_price


class RefusedError(InputError):
    """A value does not fit its field; the message says what would."""


def value_of(field: Field, given: object) -> Value:
    """Return what the snapshot holds for the `given` TOML value of `field`.

    Raises RefusedError with what is wrong and what would be right.
    """
    if field.later is not None:
        raise RefusedError(f"not yet supported: {field.later}")
    return _BY_KIND[field.kind](field, given)


def _quantity(field: Field, given: object) -> Value:
    suggestion = field.example or field.default or example(field.dimensions[0])
    if isinstance(given, bool) or not isinstance(given, str | int | float):
        raise RefusedError(f'must be text with a unit, e.g. "{suggestion}"')
    if not isinstance(given, str):
        raise RefusedError(f'{_number(given)} has no unit; write it as text with one, e.g. "{suggestion}"')
    try:
        measure = parse(given, *field.dimensions)
    except QuantityError as error:
        raise RefusedError(str(error)) from error
    _within(field, measure)
    return measure


def _within(field: Field, measure: Measure) -> None:
    value = measure.value
    if measure.dimension == "mass_concentration":
        if field.species is None:
            raise RefusedError(
                f"{quoted(measure.text)} is a mass per volume; give a share of the gas, e.g. {field.example}"
            )
        value = value / species(field.species).molar_mass
    for limit, word, outside in (
        (field.low, "at least", field.low is not None and value < field.low - 1e-12 * abs(field.low)),
        (field.high, "at most", field.high is not None and value > field.high + 1e-12 * abs(field.high)),
    ):
        if outside and limit is not None:
            raise RefusedError(f"{quoted(measure.text)} is out of range: it must be {word} {_limit(limit, measure)}")


def _limit(limit: float, measure: Measure) -> str:
    """Return a limit in the unit that the person chose, of the gas share where that was a mass concentration."""
    if measure.dimension == "mass_concentration":
        return f"{from_si(limit, 'fraction', '%'):.6g} % of the gas"
    return f"{from_si(limit, measure.dimension, measure.unit):.6g} {measure.unit}"


def _number(given: int | float) -> str:
    return f"{given:.15g}" if abs(given) < 1e15 else "this number"


def _text(field: Field, given: object) -> Value:
    if not isinstance(given, str):
        raise RefusedError("must be text in quotation marks")
    if not is_plain(given, "\n\t" if field.key == "note" else ""):
        raise RefusedError(f"{quoted(given)} holds control characters; write plain text")
    longest = 10_000 if field.key == "note" else LONGEST_NAME
    if len(given) > longest:
        raise RefusedError(f"is {len(given)} characters long; at most {longest} are kept")
    if not given.strip() and field.key == "name":
        raise RefusedError("is empty; give a name")
    return given


def check_name(text: str) -> None:
    """Raise RefusedError for a name of the user's own that could not be shown."""
    _text(Field("", "name", "name", "text"), text)


def _choice(field: Field, given: object) -> Value:
    if given in field.choices and isinstance(given, str):
        return given
    hint = nearest(given, field.choices) if isinstance(given, str) else ""
    raise RefusedError(f"{quoted(given)} is not one of {listed(field.choices)}{hint}")


def _flag(field: Field, given: object) -> Value:
    if isinstance(given, bool):
        return given
    raise RefusedError(f"{quoted(given)} is neither true nor false")


def _whole(field: Field, given: object) -> Value:
    if isinstance(given, int) and not isinstance(given, bool) and abs(given) < 10**15:
        if field.low is not None and given < field.low:
            raise RefusedError(f"{given} is out of range: it must be at least {field.low:g}")
        return given
    raise RefusedError(f"{quoted(given)} is not a whole number")


def _percent(field: Field, given: object) -> Value:
    if isinstance(given, bool) or not isinstance(given, int | float):
        raise RefusedError(f"{quoted(given)} is not a plain number; analyses are bare percents, e.g. {field.key} = 4.2")
    if isinstance(given, int) and abs(given) > 10**9:
        raise RefusedError("is far above 100 percent")
    value = float(given)
    if not isfinite(value):
        raise RefusedError("is not a finite number")
    if value < 0:
        raise RefusedError(f"{value:g} is negative; a share cannot be")
    if field.high is not None and value > field.high:
        raise RefusedError(f"{value:g} is out of range: it must be at most {field.high:g}")
    return value


def _price(field: Field, given: object) -> Value:
    if isinstance(given, bool) or not isinstance(given, str):
        raise RefusedError(f'must be text such as "{field.example}"')
    try:
        price = parse_price(given)
    except QuantityError as error:
        raise RefusedError(str(error)) from error
    if price.value < 0:
        raise RefusedError(f"{quoted(given)} is negative; a price must be at least 0")
    return price


def _quantity_or_word(field: Field, given: object) -> Value:
    if isinstance(given, str) and given in field.choices:
        return given
    try:
        return _quantity(field, given)
    except RefusedError as error:
        raise RefusedError(f"{error}; or the word {listed(field.choices)}") from error


_BY_KIND = {
    "quantity": _quantity,
    "text": _text,
    "choice": _choice,
    "flag": _flag,
    "whole": _whole,
    "percent": _percent,
    "price": _price,
    "quantity or word": _quantity_or_word,
}
