"""Sensible heat of the flue gas at one temperature: at the stack, in the chamber, at the temperature of the air."""

from functools import cached_property

import numpy as np

from fluegas.combustion.product_gas import ProductGas
from fluegas.thermo.mixture import Temperature, gases_above
from fluegas.thermo.polynomials import FloatArray
from fluegas.thermo.water import heat_of_evaporation, saturation_pressure, saturation_temperature


class FlueHeat:
    """Sensible heat of the flue gas at one temperature [K], per kilogram of fuel [J/kg], all water as vapour."""

    def __init__(self, gas: ProductGas, temperature: Temperature) -> None:
        self.gas, self.at = gas, temperature

    @cached_property
    def dry_gas(self) -> FloatArray:
        """Heat of the dry flue gas."""
        return self.gas.dry_mixture.enthalpy(self.at)

    @cached_property
    def of_vapour(self) -> FloatArray:
        """Heat of one mole of water vapour [J/mol]."""
        vapour = gases_above(("H2O",), self.gas.fuel.reference_temperature)
        return vapour.mixture(np.ones(1)).enthalpy(self.at)

    @cached_property
    def fuel_water(self) -> FloatArray:
        """Heat of the water from the fuel, as vapour."""
        return np.asarray(self.gas.water_from_fuel * self.of_vapour)

    @cached_property
    def air_moisture(self) -> FloatArray:
        """Heat of the water that came with the air, as vapour."""
        return np.asarray(self.gas.water_from_air * self.of_vapour)

    @cached_property
    def saturation_condensate(self) -> FloatArray:
        """Water that condenses so that the gas is saturated at this temperature and its pressure [mol/kg fuel]."""
        temperature, pressure = self.at.kelvin, self.gas.air.pressure
        if self.at.lowest >= float(saturation_temperature(np.max(pressure))):
            return np.zeros(())
        saturated = saturation_pressure(np.minimum(temperature, saturation_temperature(0.99 * pressure)))
        vapour = self.gas.dry_flue_gas * saturated / (pressure - saturated)
        return np.maximum(self.gas.water - vapour, 0.0)

    def condensation(self, condensed: FloatArray) -> FloatArray:
        """Return the heat that `condensed` water [mol/kg fuel] gives back at this temperature, negative [J/kg fuel]."""
        if not np.any(condensed):
            return np.zeros(())
        temperature = np.where(condensed > 0, self.at.kelvin, self.gas.fuel.reference_temperature)
        return np.asarray(-condensed * heat_of_evaporation(temperature))
