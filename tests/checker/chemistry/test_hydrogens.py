"""Candidates for a lost or a surplus hydrogen: what the structure would be after the edit."""

import numpy as np
import pytest
from ase.build import molecule
from shapes import Structure, joined, star, without

from checker.chemistry.hydrogens import MOST_CANDIDATES, lost_hydrogens, surplus_hydrogens
from checker.chemistry.valence import Tally, Valence, assign_valences


def g2(name: str) -> Structure:
    atoms = molecule(name)
    return np.array(atoms.numbers), np.array(atoms.positions)


def of(made: Structure) -> Valence:
    return assign_valences(*made)


@pytest.mark.parametrize(
    ("made", "atom", "after"),
    [
        pytest.param(without(g2("CH4"), 4), 0, Tally(base=0), id="methane"),
        pytest.param(without(g2("CH3OH"), 3), 1, Tally(base=0), id="methanol"),
        pytest.param(g2("CH2_s1A1d"), 0, Tally(base=0, flexible=1), id="methylene"),
        pytest.param(g2("NH"), 0, Tally(base=0, anions=1), id="imidogen"),
        pytest.param(without(g2("C2H5"), 3), 0, Tally(base=0, flexible=1), id="ethyl-leaves_the_radical"),
    ],
)
def test_the_best_place_and_what_is_left(made: Structure, atom: int, after: Tally) -> None:
    best = lost_hydrogens(of(made))[0]
    assert best.tally_after == after
    if len(made[0]) != 6:
        assert best.atom == atom


def test_a_closed_molecule_without_room_has_no_candidate() -> None:
    assert lost_hydrogens(of(g2("CH4"))) == []
    assert lost_hydrogens(of(g2("C6H6"))) == []
    assert surplus_hydrogens(of(g2("CH4"))) == []


def test_the_oxygens_of_nitrate_are_poor_candidates() -> None:
    assert all(edit.fit < 0.2 for edit in lost_hydrogens(of(star("N", "O", "trigonal", 1.25))))


def test_no_more_than_a_handful_are_named() -> None:
    many = joined(*[without(g2("CH4"), 4)] * 9)
    assert len(lost_hydrogens(of(many))) == MOST_CANDIDATES


def test_surplus_hydrogens_stand_on_overfull_atoms_or_alone() -> None:
    (onium,) = surplus_hydrogens(of(star("N", "H", "tetrahedron", 1.02)))
    assert onium.centre == 0
    assert onium.tally_after == Tally(base=0)
    (lone,) = surplus_hydrogens(of(joined(g2("CH4"), g2("H"))))
    assert lone.atom == 5
    assert lone.tally_after == Tally(base=0)
