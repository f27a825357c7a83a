"""Room for a bond, bond orders from lengths, and the place of a lost hydrogen."""

import numpy as np
import pytest
from ase.build import molecule
from shapes import Structure, star, structure, without

from checker.chemistry.bonding import perceive_bonds
from checker.chemistry.vacancy import bond_order, hydrogen_site, vacancy

# Lengths in angstrom, rounded, from the CRC Handbook (from memory); orders as every textbook gives them.
LENGTHS = [
    pytest.param(6, 6, 1.535, 1.0, id="ethane"),
    pytest.param(6, 6, 1.397, 1.5, id="benzene"),
    pytest.param(6, 6, 1.339, 2.0, id="ethene"),
    pytest.param(6, 6, 1.203, 3.0, id="ethyne"),
    pytest.param(6, 8, 1.425, 1.0, id="methanol"),
    pytest.param(6, 8, 1.205, 2.0, id="formaldehyde"),
    pytest.param(6, 7, 1.471, 1.0, id="methylamine"),
    pytest.param(6, 7, 1.153, 3.0, id="hydrogen_cyanide"),
    pytest.param(7, 7, 1.449, 1.0, id="hydrazine"),
    pytest.param(8, 8, 1.475, 1.0, id="hydrogen_peroxide"),
    pytest.param(8, 8, 1.207, 2.0, id="oxygen"),
    pytest.param(7, 8, 1.224, 1.6, id="nitromethane"),
    pytest.param(1, 6, 1.087, 1.0, id="methane"),
]


@pytest.mark.parametrize(("first", "second", "length", "order"), LENGTHS)
def test_orders_follow_from_lengths(first: int, second: int, length: float, order: float) -> None:
    assert bond_order(first, second, length) == pytest.approx(order, abs=0.35)
    assert bond_order(first, second, length) == bond_order(second, first, length)


def test_an_order_falls_with_the_length() -> None:
    orders = [bond_order(6, 7, length) for length in np.arange(1.0, 1.9, 0.01)]
    assert orders == sorted(orders, reverse=True)


def room(made: Structure, atom: int = 0) -> float:
    return vacancy(atom, *made, perceive_bonds(*made))


def test_room_tells_a_pyramid_from_a_plane() -> None:
    pyramid, plane = star("C", "H", "pyramid", 1.09), star("C", "H", "trigonal", 1.09)
    assert room(pyramid) > 0.7
    assert room(plane) < 0.1


def test_a_full_atom_has_no_room() -> None:
    assert room(star("C", "H", "tetrahedron", 1.09)) == 0.0
    assert room(star("N", "H", "pyramid", 1.01)) == 0.0


def test_a_bent_carbon_has_room_and_a_linear_one_little() -> None:
    assert room(star("C", "H", "bent", 1.09)) > 0.7
    assert room(star("C", "O", "linear", 1.16)) < 0.1


@pytest.mark.parametrize(
    "name", ["CH4", "C2H6", "C2H4", "C2H2", "NH3", "H2O", "CH3OH", "C6H6", "H2CO", "SiH4", "H2"]
)
def test_a_removed_hydrogen_is_put_back_where_it_was(name: str) -> None:
    """Within 0.45 angstrom; along the same direction where the other neighbours fix it."""
    atoms = molecule(name)
    hydrogen = int(np.flatnonzero(atoms.numbers == 1)[-1])
    whole = perceive_bonds(atoms.numbers, atoms.positions)
    (parent,) = whole.neighbours[hydrogen]
    rest = without((atoms.numbers, atoms.positions), hydrogen)
    bonds = perceive_bonds(*rest)
    site = hydrogen_site(parent, *rest, bonds)
    length = np.linalg.norm(site - rest[1][parent])
    assert length == pytest.approx(np.linalg.norm(atoms.positions[hydrogen] - rest[1][parent]), abs=0.1)
    if len(bonds.neighbours[parent]) >= 2 and name not in {"NH3"}:
        assert np.linalg.norm(site - atoms.positions[hydrogen]) < 0.45


@pytest.mark.parametrize(
    "made",
    [
        pytest.param(structure([("O", 1.0, 2.0, 3.0)]), id="free_atom"),
        pytest.param(structure([("O", 0, 0, 0), ("H", 0, 0, 0.97)]), id="one_neighbour"),
        pytest.param(star("C", "O", "linear", 1.16), id="linear"),
        pytest.param(star("C", "H", "trigonal", 1.09), id="planar"),
        pytest.param(star("C", "H", "bent", 1.09), id="two_missing"),
        pytest.param(star("C", "H", "tetrahedron", 1.09), id="nothing_missing"),
    ],
)
def test_a_site_is_always_finite_and_clear_of_the_others(made: Structure) -> None:
    numbers, places = made
    site = hydrogen_site(0, numbers, places, perceive_bonds(numbers, places))
    assert np.isfinite(site).all()
    if len(numbers) < 5:
        assert all(np.linalg.norm(site - place) > 0.85 for place in places)
