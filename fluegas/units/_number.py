"""Numbers as people write them: decimal point or comma, grouped thousands; what can be read two ways is questioned."""

import re

from fluegas.errors import QuantityError

LONGEST_TEXT = 60
LARGEST = 1e15
SMALLEST = 1e-30

SPACES = " \t\u00a0\u2009\u202f"
MINUS = "\u2212"

# What looks like a number at the start of a text; whether it is one is decided by the patterns further down.
NUMBER_START = re.compile(
    rf"[-+{MINUS}]?[0-9.,](?:[0-9.,'\u2019{SPACES}]*[0-9.,])?(?:[eE][-+{MINUS}]?[0-9]+)?",
)

_PARTS = re.compile(rf"([-+{MINUS}]?)([0-9.,'\u2019{SPACES}]+)((?:[eE][-+{MINUS}]?[0-9]+)?)")
_PLAIN = re.compile(r"[-+]?(?:[0-9]+(?:\.[0-9]*)?|\.[0-9]+)(?:[eE][-+]?[0-9]+)?")
_COMMA_UNCLEAR = re.compile(r"[1-9][0-9]{0,2},[0-9]{3}")
_COMMA_DECIMAL = re.compile(r"[0-9]*,[0-9]+")
_GROUPED = tuple(
    re.compile(rf"[1-9][0-9]{{0,2}}{pattern}")
    for pattern in (
        rf"(?:(?P<mark>['\u2019{SPACES}])[0-9]{{3}}(?:(?P=mark)[0-9]{{3}})*)(?:[.,][0-9]+)?",  # 1 234,5 and 1'234.5
        r"(?:,[0-9]{3})+\.[0-9]+",  # 1,234.5
        r"(?:\.[0-9]{3})+,[0-9]+",  # 1.234,5
        r"(?:,[0-9]{3}){2,}",  # 1,234,567
        r"(?:\.[0-9]{3}){2,}",  # 1.234.567
    )
)
_GROUP_MARKS = str.maketrans("", "", "'\u2019" + SPACES)


def shown(text: str) -> str:
    """Return a text from outside as a message may show it: quoted, cut to a sane length, no raw control characters."""
    return repr(text if len(text) <= LONGEST_TEXT else text[: LONGEST_TEXT // 2] + "...")


def checked_length(text: str) -> str:
    """Return `text` without surrounding blanks.

    Raises QuantityError if it is longer than anything meant or written with digits other than 0 to 9.
    """
    text = text.strip()
    if len(text) > LONGEST_TEXT:
        raise QuantityError(
            f"{shown(text)} is {len(text)} characters long; a value with its unit takes at most {LONGEST_TEXT}"
        )
    if not text.isascii() and any(letter.isdecimal() and not letter.isascii() for letter in text):
        raise QuantityError(f"{shown(text)} has digits other than 0 to 9; write it with those")
    return text


def parse_number(text: str) -> float:
    """Return the number that `text` holds and nothing else.

    Understood are 1234.5, 1234,5, .5, 1.2e3, 1,234.5, 1.234,5, 1 234,5, 1'234.5, and a true minus sign. A single point
    is always the decimal point.

    Raises QuantityError if `text` is not a number, can be read two ways (3,500), or is absurdly large (beyond 1e15) or
    small (below 1e-30 and not zero).
    """
    text = checked_length(text)
    plain = text if _PLAIN.fullmatch(text) else _plain_form(text)
    value = float(plain)
    if not -LARGEST <= value <= LARGEST:
        raise QuantityError(f"{shown(text)} is too large to be meant; the limit is {LARGEST:g} in any unit")
    if -SMALLEST < value < SMALLEST and re.search("[1-9]", plain.lower().partition("e")[0]):
        raise QuantityError(f"{shown(text)} is too small to be meant; write 0 or at least {SMALLEST:g}")
    return value


def _plain_form(text: str) -> str:
    """Return a number in local dress in the form that float() reads."""
    parts = _PARTS.fullmatch(text)
    if parts is None:
        raise _not_a_number(text)
    sign, digits, exponent = (part.replace(MINUS, "-") for part in parts.groups())
    if _COMMA_UNCLEAR.fullmatch(digits):
        whole, point = digits.replace(",", ""), digits.replace(",", ".")
        raise QuantityError(f"{shown(text)} is unclear; write {sign}{whole}{exponent} or {sign}{point}{exponent}")
    if _COMMA_DECIMAL.fullmatch(digits):
        digits = digits.replace(",", ".")
    elif any(pattern.fullmatch(digits) for pattern in _GROUPED):
        digits = _without_groups(digits.translate(_GROUP_MARKS))
    elif not _PLAIN.fullmatch(digits):
        raise _not_a_number(text)
    return sign + digits + exponent


def _without_groups(digits: str) -> str:
    """Return a well-formed grouped number with only its decimal mark left, as a point."""
    last = max(digits.rfind(","), digits.rfind("."))
    if last < 0:
        return digits
    mark = digits[last]
    other = "." if mark == "," else ","
    if digits.count(mark) > 1:
        return digits.replace(mark, "")
    return digits.replace(other, "").replace(mark, ".")


def _not_a_number(text: str) -> QuantityError:
    return QuantityError(f"{shown(text)} is not a number; write it like 1234.5")
