"""Titles of figures where they stand alone, and figures by what a person may call them."""

from collections.abc import Mapping, Sequence
from functools import cache

from fluegas.accounting.figure import Figure
from fluegas.accounting.figures import figures
from fluegas.accounting.inputs import BASES
from fluegas.errors import InputError
from fluegas.scenario.wording import nearest, quoted


@cache
def titles() -> Mapping[str, str]:
    """Return a title for every figure by its dotted name: its label, with what it belongs to and its basis."""
    found: dict[str, str] = {}
    above = ""
    for name, figure in figures().items():
        label = figure.label
        title = f"{above} {label.strip()}" if label.startswith(" ") else label
        above = above if label.startswith(" ") else label
        basis = next((part for part in name.split(".") if part in BASES), None)
        found[name] = title if basis is None else f"{title}, {basis}"
    return found


def find_figures(words: Sequence[str], basis: str) -> list[str]:
    """Return the dotted names of the figures that `words` stand for, each once.

    A figure goes by its dotted name, with or without its basis, by the end of that name, by its title and by its label;
    upper and lower case do not count. Without a basis, `basis` ("gross" or "net") is taken.

    Raises InputError for a word that is no figure or could be several.
    """
    return list(dict.fromkeys(_find(word, basis) for word in words))


def _find(word: str, basis: str) -> str:
    wanted = " ".join(word.split()).casefold()
    for called in (_names, _shorter, _labels, _last_parts):
        found = [name for name in figures() if wanted in called(figures()[name]) and _is_on(name, basis, wanted)]
        if len(found) == 1:
            return found[0]
        if found:
            raise InputError(f"{quoted(word)} could be {' or '.join(found)}; name one of them")
    raise InputError(f"no figure is called {quoted(word)}{nearest(wanted, _words())}; fluegas curve --list lists them")


def _is_on(name: str, basis: str, wanted: str) -> bool:
    """Return whether a figure is on `basis`, or is on none, or was named with its own."""
    own = next((part for part in name.split(".") if part in BASES), None)
    return own in (None, basis) or wanted in (name.casefold(), titles()[name].casefold())


def _names(figure: Figure) -> set[str]:
    return {figure.name.casefold()}


def _shorter(figure: Figure) -> set[str]:
    return {".".join(part for part in figure.name.split(".") if part not in BASES).casefold()}


def _labels(figure: Figure) -> set[str]:
    return {titles()[figure.name].casefold(), figure.label.strip().casefold()}


def _last_parts(figure: Figure) -> set[str]:
    return {figure.name.split(".")[-1].casefold()}


def _words() -> set[str]:
    return {word for name, figure in figures().items() for word in (name, *_shorter(figure), *_labels(figure))}
