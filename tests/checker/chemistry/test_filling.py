"""What occupations mean in the body's own group. O2, N2 and atoms by their published terms, from memory."""

import pytest

from checker.chemistry.descent import abelian_correlation, abelian_subgroups, correlation
from checker.chemistry.filling import (
    OpenLevel,
    electron_correlation,
    fills_whole_levels,
    missing_partners,
    open_levels,
    state_irreps,
    terms_of,
)

N2 = {"Ag": 3, "B1u": 2, "B2u": 1, "B3u": 1}
LINEAR = electron_correlation("D∞h", "D2h")
ATOM = electron_correlation("Kh", "D2h")
SP_ATOM = {"Sg": 5, "Pu": 3}
S_AND_P = {"Σg+": 8, "Σu+": 8, "Πg": 3, "Πu": 3}


def with_more(**further: int) -> dict[str, int]:
    return {name: N2.get(name, 0) + further.get(name, 0) for name in {**N2, **further}}


def terms_in(group: str, subgroup: str, level: OpenLevel) -> tuple[str, ...]:
    turn = next(choice.turn for choice in abelian_subgroups(group) if choice.symbol == subgroup)
    partners = electron_correlation(group, subgroup, turn)[level.irrep]
    return terms_of(group, level, subgroup, partners, abelian_correlation(group, subgroup))


@pytest.mark.parametrize(
    ("group", "subgroup", "electrons", "whole"),
    [
        pytest.param("D∞h", "D2h", N2, True, id="dinitrogen"),
        pytest.param("D∞h", "D2h", with_more(B2g=1, B3g=1), True, id="dioxygen_alpha"),
        pytest.param("D∞h", "D2h", with_more(B2g=1), False, id="half_a_pi_level"),
        pytest.param("D∞h", "D2h", {"Ag": 3, "B1u": 1, "B2u": 1, "B3u": 2}, False, id="axis_called_x"),
        pytest.param("D∞h", "D∞h", {"Σg+": 3, "Σu+": 2, "Πu": 2}, True, id="electrons_in_the_full_group"),
        pytest.param("D∞h", "D∞h", {"Σg+": 3, "Σu+": 2, "Πu": 3}, False, id="three_of_four"),
        pytest.param("Td", "Td", {"A1": 2, "T2": 3}, True, id="methane"),
        pytest.param("Td", "Td", {"A1": 2, "T2": 2}, False, id="methane_cation_beta"),
        pytest.param("C2v", "C2v", {"A1": 3, "B1": 1, "B2": 1}, True, id="nothing_degenerate"),
        pytest.param("Kh", "D2h", {"Ag": 2, "B1u": 1, "B2u": 1, "B3u": 1}, True, id="nitrogen_atom_alpha"),
        pytest.param("Td", "D2", {"A": 2, "B1": 1, "B2": 1, "B3": 1}, True, id="methane_in_D2"),
    ],
)
def test_whole_levels(group: str, subgroup: str, electrons: dict[str, int], whole: bool) -> None:
    assert fills_whole_levels(electron_correlation(group, subgroup), electrons, None) is whole


def test_levels_that_the_basis_lacks_fill_nothing() -> None:
    assert fills_whole_levels(LINEAR, {"Ag": 1, "B1g": 1}, None)
    assert not fills_whole_levels(LINEAR, {"Ag": 1, "B1g": 1}, S_AND_P)


@pytest.mark.parametrize(
    ("alpha", "beta", "terms"),
    [
        pytest.param({"B2g": 1}, {}, ("2Πg",), id="one_electron"),
        pytest.param({"B2g": 1, "B3g": 1}, {"B3g": 1}, ("2Πg",), id="three_electrons"),
        pytest.param({"B2g": 1}, {"B2g": 1}, ("1Σg+", "1Δg"), id="closed_shell_pi2"),
        pytest.param({"B2g": 1}, {"B3g": 1}, ("3Σg-", "1Δg"), id="one_in_each_with_opposite_spins"),
    ],
)
def test_dioxygen_and_its_ions(alpha: dict[str, int], beta: dict[str, int], terms: tuple[str, ...]) -> None:
    """Herzberg (1950): pi and pi^3 are 2Π, pi^2 is 3Σ- with 1Δ and 1Σ+."""
    level = open_levels(LINEAR, with_more(**alpha), with_more(**beta), S_AND_P)[0]
    assert level.irrep == "Πg"
    assert sorted(terms_in("D∞h", "D2h", level)) == sorted(terms)


@pytest.mark.parametrize("alpha", [{"B1u": 1, "B2u": 1}, {"B1u": 1, "B3u": 1}, {"B2u": 1, "B3u": 1}])
def test_any_two_p_orbitals_of_carbon_are_the_same_term(alpha: dict[str, int]) -> None:
    (level,) = open_levels(ATOM, {"Ag": 2, **alpha}, {"Ag": 2}, SP_ATOM)
    assert level == OpenLevel("Pu", 3, alpha, {})
    assert terms_in("Kh", "D2h", level) == ("3Pg",)


def test_two_d_electrons_may_mix_terms() -> None:
    """E. U. Condon & G. H. Shortley: d2 has 3F and 3P, and a determinant of real orbitals may be a mixture."""
    level = OpenLevel("Dg", 5, {"B2g": 1, "B3g": 1}, {})
    assert terms_in("Kh", "D2h", level) == ("3Pg", "3Fg")


@pytest.mark.parametrize(
    ("alpha", "terms"),
    [
        pytest.param({"B1g": 1, "B2g": 1, "B3g": 1}, ("4Fg",), id="t2g_of_an_octahedron"),
        pytest.param({"Ag": 2, "B1g": 1}, ("4Pg", "4Fg"), id="eg_and_one_more"),
    ],
)
def test_three_d_electrons_may_be_of_one_term(alpha: dict[str, int], terms: tuple[str, ...]) -> None:
    """A2g of Oh comes from 4F alone, T1g from 4F and 4P (Y. Tanabe & S. Sugano, 1954; from memory)."""
    assert terms_in("Kh", "D2h", OpenLevel("Dg", 5, alpha, {})) == terms


@pytest.mark.parametrize(
    ("group", "subgroup", "level", "terms"),
    [
        pytest.param("D4h", "D2h", OpenLevel("Eg", 2, {"B2g": 1}, {"B2g": 1}), ("1A1g", "1B1g"), id="closed_e2"),
        pytest.param("D4h", "D2h", OpenLevel("Eg", 2, {"B2g": 1}, {"B3g": 1}), ("3A2g", "1B2g"), id="open_e2"),
        pytest.param("Td", "D2", OpenLevel("T2", 3, {"B1": 1}, {"B1": 1}), ("1A1", "1E"), id="closed_t2_squared"),
        pytest.param("Td", "D2", OpenLevel("T2", 3, {"B1": 1, "B2": 1}, {}), ("3T1",), id="high_spin_t2_squared"),
        pytest.param("Td", "C2v", OpenLevel("T2", 3, {"A1": 1, "B1": 1}, {}), ("3T1",), id="the_same_in_c2v"),
        pytest.param("C3v", "Cs", OpenLevel("E", 2, {"A'": 1}, {"A'": 1}), ("1A1", "1E"), id="closed_e2_in_cs"),
        pytest.param("C3v", "Cs", OpenLevel("E", 2, {"A'": 1}, {"A''": 1}), ("3A2", "1E"), id="open_e2_in_cs"),
        pytest.param("C∞v", "C2v", OpenLevel("Δ", 2, {"A2": 1}, {"A2": 1}), ("1Σ+", "1Γ"), id="closed_delta2"),
    ],
)
def test_terms_that_a_determinant_mixes(
    group: str, subgroup: str, level: OpenLevel, terms: tuple[str, ...]
) -> None:
    """Herzberg 1966: e2 of C3v 3A2 1A1 1E, of D4h 3A2g 1A1g 1B1g 1B2g; t2 squared 3T1 1A1 1E 1T2 (memory)."""
    assert terms_in(group, subgroup, level) == terms


def test_the_lowest_reading_comes_first() -> None:
    """Without a basis Πg may as well be Φg; nothing higher is offered, as no such orbital is ever occupied."""
    levels = open_levels(LINEAR, with_more(B2g=1), N2)
    assert [level.irrep for level in levels] == ["Πg", "Φg"]


def test_no_single_open_level_explains_what_lacks_two() -> None:
    assert open_levels(LINEAR, {"Ag": 3, "B1u": 2, "B2u": 1, "B2g": 1}, N2, S_AND_P) == ()


@pytest.mark.parametrize(
    ("group", "unpaired", "irreps"),
    [
        pytest.param("D2h", {"B2g": 1, "B3g": 1}, {"B1g"}, id="dioxygen_in_D2h"),
        pytest.param("D∞h", {"Πg": 2}, {"Σg-"}, id="dioxygen"),
        pytest.param("C2v", {"B1": 1}, {"B1"}, id="water_cation"),
        pytest.param("C2v", {"B1": 2, "A1": 1}, {"A1"}, id="two_of_one_irrep_cancel"),
        pytest.param("C2v", {}, {"A1"}, id="closed_shell"),
        pytest.param("Oh", {"T2g": 3}, {"A2g"}, id="half_filled_t2g"),
        pytest.param("Oh", {"T2g": 3, "Eg": 2}, {"A1g"}, id="half_filled_d_shell"),
        pytest.param("Oh", {"T2g": 1, "Eg": 1}, {"T1g", "T2g"}, id="two_open_levels"),
        pytest.param("Kh", {"Dg": 5}, {"Sg"}, id="manganese"),
    ],
)
def test_state_of_unpaired_electrons(group: str, unpaired: dict[str, int], irreps: set[str]) -> None:
    """Y. Tanabe & S. Sugano (1954) for the octahedral terms of highest spin (from memory)."""
    assert state_irreps(group, unpaired) == irreps
    assert state_irreps(group, unpaired) <= state_irreps(group, unpaired, one_level=False)


def test_electrons_of_different_levels_allow_more() -> None:
    assert state_irreps("D∞h", {"Πg": 2}, one_level=False) == {"Σg+", "Σg-", "Δg"}


def test_error_for_an_irrep_of_another_group() -> None:
    with pytest.raises(ValueError, match="C2v has no irrep 'B1g'"):
        state_irreps("C2v", {"B1g": 1})


@pytest.mark.parametrize(
    ("group", "subgroup", "roots", "missing"),
    [
        pytest.param("C∞v", "C2v", {"B1": 1}, ({"B2": 1},), id="hydroxyl"),
        pytest.param("C∞v", "C2v", {"B1": 1, "B2": 1}, (), id="both_partners"),
        pytest.param("C∞v", "C2v", {"A1": 1}, (), id="sigma_state"),
        pytest.param("C∞v", "C2v", {"A2": 1}, (), id="perhaps_sigma_minus"),
        pytest.param("D∞h", "D2h", {"B1g": 1}, (), id="dioxygen_ground_state"),
        pytest.param("Kh", "D2h", {"B1u": 1}, ({"B2u": 1, "B3u": 1},), id="p_atom"),
        pytest.param("Kh", "D2h", {"B1g": 1, "B2g": 1}, ({"B3g": 1},), id="p2_atom"),
        pytest.param("Td", "D2", {"B1": 1, "B2": 1}, ({"B3": 1},), id="one_of_T2_missing"),
        pytest.param("C2v", "C2v", {"B1": 1}, (), id="no_degeneracy"),
    ],
)
def test_partners_of_degenerate_states(
    group: str, subgroup: str, roots: dict[str, int], missing: tuple[dict[str, int], ...]
) -> None:
    assert missing_partners(abelian_correlation(group, subgroup), roots) == missing


def test_a_search_for_partners_among_very_many_irreps_is_given_up() -> None:
    """An atom in S58 has sixty irreps; four partners of them would be half a million sets."""
    into = correlation("Kh", "S58")
    assert missing_partners(into, {"E7g": 2, "E20u": 1}) == ()
    assert missing_partners(into, {"E1u": 1}) == ({"Au": 1},)
