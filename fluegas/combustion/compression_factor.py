"""Real fuel gas at 101.325 kPa: how much of it a cubic metre holds, after ISO 6976:2016.

Compression factor Z = 1 - (sum x s)^2 from the summation factors s in `data/summation_factors.toml`, which say for each
gas where its factor comes from. A real cubic metre holds p/(Z R T); what is stated per cubic metre follows from that.
"""

from collections.abc import Mapping
from dataclasses import dataclass
from functools import cache
from types import MappingProxyType

import numpy as np
from numpy.typing import ArrayLike

from fluegas.combustion.air import STANDARD_ATMOSPHERE
from fluegas.combustion.fuel import FUEL_GASES
from fluegas.errors import DataError, InputError
from fluegas.thermo.polynomials import FloatArray
from fluegas.thermo.species import GAS_CONSTANT

METERING: Mapping[str, float] = MappingProxyType(
    {"0 degC": 273.15, "15 degC": 288.15, "20 degC": 293.15, "60 degF": (60.0 + 459.67) / 1.8}
)
"""Temperatures [K] at which gas is metered, by name."""
LOWEST_FACTOR = 0.9
"""Compression factor below which ISO 6976:2016 does not hold (from memory)."""


@dataclass(frozen=True)
class MeteringState:
    """One metering temperature: `factors` s in the order of FUEL_GASES, NaN where a gas has none; and Z of dry air."""

    temperature: float
    factors: FloatArray
    air_compression_factor: float


@dataclass(frozen=True)
class SummationFactors:
    """The data file: states by the names of METERING, the molar mass of dry air [kg/mol], source of each gas."""

    states: Mapping[str, MeteringState]
    air_molar_mass: float
    source: Mapping[str, str]


@cache
def summation_factors() -> SummationFactors:
    """Return the summation factors.

    Raises DataError if the data file is missing or damaged.
    """
    import tomllib

    from fluegas.resources import data_text

    try:
        data = tomllib.loads(data_text("summation_factors.toml"))
        source = {gas: origin for origin, gases in data["sources"].items() for gas in gases}
        table = {gas: tuple(map(float, row)) for gas, row in data["factors"].items()}
        if table.keys() != source.keys() or not table.keys() <= set(FUEL_GASES):
            raise ValueError(f"gases without factor, source or species: {sorted(table.keys() ^ source.keys())}")
        states = {}
        for place, name in enumerate(data["temperatures"]):
            factors = np.array([table[gas][place] if gas in table else np.nan for gas in FUEL_GASES])
            states[name] = MeteringState(METERING[name], factors, float(data["air"]["compression_factor"][place]))
        molar_mass = 1e-3 * float(data["air"]["molar_mass"])
    except (tomllib.TOMLDecodeError, KeyError, TypeError, AttributeError, ValueError, IndexError) as error:
        raise DataError(f"data/summation_factors.toml is damaged: {error!r}; install fluegas again") from error
    return SummationFactors(MappingProxyType(states), molar_mass, MappingProxyType(source))


def metering_state(name: str) -> MeteringState:
    """Return the metering state `name`. Raises InputError if it is not one of METERING."""
    try:
        return summation_factors().states[name]
    except KeyError:
        raise InputError(f"no summation factors at {name!r}; there are those at {', '.join(METERING)}") from None


def gases_without_factor(gases: ArrayLike) -> tuple[str, ...]:
    """Return the FUEL_GASES present in amounts `gases`, shape `(35, ...)`, for which there is no summation factor."""
    there = np.asarray(gases, dtype=float).reshape(len(FUEL_GASES), -1).max(axis=1) > 0
    known = summation_factors().source
    return tuple(gas for gas, present in zip(FUEL_GASES, there, strict=True) if present and gas not in known)


def compression_factor(gases: ArrayLike, metering: str) -> FloatArray:
    """Return the compression factor at 101.325 kPa and the temperature named `metering`, one of METERING.

    `gases` are amounts of FUEL_GASES, shape `(35, ...)`, in any unit. NaN where a gas has no summation factor or there
    is no gas at all.

    Raises InputError for an unknown `metering`.
    """
    state = metering_state(metering)
    amounts = np.asarray(gases, dtype=float)
    total = amounts.sum(axis=0)
    known = ~np.isnan(state.factors)
    weighted = np.tensordot(np.where(known, state.factors, 0.0), amounts, 1)
    unknown = np.tensordot((~known).astype(float), amounts, 1) > 0
    with np.errstate(divide="ignore", invalid="ignore"):
        mean = weighted / total
    return np.asarray(np.where(unknown | (total <= 0), np.nan, 1.0 - mean**2))


def molar_density(gases: ArrayLike, metering: str) -> FloatArray:
    """Return what a real cubic metre of the gas holds [mol/m3] at 101.325 kPa and the temperature named `metering`.

    Shapes, NaN and errors as for `compression_factor`.
    """
    temperature = metering_state(metering).temperature
    ideal = STANDARD_ATMOSPHERE / (GAS_CONSTANT * temperature)
    return np.asarray(ideal / compression_factor(gases, metering))


def air_density(metering: str) -> float:
    """Return the density of real dry air [kg/m3] at 101.325 kPa and the temperature named `metering`."""
    state = metering_state(metering)
    amount = STANDARD_ATMOSPHERE / (GAS_CONSTANT * state.temperature * state.air_compression_factor)
    return summation_factors().air_molar_mass * amount
