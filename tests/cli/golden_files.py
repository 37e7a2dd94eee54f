"""Outputs kept as files. A missing file is a failure; UPDATE_GOLDEN=1 writes them anew, to be looked at first."""

import os
import re
from pathlib import Path

FOLDER = Path(__file__).resolve().parent / "golden"

_LONG = re.compile(r"-?\d+\.\d{9,}(e-?\d+)?")
"""Numbers in full precision, whose last digits differ between machines."""


def assert_golden(name: str, text: str) -> None:
    """Compare `text` with the file `name`, to the last character but for digits beyond the tenth of a number."""
    text = _LONG.sub(lambda number: f"{float(number[0]):.10g}", text)
    file = FOLDER / name
    if os.environ.get("UPDATE_GOLDEN") == "1":
        file.write_bytes(text.encode("utf-8"))
    assert file.exists(), f"{file} is missing; UPDATE_GOLDEN=1 writes it"
    assert text == file.read_bytes().decode("utf-8"), f"differs from {file}; UPDATE_GOLDEN=1 writes it anew"
