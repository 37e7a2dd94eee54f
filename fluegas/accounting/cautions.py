"""What is doubtful about a setting's account, as data: codes, values, limits and where the limits come from.

Cautions never change a figure. Those on carbon monoxide, fuel-rich firing and condensate say what the usual safe
practice is and defer to local codes, the maker's instructions and licensed persons.
"""

from collections.abc import Mapping
from dataclasses import dataclass

import numpy as np

from fluegas.accounting.air_density import air_density_cautions
from fluegas.accounting.emissions import emission_cautions
from fluegas.accounting.inputs import AccountInput
from fluegas.combustion.dew_point import ACID_DOUBT
from fluegas.errors import Caution
from fluegas.thermo.polynomials import FloatArray

IDEAL_GAS_PRESSURE, IDEAL_GAS_TEMPERATURE = 3e5, 450.0
COLDEST_CHECKED = 220.0
LIMITS_SOURCE = "DVGW G 680 for 300 and 1000 ppm; common practice elsewhere"
"""Source of the default limits of carbon monoxide."""


@dataclass(frozen=True)
class Limits:
    """Limits of one setting: carbon monoxide in the undiluted dry gas (mole fractions) and the coldest metal [K]."""

    carbon_monoxide_flag: float = 100e-6
    carbon_monoxide_act: float = 300e-6
    carbon_monoxide_stop: float = 1000e-6
    carbon_monoxide_source: str = LIMITS_SOURCE
    metal_temperature: float | None = None


def cautions_of(data: AccountInput, figures: Mapping[str, float], limits: Limits) -> tuple[Caution, ...]:
    """Return the cautions about one setting: `data` of one state, its `figures` by name."""
    return (
        *data.fuel.cautions,
        *_fuel_rich(data, figures),
        *_no_account(figures),
        *_carbon_monoxide(data, figures, limits),
        *air_density_cautions(data, figures),
        *_water(data, figures),
        *_acid(data, figures, limits),
        *emission_cautions(data, figures),
        *_validity(data, figures),
    )


def degrees(kelvin: float, decimals: int = 0) -> str:
    """Return a temperature [K] for a message, in both units that people read."""
    celsius = kelvin - 273.15
    return f"{celsius:.{decimals}f} degC ({celsius * 1.8 + 32:.{decimals}f} degF)"


def _number(value: FloatArray | float) -> float:
    return float(np.asarray(value).flat[0])


def _fuel_rich(data: AccountInput, figures: Mapping[str, float]) -> tuple[Caution, ...]:
    air_ratio = figures["air_ratio"]
    if not air_ratio < 1 - 1e-9:
        return ()
    known = not np.isnan(figures["efficiency.gross"])
    account = (
        "the account counts the CO and H2 that were read"
        if known
        else "no account can be given without readings of CO and H2 that fit"
    )
    message = (
        f"fuel-rich: the air ratio is {air_ratio:.3g}; {account}. CO is deadly and may burn later: fuel is reduced "
        "first, air is never added to a fuel-rich hot chamber. Licensed persons only; local codes and the maker's "
        "instructions lead"
    )
    code = "fuel_rich" if known else "fuel_rich_unread"
    return (Caution(code, message, air_ratio, 1.0, "common practice, no source"),)


def _no_account(figures: Mapping[str, float]) -> tuple[Caution, ...]:
    air_ratio = figures["air_ratio"]
    if not np.isnan(figures["efficiency.gross"]) or air_ratio < 1 - 1e-9:
        return ()
    if np.isnan(air_ratio):
        message = "no account can be given: no reading tells the excess air; give O2, CO2 or the excess air itself"
        return (Caution("no_account", message, None, None, "element balances"),)
    message = (
        "no account can be given: with these readings the fuel and the air would have to leave less than nothing of a "
        "gas; O2, CO, H2, CH4, NO or the fuel analysis cannot be right"
    )
    return (Caution("no_account", message, air_ratio, 1.0, "element balances"),)


def _carbon_monoxide(data: AccountInput, figures: Mapping[str, float], limits: Limits) -> tuple[Caution, ...]:
    share, oxygen = _number(data.readings.co), figures["flue_gas.dry.O2"]
    if not share > 0:
        return ()
    if np.isnan(oxygen):  # no account: what was read, undiluted as a fuel-rich gas is
        oxygen = 0.0
    in_air = _number(data.air.oxygen)
    undiluted = share * in_air / (in_air - oxygen)
    steps = (
        (
            limits.carbon_monoxide_stop,
            "carbon_monoxide_stop",
            "far above the usual limit: exhaust CO kills; usually it is shut down at once and a licensed person called",
        ),
        (
            limits.carbon_monoxide_act,
            "carbon_monoxide_act",
            "above the level at which combustion is put right before anything else, by licensed persons",
        ),
        (
            limits.carbon_monoxide_flag,
            "carbon_monoxide_flag",
            "higher than a sound flame gives; check the readings and the burner's condition over the whole load range",
        ),
    )
    for limit, code, meaning in steps:
        if undiluted > limit:
            message = (
                f"CO is {undiluted * 1e6:.0f} ppm undiluted (air-free, dry), limit {limit * 1e6:.0f} ppm: {meaning}"
            )
            return (Caution(code, message, undiluted, limit, limits.carbon_monoxide_source),)
    return ()


def _water(data: AccountInput, figures: Mapping[str, float]) -> tuple[Caution, ...]:
    dew_point, flue = figures["dew_point.water"], _number(data.readings.flue_temperature)
    if np.isnan(dew_point):
        return ()
    if flue >= dew_point:
        if data.condensate is None or not _number(data.condensate) > 0:
            return ()
        message = (
            f"condensate was measured, but the flue gas leaves at {degrees(flue, 1)}, above its water dew point of "
            f"{degrees(dew_point, 1)}: it condensed on colder walls, or a reading is wrong"
        )
        return (Caution("condensate_above_dew_point", message, flue, dew_point, "IAPWS R7-97"),)
    message = (
        f"the flue gas leaves at {degrees(flue, 1)}, below its water dew point of {degrees(dew_point, 1)}: "
        "condense only in units, drains and chimneys built for acid condensate"
    )
    return (Caution("below_water_dew_point", message, flue, dew_point, "IAPWS R7-97"),)


def _acid(data: AccountInput, figures: Mapping[str, float], limits: Limits) -> tuple[Caution, ...]:
    dew_point = figures["dew_point.acid"]
    if np.isnan(dew_point):
        return ()
    limit = dew_point + ACID_DOUBT
    places = [("the flue gas", _number(data.readings.flue_temperature), "acid_dew_point_gas")]
    if limits.metal_temperature is not None:
        places.append(("the coldest metal", limits.metal_temperature, "acid_dew_point_metal"))
    found = []
    for what, temperature, code in places:
        if temperature < limit:
            message = (
                f"{what} is at {degrees(temperature)}, not clear of the acid dew point of "
                f"{degrees(dew_point)} +-5 K: sulfuric acid may condense and corrode; gas above it does not "
                "mean metal above it"
            )
            found.append(Caution(code, message, temperature, limit, data.acid_correlation))
    return tuple(found)


def _validity(data: AccountInput, figures: Mapping[str, float]) -> tuple[Caution, ...]:
    found = []
    pressure, flue = _number(data.air.pressure), _number(data.readings.flue_temperature)
    if pressure > IDEAL_GAS_PRESSURE and flue < IDEAL_GAS_TEMPERATURE:
        message = f"at {pressure / 1e5:.3g} bar and {degrees(flue)} the flue gas departs from an ideal gas"
        found.append(
            Caution("ideal_gas", message, pressure, IDEAL_GAS_PRESSURE, "enthalpy departures of a flue gas, CoolProp")
        )
    air = _number(data.air.temperature)
    if flue < air:
        message = (
            f"the flue gas, {degrees(flue, 1)}, is colder than the combustion air, {degrees(air, 1)}: one of the "
            "readings cannot be right, or something from outside cools the gas"
        )
        found.append(Caution("flue_colder_than_air", message, flue, air, "energy balance"))
    coldest = min(flue, _number(data.air.temperature), _number(data.fuel_temperature))
    if coldest < COLDEST_CHECKED:
        message = f"at {degrees(coldest)} the species data are extrapolated below what was checked"
        found.append(Caution("cold_data", message, coldest, COLDEST_CHECKED, "NASA/TP-2002-211556 against CoolProp"))
    efficiency = figures["efficiency.gross"]
    if efficiency <= 0:
        message = (
            f"the losses exceed the heat input (useful heat {100 * efficiency:.1f} %): the readings cannot all be right"
        )
        found.append(Caution("no_useful_heat", message, efficiency, 0.0, "energy balance"))
    return tuple(found)
