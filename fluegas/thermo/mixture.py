"""The integration core: heat capacity, enthalpy, entropy and Gibbs energy of ideal gases and their mixtures.

The polynomials of the species data are linear in their coefficients. A mixture therefore has composite coefficients
(one matrix product), and its enthalpy costs one Horner scheme, whatever the number of species. Heats come out in J for
the amounts put in; entropies are at the standard pressure of 1 bar.
"""

from collections.abc import Callable, Sequence
from functools import cached_property, lru_cache
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


class Temperature:
    """Temperatures [K] with what is asked of them more than once: their extremes and their logarithm.

    Wherever a temperature is asked for, an array will do; handing in the same Temperature again saves the work.

    Raises RangeError unless every one lies within the species data.
    """

    def __init__(self, kelvin: ArrayLike, what: str = "temperature") -> None:
        self.kelvin = np.asarray(kelvin, dtype=float)
        self.lowest = float(np.min(self.kelvin, initial=np.inf))
        self.highest = float(np.max(self.kelvin, initial=-np.inf))
        if self.kelvin.size == 0:
            return
        for extreme in (self.lowest, self.highest):
            if not LOWEST_TEMPERATURE <= extreme <= HIGHEST_TEMPERATURE:
                raise RangeError(what, extreme, LOWEST_TEMPERATURE, HIGHEST_TEMPERATURE, unit="K", source=_SOURCE)

    @cached_property
    def log(self) -> FloatArray:
        """Natural logarithm of the temperatures."""
        return np.asarray(np.log(self.kelvin))

    @classmethod
    def of(cls, temperature: "ArrayLike | Temperature") -> "Temperature":
        """Return `temperature` itself if it is one, else make it one."""
        return temperature if isinstance(temperature, Temperature) else cls(temperature)


class Mixture:
    """Gases with fixed amounts: composite coefficients of shape `(9, ...)` for the ranges below and above 1000 K.

    Amounts in mol (per kilogram of fuel, say) give heats in J (per kilogram of fuel). Temperatures broadcast against
    the amounts.
    """

    def __init__(
        self,
        low: Callable[[], FloatArray],
        high: Callable[[], FloatArray],
        at_one_temperature: Callable[[Formula, Temperature], FloatArray] | None = None,
    ) -> None:
        self._make_low, self._make_high = low, high
        self._at_one_temperature = at_one_temperature

    @cached_property
    def low(self) -> FloatArray:
        """Coefficients up to 1000 K, made when first needed."""
        return self._make_low()

    @cached_property
    def high(self) -> FloatArray:
        """Coefficients above 1000 K, made when first needed."""
        return self._make_high()

    def heat_capacity(self, temperature: ArrayLike | Temperature) -> FloatArray:
        """Return cp [J/K] at `temperature` [K]. Raises RangeError outside 200 to 6000 K."""
        return self._by_range(polynomials.heat_capacity, Temperature.of(temperature))

    def enthalpy(self, temperature: ArrayLike | Temperature) -> FloatArray:
        """Return the enthalpy [J] at `temperature` [K]. Raises RangeError outside 200 to 6000 K."""
        return self._by_range(polynomials.enthalpy, Temperature.of(temperature))

    def enthalpy_change(self, start: ArrayLike | Temperature, end: ArrayLike | Temperature) -> FloatArray:
        """Return the heat [J] that warms the mixture from `start` to `end` [K] at constant pressure."""
        return self.enthalpy(end) - self.enthalpy(start)

    def entropy(self, temperature: ArrayLike | Temperature) -> FloatArray:
        """Return the entropy [J/K] of the unmixed gases, each at 1 bar, at `temperature` [K]."""
        return self._by_range(polynomials.entropy, Temperature.of(temperature))

    def gibbs_energy(self, temperature: ArrayLike | Temperature) -> FloatArray:
        """Return the Gibbs energy h - T s [J] of the unmixed gases, each at 1 bar, at `temperature` [K]."""
        at = Temperature.of(temperature)
        return self.enthalpy(at) - at.kelvin * self.entropy(at)

    def _by_range(self, formula: Formula, at: Temperature) -> FloatArray:
        if at.kelvin.ndim == 0 and self._at_one_temperature is not None:
            return self._at_one_temperature(formula, at)
        if at.highest <= JOINT:
            return formula(self.low, at.kelvin, at.log)
        if at.lowest > JOINT:
            return formula(self.high, at.kelvin, at.log)
        cold, hot = (formula(k, at.kelvin, at.log) for k in (self.low, self.high))
        return np.where(at.kelvin <= JOINT, cold, hot)


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
        return gases_above(self.symbols, float(temperature))

    def mixture(self, amounts: ArrayLike) -> Mixture:
        """Return the mixture with `amounts` of shape `(n, ...)` [mol]."""
        n = np.asarray(amounts, dtype=float)
        flat = n.reshape(n.shape[0], -1)
        shape = (9, *n.shape[1:])

        def at_one_temperature(formula: Formula, at: Temperature) -> FloatArray:
            """Many mixtures at one temperature: the molar property of each gas, then one product."""
            molar = formula(self._low if at.highest <= JOINT else self._high, at.kelvin, at.log)
            return _composite(molar[None], flat).reshape(n.shape[1:])

        return Mixture(
            lambda: _composite(self._low, flat).reshape(shape),
            lambda: _composite(self._high, flat).reshape(shape),
            at_one_temperature if flat.shape[1] > 1 else None,
        )

    def each(self, dimensions: int = 0) -> Mixture:
        """Return one mole of each gas: coefficients `(9, n, 1, ...)` with `dimensions` axes for the states behind."""
        shape = (9, len(self.symbols), *(1,) * dimensions)
        return Mixture(lambda: self._low.reshape(shape), lambda: self._high.reshape(shape))

    def enthalpies(self, temperature: ArrayLike | Temperature) -> FloatArray:
        """Return the molar enthalpy of each gas [J/mol], shape `(n, ...)`, at `temperature` [K] of shape `(...)`."""
        at = Temperature.of(temperature)
        return self.each(at.kelvin.ndim).enthalpy(at)

    @classmethod
    def of(cls, *symbols: str) -> Self:
        """Return the set of the gases named, `GasSet.of("N2", "O2")`."""
        return cls(symbols)


_BLOCK_WORK = 500_000
"""Multiplications in one matrix product: few enough that no linear-algebra library starts threads for it. On so narrow
a matrix they cost more than they save, and much more on a busy machine."""


def _composite(coefficients: FloatArray, amounts: FloatArray) -> FloatArray:
    """Return coefficients (9, n) times amounts (n, states), in blocks of states."""
    rows, gases = coefficients.shape
    states = amounts.shape[1]
    block = max(1, _BLOCK_WORK // (rows * max(1, gases)))
    if states <= block:
        return coefficients @ amounts
    product = np.empty((rows, states))
    for start in range(0, states, block):
        part = slice(start, start + block)
        product[:, part] = coefficients @ amounts[:, part]
    return product


@lru_cache(maxsize=256)
def gases_above(symbols: tuple[str, ...], temperature: float) -> GasSet:
    """Return the gases named with enthalpies counted from `temperature` [K]; made once for each call's arguments."""
    offsets = GasSet(symbols).enthalpies(temperature)
    return GasSet(symbols, offsets)
