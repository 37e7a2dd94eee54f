"""`fluegas fuel FILE-OR-NAME`: what a fuel is, as a table or JSON."""

from pathlib import Path
from typing import TYPE_CHECKING

import click

from fluegas.cli.options import basis_option, units_option

if TYPE_CHECKING:
    from fluegas.scenario.fuel_sheet import FuelSheet


@click.command("fuel")
@click.argument("name", metavar="FILE-OR-NAME")
@click.option("--json", "as_json", is_flag=True, help="Print one JSON object, always in SI.")
@units_option
@basis_option
@click.option(
    "--reference-temperature",
    "reference",
    metavar="TEMPERATURE",
    help="For the heating values of a library fuel, e.g. 15degC; 25 degC if not given. A file has its own.",
)
def command(name: str, as_json: bool, units: str, basis: str | None, reference: str | None) -> None:
    """Show the fuels of a scenario file, or one of the fuel library by NAME.

    Heating values, density and Wobbe index as a real gas, air demand, flue gas, maximum CO2, F factors, CO2 by heat,
    dew point and flame temperature. `fluegas fuels` lists the library.
    """
    sheets, own_basis = _sheets(name, reference)
    if as_json:
        from fluegas.report.fuel_json import fuels_json_text

        click.echo(fuels_json_text(sheets), nl=False)
        return
    from fluegas.cli.narration import console
    from fluegas.report.fuel_text import print_fuels

    print_fuels(console(), sheets, system=units, basis=basis or own_basis)


def _sheets(name: str, reference: str | None) -> "tuple[tuple[FuelSheet, ...], str]":
    """Return the sheets of a file, or of a library fuel if there is no such file, and the basis to show first."""
    from fluegas.scenario.fuel_sheet import library_sheet, scenario_sheets
    from fluegas.scenario.library import known_name, no_such_fuel

    if not _is_there(name) and known_name(name) is not None:
        return (library_sheet(name, _temperature(reference)),), "gross"
    if not _is_there(name) and not name.endswith(".toml") and not {"/", "\\"} & set(name):
        raise click.UsageError(f"there is no such file, and {no_such_fuel(name)}")
    if reference is not None:
        raise click.UsageError("--reference-temperature is for library fuels; a file states its reference_temperature")
    from fluegas.cli.narration import note_unused_keys
    from fluegas.scenario.reading import read_scenario

    scenario = read_scenario(name)
    note_unused_keys(scenario)
    return scenario_sheets(scenario), scenario.top.text("basis") or "gross"


def _is_there(name: str) -> bool:
    try:
        return Path(name).exists()
    except (OSError, ValueError):
        return False


def _temperature(text: str | None) -> float:
    if text is None:
        return 298.15
    from fluegas.scenario.fields import FIELDS_OF
    from fluegas.scenario.values import RefusedError, value_of
    from fluegas.units import Measure

    try:
        measure = value_of(FIELDS_OF["top"]["reference_temperature"], text)
    except RefusedError as error:
        raise click.UsageError(f"--reference-temperature: {error}") from error
    assert isinstance(measure, Measure)
    return measure.value
