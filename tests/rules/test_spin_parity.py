"""spin-parity. Each id states N, so that a reader can check the row by hand."""

import numpy as np
import pytest
from ase.build import molecule
from shapes import Structure, rows, without

from builders import job, run_rule, speak
from checker.findings import Edit, Finding, NotJudged
from checker.geometry import ANGSTROM_PER_BOHR
from rules.spin_parity import RULE


@pytest.mark.parametrize(
    ("atoms", "charge", "multiplicity", "speaks"),
    [
        pytest.param("O H H", 0, 1, False, id="water-N10-singlet"),
        pytest.param("O H H", +1, 1, True, id="water_cation-N9-singlet"),
        pytest.param("Fe", +2, 5, False, id="iron2-N24-quintet"),
        pytest.param("Fe", +3, 5, True, id="iron3-N23-quintet"),
        pytest.param("H", +1, 1, False, id="bare_proton-N0-singlet"),
    ],
)
def test_speaks_only_on_wrong_parity(atoms: str, charge: int, multiplicity: int, speaks: bool) -> None:
    found = run_rule(RULE, job(atoms, charge=charge, multiplicity=multiplicity))
    assert [f.at for f in found] == ["species.multiplicity"] * speaks


def g2(name: str) -> Structure:
    atoms = molecule(name)
    return np.array(atoms.numbers), np.array(atoms.positions)


WATER = rows(g2("H2O"))
CUT_METHANE = rows(without(g2("CH4"), 4))


def only(found: list[Finding]) -> Finding:
    (finding,) = found
    return finding


def test_says_the_count_the_need_and_the_way_out() -> None:
    finding = only(run_rule(RULE, job(WATER, charge=+1, multiplicity=1)))
    assert finding.message == "9 electrons need an even multiplicity, not 1"
    assert finding.repairs[0].say == "set the charge to 0: closed valences give charge 0"
    assert finding.repairs[0].edits == (Edit("species.charge", 0),)
    assert sum(repair.weight for repair in finding.repairs) == pytest.approx(1.0, abs=0.01)


def test_a_multiplicity_is_set() -> None:
    finding = only(run_rule(RULE, job(WATER, charge=0, multiplicity=2)))
    assert finding.repairs[0].say == "set the multiplicity to 1: all valences are closed, which makes a singlet"
    assert finding.repairs[0].edits == (Edit("species.multiplicity", 1),)


@pytest.mark.parametrize(("unit", "length"), [("angstrom", 1.0), ("bohr", ANGSTROM_PER_BOHR)])
def test_a_hydrogen_is_added_in_the_unit_of_the_deck(unit: str, length: float) -> None:
    """The geometry is held in angstrom; the row that goes into the deck is in the deck's own unit."""
    stated = job(CUT_METHANE, multiplicity=1, species={"length_unit": unit})
    repair = only(run_rule(RULE, stated)).repairs[0]
    assert repair.say.startswith("add a hydrogen to C 1: carbon 1 has three neighbours in a pyramid")
    (edit,) = repair.edits
    assert edit.key == "species.atoms[4]"
    assert isinstance(edit.value, list)
    symbol, *place = edit.value
    assert symbol == "H"
    assert np.array(place, dtype=float) * length == pytest.approx(molecule("CH4").positions[4], abs=0.1)


def test_a_copy_is_deleted_and_ghosts_and_fragments_keep_their_atoms() -> None:
    hydrogen = WATER[1]
    ghost = ("He", 0.0, 0.0, 5.0)
    fragments = [{"atoms": [1, 2]}, {"atoms": [3, 4]}]
    stated = job(
        [*WATER[:2], hydrogen, WATER[2], ghost], multiplicity=1, species={"ghost_atoms": [5]}, fragments=fragments
    )
    repair = only(run_rule(RULE, stated)).repairs[0]
    assert repair.say.startswith("delete H 3, pasted twice")
    assert repair.edits == (
        Edit("species.atoms[2]", None),
        Edit("species.ghost_atoms", [4]),
        Edit("fragments[1].atoms", [3]),
    )


def test_atoms_are_named_by_their_numbers_in_the_deck_past_ghosts() -> None:
    ghost = ("He", 0.0, 0.0, 8.0)
    stated = job([ghost, *CUT_METHANE], multiplicity=1, species={"ghost_atoms": [1]})
    repair = only(run_rule(RULE, stated)).repairs[0]
    assert repair.say.startswith("add a hydrogen to C 2: carbon 2 has three neighbours")
    assert repair.edits[0].key == "species.atoms[5]"


def test_a_miscounted_core_is_offered() -> None:
    atoms = [("I", 0.0, 0.0, 0.0), ("H", 0.0, 0.0, 1.61)]
    finding = only(run_rule(RULE, job(atoms, multiplicity=1, core_potential={"replaced": {"I": 27}})))
    assert finding.repairs[0].say == (
        "let the core potential of I replace 28 electrons: published potentials of I replace 28 electrons, not 27"
    )
    assert finding.repairs[0].edits == (Edit("core_potential.replaced.I", 28),)


def test_where_no_bonds_can_be_told_the_halt_stands_without_repairs() -> None:
    heap = [("H", 0.001 * i, 0.0, 0.0) for i in range(2_001)]
    words = speak(RULE, job(heap, multiplicity=1))
    (finding,) = (word for word in words if isinstance(word, Finding))
    (unknown,) = (word for word in words if isinstance(word, NotJudged))
    assert not finding.repairs
    assert unknown.because.startswith("what was meant cannot be ranked: ")
