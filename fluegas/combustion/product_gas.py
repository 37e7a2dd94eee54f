"""From fuel, air and flue readings to the product gas: excess air in closed form and every amount per kg of fuel.

Unknowns are the dry air a and the dry flue gas D [mol/kg fuel]. With the oxygen s that burns what burns, the dry gas k
from the fuel and e = (CO + H2)/2 + 2 CH4 from the dry flue readings, the element balances give

    D (1 - e - H2) = k - s + a                                  (all dry gas)
    O2 D = x a - s + (e - NO/2) D                               (oxygen; x its share in the dry air)
    CO2 D = c - (CO + CH4) D + x_CO2 a                          (carbon; c what burns of it)

Each measured quantity makes them linear in D, so excess air from dry O2, wet O2 or dry CO2 is exact, not iterated.
Sulfur leaves as SO2, fuel nitrogen as N2, chlorine as HCl. The air ratio is x a/s.
"""

from dataclasses import dataclass
from functools import cached_property

import numpy as np

from fluegas.combustion.air import Air, dry_air_amounts
from fluegas.combustion.fuel import Fuel, oxygen_of_rest
from fluegas.errors import RangeError
from fluegas.thermo.mixture import Mixture, gases_above
from fluegas.thermo.polynomials import BoolArray, FloatArray

FLUE_GASES = ("CO2", "CO", "H2", "CH4", "NO", "SO2", "HCl", "N2", "Ar", "He", "O2", "H2O")
"""Gases that the flue may hold, in the order in which tables show them."""
DRY_FLUE_GASES = FLUE_GASES[:-1]

_FROM_FUEL = {"SO2": "S", "HCl": "Cl", "He": "He"}
"""Flue gases of which each molecule holds one atom of an element that only the fuel brings."""

SUPPLY_READINGS = ("o2", "o2_wet", "co2", "excess_air")


@dataclass(frozen=True)
class FlueReadings:
    """Readings of state shape `(...)`; every field broadcasts; gas shares are mole fractions, dry unless named wet.

    flue_temperature: K where the gas leaves the balance boundary.
    o2, o2_wet, co2, excess_air: what the air supply is worked out from. None where not given; where states differ in
    what is given, NaN marks the absent one, and the first given in this order leads.
    co, h2, ch4, no: unburnt gases and nitric oxide; zero where not read. unburned_carbon: share of the fuel's carbon
    that does not burn. chamber_temperature: K where gas leaves the furnace chamber, NaN or None where not given.
    rich_gases_read: true where CO and H2 were both read, so that a fuel-rich gas can be worked out.
    """

    flue_temperature: FloatArray
    o2: FloatArray | None = None
    o2_wet: FloatArray | None = None
    co2: FloatArray | None = None
    excess_air: FloatArray | None = None
    co: FloatArray | float = 0.0
    h2: FloatArray | float = 0.0
    ch4: FloatArray | float = 0.0
    no: FloatArray | float = 0.0
    unburned_carbon: FloatArray | float = 0.0
    chamber_temperature: FloatArray | None = None
    rich_gases_read: BoolArray | bool = False


class ProductGas:
    """What leaves for each kilogram of fuel: amounts in mol/kg, worked out when first asked for.

    Raises RangeError for a share that is negative or not below 1 and, when asked, for O2 at or above the oxidant's
    share and for CO2 below the air's own.
    """

    def __init__(self, fuel: Fuel, air: Air, readings: FlueReadings) -> None:
        self.fuel, self.air, self.readings = fuel, air, readings
        for what, share in (
            ("CO in the flue gas", readings.co),
            ("H2 in the flue gas", readings.h2),
            ("CH4 in the flue gas", readings.ch4),
            ("NO in the flue gas", readings.no),
            ("share of carbon that does not burn", readings.unburned_carbon),
        ):
            low, high = np.min(share, initial=0.0), np.max(share, initial=0.0)
            if low < 0 or high >= 1:
                raise RangeError(what, float(low if low < 0 else high), low=0.0, high=1.0, source="a share of a whole")

    @cached_property
    def burned_carbon(self) -> FloatArray:
        """Carbon that burns, c [mol/kg]."""
        carbon: FloatArray = self.fuel.element("C") * (1 - np.asarray(self.readings.unburned_carbon))
        return carbon

    @cached_property
    def theoretical_oxygen(self) -> FloatArray:
        """Oxygen for what burns, s [mol/kg]."""
        return self.burned_carbon + oxygen_of_rest(self.fuel)

    @cached_property
    def _dry_from_fuel(self) -> FloatArray:
        """Dry gas from the fuel, k [mol/kg]: CO2, SO2, N2, HCl and inert gas."""
        element = self.fuel.element
        gas = self.burned_carbon + element("S") + element("N") / 2 + element("Cl")
        return gas + element("Ar") + element("He")

    @cached_property
    def _oxygen_debt(self) -> FloatArray:
        """Oxygen that the unburnt gases would still take, e, per dry flue gas."""
        r = self.readings
        return np.asarray(0.5 * (np.asarray(r.co) + r.h2) + 2.0 * np.asarray(r.ch4))

    @cached_property
    def _dry_yield(self) -> FloatArray:
        """1 - e - H2: what D is multiplied by in the balance of the dry gas."""
        return np.asarray(1.0 - self._oxygen_debt - self.readings.h2)

    @cached_property
    def water_formed(self) -> FloatArray:
        """Water from the hydrogen that burns [mol/kg], before unburnt H2 and CH4 are taken off."""
        return np.asarray((self.fuel.element("H") - self.fuel.element("Cl")) / 2)

    @cached_property
    def dry_flue_gas(self) -> FloatArray:
        """Dry flue gas, D [mol/kg fuel]."""
        given = [name for name in SUPPLY_READINGS if getattr(self.readings, name) is not None]
        if not given:
            raise RangeError("number of readings that give the excess air", 0, low=1, source="o2, co2 or excess_air")
        amount: FloatArray = _FROM[given[-1]](self, getattr(self.readings, given[-1]))
        for name in reversed(given[:-1]):
            value = getattr(self.readings, name)
            amount = np.where(np.isnan(value), amount, _FROM[name](self, value))
        return amount

    @cached_property
    def dry_air(self) -> FloatArray:
        """Dry air supplied, a [mol/kg fuel]."""
        return np.asarray(self.dry_flue_gas * self._dry_yield + (self.theoretical_oxygen - self._dry_from_fuel))

    @cached_property
    def theoretical_dry_air(self) -> FloatArray:
        """Dry air that just burns what burns [mol/kg fuel]."""
        return np.asarray(self.theoretical_oxygen / self.air.oxygen)

    @cached_property
    def excess_air(self) -> FloatArray:
        """Dry air supplied over the theoretical, less 1."""
        return np.asarray(self.dry_air * (self.air.oxygen / self.theoretical_oxygen) - 1.0)

    @cached_property
    def oxygen_left(self) -> FloatArray:
        """Oxygen in the flue gas [mol/kg]."""
        r = self.readings
        left = self.air.oxygen * self.dry_air - self.theoretical_oxygen
        return np.asarray(left + (self._oxygen_debt - 0.5 * np.asarray(r.no)) * self.dry_flue_gas)

    @cached_property
    def dry_oxygen(self) -> FloatArray:
        """Oxygen in the dry flue gas, mole fraction."""
        return np.asarray(self.oxygen_left / self.dry_flue_gas)

    @cached_property
    def is_unknown(self) -> BoolArray:
        """True where the account cannot be worked out: fuel-rich without CO and H2 readings, or a gas below zero."""
        unknown = (self.excess_air < -1e-9) & ~np.asarray(self.readings.rich_gases_read)
        least = -1e-7 * self.theoretical_oxygen
        unknown = unknown | (self.oxygen_left < least)
        r = self.readings
        if np.any(r.co) or np.any(r.ch4):
            unknown = unknown | (self.amount("CO2") < least)
        if np.any(r.h2) or np.any(r.ch4):
            unknown = unknown | (self.water_from_fuel < least)
        if np.any(r.no):
            unknown = unknown | (self.amount("N2") < least)
        return np.asarray(unknown)

    @cached_property
    def water_from_air(self) -> FloatArray:
        """Water that came with the air [mol/kg]."""
        return np.asarray(self.air.water_ratio * self.dry_air)

    @cached_property
    def water_from_fuel(self) -> FloatArray:
        """Water formed, less what left unburnt, plus the fuel's moisture [mol/kg]."""
        r = self.readings
        burnt = self.water_formed + self.fuel.moisture
        if not (np.any(r.h2) or np.any(r.ch4)):
            return burnt
        return np.asarray(burnt - (np.asarray(r.h2) + 2.0 * np.asarray(r.ch4)) * self.dry_flue_gas)

    @cached_property
    def water(self) -> FloatArray:
        """All water in the flue gas [mol/kg]."""
        return self.water_from_fuel + self.water_from_air

    @cached_property
    def wet_flue_gas(self) -> FloatArray:
        """Wet flue gas [mol/kg fuel]."""
        return self.dry_flue_gas + self.water

    @cached_property
    def dry_amounts(self) -> dict[str, FloatArray]:
        """Amounts of the dry flue gases that can be there [mol/kg fuel], by symbol."""
        r, element, dry = self.readings, self.fuel.element, self.dry_flue_gas
        air = dry_air_amounts(self.dry_air, self.air.oxygen)
        measured = {"CO": r.co, "H2": r.h2, "CH4": r.ch4, "NO": r.no}
        unburnt = {gas: np.asarray(share * dry) for gas, share in measured.items() if np.any(share)}
        carbon_dioxide = self.burned_carbon + air["CO2"]
        nitrogen = element("N") / 2 + air["N2"] if np.any(element("N")) else air["N2"]
        for gas in ("CO", "CH4"):
            if gas in unburnt:
                carbon_dioxide = carbon_dioxide - unburnt[gas]
        if "NO" in unburnt:
            nitrogen = nitrogen - unburnt["NO"] / 2
        from_fuel = {gas: element(symbol) for gas, symbol in _FROM_FUEL.items() if np.any(element(symbol))}
        return {
            "CO2": carbon_dioxide,
            **unburnt,
            **from_fuel,
            "N2": nitrogen,
            "Ar": element("Ar") + air["Ar"] if np.any(element("Ar")) else air["Ar"],
            "O2": self.oxygen_left,
        }

    @cached_property
    def dry_mixture(self) -> Mixture:
        """The dry flue gas per kilogram of fuel, enthalpy counted from the fuel's reference temperature."""
        amounts = self.dry_amounts
        gases = gases_above(tuple(amounts), self.fuel.reference_temperature)
        return gases.mixture(np.stack(np.broadcast_arrays(*amounts.values())))

    def amount(self, gas: str) -> FloatArray:
        """Return the amount of one of FLUE_GASES [mol/kg fuel], zero if there is none."""
        if gas == "H2O":
            return self.water
        return self.dry_amounts.get(gas, np.zeros(()))


def _check_oxygen(share: FloatArray, oxygen: FloatArray | float, what: str) -> None:
    if np.size(oxygen) == 1 and np.max(share, initial=0.0) < oxygen and np.min(share, initial=0.0) >= 0:
        return
    if not np.any(share >= oxygen) and not np.any(share < 0):
        return
    bad = (share >= oxygen) | (share < 0)
    value = float(np.broadcast_to(share, bad.shape)[bad].flat[0])
    limit = float(np.broadcast_to(oxygen, bad.shape)[bad].flat[0])
    raise RangeError(
        what, value, low=0.0, high=limit, source="the oxidant's oxygen share; such a gas holds no flue gas"
    )


def _from_dry_oxygen(gas: ProductGas, share: FloatArray) -> FloatArray:
    x = np.asarray(gas.air.oxygen)
    _check_oxygen(share, x, "O2 in the dry flue gas")
    debt = share + 0.5 * np.asarray(gas.readings.no) - gas._oxygen_debt
    numerator = gas._dry_from_fuel + (1.0 - x) / x * gas.theoretical_oxygen
    return np.asarray(numerator / (gas._dry_yield - debt / x))


def _from_wet_oxygen(gas: ProductGas, share: FloatArray) -> FloatArray:
    x, w = np.asarray(gas.air.oxygen), gas.air.water_ratio
    _check_oxygen(share, x / (1 + w), "O2 in the wet flue gas")
    r, s, k = gas.readings, gas.theoretical_oxygen, gas._dry_from_fuel
    fixed = gas.water_formed + gas.fuel.moisture + w * (s - k)
    numerator = s + x * (k - s) + share * fixed
    wet_per_dry = 1.0 - r.h2 - 2.0 * np.asarray(r.ch4) + w * gas._dry_yield
    denominator = x * gas._dry_yield + gas._oxygen_debt - 0.5 * np.asarray(r.no) - share * wet_per_dry
    return np.asarray(numerator / denominator)


def _from_carbon_dioxide(gas: ProductGas, share: FloatArray) -> FloatArray:
    air_share = dry_air_amounts(1.0, gas.air.oxygen)["CO2"]
    r, s, k = gas.readings, gas.theoretical_oxygen, gas._dry_from_fuel
    numerator = gas.burned_carbon - air_share * (k - s)
    denominator = share + np.asarray(r.co) + r.ch4 - air_share * gas._dry_yield
    if np.any(denominator <= 0):
        limit = float(np.max(air_share))
        raise RangeError(
            "CO2 in the dry flue gas", float(np.min(share)), low=limit, source="the air itself has as much"
        )
    return np.asarray(numerator / denominator)


def _from_excess_air(gas: ProductGas, excess: FloatArray) -> FloatArray:
    s = gas.theoretical_oxygen
    air = (1.0 + excess) * s / gas.air.oxygen
    return np.asarray((gas._dry_from_fuel - s + air) / gas._dry_yield)


_FROM = {
    "o2": _from_dry_oxygen,
    "o2_wet": _from_wet_oxygen,
    "co2": _from_carbon_dioxide,
    "excess_air": _from_excess_air,
}
