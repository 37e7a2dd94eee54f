"""The accounts of the demos as they are printed at 80 columns, kept as text.

A change of a figure, a word or a column shows here. After a change that is meant, `UPDATE_GOLDEN=1` in the environment
writes the texts anew; read the difference before it is kept.
"""

import os
from pathlib import Path

import pytest

from tests.cli.accounts import DEMOS, demo, printed

GOLDEN = Path(__file__).parent / "golden"


@pytest.mark.parametrize("units", ["si", "us"])
@pytest.mark.parametrize("name", DEMOS)
def test_the_account_of_a_demo_is_as_before(
    name: str, units: str, capsys: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.setenv("COLUMNS", "80")
    text = printed(capsys, demo(name), "--units", units)
    file = GOLDEN / f"account-{name.removesuffix('.toml')}-{units}.txt"
    if os.environ.get("UPDATE_GOLDEN") == "1":
        file.write_text(text, encoding="utf-8", newline="\n")
    assert file.exists(), f"{file.name} is missing; UPDATE_GOLDEN=1 writes it"
    assert text.splitlines() == file.read_text(encoding="utf-8").splitlines()


def test_no_text_is_left_over_from_a_demo_that_is_gone() -> None:
    expected = {f"account-{name.removesuffix('.toml')}-{units}.txt" for name in DEMOS for units in ("si", "us")}
    assert {file.name for file in GOLDEN.glob("account-*")} == expected
