"""How far each atom is from its nearest neighbour, in units of bond lengths, and what that tells of the units.

A bond's length over the sum of the covalent radii (B. Cordero et al., Dalton Trans. 2008, 2832) is near 1. In
G2/97, each atom's least ratio lies between 0.77 (CN) and 1.25 (F2), and the median over the atoms of a molecule of
three and more between 0.78 (C2H) and 1.16 (F2O). The shortest known metal bonds go down to 0.58 (V2, 1.77
angstrom; from memory). Measured by tests/outside/test_contacts_g2.py.
"""

from dataclasses import dataclass
from functools import cache

import numpy as np
from numpy.typing import NDArray

from checker.chemistry.neighbours import DENSE_LIMIT_ATOMS, Floats, Ints
from checker.tables.structure import cordero_radii, is_covalent

SHORT_MEDIAN = 0.65
"""A median ratio below this is no molecule in angstrom: G2 in bohr gives 0.41 to 0.61, G2 shrunk by 0.9 0.70."""

SHORT_WITH_METAL = 0.55
"""The same where metals are: they have large radii and short multiple bonds (0.65 in uranyl, 0.69 in BaO)."""

LONG_MEDIAN = (1.43, 2.25)
"""Median ratios of molecules in bohr that are read as angstrom: G2 gives 1.46 to 2.19; stretched by 1.15, 1.33."""

LEAST_LONG = 1.35
"""One pair of atoms nearer than this is a bond, and shows that the lengths are in angstrom."""

LEAST_ATOMS = 3
"""A single distance shows no unit: it may be a point of a scan."""

_TREE_NEIGHBOURS = 7
_ROWS = 256
_NOBLE_GASES = (2, 10, 18, 36, 54, 86)


@dataclass(frozen=True, slots=True, eq=False)
class Nearest:
    """For each of n atoms, the other one that is nearest in units of bond lengths.

    Attributes
    ----------
    partner : (n,) index of that other atom.
    distance : (n,) angstrom.
    ratio : (n,) distance over the sum of the covalent radii.

    """

    partner: Ints
    distance: Floats
    ratio: Floats


@dataclass(frozen=True, slots=True)
class LengthSlip:
    """Lengths that make sense in the other unit only.

    Attributes
    ----------
    too_long : True where bohr was read as angstrom, False where angstrom was read as bohr.
    median_ratio : median distance to the nearest neighbour over the sum of the covalent radii.
    n_atoms : atoms that were judged.
    confidence : 0 to 1; it grows with the number of atoms.

    """

    too_long: bool
    median_ratio: float
    n_atoms: int
    confidence: float


_SINGLE_POINT = Nearest(np.zeros(1, dtype=np.int64), np.zeros(1), np.zeros(1))


def nearest_by_bond_length(numbers: Ints, coordinates: Floats) -> Nearest:
    """Return each atom's nearest neighbour, the distance measured in bond lengths.

    Parameters
    ----------
    numbers : (n,) atomic numbers, n >= 2.
    coordinates : (n, 3) angstrom.

    """
    radii = cordero_radii()[numbers]
    if len(numbers) < DENSE_LIMIT_ATOMS:
        return _dense(radii, coordinates)
    return _by_tree(radii, coordinates)


def length_slip(numbers: Ints, nearest: Nearest) -> LengthSlip | None:
    """Return the slip that the distribution of nearest distances betrays; None where there is none or no telling.

    Pairs that need be no bond at any distance are left out: noble gases, metal with metal, hydrogen with hydrogen.
    """
    tells = _tells_a_bond(numbers, nearest.partner)
    ratios = nearest.ratio[tells]
    if len(ratios) < LEAST_ATOMS or 2 * len(ratios) < len(numbers):
        return None
    median = float(np.sort(ratios)[len(ratios) // 2])
    too_long = LONG_MEDIAN[0] <= median <= LONG_MEDIAN[1] and float(nearest.ratio.min()) > LEAST_LONG
    if not too_long and (median >= SHORT_MEDIAN or not _too_short(numbers, nearest, tells)):
        return None
    return LengthSlip(too_long, median, len(ratios), _confidence(len(ratios), too_long))


def _too_short(numbers: Ints, nearest: Nearest, tells: NDArray[np.bool_]) -> bool:
    """Tell whether the median is short of what bonds of these kinds can be."""
    metal = _kinds() == _METAL
    has_metal = (metal[numbers] | metal[numbers[nearest.partner]])[tells]
    shares = np.sort(nearest.ratio[tells] / np.where(has_metal, SHORT_WITH_METAL, SHORT_MEDIAN))
    return float(shares[len(shares) // 2]) < 1.0


def _confidence(n_atoms: int, too_long: bool) -> float:
    """Three atoms at twice their bond lengths may be a scan; twenty are hardly ever one."""
    return min(0.99, 1 - 1 / n_atoms) if too_long else 0.97


def _tells_a_bond(numbers: Ints, partner: Ints) -> NDArray[np.bool_]:
    kinds = _kinds()[numbers]
    of_pair = kinds + kinds[partner]
    return (of_pair > 2 * _METAL) & (of_pair < 2 * _HYDROGEN)


_METAL, _COVALENT, _HYDROGEN, _NOBLE = 0, 1, 3, 9
"""Kinds of atoms, numbered so that the sum tells the pair: 0 two metals, 6 two hydrogens, above 6 a noble gas."""


@cache
def _kinds() -> Ints:
    kinds = np.where(is_covalent(), _COVALENT, _METAL)
    kinds[1] = _HYDROGEN
    kinds[list(_NOBLE_GASES)] = _NOBLE
    return kinds


def _dense(radii: Floats, coordinates: Floats) -> Nearest:
    blocks = [
        _rows(radii, coordinates, start, min(start + _ROWS, len(radii))) for start in range(0, len(radii), _ROWS)
    ]
    if len(blocks) == 1:
        return blocks[0]
    return Nearest(
        np.concatenate([block.partner for block in blocks]),
        np.concatenate([block.distance for block in blocks]),
        np.concatenate([block.ratio for block in blocks]),
    )


def _rows(radii: Floats, coordinates: Floats, start: int, stop: int) -> Nearest:
    """Search for the atoms from `start` up to `stop` among all atoms."""
    gaps = coordinates[start:stop, None, :] - coordinates
    lengths = np.sqrt(np.einsum("ijk,ijk->ij", gaps, gaps))
    ratios = lengths / (radii[start:stop, None] + radii)
    atoms = np.arange(stop - start)
    ratios[atoms, atoms + start] = np.inf
    partner = ratios.argmin(axis=1)
    return Nearest(partner, lengths[atoms, partner], ratios[atoms, partner])


def _by_tree(radii: Floats, coordinates: Floats) -> Nearest:
    """Search among the nearest few by distance.

    Coincident atoms are set aside first, for a leaf that cannot be split makes the search quadratic.
    """
    from scipy.spatial import cKDTree  # heavy, and needed for large systems only

    distinct, first, which, copies = np.unique(
        coordinates, axis=0, return_index=True, return_inverse=True, return_counts=True
    )
    which = which.reshape(-1)
    nearest = _SINGLE_POINT if len(distinct) == 1 else _of_distinct(cKDTree(distinct), radii[first])
    partner, distance, ratio = first[nearest.partner][which], nearest.distance[which], nearest.ratio[which]
    crowded = np.flatnonzero(copies[which] > 1)
    if len(crowded):
        partner[crowded] = _other_copy(first, which)[crowded]
        distance[crowded] = ratio[crowded] = 0.0
    return Nearest(partner, distance, ratio)


def _of_distinct(tree: object, radii: Floats) -> Nearest:
    points = tree.data  # type: ignore[attr-defined]
    lengths, others = tree.query(points, k=min(_TREE_NEIGHBOURS, len(radii)))  # type: ignore[attr-defined]
    ratios = lengths[:, 1:] / (radii[:, None] + radii[others[:, 1:]])
    best = ratios.argmin(axis=1)[:, None]
    return Nearest(
        np.take_along_axis(others[:, 1:], best, axis=1)[:, 0].astype(np.int64),
        np.take_along_axis(lengths[:, 1:], best, axis=1)[:, 0],
        np.take_along_axis(ratios, best, axis=1)[:, 0],
    )


def _other_copy(first: Ints, which: Ints) -> Ints:
    """Return, for each atom, another one on the same point: the first there, or the last for the first."""
    last = np.zeros(len(first), dtype=np.int64)
    last[which] = np.arange(len(which))
    atoms = np.arange(len(which))
    return np.where(first[which] == atoms, last[which], first[which])
