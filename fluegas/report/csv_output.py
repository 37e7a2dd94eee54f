"""The ledger as CSV: a row a figure, a column a setting. A text cell never starts a formula in a spreadsheet."""

import csv
import io

from fluegas.report.ledger_table import LedgerTable
from fluegas.report.numbers import MISSING

_FORMULA_STARTS = ("=", "+", "-", "@", "\t", "\r")


def csv_text(table: LedgerTable) -> str:
    """Return the CSV text of `table`: name, label, unit, then one number or text for each setting."""
    out = io.StringIO(newline="")
    writer = csv.writer(out, lineterminator="\r\n")
    writer.writerow([safe_cell(cell) for cell in ("figure", "label", "unit", *table.settings)])
    for group in table.groups:
        for row in group.rows:
            head = [safe_cell(cell) for cell in (row.name, row.label, row.unit)]
            is_text = row.unit == ""
            cells = [
                _text_cell(text) if is_text else "" if number is None else repr(number)
                for number, text in zip(row.numbers, row.texts, strict=True)
            ]
            writer.writerow([*head, *cells])
    return out.getvalue()


def _text_cell(text: str) -> str:
    return "" if text == MISSING else safe_cell(text)


def safe_cell(text: str) -> str:
    """Return `text` so that a spreadsheet takes it as text: an apostrophe before what would start a formula."""
    return f"'{text}" if text.startswith(_FORMULA_STARTS) else text
