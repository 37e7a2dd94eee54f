"""The same polynomials evaluated by Cantera: the code path, not the data, is what this compares."""

from typing import Any

import numpy as np
import pytest

from fluegas.thermo.mixture import GasSet
from fluegas.thermo.species import species_table
from fluegas.thermo.water import liquid_enthalpy
from tests.reference.cantera_gas import cantera_gas, cantera_species

GASES = tuple(symbol for symbol, entry in species_table().items() if entry.is_gas)
TEMPERATURES = np.array([200.0, 250.0, 298.15, 450.0, 700.0, 999.0, 1001.0, 1500.0, 2200.0, 3500.0, 6000.0])


@pytest.mark.parametrize("symbol", GASES)
def test_every_gas_agrees(symbol: str) -> None:
    thermo: Any = cantera_species(symbol).thermo
    gas = GasSet.of(symbol).mixture([1.0])
    enthalpy = np.array([thermo.h(t) for t in TEMPERATURES]) / 1000
    entropy = np.array([thermo.s(t) for t in TEMPERATURES]) / 1000
    capacity = np.array([thermo.cp(t) for t in TEMPERATURES]) / 1000
    np.testing.assert_allclose(gas.heat_capacity(TEMPERATURES), capacity, rtol=1e-10)
    np.testing.assert_allclose(gas.entropy(TEMPERATURES), entropy, rtol=1e-10)
    np.testing.assert_allclose(gas.enthalpy(TEMPERATURES), enthalpy, rtol=1e-10, atol=1e-6)
    np.testing.assert_allclose(gas.gibbs_energy(TEMPERATURES), enthalpy - TEMPERATURES * entropy, rtol=1e-10, atol=1e-6)


def test_mixtures_agree() -> None:
    """Enthalpy and heat capacity of random mixtures of all gases at once."""
    random = np.random.default_rng(20)
    solution: Any = cantera_gas(GASES)
    amounts = random.dirichlet(np.full(len(GASES), 0.2), size=40).T
    temperatures = random.uniform(210, 5900, 40)
    mixture = GasSet(GASES).mixture(amounts)
    enthalpy, capacity = mixture.enthalpy(temperatures), mixture.heat_capacity(temperatures)
    for place, temperature in enumerate(temperatures):
        solution.TPX = temperature, 1e5, amounts[:, place]
        scale = np.abs(solution.standard_enthalpies_RT).max() * 8.314 * temperature
        assert enthalpy[place] == pytest.approx(solution.enthalpy_mole / 1000, rel=1e-10, abs=1e-12 * scale)
        assert capacity[place] == pytest.approx(solution.cp_mole / 1000, rel=1e-10)


def test_liquid_water_agrees() -> None:
    thermo: Any = cantera_species("H2O(l)").thermo
    temperatures = np.array([273.15, 298.15, 350.0, 373.0, 374.0, 450.0, 600.0])
    expected = np.array([thermo.h(t) for t in temperatures]) / 1000
    np.testing.assert_allclose(liquid_enthalpy(temperatures), expected, rtol=1e-9)
