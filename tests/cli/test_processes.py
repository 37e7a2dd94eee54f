"""What only a process of its own shows: imports, streams, signals, locales, the folder it runs in."""

import json
import os
import shutil
import signal
import subprocess
import sys
from pathlib import Path

import pytest

from tests.cli.accounts import demo
from tests.scenario.documents import GAS, document, setting, text_of

LAUNDRY = demo("laundry-boiler.toml")
ROOT = Path(__file__).resolve().parents[2]

LOADED = (
    "import sys; from fluegas.__main__ import main; status = main(sys.argv[1:]); "
    "print(status, *sys.modules, file=sys.stderr)"
)


def environment(**changes: str) -> dict[str, str]:
    kept = {name: value for name, value in os.environ.items() if not name.startswith(("LC_", "LANG", "PYTHON"))}
    return {**kept, "PYTHONPATH": str(ROOT), **changes}


def run(*words: str, folder: Path = ROOT, **changes: str) -> subprocess.CompletedProcess[bytes]:
    command = [sys.executable, "-X", "dev", "-W", "error", "-m", "fluegas", *words]
    return subprocess.run(command, cwd=folder, env=environment(**changes), capture_output=True, timeout=60, check=False)


def modules_loaded_by(*words: str) -> set[str]:
    """Return the modules that a command has imported when it is done."""
    command = [sys.executable, "-c", LOADED, *words]
    done = subprocess.run(command, cwd=ROOT, env=environment(), capture_output=True, timeout=60, check=True, text=True)
    status, *modules = done.stderr.split()
    assert status == "0"
    return set(modules)


@pytest.mark.parametrize("words", [["--help"], ["--version"], ["account", "--help"]], ids=" ".join)
def test_help_and_version_load_no_heavy_package(words: list[str]) -> None:
    loaded = modules_loaded_by(*words)
    assert {"fluegas", "click"} <= loaded
    assert not loaded & {"numpy", "scipy", "pint", "textual", "rich", "tomlkit", "polars", "matplotlib", "jinja2"}


def test_the_account_as_json_loads_only_what_it_needs() -> None:
    """pint looks whether scipy is there, which loads its outermost module; nothing loads what is slow, its contents."""
    loaded = modules_loaded_by("account", LAUNDRY, "--json")
    assert {"numpy", "pint"} <= loaded
    assert not loaded & {"polars", "textual", "rich", "tomlkit", "matplotlib", "jinja2"}
    slow = {"scipy.stats", "scipy.optimize", "scipy.special", "scipy.linalg", "scipy.sparse", "scipy.interpolate"}
    assert not loaded & slow


def test_the_account_as_csv_needs_no_rich() -> None:
    assert "rich" not in modules_loaded_by("account", LAUNDRY, "--csv")


def test_data_and_narration_take_their_own_streams(tmp_path: Path) -> None:
    file = tmp_path / "unit.toml"
    file.write_text(text_of(document(GAS, accuracy={"o2": {"shared": "0.2 vol%"}})), encoding="utf-8")
    done = run("account", str(file), "--json")
    assert done.returncode == 0
    assert json.loads(done.stdout)["settings"][0]["name"] == "As found"
    assert done.stderr.decode().rstrip() == "note: understood but without effect in this version: accuracy"


def test_a_broken_file_gives_2_and_plain_lines(tmp_path: Path) -> None:
    file = tmp_path / "unit.toml"
    file.write_text(text_of(document(GAS, setting(o2="5"), setting("B", co=7))), encoding="utf-8")
    done = run("account", "unit.toml", folder=tmp_path)
    assert done.returncode == 2
    assert done.stdout == b""
    lines = done.stderr.decode().splitlines()
    assert len(lines) == 2
    assert all(line.startswith("unit.toml:") for line in lines)
    assert b"Traceback" not in done.stderr


@pytest.mark.parametrize("locale", ["C", "de_DE.UTF-8"])
@pytest.mark.parametrize("form", [(), ("--json",), ("--csv",)], ids=["table", "json", "csv"])
def test_a_title_beyond_ascii_in_a_narrow_locale(locale: str, form: tuple[str, ...], tmp_path: Path) -> None:
    file = tmp_path / "unit.toml"
    plain = document(GAS, setting("Volllast Ö"), title="Färberei Kessel 2, 染色")
    file.write_text(text_of(plain), encoding="utf-8")
    done = run("account", str(file), *form, LC_ALL=locale, PYTHONIOENCODING="ascii", COLUMNS="80")
    assert done.returncode == 0
    assert done.stderr == b""
    if form == ("--csv",):
        assert "Volllast Ö" in done.stdout.decode("utf-8").splitlines()[0]
        return
    text = done.stdout.decode("ascii")
    if form == ("--json",):
        whole = json.loads(text)
        assert whole["title"] == plain["title"]
        assert whole["settings"][0]["name"] == "Volllast Ö"
    else:
        assert text.startswith("F\\xe4rberei Kessel 2")
        assert "Volllast" in text


def test_it_works_from_another_folder(tmp_path: Path) -> None:
    shutil.copy(LAUNDRY, tmp_path / "unit.toml")
    inside = run("account", "unit.toml", folder=tmp_path)
    outside = run("account", LAUNDRY, folder=tmp_path)
    assert (inside.returncode, outside.returncode) == (0, 0)
    assert inside.stdout == outside.stdout
    assert list(tmp_path.iterdir()) == [tmp_path / "unit.toml"]


@pytest.mark.skipif(sys.platform == "win32", reason="pipes close otherwise there")
@pytest.mark.parametrize("form", [(), ("--json",), ("--csv",), ("--help",)], ids=["table", "json", "csv", "help"])
def test_a_closed_pipe_gives_141_and_no_word(form: tuple[str, ...]) -> None:
    reading, writing = os.pipe()
    os.close(reading)
    command = [sys.executable, "-m", "fluegas", "account", LAUNDRY, *form]
    try:
        done = subprocess.run(
            command, cwd=ROOT, env=environment(), stdout=writing, stderr=subprocess.PIPE, timeout=60, check=False
        )
    finally:
        os.close(writing)
    assert done.stderr == b""
    assert done.returncode == 141


@pytest.mark.skipif(sys.platform == "win32", reason="interrupts are sent otherwise there")
def test_an_interrupt_gives_130_and_no_traceback() -> None:
    """The interrupt comes while the file is read: the reading function raises the signal against its own process."""
    program = (
        "import os, signal, sys\n"
        "import fluegas.scenario.reading as reading\n"
        "reading.read_scenario = lambda path: os.kill(os.getpid(), signal.SIGINT)\n"
        "from fluegas.__main__ import main\n"
        f"sys.exit(main(['account', {LAUNDRY!r}]))\n"
    )
    done = subprocess.run(
        [sys.executable, "-c", program], cwd=ROOT, env=environment(), capture_output=True, timeout=60, check=False
    )
    assert done.returncode == 128 + signal.SIGINT
    assert done.stdout == b""
    assert b"Traceback" not in done.stderr
