"""Curves as text with pictures, as CSV and as JSON. CSV holds the numbers of the text, every point of them."""

import csv
import io
import json
from collections.abc import Iterable, Iterator, Sequence

from rich.cells import cell_len
from rich.console import Console, RenderableType
from rich.table import Table
from rich.text import Text

from fluegas import __version__
from fluegas.accounting.curve import Curves
from fluegas.report.braille import MARKS, plot
from fluegas.report.csv_output import safe_cell
from fluegas.report.curve_table import MOST_DRAWN, CurveTable, Panel, drawn, rows_shown, texts
from fluegas.report.json_output import FORMAT
from fluegas.report.numbers import number_or_none
from fluegas.report.safety import SAFETY
from fluegas.report.text_output import print_trimmed, printable
from fluegas.scenario.result import Result
from fluegas.thermo.polynomials import FloatArray
from fluegas.units import si_unit

WIDEST, HIGHEST, LOWEST = 140, 34, 8
"""Cells of a picture: no wider and higher than a glance takes in, and no lower than axes need."""
_FIRST_WIDTH, _WIDTH = 20, 13


def curve_json(found: Curves, result: Result) -> str:
    """Return curves as one JSON object: SI units, fractions of 1, null where there is no figure."""
    variable = found.variable
    settings = [
        {
            "name": result.case.columns[place].name,
            "own": number_or_none(found.own[row]),
            "figures": {
                name: {"own": number_or_none(found.own_figures[name][row]), "values": _numbers(values[row])}
                for name, values in found.figures.items()
            },
        }
        for row, place in enumerate(found.places)
    ]
    whole = {
        "fluegas": __version__,
        "format": FORMAT,
        "title": result.scenario.top.text("title"),
        "basis": result.case.data.basis,
        "against": {
            "name": variable.name,
            "label": variable.label,
            "unit": si_unit(variable.dimension),
            "values": _numbers(found.values),
        },
        "held": variable.held,
        "settings": settings,
    }
    return json.dumps(whole, indent=2, allow_nan=False) + "\n"


def _numbers(values: FloatArray) -> list[float | None]:
    return [number_or_none(value) for value in values]


def curve_csv(table: CurveTable) -> str:
    """Return curves as CSV: a row a point, a column for each figure of each setting."""
    out = io.StringIO(newline="")
    writer = csv.writer(out, lineterminator="\r\n")
    heads = [f"{panel.name} [{panel.unit}] {setting}" for panel in table.panels for setting in table.settings]
    writer.writerow([safe_cell(head) for head in (f"{table.name} [{table.unit}]", *heads)])
    columns = [column for panel in table.panels for column in panel.numbers]
    for place, x in enumerate(table.numbers):
        writer.writerow([repr(x), *("" if column[place] is None else repr(column[place]) for column in columns)])
    return out.getvalue()


def print_curves(
    console: Console, result: Result, table: CurveTable, *, pictures: bool, numbers: bool, ascii_only: bool
) -> None:
    """Print a picture and a table for each figure, as asked, then what was held and the safety line."""
    parts = _parts(result, table, (console.width, console.height), pictures, numbers, ascii_only)
    print_trimmed(console, parts)


def _parts(
    result: Result, table: CurveTable, size: tuple[int, int], pictures: bool, numbers: bool, ascii_only: bool
) -> Iterator[RenderableType]:
    yield Text(printable(result.scenario.top.text("title") or result.scenario.name), style="bold")
    for panel in table.panels:
        if pictures:
            yield Text()
            yield from _picture(table, panel, size, ascii_only)
        if numbers:
            for places in _blocks(len(table.settings), size[0]):
                yield Text()
                yield _block(table, panel, places, lettered=pictures)
    yield Text()
    yield Text(f"Held as entered: {table.held}; on a real unit they move with it.")
    yield Text(SAFETY, style="italic")


def _picture(table: CurveTable, panel: Panel, size: tuple[int, int], ascii_only: bool) -> Iterable[RenderableType]:
    width, height = min(size[0], WIDEST), max(LOWEST, min(size[1] - 4, HIGHEST))
    series = drawn(table, panel)
    lines = plot(series, width, height, x_title=table.heading, y_title=panel.heading, ascii_only=ascii_only)
    yield Text("\n".join(lines), no_wrap=True)
    entries = [f"{each.letter} {_name(table, place)}" for place, each in enumerate(series)]
    yield Text("\n".join(_packed(entries, size[0])))
    if len(table.settings) > MOST_DRAWN:
        yield Text(f"drawn: the first {MOST_DRAWN} of {len(table.settings)} settings")


def _packed(entries: Sequence[str], width: int) -> list[str]:
    """Return the entries in lines of at most `width` cells, none of them broken unless it is wider by itself."""
    lines: list[str] = []
    for entry in entries:
        if lines and cell_len(lines[-1]) + 3 + cell_len(entry) <= width:
            lines[-1] += f"   {entry}"
        else:
            lines.append(entry)
    return lines


def _name(table: CurveTable, place: int) -> str:
    return printable(table.settings[place], 60) + ("*" if place == table.baseline else "")


def _blocks(count: int, width: int) -> list[range]:
    room = max(1, (width - _FIRST_WIDTH - 1) // (_WIDTH + 1))
    return [range(start, min(start + room, count)) for start in range(0, count, room)]


def _block(table: CurveTable, panel: Panel, places: Sequence[int], *, lettered: bool) -> Table:
    shown = Table(box=None, padding=(0, 1, 0, 0), pad_edge=False, header_style="bold", title_justify="left")
    if not lettered:
        shown.title = Text(panel.heading, style="bold")
    shown.add_column(Text(table.heading), width=_FIRST_WIDTH, justify="right", overflow="fold")
    for place in places:
        letter = f"{MARKS[place]} " if lettered and place < MOST_DRAWN else ""
        shown.add_column(Text(letter + _name(table, place)), width=_WIDTH, justify="right", overflow="fold")
    every = [number for column in panel.numbers for number in column]
    columns = [texts(panel.numbers[place], panel, every) for place in places]
    firsts = texts(table.numbers, table, table.numbers)
    for row in rows_shown(len(table.numbers)):
        shown.add_row(firsts[row], *(column[row] for column in columns))
    own_x = texts([table.own[place] for place in places], table, table.numbers)
    own_y = texts([panel.own[place] for place in places], panel, every)
    shown.add_row("as entered, at", *own_x, end_section=True)
    shown.add_row("there", *own_y)
    return shown
