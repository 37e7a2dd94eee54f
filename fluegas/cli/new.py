"""`fluegas new FILE`: a commented scenario file to start from."""

import os

import click


@click.command("new")
@click.argument("file", metavar="FILE", type=click.Path())
@click.option(
    "--fuel",
    "state",
    type=click.Choice(["gas", "liquid", "solid"]),
    default="gas",
    show_default=True,
    help="State of the fuel.",
)
def command(file: str, state: str) -> None:
    """Write a commented scenario into a new FILE; a minus sign prints it instead.

    It works as it stands, with invented values to be replaced. A file that is there already is left alone.
    """
    from fluegas.errors import InputError, SavingError
    from fluegas.scenario.reading import parse_scenario
    from fluegas.scenario.saving import save
    from fluegas.scenario.starter import starter_text
    from fluegas.scenario.wording import escaped

    text = starter_text(state)
    if file == "-":
        click.echo(text, nl=False)
        return
    shown = escaped(file)
    if os.path.lexists(file):
        raise InputError(f"{shown}: there is something of this name already; nothing was written, name another file")
    try:
        save(parse_scenario(text, shown), file, expected_on_disk=None)
    except SavingError as error:
        raise InputError(escaped(str(error))) from error
    click.echo(f"note: written: {shown}; try: fluegas account {shown}", err=True)
