"""The electron books: sums that must hold whatever the species."""

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from checker.chemistry.ledger import is_reachable, ledger, lowest_multiplicity, spin_split

SPECIES = st.lists(st.tuples(st.integers(1, 118), st.booleans()), min_size=1, max_size=30)


@given(species=SPECIES, charge=st.integers(-5, 5), multiplicity=st.integers(-1, 9), core=st.integers(0, 2))
def test_books_balance(species: list[tuple[int, bool]], charge: int, multiplicity: int, core: int) -> None:
    numbers = np.array([z for z, _ in species])
    ghosts = np.array([ghost for _, ghost in species])
    told = ledger(numbers, ghosts, charge, multiplicity, {z: core for z, _ in species})

    assert told.n_electrons == told.nuclear_charge - (told.core_electrons_replaced or 0) - charge
    assert told.nuclear_charge == sum(z for z, ghost in species if not ghost)
    assert told.core_electrons_replaced == core * sum(not ghost for _, ghost in species)
    assert sum(book.nuclear_charge for book in told.by_element) == told.nuclear_charge
    assert sum(book.atoms + book.ghosts for book in told.by_element) == len(species)
    if told.n_alpha is not None and told.n_beta is not None:
        assert told.n_alpha + told.n_beta == told.n_electrons
        assert told.n_alpha - told.n_beta == told.n_unpaired == multiplicity - 1
        assert told.n_beta >= 0


@given(n_electrons=st.integers(0, 300))
def test_the_lowest_multiplicity_can_be_reached_and_nothing_lower(n_electrons: int) -> None:
    lowest = lowest_multiplicity(n_electrons)

    assert is_reachable(n_electrons, lowest)
    assert not any(is_reachable(n_electrons, m) for m in range(-3, lowest))


@pytest.mark.parametrize(
    ("n_electrons", "multiplicity", "split"),
    [
        pytest.param(16, 3, (9, 7), id="O2-triplet"),
        pytest.param(0, 1, (0, 0), id="bare-proton"),
        pytest.param(0, 3, (None, None), id="no-electrons-triplet"),
        pytest.param(-1, 2, (None, None), id="fewer-than-none"),
        pytest.param(9, 1, (None, None), id="wrong-parity"),
        pytest.param(3, 4, (3, 0), id="all-unpaired"),
        pytest.param(None, 1, (None, None), id="unknown-count"),
    ],
)
def test_spin_split(n_electrons: int | None, multiplicity: int, split: tuple[int | None, int | None]) -> None:
    assert spin_split(n_electrons, multiplicity) == split


def test_unknown_core_leaves_the_electrons_unknown() -> None:
    told = ledger(np.array([53]), np.array([False]), 0, 2, None)

    assert (told.nuclear_charge, told.core_electrons_replaced, told.n_electrons, told.n_alpha) == (
        53,
        None,
        None,
        None,
    )


def test_ghosts_carry_neither_charge_nor_electrons() -> None:
    """A water dimer with the second water made of ghosts counts as one water."""
    told = ledger(np.array([8, 1, 1] * 2), np.array([False] * 3 + [True] * 3), 0, 1, {})

    assert (told.n_electrons, told.n_alpha, told.ghost_atoms) == (10, 5, 3)
