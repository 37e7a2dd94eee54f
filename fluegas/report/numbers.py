"""How numbers are shown: units of the system chosen, decimals by kind of quantity, a dash where there is no figure."""

from math import isnan

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
    "MMBtu/h": 2,
    "t": 1,
    "kg/MWh": 1,
    "lb/MMBtu": 1,
    "MJ/kg": 3,
    "Btu/lb": 0,
    "mbar": 0,
    "inHg": 2,
}


def unit_of(dimension: str, system: str) -> str:
    """Return the unit in which a figure of `dimension` is shown; masses of a year's gas in tonnes in either system."""
    return "t" if dimension == "mass" else display_unit(dimension, system)


def shown(value: float, dimension: str, unit: str, *, signed: bool = False) -> str:
    """Return an SI `value` as text in `unit`, a dash for NaN; `signed` puts a plus before a gain."""
    if isnan(value):
        return MISSING
    number = from_si(value, dimension, unit)
    decimals = _DECIMALS.get(unit, 3)
    text = f"{number:+,.{decimals}f}" if signed else f"{number:,.{decimals}f}"
    text = text.replace(",", " ")
    return text.removeprefix("-") if float(text.replace(" ", "")) == 0 and text.startswith("-") else text


def in_unit(value: float, dimension: str, unit: str) -> float | None:
    """Return an SI `value` in `unit`, None for NaN."""
    return None if isnan(value) else from_si(value, dimension, unit)
