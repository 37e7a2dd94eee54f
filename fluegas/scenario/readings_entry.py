"""From a setting's entries to its flue readings in SI. Repeat readings are averaged first."""

from collections.abc import Callable, Sequence
from dataclasses import dataclass

import numpy as np

from fluegas.combustion.flame import Recirculation
from fluegas.combustion.product_gas import FlueReadings
from fluegas.errors import InputError
from fluegas.scenario.model import Table
from fluegas.thermo.polynomials import FloatArray
from fluegas.thermo.species import species

SPECIES = {"o2": "O2", "co2": "CO2", "co": "CO", "h2": "H2", "ch4": "CH4", "no": "NO"}


@dataclass(frozen=True)
class ReadingState:
    """The readings of one setting in SI; NaN where not given."""

    flue_temperature: float
    o2: float
    o2_wet: float
    co2: float
    co2_check: float
    excess_air: float
    co: float
    h2: float
    ch4: float
    no: float
    unburned_carbon: float
    chamber_temperature: float
    recirculated_share: float
    recirculated_temperature: float


def readings_of(setting: Table, ash_carbon: float | None) -> ReadingState:
    """Return the readings of a setting; `ash_carbon` is the share of carbon lost in ash streams, None without.

    O2 leads where CO2 stands beside it, and CO2 becomes a check.

    Raises InputError if there is no flue temperature.
    """
    flue = _mean(setting, "flue_temperature")
    if np.isnan(flue):
        raise InputError("a setting needs its flue_temperature")
    oxygen, carbon_dioxide = _mean(setting, "o2"), _mean(setting, "co2")
    is_wet = setting.text("o2_basis") == "wet"
    leads = not np.isnan(oxygen)
    stated = _mean(setting, "unburned_carbon")
    recirculation = setting.table("recirculation")
    share, temperature = (
        (0.0, np.nan)
        if recirculation is None
        else (recirculation.number("share") or 0.0, recirculation.number("temperature"))
    )
    return ReadingState(
        flue_temperature=flue,
        o2=np.nan if is_wet else oxygen,
        o2_wet=oxygen if is_wet else np.nan,
        co2=np.nan if leads else carbon_dioxide,
        co2_check=carbon_dioxide if leads else np.nan,
        excess_air=_mean(setting, "excess_air"),
        co=_mean(setting, "co"),
        h2=_mean(setting, "h2"),
        ch4=_mean(setting, "ch4"),
        no=_mean(setting, "no"),
        unburned_carbon=stated if ash_carbon is None else ash_carbon,
        chamber_temperature=_mean(setting, "chamber_temperature"),
        recirculated_share=share,
        recirculated_temperature=flue if temperature is None or np.isnan(temperature) else temperature,
    )


def _mean(setting: Table, key: str) -> float:
    """Return the mean of the repeat readings of `key`, else the setting's own value, NaN without either."""
    values = [value for row in setting.rows("readings") if (value := _number(row, key)) is not None]
    if not values:
        value = _number(setting, key)
        return np.nan if value is None else value
    return float(np.mean(values))


def _number(table: Table, key: str) -> float | None:
    measure = table.measure(key)
    if measure is None:
        return None
    if measure.dimension == "mass_concentration":
        return measure.value / species(SPECIES[key]).molar_mass
    return measure.value


def stack_readings(states: Sequence[ReadingState]) -> FlueReadings:
    """Return the FlueReadings of several settings, shape `(n,)`."""

    def along(number: Callable[[ReadingState], float]) -> FloatArray:
        return np.array([number(state) for state in states], dtype=float)

    def form(number: Callable[[ReadingState], float]) -> FloatArray | None:
        values = along(number)
        return None if np.all(np.isnan(values)) else values

    def or_zero(number: Callable[[ReadingState], float]) -> FloatArray:
        return np.nan_to_num(along(number))

    read = [not (np.isnan(state.co) or np.isnan(state.h2)) for state in states]
    return FlueReadings(
        flue_temperature=along(lambda state: state.flue_temperature),
        o2=form(lambda state: state.o2),
        o2_wet=form(lambda state: state.o2_wet),
        co2=form(lambda state: state.co2),
        excess_air=form(lambda state: state.excess_air),
        co=or_zero(lambda state: state.co),
        h2=or_zero(lambda state: state.h2),
        ch4=or_zero(lambda state: state.ch4),
        no=or_zero(lambda state: state.no),
        unburned_carbon=or_zero(lambda state: state.unburned_carbon),
        chamber_temperature=form(lambda state: state.chamber_temperature),
        rich_gases_read=np.array(read),
    )


def stack_recirculation(states: Sequence[ReadingState]) -> Recirculation | None:
    """Return the recirculated gas of several settings, None if there is none."""
    share = np.array([state.recirculated_share for state in states])
    if not np.any(share):
        return None
    return Recirculation(share, np.array([state.recirculated_temperature for state in states]))
