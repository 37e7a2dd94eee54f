"""From the air entries of a scenario to the Air of its settings."""

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from fluegas.accounting.cautions import degrees
from fluegas.combustion.air import OXYGEN_IN_AIR, STANDARD_ATMOSPHERE, Air, pressure_at_altitude
from fluegas.errors import Caution
from fluegas.scenario.model import Table
from fluegas.scenario.stacking import along, given_along

HUMIDITY_FORMS = ("relative_humidity", "wet_bulb", "dew_point")
PRESSURE_FORMS = ("pressure", "altitude")
PREHEAT = ("burner_temperature", "preheat_from")


@dataclass(frozen=True)
class AirState:
    """The air of one setting in SI; NaN where a form of humidity or the preheating is not given."""

    temperature: float
    pressure: float
    relative_humidity: float
    wet_bulb: float
    dew_point: float
    oxygen: float
    burner_temperature: float
    preheated_outside: bool


def merged_air(base: Table, override: Table | None) -> Table:
    """Return the air entries that hold for a setting; another form of humidity or pressure replaces the file's."""
    if override is None:
        return base
    entries = dict(base.entries)
    for forms in (HUMIDITY_FORMS, PRESSURE_FORMS):
        if any(key in override.entries for key in forms):
            for key in forms:
                entries.pop(key, None)
    return Table({**entries, **override.entries})


def air_of(base: Table, override: Table | None, reference_temperature: float) -> tuple[AirState, tuple[Caution, ...]]:
    """Return the air of a setting and what was assumed of it.

    Raises RangeError for air more humid than saturated.
    """
    entry = merged_air(base, override)
    cautions: tuple[Caution, ...] = ()
    temperature = entry.number("temperature")
    if temperature is None:
        temperature = reference_temperature
        message = f"no air temperature given: {degrees(temperature)}, the reference temperature, was taken"
        cautions += (Caution("air_temperature_assumed", message, temperature, None, "default of the scenario format"),)
    if not any(entry.number(key) is not None for key in HUMIDITY_FORMS):
        message = "no humidity given: the air was taken as dry"
        cautions += (Caution("air_assumed_dry", message, 0.0, None, "default of the scenario format"),)
    altitude, pressure = entry.number("altitude"), entry.number("pressure")
    if altitude is not None:
        pressure = float(pressure_at_altitude(altitude))

    def given(key: str) -> float:
        value = entry.number(key)
        return np.nan if value is None else value

    oxygen = entry.number("oxygen")
    state = AirState(
        temperature=temperature,
        pressure=STANDARD_ATMOSPHERE if pressure is None else pressure,
        relative_humidity=given("relative_humidity"),
        wet_bulb=given("wet_bulb"),
        dew_point=given("dew_point"),
        oxygen=OXYGEN_IN_AIR if oxygen is None else oxygen,
        burner_temperature=given("burner_temperature"),
        preheated_outside=entry.text("preheat_from") == "outside",
    )
    float(np.max(stack_air([state]).water_ratio))
    return state, cautions


def stack_air(states: Sequence[AirState]) -> Air:
    """Return the Air of several settings, shape `(n,)`."""

    return Air(
        temperature=along(states, lambda state: state.temperature),
        pressure=along(states, lambda state: state.pressure),
        relative_humidity=given_along(states, lambda state: state.relative_humidity),
        wet_bulb=given_along(states, lambda state: state.wet_bulb),
        dew_point=given_along(states, lambda state: state.dew_point),
        oxygen=along(states, lambda state: state.oxygen),
        burner_temperature=given_along(states, lambda state: state.burner_temperature),
        preheated_outside=np.array([state.preheated_outside for state in states]),
    )
