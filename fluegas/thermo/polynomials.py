"""The property polynomials: enthalpy, heat capacity and entropy from nine coefficients, by Horner's scheme.

The published form of NASA/TP-2002-211556 has coefficients a1..a7, b1, b2. `from_published` turns them into the form of
the enthalpy,

    h = k1 ln T + k7 + k0/T + T (k2 + T (k3 + T (k4 + T (k5 + T k6)))),    k8 the constant of the entropy,

from which cp = dh/dT and s follow by factors. All are linear in k, so k may be that of one gas or of a mixture.
"""

from collections.abc import Callable

import numpy as np
from numpy.typing import ArrayLike, NDArray

FloatArray = NDArray[np.float64]
BoolArray = NDArray[np.bool_]
Formula = Callable[[FloatArray, FloatArray, FloatArray], FloatArray]

_FACTORS = np.array([-1.0, 1.0, 1.0, 1 / 2, 1 / 3, 1 / 4, 1 / 5, 1.0, 1.0])


def from_published(coefficients: ArrayLike) -> FloatArray:
    """Return k, shape `(9, n)`, from published rows a1..a7, b1, b2 of shape `(n, 9)`."""
    rows: FloatArray = np.asarray(coefficients, dtype=float).reshape(-1, 9) * _FACTORS
    return rows.T


def enthalpy(k: FloatArray, t: FloatArray, log_t: FloatArray) -> FloatArray:
    """Return h [J] from coefficients `k` of shape `(9, ...)` at `t` [K]; `log_t` is ln t."""
    h: FloatArray = np.asarray(k[6] * t)
    for row in (5, 4, 3, 2):
        h = _multiply_add(h, k[row], t)
    h = h + k[0] / t
    h += k[1] * log_t
    h += k[7]
    return h


def _multiply_add(value: FloatArray, addend: FloatArray, t: FloatArray) -> FloatArray:
    """Return (value + addend) t; in place, since `value` always has the full shape of k and t."""
    value += addend
    value *= t
    return value


def heat_capacity(k: FloatArray, t: FloatArray, log_t: FloatArray) -> FloatArray:
    """Return cp = dh/dT [J/K]; arguments as of `enthalpy`."""
    del log_t  # dh/dT has no logarithm
    cp: FloatArray = (k[1] - k[0] / t) / t + k[2] + t * (2 * k[3] + t * (3 * k[4] + t * (4 * k[5] + t * (5 * k[6]))))
    return cp


def entropy(k: FloatArray, t: FloatArray, log_t: FloatArray) -> FloatArray:
    """Return s [J/K] at 1 bar; arguments as of `enthalpy`."""
    polynomial: FloatArray = t * (2 * k[3] + t * (1.5 * k[4] + t * (4 / 3 * k[5] + t * (1.25 * k[6]))))
    s: FloatArray = (0.5 * k[0] / t - k[1]) / t + k[2] * log_t + polynomial + k[8]
    return s
