"""Runs `fluegas account` in this process and takes its table and CSV apart."""

import csv
import io
import re

import pytest

from fluegas.__main__ import main
from fluegas.resources import folder

ESCAPE = "\x1b"
DEMOS = sorted(entry.name for entry in folder("scenarios").iterdir() if entry.name.endswith(".toml"))


def demo(name: str) -> str:
    return str(folder("scenarios") / name)


def printed(capsys: pytest.CaptureFixture[str], *words: str) -> str:
    """Return what `fluegas account` with `words` prints, and check that it is done."""
    status = main(["account", *words])
    out, err = capsys.readouterr()
    assert status == 0, err
    return out


def csv_rows(text: str) -> list[list[str]]:
    return list(csv.reader(io.StringIO(text, newline="")))


def table_rows(text: str) -> list[tuple[str, str, list[str]]]:
    """Return label, unit and cells of the rows with a unit in the first block of a printed table."""
    found = []
    for line in text.splitlines():
        if not re.match(r"  \S|    by", line) or line.startswith("  !"):
            continue
        label, unit, rest = line[:22].strip(), line[23:31].strip(), line[31:]
        if unit and rest.strip():
            found.append((label, unit, re.split(r"\s{2,}", rest.strip())))
    return found
