"""Characters of the irreps of every point group, at any operation, worked out from the operation's matrix.

Every group about one axis lies in the group of a cylinder, so an operation is a turn or a reflection of the xy
plane by an angle, with or without the inversion or the horizontal plane:

- A is 1; A2 (Σ-) the determinant of the turn in the plane; E_k (Π, Δ ...) 2 cos(k angle) for a turn, 0 for a
  reflection; B1 of an n-fold axis behaves as cos(n angle / 2), which is symmetric in C2' and σv; B2 = A2 x B1.
- D2: B1, B2, B3 are z, y, x. Groups with i or with σh and odd n: g and u, ' and ''.
- Cubic groups: E and A2 follow from how the three axes are permuted, T1 and T2 from the matrix itself.
- Icosahedral groups: T1, H, G, T2 from functions of angular momentum 1 to 4 (T1; H; G + H; G + T2 for 3).

Irreps stand in the order and under the names of `irreps.point_group`. A pair of complex conjugates is one row, the
real sum of both.

Source: R. S. Mulliken, J. Chem. Phys. 23, 1997 (1955); F. A. Cotton, Chemical Applications of Group Theory, 3rd
ed., appendix IIA (from memory).
"""

from collections.abc import Callable
from dataclasses import dataclass
from functools import cache

import numpy as np
from numpy.typing import NDArray

from checker.chemistry.classes import class_name, class_of_operation, representative_of
from checker.chemistry.irreps import ATOMIC_LETTERS, LINEAR_LETTERS, Irrep, PointGroup, point_group
from checker.chemistry.point_groups import (
    INVERSION,
    PLANE_XZ,
    Matrices,
    family_of,
    standard_operations,
    turns_about_z,
)

Reals = NDArray[np.float64]
N_ANGLES = 128
"""Angles at which a continuous group is sampled; averages are exact for angular momenta below this number."""


@dataclass(frozen=True, eq=False)
class CharacterTable:
    """The character table of a finite group.

    Attributes
    ----------
    symbol : the group.
    irreps : names and dimensions, in the order of the rows.
    class_names : such as ``E``, ``2C3``, ``3σv``, in the order of the columns.
    class_sizes : (n_classes,) number of operations of each.
    representatives : (n_classes, 3, 3) one operation of each, in the standard frame.
    characters : (n_irreps, n_classes).

    """

    symbol: str
    irreps: tuple[Irrep, ...]
    class_names: tuple[str, ...]
    class_sizes: NDArray[np.int64]
    representatives: Matrices
    characters: Reals


@dataclass(frozen=True, eq=False)
class Sample:
    """Operations of a group over which a class function is averaged.

    Attributes
    ----------
    operations : (k, 3, 3) all of a finite group; of a continuous one, enough to stand for all its classes.
    weights : (k,) adding up to 1.
    characters : (n_irreps, k) of the group's irreps.
    norms : (n_irreps,) mean square of each row: 2 for a pair of complex conjugates, else 1.

    """

    operations: Matrices
    weights: Reals
    characters: Reals
    norms: Reals


def known_group(symbol: str) -> PointGroup:
    """Return the point group of a symbol in any usual writing; raise ValueError where there is no such group."""
    group = point_group(symbol)
    if group is None:
        raise ValueError(f"{symbol!r} is no symbol of a point group")
    return group


@cache
def character_table(symbol: str) -> CharacterTable:
    """Return the character table of a finite group.

    Raises ValueError for a continuous group, whose characters are functions of an angle (`characters_at`), and for
    what is no group.

    >>> table = character_table("C3v")
    >>> table.class_names, table.characters.round().astype(int).tolist()
    (('E', '2C3', '3σv'), [[1, 1, 1], [1, 1, -1], [2, -1, 0]])
    """
    group = known_group(symbol)
    operations = standard_operations(group.symbol)
    classes = class_of_operation(group.symbol)
    members = [operations[classes == number] for number in range(int(classes.max()) + 1)]
    representatives = np.array([of_class[representative_of(of_class)] for of_class in members])
    return CharacterTable(
        symbol=group.symbol,
        irreps=group.irreps,
        class_names=tuple(class_name(group.symbol, of_class) for of_class in members),
        class_sizes=np.bincount(classes),
        representatives=representatives,
        characters=characters_at(group.symbol, representatives),
    )


@cache
def sample(symbol: str) -> Sample:
    """Return operations of a group with the weights that make an average over it; E is the first."""
    group = known_group(symbol)
    if group.order is None:
        return _weighted(group, *_continuous_sample(group.symbol))
    return sample_over(group.symbol, standard_operations(group.symbol))


def sample_over(symbol: str, operations: Matrices) -> Sample:
    """Return the sample made of all operations (order, 3, 3) of a finite group, in its frame and in any order.

    Raises ValueError where they are not as many as the group has.
    """
    group = known_group(symbol)
    if len(operations) != group.order:
        raise ValueError(
            f"{group.symbol} has {group.order or 'infinitely many'} operations, not {len(operations)}"
        )
    return _weighted(group, np.asarray(operations), np.full(group.order, 1.0 / group.order))


def _weighted(group: PointGroup, operations: Matrices, weights: Reals) -> Sample:
    characters = characters_at(group.symbol, operations)
    norms = np.array([2.0 if irrep.complex_pair else 1.0 for irrep in group.irreps])
    for array in (weights, characters, norms):
        array.setflags(write=False)
    return Sample(operations, weights, characters, norms)


def _continuous_sample(symbol: str) -> tuple[Matrices, Reals]:
    """Return classes of a continuous group: turns about z with the group's measure, one plane, the inversion."""
    turns = turns_about_z(N_ANGLES)
    even = np.full(N_ANGLES, 1.0 / N_ANGLES)
    if symbol == "Kh":
        angles = 2 * np.pi * np.arange(N_ANGLES) / N_ANGLES
        operations, weights = turns, even * (1 - np.cos(angles))
    else:
        operations, weights = np.concatenate([turns, PLANE_XZ[None]]), np.append(even, 1.0) / 2
    if symbol == "C∞v":
        return operations, weights
    return np.concatenate([operations, INVERSION @ operations]), np.tile(weights, 2) / 2


def characters_at(symbol: str, operations: Matrices) -> Reals:
    """Return the characters (n_irreps, k) of a group's irreps at operations (k, 3, 3) in its standard frame.

    Nothing checks that the operations belong to the group. Raises ValueError where there is no such group.
    """
    group = known_group(symbol)
    family, n = family_of(group.symbol)
    rows = _rows(family, n, np.asarray(operations, dtype=np.float64))
    assert len(rows) == len(group.irreps), symbol
    return np.array(rows)


def _rows(family: str, n: int, operations: Matrices) -> list[Reals]:
    if family in ("Cs", "Ci"):
        return [np.ones(len(operations)), np.linalg.det(operations)]
    if family in _POLYHEDRAL:
        return _POLYHEDRAL[family](operations)
    if family == "Dn" and n == 2:
        return _three_axes(operations)
    if family == "Dnh" and n == 2:
        return _with_inversion(_three_axes, operations)
    if (family in ("Cnh", "Dnh") and n % 2 == 0) or (family == "Dnd" and n % 2) or (family == "Sn" and n % 4):
        of_rotations = _dihedral if family.startswith("D") else _cyclic
        return _with_inversion(lambda proper: of_rotations(_rotations_below(family, n), proper), operations)
    plain = (
        _dihedral(2 * n if family == "Dnd" else n, operations) if family in _MIRRORED else _cyclic(n, operations)
    )
    return _doubled(plain, operations) if family in ("Cnh", "Dnh") else plain


_MIRRORED = ("Cnv", "Dn", "Dnh", "Dnd")


def _rotations_below(family: str, n: int) -> int:
    return n // 2 if family == "Sn" else n


def _in_plane(operations: Matrices) -> tuple[Reals, Reals]:
    """Return the determinant and the angle of what an operation does to the xy plane.

    The angle of a reflection is twice that of its mirror line with x.
    """
    block = operations[:, :2, :2]
    return np.round(np.linalg.det(block)), np.arctan2(block[:, 1, 0], block[:, 0, 0])


def _cyclic(n: int, operations: Matrices) -> list[Reals]:
    _, angle = _in_plane(operations)
    half = [np.cos(n / 2 * angle)] if n % 2 == 0 else []
    return [np.ones_like(angle), *half, *(2 * np.cos(k * angle) for k in range(1, (n + 1) // 2))]


def _dihedral(n: int, operations: Matrices) -> list[Reals]:
    turns, angle = _in_plane(operations)
    half = np.cos(n / 2 * angle)
    paired = [(1 + turns) * np.cos(k * angle) for k in range(1, (n + 1) // 2)]
    return [np.ones_like(angle), turns, *([half, turns * half] if n % 2 == 0 else []), *paired]


def _three_axes(operations: Matrices) -> list[Reals]:
    return [np.ones(len(operations)), operations[:, 2, 2], operations[:, 1, 1], operations[:, 0, 0]]


def _with_inversion(of_rotations: Callable[[Matrices], list[Reals]], operations: Matrices) -> list[Reals]:
    proper = np.round(np.linalg.det(operations))[:, None, None] * operations
    return _doubled(of_rotations(proper), operations)


def _doubled(rows: list[Reals], operations: Matrices) -> list[Reals]:
    sign = np.round(np.linalg.det(operations))
    return [*rows, *(sign * row for row in rows)]


def _tetrahedral(operations: Matrices) -> list[Reals]:
    return [np.ones(len(operations)), _of_axes(operations) - 1, _trace(operations)]


def _octahedral(operations: Matrices) -> list[Reals]:
    """Rows of O and Td: A2 is odd where two axes are swapped, T1 turns as an axial vector."""
    swaps = np.round(np.linalg.det(np.abs(operations)))
    axial = np.round(np.linalg.det(operations)) * _trace(operations)
    return [np.ones(len(operations)), swaps, _of_axes(operations) - 1, axial, swaps * axial]


def _icosahedral(operations: Matrices) -> list[Reals]:
    chi = momentum_characters(operations, 4)
    return [chi[0], chi[1], chi[3] - chi[4] + chi[2], chi[4] - chi[2], chi[2]]


def _linear(operations: Matrices) -> list[Reals]:
    turns, angle = _in_plane(operations)
    momenta = range(1, len(LINEAR_LETTERS))
    return [np.ones_like(angle), turns, *((1 + turns) * np.cos(m * angle) for m in momenta)]


def _linear_with_inversion(operations: Matrices) -> list[Reals]:
    along = np.round(operations[:, 2, 2])  # what turns the axis over is i times an operation that does not
    rows = _linear(along[:, None, None] * operations)
    return [*rows, *(along * row for row in rows)]


def _atomic(operations: Matrices) -> list[Reals]:
    sign = np.round(np.linalg.det(operations))
    chi = momentum_characters(sign[:, None, None] * operations, len(ATOMIC_LETTERS) - 1)
    return [row for momentum in chi for row in (momentum, sign * momentum)]


def _trace(operations: Matrices) -> Reals:
    return np.asarray(np.einsum("kii->k", operations))


def _of_axes(operations: Matrices) -> Reals:
    """Return how many of the three axes of a cubic group stay where they are."""
    return _trace(np.abs(operations))


_POLYHEDRAL: dict[str, Callable[[Matrices], list[Reals]]] = {
    "T": _tetrahedral,
    "Td": _octahedral,
    "Th": lambda operations: _with_inversion(_tetrahedral, operations),
    "O": _octahedral,
    "Oh": lambda operations: _with_inversion(_octahedral, operations),
    "I": _icosahedral,
    "Ih": lambda operations: _with_inversion(_icosahedral, operations),
    "C∞v": _linear,
    "D∞h": _linear_with_inversion,
    "Kh": _atomic,
}


def monomial_characters(operations: Matrices, highest: int) -> Reals:
    """Return the characters (highest + 1, k) of all monomials x^a y^b z^c of each degree, at operations (k, 3, 3).

    They are the coefficients of t^degree in 1 / det(1 - t R).
    """
    determinant = np.round(np.linalg.det(operations))
    trace = _trace(operations)
    rows = [np.zeros_like(trace), np.zeros_like(trace), np.ones_like(trace)]
    for _ in range(highest):
        rows.append(trace * rows[-1] - determinant * trace * rows[-2] + determinant * rows[-3])
    return np.array(rows[2:])


def momentum_characters(operations: Matrices, highest: int) -> Reals:
    """Return the characters (highest + 1, k) of the functions of each angular momentum 0, 1, 2 ..., at operations.

    Monomials of a degree are the functions of that momentum and, times r^2, the monomials two degrees lower.
    """
    chi = monomial_characters(operations, highest)
    return np.asarray(np.concatenate([chi[:2], chi[2:] - chi[:-2]])) if highest > 1 else chi
