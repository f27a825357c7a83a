"""caution: one note per deck, for few species, and none for the everyday ones."""

import pytest
from ase.collections import g2

from builders import geometry, job, report, run_rule
from checker.findings import Finding, Grade, Verdict
from rules.caution import RULE

CALL_FOR_CAUTION = {"PH3", "SH2", "CH3NO2", "Be", "BeH", "HCN", "HF", "F2", "NO2"}


def of_g2(name: str) -> list[Finding]:
    rows = [(s, *p) for s, p in zip(g2[name].symbols, g2[name].positions.tolist(), strict=True)]
    return run_rule(RULE, job(rows))


def test_which_of_g2_call_for_caution() -> None:
    assert {name for name in g2.names if of_g2(name)} == CALL_FOR_CAUTION


@pytest.mark.parametrize(
    ("atoms", "speaks"),
    [
        pytest.param("O H H", False, id="water"),
        pytest.param("Fe", False, id="iron"),
        pytest.param("Bi", False, id="bismuth"),
        pytest.param("", False, id="no_atoms"),
        pytest.param("U O O", True, id="uranyl"),
        pytest.param("Tc", True, id="technetium"),
        pytest.param("Hg", True, id="mercury"),
        pytest.param("T", True, id="tritium"),
        pytest.param("D", False, id="deuterium"),
    ],
)
def test_by_element(atoms: str, speaks: bool) -> None:
    found = run_rule(RULE, job(geometry(atoms)))
    assert [f.at for f in found] == ["species.atoms"] * speaks


def test_a_ghost_is_not_there() -> None:
    assert not run_rule(RULE, job("U H", species={"ghost_atoms": [1]}))
    assert not run_rule(RULE, job("T H", species={"ghost_atoms": [1]}))


def test_it_is_one_note_that_changes_no_verdict() -> None:
    judged = report(job("U As T", 0, 2), RULE)
    (finding,) = judged.findings
    assert finding.grade is Grade.NOTE
    assert judged.verdict is Verdict.CLEAR
    assert finding.finding.evidence["kinds"] == ["toxic", "radioactive"]


def test_says_that_it_is_no_safety_assessment_and_who_decides() -> None:
    (finding,) = of_g2("SH2")
    assert finding.message == (
        "the formula is that of hydrogen sulfide: a computed result is no safety assessment, "
        "local rules and licensed practice decide"
    )


def test_a_large_solution_is_not_searched_for_single_molecules() -> None:
    rows = [("F", 0.0, 0.0, 0.0), ("H", 0.0, 0.0, 0.92)] + [("Ne", 5.0 + 4.0 * i, 0.0, 0.0) for i in range(2000)]
    assert run_rule(RULE, job(rows[:100]))
    assert not run_rule(RULE, job(rows))
