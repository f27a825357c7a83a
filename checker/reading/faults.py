"""A fault found in a deck, by key; its place in the text is looked up once all are known."""

from collections.abc import Iterable, Sequence
from typing import NamedTuple, TypeAlias

from checker.errors import Complaint
from checker.reading.limits import MAX_COMPLAINTS, MAX_COMPLAINTS_PER_LIST
from checker.reading.words import plural, shortened
from checker.source import Span

KeyPath: TypeAlias = tuple[str | int, ...]


class Fault(NamedTuple):
    """What is wrong, at which key; for a missing key, where it would stand."""

    at: KeyPath
    message: str


def key_text(path: KeyPath) -> str:
    """Write a path as the keys of findings are written.

    >>> key_text(("fragments", 0, "atoms", 2))
    'fragments[0].atoms[2]'
    """
    parts = [f"[{step}]" if isinstance(step, int) else f".{shortened(step)}" for step in path]
    return "".join(parts).removeprefix(".")


def complaint(at: Span, message: str, key: str | None = None) -> Complaint:
    """Make a complaint about a place."""
    return Complaint(message, at.file, at.line, at.column, key)


def in_order(complaints: Iterable[Complaint]) -> tuple[Complaint, ...]:
    """Sort complaints by file and place, in the order the files were met, and cut an endless list short."""
    listed = list(complaints)
    files = list(dict.fromkeys(c.file for c in listed))
    listed.sort(key=lambda c: (files.index(c.file), c.line or 0, c.column or 0))
    if len(listed) <= MAX_COMPLAINTS:
        return tuple(listed)
    left = plural(len(listed) - MAX_COMPLAINTS, "more complaint")
    rest = Complaint(f"and {left}; mend the first ones and check again", listed[0].file)
    return (*listed[:MAX_COMPLAINTS], rest)


def cut_short(faults: Sequence[Fault], of: str, n_faults: int | None = None) -> list[Fault]:
    """Return the first faults of a long list, and a last one that counts the others.

    `n_faults` is how many there are, where `faults` does not hold all of them.
    """
    n_left = (n_faults or len(faults)) - MAX_COMPLAINTS_PER_LIST
    if n_left <= 0:
        return list(faults)
    first_left = faults[MAX_COMPLAINTS_PER_LIST].at
    rest = Fault(first_left, f"and {plural(n_left, 'more fault')} in {of}; mend the first ones and check again")
    return [*faults[:MAX_COMPLAINTS_PER_LIST], rest]
