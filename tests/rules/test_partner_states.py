"""partner-states. Published ground states, from memory: G. Herzberg (1950)."""

import pytest

from builders import job, run_rule
from checker.errors import NotDerivable
from checker.findings import Edit, Finding
from rules.partner_states import RULE

Atoms = list[tuple[str, float, float, float]]
OH: Atoms = [("O", 0.0, 0.0, 0.0), ("H", 0.0, 0.0, 0.97)]
O2: Atoms = [("O", 0.0, 0.0, 0.6), ("O", 0.0, 0.0, -0.6)]
WATER: Atoms = [("O", 0.0, 0.0, 0.1173), ("H", 0.0, 0.7572, -0.4692), ("H", 0.0, -0.7572, -0.4692)]
BORON: Atoms = [("B", 0.0, 0.0, 0.0)]


def judged(atoms: Atoms, group: str, roots: dict[str, int]) -> list[Finding]:
    return run_rule(RULE, job(atoms, 0, 2, symmetry={"point_group": group}, treatment={"roots": roots}))


@pytest.mark.parametrize(
    ("atoms", "group", "roots"),
    [
        pytest.param(OH, "C2v", {"B1": 1, "B2": 1}, id="hydroxyl_both"),
        pytest.param(OH, "C2v", {"B1": 1, "B2": 1, "A1": 1}, id="hydroxyl_with_excited_sigma"),
        pytest.param(OH, "C2v", {"A1": 1}, id="sigma_state"),
        pytest.param(OH, "C2v", {"A1": 1, "A2": 1}, id="delta_state"),
        pytest.param(OH, "Cinfv", {"Pi": 1}, id="in_its_own_group"),
        pytest.param(OH, "C1", {"A": 3}, id="no_labels"),
        pytest.param(O2, "D2h", {"B1g": 1}, id="sigma_minus"),
        pytest.param(WATER, "C2v", {"B1": 1}, id="nothing_degenerate"),
        pytest.param(BORON, "D2h", {"B1u": 1, "B2u": 1, "B3u": 1}, id="p_atom"),
    ],
)
def test_whole_states_pass(atoms: Atoms, group: str, roots: dict[str, int]) -> None:
    assert judged(atoms, group, roots) == []


@pytest.mark.parametrize(
    ("atoms", "group", "roots", "repaired"),
    [
        pytest.param(OH, "C2v", {"B1": 1}, {"B1": 1, "B2": 1}, id="hydroxyl_one_component"),
        pytest.param(OH, "C2v", {"B1": 2, "B2": 1}, {"B1": 2, "B2": 2}, id="second_pi_state_cut"),
        pytest.param(O2, "D2h", {"B2u": 1, "B1g": 1}, {"B2u": 1, "B1g": 1, "B3u": 1}, id="pi_u_cut"),
        pytest.param(BORON, "D2h", {"B3u": 1}, {"B3u": 1, "B1u": 1, "B2u": 1}, id="boron_atom"),
    ],
)
def test_a_component_alone_is_doubted(
    atoms: Atoms, group: str, roots: dict[str, int], repaired: dict[str, int]
) -> None:
    (finding,) = judged(atoms, group, roots)
    assert finding.at == "treatment.roots"
    (edit,) = finding.repairs[0].edits
    assert edit == Edit("treatment.roots", repaired)


def test_says_what_to_add() -> None:
    (finding,) = judged(OH, "C2v", {"B1": 1})
    assert finding.message == "B1 = 1 in C2v is part of a degenerate state of C∞v; add B2 = 1"


def test_not_judged_where_the_geometry_lacks_the_group() -> None:
    with pytest.raises(NotDerivable, match="D2h is not within it"):
        judged(OH, "D2h", {"B1g": 1})


def test_silent_without_roots() -> None:
    assert run_rule(RULE, job(OH, 0, 2, symmetry={"point_group": "C2v"})) == []
