"""The species table: what `data/species.toml` says of each species, read once and checked."""

from collections.abc import Mapping
from dataclasses import dataclass
from functools import cache
from types import MappingProxyType
from typing import Any

from fluegas.errors import DataError, InputError

STANDARD_PRESSURE = 100_000.0
"""Pressure of the standard state [Pa]."""

GAS_CONSTANT = 8.314462618
"""Molar gas constant [J/(mol K)], CODATA 2018. Not the one inside the property polynomials: those keep their own."""


@dataclass(frozen=True)
class Species:
    """One species: `symbol` and plain `name`, its elements, and polynomials over adjoining temperature ranges.

    `molar_mass` is in kg/mol, `enthalpy_of_formation` in J/mol at 298.15 K, `temperatures` in K (n + 1 joints for
    n ranges), `coefficients` a1..a7, b1, b2 of NASA/TP-2002-211556 multiplied by the gas constant of the fit, so
    that heats come out in J/mol. `fitted_from` [K] is where the data behind the fit begin.
    """

    symbol: str
    name: str
    elements: Mapping[str, int]
    is_gas: bool
    molar_mass: float
    enthalpy_of_formation: float
    temperatures: tuple[float, ...]
    coefficients: tuple[tuple[float, ...], ...]
    fitted_from: float
    source: str


@cache
def _tables() -> tuple[Mapping[str, float], Mapping[str, Species]]:
    import tomllib

    from fluegas.resources import data_text

    try:
        data = tomllib.loads(data_text("species.toml"))
        weights = {element: weight * 1e-3 for element, weight in data["atomic_weights"].items()}
        gas_constant = float(data["gas_constant_of_fit"])
        species = {symbol: _species(symbol, entry, weights, gas_constant) for symbol, entry in data["species"].items()}
    except (tomllib.TOMLDecodeError, KeyError, TypeError, AttributeError, ValueError) as error:
        raise DataError(f"data/species.toml is damaged: {error!r}; install fluegas again") from error
    return MappingProxyType(weights), MappingProxyType(species)


def _species(symbol: str, entry: Mapping[str, Any], weights: Mapping[str, float], gas_constant: float) -> Species:
    temperatures = tuple(map(float, entry["temperatures"]))
    rows = tuple(tuple(gas_constant * float(number) for number in row) for row in entry["coefficients"])
    if len(rows) != len(temperatures) - 1 or any(len(row) != 9 for row in rows):
        raise ValueError(f"{symbol}: {len(temperatures)} joints need {len(temperatures) - 1} rows of 9 coefficients")
    return Species(
        symbol=symbol,
        name=entry["name"],
        elements=MappingProxyType(dict(entry["elements"])),
        is_gas=entry["phase"] == "gas",
        molar_mass=sum(weights[element] * count for element, count in entry["elements"].items()),
        enthalpy_of_formation=float(entry["enthalpy_of_formation"]),
        temperatures=temperatures,
        coefficients=rows,
        fitted_from=float(entry.get("fitted_from", temperatures[0])),
        source=entry["source"],
    )


def atomic_weight(element: str) -> float:
    """Return the atomic weight of `element` [kg/mol] (CIAAW abridged values)."""
    return _tables()[0][element]


def species_table() -> Mapping[str, Species]:
    """Return every species by symbol.

    Raises DataError if the data file is missing or damaged.
    """
    return _tables()[1]


def species(symbol: str) -> Species:
    """Return the species with this `symbol`, such as "CO2" or "H2O(l)".

    Raises InputError if the table has none.
    """
    try:
        return species_table()[symbol]
    except KeyError:
        known = ", ".join(species_table())
        raise InputError(f"no species {symbol!r} in the table; it has {known}") from None


@cache
def symbol_of(name: str) -> str:
    """Return the symbol of the gas with this plain `name`: "carbon dioxide" gives "CO2".

    Raises InputError if no gas of the table has that name.
    """
    for entry in species_table().values():
        if entry.name == name and entry.is_gas:
            return entry.symbol
    raise InputError(f"no gas named {name!r} in the species table")
