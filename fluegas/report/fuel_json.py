"""Fuels as one JSON object: SI units, fractions of 1, null where a fuel has no such figure."""

import json
from collections.abc import Sequence
from typing import Any

from fluegas import __version__
from fluegas.report.json_output import FORMAT, caution_object
from fluegas.report.numbers import number_or_none
from fluegas.scenario.fuel_sheet import FuelSheet, composition


def fuels_json_text(sheets: Sequence[FuelSheet]) -> str:
    """Return the JSON text of `sheets`, ending with a line break."""
    whole = {"fluegas": __version__, "format": FORMAT, "fuels": [fuel_object(sheet) for sheet in sheets]}
    return json.dumps(whole, indent=2, allow_nan=False) + "\n"


def fuel_object(sheet: FuelSheet) -> dict[str, Any]:
    """Return one fuel: what it is, its composition, its figures nested by the parts of their names, its cautions."""
    nested: dict[str, Any] = {}
    for name, value in sheet.figures.items():
        inner, (*tables, last) = nested, name.split(".")
        for table in tables:
            inner = inner.setdefault(table, {})
        inner[last] = number_or_none(value)
    parts = composition(sheet.fuel)
    return {
        "name": sheet.entry.text("name"),
        "library": sheet.library,
        "origin": sheet.origin or None,
        "settings": list(sheet.settings),
        "state": sheet.state,
        "kind": sheet.entry.text("kind"),
        "reference_temperature": sheet.fuel.reference_temperature,
        "biogenic_share": sheet.biogenic_share,
        "composition": {"mole": parts.get("mole"), "mass": parts.get("mass")},
        **nested,
        "cautions": [caution_object(caution) for caution in sheet.cautions],
    }
