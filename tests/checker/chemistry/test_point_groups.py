"""Operations of the point groups: that they are groups, and that their elements lie where the vocabulary says."""

import numpy as np
import pytest

from checker.chemistry.irreps import common_groups, point_group
from checker.chemistry.point_groups import (
    GOLDEN_RATIO,
    Matrices,
    family_of,
    indices_of,
    rotation,
    standard_operations,
)

FINITE = [s for s in common_groups() if "∞" not in s and s != "Kh"]
X, Y, Z = (1.0, 0.0, 0.0), (0.0, 1.0, 0.0), (0.0, 0.0, 1.0)


def turn(axis: tuple[float, float, float], n: int) -> Matrices:
    return rotation(axis, 2 * np.pi / n)


def plane(normal: tuple[float, float, float]) -> Matrices:
    return -turn(normal, 2)


def improper(axis: tuple[float, float, float], n: int) -> Matrices:
    return plane(axis) @ turn(axis, n)


@pytest.mark.parametrize("symbol", FINITE)
def test_the_operations_are_a_group_of_the_right_order(symbol: str) -> None:
    operations = standard_operations(symbol)
    group = point_group(symbol)
    assert group is not None
    assert len(operations) == group.order
    assert np.array_equal(operations[0], np.eye(3))
    assert np.allclose(operations @ operations.transpose(0, 2, 1), np.eye(3))
    products = np.einsum("gij,hjk->ghik", operations, operations)
    table = indices_of(products, operations)
    assert all(sorted(row) == list(range(len(operations))) for row in table.tolist())  # closed, all different


@pytest.mark.parametrize(
    ("symbol", "elements", "missing"),
    [
        pytest.param("Cs", [plane(Z)], [plane(X)], id="Cs-plane_is_xy"),
        pytest.param("C2v", [turn(Z, 2), plane(Y), plane(X)], [plane(Z)], id="C2v"),
        pytest.param("C3v", [turn(Z, 3), plane(Y)], [plane(X)], id="C3v-xz_is_a_plane"),
        pytest.param("C2h", [turn(Z, 2), plane(Z)], [turn(X, 2)], id="C2h-axis_z"),
        pytest.param("D3", [turn(X, 2)], [turn(Y, 2)], id="D3-C2'_along_x"),
        pytest.param("D3h", [turn(X, 2), plane(Y), improper(Z, 3)], [plane(X)], id="D3h"),
        pytest.param("D3d", [turn(X, 2), plane(X), improper(Z, 6)], [plane(Y)], id="D3d"),
        pytest.param("D2d", [turn(X, 2), turn(Y, 2), improper(Z, 4), plane((1, 1, 0))], [plane(X)], id="D2d"),
        pytest.param("D4d", [turn(X, 2), turn(Y, 2), improper(Z, 8)], [plane(X)], id="D4d"),
        pytest.param("D4h", [turn(X, 2), turn(Y, 2), turn((1, 1, 0), 2)], [], id="D4h"),
        pytest.param("D6h", [turn(X, 2), turn(Y, 2), turn(Z, 6), -np.eye(3)], [], id="D6h"),
        pytest.param("S4", [improper(Z, 4), turn(Z, 2)], [turn(Z, 4)], id="S4"),
        pytest.param("T", [turn((1, 1, 1), 3), turn(X, 2)], [turn(Z, 4)], id="T"),
        pytest.param("Td", [improper(Z, 4), plane((1, 1, 0))], [turn(Z, 4), -np.eye(3)], id="Td"),
        pytest.param("Th", [plane(Z), improper((1, 1, 1), 6)], [plane((1, 1, 0))], id="Th"),
        pytest.param("O", [turn(X, 4), turn((1, 1, 0), 2)], [-np.eye(3)], id="O"),
        pytest.param("Oh", [turn(Y, 4), improper((1, 1, 1), 6), plane((1, 1, 0))], [], id="Oh"),
        pytest.param("I", [turn((0, 1, GOLDEN_RATIO), 5), turn(Z, 2)], [turn((1, 0, GOLDEN_RATIO), 5)], id="I"),
        pytest.param("Ih", [improper((0, 1, GOLDEN_RATIO), 10), plane(X)], [], id="Ih"),
    ],
)
def test_elements_lie_where_the_vocabulary_says(
    symbol: str, elements: list[Matrices], missing: list[Matrices]
) -> None:
    operations = standard_operations(symbol)
    assert np.all(indices_of(np.array(elements), operations) >= 0)
    assert np.all(indices_of(np.array(missing).reshape(-1, 3, 3), operations) == -1)


@pytest.mark.parametrize("symbol", ["C∞v", "Kh", "c2v", "C1h", "C99", "nonsense"])
def test_error_where_there_is_no_such_finite_group(symbol: str) -> None:
    with pytest.raises(ValueError, match="no symbol of a finite point group"):
        standard_operations(symbol)


def test_the_largest_axis_is_quick_and_whole() -> None:
    assert len(standard_operations("D60h")) == 240


def test_operations_cannot_be_changed_by_a_caller() -> None:
    with pytest.raises(ValueError, match="read-only"):
        standard_operations("C2v")[0, 0, 0] = 2.0


def test_families() -> None:
    assert [family_of(s) for s in ("D6h", "S8", "C3", "Cs", "Td")] == [
        ("Dnh", 6), ("Sn", 8), ("Cn", 3), ("Cs", 0), ("Td", 0),
    ]  # fmt: skip
