"""The figures of a fuel alone, each declared once: heating values, air, flue gas, factors of emission rules, flame.

One pure function: a Fuel of any state shape goes in, named arrays of that shape come out. Names are dotted as the JSON
output nests them. NaN marks a figure that a fuel does not have, such as the density of a solid as a gas.

Everything about combustion holds for dry air of 25 degC and 101.325 kPa in just the amount that burns the fuel wholly.
"""

from collections.abc import Mapping, Sequence
from functools import cache
from types import MappingProxyType

import numpy as np

from fluegas.accounting.fuel_terms import EPA_MOLAR_VOLUME, ROOM, Formula, FuelFigure, FuelTerms
from fluegas.accounting.inputs import BASES
from fluegas.combustion.air import STANDARD_ATMOSPHERE, dry_air_molar_mass
from fluegas.combustion.compression_factor import METERING, air_density
from fluegas.combustion.dew_point import water_dew_point
from fluegas.combustion.flame import complete_flame_temperature
from fluegas.combustion.fuel import Fuel
from fluegas.errors import InputError
from fluegas.thermo.polynomials import FloatArray
from fluegas.thermo.species import species

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
