"""One number of each setting, laid along the settings' axis."""

from collections.abc import Callable, Sequence
from typing import TypeVar

import numpy as np

from fluegas.thermo.polynomials import FloatArray

State = TypeVar("State")


def along(states: Sequence[State], number: Callable[[State], float]) -> FloatArray:
    """Return the `number` of each of `states`, shape `(n,)`."""
    return np.array([number(state) for state in states], dtype=float)


def given_along(states: Sequence[State], number: Callable[[State], float]) -> FloatArray | None:
    """Return the same, None where no state has one (all are NaN)."""
    values = along(states, number)
    return None if np.all(np.isnan(values)) else values
