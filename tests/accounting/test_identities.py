"""What must hold between the figures of an account, whatever the state."""

from collections.abc import Mapping

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from fluegas.accounting.account import heat_account
from fluegas.accounting.figures import LOSSES, figures
from fluegas.accounting.inputs import BASES, AccountInput
from fluegas.accounting.ledger import other_losses
from fluegas.accounting.terms import CREDITS
from fluegas.combustion.fuel import Fuel
from fluegas.combustion.solid_fuel import with_moisture
from fluegas.errors import InputError, RangeError
from fluegas.thermo.polynomials import FloatArray
from tests.accounting.states import array, coal, distillate_oil, lean_states, numbers, pipeline_gas, state

RANDOM = settings(deadline=None, derandomize=True, max_examples=150)
FUELS = {"gas": pipeline_gas(), "oil": distillate_oil(), "coal": coal()}


def assert_same(found: Mapping[str, FloatArray], expected: Mapping[str, FloatArray]) -> None:
    assert list(found) == list(expected)
    for name, values in expected.items():
        np.testing.assert_allclose(found[name], values, rtol=1e-12, atol=1e-14, err_msg=name)


@RANDOM
@given(lean_states(nitric_oxide=True))
def test_efficiency_is_one_less_losses_plus_credits(data: AccountInput) -> None:
    account = numbers(heat_account(data))
    for basis in BASES:
        losses = sum(account[f"losses.{basis}.{name}"] for name in LOSSES)
        credits = sum(account[f"credits.{basis}.{name}"] for name in CREDITS)
        assert account[f"efficiency.{basis}"] == pytest.approx(1 - losses + credits, abs=1e-11)


@RANDOM
@given(lean_states())
def test_net_is_gross_times_gross_over_net_value(data: AccountInput) -> None:
    account = numbers(heat_account(data))
    ratio = float(data.fuel.gross_heating_value / data.fuel.net_heating_value)
    names = ["efficiency", "losses|dry_gas", "losses|condensation", "losses|surface", "losses|other"]
    names += ["losses|unburned_carbon", "credits|air", "credits|fuel", "emissions.co2_per_input"]
    for name in names:
        group, _, last = name.partition("|")
        gross, net = (f"{group}.{basis}" + (f".{last}" if last else "") for basis in BASES)
        assert account[net] == pytest.approx(account[gross] * ratio, rel=1e-12, abs=1e-15), name


@RANDOM
@given(lean_states())
def test_efficiency_of_all_input_counts_the_credits_as_input(data: AccountInput) -> None:
    account = numbers(heat_account(data))
    for basis in BASES:
        credits = sum(account[f"credits.{basis}.{name}"] for name in CREDITS)
        expected = account[f"efficiency.{basis}"] / (1 + credits)
        assert account[f"efficiency_all_input.{basis}"] == pytest.approx(expected, rel=1e-11)


@RANDOM
@given(lean_states())
def test_stated_shares_stand_as_they_were_stated(data: AccountInput) -> None:
    """Surface and other losses on the file's basis are what was put in; names keep their shares on either basis."""
    account = numbers(heat_account(data))
    if data.surface_share is not None:
        assert account[f"losses.{data.basis}.surface"] == pytest.approx(float(data.surface_share), rel=1e-12)
    else:
        useful = account[f"efficiency.{data.basis}"]
        expected = useful * float(data.surface_per_useful)
        assert account[f"losses.{data.basis}.surface"] == pytest.approx(expected, rel=1e-10, abs=1e-14)
    for basis in BASES:
        named = other_losses(data, basis)
        assert list(named) == list(data.other)
        total = sum(float(share) for share in named.values())
        assert account[f"losses.{basis}.other"] == pytest.approx(total, rel=1e-12)


def test_moisture_of_air_alone_makes_its_loss() -> None:
    dry, humid = (numbers(heat_account(state(pipeline_gas(), relative_humidity=phi))) for phi in (0.0, 0.9))
    for basis in BASES:
        name = f"losses.{basis}.air_moisture"
        assert dry[name] == 0.0
        assert 0.0005 < humid[name] < 0.01


# Shapes.

MANY = {
    "flue_temperature": [310.0, 330.0, 400.0, 500.0, 700.0, 1000.0, 1400.0],
    "o2": [0.01, 0.02, 0.04, 0.06, 0.08, 0.10, 0.15],
    "co": [0.0, 5e-5, 1e-4, 0.0, 1e-3, 2e-4, 0.0],
    "surface_share": [0.01, np.nan, 0.02, np.nan, 0.0, 0.01, 0.01],
    "burner_temperature": [np.nan, 400.0, np.nan, 500.0, 450.0, np.nan, 350.0],
    "chamber_temperature": [1300.0, np.nan, 1200.0, np.nan, np.nan, 1500.0, 1600.0],
    "condensate": [np.nan, 0.1, np.nan, np.nan, np.nan, np.nan, np.nan],
}
COMMON = {
    "surface_per_useful": 0.02,
    "relative_humidity": 0.6,
    "preheated_outside": np.array([True, True, False, False, True, False, True]),
    "other": {"blowdown": 0.01},
}


def seven(fuel: Fuel, place: int | None = None) -> AccountInput:
    if place is None:
        return state(fuel, **MANY, **COMMON)
    each = {name: values[place] for name, values in MANY.items()}
    return state(fuel, **each, **(COMMON | {"preheated_outside": COMMON["preheated_outside"][place]}))  # type: ignore[index]


@pytest.mark.parametrize("name", FUELS)
def test_seven_states_at_once_give_what_each_gives_alone(name: str) -> None:
    together = heat_account(seven(FUELS[name]))
    assert together.shape == (7,)
    alone = [heat_account(seven(FUELS[name], place)) for place in range(7)]
    assert all(account.shape == () for account in alone)
    assert_same(together, {name: np.array([account[name] for account in alone]) for name in together})


@pytest.mark.parametrize("name", FUELS)
def test_chunks_give_the_same_numbers(name: str) -> None:
    data = seven(FUELS[name])
    assert_same(heat_account(data, chunk=5), heat_account(data))
    assert_same(heat_account(data, chunk=1), heat_account(data))


@pytest.mark.parametrize("chunk", [1, 2, 5, 12, 100])
def test_a_grid_broadcasts_and_chunks(chunk: int) -> None:
    """Shape (3, 4) from a column and a row; with chunk=5 it is cut along the axis of four."""
    oxygen, temperature = array([0.02, 0.05, 0.08]), array([320.0, 400.0, 600.0, 1100.0])
    grid = state(pipeline_gas(), o2=oxygen.reshape(3, 1), flue_temperature=temperature, relative_humidity=0.5)
    account = heat_account(grid, chunk=chunk)
    assert account.shape == (3, 4)
    rows = [
        heat_account(state(pipeline_gas(), o2=x, flue_temperature=temperature, relative_humidity=0.5)) for x in oxygen
    ]
    assert_same(account, {name: np.stack([row[name] for row in rows]) for name in account})


def test_a_figure_that_is_constant_in_one_chunk_only_is_right_in_all() -> None:
    """CO is there in the middle chunk alone; condensation in the first alone; unknown states in the last alone."""
    co = [0.0] * 5 + [1e-3] * 5 + [0.0] * 5
    temperature = [310.0] * 5 + [450.0] * 10
    excess = [0.2] * 10 + [-0.1] * 5
    data = state(pipeline_gas(), co=co, flue_temperature=temperature, excess_air=excess)
    assert_same(heat_account(data, chunk=5), heat_account(data))
    alone = [
        heat_account(state(pipeline_gas(), co=c, flue_temperature=t, excess_air=e))
        for c, t, e in zip(co, temperature, excess, strict=True)
    ]
    for chunk in (5, 100):
        assert_same(heat_account(data, chunk=chunk), {name: np.array([a[name] for a in alone]) for name in figures()})


def test_named_outputs_equal_those_of_the_full_account() -> None:
    data = seven(coal())
    full = heat_account(data)
    for name in full:
        assert_same(heat_account(data, [name]), {name: full[name]})
    order = ["efficiency.net", "excess_air", "losses.gross.dry_gas"]
    assert list(heat_account(data, order)) == order


def test_an_unknown_output_is_named_with_those_that_are() -> None:
    with pytest.raises(InputError, match=r"efficiency\.grass.*efficiency\.gross"):
        heat_account(state(pipeline_gas()), ["efficiency.grass"])


# Readings that give the air supply.


@pytest.mark.parametrize("name", FUELS)
def test_mixed_supply_readings_give_what_each_gives_alone(name: str) -> None:
    """Four states of one and the same gas, each known by another reading; NaN marks what was not read."""
    common = {"co": 1e-3, "h2": 7e-4, "ch4": 5e-4, "no": 3e-4, "relative_humidity": 0.7, "flue_temperature": 420.0}
    first = numbers(heat_account(state(FUELS[name], o2=0.055, **common)))
    readings = {
        "o2": 0.055,
        "o2_wet": first["flue_gas.wet.O2"],
        "co2": first["flue_gas.dry.CO2"],
        "excess_air": first["excess_air"],
    }
    marked = {
        key: [value if place == index else np.nan for index in range(4)]
        for place, (key, value) in enumerate(readings.items())
    }
    mixed = heat_account(state(FUELS[name], **marked, **common))
    for index, (key, value) in enumerate(readings.items()):
        alone = heat_account(state(FUELS[name], **{key: value}, **common))
        for figure in alone:
            np.testing.assert_allclose(mixed[figure][index], alone[figure], rtol=1e-12, atol=1e-14, err_msg=figure)
            np.testing.assert_allclose(alone[figure], first[figure], rtol=1e-9, atol=1e-12, err_msg=f"{key}: {figure}")


def test_oxygen_leads_where_carbon_dioxide_was_read_too() -> None:
    both = heat_account(state(pipeline_gas(), o2=0.05, co2=0.05))
    assert_same(both, heat_account(state(pipeline_gas(), o2=0.05)))


@pytest.mark.parametrize(
    ("given", "what"),
    [
        ({"o2": 0.2095}, "O2 in the dry flue gas is 0.2095"),
        ({"o2": [0.03, -0.01]}, "O2 in the dry flue gas is -0.01"),
        ({"o2_wet": 0.21}, "O2 in the wet flue gas"),
        ({"co2": 0.0003}, "CO2 in the dry flue gas is 0.0003"),
        ({"flue_temperature": 7000.0}, "7000"),
        ({"condensate": 9.0}, "condensate"),
    ],
)
def test_impossible_readings_are_named(given: dict[str, object], what: str) -> None:
    with pytest.raises(RangeError, match=what):
        heat_account(state(pipeline_gas(), **given))


# Monotony, above the dew point and for a flue gas warmer than air and reference.


@settings(deadline=None, derandomize=True, max_examples=60)
@given(
    st.sampled_from(sorted(FUELS)),
    st.floats(0.0, 1.5),
    st.floats(345.0, 1200.0),
    st.floats(260.0, 320.0),
    st.floats(0.0, 1.0),
)
def test_efficiency_falls_with_excess_air_and_flue_temperature(
    name: str, excess: float, temperature: float, air: float, humidity: float
) -> None:
    """From 72 degC up every flue gas of these fuels with air at the sea is above its dew point."""
    data = state(
        FUELS[name],
        excess_air=[excess, excess + 0.01, excess],
        flue_temperature=[temperature, temperature, temperature + 1.0],
        air_temperature=air,
        relative_humidity=humidity,
    )
    account = heat_account(data)
    assert np.all(account["losses.gross.condensation"] == 0)
    for basis in BASES:
        base, more_air, hotter = account[f"efficiency.{basis}"]
        assert more_air < base
        assert hotter < base


def test_cooling_below_the_dew_point_gains_faster() -> None:
    temperatures = array([340.0, 339.0, 315.0, 314.0])
    eta = heat_account(state(pipeline_gas(), flue_temperature=temperatures))["efficiency.gross"]
    assert eta[3] - eta[2] > 5 * (eta[1] - eta[0]) > 0


# Fuel.


@pytest.mark.parametrize("name", ["oil", "coal"])
def test_another_moisture_keeps_the_dry_fuel(name: str) -> None:
    """Per dry kilogram the gross value, the dry gas and its heat stay; only the water moves.

    Each kilogram of it takes 2.73 MJ from liquid at 25 degC to dilute steam at 450 K (steam tables, from memory:
    2.442 to evaporate, 1.89 kJ/(kg K) to warm); +-0.5 % for the rounding.
    """
    accounts = []
    for moisture in (0.02, 0.30):
        fuel = with_moisture(FUELS[name], moisture)
        account = numbers(heat_account(state(fuel, o2=0.05, flue_temperature=450.0)))
        gross = float(fuel.gross_heating_value) / (1 - moisture)
        accounts.append((account, gross))
    (first, gross_first), (second, gross_second) = accounts
    assert gross_first == pytest.approx(gross_second, rel=1e-12)
    for figure in ("excess_air", "flue_gas.dry.CO2", "losses.gross.dry_gas"):
        assert first[figure] == pytest.approx(second[figure], rel=1e-12), figure
    assert first["air_per_fuel"] / 0.98 == pytest.approx(second["air_per_fuel"] / 0.70, rel=1e-12)
    more_water = 0.30 / 0.70 - 0.02 / 0.98
    rise = (second["losses.gross.fuel_water"] - first["losses.gross.fuel_water"]) * gross_first
    assert rise == pytest.approx(more_water * 2.73e6, rel=0.005)


@pytest.mark.parametrize("name", FUELS)
def test_available_heat_is_the_efficiency_at_the_chamber_temperature(name: str) -> None:
    """Without surface, other losses and condensation, gas that leaves at the chamber temperature leaves that much."""
    at_chamber = heat_account(
        state(
            FUELS[name],
            flue_temperature=500.0,
            chamber_temperature=1100.0,
            burner_temperature=600.0,
            co=1e-3,
            surface_share=0.02,
        )
    )
    leaving = heat_account(
        state(FUELS[name], flue_temperature=1100.0, burner_temperature=600.0, preheated_outside=True, co=1e-3)
    )
    for basis in BASES:
        assert at_chamber[f"available_heat.{basis}"] == pytest.approx(leaving[f"efficiency.{basis}"], rel=1e-12)


def test_stack_loss_from_air_is_the_loss_when_counted_from_the_air_temperature() -> None:
    """With T_ref = T_air, no CO and no condensing, it is all flue losses on the net basis."""
    data = state(pipeline_gas(288.15), air_temperature=288.15, flue_temperature=480.0, relative_humidity=0.8)
    account = numbers(heat_account(data))
    losses = sum(account[f"losses.net.{name}"] for name in ("dry_gas", "fuel_water", "air_moisture"))
    assert account["stack_loss_from_air.rigorous"] == pytest.approx(losses, rel=1e-12)


def test_the_flame_takes_what_the_available_heat_leaves_none_of() -> None:
    """Gas that leaves at the flame temperature leaves nothing: available heat there is zero (complete, no CO)."""
    for fuel in FUELS.values():
        flame = heat_account(state(fuel, burner_temperature=500.0))["flame_temperature.complete"]
        there = heat_account(state(fuel, burner_temperature=500.0, chamber_temperature=flame))
        assert abs(float(there["available_heat.net"])) < 1e-9
