"""The range of a curve when none is asked for: round ends in the units shown, with the settings' own values inside."""

from math import ceil, floor

import numpy as np

from fluegas.accounting.curve import own_values
from fluegas.accounting.inputs import AccountInput
from fluegas.report.numbers import unit_of
from fluegas.thermo.polynomials import FloatArray
from fluegas.units import from_si, to_si

_FIXED = {
    "o2": (0.01, 0.11, 0.05),
    "excess-air": (0.0, 1.0, 0.5),
    "fuel-moisture": (0.0, 0.2, 0.1),
}
"""Usual low and high end, and the step by which the high end moves up to hold an own value."""
_AROUND = 50.0
"""How far [K] the range of a temperature reaches at least beyond the own values."""
_COLDEST_FLUE = 293.15


def default_span(data: AccountInput, variable: str, places: list[int], system: str) -> tuple[float, float]:
    """Return the ends [SI] of a curve over `variable` for the settings at `places`; `system` is "si" or "us"."""
    own = own_values(data, variable)[places]
    own = own[np.isfinite(own)]
    if variable in _FIXED:
        low, high = _share_span(variable, own)
        if variable == "o2":
            oxygen = np.broadcast_to(data.air.oxygen, np.shape(data.fuel_temperature))[places]
            high = min(high, max(0.95 * float(np.min(oxygen)), float(np.max(own, initial=0.0))))
        return low, high
    if variable == "flue-temperature":
        low, high = _around(own, system)
        return max(low, min(_COLDEST_FLUE, float(np.min(own)))), high
    return _air_span(data, own, places, system)


def even_points(low: float, high: float, count: int) -> FloatArray:
    """Return `count` points evenly from `low` to `high`, both among them."""
    return np.linspace(low, high, count)


def _share_span(variable: str, own: FloatArray) -> tuple[float, float]:
    """Return the usual ends, moved by whole steps to hold the own values."""
    low, high, step = _FIXED[variable]
    lowest, highest = float(np.min(own, initial=low)), float(np.max(own, initial=high))
    low = low if lowest >= low else floor(lowest / step + 1e-9) * step
    return low, low + ceil((highest - low) / step - 1e-9) * step


def _around(own: FloatArray, system: str) -> tuple[float, float]:
    """Return round ends that lie at least _AROUND beyond the own values [K]."""
    unit = unit_of("temperature", system)
    step = 50.0 if system == "si" else 100.0
    low = floor(from_si(float(np.min(own)) - _AROUND, "temperature", unit) / step) * step
    high = ceil(from_si(float(np.max(own)) + _AROUND, "temperature", unit) / step) * step
    return to_si(low, "temperature", unit), to_si(high, "temperature", unit)


def _air_span(data: AccountInput, own: FloatArray, places: list[int], system: str) -> tuple[float, float]:
    """Return a range of weather, widened to the own values; not below what the humidity entered allows."""
    unit = unit_of("temperature", system)
    low, high = (to_si(end, "temperature", unit) for end in ((-10.0, 40.0) if system == "si" else (10.0, 110.0)))
    low, high = min(low, float(np.min(own))), max(high, float(np.max(own)))
    for limit in (data.air.dew_point, data.air.wet_bulb):
        if limit is not None and not np.all(np.isnan(limit[places])):
            lowest = from_si(float(np.nanmax(limit[places])), "temperature", unit)
            low = max(low, min(to_si(ceil(lowest / 5.0) * 5.0, "temperature", unit), float(np.min(own))))
    return low, high if high > low else low + 10.0
