"""`fluegas check FILE`: is the file sound, and what is doubtful about its readings?"""

import click

from fluegas.cli.options import file_argument


@click.command("check")
@file_argument
def command(file: str) -> None:
    """Check a scenario FILE: every problem with its line, then the cautions about each setting.

    A file with problems gives them all on standard error and exit status 2. Cautions alone leave it at 0.
    """
    from fluegas.cli.narration import console, note_unused_keys
    from fluegas.report.text_output import print_check
    from fluegas.scenario.reading import read_scenario
    from fluegas.scenario.result import work_out

    scenario = read_scenario(file)
    note_unused_keys(scenario)
    print_check(console(), work_out(scenario))
