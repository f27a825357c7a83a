"""occupation-total: the occupations must add up to the electrons and the spin of the deck.

In the style alpha and beta, electrons are counted: their sum is the number of electrons that the job treats,
their difference is 2S. In the style paired and unpaired, orbitals are counted, each degenerate irrep with its
dimension (T2 = 1 is three orbitals): twice the paired and once the unpaired ones are the electrons, and there
are as many unpaired orbitals as 2S or more, since an open-shell singlet has two. Electrons that core
potentials replace are not counted, frozen ones are. Not judged where the books are unknown or an irrep is no
name of the group.

Passes: O2, multiplicity 3, alpha 9 and beta 7; singlet methylene with two unpaired orbitals.
Speaks: O2, multiplicity 3, alpha 8 and beta 8; iodide with 28 electrons replaced and 54 occupied.
Source: common practice, no source; it is counting.
"""

from collections.abc import Iterator, Mapping
from dataclasses import dataclass

from checker.chemistry.irrep_names import read_orbital
from checker.chemistry.irreps import PointGroup
from checker.errors import NotDerivable
from checker.facts import Facts
from checker.findings import Edit, Finding, Grade, Json, Repair
from checker.model import Occupations
from checker.registry import Rule

FARTHEST_CHARGE = 2
"""An occupation that fits a charge farther away than this is no slip of the charge."""


@dataclass(frozen=True, slots=True)
class _Sum:
    """What occupations add up to, and in which words."""

    n_electrons: int
    n_open: int
    words: str


def judge(facts: Facts) -> Iterator[Finding]:
    """Compare the sums with the books: first the electrons, then the spin."""
    occupations = facts.job.occupations
    if occupations is None or occupations == Occupations():
        return
    n_electrons = facts.n_electrons
    by_spin = occupations.alpha is not None or occupations.beta is not None
    summed = _by_spin(occupations) if by_spin else _by_pairs(facts, occupations)
    if by_spin and summed.n_electrons < n_electrons and None in (occupations.alpha, occupations.beta):
        yield _half_given(facts, occupations, summed)
    elif summed.n_electrons != n_electrons:
        yield _wrong_total(facts, summed)
    elif facts.job.species.multiplicity is not None:
        n_unpaired = facts.job.species.multiplicity - 1
        if by_spin and summed.n_open != n_unpaired:
            yield _wrong_difference(facts, occupations, summed)
        elif not by_spin and (summed.n_open < n_unpaired or (summed.n_open - n_unpaired) % 2):
            yield _wrong_number_open(facts, occupations, summed)


def _first_table(facts: Facts) -> str:
    occupations = facts.job.occupations
    given = [name for name in ("alpha", "beta", "paired", "unpaired") if getattr(occupations, name) is not None]
    return f"occupations.{given[0]}"


def _by_spin(occupations: Occupations) -> _Sum:
    n_alpha, n_beta = (_count(table) for table in (occupations.alpha, occupations.beta))
    return _Sum(n_alpha + n_beta, n_alpha - n_beta, f"{n_alpha} alpha and {n_beta} beta electrons")


def _by_pairs(facts: Facts, occupations: Occupations) -> _Sum:
    n_paired, n_open = (_orbitals(facts, table) for table in (occupations.paired, occupations.unpaired))
    return _Sum(2 * n_paired + n_open, n_open, f"{n_paired} paired and {n_open} unpaired orbitals")


def _count(table: Mapping[str, int] | None) -> int:
    if any(count < 0 for count in (table or {}).values()):
        raise NotDerivable("an occupation is negative")
    return sum((table or {}).values())


def _orbitals(facts: Facts, table: Mapping[str, int] | None) -> int:
    """Return the number of orbitals, an irrep counted with its dimension."""
    _count(table)
    n_orbitals = 0
    for name, count in (table or {}).items():
        n_orbitals += _dimension(facts.point_group, name) * count
    return n_orbitals


def _dimension(group: PointGroup, name: str) -> int:
    """Return the dimension of an irrep; of a wrong name too, where every irrep that may be meant has the same."""
    reading = read_orbital(group, name)
    if reading.irrep is not None:
        return reading.irrep.dimension
    dimensions = {irrep.dimension for irrep in reading.candidates or group.irreps}
    if len(dimensions) > 1:
        raise NotDerivable(f"{name} is no irrep of {group.symbol}")
    return dimensions.pop()


def _evidence(facts: Facts, summed: _Sum) -> dict[str, Json]:
    return {
        "occupied": summed.n_electrons,
        "singly_occupied": summed.n_open,
        "electrons": facts.n_electrons,
        "multiplicity": facts.job.species.multiplicity,
    }


def _half_given(facts: Facts, occupations: Occupations, summed: _Sum) -> Finding:
    given, missing = ("alpha", "beta") if occupations.beta is None else ("beta", "alpha")
    n_left = facts.n_electrons - summed.n_electrons
    repairs: tuple[Repair, ...] = ()
    table = occupations.alpha or occupations.beta or {}
    if facts.job.species.multiplicity == 1 and n_left == summed.n_electrons:
        repairs = (Repair(f"{missing} like {given}", (Edit(f"occupations.{missing}", dict(table)),), 0.8),)
    return Finding(
        at=_first_table(facts),
        message=f"{given} holds {summed.n_electrons} electrons and {missing} is not given; "
        f"state {missing} with the other {n_left} of {facts.n_electrons}",
        why="In this style both spins are stated; what is left out holds no electron.",
        evidence=_evidence(facts, summed),
        repairs=repairs,
    )


def _wrong_total(facts: Facts, summed: _Sum) -> Finding:
    excess = summed.n_electrons - facts.n_electrons
    return Finding(
        at=_first_table(facts),
        message=f"{summed.words} make {summed.n_electrons} electrons, and the job has {facts.n_electrons}; "
        f"{'take out' if excess > 0 else 'add'} {abs(excess)}",
        why=_reason(facts, excess),
        evidence=_evidence(facts, summed),
        repairs=tuple(_charge_repair(facts, summed, excess)),
    )


def _reason(facts: Facts, excess: int) -> str:
    """Return what the difference is, where it is a known number."""
    replaced = facts.ledger.core_electrons_replaced or 0
    frozen = facts.job.treatment.frozen_orbitals
    n_frozen = frozen if isinstance(frozen, int) else sum((frozen or {}).values())
    if replaced and excess == replaced:
        return f"The difference is the {replaced} electrons that core potentials replace; those are not occupied."
    if n_frozen > 0 and excess == -2 * n_frozen:
        return f"The difference is the {2 * n_frozen} electrons of the frozen orbitals; those are counted too."
    if excess == facts.charge != 0:
        return "The occupations are those of the neutral species."
    return "Every electron that the job treats is occupied once; a degenerate irrep counts with its dimension."


def _charge_repair(facts: Facts, summed: _Sum, excess: int) -> Iterator[Repair]:
    """Offer the charge that the occupations fit, where the spin fits as well."""
    multiplicity = facts.job.species.multiplicity
    if abs(excess) <= FARTHEST_CHARGE and (multiplicity is None or abs(summed.n_open) == multiplicity - 1):
        charge = facts.charge - excess
        yield Repair(f"the occupations are those of charge {charge:+d}", (Edit("species.charge", charge),), 0.4)


def _wrong_difference(facts: Facts, occupations: Occupations, summed: _Sum) -> Finding:
    multiplicity = facts.stated_multiplicity
    repairs = []
    if summed.n_open == 1 - multiplicity and summed.n_open < 0:
        swapped = (
            Edit("occupations.alpha", _json(occupations.beta)),
            Edit("occupations.beta", _json(occupations.alpha)),
        )
        repairs.append(Repair("alpha and beta are swapped", swapped, 0.9))
    elif summed.n_open >= 0:
        repairs.append(_multiplicity_repair(summed))
    return Finding(
        at=_first_table(facts),
        message=f"{summed.words} differ by {summed.n_open}, and multiplicity {multiplicity} needs "
        f"{multiplicity - 1} more alpha than beta; move electrons or change the multiplicity",
        why="2S is the number of alpha electrons less that of beta; unpaired electrons are alpha by convention.",
        evidence=_evidence(facts, summed),
        repairs=tuple(repairs),
    )


def _wrong_number_open(facts: Facts, occupations: Occupations, summed: _Sum) -> Finding:
    multiplicity = facts.stated_multiplicity
    degenerate = [
        n
        for n in occupations.unpaired or {}
        if (r := read_orbital(facts.point_group, n).irrep) and r.dimension > 1
    ]
    why = "Each unpaired electron needs an orbital of its own, and the others pair up."
    if degenerate:
        why = (
            f"{', '.join(degenerate)} counts with all its partners; "
            "to occupy some of them, give the occupations in an abelian subgroup."
        )
    return Finding(
        at="occupations.unpaired",
        message=f"{summed.n_open} orbitals are unpaired, and multiplicity {multiplicity} needs "
        f"{multiplicity - 1}, or more by an even number; open orbitals or change the multiplicity",
        why=why,
        evidence=_evidence(facts, summed),
        repairs=(_multiplicity_repair(summed),),
    )


def _multiplicity_repair(summed: _Sum) -> Repair:
    implied = summed.n_open + 1
    return Repair(
        f"the occupations are those of multiplicity {implied}", (Edit("species.multiplicity", implied),), 0.6
    )


def _json(table: Mapping[str, int] | None) -> Json:
    return dict(table or {})


RULE = Rule("occupation-total", Grade.HALT, judge)
