"""data/ and scenarios/ are found from a wheel, an editable install and a bare checkout, from any working directory."""

import json
import os
import subprocess
import sys
import sysconfig
import venv
import zipfile
from pathlib import Path

import pytest

CHECKOUT = Path(__file__).resolve().parent.parent
DEMO = "laundry-boiler.toml"


def run(*words: str | Path, cwd: Path, **environment: str) -> subprocess.CompletedProcess[str]:
    inherited = {name: value for name, value in os.environ.items() if name != "PYTHONPATH"}
    return subprocess.run(
        [str(word) for word in words],
        cwd=cwd,
        env={**inherited, **environment},
        capture_output=True,
        text=True,
        encoding="utf-8",
        check=False,
    )


@pytest.fixture(scope="module")
def wheel(tmp_path_factory: pytest.TempPathFactory) -> Path:
    out = tmp_path_factory.mktemp("wheel")
    words = ["pip", "wheel", "-q", "--no-build-isolation", "--no-deps", "--no-index", "-w", str(out), str(CHECKOUT)]
    built = run(sys.executable, "-m", *words, cwd=out)
    assert built.returncode == 0, built.stderr
    (found,) = out.glob("*.whl")
    return found


@pytest.fixture(scope="module")
def installed(wheel: Path, tmp_path_factory: pytest.TempPathFactory) -> Path:
    """A virtual environment that has the wheel and sees this one's packages, but not this checkout."""
    folder = tmp_path_factory.mktemp("environment")
    venv.create(folder, with_pip=False, symlinks=True)
    python = folder / "bin" / "python"
    site = Path(run(python, "-c", "import sysconfig; print(sysconfig.get_path('purelib'))", cwd=folder).stdout.strip())
    with zipfile.ZipFile(wheel) as archive:
        archive.extractall(site)
    (site / "packages.pth").write_text(sysconfig.get_path("purelib") + "\n", encoding="utf-8")
    return python


def account_of_the_demo(python: Path | str, folder: Path, **environment: str) -> dict[str, object]:
    code = "from fluegas.resources import folder; import fluegas; print(fluegas.__file__); print(folder('scenarios'))"
    where = run(python, "-c", code, cwd=folder, **environment).stdout.splitlines()
    done = run(python, "-m", "fluegas", "account", Path(where[1]) / DEMO, "--json", cwd=folder, **environment)
    assert done.returncode == 0, done.stderr
    return {"package": where[0], "result": json.loads(done.stdout)}


def test_the_wheel_carries_data_and_scenarios_and_no_tests(wheel: Path) -> None:
    names = zipfile.ZipFile(wheel).namelist()
    for name in ("data/species.toml", "data/units.txt", "data/spellings.toml", f"scenarios/{DEMO}"):
        assert f"fluegas/{name}" in names
    assert not [name for name in names if name.startswith("tests")]


def test_the_installed_wheel_does_the_main_job_elsewhere(installed: Path, tmp_path: Path) -> None:
    found = account_of_the_demo(installed, tmp_path)
    assert not str(found["package"]).startswith(str(CHECKOUT))
    here = account_of_the_demo(sys.executable, tmp_path, PYTHONPATH=str(CHECKOUT))
    assert found["result"] == here["result"]


def test_a_bare_checkout_does_the_main_job_from_another_folder(tmp_path: Path) -> None:
    found = account_of_the_demo(sys.executable, tmp_path, PYTHONPATH=str(CHECKOUT))
    assert str(found["package"]).startswith(str(CHECKOUT))


def test_an_installation_without_its_data_says_so(wheel: Path, installed: Path, tmp_path: Path) -> None:
    with zipfile.ZipFile(wheel) as archive:
        names = [name for name in archive.namelist() if not name.startswith(("fluegas/data", "fluegas/scenarios"))]
        archive.extractall(tmp_path, names)
    (tmp_path / "some.toml").write_bytes((CHECKOUT / "scenarios" / DEMO).read_bytes())
    done = run(installed, "-m", "fluegas", "account", "some.toml", cwd=tmp_path)
    assert done.returncode == 1
    assert done.stderr == (
        "fluegas: fluegas is installed without its folder 'data'; install it again from a complete copy\n"
    )
