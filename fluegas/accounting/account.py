"""The heat account: one pure function of arrays.

Fuel, air and readings go in as SI arrays of any shapes that broadcast; named figures come out, all of one shape. One
reading has shape `()`, a comparison `(6,)`, a simulation `(6, 131072)`, a year of logger rows `(525600,)`: the same
call. Large arrays are worked out in chunks along their longest axis, so a million rows need no memory for the terms
between.
"""

from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass
from math import prod
from types import EllipsisType, MappingProxyType

import numpy as np

from fluegas.accounting.figure import Figure
from fluegas.accounting.figures import figures
from fluegas.accounting.inputs import AccountInput, state_shape, take
from fluegas.accounting.terms import Terms
from fluegas.errors import InputError
from fluegas.thermo.polynomials import FloatArray

CHUNK = 32_768
"""States worked out at a time: few enough that their terms stay in cache, many enough to spread what a chunk costs."""


@dataclass(frozen=True)
class HeatAccount(Mapping[str, FloatArray]):
    """The figures that were asked for, by dotted name, each a read-only array of `shape`.

    NaN marks a figure that does not exist for a state: no sulfur, no chamber temperature, a fuel-rich gas that the
    readings do not describe.
    """

    shape: tuple[int, ...]
    by_name: Mapping[str, FloatArray]

    def __getitem__(self, name: str) -> FloatArray:
        return self.by_name[name]

    def __iter__(self) -> Iterator[str]:
        return iter(self.by_name)

    def __len__(self) -> int:
        return len(self.by_name)


def heat_account(data: AccountInput, outputs: Sequence[str] | None = None, *, chunk: int = CHUNK) -> HeatAccount:
    """Return the heat account of every state in `data`; `outputs` names the figures wanted, all if None.

    Raises InputError for an unknown figure, RangeError for values outside the data or physically impossible readings.
    """
    wanted = _wanted(outputs)
    shape = state_shape(data)
    values: dict[str, FloatArray] = {}
    if 0 in shape:
        values = {figure.name: np.empty(shape) for figure in wanted}
    elif prod(shape) <= chunk:
        _fill(values, wanted, data, shape, (...,))
    else:
        axis = int(np.argmax(shape))
        step = max(1, chunk * shape[axis] // prod(shape))
        for start in range(0, shape[axis], step):
            part = slice(start, min(start + step, shape[axis]))
            place = (*(slice(None),) * axis, part)
            _fill(values, wanted, take(data, len(shape), axis, part), shape, place)
    found = {name: np.broadcast_to(array, shape) for name, array in values.items()}
    return HeatAccount(shape, MappingProxyType(found))


def _wanted(outputs: Sequence[str] | None) -> list[Figure]:
    known = figures()
    if outputs is None:
        return list(known.values())
    unknown = [name for name in outputs if name not in known]
    if unknown:
        raise InputError(f"no figure named {', '.join(unknown)}; the figures are {', '.join(known)}")
    return [known[name] for name in outputs]


def _fill(
    values: dict[str, FloatArray],
    wanted: Sequence[Figure],
    data: AccountInput,
    shape: tuple[int, ...],
    place: tuple[slice | EllipsisType, ...],
) -> None:
    """Work out one chunk. A figure that is one and the same number in every state so far is kept as that number.

    States that cannot be worked out divide by nothing sensible; they are marked NaN.
    """
    terms = Terms(data)
    with np.errstate(divide="ignore", invalid="ignore"):
        unknown = terms.gas.is_unknown
        any_unknown = bool(np.any(unknown))
        for figure in wanted:
            value = np.asarray(figure.formula(terms))
            if any_unknown and not figure.when_rich:
                value = np.where(unknown, np.nan, value)
            before = values.get(figure.name)
            if value.size == 1 and (
                before is None or (before.size == 1 and np.array_equal(before, value, equal_nan=True))
            ):
                values[figure.name] = value.reshape(())
                continue
            if before is None or before.shape != shape:
                constant = before
                before = values[figure.name] = np.empty(shape)
                if constant is not None:
                    before[...] = constant
            before[place] = value
