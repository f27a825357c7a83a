"""closed-shell-treatment. Each id states N."""

from typing import Any

import pytest

from builders import job, run_rule, speak
from checker.findings import Edit, Grade, NotJudged
from rules.closed_shell_treatment import RULE

NOTE, HALT = Grade.NOTE, Grade.HALT


@pytest.mark.parametrize(
    ("atoms", "charge", "multiplicity", "treatment", "grade"),
    [
        pytest.param("O H H", 0, 1, "restricted", None, id="water-N10-restricted_singlet"),
        pytest.param("O O", 0, 3, "unrestricted", None, id="oxygen-N16-unrestricted_triplet"),
        pytest.param("O O", 0, 3, "restricted-open", None, id="oxygen-N16-open_triplet"),
        pytest.param("O O", 0, 3, None, None, id="oxygen-N16-nothing_said"),
        pytest.param("O H", 0, 2, "unrestricted", None, id="hydroxyl-N9-unrestricted_doublet"),
        pytest.param("O H H", 0, None, "restricted", None, id="water-N10-restricted_no_multiplicity"),
        pytest.param("O H H", 0, None, "unrestricted", None, id="water-N10-unrestricted_no_multiplicity"),
        pytest.param("H", 1, 1, "unrestricted", None, id="proton-N0-nothing_to_restrict"),
        pytest.param("O H", 0, 1, "restricted", None, id="hydroxyl-N9-parity_is_not_ours"),
        pytest.param("O H", 0, 3, "restricted", None, id="hydroxyl-N9-wrong_triplet_is_not_ours"),
        pytest.param("O H", 0, 1, "unrestricted", None, id="hydroxyl-N9-no_closed_shell"),
        pytest.param("O O", 0, 0, "restricted", None, id="oxygen-N16-multiplicity_0_is_not_ours"),
        pytest.param("O O", 0, 3, "restricted", HALT, id="oxygen-N16-restricted_triplet"),
        pytest.param("O H", 0, 2, "restricted", HALT, id="hydroxyl-N9-restricted_doublet"),
        pytest.param("O H", 0, None, "restricted", HALT, id="hydroxyl-N9-restricted_odd"),
        pytest.param("O H H", 0, 1, "unrestricted", NOTE, id="water-N10-unrestricted_singlet"),
        pytest.param("O H H", 0, 1, "restricted-open", NOTE, id="water-N10-open_singlet"),
    ],
)
def test_treatment_against_spin(
    atoms: str, charge: int, multiplicity: int | None, treatment: str | None, grade: Grade | None
) -> None:
    found = run_rule(RULE, job(atoms, charge, multiplicity, treatment={"spin_treatment": treatment}))
    assert [f.grade or RULE.grade for f in found] == [grade] * (grade is not None)
    assert all(f.at == "treatment.spin_treatment" for f in found)


@pytest.mark.parametrize(
    ("treatment", "tables", "speaks"),
    [
        pytest.param("restricted", {"paired": {"A1": 4}, "unpaired": {"B1": 1, "A1": 1}}, True, id="open_singlet"),
        pytest.param("restricted", {"alpha": {"A1": 4, "B1": 1}, "beta": {"A1": 5}}, True, id="alpha_unlike_beta"),
        pytest.param("restricted", {"alpha": {"A1": 5}, "beta": {"a1": 5}}, False, id="the_same_in_other_case"),
        pytest.param("restricted", {"paired": {"A1": 5}, "unpaired": {"B1": 0}}, False, id="nothing_open"),
        pytest.param("restricted", {"alpha": {"A1": 5}}, False, id="beta_not_given"),
        pytest.param(
            "restricted-open", {"paired": {"A1": 4}, "unpaired": {"B1": 1, "A1": 1}}, False, id="open_meant"
        ),
        pytest.param("unrestricted", {"alpha": {"A1": 4, "B1": 1}, "beta": {"A1": 5}}, False, id="spins_meant"),
    ],
)
def test_occupations_count_too(treatment: str, tables: dict[str, Any], speaks: bool) -> None:
    of = job("C H H", 0, 1, treatment={"spin_treatment": treatment}, occupations=tables)
    assert [f.grade for f in run_rule(RULE, of)] == [None] * speaks


@pytest.mark.parametrize(
    "tables",
    [
        pytest.param({"treatment": {"spin_treatment": "unrestricted", "intent": "broken-symmetry"}}, id="broken"),
        pytest.param({"treatment": {"spin_treatment": "unrestricted", "intent": "excited"}}, id="excited"),
        pytest.param(
            {"treatment": {"spin_treatment": "unrestricted"}, "fragments": [{"atoms": [1]}, {"atoms": [2]}]},
            id="spin_coupled",
        ),
    ],
)
def test_an_unrestricted_singlet_with_a_purpose_is_not_noted(tables: dict[str, Any]) -> None:
    assert not run_rule(RULE, job("Fe Fe", 0, 1, **tables))


def test_an_active_space_holds_the_unpaired_electrons_itself() -> None:
    active = {"electrons": 8, "orbitals": 6}
    said = speak(RULE, job("O O", 0, 3, treatment={"spin_treatment": "restricted"}, active_space=active))
    assert said == [NotJudged("the unpaired electrons may be those of the active space")]


def test_says_what_was_found_and_offers_three_ways_out() -> None:
    (finding,) = run_rule(RULE, job("O O", 0, 3, treatment={"spin_treatment": "restricted"}))
    assert finding.message == (
        "the state has 2 unpaired electrons, and a restricted treatment leaves none; "
        'set spin_treatment = "restricted-open" or "unrestricted"'
    )
    assert [repair.edits for repair in finding.repairs] == [
        (Edit("treatment.spin_treatment", "restricted-open"),),
        (Edit("treatment.spin_treatment", "unrestricted"),),
        (Edit("species.multiplicity", 1),),
    ]


def test_an_unknown_core_potential_does_not_hide_a_restricted_triplet() -> None:
    of = job("I I", 0, 3, treatment={"spin_treatment": "restricted"}, core_potential={"name": "of-our-own"})
    assert len(run_rule(RULE, of)) == 1
