"""Which atoms lie near which: pairs within a cutoff.

Small systems are done with dense arrays; large ones with a k-d tree, whose library is imported only then.
"""

from functools import lru_cache
from typing import TypeAlias

import numpy as np
from numpy.typing import NDArray

from checker.errors import NotDerivable

Floats: TypeAlias = NDArray[np.float64]
Ints: TypeAlias = NDArray[np.int64]

DENSE_LIMIT_ATOMS = 2_000
"""Below this number of atoms the full distance matrix is cheaper than building a tree."""

NEIGHBOURS_PER_ATOM_LIMIT = 400
"""More than this on average is no molecule but a heap of atoms; the search stops before it fills the memory."""

_BLOCK_ELEMENTS = 250_000
_CHUNK_ATOMS = 512
_SAMPLE_ATOMS = 4_096
_SMALL_ATOMS = 200


def neighbour_pairs(coordinates: Floats, cutoff: float) -> tuple[Ints, Floats]:
    """Pairs of atoms not farther apart than the cutoff.

    Parameters
    ----------
    coordinates : (n, 3) float array, angstrom.
    cutoff : float, angstrom.

    Returns
    -------
    pairs : (m, 2) int array, i < j, sorted by i and then j.
    distances : (m,) float array, angstrom.

    Raises
    ------
    NotDerivable
        If the atoms lie so dense that the list would not fit in memory.

    """
    points = np.ascontiguousarray(coordinates, dtype=np.float64).reshape(-1, 3)
    if len(points) <= _SMALL_ATOMS:
        return _small_pairs(points, cutoff)
    if len(points) < DENSE_LIMIT_ATOMS:
        return _dense_pairs(points, cutoff)
    return _tree_pairs(points, cutoff)


def _rows_per_block(n_atoms: int) -> int:
    return max(1, _BLOCK_ELEMENTS // max(1, n_atoms))


@lru_cache(maxsize=16)
def _upper_triangle(n_atoms: int) -> tuple[Ints, Ints]:
    rows, columns = np.triu_indices(n_atoms, 1)
    return rows.astype(np.int64), columns.astype(np.int64)


def _small_pairs(points: Floats, cutoff: float) -> tuple[Ints, Floats]:
    rows, columns = _upper_triangle(len(points))
    gaps = points[rows] - points[columns]
    squares = np.einsum("ij,ij->i", gaps, gaps)
    near = np.flatnonzero(squares <= cutoff * cutoff)
    pairs = np.empty((len(near), 2), dtype=np.int64)
    pairs[:, 0], pairs[:, 1] = rows[near], columns[near]
    return pairs, np.sqrt(squares[near])


def _dense_pairs(points: Floats, cutoff: float) -> tuple[Ints, Floats]:
    found: list[Ints] = []
    lengths: list[Floats] = []
    for start in range(0, len(points), _rows_per_block(len(points))):
        stop = min(start + _rows_per_block(len(points)), len(points))
        gaps = points[start:stop, None, :] - points[None, start:, :]
        squares = np.einsum("ijk,ijk->ij", gaps, gaps)
        rows, columns = np.nonzero(squares <= cutoff * cutoff)
        upper = columns > rows
        rows, columns = rows[upper], columns[upper]
        found.append(np.stack([rows, columns], axis=1) + start)
        lengths.append(np.sqrt(squares[rows, columns]))
    if not found:
        return np.empty((0, 2), dtype=np.int64), np.empty(0)
    return np.concatenate(found), np.concatenate(lengths)


def _tree_pairs(points: Floats, cutoff: float) -> tuple[Ints, Floats]:
    from scipy.spatial import cKDTree  # heavy, and needed for large systems only

    # A median-split tree degenerates on thousands of coincident atoms; the sliding midpoint does not.
    tree = cKDTree(points, balanced_tree=False, compact_nodes=False)
    _refuse_heap(tree, points, cutoff)
    pairs = np.asarray(tree.query_pairs(cutoff, output_type="ndarray"), dtype=np.int64).reshape(-1, 2)
    pairs = pairs[np.lexsort((pairs[:, 1], pairs[:, 0]))]
    gaps = points[pairs[:, 0]] - points[pairs[:, 1]]
    return pairs, np.sqrt(np.einsum("ij,ij->i", gaps, gaps))


def _refuse_heap(tree: object, points: Floats, cutoff: float) -> None:
    """Count first, on a sample: a count costs no memory, and listing the pairs of a heap of atoms would."""
    sample = points[:: max(1, len(points) // _SAMPLE_ATOMS)]
    total = 0
    for start in range(0, len(sample), _CHUNK_ATOMS):
        chunk = sample[start : start + _CHUNK_ATOMS]
        total += int(np.sum(tree.query_ball_point(chunk, cutoff, return_length=True)))  # type: ignore[attr-defined]
        if total > NEIGHBOURS_PER_ATOM_LIMIT * len(sample):
            because = (
                f"more than {NEIGHBOURS_PER_ATOM_LIMIT} atoms on average within {cutoff:.2f} angstrom of each atom"
            )
            raise NotDerivable(because)
