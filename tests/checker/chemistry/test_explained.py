"""What charge and multiplicity account for, and what they do not."""

import numpy as np
import pytest
from ase.build import molecule
from shapes import Structure, joined, sodium_with_six_waters, star, structure, without

from checker.chemistry.explained import beyond_valence, charge_mismatch, unexplained_sites
from checker.chemistry.valence import Valence, assign_valences


def g2(name: str) -> Structure:
    atoms = molecule(name)
    return np.array(atoms.numbers), np.array(atoms.positions)


def of(made: Structure) -> Valence:
    return assign_valences(*made)


def chain(symbols: str, apart: float) -> Structure:
    return structure([(symbol, 0.0, 0.0, i * apart) for i, symbol in enumerate(symbols)])


CUT_METHANE = without(g2("CH4"), 4)
ETHANE_LESS_TWO = without(g2("C2H6"), 2, 5)
"""One hydrogen gone from each carbon, the carbon-carbon bond still single."""


@pytest.mark.parametrize(
    ("made", "charge", "multiplicity", "explained"),
    [
        pytest.param(g2("CH3"), 0, 2, True, id="methyl_radical"),
        pytest.param(g2("CH3"), +1, 1, True, id="methyl_cation"),
        pytest.param(g2("CH3"), -1, 1, True, id="methyl_anion"),
        pytest.param(g2("CH2_s1A1d"), 0, 1, True, id="carbene_singlet"),
        pytest.param(g2("CH2_s1A1d"), 0, 3, True, id="carbene_triplet"),
        pytest.param(g2("CH3O"), 0, 2, True, id="methoxy"),
        pytest.param(g2("CH3O"), -1, 1, True, id="methoxide"),
        pytest.param(joined(g2("CH3"), g2("CH3")), 0, 3, True, id="two_methyls_triplet"),
        pytest.param(joined(CUT_METHANE, CUT_METHANE), 0, 1, False, id="two_cut_methanes_singlet"),
        pytest.param(joined(CUT_METHANE, CUT_METHANE), 0, 3, True, id="two_cut_methanes_triplet"),
        pytest.param(joined(CUT_METHANE, g2("NH2")), 0, 1, False, id="two_hydrogens_lost_apart"),
        pytest.param(ETHANE_LESS_TWO, 0, 1, False, id="ethane_less_two_hydrogens"),
        pytest.param(joined(CUT_METHANE, CUT_METHANE), 0, 5, True, id="two_cut_methanes_quintet-excited"),
        pytest.param(g2("C2H3"), 0, 4, True, id="vinyl_quartet-excited"),
        pytest.param(g2("C2H4"), 0, 1, True, id="ethene"),
        pytest.param(chain("HHH", 0.93), 0, 2, True, id="hydrogen_exchange-saddle"),
        pytest.param(chain("FF", 1.7), 0, 1, True, id="fluorine-partly_broken"),
        pytest.param(chain("FF", 2.4), 0, 1, False, id="fluorine-broken"),
        pytest.param(chain("CC", 1.243), 0, 1, True, id="dicarbon"),
        pytest.param(chain("CCC", 1.28), 0, 1, True, id="tricarbon"),
        pytest.param(star("Fe", "Cl", "tetrahedron", 2.2), 0, 1, True, id="metal-not_judged"),
    ],
)
def test_open_valences_and_the_states_that_explain_them(
    made: Structure, charge: int, multiplicity: int, explained: bool
) -> None:
    assert (unexplained_sites(of(made), charge, multiplicity) is None) == explained


def test_the_ends_of_a_stripped_bond_are_named() -> None:
    found = unexplained_sites(of(ETHANE_LESS_TWO), 0, 1)
    assert found is not None
    assert found.atoms == (0, 1)
    assert "is a single bond" in found.why


def test_a_twisted_ethene_is_no_stripped_ethane() -> None:
    """Half-way round, C-C 1.47 angstrom: its carbons are planar."""
    half = [[0.0, 0.0, 0.735], [0.93, 0.0, 1.29], [-0.93, 0.0, 1.29]]
    other = [[0.0, 0.0, -0.735], [0.0, 0.93, -1.29], [0.0, -0.93, -1.29]]
    assert unexplained_sites(of((np.array([6, 1, 1, 6, 1, 1]), np.array(half + other))), 0, 1) is None


def test_a_fifth_neighbour_is_beyond_the_valence_unless_the_charge_says_so() -> None:
    methonium = of(star("C", "H", "bipyramid", 1.10))
    assert beyond_valence(methonium, +1) is None
    found = beyond_valence(methonium, 0)
    assert found is not None
    assert found.atoms == (0,)


@pytest.mark.parametrize(
    ("made", "charge", "implied"),
    [
        pytest.param(star("N", "O", "trigonal", 1.25), +1, -1, id="nitrate_as_cation"),
        pytest.param(star("N", "O", "trigonal", 1.25), -1, None, id="nitrate"),
        pytest.param(star("N", "O", "trigonal", 1.25), 0, None, id="nitrate_radical"),
        pytest.param(sodium_with_six_waters(), 0, +1, id="aqua_ion_as_neutral"),
        pytest.param(sodium_with_six_waters(), +1, None, id="aqua_ion"),
        pytest.param(star("N", "H", "tetrahedron", 1.02), 0, +1, id="ammonium_as_neutral"),
        pytest.param(g2("H2O"), +1, None, id="ionised_water"),
        pytest.param(g2("H2O"), +2, 0, id="water_twice_ionised"),
        pytest.param(g2("H2O"), -1, None, id="attached_water-another_rule_speaks"),
        pytest.param(g2("C6H6"), -2, 0, id="benzene_dianion"),
        pytest.param(star("S", "O", "tetrahedron", 1.49), 0, -2, id="sulfate_as_neutral"),
        pytest.param(star("S", "O", "tetrahedron", 1.49), -1, None, id="sulfate_radical_anion"),
        pytest.param(g2("OH"), +1, -1, id="hydroxyl_cation_as_singlet"),
        pytest.param(chain("FF", 1.9), 0, None, id="fluorine_drawn_out"),
        pytest.param(chain("FF", 2.8), 0, -2, id="two_fluorines_apart"),
    ],
)
def test_the_charge_that_bonds_imply(made: Structure, charge: int, implied: int | None) -> None:
    found = charge_mismatch(of(made), charge)
    assert (found.implied if found else None) == implied


@pytest.mark.parametrize("name", ["OH", "SH", "NH2", "CH3O"])
def test_a_radical_with_lone_pairs_ionises_to_a_triplet(name: str) -> None:
    """K. P. Huber, G. Herzberg, Constants of Diatomic Molecules (1979): OH+ and SH+ are 3Sigma- (from memory)."""
    assert charge_mismatch(of(g2(name)), +1, 3) is None
    assert charge_mismatch(of(g2(name)), +1, 1) is not None
    assert charge_mismatch(of(g2(name)), +1, 1, vertical=True) is None


def test_nitrate_is_no_sextet() -> None:
    assert charge_mismatch(of(star("N", "O", "trigonal", 1.25)), +1, 3) is not None


def test_an_extended_pi_system_may_hold_two_charges() -> None:
    assert charge_mismatch(of(g2("C60")), -2) is None
