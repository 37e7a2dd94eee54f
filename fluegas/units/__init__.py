"""Text with a unit <-> SI floats: the border at which units exist.

Inside the program every quantity is a float or an array in SI units. A person writes "412 degF"; `parse` turns it into
484.26 K. The definitions are in `data/units.txt`, the accepted words in `data/spellings.toml`. Typed text meets a
strict pattern and a table of words, never an evaluator.

Normal volumes (Nm3 at 0 degC, Sm3 at 15 degC, scf at 60 degF, all at 101.325 kPa) are amounts of substance; a bare m3
of gas is refused with a message that names them. Pressures are absolute. A year is 8760 h. Calories and Btu are those
of the International Steam Tables.
"""

from fluegas.units._measure import (
    Measure,
    dimensions,
    display_unit,
    example,
    from_si,
    label,
    parse,
    si_unit,
    spellings,
    to_si,
)
from fluegas.units._number import parse_number
from fluegas.units._price import Price, parse_price

__all__ = [
    "Measure",
    "Price",
    "dimensions",
    "display_unit",
    "example",
    "from_si",
    "label",
    "parse",
    "parse_number",
    "parse_price",
    "si_unit",
    "spellings",
    "to_si",
]
