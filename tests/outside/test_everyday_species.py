"""No false alarm on species that are computed every day, at their own charge and multiplicity, under all rules.

S22: P. Jurecka et al., Phys. Chem. Chem. Phys. 8, 1985 (2006), as ASE ships it. The other geometries are rounded
common values (no source). Charges and multiplicities are common knowledge, those of diatomics after K. P. Huber,
G. Herzberg, Constants of Diatomic Molecules (1979) (from memory).
"""

import numpy as np
import pytest
from ase.collections import g2, s22
from shapes import DIRECTIONS, Structure, joined, rows, sodium_with_six_waters, star, structure

from builders import job, report
from checker.findings import Verdict
from rules import ALL_RULES


def row(symbols: str, *bonds: float) -> Structure:
    """Atoms in a line, with the bond lengths in angstrom between them."""
    places = np.concatenate([[0.0], np.cumsum(bonds)])
    return structure([(symbol, 0.0, 0.0, z) for symbol, z in zip(symbols.split(), places.tolist(), strict=True)])


def shells(centre: str, shape: str, **radii: float) -> Structure:
    """Put two-atomic ligands round a centre, their atoms at the radii given."""
    ligands = [(s, *(r * np.array(d) / np.linalg.norm(d))) for s, r in radii.items()
               for d in DIRECTIONS[shape]]  # fmt: skip
    return structure([(centre, 0.0, 0.0, 0.0), *ligands])


def bridged(element: str, half: float, bridge: tuple[str, float], ends: tuple[str, float, float]) -> Structure:
    """Two centres under two bridges, as in diborane."""
    atoms = [(element, 0.0, s * half, 0.0) for s in (1, -1)] + [
        (bridge[0], s * bridge[1], 0.0, 0.0) for s in (1, -1)
    ]
    return structure([*atoms, *((ends[0], 0.0, s * ends[1], t * ends[2]) for s in (1, -1) for t in (1, -1))])


SPECIES: dict[str, tuple[Structure, int, int]] = {
    "diborane": (bridged("B", 0.88, ("H", 0.97), ("H", 1.46, 1.04)), 0, 1),
    "dialane": (bridged("Al", 1.30, ("H", 1.14), ("H", 1.96, 1.42)), 0, 1),
    "aluminium_chloride_dimer": (bridged("Al", 1.60, ("Cl", 1.62), ("Cl", 2.60, 1.80)), 0, 1),
    "tetrafluoroborate": (star("B", "F", "tetrahedron", 1.40), -1, 1),
    "perchlorate": (star("Cl", "O", "tetrahedron", 1.45), -1, 1),
    "permanganate": (star("Mn", "O", "tetrahedron", 1.63), -1, 1),
    "hexafluorophosphate": (star("P", "F", "octahedron", 1.60), -1, 1),
    "sulfur_hexafluoride": (star("S", "F", "octahedron", 1.56), 0, 1),
    "xenon_tetrafluoride": (star("Xe", "F", "square", 1.95), 0, 1),
    "uranium_hexafluoride": (star("U", "F", "octahedron", 2.00), 0, 1),
    "uranyl": (row("O U O", 1.70, 1.70), 2, 1),
    "triiodide": (row("I I I", 2.92, 2.92), -1, 1),
    "bifluoride": (row("F H F", 1.15, 1.15), -1, 1),
    "azide": (row("N N N", 1.18, 1.18), -1, 1),
    "nitronium": (row("O N O", 1.12, 1.12), 1, 1),
    "nitrosonium": (row("N O", 1.063), 1, 1),
    "formyl_cation": (row("H C O", 1.10, 1.11), 1, 1),
    "superoxide": (row("O O", 1.35), -1, 2),
    "dicarbon": (row("C C", 1.243), 0, 1),
    "dicarbon_anion": (row("C C", 1.268), -1, 2),
    "diboron": (row("B B", 1.59), 0, 3),
    "tricarbon": (row("C C C", 1.28, 1.28), 0, 1),
    "hydroxyl_cation": (row("O H", 1.03), 1, 3),
    "imidogen": (row("N H", 1.04), 0, 3),
    "dihydrogen_cation": (row("H H", 1.06), 1, 2),
    "hydrogen_exchange_saddle": (row("H H H", 0.93, 0.93), 0, 2),
    "chloride_exchange_saddle": (
        structure([(s, *xyz) for s, xyz in zip(
            "C H H H Cl Cl".split(),
            [(0.0, 0.0, 0.0), (1.07, 0.0, 0.0), (-0.535, 0.927, 0.0), (-0.535, -0.927, 0.0), (0.0, 0.0, 2.32),
             (0.0, 0.0, -2.32)], strict=True)]), -1, 1),
    "sodium_chloride": (row("Na Cl", 2.36), 0, 1),
    "magnesium_oxide": (row("Mg O", 1.75), 0, 1),
    "six_waters_round_sodium": (sodium_with_six_waters(), 1, 1),
    "nickel_carbonyl": (shells("Ni", "tetrahedron", C=1.84, O=2.98), 0, 1),
    "ferricyanide": (shells("Fe", "octahedron", C=1.92, N=3.08), -3, 2),
    "chromium_dimer": (row("Cr Cr", 1.68), 0, 1),
    "mercury_dication": (row("Hg Hg", 2.52), 2, 1),
}  # fmt: skip


def doubts(made: Structure, charge: int, multiplicity: int, **tables: dict[str, str]) -> list[str]:
    judged = report(job(rows(made), charge=charge, multiplicity=multiplicity, **tables), *ALL_RULES)
    return [] if judged.verdict is Verdict.CLEAR else [placed.finding.message for placed in judged.findings]


@pytest.mark.parametrize("name", SPECIES)
def test_a_common_state_is_clear(name: str) -> None:
    assert doubts(*SPECIES[name]) == []


@pytest.mark.parametrize("name", s22.names)
def test_a_complex_of_two_molecules_is_clear(name: str) -> None:
    assert doubts((np.array(s22[name].numbers), np.array(s22[name].positions)), 0, 1) == []


@pytest.mark.parametrize("name", ["CH3", "C2H3", "OH", "NH2", "HCO", "NO2", "SiH3", "CH3CO", "CCH"])
@pytest.mark.parametrize(("charge", "multiplicity"), [(1, 1), (1, 3), (0, 4)])
def test_a_vertical_state_of_a_radical_is_clear(name: str, charge: int, multiplicity: int) -> None:
    atoms = g2[name]
    radical = (np.array(atoms.numbers), np.array(atoms.positions))
    assert doubts(radical, charge, multiplicity, treatment={"intent": "vertical"}) == []


def test_a_slip_in_one_of_two_species_side_by_side_is_still_seen() -> None:
    diborane, _, _ = SPECIES["diborane"]
    hexafluoride, _, _ = SPECIES["hexafluorophosphate"]
    assert doubts(joined(diborane, hexafluoride), -1, 1) == []
    assert doubts(joined(diborane, hexafluoride), 1, 1) != []
