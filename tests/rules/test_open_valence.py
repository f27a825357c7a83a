"""open-valence. Each id names the species and its state."""

import numpy as np
import pytest
from ase.build import molecule
from ase.collections import g2
from shapes import Structure, joined, rows, star, without

from builders import job, run_rule, speak
from checker.findings import Edit, NotJudged
from rules.open_valence import RULE


def of(name: str) -> Structure:
    atoms = molecule(name)
    return np.array(atoms.numbers), np.array(atoms.positions)


STRIPPED = without(of("C2H6"), 2, 5)


@pytest.mark.parametrize(
    ("made", "charge", "multiplicity", "at"),
    [
        pytest.param(of("CH4"), 0, 1, None, id="methane"),
        pytest.param(of("CH3"), 0, 2, None, id="methyl_doublet"),
        pytest.param(of("CH3"), +1, 1, None, id="methyl_cation"),
        pytest.param(of("CH2_s3B1d"), 0, 3, None, id="methylene_triplet"),
        pytest.param(of("O2"), 0, 3, None, id="oxygen_triplet"),
        pytest.param(of("C6H6"), 0, 1, None, id="benzene"),
        pytest.param(of("C6H6"), +1, 2, None, id="benzene_cation"),
        pytest.param(of("H"), 0, 2, None, id="hydrogen_atom-no_molecule"),
        pytest.param(star("Fe", "Cl", "tetrahedron", 2.2), -1, 6, None, id="iron_chloride-a_metal"),
        pytest.param(STRIPPED, 0, 1, "species.atoms[0]", id="ethane_less_two"),
        pytest.param(
            joined(without(of("CH4"), 4), of("NH2")), 0, 1, "species.atoms[0]", id="two_fragments_less_one_each"
        ),
        pytest.param(star("C", "H", "bipyramid", 1.10), 0, 2, "species.atoms[0]", id="five_neighbours"),
        pytest.param(star("C", "H", "bipyramid", 1.10), +1, 1, None, id="methonium"),
    ],
)
def test_speaks_where_nothing_explains_the_gap(
    made: Structure, charge: int, multiplicity: int, at: str | None
) -> None:
    found = run_rule(RULE, job(rows(made), charge=charge, multiplicity=multiplicity))
    assert [finding.at for finding in found] == [at] * (at is not None)


def test_says_which_atoms_and_what_to_look_for() -> None:
    (finding,) = run_rule(RULE, job(rows(STRIPPED), multiplicity=1))
    assert finding.message.startswith(
        "C 1, C 2 are short of a bond, and charge 0 and multiplicity 1 do not account"
    )
    assert finding.message.endswith("; look for a lost hydrogen or a stretched bond")
    hydrogens, coupled = finding.repairs
    assert [edit.key for edit in hydrogens.edits] == ["species.atoms[6]", "species.atoms[7]"]
    assert coupled.edits == (Edit("treatment.intent", "broken-symmetry"),)
    assert finding.evidence == {"atoms": ["C 1", "C 2"], "neighbours": [3, 3]}


@pytest.mark.parametrize("intent", ["broken-symmetry", "excited"])
def test_a_coupled_pair_may_be_meant(intent: str) -> None:
    assert not run_rule(RULE, job(rows(STRIPPED), multiplicity=1, treatment={"intent": intent}))


def test_where_parity_fails_another_rule_judges() -> None:
    (word,) = speak(RULE, job(rows(of("CH3")), multiplicity=1))
    assert isinstance(word, NotJudged)
    assert "spin-parity" in word.because


@pytest.mark.parametrize("name", sorted(g2.names))
def test_is_silent_on_g2(name: str) -> None:
    """L. A. Curtiss et al., J. Chem. Phys. 106, 1063 (1997), as ASE ships it."""
    system = g2[name]
    multiplicity = round(sum(system.get_initial_magnetic_moments())) + 1
    made = (np.array(system.numbers), np.array(system.positions))
    assert not run_rule(RULE, job(rows(made), multiplicity=multiplicity))


def test_hydrogens_are_offered_for_both_ends_and_mend_it() -> None:
    """Ethane less one hydrogen at each carbon, the C-C bond as it was."""
    ethane = molecule("C2H6")
    rows = [(s, *map(float, p)) for s, p in zip(ethane.get_chemical_symbols(), ethane.positions, strict=True)]
    lost = next(i for i, row in enumerate(rows) if row[0] == "H" and ethane.get_distance(0, i) < 1.2)
    other = next(i for i, row in enumerate(rows) if row[0] == "H" and ethane.get_distance(1, i) < 1.2)
    short = [row for i, row in enumerate(rows) if i not in (lost, other)]
    (finding,) = run_rule(RULE, job(short, 0, 1))
    first = finding.repairs[0]
    assert first.say == "add a hydrogen to C 1 and C 2"
    mended = short + [tuple(edit.value) for edit in first.edits]  # type: ignore[arg-type]
    assert run_rule(RULE, job(mended, 0, 1)) == []
