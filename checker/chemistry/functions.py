"""Symmetry-adapted functions: how many of each irrep the basis functions on all atoms span.

An operation's character in the space of basis functions is the sum, over the atoms it leaves in place, of the
characters of their shells. Cartesian shells of degree l hold all monomials of that degree, spherical ones the 2l+1
functions of that angular momentum.

Source: F. A. Cotton, Chemical Applications of Group Theory, 3rd ed., secs. 6.2-6.3 (from memory).
"""

from typing import Literal

import numpy as np
from numpy.typing import NDArray

from checker.chemistry.characters import (
    Reals,
    Sample,
    known_group,
    momentum_characters,
    monomial_characters,
    sample,
    sample_over,
)
from checker.chemistry.point_groups import Matrices
from checker.chemistry.products import reduce

Whole = NDArray[np.int64]
Form = Literal["spherical", "cartesian"]


def n_functions(shells: Whole, form: Form = "spherical") -> int:
    """Return the number of basis functions of shells (n_atoms, l_max + 1) by atom and angular momentum.

    >>> n_functions(np.array([[3, 2, 1]])), n_functions(np.array([[3, 2, 1]]), "cartesian")
    (14, 15)
    """
    momenta = np.arange(shells.shape[1])
    sizes = 2 * momenta + 1 if form == "spherical" else (momenta + 1) * (momenta + 2) // 2
    return int((shells @ sizes).sum())


def levels_per_irrep(
    symbol: str, operations: Matrices, permutations: Whole, shells: Whole, form: Form = "spherical"
) -> dict[str, int]:
    """Return the symmetry-adapted levels of each irrep of a finite group; a level of T2 is three functions.

    Parameters
    ----------
    symbol : the group, the full one or any subgroup.
    operations : (order, 3, 3) all its operations in its standard frame, in any order.
    permutations : (order, n_atoms) the atom on which each operation puts each atom.
    shells : (n_atoms, l_max + 1) contracted shells by atom and angular momentum.
    form : whether shells are spherical or cartesian.

    Returns counts of all irreps of the group, zeros included. Raises ValueError where the operations are not as
    many as the group has, or are not those of the atoms' permutations.
    """
    group = known_group(symbol)
    over = sample_over(group.symbol, operations)
    fixed_shells = (permutations == np.arange(len(shells))) @ shells
    found = reduce(group.symbol, _characters(over, fixed_shells, form), over)
    return {irrep.name: found.get(irrep.name, 0) for irrep in group.irreps}


def levels_on_axis(symbol: str, inverted: Whole | None, shells: Whole, form: Form = "spherical") -> dict[str, int]:
    """Return the symmetry-adapted levels of each irrep of a linear molecule or a free atom, zeros left out.

    Parameters
    ----------
    symbol : ``C∞v``, ``D∞h`` or ``Kh``.
    inverted : (n_atoms,) the atom on which the inversion puts each atom; not needed for C∞v and the free atom.
    shells : (n_atoms, l_max + 1) contracted shells by atom and angular momentum.
    form : whether shells are spherical or cartesian.

    >>> levels_on_axis("D∞h", np.array([1, 0]), np.array([[2, 1], [2, 1]]))
    {'Σg+': 3, 'Πg': 1, 'Σu+': 3, 'Πu': 1}
    """
    over = sample(symbol)
    in_place = np.arange(len(shells))
    stays = in_place if inverted is None else inverted
    turned_over = over.operations[:, 2, 2] < 0 if symbol == "D∞h" else np.zeros(len(over.weights), dtype=bool)
    fixed_shells = np.where(turned_over[:, None], (stays == in_place) @ shells, shells.sum(axis=0))
    return reduce(symbol, _characters(over, fixed_shells, form), over)


def _characters(over: Sample, fixed_shells: Whole, form: Form) -> Reals:
    """Return the characters (k,) of the basis functions, from the shells (k, l_max + 1) left in place."""
    of_shells = momentum_characters if form == "spherical" else monomial_characters
    chi = of_shells(over.operations, fixed_shells.shape[1] - 1)
    return np.asarray(np.einsum("kl,lk->k", fixed_shells, chi))
