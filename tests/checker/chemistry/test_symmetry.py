"""Groups at a tolerance: what is found, how far off the body is, what is next, and what is refused."""

import numpy as np
import pytest
from named_molecules import NAMED
from symmetric_bodies import FAMILIES, Body, annulene, at, body, built, icosahedron, moved, ring, shaken, spread

from checker.chemistry import symmetry_search
from checker.chemistry.closure import Closed, Element, enlarged, symbol_of, trivial
from checker.chemistry.descent import abelian_subgroups, operations_of
from checker.chemistry.irreps import common_groups
from checker.chemistry.point_groups import standard_operations
from checker.chemistry.symmetry import MOST_ATOMS, find_symmetry
from checker.errors import NotDerivable

MOLECULES = {name: body(rows) for name, _, _, rows in NAMED}


@pytest.mark.parametrize("group", FAMILIES)
def test_every_family(group: str) -> None:
    found = find_symmetry(*built(group))
    assert found.group == group
    assert found.deviation_angstrom < 1e-9


@pytest.mark.parametrize("n", [9, 20, 30, 60])
def test_rings(n: int) -> None:
    assert find_symmetry(*moved(body(ring("C", n, 0.25 * n)), seed=n)).group == f"D{n}h"


def test_an_axis_beyond_the_lists_is_refused() -> None:
    with pytest.raises(NotDerivable, match="axis of order 61 is higher than the groups listed, which end at 60"):
        find_symmetry(*body(ring("C", 61, 15.0)))


def carbon_dioxide(off: float) -> Body:
    """The carbon off the middle by so much: the centroid moves a third of it, the carbon has to move the rest."""
    return body(at("C", (0, 0, off)) + at("O", (0, 0, 1.16), (0, 0, -1.16)))


def test_the_deviation_is_the_largest_move_of_an_atom() -> None:
    found = find_symmetry(*carbon_dioxide(0.012))
    assert found.group == "D∞h"
    assert found.deviation_angstrom == pytest.approx(2 / 3 * 0.012)


def test_the_next_higher_group_has_its_own_deviation() -> None:
    found = find_symmetry(*carbon_dioxide(0.03))
    assert found.group == "C∞v"
    assert found.deviation_angstrom == pytest.approx(0.0)
    assert found.next_higher == ("D∞h", pytest.approx(0.02))


def square(off: float) -> Body:
    """A square of four atoms and a centre, two atoms across from each other pulled out by `off`."""
    return body(
        at("Xe", (0, 0, 0)) + at("F", (1.95 + off, 0, 0), (-1.95 - off, 0, 0), (0, 1.95, 0), (0, -1.95, 0))
    )


def test_just_within_and_just_beyond_the_tolerance() -> None:
    """D4h wants the four at their mean distance, so that each moves by half the difference."""
    assert find_symmetry(*square(0.0198)).group == "D4h"
    beyond = find_symmetry(*square(0.0202))
    assert beyond.group == "D2h"
    assert beyond.next_higher == ("D4h", pytest.approx(0.0101, abs=1e-6))


def test_a_bent_molecule_is_next_to_a_linear_one() -> None:
    rows = at("C", (0, 0, 0)) + at("O", (0.1, 0, 1.16), (0.1, 0, -1.16))
    found = find_symmetry(*body(rows))
    assert found.group == "C2v"
    assert found.next_higher == ("D∞h", pytest.approx(0.2 / 3))


def test_nothing_is_above_what_has_no_supergroup() -> None:
    for name in ("sulfur hexafluoride", "dodecahedrane", "carbon dioxide", "neon"):
        assert find_symmetry(*MOLECULES[name]).next_higher is None


def test_kinds_tell_atoms_apart() -> None:
    kinds, places = MOLECULES["water"]
    assert find_symmetry(kinds, places).group == "C2v"
    assert find_symmetry(np.array([8, 1, 2]), places).group == "Cs"  # an isotope, or a ghost
    assert find_symmetry(np.array([1, 2]), [[0, 0, 0], [0, 0, 0.74]]).group == "C∞v"


def test_a_ghost_may_lie_on_an_atom() -> None:
    kinds, places = MOLECULES["benzene"]
    doubled = np.concatenate([places, places[:1]])
    assert find_symmetry(np.append(kinds, 99), doubled).group == "C2v"


def test_like_atoms_on_one_spot_are_refused() -> None:
    kinds, places = MOLECULES["benzene"]
    with pytest.raises(NotDerivable, match=r"atoms 3 and 13 are alike and 0\.000 angstrom apart"):
        find_symmetry(np.append(kinds, 6), np.concatenate([places, places[2:3]]))


@pytest.mark.parametrize("n_atoms", [0, MOST_ATOMS + 1])
def test_too_few_and_too_many_atoms_are_refused(n_atoms: int) -> None:
    with pytest.raises(NotDerivable, match=f"symmetry of {n_atoms} atoms is not worked out"):
        find_symmetry(np.full(n_atoms, 6), np.zeros((n_atoms, 3)))


@pytest.mark.parametrize("far", [1e5, 1e200, np.inf, np.nan])
def test_atoms_beyond_all_measure_are_refused(far: float) -> None:
    with pytest.raises(NotDerivable, match="beyond 100000 angstrom"):
        find_symmetry(np.array([1, 1]), np.array([[0.0, 0, 0], [0, 0, far]]))


def test_a_search_beyond_all_measure_is_refused(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(symmetry_search, "MOST_IMAGES", 100)
    with pytest.raises(NotDerivable, match="would try 24 operations on 12 atoms"):
        find_symmetry(*MOLECULES["benzene"])


def test_large_bodies_are_matched_in_a_grid_as_small_ones_are_densely(monkeypatch: pytest.MonkeyPatch) -> None:
    from checker.chemistry import bodies

    monkeypatch.setattr(bodies, "DENSE_LIMIT_ATOMS", 0)
    for group in FAMILIES:
        assert find_symmetry(*shaken(moved(built(group), 5), 0.001, 6)).group == group


def test_two_near_groups_do_not_hang_on_the_noise() -> None:
    """A rectangle nearly a square, a little sheared: D4h is out of reach, D2h is the largest group either way."""
    kinds, places = square(0.05)
    found = {find_symmetry(*shaken((kinds, places), 0.002, seed)).group for seed in range(20)}
    assert found == {"D2h"}


def test_the_largest_group_wins_over_the_best_fitting_one() -> None:
    """Against every subgroup of the group of the unshaken body that two operations generate."""
    from itertools import combinations_with_replacement

    from checker.chemistry.bodies import body_of
    from checker.chemistry.fitting import fitted

    kinds, places = MOLECULES["methane"]
    whole = find_symmetry(kinds, places)
    elements = [
        Element(np.ascontiguousarray(p), round(float(np.linalg.det(o))))
        for p, o in zip(whole.permutations, whole.operations, strict=True)
    ]
    groups: dict[frozenset[tuple[int, bytes]], Closed] = {}
    for pair in combinations_with_replacement(elements, 2):
        group = enlarged(trivial(5), pair, most=24)
        assert group is not None
        groups[frozenset(group.elements)] = group
    for seed in range(20):
        noisy = shaken((kinds, places), 0.025, seed)
        fits = [fitted(body_of(*noisy)[0], group) for group in groups.values()]
        largest = max(len(fit.closed) for fit in fits if fit is not None and fit.deviation <= 0.01)
        assert len(find_symmetry(*noisy).operations) >= largest


@pytest.mark.parametrize("group", [*FAMILIES, "D60h", "C7h", "S14"])
def test_the_abelian_group_is_the_one_of_the_table(group: str) -> None:
    """The first choice is what is diagonal in the standard frame, and so the largest within D2h."""
    for choice in abelian_subgroups(group):
        operations = standard_operations(group)[operations_of(group, choice.symbol)]
        assert len(operations) == len(standard_operations(choice.symbol))
        assert np.allclose(choice.turn @ operations @ choice.turn.T, standard_operations(choice.symbol))
    first = standard_operations(group)[operations_of(group, abelian_subgroups(group)[0].symbol)]
    diagonal = [matrix for matrix in standard_operations(group) if np.allclose(matrix, np.diag(np.diag(matrix)))]
    assert len(first) == len(diagonal)
    assert np.allclose(first * (1.0 - np.eye(3)), 0.0, atol=1e-9)
    kinds, places = moved(built(group), seed=3)
    assert find_symmetry(kinds, places).abelian_group == abelian_subgroups(group)[0].symbol


def test_abelian_choice_of_td_and_d2d() -> None:
    for name in ("methane", "allene"):
        kinds, places = MOLECULES[name]
        assert find_symmetry(kinds, places).abelian_group == "D2"
        assert find_symmetry(kinds, places, abelian_choice="C2v").abelian_group == "C2v"
        assert find_symmetry(kinds, places, abelian_choice="D2").abelian_group == "D2"
    assert find_symmetry(*MOLECULES["ethene"], abelian_choice="C2v").abelian_group == "D2h"


SUBGROUPS = {
    "methane": "C1 Cs C2 C3 C2v C3v D2 S4 D2d T Td",
    "benzene": "C1 Cs Ci C2 C3 C6 C2v C3v C6v C2h C3h C6h D2 D3 D6 D2h D3h D6h D3d S6",
    "ammonia": "C1 Cs C3 C3v",
    "sulfur hexafluoride": "C1 Cs Ci C2 C3 C4 C2v C3v C4v C2h C4h D2 D3 D4 D2h D4h D2d D3d S4 S6 T Td Th O Oh",
    "ferrocene, staggered": "C1 Cs Ci C2 C5 C5v C2h D5 D5d S10",
    "dodecahedrane": "C1 Cs Ci C2 C3 C5 C2v C3v C5v C2h D2 D3 D5 D2h D3d D5d S6 S10 T Th I Ih",
}


@pytest.mark.parametrize("name", SUBGROUPS)
def test_subgroups(name: str) -> None:
    """Source: S. L. Altmann & P. Herzig, Point-Group Theory Tables, 2nd ed. (2011), from memory."""
    found = find_symmetry(*moved(MOLECULES[name], seed=3))
    held = {symbol for symbol in (*common_groups(), "S10") if found.subgroup(symbol) is not None}
    assert held == set(SUBGROUPS[name].split())


def test_subgroups_of_a_line_and_of_a_point() -> None:
    carbonyl, dioxide = (find_symmetry(*MOLECULES[name]) for name in ("carbon monoxide", "carbon dioxide"))
    for symbol in ("C1", "Cs", "C2", "C7", "C2v", "C6v", "C∞v"):
        assert carbonyl.subgroup(symbol) is not None, symbol
        assert dioxide.subgroup(symbol) is not None, symbol
    for symbol in ("Ci", "C2h", "D2", "D6h", "D5d", "S8", "D∞h"):
        assert carbonyl.subgroup(symbol) is None, symbol
        assert dioxide.subgroup(symbol) is not None, symbol
    for symbol in ("T", "Oh", "Kh"):
        assert dioxide.subgroup(symbol) is None, symbol
        assert find_symmetry(*MOLECULES["neon"]).subgroup(symbol) is not None, symbol


def test_symmetrising_to_a_subgroup_only() -> None:
    kinds, places = shaken(MOLECULES["benzene"], 0.004, seed=1)
    found = find_symmetry(kinds, places)
    symmetrised = found.symmetrised_to("C6")
    assert symmetrised is not None
    coordinates, deviation = symmetrised
    assert 0 < deviation <= 0.01
    assert find_symmetry(kinds, coordinates, tolerance=1e-6).group in ("C6", "C6h")
    assert found.symmetrised_to("C5") is None
    whole = found.symmetrised_to("D6h")
    assert whole is not None
    assert whole[1] == pytest.approx(found.deviation_angstrom)


def test_symmetrising_to_a_line_without_a_centre() -> None:
    kinds, places = carbon_dioxide(0.012)
    places = places + np.array([[0.003, 0, 0], [-0.0015, 0, 0], [-0.0015, 0, 0]])
    found = find_symmetry(kinds, places)
    assert found.group == "D∞h"
    symmetrised = found.symmetrised_to("C∞v")
    assert symmetrised is not None
    assert symmetrised[1] == pytest.approx(0.003, abs=1e-5)
    assert find_symmetry(kinds, symmetrised[0], tolerance=1e-4).group == "C∞v"


def test_another_tolerance() -> None:
    found = find_symmetry(*square(0.05))
    assert found.within(0.03).group == "D4h"
    assert found.within(1e6).tolerance < 1.0


def test_the_symbol_needs_as_many_improper_operations_as_rotations() -> None:
    """A set of permutations that belongs to no point group has no symbol."""
    swap = Element(np.array([1, 0, 2, 3]), 1)
    turn = Element(np.array([1, 2, 3, 0]), 1)
    group = enlarged(trivial(4), [swap, turn], most=100)
    assert group is not None
    assert symbol_of(group, np.zeros(len(group))) == "O"  # S4 as rotations
    five = enlarged(
        trivial(5), [Element(np.array([1, 0, 2, 3, 4]), 1), Element(np.array([1, 2, 3, 4, 0]), 1)], 200
    )
    assert five is not None
    assert symbol_of(five, np.zeros(len(five))) is None


def test_a_metal_on_an_icosahedron_of_another_kind() -> None:
    rows = icosahedron("B", 1.78) + at("C", (0, 0, 0))
    assert find_symmetry(*moved(body(rows), 1)).group == "Ih"
    odd_one = [("C", *rows[0][1:]), *rows[1:]]
    assert find_symmetry(*moved(body(odd_one), 1)).group == "C5v"


def test_an_atom_close_to_the_centre_fixes_nothing() -> None:
    rows = annulene(6) + at("Cr", (0, 0, 0.003))
    assert find_symmetry(*moved(body(rows), 2)).group == "D6h"
    assert find_symmetry(*moved(body(rows), 2), tolerance=0.001).group == "C6v"


def test_a_small_outer_shell_and_a_large_inner_one() -> None:
    rows = spread("C", "Ih", 0.6, 1.9, 3.4) + spread("Au", "D2h", 0, 0, 9)
    assert find_symmetry(*moved(body(rows), 2)).group == "D2h"


@pytest.mark.parametrize("scale", [0.001, 0.02, 0.1])
def test_a_short_cut_to_no_symmetry_finds_what_the_search_finds(
    scale: float, monkeypatch: pytest.MonkeyPatch
) -> None:
    """Shaken bodies, with and without the comparison of all pairs that may spare the search."""
    rng = np.random.default_rng(5)
    kinds, positions = MOLECULES["benzene"]
    places = [positions + rng.normal(scale=scale, size=positions.shape) for _ in range(20)]
    quick = [find_symmetry(kinds, shaken_places).group for shaken_places in places]
    monkeypatch.setattr(symmetry_search, "MOST_COMPARED_ATOMS", 0)
    assert quick == [find_symmetry(kinds, shaken_places).group for shaken_places in places]
    assert ("C1" in quick) == (scale > 0.01)
