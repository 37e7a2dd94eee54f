"""Fuels as text: what they consist of, their figures on both bases, and those of a real gas by metering temperature."""

from collections.abc import Iterable, Sequence

import numpy as np
from rich.console import Console, RenderableType
from rich.padding import Padding
from rich.table import Table
from rich.text import Text

from fluegas.accounting.fuel_figures import fuel_figure_table
from fluegas.accounting.fuel_terms import FuelFigure
from fluegas.accounting.inputs import BASES
from fluegas.combustion.compression_factor import METERING
from fluegas.report.numbers import MISSING, shown, unit_of
from fluegas.report.text_output import CELL_WIDTH, LABEL_WIDTH, UNIT_WIDTH, print_trimmed, printable
from fluegas.scenario.fuel_sheet import FuelSheet, composition

_BY_BASIS = (
    ("Heating value", "{}_heating_value", ""),
    ("  of ideal gas", "molar.{}_heating_value", ""),
    ("  by mole", "molar.{}_heating_value", "kJ/mol"),
    ("Fossil CO2", "carbon_dioxide.{}.fossil", "kg/MWh"),
    ("", "carbon_dioxide.{}.fossil", "kg/MMBtu"),
    ("Biogenic CO2", "carbon_dioxide.{}.biogenic", "kg/MWh"),
    ("", "carbon_dioxide.{}.biogenic", "kg/MMBtu"),
)
"""Label, figure and unit ("" for that of the system) of the rows that have a column for each basis."""
_SINGLE = (
    ("at theoretical air, by mass", "theoretical_air.mass_ratio"),
    ("", "theoretical_air.per_mass"),
    ("", "flue_gas.dry.per_mass"),
    ("", "flue_gas.wet.per_mass"),
    ("at theoretical air, by volume", "theoretical_air.volume_ratio"),
    ("", "flue_gas.dry.volume_ratio"),
    ("", "flue_gas.wet.volume_ratio"),
    ("flue gas at theoretical air", "maximum_carbon_dioxide"),
    ("", "dew_point.water"),
    ("", "flame_temperature.complete"),
    ("by gross heat, 68 degF, 760 mmHg", "f_factor.dry"),
    ("", "f_factor.wet"),
    ("", "f_factor.carbon"),
    ("", "f_factor.ratio"),
)
"""What a row starts with as its own heading, and its figure."""
_METERED = (
    ("{}_heating_value", 3),
    ("{}_wobbe_index", 3),
    ("density", 4),
    ("relative_density", 4),
    ("compression_factor", 5),
)
"""Figures of a real gas and their decimals in SI; "{}" stands for both bases."""


def print_fuels(console: Console, sheets: Sequence[FuelSheet], *, system: str, basis: str) -> None:
    """Print `sheets` one below the other, in "si" or "us" units, `basis` ("gross" or "net") first."""
    parts: list[RenderableType] = []
    for sheet in sheets:
        parts += [Text()] if parts else []
        parts += _sheet(sheet, system, [basis, *(other for other in BASES if other != basis)])
    print_trimmed(console, parts)


def _sheet(sheet: FuelSheet, system: str, bases: Sequence[str]) -> Iterable[RenderableType]:
    yield from _heading(sheet, system)
    yield Text()
    yield _by_basis(sheet, system, bases)
    if not np.isnan(sheet.figures["real_gas.0 degC.density"]):
        yield Text()
        yield _real_gas(sheet, system, bases)
    yield Text()
    yield _single(sheet, system)
    if sheet.cautions:
        yield Text()
        yield Text(f"cautions: {len(sheet.cautions)}", style="bold")
        for caution in sheet.cautions:
            yield Padding(Text(f"! {printable(caution.message, 600)}"), (0, 0, 0, 2))


def _heading(sheet: FuelSheet, system: str) -> Iterable[RenderableType]:
    yield Text(printable(sheet.name), style="bold")
    kind = sheet.entry.text("kind")
    words = [sheet.state, *([kind] if kind else [])]
    if sheet.library is not None:
        words.append(f"library fuel {sheet.library!r}")
    yield Text(", ".join(words))
    if sheet.settings:
        yield Text(f"burnt in: {printable(', '.join(sheet.settings))}")
    if sheet.origin:
        yield Text(f"origin: {printable(sheet.origin, 400)}")
    unit = unit_of("temperature", system)
    reference = shown(sheet.fuel.reference_temperature, "temperature", unit)
    for measure, parts in composition(sheet.fuel).items():
        listed = ", ".join(f"{name} {_percent(share)}" for name, share in parts.items())
        yield Text(f"as fired, {measure} %: {listed}")
    yield Text(f"heating values at {reference} {unit}")


def _percent(share: float) -> str:
    return f"{100 * share:.3g}" if share < 0.1 else f"{100 * share:.4g}"


def _table(headings: Sequence[str], label_width: int = LABEL_WIDTH) -> Table:
    table = Table(box=None, padding=(0, 1, 0, 0), pad_edge=False, show_header=bool(headings), header_style="bold")
    table.add_column("", width=label_width, no_wrap=True, overflow="ellipsis")
    table.add_column("", width=UNIT_WIDTH + 2, no_wrap=True)
    for heading in headings or [""]:
        table.add_column(Text(heading), width=CELL_WIDTH, justify="right", no_wrap=True)
    return table


def _by_basis(sheet: FuelSheet, system: str, bases: Sequence[str]) -> Table:
    table = _table(bases)
    for label, name, stated in _BY_BASIS:
        figures = [fuel_figure_table()[name.format(basis)] for basis in bases]
        values = [float(sheet.figures[figure.name]) for figure in figures]
        if all(np.isnan(values)) or ("biogenic" in name and not any(values)):
            continue
        dimension = figures[0].dimension
        unit = stated or unit_of(dimension, system)
        table.add_row(Text(label), Text(unit), *(shown(value, dimension, unit) for value in values))
    return table


def _real_gas(sheet: FuelSheet, system: str, bases: Sequence[str]) -> Table:
    """Return the table of a real cubic metre at 101.325 kPa: a column for each metering temperature."""
    table = _table(tuple(METERING))
    table.add_row(Text("real gas, 101.325 kPa", style="underline"))
    for name, decimals in _METERED:
        for own in [name.format(basis) for basis in bases] if "{}" in name else [name]:
            figures = [fuel_figure_table()[f"real_gas.{metering}.{own}"] for metering in METERING]
            unit = unit_of(figures[0].dimension, system)
            texts = [_metered(sheet, figure, unit, decimals) for figure in figures]
            table.add_row(Text("  " + figures[0].label), Text(unit), *texts)
    return table


def _metered(sheet: FuelSheet, figure: FuelFigure, unit: str, decimals: int) -> str:
    value = float(sheet.figures[figure.name])
    if figure.dimension == "ratio":
        return MISSING if np.isnan(value) else f"{value:.{decimals}f}"
    return shown(value, figure.dimension, unit)


def _single(sheet: FuelSheet, system: str) -> Table:
    table = _table((), 32)
    heading = ""
    for start, name in _SINGLE:
        heading = start or heading
        value = float(sheet.figures[name])
        if np.isnan(value):
            continue
        if heading:
            table.add_row(Text(heading, style="underline"))
            heading = ""
        figure = fuel_figure_table()[name]
        unit = unit_of(figure.dimension, system)
        table.add_row(Text("  " + figure.label), Text(unit), shown(value, figure.dimension, unit))
    return table


def print_library(console: Console, sheets: Sequence[FuelSheet], *, system: str) -> None:
    """Print one line for each fuel: name, heating values as fired, greatest CO2, CO2 by net heat."""
    unit, per_energy = unit_of("energy_per_mass", system), unit_of("emission_per_energy", system)
    headings = ("moisture %", f"gross {unit}", f"net {unit}", "max CO2 %", f"CO2 {per_energy}")
    table = Table(box=None, padding=(0, 1, 0, 0), pad_edge=False, header_style="bold")
    table.add_column("", width=33, no_wrap=True, overflow="ellipsis")
    for heading in headings:
        table.add_column(Text(heading), width=8 if heading != headings[4] else 9, justify="right")
    state = ""
    for sheet in sheets:
        if sheet.state != state:
            state = sheet.state
            table.add_row(Text(state, style="underline"))
        table.add_row(Text("  " + (sheet.library or sheet.name)), *_line(sheet, unit, per_energy))
    kelvin, degrees = sheets[0].fuel.reference_temperature, unit_of("temperature", system)
    reference = f"{shown(kelvin, 'temperature', degrees)} {degrees}"
    note = f"As fired, heating values at {reference}; CO2 by net heat, fossil and biogenic."
    print_trimmed(
        console, [table, Text(), Text(note), Text("Typical analyses; an analysis of the fuel fired is surer.")]
    )


def _line(sheet: FuelSheet, unit: str, per_energy: str) -> Iterable[str]:
    figures = {name: float(value) for name, value in sheet.figures.items()}
    moisture = composition(sheet.fuel).get("mass", {}).get("moisture")
    yield MISSING if moisture is None else f"{100 * moisture:.1f}"
    yield shown(figures["gross_heating_value"], "energy_per_mass", unit)
    yield shown(figures["net_heating_value"], "energy_per_mass", unit)
    yield f"{100 * figures['maximum_carbon_dioxide']:.2f}"
    total = figures["carbon_dioxide.net.fossil"] + figures["carbon_dioxide.net.biogenic"]
    yield shown(total, "emission_per_energy", per_energy)
