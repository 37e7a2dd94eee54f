"""What no single field can see: required entries, entries that contradict one another, names that lead nowhere.

Works on what could be read of a file, so that these problems come together with those of single values.
"""

from collections.abc import Iterator

from fluegas.scenario.air_entry import HUMIDITY_FORMS, PRESSURE_FORMS, merged_air
from fluegas.scenario.fields import FIELDS_OF, FORMAT
from fluegas.scenario.fuel_entry import brings_analysis
from fluegas.scenario.lines import Path
from fluegas.scenario.model import Scenario, Table
from fluegas.scenario.wording import listed, nearest, quoted

Found = Iterator[tuple[Path, str]]

SUPPLY = ("o2", "co2", "excess_air")


def contradictions(top: Table) -> Found:
    """Yield path and message of every problem that concerns more than one entry."""
    yield from _format(top)
    fuel, air, plant = (top.table(key) or Table() for key in ("fuel", "air", "plant"))
    if "fuel" not in top.entries:
        yield ("fuel",), "missing: a scenario needs its [fuel] with an analysis"
    else:
        yield from _fuel(fuel, ("fuel",), needs_analysis=True)
    yield from _air(air, ("air",), Table())
    yield from _plant(plant, fuel)
    yield from _settings(top, fuel, air, plant)


def _format(top: Table) -> Found:
    number = top.entries.get("fluegas")
    if number is None:
        yield ("fluegas",), f"missing or unusable: the first line must be: fluegas = {FORMAT}"
    elif isinstance(number, int) and number > FORMAT:
        yield (
            ("fluegas",),
            f"the file is of format {number}; this fluegas reads format {FORMAT}: a newer fluegas is needed",
        )


def _fuel(fuel: Table, path: Path, *, needs_analysis: bool) -> Found:
    mole, mass = fuel.table("mole_percent"), fuel.table("mass_percent")
    state = fuel.text("state")
    if mole is not None and mass is not None:
        yield (*path, "mass_percent"), "beside mole_percent: keep the one that fits the fuel's state"
        return
    if mole is None and mass is None:
        if needs_analysis and "library" not in fuel.entries:
            yield path, "no analysis: give [fuel.mole_percent] for a gas or [fuel.mass_percent] for a liquid or solid"
        return
    if mole is not None and state in ("liquid", "solid"):
        yield (*path, "mole_percent"), f"a {state} fuel has its analysis in mass_percent"
    if mass is not None and state == "gas":
        yield (*path, "mass_percent"), "a gas has its analysis in mole_percent"
    if mass is not None and state is None and needs_analysis:
        yield (*path, "state"), "missing: say whether the fuel is liquid or solid"
    analysis = mole if mole is not None else mass
    parts = [key for key in (analysis or Table()).entries if key not in ("moisture", "ash")]
    if analysis is not None and needs_analysis and sum(analysis.number(key) or 0.0 for key in parts) <= 0:
        key = "mole_percent" if mole is not None else "mass_percent"
        yield (*path, key), "the analysis is empty; give the percent of at least one part that burns"
    if (mass or Table()).number("moisture") is not None and ((mass or Table()).number("moisture") or 0) >= 100:
        yield (*path, "mass_percent", "moisture"), "must be below 100 percent of the fuel as fired"
    yield from _units_of_state(fuel, path, is_gas=mole is not None)
    yield from _ash(fuel, path, is_gas=mole is not None)


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
    if None not in shares and abs(total - 1) > 0.005:
        yield (*path, "ash_stream"), f"the ash shares sum to {100 * total:.4g} %, not 100 %"


def _air(air: Table, path: Path, base: Table) -> Found:
    for forms, what in ((HUMIDITY_FORMS, "humidity"), (PRESSURE_FORMS, "pressure")):
        given = [key for key in forms if key in air.entries]
        if len(given) > 1:
            yield (*path, given[1]), f"beside {given[0]}: the {what} is given twice; keep one of {listed(given)}"
    whole = merged_air(base, air)
    if "burner_temperature" in whole.entries and "preheat_from" not in whole.entries:
        yield (*path, "burner_temperature"), "needs preheat_from beside it: flue or outside"
    if "preheat_from" in air.entries and "burner_temperature" not in whole.entries:
        yield (*path, "preheat_from"), "needs burner_temperature beside it"


def _plant(plant: Table, fuel: Table) -> Found:
    yield from _one_rate(plant, ("plant",))
    if plant.text("surface_loss") == "estimate" and "rated_output" not in plant.entries:
        yield ("plant", "surface_loss"), "estimate needs rated_output, the useful heat at full load"
    is_gas = fuel.table("mole_percent") is not None
    for key in ("fuel_rate", "annual_fuel"):
        measure = plant.measure(key)
        if measure is not None and measure.dimension.startswith("amount") and not is_gas and fuel.entries:
            yield (
                ("plant", key),
                f"{quoted(measure.text)} is a volume of gas, but the fuel is not a gas; give it by mass",
            )


def _one_rate(table: Table, path: Path) -> Found:
    if "heat_input" in table.entries and "fuel_rate" in table.entries:
        yield (*path, "fuel_rate"), "beside heat_input: keep the one that was measured"


def _settings(top: Table, fuel: Table, air: Table, plant: Table) -> Found:
    settings = top.rows("setting")
    if "setting" not in top.entries or (not settings and isinstance(top.entries.get("setting"), tuple)):
        yield ("setting",), "missing: give at least one [[setting]] with its readings"
    names = [setting.text("name") for setting in settings]
    baselines = [place for place, setting in enumerate(settings) if setting.flag("baseline")]
    for place in baselines[1:]:
        yield ("setting", place, "baseline"), f"{quoted(names[baselines[0]] or '')} is the baseline already; keep one"
    baseline = baselines[0] if baselines else 0
    for place, setting in enumerate(settings):
        path: Path = ("setting", place)
        yield from _names(setting, path, names, place)
        yield from _readings(setting, path)
        yield from _one_rate(setting, path)
        inner = setting.table("air")
        if inner is not None:
            yield from _air(inner, (*path, "air"), air)
        yield from _own_fuel(setting, path, fuel)
        has_rate = any(
            key in table.entries
            for key in ("heat_input", "fuel_rate")
            for table in _rates(setting, plant, place, baseline)
        )
        if "condensate" in setting.entries and not has_rate:
            yield (*path, "condensate"), "needs the setting's heat_input or fuel_rate beside it"


def _rates(setting: Table, plant: Table, place: int, baseline: int) -> tuple[Table, ...]:
    return (setting, plant) if place == baseline else (setting,)


def _names(setting: Table, path: Path, names: list[str | None], place: int) -> Found:
    name = names[place]
    if "name" not in setting.entries:
        yield (*path, "name"), "missing: every [[setting]] needs a name"
    elif name is not None and name in names[:place]:
        yield (*path, "name"), f"{quoted(name)} is the name of an earlier setting; names must differ"
    other = setting.text("compare_with")
    if other is None:
        return
    if other == name:
        yield (*path, "compare_with"), "names the setting itself; name another one"
    elif other not in names:
        hint = nearest(other, [each for each in names if each])
        yield (*path, "compare_with"), f"there is no setting {quoted(other)}{hint}"


def _readings(setting: Table, path: Path) -> Found:
    rows = setting.rows("readings")
    repeated = {key for row in rows for key in row.entries}
    for key in sorted(repeated & set(setting.entries)):
        yield (*path, key), "stands in the setting and in its repeat readings; keep one"
    present = repeated | set(setting.entries)
    if "flue_temperature" not in present:
        yield (*path, "flue_temperature"), "missing: every setting needs its flue_temperature"
    given = [key for key in SUPPLY if key in present]
    if not given:
        yield path, "nothing tells the excess air: give o2, co2 or excess_air"
    if "excess_air" in given and len(given) > 1:
        yield (*path, "excess_air"), f"beside {given[0]}: keep the reading or the excess air, not both"
    if "o2_basis" in setting.entries and "o2" not in present:
        yield (*path, "o2_basis"), "stands without o2"
    recirculation = setting.table("recirculation")
    if recirculation is not None and "share" not in recirculation.entries:
        yield (*path, "recirculation"), "needs its share, kilograms of flue gas per kilogram of air and fuel"


def _own_fuel(setting: Table, path: Path, fuel: Table) -> Found:
    own = setting.table("fuel")
    holds = fuel if own is None or not brings_analysis(own) else own
    if own is not None:
        is_new = brings_analysis(own)
        yield from _fuel(own, (*path, "fuel"), needs_analysis=is_new)
        if not is_new and own.table("mass_percent") is not None and fuel.table("mass_percent") is None:
            yield (*path, "fuel", "mass_percent"), "the file's fuel is a gas; another moisture needs a liquid or solid"
        if not is_new and "state" in own.entries and own.text("state") != fuel.text("state"):
            yield (*path, "fuel", "state"), "another state is another fuel; give its analysis too"
    streams = bool(holds.rows("ash_stream")) or (own is not None and bool(own.rows("ash_stream")))
    if streams and "unburned_carbon" in setting.entries:
        yield (*path, "unburned_carbon"), "beside ash streams, which give the same; keep one"
    rate = setting.measure("fuel_rate")
    if rate is not None and rate.dimension == "amount_flow" and holds.table("mole_percent") is None and holds.entries:
        yield (
            (*path, "fuel_rate"),
            f"{quoted(rate.text)} is a volume of gas, but the fuel is not a gas; give it by mass",
        )


def unused_keys(scenario: Scenario) -> tuple[str, ...]:
    """Return the dotted names of keys in a scenario that are understood but have no effect in this version."""
    tables = [("plant", scenario.plant), ("fuel", scenario.fuel), ("air", scenario.air)]
    for setting in scenario.settings:
        inner = ((name, setting.table(name)) for name in ("air", "fuel"))
        tables += [("setting", setting), *((name, table) for name, table in inner if table is not None)]
        tables += [("setting.readings", row) for row in setting.rows("readings")]
    found: dict[str, None] = {}
    for name, table in tables:
        for key in table.entries:
            if FIELDS_OF[name][key].unused:
                found[FIELDS_OF[name][key].name] = None
    if scenario.accuracy.entries:
        found["accuracy"] = None
    return tuple(found)
