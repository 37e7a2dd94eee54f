"""`fluegas account`: table, CSV and JSON agree; widths, colour, units, basis; what goes to which stream."""

import json
from pathlib import Path
from typing import Any

import pytest
from rich.cells import cell_len

from fluegas.__main__ import main
from fluegas.report.safety import SAFETY
from tests.cli.accounts import DEMOS, ESCAPE, csv_rows, demo, printed, table_rows
from tests.scenario.documents import GAS, Document, document, setting, text_of

LAUNDRY = demo("laundry-boiler.toml")
OIL = demo("dye-house-oil.toml")


def written(folder: Path, plain: Document) -> str:
    file = folder / "unit.toml"
    file.write_text(text_of(plain), encoding="utf-8")
    return str(file)


def many(count: int) -> Document:
    """Return a unit with `count` settings, the third of them the baseline."""
    settings = [setting(f"Load {place + 1}", o2=f"{3 + 0.2 * place:.1f} %") for place in range(count)]
    settings[2]["baseline"] = True
    return document(GAS, *settings, title="A unit at many loads")


# Table, CSV and JSON.


@pytest.mark.parametrize("units", ["si", "us"])
@pytest.mark.parametrize("name", DEMOS)
def test_the_csv_agrees_with_the_table_number_by_number(
    name: str, units: str, capsys: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.setenv("COLUMNS", "200")
    shown = table_rows(printed(capsys, demo(name), "--units", units))
    rows = [row for row in csv_rows(printed(capsys, demo(name), "--units", units, "--csv"))[1:] if row[2]]
    assert [(label, unit) for label, unit, _ in shown] == [(row[1].strip(), row[2]) for row in rows]
    assert len(rows) > 20
    for (label, _, cells), row in zip(shown, rows, strict=True):
        assert len(cells) == len(row) - 3
        for cell, number in zip(cells, row[3:], strict=True):
            if cell == "-":
                assert number == ""
                continue
            decimals = len(cell.partition(".")[2])
            assert float(cell.replace(" ", "")) == pytest.approx(float(number), abs=0.5001 * 10**-decimals), label


@pytest.mark.parametrize("name", DEMOS)
def test_the_json_agrees_with_the_csv(name: str, capsys: pytest.CaptureFixture[str]) -> None:
    whole = json.loads(printed(capsys, demo(name), "--json"))
    rows = csv_rows(printed(capsys, demo(name), "--csv"))
    assert rows[0][3:] == [each["name"] for each in whole["settings"]]
    factors = {"%": 100.0, "ppm": 1e6, "kg/kg": 1.0, "MWh": 1 / 3.6e9, "t": 1e-3, "EUR": 1.0}
    compared = 0
    for row in rows[1:]:
        if not row[2]:
            continue
        for place, cell in enumerate(row[3:]):
            value: Any = whole["settings"][place]
            for part in row[0].split("."):
                value = value.get(part) if isinstance(value, dict) else None
            if not isinstance(value, int | float):
                continue
            expected = value - 273.15 if row[2] == "degC" else value * factors.get(row[2], 0.0)
            if row[2] == "degC" or row[2] in factors:
                assert float(cell) == pytest.approx(expected, rel=1e-12, abs=1e-12), row[0]
                compared += 1
    assert compared > 20 * len(whole["settings"])


def test_json_and_csv_together_are_refused(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["account", LAUNDRY, "--json", "--csv"]) == 2
    out, err = capsys.readouterr()
    assert out == ""
    assert "--json and --csv cannot both be asked for; choose one" in err


def test_json_is_in_si_and_on_both_bases_whatever_is_asked_for(capsys: pytest.CaptureFixture[str]) -> None:
    plain = printed(capsys, LAUNDRY, "--json")
    assert printed(capsys, LAUNDRY, "--json", "--units", "us", "--basis", "net") == plain


# Units and basis.


def test_units_us_shows_degrees_fahrenheit(capsys: pytest.CaptureFixture[str]) -> None:
    si = {label: (unit, cells) for label, unit, cells in table_rows(printed(capsys, LAUNDRY))}
    us = {label: (unit, cells) for label, unit, cells in table_rows(printed(capsys, LAUNDRY, "--units", "us"))}
    assert si["Water dew point"][0] == "degC"
    assert us["Water dew point"][0] == "degF"
    for celsius, fahrenheit in zip(si["Water dew point"][1], us["Water dew point"][1], strict=True):
        assert float(fahrenheit) == pytest.approx(float(celsius) * 1.8 + 32, abs=0.15)
    assert si["Useful heat, gross"] == us["Useful heat, gross"]


def test_basis_net_shows_the_account_on_the_net_value(capsys: pytest.CaptureFixture[str]) -> None:
    text = printed(capsys, LAUNDRY, "--basis", "net")
    assert "percent of net heat input" in text
    assert "heat account, net" in text
    rows = {label: cells for label, _, cells in table_rows(text)}
    gross = {label: cells for label, _, cells in table_rows(printed(capsys, LAUNDRY))}
    assert rows["Useful heat, net"] == gross["Useful heat, net"]
    for cells, label in ((rows["Dry flue gas"], "Dry flue gas"), (rows["Surface"], "Surface")):
        for net, other in zip(cells, gross[label], strict=True):
            assert float(net) > float(other)
    assert list(rows).index("Useful heat, net") < list(rows).index("Useful heat, gross")


def test_the_basis_of_the_file_is_shown_first_if_none_is_asked_for(capsys: pytest.CaptureFixture[str]) -> None:
    assert "heat account, net" in printed(capsys, demo("heating-plant-chips.toml"))


# Width.


def test_many_settings_keep_to_eighty_columns_in_blocks_led_by_the_baseline(
    tmp_path: Path, capsys: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.setenv("COLUMNS", "80")
    text = printed(capsys, written(tmp_path, many(14)))
    assert max(cell_len(line) for line in text.splitlines()) <= 80
    headings = [line for line in text.splitlines() if "Load 3*" in line]
    assert len(headings) == 5
    assert all(line.split("Load")[1].strip() == "3*" for line in headings)
    shown = [part.strip() for line in headings for part in line.split("Load")[2:]]
    assert shown == [str(number) for number in range(1, 15) if number != 3]
    assert text.count("Useful heat, gross") == 5
    assert text.count(SAFETY[:30]) == 1


@pytest.mark.parametrize("width", [60, 80, 100, 140, 200])
@pytest.mark.parametrize("name", DEMOS)
def test_no_line_is_wider_than_the_terminal(
    name: str, width: int, capsys: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.setenv("COLUMNS", str(width))
    lines = printed(capsys, demo(name)).splitlines()
    assert max(cell_len(line) for line in lines) <= width
    assert all(line == line.rstrip() for line in lines)


def test_a_wide_terminal_takes_all_settings_in_one_block(
    tmp_path: Path, capsys: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.setenv("COLUMNS", "200")
    text = printed(capsys, written(tmp_path, many(14)))
    assert text.count("Useful heat, gross") == 1
    assert all(f"Load {number}" in text for number in range(1, 15))


def test_large_numbers_are_not_broken_across_lines(
    tmp_path: Path, capsys: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.setenv("COLUMNS", "80")
    plain = document(
        {**GAS, "price": "6000 JPY/MWh"},
        setting("As found"),
        setting("Less air", o2="3 %"),
        setting("Cooled", o2="3 %", flue_temperature="120 degC"),
        plant={"heat_input": "1500 MW", "operating_hours": "8000 h"},
    )
    file = written(tmp_path, plain)
    whole = json.loads(printed(capsys, file, "--json"))
    cost = whole["settings"][2]["against_baseline"]["cost"]
    assert cost < -1e9
    lines = printed(capsys, file).splitlines()
    (line,) = [line for line in lines if "Cost a year" in line]
    assert line.endswith(f"{cost:+,.0f}".replace(",", " "))
    assert max(cell_len(line) for line in lines) <= 80


# Colour.


def test_a_pipe_gets_no_escape_sequences(capsys: pytest.CaptureFixture[str]) -> None:
    for words in ((), ("--csv",), ("--json",), ("--units", "us")):
        assert ESCAPE not in printed(capsys, LAUNDRY, *words)


def test_a_terminal_gets_bold_and_no_color_takes_it_away(
    capsys: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch
) -> None:
    plain = printed(capsys, LAUNDRY)
    monkeypatch.setenv("FORCE_COLOR", "1")
    styled = printed(capsys, LAUNDRY)
    assert f"{ESCAPE}[1m" in styled
    monkeypatch.setenv("NO_COLOR", "1")
    assert printed(capsys, LAUNDRY) == plain


# Hostile names.


HOSTILE = (
    "[bold]x[/oops]",
    "[link=file:///etc]y[/link]",
    "=1+1",
    "染色工場のボイラー",
    "x" * 200,
    ":smile: 100%",
    "{0} %s {x!r}",
)


@pytest.mark.parametrize("name", HOSTILE, ids=lambda name: name[:12])
def test_names_are_shown_literally(
    name: str, tmp_path: Path, capsys: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.setenv("COLUMNS", "80")
    monkeypatch.setenv("FORCE_COLOR", "1")
    plain = document(
        {**GAS, "name": name},
        setting(name, co="2000 ppm"),
        setting("Other", compare_with=name),
        setting("Third", compare_with="Other"),
        title=name,
        plant={"other_losses": {name: "1 %"}},
    )
    file = written(tmp_path, plain)
    text = printed(capsys, file)
    assert name[:40] in text
    assert f"{ESCAPE}]" not in text
    monkeypatch.setenv("NO_COLOR", "1")
    lines = printed(capsys, file).splitlines()
    assert lines[0].startswith(name[:40])
    assert max(cell_len(line) for line in lines) <= 80
    assert json.loads(printed(capsys, file, "--json"))["title"] == name
    assert main(["check", file]) == 0
    assert name[:40] in capsys.readouterr().out


# Streams.


def test_the_note_about_keys_without_effect_goes_to_standard_error(
    tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    plain = document(GAS, setting("A", note="Free text"), accuracy={"o2": {"shared": "0.2 vol%"}})
    file = written(tmp_path, plain)
    for words in (["account", file], ["account", file, "--json"], ["account", file, "--csv"], ["check", file]):
        assert main(words) == 0
        out, err = capsys.readouterr()
        assert "without effect" not in out
        assert err == "note: understood but without effect in this version: accuracy\n"


def test_cautions_are_data_and_leave_the_status_at_zero(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    file = written(tmp_path, document(GAS, setting("A", co="1500 ppm"), setting("B", co="1500 ppm")))
    assert main(["account", file]) == 0
    out, err = capsys.readouterr()
    assert err == ""
    assert "cautions: 1" in out
    assert "! all settings: CO is " in out
    assert "licensed person" in " ".join(out.split())
    assert out.rstrip().endswith("maker's instructions lead.")


def test_a_fuel_rich_setting_shows_dashes_and_says_why(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    rich = setting("Rich", o2=None, co=None, excess_air="-10 %")
    text = printed(capsys, written(tmp_path, document(GAS, setting("Lean"), rich)))
    rows = {label: cells for label, _, cells in table_rows(text)}
    assert rows["Useful heat, gross"][1] == "-"
    assert rows["Excess air"][1] == "-10.00"
    assert "nan" not in text.lower()
    assert "air is never added to a fuel-rich hot chamber" in " ".join(text.split())


def test_wet_and_dry_oxygen_are_told_apart(capsys: pytest.CaptureFixture[str]) -> None:
    text = printed(capsys, demo("heating-plant-chips.toml"))
    assert any(line.split() == ["O2", "basis", "wet", "wet", "wet"] for line in text.splitlines())


def test_repeat_readings_are_shown_with_their_number(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    readings = [{"o2": "6 %", "co": "40 ppm"}, {"o2": "7 %", "co": "60 mg/Nm3"}]
    text = printed(capsys, written(tmp_path, document(GAS, setting("A", o2=None, co=None, readings=readings))))
    assert "6.5 % (2)" in text
    assert "2 readings" in text
