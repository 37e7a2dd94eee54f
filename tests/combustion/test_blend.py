"""Co-firing: a blend weighs its parts by mass, whatever their order, and its energy closes."""

from dataclasses import fields

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from fluegas.accounting.account import heat_account
from fluegas.combustion.blend import blend, heat_shares_of_mass, mass_shares_of_heat
from fluegas.combustion.fuel import Fuel, latent_heat
from fluegas.combustion.gas_fuel import gas_fuel
from fluegas.combustion.solid_fuel import solid_fuel
from fluegas.errors import InputError
from tests.accounting import absolute_enthalpy as absolute
from tests.accounting.states import coal, distillate_oil, pipeline_gas, state
from tests.combustion.drawn import fuels

NUMBERS = (
    "elements",
    "moisture",
    "ash",
    "gross_heating_value",
    "net_heating_value",
    "heat_capacity",
    "gases",
)


def assert_same(one: Fuel, other: Fuel, rel: float = 1e-13) -> None:
    assert {field.name for field in fields(Fuel)} == {*NUMBERS, "reference_temperature", "cautions"}
    for name in NUMBERS:
        np.testing.assert_allclose(getattr(one, name), getattr(other, name), rtol=rel, atol=1e-12, err_msg=name)
    assert one.reference_temperature == other.reference_temperature


@given(fuels, fuels)
def test_the_whole_of_one_part_is_that_part(one: Fuel, other: Fuel) -> None:
    assert_same(blend([one], [1.0]), one)
    assert_same(blend([one, other], [1.0, 0.0]), one)
    assert_same(blend([one, other], [0.0, 1.0]), other)


@given(fuels, fuels, st.floats(0.0, 1.0))
def test_order_does_not_matter(one: Fuel, other: Fuel, share: float) -> None:
    assert_same(blend([one, other], [share, 1 - share]), blend([other, one], [1 - share, share]))


@given(fuels, fuels, fuels, st.floats(0.0, 1.0), st.floats(0.0, 1.0))
def test_a_blend_of_a_blend_is_a_blend_of_all(first: Fuel, second: Fuel, third: Fuel, a: float, b: float) -> None:
    inner = blend([first, second], [a, 1 - a])
    assert_same(blend([inner, third], [b, 1 - b]), blend([first, second, third], [a * b, (1 - a) * b, 1 - b]), 1e-12)


@given(fuels, fuels, st.floats(0.0, 1.0))
def test_gross_less_net_is_the_latent_heat_of_its_water(one: Fuel, other: Fuel, share: float) -> None:
    whole = blend([one, other], [share, 1 - share])
    latent = float(latent_heat(whole.element("H"), whole.moisture, whole.reference_temperature))
    rounding = 1e-14 * float(whole.gross_heating_value)
    assert float(whole.gross_heating_value - whole.net_heating_value) == pytest.approx(latent, rel=1e-9, abs=rounding)


def test_gases_blended_by_mass_are_the_gas_of_both() -> None:
    """Two gases and the analysis of their mixture: 0.75 mol CH4 and 0.25 mol H2."""
    methane, hydrogen = gas_fuel({"CH4": 1.0}), gas_fuel({"H2": 1.0})
    mass = np.array([0.75 / float(methane.gases.sum()), 0.25 / float(hydrogen.gases.sum())])
    assert_same(blend([methane, hydrogen], mass / mass.sum()), gas_fuel({"CH4": 0.75, "H2": 0.25}), 1e-12)


def test_sensible_heat_follows() -> None:
    parts, shares = [coal(), pipeline_gas(), distillate_oil()], [0.5, 0.2, 0.3]
    apart = sum(share * float(part.sensible_heat(370.0)) for share, part in zip(shares, parts, strict=True))
    assert float(blend(parts, shares).sensible_heat(370.0)) == pytest.approx(apart, rel=1e-13)


@pytest.mark.parametrize("flue_temperature", [310.0, 450.0, 900.0])
@pytest.mark.parametrize("basis", ["gross", "net"])
def test_energy_closes(flue_temperature: float, basis: str, monkeypatch: pytest.MonkeyPatch) -> None:
    """Account of the blend against absolute enthalpies, those of the fuels summed one by one."""
    parts, shares = [coal(), pipeline_gas(), distillate_oil()], [0.5, 0.2, 0.3]
    own = {"flue_temperature": flue_temperature, "o2": 0.05, "co": 0.0004, "fuel_temperature": 320.0, "basis": basis}
    own |= {"relative_humidity": 0.7, "unburned_carbon": 0.01, "surface_share": 0.012}
    data = state(blend(parts, shares), **own)
    enthalpy = sum(
        share * absolute.fuel_enthalpy(state(part, **own)) for share, part in zip(shares, parts, strict=True)
    )
    monkeypatch.setattr(absolute, "fuel_enthalpy", lambda data: enthalpy)
    account = heat_account(data)
    useful = absolute.useful_heat(data, float(account["excess_air"]))
    assert float(account[f"efficiency.{basis}"]) == pytest.approx(
        useful / float(getattr(data.fuel, f"{basis}_heating_value")), abs=1e-9
    )


def test_shares_of_heat_and_mass_lead_back() -> None:
    values, heat = np.array([50e6, 10e6, 30e6]), np.array([0.2, 0.5, 0.3])
    mass = mass_shares_of_heat(values, heat)
    assert mass.sum() == pytest.approx(1.0)
    assert mass[1] / mass[0] == pytest.approx(0.5 / 0.2 * 5)
    np.testing.assert_allclose(heat_shares_of_mass(values, mass), heat, rtol=1e-14)


def test_shares_may_differ_by_state() -> None:
    """A column of shares for each state; each is the blend of its own shares."""
    parts = [coal(), pipeline_gas()]
    whole = blend(parts, np.array([[0.0, 0.4, 1.0], [1.0, 0.6, 0.0]]))
    assert whole.gross_heating_value.shape == (3,)
    assert whole.elements.shape == (8, 3)
    middle = blend(parts, [0.4, 0.6])
    np.testing.assert_allclose(whole.elements[:, 1], middle.elements, rtol=1e-14)
    np.testing.assert_allclose(whole.net_heating_value[2], coal().net_heating_value, rtol=1e-14)


def test_cautions_of_all_parts_come_along_once() -> None:
    estimated = solid_fuel({"carbon": 0.5, "hydrogen": 0.06, "oxygen": 0.44})
    codes = [caution.code for caution in blend([estimated, estimated, pipeline_gas()], [0.2, 0.3, 0.5]).cautions]
    assert codes == ["heating_value_estimated"]


@pytest.mark.parametrize(
    ("shares", "said"),
    [
        ([0.5], "a share for each"),
        ([0.5, 0.4], "sum to 0.9"),
        ([1.5, -0.5], "at least 0"),
        (1.0, "a share for each"),
        ([0.5, float("nan")], "at least 0"),
    ],
)
def test_shares_that_cannot_be(shares: object, said: str) -> None:
    with pytest.raises(InputError, match=said):
        blend([coal(), pipeline_gas()], np.asarray(shares))


def test_no_fuels_no_blend_and_one_reference_temperature() -> None:
    with pytest.raises(InputError, match="there are 0 fuels"):
        blend([], [])
    with pytest.raises(InputError, match="one reference temperature"):
        blend([coal(), pipeline_gas(288.15)], [0.5, 0.5])
    with pytest.raises(InputError, match="above zero"):
        mass_shares_of_heat([20e6, 0.0], [0.5, 0.5])
