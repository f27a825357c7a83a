"""The G2 systems with one slip injected at a time, and the score of a ranking of causes.

Data: the 162 systems of the G2 set as the ASE library carries them (L. A. Curtiss et al., J. Chem. Phys. 106, 1063
(1997)), with their spin from the initial magnetic moments.
"""

from collections.abc import Iterator
from dataclasses import dataclass

import numpy as np
from ase.collections import g2
from numpy.typing import NDArray

from checker.chemistry.bonding import perceive_bonds
from checker.chemistry.configurations import ground_level
from checker.chemistry.parity import Cause, Slip, rank_causes

OFFSETS_ANGSTROM = (0.01, 0.03, 0.05)


@dataclass(frozen=True)
class Case:
    """A job with one slip, and what mends it."""

    name: str
    slip: str
    numbers: NDArray[np.int64]
    coordinates: NDArray[np.float64]
    charge: int
    multiplicity: int
    truth: tuple[Slip, int]

    def ranked(self) -> tuple[Cause, ...]:
        """The causes found."""
        return rank_causes(self.numbers, self.coordinates, self.charge, self.multiplicity)


def mending(cause: Cause) -> tuple[Slip, int]:
    """A cause as (kind, new value or atom)."""
    if cause.kind is Slip.MULTIPLICITY:
        return cause.kind, cause.multiplicity or 0
    if cause.kind is Slip.CHARGE:
        return cause.kind, cause.charge or 0
    return cause.kind, cause.atoms[0] if cause.atoms else -1


def cases() -> Iterator[Case]:
    """Every slip of every molecule."""
    for name in g2.names:
        atoms = g2[name]
        numbers = np.array(atoms.numbers, dtype=np.int64)
        coordinates = np.array(atoms.positions)
        multiplicity = round(abs(float(np.sum(atoms.get_initial_magnetic_moments())))) + 1
        if len(numbers) == 1:
            multiplicity = ground_level(int(numbers[0]), 0).multiplicity or multiplicity
        yield from _stated_wrongly(name, numbers, coordinates, multiplicity)
        yield from _hydrogen_removed(name, numbers, coordinates, multiplicity)
        yield from _atom_doubled(name, numbers, coordinates, multiplicity)


def _stated_wrongly(
    name: str, numbers: NDArray[np.int64], coordinates: NDArray[np.float64], multiplicity: int
) -> Iterator[Case]:
    for step in (1, -1):
        truth = (Slip.CHARGE, 0)
        yield Case(name, f"charge {step:+d}", numbers, coordinates, step, multiplicity, truth)
        if multiplicity + step >= 1:
            truth = (Slip.MULTIPLICITY, multiplicity)
            slip = f"multiplicity {step:+d}"
            yield Case(name, slip, numbers, coordinates, 0, multiplicity + step, truth)


def _hydrogen_removed(
    name: str, numbers: NDArray[np.int64], coordinates: NDArray[np.float64], multiplicity: int
) -> Iterator[Case]:
    if len(numbers) < 2:
        return
    bonds = perceive_bonds(numbers, coordinates)
    for hydrogen in np.flatnonzero(numbers == 1).tolist():
        parents = bonds.neighbours[hydrogen] or bonds.contacts[hydrogen]
        parent = parents[0] - (parents[0] > hydrogen)
        kept = np.arange(len(numbers)) != hydrogen
        truth = (Slip.HYDROGEN_MISSING, parent)
        yield Case(name, "hydrogen removed", numbers[kept], coordinates[kept], 0, multiplicity, truth)


def _atom_doubled(
    name: str, numbers: NDArray[np.int64], coordinates: NDArray[np.float64], multiplicity: int
) -> Iterator[Case]:
    random = np.random.default_rng(7)
    for atom in np.flatnonzero(numbers % 2).tolist():
        direction = random.normal(size=3)
        shift = OFFSETS_ANGSTROM[atom % len(OFFSETS_ANGSTROM)]
        for slip, offset in (("atom doubled", 0.0), ("atom doubled, shifted", shift)):
            copy = coordinates[atom] + offset * direction / np.linalg.norm(direction)
            truth = (Slip.ATOM_DOUBLED, len(numbers))
            doubled = np.append(numbers, numbers[atom])
            yield Case(name, slip, doubled, np.vstack([coordinates, copy]), 0, multiplicity, truth)


@dataclass
class Score:
    """Hits of one kind of slip."""

    cases: int = 0
    first: int = 0
    in_three: int = 0
    atom_first: int = 0
    weight: float = 0.0

    def add(self, case: Case, causes: tuple[Cause, ...]) -> int:
        """Count a case; return the place of the true cause, from 0, or 99."""
        mendings = [mending(cause) for cause in causes]
        place = mendings.index(case.truth) if case.truth in mendings else 99
        hydrogens = [found for found in mendings if found[0] is Slip.HYDROGEN_MISSING]
        self.cases += 1
        self.first += place == 0
        self.in_three += place < 3
        self.atom_first += place < 3 and bool(hydrogens) and hydrogens[0] == case.truth
        self.weight += causes[place].weight if place < 99 else 0.0
        return place
