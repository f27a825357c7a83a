"""The 162 systems of the G2/97 set as ASE ships them, with their published spin.

Source: Curtiss, Raghavachari, Redfern, Pople, J. Chem. Phys. 106, 1063 (1997); geometries and spins from ASE's
`ase.collections.g2` (2S is the sum of the initial magnetic moments). All are neutral.
"""

import pytest
from ase import Atoms
from ase.collections import g2

from builders import TODAY
from checker.api import check_text
from checker.findings import DeckReport, Verdict

NAMES = sorted(g2.names)
MOST_DOUBTS = 3  # 2 % of 162, rounded down


def judged(atoms: Atoms, charge: int) -> DeckReport:
    """Judge a system with its published spin and the charge given, through the reading of XYZ text."""
    multiplicity = round(sum(atoms.get_initial_magnetic_moments())) + 1
    rows = zip(atoms.get_chemical_symbols(), atoms.positions.tolist(), strict=True)
    lines = [f"{symbol} {x:.6f} {y:.6f} {z:.6f}" for symbol, (x, y, z) in rows]
    comment = f"charge={charge} multiplicity={multiplicity}"
    (report,) = check_text("\n".join([str(len(lines)), comment, *lines, ""]), name="g2.xyz", today=TODAY)
    return report


def test_the_set_is_whole() -> None:
    assert len(NAMES) == 162


@pytest.mark.parametrize("name", NAMES)
def test_no_published_state_is_halted(name: str) -> None:
    report = judged(g2[name], charge=0)
    assert report.verdict in {Verdict.CLEAR, Verdict.DOUBTFUL}, [f.finding.message for f in report.findings]


def test_hardly_any_published_state_is_doubted() -> None:
    doubted = {name for name in NAMES if judged(g2[name], charge=0).verdict is Verdict.DOUBTFUL}
    assert len(doubted) <= MOST_DOUBTS, doubted


@pytest.mark.parametrize("name", NAMES)
@pytest.mark.parametrize("charge", [1, -1])
def test_a_charge_moved_by_one_is_halted(name: str, charge: int) -> None:
    report = judged(g2[name], charge=charge)
    assert report.verdict is Verdict.HALTED
    assert "spin-parity" in {finding.rule for finding in report.findings}
