"""The distances that contacts.py and close-contact name, measured over G2/97 as ASE ships it.

Source: Curtiss, Raghavachari, Redfern, Pople, J. Chem. Phys. 106, 1063 (1997).
"""

import numpy as np
import pytest
from ase.collections import g2

from checker.chemistry.contacts import Nearest, nearest_by_bond_length
from checker.geometry import ANGSTROM_PER_BOHR


def nearest(name: str) -> Nearest:
    return nearest_by_bond_length(g2[name].numbers.astype(np.int64), g2[name].positions)


SYSTEMS = {name: nearest(name) for name in sorted(g2.names) if len(g2[name]) > 1}
MEDIANS = {name: float(np.median(n.ratio)) for name, n in SYSTEMS.items() if len(n.ratio) > 2}


def test_least_and_greatest_ratio() -> None:
    ratios = {name: (float(n.ratio.min()), float(n.ratio.max())) for name, n in SYSTEMS.items()}
    assert min(ratios, key=lambda name: ratios[name][0]) == "CN"
    assert max(ratios, key=lambda name: ratios[name][1]) == "F2"
    assert ratios["CN"][0] == pytest.approx(0.772, abs=1e-3)
    assert ratios["F2"][1] == pytest.approx(1.246, abs=1e-3)


def test_range_of_the_medians() -> None:
    assert (min(MEDIANS, key=MEDIANS.__getitem__), max(MEDIANS, key=MEDIANS.__getitem__)) == ("CCH", "F2O")
    low, high = min(MEDIANS.values()), max(MEDIANS.values())
    assert (low, high) == pytest.approx((0.776, 1.157), abs=1e-3)
    assert (low / ANGSTROM_PER_BOHR, high / ANGSTROM_PER_BOHR) == pytest.approx((1.467, 2.186), abs=1e-3)
    assert (low * ANGSTROM_PER_BOHR, high * ANGSTROM_PER_BOHR) == pytest.approx((0.411, 0.612), abs=1e-3)


def test_farthest_nearest_neighbour() -> None:
    assert max(SYSTEMS, key=lambda name: SYSTEMS[name].distance.max()) == "Na2"
    assert SYSTEMS["Na2"].distance.max() == pytest.approx(3.15, abs=0.01)


@pytest.mark.parametrize("n_atoms", [2, 300, 2500])
def test_every_search_finds_the_same(n_atoms: int) -> None:
    """Against a plain double loop in NumPy; the three sizes take the three ways of searching."""
    rng = np.random.default_rng(n_atoms)
    numbers = rng.choice(np.array([1, 6, 8, 17]), n_atoms)
    coordinates = rng.random((n_atoms, 3)) * 1.6 * n_atoms ** (1 / 3)
    found = nearest_by_bond_length(numbers, coordinates)
    radius = {1: 0.31, 6: 0.76, 8: 0.66, 17: 1.02}  # Cordero et al., Dalton Trans. 2008, 2832
    radii = np.array([radius[z] for z in numbers.tolist()])
    for atom in rng.integers(0, n_atoms, 50).tolist():
        distances = np.linalg.norm(coordinates - coordinates[atom], axis=1)
        ratios = np.where(np.arange(n_atoms) == atom, np.inf, distances / (radii + radii[atom]))
        assert found.ratio[atom] == pytest.approx(ratios.min())
        assert found.distance[atom] == pytest.approx(distances[ratios.argmin()])
        assert found.partner[atom] == ratios.argmin()


def test_atoms_on_one_point_find_each_other_in_a_large_system() -> None:
    coordinates = np.random.default_rng(1).random((3000, 3)) * 40
    coordinates[2000:2003] = coordinates[7]
    found = nearest_by_bond_length(np.full(3000, 6), coordinates)
    assert set(np.flatnonzero(found.distance == 0).tolist()) == {7, 2000, 2001, 2002}
    assert all(found.partner[atom] in {7, 2000, 2001, 2002} - {atom} for atom in (7, 2000, 2001, 2002))
