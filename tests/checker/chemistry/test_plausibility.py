"""Weights of states: only the order is meant, so only the order is tested."""

import itertools

import pytest

from checker.chemistry.plausibility import state_weight
from checker.chemistry.valence import Tally

CLOSED, RADICAL, ANION = Tally(base=0), Tally(base=0, flexible=1), Tally(base=0, anions=1)
ONIUM, CARBENE, OXYGEN = Tally(base=1), Tally(base=0, carbenes=1), Tally(base=0, paired_triplets=1)


@pytest.mark.parametrize(
    ("tally", "better", "worse"),
    [
        pytest.param(CLOSED, (0, 1), (1, 2), id="closed-neutral_before_ionised"),
        pytest.param(CLOSED, (1, 2), (-1, 2), id="closed-a_hole_before_an_electron"),
        pytest.param(CLOSED, (0, 1), (0, 3), id="closed-singlet_before_triplet"),
        pytest.param(RADICAL, (0, 2), (1, 1), id="methyl-doublet_before_cation"),
        pytest.param(RADICAL, (1, 1), (2, 2), id="methyl-cation_before_dication"),
        pytest.param(ANION, (0, 2), (1, 1), id="hydroxyl-radical_before_cation"),
        pytest.param(ANION, (-1, 1), (1, 1), id="hydroxyl-anion_before_cation"),
        pytest.param(ONIUM, (1, 1), (0, 2), id="ammonium-cation_before_neutral"),
        pytest.param(CARBENE, (0, 1), (1, 2), id="carbene-singlet_before_cation"),
        pytest.param(CARBENE, (0, 3), (0, 5), id="carbene-triplet_before_quintet"),
        pytest.param(OXYGEN, (0, 3), (0, 1), id="oxygen-triplet_before_singlet"),
    ],
)
def test_the_order_of_states(tally: Tally, better: tuple[int, int], worse: tuple[int, int]) -> None:
    assert state_weight(tally, *better) > state_weight(tally, *worse) > 0


def test_weights_lie_between_0_and_1_and_vanish_for_the_wrong_parity() -> None:
    for tally, charge, multiplicity in itertools.product(
        [CLOSED, RADICAL, ANION, ONIUM, CARBENE, OXYGEN], range(-4, 5), range(1, 8)
    ):
        assert 0 <= state_weight(tally, charge, multiplicity) <= 1
    assert state_weight(CLOSED, 0, 2) == state_weight(RADICAL, 0, 1) == 0


def test_a_metal_of_variable_charge_leaves_all_states_possible() -> None:
    metal = Tally(base=0, unknown=1)
    assert len({state_weight(metal, 2, multiplicity) for multiplicity in range(1, 7)}) == 1


def test_many_sites_are_counted_without_trying_every_way() -> None:
    assert state_weight(Tally(base=0, anions=50_000, flexible=50_001), -50_000, 2) > 0
