"""The shells that the electrons of a species occupy at most in its ground state: cores and the valence shell.

Per atom they are the subshells of the neutral atom's ground configuration, and the p subshell that belongs to its
outermost s. An irrep in which more orbitals are occupied than these shells span holds diffuse or antibonding ones
beyond any minimal picture. Common practice, no source.
"""

from functools import cache

import numpy as np
from numpy.typing import NDArray

from checker.chemistry.configurations import ground_level

HIGHEST = 3
"""Angular momentum of the highest shells counted, f."""


def minimal_shells(numbers: NDArray[np.int64], is_ghost: NDArray[np.bool_]) -> NDArray[np.int64]:
    """Return the occupied and valence shells (n, HIGHEST + 1) by atom and angular momentum; ghosts have none.

    Raises NotDerivable where the configuration of an element is unknown.

    >>> minimal_shells(np.array([1, 6, 26]), np.zeros(3, dtype=bool)).tolist()
    [[1, 0, 0, 0], [2, 1, 0, 0], [4, 3, 1, 0]]
    """
    rows = np.array([_of_element(z) for z in numbers.tolist()], dtype=np.int64).reshape(-1, HIGHEST + 1)
    return np.where(is_ghost[:, None], 0, rows)


@cache
def _of_element(z: int) -> tuple[int, ...]:
    subshells = {(n, ell) for n, ell, _ in ground_level(z, 0).occupation}
    outermost = max(n for n, _ in subshells)
    if outermost > 1:
        subshells |= {(outermost, 0), (outermost, 1)}
    momenta = [ell for _, ell in subshells]
    return tuple(momenta.count(ell) for ell in range(HIGHEST + 1))
