"""Hostile files: refused in a few plain lines, whatever is in them; nothing is evaluated, nothing blows up."""

import random
from pathlib import Path

import pytest
from hypothesis import given
from hypothesis import strategies as st

from fluegas.errors import ScenarioError
from fluegas.scenario.lines import round_trip_problem
from fluegas.scenario.reading import parse_scenario, read_scenario
from tests.scenario.files import GAS, HEAD, SAMPLE, SETTING, SMALL, problems_of

LONGEST_MESSAGE = 700

BOMBS = {
    "8000 settings": HEAD + GAS + "[[setting]]\nname='A'\n" * 8000,
    "400 bad settings": HEAD + GAS + "".join(f"[[setting]]\nname='A{n}'\no2='4 bar'\nzork=3\n" for n in range(400)),
    "20000 unknown keys": SMALL + "".join(f"k{n} = 1\n" for n in range(20_000)),
    "15000 repeats": SMALL + "readings = [" + "{o2='4 %'}," * 15_000 + "]\n",
    "10000 losses": HEAD + "[plant.other_losses]\n" + "".join(f"x{n}='1 %'\n" for n in range(10_000)) + GAS + SETTING,
    "a dotted key of 50000 parts": SMALL + ".".join(["a"] * 50_000) + " = 1\n",
    "a quoted dotted key of 30000 parts": SMALL + " . ".join(['"a\\""'] * 30_000) + " = 1\n",
    "a header of 50000 parts": SMALL + "[" + ".".join(["a"] * 50_000) + "]\n",
    "10000 headers": HEAD + "".join(f"[a.b{n}]\n" for n in range(10_000)) + GAS + SETTING,
    "50000 arrays deep": HEAD + "title = " + "[" * 50_000 + "]" * 50_000 + "\n" + GAS + SETTING,
    "200 arrays deep": HEAD + "basis = " + "[" * 200 + "]" * 200 + "\n" + GAS + SETTING,
    "20000 tables deep": HEAD + "title = " + "{a=" * 20_000 + "1" + "}" * 20_000 + "\n" + GAS + SETTING,
    "200 tables deep": HEAD + "basis = " + "{a=" * 200 + "1" + "}" * 200 + "\n" + GAS + SETTING,
    "dotted keys in tables in tables": HEAD
    + "".join(f"b{n} = " + ("{" + "a." * 30 + "a=") * 100 + "1" + "}" * 100 + "\n" for n in range(30)),
    "a number of 200000 digits": "fluegas = " + "9" * 200_000 + "\n" + GAS + SETTING,
    "a number of 100000 hexadecimal digits": "fluegas = 0x" + "f" * 100_000 + "\n" + GAS + SETTING,
    "hexadecimal digits where a text belongs": HEAD + "basis = [0x" + "f" * 100_000 + "]\n" + GAS + SETTING,
    "hexadecimal digits in accuracy": HEAD + "[accuracy]\nseed = 0x" + "f" * 100_000 + "\n" + GAS + SETTING,
    "a quantity of many digits": SMALL.replace('"6.4 %"', '"' + "9" * 100_000 + ' %"'),
    "a power of powers": SMALL.replace("6.4 %", "9**9**9 %"),
    "a call": SMALL.replace("6.4 %", "__import__('os').getcwd() %"),
    "a key of 200000 letters": HEAD + "a" * 200_000 + " = 1\n" + GAS + SETTING,
    "a loss of 100000 letters": HEAD + "[plant.other_losses]\n" + "x" * 100_000 + " = '1 %'\n" + GAS + SETTING,
    "a title of 200000 letters": HEAD + "title = '" + "x" * 200_000 + "'\n" + GAS + SETTING,
    "control characters in a key": HEAD + '"a\\n\\u001b[31m" = 1\n' + GAS + SETTING,
    "control characters in a loss": HEAD + '[plant.other_losses]\n"\\u001b[31m" = "1 %"\n' + GAS + SETTING,
    "control characters in a choice": HEAD + 'basis = "\\u001b[31m"\n' + GAS + SETTING,
    "control characters in a quantity": SMALL.replace("6.4 %", "6.4 \\u001b[31m"),
    "control characters in a title": HEAD + 'title = "\\u0007"\n' + GAS + SETTING,
    "writing turned round": HEAD + 'title = "\\u202e abc"\n' + GAS + SETTING,
    "a surrogate": HEAD + "title = '\ud800'\n" + GAS + SETTING,
    "a NUL": HEAD + "\0" + GAS + SETTING,
    "a lone carriage return": HEAD.rstrip() + "\rtitle = 'x'\n" + GAS + SETTING,
    "a day that is not": HEAD + "title = 2026-02-31\n" + GAS + SETTING,
    "accuracy of anything": HEAD
    + "[accuracy]\nfuel = 3\no2 = [[[1]]]\nco = {shared = [{}], kind = [1]}\n"
    + GAS
    + SETTING,
    "wrong types everywhere": "fluegas = []\ntitle = {}\nplant = 1\nfuel = 'x'\nair = []\nlimits = 1.5\nsetting = [1]",
}


@pytest.mark.parametrize("name", BOMBS)
def test_a_hostile_text_is_refused_in_a_few_plain_lines(name: str) -> None:
    with pytest.raises(ScenarioError) as caught:
        parse_scenario(BOMBS[name], "some.toml")
    assert 1 <= len(caught.value.problems) <= 101
    for problem in caught.value.problems:
        assert len(str(problem)) <= LONGEST_MESSAGE
        assert str(problem).isprintable()


def test_markup_in_a_text_is_kept_as_text() -> None:
    text = HEAD + 'title = "[red]x[/red]"\n' + GAS + SETTING
    assert parse_scenario(text).top.text("title") == "[red]x[/red]"


@pytest.mark.parametrize("title", ["Chaudière\u00a02", "دیگ\u200cبخار", "ボイラー\u3000二"])
def test_titles_of_other_languages_are_plain_text(title: str) -> None:
    assert parse_scenario(HEAD + f'title = "{title}"\n' + GAS + SETTING).top.text("title") == title


def test_a_note_may_have_lines_and_other_texts_may_not() -> None:
    assert problems_of(HEAD + 'note = """one\n\ttwo"""\n' + GAS + SETTING) == []
    assert len(problems_of(HEAD + 'title = """one\ntwo"""\n' + GAS + SETTING)) == 1


CASES = {
    "nothing": (b"", "is empty"),
    "only a comment": (b"# nothing\n", "is empty"),
    "Latin-1": (SAMPLE.encode("latin-1").replace(b"Boiler 2", b"Br\xfcner"), "is not UTF-8 text; save it as UTF-8"),
    "UTF-16": (SAMPLE.encode("utf-16"), "is not UTF-8 text; save it as UTF-8"),
    "a picture": (b"\x89PNG\r\n\x1a\n" + bytes(range(256)), "is not UTF-8 text; save it as UTF-8"),
    "too large": (b"# " + b"x" * 300_000, "is larger than 256 kB"),
}


@pytest.mark.parametrize("name", CASES)
def test_a_file_that_is_no_scenario_has_one_plain_problem(name: str, tmp_path: Path) -> None:
    content, said = CASES[name]
    file = tmp_path / "some.toml"
    file.write_bytes(content)
    with pytest.raises(ScenarioError, match=said) as caught:
        read_scenario(file)
    assert len(caught.value.problems) == 1


def test_the_line_of_a_byte_that_is_not_utf8_is_told(tmp_path: Path) -> None:
    file = tmp_path / "some.toml"
    file.write_bytes(HEAD.encode() + b'title = "20 \xb0C"\n')
    with pytest.raises(ScenarioError) as caught:
        read_scenario(file)
    assert caught.value.problems[0].line == 2


def test_no_file_and_a_folder_are_said(tmp_path: Path) -> None:
    with pytest.raises(ScenarioError, match="there is no such file"):
        read_scenario(tmp_path / "missing.toml")
    with pytest.raises(ScenarioError, match="is a folder; name a scenario file"):
        read_scenario(tmp_path)
    with pytest.raises(ScenarioError):
        read_scenario("a\0b")


@pytest.mark.parametrize("content", [b"\xef\xbb\xbf" + SAMPLE.encode(), SAMPLE.replace("\n", "\r\n").encode()])
def test_a_mark_at_the_start_and_windows_line_ends_do_not_matter(content: bytes, tmp_path: Path) -> None:
    file = tmp_path / "some.toml"
    file.write_bytes(content)
    assert read_scenario(file).settings == parse_scenario(SAMPLE).settings
    assert parse_scenario("\ufeff" + SAMPLE).settings == parse_scenario(SAMPLE).settings


SNIPPETS = [*"\"[]{}=.,#\n'\\", "nan", "inf", "true", "-", "9" * 30, "\0", "\u202e", "[[setting]]", "[air]", '"""', "é"]


@given(st.integers(0, 2**32), st.integers(1, 6))
def test_a_sound_file_damaged_at_random_is_read_or_refused(seed: int, count: int) -> None:
    chance = random.Random(seed)
    text = SAMPLE
    for _ in range(count):
        start = chance.randrange(len(text) + 1)
        end = min(len(text), start + chance.choice([0, 0, 1, 1, 5, 40]))
        text = text[:start] + chance.choice(["", *SNIPPETS, text[start:end] * 2]) + text[end:]
    try:
        scenario = parse_scenario(text, "some.toml")
    except ScenarioError as error:
        lines = text.count("\n") + 1
        for problem in error.problems:
            assert problem.message
            assert problem.line is None or 1 <= problem.line <= lines
            assert str(problem).isprintable()
    else:
        assert scenario.settings
    said = round_trip_problem(text)
    assert said is None or said.isprintable()
