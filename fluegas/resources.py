"""Finds the folders `data/` and `scenarios/` in a wheel, an editable install and a bare checkout."""

from importlib.resources import files
from importlib.resources.abc import Traversable
from pathlib import Path

from fluegas.errors import DataError


def folder(name: str) -> Traversable:
    """Return the folder `name` ("data" or "scenarios"): inside the installed package, else beside it.

    Raises DataError if the program was installed without it.
    """
    inside = files("fluegas") / name
    if inside.is_dir():
        return inside
    beside = Path(__file__).resolve().parent.parent / name
    if beside.is_dir():
        return beside
    raise DataError(f"fluegas is installed without its folder {name!r}; install it again from a complete copy")


def data_text(name: str) -> str:
    """Return the text of the file `name` in `data/`.

    Raises DataError if it is missing.
    """
    file = folder("data") / name
    if not file.is_file():
        raise DataError(f"the data file {name!r} is missing from this installation")
    return file.read_text(encoding="utf-8")
