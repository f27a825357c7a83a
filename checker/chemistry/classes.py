"""Classes of the operations of a point group: which there are, in what order they stand, what they are called.

Two operations are of one class where another operation of the group turns one into the other. Names are those of
character tables; powers are written ``C5^2``. C2' axes are those of the class that has one along x, σv planes
those of the class of xz (in the D groups they hold C2' axes), σd the others; in the cubic groups C2' and σd are
those that lie along no coordinate axis.

Source: F. A. Cotton, Chemical Applications of Group Theory, 3rd ed., appendix IIA (from memory).
"""

from fractions import Fraction
from functools import cache

import numpy as np
from numpy.typing import NDArray

from checker.chemistry.irreps import MAX_AXIS
from checker.chemistry.point_groups import (
    HALF_TURN_X,
    INVERSION,
    SAME_OPERATION,
    Matrices,
    family_of,
    indices_of,
    standard_operations,
)

# The end of an axis that counts as its positive one: that of z, and of (1, 1, 1) in the cubic groups.
_POSITIVE = np.array([0.9, 1.0, 1.2])


@cache
def class_of_operation(symbol: str) -> NDArray[np.int64]:
    """Return the number of the class (order,) that each operation of `standard_operations` belongs to.

    Classes are numbered as they stand in a table: E, rotations, then what reflects; within these by falling order
    of the axis.
    """
    operations = standard_operations(symbol)
    conjugates = np.einsum("gij,hjk,glk->ghil", operations, operations, operations, optimize=True)
    first = indices_of(conjugates, operations).min(axis=0)
    inverts, turns_over = indices_of(np.array([INVERSION, HALF_TURN_X]), operations) >= 0
    heads = sorted(
        set(first.tolist()),
        key=lambda head: _place_in_table(operations[first == head], bool(inverts), bool(turns_over)),
    )
    number = {head: place for place, head in enumerate(heads)}
    classes = np.array([number[head] for head in first.tolist()], dtype=np.int64)
    classes.setflags(write=False)
    return classes


def _place_in_table(members: Matrices, has_inversion: bool, has_half_turns: bool) -> tuple[float, ...]:
    turn, axis = _turn_and_axis(members[representative_of(members)])
    reflects = bool(np.linalg.det(members[0]) < 0)
    if reflects and has_inversion:
        turn = (turn + Fraction(1, 2)) % 1  # such classes stand in the order of the rotations they come from
    across = (turn == Fraction(1, 2) or (reflects and turn == 0)) and abs(axis[2]) < 1 - SAME_OPERATION
    first = "y" if reflects and not has_half_turns else "x"
    comes_second = len(members) > 1 and not _along_any([_turn_and_axis(member)[1] for member in members], first)
    order = -turn.denominator if turn else -999
    return float(reflects), float(across), order, float(turn), float(comes_second), *(-axis[::-1])


def representative_of(members: Matrices) -> int:
    """Return which operation of a class (k, 3, 3) stands for it: the smallest turn about its first axis."""
    keys = []
    for i, member in enumerate(members):
        turn, axis = _turn_and_axis(member)
        keys.append((-round(float(axis @ _POSITIVE), 6), float(turn), i))
    return min(keys)[2]


def _turn_and_axis(operation: Matrices) -> tuple[Fraction, Matrices]:
    """Return the turn in whole circles, 0 up to 1, and the positive end of its axis (z for E and i).

    An improper operation is the turn followed by the reflection in the plane perpendicular to the axis.
    """
    sign = 1.0 if np.linalg.det(operation) > 0 else -1.0
    values, vectors = np.linalg.eigh(operation + operation.T)
    if np.ptp(values) < SAME_OPERATION:
        return Fraction(0 if sign > 0 else 1, 1 if sign > 0 else 2), np.array([0.0, 0.0, 1.0])
    axis = vectors[:, int(np.argmax(sign * values))]
    axis = np.where(np.abs(axis) < SAME_OPERATION, 0.0, axis)
    axis = axis if axis @ _POSITIVE > 0 else -axis
    cosine = (np.trace(operation) - sign) / 2
    skew = operation - operation.T
    sine = np.array([skew[2, 1], skew[0, 2], skew[1, 0]]) @ axis / 2
    circles = np.arctan2(sine, cosine) / (2 * np.pi)
    return Fraction(float(circles)).limit_denominator(2 * MAX_AXIS) % 1, axis


def class_name(symbol: str, members: Matrices) -> str:
    """Return the name of a class (k, 3, 3) as tables write it, such as ``2C3``, ``3C2'``, ``σh``, ``S8^3``."""
    representative = members[representative_of(members)]
    turn, _ = _turn_and_axis(representative)
    axes = [_turn_and_axis(member)[1] for member in members]
    if np.linalg.det(representative) > 0:
        name = "E" if turn == 0 else _half_turn(symbol, axes) if turn == Fraction(1, 2) else _power("C", turn)
    elif turn == 0:
        name = _plane(symbol, axes)
    else:
        name = "i" if turn == Fraction(1, 2) else _power("S", turn)
    return name if len(members) == 1 else f"{len(members)}{name}"


def _power(letter: str, turn: Fraction) -> str:
    power, order = turn.numerator, turn.denominator
    if letter == "S" and power % 2 == 0:
        power += order  # an even power would not reflect
    return f"{letter}{order}" if power == 1 else f"{letter}{order}^{power}"


def _half_turn(symbol: str, axes: list[Matrices]) -> str:
    family, _ = family_of(symbol)
    if symbol in ("D2", "D2h"):
        return f"C2({'xyz'[int(np.argmax(axes[0]))]})"
    if family in ("O", "Oh"):
        return "C2" if _along_any(axes, "xyz") else "C2'"
    if not family.startswith("D") or _along_any(axes, "z"):
        return "C2"
    return "C2'" if _along_any(axes, "x") else "C2''"


def _plane(symbol: str, normals: list[Matrices]) -> str:
    family, _ = family_of(symbol)
    if symbol in ("C2v", "D2h"):
        return f"σ({'xyz'.replace('xyz'[int(np.argmax(normals[0]))], '')})"
    if family in ("Oh", "Th", "Td"):
        return "σh" if _along_any(normals, "xyz") else "σd"
    if family == "Ih":
        return "σ"
    if _along_any(normals, "z"):
        return "σh"
    return "σv" if _along_any(normals, "y") else "σd"


def _along_any(axes: list[Matrices], letters: str) -> bool:
    return any(abs(axis["xyz".index(letter)]) > 1 - SAME_OPERATION for axis in axes for letter in letters)
