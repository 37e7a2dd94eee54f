"""Air density: what a cold and a hot day make of a setting whose dampers stay where they are.

A fan moves the same volume of air, so the dry air that it brings goes with its partial pressure over temperature:

    a_day/a = [T (1 + w)] / [T_day (1 + w_day)],    w mol of water per mol of dry air.

Fuel, barometric pressure and relative humidity stay as they were. Relative humidity is held rather than the water
ratio: air that cools cannot keep all its water, and hot days are humid; so the hottest day is the leaner one in oxygen.
CO and other unburnt gases are held too, so that a day like the one measured gives back the oxygen that was measured.
"""

from collections.abc import Callable, Mapping
from dataclasses import replace

import numpy as np

from fluegas.accounting.figure import LIMITS, Figure
from fluegas.accounting.inputs import AccountInput
from fluegas.accounting.terms import Terms
from fluegas.combustion.air import Air
from fluegas.combustion.product_gas import ProductGas
from fluegas.errors import Caution
from fluegas.thermo.polynomials import FloatArray
from fluegas.thermo.water import CRITICAL_POINT, saturation_pressure

DAYS = ("coldest", "hottest")
LEAST_OXYGEN = 0.01
"""O2 in the dry gas below which a day gets a caution: common practice, no source."""


def relative_humidity(air: Air) -> FloatArray:
    """Return the relative humidity of the air, whatever form it was given in; zero for dry air."""
    ratio = air.water_ratio
    if not np.any(ratio):
        return np.zeros(())
    saturated = saturation_pressure(np.minimum(air.temperature, CRITICAL_POINT))
    return np.minimum(ratio / (1.0 + ratio) * air.pressure / saturated, 1.0)


def excess_air_on(terms: Terms, day: str) -> FloatArray:
    """Return the excess air on the "coldest" or "hottest" day, NaN where no temperature was given.

    Raises RangeError for a day on which the air could not hold its water at the pressure.
    """
    air = terms.data.air
    then = _temperature(terms.data, day)
    if np.all(np.isnan(then)):
        return np.full((), np.nan)
    at = np.where(np.isnan(then), air.temperature, then)
    humidity = np.asarray(relative_humidity(air))
    water_then = Air(at, air.pressure, relative_humidity=humidity).water_ratio if np.any(humidity) else np.zeros(())
    ratio = air.temperature * (1.0 + air.water_ratio) / (at * (1.0 + water_then))
    excess = (1.0 + terms.gas.excess_air) * ratio - 1.0
    return np.where(np.isnan(then), np.nan, excess)


def oxygen_on(terms: Terms, day: str) -> FloatArray:
    """Return the dry O2 on the "coldest" or "hottest" day; NaN where not given or fuel-rich."""
    excess = excess_air_on(terms, day)
    if np.all(np.isnan(excess)):
        return np.full((), np.nan)
    known = excess > -1e-9
    then = np.where(known, excess, 0.0)
    readings = replace(terms.data.readings, o2=None, o2_wet=None, co2=None, excess_air=then)
    gas = ProductGas(terms.data.fuel, terms.data.air, readings)
    return np.where(known & ~gas.is_unknown, gas.oxygen_left / gas.dry_flue_gas, np.nan)


def _temperature(data: AccountInput, day: str) -> FloatArray:
    return np.asarray(data.coldest_air if day == DAYS[0] else data.hottest_air, dtype=float)


def air_density_figures() -> list[Figure]:
    """Return the figures of both days in the order of tables."""
    source = "element balances; air by the ideal gas law, at constant volume flow and relative humidity"
    what = {"o2": ("O2", "O2 in the dry flue gas", oxygen_on), "excess_air": ("Excess", "Excess air", excess_air_on)}

    def on(day: str, formula: Callable[[Terms, str], FloatArray]) -> Callable[[Terms], FloatArray]:
        return lambda terms: formula(terms, day)

    return [
        Figure(
            f"air_density.{key}_{day}",
            f"{label}, {day} day",
            "fraction",
            LIMITS,
            f"{words} on the {day} day, dampers and fuel as they are.",
            source,
            on(day, formula),
        )
        for key, (label, words, formula) in what.items()
        for day in DAYS
    ]


def air_density_cautions(data: AccountInput, figures: Mapping[str, float]) -> tuple[Caution, ...]:
    """Return what the days do to one setting: `data` of one state, its `figures` by name."""
    found = []
    for day in DAYS:
        excess, oxygen = figures[f"air_density.excess_air_{day}"], figures[f"air_density.o2_{day}"]
        celsius = float(_temperature(data, day).flat[0]) - 273.15
        when = f"on the {day} day ({celsius:.0f} degC, {celsius * 1.8 + 32:.0f} degF), with dampers as they are,"
        if excess < -1e-9:
            message = (
                f"{when} the firing would be fuel-rich, at an air ratio of {1 + excess:.3g}: CO is deadly and may burn "
                "later. Licensed persons only; local codes and the maker's instructions lead"
            )
            found.append(Caution("air_density_rich", message, 1 + excess, 1.0, "element balances"))
        elif oxygen < LEAST_OXYGEN:
            message = (
                f"{when} {100 * oxygen:.2g} % O2 would be left, under {100 * LEAST_OXYGEN:g} %: little stands between "
                "that and CO; settle it with a licensed person, over the whole load range"
            )
            found.append(Caution("air_density_oxygen", message, oxygen, LEAST_OXYGEN, "common practice, no source"))
    return tuple(found)
