"""Settings of one unit side by side: the surface loss that carries over, heat inputs, savings, money and CO2."""

from collections.abc import Sequence
from dataclasses import replace
from typing import Any

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from fluegas.accounting.account import heat_account
from fluegas.accounting.comparison import AnnualUse, compare
from fluegas.accounting.inputs import AccountInput
from fluegas.accounting.ledger import Ledger, UnitInput, ledger, with_surface
from fluegas.combustion.fuel import stack_fuels
from fluegas.thermo.polynomials import FloatArray
from tests.accounting.states import CELSIUS, array, coal, distillate_oil, pipeline_gas, state

OXYGEN = [0.064, 0.032, 0.030, 0.045]
FLUE = [504.0, 495.0, 330.0, 421.0]
HOUR = 3600.0
NONE = [np.nan] * 4


def settings_of_one_boiler(**given: object) -> AccountInput:
    """Four settings on gas; the third condenses."""
    return state(pipeline_gas(), o2=OXYGEN, flue_temperature=FLUE, relative_humidity=0.5, **given)


def unit(heat_input: Sequence[float], baseline: int = 0, **given: Any) -> UnitInput:
    compared = given.pop("compared_with", [baseline] * len(heat_input))
    return UnitInput(baseline=baseline, compared_with=compared, heat_input=array(heat_input), **given)


def surface_power(found: Ledger, basis: str) -> FloatArray:
    """Return the surface loss as power [W] at the heat inputs of the ledger, NaN where these are not known."""
    return found.account[f"losses.{basis}.surface"] * found.heat_input


# Surface.


@pytest.mark.parametrize("basis", ["gross", "net"])
@pytest.mark.parametrize("baseline", [0, 2])
def test_a_surface_share_is_the_same_heat_at_equal_useful_heat(basis: str, baseline: int) -> None:
    """Only the baseline's heat input is known: every other setting gives the same useful heat and loses the same kW."""
    inputs = list(NONE)
    inputs[baseline] = 3.2e6
    found = ledger(settings_of_one_boiler(basis=basis), unit(inputs, baseline, surface_share=0.011))
    assert found.account[f"losses.{basis}.surface"][baseline] == pytest.approx(0.011, rel=1e-12)
    useful = found.account[f"efficiency.{basis}"] * found.heat_input
    np.testing.assert_allclose(useful, useful[baseline], rtol=1e-12)
    np.testing.assert_allclose(surface_power(found, basis), 0.011 * 3.2e6, rtol=1e-12)


def test_a_surface_share_needs_no_heat_input() -> None:
    """Surface over useful heat is what carries over, known or not."""
    data = settings_of_one_boiler()
    unknown = ledger(data, unit(NONE, surface_share=0.011))
    known = ledger(data, unit([3.2e6, *NONE[1:]], surface_share=0.011))
    np.testing.assert_allclose(
        unknown.account["losses.gross.surface"], known.account["losses.gross.surface"], rtol=1e-12
    )
    ratio = unknown.account["losses.gross.surface"] / unknown.account["efficiency.gross"]
    np.testing.assert_allclose(ratio, ratio[0], rtol=1e-12)
    assert np.isnan(unknown.heat_input).all()


def test_the_formula_of_the_surface_rule() -> None:
    """q = s0/eta0; surface_i = (1 - L_i + C_i) q/(1 + q), L and C without surface (the definition, term by term)."""
    data = settings_of_one_boiler(other={"blowdown": 0.015})
    found = ledger(data, unit(NONE, surface_share=0.02)).account
    bare = heat_account(data)["efficiency.gross"]  # no surface: 1 - L + C
    q = 0.02 / (bare[0] - 0.02)
    np.testing.assert_allclose(found["losses.gross.surface"], bare * q / (1 + q), rtol=1e-12)


@pytest.mark.parametrize("given", [{"surface_share": 0.02}, {"surface_heat": 64e3}])
def test_a_setting_with_its_own_heat_input_loses_the_same_power(given: dict[str, Any]) -> None:
    """Half load: the shell is as hot, so its 64 kW weigh double."""
    found = ledger(settings_of_one_boiler(), unit([3.2e6, np.nan, np.nan, 1.6e6], **given))
    np.testing.assert_allclose(surface_power(found, "gross"), 64e3, rtol=1e-12)
    assert found.account["losses.gross.surface"][3] == pytest.approx(0.04, rel=1e-12)
    assert found.heat_input[3] == 1.6e6


def test_surface_heat_without_heat_input_goes_by_the_rated_output() -> None:
    found = ledger(settings_of_one_boiler(), unit(NONE, surface_heat=50e3, rated_output=2.5e6)).account
    np.testing.assert_allclose(found["losses.gross.surface"] / found["efficiency.gross"], 0.02, rtol=1e-12)


def test_surface_heat_stays_the_same_power_where_only_a_setting_has_a_heat_input() -> None:
    """The estimate gives kW; a setting with its own heat input loses those kW though the baseline has none."""
    found = ledger(settings_of_one_boiler(), unit([*NONE[:3], 1.6e6], surface_heat=50e3, rated_output=2.5e6))
    assert surface_power(found, "gross")[3] == pytest.approx(50e3, rel=1e-12)


def test_without_a_working_baseline_every_setting_takes_its_share() -> None:
    data = state(pipeline_gas(), excess_air=[-0.05, 0.15, 0.30])
    found = ledger(data, unit([3.2e6, np.nan, np.nan], surface_share=0.011)).account
    assert np.isnan(found["efficiency.gross"][0])
    np.testing.assert_allclose(found["losses.gross.surface"][1:], 0.011, rtol=1e-12)


def test_without_a_surface_loss_nothing_is_taken_off() -> None:
    data = settings_of_one_boiler()
    assert with_surface(data, unit(NONE)) is data
    assert np.all(ledger(data, unit(NONE)).account["losses.gross.surface"] == 0)


# Heat inputs and savings.


def test_the_baseline_has_zeros() -> None:
    found = ledger(
        settings_of_one_boiler(),
        unit([3.2e6, *NONE[1:]], 1, compared_with=[1, 1, 1, 3], operating_time=5200 * HOUR, price=1e-8),
    ).comparison
    for name in ("fuel", "fuel_gross", "fuel_net", "heat", "cost", "carbon_dioxide"):
        values = getattr(found, name)
        assert values[1] == 0.0, name
        assert values[3] == 0.0, name  # compared with itself
    assert found.compared_with == (1, 1, 1, 3)


def test_swapping_the_settings_turns_the_change_round() -> None:
    data = settings_of_one_boiler()
    there = ledger(data, unit(NONE, compared_with=[0, 0, 0, 0])).comparison.fuel
    back = ledger(data, unit(NONE, compared_with=[1, 1, 1, 1])).comparison.fuel
    assert (1 + there[1]) * (1 + back[0]) == pytest.approx(1.0, rel=1e-14)
    assert there[1] < 0 < back[0]


def test_savings_in_sequence_multiply() -> None:
    """Setting 2 against 1 against 0: the factors of both steps make the factor of the whole way, their sum does not."""
    data = settings_of_one_boiler()
    steps = ledger(data, unit(NONE, compared_with=[0, 0, 1, 2])).comparison.fuel
    whole = ledger(data, unit(NONE)).comparison.fuel
    assert np.prod(1 + steps[:3]) == pytest.approx(1 + whole[2], rel=1e-12)
    assert np.prod(1 + steps) == pytest.approx(1 + whole[3], rel=1e-12)
    assert abs(steps[1] + steps[2] - whole[2]) > 0.001


def test_steps_in_sequence_add_up_in_heat_and_money() -> None:
    given: dict[str, Any] = {"operating_time": 5200 * HOUR, "price": 1.1e-8, "surface_share": 0.01}
    inputs = [3.2e6, *NONE[1:]]
    data = settings_of_one_boiler()
    steps = ledger(data, unit(inputs, compared_with=[0, 0, 1, 2], **given)).comparison
    whole = ledger(data, unit(inputs, **given)).comparison
    for name in ("heat", "cost", "carbon_dioxide"):
        assert getattr(steps, name).sum() == pytest.approx(getattr(whole, name)[3], rel=1e-9), name


def test_heat_money_and_carbon_dioxide_are_after_less_before() -> None:
    inputs, hours, price = [3.2e6, *NONE[1:]], 5200 * HOUR, 38 / 3.6e9
    found = ledger(settings_of_one_boiler(), unit(inputs, operating_time=hours, price=price))
    eta, factor = found.account["efficiency.gross"], found.account["emissions.co2_per_input.gross"]
    heat = 3.2e6 * hours * eta[0] / eta
    np.testing.assert_allclose(found.heat_input, 3.2e6 * eta[0] / eta, rtol=1e-12)
    np.testing.assert_allclose(found.comparison.heat, heat - heat[0], rtol=1e-9, atol=1.0)
    np.testing.assert_allclose(found.comparison.cost, price * (heat - heat[0]), rtol=1e-9, atol=1e-6)
    expected = factor * heat - factor[0] * heat[0]
    np.testing.assert_allclose(found.comparison.carbon_dioxide, expected, rtol=1e-9, atol=1e-3)


def test_another_fuel_is_priced_and_counted_with_its_own_price_and_carbon() -> None:
    """Gas against oil: both bases differ, and money may rise though heat falls."""
    fuels = stack_fuels([distillate_oil(), pipeline_gas()])
    data = state(fuels, o2=[0.05, 0.03], flue_temperature=[480.0, 420.0])
    price = array([9e-9, 1.3e-8])
    found = ledger(data, unit([2e6, np.nan], operating_time=4000 * HOUR, price=price))
    eta, factor = found.account["efficiency.gross"], found.account["emissions.co2_per_input.gross"]
    before = 2e6 * 4000 * HOUR
    after = before * eta[0] / eta[1]
    assert found.comparison.cost[1] == pytest.approx(after * price[1] - before * price[0], rel=1e-12)
    assert found.comparison.carbon_dioxide[1] == pytest.approx(after * factor[1] - before * factor[0], rel=1e-12)
    net = found.account["efficiency.net"]
    assert found.comparison.fuel_gross[1] == pytest.approx(eta[0] / eta[1] - 1, rel=1e-12)
    assert found.comparison.fuel_net[1] == pytest.approx(net[0] / net[1] - 1, rel=1e-12)
    assert abs(found.comparison.fuel_net[1] - found.comparison.fuel_gross[1]) > 0.01


def test_one_fuel_saves_the_same_share_on_both_bases() -> None:
    found = ledger(settings_of_one_boiler(basis="net"), unit(NONE, surface_share=0.01)).comparison
    np.testing.assert_allclose(found.fuel_gross, found.fuel_net, rtol=1e-11, atol=1e-14)
    assert np.array_equal(found.fuel, found.fuel_net)


def test_low_and_high_fire_are_each_compared_at_their_own_load() -> None:
    """Settings 0, 1 at full load, 2, 3 at a third of it: setting 3 saves of the heat that setting 2 takes."""
    unit_input = unit([3e6, np.nan, 1e6, 1e6], compared_with=[0, 0, 2, 2], operating_time=1000 * HOUR)
    found = ledger(settings_of_one_boiler(), unit_input)
    eta = found.account["efficiency.gross"]
    assert found.comparison.heat[3] == pytest.approx(1e6 * 1000 * HOUR * (eta[2] / eta[3] - 1), rel=1e-12)
    assert found.comparison.heat[1] == pytest.approx(3e6 * 1000 * HOUR * (eta[0] / eta[1] - 1), rel=1e-12)


def test_annual_fuel_leads_over_power_and_hours() -> None:
    found = ledger(settings_of_one_boiler(), unit([3.2e6, *NONE[1:]], annual_heat=5e13, operating_time=5200 * HOUR))
    eta = found.account["efficiency.gross"]
    np.testing.assert_allclose(found.comparison.heat, 5e13 * (eta[0] / eta - 1), rtol=1e-9, atol=1.0)


def test_annual_fuel_is_the_baseline_s_and_not_that_of_a_setting_at_its_own_load() -> None:
    """Setting 3 is compared with setting 2, which takes 1 MW for 900 h, whatever the baseline takes in a year."""
    unit_input = unit(
        [3e6, np.nan, 1e6, np.nan], compared_with=[0, 0, 2, 2], annual_heat=5e13, operating_time=900 * HOUR
    )
    found = ledger(settings_of_one_boiler(), unit_input)
    eta = found.account["efficiency.gross"]
    assert found.comparison.heat[3] == pytest.approx(1e6 * 900 * HOUR * (eta[2] / eta[3] - 1), rel=1e-12)
    assert found.comparison.heat[1] == pytest.approx(5e13 * (eta[0] / eta[1] - 1), rel=1e-12)


def test_money_and_heat_are_unknown_where_nothing_was_given() -> None:
    found = ledger(settings_of_one_boiler(), unit(NONE)).comparison
    for name in ("heat", "cost", "carbon_dioxide"):
        values = getattr(found, name)
        assert values[0] == 0.0
        assert np.isnan(values[1:]).all(), name
    assert np.all(np.isfinite(found.fuel))


def test_named_outputs_and_what_the_comparison_needs() -> None:
    data = settings_of_one_boiler()
    full = ledger(data, unit(NONE, surface_share=0.01))
    some = ledger(data, unit(NONE, surface_share=0.01), ["dew_point.water", "efficiency.net"])
    assert {"dew_point.water", "efficiency.net", "efficiency.gross"} <= set(some.account) < set(full.account)
    for name in some.account:
        np.testing.assert_array_equal(some.account[name], full.account[name])
    np.testing.assert_array_equal(some.comparison.fuel, full.comparison.fuel)


def test_draws_behind_the_settings_give_what_each_draw_gives() -> None:
    """Shape (n, draws): a simulation is the same call; heat inputs and shares may be drawn too."""
    oxygen = array(OXYGEN).reshape(4, 1) + array([[0.0, 0.002, -0.001]])
    inputs = array([[3.2e6, 3.1e6, 3.3e6], [np.nan] * 3, [np.nan] * 3, [1.6e6, 1.5e6, 1.7e6]])
    share = array([0.010, 0.012, 0.008])
    common: dict[str, Any] = {"relative_humidity": 0.5}
    flue = array(FLUE)
    data = state(pipeline_gas(), o2=oxygen, flue_temperature=flue.reshape(4, 1), **common)
    times = {"operating_time": 5200 * HOUR, "price": 1e-8}
    together = ledger(data, UnitInput(0, [0, 0, 1, 3], inputs, surface_share=share, **times))
    assert together.account.shape == (4, 3)
    for draw in range(3):
        one = state(pipeline_gas(), o2=oxygen[:, draw], flue_temperature=flue, **common)
        alone = ledger(one, UnitInput(0, [0, 0, 1, 3], inputs[:, draw], surface_share=share[draw], **times))
        for name in alone.account:
            np.testing.assert_allclose(together.account[name][..., draw], alone.account[name], rtol=1e-12, err_msg=name)
        np.testing.assert_allclose(together.heat_input[:, draw], alone.heat_input, rtol=1e-12)
        for name in ("fuel", "heat", "cost", "carbon_dioxide"):
            found, expected = getattr(together.comparison, name)[:, draw], getattr(alone.comparison, name)
            np.testing.assert_allclose(found, expected, rtol=1e-9, err_msg=name)


@settings(deadline=None, derandomize=True, max_examples=100)
@given(st.lists(st.floats(0.3, 1.1), min_size=2, max_size=6), st.data())
def test_comparison_for_any_efficiencies(values: list[float], draws: st.DataObject) -> None:
    """Identities of `compare` alone: fuel = eta_other/eta - 1, heat = before x fuel, cost and CO2 follow the heat."""
    eta = array(values)
    count = len(values)
    other = draws.draw(st.lists(st.integers(0, count - 1), min_size=count, max_size=count))
    heat = array(draws.draw(st.lists(st.floats(1e9, 1e14), min_size=count, max_size=count)))
    price, carbon = np.full(count, 2e-8), np.full(count, 6e-8)
    found = compare(eta, eta, eta * 1.1, other, AnnualUse(heat, price, carbon))
    np.testing.assert_allclose(found.fuel, eta[other] / eta - 1, rtol=1e-12, atol=1e-15)
    np.testing.assert_allclose(found.fuel_gross, found.fuel_net, rtol=1e-12, atol=1e-12)
    np.testing.assert_allclose(found.heat, heat[other] * found.fuel, rtol=1e-12)
    np.testing.assert_allclose(found.cost, found.heat * 2e-8, rtol=1e-6, atol=1e-9 * heat.max() * 2e-8)
    np.testing.assert_allclose(found.carbon_dioxide, found.heat * 6e-8, rtol=1e-6, atol=1e-9 * heat.max() * 6e-8)


def test_coal_condensing_and_lean_settings_keep_the_same_surface_power_with_other_losses() -> None:
    """All at once on a coal boiler, on the net basis, with other losses and carbon in ash."""
    data = state(
        coal(),
        basis="net",
        o2=[0.06, 0.04, 0.08],
        unburned_carbon=[0.02, 0.03, 0.01],
        flue_temperature=[450.0, CELSIUS + 35, 500.0],
        other={"hot ash": 0.005},
    )
    found = ledger(data, unit([8e6, np.nan, 5e6], surface_heat=90e3))
    np.testing.assert_allclose(surface_power(found, "net"), 90e3, rtol=1e-12)
    share = replace(data, surface_share=array(90e3 / 8e6))
    first = heat_account(share)["efficiency.net"][0]
    assert found.account["efficiency.net"][0] == pytest.approx(first, rel=1e-12)
