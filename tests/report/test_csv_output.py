"""CSV: one row a figure, numbers as numbers, texts that no spreadsheet takes for a formula."""

import csv
import io

import pytest

from fluegas.report.csv_output import csv_text, safe_cell
from fluegas.report.ledger_table import ledger_table
from tests.scenario.documents import GAS, Document, document, result_of, setting

FORMULAS = ("=1+1", "+1", "-1", "@SUM(A1)", "=cmd|' /C calc'!A0", '=HYPERLINK("x")')


def rows_of(plain: Document, system: str = "si", basis: str = "gross") -> list[list[str]]:
    text = csv_text(ledger_table(result_of(plain), system=system, basis=basis))
    assert text.endswith("\r\n")
    assert "\n" not in text.replace("\r\n", "")
    return list(csv.reader(io.StringIO(text, newline="")))


def test_every_row_has_a_cell_for_every_setting() -> None:
    rows = rows_of(document(GAS, setting("A"), setting("B", co=None), setting("C, with a comma")))
    assert rows[0] == ["figure", "label", "unit", "A", "B", "C, with a comma"]
    assert {len(row) for row in rows} == {6}
    assert len({row[0] for row in rows}) == len(rows)


@pytest.mark.parametrize("name", FORMULAS)
def test_a_text_that_would_start_a_formula_gets_an_apostrophe(name: str) -> None:
    plain = document(
        GAS,
        setting(name),
        setting("other", compare_with=name),
        setting("third", compare_with="other"),
        plant={"other_losses": {name: "1 %"}},
    )
    rows = rows_of(plain)
    assert rows[0][3] == f"'{name}"
    labels = {row[1] for row in rows}
    assert f"'{name}" in labels
    compared = next(row for row in rows if row[0] == "against_baseline.compared_with")
    assert compared[3:] == ["", f"'{name}", "other"]
    for row in rows:
        for cell in row:
            assert not cell.startswith(("=", "@", "\t", "\r"))
            assert not cell.startswith(("+", "-")) or float(cell) is not None


def test_a_reading_written_with_a_sign_stays_text() -> None:
    rows = rows_of(document(GAS, setting("A", air={"temperature": "-5 degC"}), setting("B", o2="+6 %")))
    assert next(row for row in rows if row[0] == "entered.air.temperature")[3:] == ["'-5 degC", "22 degC"]
    assert next(row for row in rows if row[0] == "entered.o2")[3:] == ["6.4 %", "'+6 %"]


def test_what_is_missing_is_an_empty_cell() -> None:
    rows = rows_of(document(GAS, setting("A"), setting("B", co=None, chamber_temperature="900 degC")))
    by_name = {row[0]: row[3:] for row in rows}
    assert by_name["entered.co"] == ["45 ppm", ""]
    assert by_name["entered.chamber_temperature"] == ["", "900 degC"]
    assert by_name["available_heat.gross"][0] == ""
    assert 0 < float(by_name["available_heat.gross"][1]) < 100
    assert all(cell != "-" for row in rows for cell in row[3:])


def test_numbers_are_whole_and_need_no_locale() -> None:
    result = result_of(document(GAS))
    rows = rows_of(document(GAS))
    row = next(row for row in rows if row[0] == "losses.gross.dry_gas")
    assert row[2] == "%"
    assert float(row[3]) == pytest.approx(100 * float(result.ledger.account["losses.gross.dry_gas"][0]), rel=1e-15)


def test_units_and_basis_are_those_asked_for() -> None:
    si = {row[0]: row for row in rows_of(document(GAS))}
    us = {row[0]: row for row in rows_of(document(GAS), "us", "net")}
    assert (si["dew_point.water"][2], us["dew_point.water"][2]) == ("degC", "degF")
    assert float(us["dew_point.water"][3]) == pytest.approx(float(si["dew_point.water"][3]) * 1.8 + 32, abs=1e-9)
    assert "losses.net.dry_gas" in us
    assert "losses.gross.dry_gas" not in us
    assert "efficiency.gross" in us


@pytest.mark.parametrize("text", FORMULAS)
def test_safe_cell(text: str) -> None:
    assert safe_cell(text) == f"'{text}"
    assert safe_cell(f"x{text}") == f"x{text}"
    assert safe_cell("") == ""
