"""Cores and valence shells, against the minimal set of the catalogue (STO-3G) where it means the same."""

import numpy as np
import pytest

from checker.chemistry.basis_sets import basis_set
from checker.chemistry.minimal_shells import minimal_shells


def of_element(z: int, ghost: bool = False) -> list[int]:
    (row,) = minimal_shells(np.array([z]), np.array([ghost])).tolist()
    return [int(n) for n in row]


@pytest.mark.parametrize("z", [*range(1, 19), *range(21, 37)])
def test_main_group_and_3d_metals_have_the_shells_of_a_minimal_set(z: int) -> None:
    """STO-3G: W. J. Hehre, R. F. Stewart, J. A. Pople, J. Chem. Phys. 51, 2657 (1969), and its later parts."""
    minimal = basis_set("STO-3G")
    assert minimal is not None
    by_momentum = {shell.angular_momentum: shell.n_contracted for shell in minimal.shells[z]}
    assert of_element(z) == [by_momentum.get(momentum, 0) for momentum in range(4)]


def test_heavy_atoms_and_ghosts() -> None:
    assert of_element(92) == [7, 6, 4, 2]  # uranium: 5f3 6d 7s2, and 7p
    assert of_element(6, ghost=True) == [0, 0, 0, 0]


def test_an_empty_species_has_no_rows() -> None:
    assert minimal_shells(np.array([], dtype=int), np.array([], dtype=bool)).shape == (0, 4)
