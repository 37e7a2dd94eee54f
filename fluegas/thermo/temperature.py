"""The temperature at which a mixture has a given enthalpy: Newton's method, safeguarded by a bracket, for arrays."""

import numpy as np
from numpy.typing import ArrayLike

from fluegas.errors import ConvergenceError, RangeError
from fluegas.thermo.mixture import HIGHEST_TEMPERATURE, JOINT, LOWEST_TEMPERATURE, Mixture
from fluegas.thermo.polynomials import FloatArray

_TOLERANCE = 1e-9
_STEPS = 60


def temperature_from_enthalpy(mixture: Mixture, enthalpy: ArrayLike) -> FloatArray:
    """Return the temperature [K] at which `mixture` has the `enthalpy` [J], shapes broadcast.

    Enthalpy rises with temperature, so the root is unique. Every step keeps a bracket; a Newton step that leaves it is
    replaced by bisection. Settled to 1e-9 of the temperature. States whose enthalpy is NaN stay NaN.

    Raises RangeError if the temperature would lie outside 200 to 6000 K, ConvergenceError if 60 steps do not settle.
    """
    target = np.asarray(enthalpy, dtype=float)
    low, high = mixture.enthalpy(LOWEST_TEMPERATURE), mixture.enthalpy(HIGHEST_TEMPERATURE)
    outside = (target < low) | (target > high)
    if np.any(outside):
        value, least, most = (float(np.broadcast_to(x, outside.shape)[outside].flat[0]) for x in (target, low, high))
        raise RangeError("enthalpy of the mixture", value, least, most, unit="J", source="from 200 to 6000 K")
    below = np.full(np.broadcast_shapes(target.shape, low.shape), LOWEST_TEMPERATURE)
    above = np.full_like(below, HIGHEST_TEMPERATURE)
    t = np.where(mixture.enthalpy(JOINT) > target, 600.0, 1700.0)
    known = ~np.isnan(target + low)
    for _ in range(_STEPS):
        error = mixture.enthalpy(t) - target
        above = np.where(error > 0, t, above)
        below = np.where(error <= 0, t, below)
        new = t - error / mixture.heat_capacity(t)
        new = np.where((new > below) & (new < above) | (error == 0), new, 0.5 * (below + above))
        settled = np.abs(new - t) <= _TOLERANCE * t
        t = np.where(known, new, t)
        if np.all(settled | ~known):
            return np.where(known, t, np.nan)
    raise ConvergenceError(f"the temperature for an enthalpy did not settle in {_STEPS} steps")
