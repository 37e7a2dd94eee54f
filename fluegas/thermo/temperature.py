"""The temperature at which a mixture has a given enthalpy, for arrays: Newton's method, safeguarded by a bracket."""

import numpy as np
from numpy.typing import ArrayLike

from fluegas.errors import ConvergenceError, RangeError
from fluegas.thermo.mixture import HIGHEST_TEMPERATURE, JOINT, LOWEST_TEMPERATURE, Mixture, Temperature
from fluegas.thermo.polynomials import BoolArray, FloatArray

_LAST_STEP = 1e-5
"""A Newton step below this share of the temperature is the last: it leaves an error of about 1e-12 of it."""
_FREE_STEPS = 6
_BRACKETED_STEPS = 60
_GROWTH = 1.2e-4
"""Relative growth of a burnt gas's heat capacity per kelvin; only the first guess uses it."""


def temperature_from_enthalpy(mixture: Mixture, enthalpy: ArrayLike) -> FloatArray:
    """Return the temperature [K] at which `mixture` has the `enthalpy` [J], shapes broadcast.

    Enthalpy rises with temperature, so the root is unique. Newton's method takes a few steps from a guess that knows
    enthalpy and heat capacity at 1000 K; whatever has not settled then goes on inside a bracket, bisecting where a step
    would leave it. States whose enthalpy is NaN stay NaN.

    Raises RangeError if the temperature would lie outside 200 to 6000 K, ConvergenceError if 60 steps do not settle.
    """
    target = np.asarray(enthalpy, dtype=float)
    at_joint = Temperature(np.nextafter(JOINT, HIGHEST_TEMPERATURE))
    distance = (target - mixture.enthalpy(at_joint)) / mixture.heat_capacity(at_joint)
    known = ~np.isnan(distance)
    if not np.all(known):
        found = temperature_from_enthalpy(_part(mixture, known), np.broadcast_to(target, known.shape)[known])
        t = np.full(known.shape, np.nan)
        t[known] = found
        return t
    t = JOINT + 2.0 * distance / (1.0 + np.sqrt(np.maximum(1.0 + 2.0 * _GROWTH * distance, 0.25)))
    t = np.clip(t, LOWEST_TEMPERATURE, HIGHEST_TEMPERATURE)
    for _ in range(_FREE_STEPS):
        at = Temperature(t)
        step = (mixture.enthalpy(at) - target) / mixture.heat_capacity(at)
        t = np.clip(t - step, LOWEST_TEMPERATURE, HIGHEST_TEMPERATURE)
        if np.all(np.abs(step) <= _LAST_STEP * t):
            break
    settled = (np.abs(step) <= _LAST_STEP * t) & (t > LOWEST_TEMPERATURE) & (t < HIGHEST_TEMPERATURE)
    if not np.all(settled):
        t = _bracketed(mixture, target, t, settled)
    return np.asarray(t)


def _part(mixture: Mixture, known: BoolArray) -> Mixture:
    """Return the mixtures of the states that are `known`, on one axis."""

    def part(k: FloatArray) -> FloatArray:
        aligned = k.reshape(9, *(1,) * (known.ndim + 1 - k.ndim), *k.shape[1:])
        return np.broadcast_to(aligned, (9, *known.shape))[:, known]

    return Mixture(lambda: part(mixture.low), lambda: part(mixture.high))


def _bracketed(mixture: Mixture, target: FloatArray, start: FloatArray, settled: BoolArray) -> FloatArray:
    """Go on from `start` where not `settled`, keeping a bracket around the root."""
    low, high = mixture.enthalpy(LOWEST_TEMPERATURE), mixture.enthalpy(HIGHEST_TEMPERATURE)
    outside = (target < low) | (target > high)
    if np.any(outside):
        value, least, most = (float(np.broadcast_to(x, outside.shape)[outside].flat[0]) for x in (target, low, high))
        raise RangeError("enthalpy of the mixture", value, least, most, unit="J", source="from 200 to 6000 K")
    below = np.full(start.shape, LOWEST_TEMPERATURE)
    above = np.full(start.shape, HIGHEST_TEMPERATURE)
    t = start
    for _ in range(_BRACKETED_STEPS):
        at = Temperature(t)
        error = mixture.enthalpy(at) - target
        above = np.where(error > 0, t, above)
        below = np.where(error <= 0, t, below)
        step = error / mixture.heat_capacity(at)
        new = t - step
        now_settled = np.abs(step) <= _LAST_STEP * t
        inside = (new > below) & (new < above)
        new = np.where(now_settled, np.clip(new, below, above), np.where(inside, new, 0.5 * (below + above)))
        t = np.where(settled, t, new)
        settled = settled | now_settled
        if np.all(settled):
            return t
    raise ConvergenceError(f"the temperature for an enthalpy did not settle in {_BRACKETED_STEPS} steps")
