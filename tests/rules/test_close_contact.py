"""close-contact. Each id states the distance over the sum of the covalent radii."""

import numpy as np
import pytest
from ase.build import molecule
from ase.collections import g2

from builders import geometry, job, run_rule
from checker.findings import Edit, Grade
from checker.geometry import Geometry
from rules.close_contact import RULE

WATER = [("O", 0.0, 0.0, 0.12), ("H", 0.0, 0.76, -0.48), ("H", 0.0, -0.76, -0.48)]


def pair(symbols: str, distance: float) -> Geometry:
    first, second = symbols.split()
    return geometry([(first, 0.0, 0.0, 0.0), (second, 0.0, 0.0, distance)])


@pytest.mark.parametrize(
    ("symbols", "distance", "grade"),
    [
        pytest.param("N N", 1.098, None, id="nitrogen-0.77"),
        pytest.param("N N", 0.92 * 1.098, None, id="nitrogen_compressed-0.71"),
        pytest.param("C O", 1.128, None, id="carbon_monoxide-0.79"),
        pytest.param("H H", 0.741, None, id="hydrogen-1.20"),
        pytest.param("Cr Cr", 1.68, None, id="chromium_dimer-0.60"),
        pytest.param("V V", 1.77, None, id="vanadium_dimer-0.58"),
        pytest.param("Cu H", 1.463, None, id="copper_hydride-0.90"),
        pytest.param("U O", 1.75, None, id="uranyl_bond-0.67"),
        pytest.param("Og Og", 3.0, None, id="no_radius_known-0.88"),
        pytest.param("O O", 0.60, Grade.DOUBT, id="oxygen-0.45"),
        pytest.param("H H", 0.45, Grade.DOUBT, id="hydrogen_pressed-0.73"),
        pytest.param("C H", 0.50, Grade.DOUBT, id="carbon_hydrogen-0.47"),
        pytest.param("H H", 0.0, Grade.HALT, id="one_point-0.00"),
        pytest.param("C H", 0.05, Grade.HALT, id="nearly_one_point-0.05"),
    ],
)
def test_speaks_below_any_bond(symbols: str, distance: float, grade: Grade | None) -> None:
    found = run_rule(RULE, job(pair(symbols, distance)))
    assert [f.grade for f in found] == [grade] * (grade is not None)


@pytest.mark.parametrize("scale", [1.0, 0.92, 0.85])
def test_is_silent_on_g2_and_on_g2_compressed(scale: float) -> None:
    for name in g2.names:
        system = g2[name]
        rows = [(s, *p) for s, p in zip(system.symbols, (scale * system.positions).tolist(), strict=True)]
        assert not run_rule(RULE, job(rows)), name


def test_an_atom_pasted_twice_is_taken_out_again() -> None:
    (finding,) = run_rule(RULE, job([*WATER, WATER[2]]))
    assert finding.message == "H 3 and H 4 stand on one point; remove one of them or correct its coordinates"
    assert finding.at == "species.atoms[3]"
    assert finding.repairs[0].edits == (Edit("species.atoms[3]", None),)


def test_a_molecule_pasted_twice_is_one_finding_and_leaves_from_the_end() -> None:
    (finding,) = run_rule(RULE, job([*WATER, *WATER]))
    assert finding.evidence["contacts"] == 3
    assert [edit.key for edit in finding.repairs[0].edits] == [f"species.atoms[{i}]" for i in (5, 4, 3)]


def test_unlike_atoms_on_one_point_are_not_removed() -> None:
    (finding,) = run_rule(RULE, job([*WATER, ("F", *WATER[0][1:])]))
    assert finding.grade is Grade.HALT
    assert finding.repairs == ()


def test_the_whole_molecule_too_small_is_left_to_length_unit() -> None:
    rows = [(s, *p) for s, p in zip("CHHHH", (0.529 * molecule("CH4").positions).tolist(), strict=True)]
    assert not run_rule(RULE, job(rows))


@pytest.mark.parametrize(
    ("z", "speaks"),
    [pytest.param(2.9, False, id="ghost_at_its_partner_site"), pytest.param(0.12, True, id="ghost_on_the_oxygen")],
)
def test_a_ghost_on_an_atom_is_doubted(z: float, speaks: bool) -> None:
    found = run_rule(RULE, job([*WATER, ("O", 0.0, 0.0, z)], species={"ghost_atoms": [4]}))
    assert [f.at for f in found] == ["species.atoms[3]"] * speaks
    assert [f.grade for f in found] == [Grade.DOUBT] * speaks


def test_a_ghost_close_to_an_atom_counts_for_no_contact() -> None:
    assert not run_rule(RULE, job([*WATER, ("He", 0.0, 0.0, 0.5)], species={"ghost_atoms": [4]}))


@pytest.mark.parametrize("n_atoms", [0, 1])
def test_fewer_than_two_atoms_have_no_contact(n_atoms: int) -> None:
    assert not run_rule(RULE, job([("H", 0.0, 0.0, 0.0)] * n_atoms))


def test_many_atoms_with_one_contact() -> None:
    grid = 2.0 * np.stack(np.meshgrid(*[np.arange(14.0)] * 3), axis=-1).reshape(-1, 3)
    rows = [("C", *p) for p in grid.tolist()]
    assert not run_rule(RULE, job(rows))
    (finding,) = run_rule(RULE, job([*rows, ("H", 0.0, 0.3, 0.0)]))
    assert finding.evidence["contacts"] == 1
    assert finding.at == f"species.atoms[{len(rows)}]"


def test_a_heap_of_atoms_on_one_point_is_one_finding() -> None:
    (finding,) = run_rule(RULE, job([("H", 0.0, 0.0, 0.0)] * 3000))
    assert finding.grade is Grade.HALT
    assert finding.repairs == ()
