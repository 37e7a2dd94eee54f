"""Settings added, copied, moved and renamed: blocks of text go as a whole, with their comments."""

from pathlib import Path

import pytest

from fluegas.errors import InputError, SavingError, ScenarioError
from fluegas.scenario.model import Scenario
from fluegas.scenario.reading import parse_scenario, read_scenario
from fluegas.scenario.splicing import Entry
from fluegas.scenario.writing import edited, moved_setting, renamed_setting, with_setting, without

FOLDER = Path(__file__).resolve().parents[2] / "scenarios"
HEAD = "fluegas = 1\n\n[fuel.mole_percent]\nmethane = 100.0\n\n"
READ = 'o2 = "3 %"\nflue_temperature = "200 degC"\n'
ROWS = (
    f'# before cleaning\n[[setting]]\nname = "A"\nbaseline = true # as found\n{READ}',
    '[[setting]]\nname = "B"\no2 = "4 %"\nflue_temperature = "210 degC"\n\n[setting.air]\ntemperature = "9 degC"\n',
    '# low\n# fire\n[[setting]]\nname = "C"\ncompare_with = "B"\no2 = "5 %"\nflue_temperature = "220 degC"\n',
)


def file_of(*rows: str, tail: str = "") -> Scenario:
    return parse_scenario(HEAD + "\n".join(rows) + tail)


def names(scenario: Scenario) -> list[str | None]:
    return [setting.text("name") for setting in scenario.settings]


@pytest.mark.parametrize("place", range(3))
@pytest.mark.parametrize("target", range(3))
@pytest.mark.parametrize("tail", ["", '\n[limits]\ncarbon_monoxide = "90 ppm"\n'])
@pytest.mark.parametrize("newline", ["\n", "\r\n"])
def test_a_setting_moves_with_its_comments(place: int, target: int, tail: str, newline: str) -> None:
    order = list(ROWS)
    order.insert(target, order.pop(place))
    before = parse_scenario(file_of(*ROWS, tail=tail).source.replace("\n", newline))
    after = moved_setting(before, place, target)
    assert after.source == file_of(*order, tail=tail).source.replace("\n", newline)
    assert moved_setting(after, target, place).source == before.source


def test_a_move_may_change_the_baseline() -> None:
    scenario = without(file_of(*ROWS), ("setting", 0, "baseline"))
    assert names(moved_setting(scenario, 0, 1))[scenario.baseline_index] == "B"


@pytest.mark.parametrize("place", range(4))
@pytest.mark.parametrize("newline", ["\n", "\r\n"])
def test_a_copy_stands_where_asked_and_is_no_baseline(place: int, newline: str) -> None:
    before = parse_scenario(file_of(*ROWS).source.replace("\n", newline))
    copy = '[[setting]]\nname = "D"\no2 = "2.5 %"\nflue_temperature = "200 degC"\nco = "9 ppm"\n'
    after = with_setting(before, place, name="D", copy_of=0, entries={"o2": "2.5 %", "co": "9 ppm"})
    rows = list(ROWS)
    rows.insert(place, copy)
    assert after.source == file_of(*rows).source.replace("\n", newline)
    assert without(after, ("setting", place)).source == before.source


def test_a_copy_takes_its_tables_along() -> None:
    after = with_setting(file_of(*ROWS), 3, name="D", copy_of=1)
    assert after.source == file_of(*ROWS, ROWS[1].replace('"B"', '"D"')).source
    again = with_setting(after, 0, name="E", copy_of=2)
    assert again.settings[0].text("compare_with") == "B"


def test_a_new_setting() -> None:
    entries: dict[str, Entry] = {"co2": "9 %", "flue_temperature": "300 degF", "air": {"temperature": "9 degC"}}
    for place in (1, 3):
        after = with_setting(file_of(*ROWS), place, name='D "two"', entries=entries)
        rows = list(ROWS)
        air = 'air = { temperature = "9 degC" }'
        rows.insert(place, f'[[setting]]\nname = "D \\"two\\""\nco2 = "9 %"\nflue_temperature = "300 degF"\n{air}\n')
        assert after.source == file_of(*rows).source


def test_a_new_setting_before_a_table_behind_the_settings() -> None:
    tail = '\n[limits]\ncarbon_monoxide = "90 ppm"\n'
    after = with_setting(file_of(*ROWS, tail=tail), 3, name="D", copy_of=0)
    assert (
        after.source
        == file_of(*ROWS, '[[setting]]\nname = "D"\no2 = "3 %"\nflue_temperature = "200 degC"\n', tail=tail).source
    )


def test_new_settings_that_cannot_be() -> None:
    scenario = file_of(*ROWS)
    with pytest.raises(ScenarioError, match=r"(?s)flue_temperature.*excess air"):
        with_setting(scenario, 3, name="D")
    with pytest.raises(ScenarioError, match="names must differ"):
        with_setting(scenario, 3, name="A", copy_of=0)
    for place, copy_of in ((5, 0), (-1, 0), (0, 3), (0, -1)):
        with pytest.raises(InputError, match="there is no place"):
            with_setting(scenario, place, name="D", copy_of=copy_of)
    for place, target in ((3, 0), (0, 3), (-1, 0)):
        with pytest.raises(InputError, match="there is no place"):
            moved_setting(scenario, place, target)


def test_those_compared_with_a_setting_follow_its_new_name() -> None:
    scenario = read_scenario(FOLDER / "dye-house-oil.toml")
    place = names(scenario).index("Low fire")
    after = renamed_setting(scenario, place, "Low, as found")
    assert after.source == scenario.source.replace('"Low fire"', '"Low, as found"')
    assert after.settings[place + 1].text("compare_with") == "Low, as found"
    with pytest.raises(ScenarioError, match="there is no setting 'Low fire'"):
        edited(scenario, ("setting", place, "name"), "Low, as found")


def test_a_setting_that_others_are_compared_with_stays() -> None:
    with pytest.raises(ScenarioError, match="there is no setting 'B'"):
        without(file_of(*ROWS), ("setting", 1))


def test_settings_in_one_value_are_edited_but_not_moved() -> None:
    rows = ", ".join(f'{{name = "{name}", o2 = "3 %", flue_temperature = "150 degC"}}' for name in "AB")
    scenario = parse_scenario(f"fluegas = 1\nsetting = [{rows}]\n[fuel.mole_percent]\nmethane = 1\n")
    assert edited(scenario, ("setting", 1, "o2"), "4 %").settings[1].number("o2") == pytest.approx(0.04)
    with pytest.raises(SavingError, match="cannot be changed in the way the file is written"):
        moved_setting(scenario, 0, 1)


def test_a_text_that_looks_like_comments_is_not_torn() -> None:
    row = '[[setting]]\nname = "A"\no2 = "3 %"\nflue_temperature = "200 degC"\nnote = """\n# one\n# two"""\n'
    before = parse_scenario(HEAD + row + ROWS[1])
    after = moved_setting(before, 1, 0)
    assert after.source == HEAD + ROWS[1] + row
