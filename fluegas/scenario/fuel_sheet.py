"""Fuels by themselves: one of the library, or those of a scenario file, each with its figures and cautions."""

from collections.abc import Mapping
from dataclasses import dataclass

import numpy as np

from fluegas.accounting.fuel_figures import fuel_figures
from fluegas.accounting.inputs import GROSS
from fluegas.combustion.compression_factor import LOWEST_FACTOR, gases_without_factor
from fluegas.combustion.fuel import ELEMENTS, FUEL_GASES, Fuel, atomic_weights
from fluegas.combustion.solid_fuel import SOLID_ELEMENTS
from fluegas.errors import Caution
from fluegas.scenario.case import case_of
from fluegas.scenario.fuel_entry import state_of
from fluegas.scenario.fuel_state import fuel_state_of
from fluegas.scenario.library import known_name, library_fuel, origin_of
from fluegas.scenario.model import Scenario, Table
from fluegas.thermo.polynomials import FloatArray
from fluegas.thermo.species import species


@dataclass(frozen=True)
class FuelSheet:
    """One fuel: the entries that hold for it, its figures by name, and the settings of the file that burn it.

    library: its name there, None for a fuel of the file's own; origin: where the library's analysis comes from, "" for
    another one. state: gas, liquid or solid.
    """

    fuel: Fuel
    entry: Table
    state: str
    biogenic_share: float
    figures: Mapping[str, FloatArray]
    cautions: tuple[Caution, ...]
    settings: tuple[str, ...] = ()
    library: str | None = None
    origin: str = ""

    @property
    def name(self) -> str:
        """The fuel's name, "fuel" if it has none."""
        return self.entry.text("name") or "fuel"


def library_sheet(name: str, reference_temperature: float = 298.15) -> FuelSheet:
    """Return the sheet of a fuel of the library, heating values at `reference_temperature` [K].

    Raises InputError for a name that the library does not have.
    """
    found = library_fuel(name)
    state = fuel_state_of(found.entry, None, reference_temperature, GROSS)
    return _sheet(state.fuel, found.entry, state.biogenic_share, (), found.name, found.origin)


def scenario_sheets(scenario: Scenario) -> tuple[FuelSheet, ...]:
    """Return a sheet for each fuel of a scenario: the baseline's first, then those of settings that burn another one.

    Raises ScenarioError as `case_of` does.
    """
    case = case_of(scenario)
    baseline = case.unit.baseline
    order = [baseline, *(place for place in range(len(case.columns)) if place != baseline)]
    groups: list[list[int]] = []
    for place in order:
        column = case.columns[place]
        for group in groups:
            first = case.columns[group[0]]
            if first.biogenic_share == column.biogenic_share and _are_same(first.fuel, column.fuel):
                group.append(place)
                break
        else:
            groups.append([place])
    sheets = []
    for group in groups:
        column = case.columns[group[0]]
        names = tuple(case.columns[place].name for place in sorted(group))
        origin = origin_of(column.entry) or ""
        library = known_name(column.entry.text("library") or "") if origin else None
        sheets.append(_sheet(column.fuel, column.entry, column.biogenic_share, names, library, origin))
    return tuple(sheets)


def _are_same(one: Fuel, other: Fuel) -> bool:
    fields = ("elements", "gases", "moisture", "ash", "gross_heating_value", "heat_capacity")
    return all(np.array_equal(getattr(one, name), getattr(other, name)) for name in fields)


def composition(fuel: Fuel) -> dict[str, dict[str, float]]:
    """Return what a fuel of state shape `()` consists of, as fractions of what is fired, by plain names.

    Under "mole" the gases of one that is wholly a gas, else under "mass" the elements, moisture and ash.
    """
    total = float(fuel.gases.sum())
    if total > 0 and not float(fuel.heat_capacity) > 0:
        shares = zip(FUEL_GASES, fuel.gases, strict=True)
        return {"mole": {species(gas).name: float(amount) / total for gas, amount in shares if amount > 0}}
    names = {symbol: name for name, symbol in SOLID_ELEMENTS.items()} | {"Ar": "argon", "He": "helium"}
    weights = zip(ELEMENTS, fuel.elements, atomic_weights(), strict=True)
    parts = {names[symbol]: float(amount * weight) for symbol, amount, weight in weights}
    parts |= {"moisture": float(fuel.moisture) * species("H2O").molar_mass, "ash": float(fuel.ash)}
    return {"mass": {name: share for name, share in parts.items() if share > 0}}


def _sheet(
    fuel: Fuel, entry: Table, biogenic_share: float, settings: tuple[str, ...], library: str | None, origin: str
) -> FuelSheet:
    figures = fuel_figures(fuel, biogenic_share)
    return FuelSheet(
        fuel=fuel,
        entry=entry,
        state=state_of(entry),
        biogenic_share=biogenic_share,
        figures=figures,
        cautions=(*fuel.cautions, *_real_gas_cautions(fuel, figures)),
        settings=settings,
        library=library,
        origin=origin,
    )


def _real_gas_cautions(fuel: Fuel, figures: Mapping[str, FloatArray]) -> tuple[Caution, ...]:
    """Return why a gas has no figures as a real gas, or why they are doubtful."""
    if np.isnan(figures["molar.gross_heating_value"]):
        return ()
    missing = gases_without_factor(fuel.gases)
    if missing:
        names = ", ".join(species(gas).name for gas in missing)
        message = f"{names} has no summation factor: density, Wobbe index and heat of a real cubic metre are not given"
        return (Caution("compression_factor_missing", message, None, None, "ISO 6976:2016"),)
    factor = min(float(value) for name, value in figures.items() if name.endswith(".compression_factor"))
    if factor >= LOWEST_FACTOR:
        return ()
    message = (
        f"the compression factor is down to {factor:.3g}; below {LOWEST_FACTOR:g} the method does not hold, and the "
        "gas may be partly liquid"
    )
    return (Caution("compression_factor_low", message, factor, LOWEST_FACTOR, "ISO 6976:2016, range from memory"),)
