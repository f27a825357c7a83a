"""Point groups and their irreps: which there are, what they are called, how many functions each spans.

Nothing is typed but the naming rules; each family of groups is generated from the group it is built on:

- Cn: A, for even n B, and a pair E_k of complex conjugates for each k below n/2. S2n of even n is isomorphic to
  C2n; of odd n it is Cn with the inversion.
- Cnv, Dn and Dnd of even n (isomorphic to D2n): A1, A2, for an even axis B1, B2, and a true E_k. D2 has three
  equal axes and hence B1, B2, B3.
- A horizontal plane with odd n doubles every irrep into ' and ''; the inversion doubles it into g and u.
- E carries no number where there is only one.

A conjugate pair is counted as one irrep of dimension 2, as orbitals and real functions come in such pairs.

Source: R. S. Mulliken, J. Chem. Phys. 23, 1997 (1955) for the names; S. L. Altmann & P. Herzig, Point-Group
Theory Tables, 2nd ed. (2011) for families and orders (from memory).
"""

import difflib
import re
import unicodedata
from collections.abc import Callable
from dataclasses import dataclass
from functools import cache, cached_property, lru_cache

MAX_AXIS = 60
"""Highest order of an axis that is listed; molecules have none higher, and the lists would grow without end."""

MAX_MOMENTUM = 12
"""Highest angular momentum that is listed for the continuous groups."""

ATOMIC_LETTERS = "SPDFGHIKLMNOQ"
LINEAR_LETTERS = {
    "Σ": "Sigma", "Π": "Pi", "Δ": "Delta", "Φ": "Phi", "Γ": "Gamma", "Η": "Eta", "Ι": "Iota",
    "Κ": "Kappa", "Λ": "Lambda",
}  # fmt: skip
"""Letters for the axial angular momentum 0, 1, 2 ... and their names in plain letters."""


@dataclass(frozen=True, slots=True)
class Irrep:
    """An irreducible representation over the reals.

    Attributes
    ----------
    name : Mulliken symbol as the project writes it, such as ``B1g``, ``A''``, ``Σg+``.
    dimension : how many functions span it.
    complex_pair : True for two conjugate one-dimensional irreps taken together.
    of_orbitals : False where no function of one electron has this symmetry (Σ-, and the wrong parity in an atom).

    """

    name: str
    dimension: int
    complex_pair: bool = False
    of_orbitals: bool = True

    @property
    def plain_name(self) -> str:
        """The name in ASCII: ``Sigmag+`` for ``Σg+``."""
        return LINEAR_LETTERS.get(self.name[0], self.name[0]) + self.name[1:]


@dataclass(frozen=True)
class PointGroup:
    """A point group.

    Attributes
    ----------
    symbol : Schoenflies symbol as the project writes it, such as ``D2h`` or ``C∞v``.
    order : number of operations; None for the continuous groups.
    irreps : in the usual order of character tables; for the continuous groups as far as `MAX_MOMENTUM`.

    """

    symbol: str
    order: int | None
    irreps: tuple[Irrep, ...]

    @property
    def is_continuous(self) -> bool:
        """True for a linear molecule's groups and a free atom's."""
        return self.order is None

    @property
    def is_abelian(self) -> bool:
        """True where all operations commute, so that no irrep is truly degenerate."""
        return all(irrep.dimension == 1 or irrep.complex_pair for irrep in self.irreps)

    @cached_property
    def by_name(self) -> dict[str, Irrep]:
        """Irreps by their names in lower case, as written by the project and in ASCII."""
        return {name.casefold(): irrep for irrep in self.irreps for name in (irrep.plain_name, irrep.name)}


@lru_cache(maxsize=256)
def point_group(written: str) -> PointGroup | None:
    """Return the group of a Schoenflies symbol in any usual writing, or None where there is no such group.

    Case, blanks, underscores and subscripts do not matter; ``inf``, ``oo`` and the sign stand for infinity. Second
    names are followed: ``C1h`` is Cs, ``S2`` is Ci, ``C3i`` is S6, ``S3`` is C3h.

    >>> point_group("d_2h").symbol, point_group("Cinfv").symbol, point_group("C3x")
    ('D2h', 'C∞v', None)
    """
    plain = _plain(written)
    if plain in _FIXED:
        return _fixed_group(*_FIXED[plain])
    match = re.fullmatch(r"([cds])(\d{1,3})([vhdi]?)", plain)
    return None if match is None else _axial_group(match[1], int(match[2]), match[3])


@cache
def common_groups() -> tuple[str, ...]:
    """Symbols of the groups with axes up to 8 and of those without a number."""
    written = [f"{kind}{n}{end}" for n in range(1, 9) for kind in "CDS" for end in ("", "v", "h", "d")]
    groups = [point_group(symbol) for symbol in (*_FIXED, *written)]
    return tuple(dict.fromkeys(group.symbol for group in groups if group is not None))


def nearest_groups(written: str, most: int = 3) -> tuple[str, ...]:
    """Return the symbols that look most like what was written, the likeliest first; empty if nothing is near."""
    by_plain = {_plain(symbol).replace("∞", "inf"): symbol for symbol in common_groups()}
    plain = _plain(written[:20]).replace("∞", "inf")
    return tuple(by_plain[near] for near in difflib.get_close_matches(plain, by_plain, most, 0.6))


def _plain(written: str) -> str:
    text = unicodedata.normalize("NFKC", written).casefold()
    text = re.sub(r"[\s_{}$^]", "", text)
    return re.sub(r"^([cd])(inf(?:inity)?|oo)(?=[vh]$)", r"\1∞", text)


def _cyclic(n: int) -> list[Irrep]:
    return [Irrep("A", 1), *([Irrep("B", 1)] if n % 2 == 0 else []), *_doubly_degenerate(n, complex_pair=True)]


def _dihedral(n: int) -> list[Irrep]:
    letters = "AB" if n % 2 == 0 else "A"
    return [*(Irrep(f"{letter}{i}", 1) for letter in letters for i in (1, 2)), *_doubly_degenerate(n)]


def _doubly_degenerate(n: int, complex_pair: bool = False) -> list[Irrep]:
    numbers = range(1, (n + 1) // 2)
    return [Irrep(f"E{k}" if len(numbers) > 1 else "E", 2, complex_pair) for k in numbers]


def _with_axes(n: int) -> list[Irrep]:
    return _named("A B1 B2 B3") if n == 2 else _dihedral(n)


def _named(names: str) -> list[Irrep]:
    return [Irrep(name, _DIMENSIONS[name[0]]) for name in names.split()]


_DIMENSIONS = {"A": 1, "B": 1, "E": 2, "T": 3, "G": 4, "H": 5}


def _doubled(irreps: list[Irrep], marks: tuple[str, str]) -> list[Irrep]:
    return [Irrep(irrep.name + mark, irrep.dimension, irrep.complex_pair) for mark in marks for irrep in irreps]


def _inverted(irreps: list[Irrep]) -> list[Irrep]:
    return _doubled(irreps, ("g", "u"))


def _with_plane(irreps: list[Irrep], n: int) -> list[Irrep]:
    return _inverted(irreps) if n % 2 == 0 else _doubled(irreps, ("'", "''"))


def _linear(parities: tuple[str, ...]) -> list[Irrep]:
    irreps = []
    for parity in parities:
        irreps += [Irrep(f"Σ{parity}+", 1), Irrep(f"Σ{parity}-", 1, of_orbitals=False)]
        irreps += [Irrep(letter + parity, 2) for letter in list(LINEAR_LETTERS)[1:]]
    return irreps


def _atomic() -> list[Irrep]:
    return [
        Irrep(letter + parity, 2 * momentum + 1, of_orbitals=(momentum % 2 == 0) == (parity == "g"))
        for momentum, letter in enumerate(ATOMIC_LETTERS)
        for parity in "gu"
    ]


_TETRAHEDRAL = [Irrep("A", 1), Irrep("E", 2, complex_pair=True), Irrep("T", 3)]
_OCTAHEDRAL = "A1 A2 E T1 T2"
_ICOSAHEDRAL = "A T1 T2 G H"

#: Groups without a free number: symbol, order, irreps.
_FIXED: dict[str, tuple[str, int | None, Callable[[], list[Irrep]]]] = {
    "c1": ("C1", 1, lambda: _named("A")),
    "cs": ("Cs", 2, lambda: _named("A' A''")),
    "ci": ("Ci", 2, lambda: _named("Ag Au")),
    "t": ("T", 12, lambda: _TETRAHEDRAL),
    "td": ("Td", 24, lambda: _named(_OCTAHEDRAL)),
    "th": ("Th", 24, lambda: _inverted(_TETRAHEDRAL)),
    "o": ("O", 24, lambda: _named(_OCTAHEDRAL)),
    "oh": ("Oh", 48, lambda: _inverted(_named(_OCTAHEDRAL))),
    "i": ("I", 60, lambda: _named(_ICOSAHEDRAL)),
    "ih": ("Ih", 120, lambda: _inverted(_named(_ICOSAHEDRAL))),
    "c∞v": ("C∞v", None, lambda: _linear(("",))),
    "d∞h": ("D∞h", None, lambda: _linear(("g", "u"))),
    "kh": ("Kh", None, _atomic),
}

#: Families: by kind and ending of the symbol, the order for an axis n and the irreps.
_FAMILIES: dict[str, tuple[int, Callable[[int], list[Irrep]]]] = {
    "c": (1, _cyclic),
    "cv": (2, _dihedral),
    "ch": (2, lambda n: _with_plane(_cyclic(n), n)),
    "d": (2, _with_axes),
    "dh": (4, lambda n: _with_plane(_with_axes(n), n)),
    "dd": (4, lambda n: _dihedral(2 * n) if n % 2 == 0 else _inverted(_dihedral(n))),
    "s": (1, lambda n: _cyclic(n) if n % 4 == 0 else _inverted(_cyclic(n // 2))),
}


@cache
def _fixed_group(symbol: str, order: int | None, irreps: Callable[[], list[Irrep]]) -> PointGroup:
    return PointGroup(symbol, order, tuple(irreps()))


def _axial_group(kind: str, n: int, ending: str) -> PointGroup | None:
    """Return the group of a symbol with a number, second names followed."""
    if not 1 <= n <= MAX_AXIS:
        return None
    second_name = _second_name(kind, n, ending)
    if second_name is not None:
        return point_group(second_name)
    if kind + ending not in _FAMILIES or n == 1:
        return None
    order_per_n, irreps = _FAMILIES[kind + ending]
    return PointGroup(f"{kind.upper()}{n}{ending}", order_per_n * n, tuple(irreps(n)))


def _second_name(kind: str, n: int, ending: str) -> str | None:
    """Return the usual symbol of a group that was called by another one: S1, S2, S3, C1h, C3i ..."""
    if (kind, n) == ("c", 1) and ending in ("h", "v"):
        return "Cs"
    if kind == "s" and not ending and n % 2 == 1:
        return "Cs" if n == 1 else f"C{n}h"
    if (kind, ending) == ("c", "i") and n % 2 == 1:
        return "Ci" if n == 1 else f"S{2 * n}"
    return "Ci" if (kind, n, ending) == ("s", 2, "") else None
