"""From a group of permutations to the exact group of matrices that fits a body best, and how far off the body is.

The exactly symmetric body nearest to a given one, for a group in a given orientation, is the average over the
group of what each operation brings to a place. The orientation is then turned so that the average lies best on the
body, and the average taken anew; as the average follows a small turn to first order, two rounds do.

Source: H. Zabrodsky, S. Peleg, D. Avnir, J. Am. Chem. Soc. 114, 7843 (1992), for the nearest symmetric shape as an
average over the group.
"""

from dataclasses import dataclass

import numpy as np

from checker.chemistry.axes import best_placement
from checker.chemistry.bodies import Body, Floats, Ints, best_matrices
from checker.chemistry.closure import Closed, symbol_of
from checker.chemistry.irreps import point_group
from checker.chemistry.point_groups import standard_operations

ROUNDS = 2


@dataclass(frozen=True, eq=False)
class Fit:
    """An exact group on a body.

    Attributes
    ----------
    symbol : Schoenflies symbol.
    closed : its permutations as a group.
    operations : (g, 3, 3) in the body's axes, in the order of `standard_operations`.
    permutations : (g, n) in the same order.
    symmetrised : (n, 3) positions of the nearest exactly symmetric body, angstrom.
    deviation : the largest distance of an atom from there, angstrom.

    """

    symbol: str
    closed: Closed
    operations: Floats
    permutations: Ints
    symmetrised: Floats
    deviation: float


def fitted(body: Body, group: Closed) -> Fit | None:
    """Fit the exact group to a body that is no line; None if the permutations belong to none that is listed."""
    if len(group) == 1:
        return Fit("C1", group, np.eye(3)[None], group.permutations, body.positions, 0.0)
    if len(group) == 2:
        return _fitted_pair(body, group)
    targets = body.positions[group.permutations]
    rough = best_matrices(body.positions, targets, group.handedness)
    symbol = symbol_of(group, np.trace(rough, axis1=1, axis2=2))
    if symbol is None or point_group(symbol) is None:
        return None
    frame = best_placement(rough, group.handedness, group.orders, symbol)
    if frame is None:
        return None
    operations = frame.T @ standard_operations(symbol) @ frame
    closeness = operations.reshape(-1, 9) @ rough.reshape(-1, 9).T
    order = closeness.argmax(axis=1)
    if len(set(order.tolist())) < len(order):
        return None
    permutations = group.permutations[order]
    operations, symmetrised, deviation = settled(body.positions, operations, permutations)
    return Fit(symbol, group, operations, permutations, symmetrised, deviation)


def _fitted_pair(body: Body, group: Closed) -> Fit:
    """Fit C2, Cs or Ci: the axis is an eigenvector, so that no search for a place is needed.

    A half turn about a, 2 aa' - 1, fits best where a'Ma is largest, M being the sum of the products of images and
    atoms; a reflection, 1 - 2 aa', where it is smallest.
    """
    images = group.permutations[1]
    products = body.positions[images].T @ body.positions
    values, vectors = np.linalg.eigh(0.5 * (products + products.T))
    if group.handedness[1] == 1:
        symbol, operation = "C2", 2.0 * np.outer(vectors[:, 2], vectors[:, 2]) - np.eye(3)
    elif values.sum() - 2.0 * values[0] >= -values.sum():
        symbol, operation = "Cs", np.eye(3) - 2.0 * np.outer(vectors[:, 0], vectors[:, 0])
    else:
        symbol, operation = "Ci", -np.eye(3)
    symmetrised = 0.5 * (body.positions + body.positions[images] @ operation)
    gaps = body.positions - symmetrised
    deviation = float(np.sqrt(np.einsum("ni,ni->n", gaps, gaps).max()))
    return Fit(symbol, group, np.array([np.eye(3), operation]), group.permutations, symmetrised, deviation)


def settled(positions: Floats, operations: Floats, permutations: Ints) -> tuple[Floats, Floats, float]:
    """Turn an exact group to where it fits best.

    Parameters
    ----------
    positions : (n, 3) angstrom, about the centre.
    operations : (g, 3, 3) an exact group, nearly in place.
    permutations : (g, n) image atom of each atom.

    Returns
    -------
    operations : (g, 3, 3) turned.
    symmetrised : (n, 3) angstrom.
    deviation : the largest distance of an atom from its symmetrised place, angstrom.

    """
    proper = np.ones(1, dtype=np.int64)
    targets = positions[permutations]
    for _ in range(ROUNDS):
        symmetrised = (targets @ operations).mean(axis=0)
        turn = best_matrices(symmetrised, positions[None], proper)[0]
        operations = turn @ operations @ turn.T
    symmetrised = (targets @ operations).mean(axis=0)
    gaps = positions - symmetrised
    return operations, symmetrised, float(np.sqrt(np.einsum("ni,ni->n", gaps, gaps).max()))
