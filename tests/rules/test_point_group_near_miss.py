"""point-group-near-miss. Geometries made so that the distance from the group is known."""

import pytest
from named_molecules import NAMED
from symmetric_bodies import Row, at, body, shaken

from builders import geometry, job, run_rule
from checker.chemistry.frames import AXES_AS_GIVEN, LABELS_WITHOUT_AXES
from checker.facts import Facts
from checker.findings import Finding, Grade
from checker.model import Job
from rules.point_group_near_miss import RULE

ATOMS = {name: rows for name, _, _, rows in NAMED}


def square(off: float) -> list[Row]:
    """XeF4 whose one pair of opposite atoms is out by `off`: D4h needs all four to move by half of that."""
    far = 1.95 + off
    return at("Xe", (0, 0, 0)) + at("F", (far, 0, 0), (-far, 0, 0), (0, 1.95, 0), (0, -1.95, 0))


def deck(atoms: list[Row], group: str | None, unit: str = "angstrom") -> Job:
    symmetry = {} if group is None else {"point_group": group}
    return job(atoms, 0, 1, species={"length_unit": unit}, symmetry=symmetry)


def judged(of: Job) -> list[Finding]:
    return run_rule(RULE, of)


@pytest.mark.parametrize(
    "of",
    [
        pytest.param(deck(square(0.0), "D4h"), id="exact"),
        pytest.param(deck(square(0.0018), "D4h"), id="three_decimals"),
        pytest.param(deck(square(0.03), None), id="no_group_stated"),
        pytest.param(deck(square(0.03), "C2v"), id="a_lower_group_by_choice"),
        pytest.param(deck(square(0.1), "D2h"), id="a_distortion"),
        pytest.param(deck(square(0.3), "D4h"), id="out_of_reach_is_for_mismatch"),
        pytest.param(deck(ATOMS["benzene"], "D2h"), id="more_symmetry_than_stated"),
        pytest.param(deck(ATOMS["carbon dioxide"], "D∞h"), id="line"),
        pytest.param(deck(ATOMS["neon"], "Kh"), id="atom"),
    ],
)
def test_passes(of: Job) -> None:
    assert judged(of) == []


def test_a_stated_group_that_is_nearly_there_is_a_doubt() -> None:
    (found,) = judged(deck(square(0.05), "D4h"))
    assert found.grade is None
    assert found.message == "the geometry has D4h only within 0.025 angstrom; it has D2h at 0.01 angstrom"
    assert found.evidence == {"stated": "D4h", "geometry": "D2h", "deviation_angstrom": 0.025}


@pytest.mark.parametrize("unit", ["angstrom", "bohr"])
def test_the_repair_makes_the_group_exact(unit: str) -> None:
    of = deck(square(0.05), "D4h", unit)
    (repair,) = judged(of)[0].repairs
    assert [edit.key for edit in repair.edits] == [f"species.atoms[{i}]" for i in range(5)]
    scale = 0.529177210903 if unit == "bohr" else 1.0
    rows = [(edit.value[0], *(scale * c for c in edit.value[1:])) for edit in repair.edits]  # type: ignore[index]
    mended = job(geometry(rows), 0, 1, symmetry={"point_group": "D4h"})  # type: ignore[arg-type]
    assert judged(mended) == []
    assert Facts(mended).symmetry.group == "D4h"


def test_a_stated_group_that_is_there_but_loose_is_a_note() -> None:
    (found,) = judged(deck(square(0.008), "D4h"))
    assert found.grade is Grade.NOTE
    assert found.message == "the geometry has D4h only within 0.0040 angstrom"


def test_more_symmetry_close_by_is_a_note() -> None:
    for group in ("D2h",):
        (found,) = judged(deck(square(0.03), group))
        assert found.grade is Grade.NOTE
        assert found.message == "the geometry has D2h and is within 0.015 angstrom of D4h"
        assert len(found.repairs) == 1


def test_a_nearly_linear_molecule() -> None:
    rows = at("C", (0.05, 0, 0)) + at("O", (0, 0, 1.16), (0, 0, -1.16))
    (found,) = judged(deck(rows, "D∞h"))
    assert found.message == "the geometry has D∞h only within 0.033 angstrom; it has C2v at 0.01 angstrom"
    rows = [(edit.value[0], *edit.value[1:]) for edit in found.repairs[0].edits]  # type: ignore[index, misc]
    assert judged(deck(rows, "D∞h")) == []


def not_along_axes(name: str, group: str) -> bool:
    """The unshaken molecule too lies otherwise than its labels need."""
    placed = Facts(deck(ATOMS[name], group)).symmetry.subgroup(group)
    return placed is not None and placed.frame_note != AXES_AS_GIVEN


@pytest.mark.parametrize("name", [name for name, group, *_ in NAMED if group != "C1"])
def test_noise_is_found_out_and_mended(name: str) -> None:
    """0.04 angstrom of noise on each atom: more than the tolerance, and yet no other molecule."""
    group = next(row[1] for row in NAMED if row[0] == name)
    if group == "Kh":
        return
    numbers, places = shaken(body(ATOMS[name]), 0.04, seed=len(name))
    rows = [(ATOMS[name][i][0], *place) for i, place in enumerate(places.tolist())]
    found = judged(deck(rows, group))
    assert [f.grade for f in found if f.grade is None] == ([None] if found and found[0].grade is None else [])
    for finding in found:
        edited = [(edit.value[0], *edit.value[1:]) for edit in finding.repairs[0].edits]  # type: ignore[index, misc]
        mended = Facts(deck(edited, group)).symmetry.within(1e-4).subgroup(group)
        assert mended is not None
        assert mended.frame_note in (AXES_AS_GIVEN, LABELS_WITHOUT_AXES) or not_along_axes(name, group)
    assert found or Facts(deck(rows, group)).symmetry.deviation_angstrom <= 0.001
    assert len(numbers) == len(rows)
