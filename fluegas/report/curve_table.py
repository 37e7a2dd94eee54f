"""Curves as a table model in the units shown: text, CSV, terminal picture and drawing all come from it."""

from collections.abc import Sequence
from dataclasses import dataclass
from math import ceil, floor, isnan, log10

import numpy as np

from fluegas.accounting.curve import Curves
from fluegas.accounting.figures import figures
from fluegas.report.braille import MARKS, Series
from fluegas.report.figure_names import titles
from fluegas.report.numbers import MISSING, decimals_of, in_unit, unit_of
from fluegas.scenario.case import Case
from fluegas.thermo.polynomials import FloatArray

MOST_DRAWN = 12
"""Settings in one picture at most: more cannot be told apart."""
_TRACE = 0.005
"""A gas that stays below this share is shown in ppm."""


@dataclass(frozen=True)
class Panel:
    """One figure: for each setting a number for each point (None where there is none), and its own."""

    name: str
    title: str
    dimension: str
    unit: str
    numbers: tuple[tuple[float | None, ...], ...]
    own: tuple[float | None, ...]

    @property
    def heading(self) -> str:
        """Title with unit."""
        return f"{self.title} [{self.unit}]"


@dataclass(frozen=True)
class CurveTable:
    """Figures of settings against one quantity, in the units shown.

    name, title, unit: of the quantity; numbers: its points; own: its value in each setting as entered, None where there
    is none. baseline: place of the baseline among `settings`, None if it is not one of them. held: what is kept.
    """

    name: str
    title: str
    dimension: str
    unit: str
    numbers: tuple[float, ...]
    settings: tuple[str, ...]
    baseline: int | None
    own: tuple[float | None, ...]
    panels: tuple[Panel, ...]
    held: str

    @property
    def heading(self) -> str:
        """Title of the quantity with its unit."""
        return f"{self.title} [{self.unit}]"


def curve_table(found: Curves, case: Case, *, system: str) -> CurveTable:
    """Return the table model of curves in "si" or "us" units."""
    variable = found.variable
    unit = unit_of(variable.dimension, system)
    places = list(found.places)
    return CurveTable(
        name=variable.name,
        title=variable.label,
        dimension=variable.dimension,
        unit=unit,
        numbers=tuple(in_unit(float(value), variable.dimension, unit) or 0.0 for value in found.values),
        settings=tuple(case.columns[place].name for place in places),
        baseline=places.index(case.unit.baseline) if case.unit.baseline in places else None,
        own=tuple(in_unit(float(value), variable.dimension, unit) for value in found.own),
        panels=tuple(_panel(found, name, system) for name in found.figures),
        held=variable.held,
    )


def _panel(found: Curves, name: str, system: str) -> Panel:
    values, own = found.figures[name], found.own_figures[name]
    dimension = _dimension(name, values)
    unit = unit_of(dimension, system)
    return Panel(
        name=name,
        title=titles()[name],
        dimension=dimension,
        unit=unit,
        numbers=tuple(tuple(in_unit(float(value), dimension, unit) for value in row) for row in values),
        own=tuple(in_unit(float(value), dimension, unit) for value in own),
    )


def _dimension(name: str, values: FloatArray) -> str:
    dimension = figures()[name].dimension
    is_gas = name.startswith("flue_gas.") and dimension == "fraction"
    return "trace_fraction" if is_gas and np.max(np.nan_to_num(values), initial=0.0) < _TRACE else dimension


def drawn(table: CurveTable, panel: Panel) -> tuple[Series, ...]:
    """Return the lines of one picture, the first MOST_DRAWN settings, lettered in their order."""
    return tuple(
        Series(
            x=table.numbers,
            y=[_or_nan(number) for number in panel.numbers[place]],
            letter=MARKS[place],
            own_x=_or_nan(table.own[place]),
            own_y=_or_nan(panel.own[place]),
        )
        for place in range(min(len(table.settings), MOST_DRAWN))
    )


def _or_nan(number: float | None) -> float:
    return float("nan") if number is None else number


def texts(numbers: Sequence[float | None], of: CurveTable | Panel, every: Sequence[float | None]) -> list[str]:
    """Return numbers of a panel or quantity as texts, with as many decimals as it takes to tell `every` apart."""
    given = [number for number in every if number is not None]
    span = max(given) - min(given) if given else 0.0
    decimals = decimals_of(of.dimension, of.unit)
    if span > 0:
        decimals = max(decimals, min(6, ceil(-log10(span)) + 1))
    return [_text(number, decimals) for number in numbers]


def _text(number: float | None, decimals: int) -> str:
    if number is None or isnan(number):
        return MISSING
    text = f"{number:,.{decimals}f}".replace(",", " ")
    return text.removeprefix("-") if float(text.replace(" ", "")) == 0 else text


def rows_shown(count: int, most: int = 11) -> list[int]:
    """Return the places of at most about `most` of `count` points, evenly apart, the first and the last among them."""
    if count <= most:
        return list(range(count))
    steps = next((steps for steps in range(most - 1, floor(most / 2) - 1, -1) if (count - 1) % steps == 0), most - 1)
    return [round(step * (count - 1) / steps) for step in range(steps + 1)]
