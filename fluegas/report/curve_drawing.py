"""Curves as an SVG drawing, the same bytes for the same curves wherever it is drawn.

The drawing library is told everything here: no settings of the user's, no date, no state of its own kept.
"""

import io
import warnings
from typing import TYPE_CHECKING, Any

from fluegas.report.curve_table import MOST_DRAWN, CurveTable, Panel, drawn
from fluegas.report.text_output import printable

if TYPE_CHECKING:
    from matplotlib.axes import Axes
    from matplotlib.figure import Figure

_COLOURS = ("#0072B2", "#D55E00", "#009E73", "#CC79A7", "#56B4E9", "#E69F00")
"""Told apart by colour-blind eyes (Okabe and Ito, 2008, from memory); lines and marks differ in form as well."""
_DASHES = ("-", "--", "-.", ":")
_MARKERS = "osD^vPX"
_WIDTH, _PANEL_HEIGHT = 7.6, 3.4
_STYLE = {
    "svg.hashsalt": "fluegas",
    "svg.fonttype": "path",
    "font.family": ["DejaVu Sans"],
    "font.size": 10.0,
    "axes.spines.top": False,
    "axes.spines.right": False,
    "axes.grid": True,
    "grid.color": "#d8d8d8",
    "grid.linewidth": 0.6,
    "axes.axisbelow": True,
}
_PROGRAM = ("backend", "backend_fallback", "interactive", "toolbar", "timezone")
"""Settings of a program around the drawing, none of a drawing."""


def curve_svg(table: CurveTable, title: str) -> bytes:
    """Return the SVG of `table`, a panel for each figure above the other, as UTF-8."""
    import matplotlib
    from matplotlib.backends.backend_svg import FigureCanvasSVG
    from matplotlib.figure import Figure

    style: Any = {key: value for key, value in matplotlib.rcParamsDefault.items() if key not in _PROGRAM} | _STYLE
    out = io.BytesIO()
    with matplotlib.rc_context(style), warnings.catch_warnings():
        warnings.filterwarnings("ignore", message="Glyph .* missing from font", category=UserWarning)
        figure = Figure(figsize=(_WIDTH, _PANEL_HEIGHT * len(table.panels) + 0.9), layout="constrained")
        figure.suptitle(printable(title, 80), x=0.02, ha="left", fontsize=11, parse_math=False)
        _draw(figure, table)
        metadata = {"Date": None, "Creator": "fluegas", "Title": printable(title)}
        FigureCanvasSVG(figure)
        figure.savefig(out, format="svg", metadata=metadata)
    return out.getvalue()


def _draw(figure: "Figure", table: CurveTable) -> None:
    every = figure.subplots(len(table.panels), 1, sharex=True, squeeze=False)[:, 0]
    for axes, panel in zip(every, table.panels, strict=True):
        _draw_panel(axes, table, panel)
    every[-1].set_xlabel(table.heading)
    handles = every[0].get_lines()
    legend = figure.legend(
        handles, [each.get_label() for each in handles], loc="outside lower left", ncols=3, frameon=False, fontsize=9
    )
    for text, setting in zip(legend.get_texts(), table.settings, strict=False):
        text.set_parse_math(False)
        text.set_text(printable(setting, 40))


def _draw_panel(axes: "Axes", table: CurveTable, panel: Panel) -> None:
    low, high = table.numbers[0], table.numbers[-1]
    for place, each in enumerate(drawn(table, panel)):
        own_x = each.own_x if low <= each.own_x <= high else float("nan")
        axes.plot(
            [*each.x, float("nan"), own_x],
            [*each.y, float("nan"), each.own_y],
            label=each.letter,
            color=_COLOURS[place % len(_COLOURS)],
            linestyle=_DASHES[place % len(_DASHES)],
            linewidth=1.6,
            marker=_MARKERS[place % len(_MARKERS)],
            markersize=6,
            markevery=[len(each.x) + 1],
            clip_on=False,
        )
    axes.set_title(panel.heading, loc="left", fontsize=10)
    axes.set_xlim(low, high)
    if len(table.settings) > MOST_DRAWN:
        axes.set_title(f"the first {MOST_DRAWN} of {len(table.settings)} settings", loc="right", fontsize=9)
