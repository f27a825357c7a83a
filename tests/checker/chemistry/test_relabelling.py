"""Other choices of axes: what they rename, and when the body's own symmetry makes them the same choice."""

import numpy as np
import pytest

from checker.chemistry.descent import abelian_correlation, abelian_subgroups, descend
from checker.chemistry.irreps import common_groups
from checker.chemistry.relabelling import equivalent_relabellings, relabellings

FINITE = [s for s in common_groups() if "∞" not in s and s != "Kh"]


def renamed(symbol: str, words: str) -> dict[str, str]:
    (found,) = [other for other in relabellings(symbol) if other.words == words]
    return {old: new for old, new in found.names.items() if old != new}


def test_planes_of_c2v_may_be_exchanged() -> None:
    """Mulliken (1955): B1 and B2 of C2v change places with x and y."""
    assert renamed("C2v", "x and y exchanged") == {"B1": "B2", "B2": "B1"}


def test_axes_of_d2h_may_be_called_in_six_ways() -> None:
    """B1 goes with z, B2 with y, B3 with x, g and u alike."""
    assert len(relabellings("D2h")) == len(relabellings("D2")) == 5
    assert renamed("D2h", "x and z exchanged") == {"B1g": "B3g", "B3g": "B1g", "B1u": "B3u", "B3u": "B1u"}
    assert renamed("D2", "x and y exchanged") == {"B2": "B3", "B3": "B2"}
    assert renamed("D2", "x, y, z become y, z, x") == {"B3": "B2", "B2": "B1", "B1": "B3"}


@pytest.mark.parametrize(
    ("symbol", "pairs"),
    [
        ("D4h", {"B1g": "B2g", "B2g": "B1g", "B1u": "B2u", "B2u": "B1u"}),
        ("C6v", {"B1": "B2", "B2": "B1"}),
        ("D6", {"B1": "B2", "B2": "B1"}),
    ],
)
def test_c2_axes_and_planes_of_even_groups_come_in_two_kinds(symbol: str, pairs: dict[str, str]) -> None:
    (only,) = relabellings(symbol)
    assert {old: new for old, new in only.names.items() if old != new} == pairs


@pytest.mark.parametrize("symbol", ["C1", "Cs", "C2h", "C3v", "D3h", "D2d", "D3d", "S4", "Td", "Oh", "Ih"])
def test_other_groups_leave_no_choice(symbol: str) -> None:
    assert relabellings(symbol) == ()


@pytest.mark.parametrize("symbol", FINITE)
def test_a_relabelling_renames_every_irrep_to_one_of_its_kind(symbol: str) -> None:
    for other in relabellings(symbol):
        assert sorted(other.names.values()) == sorted(other.names)
        assert np.linalg.det(other.turn) == pytest.approx(1)
        assert other.applied_to(dict.fromkeys(other.names, 1)) == dict.fromkeys(other.names, 1)


@pytest.mark.parametrize(
    ("group", "subgroup", "n_equivalent"),
    [
        pytest.param("Kh", "D2h", 5, id="atom-all_axes_alike"),
        pytest.param("D∞h", "D2h", 1, id="linear-x_and_y_alike"),
        pytest.param("C∞v", "C2v", 1, id="linear_without_centre"),
        pytest.param("Oh", "D2h", 5, id="octahedron"),
        pytest.param("Td", "D2", 5, id="tetrahedron_in_D2"),
        pytest.param("Td", "C2v", 1, id="tetrahedron_in_C2v-S4_exchanges_the_planes"),
        pytest.param("D2d", "C2v", 1, id="allene"),
        pytest.param("D4h", "D2h", 1, id="square"),
        pytest.param("D6h", "D2h", 0, id="hexagon-x_through_atoms_y_between"),
        pytest.param("C2v", "C2v", 0, id="water"),
        pytest.param("D2h", "D2h", 0, id="ethene"),
        pytest.param("Th", "D2h", 2, id="pyritohedral-cyclic_only"),
        pytest.param("D3h", "C2v", 0, id="triangle"),
    ],
)
def test_axes_are_alike_where_the_body_exchanges_them(group: str, subgroup: str, n_equivalent: int) -> None:
    (turn,) = [choice.turn for choice in abelian_subgroups(group) if choice.symbol == subgroup]
    assert len(equivalent_relabellings(group, subgroup, turn)) == n_equivalent


@pytest.mark.parametrize("group", [g for g in common_groups() if len(abelian_correlation(g)) < 30])
def test_whole_levels_look_the_same_from_equivalent_axes(group: str) -> None:
    for choice in abelian_subgroups(group):
        into = abelian_correlation(group, choice.symbol)
        for other in equivalent_relabellings(group, choice.symbol, choice.turn):
            for name in into:
                orbitals = descend(into, {name: 1})
                assert other.applied_to(orbitals) == orbitals, (group, name)
