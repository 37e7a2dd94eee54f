"""`fluegas curve FILE`: figures against one quantity, as pictures, tables, CSV, JSON and a drawing."""

import os
import sys
from typing import TYPE_CHECKING

import click

from fluegas.cli.options import basis_option, file_argument, units_option

if TYPE_CHECKING:
    from fluegas.accounting.curve import Curves
    from fluegas.report.curve_table import CurveTable
    from fluegas.scenario.result import Result

_QUANTITIES = {
    "o2": ("setting", "o2"),
    "excess-air": ("setting", "excess_air"),
    "flue-temperature": ("setting", "flue_temperature"),
    "air-temperature": ("air", "temperature"),
    "fuel-moisture": None,
}
"""What a curve may run over, and the input of a scenario file whose limits hold for it."""


def _print_list(ctx: click.Context, _: click.Parameter, asked: bool) -> None:
    if not asked or ctx.resilient_parsing:
        return
    from fluegas.accounting.figures import figures
    from fluegas.report.figure_names import titles

    width = max(map(len, figures()))
    click.echo("\n".join(f"{name.ljust(width)}  {title}" for name, title in titles().items()))
    ctx.exit()


@click.command("curve")
@file_argument
@click.option(
    "--against",
    type=click.Choice(list(_QUANTITIES)),
    default="o2",
    show_default=True,
    help="What is varied; all else stays as entered. O2 is that of the dry gas.",
)
@click.option(
    "--figure",
    "words",
    multiple=True,
    metavar="NAME",
    help="A figure, by its name or label, such as efficiency.gross or 'dry flue gas'; may be repeated. "
    "Useful heat and the dry-gas loss if not given.",
)
@click.option("--setting", "names", multiple=True, metavar="NAME", help="A setting; may be repeated. All if not given.")
@click.option("--from", "start", metavar="VALUE", help="Where the curve starts, with its unit: '2 %', '120 degC'.")
@click.option("--to", "end", metavar="VALUE", help="Where it ends.")
@click.option(
    "--points", type=click.IntRange(2, 10_001), default=201, show_default=True, help="Points from end to end."
)
@click.option("--json", "as_json", is_flag=True, help="Print one JSON object, always in SI.")
@click.option("--csv", "as_csv", is_flag=True, help="Print CSV, a row a point.")
@click.option("--svg", metavar="FILE", help="Draw the curves into FILE, which ends in .svg, as well.")
@click.option(
    "--show",
    type=click.Choice(["both", "picture", "table"]),
    default="both",
    show_default=True,
    help="What is printed for each figure. The table has some of the points, CSV and JSON have all.",
)
@click.option(
    "--ascii",
    "plain",
    is_flag=True,
    help="Draw pictures with plain characters; also FLUEGAS_ASCII=1, and by itself where the output is not UTF-8.",
)
@units_option
@basis_option
@click.option(
    "--list", is_flag=True, is_eager=True, expose_value=False, callback=_print_list, help="List all figures and leave."
)
def command(
    file: str,
    against: str,
    words: tuple[str, ...],
    names: tuple[str, ...],
    start: str | None,
    end: str | None,
    points: int,
    as_json: bool,
    as_csv: bool,
    svg: str | None,
    show: str,
    plain: bool,
    units: str,
    basis: str | None,
) -> None:
    """Show figures of the settings in a scenario FILE against one quantity.

    Every point is worked out like a setting that differs in that quantity alone; its surface loses the same heat at
    equal useful heat. Letters in a picture mark where the settings themselves are. Where a point cannot be worked
    out, such as a fuel-rich gas, the curve has a gap.
    """
    if as_json and as_csv:
        raise click.UsageError("--json and --csv cannot both be asked for; choose one")
    if svg is not None and not svg.lower().endswith(".svg"):
        raise click.UsageError(f"--svg {svg!a}: the name of the drawing must end in .svg")
    from fluegas.cli.narration import console, note_cautions, note_unused_keys
    from fluegas.report.curve_output import curve_csv, curve_json, print_curves
    from fluegas.report.curve_table import curve_table
    from fluegas.scenario.reading import read_scenario
    from fluegas.scenario.result import work_out

    scenario = read_scenario(file)
    note_unused_keys(scenario)
    result = work_out(scenario)
    note_cautions(result, file)
    places = _places(result, names)
    found = _curves(result, against, places, words, basis, _span(result, against, places, start, end, units), points)
    table = curve_table(found, result.case, system=units)
    if svg is not None:
        _draw(svg, table, scenario.top.text("title") or scenario.name)
    if as_json:
        click.echo(curve_json(found, result), nl=False)
    elif as_csv:
        click.echo(curve_csv(table), nl=False)
    else:
        pictures, numbers, ascii_only = show != "table", show != "picture", plain or _needs_ascii()
        print_curves(console(), result, table, pictures=pictures, numbers=numbers, ascii_only=ascii_only)


def _draw(svg: str, table: "CurveTable", title: str) -> None:
    from fluegas.cli.output_file import write_whole
    from fluegas.report.curve_drawing import curve_svg
    from fluegas.scenario.wording import escaped

    write_whole(svg, curve_svg(table, title))
    click.echo(f"note: drawn into {escaped(svg)}", err=True)


def _places(result: "Result", names: tuple[str, ...]) -> list[int]:
    from fluegas.errors import InputError
    from fluegas.scenario.wording import listed, nearest, quoted

    known = [column.name for column in result.case.columns]
    for name in names:
        if name not in known:
            near = nearest(name, known)
            raise InputError(f"--setting {quoted(name)}: no such setting{near}; there are {listed(map(quoted, known))}")
    return [place for place, name in enumerate(known) if not names or name in names]


def _span(
    result: "Result", against: str, places: list[int], start: str | None, end: str | None, units: str
) -> tuple[float, float]:
    """Return the ends of the curve [SI], the usual ones where none is given."""
    from fluegas.errors import InputError
    from fluegas.report.curve_span import default_span

    low, high = default_span(result.case.data, against, places, units) if start is None or end is None else (0.0, 0.0)
    low = low if start is None else _end("--from", against, start)
    high = high if end is None else _end("--to", against, end)
    if not low < high:
        raise InputError("the curve would end where it starts or before; give --from and --to so that --to is larger")
    return low, high


def _end(option: str, against: str, text: str) -> float:
    from fluegas.errors import InputError
    from fluegas.scenario.fields import FIELDS_OF
    from fluegas.scenario.values import value_of
    from fluegas.units import Measure, parse

    place = _QUANTITIES[against]
    try:
        value = parse(text, "fraction") if place is None else value_of(FIELDS_OF[place[0]][place[1]], text)
    except InputError as error:
        raise InputError(f"{option}: {error}") from error
    assert isinstance(value, Measure)
    return value.value


def _curves(
    result: "Result",
    against: str,
    places: list[int],
    words: tuple[str, ...],
    basis: str | None,
    span: tuple[float, float],
    points: int,
) -> "Curves":
    from fluegas.accounting.curve import curves
    from fluegas.errors import InputError
    from fluegas.report.curve_span import even_points
    from fluegas.report.figure_names import find_figures

    shown_basis = basis or result.case.data.basis
    names = find_figures(words or ("efficiency", "losses.dry_gas"), shown_basis)
    case, values = result.case, even_points(*span, points)
    try:
        return curves(case.data, case.unit, against, values, names, places)
    except InputError as error:
        raise InputError(f"--against {against}, {_words(against, span)}: {error}") from error


def _words(against: str, span: tuple[float, float]) -> str:
    from fluegas.accounting.curve import variable_of
    from fluegas.units import display_unit, from_si

    dimension = variable_of(against).dimension
    unit = display_unit(dimension, "si")
    low, high = (f"{from_si(end, dimension, unit):.6g} {unit}" for end in span)
    return f"from {low} to {high}"


def _needs_ascii() -> bool:
    """Return whether the output cannot show braille: as the user says, not UTF-8, or an old Windows console."""
    if os.environ.get("FLUEGAS_ASCII", "") not in ("", "0"):
        return True
    if "utf" not in (sys.stdout.encoding or "").lower():
        return True
    return sys.platform == "win32" and "WT_SESSION" not in os.environ
