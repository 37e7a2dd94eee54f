"""The line plot in text: sizes, frames, ticks, gaps and marks, for any numbers whatever."""

from math import inf, isfinite, nan

import pytest
from hypothesis import given
from hypothesis import strategies as st

from fluegas.report.braille import Series, exact_scale, plot, round_scale, round_step

ANY = st.floats() | st.sampled_from([nan, inf, -inf, 0.0, -0.0, 5e-324, 1e308, -1e308, 1.0, 1.0 + 2e-16])
USUAL = st.floats(-1e6, 1e6)
BRAILLE = {chr(code) for code in range(0x2801, 0x2900)}
FRAME = set("│┤└─┬0123456789.-+e ")


@st.composite
def any_series(draw: st.DrawFn, numbers: st.SearchStrategy[float] = ANY) -> Series:
    points = draw(st.lists(st.tuples(numbers, numbers), max_size=12))
    return Series(
        x=[x for x, _ in points],
        y=[y for _, y in points],
        letter=draw(st.sampled_from(["", "A", "B", "C"])),
        own_x=draw(numbers),
        own_y=draw(numbers),
    )


@given(
    series=st.lists(any_series() | any_series(USUAL), max_size=4),
    width=st.integers(0, 100),
    height=st.integers(0, 30),
    ascii_only=st.booleans(),
)
def test_any_numbers_in_any_size_fill_just_the_lines_asked_for(
    series: list[Series], width: int, height: int, ascii_only: bool
) -> None:
    lines = plot(series, width, height, x_title="x", y_title="y", ascii_only=ascii_only)
    assert len(lines) == height
    assert all(len(line) <= width for line in lines)
    text = "".join(lines)
    assert text.isprintable()
    if ascii_only:
        assert text.isascii()
    else:
        assert set(text) <= BRAILLE | FRAME | set("ABCxy")


def dots(lines: list[str]) -> int:
    return sum((ord(character) - 0x2800).bit_count() for line in lines for character in line if character in BRAILLE)


@pytest.mark.parametrize("size", [(1, 1), (1, 5), (7, 1), (9, 4), (80, 20)])
def test_a_line_is_seen_in_every_size(size: tuple[int, int]) -> None:
    lines = plot([Series([0.0, 1.0], [0.0, 1.0])], *size)
    assert dots(lines) > 0


@pytest.mark.parametrize("value", [0.0, 42.0, -1e-7, 1e12, 5e-324])
def test_a_constant_lies_in_the_middle(value: float) -> None:
    lines = plot([Series([1.0, 2.0, 3.0], [value] * 3)], 60, 15)
    drawn = [row for row, line in enumerate(lines) if BRAILLE & set(line)]
    assert len(drawn) == 1
    assert 3 <= drawn[0] <= 11


def test_one_point_alone_is_a_dot() -> None:
    assert dots(plot([Series([2.0], [3.0])], 40, 12)) == 1
    assert dots(plot([Series([1.0, 2.0, 3.0], [nan, 3.0, inf])], 40, 12)) == 1


def test_nothing_to_draw_leaves_an_empty_frame() -> None:
    for series in ([], [Series([], [])], [Series([1.0, 2.0], [nan, nan], "A", 1.0, nan)]):
        lines = plot(series, 40, 12)
        assert dots(lines) == 0
        assert "└" in lines[-3]


def test_nan_leaves_a_gap() -> None:
    x = [place / 50 for place in range(51)]
    whole = plot([Series(x, [1.0 + each for each in x])], 70, 16)
    gap = plot([Series(x, [nan if 0.4 < each < 0.6 else 1.0 + each for each in x])], 70, 16)
    seen = {column for line in gap for column, character in enumerate(line) if character in BRAILLE}
    missing = set(range(min(seen), max(seen) + 1)) - seen
    assert 10 <= len(missing) <= 15
    assert max(missing) - min(missing) + 1 == len(missing)
    every = {column for line in whole for column, character in enumerate(line) if character in BRAILLE}
    assert every == set(range(min(every), max(every) + 1))


def test_a_rising_line_rises_and_its_own_point_is_lettered() -> None:
    lines = plot([Series([0.0, 10.0], [0.0, 10.0], "A", 5.0, 5.0)], 61, 24, x_title="x", y_title="y")
    plotted = [line[line.index("│" if "│" in line else "┤") + 1 :] for line in lines[1:-3]]
    first = [min((c for c, mark in enumerate(line) if mark in BRAILLE | {"A"}), default=None) for line in plotted]
    starts = [start for start in first if start is not None]
    assert len(starts) == len(plotted)
    assert starts == sorted(starts, reverse=True)
    row = next(row for row, line in enumerate(plotted) if "A" in line)
    assert abs(row - len(plotted) / 2) <= 1
    assert abs(plotted[row].index("A") - 28) <= 1


def test_letters_at_one_place_stand_side_by_side() -> None:
    same = [Series([0.0, 1.0], [0.0, 1.0], letter, 0.5, 0.5) for letter in "ABC"]
    assert any("ABC" in line for line in plot(same, 50, 12))
    at_the_edge = [Series([0.0, 1.0], [0.0, 1.0], letter, 1.0, 1.0) for letter in "ABC"]
    assert any(line.endswith("CBA") for line in plot(at_the_edge, 50, 12))


def test_an_own_point_out_of_range_leaves_its_letter_at_the_end_of_the_line() -> None:
    lines = plot([Series([0.0, 1.0], [0.0, 1.0], "A", 7.0, 9.0)], 50, 12)
    assert lines[1].endswith("A")
    assert "9" not in "".join(lines)


def test_ticks_stand_where_their_values_are() -> None:
    """A dot at each tick of y and of x lies in the row and the column of that tick."""
    lines = plot([Series([0.0, 25.0, 50.0, 75.0, 100.0], [nan, 20.0, nan, 40.0, nan])], 72, 23, x_title="x")
    y_rows = {line.split("┤")[0].strip(): row for row, line in enumerate(lines) if "┤" in line}
    assert {"20", "40"} <= set(y_rows)
    assert BRAILLE & set(lines[y_rows["20"]])
    assert BRAILLE & set(lines[y_rows["40"]])
    axis, numbers = lines[-3], lines[-2]
    ticks = [column for column, mark in enumerate(axis) if mark == "┬"]
    assert len(ticks) == len(numbers.split())
    columns = [column for line in lines[:-3] for column, mark in enumerate(line) if mark in BRAILLE]
    assert columns
    for tick, text in zip(ticks, numbers.split(), strict=True):
        assert text in numbers[max(tick - 3, 0) : tick + 4]


@given(low=st.floats(-1e9, 1e9), span=st.floats(1e-3, 1e9), most=st.integers(2, 12))
def test_scales_hold_their_values_with_few_round_ticks(low: float, span: float, most: int) -> None:
    high = low + span
    if not high > low or span < 1e-8 * max(abs(low), abs(high)):
        return
    up, across = round_scale(low, high, most), exact_scale(low, high, most)
    slack = 1e-6 * span
    assert up.low <= low + slack
    assert up.high >= high - slack
    assert 2 <= len(up.ticks) <= most + 2
    assert (across.low, across.high) == (low, high)
    assert 1 <= len(across.ticks) <= most + 1
    assert all(low <= tick <= high for tick in across.ticks)
    for scale in (up, across):
        assert len(set(scale.texts)) == len(scale.ticks)


@given(st.floats(1e-290, 1e290))
def test_steps_are_round_and_not_too_small(least: float) -> None:
    step = round_step(least)
    assert least * (1 - 1e-8) <= step <= least * 2.51
    assert isfinite(step)
    mantissa = float(f"{step:e}".split("e")[0])
    assert mantissa in (1.0, 2.0, 2.5, 5.0)


def test_tick_texts_have_the_decimals_of_their_step() -> None:
    assert round_scale(0.0, 1.0, 4).texts == ("0.00", "0.25", "0.50", "0.75", "1.00")
    assert round_scale(-3.0, 95.0, 5).texts == ("-20", "0", "20", "40", "60", "80", "100")
    assert round_scale(0.0, 4e7, 4).texts == ("0.0e+00", "1.0e+07", "2.0e+07", "3.0e+07", "4.0e+07")


def test_ascii_and_braille_have_the_same_frame() -> None:
    series = [Series([0.0, 1.0, 2.0], [3.0, 5.0, 4.0], "A", 1.0, 5.0)]
    fine, plain = (plot(series, 60, 16, x_title="x", y_title="y", ascii_only=only) for only in (False, True))
    assert [line.split("┤")[0] for line in fine if "┤" in line] == [
        line.split("+")[0] for line in plain[1:-3] if "+" in line
    ]
    assert fine[-2].split() == plain[-2].split()
    assert fine[-1] == plain[-1]
    in_ascii = fine[-3].replace("└", "+").replace("─", "-").replace("┬", "+")
    assert sorted(plain[-3]) == sorted(in_ascii)
