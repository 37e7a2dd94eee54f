"""Saving a scenario file so that a crash or a full disk loses neither the old file nor the unsaved text.

The text goes to a new file in the same folder, is flushed to the disk, and takes the old file's place in one step.
"""

import errno
import os
import secrets
import stat
from contextlib import suppress
from os import PathLike

from fluegas.errors import SavingError
from fluegas.scenario.fields import FORMAT, LARGEST_FILE
from fluegas.scenario.lines import round_trip_problem
from fluegas.scenario.model import Scenario

_BYTE_ORDER_MARK = b"\xef\xbb\xbf"
_FULL = {errno.ENOSPC, errno.EDQUOT}
_PROTECTED = {errno.EACCES, errno.EPERM, errno.EROFS}
_FOLDERS_CANNOT_BE_FLUSHED = {errno.EINVAL, errno.ENOTSUP, errno.EACCES, errno.EPERM, errno.EBADF}


def save(scenario: Scenario, path: str | PathLike[str], *, expected_on_disk: str | None) -> None:
    """Write the text of a scenario to the file at `path`, whole or not at all.

    expected_on_disk: the text that the file held when it was read, the scenario's `source` after the last save; None
    for a file that is new. A file that holds anything else is left alone; one that is gone is written again. Line
    endings, a byte order mark, permissions and a symbolic link to the file stay as they are.

    Raises SavingError with the reason if it cannot be written, with the old file as it was and nothing left beside it.
    """
    shown = str(path)
    try:
        target = os.path.realpath(path)
        text = _text_to_write(scenario)
        found = _found(target)
        _refuse_conflict(found, text, expected_on_disk)
        if found is not None and found.startswith(_BYTE_ORDER_MARK):
            text = _BYTE_ORDER_MARK + text
        _put_in_place(target, text, expected_on_disk)
    except SavingError as error:
        raise SavingError(f"{shown}: {error}") from error
    except (OSError, ValueError) as error:
        raise SavingError(
            f"{shown}: not saved: {_reason(error)}; nothing is lost, what was there is unchanged"
        ) from error
    _flush_folder(os.path.dirname(target), shown)


def _text_to_write(scenario: Scenario) -> bytes:
    number = scenario.top.number("fluegas")
    if number is not None and number > FORMAT:
        raise SavingError(f"not saved: the scenario is of format {number:g}, this fluegas writes format {FORMAT}")
    reason = round_trip_problem(scenario.source)
    if reason is not None:
        raise SavingError(f"not saved: {reason}")
    text = scenario.source.encode("utf-8")
    if len(text) > LARGEST_FILE:
        raise SavingError(f"not saved: it takes {len(text)} bytes, a scenario file at most {LARGEST_FILE}")
    return text


def _found(target: str) -> bytes | None:
    """Return what is on the disk, None if there is no file; no more of it than a scenario file may hold."""
    try:
        state = os.stat(target)
    except FileNotFoundError:
        return None
    if stat.S_ISDIR(state.st_mode):
        raise SavingError("not saved: it is a folder; name a file")
    if not stat.S_ISREG(state.st_mode):
        raise SavingError("not saved: it is not an ordinary file; name another one")
    if not os.access(target, os.W_OK):
        raise SavingError("not saved: the file is write-protected; save under another name")
    with open(target, "rb") as stream:
        return stream.read(LARGEST_FILE + len(_BYTE_ORDER_MARK) + 1)


def _refuse_conflict(found: bytes | None, text: bytes, expected_on_disk: str | None) -> None:
    """Refuse to overwrite what nobody has read, and a file of a newer format in any case."""
    if found is None:
        return
    content = found.removeprefix(_BYTE_ORDER_MARK)
    if content == text:
        return
    newer = _newer_format(content)
    if newer is not None:
        raise SavingError(
            f"not saved: the file there is of format {newer}; this fluegas writes format {FORMAT} and would lose what "
            "is new in it: save under another name, or use a newer fluegas"
        )
    if expected_on_disk is None:
        raise SavingError("not saved: there is a file of this name already; save under another name")
    if content != expected_on_disk.removeprefix("\ufeff").encode("utf-8", "surrogatepass"):
        raise SavingError(
            "not saved: the file was changed by someone else since it was read; save under another name, or read it "
            "again and repeat your changes"
        )


def _newer_format(content: bytes) -> int | None:
    import tomllib

    try:
        number = tomllib.loads(content.decode("utf-8")).get("fluegas")
    except (ValueError, RecursionError):
        return None
    return number if isinstance(number, int) and number > FORMAT else None


def _put_in_place(target: str, text: bytes, expected_on_disk: str | None) -> None:
    temporary = os.path.join(os.path.dirname(target), f".fluegas-{secrets.token_hex(8)}.part")
    try:
        with open(temporary, "xb") as stream:
            _keep_owner_and_permissions(target, temporary)
            stream.write(text)
            stream.flush()
            os.fsync(stream.fileno())
        _refuse_conflict(_found(target), text.removeprefix(_BYTE_ORDER_MARK), expected_on_disk)
        os.replace(temporary, target)
    except BaseException:
        with suppress(OSError):
            os.unlink(temporary)
        raise


def _keep_owner_and_permissions(target: str, temporary: str) -> None:
    try:
        state = os.stat(target)
    except FileNotFoundError:
        return
    if hasattr(os, "chown"):
        with suppress(OSError):
            os.chown(temporary, state.st_uid, state.st_gid)
    os.chmod(temporary, stat.S_IMODE(state.st_mode))


def _flush_folder(folder: str, shown: str) -> None:
    """Make the new name last on the disk, where folders can be flushed."""
    if os.name == "nt":
        return
    try:
        handle = os.open(folder, os.O_RDONLY)
        try:
            os.fsync(handle)
        finally:
            os.close(handle)
    except OSError as error:
        if error.errno not in _FOLDERS_CANNOT_BE_FLUSHED:
            raise SavingError(
                f"{shown}: the new text is in the file, but a loss of power may still undo it: {_reason(error)}; "
                "save again"
            ) from error


def _reason(error: OSError | ValueError) -> str:
    if isinstance(error, UnicodeEncodeError):
        return "it holds characters that are no text"
    if not isinstance(error, OSError):
        return f"a file cannot have this name ({error})"
    if error.errno in _FULL:
        return f"the disk is full ({error.strerror}); free some space or save to another disk"
    if error.errno in _PROTECTED:
        return f"the folder or the file is write-protected ({error.strerror}); save to another folder"
    if error.errno in (errno.ENOENT, errno.ENOTDIR):
        return f"there is no such folder ({error.strerror})"
    return error.strerror or str(error)
