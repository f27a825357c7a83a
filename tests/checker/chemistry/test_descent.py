"""Descent in symmetry and the way back; published tables in tests/outside/test_characters.py."""

import numpy as np
import pytest

from checker.chemistry.descent import (
    abelian_correlation,
    abelian_subgroups,
    ascend,
    correlation,
    descend,
    orbital_correlation,
    possible_levels,
)
from checker.chemistry.irreps import common_groups, point_group
from checker.chemistry.point_groups import PLANE_XY, Matrices, indices_of, rotation, standard_operations

GROUPS = common_groups()
CONTINUOUS = ("C∞v", "D∞h", "Kh")


def involutions(symbol: str) -> list[Matrices]:
    operations = standard_operations(symbol)
    return [op for op in operations if np.allclose(op @ op, np.eye(3)) and not np.allclose(op, np.eye(3))]


def largest_elementary_abelian(symbol: str) -> int:
    """Order of the largest subgroup all of whose operations commute and are their own inverses, by brute force."""
    of_two = involutions(symbol)

    def grow(start: int, chosen: list[Matrices]) -> int:
        best = len(chosen) + 1
        for i in range(start, len(of_two)):
            if all(np.allclose(of_two[i] @ other, other @ of_two[i]) for other in chosen):
                best = max(best, grow(i + 1, [*chosen, of_two[i]]))
        return best

    return grow(0, [])


@pytest.mark.parametrize("symbol", [s for s in GROUPS if s not in CONTINUOUS])
def test_the_abelian_group_is_the_largest_there_is(symbol: str) -> None:
    """All subgroups of D2h are made of commuting operations of order two, and the other way round."""
    orders = {len(standard_operations(choice.symbol)) for choice in abelian_subgroups(symbol)}
    assert orders == {largest_elementary_abelian(symbol)}


@pytest.mark.parametrize("symbol", GROUPS)
def test_descent_keeps_dimensions(symbol: str) -> None:
    group = point_group(symbol)
    assert group is not None
    for choice in abelian_subgroups(symbol):
        into = abelian_correlation(symbol, choice.symbol)
        assert {irrep.name: irrep.dimension for irrep in group.irreps} == {
            k: sum(v.values()) for k, v in into.items()
        }
        assert np.linalg.det(choice.turn) == pytest.approx(1)  # a frame turned, never mirrored


@pytest.mark.parametrize(
    "steps", ["Oh D4h D2h", "Oh Td D2", "Kh D∞h D2h", "D∞h C∞v C2v", "D6h D3h Cs", "Ih Th D2h"]
)
def test_descent_in_steps_is_descent_at_once(steps: str) -> None:
    top, middle, bottom = steps.split()
    first, second, at_once = (correlation(*pair) for pair in ((top, middle), (middle, bottom), (top, bottom)))
    assert first
    for name, row in first.items():
        assert descend(second, row) == at_once[name], name


def test_orientation_decides_which_name_an_irrep_gets() -> None:
    """In C2v of D2h the axis may be any of the three: z keeps B1, B2; x as axis makes B3u totally symmetric."""
    about_x = np.array([[0.0, 1.0, 0.0], [0.0, 0.0, 1.0], [1.0, 0.0, 0.0]])
    assert correlation("D2h", "C2v")["B1u"] == {"A1": 1}
    assert correlation("D2h", "C2v", about_x)["B3u"] == {"A1": 1}
    assert correlation("D2h", "Cs")["B1u"] == {"A''": 1}


@pytest.mark.parametrize(
    ("group", "subgroup", "turn"),
    [
        ("Td", "C2v", np.eye(3)),  # its planes lie between x and y
        ("C3v", "C2v", np.eye(3)),
        ("C∞v", "D2h", np.eye(3)),
        ("D∞h", "D2h", rotation((1, 0, 0), 0.3)),
        ("C2v", "C∞v", np.eye(3)),
    ],
)
def test_error_where_it_is_no_subgroup(group: str, subgroup: str, turn: Matrices) -> None:
    with pytest.raises(ValueError, match=f"{subgroup} in this orientation is no subgroup of {group}"):
        correlation(group, subgroup, turn)


def test_error_names_the_abelian_group() -> None:
    with pytest.raises(ValueError, match="C2v is not the abelian group of Oh, which is D2h"):
        abelian_correlation("Oh", "C2v")


def test_planes_of_a_group_go_to_the_plane_of_cs() -> None:
    """C3v in Cs: the plane xz of C3v is turned into the xy plane that Cs has."""
    (choice,) = abelian_subgroups("C3v")
    mirror = choice.turn.T @ PLANE_XY @ choice.turn
    assert indices_of(mirror, standard_operations("C3v")) > 0


@pytest.mark.parametrize(
    ("symbol", "levels", "orbitals"),
    [
        pytest.param("Td", {"A1": 2, "T2": 1}, {"A": 2, "B1": 1, "B2": 1, "B3": 1}, id="methane"),
        pytest.param("D∞h", {"Σg+": 3, "Σu+": 2, "Πu": 1},
                     {"Ag": 3, "B1u": 2, "B2u": 1, "B3u": 1}, id="dinitrogen"),
        pytest.param("D6h", {"A2u": 1, "E1g": 1}, {"B1u": 1, "B2g": 1, "B3g": 1}, id="benzene_pi"),
        pytest.param("Kh", {"Sg": 2, "Pu": 1}, {"Ag": 2, "B1u": 1, "B2u": 1, "B3u": 1}, id="neon"),
        pytest.param("C3v", {"A1": 3, "E": 1}, {"A'": 4, "A''": 1}, id="ammonia"),
    ],
)  # fmt: skip
def test_occupations_go_down(symbol: str, levels: dict[str, int], orbitals: dict[str, int]) -> None:
    assert descend(abelian_correlation(symbol), levels) == orbitals


@pytest.mark.parametrize(
    ("symbol", "most", "orbitals", "levels"),
    [
        pytest.param("Td", {"A1": 9, "E": 0, "T2": 9}, {"A": 2, "B1": 1, "B2": 1, "B3": 1},
                     {"A1": 2, "T2": 1}, id="methane_without_E_functions"),
        pytest.param("D∞h", {"Σg+": 8, "Σu+": 8, "Πu": 3, "Πg": 3}, {"Ag": 3, "B1u": 2, "B2u": 1, "B3u": 1},
                     {"Σg+": 3, "Σu+": 2, "Πu": 1}, id="dinitrogen_s_and_p"),
        pytest.param("D2h", None, {"Ag": 3, "B1u": 2}, {"Ag": 3, "B1u": 2}, id="nothing_to_gather"),
        pytest.param("C3v", {"A1": 9, "E": 9}, {"A'": 4, "A''": 1}, {"A1": 3, "E": 1}, id="ammonia"),
    ],
)  # fmt: skip
def test_occupations_go_up_where_it_is_unique(
    symbol: str, most: dict[str, int] | None, orbitals: dict[str, int], levels: dict[str, int]
) -> None:
    assert ascend(orbital_correlation(symbol), orbitals, most) == levels


@pytest.mark.parametrize(
    ("symbol", "orbitals"),
    [
        pytest.param("D∞h", {"Ag": 3, "B1u": 2, "B2u": 1}, id="half_a_pi_level"),
        pytest.param("Td", {"A": 2, "B1": 1, "B2": 1}, id="two_thirds_of_T2"),
        pytest.param("D∞h", {"Ag": 1, "B1g": 2}, id="more_delta_than_its_partner"),
        pytest.param("Kh", {"Ag": 1, "B1g": 1, "B2g": 1, "B3g": 1}, id="d_shell_without_its_second_Ag"),
        pytest.param("D∞h", {"Ag": -1}, id="less_than_none"),
        pytest.param("D∞h", {"B2u": 40, "B3u": 39}, id="many_and_one_missing"),
    ],
)
def test_error_where_a_level_is_partly_filled(symbol: str, orbitals: dict[str, int]) -> None:
    assert possible_levels(orbital_correlation(symbol), orbitals) == ()
    with pytest.raises(ValueError, match="no whole levels fit"):
        ascend(orbital_correlation(symbol), orbitals)


def test_several_meanings_are_all_given_up_to_the_limit() -> None:
    into = orbital_correlation("Td")
    assert possible_levels(into, {"A": 2}, limit=9) == ({"E": 1}, {"A1": 2}, {"A1": 1, "A2": 1}, {"A2": 2})
    with pytest.raises(ValueError, match="several sets of levels fit"):
        ascend(into, {"A": 2})


def test_caps_exclude_levels_that_the_basis_does_not_have() -> None:
    into = orbital_correlation("D∞h")
    assert possible_levels(into, {"B2u": 2, "B3u": 2}, {"Πu": 1}) == ()
    assert possible_levels(into, {"B2u": 2, "B3u": 2}, {"Πu": 1, "Φu": 1}) == ({"Πu": 1, "Φu": 1},)


@pytest.mark.parametrize("symbol", GROUPS)
def test_what_went_down_is_among_what_comes_back(symbol: str) -> None:
    into = orbital_correlation(symbol)
    random = np.random.default_rng(3)
    names = list(into)[:8]
    for _ in range(5):
        levels = {name: int(n) for name, n in zip(names, random.integers(0, 3, len(names)), strict=True) if n}
        assert levels in possible_levels(into, descend(into, levels), most=levels, limit=5)
