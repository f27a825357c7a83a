"""occupation-irreps. Each id states the group and the name."""

from typing import Any

import pytest

from builders import job, run_rule, speak
from checker.errors import NotDerivable
from checker.findings import Edit, Finding, Grade
from checker.report.plain import split_key
from rules.occupation_irreps import RULE


def judged(group: str | None, **tables: Any) -> list[Finding]:
    return run_rule(RULE, job("O H H", 0, 1, symmetry={"point_group": group}, **tables))


def alpha(group: str | None, **counts: int) -> list[Finding]:
    return judged(group, occupations={"alpha": counts})


@pytest.mark.parametrize(
    ("group", "names"),
    [
        pytest.param("C2v", "A1 A2 B1 B2", id="C2v"),
        pytest.param("c_2v", "a1 b1", id="case_and_underscore"),
        pytest.param("Cs", "A' A''", id="Cs_primes"),
        pytest.param("D2h", "Ag B1g B2g B3g Au B1u B2u B3u", id="D2h"),
        pytest.param("D3h", "A1' E' E'' A2''", id="D3h"),
        pytest.param("Td", "A1 E T2", id="Td"),
        pytest.param("Ih", "Ag T1u Hg Gu", id="Ih"),
        pytest.param("Cinfv", "Sigma+ Pi Delta", id="linear_spelled_out"),
        pytest.param("D∞h", "Σg+ Σu+ Πu Πg", id="linear_greek"),
        pytest.param("Dinfh", "sigmag sigmau piu", id="linear_orbitals_without_sign"),
        pytest.param("Kh", "s p d", id="atom_orbitals"),
        pytest.param("C1", "A", id="C1"),
        pytest.param("Cs", 'A′ A"', id="Cs-marks_that_look_like_primes"),
    ],
)
def test_names_of_the_group_pass(group: str, names: str) -> None:
    assert alpha(group, **dict.fromkeys(names.split(), 1)) == []


@pytest.mark.parametrize(
    ("group", "name", "offered"),
    [
        pytest.param("C2v", "B1g", ["B1"], id="C2v-B1g"),
        pytest.param("D2h", "B1", ["B1g", "B1u"], id="D2h-B1"),
        pytest.param("D3h", "A1", ["A1'", "A1''"], id="D3h-A1"),
        pytest.param("D2", "A1", ["A"], id="D2-A1"),
        pytest.param("Cs", "A", ["A'", "A''"], id="Cs-A"),
        pytest.param("Dinfh", "Sigma+", ["Σg+", "Σu+"], id="Dinfh-Sigma+"),
        pytest.param("C2v", "zz", [], id="C2v-zz"),
        pytest.param("C2v", "", [], id="C2v-empty"),
    ],
)
def test_a_wrong_name_halts_and_the_nearest_are_ready(group: str, name: str, offered: list[str]) -> None:
    (finding,) = alpha(group, **{name: 2})
    assert split_key(finding.at) == ("occupations", "alpha", name)
    assert (finding.grade or RULE.grade) is Grade.HALT
    renamed = [repair.edits[0].value for repair in finding.repairs if repair.edits[0].key == "occupations.alpha"]
    assert renamed == [{new: 2} for new in offered]


def test_says_the_name_the_group_and_what_it_has() -> None:
    (finding,) = alpha("C2v", A1=3, B1g=1)
    assert finding.message == "B1g is no irrep of C2v, which has A1, A2, B1, B2"
    assert finding.evidence["nearest"] == {"B1g": ["B1"]}
    assert finding.repairs[0].edits == (Edit("occupations.alpha", {"A1": 3, "B1": 1}),)


def test_a_renaming_never_makes_one_name_of_two() -> None:
    (finding,) = alpha("C2v", B1=1, B1g=1)
    assert finding.repairs == ()


def test_names_of_another_group_are_recognised_as_a_whole() -> None:
    (finding,) = alpha("Dinfh", Ag=3, B1u=2, B2u=1, B3u=1)
    assert finding.message.startswith("Ag, B1u, B2u, B3u are no irreps of D∞h")
    assert finding.repairs[-1].edits == (Edit("symmetry.point_group", "D2h"),)


@pytest.mark.parametrize(
    ("group", "name", "meant"),
    [
        pytest.param("Cs", "A´", "A'", id="Cs-accent_for_prime"),
        pytest.param("Td", "F2", "T2", id="Td-F2"),
    ],
)
def test_another_spelling_is_a_note_that_says_what_is_read(group: str, name: str, meant: str) -> None:
    (finding,) = alpha(group, **{name: 1})
    assert finding.grade is Grade.NOTE
    assert split_key(finding.at) == ("occupations", "alpha", name)
    assert f"{name} is read as {meant}" in finding.message
    assert finding.repairs[0].edits == (Edit("occupations.alpha", {meant: 1}),)


@pytest.mark.parametrize(("written", "offered"), [("D2x", "D2"), ("Dinfth", "D∞h"), ("mm2", None), ("", None)])
def test_an_unknown_group_has_its_own_sentence(written: str, offered: str | None) -> None:
    (finding,) = alpha(written, A1=5)
    assert finding.at == "symmetry.point_group"
    assert f"there is no point group {written!r}" in finding.message
    assert [r.edits[0].value for r in finding.repairs][:1] == ([offered] if offered else [])


def test_an_unknown_group_is_found_without_occupations_too() -> None:
    assert len(judged("D2x")) == 1
    assert judged("D2h") == []


def test_occupations_without_a_group_are_not_judged() -> None:
    with pytest.raises(NotDerivable, match="states no point group"):
        alpha(None, A1=5)
    assert speak(RULE, job("O H H")) == []


@pytest.mark.parametrize(
    ("tables", "at"),
    [
        pytest.param(
            {"treatment": {"frozen_orbitals": {"A1": 1, "X": 1}}}, "treatment.frozen_orbitals.X", id="frozen"
        ),
        pytest.param({"treatment": {"frozen_orbitals": 2}}, None, id="frozen_number"),
        pytest.param({"treatment": {"state_irrep": "B1g"}}, "treatment.state_irrep", id="state"),
        pytest.param({"treatment": {"state_irrep": "b1"}}, None, id="state_known"),
        pytest.param({"treatment": {"roots": {"A1": 2, "B1g": 1}}}, "treatment.roots.B1g", id="roots"),
        pytest.param(
            {"active_space": {"electrons": 4, "orbitals": {"A1": 2, "B9": 1}}},
            "active_space.orbitals.B9",
            id="active",
        ),
        pytest.param({"active_space": {"electrons": 4, "orbitals": 4}}, None, id="active_number"),
    ],
)
def test_all_that_is_named_by_irrep_is_judged(tables: dict[str, Any], at: str | None) -> None:
    assert [f.at for f in judged("C2v", **tables)] == [at] * (at is not None)


@pytest.mark.parametrize(
    ("group", "state", "grade"),
    [
        pytest.param("Dinfh", "Sigmag-", None, id="a_state_may_be_sigma_minus"),
        pytest.param("Cinfv", "Delta", None, id="delta_state"),
        pytest.param("Kh", "P", None, id="atom_term_without_parity"),
        pytest.param("Kh", "3P", Grade.NOTE, id="atom_term_symbol"),
        pytest.param("D2h", "3B1g", Grade.NOTE, id="term_symbol"),
        pytest.param("Cinfv", "Sigma", Grade.DOUBT, id="sign_left_out"),
        pytest.param("Dinfh", "Sigma", None, id="parity_and_sign_left_out"),
    ],
)
def test_states_of_linear_molecules_and_atoms(group: str, state: str, grade: Grade | None) -> None:
    found = judged(group, treatment={"state_irrep": state})
    if state == "Sigma" and group == "Dinfh":
        assert [f.grade for f in found] == [None]
        assert found[0].message.startswith("Sigma is no irrep of D∞h")
    else:
        assert [f.grade for f in found] == [grade] * (grade is not None)


def test_a_state_is_renamed_as_a_text() -> None:
    (finding,) = judged("D2h", treatment={"state_irrep": "B1"})
    assert [r.edits for r in finding.repairs[:2]] == [
        (Edit("treatment.state_irrep", "B1g"),),
        (Edit("treatment.state_irrep", "B1u"),),
    ]


def test_no_orbital_is_sigma_minus() -> None:
    (finding,) = alpha("Dinfh", **{"Sigmag+": 2, "Sigmag-": 1})
    assert finding.message.startswith("no orbital of D∞h is Σg-")
    assert alpha("Dinfh", **{"Sigmag+": 2, "Sigmag-": 0}) == []


def test_one_irrep_in_two_spellings_is_given_twice() -> None:
    (finding,) = alpha("C2v", A1=3, a1=2)
    assert finding.message == "A1 and a1 are the same irrep A1; give it once"


def test_a_negative_number_is_named() -> None:
    (finding,) = alpha("C2v", A1=-3)
    assert finding.message == "A1 = -3 is a negative number; give zero or more, or leave A1 out"
