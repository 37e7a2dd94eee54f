"""The ledger as text for a terminal or a pipe: Rich tables that keep to the width, in blocks of settings if need be."""

from collections.abc import Iterable, Sequence

from rich.console import Console, RenderableType
from rich.padding import Padding
from rich.table import Table
from rich.text import Text

from fluegas.report.ledger_table import LedgerTable, Row
from fluegas.report.numbers import shown, unit_of
from fluegas.report.safety import SAFETY
from fluegas.scenario.result import Result

LABEL_WIDTH, UNIT_WIDTH, CELL_WIDTH = 22, 8, 11


def printable(text: str, longest: int = 200) -> str:
    """Return `text` with control characters, escape sequences among them, made visible, and cut to `longest`."""
    safe = "".join(character if character.isprintable() else f"\\x{ord(character):02x}" for character in text)
    return safe if len(safe) <= longest else safe[: longest - 3] + "..."


def print_result(console: Console, result: Result, table: LedgerTable, *, system: str, basis: str) -> None:
    """Print the whole account: heading, ledger in blocks that fit the width, cautions, the safety line."""
    print_trimmed(console, _parts(result, table, console.width, system, basis))


def print_table(console: Console, result: Result, table: LedgerTable, heading: str) -> None:
    """Print a table of settings: title, `heading`, blocks that fit the width, cautions, the safety line."""
    title = Text(printable(result.scenario.top.text("title") or result.scenario.name), style="bold")
    parts: list[RenderableType] = [title, Text(heading)]
    for places in blocks(table, console.width):
        parts += [Text(), _block(table, places)]
    print_trimmed(console, [*parts, *_cautions(result), Text(), Text(SAFETY, style="italic")])


def print_trimmed(console: Console, parts: Iterable[RenderableType]) -> None:
    """Print `parts` without the blanks that tables leave at the ends of lines."""
    with console.capture() as capture:
        for part in parts:
            console.print(part)
    lines = capture.get().split("\n")
    console.file.write("\n".join(line.rstrip() for line in lines))
    console.file.flush()


def _parts(result: Result, table: LedgerTable, width: int, system: str, basis: str) -> Iterable[RenderableType]:
    yield from _heading(result, system, basis)
    for places in blocks(table, width):
        yield Text()
        yield _block(table, places)
    yield from _cautions(result)
    yield Text()
    yield Text(SAFETY, style="italic")


def _heading(result: Result, system: str, basis: str) -> Iterable[RenderableType]:
    scenario, case = result.scenario, result.case
    title = scenario.top.text("title") or scenario.name
    yield Text(printable(title), style="bold")
    unit = unit_of("temperature", system)
    reference = shown(case.data.fuel.reference_temperature, "temperature", unit)
    yield Text(f"percent of {basis} heat input; heat counted from {reference} {unit}")
    fuel = case.columns[case.unit.baseline]
    unit = unit_of("energy_per_mass", system)
    gross = shown(float(fuel.fuel.gross_heating_value), "energy_per_mass", unit)
    net = shown(float(fuel.fuel.net_heating_value), "energy_per_mass", unit)
    name = printable(fuel.entry.text("name") or "fuel", 60)
    yield Text(f"{name}: gross {gross}, net {net} {unit} as fired")


def blocks(table: LedgerTable, width: int) -> list[list[int]]:
    """Return places of settings in blocks that fit `width`; the baseline leads every block."""
    room = max(1, (width - LABEL_WIDTH - UNIT_WIDTH - 2) // (cell_width(table) + 1))
    places = list(range(len(table.settings)))
    if len(places) <= room:
        return [places]
    others = [place for place in places if place != table.baseline]
    each = max(1, room - 1)
    return [[table.baseline, *others[start : start + each]] for start in range(0, len(others), each)]


def cell_width(table: LedgerTable) -> int:
    """Return the width of a setting's column: wider than usual where a number would be broken across lines."""
    numbers = (text for group in table.groups for row in group.rows if row.unit for text in row.texts)
    return max(CELL_WIDTH, *map(len, numbers))


def _block(table: LedgerTable, places: Sequence[int]) -> Table:
    shown_table = Table(box=None, padding=(0, 1, 0, 0), pad_edge=False, show_header=True, header_style="bold")
    shown_table.add_column("", width=LABEL_WIDTH, no_wrap=True, overflow="ellipsis")
    shown_table.add_column("", width=UNIT_WIDTH, no_wrap=True)
    width = cell_width(table)
    for place in places:
        mark = "*" if place == table.baseline else ""
        heading = Text(printable(table.settings[place], 60) + mark)
        shown_table.add_column(heading, width=width, justify="right", overflow="fold")
    for group in table.groups:
        shown_table.add_row(Text(group.title, style="underline"))
        for row in group.rows:
            shown_table.add_row(*_cells(row, places), style="bold" if row.is_sum else None)
    return shown_table


def _cells(row: Row, places: Sequence[int]) -> Iterable[Text]:
    yield Text("  " + printable(row.label, 40))
    yield Text(row.unit)
    for place in places:
        yield Text(printable(row.texts[place], 40), justify="right")


def _cautions(result: Result) -> Iterable[RenderableType]:
    """Yield each caution once, with the settings that it holds for."""
    holders: dict[str, list[str]] = {}
    for column, cautions in zip(result.case.columns, result.cautions, strict=True):
        for caution in cautions:
            names = holders.setdefault(caution.message, [])
            if column.name not in names:
                names.append(column.name)
    if not holders:
        return
    yield Text()
    yield Text(f"cautions: {len(holders)}", style="bold")
    every = len(result.case.columns)
    for message, names in holders.items():
        whose = "all settings" if len(names) == every and every > 1 else ", ".join(names)
        yield Padding(Text(f"! {printable(whose, 120)}: {printable(message, 600)}"), (0, 0, 0, 2))


def print_check(console: Console, result: Result) -> None:
    """Print that the file is sound, and the cautions about its settings."""
    count = len(result.case.columns)
    plural = "setting" if count == 1 else "settings"
    sound = Text(f"{printable(result.scenario.name)}: no problems, {count} {plural}")
    print_trimmed(console, [sound, *_cautions(result)])
