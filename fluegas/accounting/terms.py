"""The terms of the heat account for one chunk of states: heats per kilogram of fuel, worked out when first asked for.

All heats are counted from the reference temperature. Useful heat per kilogram of fuel does not depend on the basis:

    gross value - losses (with latent heat) + credits = net value - losses (without) + credits = useful + surface heat,

so efficiency on either basis is the same useful heat over that basis's heating value.
"""

from collections.abc import Iterable
from functools import cached_property

import numpy as np

from fluegas.accounting.flue_heat import FlueHeat
from fluegas.accounting.inputs import GROSS, NET, AccountInput
from fluegas.combustion.air import dry_air_amounts
from fluegas.combustion.fuel import atomic_weights
from fluegas.combustion.heating_value import molar_heating_values
from fluegas.combustion.product_gas import ProductGas
from fluegas.errors import RangeError
from fluegas.thermo.mixture import Temperature, gases_above
from fluegas.thermo.polynomials import FloatArray
from fluegas.thermo.species import species
from fluegas.thermo.water import heat_of_evaporation_at

HEAT_OF_UNBURNED_CARBON = 33.7e6
"""Heat of combustion of carbon in ash [J/kg]; the value that the standards for boilers use (from memory: EN 12952-15
has 33.0, ASME PTC 4 33.7 MJ/kg)."""

UNBURNT_GASES = {"carbon_monoxide": "CO", "hydrogen": "H2", "methane": "CH4"}
HEAT_LOSSES = (
    "dry_gas",
    "fuel_water",
    "air_moisture",
    "condensation",
    *UNBURNT_GASES,
    "unburned_carbon",
)
"""Losses that follow from fuel, air and flue gas alone."""
CREDITS = ("air", "air_moisture", "fuel")


def total(parts: Iterable[FloatArray]) -> FloatArray:
    """Return the sum of `parts`, the single numbers among them first, so that zeros cost no pass over an array."""
    return np.asarray(sum(sorted(parts, key=lambda part: part.size), 0.0))


class Terms:
    """The terms of the account for one chunk; every property has the chunk's state shape or broadcasts to it."""

    def __init__(self, data: AccountInput) -> None:
        self.data = data
        self.gas = ProductGas(data.fuel, data.air, data.readings)
        self.reference = data.fuel.reference_temperature

    def heating_value(self, basis: str) -> FloatArray:
        """Heating value [J/kg] on `basis`."""
        return self.data.fuel.gross_heating_value if basis == GROSS else self.data.fuel.net_heating_value

    @cached_property
    def air_temperature(self) -> Temperature:
        """Temperature of the air where its humidity is measured."""
        return Temperature(self.data.air.temperature, "air temperature")

    @cached_property
    def flue(self) -> FlueHeat:
        """The flue gas where it leaves the boundary."""
        return FlueHeat(self.gas, Temperature(self.data.readings.flue_temperature, "flue temperature"))

    def heat(self, loss: str, basis: str) -> FloatArray:
        """Heat of one of HEAT_LOSSES [J/kg fuel] as counted on `basis`."""
        if loss == "dry_gas":
            return self.flue.dry_gas
        if loss == "fuel_water":
            return self.flue.fuel_water + self.latent_heat if basis == GROSS else self.flue.fuel_water
        if loss == "air_moisture":
            return self.flue.air_moisture
        if loss == "condensation":
            return self.condensation
        if loss == "unburned_carbon":
            return self.unburned_carbon
        return self.unburnt_gas(UNBURNT_GASES[loss], basis)

    @cached_property
    def latent_heat(self) -> FloatArray:
        """Heat of evaporation, at the reference temperature, of the water from fuel [J/kg fuel].

        Hydrogen that leaves bound to chlorine is counted with it, as gross less net heating value counts it.
        """
        water = self.gas.water_from_fuel + self.data.fuel.element("Cl") / 2
        return np.asarray(water * heat_of_evaporation_at(self.reference))

    def unburnt_gas(self, symbol: str, basis: str) -> FloatArray:
        """Heat of combustion of an unburnt flue gas [J/kg fuel]."""
        gross, net = molar_heating_values(tuple(UNBURNT_GASES.values()), self.reference)
        place = tuple(UNBURNT_GASES.values()).index(symbol)
        molar = gross[place] if basis == GROSS else net[place]
        return np.asarray(self.gas.amount(symbol) * molar)

    @cached_property
    def unburned_carbon(self) -> FloatArray:
        """Heat left in unburned carbon [J/kg fuel]."""
        carbon = self.data.fuel.element("C") * atomic_weights()[0]
        return np.asarray(HEAT_OF_UNBURNED_CARBON * carbon * self.data.readings.unburned_carbon)

    @cached_property
    def condensed_water(self) -> FloatArray:
        """Water that leaves as condensate [mol/kg fuel]: measured, else so that the gas leaves saturated."""
        measured = self.data.condensate
        if measured is None:
            return self.flue.saturation_condensate
        amount = measured / species("H2O").molar_mass
        if np.any(amount > self.gas.water):
            worst = float(np.max(amount / self.gas.water))
            raise RangeError("measured condensate over all water of the flue gas", worst, low=0.0, high=1.0)
        return np.where(np.isnan(measured), self.flue.saturation_condensate, amount)

    @cached_property
    def condensation(self) -> FloatArray:
        """Heat given back by condensing, negative [J/kg fuel]; the condensate leaves at the flue temperature."""
        return self.flue.condensation(self.condensed_water)

    @cached_property
    def credits(self) -> dict[str, FloatArray]:
        """Heat brought in above the reference temperature [J/kg fuel], by the names of CREDITS."""
        air = self.data.air
        same = air.at_boundary is air.temperature
        return self.credits_at(self.air_temperature if same else Temperature(air.at_boundary, "burner temperature"))

    @cached_property
    def burner_credits(self) -> dict[str, FloatArray]:
        """The credits with the air as it is at the burner, whoever preheats it."""
        air = self.data.air
        if air.at_burner is air.at_boundary:
            return self.credits
        return self.credits_at(Temperature(air.at_burner, "burner temperature"))

    def credits_at(self, temperature: Temperature) -> dict[str, FloatArray]:
        """Heat brought in with air of this `temperature` and with the fuel [J/kg fuel], by the names of CREDITS."""
        amounts = dry_air_amounts(1.0, self.data.air.oxygen)
        dry = gases_above(tuple(amounts), self.reference).mixture(np.stack(list(amounts.values())))
        vapour = gases_above(("H2O",), self.reference).mixture(np.ones(1))
        return {
            "air": np.asarray(self.gas.dry_air * dry.enthalpy(temperature)),
            "air_moisture": np.asarray(self.gas.water_from_air * vapour.enthalpy(temperature)),
            "fuel": self.data.fuel.sensible_heat(self.data.fuel_temperature),
        }

    @cached_property
    def total_credit(self) -> FloatArray:
        """All credits [J/kg fuel]."""
        return total(self.credits.values())

    @cached_property
    def other(self) -> dict[str, FloatArray]:
        """Other losses by name [J/kg fuel]."""
        value = self.heating_value(self.data.basis)
        return {name: np.asarray(share * value) for name, share in self.data.other.items()}

    @cached_property
    def _before_surface(self) -> FloatArray:
        lost = total([*(self.heat(loss, NET) for loss in HEAT_LOSSES), *self.other.values()])
        return np.asarray(self.heating_value(NET) + self.total_credit - lost)

    @cached_property
    def surface(self) -> FloatArray:
        """Heat lost by radiation and convection [J/kg fuel]."""
        share, ratio = self.data.surface_share, np.asarray(self.data.surface_per_useful)
        by_ratio = self._before_surface * (ratio / (1.0 + ratio))
        if share is None:
            return np.asarray(by_ratio)
        return np.where(np.isnan(share), by_ratio, share * self.heating_value(self.data.basis))

    @cached_property
    def useful_heat(self) -> FloatArray:
        """Useful heat [J/kg fuel], the same on both bases."""
        return self._before_surface - self.surface

    def loss(self, name: str, basis: str) -> FloatArray:
        """One loss as a share of the heat input on `basis`; "surface" and "other" (their sum) included."""
        if name == "surface":
            heat = self.surface
        elif name == "other":
            heat = total(self.other.values())
        else:
            heat = self.heat(name, basis)
        return heat / self.heating_value(basis)

    def credit(self, name: str, basis: str) -> FloatArray:
        """One credit as a share of the heat input on `basis`."""
        return self.credits[name] / self.heating_value(basis)

    def efficiency(self, basis: str) -> FloatArray:
        """Useful heat over fuel heat on `basis`."""
        return self.useful_heat / self.heating_value(basis)

    def efficiency_all_input(self, basis: str) -> FloatArray:
        """Useful heat over fuel heat and credits on `basis`."""
        return self.useful_heat / (self.heating_value(basis) + self.total_credit)
