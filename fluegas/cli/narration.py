"""Where the commands print: data through one console, narration to standard error."""

import os
import sys
from typing import TYPE_CHECKING

import click

from fluegas.scenario.checking import unused_keys
from fluegas.scenario.model import Scenario

if TYPE_CHECKING:
    from rich.console import Console


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
