"""The fuel library: every entry is sound and says where it comes from; how a file's own entries lie over it."""

from typing import Any

import numpy as np
import pytest

from fluegas.accounting.account import heat_account
from fluegas.combustion.heating_value import estimated_gross_heating_value
from fluegas.combustion.solid_fuel import SOLID_ELEMENTS
from fluegas.errors import DataError, InputError
from fluegas.resources import data_text
from fluegas.scenario import library
from fluegas.scenario.fields import FIELDS_OF
from fluegas.scenario.fuel_sheet import composition, library_sheet, scenario_sheets
from fluegas.scenario.library import known_name, library_fuel, library_names, with_library
from fluegas.scenario.model import Table
from fluegas.scenario.reading import parse_scenario
from tests.accounting.states import state
from tests.scenario.documents import Document, document, problems_of, result_of, setting, text_of

WOOD: Document = {"library": "wood chips"}
DRY_WOOD: Document = {
    "state": "solid",
    "kind": "wood",
    "analysis_basis": "dry",
    "gross_heating_value": "20.3 MJ/kg",
    "biogenic_share": "100 %",
    "mass_percent": {
        "carbon": 50.4,
        "hydrogen": 6.2,
        "oxygen": 41.9,
        "nitrogen": 0.2,
        "sulfur": 0.02,
        "chlorine": 0.01,
        "ash": 1.27,
    },
}


def assert_same_account(one: Document, other: Document) -> None:
    first, second = (result_of(document(fuel, setting())).ledger.account for fuel in (one, other))
    for name, values in first.items():
        np.testing.assert_allclose(values, second[name], rtol=1e-12, err_msg=name)


def said(fuel: Document) -> list[tuple[str, str]]:
    return [(problem.key, problem.message) for problem in problems_of(text_of(document(fuel)))]


# The entries.


def test_the_library_is_large_enough_and_names_are_plain() -> None:
    assert len(library_names()) >= 28
    wanted = {"pipeline gas", "propane", "butane", "biogas", "landfill gas", "hydrogen", "ammonia", "light oil"}
    wanted |= {"heavy oil", "biodiesel", "anthracite", "lignite", "coke", "petroleum coke", "wood chips", "straw"}
    assert wanted <= set(library_names())
    for name in library_names():
        assert name == name.lower()
        assert known_name(name) == name


@pytest.mark.parametrize("name", library_names())
def test_every_fuel_is_sound(name: str) -> None:
    """Sums to 100 %, says where it comes from, gives no caution, and its account at 20 % excess air is one."""
    found = library_fuel(name)
    assert len(found.origin) > 10
    entry = found.entry
    assert entry.text("name")
    assert entry.text("kind") in FIELDS_OF["fuel"]["kind"].choices
    analysis = entry.table("mole_percent") or entry.table("mass_percent")
    assert analysis is not None
    is_gas = entry.text("state") == "gas"
    assert (entry.table("mole_percent") is not None) == is_gas
    counted = [key for key in analysis.entries if is_gas or key != "moisture"]
    assert sum(analysis.number(key) or 0.0 for key in counted) == pytest.approx(100.0, abs=1e-9)
    assert is_gas or entry.text("analysis_basis") == "dry"
    sheet = library_sheet(name)
    assert sheet.cautions == ()
    account = heat_account(state(sheet.fuel, excess_air=0.2, flue_temperature=470.0))
    assert 0.6 < float(account["efficiency.gross"]) < float(account["efficiency.net"]) < 1.0
    assert 900 < float(account["flame_temperature.complete"]) < 2700
    assert all(np.isfinite(float(account[f"losses.gross.{loss}"])) for loss in ("dry_gas", "fuel_water"))


@pytest.mark.parametrize("name", [name for name in library_names() if library_fuel(name).entry.text("state") != "gas"])
def test_heating_values_of_liquids_and_solids(name: str) -> None:
    """Within 3 % of Channiwala and Parikh (2002); coke and petroleum coke are near that, as their carbon is nearer to
    graphite (32.8 MJ/kg) than the 34.9 MJ/kg of the correlation."""
    entry = library_fuel(name).entry
    analysis = entry.table("mass_percent")
    assert analysis is not None
    parts = {symbol: (analysis.number(part) or 0.0) / 100 for part, symbol in SOLID_ELEMENTS.items()}
    estimate = estimated_gross_heating_value({**parts, "ash": (analysis.number("ash") or 0.0) / 100})
    assert entry.number("gross_heating_value") == pytest.approx(float(estimate), rel=0.03)


@pytest.mark.parametrize(
    ("name", "per_short_ton"),
    [
        ("anthracite", 25.09),
        ("bituminous coal", 24.93),
        ("sub-bituminous coal", 17.25),
        ("lignite", 14.21),
        ("coke", 24.80),
        ("petroleum coke", 30.00),
    ],
)
def test_heat_of_a_short_ton_in_40_cfr_98(name: str, per_short_ton: float) -> None:
    """Table C-1 (81 FR 89188, 2016), MMBtu per short ton. Within 2 %; green petroleum coke comes wet, the table's is
    near dry: 6 %."""
    gross = float(library_sheet(name).fuel.gross_heating_value) * 907.18474 / 1055.05585262e6
    assert gross == pytest.approx(per_short_ton, rel=0.06 if name == "petroleum coke" else 0.02)


@pytest.mark.parametrize(("percent", "kept"), [(10, 0.9), (20, 0.8), (30, 0.7)])
def test_gas_with_hydrogen_is_the_pipeline_gas_thinned(percent: int, kept: float) -> None:
    plain = library_fuel("pipeline gas").entry.table("mole_percent")
    mixed = library_fuel(f"pipeline gas with {percent} % hydrogen").entry.table("mole_percent")
    assert plain is not None
    assert mixed is not None
    assert mixed.number("hydrogen") == percent
    for gas in plain.entries:
        assert mixed.number(gas) == pytest.approx(kept * (plain.number(gas) or 0.0))


@pytest.mark.parametrize("name", ["wood-chips", "Wood Chips", "WOOD_CHIPS", "wood  chips", "wood, chips"])
def test_a_name_is_found_however_it_is_written(name: str) -> None:
    assert library_fuel(name).name == "wood chips"


def test_a_name_that_is_not_there() -> None:
    with pytest.raises(InputError, match="there is no library fuel 'propan'; did you mean 'propane'"):
        library_fuel("propan")
    with pytest.raises(InputError, match="fluegas fuels"):
        library_fuel("zzzzzz")


@pytest.mark.parametrize(
    ("find", "put"),
    [
        ('["propane"]', '["propane'),
        ("origin =", "source ="),
        ("methane = 100.0", "methane = -1"),
        ("methane = 100.0", 'methane = "100"'),
        ('gross_heating_value = "45.6 MJ/kg"', "gross_heating_value = 45.6"),
        ('state = "liquid"', 'condition = "liquid"'),
        ('kind = "natural gas"', 'kind = "gas"'),
        ("mass_percent]", "weight_percent]"),
    ],
)
def test_a_damaged_library_is_said_so(find: str, put: str, monkeypatch: pytest.MonkeyPatch) -> None:
    text = data_text("fuels.toml")
    assert find in text
    caches = [entry for entry in vars(library).values() if hasattr(entry, "cache_clear")]
    monkeypatch.setattr(library, "data_text", lambda name: text.replace(find, put))
    for cached in caches:
        cached.cache_clear()
    try:
        with pytest.raises(DataError, match=r"fuels\.toml is damaged"):
            [library_fuel(name) for name in library_names()]
    finally:
        for cached in caches:
            cached.cache_clear()


# In a scenario file.


@pytest.mark.parametrize("name", library_names())
def test_every_name_works_in_a_file(name: str) -> None:
    result = result_of(document({"library": name}))
    assert 0.5 < float(result.ledger.account["efficiency.gross"][0]) < 1
    (code,) = [caution for caution in result.cautions[0] if caution.code == "fuel_from_library"]
    assert code.source == library_fuel(name).origin
    assert result.case.columns[0].entry.text("name") == library_fuel(name).entry.text("name")


def test_the_library_is_what_it_says() -> None:
    """The same entries written out give the same account, moisture and all."""
    written = {**DRY_WOOD, "mass_percent": {**DRY_WOOD["mass_percent"], "moisture": 35.0}}
    assert_same_account(WOOD, written)


def test_moisture_alone_wets_the_same_dry_fuel() -> None:
    written = {**DRY_WOOD, "mass_percent": {**DRY_WOOD["mass_percent"], "moisture": 52.0}}
    wetted = {**WOOD, "mass_percent": {"moisture": 52.0}}
    assert_same_account(wetted, written)
    assert "fuel_from_library" in [caution.code for caution in result_of(document(wetted)).cautions[0]]


def test_the_file_leads_over_the_library() -> None:
    entry = Table({"library": "light oil", "name": "Tank 2", "biogenic_share": 0.07})
    merged = with_library(entry)
    assert merged.text("name") == "Tank 2"
    assert merged.number("biogenic_share") == 0.07
    assert merged.text("kind") == "distillate oil"
    assert with_library(Table({"name": "own"})) == Table({"name": "own"})


def test_a_heating_value_replaces_both_of_the_library() -> None:
    fuel = result_of(document({"library": "light oil", "net_heating_value": "42.9 MJ/kg"})).case.columns[0].fuel
    assert float(fuel.net_heating_value) == pytest.approx(42.9e6)


def test_an_analysis_of_ones_own_drops_basis_and_heating_value() -> None:
    """As fired, the default, and not dry as the library; the heating value is estimated anew; the kind stays."""
    own: Document = {"carbon": 30.0, "hydrogen": 3.6, "oxygen": 25.4, "ash": 1.0, "moisture": 40.0}
    column = result_of(document({**WOOD, "mass_percent": own})).case.columns[0]
    assert float(column.fuel.element("C")) * 12.011e-3 == pytest.approx(0.30, rel=1e-6)
    codes = [caution.code for caution in column.cautions]
    assert "heating_value_estimated" in codes
    assert "fuel_from_library" not in codes
    assert column.entry.text("kind") == "wood"
    assert column.biogenic_share == 1.0


def test_a_setting_may_take_a_library_fuel() -> None:
    """Then nothing of the file's fuel holds for it; another moisture goes with it."""
    base = {"library": "light oil", "temperature": "60 degC", "price": "80 EUR/MWh"}
    settings = [
        setting("Oil"),
        setting("Wood", fuel=WOOD),
        setting("Wet wood", fuel={**WOOD, "mass_percent": {"moisture": 55}}),
        setting("Dear oil", fuel={"price": "90 EUR/MWh"}),
    ]
    columns = result_of(document(base, *settings)).case.columns
    assert [column.entry.text("name") for column in columns] == [
        "Light heating oil",
        "Wood chips",
        "Wood chips",
        "Light heating oil",
    ]
    assert columns[0].fuel_temperature == pytest.approx(333.15)
    assert columns[1].fuel_temperature == pytest.approx(298.15)
    assert np.isnan(columns[1].price)
    assert columns[3].price == pytest.approx(90 / 3.6e9)
    assert float(columns[2].fuel.moisture) * 18.015e-3 == pytest.approx(0.55, rel=1e-4)


def test_a_setting_may_wet_the_library_fuel_of_the_file() -> None:
    base = {**WOOD, "mass_percent": {"moisture": 40}}
    columns = result_of(
        document(base, setting("A"), setting("B", fuel={"mass_percent": {"moisture": 20}}))
    ).case.columns
    water = [float(column.fuel.moisture) * 18.015e-3 for column in columns]
    assert water == pytest.approx([0.4, 0.2], rel=1e-4)


@pytest.mark.parametrize(
    ("fuel", "key", "message"),
    [
        ({"library": "propan"}, "fuel.library", "did you mean 'propane'?"),
        ({**WOOD, "mass_percent": {"sulfur": 0.3}}, "fuel.mass_percent", "sums to 0.3 %; an analysis beside a library"),
        ({**WOOD, "mass_percent": {"moisture": 30.0, "ash": 2.0}}, "fuel.mass_percent", "or moisture alone"),
        ({"library": "propane", "mole_percent": {"hydrogen": 20.0}}, "fuel.mole_percent", "give every part of it"),
        ({"library": "propane", "mass_percent": {"moisture": 3.0}}, "fuel.mass_percent", "propane is a gas"),
        ({**WOOD, "analysis_basis": "as fired"}, "fuel.analysis_basis", "keeps its own basis"),
        ({**WOOD, "state": "gas"}, "fuel.state", "wood chips is a solid"),
        ({**WOOD, "mole_percent": {"methane": 100.0}}, "fuel.mole_percent", "has its analysis in mass_percent"),
        ({**WOOD, "mass_percent": {"moisture": 100.0}}, "fuel.mass_percent.moisture", "must be below 100 percent"),
        ({**WOOD, "gross_heating_value": "20 MJ/Nm3"}, "fuel.gross_heating_value", "needs it per mass"),
    ],
)
def test_what_cannot_stand_beside_a_library_name(fuel: Document, key: str, message: str) -> None:
    ((where, what),) = said(fuel)
    assert where == key
    assert message in what


def test_problems_have_the_line_of_what_the_file_wrote() -> None:
    text = "\n".join(
        (
            "fluegas = 1",
            "[fuel]",
            'library = "wood chips"',
            "[fuel.mass_percent]",
            "carbon = 50",
            "[[setting]]",
            'name = "A"',
            'o2 = "5 %"',
            'flue_temperature = "200 degC"',
            'fuel = { library = "wood chps" }',
        )
    )
    assert [(problem.line, problem.key) for problem in problems_of(text)] == [
        (4, "fuel.mass_percent"),
        (10, "setting[1].fuel.library"),
    ]


# Co-firing.


def blend(*parts: Document, share_of: str = "heat", **whole: Any) -> Document:
    return {**whole, "part": [{"share_of": share_of, **part} for part in parts]}


COAL_AND_WOOD: tuple[Document, ...] = (
    {"library": "bituminous coal", "share": "80 %"},
    {"library": "wood chips", "share": "20 %", "mass_percent": {"moisture": 30.0}},
)


@pytest.mark.parametrize("basis", ["gross", "net"])
def test_shares_of_heat_are_on_the_basis_of_the_file(basis: str) -> None:
    plain = document(blend(*COAL_AND_WOOD), basis=basis)
    fuel = result_of(plain).case.columns[0].fuel
    coal, wood = (
        result_of(document(part)).case.columns[0].fuel
        for part in ({"library": "bituminous coal"}, {**WOOD, "mass_percent": {"moisture": 30.0}})
    )
    values = [float(getattr(each, f"{basis}_heating_value")) for each in (coal, wood)]
    mass = np.array([0.8 / values[0], 0.2 / values[1]])
    mass /= mass.sum()
    assert float(fuel.ash) == pytest.approx(mass @ [float(coal.ash), float(wood.ash)], rel=1e-12)
    heat = mass * values
    assert heat / heat.sum() == pytest.approx([0.8, 0.2])


def test_one_part_of_all_is_that_fuel() -> None:
    assert_same_account(blend({"library": "lignite", "share": "100 %"}), {"library": "lignite"})


def test_order_of_parts_does_not_matter() -> None:
    assert_same_account(blend(*COAL_AND_WOOD), blend(*reversed(COAL_AND_WOOD)))


def test_shares_of_mass_and_names() -> None:
    column = result_of(document(blend(*COAL_AND_WOOD, share_of="mass"))).case.columns[0]
    coal, wood = library_sheet("bituminous coal").fuel, library_sheet("wood chips").fuel
    dry = 0.70 / 0.65
    assert float(column.fuel.ash) == pytest.approx(0.8 * float(coal.ash) + 0.2 * dry * float(wood.ash), rel=1e-12)
    assert column.entry.text("name") == "Bituminous coal with Wood chips"
    named = document(blend(*COAL_AND_WOOD, name="Grate mixture"))
    assert result_of(named).case.columns[0].entry.text("name") == "Grate mixture"


def test_price_by_heat_carbon_by_carbon_and_sulfur_by_sulfur() -> None:
    parts = [
        {**COAL_AND_WOOD[0], "price": "10 EUR/MWh", "so3_share": "1 %"},
        {**COAL_AND_WOOD[1], "price": "30 EUR/MWh", "so3_share": "3 %"},
    ]
    column = result_of(document(blend(*parts))).case.columns[0]
    assert column.price * 3.6e9 == pytest.approx(0.8 * 10 + 0.2 * 30)
    assert column.currency == "EUR"
    carbon = [0.8 * 74.4 / 30.8, 0.2 * 50.4 / 20.3]  # of the dry analyses and heating values: moisture takes no part
    assert column.biogenic_share == pytest.approx(carbon[1] / sum(carbon), rel=1e-6)
    sulfur = [0.8 * 1.2 / 30.8, 0.2 * 0.02 / 20.3]
    assert column.sulfur_trioxide_share == pytest.approx((sulfur[0] * 0.01 + sulfur[1] * 0.03) / sum(sulfur), rel=1e-6)


def test_what_is_stated_for_the_blend_leads() -> None:
    own = {"price": "7 EUR/MWh", "biogenic_share": "11 %", "so3_share": "4 %", "temperature": "40 degC"}
    parts = [{**part, "price": "30 EUR/MWh"} for part in COAL_AND_WOOD]
    column = result_of(document(blend(*parts, **own))).case.columns[0]
    found = (column.price * 3.6e9, column.biogenic_share, column.sulfur_trioxide_share, column.fuel_temperature)
    assert found == pytest.approx((7.0, 0.11, 0.04, 313.15))


def test_a_part_without_price_leaves_the_blend_without() -> None:
    parts = [{**COAL_AND_WOOD[0], "price": "10 EUR/MWh"}, COAL_AND_WOOD[1]]
    column = result_of(document(blend(*parts))).case.columns[0]
    assert np.isnan(column.price)
    assert "blend_price_incomplete" in [caution.code for caution in column.cautions]


def test_ash_streams_are_those_of_the_blend() -> None:
    streams = [{"name": "Grate", "ash_share": "100 %", "carbon": "10 %"}]
    plain = result_of(document(blend(*COAL_AND_WOOD)))
    streamed = result_of(document(blend(*COAL_AND_WOOD, ash_stream=streams)))
    fuel = plain.case.columns[0].fuel
    lost = 33.7e6 * float(fuel.ash) * 0.1 / 0.9 / float(fuel.gross_heating_value)
    assert float(streamed.ledger.account["losses.gross.unburned_carbon"][0]) == pytest.approx(lost, rel=1e-9)


def test_cautions_name_their_part() -> None:
    messages = [caution.message for caution in result_of(document(blend(*COAL_AND_WOOD))).cautions[0]]
    assert any(message.startswith("Wood chips: ") for message in messages)


def test_gas_blends_are_measured_by_volume_and_others_are_not() -> None:
    gases = blend(
        {"library": "pipeline gas", "share": "70 %"}, {"library": "coke-oven gas", "share": "30 %"}, share_of="heat"
    )
    assert not said(gases)
    whole = document(gases, plant={"fuel_rate": "300 Nm3/h"})
    assert not problems_of(text_of(whole))
    mixed = document(blend(*COAL_AND_WOOD), plant={"fuel_rate": "300 Nm3/h"})
    ((key, message),) = [(problem.key, problem.message) for problem in problems_of(text_of(mixed))]
    assert key == "plant.fuel_rate"
    assert "not a gas" in message


PART = {"library": "coke", "share": "100 %", "share_of": "mass"}


@pytest.mark.parametrize(
    ("fuel", "key", "message"),
    [
        (blend({"library": "coke", "share": "60 %"}), "fuel.part", "sum to 60 %, not 100 %"),
        ({"part": [{"library": "coke", "share_of": "heat"}]}, "fuel.part[1].share", "missing: every part"),
        ({"part": [{"library": "coke", "share": "100 %"}]}, "fuel.part[1].share_of", "of the heat or of the mass"),
        ({"part": [{**PART, "library": "coak"}]}, "fuel.part[1].library", "did you mean 'coke'?"),
        ({"part": [{**PART, "temperature": "20 degC"}]}, "fuel.part[1].temperature", "it belongs in [fuel]"),
        ({"part": [{"share": "100 %", "share_of": "mass"}]}, "fuel.part[1]", "no analysis"),
        ({"part": [PART], "library": "coke"}, "fuel.library", "give it in each part"),
        ({"part": [PART], "net_heating_value": "20 MJ/kg"}, "fuel.net_heating_value", "give it in each part"),
        ({"part": [PART], "price": "0.4 EUR/Nm3"}, "fuel.price", "per volume of gas"),
        ({"part": []}, "fuel.part", "is empty"),
        (
            {"part": [{**PART, "share": "50 %"}, {**PART, "share": "50 %", "share_of": "heat"}]},
            "fuel.part[2].share_of",
            "all parts need the same",
        ),
    ],
)
def test_blends_that_cannot_be(fuel: Document, key: str, message: str) -> None:
    ((where, what),) = said(fuel)
    assert where == key
    assert message in what


def test_a_blend_cannot_be_wetted_by_a_setting() -> None:
    whole = document(blend(*COAL_AND_WOOD), setting("A"), setting("B", fuel={"mass_percent": {"moisture": 20}}))
    ((key, message),) = [(problem.key, problem.message) for problem in problems_of(text_of(whole))]
    assert key == "setting[2].fuel.mass_percent"
    assert "is a blend" in message


def test_prices_in_two_currencies() -> None:
    parts = [{**COAL_AND_WOOD[0], "price": "10 EUR/MWh"}, {**COAL_AND_WOOD[1], "price": "30 CHF/MWh"}]
    assert "EUR and CHF" in said(blend(*parts))[0][1]


# Sheets.


def test_a_file_has_a_sheet_for_each_fuel_the_baseline_first() -> None:
    settings = [
        setting("A"),
        setting("B", fuel=WOOD),
        setting("C", baseline=True, fuel={"library": "propane"}),
        setting("D", fuel={"temperature": "50 degC"}),
    ]
    sheets = scenario_sheets(parse_scenario(text_of(document({"library": "light oil"}, *settings))))
    assert [(sheet.library, sheet.settings) for sheet in sheets] == [
        ("propane", ("C",)),
        ("light oil", ("A", "D")),
        ("wood chips", ("B",)),
    ]


def test_composition_is_that_of_the_analysis() -> None:
    assert composition(library_sheet("hydrogen").fuel) == {"mole": {"hydrogen": 1.0}}
    parts = composition(library_sheet("straw").fuel)["mass"]
    assert sum(parts.values()) == pytest.approx(1.0)
    assert parts["moisture"] == pytest.approx(0.15)
    assert parts["chlorine"] == pytest.approx(0.85 * 0.0035)


def test_a_gas_without_summation_factor_says_so() -> None:
    gas = {"state": "gas", "mole_percent": {"methane": 98.0, "acetylene": 2.0}}
    (sheet,) = scenario_sheets(parse_scenario(text_of(document(gas))))
    (caution,) = sheet.cautions
    assert caution.code == "compression_factor_missing"
    assert caution.message.startswith("acetylene has no summation factor")
    assert np.isnan(sheet.figures["real_gas.15 degC.density"])
    heavy = {"state": "gas", "mole_percent": {"n-hexane": 100.0}}
    (sheet,) = scenario_sheets(parse_scenario(text_of(document(heavy))))
    assert [caution.code for caution in sheet.cautions] == ["compression_factor_low"]
