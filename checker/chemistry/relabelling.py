"""Other choices of the axes in which a group has the same elements, and what they make of the names of its irreps.

D2 and D2h have three axes that may be called x, y and z in six ways. C2v has two planes; Cnv, Dn and Dnh of even
n have two classes of planes or C2' axes, and either may be the first. In all other groups the axes leave no choice
of names. Where the body itself has an operation that exchanges the axes, as a linear molecule has for x and y, two
occupations that differ by the exchange are one state.

Source: R. S. Mulliken, J. Chem. Phys. 23, 1997 (1955), sec. II, on the choice of axes and its consequences (from
memory).
"""

import itertools
from collections.abc import Mapping
from dataclasses import dataclass
from functools import cache
from types import MappingProxyType

import numpy as np

from checker.chemistry.characters import characters_at, known_group
from checker.chemistry.descent import belong_to
from checker.chemistry.point_groups import IDENTITY, Matrices, family_of, rotation, standard_operations


@dataclass(frozen=True, eq=False)
class Relabelling:
    """Another choice of axes.

    Attributes
    ----------
    turn : (3, 3) takes coordinates in the first choice of axes into the other.
    names : for each irrep under the first choice, its name under the other.
    words : what is exchanged with what.

    """

    turn: Matrices
    names: Mapping[str, str]
    words: str

    def applied_to(self, counts: Mapping[str, int]) -> dict[str, int]:
        """Return counts by irrep under their names in the other axes."""
        return {self.names[name]: n for name, n in counts.items()}


@cache
def relabellings(symbol: str) -> tuple[Relabelling, ...]:
    """Return the other choices of axes of a finite group that rename irreps, each renaming once.

    >>> dict(relabellings("C2v")[0].names)
    {'A1': 'A1', 'A2': 'A2', 'B1': 'B2', 'B2': 'B1'}
    """
    found: dict[tuple[str, ...], Relabelling] = {}
    for turn, words in _choices(known_group(symbol).symbol):
        names = _renamed(symbol, turn)
        if any(old != new for old, new in names.items()):
            found.setdefault(tuple(names.values()), Relabelling(turn, MappingProxyType(names), words))
    return tuple(found.values())


def equivalent_relabellings(group: str, subgroup: str, turn: Matrices = IDENTITY) -> tuple[Relabelling, ...]:
    """Return the relabellings of a subgroup that an operation of the body's own group brings about.

    Parameters
    ----------
    group : of the body, finite or continuous.
    subgroup : the finite group in which states are named.
    turn : (3, 3) takes coordinates in the group's standard frame into the subgroup's.
    """
    return tuple(
        other for other in relabellings(subgroup) if np.any(belong_to(group, _exchanging(other, subgroup, turn)))
    )


def _exchanging(other: Relabelling, subgroup: str, turn: Matrices) -> Matrices:
    """Return the operations, in the group's frame, that exchange the subgroup's axes in the way of `other`."""
    exchanges = other.turn @ standard_operations(subgroup)
    both_hands = np.concatenate([exchanges, -exchanges])
    return np.asarray(np.einsum("ji,kjl,lm->kim", turn, both_hands, turn))


_CYCLIC = ((1, 2, 0), (2, 0, 1))


def _choices(symbol: str) -> list[tuple[Matrices, str]]:
    family, n = family_of(symbol)
    if symbol in ("D2", "D2h"):
        orders = sorted(itertools.permutations(range(3)), key=lambda order: order in _CYCLIC)  # exchanges first
        return [(_permuting(order), _exchange_words(order)) for order in orders]
    if family in ("Cnv", "Dn", "Dnh") and n % 2 == 0:
        words = "x and y exchanged" if n == 2 else f"axes turned by {180 / n:g} degrees about z"
        return [(rotation((0.0, 0.0, 1.0), -np.pi / n), words)]
    return []


def _permuting(order: tuple[int, ...]) -> Matrices:
    """Return the rotation whose new axes are the old ones in this order, one of them turned round where needed."""
    turn = IDENTITY[list(order)]
    return np.asarray(turn * np.linalg.det(turn))


def _exchange_words(order: tuple[int, ...]) -> str:
    fixed = [axis for axis, old in enumerate(order) if axis == old]
    if len(fixed) == 1:
        return " and ".join("xyz"[axis] for axis in range(3) if axis != fixed[0]) + " exchanged"
    return "x, y, z become " + ", ".join("xyz"[order.index(axis)] for axis in range(3))


def _renamed(symbol: str, turn: Matrices) -> dict[str, str]:
    """Match the characters at the operations with those at the same operations seen in the other axes."""
    group, operations = known_group(symbol), standard_operations(symbol)
    before = np.round(characters_at(symbol, operations), 6)
    after = np.round(characters_at(symbol, turn @ operations @ turn.T), 6)
    names = [irrep.name for irrep in group.irreps]
    rows = {tuple((row + 0.0).tolist()): name for row, name in zip(after, names, strict=True)}
    return {name: rows[tuple((row + 0.0).tolist())] for row, name in zip(before, names, strict=True)}
