"""What the figures of a fuel alone are made of: its gas, its product gas at theoretical air; what a figure declares."""

from collections.abc import Callable
from dataclasses import dataclass
from functools import cached_property

import numpy as np

from fluegas.accounting.inputs import GROSS
from fluegas.combustion.air import STANDARD_ATMOSPHERE, Air
from fluegas.combustion.compression_factor import air_density, compression_factor, molar_density
from fluegas.combustion.fuel import Fuel
from fluegas.combustion.product_gas import FlueReadings, ProductGas
from fluegas.thermo.polynomials import FloatArray
from fluegas.thermo.species import GAS_CONSTANT

ROOM = 298.15
"""Temperature [K] of air and fuel before the flame."""
EPA_MOLAR_VOLUME = GAS_CONSTANT * 293.15 / STANDARD_ATMOSPHERE
"""Molar volume [m3/mol] at the standard state of 40 CFR 60, 68 degF and 760 mmHg."""


class FuelTerms:
    """What the figures of a fuel are made of, worked out when first asked for."""

    def __init__(self, fuel: Fuel, biogenic_share: FloatArray | float = 0.0) -> None:
        self.fuel = fuel
        self.biogenic_share = np.asarray(biogenic_share, dtype=float)

    @cached_property
    def amount(self) -> FloatArray:
        """Gas per mass [mol/kg]; NaN for a fuel that is not wholly a gas."""
        total = self.fuel.gases.sum(axis=0)
        return np.where((total > 0) & (self.fuel.heat_capacity == 0), total, np.nan)

    @cached_property
    def product(self) -> ProductGas:
        """The product gas of complete combustion at theoretical air."""
        room = np.asarray(ROOM)
        air = Air(temperature=room, pressure=np.asarray(STANDARD_ATMOSPHERE))
        return ProductGas(self.fuel, air, FlueReadings(flue_temperature=room, excess_air=np.zeros(())))

    def heating_value(self, basis: str) -> FloatArray:
        """Heating value [J/kg] on `basis`."""
        return self.fuel.gross_heating_value if basis == GROSS else self.fuel.net_heating_value

    def molar_density(self, metering: str) -> FloatArray:
        """What a real cubic metre of the gas holds [mol/m3]."""
        return np.where(np.isnan(self.amount), np.nan, molar_density(self.fuel.gases, metering))

    def compression_factor(self, metering: str) -> FloatArray:
        """Compression factor of the gas."""
        return np.where(np.isnan(self.amount), np.nan, compression_factor(self.fuel.gases, metering))

    def density(self, metering: str) -> FloatArray:
        """Density of the real gas [kg/m3]."""
        return self.molar_density(metering) / self.amount

    def volumetric(self, basis: str, metering: str) -> FloatArray:
        """Heating value of a real cubic metre [J/m3]."""
        return self.heating_value(basis) * self.density(metering)

    def wobbe_index(self, basis: str, metering: str) -> FloatArray:
        """Heating value of a real cubic metre over the root of the relative density [J/m3]."""
        return self.volumetric(basis, metering) / np.sqrt(self.density(metering) / air_density(metering))

    @cached_property
    def f_factor_dry(self) -> FloatArray:
        """Dry flue gas at theoretical air over gross heat [m3/J], 68 degF and 760 mmHg."""
        return self.product.dry_flue_gas * EPA_MOLAR_VOLUME / self.fuel.gross_heating_value

    @cached_property
    def f_factor_carbon(self) -> FloatArray:
        """Carbon dioxide from the fuel over gross heat [m3/J], 68 degF and 760 mmHg."""
        return self.fuel.element("C") * EPA_MOLAR_VOLUME / self.fuel.gross_heating_value


Formula = Callable[[FuelTerms], FloatArray]


@dataclass(frozen=True)
class FuelFigure:
    """One figure of a fuel; `dimension` is a name of the units floor, `metering` one of METERING or "" for none."""

    name: str
    label: str
    dimension: str
    group: str
    help: str
    source: str
    formula: Formula
    metering: str = ""
