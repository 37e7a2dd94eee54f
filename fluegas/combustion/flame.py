"""Adiabatic flame temperature of complete combustion: CO2, H2O, SO2, HCl, N2, Ar, He and O2 only, no dissociation.

The net heating value, less what stays in the ash, and the sensible heats of fuel and of air at the burner all go into
the products; unburnt gases in the readings are taken as burnt. Recirculated flue gas takes part at its own temperature.
"""

from dataclasses import dataclass

import numpy as np

from fluegas.combustion.air import DRY_AIR_GASES, dry_air_amounts, dry_air_molar_mass
from fluegas.combustion.product_gas import ProductGas
from fluegas.thermo.mixture import Temperature, gases_above
from fluegas.thermo.polynomials import FloatArray
from fluegas.thermo.temperature import temperature_from_enthalpy

COMPLETE_PRODUCTS = ("CO2", "H2O", "SO2", "HCl", "N2", "Ar", "He", "O2")
"""Products of complete combustion, in the order of the first axis of `complete_products`."""


@dataclass(frozen=True)
class Recirculation:
    """Flue gas led back to the flame: `share` in kg per kg of air and fuel, at `temperature` [K]."""

    share: FloatArray
    temperature: FloatArray


def complete_products(gas: ProductGas) -> FloatArray:
    """Return the amounts of COMPLETE_PRODUCTS [mol/kg fuel], shape `(8, ...)`; O2 is negative where fuel-rich."""
    amounts = _amounts(gas)
    return np.stack(np.broadcast_arrays(*(amounts.get(symbol, np.zeros(())) for symbol in COMPLETE_PRODUCTS)))


def _amounts(gas: ProductGas) -> dict[str, FloatArray]:
    """Return the amounts of those complete products that can be there, O2 last."""
    element = gas.fuel.element
    air = dry_air_amounts(gas.dry_air, gas.air.oxygen)
    water = gas.water_formed + gas.fuel.moisture + gas.water_from_air
    found = {"CO2": gas.burned_carbon + air["CO2"], "H2O": np.asarray(water)}
    for symbol, amount in (("SO2", element("S")), ("HCl", element("Cl")), ("He", element("He"))):
        if np.any(amount):
            found[symbol] = amount
    for symbol, amount in (("N2", element("N") / 2), ("Ar", element("Ar"))):
        found[symbol] = amount + air[symbol] if np.any(amount) else air[symbol]
    return {**found, "O2": np.asarray(air["O2"] - gas.theoretical_oxygen)}


def heat_of_air(gas: ProductGas) -> FloatArray:
    """Return the heat of the humid air at the burner above the reference temperature [J/kg fuel]."""
    at = Temperature(gas.air.at_burner, "air temperature at the burner")
    one_mole = dry_air_amounts(1.0, gas.air.oxygen)
    dry = gases_above(DRY_AIR_GASES, gas.fuel.reference_temperature).mixture(np.stack(list(one_mole.values())))
    vapour = gases_above(("H2O",), gas.fuel.reference_temperature).mixture(np.ones(1))
    return np.asarray(gas.dry_air * dry.enthalpy(at) + gas.water_from_air * vapour.enthalpy(at))


def complete_flame_temperature(
    gas: ProductGas,
    fuel_temperature: FloatArray,
    unburned_heat: FloatArray | float = 0.0,
    recirculation: Recirculation | None = None,
    air_heat: FloatArray | None = None,
) -> FloatArray:
    """Return the flame temperature of complete combustion [K]; NaN where fuel-rich.

    `fuel_temperature` [K] is that at the burner; `unburned_heat` [J/kg fuel] stays in the ash. `air_heat` is what
    `heat_of_air` gives, if the caller has it.

    Raises RangeError if the flame would be hotter than 6000 K.
    """
    by_symbol = _amounts(gas)
    lean = by_symbol["O2"] >= -1e-7 * gas.theoretical_oxygen
    by_symbol["O2"] = np.maximum(by_symbol["O2"], 0.0)
    products_set = gases_above(tuple(by_symbol), gas.fuel.reference_temperature)
    amounts = np.stack(np.broadcast_arrays(*by_symbol.values()))
    products = products_set.mixture(amounts)
    heat = gas.fuel.net_heating_value - unburned_heat + gas.fuel.sensible_heat(fuel_temperature)
    heat = heat + (heat_of_air(gas) if air_heat is None else air_heat)
    if recirculation is not None:
        product_mass = np.tensordot(products_set.molar_mass, amounts, 1)
        air_mass = dry_air_molar_mass(gas.air.oxygen) * gas.dry_air
        water_mass = gas.water_from_air * products_set.molar_mass[products_set.index("H2O")]
        ratio = recirculation.share * (1.0 + air_mass + water_mass) / product_mass
        heat = (heat + ratio * products.enthalpy(recirculation.temperature)) / (1.0 + ratio)
    return temperature_from_enthalpy(products, np.where(lean & ~gas.is_unknown, heat, np.nan))
