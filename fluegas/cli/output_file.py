"""Files that commands write beside their output: whole or not at all."""

import os
import secrets
from contextlib import suppress
from pathlib import Path

from fluegas.errors import InputError


def write_whole(path: str, content: bytes) -> None:
    """Put `content` into the file at `path`, in one step once all of it is on the disk; an old file is replaced.

    Raises InputError with the reason if it cannot be written; an old file is then as it was.
    """
    target = Path(os.path.realpath(path))
    temporary = target.with_name(f".fluegas-{secrets.token_hex(8)}.part")
    try:
        if target.exists() and not target.is_file():
            raise InputError(f"{path}: not written: it is not an ordinary file; name another one")
        try:
            with temporary.open("xb") as stream:
                stream.write(content)
                stream.flush()
                os.fsync(stream.fileno())
            temporary.replace(target)
        except BaseException:
            with suppress(OSError):
                temporary.unlink()
            raise
    except (OSError, ValueError) as error:
        if isinstance(error, InputError):
            raise
        reason = getattr(error, "strerror", None) or str(error)
        raise InputError(f"{path}: not written: {reason}; name a file in a folder that can be written to") from error
