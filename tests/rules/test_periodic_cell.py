"""periodic-cell."""

import pytest

from builders import geometry, job, run_rule
from checker.findings import Grade
from rules.periodic_cell import RULE

CUBE = (10.0, 0.0, 0.0, 0.0, 10.0, 0.0, 0.0, 0.0, 10.0)


@pytest.mark.parametrize(
    ("lattice", "periodic", "grade"),
    [
        pytest.param(None, None, False, id="no_cell"),
        pytest.param(None, (False, False, False), False, id="flags_all_false"),
        pytest.param(CUBE, (False, False, False), Grade.NOTE, id="a_box_round_a_molecule"),
        pytest.param(CUBE, (True, True, True), None, id="crystal"),
        pytest.param(CUBE, (True, True, False), None, id="slab"),
        pytest.param(CUBE, None, None, id="lattice_without_flags"),
        pytest.param(None, (True, False, False), None, id="flags_without_lattice"),
    ],
)
def test_speaks_of_cells(
    lattice: tuple[float, ...] | None, periodic: tuple[bool, bool, bool] | None, grade: Grade | bool | None
) -> None:
    found = run_rule(RULE, job(geometry("O H H", lattice=lattice, periodic=periodic)))
    assert [f.grade for f in found] == ([] if grade is False else [grade])
    assert all(f.at == "species.atoms" for f in found)


def test_says_how_to_mend_it() -> None:
    (finding,) = run_rule(RULE, job(geometry("O H H", lattice=CUBE, periodic=(True, True, True))))
    assert RULE.grade is Grade.HALT
    assert finding.message.startswith(
        "the geometry has a lattice and periodic flags set, so it is a periodic cell"
    )
    assert "cut out a molecule or cluster" in finding.message
    assert finding.evidence["periodic"] == [True, True, True]
