"""`fluegas new`: starters read without problems, work out, and name only inputs that there are."""

import json
import tomllib
from pathlib import Path

import pytest

from fluegas.__main__ import main
from fluegas.errors import InputError
from fluegas.scenario.checking import unused_keys
from fluegas.scenario.fields import FIELDS_OF
from fluegas.scenario.reading import parse_scenario
from fluegas.scenario.starter import WIDTH, starter_text, suggestion
from fluegas.scenario.values import value_of
from tests.cli.golden_files import assert_golden

STATES = ("gas", "liquid", "solid")


@pytest.mark.parametrize("state", STATES)
def test_a_starter_is_sound_and_works_out(state: str, tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    file = tmp_path / "audit.toml"
    assert main(["new", str(file), "--fuel", state]) == 0
    out, err = capsys.readouterr()
    assert out == ""
    assert err == f"note: written: {file}; try: fluegas account {file}\n"
    assert list(tmp_path.iterdir()) == [file]
    assert main(["account", str(file), "--json"]) == 0
    out, err = capsys.readouterr()
    assert err == ""
    result = json.loads(out)
    assert len(result["settings"]) == 2
    for setting in result["settings"]:
        assert 0.6 < setting["efficiency"]["gross"] < setting["efficiency"]["net"] < 1.0
        assert setting["cautions"] == []
    assert result["settings"][1]["against_baseline"]["fuel"] < 0
    assert main(["check", str(file)]) == 0


@pytest.mark.parametrize("state", STATES)
def test_a_starter_is_as_it_was_looked_at(state: str, capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["new", "-", "--fuel", state]) == 0
    out = capsys.readouterr().out
    assert out == starter_text(state)
    assert max(map(len, out.splitlines())) <= WIDTH
    assert_golden(f"starter-{state}.toml", out)


@pytest.mark.parametrize("state", STATES)
def test_every_key_in_a_starter_is_in_force_and_so_is_every_key_offered(state: str) -> None:
    """Each commented entry, uncommented, is a value that its field takes; none is unused or for a later version."""
    text = starter_text(state)
    assert unused_keys(parse_scenario(text)) == ()
    table, offered = "top", 0
    for line in text.splitlines():
        if line.lstrip("#").startswith("["):
            table = line.strip("#[]")
        elif line.startswith("#") and not line.startswith("# "):
            ((key, value),) = tomllib.loads(line.removeprefix("#")).items()
            field = FIELDS_OF[table][key]
            assert field.later is None
            assert not field.unused
            value_of(field, value)
            offered += 1
    assert offered > 25


@pytest.mark.parametrize("state", STATES)
@pytest.mark.parametrize("table", ["plant", "fuel", "air", "setting", "limits"])
def test_every_input_that_is_in_force_is_in_the_starter(state: str, table: str) -> None:
    text = starter_text(state)
    only_solid = {"analysis_basis", "heating_value_at", "specific_heat"}
    for key, field in FIELDS_OF[table].items():
        if field.later is None and not field.unused and field.kind not in ("table", "rows", "text"):
            there = any(line.lstrip("#").startswith(f"{key} = ") for line in text.splitlines())
            assert there == (not (state == "gas" and table == "fuel" and key in only_solid)), key


def test_every_field_has_a_suggestion_that_it_takes() -> None:
    for fields in FIELDS_OF.values():
        for field in fields.values():
            if field.later is None and field.kind in ("quantity", "choice", "flag", "price", "quantity or word"):
                value_of(field, suggestion(field))


@pytest.mark.parametrize("what", ["file", "folder", "broken link"])
def test_what_is_there_is_left_alone(what: str, tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    there = tmp_path / "there.toml"
    if what == "file":
        there.write_text("my own work", encoding="utf-8")
    elif what == "folder":
        there.mkdir()
    else:
        there.symlink_to(tmp_path / "nowhere")
    assert main(["new", str(there)]) == 2
    out, err = capsys.readouterr()
    assert out == ""
    assert "there is something of this name already; nothing was written, name another file" in err
    assert list(tmp_path.iterdir()) == [there]
    if what == "file":
        assert there.read_text(encoding="utf-8") == "my own work"


def test_a_folder_that_is_not_there_and_a_full_disk_leave_nothing(
    tmp_path: Path, capsys: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch
) -> None:
    assert main(["new", str(tmp_path / "no" / "file.toml")]) == 2
    assert "there is no such folder" in capsys.readouterr().err

    def full(_: int) -> None:
        raise OSError(28, "No space left on device")

    monkeypatch.setattr("os.fsync", full)
    assert main(["new", str(tmp_path / "file.toml")]) == 2
    assert "the disk is full" in capsys.readouterr().err
    assert list(tmp_path.iterdir()) == []


def test_an_unknown_state_is_refused(capsys: pytest.CaptureFixture[str]) -> None:
    with pytest.raises(InputError, match="states of a fuel are gas, liquid, solid"):
        starter_text("plasma")
    assert main(["new", "-", "--fuel", "plasma"]) == 2
    assert "'plasma' is not one of 'gas', 'liquid', 'solid'" in capsys.readouterr().err
