"""Implied charges against published sets: each species must be allowed the charge and spin that were published.

DBH24: J. Zheng, Y. Zhao, D. G. Truhlar, J. Chem. Theory Comput. 3, 569 (2007), reactants, products and transition
structures. G2: L. A. Curtiss et al., J. Chem. Phys. 106, 1063 (1997). S22 and S26: P. Jurecka et al., Phys. Chem.
Chem. Phys. 8, 1985 (2006), complexes of closed shells.
All as ASE ships them.
"""

import numpy as np
import pytest
from ase import Atoms
from ase.collections import g2
from ase.data.dbh24 import create_dbh24_system, dbh24, get_dbh24_charge
from ase.data.s22 import create_s22_system, s22, s26
from shapes import rows

from builders import job, run_rule
from checker.chemistry.plausibility import state_weight
from checker.chemistry.valence import assign_valences
from rules import charge_structure, open_valence


@pytest.mark.parametrize("name", sorted(g2.names))
def test_a_little_noise_and_another_order_never_make_another_charge(name: str) -> None:
    """0.03 angstrom in each coordinate may make a structure ambiguous, but not wrong."""
    atoms = g2[name]
    clean = assign_valences(atoms.numbers, atoms.positions)
    random = np.random.default_rng(11)
    for _ in range(5):
        order = random.permutation(len(atoms))
        places = atoms.positions + random.normal(0, 0.03, atoms.positions.shape)
        noisy = assign_valences(atoms.numbers[order], places[order])
        assert noisy.implied_charge in {clean.implied_charge, None}


def heard(atoms: Atoms, charge: int, multiplicity: int) -> list[str]:
    """What the two rules of structure say."""
    stated = job(rows((atoms.numbers, atoms.positions)), charge=charge, multiplicity=multiplicity)
    rules = [rule for rule in (charge_structure.RULE, open_valence.RULE) if len(atoms) > 1]
    return [finding.message for rule in rules for finding in run_rule(rule, stated)]


@pytest.mark.parametrize("name", sorted({*s22, *s26}))
def test_complexes_of_closed_shells_are_neutral(name: str) -> None:
    atoms = create_s22_system(name)
    valence = assign_valences(atoms.numbers, atoms.positions)
    assert valence.implied_charge == 0
    assert not valence.open_valences.any()
    assert not heard(atoms, 0, 1)


@pytest.mark.parametrize("name", dbh24)
def test_reactants_products_and_transition_structures_pass(name: str) -> None:
    atoms = create_dbh24_system(name)
    charge = int(get_dbh24_charge(name))
    multiplicity = round(sum(atoms.get_initial_magnetic_moments())) + 1
    assert not heard(atoms, charge, multiplicity)
    if len(atoms) > 1:
        assert state_weight(assign_valences(atoms.numbers, atoms.positions).tally, charge, multiplicity) > 0.01
