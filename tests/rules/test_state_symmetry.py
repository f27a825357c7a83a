"""state-symmetry. Published ground states, from memory: G. Herzberg (1950, 1966)."""

from typing import Any

import pytest

from builders import job, run_rule, speak
from checker.findings import Edit, Finding, Grade, NotJudged
from rules.state_symmetry import RULE

N2 = {"Ag": 3, "B1u": 2, "B2u": 1, "B3u": 1}
O2 = {"alpha": {**N2, "B2g": 1, "B3g": 1}, "beta": N2}
O2_LINEAR = {"paired": {"Σg+": 3, "Σu+": 2, "Πu": 1}, "unpaired": {"Πg": 1}}
WATER_CATION = {"paired": {"A1": 3, "B2": 1}, "unpaired": {"B1": 1}}
METHYLENE = {"paired": {"A1": 2, "B2": 1}, "unpaired": {"A1": 1, "B1": 1}}


def judged(
    atoms: str, multiplicity: int, group: str, occupations: dict[str, Any], state: str, **treatment: Any
) -> list[Finding]:
    treatment = {"spin_treatment": "restricted-open", "state_irrep": state, **treatment}
    symmetry = {"point_group": group}
    made = job(atoms, 0, multiplicity, symmetry=symmetry, occupations=occupations, treatment=treatment)
    return run_rule(RULE, made)


@pytest.mark.parametrize(
    ("atoms", "multiplicity", "group", "occupations", "state", "treatment"),
    [
        pytest.param("O O", 3, "D2h", O2, "B1g", {}, id="dioxygen"),
        pytest.param("O O", 3, "Dinfh", O2_LINEAR, "Sigmag-", {}, id="dioxygen_in_its_group"),
        pytest.param("O H H", 2, "C2v", WATER_CATION, "2B1", {}, id="water_cation_with_its_multiplicity"),
        pytest.param("C H H", 3, "C2v", METHYLENE, "B1", {}, id="methylene"),
        pytest.param("N N", 1, "D2h", {"paired": N2}, "Ag", {"spin_treatment": "restricted"}, id="closed_shell"),
        pytest.param("Mn", 6, "Kh", {"paired": {"s": 4, "p": 2}, "unpaired": {"d": 1}}, "S", {}, id="manganese"),
        pytest.param("O O", 3, "D2h", O2, "Ag", {"spin_treatment": "unrestricted"}, id="unrestricted_not_judged"),
        pytest.param("O O", 3, "D2h", O2, "Ag", {"spin_treatment": None}, id="treatment_unknown"),
        pytest.param("O O", 3, "D2h", O2, "Ag", {"method": "CASSCF(8,6)"}, id="multiconfigurational"),
        pytest.param("O O", 3, "D2h", O2, "Ag", {"method": "EOM-CCSD"}, id="excited_by_method"),
        pytest.param("O O", 3, "D2h", O2, "Ag", {"intent": "excited"}, id="excited_by_intent"),
        pytest.param("O O", 3, "D2h", O2, "B1g", {"method": "CCSD(T)"}, id="method_of_one_determinant"),
    ],
)  # fmt: skip
def test_passes(
    *,
    atoms: str,
    multiplicity: int,
    group: str,
    occupations: dict[str, Any],
    state: str,
    treatment: dict[str, Any],
) -> None:
    assert judged(atoms, multiplicity, group, occupations, state, **treatment) == []


@pytest.mark.parametrize(
    ("atoms", "multiplicity", "group", "occupations", "state", "needed"),
    [
        pytest.param("O O", 3, "D2h", O2, "Ag", ["B1g"], id="dioxygen_asked_for_as_Ag"),
        pytest.param("O H H", 2, "C2v", WATER_CATION, "B2", ["B1"], id="water_cation_as_B2"),
        pytest.param("C H H", 3, "C2v", METHYLENE, "A1", ["B1"], id="methylene_as_A1"),
        pytest.param("N N", 1, "D2h", {"paired": N2}, "B1g", ["Ag"], id="closed_shell_as_B1g"),
        pytest.param("O O", 3, "Dinfh", O2_LINEAR, "Πg", ["Σg-"], id="linear_product_has_no_pi"),
    ],
)
def test_halts_on_another_symmetry(
    *, atoms: str, multiplicity: int, group: str, occupations: dict[str, Any], state: str, needed: list[str]
) -> None:
    (finding,) = judged(atoms, multiplicity, group, occupations, state)
    assert finding.grade is Grade.HALT
    assert [repair.edits for repair in finding.repairs] == [(Edit("treatment.state_irrep", n),) for n in needed]


def test_doubts_what_only_different_levels_allow() -> None:
    (finding,) = judged("O O", 3, "Dinfh", O2_LINEAR, "Δg")
    assert finding.grade is Grade.DOUBT
    assert finding.message == "the occupation, Πg^2, makes a state of Σg- in D∞h, not of Δg"


def test_says_the_product() -> None:
    (finding,) = judged("O O", 3, "D2h", O2, "Ag", method="ROHF")
    assert finding.message == "the occupation, B2g B3g, makes a state of B1g in D2h, not of Ag"


def test_an_unknown_method_is_not_judged() -> None:
    treatment = {"spin_treatment": "restricted-open", "state_irrep": "Ag", "method": "house special"}
    made = job("O O", 0, 3, symmetry={"point_group": "D2h"}, occupations=O2, treatment=treatment)
    (word,) = speak(RULE, made)
    assert isinstance(word, NotJudged)
    assert "'house special'" in word.because


def test_silent_without_a_wanted_state() -> None:
    made = job("O O", 0, 3, symmetry={"point_group": "D2h"}, occupations=O2)
    assert run_rule(RULE, made) == []
