"""Water: saturation over liquid and ice, both ways, and the heats of liquid water and of evaporation.

Saturation over liquid: IAPWS R7-97(2012), region 4, equations 30 and 31. Over ice: IAPWS R14-08(2011), the sublimation
curve. They meet at the triple point, 273.16 K. Heats are those of the species data (NASA/TP-2002-211556), the same in
the whole account, so that gross and net differ by exactly this heat of evaporation.
"""

from functools import cache, lru_cache

import numpy as np
from numpy.typing import ArrayLike

from fluegas.errors import RangeError
from fluegas.thermo.mixture import GasSet
from fluegas.thermo.polynomials import FloatArray, enthalpy, from_published
from fluegas.thermo.species import species

TRIPLE_POINT = 273.16
CRITICAL_POINT = 647.096
_TRIPLE_PRESSURE = 611.657
_LOWEST_ICE = 190.0

_N = (
    0.11670521452767e4,
    -0.72421316703206e6,
    -0.17073846940092e2,
    0.12020824702470e5,
    -0.32325550322333e7,
    0.14915108613530e2,
    -0.48232657361591e4,
    0.40511340542057e6,
    -0.23855557567849,
    0.65017534844798e3,
)
_ICE = ((-0.212144006e2, 0.333333333e-2), (0.273203819e2, 0.120666667e1), (-0.610598130e1, 0.170333333e1))


def saturation_pressure(temperature: ArrayLike) -> FloatArray:
    """Return the saturation pressure of water [Pa], over liquid from 273.16 K up, over ice below.

    Raises RangeError outside 190 K (the sublimation curve is published from 50 K; air on a site is not that cold) to
    647.096 K (the critical point).
    """
    t = np.asarray(temperature, dtype=float)
    _check("temperature of saturation", t, _LOWEST_ICE, CRITICAL_POINT, "K")
    if t.size and float(np.min(t)) >= TRIPLE_POINT:
        return _over_liquid(t)
    return np.where(
        t >= TRIPLE_POINT, _over_liquid(np.maximum(t, TRIPLE_POINT)), _over_ice(np.minimum(t, TRIPLE_POINT))
    )


def saturation_temperature(pressure: ArrayLike) -> FloatArray:
    """Return the temperature [K] at which water of partial `pressure` [Pa] is saturated: the dew or frost point.

    Raises RangeError outside the pressures that belong to 190 K and to the critical point.
    """
    p = np.asarray(pressure, dtype=float)
    low, high = float(_over_ice(np.array(_LOWEST_ICE))), float(_over_liquid(np.array(CRITICAL_POINT)))
    _check("partial pressure of water", p, low, high, "Pa")
    if p.size and float(np.min(p)) >= _TRIPLE_PRESSURE:
        return _liquid_temperature(p)
    return np.where(
        p >= _TRIPLE_PRESSURE,
        _liquid_temperature(np.maximum(p, _TRIPLE_PRESSURE)),
        _ice_temperature(np.minimum(p, _TRIPLE_PRESSURE)),
    )


def _check(what: str, value: FloatArray, low: float, high: float, unit: str) -> None:
    if value.size == 0:
        return
    for extreme in (float(np.min(value)), float(np.max(value))):
        if not low <= extreme <= high:
            raise RangeError(what, extreme, low, high, unit=unit, source="IAPWS R7-97 and R14-08")


def _over_liquid(t: FloatArray) -> FloatArray:
    """Equation 30 of IAPWS R7-97; in place where it can be, since large logs of humid air meet it first."""
    n = _N
    theta = n[8] / (t - n[9])
    theta += t
    a = theta + n[0]
    a *= theta
    a += n[1]
    b = n[2] * theta
    b += n[3]
    b *= theta
    b += n[4]
    c = n[5] * theta
    c += n[6]
    c *= theta
    c += n[7]
    a *= c
    a *= 4.0
    root = np.sqrt(b * b - a)
    root -= b
    c /= root
    c *= c
    c *= c
    c *= 16e6
    return c


def _liquid_temperature(p: FloatArray) -> FloatArray:
    """Equation 31 of IAPWS R7-97."""
    n = _N
    beta = np.sqrt(np.sqrt(p * 1e-6))
    e = beta * beta + n[2] * beta + n[5]
    f = (n[0] * beta + n[3]) * beta + n[6]
    g = (n[1] * beta + n[4]) * beta + n[7]
    d = 2 * g / (-f - np.sqrt(f * f - 4 * e * g))
    total = n[9] + d
    return 0.5 * (total - np.sqrt(total * total - 4 * (n[8] + n[9] * d)))


def _over_ice(t: FloatArray) -> FloatArray:
    """Equation 6 of IAPWS R14-08."""
    theta = t / TRIPLE_POINT
    return _TRIPLE_PRESSURE * np.exp(sum(a * theta**b for a, b in _ICE) / theta)


def _ice_temperature(p: FloatArray) -> FloatArray:
    """Newton's method on ln p, almost linear in 1/T: five steps reach the last digits."""
    log_ratio = np.log(p / _TRIPLE_PRESSURE)
    theta = 1.0 / (1.0 - log_ratio / 22.5)
    for _ in range(5):
        value = sum(a * theta ** (b - 1) for a, b in _ICE) - log_ratio
        slope = sum(a * (b - 1) * theta ** (b - 2) for a, b in _ICE)
        theta = theta - value / slope
    return TRIPLE_POINT * theta


@cache
def _vapour() -> GasSet:
    return GasSet.of("H2O")


def vapour_enthalpy(temperature: ArrayLike) -> FloatArray:
    """Return the molar enthalpy of water vapour [J/mol], formation included, at `temperature` [K]."""
    molar: FloatArray = _vapour().enthalpies(temperature)[0]
    return molar


def liquid_enthalpy(temperature: ArrayLike) -> FloatArray:
    """Return the molar enthalpy of liquid water [J/mol], formation included, at `temperature` [K].

    Raises RangeError outside the data's 273.15 to 600 K.
    """
    t = np.asarray(temperature, dtype=float)
    liquid = species("H2O(l)")
    lowest, joint, highest = liquid.temperatures
    if t.size and not (float(np.min(t)) >= lowest and float(np.max(t)) <= highest):
        extreme = float(np.min(t)) if not float(np.min(t)) >= lowest else float(np.max(t))
        raise RangeError("temperature of liquid water", extreme, lowest, highest, unit="K", source=liquid.source)
    cold, hot = from_published(liquid.coefficients).T
    return np.where(t <= joint, enthalpy(cold, t, np.log(t)), enthalpy(hot, t, np.log(t)))


@lru_cache(maxsize=64)
def heat_of_evaporation_at(temperature: float) -> float:
    """Return h_vapour - h_liquid [J/mol] at one temperature [K], kept for the next call."""
    return float(heat_of_evaporation(temperature))


def heat_of_evaporation(temperature: ArrayLike) -> FloatArray:
    """Return h_vapour - h_liquid [J/mol] at `temperature` [K], 273.15 to 600 K."""
    heat: FloatArray = vapour_enthalpy(temperature) - liquid_enthalpy(temperature)
    return heat
