"""Fuels, air and readings for the tests: short constructors, and strategies that draw them at random."""

from typing import Any

import numpy as np
from hypothesis import strategies as st
from numpy.typing import ArrayLike

from fluegas.combustion.air import Air
from fluegas.combustion.fuel import FUEL_GASES, Fuel
from fluegas.combustion.gas_fuel import gas_fuel
from fluegas.combustion.product_gas import FlueReadings
from fluegas.combustion.solid_fuel import solid_fuel

BURNING_GASES = ("CH4", "C2H6", "C3H8", "H2", "CO", "C2H4", "H2S", "NH3", "C6H6", "CH3OH", "COS", "HCN")


def air(temperature: ArrayLike = 298.15, pressure: ArrayLike = 101_325.0, **fields: ArrayLike) -> Air:
    """Return air with its fields as float arrays; dry unless a field says otherwise."""
    given: dict[str, Any] = {name: np.asarray(value) for name, value in fields.items()}
    return Air(np.asarray(temperature, dtype=float), np.asarray(pressure, dtype=float), **given)


def readings(flue_temperature: ArrayLike = 450.0, **fields: ArrayLike) -> FlueReadings:
    """Return flue readings with their fields as float arrays."""
    given: dict[str, Any] = {name: np.asarray(value) for name, value in fields.items()}
    return FlueReadings(np.asarray(flue_temperature, dtype=float), **given)


def coal(**options: Any) -> Fuel:
    """Return the dry coal of the boiler test in Steam, Its Generation and Use, 35th ed. (1919), tables 57 and 58."""
    fractions = {"carbon": 0.7857, "hydrogen": 0.0560, "oxygen": 0.0702, "nitrogen": 0.0111, "sulfur": 0.0118}
    return solid_fuel({**fractions, "ash": 0.0652}, **{"analysis_basis": "dry", **options})


@st.composite
def gas_fuels(draw: st.DrawFn) -> Fuel:
    """Draw a gas of a burning gas and up to five others."""
    fractions = {draw(st.sampled_from(BURNING_GASES)): draw(st.floats(0.3, 1.0))}
    for other in draw(st.lists(st.sampled_from(FUEL_GASES), max_size=5, unique=True)):
        share = 0.05 if other == "O2" else 0.6
        fractions[other] = fractions.get(other, 0.0) + draw(st.floats(0.0, share))
    return gas_fuel(fractions)


@st.composite
def solid_fuels(draw: st.DrawFn) -> Fuel:
    """Draw an oil, coal, wood or waste with moisture and ash."""
    fractions = {
        "carbon": draw(st.floats(0.4, 0.9)),
        "hydrogen": draw(st.floats(0.01, 0.14)),
        "oxygen": draw(st.floats(0.0, 0.4)),
        "nitrogen": draw(st.floats(0.0, 0.05)),
        "sulfur": draw(st.floats(0.0, 0.06)),
        "chlorine": draw(st.floats(0.0, 0.02)),
        "moisture": draw(st.floats(0.0, 0.5)),
        "ash": draw(st.floats(0.0, 0.3)),
    }
    return solid_fuel(fractions)


@st.composite
def airs(draw: st.DrawFn) -> Air:
    """Draw an oxidant from ambient air to near pure oxygen, dry to saturated."""
    return air(
        draw(st.floats(275.0, 320.0)),
        draw(st.floats(70e3, 105e3)),
        relative_humidity=draw(st.floats(0.0, 1.0)),
        oxygen=draw(st.floats(0.21, 0.95)),
    )


fuels = st.one_of(gas_fuels(), solid_fuels())
unburnt = st.fixed_dictionaries(
    {
        "co": st.floats(0.0, 0.02),
        "h2": st.floats(0.0, 0.01),
        "ch4": st.floats(0.0, 0.005),
        "no": st.floats(0.0, 0.002),
        "unburned_carbon": st.floats(0.0, 0.2),
    }
)
