"""The entry of the program: exit statuses, help, what is said to wrong words, failures that are nobody's fault."""

from pathlib import Path

import pytest

from fluegas import __version__
from fluegas.__main__ import main
from fluegas.cli import COMMANDS
from fluegas.errors import ConvergenceError, DataError
from fluegas.scenario import reading
from tests.cli.accounts import DEMOS, demo

LAUNDRY = demo("laundry-boiler.toml")


def said(capsys: pytest.CaptureFixture[str], *words: str) -> tuple[int, str, str]:
    status = main(words)
    out, err = capsys.readouterr()
    return status, out, err


def test_version(capsys: pytest.CaptureFixture[str]) -> None:
    assert said(capsys, "--version") == (0, f"fluegas {__version__}\n", "")


@pytest.mark.parametrize("words", [("--help",), ("-h",)])
def test_help_names_every_command_and_the_exit_statuses(
    words: tuple[str, ...], capsys: pytest.CaptureFixture[str]
) -> None:
    status, out, err = said(capsys, *words)
    assert (status, err) == (0, "")
    for name in COMMANDS:
        assert f"\n  {name} " in out
    assert "it is no instruction to adjust a burner" in " ".join(out.split())
    assert "2 bad arguments or a bad file" in " ".join(out.split())
    assert max(map(len, out.splitlines())) <= 80


@pytest.mark.parametrize("name", COMMANDS)
def test_every_command_has_help(name: str, capsys: pytest.CaptureFixture[str]) -> None:
    status, out, err = said(capsys, name, "--help")
    assert (status, err) == (0, "")
    assert out.startswith(f"Usage: fluegas {name} ")


def test_without_words_the_help_goes_to_standard_error(capsys: pytest.CaptureFixture[str]) -> None:
    status, out, err = said(capsys)
    assert (status, out) == (2, "")
    assert "Commands:" in err


@pytest.mark.parametrize(
    ("words", "expected"),
    [
        (("acount", "x.toml"), "did you mean 'fluegas account'?"),
        (("boiler.toml",), "for the account of a file: fluegas account 'boiler.toml'"),
        (("a\x1b[31mb",), "fluegas account 'a\\x1b[31mb'"),
        (("account",), "Missing argument 'FILE'."),
        (("account", LAUNDRY, "--josn"), "No such option"),
        (("account", LAUNDRY, "--units", "uk"), "'uk' is not one of 'si', 'us'."),
        (("account", LAUNDRY, "--basis", "both"), "'both' is not one of 'gross', 'net'."),
        (("account", LAUNDRY, LAUNDRY), "unexpected extra argument"),
        (("account", "no-such-file.toml"), "no-such-file.toml: there is no such file"),
        (("account", "."), ".: is a folder; name a scenario file"),
        (("check", "no-such-file.toml"), "no-such-file.toml: there is no such file"),
        (("--unknown",), "No such option"),
    ],
)
def test_wrong_words_give_2_and_a_plain_message(
    words: tuple[str, ...], expected: str, capsys: pytest.CaptureFixture[str]
) -> None:
    status, out, err = said(capsys, *words)
    assert (status, out) == (2, "")
    assert expected in err
    assert "Traceback" not in err
    assert all(line.isprintable() for line in err.splitlines())


@pytest.mark.parametrize("name", DEMOS)
def test_check_says_that_the_demos_are_sound(name: str, capsys: pytest.CaptureFixture[str]) -> None:
    status, out, err = said(capsys, "check", demo(name))
    assert (status, err) == (0, "")
    assert "no problems, " in " ".join(out.split())


def test_check_shows_the_cautions_of_each_setting(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    file = tmp_path / "unit.toml"
    text = Path(LAUNDRY).read_text(encoding="utf-8").replace('co = "32 ppm"', 'co = "900 ppm"', 1)
    file.write_text(text, encoding="utf-8")
    status, out, err = said(capsys, "check", str(file))
    assert (status, err) == (0, "")
    assert "cautions: 1" in out
    assert "! Less air: CO is " in out


@pytest.mark.parametrize(
    ("error", "status", "expected"),
    [
        (ConvergenceError("the flame did not settle"), 1, "fluegas: the flame did not settle\n"),
        (DataError("a data file is missing"), 1, "fluegas: a data file is missing\n"),
        (KeyboardInterrupt(), 130, "\n"),
        (
            ZeroDivisionError("nobody's\x1b fault"),
            1,
            "fluegas: unexpected failure, please report it: ZeroDivisionError: nobody's\\x1b fault\n",
        ),
    ],
    ids=lambda value: type(value).__name__ if isinstance(value, BaseException) else "",
)
def test_failures_give_their_status_and_no_traceback(
    error: BaseException,
    status: int,
    expected: str,
    capsys: pytest.CaptureFixture[str],
    monkeypatch: pytest.MonkeyPatch,
) -> None:
    def fail(path: str) -> None:
        raise error

    monkeypatch.setattr(reading, "read_scenario", fail)
    assert said(capsys, "account", LAUNDRY) == (status, "", expected)
