"""The electron books, in whole numbers.

electrons = sum of nuclear charges - electrons replaced by core potentials - charge; ghost atoms carry neither
charge nor electrons. With the multiplicity M: n_alpha - n_beta = M - 1 (unpaired electrons are alpha by
convention; common practice, no source).
"""

from collections.abc import Mapping

import numpy as np
from numpy.typing import NDArray

from checker.elements import symbol_of
from checker.findings import ElementBook, Ledger


def ledger(
    numbers: NDArray[np.int64],
    is_ghost: NDArray[np.bool_],
    charge: int,
    multiplicity: int | None,
    replaced_per_atom: Mapping[int, int] | None,
) -> Ledger:
    """Return the books of a species.

    Parameters
    ----------
    numbers : (n,) atomic numbers, ghosts included.
    is_ghost : (n,) True where the atom has basis functions only.
    charge : of the whole species.
    multiplicity : 2S+1, or None where it is not stated.
    replaced_per_atom : electrons replaced per atom, by atomic number; None where that is unknown.

    """
    books = _element_books(numbers, is_ghost, replaced_per_atom)
    nuclear_charge = sum(book.nuclear_charge for book in books)
    replaced = None if replaced_per_atom is None else sum(book.core_electrons_replaced or 0 for book in books)
    n_electrons = None if replaced is None else nuclear_charge - replaced - charge
    n_alpha, n_beta = spin_split(n_electrons, multiplicity)
    return Ledger(
        nuclear_charge=nuclear_charge,
        core_electrons_replaced=replaced,
        ghost_atoms=int(is_ghost.sum()),
        charge=charge,
        n_electrons=n_electrons,
        n_alpha=n_alpha,
        n_beta=n_beta,
        n_unpaired=None if n_alpha is None or n_beta is None else n_alpha - n_beta,
        by_element=books,
    )


def spin_split(n_electrons: int | None, multiplicity: int | None) -> tuple[int, int] | tuple[None, None]:
    """Return the numbers of alpha and beta electrons, or (None, None) where no such state exists.

    >>> spin_split(8, 3), spin_split(9, 1), spin_split(1, 4)
    ((5, 3), (None, None), (None, None))
    """
    if n_electrons is None or multiplicity is None or not is_reachable(n_electrons, multiplicity):
        return None, None
    n_unpaired = multiplicity - 1
    return (n_electrons + n_unpaired) // 2, (n_electrons - n_unpaired) // 2


def is_reachable(n_electrons: int, multiplicity: int) -> bool:
    """Tell whether `n_electrons` can have the multiplicity at all: parity, and no more unpaired than there are."""
    n_unpaired = multiplicity - 1
    return 0 <= n_unpaired <= n_electrons and (n_electrons - n_unpaired) % 2 == 0


def lowest_multiplicity(n_electrons: int) -> int:
    """Return the lowest 2S+1 that the number of electrons allows, the value that a default would give."""
    return 1 + n_electrons % 2


def _element_books(
    numbers: NDArray[np.int64], is_ghost: NDArray[np.bool_], replaced_per_atom: Mapping[int, int] | None
) -> tuple[ElementBook, ...]:
    present = np.bincount(numbers[~is_ghost], minlength=1)
    ghosts = np.bincount(numbers[is_ghost], minlength=1)
    books = []
    for z in np.flatnonzero(np.bincount(numbers)).tolist():  # np.unique would import numpy.ma
        n_atoms = int(present[z]) if z < len(present) else 0
        n_ghosts = int(ghosts[z]) if z < len(ghosts) else 0
        replaced = None if replaced_per_atom is None else n_atoms * replaced_per_atom.get(z, 0)
        books.append(
            ElementBook(
                symbol=symbol_of(z),
                atomic_number=z,
                atoms=n_atoms,
                ghosts=n_ghosts,
                nuclear_charge=n_atoms * z,
                core_electrons_replaced=replaced,
            )
        )
    return tuple(books)
