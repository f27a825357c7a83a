"""Pairing of open slots: graphs with known maximum matchings."""

import itertools

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from checker.chemistry import pi_bonds
from checker.chemistry.pi_bonds import Pairing


def paired(slots: dict[int, int], edges: list[tuple[int, int]]) -> Pairing:
    pairing = Pairing(slots)
    pairing.add_edges(edges)
    pairing.pair_greedily()
    pairing.pair_by_paths()
    return pairing


def ring(size: int) -> list[tuple[int, int]]:
    return [(i, (i + 1) % size) for i in range(size)]


@pytest.mark.parametrize(
    ("slots", "edges", "left"),
    [
        pytest.param([1] * 6, ring(6), 0, id="benzene"),
        pytest.param([1] * 5, ring(5), 1, id="cyclopentadienyl"),
        pytest.param([1, 1, 1], [(0, 1), (1, 2)], 1, id="allyl"),
        pytest.param([1, 2, 1], [(0, 1), (1, 2)], 0, id="carbon_dioxide"),
        pytest.param([2, 2], [(0, 1)], 0, id="nitrogen"),
        pytest.param([3, 3], [(0, 1)], 2, id="dicarbon-no_quadruple_bond"),
        pytest.param([1, 1, 1, 1], [(0, 1), (0, 2), (0, 3)], 2, id="trimethylenemethane"),
        pytest.param([1] * 10, [*ring(10), (0, 5)], 0, id="naphthalene"),
    ],
)
def test_as_many_as_possible_are_paired(slots: list[int], edges: list[tuple[int, int]], left: int) -> None:
    pairing = paired(dict(enumerate(slots)), edges)
    assert sum(pairing.left.values()) == left
    assert all(pairing.left[i] + pairing.bonds_of(i) == slots[i] for i in range(len(slots)))
    assert not pairing.gave_up


@given(
    n_atoms=st.integers(2, 8),
    chosen=st.sets(st.integers(0, 27), max_size=14),
)
def test_single_slots_pair_as_an_exhaustive_search_does(n_atoms: int, chosen: set[int]) -> None:
    every = list(itertools.combinations(range(n_atoms), 2))
    edges = [every[k % len(every)] for k in sorted(chosen)]
    pairing = paired(dict.fromkeys(range(n_atoms), 1), edges)
    assert len(pairing.bonds) == most_pairs(edges)


def most_pairs(edges: list[tuple[int, int]]) -> int:
    """Size of the largest matching, by trying the first edge in and out."""
    if not edges:
        return 0
    (i, j), *rest = edges
    apart = [edge for edge in rest if not {i, j} & set(edge)]
    return max(most_pairs(rest), 1 + most_pairs(apart)) if len(apart) < len(rest) else 1 + most_pairs(apart)


def test_an_open_slot_moves_along_the_chain() -> None:
    pairing = paired(dict.fromkeys(range(5), 1), [(i, i + 1) for i in range(4)])
    (start,) = (atom for atom, slots in pairing.left.items() if slots)
    reached = pairing.alternatives(start)
    assert sorted(reached) == [0, 2, 4]
    for end, path in reached.items():
        assert (path[0], path[-1]) == (start, end)
    pairing.shift(reached[0 if start != 0 else 4])
    assert pairing.left[0 if start != 0 else 4] == 1
    assert pairing.left[start] == 0


def test_the_search_stops_at_its_budget(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(pi_bonds, "_TOTAL_STEPS", 5)
    random = np.random.default_rng(0)
    edges = {tuple(sorted(pair)) for pair in random.integers(0, 60, (90, 2)).tolist() if pair[0] != pair[1]}
    assert paired(dict.fromkeys(range(60), 1), sorted(edges)).gave_up
