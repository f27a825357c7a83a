"""Reduction of representations, direct products and their symmetric parts, terms of open shells.

A representation is given by its characters at the operations of `characters.sample`. A pair of complex conjugates
counts as one irrep of dimension 2, so that the product of two such pairs has dimension 4 as that of true E has.

The terms of electrons in degenerate levels are counted as those of an atom are: n_alpha electrons of one spin in a
level span its antisymmetric power, the products over spins and levels give the states of each M_S, and what M_S
has more than M_S + 1 are the terms of that spin.

Source: F. A. Cotton, Chemical Applications of Group Theory, 3rd ed., secs. 4.3 and 5.2; E. U. Condon & G. H.
Shortley, The Theory of Atomic Spectra (1935), chap. 7, for the counting by M_S (from memory).
"""

from collections.abc import Mapping
from functools import cache

import numpy as np

from checker.chemistry.characters import Reals, Sample, characters_at, known_group, sample
from checker.chemistry.irrep_names import find_irrep
from checker.chemistry.irreps import PointGroup
from checker.errors import NotDerivable

NEARLY_WHOLE = 1e-3
"""Largest deviation of a multiplicity from a whole number; operations found in a geometry are not quite exact."""


def reduce(symbol: str, values: Reals, over: Sample | None = None) -> dict[str, int]:
    """Return how often each irrep occurs in a representation; irreps that do not occur are left out.

    Parameters
    ----------
    symbol : the group.
    values : (k,) characters of the representation at the operations of `over`, or of the group's own sample.
    over : another sample of the same group.

    Raises ValueError where the values are no characters of a representation, and `NotDerivable` where a continuous
    group would need angular momenta above those that are listed.
    """
    group = known_group(symbol)
    over = over or sample(group.symbol)
    exact = over.characters @ (over.weights * values) / over.norms
    counts = np.round(exact).astype(int)
    if np.abs(exact - counts).max() > NEARLY_WHOLE or counts.min() < 0:
        raise ValueError(f"these are not the characters of a representation of {group.symbol}")
    if group.is_continuous and round(float(counts @ over.characters[:, 0] - values[0])):
        raise NotDerivable(f"it needs higher angular momenta than are listed for {group.symbol}")
    return {irrep.name: int(n) for irrep, n in zip(group.irreps, counts, strict=True) if n}


@cache
def product(symbol: str, *names: str) -> Mapping[str, int]:
    """Return the irreps in the direct product of any number of irreps.

    Raises ValueError where the group has no irrep of such a name.

    >>> product("Td", "T1", "T2")
    {'A2': 1, 'E': 1, 'T1': 1, 'T2': 1}
    """
    group = known_group(symbol)
    rows = sample(group.symbol).characters[[_row(group, name) for name in names]]
    return reduce(group.symbol, np.asarray(np.prod(rows, axis=0)))


@cache
def symmetric_square(symbol: str, name: str) -> Mapping[str, int]:
    """Return the irreps in the symmetric part of the product of an irrep with itself.

    >>> symmetric_square("D∞h", "Πu")
    {'Σg+': 1, 'Δg': 1}
    """
    return _half_square(symbol, name, +1.0)


@cache
def antisymmetric_square(symbol: str, name: str) -> Mapping[str, int]:
    """Return the irreps in the antisymmetric part of the product of an irrep with itself.

    >>> antisymmetric_square("D∞h", "Πu")
    {'Σg-': 1}
    """
    return _half_square(symbol, name, -1.0)


@cache
def exterior_power(symbol: str, name: str, n: int) -> Mapping[str, int]:
    """Return the irreps of n electrons of one spin in a level: the antisymmetric n-th power of its irrep.

    Raises ValueError where the group has no irrep of such a name or its level holds no so many.

    >>> exterior_power("Oh", "T2g", 2)
    {'T1g': 1}
    """
    group = known_group(symbol)
    dimension = group.irreps[_row(group, name)].dimension
    if not 0 <= n <= dimension:
        raise ValueError(f"a level of {name} in {group.symbol} holds no {n} electrons of one spin")
    return reduce(group.symbol, _antisymmetric_powers(group, name, n)[n])


def _half_square(symbol: str, name: str, sign: float) -> dict[str, int]:
    group = known_group(symbol)
    once, twice = _powers(group, name, 2)
    return reduce(group.symbol, (once**2 + sign * twice) / 2)


def _row(group: PointGroup, name: str) -> int:
    irrep = find_irrep(group, name)
    if irrep is None:
        raise ValueError(f"{group.symbol} has no irrep {name!r}")
    return group.irreps.index(irrep)


def _powers(group: PointGroup, name: str, highest: int) -> list[Reals]:
    """Return the characters of an irrep at the first, second ... power of each operation of the sample."""
    row = _row(group, name)
    operations = sample(group.symbol).operations
    powers = [np.linalg.matrix_power(operations, k) for k in range(1, highest + 1)]
    return [characters_at(group.symbol, power)[row] for power in powers]


def terms_of_levels(symbol: str, electrons: Mapping[str, int]) -> dict[tuple[int, str], int]:
    """Return how often each term (multiplicity, irrep) occurs; full and empty levels may be left out.

    Parameters
    ----------
    symbol : the group.
    electrons : number of electrons in one level of each irrep.

    Raises ValueError for an irrep the group does not have or a level that holds no so many electrons, and
    `NotDerivable` where a continuous group would need angular momenta above those that are listed.

    >>> terms_of_levels("D∞h", {"Πg": 2})
    {(1, 'Σg+'): 1, (1, 'Δg'): 1, (3, 'Σg-'): 1}
    """
    group = known_group(symbol)
    states = {0: np.ones(len(sample(group.symbol).operations))}
    for name, n in electrons.items():
        states = _joined(states, _states_of_level(group, name, n))
    nothing = np.zeros(1)
    found: dict[tuple[int, str], int] = {}
    for twice_ms in sorted(ms for ms in states if ms >= 0):
        of_spin = states[twice_ms] - states.get(twice_ms + 2, nothing)
        found |= {(twice_ms + 1, name): n for name, n in reduce(group.symbol, of_spin).items()}
    return found


def _states_of_level(group: PointGroup, name: str, n: int) -> dict[int, Reals]:
    """Return the characters of the states of n electrons in a level by 2 M_S."""
    dimension = group.irreps[_row(group, name)].dimension
    if not 0 <= n <= 2 * dimension:
        raise ValueError(f"a level of {name} in {group.symbol} holds no {n} electrons")
    same_spin = _antisymmetric_powers(group, name, dimension)
    alphas = range(max(0, n - dimension), min(n, dimension) + 1)
    return {2 * n_alpha - n: same_spin[n_alpha] * same_spin[n - n_alpha] for n_alpha in alphas}


def _antisymmetric_powers(group: PointGroup, name: str, highest: int) -> list[Reals]:
    """Return the characters of the antisymmetric powers 0 to `highest` of an irrep (Newton's identities)."""
    powers = _powers(group, name, highest)
    found = [np.ones(len(sample(group.symbol).operations))]
    for k in range(1, highest + 1):
        terms = [(-1) ** (j - 1) * found[k - j] * powers[j - 1] for j in range(1, k + 1)]
        found.append(np.asarray(sum(terms)) / k)
    return found


def _joined(left: dict[int, Reals], right: dict[int, Reals]) -> dict[int, Reals]:
    joined: dict[int, Reals] = {}
    for left_ms, left_values in left.items():
        for right_ms, right_values in right.items():
            total = left_ms + right_ms
            joined[total] = joined.get(total, np.zeros(1)) + left_values * right_values
    return joined
