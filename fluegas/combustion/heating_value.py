"""Heating values: from enthalpies of formation, from constant volume to constant pressure, and by estimate."""

from collections.abc import Mapping
from functools import lru_cache

import numpy as np
from numpy.typing import ArrayLike

from fluegas.thermo.mixture import GasSet
from fluegas.thermo.polynomials import FloatArray
from fluegas.thermo.species import GAS_CONSTANT, species
from fluegas.thermo.water import liquid_enthalpy, vapour_enthalpy

ESTIMATE_NAME = "Channiwala and Parikh (2002)"
ESTIMATE_SCATTER = 0.015
"""Average absolute error that the authors state, as a fraction (from memory: 1.45 %)."""


@lru_cache(maxsize=256)
def _molar_heating_values(symbols: tuple[str, ...], reference_temperature: float) -> tuple[FloatArray, FloatArray]:
    gases = GasSet(symbols)
    burnt = GasSet.of("O2", "CO2", "SO2", "N2", "HCl").enthalpies(reference_temperature)
    oxygen, carbon_dioxide, sulfur_dioxide, nitrogen, hydrogen_chloride = burnt
    vapour = vapour_enthalpy(reference_temperature)
    latent = vapour - liquid_enthalpy(reference_temperature)
    own = gases.enthalpies(reference_temperature)
    gross = np.empty(len(symbols))
    net = np.empty(len(symbols))
    for place, symbol in enumerate(symbols):
        count = species(symbol).elements
        if symbol == "H2O":
            gross[place], net[place] = latent, 0.0
            continue
        c, h, o, n, s, cl = (count.get(element, 0) for element in ("C", "H", "O", "N", "S", "Cl"))
        needed = c + (h - cl) / 4 + s - o / 2
        products = c * carbon_dioxide + (h - cl) / 2 * vapour + s * sulfur_dioxide + n / 2 * nitrogen
        inert = count.keys() <= {"Ar", "He"}
        net[place] = 0.0 if inert else own[place] + needed * oxygen - products - cl * hydrogen_chloride
        gross[place] = net[place] + h / 2 * latent
    return gross, net


def molar_heating_values(symbols: tuple[str, ...], reference_temperature: float) -> tuple[FloatArray, FloatArray]:
    """Return gross and net heating value [J/mol] of ideal gases, each of shape `(n,)`, at `reference_temperature` [K].

    Burnt to CO2, H2O (liquid for gross, vapour for net), SO2, N2 and HCl, all at the reference temperature. Water
    vapour has its heat of evaporation as gross value; inert gases have zero.
    """
    return _molar_heating_values(tuple(symbols), float(reference_temperature))


def at_constant_pressure(
    value: ArrayLike, hydrogen: ArrayLike, oxygen: ArrayLike, nitrogen: ArrayLike, reference_temperature: float
) -> FloatArray:
    """Return the gross heating value at constant pressure [J/kg] from that at constant volume (a bomb's).

    Element amounts in mol/kg, without the moisture's. The reaction takes n_C + n_H/4 + n_S - n_O/2 of oxygen and leaves
    n_C + n_S + n_N/2 of gas beside liquid water, so the surrounding air does the work R T (n_H/4 - n_O/2 - n_N/2)
    (ISO 1928, annex on calculation at constant pressure).
    """
    shrinkage = np.asarray(hydrogen) / 4 - np.asarray(oxygen) / 2 - np.asarray(nitrogen) / 2
    return np.asarray(value, dtype=float) + GAS_CONSTANT * reference_temperature * shrinkage


def estimated_gross_heating_value(dry: Mapping[str, ArrayLike]) -> FloatArray:
    """Return the gross heating value [J/kg dry] from mass fractions of the `dry` fuel: C, H, S, O, N and "ash".

    Channiwala and Parikh, Fuel 81 (2002) 1051: 0.3491 C + 1.1783 H + 0.1005 S - 0.1034 O - 0.0151 N - 0.0211 ash in
    MJ/kg with percent by mass (coefficients from memory). Made for fuels with 0 to 92 % C, 0.4 to 25 % H, 0 to 50 % O.
    """
    c, h, s, o, n, a = (np.asarray(dry[part], dtype=float) for part in ("C", "H", "S", "O", "N", "ash"))
    value: FloatArray = 1e8 * (0.3491 * c + 1.1783 * h + 0.1005 * s - 0.1034 * o - 0.0151 * n - 0.0211 * a)
    return value
