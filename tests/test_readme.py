"""The README says what the program does: its parts are current and its commands are those of .ci/run."""

import re

from tests.readme import README, ROOT, written


def test_the_parts_that_come_from_the_program_are_current() -> None:
    text = README.read_text(encoding="utf-8")
    assert written(text) == text, "run: python -m tests.readme"


def test_ci_runs_the_test_command_of_the_readme_as_it_stands() -> None:
    commands = re.findall(r"```sh\n(python3 -m venv .*)\n```", README.read_text(encoding="utf-8"))
    assert len(commands) == 2
    assert commands[0].split(" && ")[-1].startswith(".venv/bin/fluegas account scenarios/")
    assert (ROOT / commands[0].split()[-1]).is_file()
    lines = (ROOT / ".ci" / "run").read_text(encoding="utf-8").splitlines()
    assert commands[1] in lines


def test_nothing_in_the_readme_names_a_missing_file() -> None:
    text = README.read_text(encoding="utf-8")
    for name in re.findall(r"`((?:scenarios|data|tests)/[\w./-]+)`|`([\w-]+\.toml)`", text):
        path = name[0] or f"scenarios/{name[1]}"
        assert (ROOT / path).exists(), path
