"""Which of the orientations of a group on a body is the one its labels refer to, and how the body was turned.

"as-given" keeps the coordinates' own axes where the group allows it, or exchanges them, or else turns as little
as it can. "mulliken" first heeds the recommendations for planar molecules: those of C2v lie in yz, those of D2h
in yz with z through most atoms; for an even axis the C2' (in Cnv the σv) pass through most atoms.

Source: R. S. Mulliken, J. Chem. Phys. 23, 1997 (1955).
"""

from collections.abc import Callable
from dataclasses import dataclass
from functools import cache
from itertools import permutations, product

import numpy as np

from checker.chemistry.axes import CLOSE_TO_AXIS, EXACT, EXCHANGES_IN_TURN, shortest_turn
from checker.chemistry.bodies import Floats, Ints
from checker.chemistry.point_groups import family_of, indices_of, standard_operations

ON_ELEMENT = 1e-3
"""Angstrom: an atom of a symmetrised body closer than this to an axis or a plane lies on it."""

AXES_AS_GIVEN = "axes as given"
NEARLY_RADIAN = 0.045
"""A turn by less than this, the angle of `CLOSE_TO_AXIS`, is told by its angle alone."""

LABELS_WITHOUT_AXES = "independent of the axes"


@dataclass(frozen=True, eq=False)
class Placement:
    """A group, or a subgroup, as it lies on a body.

    Attributes
    ----------
    group : Schoenflies symbol.
    frame : (3, 3) rotation R with x_standard = R (x - center); its rows are the standard axes.
    frame_note : in words, how the coordinates' axes were turned into those the labels refer to.
    operations : (g, 3, 3) in the coordinates' axes, in the order of `standard_operations(group)`; for C∞v and
        D∞h those of C2v and D2h in the same frame, for Kh those of D2h.
    permutations : (g, n) the image atom of each atom, in the same order.

    """

    group: str
    frame: Floats
    frame_note: str
    operations: Floats
    permutations: Ints


PermutationsOf = Callable[[Floats], Ints]


def place(
    symbol: str, found: Floats, permutations_of: PermutationsOf, *, positions: Floats, axes: str, tolerance: float
) -> Placement | None:
    """Place a finite group on a body in the best of the orientations found.

    Parameters
    ----------
    symbol : the group to place.
    found : (m, 3, 3) orientations, as `axes.placements` finds them.
    permutations_of : tells the permutations (g, n) of the atoms under operations (g, 3, 3) of the body.
    positions : (n, 3) symmetrised, about the centre, angstrom.
    axes : "as-given" or "mulliken".
    tolerance : angstrom; a turn that moves no atom by more than this is not worth a word.

    Returns
    -------
    None where there is no orientation.

    """
    if not len(found):
        return None
    if axes == "mulliken":
        found = _recommended(symbol, found, positions)
    frame = _nearest_to_given(found)
    operations = frame.T @ standard_operations(symbol) @ frame
    farthest = float(np.linalg.norm(positions, axis=1).max())
    note = note_of(symbol, frame, farthest, tolerance)
    return Placement(symbol, frame, note, operations, permutations_of(operations))


def permutations_among(matrices: Floats, images: Ints) -> PermutationsOf:
    """Return what looks permutations up: matrices (g, 3, 3) of a body and their permutations (g, n)."""
    return lambda operations: images[indices_of(operations, matrices)]


def _recommended(symbol: str, found: Floats, positions: Floats) -> Floats:
    """Keep the orientations that the recommendations favour; all where they are silent."""
    family, n = family_of(symbol)
    seen = positions @ found.transpose(0, 2, 1)
    near_plane = np.abs(seen) < ON_ELEMENT  # (m, n, 3): nearer to the plane across x, y, z than a bond's breadth
    planar = near_plane[:, :, 0].all(axis=1)
    if symbol in ("C2v", "D2h") and planar.any():
        on_z = (near_plane[:, :, 0] & near_plane[:, :, 1]).sum(axis=1)
        score = np.where(planar, 1 + (on_z if symbol == "D2h" else 0), 0)
    elif family in ("Dn", "Dnh") and n % 2 == 0 and n > 2:
        score = (near_plane[:, :, 1] & near_plane[:, :, 2]).sum(axis=1)
    elif family == "Cnv" and n % 2 == 0 and n > 2:
        score = near_plane[:, :, 1].sum(axis=1)
    else:
        return found
    return np.asarray(found[score == score.max()])


def _nearest_to_given(found: Floats) -> Floats:
    """Choose the coordinates' own axes, else these exchanged in turn, else the least turn; ties by the numbers."""
    for exchange in EXCHANGES_IN_TURN:
        cosines = 0.5 * (np.einsum("mij,ij->m", found, exchange) - 1.0)
        if cosines.max() > CLOSE_TO_AXIS:
            return np.asarray(found[cosines.argmax()])
    traces = np.trace(found, axis1=1, axis2=2)
    nearest = found[traces > traces.max() - EXACT]
    rounded = -np.round(nearest.reshape(-1, 9), 4)
    return np.asarray(nearest[np.lexsort(rounded.T[::-1])[0]])


@cache
def _exchanges() -> Floats:
    """Return the rotations (24, 3, 3) that exchange the coordinate axes or turn them round."""
    signed = [
        np.eye(3)[list(order)] * np.array(signs)[:, None]
        for order in permutations(range(3))
        for signs in product((1.0, -1.0), repeat=3)
    ]
    return np.array([matrix for matrix in signed if np.linalg.det(matrix) > 0])


def straightened(positions: Floats, frame: Floats) -> Floats:
    """Turn positions (n, 3) so that a frame, or its z, that is nearly along coordinate axes lies along them."""
    exchanges = _exchanges()
    cosines = 0.5 * (np.einsum("ij,mij->m", frame, exchanges) - 1.0)
    if cosines.max() > CLOSE_TO_AXIS:
        return np.asarray(positions @ frame.T @ exchanges[cosines.argmax()])
    along = exchanges[(exchanges[:, 2] @ frame[2]).argmax(), 2]
    if along @ frame[2] > CLOSE_TO_AXIS:
        return np.asarray(positions @ shortest_turn(frame[2], along).T)
    return positions


def note_of(symbol: str, frame: Floats, farthest: float, tolerance: float) -> str:
    """Say how the coordinates' axes became those of the labels, as far as labels or elements hang on them.

    Parameters
    ----------
    symbol : the group, finite or continuous.
    frame : (3, 3) rotation into the standard axes.
    farthest : of the atoms from the centre, angstrom.
    tolerance : angstrom; a turn that moves no atom by more than this is not worth a word.

    """
    named = _axes_that_count(symbol)
    if not named:
        return LABELS_WITHOUT_AXES
    rows = ["xyz".index(name) for name in named]
    exchanges = _exchanges()
    gaps = np.linalg.norm((frame - exchanges)[:, rows], axis=(1, 2)) / (1.0 if len(rows) == 1 else 2**0.5)
    exchange, turn = exchanges[gaps.argmin()][rows], float(gaps.min())
    if turn * farthest > tolerance and turn > NEARLY_RADIAN:
        return _turn_words(frame)
    off = f", off by {np.degrees(turn):.1f} degrees" if turn * farthest > tolerance else ""
    letters = [_signed_letter(row, len(rows) > 1) for row in exchange]
    if letters == list(named):
        return f"axes nearly as given{off}" if off else AXES_AS_GIVEN
    verb = "are" if len(rows) > 1 else "is"
    return f"axes exchanged: {', '.join(named)} of the labels {verb} {', '.join(letters)} of the coordinates{off}"


def _axes_that_count(symbol: str) -> str:
    """Return the axes that names or elements hang on: in most groups only that of the main axis."""
    family, n = family_of(symbol)
    if symbol in ("C∞v", "D∞h"):
        return "z"
    if n < 2:
        return ""
    return "xyz" if family in ("Cnv", "Dn", "Dnh") and n % 2 == 0 else "z"


def _signed_letter(row: Floats, with_sign: bool) -> str:
    return ("-" if with_sign and row.sum() < 0 else "") + "xyz"[int(np.abs(row).argmax())]


def _turn_words(frame: Floats) -> str:
    """Return the angle of a turn about z, else where z and x of the labels lie; x fixes what z leaves open."""
    if frame[2, 2] > 1.0 - EXACT:
        return f"axes turned by {np.degrees(np.arctan2(frame[0, 1], frame[0, 0])):.1f} degrees about z"
    x, z = (f"({', '.join(f'{c:.3f}' for c in np.round(row, 3) + 0.0)})" for row in (frame[0], frame[2]))
    return f"axes turned: z of the labels lies along {z} of the coordinates, x along {x}"
