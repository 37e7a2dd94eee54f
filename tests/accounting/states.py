"""States for the tests of the account: a few fuels, plain states, and random ones for hypothesis."""

from collections.abc import Mapping
from typing import Any

import numpy as np
from hypothesis import strategies as st

from fluegas.accounting.inputs import AccountInput
from fluegas.combustion.air import Air
from fluegas.combustion.fuel import Fuel
from fluegas.combustion.gas_fuel import gas_fuel
from fluegas.combustion.product_gas import FlueReadings
from fluegas.combustion.solid_fuel import solid_fuel
from fluegas.thermo.polynomials import FloatArray

CELSIUS = 273.15
PIPELINE_GAS = {"CH4": 0.93, "C2H6": 0.04, "C3H8": 0.01, "N2": 0.015, "CO2": 0.005}
DISTILLATE_OIL = {"carbon": 0.866, "hydrogen": 0.132, "sulfur": 0.001, "nitrogen": 0.001}
COAL = {
    "carbon": 0.66,
    "hydrogen": 0.045,
    "oxygen": 0.08,
    "nitrogen": 0.013,
    "sulfur": 0.011,
    "chlorine": 0.001,
    "moisture": 0.08,
    "ash": 0.11,
}


def pipeline_gas(reference: float = 298.15) -> Fuel:
    return gas_fuel(PIPELINE_GAS, reference_temperature=reference)


def distillate_oil(reference: float = 298.15) -> Fuel:
    return solid_fuel(
        DISTILLATE_OIL,
        state="liquid",
        reference_temperature=reference,
        gross_heating_value=45.6e6,
        heat_capacity=1900.0,
    )


def coal(reference: float = 298.15) -> Fuel:
    return solid_fuel(COAL, reference_temperature=reference, gross_heating_value=27.4e6)


def array(value: object) -> FloatArray:
    return np.asarray(value, dtype=float)


_AIR_KEYS = {
    "air_temperature": "temperature",
    "pressure": "pressure",
    "relative_humidity": "relative_humidity",
    "oxygen": "oxygen",
    "burner_temperature": "burner_temperature",
    "preheated_outside": "preheated_outside",
}
_READING_KEYS = (
    "flue_temperature",
    "o2",
    "o2_wet",
    "co2",
    "excess_air",
    "co",
    "h2",
    "ch4",
    "no",
    "unburned_carbon",
    "chamber_temperature",
)
_FLAGS = ("rich_gases_read", "preheated_outside")


def state(fuel: Fuel, **given: object) -> AccountInput:
    """Return an AccountInput from plain numbers or arrays; air, fuel and flue at usual values where nothing is given.

    Keys are the fields of Air (its temperature as `air_temperature`), FlueReadings and AccountInput.
    """
    values: dict[str, object] = {"air_temperature": 298.15, "pressure": 101_325.0, "flue_temperature": 450.0}
    values |= {"fuel_temperature": 298.15} | given
    air: dict[str, Any] = {}
    readings: dict[str, Any] = {}
    own: dict[str, Any] = {}
    for key, value in values.items():
        converted = value if key in _FLAGS or value is None else array(value) if key not in _PLAIN else value
        if key in _AIR_KEYS:
            air[_AIR_KEYS[key]] = converted
        elif key in _READING_KEYS or key == "rich_gases_read":
            readings[key] = converted
        else:
            own[key] = converted
    if not {"o2", "o2_wet", "co2", "excess_air"} & readings.keys():
        readings["o2"] = array(0.04)
    return AccountInput(fuel=fuel, air=Air(**air), readings=FlueReadings(**readings), **own)


_PLAIN = ("basis", "other", "recirculation", "acid_correlation", "sulfur_trioxide_share", "biogenic_share", "emissions")


def _floats(low: float, high: float) -> st.SearchStrategy[float]:
    return st.floats(low, high, allow_nan=False, width=64)


reference_temperatures = st.sampled_from([273.15, 288.15, 293.15, 298.15]) | _floats(273.15, 298.15)


@st.composite
def gas_fuels(draw: st.DrawFn, reference: float) -> Fuel:
    """A fuel gas: methane, much hydrogen or carbon monoxide beside it, some of everything else.

    The methane has the carbon and the hydrogen for the unburnt gases that `lean_states` reads.
    """
    shares: dict[str, float] = {"CH4": draw(_floats(0.2, 1.0))}
    shares[draw(st.sampled_from(["H2", "CO"]))] = draw(st.just(0.0) | _floats(0.0, 1.5))
    others = ("C2H6", "C3H8", "n-C4H10", "C2H4", "C2H2", "C6H6", "H2S", "NH3", "CO2", "N2", "O2", "Ar", "He", "H2O")
    for gas in draw(st.lists(st.sampled_from(others), max_size=6, unique=True)):
        shares[gas] = draw(_floats(0.001, 0.02 if gas == "O2" else 0.1))
    return gas_fuel(shares, reference_temperature=reference)


@st.composite
def solid_fuels(draw: st.DrawFn, reference: float) -> Fuel:
    """A solid as fired with all parts: from dry coal to wet wood, its heating value estimated."""
    parts = {
        "carbon": draw(_floats(0.4, 0.8)),
        "hydrogen": draw(_floats(0.02, 0.07)),
        "oxygen": draw(_floats(0.0, 0.35)),
        "nitrogen": draw(_floats(0.0, 0.02)),
        "sulfur": draw(_floats(0.0, 0.04)),
        "chlorine": draw(_floats(0.0, 0.01)),
        "ash": draw(_floats(0.0, 0.3)),
        "moisture": draw(_floats(0.0, 0.5)),
    }
    return solid_fuel(parts, analysis_basis="dry", reference_temperature=reference)


@st.composite
def liquid_fuels(draw: st.DrawFn, reference: float) -> Fuel:
    """An oil with a stated gross heating value and heat capacity."""
    hydrogen = draw(_floats(0.09, 0.15))
    sulfur = draw(_floats(0.0, 0.04))
    return solid_fuel(
        {"carbon": 1 - hydrogen - sulfur, "hydrogen": hydrogen, "sulfur": sulfur, "moisture": draw(_floats(0.0, 0.02))},
        analysis_basis="dry",
        state="liquid",
        reference_temperature=reference,
        gross_heating_value=draw(_floats(41e6, 47e6)),
        heat_capacity=draw(_floats(1700.0, 2300.0)),
    )


FLUE_TEMPERATURES = _floats(CELSIUS + 20, CELSIUS + 60) | _floats(CELSIUS + 60, CELSIUS + 1100)


@st.composite
def lean_states(draw: st.DrawFn, nitric_oxide: bool = False) -> AccountInput:
    """A lean state of shape `()` with all that an account may hold; O2 up to 0.9 of the oxidant's share.

    The oxygen left always exceeds what the unburnt gases would take (at most 0.3 % of the dry gas).
    """
    reference = draw(reference_temperatures)
    kind = draw(st.sampled_from([gas_fuels, liquid_fuels, solid_fuels]))
    fuel = draw(kind(reference))
    oxygen = draw(st.just(0.2095) | _floats(0.19, 0.40))
    given: dict[str, object] = {
        "oxygen": oxygen,
        "o2": draw(_floats(0.005, 0.9 * oxygen)),
        "co": draw(st.just(0.0) | _floats(0.0, 0.002)),
        "h2": draw(st.just(0.0) | _floats(0.0, 0.001)),
        "ch4": draw(st.just(0.0) | _floats(0.0, 0.0007)),
        "no": draw(_floats(1e-5, 0.001)) if nitric_oxide else 0.0,
        "flue_temperature": draw(FLUE_TEMPERATURES),
        "air_temperature": draw(_floats(253.15, 313.15)),
        "relative_humidity": draw(st.none() | _floats(0.0, 1.0)),
        "pressure": draw(st.just(101_325.0) | _floats(70_000.0, 120_000.0)),
        "fuel_temperature": draw(_floats(260.0, 400.0)),
        "unburned_carbon": draw(_floats(0.0, 0.08)) if kind is solid_fuels else 0.0,
        "burner_temperature": draw(st.none() | _floats(320.0, 800.0)),
        "preheated_outside": draw(st.booleans()),
        "basis": draw(st.sampled_from(["gross", "net"])),
        "other": draw(st.sampled_from([{}, {"blowdown": 0.02, "ash": 0.004}])),
    }
    if draw(st.booleans()):
        given["surface_share"] = draw(_floats(0.0, 0.04))
    else:
        given["surface_per_useful"] = draw(_floats(0.0, 0.05))
    return state(fuel, **given)


def numbers(account: Mapping[str, FloatArray]) -> dict[str, float]:
    """Return the figures of an account of shape `()` as floats."""
    return {name: float(value) for name, value in account.items()}
