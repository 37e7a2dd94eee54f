"""Curves: figures of settings against one quantity that is varied while all else stays as entered.

A point of a curve is a further setting, a copy of the one it starts from with another value of one quantity. Its
surface loses what the ledger says of such a setting: the same heat at equal useful heat as the baseline, or the same
share if the setting has a heat input of its own. All points of all settings are one call of the account, of shape
`(n_settings, n_points)`.
"""

from collections.abc import Callable, Mapping, Sequence
from dataclasses import dataclass, fields, is_dataclass, replace
from types import MappingProxyType
from typing import Any

import numpy as np

from fluegas.accounting.account import heat_account
from fluegas.accounting.inputs import AccountInput, state_shape
from fluegas.accounting.ledger import UnitInput, with_surface
from fluegas.combustion.product_gas import SUPPLY_READINGS
from fluegas.combustion.solid_fuel import with_moisture
from fluegas.errors import InputError
from fluegas.thermo.polynomials import FloatArray
from fluegas.thermo.species import species


@dataclass(frozen=True)
class Variable:
    """A quantity that can be varied: `vary` puts values [SI] into the input of an account.

    own: what tells a setting's own value, a figure of the account by name or a function of the input. held: what stays
    as entered though it would move with this quantity on a real unit.
    """

    name: str
    label: str
    dimension: str
    help: str
    held: str
    vary: Callable[[AccountInput, FloatArray], AccountInput]
    own: str | Callable[[AccountInput], FloatArray]


@dataclass(frozen=True)
class Curves:
    """Figures against a quantity, SI: `values` of shape `(n_points,)`, settings on the first axis of all else.

    places: of the settings in the ledger. figures: by dotted name, shape `(n_settings, n_points)`, NaN where a figure
    does not exist. own: each setting's own value of the quantity, shape `(n_settings,)`, own_figures: its figures
    there.
    """

    variable: Variable
    values: FloatArray
    places: tuple[int, ...]
    figures: Mapping[str, FloatArray]
    own: FloatArray
    own_figures: Mapping[str, FloatArray]


def _with_supply(reading: str) -> Callable[[AccountInput, FloatArray], AccountInput]:
    def vary(data: AccountInput, values: FloatArray) -> AccountInput:
        supply = {**dict.fromkeys(SUPPLY_READINGS), reading: values}
        return replace(data, readings=replace(data.readings, **supply))  # type: ignore[arg-type]  # all of one type

    return vary


def _with_flue_temperature(data: AccountInput, values: FloatArray) -> AccountInput:
    return replace(data, readings=replace(data.readings, flue_temperature=values))


def _with_air_temperature(data: AccountInput, values: FloatArray) -> AccountInput:
    return replace(data, air=replace(data.air, temperature=values))


def _with_moisture(data: AccountInput, values: FloatArray) -> AccountInput:
    if np.any(data.fuel.gases):
        raise InputError("the moisture of a gas cannot be varied; it can for liquid and solid fuels")
    fuel = with_moisture(data.fuel, values)
    spent = np.broadcast_to(~(fuel.net_heating_value > 0), np.broadcast(fuel.net_heating_value, values).shape)
    if np.any(spent):
        wet = float(np.min(np.broadcast_to(values, spent.shape)[spent]))
        raise InputError(
            f"at {100 * wet:.4g} % moisture the fuel's net heating value is no longer above zero; stay below"
        )
    return replace(data, fuel=fuel)


def _moisture(data: AccountInput) -> FloatArray:
    return np.asarray(data.fuel.moisture * species("H2O").molar_mass)


_MIXTURE_HELD = "CO, other unburnt gases and the flue temperature"
VARIABLES: Mapping[str, Variable] = MappingProxyType(
    {
        variable.name: variable
        for variable in (
            Variable(
                "o2",
                "O2, dry",
                "fraction",
                "Oxygen in the dry flue gas; takes the place of what the setting gives for its air.",
                _MIXTURE_HELD,
                _with_supply("o2"),
                "flue_gas.dry.O2",
            ),
            Variable(
                "excess-air",
                "Excess air",
                "fraction",
                "Air over the theoretical air; takes the place of what the setting gives for its air.",
                _MIXTURE_HELD,
                _with_supply("excess_air"),
                "excess_air",
            ),
            Variable(
                "flue-temperature",
                "Flue gas temperature",
                "temperature",
                "Where the gas leaves the boundary.",
                "the air supply and the unburnt gases",
                _with_flue_temperature,
                lambda data: data.readings.flue_temperature,
            ),
            Variable(
                "air-temperature",
                "Air temperature",
                "temperature",
                "Of the combustion air where its humidity is measured; the humidity stays as entered.",
                "the air supply, the flue temperature and the entry for humidity",
                _with_air_temperature,
                lambda data: data.air.temperature,
            ),
            Variable(
                "fuel-moisture",
                "Fuel moisture",
                "fraction",
                "Mass share of water in the fuel as fired, for liquids and solids; the dry fuel stays the same.",
                "the air supply, the unburnt gases and the flue temperature",
                _with_moisture,
                _moisture,
            ),
        )
    }
)
"""Quantities that a curve may run over, by name."""


def curves(
    data: AccountInput,
    unit: UnitInput,
    variable: str,
    values: FloatArray,
    outputs: Sequence[str],
    places: Sequence[int] | None = None,
) -> Curves:
    """Return the figures named `outputs` of the settings at `places`, all if None, over `values` [SI] of `variable`.

    `data` has the settings on its one state axis.

    Raises InputError for a quantity or figure that there is not, for the moisture of a gas, and with RangeError as
    `heat_account` does, for values that cannot be.
    """
    chosen = variable_of(variable)
    every = with_surface(data, unit)
    rows = list(range(state_shape(data)[0])) if places is None else list(places)
    varied = chosen.vary(_spread(_free_baseline(every, unit.baseline), rows, 0), np.asarray(values, dtype=float))
    points, entered = heat_account(varied, outputs), heat_account(every, outputs)
    shape = (len(rows), np.size(values))
    return Curves(
        variable=chosen,
        values=np.asarray(values, dtype=float),
        places=tuple(rows),
        figures=MappingProxyType({name: np.broadcast_to(points[name], shape) for name in outputs}),
        own=own_values(data, variable)[rows],
        own_figures=MappingProxyType({name: entered[name][rows] for name in outputs}),
    )


def variable_of(name: str) -> Variable:
    """Return the quantity `name` of VARIABLES. Raises InputError if there is none."""
    if name not in VARIABLES:
        raise InputError(f"no quantity named {name} can be varied; there are {', '.join(VARIABLES)}")
    return VARIABLES[name]


def own_values(data: AccountInput, variable: str) -> FloatArray:
    """Return the value of `variable` [SI] that each setting has as entered, of the state shape of `data`.

    NaN where it has none: O2 of a fuel-rich gas. Raises as `curves` does.
    """
    own = variable_of(variable).own
    found = heat_account(data, [own])[own] if isinstance(own, str) else own(data)
    return np.broadcast_to(found, state_shape(data))


def _free_baseline(data: AccountInput, baseline: int) -> AccountInput:
    """Return `data` with the baseline's surface loss by useful heat, like that of a setting compared with it."""
    if data.surface_share is None:
        return data
    ratio = np.asarray(data.surface_per_useful)
    shares = np.array(data.surface_share)
    if np.all(np.isfinite(ratio) & (ratio >= 0)):
        shares[baseline] = np.nan
    return replace(data, surface_share=shares)


def _spread(part: Any, places: list[int], leading: int) -> Any:
    """Return `part` with the settings at `places` alone and an axis of length 1 for the points behind them."""
    if isinstance(part, np.ndarray):
        if part.ndim == leading:
            return part
        chosen = part if part.shape[-1] == 1 else part[..., places]
        return chosen[..., np.newaxis]
    if isinstance(part, Mapping):
        return {name: _spread(value, places, 0) for name, value in part.items()}
    if is_dataclass(part) and not isinstance(part, type):
        spread = {
            entry.name: _spread(getattr(part, entry.name), places, entry.metadata.get("leading", 0))
            for entry in fields(part)
            if entry.init
        }
        return replace(part, **spread)
    return part
