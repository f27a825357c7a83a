"""unbound-electrons. Each id names the anion; more of them stand in tests/checker/chemistry/test_attachment.py."""

import numpy as np
import pytest
from ase.build import molecule
from shapes import Structure, rows, star

from builders import job, run_rule, speak
from checker.findings import Edit, NotJudged
from rules.unbound_electrons import RULE

SULFATE = star("S", "O", "tetrahedron", 1.49)


def of(name: str) -> Structure:
    atoms = molecule(name)
    return np.array(atoms.numbers), np.array(atoms.positions)


@pytest.mark.parametrize(
    ("atoms", "charge", "speaks"),
    [
        pytest.param(rows(SULFATE), -2, True, id="sulfate"),
        pytest.param(rows(star("N", "O", "trigonal", 1.25)), -1, False, id="nitrate"),
        pytest.param(rows(of("CH4")), -1, True, id="methane"),
        pytest.param(rows(of("CH4")), 0, False, id="neutral_methane"),
        pytest.param(rows(of("O2")), -1, False, id="superoxide"),
        pytest.param("Cl", -1, False, id="chloride"),
        pytest.param("O", -2, True, id="oxide"),
        pytest.param("Ne", -1, True, id="neon"),
        pytest.param("N", -1, True, id="nitrogen_atom"),
        pytest.param("Na", -1, False, id="sodide"),
    ],
)
def test_speaks_of_electrons_that_leave(
    atoms: str | list[tuple[str, float, float, float]], charge: int, speaks: bool
) -> None:
    found = run_rule(RULE, job(atoms, charge=charge))
    assert [finding.at for finding in found] == ["species.charge"] * speaks


@pytest.mark.parametrize("environment", ["solution", "embedded", "crystal"])
def test_surroundings_hold_the_electrons(environment: str) -> None:
    assert not run_rule(RULE, job(rows(SULFATE), charge=-2, species={"environment": environment}))


def test_says_what_happens_and_the_ways_out() -> None:
    (finding,) = run_rule(RULE, job(rows(of("CH4")), charge=-1, multiplicity=2))
    assert finding.message == (
        "CH4- does not hold all its electrons in the gas phase; change charge or environment"
    )
    neutral, dissolved = finding.repairs
    assert neutral.edits == (Edit("species.charge", 0), Edit("species.multiplicity", 1))
    assert dissolved.edits == (Edit("species.environment", "solution"),)


def test_a_dianion_is_not_offered_another_charge() -> None:
    (finding,) = run_rule(RULE, job(rows(SULFATE), charge=-2))
    assert finding.message.startswith("SO4 2- does not hold")
    assert [repair.say for repair in finding.repairs] == ["say that the species is in solution"]


def test_an_atom_without_a_measurement_is_not_judged() -> None:
    (word,) = speak(RULE, job("Og", charge=-1))
    assert isinstance(word, NotJudged)


def test_a_deck_of_ghosts_alone_is_left_to_the_electron_count() -> None:
    """Found by the fuzz test."""
    assert run_rule(RULE, job("H", -1, 1, {"ghost_atoms": [1]})) == []
