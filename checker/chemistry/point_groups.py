"""The operations of every finite point group in its standard frame.

A group is written as a product of two sets: a cyclic group about z times what turns or reflects it, or T times
what makes O, Td and I of it. The frame is that of the project's vocabulary: principal axis along z, vertical
plane xz, C2' along x; cubic groups with their twofold (T, Td, Th, I, Ih) or fourfold axes (O, Oh) along x, y, z
and a threefold one along (1, 1, 1); a fivefold axis of I and Ih along (0, 1, golden ratio); the plane of Cs is xy.

Provides `standard_operations`, `family_of`, `indices_of` and the matrices they are made of.

Source: S. L. Altmann & P. Herzig, Point-Group Theory Tables, 2nd ed. (2011), for the structures (from memory).
"""

import re
from collections.abc import Sequence
from functools import cache

import numpy as np
from numpy.typing import NDArray

from checker.chemistry.irreps import point_group

Matrices = NDArray[np.float64]

SAME_OPERATION = 1e-6
"""Largest difference of two matrix elements, at which two operations are the same."""

IDENTITY = np.eye(3)
INVERSION = -np.eye(3)
PLANE_XY = np.diag([1.0, 1.0, -1.0])
PLANE_XZ = np.diag([1.0, -1.0, 1.0])
HALF_TURN_X = np.diag([1.0, -1.0, -1.0])
GOLDEN_RATIO = (1 + 5**0.5) / 2

# A matrix is told from the others of its group by this one linear form of its elements.
_FORM = np.sqrt(np.array([[2.0, 3.0, 5.0], [7.0, 11.0, 13.0], [17.0, 19.0, 23.0]]))


def family_of(symbol: str) -> tuple[str, int]:
    """Return the family and the order of its axis: ("Dnh", 6) for D6h, ("Td", 0) for a group without a number.

    >>> family_of("S8"), family_of("C1"), family_of("C∞v")
    (('Sn', 8), ('Cn', 1), ('C∞v', 0))
    """
    match = re.fullmatch(r"([CDS])(\d+)([vhd]?)", symbol)
    return (symbol, 0) if match is None else (f"{match[1]}n{match[3]}", int(match[2]))


@cache
def standard_operations(symbol: str) -> Matrices:
    """Return the operations of a finite group as matrices (order, 3, 3) in its standard frame, E first.

    The order of the operations is fixed, the array read-only. Raises ValueError for a continuous group and for
    what is no group. `symbol` is as `irreps.point_group` writes it.
    """
    group = point_group(symbol)
    if group is None or group.symbol != symbol or group.order is None:
        raise ValueError(f"{symbol!r} is no symbol of a finite point group")
    operations = _product_of_sets(symbol)
    assert len(operations) == group.order, symbol
    operations.setflags(write=False)
    return operations


def rotation(axis: tuple[float, float, float], angle: float) -> Matrices:
    """Return the matrix (3, 3) of a turn about an axis of any length by an angle in radian (Rodrigues)."""
    x, y, z = np.asarray(axis) / np.linalg.norm(axis)
    cross = np.array([[0.0, -z, y], [z, 0.0, -x], [-y, x, 0.0]])
    return np.asarray(IDENTITY + np.sin(angle) * cross + (1.0 - np.cos(angle)) * cross @ cross)


def turns_about_z(n: int) -> Matrices:
    """Return the n rotations (n, 3, 3) of Cn about z, by ascending angle."""
    return np.array([rotation((0.0, 0.0, 1.0), 2.0 * np.pi * k / n) for k in range(n)])


def _product_of_sets(symbol: str) -> Matrices:
    family, n = family_of(symbol)
    if n:
        return _axial(family, n)
    if symbol in ("Cs", "Ci"):
        return np.array([IDENTITY, PLANE_XY if symbol == "Cs" else INVERSION])
    return _polyhedral(symbol)


def _axial(family: str, n: int) -> Matrices:
    turns = turns_about_z(n)
    if family == "Sn":
        return np.array([_improper_turn(n, k) for k in range(n)])
    half_turns = [IDENTITY, HALF_TURN_X]
    further: dict[str, Sequence[Matrices] | Matrices] = {
        "Cn": [IDENTITY],
        "Cnv": [IDENTITY, PLANE_XZ],
        "Cnh": [IDENTITY, PLANE_XY],
        "Dn": half_turns,
        "Dnh": _times(half_turns, [IDENTITY, PLANE_XY]),
        "Dnd": _times(half_turns, [IDENTITY, _improper_turn(2 * n, 1)]),
    }
    return _times(further[family], turns)


def _improper_turn(n: int, power: int) -> Matrices:
    """Return S_n to a power: the turn, and the reflection in xy if the power is odd."""
    turn = rotation((0.0, 0.0, 1.0), 2.0 * np.pi * power / n)
    return PLANE_XY @ turn if power % 2 else turn


def _polyhedral(symbol: str) -> Matrices:
    half_turns = [np.diag(signs) for signs in ((1.0, 1, 1), (1, -1, -1), (-1, 1, -1), (-1, -1, 1))]
    tetrahedral = _times([np.roll(IDENTITY, k, axis=0) for k in range(3)], half_turns)
    quarter_turn = rotation((0.0, 0.0, 1.0), np.pi / 2)
    fifths = [rotation((0.0, 1.0, GOLDEN_RATIO), 2.0 * np.pi * k / 5) for k in range(5)]
    further: dict[str, Sequence[Matrices] | Matrices] = {
        "T": [IDENTITY],
        "Td": [IDENTITY, PLANE_XY @ quarter_turn],
        "Th": [IDENTITY, INVERSION],
        "O": [IDENTITY, quarter_turn],
        "Oh": _times([IDENTITY, INVERSION], [IDENTITY, quarter_turn]),
        "I": fifths,
        "Ih": _times([IDENTITY, INVERSION], fifths),
    }
    return _times(further[symbol], tetrahedral)


def _times(left: Sequence[Matrices] | Matrices, right: Sequence[Matrices] | Matrices) -> Matrices:
    """Return all products of two sets of matrices, (len(left) * len(right), 3, 3), the right one running first."""
    products = np.einsum("aij,bjk->abik", np.asarray(left), np.asarray(right)).reshape(-1, 3, 3)
    return np.asarray(np.where(np.abs(products) < 1e-15, 0.0, products))


def indices_of(operations: Matrices, among: Matrices) -> NDArray[np.int64]:
    """Return for each of `operations` (..., 3, 3) its index in `among` (g, 3, 3), -1 where it is none of them."""
    codes = np.einsum("gij,ij->g", among, _FORM)
    order = np.argsort(codes)
    wanted = np.einsum("...ij,ij->...", operations, _FORM)
    right = np.clip(np.searchsorted(codes[order], wanted), 1, max(len(among) - 1, 1))
    best = np.full(wanted.shape, -1, dtype=np.int64)
    for candidate in (order[right - 1], order[np.minimum(right, len(among) - 1)]):
        same = np.abs(among[candidate] - operations).max(axis=(-2, -1)) < SAME_OPERATION
        best = np.where(same, candidate, best)
    return best
