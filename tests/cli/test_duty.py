"""`fluegas duty`: the table, the JSON object, cautions, and what it refuses."""

import json
from pathlib import Path
from typing import Any

import pytest

from fluegas.__main__ import main

LINES = (
    "fluegas = 1",
    'title = "Bakery heater"',
    'basis = "net"',
    "[plant]",
    'heat_input = "2 MW"',
    "[fuel.mole_percent]",
    "methane = 100",
    "[air]",
    'temperature = "25 degC"',
    'relative_humidity = "50 %"',
    "[[setting]]",
    'name = "As found"',
    'o2 = "5 %"',
    'flue_temperature = "220 degC"',
    "[[setting]]",
    'name = "Less air"',
    'o2 = "3 %"',
    'flue_temperature = "210 degC"',
    'heat_input = "1.5 MW"',
)


@pytest.fixture
def file(tmp_path: Path) -> str:
    return write(tmp_path)


def write(folder: Path, **replaced: str) -> str:
    """Write the scenario, with other lines for keys that stand once, and return its path."""
    lines = [replaced.get(line.split(" = ")[0], line) for line in LINES]
    path = folder / "heater.toml"
    path.write_text("\n".join(line for line in lines if line) + "\n", encoding="utf-8")
    return str(path)


def object_of(capsys: pytest.CaptureFixture[str], *words: str) -> dict[str, Any]:
    assert main(["duty", *words, "--json"]) == 0
    said = capsys.readouterr()
    assert said.err == ""
    found: dict[str, Any] = json.loads(said.out)
    return found


def test_the_object_in_si(file: str, capsys: pytest.CaptureFixture[str]) -> None:
    found = object_of(capsys, file, "--from", "220degC", "--to", "120 degC")
    assert found["from"] == pytest.approx(493.15)
    assert found["to"] == pytest.approx(393.15)
    assert found["basis"] == "net"
    assert [setting["name"] for setting in found["settings"]] == ["As found", "Less air"]
    for setting, power in zip(found["settings"], (2e6, 1.5e6), strict=True):
        heat, share = setting["per_fuel"], setting["share"]
        assert heat["total"] == heat["sensible"] + heat["condensation"]
        assert heat["condensation"] == setting["condensate"] == setting["condensate_flow"] == 0.0
        assert setting["power"] == pytest.approx(share["net"] * power, rel=1e-12)
        assert share["net"] / share["gross"] == pytest.approx(1.1097, rel=1e-3)  # gross over net of methane
        assert setting["cautions"] == []


def test_duty_to_the_reference_temperature_is_the_account_s_losses(
    file: str, capsys: pytest.CaptureFixture[str]
) -> None:
    found = object_of(capsys, file, "--from", "220 degC", "--to", "25 degC")["settings"][0]
    assert main(["account", file, "--json"]) == 0
    losses = json.loads(capsys.readouterr().out)["settings"][0]["losses"]["net"]
    sensible = losses["dry_gas"] + losses["fuel_water"] + losses["air_moisture"]
    assert found["per_fuel"]["sensible"] / found["per_fuel"]["total"] * found["share"]["net"] == pytest.approx(sensible)


def test_an_economiser_saves_what_the_account_says(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    """Two settings that differ in flue temperature alone: the gain in useful heat is the duty between the two."""
    path = Path(write(tmp_path))
    text = path.read_text(encoding="utf-8").replace('o2 = "3 %"', 'o2 = "5 %"').replace("210 degC", "130 degC")
    path.write_text(text.replace('heat_input = "1.5 MW"\n', ""), encoding="utf-8")
    share = object_of(capsys, str(path), "--from", "220 degC", "--to", "130 degC")["settings"][0]["share"]["gross"]
    assert main(["account", str(path), "--json"]) == 0
    first, second = json.loads(capsys.readouterr().out)["settings"]
    assert second["efficiency"]["gross"] - first["efficiency"]["gross"] == pytest.approx(share, rel=1e-9)


def test_the_table(file: str, capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["duty", file, "--from", "220degC", "--to", "120degC"]) == 0
    said = capsys.readouterr()
    lines = said.out.splitlines()
    assert lines[:2] == ["Bakery heater", "heat that the flue gas gives from 220.0 to 120.0 degC"]
    rows = {line[:22].strip(): line[22:].split() for line in lines}
    assert rows["Heat per fuel"][0] == "MJ/kg"
    assert rows["Heat flow"][0] == "kW"
    share = float(rows["of net heat input"][1])
    assert float(rows["Heat flow"][1]) == pytest.approx(2000 * share / 100, abs=0.6)
    assert "Condensation" not in rows
    assert "cautions" not in said.out
    assert "licensed persons" in said.out


def test_a_condensing_duty_has_its_parts_and_its_caution(file: str, capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["duty", file, "--from", "120degC", "--to", "40degC"]) == 0
    out = capsys.readouterr().out
    rows = {line[:22].strip(): line[22:].split() for line in out.splitlines()}
    parts = [float(rows[name][1]) for name in ("Sensible heat", "Condensation", "Heat per fuel")]
    assert parts[0] + parts[1] == pytest.approx(parts[2], abs=0.0011)
    assert rows["Condensate"][0] == "kg/h"
    assert " ".join(out.split()).count("built for acid condensate") == 2  # one for each dew point
    codes = [
        caution["code"]
        for setting in object_of(capsys, file, "--from", "120degC", "--to", "40degC")["settings"]
        for caution in setting["cautions"]
    ]
    assert codes == ["below_water_dew_point"] * 2


def test_us_units(file: str, capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["duty", file, "--from", "428degF", "--to", "248 °F", "--units", "us"]) == 0
    out = capsys.readouterr().out
    assert "from 428.0 to 248.0 degF" in out
    for unit in ("Btu/lb", "MMBtu/h"):
        assert unit in out


def test_without_a_heat_input_there_is_no_heat_flow(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    path = write(tmp_path, heat_input="")
    found = object_of(capsys, path, "--from", "220degC", "--to", "120degC")["settings"]
    assert [setting["power"] for setting in found] == [None, None]
    assert main(["duty", path, "--from", "220degC", "--to", "120degC"]) == 0
    assert "Heat flow" not in capsys.readouterr().out


@pytest.mark.parametrize(
    ("start", "end", "words"),
    [
        ("120degC", "220degC", "--from 120degC must be above --to 220degC"),
        ("120degC", "120degC", "must be above"),
        ("220", "120degC", "--from: 220 has no unit"),
        ("220degC", "5 bar", "--to: "),
        ("220degC", "-40degC", "temperature of liquid water"),
        ("9000degC", "100degC", "temperature from which the flue gas cools"),
        ("220degC", "-150degC", "to which the flue gas cools"),
    ],
)
def test_what_cannot_be_is_refused(
    file: str, start: str, end: str, words: str, capsys: pytest.CaptureFixture[str]
) -> None:
    assert main(["duty", file, "--from", start, "--to", end]) == 2
    said = capsys.readouterr()
    assert said.out == ""
    assert words in said.err
    assert "Traceback" not in said.err


def test_both_temperatures_are_needed(file: str, capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["duty", file, "--from", "220degC"]) == 2
    assert "--to" in capsys.readouterr().err
