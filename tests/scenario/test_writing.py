"""Editing a scenario: a change touches its own line and no other, and what cannot be changed is refused."""

import tomllib
from collections.abc import Iterator
from pathlib import Path
from typing import Any

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from fluegas.errors import InputError, SavingError, ScenarioError
from fluegas.report.json_output import json_text
from fluegas.scenario.fields import FIELDS_OF
from fluegas.scenario.lines import lines_of
from fluegas.scenario.model import Scenario
from fluegas.scenario.reading import parse_scenario, read_scenario
from fluegas.scenario.result import work_out
from fluegas.scenario.splicing import Entry, literal
from fluegas.scenario.writing import changed, edited, without

DEMOS = sorted((Path(__file__).resolve().parents[2] / "scenarios").glob("*.toml"))
LAUNDRY = read_scenario(next(demo for demo in DEMOS if demo.stem == "laundry-boiler"))
CHIPS = read_scenario(next(demo for demo in DEMOS if demo.stem == "heating-plant-chips"))
COUPLED = {"fluegas", "kind", "state", "analysis_basis", "compare_with", "ash_share", "baseline", "library"}
"""Keys whose value cannot be changed alone."""

words = st.text(st.characters(codec="utf-8", categories=["L", "N", "P", "S"], include_characters=" "), min_size=1)
words = words.filter(lambda text: text.isprintable() and text.strip() != "" and len(text) <= 40)
numbers = st.integers(950, 999)


def leaves(data: Any, path: tuple[str | int, ...] = ()) -> Iterator[tuple[tuple[str | int, ...], Any]]:
    if isinstance(data, dict):
        for key, value in data.items():
            yield from leaves(value, (*path, key))
    elif isinstance(data, list) and path[0] != "accuracy":
        for place, value in enumerate(data):
            yield from leaves(value, (*path, place))
    else:
        yield path, data


def value_at(data: Any, path: tuple[str | int, ...]) -> Any:
    for part in path:
        data = data[part]
    return data


def another(draw: st.DrawFn, path: tuple[str | int, ...], value: Any) -> Entry:
    """Return another value that fits as well as the one there: a text, or a number a little smaller, as written."""
    if isinstance(value, int | float):
        less_of_it = value * draw(numbers) / 1000
        return str(less_of_it) if draw(st.booleans()) else less_of_it
    number, _, unit = str(value).partition(" ")
    if number.replace(".", "").isdigit():
        less = f"{float(number) * draw(numbers) / 1000:.4f}"
        return f"{draw(st.sampled_from([less, less.replace('.', ',')]))} {unit}"
    if path[-1] in ("name", "title", "note", "site"):
        return draw(words)
    field = FIELDS_OF["top" if len(path) == 1 else str(path[0])].get(str(path[-1]))
    return draw(st.sampled_from(field.choices)) if field is not None and field.choices else str(value)


@pytest.mark.parametrize("demo", DEMOS, ids=lambda demo: demo.stem)
def test_an_edit_changes_its_own_line_alone(demo: Path) -> None:
    scenario = read_scenario(demo)
    paths = [(path, value) for path, value in leaves(tomllib.loads(scenario.source)) if path[-1] not in COUPLED]
    paths = [(path, value) for path, value in paths if not isinstance(value, list)]
    referred = {setting.text("compare_with") for setting in scenario.settings}
    taken = {setting.text("name") for setting in scenario.settings}
    paths = [(path, value) for path, value in paths if not (path[-1] == "name" and value in referred)]

    lines = lines_of(scenario.source, [path for path, _ in paths])
    before = scenario.source.split("\n")

    @settings(max_examples=200)
    @given(st.data())
    def check(data: st.DataObject) -> None:
        path, value = data.draw(st.sampled_from(paths))
        entry = data.draw(st.composite(another)(path, value))
        if entry in taken:
            return
        new = edited(scenario, path, entry)
        after, line = new.source.split("\n"), lines[path]
        assert line is not None
        assert before[: line - 1] == after[: line - 1]
        assert before[line:] == after[line:]
        head, old, rest = before[line - 1].partition(literal(value))
        assert old
        typed_number = isinstance(value, int | float) and isinstance(entry, str)
        assert after[line - 1] == head + (str(entry) if typed_number else literal(entry)) + rest
        read = value_at(tomllib.loads(new.source), path)
        assert read == (float(str(entry)) if typed_number else entry)
        assert new == parse_scenario(new.source, new.name)

    check()


@pytest.mark.parametrize("demo", DEMOS, ids=lambda demo: demo.stem)
def test_an_edit_there_and_back_gives_the_same_account(demo: Path) -> None:
    scenario = read_scenario(demo)
    path = ("setting", 1, "flue_temperature")
    value = value_at(tomllib.loads(scenario.source), path)
    there = edited(scenario, path, "401 K")
    back = edited(there, path, value)
    assert back.source == scenario.source
    assert json_text(work_out(back)) == json_text(work_out(scenario))
    assert json_text(work_out(there)) != json_text(work_out(scenario))


def added(before: Scenario, after: Scenario) -> list[str]:
    """Return the lines that are new in a text from which none is gone."""
    old, new = before.source.splitlines(), after.source.splitlines()
    start = next((place for place, (one, other) in enumerate(zip(old, new, strict=False)) if one != other), len(old))
    count = len(new) - len(old)
    assert old[start:] == new[start + count :]
    return new[start : start + count]


@pytest.mark.parametrize(
    ("path", "taken_out", "entry", "lines", "behind"),
    [
        (("setting", 1, "h2"), 3, "12 ppm", ['h2 = "12 ppm"'], 'flue_temperature = "203 degC"'),
        (("setting", 2, "air", "temperature"), 3, "75 degF", ['air = { temperature = "75 degF" }'], '"126 degC"'),
        (("fuel", "density"), 2, "0.8 kg/m3", ['density = "0.8 kg/m3"'], 'price = "41 EUR/MWh"'),
        (("fuel", "mole_percent", "helium"), 3, "0.10", ["helium = 0.10"], '"carbon dioxide" = 0.8'),
        (("fuel", "mole_percent", "carbon monoxide"), 3, 0.1, ['"carbon monoxide" = 0.1'], '"carbon dioxide" = 0.8'),
        (("note",), 1, 'An "odd" \\ note', ['note = "An \\"odd\\" \\\\ note"'], "reference_temperature"),
        (("note",), 1, "two\nlines", ['note = """', "two", 'lines"""'], "reference_temperature"),
        (("setting", 0, "readings", 3, "co"), 4, "20 ppm", ['    { co = "20 ppm" },'], '{ o2 = "7.1 %"'),
        (("plant", "other_losses", "Blow-down"), 2, "1 %", ['other_losses = { Blow-down = "1 %" }'], "surface_loss"),
        (("accuracy", "co", "shared"), 1, ["9 ppm", "5 % of reading"], ["[accuracy]"], ""),
        (("limits", "carbon_monoxide"), 1, "90 ppm", ["[limits]", 'carbon_monoxide = "90 ppm"', ""], ""),
    ],
)
def test_a_new_entry_comes_behind_the_last_key_of_its_table(
    path: tuple[str | int, ...], taken_out: int, entry: Entry, lines: list[str], behind: str
) -> None:
    new = edited(LAUNDRY, path, entry)
    found = added(LAUNDRY, new)
    assert found[: len(lines)] == lines
    whole = new.source.splitlines()
    place = next(place for place in range(len(whole)) if whole[place : place + len(found)] == found)
    assert behind in whole[place - 1]
    assert without(new, path[:taken_out]).source == LAUNDRY.source


def test_a_new_table_stands_before_the_settings() -> None:
    source = edited(LAUNDRY, ("limits", "carbon_monoxide"), "90 ppm").source
    assert source.index("[air]") < source.index("[limits]") < source.index("[[setting]]")


def test_an_entry_in_a_table_of_one_line() -> None:
    path = ("setting", 0, "readings", 1)
    added = edited(LAUNDRY, (*path, "h2"), "4 ppm").source
    assert '    { o2 = "7.0 %", co = "19 ppm", nox = "54 ppm", h2 = "4 ppm" },\n' in added
    assert '    { o2 = "6.9 %", co = "19 ppm", nox = "54 ppm" },\n' in edited(LAUNDRY, (*path, "o2"), "6.9 %").source
    assert '    { o2 = "7.0 %", nox = "54 ppm" },\n' in without(LAUNDRY, (*path, "co")).source
    assert '    { co = "19 ppm", nox = "54 ppm" },\n' in without(LAUNDRY, (*path, "o2")).source
    shorter = without(LAUNDRY, path).source
    assert '    { o2 = "7.2 %", co = "17 ppm", nox = "52 ppm" },\n    { o2 = "7.1 %"' in shorter


def test_typed_numbers_keep_their_digits() -> None:
    path = ("fuel", "mole_percent", "methane")
    for typed, written in (("92.40", "92.40"), ("9.24e1", "9.24e1"), ("92,4", "92.4"), ("93", "93"), (" 92.4", "92.4")):
        assert f"\nmethane = {written}\n" in edited(LAUNDRY, path, typed).source
    for typed in ("lots", "92.4 %", "1,234", "nan", "-3", "1e400", ""):
        with pytest.raises(ScenarioError, match=r"fuel\.mole_percent\.methane"):
            edited(LAUNDRY, path, typed)


def test_typed_words_of_truth() -> None:
    assert "\nbaseline = true\n" in edited(LAUNDRY, ("setting", 2, "baseline"), "true").source + "\n"
    assert edited(LAUNDRY, ("setting", 2, "baseline"), "true").baseline_index == 2


@pytest.mark.parametrize(
    ("path", "entry", "message"),
    [
        (("setting", 1, "o2"), "3.4", "no unit"),
        (("setting", 1, "o2"), "3.4 degC", "degC"),
        (("setting", 1, "o2"), 3.4, "no unit"),
        (("setting", 1, "o3"), "3.4 %", "unknown key"),
        (("setting", 1, "name"), "As found", "names must differ"),
        (("setting", 1, "name"), "bell\a", "control characters"),
        (("setting", 1, "compare_with"), "Nobody", "there is no setting"),
        (("setting", 1, "excess_air"), "10 %", "keep the reading or the excess air"),
        (("basis",), "middle", "not one of"),
        (("fluegas",), 2, "newer fluegas"),
        (("title",), "x" * 300, "characters long"),
        (("note",), "lone \ud800 surrogate", "control characters"),
    ],
)
def test_what_would_be_invalid_is_refused(path: tuple[str | int, ...], entry: Entry, message: str) -> None:
    before = LAUNDRY.source
    with pytest.raises(ScenarioError, match=message):
        edited(LAUNDRY, path, entry)
    assert before == LAUNDRY.source


@pytest.mark.parametrize(
    "path", [(), ("setting", 7, "o2"), ("setting", -1, "o2"), ("setting", "o2"), ("title", "x"), (0,)]
)
def test_a_place_that_is_not_there_is_refused(path: tuple[str | int, ...]) -> None:
    with pytest.raises(InputError, match="there is no"):
        edited(LAUNDRY, path, "3 %")
    with pytest.raises(InputError, match="there is no"):
        without(LAUNDRY, path)


def test_taking_out() -> None:
    with pytest.raises(InputError, match="there is no"):
        without(LAUNDRY, ("setting", 1, "h2"))
    with pytest.raises(ScenarioError, match="flue_temperature"):
        without(LAUNDRY, ("setting", 1, "flue_temperature"))
    gone = without(CHIPS, ("setting", 0, "o2_basis")).source
    assert gone == "".join(line for line in CHIPS.source.splitlines(True) if "a probe in the duct" not in line)
    gone = without(LAUNDRY, ("air",)).source
    assert "[air]" not in gone
    assert '"carbon dioxide" = 0.8\n\n[[setting]]' in gone


def test_several_changes_at_once_may_pass_through_what_is_invalid() -> None:
    new = changed(LAUNDRY, {("setting", 1, "o2"): None, ("setting", 1, "excess_air"): "18 %"})
    assert new.settings[1].number("excess_air") == pytest.approx(0.18)
    assert "o2" not in new.settings[1].entries
    streams = changed(
        CHIPS,
        {
            ("fuel", "ash_stream", 0, "ash_share"): "60 %",
            ("fuel", "ash_stream", 2, "ash_share"): "10 %",
            ("fuel", "ash_stream", 2, "carbon"): "9 %",
        },
    )
    assert added(edited(CHIPS, ("plant", "site"), "Ottermere heating plant"), streams_with(streams, "70 %")) == [
        "[[fuel.ash_stream]]",
        'ash_share = "10 %"',
        'carbon = "9 %"',
        "",
    ]


def streams_with(scenario: Scenario, share: str) -> Scenario:
    """Return a scenario whose text has another share of the first ash stream, whatever the sum comes to."""
    from dataclasses import replace

    return replace(scenario, source=scenario.source.replace('ash_share = "60 %"', f'ash_share = "{share}"'))


def test_windows_line_endings_stay() -> None:
    scenario = parse_scenario(LAUNDRY.source.replace("\n", "\r\n"))
    changes: list[tuple[tuple[str | int, ...], Entry]] = [
        (("setting", 1, "o2"), "3 %"),
        (("setting", 1, "h2"), "3 ppm"),
        (("setting", 0, "readings", 3, "o2"), "7.3 %"),
        (("limits", "carbon_monoxide"), "90 ppm"),
        (("note",), "two\nlines"),
        (("setting", 2, "air", "temperature"), "19 degC"),
    ]
    for path, entry in changes:
        new = edited(scenario, path, entry)
        assert new.source.count("\n") == new.source.count("\r\n")
        assert new.source.replace("\r\n", "\n") == edited(LAUNDRY, path, entry).source


UNUSUAL = """fluegas = 1
plant.name = "Dotted" # plant
plant . "site" = 'Single'
  [fuel.mole_percent] # only a sub-table
  methane = 100
[air]
[[setting]]
name = "A"
air.temperature = "20 degC"
note = \"\"\"
# no comment
[[setting]]
# end\"\"\"
flue_temperature = "150 degC"
[[setting.readings]]
o2 = "3 %"
[[setting.readings]]
o2 = "4 %"
# of B
[[setting]] # a header
name = "B"
excess_air = "20 %"
flue_temperature = "140 degC"
[setting.recirculation]
share = "5 %"
# the end"""


def test_unusual_ways_of_writing_a_file() -> None:
    scenario = parse_scenario(UNUSUAL)
    for path, entry, text in (
        (("plant", "kind"), "boiler", 'plant . "site" = \'Single\'\nplant.kind = "boiler"\n'),
        (("plant", "name"), "New", 'plant.name = "New" # plant\n'),
        (("fuel", "name"), "Gas", '[fuel]\nname = "Gas"\n\n  [fuel.mole_percent]'),
        (("fuel", "mole_percent", "ethane"), 0, "  methane = 100\n  ethane = 0\n"),
        (("air", "temperature"), "9 degC", '[air]\ntemperature = "9 degC"\n[[setting]]'),
        (("setting", 0, "air", "pressure"), "1 bar", '"20 degC"\nair.pressure = "1 bar"\n'),
        (("setting", 0, "co"), "9 ppm", 'flue_temperature = "150 degC"\nco = "9 ppm"\n[[setting.readings]]'),
        (("setting", 0, "readings", 2, "o2"), "5 %", '4 %"\n\n[[setting.readings]]\no2 = "5 %"\n# of B\n[[setting]]'),
        (("setting", 1, "recirculation", "temperature"), "99 degC", 'share = "5 %"\ntemperature = "99 degC"\n# the'),
        (("setting", 0, "note"), "x", 'note = "x"\nflue'),
    ):
        assert text in edited(scenario, path, entry).source
    assert 'name = "B"\nexcess_air' in without(scenario, ("setting", 0)).source
    assert 'readings]]\no2 = "4 %"\n# of B\n[[' in without(scenario, ("setting", 0, "readings", 0)).source
    assert "air.temp" not in without(scenario, ("setting", 0, "air")).source
    assert without(scenario, ("setting", 1, "recirculation")).source.endswith('"140 degC"\n')


def test_a_file_that_writing_would_rearrange_is_not_edited() -> None:
    head, _, rest = LAUNDRY.source.partition("[air]")
    air, _, settings_ = rest.partition("[[setting]]")
    first, _, others = settings_.partition("[[setting]]")
    split = parse_scenario(f"{head}[[setting]]{first}[air]{air}[[setting]]{others}")
    with pytest.raises(SavingError, match=r"put all \[\[setting\]\] tables one after the other"):
        edited(split, ("setting", 1, "o2"), "3 %")


def test_defaults_never_enter_the_text() -> None:
    scenario = parse_scenario(
        'fluegas = 1\n[fuel.mole_percent]\nmethane = 1\n[[setting]]\nname = "A"\no2 = "3 %"\n'
        'flue_temperature = "150 degC"\n'
    )
    work_out(scenario)
    new = edited(scenario, ("setting", 0, "o2"), "3.0 %")
    assert new.source == scenario.source.replace("3 %", "3.0 %")
