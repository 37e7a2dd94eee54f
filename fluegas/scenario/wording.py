"""How texts from files appear in messages: escaped, shortened, with the nearest known word."""

from collections.abc import Iterable
from difflib import get_close_matches
from unicodedata import category


def quoted(text: object, longest: int = 40) -> str:
    """Return `text` quoted for a message, control characters escaped and its length bounded."""
    try:
        whole = text if isinstance(text, str) else str(text)
    except (ValueError, RecursionError):  # a number of thousands of digits, a table in a table in a table ...
        return "this value"
    shown = whole if len(whole) <= longest else whole[: longest - 3] + "..."
    return ascii(shown) if not shown.isprintable() else f"'{shown}'"


def escaped(text: str) -> str:
    """Return `text` with characters that a terminal might obey written as escapes."""
    return "".join(character if is_plain(character) else ascii(character)[1:-1] for character in text)


def is_plain(text: str, also: str = "") -> bool:
    """Return whether a text holds only what can be shown: visible characters, blanks, joiners and those of `also`.

    Control characters and those that turn the direction of writing are not plain.
    """
    return text.isprintable() or all(
        character.isprintable() or character in also or character in "\u200c\u200d" or category(character) == "Zs"
        for character in text
    )


def nearest_word(word: str, known: Iterable[str], likeness: float = 0.6) -> str | None:
    """Return the nearest of `known`, None if none is as near as `likeness`."""
    near = get_close_matches(word.lower()[:60], list(known), 1, likeness)
    return near[0] if near else None


def nearest(word: str, known: Iterable[str]) -> str:
    """Return "; did you mean ...?" with the nearest of `known`, nothing if none is near."""
    near = nearest_word(word, known)
    return f"; did you mean {near!r}?" if near else ""


def listed(words: Iterable[str]) -> str:
    """Return words as a list for a message."""
    return ", ".join(words)
