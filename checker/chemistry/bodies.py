"""A rigid body of distinguishable atoms, and which atom an operation takes to which.

Positions are held relative to the centroid: every operation of a body that is exactly symmetric keeps it, and for
one that nearly is, it is the best centre in the sense of least squares.

Source: W. Kabsch, Acta Cryst. A32, 922 (1976), for the rotation that fits two sets of points best.
"""

from dataclasses import dataclass
from functools import cached_property
from itertools import product

import numpy as np
from numpy.typing import NDArray

Floats = NDArray[np.float64]
Ints = NDArray[np.int64]
Bools = NDArray[np.bool_]

DENSE_LIMIT_ATOMS = 250
"""Up to here comparing every image with every atom is faster than looking it up in a grid."""

_BLOCK_ELEMENTS = 1_000_000


@dataclass(frozen=True, eq=False)
class Body:
    """Atoms about their centroid.

    Attributes
    ----------
    kinds : (n,) int from 0 on, equal for atoms that an operation may exchange.
    positions : (n, 3) angstrom, relative to the centroid.

    """

    kinds: Ints
    positions: Floats

    def __len__(self) -> int:
        return len(self.kinds)

    @cached_property
    def radii(self) -> Floats:
        """(n,) distances from the centroid, angstrom."""
        return np.asarray(np.sqrt(np.einsum("ij,ij->i", self.positions, self.positions)))

    @cached_property
    def distances(self) -> Floats:
        """(n, n) distances of the atoms from each other, angstrom."""
        squares = self.radii**2
        gaps = squares[:, None] + squares[None, :] - 2.0 * (self.positions @ self.positions.T)
        return np.asarray(np.sqrt(np.maximum(gaps, 0.0)))

    @cached_property
    def alike(self) -> Bools:
        """(n, n) True where two atoms are of one kind."""
        return np.asarray(self.kinds[:, None] == self.kinds[None, :])

    @cached_property
    def closest_pair(self) -> tuple[int, int]:
        """The two atoms of one kind that are nearest to each other; twice the same atom where no two are alike."""
        apart = np.where(self.alike, self.distances, np.inf)
        np.fill_diagonal(apart, np.inf)
        first, second = divmod(int(apart.argmin()), len(self))
        return (first, second) if np.isfinite(apart[first, second]) else (0, 0)

    @cached_property
    def gap(self) -> float:
        """The least distance between two atoms of one kind, angstrom; infinite where no two are alike."""
        first, second = self.closest_pair
        return float(self.distances[first, second]) if first != second else np.inf

    @cached_property
    def environments(self) -> Floats:
        """(n, n) distances to the atoms of each kind in ascending order: equal for atoms that are equivalent."""
        columns = [np.sort(self.distances[:, self.kinds == kind], axis=1) for kind in range(self.kinds.max() + 1)]
        return np.concatenate(columns, axis=1)

    @cached_property
    def environment_gaps(self) -> Floats:
        """(n, n) the largest difference between two atoms' environments, angstrom; n^3 numbers on the way."""
        return np.asarray(np.abs(self.environments[:, None, :] - self.environments[None, :, :]).max(axis=2))

    def images(self, matrices: Floats, atoms: Ints | None = None) -> Ints:
        """Return the atom of the same kind nearest to where each operation takes each atom.

        Parameters
        ----------
        matrices : (c, 3, 3) orthogonal.
        atoms : (m,) indices of the atoms that are asked for; None stands for all.

        Returns
        -------
        (c, m) atom indices, -1 where there is certainly none within half an edge of the grid.

        """
        atoms = np.arange(len(self)) if atoms is None else atoms
        search = self._dense_images if len(self) <= DENSE_LIMIT_ATOMS else self._grid_images
        cost = len(atoms) * (len(self) if len(self) <= DENSE_LIMIT_ATOMS else 8)
        step = max(1, _BLOCK_ELEMENTS // cost)
        blocks = [search(matrices[start : start + step], atoms) for start in range(0, len(matrices), step)]
        return np.concatenate(blocks) if blocks else np.empty((0, len(atoms)), dtype=np.int64)

    def _dense_images(self, matrices: Floats, atoms: Ints) -> Ints:
        moved = self.positions[atoms] @ matrices.transpose(0, 2, 1)
        closeness = moved.reshape(-1, 3) @ self.positions.T
        closeness = closeness.reshape(len(matrices), len(atoms), len(self)) + self._bias[atoms]
        return np.asarray(closeness.argmax(axis=2))

    @cached_property
    def _bias(self) -> Floats:
        """What turns the scalar product of an image and an atom into their closeness; kinds never meet."""
        return np.where(self.alike, -0.5 * self.radii**2, -np.inf)

    @cached_property
    def _cell_edge(self) -> float:
        """Edge of the grid's cells, so small that a cell holds one atom of a kind at most."""
        return min(self.gap / 1.75, float(self.radii.max()) + 1.0)

    @cached_property
    def _grid(self) -> tuple[Ints, Ints]:
        """Codes of the occupied cells, ascending, and the atom in each."""
        codes = self._codes(np.floor(self.positions / self._cell_edge).astype(np.int64), self.kinds)
        order = np.argsort(codes)
        return codes[order], order

    def _codes(self, cells: Ints, kinds: Ints) -> Ints:
        """Give the cells (..., 3) of each kind numbers, no two the same."""
        side = 2 * int(np.ceil(self.radii.max() / self._cell_edge)) + 6
        shifted = cells + side // 2
        return np.asarray(((kinds * side + shifted[..., 0]) * side + shifted[..., 1]) * side + shifted[..., 2])

    def _grid_images(self, matrices: Floats, atoms: Ints) -> Ints:
        """Look in the eight cells about each image; an atom within half an edge is certainly in one of them."""
        codes, occupants = self._grid
        moved = self.positions[atoms] @ matrices.transpose(0, 2, 1)
        low = np.floor(moved / self._cell_edge - 0.5).astype(np.int64)
        least = np.full(moved.shape[:2], np.inf)
        best = np.full(moved.shape[:2], -1, dtype=np.int64)
        for corner in product((0, 1), repeat=3):
            wanted = self._codes(low + np.array(corner), self.kinds[atoms])
            place = np.minimum(np.searchsorted(codes, wanted), len(codes) - 1)
            gaps = moved - self.positions[occupants[place]]
            squares = np.where(codes[place] == wanted, np.einsum("cni,cni->cn", gaps, gaps), np.inf)
            best = np.where(squares < least, occupants[place], best)
            least = np.minimum(squares, least)
        return best


def cross_products(first: Floats, second: Floats) -> Floats:
    """Return the vector products (m, 3) of two lists of vectors, sooner than numpy's own on short ones."""
    turned, twice = [1, 2, 0], [2, 0, 1]
    return first[:, turned] * second[:, twice] - first[:, twice] * second[:, turned]


def best_matrices(positions: Floats, targets: Floats, handedness: Ints) -> Floats:
    """Return the orthogonal matrices that take positions to targets with the least sum of squares.

    Parameters
    ----------
    positions : (n, 3).
    targets : (c, n, 3).
    handedness : (c,) the determinants wanted, 1 or -1.

    Returns
    -------
    (c, 3, 3)

    """
    left, _, right = np.linalg.svd(targets.transpose(0, 2, 1) @ positions)
    product_of_signs = handedness * np.linalg.det(left @ right)
    left[:, :, 2] *= np.where(product_of_signs > 0, 1.0, -1.0)[:, None]
    return np.asarray(left @ right)


def body_of(kinds: Ints, coordinates: Floats) -> tuple[Body, Floats]:
    """Return the body and its centre (3,) in the coordinates' axes, angstrom."""
    points = np.ascontiguousarray(coordinates, dtype=np.float64).reshape(-1, 3)
    centre = points.mean(axis=0)
    number_of = {kind: number for number, kind in enumerate(sorted(set(np.asarray(kinds).tolist())))}
    numbered = np.array([number_of[kind] for kind in np.asarray(kinds).tolist()], dtype=np.int64)
    return Body(numbered, points - centre), centre
