"""What goes into a heat account, and how arrays of states are cut into chunks."""

from collections.abc import Mapping
from dataclasses import dataclass, field, fields, is_dataclass, replace
from types import MappingProxyType
from typing import Any, TypeVar

import numpy as np

from fluegas.combustion.air import Air
from fluegas.combustion.dew_point import DEFAULT_CORRELATION
from fluegas.combustion.flame import Recirculation
from fluegas.combustion.fuel import Fuel
from fluegas.combustion.product_gas import FlueReadings
from fluegas.thermo.polynomials import BoolArray, FloatArray

GROSS, NET = "gross", "net"
BASES = (GROSS, NET)

Part = TypeVar("Part")


@dataclass(frozen=True)
class EmissionReadings:
    """Readings that only emissions are worked out from, mole fractions in the dry flue gas; NaN where not read.

    no2, nox (NO and NO2 together), so2. co_read, no_read: true where CO and NO, which stand in FlueReadings because the
    balances need them, were read, so that a zero there is a reading; a share above zero counts as read.
    """

    no2: FloatArray | float = np.nan
    nox: FloatArray | float = np.nan
    so2: FloatArray | float = np.nan
    co_read: BoolArray | bool = False
    no_read: BoolArray | bool = False


@dataclass(frozen=True)
class AccountInput:
    """Everything that a heat account is worked out from; SI, state shape `(...)`, every array broadcasts.

    fuel, air, readings: see their classes. fuel_temperature: K where the fuel crosses the boundary.
    basis: "gross" or "net", what `surface_share` and `other` are shares of.
    surface_share: surface loss as a share of this state's heat input; where it is None or NaN, `surface_per_useful`
    holds: surface heat over useful heat, so that the surface loses the same heat at equal useful heat.
    other: named losses as shares of heat input.
    condensate: measured condensate [kg/kg fuel]; None or NaN where the saturation rule is to work it out.
    sulfur_trioxide_share: SO3 over SO2, molar, for the acid dew point by `acid_correlation`.
    short_formula_a, short_formula_b: constants of the short flue-loss formula [percent, percent/K]; NaN where it has
    none for the fuel. recirculation: flue gas led back to the flame, None without.
    biogenic_share: share of the fuel's carbon that is not fossil.
    emissions: readings for the emissions alone. reference_oxygen: O2 in the dry gas that their limits refer to.
    coldest_air, hottest_air: K of the site's extreme days, NaN where not given.
    """

    fuel: Fuel
    air: Air
    readings: FlueReadings
    fuel_temperature: FloatArray
    basis: str = GROSS
    surface_share: FloatArray | None = None
    surface_per_useful: FloatArray | float = 0.0
    other: Mapping[str, FloatArray | float] = field(default_factory=lambda: MappingProxyType({}))
    condensate: FloatArray | None = None
    sulfur_trioxide_share: FloatArray | float = 0.02
    acid_correlation: str = DEFAULT_CORRELATION
    short_formula_a: FloatArray | float = np.nan
    short_formula_b: FloatArray | float = np.nan
    recirculation: Recirculation | None = None
    biogenic_share: FloatArray | float = 0.0
    emissions: EmissionReadings = field(default_factory=EmissionReadings)
    reference_oxygen: FloatArray | float = 0.03
    coldest_air: FloatArray | float = np.nan
    hottest_air: FloatArray | float = np.nan


def state_shape(part: object) -> tuple[int, ...]:
    """Return the broadcast shape of all states in `part`, a dataclass of arrays, species axes left out.

    Raises ValueError if shapes do not broadcast.
    """
    shapes: list[tuple[int, ...]] = []
    _collect(part, 0, shapes)
    return np.broadcast_shapes(*shapes)


def _collect(part: object, leading: int, shapes: list[tuple[int, ...]]) -> None:
    if isinstance(part, np.ndarray):
        shapes.append(part.shape[leading:])
    elif isinstance(part, Mapping):
        for value in part.values():
            _collect(value, 0, shapes)
    elif is_dataclass(part):
        for entry in fields(part):
            _collect(getattr(part, entry.name), entry.metadata.get("leading", 0), shapes)


def take(part: Part, ndim: int, axis: int, where: slice) -> Part:
    """Return `part` with every array cut by `where` along state `axis` of `ndim`; axes of length 1 are kept."""
    return _take(part, ndim - axis, where, 0)  # type: ignore[no-any-return]  # recursion over fields of any type


def _take(part: Any, from_right: int, where: slice, leading: int) -> Any:
    if isinstance(part, np.ndarray):
        if part.ndim - leading < from_right or part.shape[-from_right] == 1:
            return part
        index: list[slice] = [slice(None)] * part.ndim
        index[part.ndim - from_right] = where
        return part[tuple(index)]
    if isinstance(part, Mapping):
        return {name: _take(value, from_right, where, 0) for name, value in part.items()}
    if is_dataclass(part) and not isinstance(part, type):
        cut = {
            entry.name: _take(getattr(part, entry.name), from_right, where, entry.metadata.get("leading", 0))
            for entry in fields(part)
            if entry.init
        }
        return replace(part, **cut)
    return part
