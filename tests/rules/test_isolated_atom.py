"""isolated-atom. Each id states the distance to the nearest other atom."""

import pytest
from ase.collections import g2

from builders import job, run_rule
from checker.findings import Grade
from rules.isolated_atom import RULE

Row = tuple[str, float, float, float]
WATER: list[Row] = [("O", 0.0, 0.0, 0.12), ("H", 0.0, 0.76, -0.48), ("H", 0.0, -0.76, -0.48)]


@pytest.mark.parametrize(
    ("rows", "grade"),
    [
        pytest.param(WATER, None, id="water-0.96"),
        pytest.param([*WATER, ("Na", 0.0, 0.0, 6.5)], None, id="sodium_near_water-6.4"),
        pytest.param([*WATER, ("Ar", 0.0, 0.0, 5.5)], None, id="argon-5.4"),
        pytest.param([*WATER, ("H", 0.0, 0.0, 4.9)], None, id="hydrogen-4.8"),
        pytest.param([("He", 0.0, 0.0, 0.0)], None, id="a_single_atom"),
        pytest.param([*WATER, ("H", 0.0, 0.0, 10.9)], Grade.DOUBT, id="hydrogen_slipped-10.8"),
        pytest.param([*WATER, ("Na", 0.0, 0.0, 12.0)], Grade.DOUBT, id="sodium_lost-11.9"),
        pytest.param([*WATER, ("O", 0.0, 0.0, 9e9)], Grade.DOUBT, id="absurdly_far-9e9"),
        pytest.param([("N", 0.0, 0.0, 0.0), ("N", 0.0, 0.0, 20.0)], Grade.NOTE, id="dissociated_nitrogen-20"),
        pytest.param([("H", 0.0, 0.0, 6.0 * i) for i in range(4)], Grade.NOTE, id="separate_hydrogens-6"),
    ],
)
def test_speaks_of_atoms_out_of_reach(rows: list[Row], grade: Grade | None) -> None:
    found = run_rule(RULE, job(rows))
    assert [f.grade for f in found] == [grade] * (grade is not None)


def test_is_silent_on_g2() -> None:
    for name in g2.names:
        system = g2[name]
        rows = [(s, *p) for s, p in zip(system.symbols, (1.5 * system.positions).tolist(), strict=True)]
        assert not run_rule(RULE, job(rows)), name


def test_an_atom_named_as_a_fragment_stands_there_on_purpose() -> None:
    fragments = [{"atoms": [1, 2, 3]}, {"atoms": [4]}]
    (finding,) = run_rule(RULE, job([*WATER, ("O", 0.0, 0.0, 15.0)], fragments=fragments))
    assert finding.grade is Grade.NOTE


def test_several_are_one_finding_with_names_and_distance() -> None:
    (finding,) = run_rule(RULE, job([*WATER, ("H", 0.0, 0.0, 10.12), ("F", 0.0, 0.0, 30.12)]))
    assert finding.at == "species.atoms[3]"
    assert finding.message == (
        "H 4, F 5 stand 10.0 angstrom or more from every other atom; correct the coordinates or leave them out"
    )
    assert finding.evidence["isolated_atoms"] == 2


def test_ghosts_are_no_company() -> None:
    rows: list[Row] = [*WATER, ("H", 0.0, 0.0, 10.9), ("O", 0.0, 0.0, 10.0)]
    (finding,) = run_rule(RULE, job(rows, species={"ghost_atoms": [5]}))
    assert finding.at == "species.atoms[3]"
