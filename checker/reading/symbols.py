"""Element symbols as people write them, and what to say of those that are none."""

import re
from functools import lru_cache
from typing import NamedTuple

from checker.elements import (
    HYDROGEN_ISOTOPES,
    MAX_ATOMIC_NUMBER,
    mass_number_of,
    name_of,
    number_of,
    numbers_by_symbol,
    symbol_of,
)
from checker.reading.words import nearest, quoted

_LABEL = re.compile(r"([A-Za-z]{1,2})[^A-Za-z]")
_ISOTOPE = re.compile(r"\d{1,3}-?([A-Za-z]{1,2})$")
_STAND_IN = re.compile(r"(x+|dummy|ghost)([^a-z].*)?$", re.IGNORECASE)


class Nuclide(NamedTuple):
    """An element by atomic number, and the mass number, 0 for the natural mixture."""

    number: int
    mass_number: int


@lru_cache(maxsize=4096)
def nuclide(written: str) -> Nuclide | None:
    """Return what a symbol in any case (D and T too) or an atomic number in digits stands for, or None.

    >>> nuclide("FE"), nuclide("d"), nuclide("8"), nuclide("Xq")
    (Nuclide(number=26, mass_number=0), Nuclide(number=1, mass_number=2), Nuclide(number=8, mass_number=0), None)
    """
    if re.fullmatch(r"[0-9]{1,3}", written):
        return nuclide_of_number(int(written))
    z = number_of(written) if written.isascii() else None  # the long s is no sulfur, though it capitalizes to S
    return None if z is None else Nuclide(z, mass_number_of(written))


def nuclide_of_number(z: int) -> Nuclide | None:
    """Return the element of an atomic number, or None."""
    return Nuclide(z, 0) if 1 <= z <= MAX_ATOMIC_NUMBER else None


def sentence_on_symbol(written: str, *, in_table: bool = False) -> str:
    """Return the complaint about a text that stands where an element symbol should.

    `in_table` tells that it is the key of a table by element, not the row of an atom.
    """
    said = quoted(written)
    stand_in = _STAND_IN.match(written)
    if stand_in:
        return f"{said} is no element; {_GHOST}"
    isotope = _ISOTOPE.match(written)
    if isotope and number_of(isotope[1]):
        return f"{said} names an isotope; write {_proper(isotope[1])}, as only D and T are known by mass"
    label = _LABEL.match(written)
    if label and number_of(label[1]):
        proper = _proper(label[1])
        why = "" if in_table else _LABELS
        return f"{said} is the element {proper} with a label or charge; write {proper} alone{why}"
    meant = _meant(written)
    if meant:
        return f"{said} is no element; the nearest is {meant}"
    return f"{said} is no element; write its symbol{'' if in_table else ' or its atomic number'}"


_GHOST = "write the element whose basis functions it carries, and its number in ghost_atoms"
_LABELS = ", as atoms are numbered in the order they stand and the charge is said in species.charge"


def sentence_on_number(z: int) -> str:
    """Return the complaint about an atomic number out of range."""
    shown = z if abs(z) < 10**6 else "that large number"
    if z == 0:
        return f"no element has the atomic number 0; {_GHOST}"
    return f"no element has the atomic number {shown}; they run from 1 to {MAX_ATOMIC_NUMBER}"


def _proper(symbol: str) -> str:
    written = symbol.capitalize()
    return written if written in HYDROGEN_ISOTOPES else symbol_of(number_of(symbol) or 0)


def _meant(written: str) -> str | None:
    """Return the symbol whose element's name is nearest to a word, or that a short word holds."""
    word = written.strip()
    if len(word) > 3:
        by_name = {name_of(z): symbol for symbol, z in numbers_by_symbol().items()}
        name = nearest(word, list(by_name), 0.8)
        return by_name[name] if name else None
    return next((_proper(part) for part in (word[:2], word[:1], word[1:]) if number_of(part)), None)
