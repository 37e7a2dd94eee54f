"""From a setting's entries to its flue readings in SI. Repeat readings are averaged first."""

from collections.abc import Callable, Sequence
from dataclasses import dataclass

import numpy as np

from fluegas.accounting.inputs import EmissionReadings
from fluegas.combustion.flame import Recirculation
from fluegas.combustion.product_gas import FlueReadings
from fluegas.errors import InputError
from fluegas.scenario.model import Table
from fluegas.scenario.stacking import along, given_along
from fluegas.thermo.polynomials import FloatArray
from fluegas.thermo.species import species
from fluegas.units import Measure

SPECIES = {
    "o2": "O2",
    "co2": "CO2",
    "co": "CO",
    "h2": "H2",
    "ch4": "CH4",
    "no": "NO",
    "no2": "NO2",
    "nox": "NO2",
    "so2": "SO2",
    "carbon_monoxide": "CO",
}


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
    no2: float
    nox: float
    so2: float
    unburned_carbon: float
    chamber_temperature: float
    recirculated_share: float
    recirculated_temperature: float


def readings_of(setting: Table, ash_carbon: float | None) -> ReadingState:
    """Return the readings of a setting; `ash_carbon` is the share of carbon lost in ash streams, None without.

    O2 leads where CO2 stands beside it, and CO2 becomes a check.

    Raises InputError if there is no flue temperature.
    """
    flue = mean_of(setting, "flue_temperature")
    if np.isnan(flue):
        raise InputError("a setting needs its flue_temperature")
    oxygen, carbon_dioxide = mean_of(setting, "o2"), mean_of(setting, "co2")
    is_wet = setting.text("o2_basis") == "wet"
    leads = not np.isnan(oxygen)
    stated = mean_of(setting, "unburned_carbon")
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
        excess_air=mean_of(setting, "excess_air"),
        co=mean_of(setting, "co"),
        h2=mean_of(setting, "h2"),
        ch4=mean_of(setting, "ch4"),
        no=mean_of(setting, "no"),
        no2=mean_of(setting, "no2"),
        nox=mean_of(setting, "nox"),
        so2=mean_of(setting, "so2"),
        unburned_carbon=stated if ash_carbon is None else ash_carbon,
        chamber_temperature=mean_of(setting, "chamber_temperature"),
        recirculated_share=share,
        recirculated_temperature=flue if temperature is None or np.isnan(temperature) else temperature,
    )


def mean_of(setting: Table, key: str) -> float:
    """Return the mean of the repeat readings of `key`, else the setting's own value, NaN without either."""
    values = [_number(measure, key) for measure in measures_of(setting, key)]
    return float(np.mean(values)) if values else np.nan


def or_nan(value: float | None) -> float:
    """Return `value`, NaN where it was not given."""
    return np.nan if value is None else value


def measures_of(setting: Table, key: str) -> tuple[Measure, ...]:
    """Return the repeat readings of `key`, else the setting's own, nothing without either."""
    repeats = [row.measure(key) for row in setting.rows("readings")]
    found = [measure for measure in repeats if measure is not None]
    own = setting.measure(key)
    return tuple(found) if found or own is None else (own,)


def _number(measure: Measure, key: str) -> float:
    if measure.dimension == "mass_concentration":
        return measure.value / species(SPECIES[key]).molar_mass
    return measure.value


def stack_readings(states: Sequence[ReadingState]) -> FlueReadings:
    """Return the FlueReadings of several settings, shape `(n,)`."""

    def or_zero(number: Callable[[ReadingState], float]) -> FloatArray:
        return np.nan_to_num(along(states, number))

    read = [not (np.isnan(state.co) or np.isnan(state.h2)) for state in states]
    return FlueReadings(
        flue_temperature=along(states, lambda state: state.flue_temperature),
        o2=given_along(states, lambda state: state.o2),
        o2_wet=given_along(states, lambda state: state.o2_wet),
        co2=given_along(states, lambda state: state.co2),
        excess_air=given_along(states, lambda state: state.excess_air),
        co=or_zero(lambda state: state.co),
        h2=or_zero(lambda state: state.h2),
        ch4=or_zero(lambda state: state.ch4),
        no=or_zero(lambda state: state.no),
        unburned_carbon=or_zero(lambda state: state.unburned_carbon),
        chamber_temperature=given_along(states, lambda state: state.chamber_temperature),
        rich_gases_read=np.array(read),
    )


def stack_emissions(states: Sequence[ReadingState]) -> EmissionReadings:
    """Return the readings of several settings that only emissions need, shape `(n,)`."""
    return EmissionReadings(
        no2=np.array([state.no2 for state in states]),
        nox=np.array([state.nox for state in states]),
        so2=np.array([state.so2 for state in states]),
        co_read=np.array([not np.isnan(state.co) for state in states]),
        no_read=np.array([not np.isnan(state.no) for state in states]),
    )


def stack_recirculation(states: Sequence[ReadingState]) -> Recirculation | None:
    """Return the recirculated gas of several settings, None if there is none."""
    share = np.array([state.recirculated_share for state in states])
    if not np.any(share):
        return None
    return Recirculation(share, np.array([state.recirculated_temperature for state in states]))
