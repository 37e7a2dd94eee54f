"""The help of the program and of every command, at 80 columns."""

import pytest

from fluegas.__main__ import main
from fluegas.cli import COMMANDS
from tests.cli.golden_files import assert_golden


@pytest.mark.parametrize("command", ["", *COMMANDS])
def test_the_help_is_as_before(command: str, capsys: pytest.CaptureFixture[str]) -> None:
    words = [command, "--help"] if command else ["--help"]
    assert main(words) == 0
    text = capsys.readouterr().out
    assert max(map(len, text.splitlines())) <= 80
    assert_golden(f"help-{command or 'fluegas'}.txt", text)
