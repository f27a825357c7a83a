"""caution: a computed result is no safety assessment.

Some species are radioactive, acutely toxic or energetic. Where a deck holds one that is told by simple marks
(an element, the formula of a well-known substance, a few groups), one note says so. It changes no verdict,
gives no advice on handling, and its silence is no clearance: local rules and licensed practice decide.

Passes: water, ammonia, ferrocene, nitrobenzene.
Speaks: uranyl (radioactive); hydrogen sulfide (toxic); nitromethane (energetic); water with T for H.
Source: checker/tables/cautions.csv, whose head says where its rows come from.
"""

from collections.abc import Iterator

from checker.chemistry.cautions import LARGEST_SYSTEM, TRITIUM, Caution, may_hold_some, of_elements, of_molecules
from checker.errors import NotDerivable
from checker.facts import Facts
from checker.findings import Finding, Grade
from checker.registry import Rule

MOST_NAMED = 3


def judge(facts: Facts) -> Iterator[Finding]:
    """Speak once of all that calls for caution in the deck."""
    cautions = [*_by_atoms(facts), *_by_molecules(facts)]
    if not cautions:
        return
    what = "; ".join(caution.what for caution in cautions[:MOST_NAMED])
    kinds = list(dict.fromkeys(caution.kind for caution in cautions))
    yield Finding(
        at="species.atoms",
        message=f"{what}: a computed result is no safety assessment, local rules and licensed practice decide",
        why=f"The species is, or may be, {' and '.join(kinds)}; that is told by simple marks and not assessed.",
        confidence=0.9,
        evidence={"kinds": list(kinds), "because": [caution.what for caution in cautions]},
    )


def _by_atoms(facts: Facts) -> Iterator[Caution]:
    yield from of_elements(facts.elements)
    mass_numbers = facts.job.species.atoms.mass_numbers
    if (mass_numbers[facts.real_indices] == TRITIUM).any():
        yield Caution("radioactive", "tritium is radioactive")


def _by_molecules(facts: Facts) -> list[Caution]:
    if not 1 < len(facts.real_numbers) <= LARGEST_SYSTEM or not may_hold_some(facts.elements):
        return []
    try:
        return of_molecules(facts.real_numbers, facts.valence.bonds, by_formula=facts.charge == 0)
    except NotDerivable:
        return []


RULE = Rule("caution", Grade.NOTE, judge)
