"""Damaged scenario files: whatever is wrong with one, the commands answer with a table or with plain problems.

Run with -s to see which files took longest.
"""

import io
import random
import time
from collections.abc import Callable
from contextlib import redirect_stderr, redirect_stdout
from pathlib import Path

import pytest

from fluegas.__main__ import main

DEMOS = sorted((Path(__file__).resolve().parents[2] / "scenarios").glob("*.toml"))
BATCHES, IN_EACH = 8, 250
HOSTILE = (
    '""',
    '" "',
    '"nan %"',
    '"inf degC"',
    '"-1 %"',
    '"0 K"',
    '"1e999 MW"',
    '"1e14 %"',
    '"100 %"',
    '"20.9 %"',
    '"9**9**9 %"',
    "\"__import__('os').getcwd() degC\"",
    '"[red]3 %[/red]"',
    '"\\u001b[2J"',
    '"\\u202e3 %"',
    '"=1+1"',
    '"٣ %"',
    '"3 furlong"',
    '"1,234 MW"',
    '"' + "9" * 5000 + ' %"',
    '"' + "m" * 5000 + '"',
    "'''" + "\n" * 50 + "'''",
    "nan",
    "-inf",
    "1e400",
    "9" * 5000,
    "0x" + "f" * 400,
    "-0.0",
    "true",
    "1979-05-27T07:32:00Z",
    "9999-99-99",
    "[]",
    "{}",
    "[[]]",
    "[{}]",
    "[1, '2', [3]]",
    "{ o2 = '3 %' }",
    "[" * 300 + "]" * 300,
    "{a=" * 200 + "1" + "}" * 200,
    "",
)
KEYS = (
    '"methane\\u0000"',
    '""',
    "o2.co",
    "setting",
    "[setting.fuel]",
    "[[setting]]",
    "[air.air]",
    "[[fuel]]",
    "[fuel.part]",
    "'['",
    "fluegas",
    "x" * 3000,
)


def flipped(lines: list[bytes], draw: random.Random) -> None:
    place = draw.randrange(len(lines))
    line = bytearray(lines[place])
    for _ in range(draw.randint(1, 3)):
        if line:
            line[draw.randrange(len(line))] = draw.randrange(256)
    lines[place] = bytes(line)


def deleted(lines: list[bytes], draw: random.Random) -> None:
    start = draw.randrange(len(lines))
    del lines[start : start + draw.choice((1, 1, 1, 2, 6))]


def doubled(lines: list[bytes], draw: random.Random) -> None:
    start = draw.randrange(len(lines))
    lines[start:start] = lines[start : start + draw.choice((1, 1, 4, 8))] * draw.choice((1, 1, 1, 50))


def swapped(lines: list[bytes], draw: random.Random) -> None:
    one, other = draw.randrange(len(lines)), draw.randrange(len(lines))
    lines[one], lines[other] = lines[other], lines[one]


def revalued(lines: list[bytes], draw: random.Random) -> None:
    place = draw.choice([place for place, line in enumerate(lines) if b"=" in line] or [0])
    key = lines[place].partition(b"=")[0]
    lines[place] = key + b"= " + draw.choice(HOSTILE).encode()


def crossed(lines: list[bytes], draw: random.Random) -> None:
    """Give a key the value of another one."""
    places = [place for place, line in enumerate(lines) if b"=" in line] or [0]
    one, other = draw.choice(places), draw.choice(places)
    lines[one] = lines[one].partition(b"=")[0] + b"=" + lines[other].partition(b"=")[2]


def scaled(lines: list[bytes], draw: random.Random) -> None:
    """Change the digits of a value: the file stays well written, its figures become absurd."""
    place = draw.choice([place for place, line in enumerate(lines) if b"=" in line] or [0])
    key, equals, value = lines[place].partition(b"=")
    digits = bytes(draw.choice(b"0123456789") if 48 <= each <= 57 else each for each in value)
    lines[place] = key + equals + digits.replace(b".", draw.choice((b".", b"", b"e", b"-")), 1)


def rekeyed(lines: list[bytes], draw: random.Random) -> None:
    place = draw.randrange(len(lines))
    key = draw.choice(KEYS).encode()
    lines[place] = key if key.startswith(b"[") else key + b" = " + (lines[place].partition(b"=")[2] or b"1")


def cut(lines: list[bytes], draw: random.Random) -> None:
    del lines[draw.randrange(len(lines)) :]


WAYS: tuple[Callable[[list[bytes], random.Random], None], ...] = (
    flipped,
    deleted,
    doubled,
    swapped,
    revalued,
    revalued,
    crossed,
    scaled,
    scaled,
    rekeyed,
    cut,
)


def mutation(draw: random.Random) -> bytes:
    lines = draw.choice(DEMOS).read_bytes().split(b"\n")
    for _ in range(draw.choice((1, 1, 1, 2, 3))):
        if lines:
            draw.choice(WAYS)(lines, draw)
    return b"\n".join(lines)


def outcome(*words: str) -> tuple[int, str, str]:
    """Return exit status, standard output and standard error of a command run in this process."""
    out, err = (io.TextIOWrapper(io.BytesIO(), encoding="utf-8") for _ in range(2))
    with redirect_stdout(out), redirect_stderr(err):
        status = main(words)
    texts = []
    for stream in (out, err):
        stream.flush()
        stream.seek(0)
        texts.append(stream.read())
    return status, texts[0], texts[1]


@pytest.mark.parametrize("batch", range(BATCHES))
def test_a_damaged_file_gets_a_plain_answer(batch: int, tmp_path: Path) -> None:
    draw = random.Random(f"damaged {batch}")
    slowest: list[tuple[float, str, int]] = []
    seen = set()
    for number in range(IN_EACH):
        file = tmp_path / f"{number}.toml"
        file.write_bytes(mutation(draw))
        statuses = set()
        for command in ("account", "check"):
            start = time.process_time()
            status, out, err = outcome(command, str(file))
            slowest.append((time.process_time() - start, command, number))
            assert status in (0, 2), f"{command} {file}: exit {status}: {err}"
            for words in ("Traceback", "unexpected failure", "Error:"):
                assert words not in out + err, f"{command} {file}: {err}"
            assert "\x1b" not in out + err, f"{command} {file}: {err!r}"
            assert (status == 2) == (out == ""), f"{command} {file}: exit {status}: {out}"
            assert status == 0 or str(file) in err, f"{command} {file}: {err}"
            statuses.add(status)
        assert len(statuses) == 1, f"{file}: account and check do not agree"
        seen |= statuses
    assert seen == {0, 2}
    for seconds, command, number in sorted(slowest)[-3:]:
        print(f"\n{seconds:.2f} s of processor time: {command} of file {number} in batch {batch}", end="")
