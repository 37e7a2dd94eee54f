"""Emissions: what was read of a gas, as mass, at the reference oxygen, per heat input and over a year.

A share y of the dry flue gas is the mass concentration y M/V_n with V_n = R T_n/p_n, the molar volume of an ideal gas
at 0 degC and 101.325 kPa: 22.414 l/mol, for every gas. At the reference oxygen it becomes

    y (x - O2_ref)/(x - O2),    x the oxidant's own share of O2,

which is exact for a gas diluted with that oxidant. Directive 2010/75/EU writes 21 % for x and the United States 20.9 %.
From 7 % to 3 % O2 that makes 0.1 % less and 0.1 % more than 20.95 %, from 15 % O2 0.6 % less and 0.6 % more. Mass per
heat input is y M D over the heating value, D the account's own dry flue gas per kilogram of fuel: no F-factor.

NO enters the oxygen balance of the account. NO2 and a measured SO2 do not: 20 ppm of NO2 would move O2 by 0.002 percent
of volume, far below what an analyser resolves, and the sulfur of the flue gas is the fuel's.
"""

from collections.abc import Callable, Mapping
from types import MappingProxyType

import numpy as np
from numpy.typing import NDArray

from fluegas.accounting.inputs import AccountInput
from fluegas.accounting.terms import Terms
from fluegas.combustion.fuel import GASEOUS, LIQUID, SOLID
from fluegas.errors import Caution, RangeError
from fluegas.thermo.polynomials import BoolArray, FloatArray
from fluegas.thermo.species import GAS_CONSTANT, species

NORMAL_MOLAR_VOLUME = GAS_CONSTANT * 273.15 / 101_325.0
"""m3/mol of an ideal gas at 0 degC and 101.325 kPa."""

REFERENCE_OXYGEN: Mapping[str, float] = MappingProxyType({GASEOUS: 0.03, LIQUID: 0.03, SOLID: 0.06})
"""O2 that limits refer to by state of the fuel: Directive 2010/75/EU, annex V (combustion plants, dry)."""

COUNTED_AS: Mapping[str, str] = MappingProxyType({"co": "CO", "no": "NO", "no2": "NO2", "nox": "NO2", "so2": "SO2"})
"""The gas as whose mass each pollutant is counted; nitrogen oxides together as NO2."""

PARTS_DOUBT, PARTS_FLOOR = 0.10, 5e-6
"""NO + NO2 may differ from NOx by so much of it and by this share (our choice) before a caution says so."""
SULFUR_DOUBT, SULFUR_FLOOR = 0.20, 10e-6
"""SO2 may exceed the fuel's sulfur by so much of it and by this share (our choice) before a caution says so."""


def _where_read(share: FloatArray, read: BoolArray) -> FloatArray:
    known = read | (share > 0)
    return share if np.all(known) else np.where(known, share, np.nan)


def _carbon_monoxide(terms: Terms) -> FloatArray:
    share = np.asarray(terms.data.readings.co)
    return _where_read(share, np.asarray(terms.data.emissions.co_read))


def _nitric_oxide(terms: Terms) -> FloatArray:
    share = np.asarray(terms.data.readings.no)
    return _where_read(share, np.asarray(terms.data.emissions.no_read))


def _nitrogen_dioxide(terms: Terms) -> FloatArray:
    return np.asarray(terms.data.emissions.no2)


def _nitrogen_oxides(terms: Terms) -> FloatArray:
    given = np.asarray(terms.data.emissions.nox)
    parts = _nitric_oxide(terms) + np.nan_to_num(_nitrogen_dioxide(terms))
    return np.where(np.isnan(given), parts, given)


def _sulfur_dioxide(terms: Terms) -> FloatArray:
    given, amount = np.asarray(terms.data.emissions.so2), terms.gas.amount("SO2")
    balance = amount / terms.gas.dry_flue_gas if np.any(amount) else amount
    return balance if np.all(np.isnan(given)) else np.where(np.isnan(given), balance, given)


_SHARES: Mapping[str, Callable[[Terms], FloatArray]] = MappingProxyType(
    {
        "co": _carbon_monoxide,
        "no": _nitric_oxide,
        "no2": _nitrogen_dioxide,
        "nox": _nitrogen_oxides,
        "so2": _sulfur_dioxide,
    }
)


def dry_share(terms: Terms, pollutant: str) -> FloatArray:
    """Return the mole fraction of a pollutant in the dry flue gas, NaN where nothing tells it.

    NOx without a reading of its own is NO + NO2, or NO alone where NO2 was not read; SO2 without one is the fuel's
    sulfur, all of it.
    """
    return _SHARES[pollutant](terms)


def scaled(share: FloatArray, factor: Callable[[], FloatArray]) -> FloatArray:
    """Return `share` times what `factor` gives; a single share that is zero or unknown stays that one number."""
    return share if share.size == 1 and not np.all(share > 0) else np.asarray(share * factor())


def concentration(share: FloatArray, pollutant: str) -> FloatArray:
    """Return the mass [kg] in a normal cubic metre of dry gas for a mole fraction; 0 degC, 101.325 kPa."""
    return np.asarray(share * (species(COUNTED_AS[pollutant]).molar_mass / NORMAL_MOLAR_VOLUME))


def to_reference_oxygen(terms: Terms) -> FloatArray:
    """Return the factor from the oxygen that is there to the reference oxygen.

    Raises RangeError for a reference oxygen that the oxidant does not exceed.
    """
    in_air, reference = np.asarray(terms.data.air.oxygen), np.asarray(terms.data.reference_oxygen)
    if np.any(reference >= in_air) or np.any(reference < 0):
        raise RangeError(
            "reference oxygen",
            float(np.max(reference)),
            0.0,
            float(np.min(in_air)),
            source="the oxidant's own share of oxygen",
        )
    return np.asarray((in_air - reference) / (in_air - terms.gas.dry_oxygen))


def air_free_carbon_monoxide(terms: Terms) -> FloatArray:
    """Return the mole fraction of CO in the dry flue gas without excess air: y x/(x - O2)."""
    in_air = np.asarray(terms.data.air.oxygen)
    return scaled(dry_share(terms, "co"), lambda: in_air / (in_air - terms.gas.dry_oxygen))


def mass_per_fuel(terms: Terms, pollutant: str) -> FloatArray:
    """Return the mass of a pollutant per mass of fuel [kg/kg]."""
    mass = species(COUNTED_AS[pollutant]).molar_mass
    return scaled(dry_share(terms, pollutant), lambda: terms.gas.dry_flue_gas * mass)


def carbon_dioxide(terms: Terms) -> FloatArray:
    """Return all CO2 from the carbon that burns [kg/kg fuel]; unburnt gases counted as burnt."""
    return np.asarray(terms.gas.burned_carbon * species("CO2").molar_mass)


def fossil_carbon_dioxide(terms: Terms) -> FloatArray:
    """Return the fossil part of the CO2 [kg/kg fuel]."""
    return np.asarray(carbon_dioxide(terms) * (1.0 - np.asarray(terms.data.biogenic_share)))


PER_INPUT: Mapping[str, str] = MappingProxyType(
    {
        "co2": "emissions.co2_per_input",
        "all_co2": "emissions.all_co2_per_input",
        **{pollutant: f"emissions.{pollutant}.per_input" for pollutant in COUNTED_AS},
    }
)
"""The figures of mass per heat input, without their basis: fossil CO2, all CO2 and the pollutants."""


def per_year(account: Mapping[str, FloatArray], annual_heat: FloatArray, basis: str) -> Mapping[str, FloatArray]:
    """Return the mass of a year [kg/a] by the names of PER_INPUT, from the annual heat input [J/a] on `basis`.

    NaN where either is not known.
    """
    return {name: np.asarray(account[f"{figure}.{basis}"] * annual_heat) for name, figure in PER_INPUT.items()}


ORIGINS = ("nox", "so2")
"""The pollutants that may be worked out instead of read."""
READ, FROM_PARTS, FROM_NO, FROM_SULFUR, UNKNOWN = "reading", "NO + NO2", "NO alone", "fuel sulfur", ""


def origins(data: AccountInput) -> Mapping[str, NDArray[np.str_]]:
    """Return where the shares of NOx and SO2 come from, state by state: READ, FROM_PARTS, FROM_NO, FROM_SULFUR.

    UNKNOWN where nothing tells the share.
    """
    read = data.emissions
    has_no = np.asarray(read.no_read) | (np.asarray(data.readings.no) > 0)
    parts = np.where(np.isnan(read.no2), FROM_NO, FROM_PARTS)
    return {
        "nox": np.where(np.isnan(read.nox), np.where(has_no, parts, UNKNOWN), READ),
        "so2": np.where(np.isnan(read.so2), FROM_SULFUR, READ),
    }


def emission_cautions(data: AccountInput, figures: Mapping[str, float]) -> tuple[Caution, ...]:
    """Return what is doubtful about the emissions of one setting: `data` of one state, its `figures` by name."""
    return (*_oxides_disagree(data, figures), *_more_sulfur_than_fuel(data, figures))


def _one(value: FloatArray | float) -> float:
    return float(np.asarray(value).flat[0])


def _oxides_disagree(data: AccountInput, figures: Mapping[str, float]) -> tuple[Caution, ...]:
    whole, no, no2 = _one(data.emissions.nox), figures["emissions.no.dry"], figures["emissions.no2.dry"]
    parts = float(np.nansum([no, no2]))
    margin = PARTS_DOUBT * whole + PARTS_FLOOR
    complete = not (np.isnan(no) or np.isnan(no2))
    if not (parts > whole + margin or (complete and parts < whole - margin)):
        return ()
    message = (
        f"NO and NO2 come to {parts * 1e6:.0f} ppm, but NOx was given as {whole * 1e6:.0f} ppm: one of them cannot be "
        "right; the given NOx was taken"
    )
    return (Caution("nox_disagrees", message, parts, whole, "NOx is NO + NO2; margin 10 % and 5 ppm, our choice"),)


def _more_sulfur_than_fuel(data: AccountInput, figures: Mapping[str, float]) -> tuple[Caution, ...]:
    read, balance = _one(data.emissions.so2), figures["flue_gas.dry.SO2"]
    if not read > balance * (1 + SULFUR_DOUBT) + SULFUR_FLOOR:
        return ()
    message = (
        f"SO2 was read as {read * 1e6:.0f} ppm, but the fuel's sulfur gives {balance * 1e6:.0f} ppm at most: the "
        "sulfur of the analysis, the reading or its O2 cannot be right, or the charge brings sulfur"
    )
    source = "sulfur balance; margin 20 % and 10 ppm, our choice"
    return (Caution("sulfur_dioxide_above_fuel", message, read, balance, source),)
