"""Implied charges and open valences of species whose charge every chemist knows (common practice, no source)."""

from collections import Counter

import numpy as np
import pytest
from ase.build import molecule
from shapes import Structure, joined, sodium_with_six_waters, star, structure

from checker.chemistry.sites import Kind
from checker.chemistry.valence import Valence, assign_valences

IONS = [
    pytest.param(star("N", "H", "tetrahedron", 1.02), +1, id="NH4+"),
    pytest.param(star("P", "H", "tetrahedron", 1.40), +1, id="PH4+"),
    pytest.param(star("O", "H", "pyramid", 0.98), +1, id="H3O+"),
    pytest.param(star("S", "H", "pyramid", 1.35), +1, id="H3S+"),
    pytest.param(star("N", "F", "tetrahedron", 1.31), +1, id="NF4+"),
    pytest.param(star("P", "Cl", "tetrahedron", 1.95), +1, id="PCl4+"),
    pytest.param(star("P", "F", "seesaw", 1.68), -1, id="PF4-"),
    pytest.param(star("N", "O", "trigonal", 1.25), -1, id="NO3-"),
    pytest.param(star("N", "O", "bent", 1.25), -1, id="NO2-"),
    pytest.param(star("N", "N", "linear", 1.18), -1, id="N3-"),
    pytest.param(star("C", "O", "trigonal", 1.29), -2, id="CO3_2-"),
    pytest.param(star("C", "O", "linear", 1.16), 0, id="CO2"),
    pytest.param(star("S", "O", "tetrahedron", 1.49), -2, id="SO4_2-"),
    pytest.param(star("S", "O", "pyramid", 1.53), -2, id="SO3_2-"),
    pytest.param(star("S", "O", "trigonal", 1.42), 0, id="SO3"),
    pytest.param(star("S", "O", "bent", 1.43), 0, id="SO2"),
    pytest.param(star("O", "O", "bent", 1.27), 0, id="O3"),
    pytest.param(star("S", "S", "bent", 1.92), 0, id="S3"),
    pytest.param(star("S", "S", "bent", 2.06), -2, id="S3_2-"),
    pytest.param(star("P", "O", "tetrahedron", 1.54), -3, id="PO4_3-"),
    pytest.param(star("P", "O", "trigonal", 1.48), -1, id="PO3-"),
    pytest.param(star("Cl", "O", "tetrahedron", 1.45), -1, id="ClO4-"),
    pytest.param(star("Cl", "O", "pyramid", 1.48), -1, id="ClO3-"),
    pytest.param(star("Si", "O", "tetrahedron", 1.63), -4, id="SiO4_4-"),
    pytest.param(star("B", "O", "trigonal", 1.38), -3, id="BO3_3-"),
    pytest.param(star("B", "F", "tetrahedron", 1.40), -1, id="BF4-"),
    pytest.param(star("B", "H", "tetrahedron", 1.24), -1, id="BH4-"),
    pytest.param(star("Al", "H", "tetrahedron", 1.64), -1, id="AlH4-"),
    pytest.param(star("Al", "F", "octahedron", 1.80), -3, id="AlF6_3-"),
    pytest.param(star("Si", "F", "octahedron", 1.69), -2, id="SiF6_2-"),
    pytest.param(star("Si", "F", "bipyramid", 1.63), -1, id="SiF5-"),
    pytest.param(star("P", "F", "octahedron", 1.60), -1, id="PF6-"),
    pytest.param(star("P", "F", "bipyramid", 1.57), 0, id="PF5"),
    pytest.param(star("S", "F", "octahedron", 1.56), 0, id="SF6"),
    pytest.param(star("S", "F", "seesaw", 1.60), 0, id="SF4"),
    pytest.param(star("Xe", "F", "square", 1.95), 0, id="XeF4"),
    pytest.param(star("Xe", "F", "linear", 1.98), 0, id="XeF2"),
    pytest.param(star("I", "I", "linear", 2.92), -1, id="I3-"),
    pytest.param(star("Zn", "Cl", "tetrahedron", 2.30), -2, id="ZnCl4_2-"),
    pytest.param(star("Hg", "Cl", "linear", 2.30), 0, id="HgCl2"),
    pytest.param(sodium_with_six_waters(), +1, id="Na(H2O)6+"),
]

AMBIGUOUS = [
    pytest.param(star("C", "H", "trigonal", 1.09), "carbon 1 could be a cation, an anion or a radical", id="CH3"),
    pytest.param(star("N", "O", "linear", 1.15), "oxygen 3 could be a cation", id="NO2-linear"),
    pytest.param(star("Cr", "O", "tetrahedron", 1.65), "chromium 1 has no charge of its own", id="CrO4_2-"),
    pytest.param(star("Sb", "Cl", "octahedron", 2.65), "antimony 1 has no charge of its own", id="SbCl6-or-3-"),
    pytest.param(star("Sn", "Cl", "octahedron", 2.42), "tin 1 has no charge of its own", id="SnCl6"),
    pytest.param(structure([("Be", 0, 0, 0), ("H", 0, 0, 1.33)]), "beryllium 1 has fewer anions", id="BeH"),
    pytest.param(structure([("Na", 0, 0, 0), ("Na", 0, 0, 3.08)]), "sodium 1 has no charge", id="Na2"),
    pytest.param(structure([("O", 0, 0, 0), ("O", 0, 0, 1.50)]), "too long for the double bond", id="peroxide"),
    pytest.param(structure([("C", 0, 0, 0), ("C", 0, 0, 1.25)]), "carbon 1 has no charge of its own", id="C2"),
]


def of(made: Structure) -> Valence:
    return assign_valences(*made)


@pytest.mark.parametrize(("made", "charge"), IONS)
def test_bonding_implies_the_known_charge(made: Structure, charge: int) -> None:
    valence = of(made)
    assert valence.implied_charge == charge, valence.because
    assert int(valence.formal_charges.sum()) == charge


@pytest.mark.parametrize(("made", "because"), AMBIGUOUS)
def test_what_is_ambiguous_says_so(made: Structure, because: str) -> None:
    valence = of(made)
    assert valence.implied_charge is None
    assert because in valence.because


@pytest.mark.parametrize(
    ("name", "kinds"),
    [
        pytest.param("CH4", [], id="methane"),
        pytest.param("C6H6", [], id="benzene"),
        pytest.param("CH3NO2", [Kind.FIXED, Kind.ANION], id="nitromethane-zwitterion"),
        pytest.param("CO", [Kind.ANION, Kind.FIXED], id="carbon_monoxide"),
        pytest.param("N2O", [Kind.FIXED, Kind.ANION], id="nitrous_oxide"),
        pytest.param("CH3", [Kind.FLEXIBLE], id="methyl"),
        pytest.param("CH3O", [Kind.ANION], id="methoxy"),
        pytest.param("NO2", [Kind.ANION], id="nitrogen_dioxide"),
        pytest.param("CN", [Kind.ANION], id="cyanide_or_cyano"),
        pytest.param("CH2_s1A1d", [Kind.CARBENE], id="methylene"),
        pytest.param("NH", [Kind.CARBENE], id="imidogen"),
        pytest.param("CH", [Kind.FLEXIBLE, Kind.CARBENE], id="methylidyne"),
        pytest.param("SiO", [Kind.ANION, Kind.FIXED], id="silicon_monoxide"),
    ],
)
def test_the_sites_of_g2_molecules(name: str, kinds: list[Kind]) -> None:
    atoms = molecule(name)
    valence = assign_valences(atoms.numbers, atoms.positions)
    assert Counter(site.kind for site in valence.sites) == Counter(kinds)


def test_an_acetate_and_a_zwitterion() -> None:
    """Glycine as it is in water: NH3+ CH2 COO-."""
    acetate = [("C", 0.0, 0.0, 0.0), ("O", 1.08, 0.66, 0.0), ("O", -1.08, 0.66, 0.0), ("C", 0.0, -1.53, 0.0)]
    hydrogens = [("H", 1.03, -1.90, 0.0), ("H", -0.51, -1.90, 0.89)]
    methyl = [*acetate, *hydrogens, ("H", -0.51, -1.90, -0.89)]
    assert of(structure(methyl)).implied_charge == -1
    amine = [("N", -0.70, -2.02, -1.21), ("H", -0.37, -2.97, -1.40), ("H", -0.45, -1.43, -2.01)]
    glycine = of(structure([*acetate, *hydrogens, *amine, ("H", -1.72, -2.03, -1.10)]))
    assert glycine.implied_charge == 0
    assert sorted(glycine.formal_charges[glycine.formal_charges != 0].tolist()) == [-1, 1]


def test_a_guanidinium_ion_is_a_cation() -> None:
    rows = [("C", 0.0, 0.0, 0.0)]
    for angle in np.radians([90.0, 210.0, 330.0]):
        out, across = np.array([np.cos(angle), np.sin(angle)]), np.array([-np.sin(angle), np.cos(angle)])
        rows.append(("N", *(1.33 * out).tolist(), 0.0))
        rows += [("H", *(1.83 * out + side * 0.87 * across).tolist(), 0.0) for side in (1, -1)]
    valence = of(structure(rows))
    assert valence.implied_charge == 1
    assert [site.kind for site in valence.sites] == [Kind.CATION]


@pytest.mark.parametrize(
    ("ring", "on", "symbol", "length", "charge"),
    [
        pytest.param("C5H5N", 7, "O", 1.30, 0, id="pyridine_N-oxide"),
        pytest.param("C5H5N", 7, "H", 1.01, +1, id="pyridinium"),
        pytest.param("C6H6", 6, "O", 1.27, -1, id="phenoxide"),
        pytest.param("C4H4NH", 7, None, 0.0, -1, id="pyrrolide"),
    ],
)
def test_charges_delocalised_over_a_ring(
    ring: str, on: int, symbol: str | None, length: float, charge: int
) -> None:
    """One atom of a ring gets a substituent, in place of its hydrogen if it has one."""
    atoms = molecule(ring)
    numbers, places = np.array(atoms.numbers), np.array(atoms.positions)
    host = int(np.flatnonzero(numbers == on)[0])
    outward = places[host] - places[numbers != 1].mean(axis=0)
    near = np.linalg.norm(places - places[host], axis=1) < 1.2
    kept = ~(near & (numbers == 1))
    made = (numbers[kept], places[kept])
    if symbol is not None:
        (extra,), _ = structure([(symbol, 0.0, 0.0, 0.0)])
        site = places[host] + length * outward / np.linalg.norm(outward)
        made = (np.append(made[0], extra), np.vstack([made[1], site]))
    assert of(made).implied_charge == charge


def test_a_nitroxide_and_a_diazonium_ion_are_left_open() -> None:
    """R2N-O is radical, cation or anion; N2H+ on a line is a cation, bent it is the anion or radical."""
    nitroxide = [("N", 0.0, 0.0, 0.0), ("O", 1.28, 0.0, 0.0), ("H", -0.5, 0.87, 0.0), ("H", -0.5, -0.87, 0.0)]
    assert of(structure(nitroxide)).implied_charge is None
    on_a_line = [("N", 0.0, 0.0, 0.0), ("N", 0.0, 0.0, 1.09), ("H", 0.0, 0.0, -1.03)]
    assert of(structure(on_a_line)).implied_charge is None
    bent = [("N", 0.0, 0.0, 0.0), ("N", 0.0, 0.0, 1.19), ("H", 0.0, 0.93, -0.46)]
    assert of(structure(bent)).implied_charge == -1


def test_ions_side_by_side_add_up() -> None:
    salt = joined(star("N", "H", "tetrahedron", 1.02), star("S", "O", "tetrahedron", 1.49))
    assert of(salt).implied_charge == -1


def test_open_valences_are_counted_at_the_atom() -> None:
    atoms = molecule("C2H3")
    open_valences = assign_valences(atoms.numbers, atoms.positions).open_valences
    (open_atom,) = np.flatnonzero(open_valences)
    assert atoms.numbers[open_atom] == 6
    assert open_valences[open_atom] == 1


def test_five_neighbours_of_carbon_are_beyond_its_valence() -> None:
    valence = of(star("C", "H", "bipyramid", 1.10))
    assert valence.open_valences[0] == -1
    assert "more neighbours than a usual structure" in valence.because


def test_atoms_are_named_by_the_numbers_given() -> None:
    valence = assign_valences(*star("C", "H", "trigonal", 1.09), numbering=np.array([7, 8, 9, 10]))
    assert valence.because.startswith("carbon 7 ")


def test_the_outcome_does_not_depend_on_orientation_or_order() -> None:
    atoms = molecule("CH3NO2")
    random = np.random.default_rng(5)
    for _ in range(10):
        order = random.permutation(len(atoms))
        turn, _ = np.linalg.qr(random.normal(size=(3, 3)))
        assert assign_valences(atoms.numbers[order], atoms.positions[order] @ turn).implied_charge == 0


def test_a_metal_of_variable_charge_is_told() -> None:
    assert of(star("Fe", "Cl", "tetrahedron", 2.2)).holds_metal_of_variable_charge
    assert not of(star("Zn", "Cl", "tetrahedron", 2.3)).holds_metal_of_variable_charge


def test_thousands_of_molecules_take_no_longer_than_they_are_many() -> None:
    water = molecule("H2O")
    cells = np.stack(np.meshgrid(*[np.arange(20)] * 3), -1).reshape(-1, 1, 3) * 3.1
    places = (cells + water.positions).reshape(-1, 3)
    valence = assign_valences(np.tile(water.numbers, len(cells)), places)
    assert valence.implied_charge == 0
    assert not valence.sites
