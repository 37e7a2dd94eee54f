"""What the flue gas gives between two temperatures, as a table model and as JSON."""

import json
from collections.abc import Iterable
from typing import Any

import numpy as np

from fluegas import __version__
from fluegas.accounting.inputs import BASES
from fluegas.report.json_output import FORMAT, caution_object
from fluegas.report.ledger_table import Group, LedgerTable, Row, figure_row
from fluegas.report.numbers import number_or_none, shown, unit_of
from fluegas.scenario.duty_result import DutyResult


def duty_table(found: DutyResult, *, system: str) -> LedgerTable:
    """Return the table model in "si" or "us" units: settings are columns."""
    case = found.result.case
    groups = (Group("flue gas cooled", tuple(_rows(found, system))),)
    return LedgerTable(tuple(column.name for column in case.columns), case.unit.baseline, groups)


def duty_heading(found: DutyResult, *, system: str) -> str:
    """Return what the table shows, temperatures in "si" or "us" units."""
    unit = unit_of("temperature", system)
    start, end = (shown(kelvin, "temperature", unit) for kelvin in (found.start, found.end))
    return f"heat that the flue gas gives from {start} to {end} {unit}"


def _rows(found: DutyResult, system: str) -> Iterable[Row]:
    duty, rate = found.duty, found.fuel_rate
    condenses = bool(np.any(np.nan_to_num(duty.condensate)))
    heats = [("sensible", "Sensible heat", duty.sensible), ("condensation", "Condensation", duty.condensation)]
    for name, label, values in heats if condenses else []:
        yield figure_row(f"per_fuel.{name}", label, "energy_per_mass", values, system)
    yield figure_row("per_fuel.total", "Heat per fuel", "energy_per_mass", duty.total, system)
    for basis in BASES:
        yield figure_row(f"share.{basis}", f"of {basis} heat input", "fraction", found.share(basis), system)
    if not np.all(np.isnan(rate)):
        yield figure_row("power", "Heat flow", "power", rate * duty.total, system)
        if condenses:
            yield figure_row("condensate_flow", "Condensate", "mass_flow", rate * duty.condensate, system)


def duty_json_text(found: DutyResult) -> str:
    """Return the JSON text: SI, fractions of 1, null where there is no figure; it ends with a line break."""
    return json.dumps(_object(found), indent=2, allow_nan=False) + "\n"


def _object(found: DutyResult) -> dict[str, Any]:
    columns = found.result.case.columns
    return {
        "fluegas": __version__,
        "format": FORMAT,
        "title": found.result.scenario.top.text("title"),
        "basis": found.result.case.data.basis,
        "from": found.start,
        "to": found.end,
        "settings": [{"name": column.name, **_setting(found, place)} for place, column in enumerate(columns)],
    }


def _setting(found: DutyResult, place: int) -> dict[str, Any]:
    duty, rate = found.duty, found.fuel_rate[place]
    parts = {"sensible": duty.sensible, "condensation": duty.condensation, "total": duty.total}
    return {
        "per_fuel": {name: number_or_none(values[place]) for name, values in parts.items()},
        "share": {basis: number_or_none(found.share(basis)[place]) for basis in BASES},
        "power": number_or_none(rate * duty.total[place]),
        "condensate": number_or_none(duty.condensate[place]),
        "condensate_flow": number_or_none(rate * duty.condensate[place]),
        "cautions": [caution_object(caution) for caution in found.result.cautions[place]],
    }
