"""Run with `python -m tests.bench`: prints every ratio and its target."""

from fluegas.resources import folder
from tests.bench.account_speed import compare_account
from tests.bench.process_speed import compare_processes

if __name__ == "__main__":
    for comparison in [*compare_account(), *compare_processes(str(folder("scenarios") / "laundry-boiler.toml"))]:
        print(comparison)
