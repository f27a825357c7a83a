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


@dataclass(frozen=True, slots=True)
class Reading:
    """What a written name is taken for.

    Attributes
    ----------
    written : the name as it stands.
    irrep : what it names, or None.
    is_respelled : True where the name is understood, but not written as the project writes it.
    candidates : where nothing is named, what may have been meant, the likeliest first.
    lacks_sign : True where a linear molecule's state is named but for the sign of Σ.

    """

    written: str
    irrep: Irrep | None
    is_respelled: bool = False
    candidates: tuple[Irrep, ...] = ()
    lacks_sign: bool = False


def read_orbital(group: PointGroup, written: str) -> Reading:
    """Read the name of an irrep that counts orbitals or their electrons."""
    found = find_orbital_irrep(group, written)
    return Reading(written, found) if found else _read_otherwise(group, written)


def read_state(group: PointGroup, written: str) -> Reading:
    """Read the name of a state's irrep; a term symbol (3B1g) is understood, and so is an atom's without parity."""
    found = find_irrep(group, written)
    if found is not None:
        return Reading(written, found)
    bare = re.sub(r"^\d+", "", unicodedata.normalize("NFKC", written).strip())
    agreeing = agreeing_irreps(group, bare)
    if group.symbol == "Kh" and agreeing:
        return Reading(written, agreeing[0], is_respelled=bare != written)
    if [irrep.name[-1] for irrep in agreeing] == ["+", "-"]:
        return Reading(written, None, candidates=agreeing, lacks_sign=True)
    return _read_otherwise(group, written, bare)


def _read_otherwise(group: PointGroup, written: str, bare: str | None = None) -> Reading:
    respelled = respelled_irrep(group, bare or written)
    if respelled is not None:
        return Reading(written, respelled, is_respelled=True)
    return Reading(written, None, candidates=nearest_irreps(group, bare or written))


_PRIMES = str.maketrans({'"': "''", "\u2032": "'", "\u2033": "''", "\u2019": "'", "\u201d": "''"})


def find_irrep(group: PointGroup, written: str) -> Irrep | None:
    """Return the irrep that bears the name, case ignored, Greek letters also spelled out; else None.

    Primes may be written with any of the marks that look like one or two of them.
    """
    return group.by_name.get(written.strip().casefold().translate(_PRIMES))


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
    """Return the irreps of the same letter that differ in the fewest marks; empty if no irrep has the letter."""
    agreeing = agreeing_irreps(group, written)
    if agreeing:
        return agreeing[:MOST_SUGGESTED]
    label = parse_label(written)
    if label is None:
        return ()
    wanted = _modern(label, group)
    gaps = [
        (_gap(wanted, has), irrep)
        for irrep in group.irreps
        if (has := _label(irrep, group)).letter == wanted.letter
    ]
    least = min((gap for gap, _ in gaps), default=0)
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
    """Return in how many marks two names of one letter differ."""
    return sum(int(a != b) for a, b in zip(astuple(wanted)[1:], astuple(has)[1:], strict=True))
