"""Every caution: a case that raises it, a sound twin that does not, its value, limit and source."""

import re
from collections.abc import Sequence
from dataclasses import dataclass, field, replace
from pathlib import Path

import numpy as np
import pytest
from hypothesis import given, settings

import fluegas
from fluegas.accounting.account import heat_account
from fluegas.accounting.cautions import Limits, cautions_of
from fluegas.accounting.inputs import AccountInput, EmissionReadings
from fluegas.accounting.surface import estimated_surface_heat
from fluegas.combustion.gas_fuel import gas_fuel
from fluegas.combustion.solid_fuel import solid_fuel
from fluegas.errors import Caution
from tests.accounting.states import (
    CELSIUS,
    COAL,
    PIPELINE_GAS,
    coal,
    distillate_oil,
    lean_states,
    numbers,
    pipeline_gas,
    state,
)


def cautions(data: AccountInput, limits: Limits | None = None) -> dict[str, Caution]:
    found = cautions_of(data, numbers(heat_account(data)), limits or Limits())
    assert len({caution.code for caution in found}) == len(found)
    return {caution.code: caution for caution in found}


SOUND = state(pipeline_gas(), o2=0.04, co=3e-5, relative_humidity=0.5, surface_share=0.01)
SOUND_OIL = state(distillate_oil(), o2=0.04, flue_temperature=CELSIUS + 200)


@dataclass(frozen=True)
class Case:
    """A doubtful state, its sound twin, which differs in one thing, and what the caution says as numbers."""

    data: AccountInput
    twin: AccountInput
    value: float | None
    limit: float | None
    limits: Limits = field(default_factory=Limits)
    words: Sequence[str] = ()


def undiluted_gas(ppm: float) -> AccountInput:
    """A gas whose CO would be `ppm` in air-free gas: at 4.19 % O2 the air-free share is five quarters of the read."""
    return state(pipeline_gas(), o2=0.2 * 0.2095, co=0.8 * ppm * 1e-6)


RICH = {"o2": 0.0, "co": 0.02, "h2": 0.015}
COLD_METAL = Limits(metal_temperature=CELSIUS + 100)
WARM_METAL = Limits(metal_temperature=CELSIUS + 180)

CASES = {
    "fuel_rich": Case(
        state(pipeline_gas(), rich_gases_read=True, **RICH),
        SOUND,
        None,
        1.0,
        words=("CO is deadly", "Licensed persons only", "local codes", "never added to a fuel-rich hot chamber"),
    ),
    "fuel_rich_unread": Case(
        state(pipeline_gas(), excess_air=-0.05),
        state(pipeline_gas(), excess_air=0.0),
        0.95,
        1.0,
        words=("no account", "Licensed persons only", "local codes", "maker's instructions"),
    ),
    "no_account": Case(state(pipeline_gas(), excess_air=0.0, no=1e-4), state(pipeline_gas(), excess_air=0.0), 1.0, 1.0),
    "carbon_monoxide_flag": Case(undiluted_gas(150.0), undiluted_gas(90.0), 150e-6, 100e-6, words=("undiluted",)),
    "carbon_monoxide_act": Case(
        undiluted_gas(310.0), undiluted_gas(290.0), 310e-6, 300e-6, words=("licensed persons",)
    ),
    "carbon_monoxide_stop": Case(undiluted_gas(1100.0), undiluted_gas(900.0), 1100e-6, 1000e-6, words=("CO kills",)),
    "air_density_rich": Case(
        state(pipeline_gas(), excess_air=0.02, air_temperature=293.15, hottest_air=311.15),
        state(pipeline_gas(), excess_air=0.15, air_temperature=293.15, hottest_air=311.15),
        1.02 * 293.15 / 311.15,
        1.0,
        words=("hottest day", "dampers as they are", "fuel-rich", "Licensed persons only", "local codes"),
    ),
    "air_density_oxygen": Case(
        state(pipeline_gas(), excess_air=0.03, coldest_air=300.15),
        state(pipeline_gas(), excess_air=0.03, coldest_air=283.15),
        None,
        0.01,
        words=("coldest day", "1 %", "licensed person"),
    ),
    "nox_disagrees": Case(
        state(pipeline_gas(), no=90e-6, emissions=EmissionReadings(no2=5e-6, nox=60e-6)),
        state(pipeline_gas(), no=90e-6, emissions=EmissionReadings(no2=5e-6, nox=97e-6)),
        95e-6,
        60e-6,
        words=("95 ppm", "60 ppm"),
    ),
    "sulfur_dioxide_above_fuel": Case(
        state(pipeline_gas(), emissions=EmissionReadings(so2=25e-6)),
        state(pipeline_gas(), emissions=EmissionReadings(so2=3e-6)),
        25e-6,
        0.0,
        words=("25 ppm", "cannot be right"),
    ),
    "below_water_dew_point": Case(
        state(pipeline_gas(), flue_temperature=CELSIUS + 45),
        state(pipeline_gas(), flue_temperature=CELSIUS + 65),
        CELSIUS + 45,
        None,
        words=("only in units, drains and chimneys built for",),
    ),
    "condensate_above_dew_point": Case(
        replace(state(pipeline_gas(), flue_temperature=CELSIUS + 90), condensate=np.asarray(0.2)),
        replace(state(pipeline_gas(), flue_temperature=CELSIUS + 45), condensate=np.asarray(0.2)),
        CELSIUS + 90,
        None,
    ),
    "acid_dew_point_gas": Case(
        state(distillate_oil(), flue_temperature=CELSIUS + 100), SOUND_OIL, CELSIUS + 100, None, words=("+-5",)
    ),
    "ideal_gas": Case(
        state(pipeline_gas(), pressure=4e5, flue_temperature=440.0),
        state(pipeline_gas(), pressure=4e5, flue_temperature=460.0),
        4e5,
        3e5,
    ),
    "flue_colder_than_air": Case(
        state(pipeline_gas(), flue_temperature=CELSIUS + 60, air_temperature=CELSIUS + 65),
        state(pipeline_gas(), flue_temperature=CELSIUS + 60, air_temperature=CELSIUS + 55),
        CELSIUS + 60,
        CELSIUS + 65,
    ),
    "cold_data": Case(
        state(pipeline_gas(), air_temperature=215.0), state(pipeline_gas(), air_temperature=225.0), 215.0, 220.0
    ),
    "no_useful_heat": Case(
        state(pipeline_gas(), o2=0.19, flue_temperature=700.0),
        state(pipeline_gas(), o2=0.1, flue_temperature=700.0),
        None,
        0.0,
    ),
}
METAL = {"acid_dew_point_metal": Case(SOUND_OIL, SOUND_OIL, CELSIUS + 100, None, COLD_METAL)}


@pytest.mark.parametrize("code", CASES)
def test_a_caution_comes_with_its_case_and_not_with_its_twin(code: str) -> None:
    case = CASES[code]
    found = cautions(case.data, case.limits)
    assert code in found
    assert code not in cautions(case.twin, case.limits)
    caution = found[code]
    assert caution.value is not None
    assert caution.limit is not None
    assert caution.source
    if case.value is not None:
        assert caution.value == pytest.approx(case.value, rel=1e-9)
    if case.limit is not None:
        assert caution.limit == pytest.approx(case.limit, rel=1e-12)
    for word in case.words:
        assert word in caution.message


def test_a_sound_state_has_no_caution() -> None:
    assert cautions(SOUND) == {}
    assert cautions(SOUND_OIL) == {}
    assert cautions(state(coal(), o2=0.06, flue_temperature=CELSIUS + 180), WARM_METAL) == {}


def test_metal_is_judged_apart_from_the_gas() -> None:
    """The gas stands 80 K above the acid dew point, the metal does not: it is the metal that corrodes."""
    found = cautions(SOUND_OIL, COLD_METAL)
    assert list(found) == ["acid_dew_point_metal"]
    assert found["acid_dew_point_metal"].value == CELSIUS + 100
    dew_point = float(heat_account(SOUND_OIL)["dew_point.acid"])
    assert found["acid_dew_point_metal"].limit == pytest.approx(dew_point + 5.0)  # the correlations' spread
    assert "the coldest metal" in found["acid_dew_point_metal"].message
    assert cautions(SOUND_OIL, WARM_METAL) == {}


def test_acid_is_cautioned_within_five_kelvin_above_its_dew_point() -> None:
    dew_point = float(heat_account(SOUND_OIL)["dew_point.acid"])
    assert "acid_dew_point_gas" in cautions(state(distillate_oil(), flue_temperature=dew_point + 4.0))
    assert "acid_dew_point_gas" not in cautions(state(distillate_oil(), flue_temperature=dew_point + 6.0))


def test_only_the_worst_step_of_carbon_monoxide_is_named() -> None:
    for ppm, code in (
        (1500.0, "carbon_monoxide_stop"),
        (500.0, "carbon_monoxide_act"),
        (200.0, "carbon_monoxide_flag"),
    ):
        assert list(cautions(undiluted_gas(ppm))) == [code]


def test_limits_of_carbon_monoxide_are_those_of_the_site() -> None:
    own = Limits(carbon_monoxide_flag=20e-6, carbon_monoxide_source="site rule 7")
    found = cautions(SOUND, own)
    assert list(found) == ["carbon_monoxide_flag"]
    assert found["carbon_monoxide_flag"].limit == 20e-6
    assert found["carbon_monoxide_flag"].source == "site rule 7"


def test_carbon_monoxide_is_undiluted_with_the_oxidant_s_own_oxygen() -> None:
    """400 ppm at 10 % O2 are 400 x 0.30/(0.30 - 0.10) = 600 air-free with an oxidant of 30 % O2."""
    found = cautions(state(pipeline_gas(), oxygen=0.30, o2=0.10, co=400e-6))
    assert found["carbon_monoxide_act"].value == pytest.approx(600e-6, rel=1e-12)


@pytest.mark.parametrize(
    "given", [{"o2": 0.0, "co": 0.01}, {"excess_air": -0.1, "co": 0.01}, {"co2": 0.15, "co": 0.01}]
)
def test_carbon_monoxide_is_cautioned_though_no_account_can_be_given(given: dict[str, float]) -> None:
    """Fuel-rich with CO but no H2 read: the figures are null, the danger is not."""
    found = cautions(state(pipeline_gas(), **given))
    assert set(found) == {"fuel_rich_unread", "carbon_monoxide_stop"}
    assert found["carbon_monoxide_stop"].value == pytest.approx(0.01)


# No figure is null without a word.


@pytest.mark.parametrize(
    ("given", "code"),
    [
        ({"o2": np.nan}, "no_account"),
        ({"excess_air": 0.0, "no": 1e-4}, "no_account"),
        ({"o2": 0.10, "co": 0.12}, "no_account"),
        ({"o2": 0.0, "co": 0.30, "rich_gases_read": True}, "fuel_rich_unread"),
        ({"o2": 0.0, "co": 0.05, "h2": 0.45, "rich_gases_read": True}, "fuel_rich_unread"),
        ({"o2": 0.0, "co": 0.001}, "fuel_rich_unread"),
        ({"co2": 0.15}, "fuel_rich_unread"),
    ],
)
def test_an_account_that_cannot_be_given_says_so(given: dict[str, object], code: str) -> None:
    """More CO than the fuel has carbon, more H2 than it has hydrogen, oxygen below zero: null, never negative gas."""
    data = state(pipeline_gas(), **given)
    account = numbers(heat_account(data))
    assert np.isnan(account["efficiency.gross"])
    assert np.isnan(account["flue_gas.wet.H2O"])
    caution = cautions(data)[code]
    assert "no account can be given" in caution.message
    assert "nan" not in caution.message
    assert caution.value is None or not np.isnan(caution.value)


@settings(deadline=None, derandomize=True, max_examples=100)
@given(lean_states(nitric_oxide=True))
def test_no_gas_is_negative_and_every_null_is_explained(data: AccountInput) -> None:
    account = numbers(heat_account(data))
    codes = cautions(data)
    assert np.isnan(account["efficiency.gross"]) == bool({"no_account", "fuel_rich_unread"} & codes.keys())
    for name, value in account.items():
        assert not name.startswith("flue_gas.") or np.isnan(value) or value > -1e-9, name


# Cautions of the fuel and of the surface estimate travel with the rest.

FUEL_CASES = {
    "analysis_sum": (gas_fuel(PIPELINE_GAS | {"N2": 0.025}), gas_fuel(PIPELINE_GAS | {"N2": 0.018})),
    "heating_value_disagrees": (
        gas_fuel(PIPELINE_GAS, gross_heating_value=50e6),
        gas_fuel(PIPELINE_GAS, gross_heating_value=53.3e6),
    ),
    "heating_value_estimated": (solid_fuel(COAL), coal()),
}


@pytest.mark.parametrize("code", FUEL_CASES)
def test_cautions_of_the_fuel_travel_with_the_account(code: str) -> None:
    doubtful, sound = FUEL_CASES[code]
    found = cautions(state(doubtful, flue_temperature=CELSIUS + 200))
    assert code in found
    assert found[code].value is not None
    assert found[code].source
    assert code not in cautions(state(sound, flue_temperature=CELSIUS + 200))


@pytest.mark.parametrize(
    ("output", "kind", "form", "codes"),
    [
        (2e6, "natural gas", "gas", []),
        (0.9e6, "natural gas", "gas", ["surface_estimate_small"]),
        (2e6, "wood", "solid", ["surface_estimate_constant"]),
        (0.5e6, None, "solid", ["surface_estimate_constant", "surface_estimate_small"]),
        (2e6, None, "liquid", []),
    ],
)
def test_cautions_of_the_surface_estimate(output: float, kind: str | None, form: str, codes: list[str]) -> None:
    heat, found = estimated_surface_heat(output, kind, form)
    assert heat > 0
    assert [caution.code for caution in found] == codes
    for caution in found:
        assert caution.value is not None
        assert caution.source


# What cautions may and may not say.

INSTRUCTIONS = re.compile(
    r"\b(reduce|increase|lower|raise|open|close|adjust|trim|tune|set|turn|add|cut)\s+(the\s+)?"
    r"(air|excess|o2|oxygen|fuel|burner|damper|fan|flame|gas|firing)",
    re.IGNORECASE,
)


def every_caution() -> list[Caution]:
    found = [caution for case in CASES.values() for caution in cautions(case.data, case.limits).values()]
    found += [caution for case in METAL.values() for caution in cautions(case.data, case.limits).values()]
    found += [caution for doubtful, _ in FUEL_CASES.values() for caution in doubtful.cautions]
    return found + list(estimated_surface_heat(0.5e6, "wood", "solid")[1])


def test_no_message_instructs_to_adjust_a_burner() -> None:
    for sample in ("reduce the air", "increase O2", "Adjust the burner", "open the damper", "trim oxygen"):
        assert INSTRUCTIONS.search(sample)
    for caution in every_caution():
        assert not INSTRUCTIONS.search(caution.message), caution.message


def test_messages_are_whole_sentences_without_the_language_of_the_program() -> None:
    for caution in every_caution():
        assert len(caution.message) > 30
        assert not re.search(r"\bnan\b|None|\[|\{|e-\d", caution.message), caution.message
        assert re.fullmatch(r"[a-z0-9_]+", caution.code)


def test_every_code_in_the_sources_is_tested_here() -> None:
    """A caution that a floor up to the accounting can give is named in a case above."""
    root = Path(fluegas.__file__).parent
    written = "".join(
        path.read_text(encoding="utf-8")
        for floor in ("combustion", "accounting")
        for path in (root / floor).glob("*.py")
    )
    codes = set(re.findall(r'Caution\(\s*"([a-z_]+)"', written))
    codes |= set(re.findall(r'"((?:carbon_monoxide_(?:stop|act|flag))|acid_dew_point_\w+|fuel_rich\w*)"', written))
    assert {"fuel_rich", "fuel_rich_unread", "carbon_monoxide_act"} <= codes
    assert codes == {caution.code for caution in every_caution()}
