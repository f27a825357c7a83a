"""What the author most likely meant, where electron count and multiplicity do not fit together.

Each cause is a single slip: the multiplicity or the charge off by one, a hydrogen lost or one too many, an atom
pasted twice, a core potential miscounted. Its weight is the prior of the slip times the weight of the job that
mending it leaves: do the valences then close with that charge and multiplicity, and is there room for the
hydrogen? How well this ranks is measured in tests/outside/test_g2_parity.py.

Provides `rank_causes` and the record `Cause`.
"""

import enum
from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass, replace

import numpy as np

from checker.chemistry.bonding import Bonds, perceive_bonds
from checker.chemistry.hydrogens import HydrogenEdit, lost_hydrogens, surplus_hydrogens
from checker.chemistry.neighbours import Floats, Ints
from checker.chemistry.plausibility import free_atom_weight, state_weight
from checker.chemistry.reasons import Wording, why_charge, why_doubled, why_multiplicity
from checker.chemistry.valence import Valence, assign_valences
from checker.elements import name_of, symbol_of

MOST_CAUSES = 8
LEAST_CAUSES = 3
SHARPNESS = 1.6
"""Power that turns weights into shares. On G2 the shares agree best with the hits at 2.0; decks are messier."""
LEAST_SHARE = 0.01
"""Causes below this share of the weight are not worth a line."""

PRIOR_MULTIPLICITY = 1.0
PRIOR_CHARGE = 1.0
PRIOR_HYDROGEN_LOST = 1.2
PRIOR_HYDROGEN_SURPLUS = 0.5
PRIOR_ATOM_DOUBLED = 30.0
PRIOR_CORE_UNPUBLISHED = 3.0
PRIOR_CORE_PUBLISHED = 0.03
PRIOR_CORE_SPIN = 12.0
"""Where a core potential holds an open f shell, whose spin is easily counted all the same."""


class Slip(enum.StrEnum):
    """The kinds of slip."""

    MULTIPLICITY = "multiplicity"
    CHARGE = "charge"
    HYDROGEN_MISSING = "hydrogen-missing"
    HYDROGEN_SURPLUS = "hydrogen-surplus"
    ATOM_DOUBLED = "atom-doubled"
    CORE_POTENTIAL = "core-potential"


@dataclass(frozen=True, slots=True, kw_only=True)
class Cause:
    """One slip and its mending. Atom indices count from 0 over the atoms given.

    Attributes
    ----------
    kind : what slipped.
    weight : 0 to 1; the weights of a list add up to 1.
    reason : one clause in the words of chemistry.
    multiplicity, charge : the new value, where that is the mending.
    atoms : the atom that lost a hydrogen, the surplus hydrogen, or the copies to delete.
    position : (x, y, z) angstrom of the hydrogen to add.
    core_electrons : atomic number and new number of electrons replaced per atom.
    """

    kind: Slip
    weight: float
    reason: str
    multiplicity: int | None = None
    charge: int | None = None
    atoms: tuple[int, ...] = ()
    position: tuple[float, float, float] | None = None
    core_electrons: tuple[int, int] | None = None


def rank_causes(
    numbers: Ints,
    coordinates: Floats,
    charge: int,
    multiplicity: int,
    *,
    replaced: Mapping[int, int] | None = None,
    published: Mapping[int, Sequence[int]] | None = None,
    valence: Valence | None = None,
    numbering: Ints | None = None,
    unpaired_in_core: int = 0,
) -> tuple[Cause, ...]:
    """Return the slips that may have led to a multiplicity that the electrons do not allow, likeliest first.

    Empty where electrons and multiplicity fit.

    Parameters
    ----------
    numbers, coordinates : (n,) atomic numbers of the real atoms, (n, 3) angstrom.
    charge, multiplicity : as stated.
    replaced : electrons replaced per atom by a core potential, by atomic number.
    published : counts that published potentials use, by atomic number.
    valence : as found by `assign_valences`; found here if left out.
    numbering : (n,) the numbers that people know the atoms by; 1, 2, ... if left out.
    unpaired_in_core : unpaired f electrons, of all atoms, that the core potentials hold.

    Raises
    ------
    NotDerivable
        If the atoms lie so dense that they are no molecule.
    """
    numbers, coordinates = np.asarray(numbers, dtype=np.int64), np.asarray(coordinates, dtype=np.float64)
    cores = dict(replaced or {})
    if (_count_electrons(numbers, cores) - charge) % 2 != multiplicity % 2:
        return ()
    bonds = valence.bonds if valence else perceive_bonds(numbers, coordinates)
    copies = _copies(numbers, bonds)
    kept = np.setdiff1d(np.arange(len(numbers)), copies)
    known_by = np.arange(1, len(numbers) + 1) if numbering is None else numbering
    if copies or valence is None:
        valence = assign_valences(numbers[kept], coordinates[kept], None if copies else bonds)
    job = _Job(
        numbers[kept], charge, multiplicity, cores, published or {}, copies, kept, known_by, unpaired_in_core
    )
    return _normalised(job.causes(valence))


def _count_electrons(numbers: Ints, cores: Mapping[int, int]) -> int:
    """Count the electrons of the neutral atoms outside the replaced cores."""
    replaced = sum(int(np.count_nonzero(numbers == z)) * count for z, count in cores.items())
    return int(numbers.sum()) - replaced


def _copies(numbers: Ints, bonds: Bonds) -> tuple[int, ...]:
    """Return the later atom of each pair of like nuclei that lie on each other."""
    return tuple(sorted({j for i, j, _ in bonds.overlaps if numbers[i] == numbers[j]}))


def _normalised(causes: Iterator[Cause]) -> tuple[Cause, ...]:
    """Rank the causes and make their weights shares; the tail is cut, that of the first three later."""
    ranked = sorted(causes, key=lambda cause: -cause.weight)[:MOST_CAUSES]
    weights = [cause.weight**SHARPNESS for cause in ranked]
    total = sum(weights)
    kept = sum(
        1
        for place, weight in enumerate(weights)
        if weight >= (LEAST_SHARE if place >= LEAST_CAUSES else LEAST_SHARE / 10) * total
    )
    share = sum(weights[:kept])
    return tuple(
        replace(cause, weight=weight / share) for cause, weight in zip(ranked[:kept], weights, strict=False)
    )


@dataclass(frozen=True)
class _Job:
    """The job as stated, with copies of atoms taken out; `kept` are the indices of the atoms that stay."""

    numbers: Ints
    charge: int
    multiplicity: int
    cores: Mapping[int, int]
    published: Mapping[int, Sequence[int]]
    copies: tuple[int, ...]
    kept: Ints
    numbering: Ints
    unpaired_in_core: int

    def causes(self, valence: Valence) -> Iterator[Cause]:
        yield from self._doubled(valence)
        yield from self._core_spin(valence)
        yield from self._multiplicities(valence)
        yield from self._charges(valence)
        yield from self._hydrogens(valence)
        yield from self._cores(valence)

    def _electrons(self) -> int:
        return _count_electrons(self.numbers, self.cores) - self.charge

    def _weight(self, valence: Valence, charge: int, multiplicity: int) -> float:
        """Weight of a charge and multiplicity for the atoms as they stand."""
        if len(self.numbers) != 1 or self.cores:
            return state_weight(valence.tally, charge, multiplicity)
        return free_atom_weight(int(self.numbers[0]), charge, multiplicity)

    def _index(self, atom: int) -> int:
        return int(self.kept[atom])

    def _label(self, atom: int) -> str:
        return f"{name_of(int(self.numbers[atom]))} {self.numbering[self._index(atom)]}"

    def _wording(self, valence: Valence) -> Wording:
        return Wording(valence, self.charge, self.multiplicity, self._label)

    def _doubled(self, valence: Valence) -> Iterator[Cause]:
        """Blame the copies if taking them out changes the parity of the electrons."""
        if self._electrons() % 2 == self.multiplicity % 2:
            return
        yield Cause(
            kind=Slip.ATOM_DOUBLED,
            weight=PRIOR_ATOM_DOUBLED * max(0.05, self._weight(valence, self.charge, self.multiplicity)),
            reason=why_doubled([int(self.numbering[atom]) for atom in self.copies]),
            atoms=self.copies,
        )

    def _multiplicities(self, valence: Valence) -> Iterator[Cause]:
        for multiplicity in (self.multiplicity - 1, self.multiplicity + 1):
            weight = self._weight(valence, self.charge, multiplicity) if multiplicity >= 1 else 0.0
            if weight and self.multiplicity - multiplicity != self.unpaired_in_core:
                yield Cause(
                    kind=Slip.MULTIPLICITY,
                    weight=PRIOR_MULTIPLICITY * weight,
                    reason=why_multiplicity(self._wording(valence), multiplicity),
                    multiplicity=multiplicity,
                )

    def _core_spin(self, valence: Valence) -> Iterator[Cause]:
        """Blame an f spin that was counted although the core potentials hold it."""
        multiplicity = self.multiplicity - self.unpaired_in_core
        if self.unpaired_in_core % 2 and multiplicity >= 1:
            yield Cause(
                kind=Slip.MULTIPLICITY,
                weight=PRIOR_CORE_SPIN * self._weight(valence, self.charge, multiplicity),
                reason=f"{self.unpaired_in_core} of the unpaired electrons are f electrons in the core potential",
                multiplicity=multiplicity,
            )

    def _charges(self, valence: Valence) -> Iterator[Cause]:
        for charge in (self.charge - 1, self.charge + 1):
            weight = self._weight(valence, charge, self.multiplicity)
            if weight:
                yield Cause(
                    kind=Slip.CHARGE,
                    weight=PRIOR_CHARGE * weight,
                    reason=why_charge(self._wording(valence), charge),
                    charge=charge,
                )

    def _hydrogens(self, valence: Valence) -> Iterator[Cause]:
        lost = [(edit, Slip.HYDROGEN_MISSING, PRIOR_HYDROGEN_LOST) for edit in lost_hydrogens(valence)]
        surplus = [(edit, Slip.HYDROGEN_SURPLUS, PRIOR_HYDROGEN_SURPLUS) for edit in surplus_hydrogens(valence)]
        for edit, kind, prior in (*lost, *surplus):
            weight = prior * edit.fit * state_weight(edit.tally_after, self.charge, self.multiplicity)
            if weight:
                yield self._hydrogen_cause(edit, kind, weight)

    def _hydrogen_cause(self, edit: HydrogenEdit, kind: Slip, weight: float) -> Cause:
        centre = "" if edit.centre is None else f" {self._label(edit.centre)}"
        return Cause(
            kind=kind,
            weight=weight,
            reason=f"{self._label(edit.atom)} {edit.reason}{centre}",
            atoms=(self._index(edit.atom),),
            position=edit.position,
        )

    def _cores(self, valence: Valence) -> Iterator[Cause]:
        for z, stated in self.cores.items():
            if not stated or int(np.count_nonzero(self.numbers == z)) % 2 == 0:
                continue
            known = tuple(self.published.get(z, ()))
            prior = PRIOR_CORE_PUBLISHED if stated in known or not known else PRIOR_CORE_UNPUBLISHED
            odd_steps = [count for count in known if (count - stated) % 2]
            for rank, count in enumerate(sorted(odd_steps, key=lambda count: (abs(count - stated), count))):
                yield Cause(
                    kind=Slip.CORE_POTENTIAL,
                    weight=prior * 0.3**rank * max(0.05, self._weight(valence, self.charge, self.multiplicity)),
                    reason=f"published potentials of {symbol_of(z)} replace {count} electrons, not {stated}",
                    core_electrons=(z, count),
                )
