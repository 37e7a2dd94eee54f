"""Three hundred random fuels burnt: elements, heating values, product and flame enthalpies as Cantera counts them.

The species data are the same on both sides; what is compared is the stoichiometry and the heat balance.
"""

from functools import cache
from typing import Any

import numpy as np
import pytest
from numpy.typing import NDArray

from fluegas.combustion.air import DRY_AIR_GASES, dry_air_amounts
from fluegas.combustion.flame import COMPLETE_PRODUCTS, complete_flame_temperature, complete_products
from fluegas.combustion.fuel import ELEMENTS, FUEL_GASES, Fuel
from fluegas.combustion.gas_fuel import gas_fuel
from fluegas.combustion.product_gas import FLUE_GASES, ProductGas
from fluegas.combustion.solid_fuel import solid_fuel
from fluegas.thermo.mixture import GasSet
from fluegas.thermo.polynomials import FloatArray
from tests.combustion.drawn import BURNING_GASES, air, readings
from tests.reference.cantera_gas import cantera_gas, cantera_species

SYMBOLS = tuple(dict.fromkeys((*FUEL_GASES, *FLUE_GASES, *DRY_AIR_GASES)))
CASES = 300


@cache
def solution() -> Any:
    return cantera_gas(SYMBOLS)


def atoms_of(amounts: dict[str, float]) -> FloatArray:
    """Return the amounts of ELEMENTS in a mixture, counted by Cantera."""
    gas = solution()
    return np.array([sum(n * gas.n_atoms(symbol, e) for symbol, n in amounts.items()) for e in ELEMENTS])


def enthalpy_of(amounts: dict[str, float], temperature: float) -> float:
    """Return the enthalpy [J] of a mixture by Cantera, formation included."""
    gas = solution()
    gas.TPX = temperature, 1e5, amounts
    return float(gas.enthalpy_mole) / 1000 * sum(amounts.values())


def random_gas(random: np.random.Generator) -> Fuel:
    others = random.choice(FUEL_GASES, size=random.integers(0, 6), replace=False)
    fractions = {str(name): float(random.uniform(0, 0.3)) for name in others if name != "O2"}
    burning = str(random.choice(BURNING_GASES))
    fractions[burning] = fractions.get(burning, 0.0) + float(random.uniform(0.3, 1.0))
    return gas_fuel(fractions, reference_temperature=float(random.choice([273.15, 288.15, 298.15])))


def random_solid(random: np.random.Generator) -> Fuel:
    spans = {"carbon": 0.9, "hydrogen": 0.12, "oxygen": 0.3, "nitrogen": 0.03, "sulfur": 0.05, "chlorine": 0.01}
    fractions = {name: float(random.uniform(0.3 * most, most)) for name, most in spans.items()}
    fractions |= {"moisture": float(random.uniform(0, 0.5)), "ash": float(random.uniform(0, 0.3))}
    return solid_fuel(fractions, reference_temperature=float(random.choice([273.15, 288.15, 298.15])))


def case(number: int) -> tuple[Fuel, ProductGas]:
    """Return one random fuel, every third of them solid, and its product gas with random humid air and readings."""
    random = np.random.default_rng([7, number])
    fuel = random_solid(random) if number % 3 == 0 else random_gas(random)
    supply = air(
        random.uniform(275, 315),
        random.uniform(80e3, 105e3),
        relative_humidity=random.uniform(0, 1),
        oxygen=random.choice([0.2095, random.uniform(0.21, 0.95)]),
        burner_temperature=random.uniform(300, 900),
    )
    monoxide, nitric = random.uniform(0, 5e-3), random.uniform(0, 5e-4)
    if number % 2 or float(fuel.element("C")) == 0:
        monoxide = nitric = 0.0
    return fuel, ProductGas(fuel, supply, readings(excess_air=random.uniform(0.05, 1.5), co=monoxide, no=nitric))


def numbers(amounts: dict[str, NDArray[np.float64]]) -> dict[str, float]:
    return {symbol: float(amount) for symbol, amount in amounts.items()}


def into(fuel: Fuel, gas: ProductGas) -> tuple[dict[str, float], dict[str, float]]:
    """Return the amounts of the gas fuel's gases (none for a solid) and of the humid air."""
    gases = {symbol: float(n) for symbol, n in zip(FUEL_GASES, fuel.gases, strict=True) if float(n)}
    oxidant = numbers(dry_air_amounts(gas.dry_air, gas.air.oxygen)) | {"H2O": float(gas.water_from_air)}
    return gases, oxidant


@pytest.mark.parametrize("first", range(0, CASES, 50))
def test_elements_are_kept(first: int) -> None:
    for number in range(first, first + 50):
        fuel, gas = case(number)
        gases, oxidant = into(fuel, gas)
        brought = atoms_of(oxidant)
        brought += atoms_of(gases) if gases else fuel.elements + atoms_of({"H2O": float(fuel.moisture)})
        left = atoms_of(numbers(gas.dry_amounts) | {"H2O": float(gas.water)})
        np.testing.assert_allclose(left, brought, rtol=1e-11, atol=1e-11 * brought.max())


@pytest.mark.parametrize("first", range(0, CASES, 50))
def test_products_carry_the_same_enthalpy(first: int) -> None:
    """The heat of the dry mixture and the water from the reference temperature to the flue."""
    for number in range(first, first + 50):
        fuel, gas = case(number)
        amounts = numbers(gas.dry_amounts) | {"H2O": float(gas.water)}
        flue = 350.0 + 4 * number
        expected = enthalpy_of(amounts, flue) - enthalpy_of(amounts, fuel.reference_temperature)
        water = GasSet.of("H2O").mixture([float(gas.water)])
        found = float(gas.dry_mixture.enthalpy(flue) + water.enthalpy_change(fuel.reference_temperature, flue))
        assert found == pytest.approx(expected, rel=1e-9)


@pytest.mark.parametrize("first", range(0, CASES, 50))
def test_heating_values_are_the_enthalpy_that_burning_sets_free(first: int) -> None:
    """Fuel gas and air in, complete products out at the reference temperature: net with vapour, gross with liquid."""
    for number in range(first, first + 50):
        fuel, gas = case(number)
        gases, oxidant = into(fuel, gas)
        if not gases:
            continue
        products = dict(zip(COMPLETE_PRODUCTS, (float(n) for n in complete_products(gas)), strict=True))
        t = fuel.reference_temperature
        net = enthalpy_of(gases, t) + enthalpy_of(oxidant, t) - enthalpy_of(products, t)
        assert float(fuel.net_heating_value) == pytest.approx(net, rel=1e-9)
        liquid = float(cantera_species("H2O(l)").thermo.h(t)) / 1000
        latent = enthalpy_of({"H2O": 1.0}, t) - liquid
        own_water = products["H2O"] - oxidant["H2O"]
        assert float(fuel.gross_heating_value) == pytest.approx(net + own_water * latent, rel=1e-9)


@pytest.mark.parametrize("first", range(0, CASES, 50))
def test_flames_keep_the_enthalpy_of_what_goes_in(first: int) -> None:
    """Gas fuel at its own temperature, preheated humid air, complete products at the flame temperature."""
    for number in range(first, first + 50):
        fuel, gas = case(number)
        gases, oxidant = into(fuel, gas)
        fuel_temperature = 280.0 + number % 7 * 20
        flame = float(complete_flame_temperature(gas, np.array(fuel_temperature)))
        products = dict(zip(COMPLETE_PRODUCTS, (float(n) for n in complete_products(gas)), strict=True))
        t = fuel.reference_temperature
        heat = enthalpy_of(oxidant, float(gas.air.at_burner))
        if gases:
            heat += enthalpy_of(gases, fuel_temperature)
        else:
            burning = enthalpy_of(products, t) - enthalpy_of(oxidant, t) + float(fuel.net_heating_value)
            heat += burning + float(fuel.heat_capacity) * (fuel_temperature - t)
        scale = sum(products.values()) * 33 * flame
        assert enthalpy_of(products, flame) == pytest.approx(heat, abs=1e-9 * scale)
