"""Turns of phrase that the complaints share. Whatever is quoted is shortened and made printable."""

import datetime
import os
from collections.abc import Iterable, Mapping, Sequence

LONGEST_QUOTE = 40
LARGEST_SHOWN_INTEGER = 10**18


def quoted(text: str) -> str:
    """Return a text in single quotes, shortened, with control characters written as escapes.

    >>> quoted("Fe2+"), quoted("x" * 50)
    ("'Fe2+'", "'xxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxxx...'")
    """
    return f"'{shortened(text)}'"


def shortened(text: str) -> str:
    """Return the beginning of a text, made printable."""
    return printable(text if len(text) <= LONGEST_QUOTE else text[: LONGEST_QUOTE - 1] + "...")


def printable(text: str) -> str:
    """Return a text with everything that does not print (line ends, escapes, surrogates) written as an escape."""
    if text.isprintable():
        return text
    return "".join(c if c.isprintable() else c.encode("unicode_escape").decode("ascii") for c in text)


def described(value: object) -> str:
    """Return what a value of a deck is, as people say it: "the text 'two'", "true", "1.5", "a list"."""
    if isinstance(value, str):
        return f"the text {quoted(value)}"
    if isinstance(value, bool):
        return "true" if value else "false"
    if isinstance(value, int):
        return str(value) if abs(value) < LARGEST_SHOWN_INTEGER else "a whole number of more than 18 digits"
    if isinstance(value, float):
        return repr(value)
    return _described_rest(value)


def _described_rest(value: object) -> str:
    if value is None:
        return "null"
    if isinstance(value, Mapping):
        return "a table"
    if isinstance(value, list | tuple):
        return "a list"
    if isinstance(value, datetime.date):  # a date and time is a date too
        return "a date"
    return "a time of day"


def listed(items: Iterable[str], last: str = "or") -> str:
    """Join words as in prose.

    >>> listed(["a", "b", "c"])
    'a, b or c'
    """
    words = list(items)
    if len(words) < 2:
        return "".join(words)
    return f"{', '.join(words[:-1])} {last} {words[-1]}"


def nearest(word: str, choices: Sequence[str], cutoff: float = 0.6) -> str | None:
    """Return the choice that a word was probably meant to be, case ignored, or None."""
    import difflib

    by_lower = {choice.lower(): choice for choice in choices}
    # a long word resembles nothing, and comparing it would cost seconds
    close = difflib.get_close_matches(word[:64].lower(), by_lower, n=1, cutoff=cutoff)
    return by_lower[close[0]] if close else None


def plural(n: int, word: str) -> str:
    """Return a count and its noun.

    >>> plural(1, "row"), plural(1200, "row")
    ('1 row', '1,200 rows')
    """
    return f"{n:,} {word}" if n == 1 else f"{n:,} {word}s"


def shown_path(path: str) -> str:
    """Return a path as it is named in reports: with forward slashes on every system, and printable."""
    return printable(path.replace(os.sep, "/"))
