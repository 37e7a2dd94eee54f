"""A fuel as the account sees it: element amounts, heating values and sensible heat per kilogram as fired.

Gas fuels are made in `gas_fuel.py`, liquid and solid ones in `solid_fuel.py`. Net and gross value always differ by

    gross - net = (n_H/2 + moisture) [h_vapour - h_liquid](T_ref),

hydrogen bound to chlorine included, as the standards for solid fuels count it.
"""

from collections.abc import Sequence
from dataclasses import dataclass, field
from functools import cache

import numpy as np
from numpy.typing import ArrayLike

from fluegas.errors import Caution, InputError
from fluegas.thermo.mixture import GasSet
from fluegas.thermo.polynomials import FloatArray
from fluegas.thermo.species import atomic_weight
from fluegas.thermo.water import heat_of_evaporation

ELEMENTS = ("C", "H", "O", "N", "S", "Cl", "Ar", "He")
"""Order of the first axis of `Fuel.elements`."""

ALKANES = ("CH4", "C2H6", "C3H8", "n-C4H10", "i-C4H10", "n-C5H12", "i-C5H12", "n-C6H14", "n-C7H16", "n-C8H18")
UNSATURATED = ("C2H4", "C3H6", "1-C4H8", "i-C4H8", "c-2-C4H8", "t-2-C4H8", "C2H2", "C6H6", "C7H8")
OTHER_GASES = (
    "CH3OH",
    "C2H5OH",
    "CH3OCH3",
    "H2",
    "CO",
    "H2S",
    "NH3",
    "COS",
    "CS2",
    "HCN",
    "CO2",
    "N2",
    "O2",
    "Ar",
    "He",
)
FUEL_GASES = (*ALKANES, *UNSATURATED, *OTHER_GASES, "H2O")
"""Gases that a fuel gas may contain, in the order of the first axis of `Fuel.gases`."""

GASEOUS, LIQUID, SOLID = "gas", "liquid", "solid"


@dataclass(frozen=True)
class Fuel:
    """One fuel, or an array of them. State shape `(...)`; every field broadcasts against the others.

    elements: mol/kg of ELEMENTS as fired, shape `(8, ...)`, without the hydrogen and oxygen of the moisture.
    moisture: mol/kg of water as fired. ash: kg/kg.
    gross_heating_value, net_heating_value: J/kg as fired, at `reference_temperature` [K] and constant pressure.
    heat_capacity: J/(kg K) of liquid or solid fuel as fired, moisture included; zero for a gas.
    gases: mol/kg of FUEL_GASES, shape `(35, ...)`; zeros for a liquid or solid.
    cautions: what was doubtful when the fuel was made from its analysis.
    """

    elements: FloatArray = field(metadata={"leading": 1})
    moisture: FloatArray
    ash: FloatArray
    gross_heating_value: FloatArray
    net_heating_value: FloatArray
    heat_capacity: FloatArray
    gases: FloatArray = field(metadata={"leading": 1})
    reference_temperature: float
    cautions: tuple[Caution, ...] = ()

    def element(self, symbol: str) -> FloatArray:
        """Return the amount of one element [mol/kg]."""
        amount: FloatArray = self.elements[ELEMENTS.index(symbol)]
        return amount

    @property
    def theoretical_oxygen(self) -> FloatArray:
        """Oxygen that burns the whole fuel [mol/kg]: n_C + (n_H - n_Cl)/4 + n_S - n_O/2."""
        return self.element("C") + oxygen_of_rest(self)

    def sensible_heat(self, temperature: ArrayLike) -> FloatArray:
        """Return the heat above the reference temperature [J/kg] at `temperature` [K].

        Gases are integrated; liquids and solids have their constant heat capacity.
        """
        t = np.asarray(temperature, dtype=float)
        heat: FloatArray = self.heat_capacity * (t - self.reference_temperature)
        if np.any(self.gases):
            gases = fuel_gases().referenced(self.reference_temperature)
            heat = heat + gases.mixture(self.gases).enthalpy(t)
        return heat


@cache
def fuel_gases() -> GasSet:
    """Return the set of gases that a fuel gas may contain, in the order of FUEL_GASES."""
    return GasSet(FUEL_GASES)


@cache
def atomic_weights() -> FloatArray:
    """Return the atomic weights of ELEMENTS [kg/mol]."""
    return np.array([atomic_weight(element) for element in ELEMENTS])


def oxygen_of_rest(fuel: Fuel) -> FloatArray:
    """Return the oxygen that burns all but the carbon [mol/kg], less the fuel's own."""
    return (fuel.element("H") - fuel.element("Cl")) / 4 + fuel.element("S") - fuel.element("O") / 2


def latent_heat(hydrogen: ArrayLike, moisture: ArrayLike, reference_temperature: float) -> FloatArray:
    """Return gross less net heating value [J/kg] for `hydrogen` atoms and `moisture` [mol/kg]."""
    water = np.asarray(hydrogen, dtype=float) / 2 + np.asarray(moisture, dtype=float)
    latent: FloatArray = water * heat_of_evaporation(reference_temperature)
    return latent


def stack_fuels(fuels: Sequence[Fuel]) -> Fuel:
    """Return one Fuel whose first state axis runs over `fuels`, each of state shape `()`.

    Raises InputError if there is none or if their reference temperatures differ.
    """
    references = {fuel.reference_temperature for fuel in fuels}
    if len(references) != 1:
        raise InputError(f"fuels to be stacked must share one reference temperature, not {sorted(references)}")
    return Fuel(
        elements=np.stack([fuel.elements for fuel in fuels], axis=1),
        moisture=np.array([fuel.moisture for fuel in fuels]),
        ash=np.array([fuel.ash for fuel in fuels]),
        gross_heating_value=np.array([fuel.gross_heating_value for fuel in fuels]),
        net_heating_value=np.array([fuel.net_heating_value for fuel in fuels]),
        heat_capacity=np.array([fuel.heat_capacity for fuel in fuels]),
        gases=np.stack([fuel.gases for fuel in fuels], axis=1),
        reference_temperature=references.pop(),
    )
