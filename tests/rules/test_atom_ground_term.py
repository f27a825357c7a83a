"""atom-ground-term. Levels in the ids are NIST's, from memory."""

from typing import Any

import pytest

from builders import job, run_rule, speak
from checker.errors import NotDerivable
from checker.findings import Edit
from rules.atom_ground_term import RULE


@pytest.mark.parametrize(
    ("atom", "charge", "multiplicity", "speaks"),
    [
        pytest.param("C", 0, 3, False, id="C 3P0"),
        pytest.param("C", 0, 1, True, id="C is no singlet"),
        pytest.param("N", 0, 2, True, id="N is 4S*, no doublet"),
        pytest.param("Pd", 0, 1, False, id="Pd 4d10 1S0"),
        pytest.param("Pd", 0, 3, True, id="Pd is no triplet"),
        pytest.param("W", 0, 5, False, id="W 5d4 6s2 5D0"),
        pytest.param("W", 0, 7, True, id="W is not 5d5 6s"),
        pytest.param("Ce", 0, 1, False, id="Ce 1G*4, no triplet"),
        pytest.param("Ce", 0, 3, True, id="Ce by Hund would be wrong"),
        pytest.param("Fe", 2, 5, False, id="Fe2+ 5D4"),
        pytest.param("V", 1, 5, False, id="V+ 3d4 5D0"),
        pytest.param("V", 1, 3, True, id="V+ is no triplet"),
        pytest.param("U", 0, 5, False, id="U, leading 5L*6"),
        pytest.param("Cl", -1, 1, False, id="Cl- 1S0"),
        pytest.param("H", 1, 1, False, id="bare proton"),
        pytest.param("O", -2, 1, False, id="oxide, closed shell"),
        pytest.param("Ti", 4, 1, False, id="Ti4+ derived"),
        pytest.param("Mn", 4, 2, True, id="Mn4+ derived 3d3, no doublet"),
        pytest.param("Fe", 0, 2, False, id="wrong parity belongs to spin-parity"),
        pytest.param("He", 0, 5, False, id="out of reach belongs to another rule"),
        pytest.param("O O", 0, 1, False, id="molecule"),
    ],
)
def test_speaks_where_the_level_has_another_multiplicity(
    atom: str, charge: int, multiplicity: int, speaks: bool
) -> None:
    found = run_rule(RULE, job(atom, charge=charge, multiplicity=multiplicity))
    assert [finding.at for finding in found] == ["species.multiplicity"] * speaks


@pytest.mark.parametrize("intent", ["excited", "broken-symmetry"])
def test_silent_where_another_state_is_meant(intent: str) -> None:
    assert speak(RULE, job("C", multiplicity=1, treatment={"intent": intent})) == []


def test_a_ghost_beside_the_atom_leaves_it_free() -> None:
    assert len(run_rule(RULE, job("C H", multiplicity=1, species={"ghost_atoms": [2]}))) == 1


@pytest.mark.parametrize(
    ("atom", "charge", "multiplicity", "tables", "because"),
    [
        pytest.param("C", 0, None, {}, "no multiplicity", id="unstated"),
        pytest.param("Fl", 0, 3, {}, "no LS name", id="no LS name"),
        pytest.param("N", -1, 3, {}, "not bound", id="unbound anion"),
        pytest.param("Os", 2, 5, {}, "not settled", id="disputed"),
        pytest.param(
            "Gd", 3, 8, {"core_potential": {"replaced": {"Gd": 53}}}, "7 f electrons of Gd3", id="f in core"
        ),
        pytest.param(
            "Gd", 3, 8, {"core_potential": {"replaced": {"Gd": 54}}}, "core_potential.name", id="f unclear"
        ),
        pytest.param("Fe", 2, 1, {"species": {"environment": "crystal"}}, "not free", id="in a crystal"),
    ],
)
def test_what_cannot_be_judged_says_why(
    atom: str, charge: int, multiplicity: int | None, tables: dict[str, Any], because: str
) -> None:
    with pytest.raises(NotDerivable, match=because):
        speak(RULE, job(atom, charge=charge, multiplicity=multiplicity, **tables))


def test_f_electrons_outside_the_core_are_judged() -> None:
    """28 replaced is the small core, 4f7 is counted; Lu with 60 replaced holds a closed 4f14."""
    small = {"core_potential": {"replaced": {"Gd": 28}}}
    assert run_rule(RULE, job("Gd", charge=3, multiplicity=8, **small)) == []
    assert len(run_rule(RULE, job("Gd", charge=3, multiplicity=2, **small))) == 1
    closed = {"core_potential": {"replaced": {"Lu": 60}}}
    assert run_rule(RULE, job("Lu", multiplicity=2, **closed)) == []
    assert len(run_rule(RULE, job("Lu", multiplicity=4, **closed))) == 1


def test_says_the_level_its_source_and_the_way_out() -> None:
    (finding,) = run_rule(RULE, job("Fe", multiplicity=1))
    assert finding.message == "the ground level of Fe is 5D4 with multiplicity 5, not 1"
    assert finding.why == "Its configuration is [Ar] 3d6 4s2; the level is measured (NIST ground levels)."
    assert finding.repairs[0].edits == (Edit("species.multiplicity", 5),)
    assert finding.repairs[1].edits == (Edit("treatment.intent", "excited"),)


def test_a_derived_level_says_so_and_is_less_sure() -> None:
    (derived,) = run_rule(RULE, job("Mn", charge=4, multiplicity=2))
    (measured,) = run_rule(RULE, job("Mn", charge=2, multiplicity=2))
    assert derived.evidence["origin"] == "derived"
    assert derived.confidence < measured.confidence
