"""The figures of a fuel alone, each declared once: heating values, air, flue gas, factors of emission rules, flame.

One pure function: a Fuel of any state shape goes in, named arrays of that shape come out. Names are dotted as the JSON
output nests them. NaN marks a figure that a fuel does not have, such as the density of a solid as a gas.

Everything about combustion holds for dry air of 25 degC and 101.325 kPa in just the amount that burns the fuel wholly.
"""

from collections.abc import Callable, Mapping, Sequence
from dataclasses import dataclass
from functools import cache, cached_property
from types import MappingProxyType

import numpy as np

from fluegas.accounting.inputs import BASES, GROSS
from fluegas.combustion.air import STANDARD_ATMOSPHERE, Air, dry_air_molar_mass
from fluegas.combustion.compression_factor import METERING, air_density, compression_factor, molar_density
from fluegas.combustion.dew_point import water_dew_point
from fluegas.combustion.flame import complete_flame_temperature
from fluegas.combustion.fuel import Fuel
from fluegas.combustion.product_gas import FlueReadings, ProductGas
from fluegas.errors import InputError
from fluegas.thermo.polynomials import FloatArray
from fluegas.thermo.species import GAS_CONSTANT, species

ROOM = 298.15
"""Temperature [K] of air and fuel before the flame."""
EPA_MOLAR_VOLUME = GAS_CONSTANT * 293.15 / STANDARD_ATMOSPHERE
"""Molar volume [m3/mol] at the standard state of 40 CFR 60, 68 degF and 760 mmHg."""
EPA_OXYGEN = 0.209
"""Oxygen share of dry air in 40 CFR 60."""

HEATING_VALUES, REAL_GAS, AIR_AND_GAS, FACTORS, FLAME = (
    "heating values",
    "as a real gas",
    "air and flue gas",
    "factors",
    "flame",
)
_ISO_6976 = "ISO 6976:2016"
_BALANCE = "element balances, exact"
_METHOD_19 = "40 CFR 60, appendix A-7, method 19"


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


@cache
def fuel_figure_table() -> Mapping[str, FuelFigure]:
    """Return every figure of a fuel by name, in the order of tables."""
    every = (*_heating_values(), *_real_gas(), *_air_and_gas(), *_factors(), *_flame())
    return MappingProxyType({figure.name: figure for figure in every})


def fuel_figures(
    fuel: Fuel, biogenic_share: FloatArray | float = 0.0, outputs: Sequence[str] | None = None
) -> Mapping[str, FloatArray]:
    """Return figures of `fuel` by name, each an array of its state shape; `outputs` names them, all if None.

    `biogenic_share` is the share of the carbon that is not fossil.

    Raises InputError for an unknown figure, RangeError for a flame beyond the species data.
    """
    table = fuel_figure_table()
    unknown = [name for name in outputs or () if name not in table]
    if unknown:
        raise InputError(f"no figure named {', '.join(unknown)}; the figures are {', '.join(table)}")
    terms = FuelTerms(fuel, biogenic_share)
    shape = np.broadcast_shapes(
        fuel.elements.shape[1:], np.shape(fuel.gross_heating_value), np.shape(fuel.moisture), np.shape(biogenic_share)
    )
    with np.errstate(divide="ignore", invalid="ignore"):
        values = {name: np.asarray(table[name].formula(terms)) for name in (table if outputs is None else outputs)}
    found = {
        name: np.broadcast_to(np.where(np.isfinite(value), value, np.nan), shape) for name, value in values.items()
    }
    return MappingProxyType(found)


def _heating_values() -> list[FuelFigure]:
    def per_mass(basis: str) -> Formula:
        return lambda terms: terms.heating_value(basis)

    def per_mole(basis: str) -> Formula:
        return lambda terms: terms.heating_value(basis) / terms.amount

    found = []
    for basis in BASES:
        text = f"{basis.capitalize()} heating value of a kilogram as fired, at the reference temperature."
        source = "the analysis, or as stated"
        name, label = f"{basis}_heating_value", f"{basis.capitalize()}, by mass"
        found.append(FuelFigure(name, label, "energy_per_mass", HEATING_VALUES, text, source, per_mass(basis)))
    for basis in BASES:
        text = f"{basis.capitalize()} heating value by amount of gas: its ideal normal volume."
        name, label = f"molar.{basis}_heating_value", f"{basis.capitalize()}, ideal gas"
        found.append(FuelFigure(name, label, "energy_per_amount", HEATING_VALUES, text, _ISO_6976, per_mole(basis)))
    return found


def _real_gas() -> list[FuelFigure]:
    return [figure for metering in METERING for figure in _metered(metering)]


def _metered(metering: str) -> list[FuelFigure]:
    def volumetric(basis: str) -> Formula:
        return lambda terms: terms.volumetric(basis, metering)

    def wobbe(basis: str) -> Formula:
        return lambda terms: terms.wobbe_index(basis, metering)

    def figure(name: str, label: str, dimension: str, text: str, formula: Formula) -> FuelFigure:
        whole = f"{text}, metered at {metering} and 101.325 kPa."
        dotted = f"real_gas.{metering}.{name}"
        return FuelFigure(dotted, label, dimension, REAL_GAS, whole, _ISO_6976, formula, metering)

    volume = "energy_per_volume"
    return [
        *(
            figure(
                f"{basis}_heating_value",
                f"{basis.capitalize()} heating value",
                volume,
                f"{basis.capitalize()} heat of a real cubic metre, burnt at the reference temperature",
                volumetric(basis),
            )
            for basis in BASES
        ),
        *(
            figure(
                f"{basis}_wobbe_index",
                f"{basis.capitalize()} Wobbe index",
                volume,
                f"{basis.capitalize()} heating value over the root of the relative density",
                wobbe(basis),
            )
            for basis in BASES
        ),
        figure("density", "Density", "density", "Mass of a real cubic metre", lambda terms: terms.density(metering)),
        figure(
            "relative_density",
            "Relative density",
            "ratio",
            "Density over that of dry air",
            lambda terms: terms.density(metering) / air_density(metering),
        ),
        figure(
            "compression_factor",
            "Compression factor",
            "ratio",
            "Volume of the real gas over that of the ideal gas",
            lambda terms: terms.compression_factor(metering),
        ),
    ]


def _air_and_gas() -> list[FuelFigure]:
    def figure(name: str, label: str, dimension: str, text: str, formula: Formula) -> FuelFigure:
        return FuelFigure(name, label, dimension, AIR_AND_GAS, text, _BALANCE, formula)

    def air(terms: FuelTerms) -> FloatArray:
        return terms.product.theoretical_dry_air

    def dry(terms: FuelTerms) -> FloatArray:
        return terms.product.dry_flue_gas

    def wet(terms: FuelTerms) -> FloatArray:
        return terms.product.wet_flue_gas

    found = [
        figure(
            "theoretical_air.mass_ratio",
            "Theoretical air",
            "mass_ratio",
            "Mass of dry air that just burns a mass of fuel.",
            lambda terms: air(terms) * dry_air_molar_mass(),
        )
    ]
    flows = (
        ("theoretical_air", "Theoretical air", "dry air that just burns the fuel", air),
        ("flue_gas.dry", "Dry flue gas", "dry flue gas at theoretical air", dry),
        ("flue_gas.wet", "Wet flue gas", "wet flue gas at theoretical air, the air dry", wet),
    )
    for name, label, text, amount in flows:
        found.append(
            figure(f"{name}.per_mass", label, "amount_per_mass", f"Amount of {text}, by mass of fuel.", amount)
        )
    for name, label, text, amount in flows:
        found.append(
            figure(f"{name}.volume_ratio", label, "ratio", f"Volume of {text}, by volume of gas.", _by_gas(amount))
        )
    found.append(
        figure(
            "maximum_carbon_dioxide",
            "Maximum CO2, dry",
            "fraction",
            "CO2 in the dry flue gas at theoretical air, that of the air included.",
            lambda terms: terms.product.amount("CO2") / dry(terms),
        )
    )
    return found


def _by_gas(amount: Formula) -> Formula:
    return lambda terms: amount(terms) / terms.amount


def _factors() -> list[FuelFigure]:
    def carbon_dioxide(basis: str, is_fossil: bool) -> Formula:
        def factor(terms: FuelTerms) -> FloatArray:
            share = 1.0 - terms.biogenic_share if is_fossil else terms.biogenic_share
            mass = terms.fuel.element("C") * species("CO2").molar_mass
            return np.asarray(share * mass / terms.heating_value(basis))

        return factor

    def f_factor_wet(terms: FuelTerms) -> FloatArray:
        return terms.product.wet_flue_gas * EPA_MOLAR_VOLUME / terms.fuel.gross_heating_value

    per_energy = "volume_per_energy"
    standard = "over gross heat, at 68 degF and 760 mmHg."
    found = [
        FuelFigure(
            "f_factor.dry",
            "F factor, dry (Fd)",
            per_energy,
            FACTORS,
            f"Dry flue gas at theoretical air {standard}",
            _METHOD_19,
            lambda terms: terms.f_factor_dry,
        ),
        FuelFigure(
            "f_factor.wet",
            "F factor, wet (Fw)",
            per_energy,
            FACTORS,
            f"Wet flue gas at theoretical air {standard}",
            _METHOD_19,
            f_factor_wet,
        ),
        FuelFigure(
            "f_factor.carbon",
            "F factor, CO2 (Fc)",
            per_energy,
            FACTORS,
            f"CO2 from the fuel {standard}",
            _METHOD_19,
            lambda terms: terms.f_factor_carbon,
        ),
        FuelFigure(
            "f_factor.ratio",
            "F factor ratio (Fo)",
            "ratio",
            FACTORS,
            "0.209 Fd/Fc, what (20.9 - O2)/CO2 of a dry flue gas comes to.",
            "40 CFR 60, appendix A-2, method 3B",
            lambda terms: EPA_OXYGEN * terms.f_factor_dry / terms.f_factor_carbon,
        ),
    ]
    for basis in BASES:
        for origin in ("fossil", "biogenic"):
            name = f"carbon_dioxide.{basis}.{origin}"
            text = f"CO2 from {origin} carbon over {basis} heat, all carbon burnt."
            label = f"{origin.capitalize()} CO2, {basis}"
            formula = carbon_dioxide(basis, origin == "fossil")
            found.append(FuelFigure(name, label, "emission_per_energy", FACTORS, text, _BALANCE, formula))
    return found


def _flame() -> list[FuelFigure]:
    def dew_point(terms: FuelTerms) -> FloatArray:
        share = terms.product.water / terms.product.wet_flue_gas
        return water_dew_point(share * STANDARD_ATMOSPHERE)

    def flame(terms: FuelTerms) -> FloatArray:
        return complete_flame_temperature(terms.product, np.asarray(ROOM))

    return [
        FuelFigure(
            "dew_point.water",
            "Water dew point",
            "temperature",
            FLAME,
            "Of the flue gas at theoretical air, the air dry, at 101.325 kPa.",
            "IAPWS R7-97, region 4",
            dew_point,
        ),
        FuelFigure(
            "flame_temperature.complete",
            "Flame, complete",
            "temperature",
            FLAME,
            "Adiabatic, theoretical air, air and fuel at 25 degC, no dissociation.",
            "species data of NASA/TP-2002-211556",
            flame,
        ),
    ]
