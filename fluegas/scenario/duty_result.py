"""The duty of every setting of a scenario between two temperatures, and what is doubtful about cooling so far."""

from dataclasses import dataclass, replace

import numpy as np

from fluegas.accounting.account import heat_account
from fluegas.accounting.cautions import cautions_of
from fluegas.accounting.duty import Duty, duty
from fluegas.accounting.inputs import GROSS, take
from fluegas.errors import Caution
from fluegas.scenario.result import Result
from fluegas.thermo.polynomials import FloatArray

ABOUT_COOLING = ("below_water_dew_point", "acid_dew_point_gas", "fuel_rich", "fuel_rich_unread", "no_account")
"""Codes of the cautions that matter to a duty."""


@dataclass(frozen=True)
class DutyResult:
    """The duty of every setting from `start` to `end` [K]; `result` is the scenario's, with the duty's cautions."""

    result: Result
    start: float
    end: float
    duty: Duty

    def heating_value(self, basis: str) -> FloatArray:
        """Heating value of each setting's fuel [J/kg] on `basis`."""
        fuel = self.result.case.data.fuel
        return fuel.gross_heating_value if basis == GROSS else fuel.net_heating_value

    def share(self, basis: str) -> FloatArray:
        """Heat given over the heat input on `basis`."""
        return self.duty.total / self.heating_value(basis)

    @property
    def fuel_rate(self) -> FloatArray:
        """Fuel of each setting [kg/s], NaN where its heat input is not known."""
        return self.result.ledger.heat_input / self.heating_value(self.result.case.data.basis)


def duty_of(result: Result, start: float, end: float) -> DutyResult:
    """Return the duty of every setting of a `result` from `start` to `end` [K].

    Raises RangeError outside 200 to 6000 K, and below 273.15 K where water condenses.
    """
    data = result.case.data
    given = duty(data, start, end)
    cooled = replace(data, readings=replace(data.readings, flue_temperature=np.full((), end)), condensate=None)
    account = heat_account(cooled)
    cautions: list[tuple[Caution, ...]] = []
    for place, column in enumerate(result.case.columns):
        figures = {name: float(values[place]) for name, values in account.items()}
        found = cautions_of(take(cooled, 1, 0, slice(place, place + 1)), figures, column.limits)
        cautions.append(tuple(caution for caution in found if caution.code in ABOUT_COOLING))
    return DutyResult(replace(result, cautions=tuple(cautions)), start, end, given)
