"""multiplicity-out-of-reach. Each id states N."""

import pytest
from ase.collections import g2

from builders import job, run_rule
from checker.findings import Edit, Finding, Grade
from rules.multiplicity_out_of_reach import RULE

HALT, DOUBT = Grade.HALT, Grade.DOUBT


def of_g2(name: str, multiplicity: int, intent: str | None = None, charge: int = 0) -> list[Finding]:
    rows = [(s, *p) for s, p in zip(g2[name].symbols, g2[name].positions.tolist(), strict=True)]
    return run_rule(RULE, job(rows, charge, multiplicity, treatment={"intent": intent}))


@pytest.mark.parametrize(
    ("atoms", "charge", "multiplicity", "grade"),
    [
        pytest.param("O H H", 0, 1, None, id="water-N10-singlet"),
        pytest.param("O H H", 1, 1, None, id="water_cation-N9-parity_is_not_ours"),
        pytest.param("H", 0, 2, None, id="hydrogen-N1-doublet"),
        pytest.param("H", 1, 1, None, id="proton-N0-singlet"),
        pytest.param("Gd", 0, 9, None, id="gadolinium-N64-nonet"),
        pytest.param("Mn", 2, 6, None, id="manganese2-N23-sextet"),
        pytest.param("H H H", 0, 4, None, id="separate_hydrogens-N3-quartet"),
        pytest.param("O H H", 0, 0, HALT, id="water-N10-multiplicity_0"),
        pytest.param("O H H", 0, -1, HALT, id="water-N10-negative"),
        pytest.param("H", 0, 4, HALT, id="hydrogen-N1-quartet"),
        pytest.param("H", 1, 3, HALT, id="proton-N0-triplet"),
        pytest.param("O H H", 0, 13, HALT, id="water-N10-twelve_unpaired"),
        pytest.param("O H H", 0, 2**62, HALT, id="water-N10-absurd"),
        pytest.param("Li He", 0, 6, DOUBT, id="lithium_helium-N5-five_unpaired"),
    ],
)
def test_more_unpaired_than_can_be(atoms: str, charge: int, multiplicity: int, grade: Grade | None) -> None:
    found = run_rule(RULE, job(atoms, charge, multiplicity))
    assert [f.grade or RULE.grade for f in found] == [grade] * (grade is not None)
    assert all(f.at == "species.multiplicity" for f in found)


@pytest.mark.parametrize(
    ("name", "multiplicity", "speaks"),
    [
        pytest.param("O2", 3, False, id="oxygen-N16-triplet"),
        pytest.param("O2", 5, True, id="oxygen-N16-quintet"),
        pytest.param("C2H4", 3, False, id="ethylene-N16-triplet_keeps_its_bonds"),
        pytest.param("C2H4", 5, True, id="ethylene-N16-quintet"),
        pytest.param("C6H6", 3, False, id="benzene-N42-triplet"),
        pytest.param("CH2_s3B1d", 3, False, id="methylene-N8-triplet"),
        pytest.param("CH2_s3B1d", 5, True, id="methylene-N8-quintet"),
        pytest.param("CH4", 3, True, id="methane-N10-triplet"),
        pytest.param("CH4", 9, True, id="methane-N10-nonet"),
        pytest.param("CH4", 11, True, id="methane-N10-all_unpaired"),
        pytest.param("H2O", 3, True, id="water-N10-triplet"),
        pytest.param("H2", 3, True, id="hydrogen-N2-triplet"),
        pytest.param("ClF3", 3, False, id="hypervalent-N44-not_judged"),
        pytest.param("Na2", 3, False, id="metal-N22-not_judged"),
    ],
)
def test_more_unpaired_than_the_bonds_allow(name: str, multiplicity: int, speaks: bool) -> None:
    assert [f.grade for f in of_g2(name, multiplicity)] == [DOUBT] * speaks


@pytest.mark.parametrize("intent", ["excited", "vertical"])
def test_an_excited_state_is_free_to_break_a_bond(intent: str) -> None:
    assert not of_g2("H2O", 3, intent)


def test_free_atoms_are_left_to_their_ground_level() -> None:
    assert not run_rule(RULE, job("He", 0, 3))
    (finding,) = run_rule(RULE, job("He", 0, 3, species={"environment": "crystal"}))
    assert finding.grade is DOUBT


def test_no_published_state_of_g2_is_out_of_reach() -> None:
    """Spins of the set as ASE ships it; Curtiss et al., J. Chem. Phys. 106, 1063 (1997)."""
    for name in g2.names:
        assert not of_g2(name, round(sum(g2[name].get_initial_magnetic_moments())) + 1), name


def test_says_what_is_needed_and_what_there_is() -> None:
    (finding,) = run_rule(RULE, job("H", 0, 4))
    assert finding.message == (
        "multiplicity 4 needs 3 unpaired electrons, and the number of electrons is 1; lower the multiplicity"
    )
    assert finding.repairs[0].edits == (Edit("species.multiplicity", 2),)


def test_a_doubt_offers_to_say_that_an_excited_state_is_meant() -> None:
    (finding,) = of_g2("H2O", 3)
    assert "the molecule holds without breaking a bond 0 at most" in finding.message
    assert [r.edits[0] for r in finding.repairs] == [
        Edit("species.multiplicity", 1),
        Edit("treatment.intent", "excited"),
    ]
