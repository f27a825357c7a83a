"""Neighbour pairs: dense and tree searches agree, and no heap of atoms fills the memory."""

import numpy as np
import pytest
from scipy.spatial.distance import pdist, squareform

from checker.chemistry import neighbours
from checker.chemistry.neighbours import neighbour_pairs
from checker.errors import NotDerivable

CUTOFF = 3.0


def cloud(n_atoms: int, box: float, seed: int = 1) -> np.ndarray:
    return np.random.default_rng(seed).uniform(0.0, box, (n_atoms, 3))


@pytest.mark.parametrize("n_atoms", [0, 1, 2, 57, 201, 700, 2100], ids=lambda n: f"n{n}")
def test_pairs_are_those_of_the_distance_matrix(n_atoms: int) -> None:
    points = cloud(n_atoms, 20.0)
    pairs, distances = neighbour_pairs(points, CUTOFF)
    full = squareform(pdist(points)) if n_atoms > 1 else np.zeros((n_atoms, n_atoms))
    expected = [(i, j) for i, j in zip(*np.nonzero((full <= CUTOFF) & (full >= 0)), strict=True) if i < j]
    assert [tuple(pair) for pair in pairs] == expected
    assert np.allclose(distances, [full[pair] for pair in expected])


@pytest.mark.parametrize("n_atoms", [5, 300, 3000])
def test_coincident_atoms_lie_at_zero(n_atoms: int) -> None:
    points = np.vstack([cloud(n_atoms - 1, 50.0), np.zeros((1, 3))])
    points[0] = 0.0
    pairs, distances = neighbour_pairs(points, 0.0)
    assert (pairs.tolist(), distances.tolist()) == ([[0, n_atoms - 1]], [0.0])


@pytest.mark.parametrize("size", [0.0, 1e-9, 1.0], ids=["coincident", "nearly", "ball"])
def test_error_a_heap_of_atoms_is_refused(size: float) -> None:
    with pytest.raises(NotDerivable, match="more than 400 atoms on average"):
        neighbour_pairs(size * cloud(20_000, 1.0), CUTOFF)


def test_far_coordinates_do_not_overflow() -> None:
    points = np.array([[1e6, 1e6, 1e6], [-1e6, -1e6, -1e6], [1e6, 1e6, 1e6 + 1]])
    pairs, distances = neighbour_pairs(points, 2.0)
    assert pairs.tolist() == [[0, 2]]
    assert distances[0] == pytest.approx(1.0)


def test_blocks_of_rows_join_without_a_seam(monkeypatch: pytest.MonkeyPatch) -> None:
    points = cloud(500, 15.0)
    whole, _ = neighbour_pairs(points, CUTOFF)
    monkeypatch.setattr(neighbours, "_BLOCK_ELEMENTS", 4_000)
    parts, _ = neighbour_pairs(points, CUTOFF)
    assert np.array_equal(whole, parts)
