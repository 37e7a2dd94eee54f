"""Broken scenario files, one fault or a few in each: every problem is said with its line and what would be right.

The files are in `broken/`; what is said about each stands in the table below, line by line.
"""

from pathlib import Path

import pytest

from fluegas.__main__ import main
from fluegas.errors import ScenarioError
from fluegas.scenario.reading import read_scenario
from fluegas.scenario.result import work_out

FOLDER = Path(__file__).parent / "broken"

SAID = r"""
accuracy-bare-percent
    14: accuracy.o2.shared: '0.2 %' may be of the reading or of the gas; write "... vol%", "... points" or "... % of reading"
accuracy-temperature
    14: accuracy.flue_temperature.shared: vol% is a unit of share; here a temperature difference is needed, e.g. 2 K
    14: accuracy.flue_temperature.random: '-1 K' is negative
accuracy-unknown-key
    14: accuracy.oxygen: unknown key 'oxygen'; did you mean 'fuel.oxygen'?
accuracy-unknown-part
    14: accuracy.o2.shraed: unknown key 'shraed'; it may have shared, random, kind; did you mean 'shared'?
accuracy-wrong-kind
    14: accuracy.co.kind: 'sigma' is not one of limits, standard
all-moisture
    15: fuel.mass_percent.moisture: must be below 100 percent of the fuel as fired
ambiguous-mbtu
    5: plant.heat_input: MBtu/h can mean a thousand or a million Btu/h; write kBtu/h or MMBtu/h
ash-of-a-gas
    12: fuel.ash_stream: a gas leaves no ash
ash-shares
    16: fuel.ash_stream: the ash shares sum to 90 %, not 100 %
ash-stream-incomplete
    20: fuel.ash_stream[2].carbon: missing: every ash stream needs ash_share and carbon
bare-cubic-metres
    5: plant.fuel_rate: m3/h does not say which normal volume; write Nm3/h (0 degC), Sm3/h (15 degC) or scf/h (60 degF)
bare-number
    20: setting[1].flue_temperature: 200 has no unit; write it as text with one, e.g. "231 degC"
below-absolute-zero
    20: setting[1].flue_temperature: '-300 degC' is below absolute zero (-273.15 degC)
both-analyses
    12: fuel.mass_percent: beside mole_percent: keep the one that fits the fuel's state
burner-temperature-alone
    16: air.burner_temperature: needs preheat_from beside it: flue or outside
cannot-burn
    7: fuel: the gas analysis has nothing that burns
comma-number
    5: plant.heat_input: '3,500' is unclear; write 3500 or 3.500
compare-with-itself
    24: setting[2].compare_with: names the setting itself; name another one
compare-with-nobody
    24: setting[2].compare_with: there is no setting 'As fond'; did you mean 'As found'?
condensate-without-rate
    20: setting[1].condensate: needs the setting's heat_input or fuel_rate beside it
empty-analysis
    9: fuel.mole_percent: the analysis is empty; give the percent of at least one part that burns
empty-name
    18: setting[1].name: is empty; give a name
estimate-without-output
    6: plant.surface_loss: estimate needs rated_output, the useful heat at full load
excess-air-and-o2
    20: setting[1].excess_air: beside o2: keep the reading or the excess air, not both
format-missing
    1: fluegas: missing: the first line must be: fluegas = 1
format-newer
    1: fluegas: the file is of format 2; this fluegas reads format 1: a newer fluegas is needed
format-odd
    1: fluegas: 'one' is not a whole number
heat-input-and-fuel-rate
    6: plant.fuel_rate: beside heat_input: keep the one that was measured
heat-withdrawn-later
    21: setting[1].heat_withdrawn: not yet supported: it comes with the flame at chemical equilibrium
heating-value-per-volume
    9: fuel.gross_heating_value: '38 MJ/Nm3' is per volume of gas; this fuel needs it per mass, e.g. 42.6 MJ/kg
inline-table
    21: setting[1].air.wet_bulb: 16 has no unit; write e.g. 16 degC (temperature)
    22: setting[1].recirculation.share: 0.1 has no unit; write it as text with one, e.g. "15 %"
inside-ash-stream
    23: fuel.ash_stream[2].carbon: 18 has no unit; write it as text with one, e.g. "6 %"
library-unknown-name
    8: fuel.library: there is no library fuel 'pipline gas'; did you mean 'pipeline gas'?
mole-percent-for-a-liquid
    9: fuel.mole_percent: a liquid fuel has its analysis in mass_percent
negative-reading
    19: setting[1].o2: '-1 %' is out of range: it must be at least 0 %
negative-share
    11: fuel.mole_percent.nitrogen: -5 is negative; a share cannot be
no-air-supply
    17: setting[1]: nothing tells the excess air: give o2, co2 or excess_air
no-analysis
    7: fuel: no analysis: give [fuel.mole_percent] for a gas, [fuel.mass_percent] for a liquid or solid, or a library fuel by name
no-flue-temperature
    17: setting[1].flue_temperature: missing: every setting needs its flue_temperature
no-fuel
    1: fuel: missing: a scenario needs its [fuel] with an analysis
no-name
    17: setting[1].name: missing: every [[setting]] needs a name
no-setting
    1: setting: missing: give at least one [[setting]] with its readings
number-for-text
    18: setting[1].name: must be text in quotation marks
number-without-unit
    20: setting[1].flue_temperature: 200 has no unit; write e.g. 200 degC (temperature)
o2-above-the-air-once
    22: setting 'Less air': O2 in the dry flue gas is 0.22; it must be between 0 and 0.2095 (the oxidant's oxygen share; such a gas holds no flue gas)
o2-above-the-air
    17: setting 'As found': O2 in the dry flue gas is 0.21; it must be between 0 and 0.2095 (the oxidant's oxygen share; such a gas holds no flue gas)
o2-basis-without-o2
    20: setting[1].o2_basis: stands without o2
oil-price-per-volume
    9: fuel.price: '0.4 EUR/Nm3' is per volume of gas; this fuel needs it per mass or per heat
oil-rate-by-volume
    5: plant.fuel_rate: '150 Nm3/h' is a volume of gas, but the fuel is not a gas; give it by mass
other-losses
    7: plant.other_losses.Blow-down: 0.6 has no unit; write it as text with one, e.g. "0.6 %"
    8: plant.other_losses.'Door \x1b[31m': 'Door \x1b[31m' holds control characters; write plain text
out-of-range
    20: setting[1].flue_temperature: '20000 degC' is out of range: it must be at most 2726.85 degC
own-fuel-another-state
    21: setting[1].fuel.state: another state is another fuel; give its analysis too
own-fuel
    21: setting[1].fuel.mass_percent: the file's fuel is a gas; another moisture needs a liquid or solid
parts-that-do-not-sum
    8: fuel.part: the shares of the parts sum to 90 %, not 100 %
percent-as-text
    10: fuel.mole_percent.methane: '95 %' is not a plain number; analyses are bare percents, e.g. methane = 4.2
prefix-case
    5: plant.heat_input: unknown unit 'mw'; capital and small letters are different prefixes (M a million, m a thousandth), did you mean MW?
preheat-from-alone
    16: air.preheat_from: needs burner_temperature beside it
pressure-and-altitude
    17: air.altitude: beside pressure: the pressure is given twice; keep one of pressure, altitude
price-without-currency
    9: fuel.price: unknown currency 'per MWh'; write a code of three capital letters (EUR, USD) or one of € £ ₹ $ ¥, and no cents
quantity-without-quotation-marks
    19: syntax, column 8: the line should end here; texts and quantities stand in quotation marks, e.g. "6.4 %"
reading-twice
    19: setting[1].o2: stands in the setting and in its repeat readings; keep one
readings-array
    21: setting[1].readings[2].co: 21 has no unit; write it as text with one, e.g. "45 ppm"
    22: setting[1].readings[3].hydrogen: unknown key here; it belongs in [fuel.mole_percent] or [fuel.mass_percent]
readings-log-later
    13: readings: not yet supported: logger files come with a later version
same-name-twice
    23: setting[2].name: 'As found' is the name of an earlier setting; names must differ
second-point-later
    21: setting[1].second: not yet supported: a second sampling point comes with a later version
several-at-once
    5: plant.heat_input: 2 has no unit; write e.g. 2 MW (power)
    10: fuel.mole_percent.metane: unknown key; did you mean 'methane'?
    15: air.relative_humidity: '150 %' is out of range: it must be at most 100 %
    19: setting[1].o2: 5 has no unit; write it as text with one, e.g. "6.4 %"
    20: setting[1].co: '3,500' is unclear; write 3500 or 3.500
specific-heat-of-a-gas
    9: fuel.specific_heat: is for liquid and solid fuels; a gas needs none
split-order
    8: setting[1].flue_temperature: 200 has no unit; write it as text with one, e.g. "231 degC"
    11: air.temperature: 20 has no unit; write it as text with one, e.g. "22 degC"
    16: setting[2].flue_temperature: 190 has no unit; write it as text with one, e.g. "231 degC"
state-missing
    7: fuel.state: missing: say whether the fuel is liquid or solid
surface-loss-word
    6: plant.surface_loss: 'small' does not start with a number; write e.g. 6.4 % (share); or the word estimate
syntax-duplicate-key
    20: syntax, column 11: this key stands there already
syntax
    19: syntax, column 10: a text in quotation marks is not closed on its line
table-for-tables
    17: setting: must be tables: [[setting]], one for each
text-for-flag
    20: setting[1].baseline: 'yes' is neither true nor false
text-for-table
    2: air: must be a table: [air] or { key = ... }
two-baselines
    25: setting[2].baseline: 'As found' is the baseline already; keep one
two-humidities
    16: air.dew_point: beside relative_humidity: the humidity is given twice; keep one of relative_humidity, dew_point
unburned-carbon-twice
    32: setting[1].unburned_carbon: beside ash streams, which give the same; keep one
unknown-key-near-nothing
    20: setting[1].colour: unknown key; [setting] may have name, note, baseline, compare_with, load, o2_basis, o2, co2, excess_air, co, h2, ch4, no, no2, nox, so2, flue_temperature, chamber_temperature, metal_temperature, unburned_carbon, condensate, heat_input, fuel_rate, useful_heat, heat_withdrawn, second, recirculation, readings, air, fuel
unknown-key
    20: setting[1].flue_temprature: unknown key; did you mean 'flue_temperature'?
unknown-table
    4: boiler: unknown key; the top of the file may have fluegas, title, note, basis, reference_temperature, plant, fuel, air, accuracy, limits, setting, readings
wet-bulb-above-air
    15: air.wet_bulb: the wet bulb '24 degC' is above the air temperature '20 degC'; air cannot hold so much water
word-without-quotation-marks
    8: syntax, column 9: not a value; texts and quantities stand in quotation marks, e.g. "6.4 %"
wrong-choice
    8: fuel.state: 'gass' is not one of gas, liquid, solid; did you mean 'gas'?
wrong-dimension
    5: plant.heat_input: MWh is a unit of energy; here a power is needed, e.g. 3.2 MW
wrong-kind-of-fuel
    9: fuel.kind: 'naturalgas' is not one of natural gas, liquefied petroleum gas, propane, butane, coke-oven gas, biogas, distillate oil, plant oil, residual oil, anthracite, bituminous coal, lignite, wood, wood bark, other; did you mean 'natural gas'?
wrong-table
    6: fuel.heat_input: unknown key here; it belongs in [plant] or [setting]
wrong-unit
    20: setting[1].flue_temperature: unknown unit 'grad'; write e.g. 231 degC (temperature)
"""  # noqa: E501


def said_of_each() -> dict[str, list[str]]:
    """Return the lines said of each file, by its name without ending."""
    table: dict[str, list[str]] = {}
    name = ""
    for line in SAID.strip().splitlines():
        if line.startswith("    "):
            table[name].append(line.strip())
        else:
            name = line
            table[name] = []
    return table


def test_the_table_and_the_folder_hold_the_same_files() -> None:
    assert sorted(said_of_each()) == sorted(file.stem for file in FOLDER.glob("*.toml"))
    assert len(said_of_each()) > 80


@pytest.mark.parametrize(("name", "expected"), said_of_each().items(), ids=said_of_each())
def test_reading_says_every_problem_with_its_line(name: str, expected: list[str]) -> None:
    file = FOLDER / f"{name}.toml"
    with pytest.raises(ScenarioError) as caught:
        work_out(read_scenario(file))
    assert [str(problem) for problem in caught.value.problems] == [f"{file}:{line}" for line in expected]


@pytest.mark.parametrize("command", ["account", "check"])
@pytest.mark.parametrize(("name", "expected"), said_of_each().items(), ids=said_of_each())
def test_the_commands_say_it_and_exit_with_2(
    name: str, expected: list[str], command: str, capsys: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.chdir(FOLDER)
    assert main([command, f"{name}.toml"]) == 2
    out, err = capsys.readouterr()
    assert out == ""
    assert err.splitlines() == [f"{name}.toml:{line}" for line in expected]


@pytest.mark.parametrize(("name", "expected"), said_of_each().items(), ids=said_of_each())
def test_the_same_is_said_of_a_file_with_windows_line_ends_and_a_byte_order_mark(
    name: str, expected: list[str], tmp_path: Path
) -> None:
    content = (FOLDER / f"{name}.toml").read_bytes().replace(b"\n", b"\r\n")
    file = tmp_path / "file.toml"
    file.write_bytes(b"\xef\xbb\xbf" + content)
    with pytest.raises(ScenarioError) as caught:
        work_out(read_scenario(file))
    assert [str(problem) for problem in caught.value.problems] == [f"{file}:{line}" for line in expected]
