"""How long a whole `account` takes from the shell, against a bare `import numpy`."""

import os
import subprocess
import sys

from tests.bench.timing import Comparison, alternate


def _run(*words: str) -> None:
    subprocess.run(
        [sys.executable, *words], check=True, stdout=subprocess.DEVNULL, env={**os.environ, "OPENBLAS_NUM_THREADS": "1"}
    )


def compare_processes(demo: str) -> list[Comparison]:
    """Return the ratio of `account DEMO --json` and of `--help` as whole processes to `import numpy`."""
    numpy, account, help_text = alternate(
        [
            lambda: _run("-c", "import numpy"),
            lambda: _run("-m", "fluegas", "account", demo, "--json"),
            lambda: _run("-m", "fluegas", "--help"),
        ],
        repeats=11,
    )
    return [
        Comparison("process `account DEMO --json` / process `import numpy`", account / numpy, 5.0),
        Comparison("process `--help` / process `import numpy`", help_text / numpy, 1.0),
    ]
