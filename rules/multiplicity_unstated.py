"""multiplicity-unstated: the deck should say the multiplicity.

Left out, it becomes the lowest one that the number of electrons allows: 1 or 2. For a free atom with a known
ground level, and for a molecule whose valences are closed but for one unpaired electron at most, that may be
just right, and it is noted only. Everything else is doubted: atoms with a higher ground level, carbenes, O2
and its like, several radical centres, and metals, of whose spin the structure says nothing.

Passes: any deck that states a multiplicity; a bare proton, which has one state only.
Speaks: O2 without multiplicity (doubt, 3 is likelier); water without multiplicity (note).
Source: common practice, no source; the ground levels as in checker/tables/README.md.
"""

from collections.abc import Iterator

from checker.chemistry.ledger import lowest_multiplicity
from checker.chemistry.plausibility import state_weight
from checker.elements import written_ion
from checker.errors import NotDerivable
from checker.facts import Facts
from checker.findings import Edit, Finding, Grade, Repair
from checker.registry import Rule

SURE = 0.9
"""The lowest multiplicity must be this likely, or the deck is doubted."""

MOST_OFFERED = 3


def judge(facts: Facts) -> Iterator[Finding]:
    """Speak where the multiplicity is left out; how loud depends on what it would likely be."""
    if facts.job.species.multiplicity is not None or facts.n_electrons <= 0:
        return
    lowest = lowest_multiplicity(facts.n_electrons)
    likely, why = _likely(facts, lowest)
    sure = likely.get(lowest, 0.0) >= SURE
    yield Finding(
        at="species.multiplicity",
        grade=Grade.NOTE if sure else Grade.DOUBT,
        message=f"no multiplicity is stated, and a default gives {lowest}{_verdict(likely, lowest)}; state it",
        why=why,
        confidence=1.0 if sure else 0.9,
        evidence={
            "electrons": facts.n_electrons,
            "lowest": lowest,
            "likely": {str(m): round(weight, 3) for m, weight in likely.items()},
        },
        repairs=tuple(
            Repair(f"state multiplicity {m}", (Edit("species.multiplicity", m),), round(weight, 3))
            for m, weight in sorted(likely.items(), key=lambda item: -item[1])
        ),
    )


def _verdict(likely: dict[int, float], lowest: int) -> str:
    best = max(likely, key=lambda m: likely[m], default=None)
    if best is None:
        return ""
    if best != lowest:
        return f", where {best} is likelier"
    return ", which is likely right" if likely[lowest] >= SURE else ""


def _likely(facts: Facts, lowest: int) -> tuple[dict[int, float], str]:
    """Return weights of multiplicities, empty where nothing is known, and the ground for them."""
    if facts.free_atom is not None:
        return _of_atom(facts, lowest)
    valence = facts.valence
    if valence.tally.unknown or valence.tally.beyond:
        return {}, "The structure does not tell the spin: a metal, a cluster or an unusual valence is there."
    offered = range(lowest, lowest + 2 * MOST_OFFERED, 2)
    weights = {m: state_weight(valence.tally, facts.charge, m) for m in offered if m <= facts.n_electrons + 1}
    total = sum(weights.values())
    if not total:
        return {}, "The charge is not one that the structure explains, so neither is the spin."
    likely = {m: weight / total for m, weight in weights.items() if weight / total > 0.01}
    return likely, _of_sites(valence.tally.open, valence.tally.carbenes + valence.tally.paired_triplets)


def _of_sites(n_open: int, n_coupled: int) -> str:
    if n_coupled:
        return "Two electrons of one centre may be paired or not, which a default does not ask."
    if n_open > 1:
        return f"{n_open} valences are open, and how their electrons couple a default does not ask."
    return "All valences are closed, but for one electron at most that charge or structure leaves unpaired."


def _of_atom(facts: Facts, lowest: int) -> tuple[dict[int, float], str]:
    try:
        expected = facts.ground_multiplicity
    except NotDerivable as reason:
        return {}, f"Which multiplicity is meant cannot be told: {reason.because}."
    level = facts.ground_level
    weight = facts.ground_level_confidence
    likely = {expected: weight} if expected == lowest else {expected: weight, lowest: round(1 - weight, 3)}
    ion = written_ion(level.atomic_number, level.charge)
    return likely, f"The ground level of {ion} is {level.level} of {level.configuration} ({level.source})."


RULE = Rule("multiplicity-unstated", Grade.DOUBT, judge)
