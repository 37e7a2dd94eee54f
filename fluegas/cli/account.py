"""`fluegas account FILE`: the heat account as a table, CSV or JSON."""

import click

from fluegas.cli.options import basis_option, file_argument, units_option


@click.command("account")
@file_argument
@click.option("--json", "as_json", is_flag=True, help="Print one JSON object, always in SI.")
@click.option("--csv", "as_csv", is_flag=True, help="Print CSV, a row a figure.")
@units_option
@basis_option
def command(file: str, as_json: bool, as_csv: bool, units: str, basis: str | None) -> None:
    """Work out the heat account of every setting in a scenario FILE.

    Losses, credits and efficiency of each setting side by side, the product gas, dew points, and what each saves
    against the baseline. The data go to standard output, notes to standard error.
    """
    if as_json and as_csv:
        raise click.UsageError("--json and --csv cannot both be asked for; choose one")
    from fluegas.cli.narration import note_cautions, note_unused_keys
    from fluegas.scenario.reading import read_scenario
    from fluegas.scenario.result import work_out

    scenario = read_scenario(file)
    note_unused_keys(scenario)
    result = work_out(scenario)
    if as_json:
        from fluegas.report.json_output import json_text

        click.echo(json_text(result), nl=False)
        return
    from fluegas.report.ledger_table import ledger_table

    shown_basis = basis or result.case.data.basis
    table = ledger_table(result, system=units, basis=shown_basis)
    if as_csv:
        from fluegas.report.csv_output import csv_text

        click.echo(csv_text(table), nl=False)
        note_cautions(result, file)
        return
    from fluegas.cli.narration import console
    from fluegas.report.text_output import print_result

    print_result(console(), result, table, system=units, basis=shown_basis)
