"""Point groups against published tables, and against the groups themselves built from their operations."""

import itertools

import numpy as np
import pytest
from numpy.typing import NDArray

from checker.chemistry.irreps import MAX_AXIS, common_groups, nearest_groups, point_group

# F. A. Cotton, Chemical Applications of Group Theory, 3rd ed., appendix IIA; S. L. Altmann & P. Herzig,
# Point-Group Theory Tables, 2nd ed. (from memory). Altmann & Herzig write the conjugate pairs singly.
PUBLISHED = {
    "C1": "A",
    "Cs": "A' A''",
    "Ci": "Ag Au",
    "C2": "A B",
    "C3": "A E",
    "C4": "A B E",
    "C5": "A E1 E2",
    "C6": "A B E1 E2",
    "C2v": "A1 A2 B1 B2",
    "C3v": "A1 A2 E",
    "C4v": "A1 A2 B1 B2 E",
    "C5v": "A1 A2 E1 E2",
    "C6v": "A1 A2 B1 B2 E1 E2",
    "C2h": "Ag Bg Au Bu",
    "C3h": "A' E' A'' E''",
    "C4h": "Ag Bg Eg Au Bu Eu",
    "C6h": "Ag Bg E1g E2g Au Bu E1u E2u",
    "D2": "A B1 B2 B3",
    "D3": "A1 A2 E",
    "D4": "A1 A2 B1 B2 E",
    "D2h": "Ag B1g B2g B3g Au B1u B2u B3u",
    "D3h": "A1' A2' E' A1'' A2'' E''",
    "D4h": "A1g A2g B1g B2g Eg A1u A2u B1u B2u Eu",
    "D5h": "A1' A2' E1' E2' A1'' A2'' E1'' E2''",
    "D6h": "A1g A2g B1g B2g E1g E2g A1u A2u B1u B2u E1u E2u",
    "D2d": "A1 A2 B1 B2 E",
    "D3d": "A1g A2g Eg A1u A2u Eu",
    "D4d": "A1 A2 B1 B2 E1 E2 E3",
    "D5d": "A1g A2g E1g E2g A1u A2u E1u E2u",
    "S4": "A B E",
    "S6": "Ag Eg Au Eu",
    "S8": "A B E1 E2 E3",
    "T": "A E T",
    "Th": "Ag Eg Tg Au Eu Tu",
    "Td": "A1 A2 E T1 T2",
    "O": "A1 A2 E T1 T2",
    "Oh": "A1g A2g Eg T1g T2g A1u A2u Eu T1u T2u",
    "I": "A T1 T2 G H",
    "Ih": "Ag T1g T2g Gg Hg Au T1u T2u Gu Hu",
}
DIMENSIONS = {"A": 1, "B": 1, "E": 2, "T": 3, "G": 4, "H": 5}
Matrix = NDArray[np.float64]


@pytest.mark.parametrize(("symbol", "names"), PUBLISHED.items())
def test_irreps_are_those_of_the_published_table(symbol: str, names: str) -> None:
    group = point_group(symbol)
    assert group is not None
    assert [irrep.name for irrep in group.irreps] == names.split()
    assert [irrep.dimension for irrep in group.irreps] == [DIMENSIONS[name[0]] for name in names.split()]


@pytest.mark.parametrize("symbol", [s for s in common_groups() if "∞" not in s and s != "Kh"])
def test_order_and_classes_are_those_of_the_operations(symbol: str) -> None:
    """Burnside: squares of the dimensions sum to the order, and there are as many irreps as classes."""
    group = point_group(symbol)
    assert group is not None
    operations = close_group(generators(symbol))
    over_complex = [d for i in group.irreps for d in ([1, 1] if i.complex_pair else [i.dimension])]
    assert group.order == len(operations) == sum(d * d for d in over_complex)
    assert len(over_complex) == n_classes(operations)
    assert group.is_abelian == (n_classes(operations) == len(operations))


def test_burnside_holds_up_to_the_highest_axis() -> None:
    for n, (kind, ending) in itertools.product(
        range(2, MAX_AXIS + 1), [*itertools.product("CD", ["", "h"]), ("C", "v")]
    ):
        group = point_group(f"{kind}{n}{ending}")
        assert group is not None
        assert sum(2 if i.complex_pair else i.dimension**2 for i in group.irreps) == group.order
        assert len({i.name for i in group.irreps}) == len(group.irreps)


def test_linear_and_atomic_irreps() -> None:
    """G. Herzberg, Spectra of Diatomic Molecules, ch. V; atomic terms have 2L+1 components."""
    linear, symmetric, atom = (point_group(symbol) for symbol in ("Cinfv", "Dinfh", "Kh"))
    assert linear is not None
    assert symmetric is not None
    assert atom is not None
    assert [irrep.name for irrep in linear.irreps[:5]] == ["Σ+", "Σ-", "Π", "Δ", "Φ"]
    assert {"Σg+", "Σu+", "Σg-", "Πu", "Δg"} <= {irrep.name for irrep in symmetric.irreps}
    assert {i.name: i.dimension for i in atom.irreps}["Fu"] == 7
    assert [i.name for i in atom.irreps[:8] if i.of_orbitals] == ["Sg", "Pu", "Dg", "Fu"]
    assert [i.name for i in symmetric.irreps if not i.of_orbitals] == ["Σg-", "Σu-"]
    assert linear.order is symmetric.order is atom.order is None


@pytest.mark.parametrize(
    ("written", "symbol"),
    [
        ("c2v", "C2v"), ("C_2v", "C2v"), ("C₂ᵥ", "C2v"), ("C_{2v}", "C2v"), (" D2H ", "D2h"), ("TD", "Td"),
        ("oh", "Oh"), ("C∞v", "C∞v"), ("Cinfv", "C∞v"), ("D_infh", "D∞h"),
        ("Dooh", "D∞h"), ("dinfinityh", "D∞h"), ("kh", "Kh"),
        ("C1h", "Cs"), ("C1v", "Cs"), ("S1", "Cs"), ("S2", "Ci"), ("C3i", "S6"), ("S3", "C3h"), ("C5i", "S10"),
    ],
)  # fmt: skip
def test_symbols_are_read_as_people_write_them(written: str, symbol: str) -> None:
    group = point_group(written)
    assert group is not None
    assert group.symbol == symbol


@pytest.mark.parametrize(
    "written", ["", "x", "C0v", "C61", "D1h", "Sv", "S4h", "Dinfv", "C-2v", "C2v2", "Tg", "mm2", "C" * 99]
)
def test_what_is_no_group_is_none(written: str) -> None:
    assert point_group(written) is None


@pytest.mark.parametrize(
    ("written", "near"), [("D2x", "D2"), ("C3hv", "C3h"), ("Thh", "Th"), ("Dinfth", "D∞h"), ("zzz", None)]
)
def test_the_nearest_symbols_are_offered(written: str, near: str | None) -> None:
    offered = nearest_groups(written)
    assert (near in offered) if near else not offered


# --- the groups as matrices, independent of the naming rules ---


def rotation(n: float, axis: str = "z") -> Matrix:
    c, s = np.cos(2 * np.pi / n), np.sin(2 * np.pi / n)
    matrix = np.array([[c, -s, 0], [s, c, 0], [0, 0, 1.0]])
    turn = {"z": [0, 1, 2], "x": [2, 0, 1], "y": [1, 2, 0]}[axis]
    return matrix[np.ix_(turn, turn)]


def about(direction: tuple[float, float, float], n: int) -> Matrix:
    x, y, z = np.array(direction) / np.linalg.norm(direction)
    cross = np.array([[0, -z, y], [z, 0, -x], [-y, x, 0]])
    angle = 2 * np.pi / n
    return np.asarray(np.eye(3) + np.sin(angle) * cross + (1 - np.cos(angle)) * cross @ cross)


INVERSION = -np.eye(3)
PLANE_H = np.diag([1.0, 1.0, -1.0])
PLANE_V = np.diag([1.0, -1.0, 1.0])
TETRAHEDRAL = [rotation(2), about((1, 1, 1), 3)]
ICOSAHEDRAL = [about((0, 1, (1 + 5**0.5) / 2), 5), about((1, 1, 1), 3)]
FIXED = {
    "C1": [np.eye(3)],
    "Cs": [PLANE_H],
    "Ci": [INVERSION],
    "T": TETRAHEDRAL,
    "Th": [*TETRAHEDRAL, INVERSION],
    "Td": [*TETRAHEDRAL, PLANE_H @ rotation(4)],
    "O": [*TETRAHEDRAL, rotation(4)],
    "Oh": [*TETRAHEDRAL, rotation(4), INVERSION],
    "I": ICOSAHEDRAL,
    "Ih": [*ICOSAHEDRAL, INVERSION],
}


def generators(symbol: str) -> list[Matrix]:
    if symbol in FIXED:
        return FIXED[symbol]
    kind, n, ending = symbol[0], int(symbol[1]), symbol[2:]
    if kind == "S":
        return [PLANE_H @ rotation(n)]
    made = [rotation(n)] + ([rotation(2, "x")] if kind == "D" else [])
    if ending == "d":
        return [*made, PLANE_H @ rotation(2 * n)]
    return made + {"": [], "v": [PLANE_V], "h": [PLANE_H]}[ending]


def close_group(made_of: list[Matrix]) -> list[Matrix]:
    found = [np.eye(3)]
    for operation in found:  # grows while it is walked
        for generator in made_of:
            product = generator @ operation
            if not any(np.allclose(product, known) for known in found):
                found.append(product)
    return found


def n_classes(operations: list[Matrix]) -> int:
    left = list(operations)
    n_found = 0
    while left:
        members = [g @ left[0] @ g.T for g in operations]
        left = [op for op in left if not any(np.allclose(op, member) for member in members)]
        n_found += 1
    return n_found
