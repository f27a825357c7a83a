"""occupation-capacity. Functions per irrep of the cases, counted by hand, stand beside them."""

from typing import Any

import pytest

from builders import job, run_rule
from checker.errors import NotDerivable
from checker.findings import Finding
from rules.occupation_capacity import RULE

# water in the yz plane: B2 is in the plane, B1 is the out-of-plane p. Minimal basis A1 4, A2 0, B1 1, B2 2.
WATER = [("O", 0.0, 0.0, 0.1173), ("H", 0.0, 0.7572, -0.4692), ("H", 0.0, -0.7572, -0.4692)]
METHANE = [("C", 0.0, 0.0, 0.0), *(("H", 0.63 * x, 0.63 * y, 0.63 * x * y) for x in (1, -1) for y in (1, -1))]


def judged(
    atoms: list[tuple[str, float, float, float]], group: str | None, occupations: dict[str, Any], basis: str | None
) -> list[Finding]:
    tables = {"basis": {"name": basis}} if basis else {}
    return run_rule(RULE, job(atoms, 0, 1, symmetry={"point_group": group}, occupations=occupations, **tables))


@pytest.mark.parametrize(
    ("atoms", "group", "occupations", "basis"),
    [
        pytest.param(WATER, "C2v", {"paired": {"A1": 3, "B1": 1, "B2": 1}}, "STO-3G", id="water"),
        pytest.param(WATER, "C2v", {"paired": {"A1": 4, "B1": 1, "B2": 2}}, "STO-3G", id="all_functions_full"),
        pytest.param(WATER, "C2v", {"paired": {"A1": 3, "B1": 2}}, "cc-pVDZ", id="larger_basis_holds_it"),
        pytest.param(METHANE, "Td", {"paired": {"A1": 2, "T2": 1}}, "STO-3G", id="methane_T2_counts_three"),
        pytest.param(METHANE, "Td", {"alpha": {"A1": 3, "T2": 6}, "beta": {"A1": 3, "T2": 6}}, "STO-3G",
                     id="methane_all_nine_functions"),
        pytest.param(METHANE, "D2", {"paired": {"A": 2, "B1": 1, "B2": 1, "B3": 1}}, "STO-3G", id="in_D2"),
        pytest.param(WATER, "C1", {"paired": {"A": 5}}, "STO-3G", id="no_symmetry"),
        pytest.param(WATER, "Cs", {"alpha": {"A'": 4, "A''": 1}, "beta": {}}, "STO-3G", id="one_plane"),
    ],
)  # fmt: skip
def test_passes_what_the_basis_holds(
    atoms: list[tuple[str, float, float, float]], group: str, occupations: dict[str, Any], basis: str
) -> None:
    assert judged(atoms, group, occupations, basis) == []


@pytest.mark.parametrize(
    ("atoms", "group", "occupations", "at"),
    [
        pytest.param(WATER, "C2v", {"paired": {"A1": 3, "B1": 2}}, "occupations.paired", id="B1_has_one"),
        pytest.param(WATER, "C2v", {"alpha": {"A1": 3, "B1": 1, "B2": 1}, "beta": {"A1": 4, "A2": 1}},
                     "occupations.beta", id="A2_has_none"),
        pytest.param(WATER, "C2v", {"paired": {"A1": 4}, "unpaired": {"B1": 2}}, "occupations.paired", id="open"),
        pytest.param(METHANE, "Td", {"paired": {"A1": 1, "T2": 3}}, "occupations.paired", id="T2_has_two_levels"),
        pytest.param(METHANE, "Td", {"paired": {"E": 1}}, "occupations.paired", id="E_has_none"),
    ],
)  # fmt: skip
def test_halts_what_it_does_not(
    atoms: list[tuple[str, float, float, float]], group: str, occupations: dict[str, Any], at: str
) -> None:
    assert [f.at for f in judged(atoms, group, occupations, "STO-3G")] == [at]


def test_says_which_irrep_and_how_many() -> None:
    (finding,) = judged(WATER, "C2v", {"paired": {"A1": 3, "B1": 2}}, "STO-3G")
    assert finding.message == "2 orbitals of B1 are occupied in C2v, and STO-3G has 1 function of it"
    assert finding.evidence == {"point_group": "C2v", "irrep": "B1", "occupied": 2, "functions": 1}


@pytest.mark.parametrize(
    ("group", "basis", "because"),
    [
        pytest.param("C2v", None, "names no basis", id="no_basis"),
        pytest.param("C2v", "ours", "is not in the catalogue", id="unknown_basis"),
        pytest.param(None, "STO-3G", "states no point group", id="no_group"),
        pytest.param(
            "D2h", "STO-3G", "the geometry has the point group C2v, D2h is not within it", id="other_group"
        ),
    ],
)
def test_says_why_it_does_not_judge(group: str | None, basis: str | None, because: str) -> None:
    names = {"paired": {"Ag": 5}} if group == "D2h" else {"paired": {"A1": 5}}
    with pytest.raises(NotDerivable, match=because):
        judged(WATER, group, names, basis)


def test_silent_without_occupations() -> None:
    assert run_rule(RULE, job(WATER, 0, 1, symmetry={"point_group": "C2v"})) == []


def test_an_irrep_of_a_linear_molecule_that_the_basis_does_not_reach() -> None:
    symmetry, basis = {"point_group": "D∞h"}, {"name": "STO-3G"}
    occupations = {"paired": {"Σg+": 3, "Σu+": 2, "Πu": 1, "Γg": 1}}
    (found,) = run_rule(RULE, job("N N", 0, 1, symmetry=symmetry, occupations=occupations, basis=basis))
    assert found.message == "2 orbitals of Γg are occupied in D∞h, and STO-3G has no functions of it"
