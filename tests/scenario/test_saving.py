"""Saving: whole or not at all, never over what nobody has read, with everything but the edit as it was."""

import errno
import io
import os
import signal
import stat
import subprocess
import sys
from dataclasses import replace
from pathlib import Path
from types import MappingProxyType
from typing import Any, NoReturn

import pytest

from fluegas.errors import FluegasError, SavingError
from fluegas.report.json_output import json_text
from fluegas.scenario import saving
from fluegas.scenario.model import Scenario, Table
from fluegas.scenario.reading import parse_scenario, read_scenario
from fluegas.scenario.result import work_out
from fluegas.scenario.saving import save
from fluegas.scenario.writing import edited

CHECKOUT = Path(__file__).resolve().parents[2]
DEMOS = sorted((CHECKOUT / "scenarios").glob("*.toml"))
DEMO = CHECKOUT / "scenarios" / "laundry-boiler.toml"
O2 = ("setting", 1, "o2")
posix = pytest.mark.skipif(os.name != "posix", reason="permissions, links and signals of another kind")


@pytest.fixture
def file(tmp_path: Path) -> Path:
    folder = tmp_path / "audits"
    folder.mkdir()
    target = folder / "boiler.toml"
    target.write_bytes(DEMO.read_bytes())
    return target


def changed(file: Path) -> tuple[Scenario, Scenario]:
    """Return the scenario in a file and the same with one edit."""
    before = read_scenario(file)
    return before, edited(before, O2, "3.1 %")


def refused(scenario: Scenario, path: Path, expected: str | None, words: str) -> SavingError:
    """Check that saving is refused and leaves the folder, name by name and byte by byte, as it was."""
    folder = path if path.is_dir() else path.parent
    before = {each.name: each.read_bytes() for each in folder.iterdir() if each.is_file()}
    source = scenario.source
    with pytest.raises(SavingError, match=words) as caught:
        save(scenario, path, expected_on_disk=expected)
    assert {each.name: each.read_bytes() for each in folder.iterdir() if each.is_file()} == before
    assert scenario.source == source
    assert str(path) in str(caught.value)
    return caught.value


def test_its_place_in_the_tree() -> None:
    assert issubclass(SavingError, FluegasError)
    assert issubclass(SavingError, OSError)


@pytest.mark.parametrize("demo", DEMOS, ids=lambda demo: demo.stem)
def test_what_is_saved_works_out_to_the_last_digit(demo: Path, tmp_path: Path) -> None:
    before = read_scenario(demo)
    after = edited(before, ("setting", 0, "flue_temperature"), "411.3 degF")
    target = tmp_path / "copy.toml"
    save(after, target, expected_on_disk=None)
    assert json_text(work_out(read_scenario(target))) == json_text(work_out(after))
    save(before, target, expected_on_disk=after.source)
    assert target.read_bytes() == demo.read_bytes()
    assert [each.name for each in tmp_path.iterdir()] == ["copy.toml"]


@pytest.mark.parametrize("mark", [b"", b"\xef\xbb\xbf"], ids=["plain", "byte order mark"])
@pytest.mark.parametrize("newline", [b"\n", b"\r\n"], ids=["lf", "crlf"])
def test_line_endings_and_byte_order_mark_stay(file: Path, mark: bytes, newline: bytes) -> None:
    file.write_bytes(mark + DEMO.read_bytes().replace(b"\n", newline))
    before, after = changed(file)
    content = file.read_bytes()
    save(after, file, expected_on_disk=before.source)
    old = b'"Less air"' + newline + b'o2 = "3.4 %"'
    assert old in content
    assert file.read_bytes() == content.replace(old, old.replace(b"3.4", b"3.1"))


@posix
@pytest.mark.parametrize("mode", [0o600, 0o640, 0o644, 0o664])
def test_permissions_stay(file: Path, mode: int) -> None:
    file.chmod(mode)
    before, after = changed(file)
    save(after, file, expected_on_disk=before.source)
    assert stat.S_IMODE(file.stat().st_mode) == mode


@posix
def test_a_new_file_has_the_usual_permissions(file: Path) -> None:
    new = file.with_name("new.toml")
    plain = file.with_name("plain")
    plain.write_text("", encoding="utf-8")
    save(read_scenario(file), new, expected_on_disk=None)
    assert new.stat().st_mode == plain.stat().st_mode


@posix
@pytest.mark.parametrize("exists", [True, False])
def test_a_link_stays_a_link(file: Path, tmp_path: Path, exists: bool) -> None:
    before, after = changed(file)
    link = tmp_path / "link.toml"
    link.symlink_to(Path("audits") / file.name)
    if not exists:
        file.unlink()
    save(after, link, expected_on_disk=before.source)
    assert link.is_symlink()
    assert file.read_text(encoding="utf-8") == after.source
    assert not file.is_symlink()
    assert sorted(each.name for each in tmp_path.iterdir()) == ["audits", "link.toml"]


@posix
def test_a_link_to_itself(file: Path) -> None:
    link = file.with_name("loop.toml")
    link.symlink_to("loop.toml")
    refused(read_scenario(file), link, None, "not saved")


def test_a_file_that_changed_is_left_alone(file: Path) -> None:
    before, after = changed(file)
    file.write_text(before.source + "# a colleague was here\n", encoding="utf-8")
    refused(after, file, before.source, "changed by someone else since it was read")
    file.write_bytes(b"\xff\xfe no text")
    refused(after, file, before.source, "changed by someone else")
    file.write_bytes(b"#" * 300_000)
    refused(after, file, before.source, "changed by someone else")


def test_a_file_that_changes_while_saving_is_left_alone(file: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    before, after = changed(file)
    flush = os.fsync

    def colleague(handle: int) -> None:
        flush(handle)
        file.write_text("# theirs\n", encoding="utf-8")

    monkeypatch.setattr(os, "fsync", colleague)
    with pytest.raises(SavingError, match="changed by someone else"):
        save(after, file, expected_on_disk=before.source)
    assert file.read_text(encoding="utf-8") == "# theirs\n"
    assert [each.name for each in file.parent.iterdir()] == [file.name]


def test_a_file_that_is_in_the_way_is_left_alone(file: Path) -> None:
    _, after = changed(file)
    refused(after, file, None, "there is a file of this name already")


def test_a_file_that_is_gone_is_written_again_and_one_that_is_saved_may_be_saved_again(file: Path) -> None:
    before, after = changed(file)
    file.unlink()
    save(after, file, expected_on_disk=before.source)
    save(after, file, expected_on_disk=before.source)
    save(after, file, expected_on_disk=None)
    assert file.read_text(encoding="utf-8") == after.source


def failing(number: int) -> Any:
    def fail(*_: object, **__: object) -> NoReturn:
        raise OSError(number, os.strerror(number))

    return fail


class FullStream(io.FileIO):
    """A new file on a full disk: half of the text fits."""

    def write(self, text: Any) -> NoReturn:
        super().write(text[: len(text) // 2])
        raise OSError(errno.ENOSPC, os.strerror(errno.ENOSPC))


def opening(new: Any) -> Any:
    """Return an open() that takes `new` for a new file."""

    def opened(path: str, mode: str) -> Any:
        return new(path, mode) if mode == "xb" else io.FileIO(path, mode)

    return opened


@pytest.mark.parametrize("is_new", [False, True], ids=["old file", "new file"])
@pytest.mark.parametrize(
    ("number", "words"),
    [(errno.ENOSPC, "the disk is full"), (errno.EIO, os.strerror(errno.EIO)), (errno.EROFS, "write-protected")],
)
@pytest.mark.parametrize("step", ["write", "fsync", "replace"])
def test_a_failing_disk_loses_nothing(
    file: Path, monkeypatch: pytest.MonkeyPatch, step: str, number: int, words: str, is_new: bool
) -> None:
    before, after = changed(file)
    target = file.with_name("new.toml") if is_new else file
    if step == "write":
        number, words = errno.ENOSPC, "the disk is full"
        monkeypatch.setattr(saving, "open", opening(FullStream), raising=False)
    else:
        monkeypatch.setattr(os, step, failing(number))
    error = refused(after, target, None if is_new else before.source, words)
    assert isinstance(error.__cause__, OSError)
    assert error.__cause__.errno == number
    monkeypatch.undo()
    save(after, target, expected_on_disk=None if is_new else before.source)
    assert target.read_text(encoding="utf-8") == after.source


@posix
def test_an_interruption_leaves_no_litter(file: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    def interrupt(*_: object) -> NoReturn:
        raise KeyboardInterrupt

    before, after = changed(file)
    monkeypatch.setattr(os, "replace", interrupt)
    with pytest.raises(KeyboardInterrupt):
        save(after, file, expected_on_disk=before.source)
    assert [each.name for each in file.parent.iterdir()] == [file.name]
    assert file.read_text(encoding="utf-8") == before.source


@posix
@pytest.mark.parametrize(("number", "fails"), [(errno.EIO, True), (errno.ENOSPC, True), (errno.EINVAL, False)])
def test_a_folder_that_cannot_be_flushed(file: Path, monkeypatch: pytest.MonkeyPatch, number: int, fails: bool) -> None:
    before, after = changed(file)
    flush = os.fsync

    def only_files(handle: int) -> None:
        if stat.S_ISDIR(os.fstat(handle).st_mode):
            failing(number)()
        flush(handle)

    monkeypatch.setattr(os, "fsync", only_files)
    if fails:
        with pytest.raises(SavingError, match="a loss of power may still undo it"):
            save(after, file, expected_on_disk=before.source)
    else:
        save(after, file, expected_on_disk=before.source)
    assert file.read_text(encoding="utf-8") == after.source
    monkeypatch.undo()
    save(after, file, expected_on_disk=before.source)


@posix
def test_a_folder_or_file_that_is_write_protected(file: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    before, after = changed(file)
    if os.geteuid() == 0:
        monkeypatch.setattr(saving, "open", opening(failing(errno.EACCES)), raising=False)
    else:
        file.parent.chmod(0o500)
    try:
        refused(after, file, before.source, "write-protected")
        refused(after, file.with_name("new.toml"), None, "write-protected")
    finally:
        file.parent.chmod(0o700)
    monkeypatch.undo()
    monkeypatch.setattr(os, "access", lambda *_: False)
    refused(after, file, before.source, "the file is write-protected; save under another name")


@posix
@pytest.mark.parametrize(
    ("path", "words"),
    [
        (".", "it is a folder"),
        ("no/folder.toml", "there is no such folder"),
        ("boiler.toml/inside.toml", "there is no such folder|is a folder"),
        ("x" * 300 + ".toml", "not saved"),
        ("nul\0.toml", "cannot have this name"),
        ("/dev/null", "not an ordinary file"),
    ],
)
def test_places_that_hold_no_file(file: Path, path: str, words: str) -> None:
    _, after = changed(file)
    with pytest.raises(SavingError, match=words):
        save(after, file.parent / path, expected_on_disk=None)
    assert [each.name for each in file.parent.iterdir()] == [file.name]


def test_the_longest_name_of_a_file(file: Path) -> None:
    target = file.with_name("x" * 250 + ".toml")
    save(read_scenario(file), target, expected_on_disk=None)
    assert target.read_bytes() == DEMO.read_bytes()


def test_a_file_that_writing_would_rearrange(file: Path) -> None:
    setting = '[[setting]]\nname = "{}"\no2 = "3 %"\nflue_temperature = "150 degC"\n'
    head = "fluegas = 1\n[fuel.mole_percent]\nmethane = 1\n"
    file.write_text(f"{head}{setting.format('A')}[air]\n{setting.format('B')}", encoding="utf-8")
    split = read_scenario(file)
    assert len(split.settings) == 2
    refused(split, file, split.source, r"put all \[\[setting\]\] tables one after the other")


def test_a_newer_format_is_not_written_over(file: Path) -> None:
    _, after = changed(file)
    newer = after.source.replace("fluegas = 1", "fluegas = 2") + "\n[new]\nkey = 1\n"
    file.write_text(newer, encoding="utf-8")
    refused(after, file, newer, "is of format 2; this fluegas writes format 1.*use a newer fluegas")
    entries = MappingProxyType({**after.top.entries, "fluegas": 2})
    refused(replace(after, top=Table(entries)), file.with_name("new.toml"), None, "of format 2")


def test_a_text_that_could_not_be_read_again(file: Path) -> None:
    before = read_scenario(file)
    long = parse_scenario(before.source + "# \u00e9" * 70_000 + "\n")
    assert len(long.source) < 256_000 < len(long.source.encode())
    refused(long, file.with_name("new.toml"), None, "bytes, a scenario file at most 256000")
    odd = replace(before, source=before.source + "# \ud800\n")
    refused(odd, file.with_name("new.toml"), None, "characters that are no text")


KILLED = """
import os, sys, time
from fluegas.scenario import saving
from fluegas.scenario.reading import read_scenario
from fluegas.scenario.writing import edited

before = read_scenario(sys.argv[1])
after = edited(before, ("setting", 1, "o2"), "3.1 %")

def wait(*given):
    print("written", flush=True)
    time.sleep(600)

saving.os.replace = wait
saving.save(after, sys.argv[1], expected_on_disk=before.source)
"""


@posix
def test_a_killed_process_leaves_the_old_file_whole(file: Path) -> None:
    content = file.read_bytes()
    with subprocess.Popen(
        [sys.executable, "-c", KILLED, str(file)],
        cwd=CHECKOUT,
        stdout=subprocess.PIPE,
        text=True,
        encoding="utf-8",
    ) as process:
        assert process.stdout is not None
        assert process.stdout.readline() == "written\n"
        process.send_signal(signal.SIGKILL)
        assert process.wait() == -signal.SIGKILL
    assert file.read_bytes() == content
    before, after = changed(file)
    save(after, file, expected_on_disk=before.source)
    assert read_scenario(file).source == after.source
