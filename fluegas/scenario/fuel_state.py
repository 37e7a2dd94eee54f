"""The fuel of one setting in SI, one fuel or several fired together: what it is, what it costs, what was assumed of it.

A blend takes its price by heat, its biogenic share by carbon and its SO3 share by sulfur, unless [fuel] states them.
"""

from collections.abc import Callable, Sequence
from dataclasses import dataclass, replace

import numpy as np

from fluegas.accounting.inputs import GROSS
from fluegas.combustion.blend import blend, mass_shares_of_heat
from fluegas.combustion.fuel import Fuel
from fluegas.errors import Caution, InputError
from fluegas.scenario.fuel_entry import SULFUR_TRIOXIDE_SHARE, amount_per_mass_of, merged_fuel, single_fuel, state_of
from fluegas.scenario.library import origin_of
from fluegas.scenario.model import Table
from fluegas.thermo.polynomials import FloatArray


@dataclass(frozen=True)
class FuelState:
    """The fuel of a setting and the `entry` that holds for it, library and override merged.

    biogenic_share: share of the carbon that is not fossil. sulfur_trioxide_share: SO3 over SO2, molar. price: currency
    per joule on the file's basis, NaN where there is none; currency: its name, None where there is none.
    """

    fuel: Fuel
    entry: Table
    biogenic_share: float
    sulfur_trioxide_share: float
    price: float
    currency: str | None
    cautions: tuple[Caution, ...]


def fuel_state_of(base: Table, override: Table | None, reference_temperature: float, basis: str) -> FuelState:
    """Return the fuel of a setting from the file's entries `base`, with the library beneath them, and its `override`.

    Raises AnalysisError for an analysis that cannot be; InputError for a unit that does not fit the fuel or prices in
    two currencies.
    """
    entry = merged_fuel(base, override)
    if entry.rows("part"):
        return _blend(entry, reference_temperature, basis)
    return _single(entry, single_fuel(base, override, reference_temperature), basis)


def heating_value(fuel: Fuel, basis: str) -> float:
    """Return the heating value [J/kg] on `basis`."""
    return float(fuel.gross_heating_value if basis == GROSS else fuel.net_heating_value)


def _single(entry: Table, fuel: Fuel, basis: str) -> FuelState:
    price, currency = _price(entry, fuel, heating_value(fuel, basis))
    fuel = replace(fuel, cautions=(*_library_caution(entry), *fuel.cautions))
    stated = entry.number("so3_share")
    share = SULFUR_TRIOXIDE_SHARE[state_of(entry)] if stated is None else stated
    return FuelState(
        fuel=fuel,
        entry=entry,
        biogenic_share=entry.number("biogenic_share") or 0.0,
        sulfur_trioxide_share=share,
        price=price,
        currency=currency,
        cautions=(*fuel.cautions, *_sulfur_caution(fuel, share, is_stated=stated is not None)),
    )


def _blend(entry: Table, reference_temperature: float, basis: str) -> FuelState:
    rows = entry.rows("part")
    parts = [_single(row, single_fuel(row, None, reference_temperature), basis) for row in rows]
    fuels = [part.fuel for part in parts]
    mass = _mass_shares(rows, fuels, basis)
    fuel = replace(blend(fuels, mass), cautions=_of_parts(rows, fuels))
    price, currency, price_cautions = _blend_price(entry, parts, fuel, mass, basis)
    biogenic, trioxide = entry.number("biogenic_share"), entry.number("so3_share")
    if biogenic is None:
        biogenic = _weighted(lambda part: part.biogenic_share, parts, mass, "C")
    stated = trioxide is not None or all(row.number("so3_share") is not None for row in rows)
    if trioxide is None:
        trioxide = _weighted(lambda part: part.sulfur_trioxide_share, parts, mass, "S")
    return FuelState(
        fuel=fuel,
        entry=entry,
        biogenic_share=biogenic,
        sulfur_trioxide_share=trioxide,
        price=price,
        currency=currency,
        cautions=(
            *fuel.cautions,
            *_sulfur_caution(fuel, trioxide, is_stated=stated),
            *price_cautions,
        ),
    )


def _mass_shares(rows: Sequence[Table], fuels: Sequence[Fuel], basis: str) -> FloatArray:
    shares = np.array([row.number("share") or 0.0 for row in rows])
    shares = shares / shares.sum()
    if rows[0].text("share_of") == "heat":
        return mass_shares_of_heat([heating_value(fuel, basis) for fuel in fuels], shares)
    return np.asarray(shares)


def _weighted(
    number: Callable[[FuelState], float], parts: Sequence[FuelState], mass: FloatArray, element: str
) -> float:
    """Return the mean of a number of the parts weighted by their amounts of `element`; by mass where there is none."""
    amounts = np.array([float(part.fuel.element(element)) for part in parts]) * mass
    weights = amounts if amounts.sum() > 0 else mass
    return float(np.average([number(part) for part in parts], weights=weights))


def _of_parts(rows: Sequence[Table], fuels: Sequence[Fuel]) -> tuple[Caution, ...]:
    """Return the cautions of the parts, each with the name of its part."""
    found = []
    for place, (row, fuel) in enumerate(zip(rows, fuels, strict=True), 1):
        name = row.text("name") or f"part {place}"
        found += [replace(caution, message=f"{name}: {caution.message}") for caution in fuel.cautions]
    return tuple(found)


def _price(entry: Table, fuel: Fuel, value: float) -> tuple[float, str | None]:
    """Return the price per joule on the file's basis, and its currency."""
    price = entry.price("price")
    if price is None:
        return np.nan, None
    if price.dimension == "energy":
        return price.value, price.currency
    if price.dimension == "mass":
        return price.value / value, price.currency
    amount_per_mass = amount_per_mass_of(fuel)
    if amount_per_mass is None:
        raise InputError(
            f"price {price.text!r} is per volume of gas, but the fuel is not a gas; give it by mass or energy"
        )
    return price.value * amount_per_mass / value, price.currency


def _blend_price(
    entry: Table, parts: Sequence[FuelState], fuel: Fuel, mass: FloatArray, basis: str
) -> tuple[float, str | None, tuple[Caution, ...]]:
    """Return the price of a blend, stated or by the heat of its parts, its currency and cautions."""
    if entry.price("price") is not None:
        return *_price(entry, fuel, heating_value(fuel, basis)), ()
    currencies = list(dict.fromkeys(part.currency for part in parts if part.currency is not None))
    if not currencies:
        return np.nan, None, ()
    if len(currencies) > 1:
        raise InputError(f"the parts are priced in {' and '.join(currencies)}; give all prices in one currency")
    heat = mass * [heating_value(part.fuel, basis) for part in parts]
    price = float(np.dot(heat, [part.price for part in parts]) / heat.sum())
    if not np.isnan(price):
        return price, currencies[0], ()
    message = "some parts of the fuel have no price, so the blend has none; a part that costs nothing says so"
    return np.nan, None, (Caution("blend_price_incomplete", message, None, None, "the scenario file"),)


def _library_caution(entry: Table) -> tuple[Caution, ...]:
    origin = origin_of(entry)
    if origin is None:
        return ()
    message = "the analysis is a typical one of the fuel library; an analysis of the fuel fired is surer"
    return (Caution("fuel_from_library", message, None, None, origin),)


def _sulfur_caution(fuel: Fuel, share: float, *, is_stated: bool) -> tuple[Caution, ...]:
    if is_stated or not float(fuel.element("S")) > 0:
        return ()
    message = f"the acid dew point takes {100 * share:.3g} % of the sulfur as SO3; no so3_share was given"
    return (Caution("so3_share_assumed", message, share, None, "common practice, no source"),)
