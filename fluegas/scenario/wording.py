"""How texts from files appear in messages: escaped, shortened, with the nearest known word."""

from collections.abc import Iterable
from difflib import get_close_matches


def quoted(text: object, longest: int = 40) -> str:
    """Return `text` quoted for a message, control characters escaped and its length bounded."""
    whole = text if isinstance(text, str) else str(text)
    shown = whole if len(whole) <= longest else whole[: longest - 3] + "..."
    return ascii(shown) if not shown.isprintable() else f"'{shown}'"


def nearest(word: str, known: Iterable[str]) -> str:
    """Return "; did you mean ...?" with the nearest of `known`, nothing if none is near."""
    near = get_close_matches(word.lower()[:60], list(known), 1, 0.6)
    return f"; did you mean {near[0]!r}?" if near else ""


def listed(words: Iterable[str]) -> str:
    """Return words as a list for a message."""
    return ", ".join(words)
