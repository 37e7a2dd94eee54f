"""Scenario documents for tests: plain dictionaries that `text_of` writes as TOML."""

from collections.abc import Mapping
from copy import deepcopy
from typing import Any

import numpy as np
import tomlkit

from fluegas.errors import Problem, ScenarioError
from fluegas.scenario.reading import parse_scenario
from fluegas.scenario.result import Result, work_out

Document = dict[str, Any]

GAS: Document = {
    "state": "gas",
    "mole_percent": {"methane": 93.1, "ethane": 4.2, "propane": 0.8, "nitrogen": 1.2, "carbon dioxide": 0.7},
}
OIL: Document = {
    "state": "liquid",
    "gross_heating_value": "45.5 MJ/kg",
    "mass_percent": {"carbon": 86.3, "hydrogen": 13.3, "sulfur": 0.1, "oxygen": 0.2, "moisture": 0.1},
}
COAL: Document = {
    "state": "solid",
    "gross_heating_value": "27.1 MJ/kg",
    "mass_percent": {"carbon": 67.0, "hydrogen": 4.5, "oxygen": 9.0, "nitrogen": 1.5, "ash": 10.0, "moisture": 8.0},
}
AIR: Document = {"temperature": "22 degC", "relative_humidity": "55 %", "pressure": "1013 mbar"}
SETTING: Document = {"name": "As found", "o2": "6.4 %", "co": "45 ppm", "flue_temperature": "231 degC"}


def document(fuel: Mapping[str, Any] = GAS, *settings: Mapping[str, Any], **tables: Any) -> Document:
    """Return a sound document with `settings` (one if none is given); `tables` replaces or adds top entries."""
    given = settings or (SETTING,)
    plain = {"fluegas": 1, "fuel": fuel, "air": AIR, "setting": list(given), **tables}
    return deepcopy(plain)


def setting(name: str = "As found", **changes: Any) -> Document:
    """Return a setting; a change to None takes a key away."""
    whole = {**SETTING, "name": name, **changes}
    return {key: value for key, value in whole.items() if value is not None}


def text_of(plain: Mapping[str, Any]) -> str:
    return tomlkit.dumps(plain)


def result_of(plain: Mapping[str, Any]) -> Result:
    return work_out(parse_scenario(text_of(plain)))


def figure(plain: Mapping[str, Any], name: str, place: int = 0) -> float:
    """Return one figure of the account of a document."""
    return float(result_of(plain).ledger.account[name][place])


def problems_of(text: str) -> tuple[Problem, ...]:
    """Return the problems of a scenario text, none if it can be read and worked out."""
    try:
        work_out(parse_scenario(text))
    except ScenarioError as error:
        return error.problems
    return ()


def assert_alike(first: Document, second: Document, rel: float = 1e-12) -> None:
    """Check that two documents come to the same account."""
    one, other = result_of(first).ledger.account, result_of(second).ledger.account
    assert set(one) == set(other)
    for name in one:
        np.testing.assert_allclose(one[name], other[name], rtol=rel, atol=1e-15, err_msg=name)
