"""bond_radii, usual_valences, ion_charges and unbound_anions: whole, possible, without holes."""

import pytest

from checker.elements import MAX_ATOMIC_NUMBER, symbol_of
from checker.tables import structure

MAIN_GROUP = [z for z, valences in enumerate(structure.usual_valences()) if valences]


def test_every_element_has_a_single_bond_radius() -> None:
    assert sum(radii[0] is not None for radii in structure.bond_radii()) == MAX_ATOMIC_NUMBER


@pytest.mark.parametrize("z", [z for z in MAIN_GROUP if 4 < z < 54 and z not in {10, 18, 36, 49}], ids=symbol_of)
def test_multiple_bonds_of_covalent_elements_are_shorter(z: int) -> None:
    single, double, triple = structure.bond_radii()[z]
    assert single is not None
    assert double is not None
    assert triple is not None
    assert max(double, triple) < single


def test_every_valence_fits_the_electrons() -> None:
    for z in MAIN_GROUP:
        electrons, valences = structure.valence_electrons()[z], structure.usual_valences()[z]
        assert 1 <= electrons <= 8, symbol_of(z)
        assert all(0 <= valence <= electrons for valence in valences), symbol_of(z)
        octet = {1: 1, 3: 3, 4: 4, 5: 3, 6: 2, 7: 1}.get(electrons, 0)
        assert valences[0] == octet, symbol_of(z)
        assert structure.first_valences()[z] == octet


def test_an_element_is_covalent_or_an_ion_but_not_both() -> None:
    ions = {z for z, charge in enumerate(structure.ion_charges()) if charge}
    assert not ions & set(MAIN_GROUP)
    assert {symbol_of(z) for z in ions} >= {"Li", "Na", "K", "Mg", "Ca", "Zn"}
    assert not structure.is_covalent()[26]


def test_every_element_has_a_radius() -> None:
    radii = structure.cordero_radii()
    assert len(radii) == MAX_ATOMIC_NUMBER + 1
    assert (radii[1:] > 0.2).all()


def test_arrays_cannot_be_changed() -> None:
    with pytest.raises(ValueError, match="read-only"):
        structure.cordero_radii()[6] = 1.0


def test_attachment_energies_are_positive() -> None:
    energies = structure.attachment_energies()
    assert {"N2", "C6H6"} <= set(energies)
    assert all(0 < energy < 5 for energy in energies.values())
