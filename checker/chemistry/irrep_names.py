"""Names of irreps: as the project writes them, in other spellings, and what a wrong one may have meant.

A Mulliken symbol is a letter with up to four marks: number, parity (g, u), primes, and the sign of a linear
molecule. Spellings differ in the order of the marks, in subscripts and in the characters used for primes, signs
and Greek letters; the marks themselves are the same, so names are compared by them.
"""

import re
import unicodedata
from dataclasses import astuple, dataclass
from functools import lru_cache

from checker.chemistry.irreps import LINEAR_LETTERS, Irrep, PointGroup

MOST_SUGGESTED = 4
LETTER_WEIGHT = 3
"""A wrong letter weighs as much as three wrong marks: people lose marks more often than they change letters."""

_SINGLE_PRIMES = "′’‘`´ʹ"
_OTHER_CHARACTERS = str.maketrans(
    {"∑": "σ", "∏": "π", "∆": "δ", "−": "-", "–": "-", '"': "''", "“": "''", "”": "''"}
    | dict.fromkeys(_SINGLE_PRIMES, "'")
)
_GREEK = {name.casefold(): letter.casefold() for letter, name in LINEAR_LETTERS.items()}
_OLD_LETTERS = {"f": "t"}  # F1, F2 of the older literature are T1, T2


@dataclass(frozen=True, slots=True)
class Label:
    """The parts of a name; an empty text where the name has no such mark."""

    letter: str
    number: str = ""
    parity: str = ""
    primes: str = ""
    sign: str = ""


@lru_cache(maxsize=1024)
def parse_label(written: str) -> Label | None:
    """Return the parts of a name, whatever its spelling, or None where it is no Mulliken symbol.

    >>> parse_label("A″1")
    Label(letter='a', number='1', parity='', primes="''", sign='')
    """
    text = unicodedata.normalize("NFKC", written.replace("´", "'")).casefold()  # NFKC would split the accent
    text = re.sub(r"[\s_{}^$()]", "", text.translate(_OTHER_CHARACTERS).replace("ς", "σ"))
    head = re.match("|".join([*_GREEK, "[a-zα-ω]"]), text)
    if head is None:
        return None
    marks = re.findall(r"\d+|[gu]|'+|[+-]", text[head.end() :])
    kinds = [
        "number" if m.isdigit() else "primes" if "'" in m else "parity" if m in "gu" else "sign" for m in marks
    ]
    if "".join(marks) != text[head.end() :] or len(set(kinds)) < len(kinds):
        return None
    return Label(_GREEK.get(head[0], head[0]), **dict(zip(kinds, marks, strict=True)))


def find_irrep(group: PointGroup, written: str) -> Irrep | None:
    """Return the irrep that bears the name, case ignored, Greek letters also spelled out; else None."""
    return group.by_name.get(written.strip().casefold())


def find_orbital_irrep(group: PointGroup, written: str) -> Irrep | None:
    """Return the irrep of an orbital's name, where a linear molecule or an atom needs fewer marks.

    An orbital's sign (σ is Σ+) and an atomic orbital's parity (s is Sg, p is Pu) follow from its letter.
    """
    found = find_irrep(group, written)
    if found is None and group.is_continuous:
        matching = [irrep for irrep in agreeing_irreps(group, written) if irrep.of_orbitals]
        return matching[0] if len(matching) == 1 else None
    return found


def respelled_irrep(group: PointGroup, written: str) -> Irrep | None:
    """Return the irrep whose marks are exactly those written, though in another spelling; else None."""
    label = parse_label(written)
    if label is None:
        return None
    return next((irrep for irrep in group.irreps if _label(irrep, group) == _modern(label, group)), None)


def agreeing_irreps(group: PointGroup, written: str) -> tuple[Irrep, ...]:
    """Return the irreps that have every mark written, and perhaps more."""
    label = parse_label(written)
    if label is None:
        return ()
    wanted = astuple(_modern(label, group))
    return tuple(
        irrep
        for irrep in group.irreps
        if all(mark in ("", has) for mark, has in zip(wanted, astuple(_label(irrep, group)), strict=True))
    )


def nearest_irreps(group: PointGroup, written: str) -> tuple[Irrep, ...]:
    """Return the irreps that differ least from a name that the group does not have; empty if none is near."""
    agreeing = agreeing_irreps(group, written)
    if agreeing:
        return agreeing[:MOST_SUGGESTED]
    label = parse_label(written)
    if label is None:
        return ()
    gaps = [(_gap(_modern(label, group), _label(irrep, group)), irrep) for irrep in group.irreps]
    least = min(gap for gap, _ in gaps)
    if least > LETTER_WEIGHT:
        return ()
    return tuple(irrep for gap, irrep in gaps if gap == least)[:MOST_SUGGESTED]


def _label(irrep: Irrep, group: PointGroup) -> Label:
    label = parse_label(irrep.name)
    assert label is not None, (group.symbol, irrep.name)
    return label


def _modern(label: Label, group: PointGroup) -> Label:
    """Replace a letter of the older literature, where the group has no irrep of that letter itself."""
    new = _OLD_LETTERS.get(label.letter)
    if new is None or group.is_continuous:
        return label
    return Label(new, label.number, label.parity, label.primes, label.sign)


def _gap(wanted: Label, has: Label) -> int:
    marks = zip(astuple(wanted)[1:], astuple(has)[1:], strict=True)
    return LETTER_WEIGHT * int(wanted.letter != has.letter) + sum(int(a != b) for a, b in marks)
