"""Bonds, valences and causes of arbitrary heaps of atoms: an answer or a reason, never a breakdown."""

import numpy as np
from hypothesis import given
from hypothesis import strategies as st

from checker.chemistry.parity import rank_causes
from checker.chemistry.valence import assign_valences

NUMBERS = st.lists(
    st.sampled_from([1, 1, 1, 6, 6, 7, 8, 9, 5, 3, 11, 13, 15, 16, 17, 26, 50, 54, 82, 118]), max_size=14
)


@given(numbers=NUMBERS, seed=st.integers(0, 10_000), box=st.sampled_from([0.0, 1.0, 2.0, 3.0, 5.0, 1e6]))
def test_every_heap_gets_a_valence_and_its_causes(numbers: list[int], seed: int, box: float) -> None:
    elements = np.array(numbers, dtype=np.int64)
    places = np.random.default_rng(seed).uniform(-box, box, (len(numbers), 3))
    valence = assign_valences(elements, places)
    assert (valence.implied_charge is None) == bool(valence.because)
    if valence.implied_charge is not None:
        assert valence.formal_charges.sum() == valence.implied_charge
    for charge in (-1, 0, 1):
        causes = rank_causes(elements, places, charge, 2, valence=valence)
        assert not causes or abs(sum(cause.weight for cause in causes) - 1) < 1e-9
        assert all(np.isfinite(cause.position).all() for cause in causes if cause.position is not None)


@given(seed=st.integers(0, 10_000))
def test_a_shuffled_and_turned_heap_has_the_same_bonds(seed: int) -> None:
    random = np.random.default_rng(seed)
    elements = random.choice([1, 6, 7, 8], 9)
    places = random.uniform(0, 3.2, (9, 3))
    turn, _ = np.linalg.qr(random.normal(size=(3, 3)))
    order = random.permutation(9)
    here, there = assign_valences(elements, places), assign_valences(elements[order], (places @ turn)[order])
    assert here.bonds.degrees()[order].tolist() == there.bonds.degrees().tolist()
