"""The shape of an account's input, and how it is cut into chunks."""

from dataclasses import fields

import numpy as np
import pytest

from fluegas.accounting.account import heat_account
from fluegas.accounting.figures import figures
from fluegas.accounting.inputs import AccountInput, state_shape, take
from fluegas.combustion.flame import Recirculation
from fluegas.combustion.fuel import Fuel, stack_fuels
from fluegas.combustion.gas_fuel import gas_fuel
from tests.accounting.states import array, coal, distillate_oil, pipeline_gas, state


def mixed() -> AccountInput:
    """Shape (3, 4): fuels on the first axis, temperatures on the second, and everything else in some shape."""
    three = stack_fuels([pipeline_gas(), distillate_oil(), coal()])
    column = Fuel(
        elements=three.elements[:, :, None],
        moisture=three.moisture[:, None],
        ash=three.ash[:, None],
        gross_heating_value=three.gross_heating_value[:, None],
        net_heating_value=three.net_heating_value[:, None],
        heat_capacity=three.heat_capacity[:, None],
        gases=three.gases[:, :, None],
        reference_temperature=three.reference_temperature,
    )
    return state(
        column,
        flue_temperature=[340.0, 400.0, 600.0, 900.0],
        o2=[[0.03], [0.05], [0.07]],
        co=np.full((3, 4), 1e-4),
        surface_share=[[0.01], [np.nan], [0.02]],
        other={"blowdown": array([0.01, 0.0, 0.02, 0.01]), "ash": 0.001},
        recirculation=Recirculation(array(0.1), array([500.0, 450.0, 400.0, 350.0])),
    )


def test_the_species_axis_is_no_state() -> None:
    assert state_shape(state(pipeline_gas())) == ()
    assert state_shape(pipeline_gas()) == ()
    assert state_shape(stack_fuels([pipeline_gas(), coal()])) == (2,)
    assert state_shape(mixed()) == (3, 4)


def test_shapes_from_every_field_count() -> None:
    assert state_shape(state(pipeline_gas(), other={"one": array([0.1, 0.2])})) == (2,)
    assert state_shape(state(pipeline_gas(), condensate=np.zeros((5, 1)), o2=np.full(3, 0.1))) == (5, 3)
    assert state_shape(state(pipeline_gas(), recirculation=Recirculation(array([0.1, 0.2]), array(400.0)))) == (2,)


def test_shapes_that_do_not_broadcast_are_an_error() -> None:
    with pytest.raises(ValueError, match="broadcast"):
        state_shape(state(pipeline_gas(), o2=[0.1, 0.2], co=[0.0, 0.0, 0.0]))


@pytest.mark.parametrize("axis", [0, 1])
@pytest.mark.parametrize("where", [slice(0, 1), slice(1, 3), slice(0, 3)])
def test_a_cut_input_gives_the_cut_account(axis: int, where: slice) -> None:
    whole = heat_account(mixed())
    part = take(mixed(), 2, axis, where)
    index = (where, slice(None)) if axis == 0 else (slice(None), where)
    assert state_shape(part) == whole["excess_air"][index].shape
    account = heat_account(part)
    for name in figures():
        np.testing.assert_allclose(account[name], whole[name][index], rtol=1e-12, atol=1e-14, err_msg=name)


def test_axes_of_length_one_are_kept() -> None:
    part = take(mixed(), 2, 1, slice(2, 4))
    assert part.fuel.elements.shape == (8, 3, 1)
    assert part.readings.flue_temperature.tolist() == [600.0, 900.0]
    assert isinstance(part.readings.co, np.ndarray)
    assert part.readings.co.shape == (3, 2)
    assert part.readings.o2 is not None
    assert part.readings.o2.shape == (3, 1)
    assert isinstance(part.other["blowdown"], np.ndarray)
    assert part.other["blowdown"].tolist() == [0.02, 0.01]
    assert part.other["ash"] == 0.001
    assert part.recirculation is not None
    assert part.recirculation.temperature.tolist() == [400.0, 350.0]


def test_what_is_no_array_is_untouched() -> None:
    data = mixed()
    part = take(data, 2, 0, slice(0, 1))
    assert part.basis == data.basis
    assert part.acid_correlation == data.acid_correlation
    assert part.readings.chamber_temperature is None
    assert {entry.name for entry in fields(part)} == {entry.name for entry in fields(data)}


@pytest.mark.parametrize("shape", [(0,), (0, 4), (3, 0)])
def test_no_states_give_an_account_of_no_states(shape: tuple[int, ...]) -> None:
    """A log whose every row was set aside."""
    account = heat_account(state(pipeline_gas(), o2=np.zeros(shape), flue_temperature=np.full(shape, 400.0)))
    assert account.shape == shape
    assert account["efficiency.gross"].shape == shape


def test_a_flue_gas_of_water_alone_has_an_account() -> None:
    """Hydrogen with just its oxygen leaves no dry gas, so that its shares do not exist."""
    account = heat_account(state(gas_fuel({"H2": 1.0}), oxygen=1.0, excess_air=0.0, flue_temperature=450.0))
    assert account["flue_gas.wet.H2O"] == 1.0
    assert account["losses.gross.dry_gas"] == 0.0
    assert 0.8 < account["efficiency.gross"] < 0.85
    assert np.isnan(account["flue_gas.dry.O2"])
