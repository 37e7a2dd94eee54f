"""The catalogue of figures: every one complete, named once, and what the account gives."""

import re

import numpy as np
import pytest

from fluegas import units
from fluegas.accounting.account import heat_account
from fluegas.accounting.figure import BESIDE, EMISSIONS, HEAT_ACCOUNT, LIMITS, MIXTURE
from fluegas.accounting.figures import CREDIT_LABELS, LOSSES, figures
from fluegas.accounting.inputs import BASES
from fluegas.accounting.terms import CREDITS, HEAT_LOSSES
from fluegas.combustion.product_gas import DRY_FLUE_GASES, FLUE_GASES
from tests.accounting.states import coal, pipeline_gas, state

FIGURES = figures()


@pytest.mark.parametrize("name", FIGURES)
def test_a_figure_is_declared_whole(name: str) -> None:
    figure = FIGURES[name]
    assert figure.name == name
    assert re.fullmatch(r"[a-z0-9_]+(\.[A-Za-z0-9_]+){0,3}", name)
    assert 0 < len(figure.label) <= 24
    assert figure.dimension == "ratio" or figure.dimension in units.dimensions()
    assert figure.group in (MIXTURE, HEAT_ACCOUNT, BESIDE, LIMITS, EMISSIONS)
    assert len(figure.help) > 15
    assert figure.help.endswith(".")
    assert figure.help[0].isupper()
    assert len(figure.source) > 8


def test_no_name_is_the_beginning_of_another() -> None:
    """Names nest in JSON: "a.b" and "a.b.c" cannot both be values."""
    for name in FIGURES:
        assert not any(other.startswith(f"{name}.") for other in FIGURES), name


def test_losses_and_credits_are_the_terms_of_the_account() -> None:
    assert (*HEAT_LOSSES, "surface", "other") == LOSSES
    assert tuple(CREDIT_LABELS) == CREDITS
    for basis in BASES:
        assert [n for n in FIGURES if n.startswith(f"losses.{basis}.")] == [f"losses.{basis}.{name}" for name in LOSSES]
        assert [n for n in FIGURES if n.startswith(f"credits.{basis}.")] == [f"credits.{basis}.{n}" for n in CREDITS]


def test_the_figures_of_the_json_output_are_there() -> None:
    """The names that scripts read, as the command's contract nests them."""
    expected = ["excess_air", "air_ratio", "air_per_fuel"]
    expected += [f"flue_gas.dry.{gas}" for gas in DRY_FLUE_GASES] + [f"flue_gas.wet.{gas}" for gas in FLUE_GASES]
    for basis in BASES:
        losses = "dry_gas fuel_water air_moisture condensation carbon_monoxide hydrogen methane unburned_carbon surface"
        expected += [f"losses.{basis}.{name}" for name in losses.split()]
        expected += [f"credits.{basis}.{name}" for name in ("air", "air_moisture", "fuel")]
        expected += [f"efficiency.{basis}", f"efficiency_all_input.{basis}", f"available_heat.{basis}"]
    expected += ["stack_loss_from_air.rigorous", "stack_loss_from_air.short_formula", "flame_temperature.complete"]
    expected += ["dew_point.water", "dew_point.acid"]
    assert not set(expected) - set(FIGURES)


def test_shares_of_the_flue_gas_sum_to_one() -> None:
    data = state(coal(), o2=0.06, co=1e-3, h2=2e-4, ch4=1e-4, no=2e-4, relative_humidity=0.5)
    account = heat_account(data)
    for basis, gases in (("dry", DRY_FLUE_GASES), ("wet", FLUE_GASES)):
        assert sum(float(account[f"flue_gas.{basis}.{gas}"]) for gas in gases) == pytest.approx(1.0, abs=1e-12)


def test_mass_is_conserved_in_air_and_flue_gas_per_fuel() -> None:
    """Fuel + dry air + its water = flue gas + ash + carbon in ash [kg/kg]; 1e-5 for rounded molar masses of fuel."""
    fuel = coal()
    account = heat_account(state(fuel, o2=0.06, co=1e-3, unburned_carbon=0.03))
    residue = float(fuel.ash) + 0.03 * float(fuel.element("C")) * 0.012011
    gain = float(account["flue_gas_per_fuel"]) - float(account["air_per_fuel"])
    assert gain == pytest.approx(1 - residue, abs=1e-5)


def test_results_are_read_only() -> None:
    for data in (state(pipeline_gas()), state(pipeline_gas(), o2=[0.02, 0.04])):
        account = heat_account(data)
        assert list(account) == list(FIGURES)
        assert len(account) == len(FIGURES)
        for values in account.values():
            with pytest.raises(ValueError, match="read-only"):
                values[...] = 0.0
        with pytest.raises(TypeError):
            account["efficiency.gross"] = np.zeros(())  # type: ignore[index]
        with pytest.raises(AttributeError):
            account.shape = (1,)  # type: ignore[misc]


def test_figures_that_do_not_exist_are_nan() -> None:
    account = heat_account(state(pipeline_gas()))
    missing = {name for name, value in account.items() if np.isnan(value)}
    not_read = ("emissions.co.", "emissions.no", "air_density.")
    assert {name for name in account if name.startswith(not_read)} <= missing
    missing -= {name for name in account if name.startswith(not_read)}
    none_given = {"available_heat.gross", "available_heat.net", "stack_loss_from_air.short_formula", "dew_point.acid"}
    assert missing == none_given


def test_figures_that_stand_though_fuel_rich() -> None:
    account = heat_account(state(pipeline_gas(), excess_air=[-0.1, 0.1]))
    for name, values in account.items():
        stands = FIGURES[name].when_rich
        assert stands or np.isnan(values[0]), name
        assert not stands or np.isfinite(values[0]), name
    standing = {name for name, figure in FIGURES.items() if figure.when_rich}
    assert {"excess_air", "air_ratio", "air_per_fuel"} <= standing
    assert not any(name.startswith(("losses", "efficiency", "flue_gas.", "flame")) for name in standing)


def test_a_rich_state_does_not_disturb_its_neighbours() -> None:
    together = heat_account(state(pipeline_gas(), excess_air=[-0.1, 0.1, -0.3, 0.4]))
    for place, excess in ((1, 0.1), (3, 0.4)):
        alone = heat_account(state(pipeline_gas(), excess_air=excess))
        for name in alone:
            np.testing.assert_allclose(together[name][place], alone[name], rtol=1e-13, err_msg=name)


def test_carbon_dioxide_per_input_of_coal_and_its_biogenic_share() -> None:
    """kg/J: carbon burned x 44.009/12.011 over the heating value; half of it biogenic leaves half."""
    fuel = coal()
    full = heat_account(state(fuel, o2=0.06, unburned_carbon=0.02))
    half = heat_account(state(fuel, o2=0.06, unburned_carbon=0.02, biogenic_share=0.5))
    expected = 0.66 * 0.98 * 44.009 / 12.011 / 27.4e6
    name = "emissions.co2_per_input.gross"
    assert float(full[name]) == pytest.approx(expected, rel=1e-4)
    assert float(half[name]) == pytest.approx(expected / 2, rel=1e-4)
    useful = float(full["emissions.co2_per_useful"]) * float(full["efficiency.gross"])
    assert useful == pytest.approx(float(full[name]), rel=1e-12)
