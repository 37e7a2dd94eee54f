"""What stands beside the account: stack loss from air temperature, available heat, flame, dew points.

Every function takes the Terms of one chunk and gives an array that broadcasts to its state shape.
"""

import numpy as np

from fluegas.accounting.flue_heat import FlueHeat
from fluegas.accounting.inputs import GROSS, NET
from fluegas.accounting.terms import UNBURNT_GASES, Terms, total
from fluegas.combustion.dew_point import acid_dew_point, water_dew_point
from fluegas.combustion.flame import complete_flame_temperature
from fluegas.thermo.mixture import Temperature
from fluegas.thermo.polynomials import FloatArray


def stack_loss_from_air(terms: Terms) -> FloatArray:
    """Return the heat of the wet flue gas from air to flue temperature over the net value; no latent heat, no CO."""
    start, end = FlueHeat(terms.gas, terms.air_temperature), terms.flue
    heat = end.dry_gas - start.dry_gas + terms.gas.water * (end.of_vapour - start.of_vapour)
    return heat / terms.heating_value(NET)


def short_formula(terms: Terms) -> FloatArray:
    """Return the flue loss by the short formula (t_flue - t_air)(A/(21 - O2) + B), NaN where the fuel has none.

    German 1. BImSchV (2010), annex 2, number 3.4.1; temperatures in degC, O2 in percent of the dry gas.
    """
    if np.all(np.isnan(terms.data.short_formula_a)):
        return np.full((), np.nan)
    oxygen = 100.0 * terms.gas.dry_oxygen
    rise = terms.flue.at.kelvin - terms.data.air.temperature
    return np.asarray(rise * (terms.data.short_formula_a / (21.0 - oxygen) + terms.data.short_formula_b) / 100.0)


def available_heat(terms: Terms, basis: str) -> FloatArray:
    """Return the heat left to the furnace above the chamber temperature over the heat input; NaN where none is given.

    Credits are those at the burner; the surface loss is not taken off.
    """
    chamber = terms.data.readings.chamber_temperature
    if chamber is None:
        return np.full((), np.nan)
    known = ~np.isnan(chamber)
    there = FlueHeat(terms.gas, Temperature(np.where(known, chamber, 1000.0), "chamber temperature"))
    lost = there.dry_gas + there.fuel_water + there.air_moisture + terms.unburned_carbon
    if basis == GROSS:
        lost = lost + terms.latent_heat
    for symbol in UNBURNT_GASES.values():
        lost = lost + terms.unburnt_gas(symbol, basis)
    brought = total(terms.burner_credits.values())
    return np.where(known, 1.0 + (brought - lost) / terms.heating_value(basis), np.nan)


def flame_temperature(terms: Terms) -> FloatArray:
    """Return the flame temperature of complete combustion [K]; NaN where fuel-rich."""
    data = terms.data
    air_heat = terms.burner_credits["air"] + terms.burner_credits["air_moisture"]
    return complete_flame_temperature(
        terms.gas, data.fuel_temperature, terms.unburned_carbon, data.recirculation, air_heat
    )


def _water_pressure(terms: Terms) -> FloatArray:
    pressure = np.asarray(terms.gas.water / terms.gas.wet_flue_gas * terms.data.air.pressure)
    unknown = terms.gas.is_unknown
    return np.where(unknown, 0.0, pressure) if np.any(unknown) else pressure


def dew_point_of_water(terms: Terms) -> FloatArray:
    """Return the water dew point of the flue gas [K]; NaN without water."""
    return water_dew_point(_water_pressure(terms))


def dew_point_of_acid(terms: Terms) -> FloatArray:
    """Return the sulfuric acid dew point of the flue gas [K]; NaN without sulfur."""
    if not np.any(terms.gas.amount("SO2")):
        return np.full((), np.nan)
    trioxide = terms.gas.amount("SO2") * terms.data.sulfur_trioxide_share
    partial = trioxide / terms.gas.wet_flue_gas * terms.data.air.pressure
    return acid_dew_point(_water_pressure(terms), partial, terms.data.acid_correlation)
