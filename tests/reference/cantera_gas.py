"""The species of data/species.toml as Cantera species, read here from the file by another way than the program's.

Cantera multiplies the coefficients by its own gas constant, so they are scaled to keep that of the fit, and it takes
1 atm as the standard pressure unless told that it is 1 bar.
"""

import tomllib
from collections.abc import Sequence
from functools import cache
from typing import Any

import cantera

from fluegas.resources import data_text


@cache
def _data() -> dict[str, Any]:
    return tomllib.loads(data_text("species.toml"))


@cache
def cantera_species(symbol: str) -> Any:
    """Return one species of the table as a `cantera.Species`."""
    entry = _data()["species"][symbol]
    scale = 1000 * _data()["gas_constant_of_fit"] / cantera.gas_constant
    thermo: Any = {
        "model": "NASA9",
        "reference-pressure": _data()["standard_pressure"],
        "temperature-ranges": entry["temperatures"],
        "data": [[scale * number for number in row] for row in entry["coefficients"]],
    }
    return cantera.Species.from_dict({"name": symbol, "composition": entry["elements"], "thermo": thermo})


def cantera_gas(symbols: Sequence[str]) -> Any:
    """Return an ideal-gas `cantera.Solution` of the species named, in their order."""
    return cantera.Solution(thermo="ideal-gas", species=[cantera_species(symbol) for symbol in symbols])
