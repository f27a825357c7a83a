"""The minimal valence space of a species, and how many electrons it can leave unpaired.

Valence orbitals are 1s for H and He, ns np for s- and p-block elements, and (n-1)d, for the f block (n-2)f
too, besides ns np for the others. V electrons in K orbitals leave at most min(V, 2K - V) unpaired. Each bond
takes two orbitals and two electrons out of the count: it is filled, and its antibonding partner empty. Common
practice, no source.
"""

from collections.abc import Iterable

from checker.chemistry.bonding import Bonds

_CORES = (0, 2, 10, 18, 36, 54, 86, 118)
_NOBLE_GASES = _CORES[1:]
_F_BLOCK = (range(57, 71), range(89, 103))
_D_BLOCK = (range(21, 31), range(39, 49), range(71, 81), range(103, 113))


def valence_electrons(z: int) -> int:
    """Return the electrons of a neutral atom in its valence orbitals.

    >>> [valence_electrons(z) for z in (1, 2, 8, 10, 26, 34, 64)]
    [1, 2, 6, 8, 8, 6, 10]
    """
    outside = z - max(core for core in _CORES if core < z)
    return outside if z <= 2 else outside - _filled_d_and_f(z)


def valence_orbitals(z: int) -> int:
    """Return the number of valence orbitals of an atom.

    >>> [valence_orbitals(z) for z in (1, 2, 8, 26, 34, 64)]
    [1, 1, 4, 9, 4, 16]
    """
    if z <= 2:
        return 1
    if any(z in block for block in _F_BLOCK):
        return 16
    return 9 if any(z in block for block in _D_BLOCK) else 4


def most_unpaired(numbers: Iterable[int], charge: int, n_bonds: int = 0) -> int | None:
    """Return how many electrons the valence space leaves unpaired at most; None where it does not hold them all.

    Parameters
    ----------
    numbers : atomic numbers.
    charge : of the species.
    n_bonds : bonds that are to stay whole.

    """
    atoms = list(numbers)
    n_electrons = sum(map(valence_electrons, atoms)) - charge - 2 * n_bonds
    n_orbitals = sum(map(valence_orbitals, atoms)) - 2 * n_bonds
    if not 0 <= n_electrons <= 2 * n_orbitals:
        return None
    return min(n_electrons, 2 * n_orbitals - n_electrons)


def count_bonds(bonds: Bonds) -> int:
    """Return the number of covalent bonds, a multiple bond counted once."""
    return sum(map(len, bonds.neighbours)) // 2


def _filled_d_and_f(z: int) -> int:
    """Return the electrons of filled d and f shells that lie below the valence orbitals of an element."""
    n_filled = 10 * any(block[-1] < z <= _next_noble(block[-1]) for block in _D_BLOCK)
    return n_filled + 14 * any(block[-1] < z <= _next_noble(block[-1]) for block in _F_BLOCK)


def _next_noble(after: int) -> int:
    return next(gas for gas in _NOBLE_GASES if gas > after)
