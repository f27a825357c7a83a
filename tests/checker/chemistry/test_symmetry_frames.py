"""Which way round a molecule is seen: "as-given" and "mulliken", and what is said of it."""

import numpy as np
import pytest
from named_molecules import NAMED
from symmetric_bodies import FAMILIES, about_z, annulene, at, body, built, moved, ring

from checker.chemistry.frames import AXES_AS_GIVEN, LABELS_WITHOUT_AXES
from checker.chemistry.point_groups import standard_operations
from checker.chemistry.symmetry import Symmetry, find_symmetry

MOLECULES = {name: body(rows) for name, _, _, rows in NAMED}
IN_TURN = np.eye(3)[[1, 2, 0]]


def seen(name: str, axes: str = "as-given", turn: np.ndarray | None = None) -> Symmetry:
    kinds, places = MOLECULES[name]
    return find_symmetry(kinds, places if turn is None else places @ turn.T, axes=axes)


@pytest.mark.parametrize("axes", ["as-given", "mulliken"])
@pytest.mark.parametrize("group", FAMILIES)
def test_the_frame_takes_the_operations_to_the_standard_ones(group: str, axes: str) -> None:
    found = find_symmetry(*moved(built(group), seed=7), axes=axes)
    for placed in (found.placement, found.abelian):
        there = placed.frame @ placed.operations @ placed.frame.T
        assert np.allclose(there, standard_operations(placed.group), atol=1e-9)
        assert np.linalg.det(placed.frame) == pytest.approx(1.0)


@pytest.mark.parametrize("group", FAMILIES)
def test_axes_are_left_as_they_are_where_the_elements_lie_along_them(group: str) -> None:
    operations = standard_operations(group)
    places = operations @ np.array([[0.6, 1.1, 1.9], [1.3, -0.4, 0.8]]).T
    coordinates = np.concatenate([places[:, :, 0], places[:, :, 1]]) * 3.0
    found = find_symmetry(np.repeat([6, 7], len(operations)), coordinates)
    own = found.subgroup(group)
    assert own is not None
    assert np.allclose(own.frame, np.eye(3), atol=1e-9)
    assert own.frame_note in (AXES_AS_GIVEN, LABELS_WITHOUT_AXES)


def test_water_in_either_plane_keeps_its_axes() -> None:
    for turn in (np.eye(3), about_z(90)):
        found = seen("water", turn=turn)
        assert found.frame_note == AXES_AS_GIVEN
        assert np.allclose(found.frame, np.eye(3))


def test_water_lies_in_yz_by_the_recommendation() -> None:
    for turn in (np.eye(3), about_z(90), about_z(33)):
        found = seen("water", "mulliken", turn)
        inside = (found.symmetrised - found.center) @ found.frame.T
        assert np.allclose(inside[:, 0], 0.0)
    assert seen("water", "mulliken", about_z(90)).frame_note == (
        "axes exchanged: x, y, z of the labels are y, -x, z of the coordinates"
    )


@pytest.mark.parametrize(
    ("turn", "note"),
    [
        (IN_TURN, "axes exchanged: x, y, z of the labels are z, x, y of the coordinates"),  # twofold axis along y
        (IN_TURN @ IN_TURN, "axes exchanged: x, y, z of the labels are y, z, x of the coordinates"),  # along x
    ],
)
def test_a_twofold_axis_along_x_or_y_is_told(turn: np.ndarray, note: str) -> None:
    found = seen("water", turn=turn)
    assert found.frame_note == note
    assert np.allclose(found.frame, turn.T)


def test_a_molecule_askew_is_told_where_z_went() -> None:
    note = seen("water", turn=np.array([[1, 0, 0], [0, 0.6, 0.8], [0, -0.8, 0.6]])).frame_note
    assert note == (
        "axes turned: z of the labels lies along (0.000, 0.800, 0.600) of the coordinates, "
        "x along (1.000, 0.000, 0.000)"
    )


def test_a_turn_about_z_is_told_by_its_angle() -> None:
    assert seen("water", turn=about_z(30)).frame_note == "axes turned by 30.0 degrees about z"


def test_a_slight_turn_is_told_by_its_angle() -> None:
    assert seen("water", turn=about_z(2)).frame_note == "axes nearly as given, off by 2.0 degrees"
    assert seen("water", turn=IN_TURN @ about_z(2)).frame_note == (
        "axes exchanged: x, y, z of the labels are z, x, y of the coordinates, off by 2.0 degrees"
    )


def test_only_the_main_axis_counts_where_the_others_leave_the_labels_alone() -> None:
    for turn in (about_z(90), about_z(25)):
        for name in ("ammonia", "allene"):
            assert seen(name, turn=turn).frame_note == seen(name).frame_note
    assert seen("ammonia", turn=IN_TURN).frame_note == "axes exchanged: z of the labels is y of the coordinates"
    assert seen("methane", turn=about_z(25)).frame_note == LABELS_WITHOUT_AXES


def test_a_turn_within_the_tolerance_is_not_worth_a_word() -> None:
    found = seen("water", turn=about_z(0.2))
    assert found.frame_note == AXES_AS_GIVEN
    assert not np.allclose(found.frame, np.eye(3), atol=1e-6)


def test_the_plane_of_cs_may_lie_anywhere() -> None:
    found = seen("hypochlorous acid", turn=IN_TURN)
    assert found.frame_note == LABELS_WITHOUT_AXES


def test_ethene_in_d2h() -> None:
    """As given it keeps its axes; by the recommendation x is across the plane and z along the double bond."""
    for turn in (IN_TURN, about_z(90), np.eye(3)):
        assert seen("ethene", turn=turn).frame_note == AXES_AS_GIVEN
        found = seen("ethene", "mulliken", turn)
        inside = (found.symmetrised - found.center) @ found.frame.T
        assert np.allclose(inside[:, 0], 0.0)
        assert np.allclose(np.abs(inside[:2, 2]), 0.67)


def test_benzene_in_d6h_and_d2h() -> None:
    """C2' axes pass through atoms by the recommendation; in D2h benzene then lies in yz, atoms on z."""
    for start in (0.0, 30.0):
        kinds, places = body(annulene(6))
        places = places @ about_z(start).T
        given = find_symmetry(kinds, places)
        assert given.frame_note == given.abelian.frame_note == AXES_AS_GIVEN
        found = find_symmetry(kinds, places, axes="mulliken")
        inside = (found.symmetrised - found.center) @ found.frame.T
        assert (np.abs(inside[:, 1:]).max(axis=1) < 1e-9).sum() == 4  # two C and two H on x
        abelian = (found.symmetrised - found.center) @ found.abelian_frame.T
        assert np.allclose(abelian[:, 0], 0.0)
        assert (np.abs(abelian[:, :2]).max(axis=1) < 1e-9).sum() == 4


def test_planes_of_c4v_pass_through_atoms_by_the_recommendation() -> None:
    found = find_symmetry(*body(at("Br", (0, 0, 0), (0, 0, 1.7)) + ring("F", 4, 1.77, -0.15, 45)), axes="mulliken")
    inside = (found.symmetrised - found.center) @ found.frame.T
    assert (np.abs(inside[:, 1]) < 1e-9).sum() == 4


def test_fourfold_axes_of_an_octahedron_are_the_twofold_ones_of_its_abelian_group() -> None:
    for turn in (np.eye(3), about_z(45), about_z(20)):
        found = seen("sulfur hexafluoride", turn=turn)
        inside = np.abs((found.symmetrised - found.center) @ found.abelian_frame.T)
        assert found.abelian_group == "D2h"
        assert np.allclose(np.sort(inside, axis=1)[:, :2], 0.0)


def test_boron_trifluoride_in_c2v_lies_in_yz_by_the_recommendation() -> None:
    found = seen("boron trifluoride", "mulliken")
    assert found.abelian_group == "C2v"
    assert np.allclose(((found.symmetrised - found.center) @ found.abelian_frame.T)[:, 0], 0.0)


def test_a_line_along_x() -> None:
    """Sigma and Pi go by the line, whatever the axes; in D2h the axes are those given unless the deck asks."""
    turn = np.eye(3)[[2, 0, 1]]
    found = seen("carbon dioxide", turn=turn)
    assert np.allclose(np.abs(found.frame[2]), [1, 0, 0])
    assert found.frame_note == "axes exchanged: z of the labels is x of the coordinates"
    assert found.abelian.frame_note == AXES_AS_GIVEN
    assert np.allclose(np.abs(seen("carbon dioxide", "mulliken", turn).abelian_frame[2]), [1, 0, 0])
    assert found.axis is not None
    assert np.allclose(np.abs(found.axis), [1, 0, 0])


def test_operations_and_permutations_of_a_line_are_those_of_its_abelian_group() -> None:
    found = seen("acetylene")
    assert found.operations.shape == (8, 3, 3)
    places = found.symmetrised - found.center
    assert np.allclose(places @ found.operations.transpose(0, 2, 1), places[found.permutations], atol=1e-9)


@pytest.mark.parametrize("name", [name for name, *_ in NAMED])
@pytest.mark.parametrize("axes", ["as-given", "mulliken"])
def test_the_frame_does_not_hang_on_the_order_of_the_atoms(name: str, axes: str) -> None:
    kinds, places = MOLECULES[name]
    order = np.random.default_rng(1).permutation(len(kinds))
    first, second = find_symmetry(kinds, places, axes=axes), find_symmetry(kinds[order], places[order], axes=axes)
    assert np.allclose(first.frame, second.frame, atol=1e-6)
    assert np.allclose(first.abelian_frame, second.abelian_frame, atol=1e-6)
