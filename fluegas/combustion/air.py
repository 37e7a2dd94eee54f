"""Combustion air: composition, humidity and the temperatures at which it enters.

Dry air by mole: O2 0.2095, N2 0.7808, Ar 0.0093, CO2 0.0004. Another oxygen share scales the rest. Humidity is
w = p_w/(p - p_w) mol of water per mol of dry air, ideal gas, with the saturation pressure at the air temperature.
"""

from dataclasses import dataclass
from functools import cached_property

import numpy as np
from numpy.typing import ArrayLike

from fluegas.errors import RangeError
from fluegas.thermo.mixture import GasSet
from fluegas.thermo.polynomials import BoolArray, FloatArray
from fluegas.thermo.species import species
from fluegas.thermo.water import TRIPLE_POINT, liquid_enthalpy, saturation_pressure, vapour_enthalpy

STANDARD_ATMOSPHERE = 101_325.0
OXYGEN_IN_AIR = 0.2095
REST_OF_AIR = {"N2": 0.7808, "Ar": 0.0093, "CO2": 0.0004}
"""Mole fractions of dry air beside oxygen; with oxygen they sum to 1."""
DRY_AIR_GASES = ("O2", *REST_OF_AIR)


def pressure_at_altitude(altitude: ArrayLike) -> FloatArray:
    """Return the pressure [Pa] of the ICAO standard atmosphere (ISO 2533) at `altitude` [m] above the sea.

    Raises RangeError outside -500 to 11,000 m.
    """
    z = np.asarray(altitude, dtype=float)
    for extreme in (float(np.min(z)), float(np.max(z))):
        if not -500 <= extreme <= 11_000:
            raise RangeError("altitude", extreme, -500, 11_000, unit="m", source="ISO 2533, lowest layer")
    pressure: FloatArray = STANDARD_ATMOSPHERE * (1 - 0.0065 * z / 288.15) ** 5.25588
    return pressure


def dry_air_amounts(dry_air: ArrayLike = 1.0, oxygen: ArrayLike = OXYGEN_IN_AIR) -> dict[str, FloatArray]:
    """Return the amounts of DRY_AIR_GASES in `dry_air` [mol] with an `oxygen` share; shapes broadcast."""
    total, x = np.asarray(dry_air, dtype=float), np.asarray(oxygen, dtype=float)
    rest = (1 - x) / (1 - OXYGEN_IN_AIR)
    return {
        "O2": np.asarray(total * x),
        **{gas: np.asarray(total * (share * rest)) for gas, share in REST_OF_AIR.items()},
    }


def dry_air_molar_mass(oxygen: ArrayLike = OXYGEN_IN_AIR) -> FloatArray:
    """Return the molar mass of the dry oxidant [kg/mol]."""
    amounts = dry_air_amounts(1.0, oxygen)
    mass: FloatArray = np.asarray(sum(species(gas).molar_mass * amount for gas, amount in amounts.items()))
    return mass


@dataclass(frozen=True)
class Air:
    """Combustion air of state shape `(...)`; every field broadcasts.

    temperature: K, where humidity is measured. pressure: Pa, absolute.
    relative_humidity (fraction), wet_bulb [K], dew_point [K]: one of them; None or NaN where it is not the one given;
    all missing is dry air. oxygen: mole fraction in the dry oxidant.
    burner_temperature: K at the burner, None or NaN where the air is not preheated. preheated_outside: true where the
    heat of preheating comes from outside the unit, so that the air enters the balance at the burner temperature.
    """

    temperature: FloatArray
    pressure: FloatArray
    relative_humidity: FloatArray | None = None
    wet_bulb: FloatArray | None = None
    dew_point: FloatArray | None = None
    oxygen: FloatArray | float = OXYGEN_IN_AIR
    burner_temperature: FloatArray | None = None
    preheated_outside: BoolArray | bool = False

    @cached_property
    def water_ratio(self) -> FloatArray:
        """Water per dry air [mol/mol]. Raises RangeError if the air would hold more than saturates it."""
        ratio: FloatArray = np.zeros(())
        forms = (
            (self.relative_humidity, _from_relative),
            (self.wet_bulb, _from_wet_bulb),
            (self.dew_point, _from_dew_point),
        )
        for given, ratio_from in forms:
            if given is not None:
                absent = np.isnan(given)
                ratio = np.where(absent, ratio, ratio_from(self, given)) if np.any(absent) else ratio_from(self, given)
        return ratio

    @cached_property
    def at_burner(self) -> FloatArray:
        """Temperature of the air at the burner [K]."""
        if self.burner_temperature is None:
            return self.temperature
        return np.where(np.isnan(self.burner_temperature), self.temperature, self.burner_temperature)

    @cached_property
    def at_boundary(self) -> FloatArray:
        """Temperature at which the air crosses the balance boundary [K]."""
        if not np.any(self.preheated_outside):
            return self.temperature
        return np.where(self.preheated_outside, self.at_burner, self.temperature)


def _ratio(vapour_pressure: FloatArray, pressure: FloatArray) -> FloatArray:
    if np.any(vapour_pressure >= 0.9 * pressure):
        worst = float(
            np.max(np.broadcast_to(vapour_pressure / pressure, np.broadcast(vapour_pressure, pressure).shape))
        )
        raise RangeError("partial pressure of water over that of the air", worst, 0.0, 0.9)
    return vapour_pressure / (pressure - vapour_pressure)


def _from_relative(air: Air, humidity: FloatArray) -> FloatArray:
    low, high = np.min(humidity, initial=0.0), np.max(humidity, initial=0.0)
    if low >= 0 and high <= 1:
        return _ratio(humidity * saturation_pressure(air.temperature), air.pressure)
    outside = (humidity < 0) | (humidity > 1)
    if np.any(outside):
        raise RangeError("relative humidity", float(np.asarray(humidity)[outside].flat[0]), 0.0, 1.0)
    missing = np.isnan(humidity)
    temperature = np.where(missing, TRIPLE_POINT, air.temperature)
    return _ratio(np.where(missing, 0.0, humidity) * saturation_pressure(temperature), air.pressure)


def _from_dew_point(air: Air, dew_point: FloatArray) -> FloatArray:
    point = np.where(np.isnan(dew_point), np.minimum(air.temperature, TRIPLE_POINT), dew_point)
    _not_above_air(point, air, "dew point of the air")
    return _ratio(saturation_pressure(point), air.pressure)


def _from_wet_bulb(air: Air, wet_bulb: FloatArray) -> FloatArray:
    """Adiabatic saturation: air and its vapour at T, plus the water taken up at T_wb, leave saturated at T_wb."""
    missing = np.isnan(wet_bulb)
    bulb = np.where(missing, TRIPLE_POINT, wet_bulb)
    if not np.all(bulb >= TRIPLE_POINT):
        raise RangeError(
            "wet-bulb temperature",
            float(np.min(bulb)),
            low=TRIPLE_POINT,
            unit="K",
            source="an iced bulb reads otherwise",
        )
    _not_above_air(np.where(missing, air.temperature, wet_bulb), air, "wet-bulb temperature")
    saturated = _ratio(saturation_pressure(bulb), air.pressure)
    dry = GasSet(DRY_AIR_GASES).mixture(np.stack(list(dry_air_amounts(1.0, air.oxygen).values())))
    water = liquid_enthalpy(bulb)
    taken = saturated * (vapour_enthalpy(bulb) - water) - dry.enthalpy_change(bulb, air.temperature)
    ratio: FloatArray = taken / (vapour_enthalpy(air.temperature) - water)
    if not np.all(missing | (ratio >= 0)):
        least = float(np.min(np.where(missing, np.inf, ratio)))
        raise RangeError("humidity ratio from the wet bulb [mol/mol]", least, low=0.0)
    return ratio


def _not_above_air(point: FloatArray, air: Air, what: str) -> None:
    excess = np.asarray(point - air.temperature)
    if not np.all(excess <= 1e-9):
        place = np.argmax(excess)
        shape = excess.shape
        value = float(np.broadcast_to(point, shape).flat[place])
        raise RangeError(what, value, high=float(np.broadcast_to(air.temperature, shape).flat[place]), unit="K")
