"""Orientations in which the operations of a body hold those of a group in its standard frame.

An orientation is a rotation matrix whose rows are the standard axes x, y, z seen in the body's axes. It is fixed
by where it puts one axis of the group and a second one at right angles to it; groups with a single axis leave the
second direction free.
"""

from dataclasses import dataclass
from functools import cache

import numpy as np

from checker.chemistry.bodies import Bools, Floats, Ints, cross_products
from checker.chemistry.point_groups import standard_operations

EXACT = 1e-6
"""Operations of an exact group are told apart to this in the trace of their quotient; 3 is the identity's."""

CLOSE_TO_AXIS = 0.999
"""Cosine of the angle, about 2.5 degrees, within which an axis is taken to be meant along a coordinate axis."""

EXCHANGES_IN_TURN = np.eye(3)[[[0, 1, 2], [2, 0, 1], [1, 2, 0]]]
"""(3, 3, 3) rotations that leave the coordinate axes, or exchange them in turn."""

MOST_TRIED = 64
"""Of equivalent orientations; only those of I and Ih come in two sorts, of which these hold both."""


@dataclass(frozen=True, eq=False)
class _Marks:
    """What fixes a standard frame.

    Attributes
    ----------
    axes : (3, 1 or 2) the directions that are marked, as columns.
    types : handedness and order of an operation about each.
    witnesses : (w, 3, 3) operations that generate the group.

    """

    axes: Floats
    types: tuple[tuple[int, int], ...]
    witnesses: Floats


def axes_of(matrices: Floats) -> Floats:
    """Return the unit vectors (g, 3) along the axes of operations; zero for the identity and the inversion.

    The axis of a reflection is the normal of its plane.
    """
    rotations = matrices * np.sign(np.linalg.det(matrices))[:, None, None]
    cosines = 0.5 * (np.trace(rotations, axis1=1, axis2=2) - 1.0)
    squares = 0.5 * (rotations + rotations.transpose(0, 2, 1)) - cosines[:, None, None] * np.eye(3)
    largest = np.einsum("gii->gi", squares).argmax(axis=1)
    columns = squares[np.arange(len(matrices)), :, largest]
    lengths = np.linalg.norm(columns, axis=1)
    none = 1.0 - cosines < EXACT
    return np.asarray(np.where(none[:, None], 0.0, columns / np.where(none, 1.0, lengths)[:, None]))


def orders_of(matrices: Floats) -> Ints:
    """Return the power (g,) of each operation of an exact group that is the identity."""
    current, orders, power = matrices, np.zeros(len(matrices), dtype=np.int64), 1
    while not orders.all():
        orders[(orders == 0) & (np.trace(current, axis1=1, axis2=2) > 3.0 - EXACT)] = power
        current, power = current @ matrices, power + 1
    return orders


@cache
def _marks(symbol: str) -> _Marks:
    """Choose the marks of a standard frame: the highest axis along z, or else x or y, and one across it."""
    operations = standard_operations(symbol)
    axes, orders = axes_of(operations), orders_of(operations)
    proper = np.linalg.det(operations) > 0
    rank = np.where(proper, 2 * orders + 1, 2 * orders)
    has_axis = np.abs(axes).sum(axis=1) > 0.5
    along = np.abs(axes)[:, [2, 0, 1]] > 1.0 - EXACT
    on_coordinate = [np.flatnonzero(has_axis & column) for column in along.T]
    chosen: list[int] = []
    for members in on_coordinate:
        if len(members) and len(chosen) < 2:
            chosen.append(int(members[rank[members].argmax()]))
    types = tuple((1 if proper[i] else -1, int(orders[i])) for i in chosen)
    return _Marks(axes[chosen].T, types, _witnesses(operations, chosen, proper, orders))


def _witnesses(operations: Floats, chosen: list[int], proper: Bools, orders: Ints) -> Floats:
    """Return the marked operations and the first one of every handedness and order."""
    _, first = np.unique(np.stack([proper, orders]), axis=1, return_index=True)
    return np.asarray(operations[[*chosen, *first.tolist()]])


def placements(matrices: Floats, symbol: str) -> Floats:
    """Return every orientation (m, 3, 3) in which exact operations (g, 3, 3) of a body hold those of a group.

    Directions that the group leaves free lie near the body's own axes; m is 0 where it is no subgroup.
    """
    handedness = np.where(np.linalg.det(matrices) > 0, 1, -1)
    found = _candidates(matrices, handedness, orders_of(matrices), symbol, EXACT)
    if not len(found):
        return found
    return np.asarray(found[_agreement(found, matrices, symbol) > 3.0 - EXACT])


def best_placement(matrices: Floats, handedness: Ints, orders: Ints, symbol: str) -> Floats | None:
    """Return the orientation (3, 3) of the group that lies best on approximate operations (g, 3, 3)."""
    found = _candidates(matrices, handedness, orders, symbol, slack=0.25)[:MOST_TRIED]
    return None if not len(found) else np.asarray(found[_agreement(found, matrices, symbol).argmax()])


def _agreement(frames: Floats, matrices: Floats, symbol: str) -> Floats:
    """Return for each frame (m,) the trace of the quotient of its worst witness and the nearest operation."""
    placed = frames.transpose(0, 2, 1)[:, None] @ _marks(symbol).witnesses @ frames[:, None]
    closeness = placed.reshape(-1, 9) @ matrices.reshape(-1, 9).T
    return np.asarray(closeness.max(axis=1).reshape(len(frames), -1).min(axis=1))


def _candidates(matrices: Floats, handedness: Ints, orders: Ints, symbol: str, slack: float) -> Floats:
    """Put the marked axes on all axes of the same type, either way round."""
    marks = _marks(symbol)
    if not marks.types:
        return np.eye(3)[None]
    axes = axes_of(matrices)
    has_axis = np.abs(axes).sum(axis=1) > 0.5  # the inversion has none
    types = [has_axis & (handedness == hand) & (orders == order) for hand, order in marks.types]
    on = [_both_ways(axes[members], slack) for members in types]
    if len(on) == 1:
        return np.array([_nearest_frame(marks.axes[:, 0], direction) for direction in on[0]]).reshape(-1, 3, 3)
    first, second = np.nonzero(np.abs(on[0] @ on[1].T) < slack)
    placed = _right_handed(on[0][first], on[1][second])
    standard = _right_handed(marks.axes[None, :, 0], marks.axes[None, :, 1])[0]
    return np.asarray(standard @ placed.transpose(0, 2, 1))


def _both_ways(axes: Floats, slack: float) -> Floats:
    """Return each direction once, and its opposite."""
    parallel = np.abs(axes @ axes.T) > 1.0 - min(1e-3, slack)
    kept = axes[~np.tril(parallel, -1).any(axis=1)]
    return np.concatenate([kept, -kept])


def _right_handed(first: Floats, second: Floats) -> Floats:
    """Return orthonormal axes (m, 3, 3) as columns, the first kept, the second made perpendicular to it."""
    across = second - np.einsum("mi,mi->m", first, second)[:, None] * first
    across = across / np.sqrt(np.einsum("mi,mi->m", across, across))[:, None]
    return np.stack([first, across, cross_products(first, across)], axis=2)


def _nearest_frame(standard: Floats, direction: Floats) -> Floats:
    """Return the orientation with a standard axis along a direction that is else nearest to the body's axes.

    Where the direction is close to one of the body's axes, these are first exchanged in turn.
    """
    close = np.flatnonzero(standard @ EXCHANGES_IN_TURN @ direction > CLOSE_TO_AXIS)
    exchange = EXCHANGES_IN_TURN[close[0] if len(close) else 0]
    return np.asarray(shortest_turn(exchange @ direction, standard) @ exchange)


def shortest_turn(start: Floats, end: Floats) -> Floats:
    """Return the rotation (3, 3) by the least angle that takes one unit vector to another."""
    cosine = float(start @ end)
    if 1.0 + cosine < EXACT:
        across = np.eye(3)[int(np.abs(end).argmin())]
        across = across - (across @ end) * end
        return np.asarray(2.0 * np.outer(across, across) / (across @ across) - np.eye(3))
    x, y, z = cross_products(start[None], end[None])[0].tolist()
    skew = np.array([[0.0, -z, y], [z, 0.0, -x], [-y, x, 0.0]])
    return np.asarray(np.eye(3) + skew + skew @ skew / (1.0 + cosine))
