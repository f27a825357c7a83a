"""point-group-mismatch. Groups of the molecules: F. A. Cotton, Chemical Applications of Group Theory (memory)."""

from typing import Any

import numpy as np
import pytest
from named_molecules import NAMED

from builders import geometry, job, run_rule, speak
from checker.errors import NotDerivable
from checker.findings import Edit, Finding, Grade
from checker.model import Job
from rules.point_group_mismatch import RULE

ATOMS = {name: rows for name, _, _, rows in NAMED}


def deck(name: str, group: str | None, axes: str = "as-given", turn: str = "xyz", **tables: Any) -> Job:
    atoms = [(row[0], *(row[1 + "xyz".index(axis)] for axis in turn)) for row in ATOMS[name]]
    symmetry = {"axes": axes} if group is None else {"point_group": group, "axes": axes}
    return job(atoms, 0, 1, symmetry=symmetry, **tables)  # type: ignore[arg-type]


def judged(of: Job) -> list[Finding]:
    return run_rule(RULE, of)


@pytest.mark.parametrize(
    ("name", "group"),
    [
        ("water", None), ("water", "C1"), ("water", "Cs"), ("water", "C2"), ("water", "C2v"), ("water", "c_2v"),
        ("benzene", "D2h"), ("benzene", "D6h"), ("benzene", "C2v"), ("benzene", "D3h"),
        ("carbon dioxide", "D∞h"), ("carbon dioxide", "D2h"), ("carbon dioxide", "Dinfh"),
        ("carbon dioxide", "C2v"),
        ("carbon monoxide", "C2v"), ("methane", "D2"), ("methane", "Td"), ("methane", "D2d"),
        ("sulfur hexafluoride", "D2h"), ("sulfur hexafluoride", "Oh"), ("neon", "D2h"), ("neon", "Kh"),
        ("closo-dodecaborate(2-)", "D2h"), ("hypochlorous acid", "Cs"), ("bromochlorofluoromethane", "C1"),
    ],
)  # fmt: skip
def test_passes(name: str, group: str | None) -> None:
    assert judged(deck(name, group)) == []


@pytest.mark.parametrize(
    ("name", "group", "shared"),
    [
        ("water", "D2h", "C2v"), ("water", "C3v", "Cs"), ("ammonia", "C2v", "Cs"), ("benzene", "D5h", "C2v"),
        ("methane", "D2h", "D2"), ("bromochlorofluoromethane", "Cs", "C1"), ("carbon monoxide", "D∞h", "C∞v"),
        ("water", "C∞v", "C2v"), ("hydrogen peroxide", "C2v", "C2"), ("ethane, staggered", "D2h", "C2h"),
        ("trans-diazene", "C2v", "Cs"), ("boron trifluoride", "Td", "C3v"), ("ozone", "Kh", "C2v"),
    ],
)  # fmt: skip
def test_speaks(name: str, group: str, shared: str) -> None:
    (found,) = judged(deck(name, group))
    assert found.grade is None
    assert found.at == "symmetry.point_group"
    if shared != "C∞v":
        assert found.evidence["shared"] == shared


def test_the_whole_finding() -> None:
    (found,) = judged(deck("ammonia", "C2v", occupations={"paired": {"A1": 3, "B1": 1, "B2": 1}}))
    assert found.message == "the geometry has the point group C3v, and C2v is not within it"
    assert found.why == (
        "C2v does not come about even if every atom is moved by 0.1 angstrom; "
        "the largest group that both have is Cs."
    )
    assert [(repair.say, repair.edits) for repair in found.repairs] == [
        (
            "run it in Cs; the irreps of the deck have then to be named anew",
            (Edit("symmetry.point_group", "Cs"),),
        )
    ]


def test_offers_the_geometrys_own_group_too() -> None:
    (found,) = judged(deck("methane", "D3h"))
    assert [repair.edits[0].value for repair in found.repairs] == ["C3v", "Td"]


OCCUPIED = {"occupations": {"paired": {"A1": 3, "B1": 1, "B2": 1}}}


def test_a_twofold_axis_along_x_is_told_where_irreps_are_named() -> None:
    (found,) = judged(deck("water", "C2v", turn="zxy", **OCCUPIED))
    assert found.grade is Grade.NOTE
    assert found.message == (
        "C2v does not lie along the coordinate axes as its labels need; "
        "axes exchanged: x, y, z of the labels are y, z, x of the coordinates"
    )
    (repair,) = found.repairs
    turned = geometry([tuple(edit.value) for edit in repair.edits])  # type: ignore[arg-type, misc]
    assert judged(job(turned, 0, 1, symmetry={"point_group": "C2v"}, **OCCUPIED)) == []


@pytest.mark.parametrize(
    "of",
    [
        pytest.param(deck("water", "C2v", turn="zxy"), id="no_irreps_named"),
        pytest.param(deck("water", "C2v", "mulliken", "zxy", **OCCUPIED), id="axes_by_the_recommendation"),
        pytest.param(deck("water", "C2v", turn="yxz", **OCCUPIED), id="in_the_other_plane"),
        pytest.param(deck("carbon dioxide", "D∞h", turn="zxy", treatment={"state_irrep": "Σg+"}), id="line"),
        pytest.param(deck("carbon dioxide", "D2h", turn="zxy", treatment={"state_irrep": "Ag"}), id="line_in_d2h"),
        pytest.param(deck("trans-diazene", "C2h", turn="zxy", treatment={"roots": {"Ag": 1}}), id="one_axis_only"),
    ],
)
def test_axes_that_need_no_word(of: Job) -> None:
    assert judged(of) == []


def test_a_molecule_askew_is_told_even_without_irreps() -> None:
    angle = np.deg2rad(30)
    turn = np.array([[1, 0, 0], [0, np.cos(angle), -np.sin(angle)], [0, np.sin(angle), np.cos(angle)]])
    rows = [(s, *map(float, turn @ (x, y, z))) for s, x, y, z in ATOMS["ethene"]]
    (found,) = judged(job(rows, 0, 1, symmetry={"point_group": "D2h"}))
    assert found.grade is Grade.NOTE
    assert "axes turned: z of the labels lies along" in found.message


def test_what_is_nearly_there_is_left_to_near_miss() -> None:
    rows = [("O", 0.0, 0.0, 0.117), ("H", 0.0, 0.757, -0.467), ("H", 0.0, -0.79, -0.48)]
    assert judged(job(rows, 0, 1, symmetry={"point_group": "C2v"})) == []
    rows[2] = ("H", 0.0, -1.6, -0.9)
    assert len(judged(job(rows, 0, 1, symmetry={"point_group": "C2v"}))) == 1


def test_ghosts_are_told_from_atoms() -> None:
    rows = ATOMS["carbon dioxide"]
    (found,) = judged(job(rows, 0, 1, species={"ghost_atoms": [2]}, symmetry={"point_group": "D∞h"}))
    assert found.evidence["geometry"] == "C∞v"


def test_not_judged_where_the_group_is_unknown_or_the_geometry_periodic() -> None:
    with pytest.raises(NotDerivable, match="no point group"):
        speak(RULE, deck("water", "C3x"))
    held = geometry(ATOMS["water"], periodic=(True, True, True), lattice=(9.0, 0, 0, 0, 9.0, 0, 0, 0, 9.0))
    with pytest.raises(NotDerivable, match="cell"):
        speak(RULE, job(held, 0, 1, symmetry={"point_group": "C2v"}))
