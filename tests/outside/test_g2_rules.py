"""Rule by rule over the 162 systems of G2/97 with their published spin: none halts or doubts a published state.

Source: Curtiss, Raghavachari, Redfern, Pople, J. Chem. Phys. 106, 1063 (1997); data as ASE ships them.
"""

import pytest
from ase.collections import g2

from builders import job, run_rule
from checker.errors import NotDerivable
from checker.findings import Grade
from checker.registry import Rule
from rules import (
    caution,
    close_contact,
    closed_shell_treatment,
    electron_count,
    isolated_atom,
    length_unit,
    multiplicity_out_of_reach,
    multiplicity_unstated,
    occupation_irreps,
    occupation_total,
    periodic_cell,
    stated_twice,
)

JUDGED = [
    module.RULE
    for module in (
        caution, close_contact, closed_shell_treatment, electron_count, isolated_atom, length_unit,
        multiplicity_out_of_reach, multiplicity_unstated, occupation_irreps, occupation_total, periodic_cell,
        stated_twice,
    )
]  # fmt: skip


@pytest.mark.parametrize("rule", JUDGED, ids=lambda rule: rule.id)
def test_no_published_state_is_halted_or_doubted(rule: Rule) -> None:
    loud = []
    for name in sorted(g2.names):
        system = g2[name]
        rows = [(s, *p) for s, p in zip(system.symbols, system.positions.tolist(), strict=True)]
        multiplicity = round(sum(system.get_initial_magnetic_moments())) + 1
        spins = "restricted" if multiplicity == 1 else "unrestricted"
        of = job(rows, 0, multiplicity, treatment={"spin_treatment": spins})
        try:
            loud += [(name, f.message) for f in run_rule(rule, of) if (f.grade or rule.grade) > Grade.NOTE]
        except NotDerivable:
            continue
    assert loud == []
