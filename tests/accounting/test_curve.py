"""Curves: every point is the account of a setting that differs in the varied quantity alone."""

from dataclasses import fields, replace
from typing import Any

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from fluegas.accounting.account import heat_account
from fluegas.accounting.curve import VARIABLES, curves, own_values
from fluegas.accounting.figures import figures
from fluegas.accounting.inputs import AccountInput
from fluegas.accounting.ledger import UnitInput, ledger
from fluegas.combustion.fuel import stack_fuels
from fluegas.combustion.solid_fuel import with_moisture
from fluegas.errors import InputError, RangeError
from tests.accounting.states import array, coal, distillate_oil, pipeline_gas, state

EFFICIENCY = ("efficiency.gross", "efficiency.net")
FLUE = [504.0, 495.0, 330.0]
READINGS: dict[str, Any] = {"flue_temperature": FLUE, "co": [20e-6, 30e-6, 30e-6], "relative_humidity": 0.5}
OWN_INPUT = [3.2e6, np.nan, 1.4e6]


def on_gas(**given: Any) -> AccountInput:
    return state(pipeline_gas(), **{"o2": [0.064, 0.032, 0.030], **READINGS, **given})


def on_wet_fuels(**given: Any) -> AccountInput:
    return state(stack_fuels([coal(), distillate_oil(), coal()]), **{"o2": [0.07, 0.032, 0.06], **READINGS, **given})


def unit(share: float | None = 0.012, heat_input: list[float] = OWN_INPUT) -> UnitInput:
    return UnitInput(baseline=0, compared_with=[0] * 3, heat_input=array(heat_input), surface_share=share)


def doubled(data: AccountInput) -> AccountInput:
    """Return the three settings twice, the baseline first: the second three are there to be changed."""
    places = [0, 1, 2, 0, 1, 2]

    def twice(value: Any) -> Any:
        return value[..., places] if isinstance(value, np.ndarray) and value.shape[-1:] == (3,) else value

    def parts(part: Any) -> Any:
        return replace(part, **{entry.name: twice(getattr(part, entry.name)) for entry in fields(part) if entry.init})

    whole: AccountInput = parts(data)
    return replace(whole, fuel=parts(data.fuel), air=parts(data.air), readings=parts(data.readings))


def changed(data: AccountInput, variable: str, value: float) -> AccountInput:
    """Return the doubled settings, the second three with another value, entered as a user would."""
    new = np.array([False] * 3 + [True] * 3)
    readings, nothing = data.readings, np.full(6, np.nan)

    def where(old: Any, given: float = value) -> Any:
        return np.where(new, given, nothing if old is None else old)

    if variable == "o2":
        return replace(data, readings=replace(readings, o2=where(readings.o2)))
    if variable == "excess-air":
        supply = {"o2": where(readings.o2, np.nan), "excess_air": where(None)}
        return replace(data, readings=replace(readings, **supply))
    if variable == "flue-temperature":
        return replace(data, readings=replace(readings, flue_temperature=where(readings.flue_temperature)))
    if variable == "air-temperature":
        return replace(data, air=replace(data.air, temperature=where(data.air.temperature)))
    return replace(data, fuel=with_moisture(data.fuel, where(own_values(data, "fuel-moisture"))))


VALUES = {
    "o2": [0.02, 0.05, 0.11],
    "excess-air": [0.05, 0.4, 1.2],
    "flue-temperature": [310.0, 400.0, 900.0],
    "air-temperature": [270.0, 290.0, 310.0],
    "fuel-moisture": [0.0, 0.1, 0.4],
}


def test_every_quantity_is_tried_here() -> None:
    assert set(VALUES) == set(VARIABLES)


@pytest.mark.parametrize("variable", VARIABLES)
@pytest.mark.parametrize("share", [None, 0.012])
def test_points_are_the_account_of_further_settings(variable: str, share: float | None) -> None:
    """The ledger of a file with the changed copies beside the settings gives the same figures, all of them."""
    data, values = on_wet_fuels(), VALUES[variable]
    found = curves(data, unit(share), variable, array(values), list(figures()))
    for point, value in enumerate(values):
        both = changed(doubled(data), variable, value)
        own = array([*OWN_INPUT, np.nan, *OWN_INPUT[1:]])
        further = UnitInput(baseline=0, compared_with=[0] * 6, heat_input=own, surface_share=share)
        account = ledger(both, further).account
        for name in figures():
            np.testing.assert_allclose(
                found.figures[name][:, point], account[name][3:], rtol=1e-12, atol=1e-15, err_msg=f"{variable} {name}"
            )


@pytest.mark.parametrize("variable", VARIABLES)
def test_every_setting_lies_on_its_own_curve(variable: str) -> None:
    data = on_wet_fuels()
    for place in range(3):
        own = own_values(data, variable)
        found = curves(data, unit(), variable, own[place : place + 1], EFFICIENCY, [place])
        assert found.own[0] == own[place]
        for name in EFFICIENCY:
            np.testing.assert_allclose(found.figures[name][0, 0], found.own_figures[name][0], rtol=1e-13)


@given(
    oxygen=st.lists(st.floats(0.0, 0.19), min_size=1, max_size=5),
    reading=st.sampled_from(["o2", "o2_wet", "co2", "excess_air"]),
)
def test_a_curve_over_oxygen_is_one_over_the_matching_excess_air(oxygen: list[float], reading: str) -> None:
    """Whatever the settings gave for their air, it is replaced; the two ways of saying it agree."""
    given_supply = {"o2": None, reading: [0.06, 0.08, 0.05]}
    data = on_gas(**given_supply)
    names = (*EFFICIENCY, "excess_air", "losses.gross.dry_gas", "flame_temperature.complete")
    for place in range(3):
        by_oxygen = curves(data, unit(), "o2", array(oxygen), names, [place])
        excess = by_oxygen.figures["excess_air"][0]
        by_excess = curves(data, unit(), "excess-air", excess, names, [place])
        for name in names:
            np.testing.assert_allclose(by_excess.figures[name], by_oxygen.figures[name], rtol=1e-9, atol=1e-12)


def test_all_points_of_all_settings_are_one_batch() -> None:
    found = curves(on_gas(), unit(), "o2", np.linspace(0.01, 0.1, 40_001), ["efficiency.gross"])
    assert found.figures["efficiency.gross"].shape == (3, 40_001)
    some = curves(on_gas(), unit(), "o2", found.values[::10_000], ["efficiency.gross"])
    np.testing.assert_array_equal(some.figures["efficiency.gross"], found.figures["efficiency.gross"][:, ::10_000])


def test_a_figure_that_does_not_vary_still_has_every_point() -> None:
    found = curves(on_gas(), unit(), "o2", array([0.01, 0.02]), ["losses.gross.hydrogen"])
    np.testing.assert_array_equal(found.figures["losses.gross.hydrogen"], np.zeros((3, 2)))


def test_fuel_rich_points_are_gaps_unless_the_rich_gases_were_read() -> None:
    air = array([-0.1, -0.01, 0.0, 0.1])
    found = curves(on_gas(), unit(), "excess-air", air, ["efficiency.gross"])
    assert np.isnan(found.figures["efficiency.gross"]).tolist() == [[True, True, False, False]] * 3
    rich = on_gas(co=[0.03, 0.03, 0.03], h2=[0.02, 0.02, 0.02], rich_gases_read=True)
    assert np.all(np.isfinite(curves(rich, unit(), "excess-air", array([-0.09]), EFFICIENCY).figures[EFFICIENCY[0]]))


def test_the_surface_loses_the_same_heat_at_equal_useful_heat() -> None:
    """Surface over useful heat is the baseline's, at every point; with a heat input of its own the share is kept."""
    names = ["losses.gross.surface", "efficiency.gross"]
    found = curves(on_gas(), unit(), "o2", array([0.01, 0.05, 0.12]), names)
    ratio = found.figures[names[0]] / found.figures[names[1]]
    own = found.own_figures[names[0]][0] / found.own_figures[names[1]][0]
    np.testing.assert_allclose(ratio[:2], own, rtol=1e-12)
    np.testing.assert_allclose(found.figures[names[0]][2], 0.012 * 3.2 / 1.4, rtol=1e-12)


def test_moisture_keeps_the_dry_fuel() -> None:
    """Heating value of the curve's fuel: that of the dry fuel, diluted; its useful heat follows the account."""
    wet = replace(on_wet_fuels(), fuel=stack_fuels([with_moisture(coal(), 0.3)] * 3))
    found = curves(on_wet_fuels(), unit(None), "fuel-moisture", array([0.3]), EFFICIENCY, [0])
    expected = heat_account(wet, EFFICIENCY)
    for name in EFFICIENCY:
        np.testing.assert_allclose(found.figures[name][0, 0], expected[name][0], rtol=1e-12)


def test_what_cannot_be_is_said() -> None:
    with pytest.raises(InputError, match="moisture of a gas"):
        curves(on_gas(), unit(), "fuel-moisture", array([0.1]), EFFICIENCY)
    with pytest.raises(InputError, match="no quantity named pressure can be varied; there are o2, excess-air"):
        curves(on_gas(), unit(), "pressure", array([0.1]), EFFICIENCY)
    with pytest.raises(InputError, match=r"no figure named efficiency;"):
        curves(on_gas(), unit(), "o2", array([0.1]), ["efficiency"])
    with pytest.raises(RangeError, match=r"O2 in the dry flue gas is 0\.3"):
        curves(on_gas(), unit(), "o2", array([0.1, 0.3]), EFFICIENCY)
    with pytest.raises(InputError, match="moisture the fuel's net heating value is no longer above zero; stay below"):
        curves(on_wet_fuels(), unit(), "fuel-moisture", array([0.1, 0.98]), EFFICIENCY)
    with pytest.raises(InputError, match="moisture must be at least 0 and below 100 %"):
        curves(on_wet_fuels(), unit(), "fuel-moisture", array([1.0]), EFFICIENCY)


def test_a_gas_beside_solids_forbids_nothing_to_them() -> None:
    mixed = state(stack_fuels([coal(), pipeline_gas(), coal()]), **{"o2": [0.07, 0.032, 0.06], **READINGS})
    found = curves(mixed, unit(), "fuel-moisture", array([0.1]), EFFICIENCY, [0, 2])
    assert found.places == (0, 2)
    assert np.all(np.isfinite(found.figures[EFFICIENCY[0]]))
    with pytest.raises(InputError, match="moisture of a gas"):
        curves(mixed, unit(), "fuel-moisture", array([0.1]), EFFICIENCY, [1])
