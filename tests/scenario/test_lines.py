"""The line of every table and key, wherever TOML allows it to stand."""

import tomllib
from collections.abc import Iterator

import pytest
from hypothesis import given
from hypothesis import strategies as st

from fluegas.scenario.lines import DEEPEST, Path, lines_of
from tests.scenario.files import HEAD, SAMPLE, SETTING

AWKWARD = (
    r'''a.b = 1   # x = 2
"q.\u0041" = [1, [2,
  {x = 3.5, "y" = {z = 1979-05-27 07:32:00}}],
]
m = """
[no]
k = "x" \" """""
n = '''
    + "'''\n[[s]]\na''b'''''\n"
    + r"""
[[s]]
k = "# ]"
[air] # [c]
t=2
[s.air]
u = -1e5
[[s]]
k = { }
[s.air]
  [[s.f.p]]
[[s.f.p]]
g = [ # ]
  ]
"""
)


def paths_of(value: object, path: Path = ()) -> Iterator[Path]:
    """Yield the path of every table, key and element in a parsed document."""
    entries: Iterator[tuple[str | int, object]] = iter(())
    if isinstance(value, dict):
        entries = iter(value.items())
    elif isinstance(value, list):
        entries = iter(enumerate(value))
    for key, inner in entries:
        yield (*path, key)
        yield from paths_of(inner, (*path, key))


def test_each_path_of_an_awkward_file_has_the_line_that_holds_it() -> None:
    expected: dict[Path, int] = {
        ("a", "b"): 1,
        ("q.A", 1, 0): 2,
        ("q.A", 1, 1, "y", "z"): 3,
        ("m",): 5,
        ("n",): 8,
        ("s",): 12,
        ("s", 0, "k"): 13,
        ("air", "t"): 15,
        ("s", 0, "air", "u"): 17,
        ("s", 1): 18,
        ("s", 1, "k"): 19,
        ("s", 1, "air"): 20,
        ("s", 1, "f"): 21,
        ("s", 1, "f", "p", 1): 22,
        ("s", 1, "f", "p", 1, "g"): 23,
    }
    assert lines_of(AWKWARD, list(expected)) == expected
    assert lines_of(AWKWARD.replace("\n", "\r\n"), list(expected)) == expected


def test_no_path_of_a_file_is_without_its_line() -> None:
    for text in (AWKWARD, SAMPLE):
        found = lines_of(text, list(paths_of(tomllib.loads(text))))
        assert None not in found.values()


def test_what_is_missing_has_the_line_of_its_table() -> None:
    text = HEAD + "[fuel.mole_percent]\nmethane = 1\n" + SETTING + SETTING
    paths: list[Path] = [("fuel", "state"), ("setting", 1, "co"), ("plant",), ("setting", 0, "air", "x"), ()]
    assert lines_of(text, paths) == {
        ("fuel", "state"): 2,
        ("setting", 1, "co"): 8,
        ("plant",): None,
        ("setting", 0, "air", "x"): 4,
        (): None,
    }


def test_tables_between_those_of_an_array_do_not_mislead() -> None:
    text = SETTING + 'note = """\n[[setting]]\no2 = 1"""\n[air]\no2 = 1\n' + SETTING
    assert lines_of(text, [("setting", 0, "o2"), ("setting", 1, "o2"), ("air", "o2")]) == {
        ("setting", 0, "o2"): 3,
        ("setting", 1, "o2"): 12,
        ("air", "o2"): 9,
    }


def test_what_lies_deeper_than_any_entry_costs_nothing() -> None:
    text = "a = " + "[" * 200 + "]" * 200 + "\nb = " + "{c = " * 200 + "1" + "}" * 200 + "\nd = 1\n"
    assert lines_of(text, [("d",), ("b", *["c"] * 50), ("a", *[0] * DEEPEST)]) == {
        ("d",): 3,
        ("b", *["c"] * 50): 2,
        ("a", *[0] * DEEPEST): 1,
    }


KEYS = st.sampled_from(["a", "b", "c-d", '"e f"', '"g.h"', "'i'", '"\\u006a\\""'])
PLAIN = st.sampled_from(
    [
        "1",
        "-2.5e3",
        '"x"',
        "'y # ]'",
        "true",
        "1979-05-27 07:32:00",
        "07:32:00.5",
        '"""p\n[q]\n"""',
        "'''\nr = 1'''",
        "nan",
    ]
)
VALUES = st.recursive(
    PLAIN,
    lambda inner: (
        st.lists(inner, max_size=3).map(lambda items: "[ # ,\n " + ",\n".join(items) + "]")
        | st.lists(inner, max_size=3).map(
            lambda items: "{" + ", ".join(f"k{n} = {v}" for n, v in enumerate(items)) + "}"
        )
    ),
    max_leaves=6,
)
ENTRY = st.tuples(st.lists(KEYS, min_size=1, max_size=2), VALUES).map(lambda pair: f"{' . '.join(pair[0])} = {pair[1]}")
HEADERS = st.tuples(st.sampled_from(["[{}]", "[[{}]]"]), st.lists(KEYS, min_size=1, max_size=3)).map(
    lambda pair: pair[0].format(".".join(pair[1]))
)
COMMENT = st.sampled_from(["", "# [a] b = 1", "   "])


@given(st.lists(ENTRY | HEADERS | COMMENT, max_size=8))
def test_any_text_that_parses_has_a_line_for_every_path(lines: list[str]) -> None:
    text = "\n".join(lines)
    try:
        document = tomllib.loads(text)
    except tomllib.TOMLDecodeError:
        return
    paths = [path for path in paths_of(document) if len(path) <= DEEPEST]
    found = lines_of(text, paths)
    whole = text.split("\n")
    for path in paths:
        line = found[path]
        assert line is not None
        key = next(part for part in reversed(path) if isinstance(part, str))
        written = {"e f": '"e f"', "g.h": '"g.h"', "i": "'i'", 'j"': '"\\u006a\\""'}.get(key, key)
        if isinstance(path[-1], str):
            assert written in whole[line - 1]


@pytest.mark.parametrize("text", ["", "\n", "# only a comment", "[a]", "a = 1"])
def test_small_texts_end_well(text: str) -> None:
    assert lines_of(text, [("nothing",)]) == {("nothing",): None}
