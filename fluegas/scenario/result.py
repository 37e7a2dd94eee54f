"""A scenario worked out: its case, the accounts of its settings, their comparison and cautions."""

from dataclasses import dataclass

from fluegas.accounting.account import heat_account
from fluegas.accounting.cautions import cautions_of
from fluegas.accounting.inputs import AccountInput, take
from fluegas.accounting.ledger import Ledger, ledger
from fluegas.errors import Caution, InputError, Problem, ScenarioError
from fluegas.scenario.case import Case, case_of
from fluegas.scenario.model import Scenario


@dataclass(frozen=True)
class Result:
    """What a scenario comes to. Arrays of the ledger have shape `(n_settings,)`; `cautions` has a tuple for each."""

    scenario: Scenario
    case: Case
    ledger: Ledger
    cautions: tuple[tuple[Caution, ...], ...]


def work_out(scenario: Scenario) -> Result:
    """Return the accounts of every setting of a scenario.

    Raises ScenarioError for readings or entries that cannot be.
    """
    case = case_of(scenario)
    try:
        accounts = ledger(case.data, case.unit)
    except InputError as error:
        raise ScenarioError(_problems(scenario, case, error)) from error
    cautions = []
    for place, column in enumerate(case.columns):
        figures = {name: float(values[place]) for name, values in accounts.account.items()}
        found = cautions_of(_one_setting(case, place), figures, column.limits)
        cautions.append((*column.cautions, *found))
    return Result(scenario, case, accounts, tuple(cautions))


def _one_setting(case: Case, place: int) -> AccountInput:
    return take(case.data, 1, 0, slice(place, place + 1))


def _problems(scenario: Scenario, case: Case, error: InputError) -> tuple[Problem, ...]:
    """Return which settings cannot be worked out and why; `error` itself if none fails alone."""
    problems = []
    for place, column in enumerate(case.columns):
        try:
            heat_account(_one_setting(case, place))
        except InputError as own:
            line = scenario.line_of(("setting", place))
            problems.append(Problem(scenario.name, line, f"setting {column.name!r}", str(own)))
    return tuple(problems) or (Problem(scenario.name, None, "", str(error)),)
