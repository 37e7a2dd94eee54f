"""The integration core: heat capacity, enthalpy, entropy and Gibbs energy of ideal gases and their mixtures.

The polynomials of the species data are linear in their coefficients. A mixture therefore has composite coefficients
(one matrix product), and its enthalpy costs one Horner scheme, whatever the number of species. Heats come out in J for
the amounts put in; entropies are at the standard pressure of 1 bar.
"""

from collections.abc import Sequence
from functools import lru_cache
from typing import Self

import numpy as np
from numpy.typing import ArrayLike

from fluegas.errors import InputError, RangeError
from fluegas.thermo import polynomials
from fluegas.thermo.polynomials import FloatArray, Formula
from fluegas.thermo.species import species

LOWEST_TEMPERATURE = 200.0
HIGHEST_TEMPERATURE = 6000.0
JOINT = 1000.0
"""Temperature [K] at which the two ranges of every gas meet."""

_SOURCE = "range of the species data, NASA/TP-2002-211556"


def check_temperature(temperature: FloatArray, what: str = "temperature") -> None:
    """Raise RangeError unless every temperature [K] lies within the species data."""
    if temperature.size == 0:
        return
    low, high = float(np.min(temperature)), float(np.max(temperature))
    if not low >= LOWEST_TEMPERATURE:
        raise RangeError(what, low, LOWEST_TEMPERATURE, HIGHEST_TEMPERATURE, unit="K", source=_SOURCE)
    if not high <= HIGHEST_TEMPERATURE:
        raise RangeError(what, high, LOWEST_TEMPERATURE, HIGHEST_TEMPERATURE, unit="K", source=_SOURCE)


class Mixture:
    """Gases with fixed amounts: composite coefficients of shape `(9, ...)` for the ranges below and above 1000 K.

    Amounts in mol (per kilogram of fuel, say) give heats in J (per kilogram of fuel). Temperatures broadcast against
    the amounts. `log_temperature` may be handed in where the caller has it, since the logarithm is the dearest part.
    """

    def __init__(self, low: FloatArray, high: FloatArray) -> None:
        self.low, self.high = low, high

    def heat_capacity(self, temperature: ArrayLike) -> FloatArray:
        """Return cp [J/K] at `temperature` [K]. Raises RangeError outside 200 to 6000 K."""
        t = np.asarray(temperature, dtype=float)
        check_temperature(t)
        return self._by_range(polynomials.heat_capacity, t, None)

    def enthalpy(self, temperature: ArrayLike, log_temperature: FloatArray | None = None) -> FloatArray:
        """Return the enthalpy [J] at `temperature` [K]. Raises RangeError outside 200 to 6000 K."""
        t = np.asarray(temperature, dtype=float)
        check_temperature(t)
        return self._by_range(polynomials.enthalpy, t, log_temperature)

    def enthalpy_change(self, start: ArrayLike, end: ArrayLike) -> FloatArray:
        """Return the heat [J] that warms the mixture from `start` to `end` [K] at constant pressure."""
        return self.enthalpy(end) - self.enthalpy(start)

    def entropy(self, temperature: ArrayLike, log_temperature: FloatArray | None = None) -> FloatArray:
        """Return the entropy [J/K] of the unmixed gases, each at 1 bar, at `temperature` [K]."""
        t = np.asarray(temperature, dtype=float)
        check_temperature(t)
        return self._by_range(polynomials.entropy, t, log_temperature)

    def gibbs_energy(self, temperature: ArrayLike) -> FloatArray:
        """Return the Gibbs energy h - T s [J] of the unmixed gases, each at 1 bar, at `temperature` [K]."""
        t = np.asarray(temperature, dtype=float)
        log_t = np.log(t)
        return self.enthalpy(t, log_t) - t * self.entropy(t, log_t)

    def _by_range(self, formula: Formula, t: FloatArray, log_t: FloatArray | None) -> FloatArray:
        if t.size == 0 or float(np.max(t)) <= JOINT:
            return formula(self.low, t, log_t)
        if float(np.min(t)) > JOINT:
            return formula(self.high, t, log_t)
        return np.where(t <= JOINT, formula(self.low, t, log_t), formula(self.high, t, log_t))


class GasSet:
    """A fixed list of gases, in the order of the first axis of every array of amounts.

    `symbols` are their names, `molar_mass` their molar masses [kg/mol], shape `(n,)`. Raises InputError for a symbol
    that the species table lacks or that is not a gas.
    """

    def __init__(self, symbols: Sequence[str], offsets: FloatArray | None = None) -> None:
        self.symbols = tuple(symbols)
        entries = [species(symbol) for symbol in self.symbols]
        for entry in entries:
            if not entry.is_gas:
                raise InputError(f"{entry.symbol} is not a gas")
        self.molar_mass = np.array([entry.molar_mass for entry in entries])
        self._low, self._high = (
            polynomials.from_published([entry.coefficients[part] for entry in entries]) for part in (0, 1)
        )
        if offsets is not None:
            self._low[7] -= offsets
            self._high[7] -= offsets

    def index(self, symbol: str) -> int:
        """Return the place of `symbol` on the species axis."""
        return self.symbols.index(symbol)

    def referenced(self, temperature: float) -> "GasSet":
        """Return the same gases with enthalpies counted from `temperature` [K]: no formation, zero there."""
        return _referenced(self.symbols, float(temperature))

    def mixture(self, amounts: ArrayLike) -> Mixture:
        """Return the mixture with `amounts` of shape `(n, ...)` [mol]."""
        n = np.asarray(amounts, dtype=float)
        flat = n.reshape(n.shape[0], -1)
        shape = (9, *n.shape[1:])
        return Mixture((self._low @ flat).reshape(shape), (self._high @ flat).reshape(shape))

    def each(self, dimensions: int = 0) -> Mixture:
        """Return one mole of each gas: coefficients `(9, n, 1, ...)` with `dimensions` axes for the states behind."""
        shape = (9, len(self.symbols), *(1,) * dimensions)
        return Mixture(self._low.reshape(shape), self._high.reshape(shape))

    def enthalpies(self, temperature: ArrayLike) -> FloatArray:
        """Return the molar enthalpy of each gas [J/mol], shape `(n, ...)`, at `temperature` [K] of shape `(...)`."""
        t = np.asarray(temperature, dtype=float)
        return self.each(t.ndim).enthalpy(t)

    @classmethod
    def of(cls, *symbols: str) -> Self:
        """Return the set of the gases named, `GasSet.of("N2", "O2")`."""
        return cls(symbols)


@lru_cache(maxsize=256)
def _referenced(symbols: tuple[str, ...], temperature: float) -> GasSet:
    offsets = GasSet(symbols).enthalpies(temperature)
    return GasSet(symbols, offsets)
