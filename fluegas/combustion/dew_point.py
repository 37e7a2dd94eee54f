"""Dew points of the flue gas: water by inverse saturation, sulfuric acid by three published correlations.

The correlations differ by 2 to 9 K from one another and are stated with +-5 K here. A gas above its acid dew point does
not mean metal above it.
"""

from collections.abc import Callable, Mapping
from types import MappingProxyType

import numpy as np
from numpy.typing import ArrayLike

from fluegas.errors import InputError
from fluegas.thermo.polynomials import FloatArray
from fluegas.thermo.water import saturation_temperature

MILLIMETRE_OF_MERCURY = 133.322
ATMOSPHERE = 101_325.0
ACID_DOUBT = 5.0
"""Half-width stated with an acid dew point [K]: the spread of the correlations."""

DEFAULT_CORRELATION = "Verhoff-Banchero"


def water_dew_point(partial_pressure: ArrayLike) -> FloatArray:
    """Return the temperature [K] at which water of `partial_pressure` [Pa] condenses; NaN where there is no water.

    Raises RangeError above the critical pressure.
    """
    p = np.asarray(partial_pressure, dtype=float)
    there = p > 1.0
    if np.all(there):
        return saturation_temperature(p)
    point: FloatArray = np.where(there, saturation_temperature(np.where(there, p, 1000.0)), np.nan)
    return point


def verhoff_banchero(water: FloatArray, sulfur_trioxide: FloatArray) -> FloatArray:
    """Return the acid dew point [K] from partial pressures [Pa].

    Verhoff and Banchero, Chemical Engineering Progress 70 (1974) 71; pressures in mmHg:
    1000/T = 2.276 - 0.0294 ln pH2O - 0.0858 ln pSO3 + 0.0062 ln pH2O ln pSO3.
    """
    w, s = np.log(water / MILLIMETRE_OF_MERCURY), np.log(sulfur_trioxide / MILLIMETRE_OF_MERCURY)
    return np.asarray(1000.0 / (2.276 - 0.0294 * w - 0.0858 * s + 0.0062 * w * s))


def okkes(water: FloatArray, sulfur_trioxide: FloatArray) -> FloatArray:
    """Return the acid dew point [K] from partial pressures [Pa].

    Okkes, Hydrocarbon Processing, July 1987; pressures in atm, T in degC:
    T = 203.25 + 27.6 log pH2O + 10.83 log pSO3 + 1.06 (log pSO3 + 8)^2.19.
    """
    w, s = np.log10(water / ATMOSPHERE), np.log10(sulfur_trioxide / ATMOSPHERE)
    return np.asarray(273.15 + 203.25 + 27.6 * w + 10.83 * s + 1.06 * np.maximum(s + 8, 0.0) ** 2.19)


def zarenezhad(water: FloatArray, sulfur_trioxide: FloatArray) -> FloatArray:
    """Return the acid dew point [K] from partial pressures [Pa].

    ZareNezhad, Oil and Gas Journal, 2009 (coefficients from memory); pressures in mmHg, T in degC:
    T = 150 + 11.664 ln pSO3 + 8.1328 ln pH2O - 0.383226 ln pSO3 ln pH2O.
    """
    w, s = np.log(water / MILLIMETRE_OF_MERCURY), np.log(sulfur_trioxide / MILLIMETRE_OF_MERCURY)
    return np.asarray(273.15 + 150 + 11.664 * s + 8.1328 * w - 0.383226 * s * w)


CORRELATIONS: Mapping[str, Callable[[FloatArray, FloatArray], FloatArray]] = MappingProxyType(
    {"Verhoff-Banchero": verhoff_banchero, "Okkes": okkes, "ZareNezhad": zarenezhad}
)
"""The correlations by the name of their authors."""


def acid_dew_point(water: ArrayLike, sulfur_trioxide: ArrayLike, correlation: str = DEFAULT_CORRELATION) -> FloatArray:
    """Return the sulfuric acid dew point [K] from partial pressures [Pa] of water and SO3; NaN where either is zero.

    Raises InputError for an unknown `correlation`.
    """
    try:
        formula = CORRELATIONS[correlation]
    except KeyError:
        names = ", ".join(CORRELATIONS)
        raise InputError(f"no acid dew point correlation {correlation!r}; there are {names}") from None
    w, s = np.broadcast_arrays(np.asarray(water, dtype=float), np.asarray(sulfur_trioxide, dtype=float))
    there = (w > 0) & (s > 0)
    return np.where(there, formula(np.where(there, w, 1.0), np.where(there, s, 1.0)), np.nan)
