"""multiplicity-unstated. Each id states N and the known ground multiplicity."""

import pytest
from ase.collections import g2

from builders import job, run_rule
from checker.findings import Edit, Finding, Grade
from rules.multiplicity_unstated import RULE


def of_g2(name: str, charge: int = 0) -> Finding:
    rows = [(s, *p) for s, p in zip(g2[name].symbols, g2[name].positions.tolist(), strict=True)]
    (finding,) = run_rule(RULE, job(rows, charge))
    return finding


@pytest.mark.parametrize("multiplicity", [1, 3, 0, 99])
def test_a_stated_multiplicity_is_not_its_matter(multiplicity: int) -> None:
    assert not run_rule(RULE, job("O H H", 0, multiplicity))


@pytest.mark.parametrize(
    ("atoms", "charge", "grade"),
    [
        pytest.param("He", 0, Grade.NOTE, id="helium-N2-singlet"),
        pytest.param("H", 0, Grade.NOTE, id="hydrogen-N1-doublet"),
        pytest.param("Na", 1, Grade.NOTE, id="sodium_ion-N10-singlet"),
        pytest.param("Zn", 0, Grade.NOTE, id="zinc-N30-singlet"),
        pytest.param("O", 0, Grade.DOUBT, id="oxygen-N8-triplet"),
        pytest.param("N", 0, Grade.DOUBT, id="nitrogen-N7-quartet"),
        pytest.param("Fe", 3, Grade.DOUBT, id="iron3-N23-sextet"),
        pytest.param("Cr", 0, Grade.DOUBT, id="chromium-N24-septet"),
    ],
)
def test_free_atoms_by_their_ground_level(atoms: str, charge: int, grade: Grade) -> None:
    (finding,) = run_rule(RULE, job(atoms, charge))
    assert (finding.at, finding.grade) == ("species.multiplicity", grade)


@pytest.mark.parametrize(("atoms", "charge"), [("H", 1), ("H", 2), ("O H H", 12)])
def test_without_electrons_there_is_nothing_to_state(atoms: str, charge: int) -> None:
    assert not run_rule(RULE, job(atoms, charge))


@pytest.mark.parametrize(
    ("name", "charge", "grade"),
    [
        pytest.param("H2O", 0, Grade.NOTE, id="water-N10-singlet"),
        pytest.param("H2O", 1, Grade.NOTE, id="water_cation-N9-doublet"),
        pytest.param("CH3", 0, Grade.NOTE, id="methyl-N9-doublet"),
        pytest.param("C6H6", 0, Grade.NOTE, id="benzene-N42-singlet"),
        pytest.param("O2", 0, Grade.DOUBT, id="oxygen-N16-triplet"),
        pytest.param("S2", 0, Grade.DOUBT, id="sulfur-N32-triplet"),
        pytest.param("CH2_s3B1d", 0, Grade.DOUBT, id="methylene-N8-triplet"),
        pytest.param("NH", 0, Grade.DOUBT, id="imidogen-N8-triplet"),
    ],
)
def test_molecules_by_their_open_valences(name: str, charge: int, grade: Grade) -> None:
    assert of_g2(name, charge).grade is grade


def test_metals_are_doubted_and_nothing_is_guessed() -> None:
    (finding,) = run_rule(RULE, job([("Fe", 0, 0, 0), ("Cl", 2.2, 0, 0), ("Cl", -2.2, 0, 0)]))
    assert finding.grade is Grade.DOUBT
    assert finding.repairs == ()


def test_the_likelier_one_is_offered_first() -> None:
    finding = of_g2("O2")
    assert finding.message == "no multiplicity is stated, and a default gives 1, where 3 is likelier; state it"
    assert finding.repairs[0].edits == (Edit("species.multiplicity", 3),)


def test_no_g2_system_with_a_higher_ground_multiplicity_is_only_noted() -> None:
    """Spins of the set as ASE ships it; Curtiss et al., J. Chem. Phys. 106, 1063 (1997)."""
    for name in g2.names:
        finding = of_g2(name)
        published = round(sum(g2[name].get_initial_magnetic_moments())) + 1
        assert finding.grade is Grade.DOUBT or finding.evidence["lowest"] == published, name


def test_most_of_g2_is_noted_and_not_doubted() -> None:
    noted = sum(of_g2(name).grade is Grade.NOTE for name in g2.names)
    assert noted == 144
