"""Reads the published tables beside this file: lines starting with "#" name source and units, then a CSV header."""

import csv
from pathlib import Path


def table(name: str) -> list[dict[str, str]]:
    """Return the rows of `name`.csv as mappings from column name to text."""
    text = (Path(__file__).parent / f"{name}.csv").read_text(encoding="utf-8")
    lines = [line for line in text.splitlines() if line.strip() and not line.startswith("#")]
    rows = [{key.strip(): value.strip() for key, value in row.items()} for row in csv.DictReader(lines)]
    assert rows, f"the table {name} is empty"
    return rows


def column(rows: list[dict[str, str]], name: str) -> list[float]:
    """Return one column as numbers."""
    return [float(row[name]) for row in rows]
