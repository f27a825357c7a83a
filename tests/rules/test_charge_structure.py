"""charge-structure. Each id names the species; the charges are common knowledge (common practice, no source)."""

import numpy as np
import pytest
from ase.build import molecule
from ase.collections import g2
from shapes import Structure, rows, sodium_with_six_waters, star

from builders import job, run_rule, speak
from checker.findings import Edit, NotJudged
from rules.charge_structure import RULE

NITRATE = star("N", "O", "trigonal", 1.25)


def of(name: str) -> Structure:
    atoms = molecule(name)
    return np.array(atoms.numbers), np.array(atoms.positions)


@pytest.mark.parametrize(
    ("made", "charge", "multiplicity", "speaks"),
    [
        pytest.param(NITRATE, -1, 1, False, id="nitrate"),
        pytest.param(NITRATE, 0, 2, False, id="nitrate_radical"),
        pytest.param(NITRATE, +1, 1, True, id="nitrate_as_cation"),
        pytest.param(star("N", "H", "tetrahedron", 1.02), +1, 1, False, id="ammonium"),
        pytest.param(star("N", "H", "tetrahedron", 1.02), -1, 1, True, id="ammonium_as_anion"),
        pytest.param(star("P", "F", "octahedron", 1.60), -1, 1, False, id="hexafluorophosphate"),
        pytest.param(star("P", "F", "octahedron", 1.60), +1, 1, True, id="hexafluorophosphate_as_cation"),
        pytest.param(sodium_with_six_waters(), +1, 1, False, id="aqua_ion"),
        pytest.param(sodium_with_six_waters(), 0, 2, True, id="aqua_ion_as_neutral"),
        pytest.param(of("NaCl"), 0, 1, False, id="ion_pair"),
        pytest.param(of("H2O"), +1, 2, False, id="ionised_water"),
        pytest.param(of("H2O"), +2, 1, True, id="water_twice_ionised"),
        pytest.param(of("NO2"), 0, 2, False, id="nitrogen_dioxide"),
        pytest.param(of("Na"), 0, 2, False, id="free_atom"),
    ],
)
def test_speaks_only_where_the_bonds_are_plain(
    made: Structure, charge: int, multiplicity: int, speaks: bool
) -> None:
    found = run_rule(RULE, job(rows(made), charge=charge, multiplicity=multiplicity))
    assert [finding.at for finding in found] == ["species.charge"] * speaks


def test_says_what_bonding_implies_and_on_which_atoms() -> None:
    (finding,) = run_rule(RULE, job(rows(NITRATE), charge=+1, multiplicity=1))
    assert finding.message == "bonding implies -1, and the deck states +1"
    assert finding.why == "Formal charges: N 1 +1, O 3 -1, O 4 -1."
    assert finding.repairs[0].edits == (Edit("species.charge", -1),)


def test_a_singlet_oxenium_may_have_been_meant_as_the_triplet() -> None:
    (finding,) = run_rule(RULE, job(rows(of("OH")), charge=+1, multiplicity=1))
    assert [repair.edits for repair in finding.repairs] == [
        (Edit("species.charge", -1),),
        (Edit("species.multiplicity", 3),),
    ]


def test_a_vertical_state_may_have_two_electrons_fewer() -> None:
    vertical = {"intent": "vertical"}
    assert not run_rule(RULE, job(rows(of("H2O")), charge=+2, multiplicity=1, treatment=vertical))
    assert run_rule(RULE, job(rows(of("H2O")), charge=+4, multiplicity=1, treatment=vertical))


def test_a_repair_keeps_the_parity() -> None:
    (finding,) = run_rule(RULE, job(rows(sodium_with_six_waters()), charge=0, multiplicity=2))
    assert finding.message == "closed valences give +1, and the deck states 0"
    assert finding.repairs[0].edits == (Edit("species.charge", 1), Edit("species.multiplicity", 1))


@pytest.mark.parametrize(
    ("made", "because"),
    [
        pytest.param(of("CH3"), "carbon 1 could be a cation, an anion or a radical", id="methyl"),
        pytest.param(star("Cr", "O", "tetrahedron", 1.65), "chromium 1 has no charge of its own", id="chromate"),
    ],
)
def test_what_is_ambiguous_is_not_judged(made: Structure, because: str) -> None:
    (word,) = speak(RULE, job(rows(made), charge=-2, multiplicity=2))
    assert isinstance(word, NotJudged)
    assert because in word.because


@pytest.mark.parametrize("name", sorted(g2.names))
def test_is_silent_on_g2(name: str) -> None:
    """L. A. Curtiss et al., J. Chem. Phys. 106, 1063 (1997), as ASE ships it."""
    system = g2[name]
    multiplicity = round(sum(system.get_initial_magnetic_moments())) + 1
    made = (np.array(system.numbers), np.array(system.positions))
    assert not run_rule(RULE, job(rows(made), multiplicity=multiplicity))
