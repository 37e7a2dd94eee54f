"""Sensible heat of the flue gas at one temperature: at the stack, in the chamber, at the temperature of the air."""

from functools import cached_property

import numpy as np

from fluegas.combustion.product_gas import ProductGas
from fluegas.thermo.mixture import Temperature, gases_above
from fluegas.thermo.polynomials import FloatArray


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
