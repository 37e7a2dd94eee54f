"""Excess air and O2 on cold and hot days with dampers as they are: the ideal gas law, humid air of CoolProp."""

from dataclasses import replace
from typing import Any

import numpy as np
import pytest
from CoolProp.HumidAirProp import HAPropsSI
from hypothesis import given, settings
from hypothesis import strategies as st

from fluegas.accounting.account import heat_account
from fluegas.accounting.air_density import relative_humidity
from fluegas.accounting.inputs import AccountInput
from fluegas.combustion.air import Air
from fluegas.errors import RangeError
from tests.accounting.states import CELSIUS, array, coal, distillate_oil, lean_states, pipeline_gas, state

NAMES = [f"air_density.{figure}_{day}" for figure in ("excess_air", "o2") for day in ("coldest", "hottest")]


def days(data: AccountInput) -> dict[str, float]:
    """Return excess air and O2 of both days of one state by name, and those of the state itself."""
    account = heat_account(data, [*NAMES, "excess_air", "flue_gas.dry.O2"])
    return {name.removeprefix("air_density."): float(value) for name, value in account.items()}


@pytest.mark.parametrize("celsius", [-30.0, -5.0, 20.0, 38.0])
def test_dry_air_goes_with_the_inverse_of_temperature(celsius: float) -> None:
    found = days(state(pipeline_gas(), o2=0.04, air_temperature=293.15, coldest_air=celsius + CELSIUS))
    assert 1 + found["excess_air_coldest"] == pytest.approx(
        (1 + found["excess_air"]) * 293.15 / (celsius + CELSIUS), rel=1e-12
    )


@pytest.mark.parametrize("pressure", [101_325.0, 88_000.0])
@pytest.mark.parametrize("humidity", [0.2, 0.55, 1.0])
@pytest.mark.parametrize("celsius", [-12.0, 5.0, 30.0, 41.0])
def test_dry_air_in_a_volume_of_humid_air_against_coolprop(pressure: float, humidity: float, celsius: float) -> None:
    """Dry air per volume, CoolProp's real humid air (ASHRAE RP-1485), pressure and relative humidity kept: 0.1 %."""

    def volume(kelvin: float) -> float:
        return float(HAPropsSI("Vda", "T", kelvin, "P", pressure, "R", humidity))

    at = {"air_temperature": 295.15, "pressure": pressure, "relative_humidity": humidity}
    found = days(state(distillate_oil(), excess_air=0.2, hottest_air=celsius + CELSIUS, **at))
    ratio = (1 + found["excess_air_hottest"]) / 1.2
    assert ratio == pytest.approx(volume(295.15) / volume(celsius + CELSIUS), rel=1e-3)


@settings(max_examples=80)
@given(lean_states(nitric_oxide=True))
def test_a_day_like_the_one_measured_gives_what_was_measured(data: AccountInput) -> None:
    found = days(replace(data, coldest_air=data.air.temperature, hottest_air=data.air.temperature))
    for day in ("coldest", "hottest"):
        assert found[f"excess_air_{day}"] == pytest.approx(found["excess_air"], rel=1e-9, abs=1e-9)
        assert found[f"o2_{day}"] == pytest.approx(found["flue_gas.dry.O2"], abs=1e-9)


@settings(max_examples=80)
@given(st.floats(0.0, 1.0), st.floats(250.0, 320.0), st.floats(250.0, 320.0), st.floats(0.1, 1.5))
def test_a_warmer_day_has_less_air_and_less_oxygen(humidity: float, one: float, other: float, excess: float) -> None:
    low, high = sorted((one, other))
    data = state(coal(), excess_air=excess + 0.4, relative_humidity=humidity, coldest_air=low, hottest_air=high)
    found = days(data)
    assert found["excess_air_coldest"] >= found["excess_air_hottest"]
    assert found["o2_coldest"] >= found["o2_hottest"]


def test_oxygen_follows_the_excess_air() -> None:
    """The O2 of a day is that of a setting whose excess air is the day's."""
    data = state(pipeline_gas(), o2=0.05, co=1e-4, relative_humidity=0.6, coldest_air=260.0, hottest_air=309.0)
    found = days(data)
    for day in ("coldest", "hottest"):
        own = state(pipeline_gas(), excess_air=found[f"excess_air_{day}"], co=1e-4)
        expected = float(heat_account(own, ["flue_gas.dry.O2"])["flue_gas.dry.O2"])
        assert found[f"o2_{day}"] == pytest.approx(expected, rel=1e-12)


def test_a_fuel_rich_day_has_an_excess_air_and_no_oxygen() -> None:
    found = days(state(pipeline_gas(), excess_air=0.03, hottest_air=315.15))
    assert found["excess_air_hottest"] == pytest.approx(1.03 * 298.15 / 315.15 - 1, rel=1e-12)
    assert found["excess_air_hottest"] < 0
    assert np.isnan(found["o2_hottest"])


@pytest.mark.parametrize(
    "form", [{"relative_humidity": array(0.45)}, {"dew_point": array(283.0)}, {"wet_bulb": array(289.0)}, {}]
)
def test_relative_humidity_from_any_form(form: dict[str, Any]) -> None:
    air = Air(array(296.15), array(99_000.0), **form)
    found = relative_humidity(air)
    same = Air(array(296.15), array(99_000.0), relative_humidity=array(found))
    assert float(same.water_ratio) == pytest.approx(float(air.water_ratio), rel=1e-12, abs=1e-15)
    if "relative_humidity" in form:
        assert float(found) == pytest.approx(0.45, rel=1e-12)


def test_a_fuel_rich_day_has_no_oxygen_though_unburnt_gases_were_read() -> None:
    """With 2 % CO and 1 % H2 there is oxygen beside them even at an air ratio of 0.98; a day so rich gets no O2."""
    read = {"co": 0.02, "h2": 0.01, "rich_gases_read": True}
    found = days(state(pipeline_gas(), excess_air=0.01, hottest_air=307.0, **read))
    assert found["excess_air_hottest"] == pytest.approx(1.01 * 298.15 / 307.0 - 1, rel=1e-12)
    assert found["flue_gas.dry.O2"] > 0.01
    assert np.isnan(found["o2_hottest"])


def test_where_no_day_was_given_there_is_no_figure() -> None:
    found = days(state(pipeline_gas(), hottest_air=305.0))
    assert np.isnan(found["o2_coldest"])
    assert np.isnan(found["excess_air_coldest"])
    assert np.isfinite(found["o2_hottest"])


def test_any_shape_gives_what_each_state_gives() -> None:
    oxygen, hottest = array([[0.02], [0.06]]), array([303.15, np.nan, 313.15])
    common = {"relative_humidity": 0.5, "coldest_air": 262.0}
    together = heat_account(state(coal(), o2=oxygen, hottest_air=hottest, **common), NAMES, chunk=2)
    assert together.shape == (2, 3)
    for row in range(2):
        for place in range(3):
            alone = heat_account(state(coal(), o2=oxygen[row, 0], hottest_air=hottest[place], **common), NAMES)
            for name in NAMES:
                np.testing.assert_allclose(together[name][row, place], alone[name], rtol=1e-12, err_msg=name)
    assert np.isnan(together["air_density.o2_hottest"][:, 1]).all()


def test_a_day_on_which_the_air_would_be_mostly_steam_is_refused() -> None:
    with pytest.raises(RangeError, match="partial pressure of water"):
        heat_account(state(pipeline_gas(), pressure=3e4, relative_humidity=1.0, hottest_air=343.0), NAMES)
