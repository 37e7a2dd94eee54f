"""The scenario of the format's description: reads whole, works out, and comes to the figures stated for it."""

import numpy as np
import pytest

from fluegas.scenario.checking import unused_keys
from fluegas.scenario.reading import parse_scenario
from fluegas.scenario.result import Result, work_out
from tests.scenario.files import SAMPLE


@pytest.fixture(scope="module")
def sample() -> Result:
    return work_out(parse_scenario(SAMPLE, "sample.toml"))


def test_everything_written_is_read(sample: Result) -> None:
    scenario = sample.scenario
    assert scenario.source == SAMPLE
    assert scenario.name == "sample.toml"
    assert scenario.top.number("fluegas") == 1
    assert scenario.top.text("title") == "Dye house boiler 2, autumn audit"
    assert scenario.plant.number("heat_input") == pytest.approx(3.2e6)
    assert scenario.plant.number("operating_hours") == pytest.approx(5200 * 3600)
    assert scenario.plant.number("surface_loss") == pytest.approx(0.011)
    price = scenario.fuel.price("price")
    assert price is not None
    assert price.value == pytest.approx(38 / 3.6e9)
    assert price.currency == "EUR"
    analysis = scenario.fuel.table("mole_percent")
    assert analysis is not None
    assert dict(analysis.entries) == {
        "methane": 93.1,
        "ethane": 4.2,
        "propane": 0.8,
        "nitrogen": 1.2,
        "carbon dioxide": 0.7,
    }
    assert scenario.air.number("temperature") == pytest.approx(295.15)
    assert [setting.text("name") for setting in scenario.settings] == ["As found", "Trimmed", "Cooled"]
    measure = scenario.settings[0].measure("flue_temperature")
    assert measure is not None
    assert measure.value == pytest.approx(504.15)
    assert measure.text == "231 degC"
    assert scenario.baseline_index == 0


def test_lines_of_keys_and_tables_can_be_told(sample: Result) -> None:
    line_of = sample.scenario.line_of
    assert line_of(("title",)) == 2
    assert line_of(("plant",)) == 6
    assert line_of(("fuel", "mole_percent", "carbon dioxide")) == 22
    assert line_of(("setting", 1)) == 40
    assert line_of(("setting", 1, "co")) == 43
    assert line_of(("setting", 1, "missing")) == 40


@pytest.mark.parametrize(
    ("name", "expected"),
    [
        ("excess_air", (39.5, 16.2, 16.2)),
        ("flue_gas.dry.CO2", (8.3, 10.1, 10.1)),
        ("losses.gross.dry_gas", (8.65, 6.81, 4.22)),
        ("losses.gross.fuel_water", (11.31, 11.24, 10.67)),
        ("losses.gross.air_moisture", (0.15, 0.12, 0.08)),
        ("losses.gross.carbon_monoxide", (0.02, 0.02, 0.02)),
        ("losses.gross.surface", (1.10, 1.13, 1.17)),
        ("efficiency.gross", (78.60, 80.53, 83.69)),
    ],
)
def test_its_figures_are_those_stated(sample: Result, name: str, expected: tuple[float, ...]) -> None:
    """As the description of the program states them for this file, to the digits shown."""
    digits = 0.051 if name in ("excess_air", "flue_gas.dry.CO2") else 0.0101
    np.testing.assert_allclose(100 * sample.ledger.account[name], expected, rtol=0, atol=digits)


def test_dew_points_and_credits(sample: Result) -> None:
    account = sample.ledger.account
    np.testing.assert_allclose(account["dew_point.water"] - 273.15, (54.1, 57.4, 57.4), rtol=0, atol=0.051)
    credit = sum(account[f"credits.gross.{name}"] for name in ("air", "air_moisture", "fuel"))
    np.testing.assert_allclose(100 * credit, (-0.17, -0.15, -0.15), rtol=0, atol=0.0101)


def test_what_is_saved(sample: Result) -> None:
    comparison = sample.ledger.comparison
    np.testing.assert_allclose(100 * comparison.fuel, (0.0, -2.4, -6.1), rtol=0, atol=0.051)
    year = 3.2e6 * 5200 * 3600
    np.testing.assert_allclose(comparison.heat, year * comparison.fuel, rtol=1e-12)
    np.testing.assert_allclose(comparison.cost, comparison.heat * 38 / 3.6e9, rtol=1e-12)
    assert sample.case.currency == "EUR"


def test_it_has_no_cautions(sample: Result) -> None:
    assert sample.cautions == ((), (), ())


def test_the_accuracies_are_checked_and_said_to_be_without_effect(sample: Result) -> None:
    assert unused_keys(sample.scenario) == ("accuracy",)
