"""Bodies whose atoms lie on a line: C∞v and D∞h, and the finite groups within these."""

import math
from dataclasses import dataclass, replace
from functools import partial

import numpy as np

from checker.chemistry.axes import EXACT, placements
from checker.chemistry.bodies import Body, Floats, Ints
from checker.chemistry.frames import Placement, note_of, place
from checker.chemistry.irreps import MAX_AXIS, point_group
from checker.chemistry.point_groups import family_of, standard_operations

CONTINUOUS = {"C∞v": "C2v", "D∞h": "D2h", "Kh": "D2h"}
"""The finite groups whose operations stand for those of the continuous ones."""


@dataclass(frozen=True, eq=False)
class Line:
    """A linear body.

    Attributes
    ----------
    symbol : C∞v or D∞h.
    axis : (3,) unit vector.
    reversed_atoms : (n,) the image of each atom under inversion; itself in C∞v.
    symmetrised : (n, 3) positions on the line, angstrom.
    deviation : the largest distance of an atom from there, angstrom.

    """

    symbol: str
    axis: Floats
    reversed_atoms: Ints
    symmetrised: Floats
    deviation: float


def line_through(body: Body, tolerance: float) -> Line | None:
    """Return the body as a line, with a centre if it has one; None where an atom is too far off."""
    spreads, directions = np.linalg.eigh(body.positions.T @ body.positions)
    if spreads[0] + spreads[1] > 1.001 * len(body) * tolerance**2:
        return None
    axis = directions[:, 2]
    axis = axis * np.sign(axis[np.abs(axis).argmax()])
    heights = body.positions @ axis
    reverse = _reversal(body, heights)
    line = _line("D∞h", body, axis, reverse, 0.5 * (heights - heights[reverse]))
    if line.deviation <= tolerance:
        return line
    line = _line("C∞v", body, axis, np.arange(len(body)), heights)
    return line if line.deviation <= tolerance else None


def _line(symbol: str, body: Body, axis: Floats, reverse: Ints, heights: Floats) -> Line:
    places = np.outer(heights, axis)
    deviation = float(np.linalg.norm(body.positions - places, axis=1).max())
    return Line(symbol, axis, reverse, places, deviation)


def _reversal(body: Body, heights: Floats) -> Ints:
    """Pair the lowest atom of each kind with its highest, and so on."""
    reverse = np.empty(len(body), dtype=np.int64)
    reverse[np.lexsort((heights, body.kinds))] = np.lexsort((-heights, body.kinds))
    return reverse


def place_on_line(symbol: str, line: Line, axes: str, tolerance: float) -> Placement | None:
    """Place a group on a linear body; None where it is not within the body's own."""
    if symbol not in CONTINUOUS:
        return _place_finite(symbol, line, axes, tolerance)
    if symbol not in ("C∞v", line.symbol):
        return None
    placed = _place_finite(CONTINUOUS[symbol], line, axes, tolerance, along=True)
    if placed is None:
        return None
    farthest = float(np.linalg.norm(line.symmetrised, axis=1).max())
    return replace(placed, group=symbol, frame_note=note_of(symbol, placed.frame, farthest, tolerance))


def _place_finite(symbol: str, line: Line, axes: str, tolerance: float, along: bool = False) -> Placement | None:
    """Place a finite group; `along` asks for its z axis along the line."""
    matrices = _holder(symbol, line)
    if matrices is None:
        return None
    found = placements(matrices, symbol)
    if along:
        found = found[np.abs(found[:, 2] @ line.axis) > 1.0 - EXACT]
    lookup = partial(_permutations, line)
    return place(symbol, found, lookup, positions=line.symmetrised, axes=axes, tolerance=tolerance)


def _permutations(line: Line, operations: Floats) -> Ints:
    """Every operation of a line leaves its atoms where they are, or turns their order round."""
    turns_round = np.einsum("i,gij,j->g", line.axis, operations, line.axis) < 0
    return np.where(turns_round[:, None], line.reversed_atoms, np.arange(len(line.reversed_atoms)))


def _holder(symbol: str, line: Line) -> Floats | None:
    """Return a finite group (g, 3, 3) within that of the line, which holds another one if the line does."""
    group = point_group(symbol)
    if group is None or group.order is None:
        return None
    n = max(family_of(symbol)[1], 1)
    fold = next((m for m in (math.lcm(4, n), 2 * n, n) if m <= MAX_AXIS), n)
    operations = standard_operations(f"D{fold}h" if line.symbol == "D∞h" else f"C{fold}v")
    frame = _line_frame(line.axis)
    return np.asarray(frame.T @ operations @ frame)


def _line_frame(axis: Floats) -> Floats:
    """Return an orientation with z along a line, and x as near to a coordinate axis as can be."""
    across = np.eye(3)[int(np.abs(axis).argmin())]
    across = across - (across @ axis) * axis
    across /= np.linalg.norm(across)
    return np.array([across, np.cross(axis, across), axis])
