"""Timing of alternating runs, and how a ratio is printed."""

import time
from collections.abc import Callable, Sequence
from dataclasses import dataclass
from statistics import median


@dataclass(frozen=True)
class Comparison:
    """One measured figure and the target it is held against."""

    what: str
    value: float
    target: float

    def __str__(self) -> str:
        verdict = "within" if self.value <= self.target else "ABOVE"
        return f"{self.value:8.2f}  {verdict} {self.target:g}   {self.what}"


def alternate(
    runs: Sequence[Callable[[], object]], repeats: int, clock: Callable[[], float] = time.perf_counter
) -> list[float]:
    """Return the median time [s] by `clock` of each of `runs`, run in turn `repeats` times after one warm-up."""
    times: list[list[float]] = [[] for _ in runs]
    for turn in range(repeats + 1):
        for run, found in zip(runs, times, strict=True):
            start = clock()
            run()
            if turn:
                found.append(clock() - start)
    return [median(found) for found in times]
