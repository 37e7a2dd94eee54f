"""What no single field can see of a fuel: analysis and state, units that do not fit, library, parts, ash streams."""

from collections.abc import Iterator

from fluegas.errors import InputError
from fluegas.scenario.fuel_entry import brings_analysis, is_wholly_gas, state_of
from fluegas.scenario.library import (
    HEATING_VALUE_KEYS,
    has_own_analysis,
    known_name,
    library_fuel,
    no_such_fuel,
    with_library,
)
from fluegas.scenario.lines import Path
from fluegas.scenario.model import Table
from fluegas.scenario.wording import quoted

Found = Iterator[tuple[Path, str]]

OF_A_PART = (
    "library",
    "state",
    "analysis_basis",
    *HEATING_VALUE_KEYS,
    "specific_heat",
    "density",
    "mole_percent",
    "mass_percent",
)
"""Entries of a single fuel, which belong in the parts of a blend and not beside them."""
SUM_TOLERANCE = 0.005
"""How far shares may sum from 1: what rounding to a percent leaves."""
WHOLE_TOLERANCE = 5.0
"""How far an analysis beside a library name may sum from 100 percent before it is taken for a part of one."""


def known_fuel(fuel: Table) -> Table:
    """Return a fuel's entries with the library beneath them, an empty table where a name leads nowhere."""
    try:
        return with_library(fuel)
    except InputError:
        return Table()


def fuel_problems(fuel: Table, path: Path, *, needs_analysis: bool) -> Found:
    """Yield path and message of every problem of one fuel at `path`; without `needs_analysis` it only changes one."""
    if "part" in fuel.entries:
        yield from _blend(fuel, path)
    elif "library" in fuel.entries:
        yield from _from_library(fuel, path)
    else:
        yield from _plain(fuel, path, needs_analysis=needs_analysis)


def override_problems(own: Table, path: Path, base: Table) -> Found:
    """Yield the problems of what a setting changes in the fuel `base`, which has the library beneath it."""
    is_new = brings_analysis(own)
    yield from fuel_problems(own, path, needs_analysis=is_new)
    if is_new or not base.entries:
        return
    if base.rows("part"):
        for key in OF_A_PART:
            if key in own.entries:
                yield (*path, key), "the file's fuel is a blend; give all parts of another one: part = [{ .. }, .. ]"
        return
    if own.table("mass_percent") is not None and base.table("mole_percent") is not None:
        yield (*path, "mass_percent"), "the file's fuel is a gas; another moisture needs a liquid or solid"
    state = own.text("state")
    if state is not None and not base.refused("state") and state != state_of(base):
        yield (*path, "state"), "another state is another fuel; give its analysis too"


def _plain(fuel: Table, path: Path, *, needs_analysis: bool) -> Found:
    mole, mass = fuel.table("mole_percent"), fuel.table("mass_percent")
    state = fuel.text("state")
    if mole is not None and mass is not None:
        yield (*path, "mass_percent"), "beside mole_percent: keep the one that fits the fuel's state"
        return
    if mole is None and mass is None:
        if needs_analysis and not fuel.refused("mole_percent") and not fuel.refused("mass_percent"):
            yield (
                path,
                "no analysis: give [fuel.mole_percent] for a gas, [fuel.mass_percent] for a liquid or solid, or a "
                "library fuel by name",
            )
        return
    if mole is not None and state in ("liquid", "solid"):
        yield (*path, "mole_percent"), f"a {state} fuel has its analysis in mass_percent"
    if mass is not None and state == "gas":
        yield (*path, "mass_percent"), "a gas has its analysis in mole_percent"
    if mass is not None and "state" not in fuel.entries and needs_analysis:
        yield (*path, "state"), "missing: say whether the fuel is liquid or solid"
    analysis = mole if mole is not None else mass
    parts = [key for key in (analysis or Table()).entries if key not in ("moisture", "ash")]
    given = [1.0 if analysis.refused(key) else analysis.number(key) or 0.0 for key in parts] if analysis else []
    if analysis is not None and needs_analysis and sum(given) <= 0:
        key = "mole_percent" if mole is not None else "mass_percent"
        yield (*path, key), "the analysis is empty; give the percent of at least one part that burns"
    if (mass or Table()).number("moisture") is not None and ((mass or Table()).number("moisture") or 0) >= 100:
        yield (*path, "mass_percent", "moisture"), "must be below 100 percent of the fuel as fired"
    yield from _units_of_state(fuel, path, is_gas=mole is not None)
    yield from _ash(fuel, path, is_gas=mole is not None)
    has_carbon = mass is None or mass.refused("carbon") or bool(mass.number("carbon"))
    if fuel.rows("ash_stream") and needs_analysis and not has_carbon:
        yield (*path, "ash_stream"), "the fuel has no carbon that could leave in its ash"


def _from_library(fuel: Table, path: Path) -> Found:
    name = fuel.text("library")
    if name is None:
        return
    if known_name(name) is None:
        yield (*path, "library"), no_such_fuel(name)
        return
    found = library_fuel(name)
    if has_own_analysis(fuel):
        problems = list(_partial(fuel, path))
        yield from problems
        if problems:
            return
    else:
        if "analysis_basis" in fuel.entries:
            yield (*path, "analysis_basis"), "belongs to an analysis; that of the library keeps its own basis"
        state = state_of(found.entry)
        if fuel.text("state") not in (None, state):
            yield (*path, "state"), f"the library's {found.name} is a {state}; another state is another fuel"
            return
        if fuel.table("mass_percent") is not None and found.entry.table("mass_percent") is None:
            yield (*path, "mass_percent"), f"the library's {found.name} is a gas; moisture needs a liquid or solid"
            return
    yield from _plain(with_library(fuel), path, needs_analysis=True)


def _partial(fuel: Table, path: Path) -> Found:
    """Yield a problem for each analysis beside a library name that is no whole one."""
    for key in ("mole_percent", "mass_percent"):
        analysis = fuel.table(key)
        if analysis is None or any(analysis.refused(part) for part in analysis.entries):
            continue
        counted = set(analysis.entries)
        if key == "mass_percent" and fuel.text("analysis_basis") is not None:
            dry = {"dry": {"moisture"}, "dry ash-free": {"moisture", "ash"}}
            counted -= dry.get(fuel.text("analysis_basis") or "", set())
        total = sum(analysis.number(part) or 0.0 for part in counted)
        if abs(total - 100.0) > WHOLE_TOLERANCE:
            moisture = ", or moisture alone, which wets the same dry fuel anew" if key == "mass_percent" else ""
            yield (
                (*path, key),
                f"sums to {total:.4g} %; an analysis beside a library fuel replaces the library's whole analysis: give "
                f"every part of it{moisture}",
            )


def _blend(fuel: Table, path: Path) -> Found:
    for key in OF_A_PART:
        if key in fuel.entries:
            yield (*path, key), "belongs to a single fuel; with [[fuel.part]] give it in each part"
    if fuel.refused("part"):
        return
    parts = fuel.rows("part")
    if not parts:
        yield (*path, "part"), "is empty; give at least one part, with its share"
        return
    kinds = [part.text("share_of") for part in parts]
    for place, part in enumerate(parts):
        where = (*path, "part", place)
        yield from fuel_problems(part, where, needs_analysis=True)
        if "share" not in part.entries:
            yield (*where, "share"), "missing: every part needs its share of the blend"
        if "share_of" not in part.entries:
            yield (*where, "share_of"), "missing: say whether the share is of the heat or of the mass"
        elif kinds[place] is not None and kinds[0] is not None and kinds[place] != kinds[0]:
            yield (*where, "share_of"), f"the first part's share is of the {kinds[0]}; all parts need the same"
    shares = [part.number("share") for part in parts]
    total = sum(share or 0.0 for share in shares)
    if None not in shares and abs(total - 1) > SUM_TOLERANCE:
        yield (*path, "part"), f"the shares of the parts sum to {100 * total:.4g} %, not 100 %"
    whole = known_fuel(fuel)
    if whole.entries:
        is_gas = is_wholly_gas(whole)
        if not is_gas:
            yield from _price_unit(fuel, path)
        yield from _ash(fuel, path, is_gas=is_gas)


def _units_of_state(fuel: Table, path: Path, *, is_gas: bool) -> Found:
    if is_gas:
        for key in ("analysis_basis", "specific_heat"):
            if key in fuel.entries:
                yield (*path, key), "is for liquid and solid fuels; a gas needs none"
        return
    for key in ("gross_heating_value", "net_heating_value"):
        measure = fuel.measure(key)
        if measure is not None and measure.dimension == "energy_per_amount":
            yield (
                (*path, key),
                f"{quoted(measure.text)} is per volume of gas; this fuel needs it per mass, e.g. 42.6 MJ/kg",
            )
    yield from _price_unit(fuel, path)


def _price_unit(fuel: Table, path: Path) -> Found:
    price = fuel.price("price")
    if price is not None and price.dimension == "amount":
        yield (*path, "price"), f"{quoted(price.text)} is per volume of gas; this fuel needs it per mass or per heat"


def _ash(fuel: Table, path: Path, *, is_gas: bool) -> Found:
    streams = fuel.rows("ash_stream")
    if not streams:
        return
    if is_gas:
        yield (*path, "ash_stream"), "a gas leaves no ash"
        return
    shares = [stream.number("ash_share") for stream in streams]
    for place, stream in enumerate(streams):
        for key in ("ash_share", "carbon"):
            if key not in stream.entries:
                yield (*path, "ash_stream", place, key), "missing: every ash stream needs ash_share and carbon"
    total = sum(share or 0.0 for share in shares)
    if None not in shares and abs(total - 1) > SUM_TOLERANCE:
        yield (*path, "ash_stream"), f"the ash shares sum to {100 * total:.4g} %, not 100 %"
