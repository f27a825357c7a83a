"""The symmetry that a report tells: group, group of the labels, frame, isotopes."""

from typing import Any

import pytest

from builders import job
from checker.facts import Facts
from checker.findings import SymmetryBook

Atoms = list[tuple[str, float, float, float]]
NITROGEN_ALONG_X: Atoms = [("N", 0.549, 0.0, 0.0), ("N", -0.549, 0.0, 0.0)]
WATER_ALONG_X: Atoms = [("O", 0.1173, 0.0, 0.0), ("H", -0.4692, 0.7572, 0.0), ("H", -0.4692, -0.7572, 0.0)]
METHANE: Atoms = [("C", 0, 0, 0), ("H", 1, 1, 1), ("H", 1, -1, -1), ("H", -1, 1, -1), ("H", -1, -1, 1)]


def book(atoms: Atoms, **symmetry: Any) -> SymmetryBook:
    found = Facts(job(atoms, 0, 1, symmetry=symmetry)).symmetry_book
    assert found is not None
    return found


@pytest.mark.parametrize(
    ("stated", "labels_of", "frame"),
    [
        pytest.param({}, "D2h", "axes as given", id="the_abelian_group"),
        pytest.param({"point_group": "D2h"}, "D2h", "axes as given", id="stated"),
        pytest.param(
            {"point_group": "D∞h"}, "D∞h", "axes exchanged: z of the labels is x of the coordinates", id="full"
        ),
        pytest.param({"point_group": "Td"}, "D2h", "axes as given", id="lacking"),
        pytest.param({"point_group": "Ci"}, "Ci", "independent of the axes", id="without_axes"),
    ],
)
def test_labels_are_those_of_the_stated_group_where_the_geometry_has_it(
    stated: dict[str, str], labels_of: str, frame: str
) -> None:
    found = book(NITROGEN_ALONG_X, **stated)
    assert (found.point_group, found.abelian_subgroup) == ("D∞h", "D2h")
    assert (found.labels_of, found.frame_note) == (labels_of, frame)


def test_a_twofold_axis_along_x_is_told() -> None:
    note = "axes exchanged: x, y, z of the labels are y, z, x of the coordinates"
    assert book(WATER_ALONG_X).frame_note == note


@pytest.mark.parametrize(("group", "abelian"), [(None, "D2"), ("Td", "D2"), ("D2", "D2"), ("C2v", "C2v")])
def test_the_deck_chooses_the_abelian_group_of_methane(group: str | None, abelian: str) -> None:
    assert book(METHANE, point_group=group).abelian_subgroup == abelian


@pytest.mark.parametrize(
    ("symbols", "told"), [("OHH", None), ("OHD", "Cs"), ("ODD", None), ("ODT", "Cs"), ("OTT", None)]
)
def test_isotopes_are_one_kind_of_atom_for_electrons(symbols: str, told: str | None) -> None:
    atoms = [(symbol, *row[1:]) for symbol, row in zip(symbols, WATER_ALONG_X, strict=True)]
    found = book(atoms)
    assert (found.point_group, found.with_isotopes) == ("C2v", told)
