"""How many electrons published core potentials replace, and how many f electrons some of them hold in the core.

A small-core potential leaves the open f shell to the calculation: 28 replaced for Gd, whose 4f7 is counted. An
f-in-core potential replaces it too: 46 + 7 = 53 for trivalent Gd, and the f spin is no longer in the books.

References: the catalogue of the library basis_set_exchange; M. Dolg, H. Stoll, A. Savin, H. Preuss, Theor. Chim.
Acta 75, 173 (1989); A. Moritz, X. Cao, M. Dolg, Theor. Chem. Acc. 117, 297 (2007).
"""

import re
from collections import defaultdict
from collections.abc import Mapping
from dataclasses import dataclass
from functools import cache

from checker import tables
from checker.chemistry.shells import functions_in_subshell
from checker.elements import symbol_of
from checker.errors import NotDerivable

__all__ = [
    "PublishedCount",
    "electrons_replaced",
    "f_electrons_in_core",
    "f_unpaired_in_core",
    "is_known_set",
    "nearest_counts",
    "published_counts",
]

_F_FUNCTIONS = functions_in_subshell(3)
_SEPARATORS = re.compile(r"[\s\-_]+")
#: Energy-consistent potentials are named by the electrons they replace: ECP28MDF.
_COUNT_IN_NAME = re.compile(r"ecp(\d{1,3})[ms](wb|df|hf|db|dq)")
_N_EXAMPLES = 3


@dataclass(frozen=True, slots=True)
class PublishedCount:
    """A number of electrons that published potentials of an element replace.

    Attributes
    ----------
    electrons : replaced per atom, above 0.
    f_electrons_in_core : electrons of an f shell, open in the free ion, that are among them.
    sets : names of some sets that do so, at most three.

    """

    electrons: int
    f_electrons_in_core: int
    sets: tuple[str, ...]

    @property
    def f_unpaired_in_core(self) -> int:
        """Unpaired f electrons (2S of f^n by Hund's first rule) that leave the books with the core."""
        return f_unpaired(self.f_electrons_in_core)


def f_unpaired(n_f: int) -> int:
    """Return the unpaired electrons of f^n by Hund's first rule.

    >>> f_unpaired(7), f_unpaired(9)
    (7, 5)
    """
    return min(n_f, 2 * _F_FUNCTIONS - n_f)


@cache
def published_counts(z: int) -> tuple[PublishedCount, ...]:
    """Return the counts that published potentials of an element use, ascending; empty where there are none."""
    sets: dict[tuple[int, int], list[str]] = defaultdict(list)
    for row in tables.core_potentials():
        electrons = row.replaced.get(z, 0)
        if electrons:
            n_f = 0 if row.below_open_f is None else electrons - row.below_open_f
            sets[electrons, n_f] += row.names
    return tuple(PublishedCount(*key, _examples(names)) for key, names in sorted(sets.items()))


def nearest_counts(z: int, replaced: int) -> tuple[PublishedCount, ...]:
    """Return the published counts, the nearest to a number first, each number of electrons once.

    Of two as near, the one with fewer f electrons in the core comes first.
    """
    by_electrons = {count.electrons: count for count in reversed(published_counts(z))}
    return tuple(
        sorted(
            by_electrons.values(), key=lambda count: (abs(count.electrons - replaced), count.f_electrons_in_core)
        )
    )


def electrons_replaced(set_name: str, z: int) -> int | None:
    """Return the electrons that a set's potential replaces for an element.

    The name is read as people write it, see `basis_names`; a family's orbital sets (``def2-TZVP``) and its
    potential (``def2-ECP``) are both known. 0 is an all-electron element of the set; elements lighter than all
    those that a potential is made for are all-electron too. None where the set or the element in it is unknown.

    >>> electrons_replaced("def2tzvp", 53), electrons_replaced("def2-TZVP", 6), electrons_replaced("mine", 53)
    (28, 0, None)
    """
    name = _table_name(set_name)
    counted = _COUNT_IN_NAME.fullmatch(name)
    if counted is not None:
        electrons = int(counted[1])
        return electrons if electrons < z else None
    replaced = _sets_by_plain_name().get(name)
    if replaced is None:
        return None
    lightest = min((element for element, electrons in replaced.items() if electrons), default=0)
    return replaced.get(z, 0 if z < lightest else None)


def is_known_set(set_name: str) -> bool:
    """Tell whether a set is in the table, or its name states what it replaces."""
    name = _table_name(set_name)
    return name in _sets_by_plain_name() or _COUNT_IN_NAME.fullmatch(name) is not None


def f_electrons_in_core(z: int, replaced: int, set_name: str | None = None) -> int:
    """Return how many electrons of an f shell, open in the free ion, a potential of that size holds in the core.

    0 for a count that no f-in-core potential uses. Raises NotDerivable where potentials with and without f
    electrons in the core replace as many (54 for Gd, Tb and Dy), unless the name of the set decides.
    """
    if set_name is not None and _sets_by_plain_name().get(_table_name(set_name), {}).get(z) == replaced:
        return replaced - _below_open_f().get(_table_name(set_name), replaced)
    candidates = {count.f_electrons_in_core for count in published_counts(z) if count.electrons == replaced}
    if len(candidates) > 1:
        ways = " or ".join(f"{n} f electrons" for n in sorted(candidates))
        raise NotDerivable(
            f"published potentials that replace {replaced} electrons of {symbol_of(z)} hold {ways} in the core; "
            "state core_potential.name"
        )
    return candidates.pop() if candidates else 0


def f_unpaired_in_core(z: int, replaced: int, set_name: str | None = None) -> int:
    """Return the unpaired f electrons that such a potential takes out of the books; see `f_electrons_in_core`."""
    return f_unpaired(f_electrons_in_core(z, replaced, set_name))


def _examples(names: list[str]) -> tuple[str, ...]:
    """Return the potentials' own names before those of basis sets, short ones first."""
    ranked = sorted(set(names), key=lambda name: ("ecp" not in name.casefold(), len(name), name))
    return tuple(ranked[:_N_EXAMPLES])


@cache
def _sets_by_plain_name() -> Mapping[str, Mapping[int, int]]:
    """Return {plain name: {z: electrons replaced}}; a name that stands in several rows has all their elements."""
    found: dict[str, dict[int, int]] = {}
    for row in tables.core_potentials():
        for name in row.names:
            found.setdefault(_plain(name), {}).update(row.replaced)
    return found


@cache
def _below_open_f() -> Mapping[str, int]:
    rows = (row for row in tables.core_potentials() if row.below_open_f is not None)
    return {_plain(name): row.below_open_f for row in rows for name in row.names if row.below_open_f is not None}


def _table_name(set_name: str) -> str:
    """Return the plain name that the table has for a set, also where it is written as 6-31G(d) for 6-31G*."""
    name = _plain(set_name)
    if name in _sets_by_plain_name():
        return name
    from checker.chemistry.basis_sets import basis_set  # a catalogue that most decks do not need

    known = basis_set(set_name)
    return name if known is None else _plain(known.name)


def _plain(set_name: str) -> str:
    return _SEPARATORS.sub("", set_name.casefold())
