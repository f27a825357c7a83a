"""Bonds from interatomic distances.

Two atoms are bonded if they are not farther apart than the sum of their covalent radii and a tolerance. Bonds to
metals that form ions are kept apart as contacts, since they are no covalent valence. A hydrogen keeps one bond,
its shortest, unless it bridges two electron-deficient centres; hydrogen bonds and H...H contacts are no bonds.

Provides `perceive_bonds` and the record `Bonds`.
Source of the radii: B. Cordero et al., Dalton Trans. 2008, 2832. The tolerances are common practice, no source.
"""

from collections.abc import Iterable
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from checker.chemistry.neighbours import Floats, Ints, neighbour_pairs
from checker.tables.structure import cordero_radii, is_covalent

HEAVY_TOLERANCE_ANGSTROM = 0.40
"""Slack between two atoms other than hydrogen; wide enough for the long N-N bond of N2O4 (1.78)."""

HYDROGEN_TOLERANCE_ANGSTROM = 0.30
"""Slack on a bond to hydrogen; a hydrogen bond is longer by far."""

OVERLAP_ANGSTROM = 0.45
"""Two nuclei nearer than this are no bond but a slip: the shortest bond there is, H2, is 0.74 long."""

STRETCH_ANGSTROM = 0.15
"""An atom with more neighbours than its shell holds loses contacts longer than the radii by more than this."""

METAL_CONTACT_LIMIT_ANGSTROM = 4.5
"""Two metal atoms farther apart than this are no contact, whatever their radii."""

_MOST_NEIGHBOURS = {5: 4, 6: 4, 7: 4, 8: 3, 9: 1, 14: 4, 15: 4, 16: 4, 17: 1, 32: 4, 35: 1, 53: 1}
_BRIDGED_BY_HYDROGEN = frozenset({5, 13, 31})


@dataclass(frozen=True, slots=True, eq=False)
class Bonds:
    """Who is bonded to whom. Atom indices count from 0.

    Attributes
    ----------
    neighbours : for each atom the covalently bonded ones, nearest first.
    lengths : the same shape, angstrom.
    contacts : for each atom the neighbours across a bond to a metal (either end may be the metal).
    overlaps : pairs of nuclei that lie on each other, with their distance in angstrom.
    """

    neighbours: tuple[list[int], ...]
    lengths: tuple[list[float], ...]
    contacts: dict[int, list[int]]
    overlaps: tuple[tuple[int, int, float], ...]

    def degrees(self) -> Ints:
        """Return the number of covalent bonds of each atom, (n,)."""
        return np.fromiter(map(len, self.neighbours), dtype=np.int64, count=len(self.neighbours))

    def component(self, atom: int) -> list[int]:
        """Return the atoms joined to this one by covalent bonds, itself included, ascending."""
        seen = {atom}
        waiting = [atom]
        while waiting:
            for other in self.neighbours[waiting.pop()]:
                if other not in seen:
                    seen.add(other)
                    waiting.append(other)
        return sorted(seen)


def perceive_bonds(numbers: Ints, coordinates: Floats) -> Bonds:
    """Find the bonds of a structure.

    Parameters
    ----------
    numbers : (n,) int array of atomic numbers, real atoms only.
    coordinates : (n, 3) float array, angstrom.

    Raises
    ------
    NotDerivable
        If the atoms lie so dense that they are no molecule.
    """
    numbers = np.asarray(numbers, dtype=np.int64)
    covalent = is_covalent()[numbers]
    pairs, distances = _candidate_pairs(numbers, coordinates, covalent)
    first, second = pairs[:, 0], pairs[:, 1]
    excess = distances - cordero_radii()[numbers[first]] - cordero_radii()[numbers[second]]
    has_hydrogen = (numbers[first] == 1) | (numbers[second] == 1)
    slack = np.where(has_hydrogen, HYDROGEN_TOLERANCE_ANGSTROM, HEAVY_TOLERANCE_ANGSTROM)
    overlap = distances < OVERLAP_ANGSTROM
    bonded = (excess <= slack) & ~overlap
    both = covalent[first] & covalent[second]
    links = _Links(numbers, pairs[bonded & both], distances[bonded & both], excess[bonded & both])
    links.prune()
    neighbours, lengths = links.lists()
    overlaps = [(int(i), int(j), float(d)) for (i, j), d in zip(pairs[overlap], distances[overlap], strict=True)]
    return Bonds(neighbours, lengths, _contacts(pairs[bonded & ~both].tolist()), tuple(overlaps))


def _candidate_pairs(numbers: Ints, coordinates: Floats, covalent: NDArray[np.bool_]) -> tuple[Ints, Floats]:
    """Pairs worth looking at; metal pairs are searched apart, lest their size widen the whole search."""
    radii = cordero_radii()[numbers]
    if not len(numbers):
        return np.empty((0, 2), dtype=np.int64), np.empty(0)
    if covalent.all():
        return neighbour_pairs(coordinates, 2 * float(radii.max()) + HEAVY_TOLERANCE_ANGSTROM)
    largest = float(radii[covalent].max()) if covalent.any() else 0.0
    reach = largest + max(float(radii.max()), largest) + HEAVY_TOLERANCE_ANGSTROM
    pairs, distances = neighbour_pairs(coordinates, reach)
    metals = np.flatnonzero(~covalent)
    if len(metals) < 2:
        return pairs, distances
    metal_pairs, metal_distances = neighbour_pairs(coordinates[metals], METAL_CONTACT_LIMIT_ANGSTROM)
    mixed = covalent[pairs[:, 0]] | covalent[pairs[:, 1]]
    joined = np.concatenate([pairs[mixed], metals[metal_pairs]])
    return joined, np.concatenate([distances[mixed], metal_distances])


def _contacts(pairs: Iterable[list[int]]) -> dict[int, list[int]]:
    contacts: dict[int, list[int]] = {}
    for i, j in pairs:
        contacts.setdefault(i, []).append(j)
        contacts.setdefault(j, []).append(i)
    return contacts


class _Links:
    """The bonds while they are being sorted out."""

    def __init__(self, numbers: Ints, pairs: Ints, distances: Floats, excess: Floats) -> None:
        self.numbers = numbers
        order = np.argsort(excess, kind="stable")
        self.pairs = pairs[order]
        self.distances = distances[order]
        self.excess = excess[order]

    def prune(self) -> None:
        """Drop what is too many: second bonds of hydrogens, bonds across hydrogen bridges, stretched contacts."""
        crowded = self._rows_of_crowded_hydrogens()
        kept_by = {atom: self._best_of_hydrogen(atom, rows) for atom, rows in crowded.items()}
        doomed = {row for atom, rows in crowded.items() for row in rows if row not in kept_by[atom]}
        doomed |= self._across_bridges(kept_by)
        doomed |= self._stretched(doomed)
        if doomed:
            kept = np.ones(len(self.pairs), dtype=bool)
            kept[list(doomed)] = False
            self.pairs, self.distances = self.pairs[kept], self.distances[kept]

    def lists(self) -> tuple[tuple[list[int], ...], tuple[list[float], ...]]:
        """Return neighbours and bond lengths per atom, best bonds first."""
        neighbours: tuple[list[int], ...] = tuple([] for _ in range(len(self.numbers)))
        lengths: tuple[list[float], ...] = tuple([] for _ in range(len(self.numbers)))
        for (i, j), length in zip(self.pairs.tolist(), self.distances.tolist(), strict=True):
            neighbours[i].append(j)
            neighbours[j].append(i)
            lengths[i].append(length)
            lengths[j].append(length)
        return neighbours, lengths

    def _degrees(self) -> Ints:
        return np.bincount(self.pairs.reshape(-1), minlength=len(self.numbers))

    def _rows_of_crowded_hydrogens(self) -> dict[int, list[int]]:
        """Rows of `pairs`, tightest bond first, for each hydrogen that has several."""
        crowded = (self._degrees() > 1) & (self.numbers == 1)
        rows_of: dict[int, list[int]] = {}
        if crowded.any():
            for row in np.flatnonzero(crowded[self.pairs].any(axis=1)).tolist():
                for atom in self.pairs[row].tolist():
                    if crowded[atom]:
                        rows_of.setdefault(atom, []).append(row)
        return rows_of

    def _best_of_hydrogen(self, atom: int, rows: list[int]) -> list[int]:
        """Return the rows a hydrogen keeps: its tightest to a heavy atom, or two across a bridge."""
        ends = {row: int(self.numbers[self._other_end(row, atom)]) for row in rows}
        bridge = [row for row in rows if ends[row] in _BRIDGED_BY_HYDROGEN]
        if len(bridge) >= 2:
            return bridge[:2]
        return ([row for row in rows if ends[row] != 1] or rows)[:1]

    def _other_end(self, row: int, atom: int) -> int:
        i, j = self.pairs[row].tolist()
        return int(j if i == atom else i)

    def _across_bridges(self, kept_by: dict[int, list[int]]) -> set[int]:
        """Bonds between two atoms that share bridging hydrogens, as in diborane."""
        bridged = {
            tuple(sorted(self._other_end(row, atom) for row in rows))
            for atom, rows in kept_by.items()
            if len(rows) == 2
        }
        return (
            {row for row, pair in enumerate(self.pairs.tolist()) if tuple(pair) in bridged} if bridged else set()
        )

    def _stretched(self, doomed: set[int]) -> set[int]:
        """Stretched contacts of atoms that have more neighbours than their shell holds, longest first."""
        limits = np.full(len(self.numbers), 99)
        for z, most in _MOST_NEIGHBOURS.items():
            limits[self.numbers == z] = most
        degrees = self._degrees()
        if not (degrees > limits).any():
            return set()
        for row in doomed:
            degrees[self.pairs[row]] -= 1
        dropped: set[int] = set()
        loose = np.flatnonzero(self.excess > STRETCH_ANGSTROM)[::-1]  # the rows stand tightest first
        for row in loose.tolist():
            i, j = self.pairs[row]
            if row not in doomed and (degrees[i] > limits[i] or degrees[j] > limits[j]):
                dropped.add(row)
                degrees[[i, j]] -= 1
        return dropped
