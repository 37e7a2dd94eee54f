"""The range of a curve that nobody asked for: round, and with the settings' own values inside."""

from pathlib import Path

import numpy as np
import pytest

from fluegas.accounting.curve import VARIABLES, curves, own_values
from fluegas.errors import InputError
from fluegas.report.curve_span import default_span, even_points
from fluegas.report.curve_table import rows_shown
from fluegas.report.numbers import unit_of
from fluegas.scenario.case import Case, case_of
from fluegas.scenario.reading import parse_scenario
from fluegas.units import from_si

SCENARIOS = Path(__file__).resolve().parents[2] / "scenarios"
EXTREME = """
fluegas = 1
[fuel.mole_percent]
methane = 100
[air]
temperature = "350 degC"
oxygen = "30 %"
[[setting]]
name = "much air"
o2 = "28 %"
flue_temperature = "1200 degC"
[[setting]]
name = "hardly any"
o2 = "0.2 %"
flue_temperature = "12 degC"
"""


def cases() -> dict[str, Case]:
    texts = {file.stem: file.read_text(encoding="utf-8") for file in sorted(SCENARIOS.glob("*.toml"))}
    return {name: case_of(parse_scenario(text)) for name, text in {**texts, "extreme": EXTREME}.items()}


@pytest.mark.parametrize("system", ["si", "us"])
@pytest.mark.parametrize("variable", VARIABLES)
@pytest.mark.parametrize("name", cases())
def test_the_range_holds_the_own_values_and_can_be_worked_out(name: str, variable: str, system: str) -> None:
    case = cases()[name]
    places = list(range(len(case.columns)))
    low, high = default_span(case.data, variable, places, system)
    assert low < high
    own = own_values(case.data, variable)
    assert np.all((own >= low - 1e-9) & (own <= high + 1e-9))
    is_gas = bool(np.any(case.data.fuel.gases))
    if variable == "fuel-moisture" and is_gas:
        with pytest.raises(InputError, match="moisture of a gas"):
            curves(case.data, case.unit, variable, even_points(low, high, 5), ["efficiency.gross"])
        return
    found = curves(case.data, case.unit, variable, even_points(low, high, 5), ["efficiency.gross"])
    assert np.mean(np.isfinite(found.figures["efficiency.gross"])) > 0.7


@pytest.mark.parametrize(("system", "step"), [("si", 50.0), ("us", 100.0)])
def test_ends_are_round_in_the_units_shown(system: str, step: float) -> None:
    case = cases()["laundry-boiler"]
    unit = unit_of("temperature", system)
    for end in default_span(case.data, "flue-temperature", [0, 1, 2], system):
        shown = from_si(end, "temperature", unit)
        assert shown / step == pytest.approx(round(shown / step), abs=1e-9)
    low, high = default_span(case.data, "o2", [0, 1, 2], system)
    assert (low, high) == pytest.approx((0.01, 0.11))
    low, high = default_span(case.data, "excess-air", [0, 1, 2], system)
    assert (low, high) == pytest.approx((0.0, 1.0))


@pytest.mark.parametrize("count", [2, 3, 11, 12, 50, 101, 201, 202, 9973])
def test_rows_of_a_table_are_few_even_and_have_both_ends(count: int) -> None:
    rows = rows_shown(count)
    assert rows[0] == 0
    assert rows[-1] == count - 1
    assert 2 <= len(rows) <= 11
    gaps = np.diff(rows)
    assert gaps.min() >= 1
    assert gaps.max() - gaps.min() <= 1
