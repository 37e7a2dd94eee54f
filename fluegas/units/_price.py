"""Prices as people write them: money per energy, mass or amount of gas."""

import re
from dataclasses import dataclass
from typing import Literal, cast

from fluegas.errors import QuantityError
from fluegas.units._measure import find_unit
from fluegas.units._number import MINUS, NUMBER_START, checked_length, parse_number, shown
from fluegas.units._table import dimension, scale

EXAMPLE = "38 EUR/MWh"

# Signs that more than one currency uses stay as they are.
_SIGNS = {"€": "EUR", "£": "GBP", "₹": "INR", "US$": "USD", "$": "$", "¥": "¥"}
_CODE = re.compile("[A-Z]{3}")
_MONEY = re.compile(
    rf"(?P<sign>[-+{MINUS}]?)(?P<before>[^-+{MINUS}0-9.,]*)(?P<number>{NUMBER_START.pattern})(?P<after>.*)", re.DOTALL
)


@dataclass(frozen=True)
class Price:
    """A price that a person wrote.

    `value` is in units of `currency` per SI unit of `dimension` (J, kg or mol); `currency` is a code of three letters,
    or a sign that several currencies share; `unit` is what the price was quoted per, `text` what was typed.
    """

    value: float
    currency: str
    unit: str
    dimension: Literal["energy", "mass", "amount"]
    text: str


def parse_price(text: str) -> Price:
    """Return the price in `text`, such as "38 EUR/MWh", "$8.00/MMBtu" or "0.41 EUR/kg".

    Raises QuantityError if the number, the currency or the unit is missing or cannot be read.
    """
    stripped = checked_length(text)
    if not stripped:
        raise QuantityError(f"a price is missing; write e.g. {EXAMPLE}")
    money, slash, unit = (part.strip() for part in stripped.partition("/"))
    parts = _MONEY.fullmatch(money)
    if parts is None:
        raise QuantityError(f"{shown(stripped)} has no number; write e.g. {EXAMPLE}")
    value = parse_number(parts["sign"] + parts["number"])
    currency = _currency(parts["before"].strip(), parts["after"].strip(), stripped)
    if not slash or not unit:
        raise QuantityError(f"{shown(stripped)} does not say what the price is per; write e.g. {EXAMPLE}")
    kinds = (dimension("energy"), dimension("mass"), dimension("amount"))
    kind, spelling = find_unit(unit, kinds, suggestion=EXAMPLE)
    factor, _ = scale(kind.name, spelling)
    return Price(value / factor, currency, spelling, cast(Literal["energy", "mass", "amount"], kind.name), text)


def _currency(before: str, after: str, text: str) -> str:
    """Return the currency that stands before or after the number, but not on both sides."""
    if before and after:
        raise QuantityError(f"{shown(text)} names two currencies; write e.g. {EXAMPLE}")
    name = before or after
    if not name:
        raise QuantityError(f"{shown(text)} names no currency; write e.g. {EXAMPLE}")
    if name in _SIGNS:
        return _SIGNS[name]
    if _CODE.fullmatch(name):
        return name
    if _CODE.fullmatch(name.upper()):
        raise QuantityError(f"unknown currency {shown(name)}; did you mean {name.upper()}?")
    raise QuantityError(
        f"unknown currency {shown(name)}; write a code of three capital letters (EUR, USD) or one of "
        f"{' '.join(sign for sign in _SIGNS if len(sign) == 1)}, and no cents"
    )
