"""The command line: one module a command, imported only when its command is called."""

from importlib import import_module

import click

from fluegas import __version__

COMMANDS = {
    "account": "The heat account of every setting side by side.",
    "duty": "The heat that the flue gas gives between two temperatures.",
    "curve": "Figures against excess air, O2, a temperature or the fuel's moisture.",
    "fuel": "What a fuel is: heating values, air, flue gas, density, factors of emission rules.",
    "fuels": "The fuel library.",
    "new": "A commented scenario file to start from.",
    "check": "Problems of a scenario file and cautions about its readings.",
}
"""Every command and its line in the help; the module `fluegas.cli.NAME` holds its function `command`."""


class _Commands(click.Group):
    def list_commands(self, ctx: click.Context) -> list[str]:
        return list(COMMANDS)

    def get_command(self, ctx: click.Context, cmd_name: str) -> click.Command | None:
        if cmd_name not in COMMANDS:
            return None
        command: click.Command = import_module(f"fluegas.cli.{cmd_name}").command
        return command

    def format_commands(self, ctx: click.Context, formatter: click.HelpFormatter) -> None:
        with formatter.section("Commands"):
            formatter.write_dl(list(COMMANDS.items()))


@click.group(
    cls=_Commands,
    no_args_is_help=True,
    context_settings={"help_option_names": ["-h", "--help"], "max_content_width": 80},
    epilog="Exit status: 0 done, also with cautions; 2 bad arguments or a bad file; 1 anything else.",
)
@click.version_option(__version__, prog_name="fluegas", message="%(prog)s %(version)s")
def group() -> None:
    """Heat accounts of fired units from a fuel analysis and a few flue-gas readings.

    It computes and compares; it is no instruction to adjust a burner. Local codes, the maker's instructions and
    licensed practice lead.
    """
