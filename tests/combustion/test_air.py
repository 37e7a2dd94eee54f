"""Combustion air: composition, humidity in its three forms, altitude, temperatures, what cannot be."""

from typing import Any

import numpy as np
import pytest
from CoolProp.HumidAirProp import HAPropsSI
from hypothesis import given
from hypothesis import strategies as st

from fluegas.combustion.air import (
    DRY_AIR_GASES,
    Air,
    dry_air_amounts,
    dry_air_molar_mass,
    pressure_at_altitude,
)
from fluegas.errors import RangeError
from fluegas.thermo.water import saturation_pressure, saturation_temperature
from tests.combustion.drawn import air
from tests.reference.tables import table

WATER_OVER_AIR = 18.01528 / 28.9655
HUMIDITY = table("humidity_ratios")
BOILING = float(saturation_pressure(380.0)) / 101_325
STATES = [
    (celsius, humidity, pressure)
    for celsius in (2.0, 10.0, 20.0, 30.0, 40.0, 50.0)
    for humidity in (0.1, 0.3, 0.5, 0.8, 1.0)
    for pressure in (101_325.0, 80_000.0)
]


def test_dry_air_sums_to_one_and_weighs_what_the_standards_say() -> None:
    """28.9655 g/mol: ISO 6976 28.96546, CIPM-2007 28.9655 (from memory); our four gases: 28.964."""
    amounts = dry_air_amounts()
    assert tuple(amounts) == DRY_AIR_GASES == ("O2", "N2", "Ar", "CO2")
    assert float(sum(amounts.values())) == pytest.approx(1.0, abs=1e-15)
    assert 1000 * float(dry_air_molar_mass()) == pytest.approx(28.96546, rel=1e-4)


def test_dry_air_has_the_composition_of_a_handbook() -> None:
    """ASHRAE Handbook, Fundamentals 2017, chapter 1: N2 78.084, O2 20.9476, Ar 0.934 % by volume."""
    amounts = dry_air_amounts()
    for symbol, percent in (("N2", 78.084), ("O2", 20.9476), ("Ar", 0.934)):
        assert 100 * float(amounts[symbol]) == pytest.approx(percent, abs=0.006)


@given(st.floats(0.15, 1.0), st.floats(0.0, 1000.0))
def test_another_oxygen_share_scales_the_rest(oxygen: float, total: float) -> None:
    amounts = dry_air_amounts(total, oxygen)
    assert float(sum(amounts.values())) == pytest.approx(total, rel=1e-12, abs=1e-12)
    assert float(amounts["O2"]) == pytest.approx(oxygen * total)
    assert float(amounts["N2"]) * 0.0093 == pytest.approx(float(amounts["Ar"]) * 0.7808, rel=1e-12)


@pytest.mark.parametrize(
    ("altitude", "pressure"), [(0, 101_325.0), (1000, 89_874.6), (2000, 79_495.2), (5000, 54_019.9)]
)
def test_the_standard_atmosphere(altitude: float, pressure: float) -> None:
    """ISO 2533 (ICAO standard atmosphere), geopotential altitude, printed to 0.1 Pa; from memory."""
    assert float(pressure_at_altitude(altitude)) == pytest.approx(pressure, abs=0.06)


@pytest.mark.parametrize(("altitude", "said"), [(-501.0, "-501"), (11_001.0, "11001")])
def test_altitudes_outside_the_lowest_layer_are_told(altitude: float, said: str) -> None:
    with pytest.raises(RangeError) as caught:
        pressure_at_altitude([100.0, altitude])
    assert str(caught.value) == (f"altitude is {said} m; it must be between -500 and 11000 m (ISO 2533, lowest layer)")


@pytest.mark.parametrize("row", HUMIDITY, ids=[row["celsius"] for row in HUMIDITY])
def test_humidity_ratios_of_perfect_gas(row: dict[str, str]) -> None:
    supply = air(float(row["celsius"]) + 273.15, relative_humidity=float(row["relative_humidity"]))
    assert float(supply.water_ratio) * WATER_OVER_AIR == pytest.approx(float(row["ratio"]), rel=2e-4)


def test_a_dew_point_by_hand() -> None:
    """25 degC and 60 %: vapour of 1.9018 kPa, dew point 16.7 degC."""
    ratio = float(air(298.15, relative_humidity=0.6).water_ratio)
    vapour = 101_325 * ratio / (1 + ratio)
    assert vapour == pytest.approx(1901.8, abs=0.3)
    assert float(saturation_temperature(vapour)) - 273.15 == pytest.approx(16.7, abs=0.05)


@pytest.mark.parametrize("form", ["relative_humidity", "dew_point", "wet_bulb"])
def test_humid_air_of_a_reference_library(form: str) -> None:
    """CoolProp's real humid air: our ideal gas lacks the enhancement factor, 0.61 % at most to 50 degC.

    ASHRAE gives less than 0.7 % for perfect gas. From the wet bulb dry air is a small difference: 3e-5 mol/mol more.
    """
    compared = 0
    for celsius, humidity, pressure in STATES:
        state = ("T", celsius + 273.15, "P", pressure, "R", humidity)
        key = {"relative_humidity": "R", "dew_point": "D", "wet_bulb": "B"}[form]
        given_value = min(HAPropsSI(key, *state), 1.0 if form == "relative_humidity" else celsius + 273.15)
        if form == "wet_bulb" and given_value < 273.2:
            continue
        expected = HAPropsSI("W", *state) * 28.966 / 18.015268
        fields: dict[str, Any] = {form: given_value}
        found = float(air(celsius + 273.15, pressure, **fields).water_ratio)
        allowed = 0.0061 * expected + (3e-5 if form == "wet_bulb" else 0.0)
        assert found == pytest.approx(expected, abs=allowed), (celsius, humidity, pressure)
        compared += 1
    assert compared > 45


@given(st.floats(275.0, 330.0), st.floats(0.02, 1.0), st.floats(60e3, 110e3))
def test_the_dew_point_says_the_same_as_the_relative_humidity(
    temperature: float, humidity: float, pressure: float
) -> None:
    by_humidity = float(air(temperature, pressure, relative_humidity=humidity).water_ratio)
    dew_point = min(float(saturation_temperature(humidity * saturation_pressure(temperature))), temperature)
    by_dew_point = float(air(temperature, pressure, dew_point=dew_point).water_ratio)
    assert by_dew_point == pytest.approx(by_humidity, rel=1e-9)


@given(st.floats(274.0, 330.0), st.floats(60e3, 110e3))
def test_saturated_air_has_three_equal_temperatures(temperature: float, pressure: float) -> None:
    saturated = float(air(temperature, pressure, relative_humidity=1.0).water_ratio)
    assert float(air(temperature, pressure, dew_point=temperature).water_ratio) == pytest.approx(saturated, rel=1e-12)
    assert float(air(temperature, pressure, wet_bulb=temperature).water_ratio) == pytest.approx(saturated, rel=1e-10)


def test_air_is_dry_unless_told() -> None:
    assert float(air().water_ratio) == 0.0
    assert float(air(relative_humidity=0.0).water_ratio) == 0.0
    assert float(air(relative_humidity=np.nan).water_ratio) == 0.0


def test_states_may_differ_in_how_humidity_is_given() -> None:
    nan = np.nan
    temperature = np.array([293.15, 303.15, 308.15, 283.15])
    mixed = air(
        temperature,
        relative_humidity=np.array([0.5, nan, nan, nan]),
        wet_bulb=np.array([nan, 293.15, nan, nan]),
        dew_point=np.array([nan, nan, 288.15, nan]),
    )
    alone = [
        air(293.15, relative_humidity=0.5),
        air(303.15, wet_bulb=293.15),
        air(308.15, dew_point=288.15),
        air(283.15),
    ]
    np.testing.assert_allclose(mixed.water_ratio, [float(one.water_ratio) for one in alone], rtol=1e-13)


@pytest.mark.parametrize("hot", [400.0, 640.0, 900.0])
@pytest.mark.parametrize("form", ["relative_humidity", "wet_bulb", "dew_point"])
def test_dry_hot_air_beside_humid_air_spoils_nothing(form: str, hot: float) -> None:
    """The state without humidity is hotter than boiling, or than water can be liquid at all."""
    value = 0.5 if form == "relative_humidity" else 288.15
    fields: dict[str, Any] = {form: np.array([value, np.nan])}
    alone: dict[str, Any] = {form: value}
    found = air(np.array([298.15, hot]), **fields).water_ratio
    np.testing.assert_allclose(found, [float(air(298.15, **alone).water_ratio), 0.0], rtol=1e-13)


def test_cold_air_beside_others_spoils_nothing() -> None:
    found = air(np.array([298.15, 250.0]), dew_point=np.array([288.15, np.nan])).water_ratio
    np.testing.assert_allclose(found, [float(air(298.15, dew_point=288.15).water_ratio), 0.0], rtol=1e-13)


def test_frosty_air() -> None:
    """At -10 degC saturation is over ice: 259.9 Pa, not the 286.5 Pa over supercooled water (tables, from memory)."""
    ratio = float(air(263.15, relative_humidity=1.0).water_ratio)
    assert 101_325 * ratio / (1 + ratio) == pytest.approx(259.9, abs=0.1)


@pytest.mark.parametrize("form", ["relative_humidity", "wet_bulb", "dew_point"])
@pytest.mark.parametrize("shape", [(), (3,), (2, 3)])
def test_any_shape_gives_the_same_numbers(form: str, shape: tuple[int, ...]) -> None:
    temperature = np.linspace(290.0, 310.0, int(np.prod(shape, dtype=int))).reshape(shape)
    value = (temperature - 250) / 100 if form == "relative_humidity" else temperature - 8
    fields: dict[str, Any] = {form: value}
    together = air(temperature, **fields).water_ratio
    assert together.shape == shape
    for place in np.ndindex(shape):
        one: dict[str, Any] = {form: value[place]}
        assert float(together[place]) == pytest.approx(float(air(temperature[place], **one).water_ratio), rel=1e-12)


def test_temperatures_at_burner_and_boundary() -> None:
    cold = np.array([290.0, 290.0, 290.0])
    supply = air(cold, burner_temperature=np.array([np.nan, 500.0, 500.0]), preheated_outside=[False, False, True])
    np.testing.assert_array_equal(supply.at_burner, [290.0, 500.0, 500.0])
    np.testing.assert_array_equal(supply.at_boundary, [290.0, 290.0, 500.0])
    assert float(air(291.0).at_burner) == float(air(291.0).at_boundary) == 291.0


@pytest.mark.parametrize(
    ("supply", "message"),
    [
        (
            air(293.15, relative_humidity=[0.5, 1.2]),
            "relative humidity is 1.2; it must be between 0 and 1",
        ),
        (
            air(293.15, relative_humidity=[0.5, -0.1]),
            "relative humidity is -0.1; it must be between 0 and 1",
        ),
        (
            air([293.15, 300.0], dew_point=[290.0, 301.0]),
            "dew point of the air is 301 K; it must be at most 300 K",
        ),
        (
            air([293.15, 300.0], wet_bulb=[290.0, 301.0]),
            "wet-bulb temperature is 301 K; it must be at most 300 K",
        ),
        (
            air(293.15, wet_bulb=[290.0, 272.0]),
            "wet-bulb temperature is 272 K; it must be at least 273.16 K (an iced bulb reads otherwise)",
        ),
        (
            air(380.0, relative_humidity=1.0),
            f"partial pressure of water over that of the air is {BOILING:g}; it must be between 0 and 0.9",
        ),
    ],
)
def test_what_cannot_be_is_told(supply: Air, message: str) -> None:
    with pytest.raises(RangeError) as caught:
        _ = supply.water_ratio
    assert str(caught.value) == message


def test_a_wet_bulb_drier_than_dry_air_is_told() -> None:
    with pytest.raises(
        RangeError, match=r"^humidity ratio from the wet bulb \[mol/mol\] is -0\.0\d+; it must be at least 0$"
    ):
        _ = air([293.15, 323.15], wet_bulb=[290.0, 280.0]).water_ratio
