"""The product gas: exactness of the closed forms, element balances, mixed readings, what cannot be."""

from typing import Any

import numpy as np
import pytest
from hypothesis import assume, given
from hypothesis import strategies as st

from fluegas.combustion.air import Air, dry_air_amounts
from fluegas.combustion.fuel import ELEMENTS, Fuel
from fluegas.combustion.gas_fuel import gas_fuel
from fluegas.combustion.product_gas import DRY_FLUE_GASES, FLUE_GASES, ProductGas
from fluegas.errors import RangeError
from fluegas.thermo.mixture import GasSet
from fluegas.thermo.species import species
from tests.combustion.drawn import air, airs, coal, fuels, readings, unburnt

METHANE = gas_fuel({"CH4": 1.0})
EXACT = 1e-12


def oxygen_share(gas: ProductGas) -> float:
    return float(gas.oxygen_left / gas.dry_flue_gas)


def air_ratio(gas: ProductGas) -> float:
    return 1 + float(gas.excess_air)


@given(fuels, airs(), st.floats(0.0, 0.9), unburnt)
def test_excess_air_from_oxygen_is_exact(fuel: Fuel, supply: Air, part: float, others: dict[str, float]) -> None:
    """Dry O2 to excess air and back, by the wet reading too; up to 0.9 of the oxidant's own share."""
    share = part * float(supply.oxygen)
    gas = ProductGas(fuel, supply, readings(o2=share, **others))
    assert oxygen_share(gas) == pytest.approx(share, abs=EXACT)
    again = ProductGas(fuel, supply, readings(excess_air=gas.excess_air, **others))
    assert oxygen_share(again) == pytest.approx(share, abs=EXACT)
    assert float(again.dry_air) == pytest.approx(float(gas.dry_air), rel=EXACT)
    wet_share = float(gas.oxygen_left / gas.wet_flue_gas)
    assume(wet_share >= 0)
    wet = ProductGas(fuel, supply, readings(o2_wet=wet_share, **others))
    assert air_ratio(wet) == pytest.approx(air_ratio(gas), rel=EXACT)
    assert float(wet.dry_flue_gas) == pytest.approx(float(gas.dry_flue_gas), rel=EXACT)


@given(fuels, airs(), st.floats(0.0, 2.0), unburnt)
def test_excess_air_from_carbon_dioxide_is_exact(
    fuel: Fuel, supply: Air, excess: float, others: dict[str, float]
) -> None:
    gas = ProductGas(fuel, supply, readings(excess_air=excess, **others))
    assert float(gas.excess_air) == pytest.approx(excess, abs=EXACT * (1 + excess))
    share = float(gas.amount("CO2") / gas.dry_flue_gas)
    assume(share > 0.02)
    by_dioxide = ProductGas(fuel, supply, readings(co2=share, **others))
    assert air_ratio(by_dioxide) == pytest.approx(1 + excess, rel=EXACT)


@given(fuels, airs(), st.floats(-0.2, 3.0), unburnt)
def test_every_element_is_balanced(fuel: Fuel, supply: Air, excess: float, others: dict[str, float]) -> None:
    """C, H, O, N, S, Cl, Ar, He of fuel, moisture and humid air are those of flue gas and carbon in ash."""
    gas = ProductGas(fuel, supply, readings(excess_air=excess, **others))
    brought = dry_air_amounts(gas.dry_air, supply.oxygen) | {"H2O": gas.water_from_air + fuel.moisture}
    left = {symbol: gas.amount(symbol) for symbol in FLUE_GASES}
    for element in ELEMENTS:
        into = float(fuel.element(element)) + sum(
            species(symbol).elements.get(element, 0) * float(amount) for symbol, amount in brought.items()
        )
        out = sum(species(symbol).elements.get(element, 0) * float(amount) for symbol, amount in left.items())
        if element == "C":
            out += float(fuel.element("C")) * others["unburned_carbon"]
        size = sum(species(symbol).elements.get(element, 0) * abs(float(amount)) for symbol, amount in left.items())
        assert out == pytest.approx(into, abs=EXACT * max(into, size)), element


@given(fuels, airs(), st.floats(0.0, 3.0), unburnt)
def test_the_amounts_add_up(fuel: Fuel, supply: Air, excess: float, others: dict[str, float]) -> None:
    gas = ProductGas(fuel, supply, readings(excess_air=excess, **others))
    total = sum(float(gas.amount(symbol)) for symbol in DRY_FLUE_GASES)
    assert total == pytest.approx(float(gas.dry_flue_gas), rel=EXACT)
    assert float(gas.wet_flue_gas) == pytest.approx(total + float(gas.amount("H2O")), rel=EXACT)
    for symbol, name in (("CO", "co"), ("H2", "h2"), ("CH4", "ch4"), ("NO", "no")):
        assert float(gas.amount(symbol) / gas.dry_flue_gas) == pytest.approx(others[name], rel=EXACT, abs=1e-300)


def test_methane_by_hand() -> None:
    """CH4 + 2 O2 -> CO2 + 2 H2O with 10 % excess air, for each mole of methane; air of 0.2095 O2, 0.0004 CO2."""
    gas = ProductGas(METHANE, air(), readings(excess_air=0.1))
    moles = float(METHANE.element("C"))
    supplied = 2.2 / 0.2095
    assert float(gas.theoretical_oxygen) / moles == pytest.approx(2.0)
    assert float(gas.dry_air) / moles == pytest.approx(supplied)
    assert float(gas.amount("O2")) / moles == pytest.approx(0.2)
    assert float(gas.amount("CO2")) / moles == pytest.approx(1 + 0.0004 * supplied)
    assert float(gas.amount("N2")) / moles == pytest.approx(0.7808 * supplied)
    assert float(gas.water) / moles == pytest.approx(2.0)
    assert oxygen_share(gas) == pytest.approx(0.2 / (supplied - 2.2 + 0.2 + 1))


@pytest.mark.parametrize(("oxygen", "rule"), [(0.03, 1.1671), (0.06, 1.4)])
def test_the_short_rule_overstates(oxygen: float, rule: float) -> None:
    """21/(21 - O2), common practice, no source: for methane 1.5 % and 4 % above the exact air ratio."""
    assert rule == pytest.approx(21 / (21 - 100 * oxygen), abs=1e-3)
    exact = air_ratio(ProductGas(METHANE, air(), readings(o2=oxygen)))
    assert 1 < exact < rule
    assert exact == pytest.approx(rule, rel=0.05)


def test_nitric_oxide_and_carbon_monoxide_by_their_size() -> None:
    """At 3 % O2 on methane: 1000 ppm CO is 0.3 points less excess air, 150 ppm NO 0.04 points more."""
    plain = air_ratio(ProductGas(METHANE, air(), readings(o2=0.03)))
    monoxide = air_ratio(ProductGas(METHANE, air(), readings(o2=0.03, co=1000e-6)))
    nitric = air_ratio(ProductGas(METHANE, air(), readings(o2=0.03, no=150e-6)))
    assert monoxide - plain == pytest.approx(-0.0029, abs=3e-4)
    assert nitric - plain == pytest.approx(0.0004, abs=1e-4)


@pytest.mark.parametrize("shape", [(), (3,), (2, 3)])
def test_any_shape_gives_the_same_numbers(shape: tuple[int, ...]) -> None:
    o2 = np.linspace(0.01, 0.1, int(np.prod(shape, dtype=int))).reshape(shape)
    fields: dict[str, Any] = {"o2": o2, "co": o2 * 1e-3, "unburned_carbon": o2 / 10}
    supply = air(290 + 100 * o2, relative_humidity=0.5)
    together = ProductGas(coal(), supply, readings(**fields))
    for place in np.ndindex(shape):
        one: dict[str, Any] = {name: value[place] for name, value in fields.items()}
        single = ProductGas(coal(), air(290 + 100 * o2[place], relative_humidity=0.5), readings(**one))
        assert together.water.shape == shape
        for symbol in FLUE_GASES:
            found = np.broadcast_to(together.amount(symbol), shape)[place]
            assert float(found) == pytest.approx(float(single.amount(symbol)), rel=1e-13, abs=1e-15)


def test_states_may_differ_in_what_was_read_and_oxygen_leads() -> None:
    nan = np.nan
    fields = {
        "o2": np.array([0.03, nan, nan, nan, 0.05]),
        "o2_wet": np.array([nan, 0.03, nan, nan, 0.02]),
        "co2": np.array([nan, nan, 0.09, nan, 0.08]),
        "excess_air": np.array([nan, nan, nan, 0.4, 0.3]),
    }
    mixed = ProductGas(METHANE, air(), readings(**fields)).excess_air
    alone = [{"o2": 0.03}, {"o2_wet": 0.03}, {"co2": 0.09}, {"excess_air": 0.4}, {"o2": 0.05}]
    expected = [float(ProductGas(METHANE, air(), readings(**one)).excess_air) for one in alone]
    np.testing.assert_allclose(mixed, expected, rtol=1e-13)


def test_a_rich_gas_is_known_only_with_its_unburnt_gases() -> None:
    """Methane with 5 % too little air, its shift gases read; then the same with CO and H2 not read."""
    fields = {"excess_air": -0.05, "co": 0.014, "h2": 0.011}
    rich = ProductGas(METHANE, air(), readings(**fields, rich_gases_read=True))
    assert float(rich.oxygen_left) > 0
    assert not rich.is_unknown
    assert ProductGas(METHANE, air(), readings(**fields, rich_gases_read=False)).is_unknown
    assert ProductGas(METHANE, air(), readings(excess_air=-0.05, rich_gases_read=True)).is_unknown
    assert not ProductGas(METHANE, air(), readings(excess_air=0.0)).is_unknown


def test_unburnt_carbon_and_sulfur_leave_as_they_should() -> None:
    gas = ProductGas(coal(), air(), readings(excess_air=0.2, unburned_carbon=0.05))
    fuel = coal()
    assert float(gas.burned_carbon) == pytest.approx(0.95 * float(fuel.element("C")))
    assert float(gas.amount("SO2")) == pytest.approx(float(fuel.element("S")))
    assert float(gas.theoretical_oxygen) == pytest.approx(
        float(fuel.theoretical_oxygen) - 0.05 * float(fuel.element("C"))
    )


def test_the_dry_mixture_holds_the_dry_amounts() -> None:
    gas = ProductGas(coal(), air(), readings(o2=np.array([0.03, 0.08]), co=1e-4))
    t = np.array([400.0, 1300.0])
    heat = sum(
        amount * np.array([species_warming(symbol, 298.15, end) for end in t])
        for symbol, amount in gas.dry_amounts.items()
    )
    np.testing.assert_allclose(gas.dry_mixture.enthalpy(t), heat, rtol=1e-10)


def species_warming(symbol: str, start: float, end: float) -> float:
    return float(GasSet.of(symbol).mixture([1.0]).enthalpy_change(start, end))


HELD = "(the oxidant's oxygen share; such a gas holds no flue gas)"


@pytest.mark.parametrize(
    ("fields", "message"),
    [
        ({"o2": [0.03, 0.21]}, f"O2 in the dry flue gas is 0.21; it must be between 0 and 0.2095 {HELD}"),
        ({"o2": [0.03, 0.2095]}, f"O2 in the dry flue gas is 0.2095; it must be between 0 and 0.2095 {HELD}"),
        ({"o2": [0.03, -0.01]}, f"O2 in the dry flue gas is -0.01; it must be between 0 and 0.2095 {HELD}"),
        ({"o2_wet": [0.2, 0.22]}, f"O2 in the wet flue gas is 0.22; it must be between 0 and 0.2095 {HELD}"),
        (
            {"co2": [0.1, 0.0003]},
            "CO2 in the dry flue gas is 0.0003; it must be at least 0.0004 (the air itself has as much)",
        ),
        ({}, "number of readings that give the excess air is 0; it must be at least 1 (o2, co2 or excess_air)"),
    ],
)
def test_what_cannot_be_is_told(fields: dict[str, Any], message: str) -> None:
    with pytest.raises(RangeError) as caught:
        _ = ProductGas(METHANE, air(), readings(**fields)).excess_air
    assert str(caught.value) == message


def test_the_oxidants_own_share_is_the_limit() -> None:
    enriched = ProductGas(METHANE, air(oxygen=0.5), readings(o2=0.3))
    assert float(enriched.excess_air) > 0.5
    with pytest.raises(RangeError, match=r"^O2 in the dry flue gas is 0\.3; it must be between 0 and 0\.25"):
        _ = ProductGas(METHANE, air(oxygen=0.25), readings(o2=0.3)).excess_air


@pytest.mark.parametrize(
    ("name", "share", "message"),
    [
        ("co", -1e-6, "CO in the flue gas is -1e-06; it must be between 0 and 1 (a share of a whole)"),
        ("h2", 1.0, "H2 in the flue gas is 1; it must be between 0 and 1 (a share of a whole)"),
        ("unburned_carbon", 1.2, "share of carbon that does not burn is 1.2; it must be between 0 and 1"),
    ],
)
def test_a_share_that_cannot_be_is_told(name: str, share: float, message: str) -> None:
    shares = np.array([0.0, share])
    with pytest.raises(RangeError) as told:
        ProductGas(gas_fuel({"methane": 1}), air(), readings(o2=0.03, **{name: shares}))
    assert str(told.value).startswith(message)
