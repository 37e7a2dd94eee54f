"""Duty: the heat that the flue gas gives while it cools from one temperature to another, as in an economiser.

Counted per kilogram of fuel from the gas of the account: sensible heat of the whole gas with its water as vapour, and
below the water dew point the heat of what condenses, gas leaving saturated and condensate at the gas temperature.
Duties over adjoining ranges add up. A measured condensate flow holds for the stack alone and is not used here; nor is
air that leaks in between.
"""

from dataclasses import dataclass

import numpy as np
from numpy.typing import ArrayLike

from fluegas.accounting.flue_heat import FlueHeat
from fluegas.accounting.inputs import AccountInput
from fluegas.accounting.terms import Terms
from fluegas.thermo.mixture import Temperature
from fluegas.thermo.polynomials import FloatArray
from fluegas.thermo.species import species


@dataclass(frozen=True)
class Duty:
    """Heat given [J/kg fuel] and condensate [kg/kg fuel], arrays of the states; NaN where there is no account.

    sensible: of the gas, all its water as vapour. condensation: of the water that condenses. Negative if the gas is
    warmed.
    """

    sensible: FloatArray
    condensation: FloatArray
    condensate: FloatArray

    @property
    def total(self) -> FloatArray:
        """All heat given [J/kg fuel]."""
        return self.sensible + self.condensation


def duty(data: AccountInput, start: ArrayLike, end: ArrayLike) -> Duty:
    """Return what the flue gas of each state gives from `start` to `end` [K]; shapes broadcast with the states'.

    Raises RangeError outside 200 to 6000 K, and below 273.15 K where water condenses.
    """
    terms = Terms(data)
    warm, cold = (
        FlueHeat(terms.gas, Temperature(at, f"temperature {which} which the flue gas cools"))
        for at, which in ((start, "from"), (end, "to"))
    )
    with np.errstate(divide="ignore", invalid="ignore"):
        unknown = terms.gas.is_unknown
        drops = [np.where(unknown, 0.0, side.saturation_condensate) for side in (warm, cold)]
        vapour = terms.gas.water * (warm.of_vapour - cold.of_vapour)
        found = Duty(
            sensible=warm.dry_gas - cold.dry_gas + vapour,
            condensation=warm.condensation(drops[0]) - cold.condensation(drops[1]),
            condensate=(drops[1] - drops[0]) * species("H2O").molar_mass,
        )
    shape = np.broadcast_shapes(found.sensible.shape, unknown.shape)
    masked = (np.where(unknown, np.nan, np.broadcast_to(part, shape)) for part in vars(found).values())
    return Duty(*masked)
