"""`fluegas curve`: table, CSV, JSON, picture and drawing say the same; bad requests are answered plainly."""

import csv
import io
import json
import subprocess
import sys
from collections.abc import Callable
from pathlib import Path
from typing import Any
from xml.etree import ElementTree

import pytest

from fluegas.__main__ import main
from fluegas.accounting.curve import VARIABLES
from fluegas.accounting.figures import figures
from fluegas.cli.curve import _QUANTITIES
from fluegas.report.curve_table import rows_shown
from fluegas.report.figure_names import find_figures, titles
from fluegas.scenario.fields import FIELDS_OF
from tests.cli.golden_files import assert_golden

CHECKOUT = Path(__file__).resolve().parents[2]
GAS, OIL, CHIPS = "laundry-boiler.toml", "dye-house-oil.toml", "heating-plant-chips.toml"

Run = Callable[..., str]


@pytest.fixture
def run(monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]) -> Run:
    monkeypatch.chdir(CHECKOUT / "scenarios")
    monkeypatch.setenv("LINES", "24")
    for name in ("FLUEGAS_ASCII", "COLUMNS"):
        monkeypatch.delenv(name, raising=False)
    monkeypatch.setenv("COLUMNS", "80")

    def words(*given: str, status: int = 0) -> str:
        capsys.readouterr()
        assert main(["curve", *given]) == status
        out, err = capsys.readouterr()
        assert status == 0 or out == ""
        return err if status else out

    return words


def test_the_command_knows_every_quantity_and_its_limits() -> None:
    assert set(_QUANTITIES) == set(VARIABLES)
    for place in _QUANTITIES.values():
        assert place is None or place[1] in FIELDS_OF[place[0]]


# What is printed.

GOLDEN = {
    "curve-laundry.txt": [GAS],
    "curve-laundry-table.txt": [GAS, "--show", "table", "--against", "flue-temperature", "--figure", "dew_point.water"],
    "curve-oil-ascii.txt": [OIL, "--ascii", "--show", "picture", "--against", "air-temperature", "--units", "us"],
    "curve-chips.csv": [CHIPS, "--csv", "--against", "fuel-moisture", "--points", "5"],
    "curve-chips.json": [CHIPS, "--json", "--against", "excess-air", "--points", "4", "--from", "-5 %"],
}


@pytest.mark.parametrize("name", GOLDEN)
def test_output_is_as_it_was_looked_at(name: str, run: Run) -> None:
    assert_golden(name, run(*GOLDEN[name]))


@pytest.mark.parametrize("size", [(80, 24), (140, 40), (40, 10), (20, 5)])
@pytest.mark.parametrize("file", [GAS, OIL, CHIPS])
def test_text_keeps_to_the_width(file: str, size: tuple[int, int], run: Run, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setenv("COLUMNS", str(size[0]))
    monkeypatch.setenv("LINES", str(size[1]))
    lines = run(file, "--figure", "useful heat").splitlines()
    drawn = [line for line in lines if any("\u2801" <= character <= "\u28ff" for character in line)]
    assert drawn
    assert max(map(len, drawn)) <= size[0]
    assert "A As found*" in "\n".join(lines) or file != GAS
    if size[0] >= 40:
        assert max(map(len, lines)) <= size[0]


def test_cautions_are_counted_and_drawings_named_on_standard_error(
    run: Run, capsys: pytest.CaptureFixture[str], tmp_path: Path
) -> None:
    drawing = tmp_path / "a.svg"
    assert main(["curve", CHIPS, "--json", "--svg", str(drawing)]) == 0
    out, err = capsys.readouterr()
    json.loads(out)
    cautions = run_check(CHIPS, capsys)
    assert cautions > 0
    assert err == f"note: {cautions} cautions about the settings: fluegas check {CHIPS}\nnote: drawn into {drawing}\n"


def run_check(file: str, capsys: pytest.CaptureFixture[str]) -> int:
    """Return how many cautions `fluegas check` counts."""
    assert main(["check", file]) == 0
    return int(capsys.readouterr().out.split("cautions: ")[1].split()[0])


def test_plain_characters_by_option_by_environment_and_for_an_output_that_is_not_utf8(
    run: Run, monkeypatch: pytest.MonkeyPatch
) -> None:
    fine, plain = run(GAS), run(GAS, "--ascii")
    assert not fine.isascii()
    assert plain.isascii()
    monkeypatch.setenv("FLUEGAS_ASCII", "1")
    assert run(GAS) == plain
    monkeypatch.setenv("FLUEGAS_ASCII", "0")
    assert run(GAS) == fine
    monkeypatch.delenv("FLUEGAS_ASCII")
    words = [sys.executable, "-m", "fluegas", "curve", GAS]
    environment = {"PYTHONPATH": str(CHECKOUT), "PYTHONIOENCODING": "latin-1", "COLUMNS": "80", "LINES": "24"}
    done = subprocess.run(words, env=environment, capture_output=True, cwd=CHECKOUT / "scenarios", check=True)
    assert done.stdout.decode("ascii").replace("\r\n", "\n") == plain


# Table, CSV and JSON hold the same numbers.


def cells(text: str) -> list[list[float | None]]:
    """Return the numbers of a printed table, row by row."""
    rows = []
    for line in text.splitlines():
        words = line.split()
        if words and all(word == "-" or word.replace(".", "").lstrip("-").isdigit() for word in words):
            rows.append([None if word == "-" else float(word) for word in words])
    return rows


@pytest.mark.parametrize("figure", ["efficiency.net", "losses.gross.dry_gas", "flue_gas.dry.CO2"])
@pytest.mark.parametrize(("file", "against"), [(GAS, "o2"), (OIL, "excess-air"), (CHIPS, "fuel-moisture")])
def test_table_csv_and_json_agree(file: str, against: str, figure: str, run: Run) -> None:
    words = [file, "--against", against, "--figure", figure, "--from", "-1 %" if against == "excess-air" else "0 %"]
    whole = json.loads(run(*words, "--json"))
    header, *rows = csv.reader(io.StringIO(run(*words, "--csv")))
    names = [setting["name"] for setting in whole["settings"]]
    assert header == [f"{against} [%]", *(f"{figure} [%] {name}" for name in names)]
    assert len(rows) == len(whole["against"]["values"]) == 201
    for place, row in enumerate(rows):
        assert float(row[0]) == pytest.approx(100 * whole["against"]["values"][place], rel=1e-14, abs=1e-14)
        for cell, setting in zip(row[1:], whole["settings"], strict=True):
            value = setting["figures"][figure]["values"][place]
            assert cell == "" if value is None else float(cell) == pytest.approx(100 * value, rel=1e-14)
    printed = cells(run(*words, "--show", "table"))
    shown = rows_shown(201)
    assert len(printed) == len(shown) == 11
    for place, line in zip(shown, printed, strict=True):
        expected = [float(cell) if cell else None for cell in rows[place]]
        assert line == [None if number is None else pytest.approx(number, abs=0.00501) for number in expected]


def test_points_are_what_the_account_says_of_such_a_setting(
    run: Run, capsys: pytest.CaptureFixture[str], tmp_path: Path
) -> None:
    """A file with a further setting of 5 % O2 gives the figures of the curve at 5 % O2, all of them."""
    text = Path(GAS).read_text(encoding="utf-8")
    file = tmp_path / "more.toml"
    more = '\n[[setting]]\nname = "Five"\no2 = "5 %"\nco = "32 ppm"\nnox = "68 ppm"\nflue_temperature = "203 degC"\n'
    file.write_text(text + more, encoding="utf-8")
    assert main(["account", str(file), "--json"]) == 0
    five = json.loads(capsys.readouterr().out)["settings"][-1]
    words = [word for name in figures() for word in ("--figure", name)]
    span = ["--from", "5 %", "--to", "6 %", "--points", "2"]
    curve = json.loads(run(GAS, "--json", "--setting", "Less air", *span, *words))
    (setting,) = curve["settings"]
    for name in figures():
        value: Any = five
        for part in name.split("."):
            value = value[part]
        if name.endswith(".other"):
            value = sum(value.values())
        found = setting["figures"][name]["values"][0]
        assert found == (None if value is None else pytest.approx(value, rel=1e-12, abs=1e-15)), name


def test_own_points_are_those_of_the_account(run: Run, capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["account", CHIPS, "--json"]) == 0
    account = json.loads(capsys.readouterr().out)["settings"]
    curve = json.loads(run(CHIPS, "--json"))["settings"]
    for setting, one in zip(account, curve, strict=True):
        assert one["own"] == setting["flue_gas"]["dry"]["O2"]
        assert one["figures"]["efficiency.net"]["own"] == setting["efficiency"]["net"]


# The drawing.


def test_the_drawing_is_well_formed_and_the_same_every_time(run: Run, tmp_path: Path) -> None:
    first, second = tmp_path / "one.svg", tmp_path / "two.SVG"
    run(GAS, "--svg", str(first))
    code = "import sys; from fluegas.__main__ import main; assert main(sys.argv[1:]) == 0; print(*sys.modules)"
    words = [sys.executable, "-c", code, "curve", GAS, "--json", "--svg", str(second)]
    environment = {"PYTHONPATH": str(CHECKOUT), "HOME": str(tmp_path)}
    done = subprocess.run(words, env=environment, capture_output=True, check=True, text=True, encoding="utf-8")
    assert "matplotlib.pyplot" not in done.stdout.splitlines()[-1].split()
    assert first.read_bytes() == second.read_bytes()
    root = ElementTree.fromstring(first.read_bytes())
    assert root.tag == "{http://www.w3.org/2000/svg}svg"
    groups = {element.get("id") for element in root.iter("{http://www.w3.org/2000/svg}g")}
    assert {"axes_1", "axes_2", "legend_1"} <= groups
    text = first.read_text(encoding="utf-8")
    assert "<dc:date>" not in text
    assert sorted(file.name for file in tmp_path.iterdir() if file.suffix != "") == ["one.svg", "two.SVG"]


def test_the_drawing_takes_names_as_they_are(run: Run, tmp_path: Path) -> None:
    """Neither formulas between dollar signs, nor markup, nor a leading underscore, nor letters the font lacks."""
    text = (
        Path(GAS)
        .read_text(encoding="utf-8")
        .replace('"Less air"', r'"_$\\frac{$ <b>&-->"')
        .replace("Economiser", "空気")
    )
    file, drawing = tmp_path / "odd.toml", tmp_path / "odd.svg"
    file.write_text(text, encoding="utf-8")
    run(str(file), "--svg", str(drawing))
    root = ElementTree.fromstring(drawing.read_bytes())
    legend = next(each for each in root.iter() if each.get("id") == "legend_1")
    assert sum("text_" in (each.get("id") or "") for each in legend.iter()) == 3


def test_settings_of_the_drawing_library_change_nothing(run: Run, tmp_path: Path) -> None:
    import matplotlib

    plain, other = tmp_path / "plain.svg", tmp_path / "other.svg"
    run(GAS, "--svg", str(plain))
    with matplotlib.rc_context({"lines.linewidth": 9.0, "axes.facecolor": "black", "svg.fonttype": "none"}):
        run(GAS, "--svg", str(other))
        assert matplotlib.rcParams["lines.linewidth"] == 9.0
    assert plain.read_bytes() == other.read_bytes()


@pytest.mark.parametrize("words", [["account", GAS], ["curve", GAS], ["curve", GAS, "--json"]])
def test_without_a_drawing_the_library_for_it_is_not_imported(words: list[str]) -> None:
    code = (
        "import sys; from fluegas.__main__ import main; assert main(sys.argv[1:]) == 0; "
        "sys.exit(any(name.split('.')[0] == 'matplotlib' for name in sys.modules))"
    )
    done = subprocess.run(
        [sys.executable, "-c", code, *words],
        env={"PYTHONPATH": str(CHECKOUT)},
        cwd=CHECKOUT / "scenarios",
        capture_output=True,
        check=False,
    )
    assert done.returncode == 0, done.stderr


# Figures by name.


def test_every_figure_goes_by_its_name_and_by_its_title() -> None:
    assert len(set(titles().values())) == len(titles())
    for name in figures():
        for word in (name, name.upper(), titles()[name]):
            assert find_figures([word], "net") == [name]


@pytest.mark.parametrize(
    ("word", "gross", "net"),
    [
        ("efficiency", "efficiency.gross", "efficiency.net"),
        ("useful  heat", "efficiency.gross", "efficiency.net"),
        ("Dry flue gas", "losses.gross.dry_gas", "losses.net.dry_gas"),
        ("dry_gas", "losses.gross.dry_gas", "losses.net.dry_gas"),
        ("losses.air_moisture", "losses.gross.air_moisture", "losses.net.air_moisture"),
        ("useful heat, net", "efficiency.net", "efficiency.net"),
        ("O2, dry", "flue_gas.dry.O2", "flue_gas.dry.O2"),
    ],
)
def test_short_names(word: str, gross: str, net: str) -> None:
    assert find_figures([word, word], "gross") == [gross]
    assert find_figures([word], "net") == [net]


def test_the_list_names_every_figure(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["curve", "--list"]) == 0
    assert [line.split()[0] for line in capsys.readouterr().out.splitlines()] == list(figures())


# Bad requests.


@pytest.mark.parametrize(
    ("words", "said"),
    [
        (
            ["--figure", "eficiency"],
            "no figure is called 'eficiency'; did you mean 'efficiency'?; fluegas curve --list",
        ),
        (
            ["--figure", "air_moisture"],
            "'air_moisture' could be losses.gross.air_moisture or credits.gross.air_moisture",
        ),
        (
            ["--setting", "Less Air"],
            "--setting 'Less Air': no such setting; did you mean 'Less air'?; there are 'As found'",
        ),
        (["--from", "3"], "--from: 3 has no unit"),
        (["--to", "30 degC"], "--to: degC is a unit of temperature; here a share is needed, e.g. 6.4 %"),
        (["--to", "150 %"], "--to: '150 %' is out of range: it must be at most 100 %"),
        (["--from", "8 %", "--to", "8 %"], "give --from and --to so that --to is larger"),
        (["--to", "30 %"], "--against o2, from 1 % to 30 %: O2 in the dry flue gas is 0.21"),
        (["--against", "fuel-moisture"], "the moisture of a gas cannot be varied"),
        (["--against", "o3"], "'o3' is not one of 'o2'"),
        (["--points", "1"], "1 is not in the range 2<=x<=10001"),
        (["--json", "--csv"], "--json and --csv cannot both be asked for"),
        (["--svg", "laundry-boiler.toml"], "must end in .svg"),
        (["--svg", "no/such/folder.svg"], "not written: No such file or directory"),
    ],
)
def test_bad_requests_are_answered_plainly(words: list[str], said: str, run: Run) -> None:
    err = run(GAS, *words, status=2)
    assert said in err
    assert "Traceback" not in err


def test_a_bad_file_is_answered_like_elsewhere(run: Run) -> None:
    assert run("nowhere.toml", status=2) == "nowhere.toml: there is no such file\n"


def test_a_drawing_that_cannot_be_written_leaves_nothing_and_harms_nothing(run: Run, tmp_path: Path) -> None:
    folder = tmp_path / "a.svg"
    folder.mkdir()
    assert "not an ordinary file" in run(GAS, "--svg", str(folder), status=2)
    assert list(tmp_path.iterdir()) == [folder]
    assert list(folder.iterdir()) == []
