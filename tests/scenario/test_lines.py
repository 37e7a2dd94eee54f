"""On which line a key or a table stands, in files as people write them."""

import pytest

from fluegas.scenario.lines import Path, lines_of

ORDERLY = """\
fluegas = 1
plant.name = "Boiler"

[fuel] # the coal
state = "solid"
[fuel.mass_percent]
carbon = 70
"odd key" = 1

[[fuel.ash_stream]]
name = "Grate"
carbon = "6 %"
[[fuel.ash_stream]]
name = "Filter"

[[setting]]
name = "A"
air = { temperature = "20 degC", pressure = "1 bar" }
"""

SPLIT = """\
note = '''
[setting]
o2 = 1
'''
[[setting]] # first
name = "A"
readings = [
    { o2 = "5 %" },
]
[setting.air]
temperature = "20 degC"
[fuel.mass_percent]
carbon = 70
[[fuel.ash_stream]]
carbon = "6 %"
[[ setting ]]
"name" = "B"
fuel.temperature = "9 degC"
[[fuel.ash_stream]]
carbon = "7 %"
[[setting]]
name = "C"
"""


@pytest.mark.parametrize(
    ("path", "line"),
    [
        (("fluegas",), 1),
        (("plant", "name"), 2),
        (("fuel",), 4),
        (("fuel", "missing"), 4),
        (("fuel", "state"), 5),
        (("fuel", "mass_percent"), 6),
        (("fuel", "mass_percent", "odd key"), 8),
        (("fuel", "ash_stream"), 10),
        (("fuel", "ash_stream", 0, "carbon"), 12),
        (("fuel", "ash_stream", 1), 13),
        (("fuel", "ash_stream", 1, "carbon"), 13),
        (("setting",), 16),
        (("setting", 0, "name"), 17),
        (("setting", 0, "air"), 18),
        (("setting", 0, "air", "pressure"), 18),
        (("nowhere",), None),
    ],
    ids=str,
)
@pytest.mark.parametrize("end", ["\n", "\r\n"], ids=["unix", "windows"])
def test_lines_of_an_orderly_file(path: Path, line: int | None, end: str) -> None:
    assert lines_of(ORDERLY.replace("\n", end), [path]) == {path: line}


def test_many_paths_at_once_are_answered_as_one_by_one() -> None:
    paths: list[Path] = [
        ("fuel",),
        ("fuel", "ash_stream", 0),
        ("fuel", "ash_stream", 0, "carbon"),
        ("fuel", "mass_percent", "carbon"),
        ("setting", 0),
        ("setting", 0, "air", "temperature"),
        ("fluegas",),
    ]
    together = lines_of(ORDERLY, paths)
    assert together == {path: lines_of(ORDERLY, [path])[path] for path in paths}


@pytest.mark.parametrize(
    ("path", "line"),
    [
        (("setting", 0), 5),
        (("setting", 0, "name"), 6),
        (("setting", 0, "readings", 0, "o2"), 8),
        (("setting", 0, "air", "temperature"), 11),
        (("fuel", "mass_percent", "carbon"), 13),
        (("fuel", "ash_stream", 0, "carbon"), 15),
        (("setting", 1), 16),
        (("setting", 1, "name"), 17),
        (("setting", 1, "missing"), 16),
        (("setting", 1, "fuel", "temperature"), 18),
        (("fuel", "ash_stream", 1, "carbon"), 20),
        (("setting", 2), 21),
        (("setting", 2, "name"), 22),
    ],
    ids=str,
)
def test_lines_of_a_file_whose_tables_are_split(path: Path, line: int) -> None:
    assert lines_of(SPLIT, [path]) == {path: line}
