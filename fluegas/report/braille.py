"""A line plot as lines of text: braille dots, or plain ASCII, with axes, round ticks and marked points.

A pure function of series and size. Every cell of a braille plot is two dots wide and four high; an ASCII cell is one
wide and three high. NaN and infinite values leave gaps.
"""

from collections.abc import Iterator, Sequence
from dataclasses import dataclass, replace
from math import ceil, floor, isfinite, log10

LARGEST = 1e300
"""Values beyond it cannot be scaled without overflow and are left out like infinite ones."""
MARKS = "ABCDEFGHIJKLMNOPQRSTUVWXYZ"
"""Letters for the series of a plot, in their order."""

_BRAILLE = 0x2800
_BRAILLE_DOTS = ((0x01, 0x08), (0x02, 0x10), (0x04, 0x20), (0x40, 0x80))
_ASCII_DOTS = " '-'.:.|"
_CELLS = {False: (2, 4), True: (1, 3)}
"""Dots of a cell, wide and high, of a braille plot and of an ASCII one."""
_FRAMES = {False: ("│", "┤", "└", "─", "┬"), True: ("|", "+", "+", "-", "+")}
"""Left axis and its tick, corner, bottom axis and its tick."""
_LEAST_PLOT = (8, 3)
"""Cells of the plot itself, wide and high, below which it is drawn without a frame."""


@dataclass(frozen=True)
class Series:
    """One line: `x` and `y` of equal length, and a point of its own to be marked with one `letter`, NaN for none.

    An own point beyond the plotted range of x is left out; the letter then stands at the end of the line.
    """

    x: Sequence[float]
    y: Sequence[float]
    letter: str = ""
    own_x: float = float("nan")
    own_y: float = float("nan")


@dataclass(frozen=True)
class Scale:
    """One axis from `low` to `high`, with the values of its ticks and their texts."""

    low: float
    high: float
    ticks: tuple[float, ...]
    texts: tuple[str, ...]

    def share(self, value: float) -> float:
        """Return where `value` lies, 0 at the low end and 1 at the high one."""
        return (value / 2 - self.low / 2) / (self.high / 2 - self.low / 2)


def plot(
    series: Sequence[Series], width: int, height: int, *, x_title: str = "", y_title: str = "", ascii_only: bool = False
) -> list[str]:
    """Return `height` lines of at most `width` characters each that show `series`.

    Where there is room, ticks and titles stand around the plot: that of y above it, that of x below it.
    """
    if width < 1 or height < 1:
        return [""] * max(height, 0)
    across = _extent([x for each in series for x in each.x if _is_shown(x)])
    series = [each if across[0] <= each.own_x <= across[1] else _marked_at_its_end(each) for each in series]
    up = _extent([y for each in series for y in (*each.y, each.own_y) if _is_shown(y)])
    titles = 1 if height >= 8 else 0
    rows = height - 2 - 2 * titles
    y_scale = round_scale(*up, max(2, rows // 4 + 1))
    margin = max(map(len, y_scale.texts)) + 1
    columns = width - margin - 1
    if columns < _LEAST_PLOT[0] or rows < _LEAST_PLOT[1]:
        bare = _Canvas(width, height, ascii_only)
        bare.draw(series, Scale(*across, (), ()), Scale(*up, (), ()))
        return bare.lines()
    x_scale = exact_scale(*across, max(2, columns // 12))
    canvas = _Canvas(columns, rows, ascii_only)
    canvas.draw(series, x_scale, y_scale)
    framed = [
        *_with_left_axis(canvas.lines(), y_scale, margin, ascii_only),
        *_bottom_axis(x_scale, margin, columns, ascii_only),
    ]
    if not titles:
        return framed
    return [y_title[:width], *framed, x_title[:width].rjust(width)]


def round_scale(low: float, high: float, most: int) -> Scale:
    """Return an axis whose ends are round numbers and hold `low` to `high`; about `most` ticks."""
    step = round_step((high / most) - (low / most))
    first, last = floor(low / step + 1e-9), ceil(high / step - 1e-9)
    ticks = tuple(place * step for place in range(first, last + 1))
    return Scale(ticks[0], ticks[-1], ticks, tick_texts(ticks, step))


def exact_scale(low: float, high: float, most: int) -> Scale:
    """Return an axis from `low` to `high` as they are, with round ticks between."""
    step = round_step((high / most) - (low / most))
    first, last = ceil(low / step - 1e-9), floor(high / step + 1e-9)
    ticks = tuple(min(max(place * step, low), high) for place in range(first, last + 1))
    return Scale(low, high, ticks, tick_texts(ticks, step))


def round_step(least: float) -> float:
    """Return the smallest of 1, 2, 2.5, 5 times a power of ten that is at least `least`, which is above zero."""
    power = 10.0 ** floor(log10(least))
    return next((factor * power for factor in (1.0, 2.0, 2.5, 5.0) if factor * power >= least * (1 - 1e-9)), 10 * power)


def tick_texts(ticks: Sequence[float], step: float) -> tuple[str, ...]:
    """Return the texts of ticks, all with the decimals that their step needs."""
    largest = max(map(abs, ticks), default=0.0)
    if not ticks or (largest < 1e6 and step >= 1e-4):
        decimals = next((count for count in range(6) if abs(step - round(step, count)) < 1e-9 * step), 6)
        return tuple(f"{tick + 0.0:.{decimals}f}" for tick in ticks)
    digits = max(0, floor(log10(largest)) - floor(log10(step))) + 1
    return tuple(f"{tick + 0.0:.{min(digits, 12)}e}" for tick in ticks)


def _marked_at_its_end(series: Series) -> Series:
    seen = [(x, y) for x, y in zip(series.x, series.y, strict=True) if _is_shown(x) and _is_shown(y)]
    own_x, own_y = seen[-1] if seen else (float("nan"), float("nan"))
    return replace(series, own_x=own_x, own_y=own_y)


def _is_shown(value: float) -> bool:
    return isfinite(value) and abs(value) < LARGEST


def _extent(values: Sequence[float]) -> tuple[float, float]:
    """Return the ends of an axis: those of the values, drawn apart where they are one and the same number."""
    if not values:
        return 0.0, 1.0
    low, high = min(values), max(values)
    size = max(abs(low), abs(high))
    if high / 2 - low / 2 > size * 1e-9 and high - low > 1e-290:
        return low, high
    apart = 0.05 * size if size > 1e-280 else 1.0
    return low - apart, high + apart


def _with_left_axis(lines: Sequence[str], scale: Scale, margin: int, ascii_only: bool) -> Iterator[str]:
    plain, tick = _FRAMES[ascii_only][:2]
    high = _CELLS[ascii_only][1]
    texts: dict[int, str] = {}
    for at, label in zip(scale.ticks, scale.texts, strict=True):
        texts[_dot(1.0 - scale.share(at), len(lines) * high) // high] = label
    for row, line in enumerate(lines):
        text = texts.get(row, "")
        yield f"{text.rjust(margin - 1)} {tick if text else plain}{line}".rstrip()


def _bottom_axis(scale: Scale, margin: int, columns: int, ascii_only: bool) -> list[str]:
    _, _, corner, plain, tick = _FRAMES[ascii_only]
    wide = _CELLS[ascii_only][0]
    axis, numbers, end = [plain] * columns, [" "] * (margin + 1 + columns), 0
    for at, text in zip(scale.ticks, scale.texts, strict=True):
        column = _dot(scale.share(at), columns * wide) // wide
        axis[column] = tick
        start = min(max(margin + 1 + column - (len(text) - 1) // 2, 0), len(numbers) - len(text))
        if start > end or end == 0:
            numbers[start : start + len(text)] = text
            end = start + len(text)
    return [" " * margin + corner + "".join(axis), "".join(numbers).rstrip()]


def _dot(share: float, count: int) -> int:
    """Return which of `count` dots along an axis lies at a share of it."""
    return round(min(max(share, 0.0), 1.0) * (count - 1))


class _Canvas:
    """Dots on a grid of cells, and letters that stand on some cells instead of dots."""

    def __init__(self, columns: int, rows: int, ascii_only: bool) -> None:
        self.columns, self.rows, self.ascii_only = columns, rows, ascii_only
        self.wide, self.high = _CELLS[ascii_only]
        self.cells = [[0] * columns for _ in range(rows)]
        self.letters: dict[tuple[int, int], str] = {}

    def draw(self, series: Sequence[Series], x_scale: Scale, y_scale: Scale) -> None:
        """Draw every line, then every own point over them; a letter whose place is taken stands beside it."""
        dots_across, dots_up = self.columns * self.wide, self.rows * self.high

        def dot(x: float, y: float) -> tuple[int, int] | None:
            if not (_is_shown(x) and _is_shown(y)):
                return None
            return _dot(x_scale.share(x), dots_across), _dot(1.0 - y_scale.share(y), dots_up)

        for each in series:
            before = None
            for x, y in zip(each.x, each.y, strict=True):
                here = dot(x, y)
                if here is not None:
                    self._line(before or here, here)
                before = here
        for each in series:
            own = dot(each.own_x, each.own_y)
            if own is not None and each.letter:
                self._letter(own[0] // self.wide, own[1] // self.high, each.letter[0])

    def _line(self, start: tuple[int, int], end: tuple[int, int]) -> None:
        steps = max(abs(end[0] - start[0]), abs(end[1] - start[1]), 1)
        for step in range(steps + 1):
            x = round(start[0] + (end[0] - start[0]) * step / steps)
            y = round(start[1] + (end[1] - start[1]) * step / steps)
            row, column = self.cells[y // self.high], x // self.wide
            if self.ascii_only:
                row[column] |= 1 << (y % 3)
            else:
                row[column] |= _BRAILLE_DOTS[y % 4][x % 2]

    def _letter(self, column: int, row: int, letter: str) -> None:
        near = (*range(column, self.columns), *range(column - 1, -1, -1))
        at = next((place for place in near if (row, place) not in self.letters), None)
        if at is not None:
            self.letters[row, at] = letter

    def lines(self) -> list[str]:
        """Return the rows as text."""
        return [
            "".join(self.letters.get((row, column)) or self._character(dots) for column, dots in enumerate(cells))
            for row, cells in enumerate(self.cells)
        ]

    def _character(self, dots: int) -> str:
        if self.ascii_only:
            return _ASCII_DOTS[dots]
        return chr(_BRAILLE + dots) if dots else " "
