"""electron-count. Each id states N."""

import pytest
from ase.collections import g2

from builders import job, run_rule
from checker.errors import NotDerivable
from checker.findings import Edit, Grade
from rules.electron_count import RULE

HALT, DOUBT, NOTE = Grade.HALT, Grade.DOUBT, Grade.NOTE
WATER = [("O", 0.0, 0.0, 0.12), ("H", 0.0, 0.76, -0.48), ("H", 0.0, -0.76, -0.48)]


@pytest.mark.parametrize(
    ("atoms", "charge", "grade"),
    [
        pytest.param("O H H", 0, None, id="water-N10"),
        pytest.param("O H H", -2, None, id="water_dianion-N12_is_for_unbound_electrons"),
        pytest.param("H", 1, None, id="proton-N0"),
        pytest.param("D", 1, None, id="deuteron-N0"),
        pytest.param("Fe", 25, None, id="iron_with_one_electron-N1"),
        pytest.param("U", 10, None, id="uranium_ion-N82"),
        pytest.param("O O", 4, None, id="two_charges_an_atom-N12"),
        pytest.param("H", -1, None, id="hydride-N2"),
        pytest.param("He", 2, NOTE, id="alpha_particle-N0"),
        pytest.param("H H", 2, NOTE, id="two_protons-N0"),
        pytest.param("O H H", 12, HALT, id="water-N_minus_2"),
        pytest.param("O H H", 9_000_000_000_000_000_000, HALT, id="water-absurd_cation"),
        pytest.param("O H H", -9_000_000_000_000_000_000, HALT, id="water-absurd_anion"),
        pytest.param("H", -2, HALT, id="hydride_dianion-N3_Lieb"),
        pytest.param("O H H", -13, HALT, id="water-N23_Lieb"),
        pytest.param("O O", 5, DOUBT, id="oxygen_stripped-N11"),
        pytest.param("O H H", 10, DOUBT, id="water_without_electrons-N0"),
    ],
)
def test_counts_that_can_be_and_that_cannot(atoms: str, charge: int, grade: Grade | None) -> None:
    found = run_rule(RULE, job(atoms, charge))
    assert [f.grade or RULE.grade for f in found] == [grade] * (grade is not None)
    assert all(f.at == "species.charge" for f in found)


def test_the_bound_on_anions_only_halts_in_free_space() -> None:
    (finding,) = run_rule(RULE, job("H", -2, species={"environment": "crystal"}))
    assert finding.grade is DOUBT


def test_says_how_many_there_are() -> None:
    (finding,) = run_rule(RULE, job("O H H", 12))
    assert finding.message == "charge +12 removes more electrons than the 10 there are; lower the charge"
    assert finding.repairs[0].edits == (Edit("species.charge", 0),)


def test_cores_larger_than_the_atom() -> None:
    (finding,) = run_rule(RULE, job("I", -1, 1, core_potential={"replaced": {"I": 60}}))
    assert finding.at == "core_potential"
    assert finding.message == "core potentials replace 60 electrons, and the neutral atoms have 53"


def test_unknown_books_are_not_judged() -> None:
    with pytest.raises(NotDerivable):
        run_rule(RULE, job("I", 99, core_potential={"name": "of-our-own"}))


def salt(charge: int, multiplicity: int | None, ghost: int) -> list[Grade | None]:
    rows = [("Na", 0.0, 0.0, 0.0), ("Cl", 0.0, 0.0, 2.36)]
    return [f.grade for f in run_rule(RULE, job(rows, charge, multiplicity, species={"ghost_atoms": [ghost]}))]


@pytest.mark.parametrize(
    ("charge", "multiplicity", "ghost", "grade"),
    [
        pytest.param(-1, 1, 1, None, id="chloride-N18"),
        pytest.param(1, 1, 2, None, id="sodium_ion-N10"),
        pytest.param(0, 2, 1, None, id="chlorine_atom_meant-N17"),
        pytest.param(0, None, 1, None, id="no_multiplicity_no_parity-N17"),
        pytest.param(0, 1, 1, HALT, id="charge_of_the_salt_on_chlorine-N17"),
        pytest.param(0, 1, 2, HALT, id="charge_of_the_salt_on_sodium-N11"),
        pytest.param(1, 1, 1, None, id="chlorine_cation_N16_no_sum"),
    ],
)
def test_a_charge_that_belonged_to_a_ghost(
    charge: int, multiplicity: int | None, ghost: int, grade: Grade | None
) -> None:
    assert salt(charge, multiplicity, ghost) == [grade] * (grade is not None)


@pytest.mark.parametrize(
    ("metal", "charge", "multiplicity", "grade"),
    [
        pytest.param("Na", 0, 1, None, id="water_alone-N10"),
        pytest.param("Na", 1, 1, HALT, id="charge_of_sodium_kept-N9"),
        pytest.param("Na", 1, 2, None, id="water_cation_meant-N9"),
        pytest.param("Mg", 0, 1, None, id="water_beside_magnesium-N10"),
        pytest.param("Mg", 2, 1, DOUBT, id="charge_of_magnesium_kept-N8"),
        pytest.param("Ar", 0, 1, None, id="water_beside_argon-N10"),
    ],
)
def test_an_ion_made_a_ghost_beside_water(metal: str, charge: int, multiplicity: int, grade: Grade | None) -> None:
    rows = [*WATER, (metal, 0.0, 0.0, 2.4)]
    found = run_rule(RULE, job(rows, charge, multiplicity, species={"ghost_atoms": [4]}))
    assert [f.grade for f in found] == [grade] * (grade is not None)
    assert all(f.repairs[0].edits == (Edit("species.charge", 0),) for f in found)


def test_a_whole_ion_made_a_ghost_is_named() -> None:
    ammonium = [("N", 0.0, 0.0, 3.0), ("H", 0.6, 0.6, 2.4), ("H", -0.6, -0.6, 2.4), ("H", 0.6, -0.6, 3.6),
                ("H", -0.6, 0.6, 3.6)]  # fmt: skip
    found = run_rule(RULE, job([*WATER, *ammonium], 1, 1, species={"ghost_atoms": [4, 5, 6, 7, 8]}))
    assert [f.message for f in found] == [
        "charge 1 with multiplicity 1 fits the species with the 5 ghost atoms counted as real, and not what "
        "remains; give the charge of the real atoms alone"
    ]


@pytest.mark.parametrize(("charge", "grade"), [(0, DOUBT), (1, HALT)])
def test_a_deck_of_ghosts_only(charge: int, grade: Grade) -> None:
    (finding,) = run_rule(RULE, job(WATER, charge, 1, species={"ghost_atoms": [1, 2, 3]}))
    assert finding.grade is grade
    assert finding.message.startswith("all 3 atoms are ghosts")


def test_every_g2_molecule_passes_with_its_dimer_made_ghosts() -> None:
    """A counterpoise deck of two like neutral molecules 4 angstrom apart, the second one ghosts."""
    for name in g2.names:
        system = g2[name]
        multiplicity = round(sum(system.get_initial_magnetic_moments())) + 1
        first = [(s, *p) for s, p in zip(system.symbols, system.positions.tolist(), strict=True)]
        second = [(s, x + 14.0, y, z) for s, x, y, z in first]
        ghosts = list(range(len(first) + 1, 2 * len(first) + 1))
        assert not run_rule(RULE, job([*first, *second], 0, multiplicity, species={"ghost_atoms": ghosts})), name
