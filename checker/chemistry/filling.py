"""What an occupation by irrep means in the body's own group: whole degenerate levels, or one partly filled.

The electrons of one spin fill whole levels where whole numbers of levels of the full group become exactly the
counts in the group of the deck. Otherwise some level holds a part only, and the state is one of the terms of that
level; a single determinant belongs to one term where the part of each spin spans a single irrep.

Source: F. A. Cotton, Chemical Applications of Group Theory, 3rd ed., ch. 9 (from memory).
"""

import itertools
import math
from collections.abc import Mapping
from dataclasses import dataclass

from checker.chemistry.characters import known_group
from checker.chemistry.descent import Correlation, correlation, possible_levels
from checker.chemistry.irreps import LINEAR_LETTERS, PointGroup
from checker.chemistry.point_groups import IDENTITY, Matrices
from checker.chemistry.products import exterior_power, product, terms_of_levels

HIGHEST_OCCUPIED = 3
"""Angular momentum of the highest orbitals that are occupied in any ground state: f in atoms, phi in molecules."""

MOST_READINGS = 4
"""So many readings of an occupation are given, the likeliest ones."""

MOST_TRIED = 600
"""Sets of partners; a search that would need more is given up."""

MOST_PARTNERS = 4
"""Partners are sought among so many further states at most; a state of Ih has four partners."""


@dataclass(frozen=True, slots=True)
class OpenLevel:
    """A degenerate level that is partly filled.

    Attributes
    ----------
    irrep : of the full group.
    dimension : orbitals of the level.
    alpha, beta : electrons of each spin in it, by irrep of the deck's group.

    """

    irrep: str
    dimension: int
    alpha: Mapping[str, int]
    beta: Mapping[str, int]

    @property
    def n_alpha(self) -> int:
        """Alpha electrons in the level."""
        return sum(self.alpha.values())

    @property
    def n_beta(self) -> int:
        """Beta electrons in the level."""
        return sum(self.beta.values())

    @property
    def n_spins_in_part(self) -> int:
        """Of how many spins the level holds some electrons and not all that it can."""
        return sum(0 < n < self.dimension for n in (self.n_alpha, self.n_beta))

    @property
    def n_electrons(self) -> int:
        """Electrons in the level."""
        return self.n_alpha + self.n_beta


def electron_correlation(group: str, subgroup: str, turn: Matrices = IDENTITY) -> Correlation:
    """Return for each irrep of occupied orbitals of the group the electrons of one spin that fill a level of it.

    They are counted by irrep of the subgroup, as a deck counts them: a level of T2 holds three, in Td itself too.
    """
    dimensions = {irrep.name: irrep.dimension for irrep in known_group(subgroup).irreps}
    orbital = _of_occupied_orbitals(known_group(group))
    if group == subgroup:
        return {name: {name: dimensions[name]} for name in dimensions if name in orbital}
    return {
        name: {below: n * dimensions[below] for below, n in row.items()}
        for name, row in correlation(group, subgroup, turn).items()
        if name in orbital
    }


def _of_occupied_orbitals(group: PointGroup) -> set[str]:
    """Return the irreps that occupied orbitals can have: in the continuous groups none above f or phi."""
    highest = {"Kh": 2 * HIGHEST_OCCUPIED + 2}.get(group.symbol)
    letters = "".join(LINEAR_LETTERS)[: HIGHEST_OCCUPIED + 1]
    irreps = group.irreps[:highest] if highest else group.irreps
    if group.is_continuous and not highest:
        irreps = tuple(irrep for irrep in irreps if irrep.name[0] in letters)
    return {irrep.name for irrep in irreps if irrep.of_orbitals}


def fills_whole_levels(into: Correlation, electrons: Mapping[str, int], most: Mapping[str, int] | None) -> bool:
    """Tell whether electrons of one spin can be whole levels; `most` is the levels there are of each irrep."""
    return bool(possible_levels(into, electrons, most, limit=1))


def fill_whole_levels(
    into: Correlation, alpha: Mapping[str, int], beta: Mapping[str, int], most: Mapping[str, int] | None
) -> bool:
    """Tell whether the electrons of both spins can be whole levels.

    Where no irrep holds more electrons of the rarer spin, as in restricted orbitals, the unpaired ones too must be
    whole levels; else a level that the one spin fills could be lacking for the other.
    """
    unpaired = _unpaired(alpha, beta)
    return all(fills_whole_levels(into, counts, most) for counts in (alpha, beta, unpaired or {}))


def _unpaired(alpha: Mapping[str, int], beta: Mapping[str, int]) -> dict[str, int] | None:
    """Return by how much one spin exceeds the other, None where each does in some irrep."""
    excess = _without(alpha, beta)
    if all(n <= 0 for n in excess.values()):
        excess = {name: -n for name, n in excess.items()}
    return excess if all(n >= 0 for n in excess.values()) else None


def open_levels(
    into: Correlation, alpha: Mapping[str, int], beta: Mapping[str, int], most: Mapping[str, int] | None = None
) -> tuple[OpenLevel, ...]:
    """Return ways to read an occupation with one degenerate level partly filled; empty where there is none.

    Parameters
    ----------
    into : electrons per level, as `electron_correlation` gives them.
    alpha, beta : electrons of each spin by irrep of the deck's group.
    most : the levels there are of each irrep of the full group; None where that is unknown.

    An occupation that fills whole levels needs no such reading; ask `fill_whole_levels` first. Readings that leave
    the fewest unpaired electrons to other levels stand first, then those with the level in part for one spin only,
    then the smallest levels; the first few are given.
    """
    candidates = [
        OpenLevel(irrep, sum(level.values()), first, second)
        for irrep, level in into.items()
        if sum(level.values()) > 1 and (most is None or most.get(irrep, 0) > 0)
        for first, second in itertools.product(_parts(level, alpha), _parts(level, beta))
        if not {sum(first.values()), sum(second.values())} <= {0, sum(level.values())}
    ]
    candidates.sort(
        key=lambda a: (_n_unpaired_beside(a, alpha, beta), a.n_spins_in_part, a.dimension, a.n_electrons)
    )
    fitting = (
        level
        for level in candidates
        if fill_whole_levels(
            into, _without(alpha, level.alpha), _without(beta, level.beta), _one_less(most, level.irrep)
        )
    )
    return tuple(itertools.islice(fitting, MOST_READINGS))


def _n_unpaired_beside(level: OpenLevel, alpha: Mapping[str, int], beta: Mapping[str, int]) -> int:
    """Return the unpaired electrons that a reading leaves to other levels, at least."""
    return sum(map(abs, _without(_without(alpha, level.alpha), _without(beta, level.beta)).values()))


def _parts(level: Mapping[str, int], counts: Mapping[str, int]) -> list[dict[str, int]]:
    """Return what a level may hold of the electrons of one spin, nothing and all of it included."""
    ranges = [range(min(n, counts.get(name, 0)) + 1) for name, n in level.items()]
    return [
        {name: n for name, n in zip(level, numbers, strict=True) if n} for numbers in itertools.product(*ranges)
    ]


def _without(counts: Mapping[str, int], part: Mapping[str, int]) -> dict[str, int]:
    return {name: counts.get(name, 0) - part.get(name, 0) for name in {**counts, **part}}


def _one_less(most: Mapping[str, int] | None, irrep: str) -> dict[str, int] | None:
    return None if most is None else {**most, irrep: most.get(irrep, 0) - 1}


def terms_of(
    group: str, level: OpenLevel, subgroup: str, partners: Mapping[str, int], below: Correlation
) -> tuple[str, ...]:
    """Return the terms that a determinant with such an open level may belong to, the highest multiplicity first.

    They are named ``3Σg-``, ``1Δg``, ``1Σg+``; a term that occurs twice stands twice, so a determinant is of one
    term where one stands here. With n more electrons of one spin than of the other no multiplicity is below n + 1;
    where both spins fill the same orbitals it is 1. And what the term becomes in the subgroup must hold an irrep
    of the product of the partners that are filled.

    Parameters
    ----------
    group, subgroup : the body's and the deck's, by which `level` counts.
    partners : electrons of one spin that fill the level, by irrep of the subgroup.
    below : the correlation of the two groups, of states.

    """
    terms = terms_of_levels(group, {level.irrep: level.n_electrons})
    lowest = abs(level.n_alpha - level.n_beta) + 1
    highest = 1 if dict(level.alpha) == dict(level.beta) else level.n_electrons + 1
    irreps = _product_of_filled(subgroup, level, partners)
    possible = [
        (multiplicity, irrep)
        for multiplicity, irrep in terms
        if lowest <= multiplicity <= highest and (irrep not in below or irreps & below[irrep].keys())
    ]
    in_order = sorted(possible, key=lambda term: -term[0])
    return tuple(f"{term[0]}{term[1]}" for term in in_order for _ in range(terms[term]))


def _product_of_filled(subgroup: str, level: OpenLevel, partners: Mapping[str, int]) -> frozenset[str]:
    """Return the irreps of the subgroup that the electrons in a level have together."""
    dimensions = {irrep.name: irrep.dimension for irrep in known_group(subgroup).irreps}
    each_once = all(dimensions[name] == n for name, n in partners.items())
    alpha, beta = (state_irreps(subgroup, part, one_level=each_once) for part in (level.alpha, level.beta))
    return frozenset(name for a in alpha for b in beta for name in product(subgroup, a, b))


def state_irreps(group: str, unpaired: Mapping[str, int], one_level: bool = True) -> frozenset[str]:
    """Return the irreps that a state with so many unpaired electrons of one spin can have.

    Parameters
    ----------
    group : the group in which the occupation is given.
    unpaired : unpaired electrons by irrep.
    one_level : whether those of a degenerate irrep share one level if it holds them; else any levels are allowed.

    Raises ValueError for an irrep that the group does not have.
    """
    irreps = known_group(group).irreps
    dimensions = {irrep.name: irrep.dimension for irrep in irreps}
    found = {irreps[0].name}
    for irrep, n in unpaired.items():
        if irrep not in dimensions:
            raise ValueError(f"{group} has no irrep {irrep!r}")
        if dimensions[irrep] == 1:
            factors = set(product(group, *[irrep] * (n % 2)))
        elif one_level and n <= dimensions[irrep]:
            factors = set(exterior_power(group, irrep, n))
        else:
            factors = set(product(group, *[irrep] * n))
        found = {name for a in found for b in factors for name in product(group, a, b)}
    return frozenset(found)


def missing_partners(into: Correlation, roots: Mapping[str, int]) -> tuple[dict[str, int], ...]:
    """Return the fewest further states by irrep that make whole degenerate states of those asked for.

    Parameters
    ----------
    into : the correlation of the full group with the deck's, of states (all irreps).
    roots : states asked for by irrep of the deck's group.

    Returns the smallest additions, several where they tie; empty where nothing is missing or nothing helps.
    """
    if possible_levels(into, roots, limit=1):
        return ()
    near = [
        row
        for row in into.values()
        if 1 < sum(row.values()) <= MOST_PARTNERS + 1 and any(roots.get(name, 0) for name in row)
    ]
    within = {name for row in near for name in row}
    names = [name for name in dict.fromkeys(name for row in into.values() for name in row) if name in within]
    largest = max((sum(row.values()) for row in near), default=1) - 1
    for n_more in range(1, largest + 1):
        if math.comb(len(names) + n_more - 1, n_more) > MOST_TRIED:
            break
        found = []
        for chosen in itertools.combinations_with_replacement(names, n_more):
            added = {name: chosen.count(name) for name in dict.fromkeys(chosen)}
            total = {name: roots.get(name, 0) + added.get(name, 0) for name in {**roots, **added}}
            if possible_levels(into, total, limit=1):
                found.append(added)
        if found:
            return tuple(found)
    return ()
