"""The result as one JSON object, a contract for scripts: SI units, fractions of 1, null where there is no figure."""

import json
from collections.abc import Mapping
from typing import Any

import numpy as np

from fluegas import __version__
from fluegas.accounting.emissions import COUNTED_AS, origins, per_year
from fluegas.accounting.inputs import BASES
from fluegas.accounting.ledger import other_losses
from fluegas.errors import Caution
from fluegas.report.numbers import number_or_none
from fluegas.scenario.result import Result

FORMAT = 1
_TOP = ("excess_air", "air_ratio", "air_per_fuel", "flue_gas_per_fuel")


def json_text(result: Result) -> str:
    """Return the JSON text of `result`, ending with a line break."""
    return json.dumps(json_object(result), indent=2, allow_nan=False) + "\n"


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
            "gross_heating_value": number_or_none(baseline.fuel.gross_heating_value),
            "net_heating_value": number_or_none(baseline.fuel.net_heating_value),
        },
        "baseline": baseline.name,
        "settings": [_setting(result, place) for place in range(len(case.columns))],
    }


def _setting(result: Result, place: int) -> dict[str, Any]:
    account = result.ledger.account
    nested: dict[str, Any] = {}
    for name, values in account.items():
        _place(nested, name.split("."), number_or_none(values[place]))
    for basis in BASES:
        others = other_losses(result.case.data, basis)
        nested["losses"][basis]["other"] = {name: _one(values, place) for name, values in others.items()}
    nested["flame_temperature"]["equilibrium"] = None
    _complete_emissions(nested["emissions"], result, place)
    column = result.case.columns[place]
    return {
        "name": column.name,
        "gross_heating_value": number_or_none(column.fuel.gross_heating_value),
        "net_heating_value": number_or_none(column.fuel.net_heating_value),
        "heat_input": number_or_none(result.ledger.heat_input[place]),
        **nested,
        "against_baseline": _against(result, place),
        "doubt": None,
        "cautions": [caution_object(caution) for caution in result.cautions[place]],
    }


def _complete_emissions(emissions: dict[str, Any], result: Result, place: int) -> None:
    """Add what lies outside the account: the mass of a year, and where a share comes from."""
    ledger, data = result.ledger, result.case.data
    for stem, values in per_year(ledger.account, ledger.annual_heat, data.basis).items():
        into, key = (emissions[stem], "per_year") if stem in COUNTED_AS else (emissions, f"{stem}_per_year")
        into[key] = number_or_none(values[place])
    for gas, texts in origins(data).items():
        emissions[gas]["origin"] = str(np.broadcast_to(texts, ledger.account.shape)[place]) or None


def _place(nested: dict[str, Any], parts: list[str], value: float | None) -> None:
    for part in parts[:-1]:
        nested = nested.setdefault(part, {})
    nested[parts[-1]] = value


def _against(result: Result, place: int) -> Mapping[str, Any]:
    comparison = result.ledger.comparison
    return {
        "compared_with": result.case.columns[comparison.compared_with[place]].name,
        "fuel": number_or_none(comparison.fuel[place]),
        "fuel_by_basis": {
            "gross": number_or_none(comparison.fuel_gross[place]),
            "net": number_or_none(comparison.fuel_net[place]),
        },
        "heat": number_or_none(comparison.heat[place]),
        "cost": number_or_none(comparison.cost[place]),
        "currency": result.case.currency,
        "co2": number_or_none(comparison.carbon_dioxide[place]),
    }


def caution_object(caution: Caution) -> dict[str, Any]:
    """Return a caution as scripts read it."""
    return {
        "code": caution.code,
        "message": caution.message,
        "value": caution.value,
        "limit": caution.limit,
        "source": caution.source,
    }


def _one(values: Any, place: int) -> float | None:
    return number_or_none(values[place] if getattr(values, "ndim", 0) else values)
