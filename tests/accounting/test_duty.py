"""Duty of the flue gas between two temperatures: the losses of the account, tables of enthalpy, steam tables."""

from dataclasses import replace

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from iapws import IAPWS97

from fluegas.accounting.account import heat_account
from fluegas.accounting.duty import duty
from fluegas.accounting.inputs import AccountInput
from fluegas.combustion.product_gas import FLUE_GASES, ProductGas
from fluegas.errors import RangeError
from fluegas.thermo.species import species
from tests.accounting.states import CELSIUS, array, coal, distillate_oil, lean_states, pipeline_gas, state
from tests.reference.tables import table


@settings(max_examples=80)
@given(lean_states(nitric_oxide=True))
def test_sensible_duty_to_the_reference_temperature_is_the_sensible_losses(data: AccountInput) -> None:
    account = heat_account(data)
    found = duty(data, data.readings.flue_temperature, data.fuel.reference_temperature)
    names = ("dry_gas", "fuel_water", "air_moisture")
    losses = sum(float(account[f"losses.net.{name}"]) for name in names) * float(data.fuel.net_heating_value)
    assert float(found.sensible) == pytest.approx(losses, rel=1e-10, abs=1e-6)


@settings(max_examples=80)
@given(lean_states())
def test_condensation_is_the_one_of_the_account(data: AccountInput) -> None:
    """From where all is vapour to the flue temperature: what the account credits there."""
    gross = float(data.fuel.gross_heating_value)
    credit = -float(heat_account(data)["losses.gross.condensation"]) * gross
    found = duty(data, 1500.0, data.readings.flue_temperature)
    assert float(found.condensation) == pytest.approx(credit, rel=1e-10, abs=1e-6)


@settings(max_examples=80)
@given(lean_states(), st.lists(st.floats(CELSIUS + 5, 1800.0), min_size=3, max_size=3))
def test_duties_over_adjoining_ranges_add_up(data: AccountInput, temperatures: list[float]) -> None:
    warm, between, cold = temperatures
    one, other, whole = duty(data, warm, between), duty(data, between, cold), duty(data, warm, cold)
    for name in ("sensible", "condensation", "condensate", "total"):
        parts = getattr(one, name) + getattr(other, name)
        assert float(parts) == pytest.approx(float(getattr(whole, name)), rel=1e-9, abs=1e-3), name


def test_sensible_duty_against_tables_of_enthalpy() -> None:
    """From 1000 and 1500 K to 500 K with molar enthalpies of the NIST WebBook: 0.1 %."""
    data = state(coal(), o2=0.05, relative_humidity=0.6)
    gas = ProductGas(data.fuel, data.air, data.readings)
    rows = {row["gas"]: row for row in table("janaf_enthalpy")}
    for kelvin in ("1000", "1500"):
        tabled = sum(
            float(gas.amount(name)) * 1e3 * (float(rows[name][kelvin]) - float(rows[name]["500"]))
            for name in FLUE_GASES
            if name in rows
        )
        known = sum(float(gas.amount(name)) for name in rows)
        assert known == pytest.approx(float(gas.wet_flue_gas), rel=2e-4)
        assert float(duty(data, float(kelvin), 500.0).sensible) == pytest.approx(tabled, rel=1e-3)


@pytest.mark.parametrize("celsius", [20.0, 35.0, 50.0])
def test_heat_of_condensing_against_steam_tables(celsius: float) -> None:
    """Condensate times the heat of evaporation of IAPWS-IF97: 0.3 %, vapour taken as an ideal gas."""
    found = duty(state(pipeline_gas(), o2=0.03, relative_humidity=0.5), 400.0, celsius + CELSIUS)
    vapour, liquid = (IAPWS97(T=celsius + CELSIUS, x=x).h for x in (1, 0))
    assert float(found.condensation) == pytest.approx(float(found.condensate) * (vapour - liquid) * 1e3, rel=3e-3)
    assert float(found.condensate) > 0.3


def test_gas_leaves_saturated() -> None:
    """What is not condensed at 40 degC has the saturation pressure of the steam tables, 7.381 kPa: 0.1 %."""
    data = state(pipeline_gas(), o2=0.03)
    gas = ProductGas(data.fuel, data.air, data.readings)
    left = float(gas.water) - float(duty(data, 450.0, CELSIUS + 40).condensate) / species("H2O").molar_mass
    assert left / (left + float(gas.dry_flue_gas)) * 101_325 == pytest.approx(
        IAPWS97(T=CELSIUS + 40, x=0).P * 1e6, rel=1e-3
    )


def test_nothing_condenses_above_the_dew_point() -> None:
    found = duty(state(distillate_oil()), 480.0, CELSIUS + 60)
    assert float(found.condensation) == float(found.condensate) == 0.0
    assert float(found.total) == float(found.sensible)


def test_readings_at_the_stack_do_not_matter() -> None:
    data = state(pipeline_gas(), flue_temperature=500.0)
    other = replace(data, readings=replace(data.readings, flue_temperature=array(390.0)), condensate=array(0.2))
    for name in ("sensible", "condensation", "condensate"):
        assert getattr(duty(data, 480.0, 310.0), name) == getattr(duty(other, 480.0, 310.0), name)


def test_warming_gives_the_same_heat_back() -> None:
    data = state(pipeline_gas())
    assert float(duty(data, 310.0, 480.0).total) == pytest.approx(-float(duty(data, 480.0, 310.0).total), rel=1e-14)


def test_any_shape_gives_what_each_state_gives() -> None:
    oxygen, ends = array([[0.02], [0.05], [0.09]]), array([400.0, 330.0, 300.0, 290.0])
    together = duty(state(pipeline_gas(), o2=oxygen), 500.0, ends)
    for row in range(3):
        for place in range(4):
            alone = duty(state(pipeline_gas(), o2=oxygen[row, 0]), 500.0, ends[place])
            for name in ("sensible", "condensation", "condensate"):
                found = np.broadcast_to(getattr(together, name), (3, 4))[row, place]
                np.testing.assert_allclose(found, getattr(alone, name), rtol=1e-12, atol=1e-9)


def test_a_gas_that_the_readings_do_not_describe_has_no_duty() -> None:
    found = duty(state(pipeline_gas(), excess_air=[-0.2, 0.2]), 500.0, 310.0)
    for values in vars(found).values():
        assert np.isnan(values[0])
        assert np.isfinite(values[1])


@pytest.mark.parametrize(
    ("start", "end", "words"),
    [(7000.0, 400.0, "from which"), (500.0, 150.0, "to which"), (500.0, 260.0, "liquid water")],
)
def test_temperatures_outside_the_data(start: float, end: float, words: str) -> None:
    with pytest.raises(RangeError, match=words):
        duty(state(pipeline_gas()), start, end)
