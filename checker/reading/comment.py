"""The comment line of an XYZ frame: words ``key=value`` as extended XYZ writes them, prose between ignored."""

import math
import re
from collections.abc import Iterator
from dataclasses import dataclass, field
from functools import lru_cache
from typing import NamedTuple

from checker.reading.reals import real
from checker.reading.words import quoted

# quoted text is taken whole, so that what it holds is not mistaken for a word of the line
_WORD = re.compile(
    r"""(?<![\w-])(?P<key>[A-Za-z_][\w-]*)[ \t]*=[ \t]*(?:"(?P<double>[^"]*)"|'(?P<single>[^']*)'|"""
    r"""\{(?P<braces>[^}]*)\}|(?P<bare>[^\s,;]+))|"[^"]*"|'[^']*'"""
)
_INTEGER = re.compile(r"([+-]?\d{1,18})(?:\.0*)?")
_SIGN_LAST = re.compile(r"(\d{1,3})([+-])")
_FLAGS = {"t": True, "true": True, "1": True, "f": False, "false": False, "0": False}

PLAIN = "species:S:1:pos:R:3"


class CommentFault(NamedTuple):
    """What is wrong with a word of the line, the column of its key, and the deck key it speaks of."""

    column: int
    message: str
    key: str | None = None


@dataclass(slots=True)
class Comment:
    """What a comment line says; None where it is silent. `columns` are those of charge and multiplicity."""

    charge: int | None = None
    multiplicity: int | None = None
    lattice: tuple[float, ...] | None = None
    periodic: tuple[bool, bool, bool] | None = None
    properties: str | None = None
    columns: dict[str, int] = field(default_factory=dict)
    faults: list[CommentFault] = field(default_factory=list)


class Layout(NamedTuple):
    """Which columns of a row hold the element and x; `width` columns must be there."""

    element: int
    x: int
    width: int


def read_comment(line: str) -> Comment:
    """Read charge, multiplicity, lattice, periodic flags and column layout from a comment line."""
    comment = Comment()
    if "=" not in line:
        return comment
    for word in _WORD.finditer(line):
        key = (word["key"] or "").lower()
        if key in _READERS:
            value = word[word.lastgroup or "bare"]
            comment.faults += _READERS[key](comment, key, value, word.start() + 1)
    return comment


def _read_integer(comment: Comment, key: str, value: str, column: int) -> Iterator[CommentFault]:
    number = _INTEGER.fullmatch(value.strip())
    if number is None:
        yield CommentFault(column, _no_integer(key, value), f"species.{key}")
        return
    before = getattr(comment, key)
    if before not in (None, int(number[1])):
        message = f"the comment line says {key}={before} and {key}={int(number[1])}; keep one of the two"
        yield CommentFault(column, message, f"species.{key}")
        return
    setattr(comment, key, int(number[1]))
    comment.columns.setdefault(key, column)


def _no_integer(key: str, value: str) -> str:
    turned = _SIGN_LAST.fullmatch(value.strip()) if key == "charge" else None
    how = f"; write {key}={turned[2]}{turned[1]}" if turned else f", such as {key}=1"
    return f"{key} on the comment line is {quoted(value)}, but must be a whole number{how}"


def _read_lattice(comment: Comment, _: str, value: str, column: int) -> Iterator[CommentFault]:
    comment.lattice = lattice_of(value)
    if comment.lattice is None:
        message = f"Lattice on the comment line is {quoted(value)}, but must be nine numbers in quotes"
        yield CommentFault(column, message)


@lru_cache(maxsize=256)  # the frames of one file mostly share a cell
def lattice_of(written: str) -> tuple[float, ...] | None:
    """Return the nine numbers of a cell, or None where they are not that."""
    try:
        numbers = tuple(real(part.encode()) for part in written.replace(",", " ").split())
    except ValueError:
        return None
    return numbers if len(numbers) == 9 and all(map(math.isfinite, numbers)) else None


def _read_periodic(comment: Comment, _: str, value: str, column: int) -> Iterator[CommentFault]:
    flags = [_FLAGS.get(part) for part in value.lower().replace(",", " ").split()]
    if len(flags) != 3 or None in flags:
        message = f'pbc on the comment line is {quoted(value)}, but must be three flags in quotes, such as "F F F"'
        yield CommentFault(column, message)
        return
    comment.periodic = (bool(flags[0]), bool(flags[1]), bool(flags[2]))


def _read_properties(comment: Comment, _: str, value: str, column: int) -> Iterator[CommentFault]:
    if layout_of(value) is None:
        message = (
            f"Properties on the comment line is {quoted(value)}, but must name the columns, with species:S:1 or "
            f"Z:I:1 and pos:R:3 among them, such as Properties={PLAIN}"
        )
        yield CommentFault(column, message)
        return
    comment.properties = value


@lru_cache(maxsize=256)
def layout_of(properties: str) -> Layout | None:
    """Return the layout of rows that a Properties word describes, or None if it leaves out element or position.

    >>> layout_of("id:I:1:species:S:1:pos:R:3")
    Layout(element=1, x=2, width=5)
    """
    parts = properties.split(":")
    starts: dict[str, int] = {}
    width = 0
    for name, kind, count in zip(parts[0::3], parts[1::3], parts[2::3], strict=False):
        if not re.fullmatch(r"[0-9]{1,4}", count):
            return None
        starts.setdefault(f"{name.lower()}:{kind.upper()}:{int(count)}", width)
        width += int(count)
    if len(parts) % 3 or "pos:R:3" not in starts:
        return None
    element = starts.get("species:S:1", starts.get("z:I:1"))
    return None if element is None else Layout(element, starts["pos:R:3"], width)


_READERS = {
    "charge": _read_integer,
    "multiplicity": _read_integer,
    "lattice": _read_lattice,
    "pbc": _read_periodic,
    "properties": _read_properties,
}
PLAIN_LAYOUT = Layout(0, 1, 4)
