"""Ranking of causes: named cases. What it does on all of G2 is measured in tests/outside/test_g2_parity.py."""

import numpy as np
import pytest
from ase.build import molecule
from shapes import Structure, joined, sodium_with_six_waters, star, without

from checker.chemistry.parity import Cause, Slip, rank_causes


def g2(name: str) -> Structure:
    atoms = molecule(name)
    return np.array(atoms.numbers), np.array(atoms.positions)


def brief(cause: Cause) -> tuple[Slip, int]:
    value = cause.multiplicity if cause.kind is Slip.MULTIPLICITY else cause.charge
    return cause.kind, cause.atoms[0] if cause.atoms else value or 0


@pytest.mark.parametrize(
    ("made", "charge", "multiplicity", "first"),
    [
        pytest.param(g2("H2O"), +1, 1, (Slip.CHARGE, 0), id="water-charge_slipped"),
        pytest.param(g2("H2O"), 0, 2, (Slip.MULTIPLICITY, 1), id="water-multiplicity_slipped"),
        pytest.param(g2("O2"), 0, 2, (Slip.MULTIPLICITY, 3), id="oxygen-is_a_triplet"),
        pytest.param(g2("C"), 0, 2, (Slip.MULTIPLICITY, 3), id="carbon_atom-is_a_triplet"),
        pytest.param(g2("CH3"), +1, 2, (Slip.CHARGE, 0), id="methyl_doublet-is_neutral"),
        pytest.param(star("N", "H", "tetrahedron", 1.02), 0, 1, (Slip.CHARGE, +1), id="ammonium-is_a_cation"),
        pytest.param(star("O", "H", "pyramid", 0.98), 0, 1, (Slip.CHARGE, +1), id="hydronium-is_a_cation"),
        pytest.param(star("N", "O", "trigonal", 1.25), 0, 1, (Slip.CHARGE, -1), id="nitrate-is_an_anion"),
        pytest.param(sodium_with_six_waters(), 0, 1, (Slip.CHARGE, +1), id="aqua_ion-is_a_cation"),
        pytest.param(without(g2("CH4"), 4), 0, 1, (Slip.HYDROGEN_MISSING, 0), id="methane_less_a_hydrogen"),
        pytest.param(without(g2("C6H6"), 9), 0, 1, (Slip.HYDROGEN_MISSING, 3), id="benzene_less_a_hydrogen"),
        pytest.param(without(g2("CH3OH"), 3), 0, 1, (Slip.HYDROGEN_MISSING, 1), id="methanol_less_its_OH"),
        pytest.param(star("C", "H", "bipyramid", 1.10), 0, 1, (Slip.HYDROGEN_SURPLUS, 1), id="CH5-one_too_many"),
    ],
)
def test_the_likeliest_cause(made: Structure, charge: int, multiplicity: int, first: tuple[Slip, int]) -> None:
    causes = rank_causes(*made, charge, multiplicity)
    assert brief(causes[0])[0] is first[0]
    if first[0] is not Slip.HYDROGEN_SURPLUS:
        assert brief(causes[0]) == first


def test_f_electrons_inside_the_core_were_counted() -> None:
    """Gadolinium(III) with 53 electrons replaced: 4f7 is in the core, a singlet is left to count, no octet."""
    gadolinium = np.array([64]), np.zeros((1, 3))
    causes = rank_causes(*gadolinium, 3, 8, replaced={64: 53}, unpaired_in_core=7)
    assert brief(causes[0]) == (Slip.MULTIPLICITY, 1)
    assert causes[0].reason == "7 of the unpaired electrons are f electrons in the core potential"


def test_weights_fall_and_add_up_to_one() -> None:
    weights = [cause.weight for cause in rank_causes(*g2("CH3OH"), 1, 1)]
    assert weights == sorted(weights, reverse=True)
    assert sum(weights) == pytest.approx(1.0)


def test_where_parity_holds_there_is_no_cause() -> None:
    assert rank_causes(*g2("H2O"), 0, 1) == ()
    assert rank_causes(*g2("H2O"), 1, 2) == ()


def test_a_lost_hydrogen_comes_with_its_place_and_a_plain_reason() -> None:
    made = without(g2("CH4"), 4)
    cause = rank_causes(*made, 0, 1)[0]
    assert cause.position is not None
    assert np.linalg.norm(np.array(cause.position) - molecule("CH4").positions[4]) < 0.1
    assert cause.reason == "carbon 1 has three neighbours in a pyramid, with room for a hydrogen"


def test_reasons_of_charge_and_multiplicity() -> None:
    reasons = {brief(cause): cause.reason for cause in rank_causes(*without(g2("CH3OH"), 3), 0, 1)}
    assert reasons[Slip.CHARGE, -1] == "closed valences give charge -1"
    assert reasons[Slip.MULTIPLICITY, 2] == "oxygen 2 has an open valence, one unpaired electron"


@pytest.mark.parametrize("offset", [0.0, 0.02, 0.05, 0.25])
def test_an_atom_pasted_twice_is_found(offset: float) -> None:
    numbers, places = g2("HCF3")
    fluorine = int(np.flatnonzero(numbers == 9)[0])
    doubled = np.vstack([places, places[fluorine] + [offset, 0.0, 0.0]])
    cause = rank_causes(np.append(numbers, 9), doubled, 0, 1)[0]
    assert (cause.kind, cause.atoms) == (Slip.ATOM_DOUBLED, (len(numbers),))
    assert cause.weight > 0.9


def test_copies_that_leave_the_parity_alone_are_not_blamed() -> None:
    numbers, places = g2("CH3OH")
    oxygen = int(np.flatnonzero(numbers == 8)[0])
    causes = rank_causes(np.append(numbers, 8), np.vstack([places, places[oxygen]]), 1, 1)
    assert brief(causes[0]) == (Slip.CHARGE, 0)
    assert Slip.ATOM_DOUBLED not in {cause.kind for cause in causes}


def test_a_core_that_no_potential_has_is_suspected() -> None:
    made = star("I", "H", "linear", 1.61)
    one = without(made, 2)
    causes = rank_causes(*one, 0, 1, replaced={53: 27}, published={53: (28, 46)})
    assert causes[0].kind is Slip.CORE_POTENTIAL
    assert causes[0].core_electrons == (53, 28)


def test_a_published_core_is_not_suspected() -> None:
    one = without(star("I", "H", "linear", 1.61), 2)
    causes = rank_causes(*one, 1, 1, replaced={53: 28}, published={53: (28, 46)})
    assert brief(causes[0]) == (Slip.CHARGE, 0)


def test_an_extra_lone_hydrogen_is_surplus() -> None:
    numbers, places = joined(g2("CH4"), (np.array([1]), np.zeros((1, 3))))
    causes = rank_causes(numbers, places, 0, 1)
    surplus = [cause for cause in causes if cause.kind is Slip.HYDROGEN_SURPLUS]
    assert surplus[0].atoms == (5,)
    assert surplus[0].reason == "hydrogen 6 is bonded to nothing"


def test_atoms_are_named_by_the_numbers_given() -> None:
    made = without(g2("CH4"), 4)
    cause = rank_causes(*made, 0, 1, numbering=np.array([11, 12, 13, 14]))[0]
    assert cause.atoms == (0,)
    assert cause.reason.startswith("carbon 11 ")


def test_the_ranking_does_not_depend_on_orientation() -> None:
    numbers, places = without(g2("CH3CH2OH"), 8)
    turn, _ = np.linalg.qr(np.random.default_rng(2).normal(size=(3, 3)))
    before = [brief(cause) for cause in rank_causes(numbers, places, 0, 1)]
    assert before == [brief(cause) for cause in rank_causes(numbers, places @ turn, 0, 1)]


def test_a_complex_of_iron_still_gets_multiplicity_and_charge() -> None:
    kinds = {cause.kind for cause in rank_causes(*star("Fe", "Cl", "tetrahedron", 2.2), -1, 5)}
    assert kinds == {Slip.MULTIPLICITY, Slip.CHARGE}
