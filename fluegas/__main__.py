"""Entry of the program: hands the words of the command line to a command and its outcome to the shell."""

import io
import os
import sys
from collections.abc import Sequence

DONE, FAILED, BAD_INPUT, INTERRUPTED, BROKEN_PIPE = 0, 1, 2, 130, 141


def main(words: Sequence[str] | None = None) -> int:
    """Run one command; return its exit status: 0 done, 2 bad arguments or file, 1 anything else, 128 + n on a signal.

    Problems go to standard error, one plain line each; never a traceback.
    """
    import click

    from fluegas.cli import COMMANDS, group
    from fluegas.errors import FluegasError, InputError
    from fluegas.scenario.wording import escaped

    given = list(sys.argv[1:] if words is None else words)
    for stream in (sys.stdout, sys.stderr):
        if hasattr(stream, "reconfigure"):
            stream.reconfigure(errors="backslashreplace")
    if given and not given[0].startswith("-") and given[0] not in COMMANDS:
        return _workspace(given[0], list(COMMANDS))
    output = sys.stdout
    try:
        group.main(args=given, prog_name="fluegas", standalone_mode=False)
        sys.stdout.flush()
    except click.exceptions.NoArgsIsHelpError as error:
        click.echo(error.format_message(), err=True)
        return BAD_INPUT
    except click.ClickException as error:
        said = io.StringIO()
        error.show(said)
        click.echo("\n".join(map(escaped, said.getvalue().splitlines())), err=True)
        return BAD_INPUT
    except (KeyboardInterrupt, click.Abort):
        return INTERRUPTED
    except SystemExit:
        if sys.stdout is not output:  # click has put its own stream in place of a closed pipe
            return BROKEN_PIPE
        raise
    except BrokenPipeError:
        os.dup2(os.open(os.devnull, os.O_WRONLY), sys.stdout.fileno())
        return BROKEN_PIPE
    except InputError as error:
        click.echo(str(error), err=True)
        return BAD_INPUT
    except FluegasError as error:
        click.echo(f"fluegas: {error}", err=True)
        return FAILED
    except Exception as error:
        said_why = f"{type(error).__name__}: {escaped(str(error))}"
        click.echo(f"fluegas: unexpected failure, please report it: {said_why}", err=True)
        return FAILED
    return DONE


def _workspace(word: str, commands: Sequence[str]) -> int:
    from difflib import get_close_matches

    near = get_close_matches(word, commands, 1)
    hint = f"did you mean 'fluegas {near[0]}'?" if near else f"for the account of a file: fluegas account {word!a}"
    print(f"fluegas: no command {word!a}; the interactive workspace is not in this version; {hint}", file=sys.stderr)
    return BAD_INPUT


if __name__ == "__main__":
    sys.exit(main())
