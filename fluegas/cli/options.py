"""Options and arguments that several commands share."""

import click

file_argument = click.argument("file", metavar="FILE", type=click.Path())
units_option = click.option(
    "--units", type=click.Choice(["si", "us"]), default="si", show_default=True, help="Units of the tables."
)
basis_option = click.option(
    "--basis", type=click.Choice(["gross", "net"]), default=None, help="Basis shown first; the file's if not given."
)
