"""Anions that hold their electrons in the gas phase, and those that do not.

Expected outcomes: electron affinities as listed in the NIST Chemistry WebBook and the reviews named in
checker/chemistry/attachment.py (from memory).
"""

import numpy as np
import pytest
from ase.build import molecule
from shapes import Structure, joined, star, structure

from checker.chemistry.attachment import hill_formula, unbound_because, written_formula
from checker.chemistry.valence import assign_valences


def g2(name: str) -> Structure:
    atoms = molecule(name)
    return np.array(atoms.numbers), np.array(atoms.positions)


@pytest.mark.parametrize(
    ("made", "charge", "bound"),
    [
        pytest.param(star("S", "O", "tetrahedron", 1.49), -2, False, id="sulfate"),
        pytest.param(star("C", "O", "trigonal", 1.29), -2, False, id="carbonate"),
        pytest.param(star("P", "O", "tetrahedron", 1.54), -3, False, id="phosphate"),
        pytest.param(structure([("O", 0, 0, 0), ("O", 0, 0, 1.50)]), -2, False, id="peroxide"),
        pytest.param(star("N", "O", "trigonal", 1.25), -1, True, id="nitrate"),
        pytest.param(star("Pt", "Cl", "octahedron", 2.33), -2, True, id="hexachloroplatinate-with_a_metal"),
        pytest.param(g2("CH4"), -1, False, id="methane"),
        pytest.param(g2("H2O"), -1, False, id="water"),
        pytest.param(g2("NH3"), -1, False, id="ammonia"),
        pytest.param(g2("N2"), -1, False, id="nitrogen"),
        pytest.param(g2("C6H6"), -1, False, id="benzene"),
        pytest.param(g2("O2"), -1, True, id="oxygen-0.45eV"),
        pytest.param(g2("SO2"), -1, True, id="sulfur_dioxide-1.1eV"),
        pytest.param(g2("Cl2"), -1, True, id="chlorine-2.4eV"),
        pytest.param(g2("CCl4"), -1, True, id="carbon_tetrachloride"),
        pytest.param(star("S", "F", "octahedron", 1.56), -1, True, id="SF6-1.0eV"),
        pytest.param(g2("C60"), -1, True, id="C60-2.7eV"),
        pytest.param(g2("CH3O"), -1, True, id="methoxide-closed_valences"),
        pytest.param(g2("CH3NO2"), -1, True, id="nitromethane-dipole_and_valence"),
        pytest.param(g2("LiF"), -1, True, id="LiF-dipole_bound"),
        pytest.param(joined(g2("H2O"), g2("H2O")), -1, True, id="water_cluster-not_judged"),
        pytest.param(g2("CH4"), 0, True, id="neutral"),
        pytest.param(g2("CH4"), +1, True, id="cation"),
    ],
)
def test_who_holds_the_electrons(made: Structure, charge: int, bound: bool) -> None:
    found = unbound_because(made[0], charge, assign_valences(*made))
    assert (found is None) == bound


def test_a_temporary_anion_comes_with_its_energy() -> None:
    made = g2("N2")
    found = unbound_because(made[0], -1, assign_valences(*made))
    assert found is not None
    assert found.attachment_ev == 2.3


@pytest.mark.parametrize(
    ("symbols", "hill", "written"),
    [
        (["O", "S", "O", "O", "O"], "O4S", "SO4"),
        (["H", "N", "H", "H"], "H3N", "NH3"),
        (["C", "H", "H", "H", "O", "H"], "CH4O", "CH4O"),
        (["H", "O", "H"], "H2O", "H2O"),
        (["O", "C", "O"], "CO2", "CO2"),
        (["H", "H", "H", "H", "Si"], "H4Si", "SiH4"),
    ],
)
def test_formulas(symbols: list[str], hill: str, written: str) -> None:
    numbers = structure([(symbol, 0.0, 0.0, 2.0 * i) for i, symbol in enumerate(symbols)])[0]
    assert hill_formula(numbers) == hill
    assert written_formula(numbers) == written
