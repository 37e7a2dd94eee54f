"""From a scenario to the SI arrays of the account: one column of the arrays for each setting."""

from collections.abc import Callable, Sequence
from dataclasses import dataclass, replace

import numpy as np

from fluegas.accounting.cautions import LIMITS_SOURCE, Limits
from fluegas.accounting.emissions import REFERENCE_OXYGEN
from fluegas.accounting.inputs import GROSS, AccountInput
from fluegas.accounting.ledger import UnitInput
from fluegas.accounting.short_formula import short_formula_constants
from fluegas.accounting.surface import estimated_surface_heat
from fluegas.combustion.fuel import Fuel, stack_fuels
from fluegas.errors import Caution, InputError, Problem, ScenarioError
from fluegas.scenario.air_entry import AirState, air_of, merged_air, stack_air
from fluegas.scenario.fuel_entry import amount_per_mass_of, ash_carbon_of, brings_analysis, state_of
from fluegas.scenario.fuel_state import fuel_state_of, heating_value
from fluegas.scenario.library import with_library
from fluegas.scenario.model import Scenario, Table
from fluegas.scenario.readings_entry import (
    ReadingState,
    mean_of,
    measures_of,
    or_nan,
    readings_of,
    stack_emissions,
    stack_readings,
    stack_recirculation,
)
from fluegas.thermo.polynomials import FloatArray
from fluegas.units import Measure


@dataclass(frozen=True)
class Column:
    """One setting in SI: its fuel, air, readings and what else holds for it alone; NaN where it has none of its own.

    entry, air_entry: the fuel and air entries that hold for it, as written in the file or the fuel library.
    """

    name: str
    fuel: Fuel
    entry: Table
    air_entry: Table
    air: AirState
    readings: ReadingState
    fuel_temperature: float
    biogenic_share: float
    sulfur_trioxide_share: float
    heat_input: float
    condensate: float
    price: float
    currency: str | None
    limits: Limits
    cautions: tuple[Caution, ...]


@dataclass(frozen=True)
class Case:
    """A scenario ready to be worked out: account input and unit of state shape `(n_settings,)`, and each column."""

    data: AccountInput
    unit: UnitInput
    columns: tuple[Column, ...]
    currency: str | None


def case_of(scenario: Scenario) -> Case:
    """Return the arrays of a scenario.

    Raises ScenarioError, all problems at once, for entries that fit their fields but cannot be together: an analysis
    that burns to nothing, air more humid than saturated, a condensate without a fuel rate.
    """
    basis = scenario.top.text("basis") or GROSS
    reference = scenario.top.number("reference_temperature")
    temperature = 298.15 if reference is None else reference
    columns: list[Column] = []
    base = with_library(scenario.fuel)
    problems = _base_fuel_problem(scenario, base, temperature, basis)
    for place in range(len(scenario.settings)):
        try:
            columns.append(_column(scenario, base, place, basis, temperature))
        except InputError as error:
            if str(error) not in [problem.message for problem in problems if problem.key == "fuel"]:
                problems.append(_problem(scenario, place, str(error)))
    if problems:
        raise ScenarioError(tuple(problems))
    try:
        return _assemble(scenario, columns, basis)
    except InputError as error:
        raise ScenarioError((Problem(scenario.name, scenario.line_of(("plant",)), "plant", str(error)),)) from error


def _base_fuel_problem(scenario: Scenario, base: Table, reference_temperature: float, basis: str) -> list[Problem]:
    """Return what is wrong with the file's own fuel, once for all settings that burn it."""
    overrides = [setting.table("fuel") for setting in scenario.settings]
    if all(override is not None and brings_analysis(override) for override in overrides):
        return []
    try:
        ash_carbon_of(base, fuel_state_of(base, None, reference_temperature, basis).fuel)
    except InputError as error:
        return [Problem(scenario.name, scenario.line_of(("fuel",)), "fuel", str(error))]
    return []


def _problem(scenario: Scenario, place: int, message: str) -> Problem:
    name = scenario.settings[place].text("name") or str(place + 1)
    return Problem(scenario.name, scenario.line_of(("setting", place)), f"setting {name!r}", message)


def _column(scenario: Scenario, base: Table, place: int, basis: str, reference_temperature: float) -> Column:
    setting = scenario.settings[place]
    state = fuel_state_of(base, setting.table("fuel"), reference_temperature, basis)
    fuel, entry = state.fuel, state.entry
    air, air_cautions = air_of(scenario.air, setting.table("air"), reference_temperature)
    readings = readings_of(setting, ash_carbon_of(entry, fuel))
    value = heating_value(fuel, basis)
    heat_input = _heat_input(setting, fuel, value)
    if heat_input is None and place == scenario.baseline_index:
        heat_input = _heat_input(scenario.plant, fuel, value)
    own_temperature = entry.number("temperature")
    return Column(
        name=setting.text("name") or f"setting {place + 1}",
        fuel=fuel,
        entry=entry,
        air_entry=merged_air(scenario.air, setting.table("air")),
        air=air,
        readings=readings,
        fuel_temperature=reference_temperature if own_temperature is None else own_temperature,
        biogenic_share=state.biogenic_share,
        sulfur_trioxide_share=state.sulfur_trioxide_share,
        heat_input=or_nan(heat_input),
        condensate=_condensate(setting, heat_input, value),
        price=state.price,
        currency=state.currency,
        limits=_limits(scenario.limits, setting),
        cautions=(*state.cautions, *air_cautions),
    )


def _heat_input(table: Table, fuel: Fuel, value: float) -> float | None:
    heat_input = mean_of(table, "heat_input")
    if not np.isnan(heat_input):
        return heat_input
    rates = [_mass_of(rate, fuel, "fuel_rate") for rate in measures_of(table, "fuel_rate")]
    return float(np.mean(rates)) * value if rates else None


def _mass_of(measure: Measure, fuel: Fuel, key: str) -> float:
    """Return kg (or kg/s) of fuel from a measure by mass or by amount."""
    if not measure.dimension.startswith("amount"):
        return measure.value
    amount_per_mass = amount_per_mass_of(fuel)
    if amount_per_mass is None:
        raise InputError(f"{key} {measure.text!r} is a volume of gas, but the fuel is not a gas; give it by mass")
    return measure.value / amount_per_mass


def _condensate(setting: Table, heat_input: float | None, value: float) -> float:
    flow = mean_of(setting, "condensate")
    if np.isnan(flow):
        return np.nan
    if heat_input is None:
        raise InputError("a measured condensate flow needs the setting's heat_input or fuel_rate beside it")
    return flow * value / heat_input


def _limits(limits: Table, setting: Table) -> Limits:
    default = Limits()
    flag = mean_of(limits, "carbon_monoxide")
    own = mean_of(setting, "metal_temperature")
    metal = limits.number("metal_temperature") if np.isnan(own) else own
    if np.isnan(flag):
        return Limits(metal_temperature=metal)
    return Limits(
        carbon_monoxide_flag=flag,
        carbon_monoxide_act=max(flag, default.carbon_monoxide_act),
        carbon_monoxide_stop=max(flag, default.carbon_monoxide_stop),
        carbon_monoxide_source=f"set in the file; {LIMITS_SOURCE}",
        metal_temperature=metal,
    )


def _reference_oxygen(plant: Table, entry: Table) -> float:
    stated = plant.number("reference_oxygen")
    return REFERENCE_OXYGEN[state_of(entry)] if stated is None else stated


def _assemble(scenario: Scenario, columns: Sequence[Column], basis: str) -> Case:
    plant, baseline = scenario.plant, scenario.baseline_index
    first = columns[baseline]
    surface_share, surface_heat, surface_cautions = _surface(plant, first)
    constants = [short_formula_constants(column.entry.text("kind")) for column in columns]
    other = plant.table("other_losses")
    currency = first.currency

    def along(number: Callable[[Column], float]) -> FloatArray:
        return np.array([number(column) for column in columns], dtype=float)

    data = AccountInput(
        fuel=stack_fuels([column.fuel for column in columns]),
        air=stack_air([column.air for column in columns]),
        readings=stack_readings([column.readings for column in columns]),
        fuel_temperature=along(lambda column: column.fuel_temperature),
        basis=basis,
        other={} if other is None else {name: other.number(name) or 0.0 for name in other.entries},
        condensate=along(lambda column: column.condensate),
        sulfur_trioxide_share=along(lambda column: column.sulfur_trioxide_share),
        short_formula_a=np.array([a for a, _ in constants]),
        short_formula_b=np.array([b for _, b in constants]),
        recirculation=stack_recirculation([column.readings for column in columns]),
        biogenic_share=along(lambda column: column.biogenic_share),
        emissions=stack_emissions([column.readings for column in columns]),
        reference_oxygen=along(lambda column: _reference_oxygen(plant, column.entry)),
        coldest_air=along(lambda column: or_nan(column.air_entry.number("coldest"))),
        hottest_air=along(lambda column: or_nan(column.air_entry.number("hottest"))),
    )
    unit = UnitInput(
        baseline=baseline,
        compared_with=_compared_with(scenario),
        heat_input=along(lambda column: column.heat_input),
        surface_share=surface_share,
        surface_heat=surface_heat,
        rated_output=or_nan(plant.number("rated_output")),
        operating_time=or_nan(plant.number("operating_hours")),
        annual_heat=_annual_heat(plant, first.fuel, basis),
        price=along(lambda column: column.price if column.currency == currency else np.nan),
    )
    noted = tuple(replace(column, cautions=(*column.cautions, *surface_cautions)) for column in columns)
    return Case(data, unit, noted, currency)


def _surface(plant: Table, baseline: Column) -> tuple[float | None, float | None, tuple[Caution, ...]]:
    """Return the baseline's surface loss as a share, or as estimated power, and cautions."""
    if plant.text("surface_loss") == "estimate":
        rated = plant.number("rated_output")
        if rated is None:
            raise InputError('surface_loss = "estimate" needs rated_output, the useful heat at full load')
        entry = baseline.entry
        heat, cautions = estimated_surface_heat(rated, entry.text("kind"), state_of(entry))
        return None, heat, cautions
    return plant.number("surface_loss"), None, ()


def _annual_heat(plant: Table, fuel: Fuel, basis: str) -> float:
    annual = plant.measure("annual_fuel")
    if annual is None:
        return np.nan
    if annual.dimension == "energy":
        return annual.value
    return _mass_of(annual, fuel, "annual_fuel") * heating_value(fuel, basis)


def _compared_with(scenario: Scenario) -> tuple[int, ...]:
    names = [setting.text("name") for setting in scenario.settings]
    places = []
    for place, setting in enumerate(scenario.settings):
        other = setting.text("compare_with")
        places.append(scenario.baseline_index if other is None else names.index(other))
        if place == scenario.baseline_index:
            places[-1] = place
    return tuple(places)
