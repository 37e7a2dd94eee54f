"""Where the commands print: data through one console, narration to standard error."""

import os
import sys
from typing import TYPE_CHECKING

import click

from fluegas.scenario.checking import unused_keys
from fluegas.scenario.model import Scenario
from fluegas.scenario.wording import escaped

if TYPE_CHECKING:
    from rich.console import Console

    from fluegas.scenario.result import Result


def console() -> "Console":
    """Return the console for data: standard output, no markup, no highlights, plain if NO_COLOR is set."""
    from rich.console import Console

    return Console(
        file=sys.stdout,
        color_system=None if os.environ.get("NO_COLOR") else "auto",
        markup=False,
        highlight=False,
        emoji=False,
    )


def note_unused_keys(scenario: Scenario) -> None:
    """Say which keys of the file are understood but have no effect yet."""
    keys = unused_keys(scenario)
    if keys:
        click.echo(f"note: understood but without effect in this version: {', '.join(keys)}", err=True)


def note_cautions(result: "Result", file: str) -> None:
    """Say how many cautions there are and where to read them, for outputs that cannot hold them."""
    doubts = {caution.message for cautions in result.cautions for caution in cautions}
    if doubts:
        plural = "caution" if len(doubts) == 1 else "cautions"
        click.echo(f"note: {len(doubts)} {plural} about the settings: fluegas check {escaped(file)}", err=True)
