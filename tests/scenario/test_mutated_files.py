"""Demo files damaged at random: they are worked out, or every problem is said; nothing else is ever raised."""

import numpy as np
from hypothesis import example, given, settings
from hypothesis import strategies as st

from fluegas.errors import ScenarioError
from fluegas.report.csv_output import csv_text
from fluegas.report.json_output import json_text
from fluegas.report.ledger_table import ledger_table
from fluegas.resources import folder
from fluegas.scenario.reading import parse_scenario
from fluegas.scenario.result import Result, work_out

DEMOS = tuple(
    entry.read_text(encoding="utf-8")
    for entry in sorted(folder("scenarios").iterdir(), key=lambda entry: entry.name)
    if entry.name.endswith(".toml")
)
VALUES = (
    '"0 %"',
    '"100 %"',
    '"-3 K"',
    '"1e-20 ppm"',
    '"20.94 %"',
    '"999 degC"',
    '"-60 degC"',
    '"1e9 kg/h"',
    '"0 MW"',
    '"dry"',
    '"estimate"',
    '""',
    "0",
    "-1",
    "100",
    "1e300",
    "nan",
    "true",
    "[]",
    "{}",
    "[{}]",
    "1979-05-27T07:32:00Z",
    "'''\n'''",
)
CHARACTERS = "\"'[]{}=.,#\\ \n\r\t0-9eE%+_\x00\x1b\u202e\ufeffé€"


@st.composite
def damaged(draw: st.DrawFn) -> str:
    """Return a demo file with up to four lines dropped, doubled, moved, given another value or other characters."""
    lines = draw(st.sampled_from(DEMOS)).split("\n")
    for _ in range(draw(st.integers(1, 4))):
        place = draw(st.integers(0, len(lines) - 1))
        line = lines[place]
        how = draw(st.sampled_from(("drop", "double", "move", "value", "key", "character", "digit")))
        if how == "drop":
            del lines[place]
        elif how == "double":
            lines.insert(place, line)
        elif how == "move":
            lines.insert(draw(st.integers(0, len(lines) - 1)), lines.pop(place))
        elif how == "value" and "=" in line:
            lines[place] = line.partition("=")[0] + "= " + draw(st.sampled_from(VALUES))
        elif how == "key" and "=" in line:
            lines[place] = draw(st.sampled_from(lines)).partition("=")[0] + "=" + line.partition("=")[2]
        elif how == "character":
            at = draw(st.integers(0, len(line)))
            lines[place] = line[:at] + draw(st.sampled_from(CHARACTERS)) + line[at + draw(st.integers(0, 2)) :]
        elif how == "digit":
            digit = draw(st.sampled_from("0123456789"))
            lines[place] = "".join(digit if each.isdigit() else each for each in line)
        if not lines:
            lines = [""]
    return "\n".join(lines)


def outcome(text: str) -> str:
    """Return "worked out" or "refused", and check what goes with either."""
    try:
        result = work_out(parse_scenario(text, "damaged.toml"))
    except ScenarioError as error:
        problems = error.problems
    else:
        check_result(result)
        return "worked out"
    assert problems
    for problem in problems:
        assert problem.message
        assert str(problem).isprintable()
        assert problem.line is None or 1 <= problem.line <= text.count("\n") + 1
    placed = [problem.line for problem in problems if problem.line is not None]
    assert placed == sorted(placed)
    return "refused"


def check_result(result: Result) -> None:
    assert json_text(result)
    for values in result.ledger.account.values():
        assert not np.any(np.isinf(values))
    for system in ("si", "us"):
        assert csv_text(ledger_table(result, system=system, basis="net"))


def test_the_demos_themselves_are_worked_out() -> None:
    assert [outcome(demo) for demo in DEMOS] == ["worked out"] * len(DEMOS)
    assert len(DEMOS) >= 3


@settings(max_examples=400)
@given(damaged())
@example(DEMOS[0].replace("[[setting]]", "[setting]"))
@example(DEMOS[0].replace("=", "= ="))
def test_a_damaged_file_is_worked_out_or_refused(text: str) -> None:
    assert outcome(text) in ("worked out", "refused")


@settings(max_examples=100)
@given(st.text(max_size=300))
def test_any_text_is_refused(text: str) -> None:
    assert outcome(text) == "refused"


@settings(max_examples=100)
@given(st.binary(max_size=300).map(lambda content: content.decode("utf-8", "replace")), st.sampled_from(DEMOS))
def test_rubbish_after_a_sound_file_is_refused_or_harmless(rubbish: str, demo: str) -> None:
    assert outcome(f"{demo}\n{rubbish}") in ("worked out", "refused")
