"""What can go wrong, and how it is said.

FluegasError
├── InputError (ValueError)          something a person gave cannot be used
│   ├── QuantityError                text that is not a number with a fitting unit
│   ├── RangeError                   a value outside its limits
│   ├── AnalysisError                a fuel analysis that cannot be
│   └── ScenarioError                one or more problems in a scenario file
├── SavingError (OSError)            a scenario file cannot be changed or written; nothing was lost
├── ConvergenceError (ArithmeticError)   an iteration did not settle
└── DataError (RuntimeError)         the program's own data are missing or damaged

What is doubtful but not fatal is a Caution: data that travels with the results.
"""

from dataclasses import dataclass


class FluegasError(Exception):
    """Base of every error that fluegas raises on purpose."""


class InputError(FluegasError, ValueError):
    """Something that a person gave cannot be used."""


class QuantityError(InputError):
    """A text is not a number with a fitting unit."""


class RangeError(InputError):
    """A value lies outside its limits.

    The fields are SI values: `what` is the quantity's name, `value` the offending value, `low` and `high` the limits
    (None where there is none), `source` where the limits come from.
    """

    def __init__(
        self,
        what: str,
        value: float,
        low: float | None = None,
        high: float | None = None,
        *,
        unit: str = "",
        source: str = "",
    ) -> None:
        self.what, self.value, self.low, self.high, self.unit, self.source = (
            what,
            value,
            low,
            high,
            unit,
            source,
        )
        space = f" {unit}" if unit else ""
        if low is not None and high is not None:
            limit = f"between {low:g} and {high:g}{space}"
        elif low is not None:
            limit = f"at least {low:g}{space}"
        else:
            limit = f"at most {high:g}{space}"
        origin = f" ({source})" if source else ""
        super().__init__(f"{what} is {value:g}{space}; it must be {limit}{origin}")


class AnalysisError(InputError):
    """A fuel analysis cannot be: it is empty, negative or burns to nothing."""


@dataclass(frozen=True)
class Problem:
    """One problem of a scenario file: where it is, what is wrong and what would be right."""

    file: str
    line: int | None
    key: str
    message: str

    def __str__(self) -> str:
        place = self.file if self.line is None else f"{self.file}:{self.line}"
        return f"{place}: {self.key}: {self.message}" if self.key else f"{place}: {self.message}"


class ScenarioError(InputError):
    """A scenario file has one or more problems, all of them in `problems`."""

    def __init__(self, problems: tuple[Problem, ...]) -> None:
        self.problems = problems
        super().__init__("\n".join(str(problem) for problem in problems))


class SavingError(FluegasError, OSError):
    """A scenario file cannot be changed or written as asked. The file and the unsaved text are as they were."""


class ConvergenceError(FluegasError, ArithmeticError):
    """An iteration did not settle within its limit of steps."""


class DataError(FluegasError, RuntimeError):
    """The program's own data are missing or damaged."""


@dataclass(frozen=True)
class Caution:
    """Something doubtful about a setting: a code, a sentence, the value and its limit in SI, the limit's source."""

    code: str
    message: str
    value: float | None = None
    limit: float | None = None
    source: str = ""
