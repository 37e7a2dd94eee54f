"""What no single field can see: required entries, entries that contradict one another, names that lead nowhere.

Works on what could be read of a file, so that these problems come together with those of single values.
"""

from collections.abc import Iterator

from fluegas.scenario.air_entry import HUMIDITY_FORMS, PRESSURE_FORMS, merged_air
from fluegas.scenario.fields import FIELDS_OF, FORMAT
from fluegas.scenario.fuel_checking import fuel_problems, known_fuel, override_problems
from fluegas.scenario.fuel_entry import brings_analysis, is_wholly_gas
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
    elif not top.refused("fuel"):
        yield from fuel_problems(fuel, ("fuel",), needs_analysis=True)
    fuel = known_fuel(fuel)
    own_air = [setting.table("air") or Table() for setting in top.rows("setting")]
    yield from _air(air, ("air",), Table(), preheats_later=any("burner_temperature" in own.entries for own in own_air))
    yield from _plant(plant, fuel)
    yield from _settings(top, fuel, air, plant)


def _format(top: Table) -> Found:
    number = top.entries.get("fluegas")
    if number is None:
        yield ("fluegas",), f"missing: the first line must be: fluegas = {FORMAT}"
    elif isinstance(number, int) and number > FORMAT:
        yield (
            ("fluegas",),
            f"the file is of format {number}; this fluegas reads format {FORMAT}: a newer fluegas is needed",
        )


def _air(air: Table, path: Path, base: Table, *, preheats_later: bool = False) -> Found:
    for forms, what in ((HUMIDITY_FORMS, "humidity"), (PRESSURE_FORMS, "pressure")):
        given = [key for key in forms if key in air.entries]
        if len(given) > 1:
            yield (*path, given[1]), f"beside {given[0]}: the {what} is given twice; keep one of {listed(given)}"
    whole = merged_air(base, air)
    temperature = whole.measure("temperature")
    for key in ("wet_bulb", "dew_point"):
        humid = whole.measure(key)
        if humid is not None and temperature is not None and humid.value > temperature.value:
            where = key if key in air.entries else "temperature"
            message = f"the {key.replace('_', ' ')} {quoted(humid.text)} is above the air temperature"
            yield (*path, where), f"{message} {quoted(temperature.text)}; air cannot hold so much water"
    coldest, hottest = whole.measure("coldest"), whole.measure("hottest")
    if coldest is not None and hottest is not None and coldest.value > hottest.value:
        where = "coldest" if "coldest" in air.entries else "hottest"
        yield (*path, where), f"the coldest day, {quoted(coldest.text)}, is warmer than the hottest"
    if "burner_temperature" in whole.entries and "preheat_from" not in whole.entries:
        yield (*path, "burner_temperature"), "needs preheat_from beside it: flue or outside"
    if "preheat_from" in air.entries and "burner_temperature" not in whole.entries and not preheats_later:
        yield (*path, "preheat_from"), "needs burner_temperature beside it"


def _plant(plant: Table, fuel: Table) -> Found:
    yield from _one_rate(plant, ("plant",))
    if plant.text("surface_loss") == "estimate" and "rated_output" not in plant.entries:
        yield ("plant", "surface_loss"), "estimate needs rated_output, the useful heat at full load"
    is_gas = is_wholly_gas(fuel)
    for key in ("fuel_rate", "annual_fuel"):
        measure = plant.measure(key)
        if measure is not None and measure.dimension.startswith("amount") and not is_gas and fuel.entries:
            yield (
                ("plant", key),
                f"{quoted(measure.text)} is a volume of gas, but the fuel is not a gas; give it by mass",
            )


def _one_rate(table: Table, path: Path) -> Found:
    if {"heat_input", "fuel_rate"} <= _present(table):
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
        rates = _present(setting) | (_present(plant) if place == baseline else set())
        if "condensate" in _present(setting) and not rates & {"heat_input", "fuel_rate"}:
            yield (*path, "condensate"), "needs the setting's heat_input or fuel_rate beside it"


def _present(table: Table) -> set[str]:
    """Return the keys of a table and of its repeat readings."""
    return {key for row in (table, *table.rows("readings")) for key in row.entries}


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
    elif other not in names and None not in names:
        hint = nearest(other, [each for each in names if each])
        yield (*path, "compare_with"), f"there is no setting {quoted(other)}{hint}"


def _readings(setting: Table, path: Path) -> Found:
    rows = setting.rows("readings")
    for row, entry in enumerate(rows):
        if not entry.entries:
            yield (*path, "readings", row), "is empty; give what was read, or leave it out"
    repeated = {key for row in rows for key in row.entries}
    for key in sorted(repeated & set(setting.entries)):
        yield (*path, key), "stands in the setting and in its repeat readings; keep one"
    present = _present(setting)
    unread = setting.refused("readings")
    if "flue_temperature" not in present and not unread:
        yield (*path, "flue_temperature"), "missing: every setting needs its flue_temperature"
    given = [key for key in SUPPLY if key in present]
    if not given and not unread:
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
    holds = fuel if own is None or not brings_analysis(own) else known_fuel(own)
    if own is not None:
        yield from override_problems(own, (*path, "fuel"), fuel)
    streams = bool(holds.rows("ash_stream")) or (own is not None and bool(own.rows("ash_stream")))
    if streams and "unburned_carbon" in setting.entries:
        yield (*path, "unburned_carbon"), "beside ash streams, which give the same; keep one"
    rate = setting.measure("fuel_rate")
    if rate is not None and rate.dimension == "amount_flow" and holds.entries and not is_wholly_gas(holds):
        yield (
            (*path, "fuel_rate"),
            f"{quoted(rate.text)} is a volume of gas, but the fuel is not a gas; give it by mass",
        )


def unused_keys(scenario: Scenario) -> tuple[str, ...]:
    """Return the dotted names of keys in a scenario that are understood but have no effect in this version."""
    tables = [("plant", scenario.plant), ("fuel", scenario.fuel), ("air", scenario.air)]
    tables += [("fuel.part", part) for part in scenario.fuel.rows("part")]
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
