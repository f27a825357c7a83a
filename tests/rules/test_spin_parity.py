"""spin-parity. Each id states N, so that a reader can check the row by hand."""

import pytest
from builders import job, run_rule

from rules.spin_parity import RULE


@pytest.mark.parametrize(
    ("atoms", "charge", "multiplicity", "speaks"),
    [
        pytest.param("O H H", 0, 1, False, id="water-N10-singlet"),
        pytest.param("O H H", +1, 1, True, id="water_cation-N9-singlet"),
        pytest.param("Fe", +2, 5, False, id="iron2-N24-quintet"),
        pytest.param("Fe", +3, 5, True, id="iron3-N23-quintet"),
        pytest.param("H", +1, 1, False, id="bare_proton-N0-singlet"),
    ],
)
def test_speaks_only_on_wrong_parity(atoms: str, charge: int, multiplicity: int, speaks: bool) -> None:
    found = run_rule(RULE, job(atoms, charge=charge, multiplicity=multiplicity))
    assert [f.at for f in found] == ["species.multiplicity"] * speaks
