"""Where a bond is missing: what angles and bond lengths say, and where a lost hydrogen would sit.

The unit vectors from an atom to its neighbours add up to zero where directions are complete (linear, trigonal,
tetrahedral) and to about one bond where one direction is empty. Bond lengths give bond orders, and with them how
much of an atom's valence is used. Source of the bond radii: P. Pyykko and M. Atsumi, Chem. Eur. J. 15, 186 and
12770 (2009). The scales are fitted to common geometries, no source.

Provides `bond_order`, `direction_sum`, `vacancy`, `has_twin` and `hydrogen_site`.
"""

import math

import numpy as np
from numpy.typing import NDArray

from checker.chemistry.bonding import Bonds
from checker.chemistry.neighbours import Floats, Ints
from checker.tables.structure import bond_radii, usual_valences

LONE_PAIR_STRETCH_ANGSTROM = 0.10
"""N-N, N-O, O-O, N-F ... single bonds are longer than their radii by about this: the lone pairs repel."""

HYDROGEN_RADIUS_ANGSTROM = 0.32
"""Single-bond radius of hydrogen (Pyykko and Atsumi 2009)."""

TWIN_ANGSTROM = 0.03
"""Bonds that differ by less than this are alike."""

LEAST_ORDER = 0.8
"""A bond is a bond: however long, it uses this much of a valence."""

LINEAR_SUM = 0.35
"""Two unit vectors that add up to less than this (160 degrees or more) leave no empty direction."""

_WITH_LONE_PAIRS = frozenset({7, 8, 9})


def bond_order(first: int, second: int, length: float) -> float:
    """Estimate a bond order, 0.8 to 3, from two atomic numbers and a length in angstrom.

    Linear between the sums of the radii of single, double and triple bonds; 1 where no double bond is known.
    """
    (single, double, triple), (other_single, other_double, other_triple) = (
        bond_radii()[first],
        bond_radii()[second],
    )
    if single is None or other_single is None or double is None or other_double is None or 1 in (first, second):
        return 1.0
    one = single + other_single
    if first in _WITH_LONE_PAIRS and second in _WITH_LONE_PAIRS:
        one += LONE_PAIR_STRETCH_ANGSTROM
    two = min(double + other_double, one - 0.05)
    if length >= two or triple is None or other_triple is None:
        return min(3.0, max(LEAST_ORDER, 1.0 + (one - length) / (one - two)))
    three = min(triple + other_triple, two - 0.05)
    return min(3.0, 2.0 + (two - length) / (two - three))


def direction_sum(atom: int, coordinates: Floats, bonds: Bonds) -> tuple[float, float, float]:
    """Return the sum of the unit vectors from an atom to its neighbours."""
    x, y, z = coordinates[atom].tolist()
    total_x = total_y = total_z = 0.0
    for other, length in zip(bonds.neighbours[atom], bonds.lengths[atom], strict=True):
        other_x, other_y, other_z = coordinates[other].tolist()
        total_x += (other_x - x) / length
        total_y += (other_y - y) / length
        total_z += (other_z - z) / length
    return total_x, total_y, total_z


def unused_valence(atom: int, numbers: Ints, bonds: Bonds) -> float:
    """Return the usual valence of an atom less the orders of its bonds, as their lengths tell them."""
    z = int(numbers[atom])
    valences = usual_valences()[z]
    pairs = zip(bonds.neighbours[atom], bonds.lengths[atom], strict=True)
    used = sum(bond_order(z, int(numbers[other]), length) for other, length in pairs)
    return (valences[0] if valences else 0) - used


def vacancy(atom: int, numbers: Ints, coordinates: Floats, bonds: Bonds) -> float:
    """Say how well another bond would fit at an atom, from 0 (no room) to about 1.2 (a gap plain to see).

    A planar atom with three neighbours has no room, a pyramid has; an atom with lone pairs always has a place
    for a bond, and only its bond lengths speak.
    """
    z = int(numbers[atom])
    degree = len(bonds.neighbours[atom])
    if not degree:
        return 1.0
    unused = min(1.2, max(0.0, unused_valence(atom, numbers, bonds)))
    has_lone_pair = z not in {1, 5, 6, 13, 14, 31, 32, 49, 50}
    if degree > 3 or (degree == 3 and has_lone_pair):
        return 0.0
    if has_lone_pair or degree == 1:
        return 0.06 + 0.85 * unused
    gap = math.hypot(*direction_sum(atom, coordinates, bonds))
    if degree == 2:
        return (0.03 if gap < LINEAR_SUM else 0.10) + (0.2 if gap < LINEAR_SUM else 0.9) * unused
    return 0.02 + min(1.0, (gap / 0.75) ** 2) * (0.6 + 0.4 * unused)


def has_twin(atom: int, numbers: Ints, bonds: Bonds) -> bool:
    """Say whether a terminal atom shares its centre with another of its element at the same distance."""
    if len(bonds.neighbours[atom]) != 1 or numbers[atom] == 1:
        return False
    (centre,), (length,) = bonds.neighbours[atom], bonds.lengths[atom]
    return any(
        other != atom and numbers[other] == numbers[atom] and abs(distance - length) < TWIN_ANGSTROM
        for other, distance in zip(bonds.neighbours[centre], bonds.lengths[centre], strict=True)
        if len(bonds.neighbours[other]) == 1
    )


def hydrogen_site(atom: int, numbers: Ints, coordinates: Floats, bonds: Bonds) -> Floats:
    """Return coordinates, (3,) angstrom, for a hydrogen on an atom: along its empty direction, clear of others.

    A tentative place from which a relaxation can start, at the sum of the single-bond radii.
    """
    here = np.asarray(coordinates[atom], dtype=np.float64)
    single = bond_radii()[int(numbers[atom])][0] or 1.5
    others = bonds.neighbours[atom]
    arms = np.array([coordinates[other] - here for other in others]).reshape(-1, 3)
    arms /= np.linalg.norm(arms, axis=1, keepdims=True)
    options = _empty_directions(arms, unused_valence(atom, numbers, bonds))
    crowd = np.delete(np.asarray(coordinates, dtype=np.float64), atom, axis=0)
    places = here + (single + HYDROGEN_RADIUS_ANGSTROM) * options
    if not len(crowd):
        return np.asarray(places[0], dtype=np.float64)
    room = [float(np.min(np.sum((crowd - place) ** 2, axis=1))) for place in places]
    return np.asarray(places[int(np.argmax(np.round(room, 6)))], dtype=np.float64)


def _empty_directions(arms: Floats, unused: float) -> Floats:
    """Return unit vectors along which another bond may lie, (k, 3)."""
    if not len(arms):
        return np.array([[0.0, 0.0, 1.0]])
    across = _perpendiculars(arms[0])
    if len(arms) == 1:
        tilt = math.radians(70.5)
        return np.asarray(math.sin(tilt) * across - math.cos(tilt) * arms[0], dtype=np.float64)
    total = arms.sum(axis=0)
    gap = float(np.linalg.norm(total))
    if gap < LINEAR_SUM:
        normal = np.cross(arms[0], arms[1])
        size = float(np.linalg.norm(normal))
        return across if size < 0.05 else np.array([normal / size, -normal / size])
    back = -total / gap
    if len(arms) == 2 and unused > 1.4:  # two bonds are missing: the hydrogen stands out of the plane
        normal = np.cross(arms[0], arms[1])
        normal /= np.linalg.norm(normal)
        tilt = math.radians(54.75)
        return np.array([back * math.cos(tilt) + side * math.sin(tilt) * normal for side in (1, -1)])
    return np.asarray(back.reshape(1, 3), dtype=np.float64)


def _perpendiculars(axis: NDArray[np.float64]) -> Floats:
    """Twelve unit vectors at right angles to an axis."""
    helper = np.eye(3)[int(np.argmin(np.abs(axis)))]
    first = np.cross(axis, helper)
    first /= np.linalg.norm(first)
    second = np.cross(axis, first)
    angles = np.arange(0.0, 2 * math.pi, math.pi / 6)
    return np.asarray(np.outer(np.cos(angles), first) + np.outer(np.sin(angles), second), dtype=np.float64)
