"""Files that mean no good, or are no scenario at all: a plain message, quickly, and nothing evaluated."""

import os
import sys
from pathlib import Path

import pytest

from fluegas.__main__ import main
from fluegas.errors import ScenarioError
from fluegas.scenario.fields import LARGEST_FILE
from fluegas.scenario.reading import read_scenario
from tests.scenario.documents import GAS, document, problems_of, result_of, setting, text_of

SOUND = text_of(document(GAS))


def said(text: str) -> str:
    """Return what is said of a text, problem by problem; "" if it can be worked out."""
    return "\n".join(f"{problem.line}: {problem.key}: {problem.message}" for problem in problems_of(text))


def said_of_file(file: str | Path) -> str:
    with pytest.raises(ScenarioError) as caught:
        read_scenario(file)
    (problem,) = caught.value.problems
    return problem.message


# Numbers.


@pytest.mark.parametrize("number", ["9**9**9", "1e400", "9" * 50, "nan", "inf", "-inf", "0x10", "1_000", "exit(1)"])
def test_a_text_that_is_no_sane_number_is_refused(number: str) -> None:
    message = said(SOUND.replace('"231 degC"', f'"{number} degC"'))
    assert "setting[1].flue_temperature: " in message
    assert "\n" not in message
    assert len(message) < 200


@pytest.mark.parametrize("number", ["nan", "inf", "-inf", "1e400", "-1e400", "1e308", "9" * 300, "0x" + "f" * 9000])
@pytest.mark.parametrize("key", ["methane = 93.1", 'o2 = "6.4 %"', "fluegas = 1"])
def test_a_bare_number_beyond_reason_is_refused(number: str, key: str) -> None:
    name = key.partition(" ")[0]
    message = said(SOUND.replace(key, f"{name} = {number}"))
    assert f"{name}: " in message
    assert "\n" not in message
    assert len(message) < 200


def test_a_number_of_thousands_of_digits_is_refused_as_such() -> None:
    message = said(SOUND.replace("93.1", "9" * 5000))
    assert message == "None: : holds a number of thousands of digits; nothing measured needs them"


@pytest.mark.parametrize(
    "line",
    [
        "basis = {}",
        "title = {}",
        "accuracy.seed = {}",
        "accuracy.o2.shared = {}",
        "accuracy.o2.kind = {}",
        "accuracy.confidence = {}",
        "plant.surface_loss = {}",
        "plant.heat_input = {}",
        "limits.carbon_monoxide = {}",
    ],
)
@pytest.mark.parametrize(
    "value",
    [
        "0x" + "f" * 9000,
        "[" * 60 + "]" * 60,
        "{ a = " * 60 + "1" + " }" * 60,
        "{ a.b.c.d.e.f.g.h = " * 60 + "1" + " }" * 60,
    ],
    ids=["digits", "arrays", "tables", "keys"],
)
def test_a_value_too_big_to_show_gives_a_short_message(line: str, value: str) -> None:
    message = said(line.format(value) + "\n" + SOUND)
    assert message.startswith("1: ")
    assert all(len(each) < 250 for each in message.splitlines())


# Depth and size.


@pytest.mark.parametrize(
    "text",
    [
        "a = " + "[" * 100_000 + "]" * 100_000,
        "a = " + "[" * 100_000,
        "a = " + "{ b = " * 40_000,
        "a" + ".a" * 100_000 + " = 1",
        '"a"' + '."a"' * 50_000 + " = 1",
        "[a" + " . 'a'" * 30_000 + "]",
        "[[a" + ".a" * 100_000 + "]]",
    ],
    ids=["arrays", "open-arrays", "inline-tables", "dotted-key", "quoted-key", "header", "array-header"],
)
def test_deep_nesting_is_refused(text: str) -> None:
    assert said(text) == "None: : nests keys, tables or arrays too deep"


def test_long_words_without_dots_are_only_unknown() -> None:
    assert "unknown key" in said("a" * 200_000 + " = 1\n" + SOUND)
    assert "unknown key" in said('"' + "a " * 100_000 + '" = 1\n' + SOUND)


def test_a_note_may_hold_dots() -> None:
    assert said('note = "1.2.3 ... and so on ............................................ see a.b.c.d"\n' + SOUND) == ""


def test_settings_are_bounded() -> None:
    many = document(GAS, *(setting(f"Setting {place}") for place in range(401)))
    assert said(text_of(many)).partition("\n")[0].endswith("setting: holds 401 tables; at most 400 are taken")
    del many["setting"][400]
    assert len(result_of(many).case.columns) == 400


def test_only_the_first_hundred_problems_are_listed() -> None:
    text = "\n".join(f"unknown_{place} = 1" for place in range(5000)) + "\n" + SOUND
    lines = said(text).splitlines()
    assert len(lines) == 101
    assert lines[-1] == "None: : and 4900 more problems"
    assert [int(line.partition(":")[0]) for line in lines[:-1]] == list(range(1, 101))


def test_a_large_file_is_refused_by_its_size_before_it_is_read(tmp_path: Path) -> None:
    file = tmp_path / "large.toml"
    file.write_text(SOUND + "# " + "x" * 300_000, encoding="utf-8")
    assert said_of_file(file) == "is larger than 256 kB; a scenario file holds far less"
    file.write_text(SOUND + "#" + "x" * (LARGEST_FILE - len(SOUND) - 1), encoding="utf-8")
    assert read_scenario(file).settings


# No scenario at all.


@pytest.mark.parametrize(
    ("content", "expected"),
    [
        (b"", "is empty; the first line must be: fluegas = 1"),
        (b"\n\n# nothing here\n", "is empty; the first line must be: fluegas = 1"),
        (b"\x89PNG\r\n\x1a\n\x00\x00\x00", "is not UTF-8 text; save it as UTF-8"),
        ('fluegas = 1\ntitle = "Färberei"'.encode("latin-1"), "is not UTF-8 text; save it as UTF-8"),
        ('fluegas = 1\ntitle = "x"'.encode("utf-16"), "is not UTF-8 text; save it as UTF-8"),
        (b"\x00" * 100, "invalid statement"),
        (b"[1, 2, 3]", "expected ']' at the end of a table declaration"),
        (b'{"fluegas": 1}', "invalid statement"),
    ],
    ids=["empty", "comment", "binary", "latin-1", "utf-16", "zeros", "list", "json"],
)
def test_a_file_that_is_no_scenario_says_what_it_is(content: bytes, expected: str, tmp_path: Path) -> None:
    file = tmp_path / "file.toml"
    file.write_bytes(content)
    assert said_of_file(file) == expected


def test_a_file_in_another_encoding_says_on_which_line(tmp_path: Path) -> None:
    file = tmp_path / "file.toml"
    file.write_bytes('fluegas = 1\n\ntitle = "Färberei"\n'.encode("latin-1"))
    with pytest.raises(ScenarioError, match=r"file\.toml:3: is not UTF-8"):
        read_scenario(file)


def test_a_byte_order_mark_is_passed_over(tmp_path: Path) -> None:
    file = tmp_path / "file.toml"
    file.write_bytes(b"\xef\xbb\xbf" + SOUND.encode())
    assert read_scenario(file).settings[0].text("name") == "As found"


def test_a_folder_a_missing_file_and_a_name_that_cannot_be() -> None:
    assert said_of_file(Path(__file__).parent) == "is a folder; name a scenario file"
    assert said_of_file("no/such/file.toml") == "there is no such file"
    assert said_of_file("a\0b.toml") == "there is no such file"
    assert said_of_file("x" * 5000) in ("there is no such file", "cannot be read: File name too long")
    assert said_of_file("") == "is a folder; name a scenario file"


@pytest.mark.skipif(sys.platform == "win32", reason="no such files there")
def test_a_pipe_and_a_device_are_not_waited_for(tmp_path: Path) -> None:
    pipe = tmp_path / "pipe"
    os.mkfifo(pipe)
    assert said_of_file(pipe) == "is not an ordinary file"
    assert said_of_file("/dev/zero") == "is not an ordinary file"


@pytest.mark.skipif(sys.platform == "win32", reason="permissions differ there")
def test_a_file_that_may_not_be_read_says_why(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    file = tmp_path / "file.toml"
    file.write_text(SOUND, encoding="utf-8")

    def refuse(*_: object, **__: object) -> None:
        raise PermissionError(13, "Permission denied")

    monkeypatch.setattr(Path, "open", refuse)
    assert said_of_file(file) == "cannot be read: Permission denied"


@pytest.mark.parametrize("name", ["a\x1b[31mb.toml", "a\x9b31mb.toml", "a\nb.toml", "a\u202eb.toml"])
def test_the_name_of_a_file_is_shown_without_what_a_terminal_obeys(
    name: str, capsys: pytest.CaptureFixture[str]
) -> None:
    assert main(["account", name]) == 2
    out, err = capsys.readouterr()
    assert out == ""
    assert err.count("\n") == 1
    assert err.rstrip("\n").isprintable()


# Texts.


CONTROLS = (
    "\\u001b[31mred",
    "\\u009b31m",
    "\\u202egnp.exe",
    "\\u2066x\\u2069",
    "a\\rb",
    "a\\nb",
    "a\\u0000b",
    "\\u200b",
    "\\ud7ff\\ue000",
)


@pytest.mark.parametrize("text", CONTROLS)
@pytest.mark.parametrize(
    "line", ['title = "{}"', 'basis = "{}"', '"{}" = 1', 'plant.name = "{}"', 'plant.other_losses."{}" = "1 %"']
)
def test_control_and_bidirectional_characters_are_refused_and_shown_as_escapes(text: str, line: str) -> None:
    message = said(line.format(text) + "\n" + SOUND)
    assert message.startswith("1: ")
    assert message.isprintable()


@pytest.mark.parametrize("key", ["\\u001b[31m", "", "  ", "x" * 201])
def test_a_loss_may_not_be_called_what_cannot_be_shown(key: str) -> None:
    message = said(f'plant.other_losses."{key}" = "1 %"\n' + SOUND)
    assert message.startswith("1: plant.other_losses.")
    assert "\n" not in message
