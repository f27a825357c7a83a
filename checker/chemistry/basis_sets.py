"""What a basis set consists of: shells of each element, number of functions, and the sets that have an element.

A shell of angular momentum l is 2l+1 spherical or (l+1)(l+2)/2 cartesian functions. Electrons that a set's core
potential replaces are told by `checker.chemistry.core_potentials`.

References: the catalogue of the library basis_set_exchange: B. P. Pritchard, D. Altarawy, B. Didier, T. D. Gibson,
T. L. Windus, J. Chem. Inf. Model. 59, 4814 (2019).
"""

import re
from collections.abc import Mapping
from dataclasses import dataclass, field
from functools import cache, cached_property, lru_cache
from types import MappingProxyType
from typing import Literal

from checker.chemistry.basis_names import (
    LONGEST,
    Polarized,
    key_of,
    keys_of,
    loose_key_of,
    nearest_keys,
    read_polarized,
)
from checker.tables.basis_sets import BasisSetRow, basis_set_rows

__all__ = [
    "BasisSet",
    "Form",
    "Shells",
    "basis_set",
    "elements_of",
    "form_of",
    "n_functions",
    "nearest_names",
    "nearest_set_with",
    "shells_of",
]

Form = Literal["spherical", "cartesian"]

_LETTERS = "spdfghiklm"
_TERM = re.compile(rf"(\d+)([{_LETTERS}])")
_LIKE_ENOUGH = 0.75
_REMEMBERED = 1024
_HELIUM, _CARBON, _ARGON = 2, 6, 18
#: Families for general use, the first of which that has an element is taken; common practice, no source.
_GENERAL_USE = (
    ("def2-SVP", "def2-TZVP", "def2-QZVP"),
    ("ANO-RCC-VDZP", "ANO-RCC-VTZP", "ANO-RCC-VQZP"),
    ("jorge-DZP-DKH", "jorge-TZP-DKH"),
    ("dyall-v2z", "dyall-v3z", "dyall-v4z"),
)


@dataclass(frozen=True, slots=True)
class Shells:
    """The shells of one angular momentum of an atom.

    Attributes
    ----------
    angular_momentum : l; 0 is s, 1 is p.
    n_contracted : shells after contraction, each of which is a full set of functions of that l.
    n_primitive : exponents; a combined sp shell counts them in both s and p.

    """

    angular_momentum: int
    n_contracted: int
    n_primitive: int

    def n_functions(self, form: Form) -> int:
        """Return the basis functions of these shells."""
        return self.n_contracted * functions_per_shell(self.angular_momentum, form)


def functions_per_shell(angular_momentum: int, form: Form) -> int:
    """Return 2l+1 spherical or (l+1)(l+2)/2 cartesian functions.

    >>> functions_per_shell(2, "spherical"), functions_per_shell(2, "cartesian")
    (5, 6)
    """
    if form == "spherical":
        return 2 * angular_momentum + 1
    return (angular_momentum + 1) * (angular_momentum + 2) // 2


@dataclass(frozen=True, eq=False)
class BasisSet:
    """A basis set; what it has for each element is unpacked on first use.

    Attributes
    ----------
    name : as published.
    role : "orbital", "potential" (a core potential without functions) or the purpose of an auxiliary set.
    cartesian : angular momenta for which the set is made for cartesian functions.
    contents : packed elements and shells, as in ``basis_sets.csv``.

    """

    name: str
    role: str
    cartesian: tuple[int, ...]
    contents: str = field(repr=False)

    @property
    def is_auxiliary(self) -> bool:
        """True for a set that fits densities or products, or starts a calculation, and expands no orbitals."""
        return self.role not in {"orbital", "potential"}

    @property
    def form(self) -> Form:
        """The form that the set is made for: cartesian where its d functions are."""
        return "cartesian" if self.cartesian else "spherical"

    @cached_property
    def shells(self) -> Mapping[int, tuple[Shells, ...]]:
        """{atomic number: shells by rising l}; a core potential alone has none."""
        found: dict[int, tuple[Shells, ...]] = {}
        for group in self.contents.split():
            elements, _, shells = group.partition(":")
            found.update(dict.fromkeys(_numbers(elements), _shells(shells)))
        return MappingProxyType(dict(sorted(found.items())))

    def form_at(self, angular_momentum: int, form: Form | None = None) -> Form:
        """Return the form of shells of an l: the one given, else the set's own."""
        return form or ("cartesian" if angular_momentum in self.cartesian else "spherical")

    def n_functions(self, z: int, form: Form | None = None) -> int | None:
        """Return the functions on an atom; None for an element that the set lacks or a core potential alone."""
        shells = self.shells.get(z)
        if not shells:
            return None
        return sum(shell.n_functions(self.form_at(shell.angular_momentum, form)) for shell in shells)


@lru_cache(_REMEMBERED)
def basis_set(name: str) -> BasisSet | None:
    """Return the set of a name as people write it, or None.

    >>> basis_set("6-31g(d)").name, basis_set("ccpvtz").name, basis_set("my own")
    ('6-31G*', 'cc-pVTZ', None)
    """
    key = key_of(name)
    position = _by_key().get(key)
    if position is not None:
        return _set_at(*position)
    polarized = read_polarized(key)
    if polarized is not None:
        return _polarized_set(polarized)
    same = _by_loose_key().get(loose_key_of(key), ())
    return _set_at(*same[0]) if len(same) == 1 else None


def shells_of(name: str, z: int) -> tuple[Shells, ...] | None:
    """Return the shells of an element by rising l; None where the set is unknown or lacks the element.

    >>> shells_of("cc-pVDZ", 6)[2]
    Shells(angular_momentum=2, n_contracted=1, n_primitive=1)
    """
    found = basis_set(name)
    return None if found is None else found.shells.get(z)


def n_functions(name: str, z: int, form: Form | None = None) -> int | None:
    """Return the basis functions on an atom, in the form given or the set's own; None where not known.

    >>> n_functions("6-31G*", 6), n_functions("6-31G*", 6, "spherical"), n_functions("6-31G*", 92)
    (15, 14, None)
    """
    found = basis_set(name)
    return None if found is None else found.n_functions(z, form)


def elements_of(name: str) -> frozenset[int] | None:
    """Return the atomic numbers that a set has; None where the set is unknown."""
    found = basis_set(name)
    return None if found is None else frozenset(found.shells)


def form_of(name: str) -> Form | None:
    """Return the form that a set is made for; None where the set is unknown."""
    found = basis_set(name)
    return None if found is None else found.form


@lru_cache(_REMEMBERED)
def nearest_names(name: str, limit: int = 3) -> tuple[str, ...]:
    """Return the names of known sets most like a name, best first; empty where none is like it.

    >>> nearest_names("cc-pVTTZ", 1)
    ('cc-pVTZ',)
    """
    known = _by_key()
    return tuple(_set_at(*known[key]).name for key in nearest_keys(key_of(name), known, limit))


@lru_cache(_REMEMBERED)
def nearest_set_with(name: str, z: int) -> str | None:
    """Return the known set nearest to a set that has an element; None where none is near.

    Near is the most alike name among sets of the same role, else, for an orbital set, the set for general use
    whose size on carbon, or the lightest element of both, is closest. An unknown name is taken for that of an
    orbital set.

    >>> nearest_set_with("cc-pVTZ", 53), nearest_set_with("6-31G*", 79)
    ('cc-pVTZ-PP', 'def2-SVP')
    """
    given = basis_set(name)
    role = "orbital" if given is None else given.role
    alike = _alike_with(key_of(name), z, role)
    if alike is not None or given is None or role != "orbital":
        return alike
    return min(_general_use_with(z), key=lambda other: _size_difference(given, other), default=given).name


def _alike_with(key: str, z: int, role: str) -> str | None:
    from difflib import SequenceMatcher

    matcher = SequenceMatcher(b=key[:LONGEST])
    best, likeness = None, _LIKE_ENOUGH
    for other, position in _by_key().items():
        if position[0].role != role:
            continue
        matcher.set_seq1(other)
        if matcher.real_quick_ratio() > likeness and matcher.ratio() > likeness:
            found = _set_at(*position)
            if z in found.shells:
                best, likeness = found.name, matcher.ratio()
    return best


def _general_use_with(z: int) -> list[BasisSet]:
    for family in _GENERAL_USE:
        found = [known for name in family if (known := basis_set(name)) is not None and z in known.shells]
        if found:
            return found
    return []


def _size_difference(given: BasisSet, other: BasisSet) -> int:
    """Return by how many functions two sets differ on carbon, or on the lightest element of both."""
    both = given.shells.keys() & other.shells.keys()
    if not both:
        return 0
    z = _CARBON if _CARBON in both else min(both)
    return abs((given.n_functions(z, "spherical") or 0) - (other.n_functions(z, "spherical") or 0))


@cache
def _by_key() -> dict[str, tuple[BasisSetRow, str]]:
    positions = [(row, name) for row in basis_set_rows() for name in row.names]
    found: dict[str, tuple[BasisSetRow, str]] = {}
    for key, position in zip(keys_of(name for _, name in positions), positions, strict=True):
        found.setdefault(key, position)
    return found


@cache
def _by_loose_key() -> Mapping[str, list[tuple[BasisSetRow, str]]]:
    found: dict[str, list[tuple[BasisSetRow, str]]] = {}
    for key, position in _by_key().items():
        found.setdefault(loose_key_of(key), []).append(position)
    return found


@cache
def _set_at(row: BasisSetRow, name: str) -> BasisSet:
    return BasisSet(name, row.role, row.cartesian, row.contents)


def _polarized_set(polarized: Polarized) -> BasisSet | None:
    """Return the set that a name spells out: another one, and polarization functions on its atoms up to argon.

    Each polarization function is one exponent. Such sets are spherical in the catalogue.
    """
    base = basis_set(polarized.base)
    if base is None:
        return None
    groups = []
    for z, shells in base.shells.items():
        if z <= _ARGON:
            added = polarized.on_light if z <= _HELIUM else polarized.on_heavy
            primitive = "".join(f"{s.n_primitive}{_LETTERS[s.angular_momentum]}" for s in shells)
            contracted = "".join(f"{s.n_contracted}{_LETTERS[s.angular_momentum]}" for s in shells)
            groups.append(f"{z}:{primitive}{added}/{contracted}{added}")
    return BasisSet(base.name + polarized.suffix, base.role, (), " ".join(groups))


def _numbers(text: str) -> list[int]:
    """Return [1, 3, 4] of ``1+3-4``."""
    numbers: list[int] = []
    for part in text.split("+"):
        first, _, last = part.partition("-")
        numbers += range(int(first), int(last or first) + 1)
    return numbers


@cache
def _shells(text: str) -> tuple[Shells, ...]:
    """Return the shells of ``9s4p1d/3s2p1d``."""
    primitive, _, contracted = text.partition("/")
    n_primitive = {letter: int(count) for count, letter in _TERM.findall(primitive)}
    return tuple(
        Shells(_LETTERS.index(letter), int(count), n_primitive[letter])
        for count, letter in _TERM.findall(contracted)
    )
