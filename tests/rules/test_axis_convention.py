"""axis-convention. The same molecules in several attitudes, occupations from memory (Herzberg 1950, 1966)."""

import numpy as np
import pytest

from builders import geometry, job, run_rule
from checker.findings import Edit, Finding
from checker.model import Job
from rules.axis_convention import RULE

Atoms = list[tuple[str, float, float, float]]
N2 = {"Ag": 3, "B1u": 2, "B2u": 1, "B3u": 1}
# ethene in the yz plane, carbons along z: pi is B3u (Mulliken 1955)
ETHENE = {"Ag": 3, "B1u": 2, "B2u": 1, "B3u": 1, "B3g": 1}
ETHENE_ATOMS: Atoms = [
    ("C", 0.0, 0.0, 0.667), ("C", 0.0, 0.0, -0.667),
    ("H", 0.0, 0.923, 1.238), ("H", 0.0, -0.923, 1.238), ("H", 0.0, 0.923, -1.238), ("H", 0.0, -0.923, -1.238),
]  # fmt: skip


def turned(atoms: Atoms, order: str) -> Atoms:
    """Call the axes otherwise: "zyx" puts what lay along z along x."""
    return [(row[0], *(row[1 + "xyz".index(axis)] for axis in order)) for row in atoms]  # type: ignore[misc]


def diatomic(first: str, second: str, length: float) -> Atoms:
    return [(first, 0.0, 0.0, length / 2), (second, 0.0, 0.0, -length / 2)]


def deck(atoms: Atoms, paired: dict[str, int], group: str = "D2h", axes: str = "as-given") -> Job:
    symmetry = {"point_group": group, "axes": axes}
    return job(atoms, 0, 1, symmetry=symmetry, occupations={"paired": paired})


def judged(of: Job) -> list[Finding]:
    return run_rule(RULE, of)


@pytest.mark.parametrize(
    "of",
    [
        pytest.param(deck(diatomic("N", "N", 1.1), N2), id="dinitrogen_along_z"),
        pytest.param(deck(turned(diatomic("N", "N", 1.1), "zyx"), N2, axes="mulliken"), id="mulliken_axes"),
        pytest.param(deck(ETHENE_ATOMS, ETHENE), id="ethene_in_yz"),
        pytest.param(deck(diatomic("C", "O", 1.1), {"A1": 5, "B1": 1, "B2": 1}, "C2v"), id="x_and_y_are_equal"),
        pytest.param(deck([("Ne", 0.0, 0.0, 0.0)], {"Ag": 2, "B1u": 1, "B2u": 1, "B3u": 1}), id="atom"),
        pytest.param(deck([("O", 0.0, 0.0, 0.1), ("H", 0.0, 0.76, -0.5), ("H", 0.0, -0.76, -0.5)],
                          {"A1": 3, "B1": 1, "B2": 1}, "C2v"), id="water_either_plane"),
        pytest.param(deck(diatomic("N", "N", 1.1), {"Ag": 7}), id="no_axes_help"),
    ],
)  # fmt: skip
def test_passes(of: Job) -> None:
    assert judged(of) == []


def test_an_open_shell_atom_may_fill_any_of_its_p_orbitals() -> None:
    """p_x p_y and p_x p_z of carbon are the same state."""
    for pair in (("B1u", "B2u"), ("B1u", "B3u"), ("B2u", "B3u")):
        occupations = {"paired": {"Ag": 2}, "unpaired": dict.fromkeys(pair, 1)}
        of = job([("C", 0.0, 0.0, 0.0)], 0, 3, symmetry={"point_group": "D2h"}, occupations=occupations)
        assert judged(of) == []


@pytest.mark.parametrize(
    ("of", "renamed"),
    [
        pytest.param(deck(turned(diatomic("N", "N", 1.1), "zyx"), N2),
                     {"Ag": 3, "B3u": 2, "B2u": 1, "B1u": 1}, id="dinitrogen_along_x"),
        pytest.param(deck(turned(diatomic("N", "N", 1.1), "xzy"), N2),
                     {"Ag": 3, "B2u": 2, "B1u": 1, "B3u": 1}, id="dinitrogen_along_y"),
        pytest.param(deck(turned(ETHENE_ATOMS, "zyx"), ETHENE),
                     {"Ag": 3, "B3u": 2, "B2u": 1, "B1u": 1, "B1g": 1}, id="ethene_in_xy_along_x"),
    ],
)  # fmt: skip
def test_other_axes_are_named_and_repaired(of: Job, renamed: dict[str, int]) -> None:
    (finding,) = judged(of)
    assert Edit("occupations.paired", renamed) in [edit for repair in finding.repairs for edit in repair.edits]


def test_the_turned_geometry_passes() -> None:
    of = deck(turned(ETHENE_ATOMS, "zyx"), ETHENE)
    (finding,) = judged(of)
    turn = next(repair for repair in finding.repairs if "turn the geometry" in repair.say)
    rows = [tuple(edit.value) for edit in turn.edits]  # type: ignore[arg-type]
    before, after = geometry(turned(ETHENE_ATOMS, "zyx")), geometry(rows)  # type: ignore[arg-type]
    gaps = [np.linalg.norm(g.coordinates[:, None] - g.coordinates[None], axis=2) for g in (before, after)]
    assert np.allclose(*gaps, atol=1e-4)  # turned, not bent
    assert judged(deck(rows, ETHENE)) == []  # type: ignore[arg-type]


def test_the_renamed_occupation_passes() -> None:
    of = deck(turned(diatomic("N", "N", 1.1), "zyx"), N2)
    (finding,) = judged(of)
    (edit,) = finding.repairs[0].edits
    assert judged(deck(turned(diatomic("N", "N", 1.1), "zyx"), dict(edit.value))) == []  # type: ignore[arg-type]


def test_says_which_axes_and_which_names() -> None:
    (finding,) = judged(deck(turned(diatomic("N", "N", 1.1), "zyx"), N2))
    assert (
        finding.message
        == "the occupation fits this geometry only with x and z exchanged (B3u for B1u, B1u for B3u)"
    )


def test_the_state_and_its_roots_are_renamed_along() -> None:
    of = job(
        turned(diatomic("N", "N", 1.1), "zyx"), 0, 1, symmetry={"point_group": "D2h"}, occupations={"paired": N2},
        treatment={"state_irrep": "Ag", "roots": {"B1u": 1}, "frozen_orbitals": {"Ag": 1, "B1u": 1}},
    )  # fmt: skip
    (finding,) = judged(of)
    edits = {edit.key: edit.value for edit in finding.repairs[0].edits}
    assert edits["treatment.roots"] == {"B3u": 1}
    assert edits["treatment.frozen_orbitals"] == {"Ag": 1, "B3u": 1}
    assert "treatment.state_irrep" not in edits


def test_silent_without_occupations() -> None:
    assert judged(job(ETHENE_ATOMS, 0, 1, symmetry={"point_group": "D2h"})) == []
