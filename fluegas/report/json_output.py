"""The result as one JSON object, a contract for scripts: SI units, fractions of 1, null where there is no figure."""

import json
from collections.abc import Mapping
from math import isfinite
from typing import Any

from fluegas import __version__
from fluegas.accounting.inputs import BASES
from fluegas.accounting.ledger import other_losses
from fluegas.errors import Caution
from fluegas.scenario.result import Result

FORMAT = 1
_TOP = ("excess_air", "air_ratio", "air_per_fuel", "flue_gas_per_fuel")


def json_text(result: Result) -> str:
    """Return the JSON text of `result`, ending with a line break."""
    return json.dumps(json_object(result), indent=2, ensure_ascii=False, allow_nan=False) + "\n"


def json_object(result: Result) -> dict[str, Any]:
    """Return the object that `account --json` prints."""
    scenario, case = result.scenario, result.case
    baseline = case.columns[case.unit.baseline]
    return {
        "fluegas": __version__,
        "format": FORMAT,
        "title": scenario.top.text("title"),
        "basis": case.data.basis,
        "reference_temperature": case.data.fuel.reference_temperature,
        "fuel": {
            "name": baseline.entry.text("name"),
            "gross_heating_value": _number(baseline.fuel.gross_heating_value),
            "net_heating_value": _number(baseline.fuel.net_heating_value),
        },
        "baseline": baseline.name,
        "settings": [_setting(result, place) for place in range(len(case.columns))],
    }


def _setting(result: Result, place: int) -> dict[str, Any]:
    account = result.ledger.account
    nested: dict[str, Any] = {}
    for name, values in account.items():
        _place(nested, name.split("."), _number(values[place]))
    for basis in BASES:
        others = other_losses(result.case.data, basis)
        nested["losses"][basis]["other"] = {name: _one(values, place) for name, values in others.items()}
    nested["flame_temperature"]["equilibrium"] = None
    column = result.case.columns[place]
    return {
        "name": column.name,
        "gross_heating_value": _number(column.fuel.gross_heating_value),
        "net_heating_value": _number(column.fuel.net_heating_value),
        "heat_input": _number(result.ledger.heat_input[place]),
        **nested,
        "against_baseline": _against(result, place),
        "doubt": None,
        "cautions": [_caution(caution) for caution in result.cautions[place]],
    }


def _place(nested: dict[str, Any], parts: list[str], value: float | None) -> None:
    for part in parts[:-1]:
        nested = nested.setdefault(part, {})
    nested[parts[-1]] = value


def _against(result: Result, place: int) -> Mapping[str, Any]:
    comparison = result.ledger.comparison
    return {
        "compared_with": result.case.columns[comparison.compared_with[place]].name,
        "fuel": _number(comparison.fuel[place]),
        "fuel_by_basis": {"gross": _number(comparison.fuel_gross[place]), "net": _number(comparison.fuel_net[place])},
        "heat": _number(comparison.heat[place]),
        "cost": _number(comparison.cost[place]),
        "currency": result.case.currency,
        "co2": _number(comparison.carbon_dioxide[place]),
    }


def _caution(caution: Caution) -> dict[str, Any]:
    return {
        "code": caution.code,
        "message": caution.message,
        "value": caution.value,
        "limit": caution.limit,
        "source": caution.source,
    }


def _number(value: Any) -> float | None:
    number = float(value)
    return number if isfinite(number) else None


def _one(values: Any, place: int) -> float | None:
    return _number(values[place] if getattr(values, "ndim", 0) else values)
