"""How numbers are shown: units of the system chosen, decimals by kind of quantity, a dash where there is no figure."""

from math import isfinite, isnan
from typing import Any

from fluegas.units import display_unit, from_si

MISSING = "-"
_DECIMALS = {
    "%": 2,
    "ppm": 0,
    "degC": 1,
    "degF": 1,
    "K": 1,
    "-": 3,
    "kg/kg": 2,
    "lb/lb": 2,
    "MWh": 1,
    "MMBtu": 1,
    "kW": 0,
    "MMBtu/h": 3,
    "t": 1,
    "kg/h": 0,
    "lb/h": 0,
    "kg/MWh": 1,
    "lb/MMBtu": 1,
    "MJ/kg": 3,
    "kJ/mol": 2,
    "Btu/lb": 0,
    "mbar": 0,
    "inHg": 2,
}
_DECIMALS_OF = {
    ("normal_concentration", "mg/Nm3"): 1,
    ("trace_emission_per_energy", "mg/MJ"): 2,
    ("trace_emission_per_energy", "lb/MMBtu"): 4,
    ("density", "kg/m3"): 4,
    ("density", "lb/ft3"): 5,
    ("volume_per_energy", "m3/GJ"): 1,
    ("volume_per_energy", "ft3/MMBtu"): 0,
    ("energy_per_volume", "Btu/ft3"): 1,
    ("energy_per_amount", "Btu/scf"): 1,
    ("emission_per_energy", "kg/MMBtu"): 2,
    ("trace_mass", "kg"): 0,
    ("trace_mass", "lb"): 0,
}
"""Decimals of a quantity that needs others than its unit usually has."""


def unit_of(dimension: str, system: str) -> str:
    """Return the unit in which a figure of `dimension` is shown; masses of a year's gas in tonnes in either system."""
    return "t" if dimension == "mass" else display_unit(dimension, system)


def decimals_of(dimension: str, unit: str) -> int:
    """Return the decimals that a figure of `dimension` usually has in `unit`."""
    return _DECIMALS_OF.get((dimension, unit), _DECIMALS.get(unit, 3))


def shown(value: float, dimension: str, unit: str, *, signed: bool = False) -> str:
    """Return an SI `value` as text in `unit`, a dash for NaN; `signed` puts a plus before a gain."""
    if isnan(value):
        return MISSING
    number = from_si(value, dimension, unit)
    decimals = decimals_of(dimension, unit)
    text = f"{number:+,.{decimals}f}" if signed else f"{number:,.{decimals}f}"
    text = text.replace(",", " ")
    return text.removeprefix("-") if float(text.replace(" ", "")) == 0 and text.startswith("-") else text


def in_unit(value: float, dimension: str, unit: str) -> float | None:
    """Return an SI `value` in `unit`, None for NaN."""
    return None if isnan(value) else from_si(value, dimension, unit)


def number_or_none(value: Any) -> float | None:
    """Return one number of an array for JSON, None where it is not finite."""
    number = float(value)
    return number if isfinite(number) else None
