"""The accounts of several settings of one unit side by side, with what holds between them.

Settings run on the first axis, `(n, ...)`. The baseline's surface loss carries over to the others as the same heat at
equal useful heat; a setting with a heat input of its own loses the same power over that input. Each setting is compared
with the baseline or with another one.
"""

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, replace

import numpy as np

from fluegas.accounting.account import HeatAccount, heat_account
from fluegas.accounting.comparison import AnnualUse, Comparison, compare
from fluegas.accounting.inputs import AccountInput, state_shape, take
from fluegas.thermo.polynomials import FloatArray

SECONDS_PER_HOUR = 3600.0


@dataclass(frozen=True)
class UnitInput:
    """What is known of the unit as a whole; powers in W on the basis of the account input.

    baseline: place of the baseline. compared_with: for each setting the place of the one that it is compared with.
    heat_input: shape `(n, ...)`, each setting's own heat input, NaN where it has none; the baseline's is the unit's.
    surface_share: the baseline's surface loss over its heat input; surface_heat: the same as power [W]; at most one,
    None for no surface loss. rated_output: useful heat [W] that stands in for the heat input if `surface_heat` is given
    without one.
    operating_time: s/a. annual_heat: baseline's heat input [J/a] if it was given. price: currency/J, `(n, ...)`.
    """

    baseline: int
    compared_with: Sequence[int]
    heat_input: FloatArray
    surface_share: FloatArray | float | None = None
    surface_heat: FloatArray | float | None = None
    rated_output: FloatArray | float = np.nan
    operating_time: FloatArray | float = np.nan
    annual_heat: FloatArray | float = np.nan
    price: FloatArray | float = np.nan


@dataclass(frozen=True)
class Ledger:
    """Accounts of the settings and their comparison; NaN where not known.

    heat_input, annual_heat: of each setting on the file's basis [W, J/a], the latter if it ran so all year.
    """

    account: HeatAccount
    comparison: Comparison
    heat_input: FloatArray
    annual_heat: FloatArray


def ledger(data: AccountInput, unit: UnitInput, outputs: Sequence[str] | None = None) -> Ledger:
    """Return the accounts and comparison of the settings on the first axis of `data`.

    `outputs` names the figures wanted, all if None; what the comparison needs is added.

    Raises InputError and RangeError as `heat_account` does.
    """
    basis = data.basis
    data = with_surface(data, unit)
    needed = ["efficiency.gross", "efficiency.net", f"emissions.co2_per_input.{basis}"]
    names = None if outputs is None else [*outputs, *(name for name in needed if name not in outputs)]
    account = heat_account(data, names)
    efficiency = account[f"efficiency.{basis}"]
    heat_input = effective_heat_input(efficiency, unit)
    annual = AnnualUse(
        heat=annual_heat(efficiency, heat_input, unit),
        price=np.broadcast_to(np.asarray(unit.price, dtype=float), account.shape),
        carbon_dioxide=account[f"emissions.co2_per_input.{basis}"],
    )
    comparison = compare(efficiency, account["efficiency.gross"], account["efficiency.net"], unit.compared_with, annual)
    return Ledger(account, comparison, heat_input, annual.heat)


def with_surface(data: AccountInput, unit: UnitInput) -> AccountInput:
    """Return `data` with the surface loss of every setting worked out from the baseline's.

    Where the baseline has no useful heat or cannot be worked out, settings without a heat input of their own take its
    share.
    """
    if unit.surface_share is None and unit.surface_heat is None:
        return data
    shape = state_shape(data)
    place = unit.baseline
    own = np.broadcast_to(unit.heat_input, shape)
    reference = own[place : place + 1]
    if unit.surface_share is not None:
        share = np.broadcast_to(np.asarray(unit.surface_share, dtype=float), reference.shape)
        power = share * reference
    else:
        power = np.broadcast_to(np.asarray(unit.surface_heat, dtype=float), reference.shape)
        share = power / reference
    baseline = take(data, len(shape), 0, slice(place, place + 1))
    name = f"efficiency.{data.basis}"
    efficiency = heat_account(replace(baseline, surface_share=np.nan_to_num(share)), [name])[name]
    ratio = share / efficiency
    if unit.surface_heat is not None:
        ratio = np.where(np.isnan(ratio), np.asarray(unit.surface_heat) / unit.rated_output, ratio)
    shares = power / own
    shares[place] = share[0]
    shares = np.where(np.isnan(shares) & ~(efficiency > 0), share, shares)
    return replace(data, surface_share=shares, surface_per_useful=ratio)


def effective_heat_input(efficiency: FloatArray, unit: UnitInput) -> FloatArray:
    """Return each setting's heat input [W]: its own, else that which gives the baseline's useful heat."""
    own = np.broadcast_to(unit.heat_input, efficiency.shape)
    useful = own[unit.baseline] * efficiency[unit.baseline]
    return np.asarray(np.where(np.isnan(own), useful / efficiency, own))


def annual_heat(efficiency: FloatArray, heat_input: FloatArray, unit: UnitInput) -> FloatArray:
    """Return each setting's heat input over a year [J/a]: from the annual fuel, else from power and hours."""
    by_power = heat_input * np.asarray(unit.operating_time)
    by_fuel = np.asarray(unit.annual_heat) * efficiency[unit.baseline] / efficiency
    own = ~np.isnan(np.broadcast_to(unit.heat_input, efficiency.shape))
    own_elsewhere = own & (np.arange(len(own)) != unit.baseline).reshape(-1, *(1,) * (efficiency.ndim - 1))
    return np.asarray(np.where(np.isnan(by_fuel) | own_elsewhere, by_power, by_fuel))


def other_losses(data: AccountInput, basis: str) -> Mapping[str, FloatArray]:
    """Return the other losses by name as shares of the heat input on `basis`."""
    values = {"gross": data.fuel.gross_heating_value, "net": data.fuel.net_heating_value}
    ratio = values[data.basis] / values[basis]
    return {name: np.asarray(share * ratio) for name, share in data.other.items()}
