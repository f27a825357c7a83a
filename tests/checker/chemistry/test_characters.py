"""Character tables against the group itself: the great orthogonality theorem, classes, names' own rules."""

import itertools
import re

import numpy as np
import pytest
from numpy.typing import NDArray

from checker.chemistry.characters import (
    character_table,
    characters_at,
    momentum_characters,
    monomial_characters,
    sample,
    sample_over,
)
from checker.chemistry.classes import class_of_operation
from checker.chemistry.irreps import Irrep, common_groups, point_group
from checker.chemistry.point_groups import indices_of, rotation, standard_operations

FINITE = [s for s in common_groups() if "∞" not in s and s != "Kh"]
Complex = NDArray[np.complex128]


def regular_representation(symbol: str) -> tuple[NDArray[np.int64], NDArray[np.int64]]:
    """The multiplication table: [g, h] is the index of g h; and the index of each inverse."""
    operations = standard_operations(symbol)
    table = indices_of(np.einsum("gij,hjk->ghik", operations, operations), operations)
    return table, np.argmax(table == 0, axis=1)


def matrices_of(symbol: str, irrep: Irrep, characters: NDArray[np.float64]) -> list[Complex]:
    """The irrep as matrices (order, d, d) over the complex numbers, cut out of the regular representation.

    The character projects the group algebra onto the copies of the irrep; a random symmetric sum of
    multiplications from the right commutes with the group and tells the copies apart by its eigenvalues. No rule
    that named the irrep is used.
    """
    table, inverse = regular_representation(symbol)
    order, d = len(table), irrep.dimension
    left = np.zeros((order, order, order))
    for g in range(order):
        left[g, table[g], np.arange(order)] = 1.0
    projector = d / order * np.einsum("g,gij->ij", characters, left) / (2 if irrep.complex_pair else 1)
    values, vectors = np.linalg.eigh((projector + projector.T) / 2)
    image = vectors[:, values > 0.5]
    assert image.shape[1] == (2 if irrep.complex_pair else d * d)
    random = np.random.default_rng(7).normal(size=order)
    random = random + random[inverse]
    right = np.zeros((order, order))
    for g in range(order):
        right[table[:, g], np.arange(order)] += random[g]
    copies, within = np.linalg.eigh(image.T @ right @ image)
    basis = image @ within[:, :d]
    assert np.ptp(copies[:d]) < 1e-8
    found = np.einsum("ia,gij,jb->gab", basis, left, basis).astype(complex)
    if not irrep.complex_pair:
        return [found]
    return [(found[:, 0, 0] + sign * 1j * found[:, 1, 0])[:, None, None] for sign in (1, -1)]


@pytest.mark.parametrize("symbol", FINITE)
def test_great_orthogonality_theorem(symbol: str) -> None:
    """All matrix elements of all irreps, times sqrt(d / order), are a unitary matrix: orthogonal and complete."""
    operations = standard_operations(symbol)
    group = point_group(symbol)
    assert group is not None
    rows = []
    for irrep, characters in zip(group.irreps, characters_at(symbol, operations), strict=True):
        matrices = matrices_of(symbol, irrep, characters)
        assert np.allclose(sum(np.einsum("gaa->g", m) for m in matrices), characters)
        for m in matrices:
            rows.append(m.reshape(len(operations), -1).T * np.sqrt(m.shape[1] / len(operations)))
    elements = np.concatenate(rows)
    assert elements.shape == (len(operations), len(operations))
    assert np.allclose(elements @ elements.conj().T, np.eye(len(operations)), atol=1e-8)


@pytest.mark.parametrize("symbol", FINITE)
def test_characters_are_the_same_all_over_a_class(symbol: str) -> None:
    table = character_table(symbol)
    at_all = characters_at(symbol, standard_operations(symbol))
    assert np.allclose(at_all, table.characters[:, class_of_operation(symbol)])
    assert table.class_sizes.sum() == len(standard_operations(symbol))
    assert len(set(table.class_names)) == len(table.class_names)


@pytest.mark.parametrize("symbol", ["C37", "S36", "D25d", "D24d", "C60h", "D59h", "D60h"])
def test_rows_are_orthogonal_for_high_axes_too(symbol: str) -> None:
    over = sample(symbol)
    assert np.allclose((over.characters * over.weights) @ over.characters.T, np.diag(over.norms))


@pytest.mark.parametrize("symbol", ["C∞v", "D∞h", "Kh"])
def test_rows_of_continuous_groups_are_orthogonal(symbol: str) -> None:
    """The average over the group, as an integral over the angle that the sample stands for."""
    over = sample(symbol)
    assert over.weights.sum() == pytest.approx(1)
    assert np.allclose((over.characters * over.weights) @ over.characters.T, np.eye(len(over.characters)))


def test_marks_mean_what_the_rules_say() -> None:
    """Mulliken: 1 and 2 for C2' or σv, g and u for i, ' and '' for σh, A and B for the principal axis."""
    for symbol in FINITE:
        table = character_table(symbol)
        column = {name.lstrip("0123456789"): k for k, name in enumerate(table.class_names)}
        for irrep, row in zip(table.irreps, table.characters, strict=True):
            if "g" in irrep.name or "u" in irrep.name:
                assert np.sign(row[column["i"]]) == (1 if "g" in irrep.name else -1), (symbol, irrep.name)
            if "'" in irrep.name:
                assert np.sign(row[column["σh"]]) == (-1 if "''" in irrep.name else 1), (symbol, irrep.name)
            mirror = next((column[name] for name in ("C2'", "σv") if name in column), None)
            if irrep.name[:2] in ("A1", "A2", "B1", "B2") and mirror and symbol not in ("O", "Oh"):
                assert row[mirror] == pytest.approx(1 if irrep.name[1] == "1" else -1), (symbol, irrep.name)


@pytest.mark.parametrize(
    ("symbol", "function", "name"),
    [
        ("C2v", "x", "B1"), ("C2v", "y", "B2"), ("C2v", "z", "A1"), ("C2v", "xy", "A2"),
        ("D2", "z", "B1"), ("D2", "y", "B2"), ("D2", "x", "B3"), ("D2", "xyz", "A"),
        ("D2h", "z", "B1u"), ("D2h", "y", "B2u"), ("D2h", "x", "B3u"), ("D2h", "xy", "B1g"),
        ("D2h", "xz", "B2g"), ("D2h", "yz", "B3g"), ("D2h", "xyz", "Au"),
        ("C2h", "z", "Au"), ("C2h", "x", "Bu"), ("C2h", "xz", "Bg"), ("C2h", "xy", "Ag"),
        ("C4v", "xx-yy", "B1"), ("C4v", "xy", "B2"), ("D4h", "xx-yy", "B1g"), ("D4h", "xy", "B2g"),
        ("D2d", "xx-yy", "B1"), ("D2d", "xy", "B2"), ("D2d", "z", "B2"), ("D4d", "z", "B2"),
        ("D6h", "xxx-3xyy", "B1u"), ("D6h", "3xxy-yyy", "B2u"), ("C6v", "xxx-3xyy", "B1"),
        ("Td", "xyz", "A1"), ("Oh", "xyz", "A2u"), ("Cs", "x", "A'"), ("Cs", "z", "A''"), ("D3h", "z", "A2''"),
        ("D3d", "z", "A2u"), ("S4", "z", "B"), ("S4", "xx-yy", "B"),
    ],
)  # fmt: skip
def test_functions_of_one_irrep_in_the_standard_frame(symbol: str, function: str, name: str) -> None:
    """R. S. Mulliken (1955) for C2v; F. A. Cotton, Chemical Applications of Group Theory, IIA (from memory)."""
    operations = standard_operations(symbol)
    point = np.array([0.3, -0.7, 1.1])
    of_image = np.array([value(function, operation.T @ point) for operation in operations])
    group = point_group(symbol)
    assert group is not None
    row = characters_at(symbol, operations)[[irrep.name for irrep in group.irreps].index(name)]
    assert np.allclose(of_image / value(function, point), row)


def value(function: str, point: NDArray[np.float64]) -> float:
    """The value of a sum of monomials such as ``xxx-3xyy`` at a point."""
    total = 0.0
    for sign, factor, letters in re.findall(r"(-?)(\d?)([xyz]+)", function):
        scale = (-1.0 if sign else 1.0) * float(factor or 1)
        total += scale * float(np.prod([point["xyz".index(letter)] for letter in letters]))
    return total


def test_linear_characters_are_functions_of_the_angle() -> None:
    angle = 0.7
    turn, mirror = rotation((0, 0, 1), angle), np.diag([1.0, -1.0, 1.0])
    at = characters_at("D∞h", np.array([turn, -turn, turn @ mirror, -mirror]))
    names = [irrep.name for irrep in point_group("D∞h").irreps]  # type: ignore[union-attr]
    assert at[names.index("Πu")] == pytest.approx([2 * np.cos(angle), -2 * np.cos(angle), 0, 0])
    assert at[names.index("Δg")] == pytest.approx([2 * np.cos(2 * angle), 2 * np.cos(2 * angle), 0, 0])
    assert at[names.index("Σu+")] == pytest.approx([1, -1, 1, -1])
    assert at[names.index("Σg-")] == pytest.approx([1, 1, -1, -1])


@pytest.mark.parametrize("angle", [0.0, 0.4, 2.0, np.pi])
def test_angular_momentum_follows_its_closed_form(angle: float) -> None:
    """sin((2l+1) angle/2) / sin(angle/2); E. P. Wigner, Group Theory (1959), sec. 15 (from memory)."""
    chi = momentum_characters(rotation((1, 2, -1), angle)[None], 8)[:, 0]
    exact = [2 * l + 1 if angle == 0 else np.sin((l + 0.5) * angle) / np.sin(angle / 2) for l in range(9)]  # noqa: E741
    assert chi == pytest.approx(exact)


def test_monomials_are_counted_by_their_eigenvalues() -> None:
    operation = np.diag([-1.0, -1.0, 1.0]) @ rotation((0, 0, 1), 0.3)
    values = np.linalg.eigvals(operation)
    for degree in range(7):
        powers = itertools.combinations_with_replacement(values, degree)
        direct = sum(np.prod(chosen) if degree else 1 for chosen in powers)
        assert monomial_characters(operation[None], 6)[degree, 0] == pytest.approx(np.real(direct))


def test_error_names_what_is_no_group() -> None:
    with pytest.raises(ValueError, match="'C3x' is no symbol"):
        sample("C3x")
    with pytest.raises(ValueError, match="C2v has 4 operations, not 1"):
        sample_over("C2v", np.eye(3)[None])
