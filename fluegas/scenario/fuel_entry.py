"""From the fuel entries of a scenario to a Fuel: analysis, basis, heating value, moisture, ash streams.

A setting may change the fuel. An override with an analysis, a library fuel or parts of its own is another fuel, and
nothing of the file's fuel holds for it; one with moisture alone wets the same dry fuel anew; other keys replace those
of the file. Entries of the library lie beneath all of them.
"""

import numpy as np

from fluegas.combustion.fuel import GASEOUS, LIQUID, SOLID, Fuel, fuel_gases
from fluegas.combustion.gas_fuel import gas_amounts, gas_fuel
from fluegas.combustion.solid_fuel import AS_FIRED, solid_fuel, unburned_carbon_share, with_moisture
from fluegas.errors import InputError
from fluegas.scenario.library import has_own_analysis, with_library
from fluegas.scenario.model import Table
from fluegas.units import Measure

SULFUR_TRIOXIDE_SHARE = {LIQUID: 0.02, SOLID: 0.01, GASEOUS: 0.02}
"""SO3 over SO2 where none is given: 2 % oil, 1 % coal (common practice, no source); a gas takes the larger."""


def merged_fuel(base: Table, override: Table | None) -> Table:
    """Return the fuel entries that hold for a setting; `base` already has the library beneath it.

    Raises InputError for a name that the library does not have.
    """
    if override is None:
        return base
    if brings_analysis(override):
        return with_library(override)
    entries = {**base.entries, **{key: value for key, value in override.entries.items() if key != "mass_percent"}}
    if "gross_heating_value" in override.entries or "net_heating_value" in override.entries:
        for key in ("gross_heating_value", "net_heating_value"):
            if key not in override.entries:
                entries.pop(key, None)
    return Table(entries)


def brings_analysis(override: Table) -> bool:
    """Return whether an override is another fuel: with a library name, parts or an analysis that is more than wet."""
    return "library" in override.entries or "part" in override.entries or has_own_analysis(override)


def state_of(entry: Table) -> str:
    """Return "gas", "liquid" or "solid": as stated, else gas for an analysis in mole percent.

    Of a blend it is the state of the part with the largest share.
    """
    parts = entry.rows("part")
    if parts:
        return state_of(max(parts, key=lambda part: part.number("share") or 0.0))
    return entry.text("state") or (GASEOUS if entry.table("mole_percent") is not None else SOLID)


def is_wholly_gas(entry: Table) -> bool:
    """Return whether a fuel, or every part of a blend, is a gas."""
    return all(part.table("mole_percent") is not None for part in entry.rows("part") or (entry,))


def single_fuel(base: Table, override: Table | None, reference_temperature: float) -> Fuel:
    """Return the Fuel of a setting that burns one fuel and no blend; `base` already has the library beneath it.

    Raises AnalysisError for an analysis that cannot be, InputError for a heating value whose unit does not fit.
    """
    entry = merged_fuel(base, override)
    if state_of(entry) == GASEOUS:
        return _gas(entry, reference_temperature)
    fuel = _solid_or_liquid(entry, reference_temperature)
    mass = None if override is None or brings_analysis(override) else override.table("mass_percent")
    return fuel if mass is None else with_moisture(fuel, _share(mass, "moisture"))


def _share(table: Table, key: str) -> float:
    value = table.number(key)
    return 0.0 if value is None else value / 100.0


def _gas(entry: Table, reference_temperature: float) -> Fuel:
    analysis = entry.table("mole_percent")
    if analysis is None:
        raise InputError("a gas needs its analysis: give [fuel.mole_percent]")
    shares = {name: _share(analysis, name) for name in analysis.entries}
    amounts = gas_amounts(shares)
    amount_per_mass = float(amounts.sum() / (fuel_gases().molar_mass @ amounts))
    return gas_fuel(
        shares,
        reference_temperature=reference_temperature,
        gross_heating_value=_heating_value(entry.measure("gross_heating_value"), amount_per_mass),
        net_heating_value=_heating_value(entry.measure("net_heating_value"), amount_per_mass),
    )


def _solid_or_liquid(entry: Table, reference_temperature: float) -> Fuel:
    analysis = entry.table("mass_percent")
    if analysis is None:
        raise InputError("a liquid or solid fuel needs its analysis: give [fuel.mass_percent]")
    return solid_fuel(
        {name: _share(analysis, name) for name in analysis.entries},
        analysis_basis=entry.text("analysis_basis") or AS_FIRED,
        state=state_of(entry),
        reference_temperature=reference_temperature,
        gross_heating_value=_heating_value(entry.measure("gross_heating_value"), None),
        net_heating_value=_heating_value(entry.measure("net_heating_value"), None),
        at_constant_volume=entry.text("heating_value_at") == "constant volume",
        heat_capacity=entry.number("specific_heat"),
    )


def _heating_value(measure: Measure | None, amount_per_mass: float | None) -> float | None:
    if measure is None:
        return None
    if measure.dimension == "energy_per_mass":
        return measure.value
    if amount_per_mass is None:
        raise InputError(
            f"{measure.text!r} is per volume of gas; a liquid or solid fuel needs it per mass, e.g. 42.6 MJ/kg"
        )
    return measure.value * amount_per_mass


def amount_per_mass_of(fuel: Fuel) -> float | None:
    """Return the mol/kg of a gas fuel, None for a fuel with any liquid or solid in it."""
    total = float(np.sum(fuel.gases))
    return total if total > 0 and not float(fuel.heat_capacity) > 0 else None


def ash_carbon_of(entry: Table, fuel: Fuel) -> float | None:
    """Return the share of the fuel's carbon that leaves in the ash streams, None if the file has none.

    Raises AnalysisError for streams that cannot be.
    """
    streams = entry.rows("ash_stream")
    if not streams:
        return None
    shares = [stream.number("ash_share") or 0.0 for stream in streams]
    carbon = [stream.number("carbon") or 0.0 for stream in streams]
    return float(unburned_carbon_share(fuel, shares, carbon))
