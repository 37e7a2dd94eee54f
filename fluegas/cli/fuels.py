"""`fluegas fuels`: the fuel library."""

import click

from fluegas.cli.options import units_option


@click.command("fuels")
@click.option("--json", "as_json", is_flag=True, help="Print one JSON object, always in SI, with every figure.")
@units_option
def command(as_json: bool, units: str) -> None:
    """List the fuels of the library.

    Write `library = "NAME"` in [fuel] of a scenario file to use one; `fluegas fuel NAME` shows it whole.
    """
    from fluegas.scenario.fuel_sheet import library_sheet
    from fluegas.scenario.library import library_names

    sheets = [library_sheet(name) for name in library_names()]
    if as_json:
        from fluegas.report.fuel_json import fuels_json_text

        click.echo(fuels_json_text(sheets), nl=False)
        return
    from fluegas.cli.narration import console
    from fluegas.report.fuel_text import print_library

    print_library(console(), sheets, system=units)
