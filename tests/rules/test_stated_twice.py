"""stated-twice."""

from typing import Any

import pytest

from builders import job, run_rule
from checker.deck import Aside
from checker.findings import Edit, Grade
from rules.stated_twice import RULE

COMMENT = "the comment line of water.xyz"


@pytest.mark.parametrize(
    ("aside", "grade"),
    [
        pytest.param(Aside("species.charge", 0, COMMENT), None, id="same_charge"),
        pytest.param(Aside("species.multiplicity", 1, COMMENT), None, id="same_multiplicity"),
        pytest.param(Aside("species.charge", 1, COMMENT), Grade.DOUBT, id="comment_line_charge"),
        pytest.param(Aside("species.multiplicity", 3, COMMENT), Grade.DOUBT, id="comment_line_multiplicity"),
        pytest.param(Aside("species.charge", -1, "--charge"), Grade.NOTE, id="option"),
    ],
)
def test_what_stands_beside_the_deck(aside: Aside, grade: Grade | None) -> None:
    found = run_rule(RULE, job("O H H", 0, 1), aside)
    assert [(f.at, f.grade) for f in found] == [(aside.key, grade)] * (grade is not None)


def test_a_multiplicity_the_deck_leaves_out_is_not_said_twice() -> None:
    assert not run_rule(RULE, job("O H H"), Aside("species.multiplicity", 3, COMMENT))


def test_says_both_values_and_offers_the_other() -> None:
    (finding,) = run_rule(RULE, job("O H H", 0, 1), Aside("species.charge", 1, COMMENT))
    assert finding.message == (
        "the deck says charge 0, the comment line of water.xyz says 1; the deck's value is used, "
        "so correct the one that is wrong"
    )
    assert finding.repairs[0].edits == (Edit("species.charge", 1),)


def iron_pair(charge: int, multiplicity: int | None, *fragments: dict[str, Any], **species: Any) -> Any:
    return job("Fe Fe S S", charge, multiplicity, species=species, fragments=list(fragments))


@pytest.mark.parametrize(
    ("charge", "fragments", "speaks"),
    [
        pytest.param(2, [{"atoms": [1, 3], "charge": 1}, {"atoms": [2, 4], "charge": 1}], False, id="sum_right"),
        pytest.param(1, [{"atoms": [1, 3], "charge": 1}, {"atoms": [2, 4], "charge": 1}], True, id="sum_wrong"),
        pytest.param(1, [{"atoms": [1, 3], "charge": 1}, {"atoms": [2, 4]}], False, id="a_charge_left_out"),
        pytest.param(1, [{"atoms": [1], "charge": 3}, {"atoms": [2], "charge": 3}], False, id="atoms_not_covered"),
        pytest.param(
            1, [{"atoms": [1, 2], "charge": 3}, {"atoms": [2, 3, 4], "charge": 3}], False, id="atom_in_two"
        ),
        pytest.param(1, [], False, id="no_fragments"),
    ],
)
def test_fragment_charges(charge: int, fragments: list[dict[str, Any]], speaks: bool) -> None:
    found = run_rule(RULE, iron_pair(charge, None, *fragments))
    assert [(f.at, f.grade) for f in found] == [("species.charge", Grade.HALT)] * speaks


def test_ghosts_need_no_fragment() -> None:
    fragments = [{"atoms": [1, 3], "charge": 1}, {"atoms": [2], "charge": 1}]
    assert len(run_rule(RULE, iron_pair(0, None, *fragments, ghost_atoms=[4]))) == 1


def test_charge_repairs_go_both_ways() -> None:
    fragments = [{"atoms": [1, 3], "charge": 1}, {"atoms": [2, 4], "charge": 0}]
    (finding,) = run_rule(RULE, iron_pair(2, None, *fragments))
    assert "the fragments' charges +1 +0 make 1, and the species has charge 2" in finding.message
    assert [repair.edits[0] for repair in finding.repairs] == [
        Edit("species.charge", 1),
        Edit("fragments[0].charge", 2),
        Edit("fragments[1].charge", 1),
    ]


@pytest.mark.parametrize(
    ("multiplicity", "spins", "speaks"),
    [
        pytest.param(1, [(6, "up"), (6, "down")], False, id="two_sextets_against_each_other"),
        pytest.param(11, [(6, "up"), (6, "up")], False, id="two_sextets_together"),
        pytest.param(11, [(6, "down"), (6, "down")], False, id="both_down_is_both_up"),
        pytest.param(2, [(6, "up"), (5, "down")], False, id="mixed_valence"),
        pytest.param(3, [(6, "up"), (6, "down")], True, id="multiplicity_not_the_sum"),
        pytest.param(1, [(6, "up"), (6, "up")], True, id="one_spin_not_turned"),
        pytest.param(3, [(6, None), (6, "down")], False, id="a_spin_left_out"),
        pytest.param(3, [(None, "up"), (6, "down")], False, id="a_multiplicity_left_out"),
        pytest.param(6, [(6, "up"), (1, None)], False, id="a_closed_shell_needs_no_spin"),
        pytest.param(None, [(6, "up"), (6, "up")], False, id="no_multiplicity"),
    ],
)
def test_fragment_spins(
    multiplicity: int | None, spins: list[tuple[int | None, str | None]], speaks: bool
) -> None:
    fragments = [{"atoms": [i + 1], "multiplicity": m, "spin": spin} for i, (m, spin) in enumerate(spins)]
    found = run_rule(RULE, iron_pair(0, multiplicity, *fragments))
    assert [(f.at, f.grade) for f in found] == [("species.multiplicity", None)] * speaks


def test_spin_repairs_turn_a_fragment_or_take_the_sum() -> None:
    spins = [{"atoms": [1], "multiplicity": 6, "spin": "up"}, {"atoms": [2], "multiplicity": 6, "spin": "up"}]
    (finding,) = run_rule(RULE, iron_pair(0, 1, *spins))
    assert [repair.edits[0] for repair in finding.repairs] == [
        Edit("species.multiplicity", 11),
        Edit("fragments[0].spin", "down"),
        Edit("fragments[1].spin", "down"),
    ]
