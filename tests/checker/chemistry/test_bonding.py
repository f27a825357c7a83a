"""Bonds: what is one, what is a mere contact. Geometries from ASE's G2 set or idealised (tests/support/shapes)."""

import numpy as np
import pytest
from ase.build import molecule
from ase.data.s22 import create_s22_system
from shapes import sodium_with_six_waters, star, structure

from checker.chemistry.bonding import Bonds, perceive_bonds


def of(name: str) -> Bonds:
    atoms = molecule(name)
    return perceive_bonds(atoms.numbers, atoms.positions)


def edges(bonds: Bonds) -> set[tuple[int, int]]:
    return {(i, j) for i, others in enumerate(bonds.neighbours) for j in others if i < j}


@pytest.mark.parametrize(
    ("name", "n_bonds"),
    [
        pytest.param("H2O", 2, id="water"),
        pytest.param("CH4", 4, id="methane"),
        pytest.param("C6H6", 12, id="benzene"),
        pytest.param("F2", 1, id="fluorine-longer_than_its_radii"),
        pytest.param("bicyclobutane", 11, id="bicyclobutane-five_CC"),
        pytest.param("C2Cl4", 5, id="C2Cl4-no_Cl_Cl"),
        pytest.param("CF4", 4, id="CF4-no_F_F"),
        pytest.param("Si2H6", 7, id="disilane"),
        pytest.param("O3", 2, id="ozone-no_third_side"),
        pytest.param("cyclobutane", 12, id="cyclobutane-no_diagonal"),
    ],
)
def test_molecules_have_their_bonds(name: str, n_bonds: int) -> None:
    bonds = of(name)
    assert len(edges(bonds)) == n_bonds
    assert not bonds.contacts
    assert not bonds.overlaps


@pytest.mark.parametrize("name", ["Water_dimer", "Formic_acid_dimer", "Adenine-thymine_Watson-Crick_complex"])
def test_hydrogen_bonds_are_no_bonds(name: str) -> None:
    atoms = create_s22_system(name)
    bonds = perceive_bonds(atoms.numbers, atoms.positions)
    assert all(len(bonds.neighbours[i]) == 1 for i in np.flatnonzero(atoms.numbers == 1))
    assert len(bonds.component(0)) == len(atoms) // 2


def test_a_shared_proton_keeps_one_bond() -> None:
    numbers, places = structure([("F", 0.0, 0.0, -1.14), ("H", 0.0, 0.0, 0.0), ("F", 0.0, 0.0, 1.15)])
    assert edges(perceive_bonds(numbers, places)) == {(0, 1)}


def test_diborane_is_held_by_its_bridges() -> None:
    rows = [("B", 0.0, 0.0, 0.885), ("B", 0.0, 0.0, -0.885)]
    rows += [("H", 0.0, side * 0.97, 0.0) for side in (1, -1)]
    rows += [("H", x * 1.04, 0.0, z * 1.46) for x in (1, -1) for z in (1, -1)]
    bonds = perceive_bonds(*structure(rows))
    assert (0, 1) not in edges(bonds)
    assert sorted(bonds.neighbours[2]) == [0, 1]
    assert bonds.degrees().tolist() == [4, 4, 2, 2, 1, 1, 1, 1]


def test_bonds_to_metal_ions_are_contacts() -> None:
    bonds = perceive_bonds(*sodium_with_six_waters())
    assert len(bonds.contacts[0]) == 6
    assert not bonds.neighbours[0]
    assert len(bonds.component(1)) == 3


def test_the_long_bond_of_dinitrogen_tetroxide_is_one() -> None:
    rows = [("N", 0.0, 0.0, z * 0.89) for z in (1, -1)]
    rows += [("O", 0.0, y * 1.1, z * 1.36) for y in (1, -1) for z in (1, -1)]
    assert (0, 1) in edges(perceive_bonds(*structure(rows)))


def test_an_atom_sheds_stretched_contacts_before_it_is_overfull() -> None:
    numbers, places = star("C", "H", "tetrahedron", 1.09)
    near = np.vstack([places, [[0.0, 0.0, 1.90]]])  # within the tolerance of C-C, but a fifth neighbour
    bonds = perceive_bonds(np.append(numbers, 6), near)
    assert sorted(bonds.neighbours[0]) == [1, 2, 3, 4]


def test_nuclei_on_each_other_are_an_overlap() -> None:
    numbers, places = star("C", "H", "tetrahedron", 1.09)
    doubled = perceive_bonds(np.append(numbers, 1), np.vstack([places, places[1] + [0.0, 0.0, 0.02]]))
    ((i, j, distance),) = doubled.overlaps
    assert (i, j) == (1, 5)
    assert distance == pytest.approx(0.02)


@pytest.mark.parametrize("n_atoms", [0, 1])
def test_nothing_is_bonded_to_nothing(n_atoms: int) -> None:
    bonds = perceive_bonds(np.full(n_atoms, 6), np.zeros((n_atoms, 3)))
    assert [list(others) for others in bonds.neighbours] == [[]] * n_atoms


def test_bonds_do_not_depend_on_the_order_of_atoms() -> None:
    atoms = molecule("C5H5N")
    order = np.random.default_rng(3).permutation(len(atoms))
    shuffled = perceive_bonds(atoms.numbers[order], atoms.positions[order])
    back = {tuple(sorted((int(order[i]), int(order[j])))) for i, j in edges(shuffled)}
    assert back == edges(perceive_bonds(atoms.numbers, atoms.positions))
