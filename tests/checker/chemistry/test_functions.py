"""Symmetry-adapted functions: counts by hand here, against a reference library in tests/outside."""

import numpy as np
import pytest
from numpy.typing import NDArray

from checker.chemistry.descent import abelian_correlation, descend
from checker.chemistry.functions import Form, levels_on_axis, levels_per_irrep, n_functions
from checker.chemistry.irreps import point_group
from checker.chemistry.point_groups import GOLDEN_RATIO, standard_operations

Points = NDArray[np.float64]


def permutations(symbol: str, points: Points) -> NDArray[np.int64]:
    """The atom on which each operation of the standard frame puts each atom."""
    images = np.einsum("gij,nj->gni", standard_operations(symbol), points)
    gaps = np.linalg.norm(images[:, :, None] - points[None, None], axis=3)
    assert gaps.min(axis=2).max() < 1e-8
    return np.asarray(np.argmin(gaps, axis=2), dtype=np.int64)


def all_signs(*rows: tuple[float, float, float]) -> Points:
    signs = np.array(np.meshgrid([1, -1], [1, -1], [1, -1])).reshape(3, -1).T
    return np.unique(np.concatenate([signs * np.array(row) for row in rows]).round(9) + 0.0, axis=0)


CYCLIC = [(0.0, 1.0, GOLDEN_RATIO), (GOLDEN_RATIO, 0.0, 1.0), (1.0, GOLDEN_RATIO, 0.0)]
# fivefold axes along (0, 1, golden ratio): a cage of twelve atoms, one on each
ICOSAHEDRON = all_signs(*CYCLIC)
OCTAHEDRON = np.concatenate([np.eye(3), -np.eye(3)])
TETRAHEDRON = np.array([[1.0, 1, 1], [1, -1, -1], [-1, 1, -1], [-1, -1, 1]])
HEXAGON = np.array([[np.cos(a), np.sin(a), 0.0] for a in np.pi / 3 * np.arange(6)])


@pytest.mark.parametrize(
    ("symbol", "points", "shells", "levels"),
    [
        pytest.param("Td", np.vstack([[0.0, 0, 0], TETRAHEDRON]), [[2, 1], *[[1, 0]] * 4],
                     {"A1": 3, "T2": 2}, id="methane_minimal"),
        pytest.param("Oh", OCTAHEDRON, [[1, 0]] * 6, {"A1g": 1, "Eg": 1, "T1u": 1}, id="six_sigma_ligands"),
        pytest.param("Oh", np.zeros((1, 3)), [[0, 0, 1]], {"Eg": 1, "T2g": 1}, id="d_shell_in_octahedron"),
        pytest.param("Oh", np.zeros((1, 3)), [[0, 0, 0, 1]], {"A2u": 1, "T1u": 1, "T2u": 1}, id="f_shell"),
        pytest.param("D6h", HEXAGON, [[0, 1]] * 6, {"A1g": 1, "A2g": 1, "B2g": 1, "E1g": 1, "E2g": 2,
                     "A2u": 1, "B1u": 1, "B2u": 1, "E1u": 2, "E2u": 1}, id="benzene_p_shells"),
        pytest.param("Ih", ICOSAHEDRON, [[1, 0]] * 12, {"Ag": 1, "Hg": 1, "T1u": 1, "T2u": 1}, id="icosahedron_s"),
    ],
)  # fmt: skip
def test_levels_by_hand(symbol: str, points: Points, shells: list[list[int]], levels: dict[str, int]) -> None:
    """F. A. Cotton, Chemical Applications of Group Theory, chapters 6 to 9, and by hand (from memory).

    The carbons of benzene lie on the C2' axes, along x.
    """
    operations = standard_operations(symbol)
    counted = levels_per_irrep(symbol, operations, permutations(symbol, points), np.array(shells))
    assert {name: n for name, n in counted.items() if n} == levels
    assert n_of(symbol, counted) == n_functions(np.array(shells))


def n_of(symbol: str, levels: dict[str, int]) -> int:
    group = point_group(symbol)
    assert group is not None
    return sum(irrep.dimension * levels.get(irrep.name, 0) for irrep in group.irreps)


@pytest.mark.parametrize("form", ["spherical", "cartesian"])
@pytest.mark.parametrize(
    ("symbol", "points"),
    [("Td", TETRAHEDRON), ("Oh", OCTAHEDRON), ("Ih", ICOSAHEDRON), ("D6h", HEXAGON)],
)
def test_the_full_group_descends_to_the_abelian_one(symbol: str, points: Points, form: Form) -> None:
    shells = np.array([[3, 2, 1, 1]] * len(points))
    subgroup = "D2" if symbol == "Td" else "D2h"
    of_full, of_abelian = (
        levels_per_irrep(group, standard_operations(group), permutations(group, points), shells, form)
        for group in (symbol, subgroup)
    )
    assert descend(abelian_correlation(symbol), of_full) == {k: v for k, v in of_abelian.items() if v}
    assert n_of(symbol, of_full) == n_functions(shells, form)


def test_linear_molecules_count_by_axial_momentum_and_parity() -> None:
    """Carbon monoxide and carbon dioxide in s and p shells, by hand; a cartesian d shell holds an s too."""
    assert levels_on_axis("C∞v", None, np.array([[3, 2], [3, 2]])) == {"Σ+": 10, "Π": 4}
    dioxide = levels_on_axis("D∞h", np.array([2, 1, 0]), np.array([[2, 1]] * 3))
    assert dioxide == {"Σg+": 5, "Πg": 1, "Σu+": 4, "Πu": 2}
    d_shell = np.array([[0, 0, 1]])
    assert levels_on_axis("C∞v", None, d_shell) == {"Σ+": 1, "Π": 1, "Δ": 1}
    assert levels_on_axis("C∞v", None, d_shell, "cartesian") == {"Σ+": 2, "Π": 1, "Δ": 1}


def test_a_free_atom_counts_by_momentum() -> None:
    assert levels_on_axis("Kh", None, np.array([[4, 3, 2, 1]])) == {"Sg": 4, "Pu": 3, "Dg": 2, "Fu": 1}
    assert levels_on_axis("Kh", None, np.array([[0, 0, 0, 1]]), "cartesian") == {"Pu": 1, "Fu": 1}


def test_linear_counts_descend_to_those_of_the_abelian_group() -> None:
    points = np.array([[0.0, 0, 1.2], [0, 0, 0], [0, 0, -1.2]])
    shells = np.array([[3, 2, 1]] * 3)
    along = levels_on_axis("D∞h", np.array([2, 1, 0]), shells)
    below = levels_per_irrep("D2h", standard_operations("D2h"), permutations("D2h", points), shells)
    assert descend(abelian_correlation("D∞h"), along) == {k: v for k, v in below.items() if v}


def test_noise_of_a_found_frame_changes_no_count() -> None:
    noise = np.random.default_rng(5).normal(scale=1e-5, size=(4, 3, 3))
    points = np.array([[0.0, 0, 0.1], [0, 0.8, -0.5], [0, -0.8, -0.5]])
    counted = levels_per_irrep(
        "C2v", standard_operations("C2v") + noise, permutations("C2v", points), np.array([[2, 1], [1, 0], [1, 0]])
    )
    assert counted == {"A1": 4, "A2": 0, "B1": 1, "B2": 2}


def test_error_for_too_few_operations() -> None:
    with pytest.raises(ValueError, match="Td has 24 operations, not 4"):
        levels_per_irrep(
            "Td", standard_operations("D2"), permutations("D2", TETRAHEDRON), np.ones((4, 1), dtype=int)
        )
