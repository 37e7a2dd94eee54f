"""`fluegas duty FILE --from 214degC --to 126degC`: the heat that the flue gas gives between two temperatures."""

import click

from fluegas.cli.options import file_argument, units_option


@click.command("duty")
@file_argument
@click.option("--from", "start", metavar="TEMPERATURE", required=True, help="Where cooling starts, e.g. 214degC.")
@click.option("--to", "end", metavar="TEMPERATURE", required=True, help="Where it ends, e.g. 126degC.")
@click.option("--json", "as_json", is_flag=True, help="Print one JSON object, always in SI.")
@units_option
def command(file: str, start: str, end: str, as_json: bool, units: str) -> None:
    """Work out what the flue gas of every setting in a scenario FILE gives as it cools.

    Sensible heat, and below the water dew point also condensation, as for an economiser or an air heater: per
    kilogram of fuel, in percent of the heat input, and as heat flow where the heat input is known. The gas is that
    of the setting's readings; air that leaks in between is not counted.
    """
    warm, cold = _temperature(start, "--from"), _temperature(end, "--to")
    if not warm > cold:
        raise click.UsageError(f"--from {start} must be above --to {end}: the flue gas gives heat as it cools")
    from fluegas.cli.narration import note_unused_keys
    from fluegas.report.duty_output import duty_heading, duty_json_text, duty_table
    from fluegas.scenario.duty_result import duty_of
    from fluegas.scenario.reading import read_scenario
    from fluegas.scenario.result import work_out

    scenario = read_scenario(file)
    note_unused_keys(scenario)
    found = duty_of(work_out(scenario), warm, cold)
    if as_json:
        click.echo(duty_json_text(found), nl=False)
        return
    from fluegas.cli.narration import console
    from fluegas.report.text_output import print_table

    print_table(console(), found.result, duty_table(found, system=units), duty_heading(found, system=units))


def _temperature(text: str, option: str) -> float:
    from fluegas.errors import QuantityError
    from fluegas.units import parse

    try:
        return parse(text, "temperature").value
    except QuantityError as error:
        raise click.UsageError(f"{option}: {error}") from error
