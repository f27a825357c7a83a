"""high-spin-default: free atoms and ions at the multiplicity a default would give. Levels: NIST, from memory."""

import pytest

from builders import job, run_rule, speak
from checker.errors import NotDerivable
from checker.findings import Edit, NotJudged
from rules.high_spin_default import RULE


@pytest.mark.parametrize(
    ("atom", "charge", "multiplicity", "speaks"),
    [
        pytest.param("Fe", 0, 1, True, id="Fe quintet"),
        pytest.param("Fe", 3, 2, True, id="Fe3+ sextet"),
        pytest.param("O", 0, 1, True, id="O triplet"),
        pytest.param("N", 0, 2, True, id="N quartet"),
        pytest.param("Ni", 2, 1, True, id="Ni2+ triplet"),
        pytest.param("Fe", 0, 3, False, id="a triplet was thought about"),
        pytest.param("Fe", 0, 5, False, id="Fe as it is"),
        pytest.param("Mg", 0, 1, False, id="Mg singlet"),
        pytest.param("Pd", 0, 1, False, id="Pd 4d10"),
        pytest.param("Ce", 0, 1, False, id="Ce singlet, though two shells are open"),
        pytest.param("Cu", 0, 2, False, id="Cu doublet"),
        pytest.param("Zn", 2, 1, False, id="Zn2+ 3d10"),
        pytest.param("Y", 1, 1, False, id="Y+ 5s2"),
        pytest.param("Fe", 0, 2, False, id="wrong parity belongs to spin-parity"),
    ],
)
def test_speaks_where_the_lowest_multiplicity_is_below_the_ground_level(
    atom: str, charge: int, multiplicity: int, speaks: bool
) -> None:
    found = run_rule(RULE, job(atom, charge=charge, multiplicity=multiplicity))
    assert [finding.at for finding in found] == ["species.multiplicity"] * speaks


def test_a_molecule_is_not_judged() -> None:
    (word,) = speak(RULE, job("O O", multiplicity=1))
    assert isinstance(word, NotJudged)
    assert "free atoms and ions" in word.because


def test_a_molecule_above_the_default_is_no_question_of_this_rule() -> None:
    assert speak(RULE, job("O O", multiplicity=3)) == []


@pytest.mark.parametrize("intent", ["excited", "broken-symmetry"])
def test_silent_where_another_state_is_meant(intent: str) -> None:
    assert speak(RULE, job("Fe", multiplicity=1, treatment={"intent": intent})) == []


def test_an_ion_whose_surroundings_decide_is_not_judged() -> None:
    with pytest.raises(NotDerivable, match="not free"):
        speak(RULE, job("Fe", charge=2, multiplicity=1, species={"environment": "embedded"}))


def test_says_the_default_the_level_and_the_way_out() -> None:
    (finding,) = run_rule(RULE, job("Fe", multiplicity=1))
    assert finding.message == "multiplicity 1 is what a default gives, and Fe has 4 unpaired electrons"
    assert "5D4 of [Ar] 3d6 4s2, multiplicity 5 (measured, NIST ground levels)" in finding.why
    assert finding.repairs[0].edits == (Edit("species.multiplicity", 5),)
