"""Descent in symmetry: what the irreps of a group become in a subgroup, and occupations both ways.

A subgroup lies in a group in a stated orientation, the turn that takes coordinates in the group's standard frame
into the subgroup's. Counts are of levels in the group and of orbitals in the subgroup: one level of T2 is three
orbitals, and in D2 one each of B1, B2 and B3.

Source: F. A. Cotton, Chemical Applications of Group Theory, 3rd ed., appendix IIB, for such tables (from memory).
"""

import contextlib
import itertools
from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass
from functools import cache
from types import MappingProxyType

import numpy as np
from numpy.typing import NDArray

from checker.chemistry.characters import characters_at, known_group, sample
from checker.chemistry.point_groups import (
    IDENTITY,
    SAME_OPERATION,
    Matrices,
    family_of,
    indices_of,
    rotation,
    standard_operations,
)
from checker.chemistry.products import reduce
from checker.errors import NotDerivable
from checker.tables.subgroups import abelian_rows

Correlation = Mapping[str, Mapping[str, int]]
"""For each irrep of the group, how often each irrep of the subgroup occurs in it."""


@dataclass(frozen=True, eq=False)
class Subgroup:
    """A subgroup in its orientation.

    Attributes
    ----------
    symbol : Schoenflies symbol.
    turn : (3, 3) takes coordinates in the group's standard frame into the subgroup's.

    """

    symbol: str
    turn: Matrices


@cache
def abelian_subgroups(symbol: str) -> tuple[Subgroup, ...]:
    """Return the largest subgroups of a group that are subgroups of D2h, in the order of preference.

    Raises ValueError where there is no such group.

    >>> [subgroup.symbol for subgroup in abelian_subgroups("Td")]
    ['D2', 'C2v']
    """
    family, n = family_of(known_group(symbol).symbol)
    rows = [row for row in abelian_rows()[family] if row.holds_for(n)]
    return tuple(Subgroup(row.subgroup, _turn(row.turn, n or 2)) for row in rows)


@cache
def operations_of(symbol: str, subgroup: str) -> NDArray[np.int64]:
    """Return which of `standard_operations` of a finite group are those (k,) of one of its abelian groups.

    Raises ValueError where the table has no such subgroup.
    """
    turns = [choice.turn for choice in abelian_subgroups(symbol) if choice.symbol == subgroup]
    if not turns:
        raise ValueError(f"{subgroup} is not the abelian group of {symbol}")
    placed = turns[0].T @ standard_operations(subgroup) @ turns[0]
    indices = indices_of(placed, standard_operations(symbol))
    indices.setflags(write=False)
    return indices


def _turn(words: str, n: int) -> Matrices:
    """Return the turn that the table describes; Td counts as having the S4 axes of D2d."""
    if words == "half step":
        turn = rotation((0.0, 0.0, 1.0), -np.pi / (2 * n))
    else:
        signs = [-1.0 if axis.startswith("-") else 1.0 for axis in words.split()]
        turn = np.array(
            [sign * IDENTITY["xyz".index(a[-1])] for sign, a in zip(signs, words.split(), strict=True)]
        )
    turn.setflags(write=False)
    return turn


@cache
def orbital_correlation(symbol: str, subgroup: str | None = None) -> Correlation:
    """Return `abelian_correlation` with those irreps only that functions of one electron can have."""
    whole = abelian_correlation(symbol, subgroup)
    orbital = {irrep.name for irrep in known_group(symbol).irreps if irrep.of_orbitals}
    return MappingProxyType({name: row for name, row in whole.items() if name in orbital})


@cache
def abelian_correlation(symbol: str, subgroup: str | None = None) -> Correlation:
    """Return the correlation of a group with its abelian group, or with the one of that name where it has several.

    Raises ValueError where the table has no such subgroup.
    """
    choices = abelian_subgroups(symbol)
    wanted = [choice for choice in choices if subgroup in (None, choice.symbol)]
    if not wanted:
        raise ValueError(f"{subgroup} is not the abelian group of {symbol}, which is {choices[0].symbol}")
    return correlation(symbol, wanted[0].symbol, wanted[0].turn)


def correlation(symbol: str, subgroup: str, turn: Matrices = IDENTITY) -> Correlation:
    """Return what each irrep of a group becomes in a subgroup.

    Parameters
    ----------
    symbol, subgroup : the two groups; either may be continuous.
    turn : (3, 3) takes coordinates in the group's standard frame into the subgroup's.

    An atom's irreps of very high angular momentum are left out where the subgroup is continuous. Raises ValueError
    where the turned operations are not all operations of the group.

    >>> correlation("D∞h", "D2h")["Πu"]
    {'B2u': 1, 'B3u': 1}
    """
    whole, part = known_group(symbol), known_group(subgroup)
    operations = np.einsum("ji,kjl,lm->kim", turn, sample(part.symbol).operations, turn)
    if not np.all(belong_to(whole.symbol, operations)):
        raise ValueError(f"{part.symbol} in this orientation is no subgroup of {whole.symbol}")
    found = {}
    for irrep, row in zip(whole.irreps, characters_at(whole.symbol, operations), strict=True):
        with contextlib.suppress(NotDerivable):
            found[irrep.name] = reduce(part.symbol, row)
    return MappingProxyType(found)


def belong_to(symbol: str, operations: Matrices) -> NDArray[np.bool_]:
    """Tell which of the operations (k, 3, 3) are operations of a group in its standard frame, shape (k,)."""
    group = known_group(symbol)
    if not group.is_continuous:
        return np.asarray(indices_of(operations, standard_operations(group.symbol)) >= 0)
    along = operations[:, 2, 2]
    if group.symbol == "Kh":
        along = np.ones_like(along)
    elif group.symbol == "D∞h":
        along = np.abs(along)
    return np.asarray(np.abs(along - 1.0) < SAME_OPERATION)


def descend(into: Correlation, levels: Mapping[str, int]) -> dict[str, int]:
    """Return the orbitals per irrep of the subgroup that so many levels per irrep of the group become.

    Raises ValueError for an irrep that the group does not have.

    >>> descend(abelian_correlation("Td"), {"A1": 2, "T2": 1})
    {'A': 2, 'B1': 1, 'B2': 1, 'B3': 1}
    """
    found: dict[str, int] = {}
    for name, n in levels.items():
        if name not in into:
            raise ValueError(f"the group has no irrep {name!r}")
        for below, times in into[name].items():
            found[below] = found.get(below, 0) + n * times
    return found


def possible_levels(
    into: Correlation, orbitals: Mapping[str, int], most: Mapping[str, int] | None = None, limit: int = 2
) -> tuple[dict[str, int], ...]:
    """Return sets of whole levels of the group that become exactly these orbitals of the subgroup.

    Parameters
    ----------
    into : the correlation of group and subgroup; irreps to be left out are simply not in it.
    orbitals : how many of each irrep of the subgroup; what is not named is none.
    most : the levels there are of each irrep of the group; without it, any number.
    limit : how many sets to return at most.

    Returns the sets as levels by irrep, none left out that are zero; empty where some level must be partly filled.
    """
    below = list(dict.fromkeys([*(name for row in into.values() for name in row), *orbitals]))
    patterns: dict[tuple[int, ...], list[str]] = {}
    for name, row in into.items():
        patterns.setdefault(tuple(row.get(sub, 0) for sub in below), []).append(name)
    wanted = np.array([orbitals.get(sub, 0) for sub in below])
    if wanted.min() < 0 or not _in_span(np.array(list(patterns)), wanted):
        return ()
    caps = {name: max(0, int(wanted.sum()) if most is None else most.get(name, 0)) for name in into}
    found = (
        dict(zip(itertools.chain(*patterns.values()), itertools.chain(*split), strict=True))
        for totals in _totals(list(patterns), wanted, [sum(caps[name] for name in p) for p in patterns.values()])
        for split in _splits(totals, [[caps[name] for name in alike] for alike in patterns.values()])
    )
    in_order = ({name: levels[name] for name in into if levels[name]} for levels in found)
    return tuple(itertools.islice(in_order, limit))


def _in_span(patterns: NDArray[np.int64], wanted: NDArray[np.int64]) -> bool:
    """Tell whether fractions of levels could do it: if not, there is no need to search."""
    solution = np.linalg.lstsq(patterns.T.astype(float), wanted.astype(float), rcond=None)[0]
    return bool(np.allclose(patterns.T @ solution, wanted, atol=1e-6))


def _totals(
    patterns: Sequence[tuple[int, ...]], wanted: NDArray[np.int64], caps: Sequence[int]
) -> Iterator[tuple[int, ...]]:
    """Yield how many levels of each pattern add up to what is wanted; the broadest patterns are tried first."""
    order = sorted(range(len(patterns)), key=lambda i: (-sum(patterns[i]), i))
    rows = [np.array(patterns[i]) for i in order]
    open_after = [sum(rows[k + 1 :], start=np.zeros_like(wanted)) for k in range(len(rows))]

    def search(k: int, left: NDArray[np.int64]) -> Iterator[tuple[int, ...]]:
        if k == len(rows):
            if not left.any():
                yield ()
            return
        used = rows[k] > 0
        fits = min(int((left[used] // rows[k][used]).min()), caps[order[k]]) if used.any() else 0
        for n in range(fits, -1, -1):
            rest = left - n * rows[k]
            if np.any(rest[open_after[k] == 0]):
                continue  # nothing that comes later could fill these
            for others in search(k + 1, rest):
                yield (n, *others)

    for counts in search(0, wanted):
        by_pattern = dict(zip(order, counts, strict=True))
        yield tuple(by_pattern[i] for i in range(len(patterns)))


def _splits(totals: Sequence[int], caps: Sequence[Sequence[int]]) -> Iterator[tuple[tuple[int, ...], ...]]:
    """Yield the ways to share the levels of each pattern among the irreps that have it."""
    return itertools.product(*(tuple(_shares(n, of)) for n, of in zip(totals, caps, strict=True)))


def _shares(n: int, caps: Sequence[int]) -> Iterator[tuple[int, ...]]:
    if not caps:
        if n == 0:
            yield ()
        return
    for first in range(min(n, caps[0]), max(0, n - sum(caps[1:])) - 1, -1):
        for rest in _shares(n - first, caps[1:]):
            yield (first, *rest)


def ascend(
    into: Correlation, orbitals: Mapping[str, int], most: Mapping[str, int] | None = None
) -> dict[str, int]:
    """Return the levels of the group that these orbitals of the subgroup are, where that is unique.

    Raises ValueError where no whole levels fit, and where several sets do.
    """
    found = possible_levels(into, orbitals, most, limit=2)
    if len(found) != 1:
        raise ValueError("no whole levels fit" if not found else "several sets of levels fit")
    return found[0]
