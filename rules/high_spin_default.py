"""high-spin-default: the lowest multiplicity that parity allows is not taken for granted where shells are open.

A multiplicity that is not thought about comes out as 1 for an even and 2 for an odd number of electrons. For most
closed-valence molecules that is right, for most free atoms with an open shell it is not. Free atoms and ions are
judged here, by their known levels; what spin the ground state of a molecule has is not worked out, so molecules
are not judged. Silent where another state is meant (`treatment.intent` is excited or broken-symmetry).

Passes: Mg, charge 0, multiplicity 1 (3s2 1S0 is a singlet).
Speaks: Fe, charge 0, multiplicity 1 (3d6 4s2 5D4 is a quintet).
Source: NIST Atomic Spectra Database and the compilations named in checker/tables/README.md (from memory).
"""

from collections.abc import Iterator

from checker.chemistry.ledger import lowest_multiplicity
from checker.elements import written_ion
from checker.facts import Facts
from checker.findings import Edit, Finding, Grade, NotJudged, Repair
from checker.registry import Rule

OTHER_STATE_MEANT = ("excited", "broken-symmetry")
MOLECULE = "the spin of a molecule's ground state is not worked out; only free atoms and ions are judged"


def judge(facts: Facts) -> Iterator[Finding | NotJudged]:
    """Speak where the stated multiplicity is what a default gives and the ground level's is higher."""
    if facts.intent in OTHER_STATE_MEANT:
        return
    stated = facts.stated_multiplicity
    if stated != lowest_multiplicity(facts.n_electrons):
        return
    if facts.free_atom is None:
        yield NotJudged(MOLECULE)
        return
    expected = facts.ground_multiplicity
    if expected <= stated:
        return
    level = facts.ground_level
    ion = written_ion(level.atomic_number, level.charge)
    yield Finding(
        at="species.multiplicity",
        message=f"multiplicity {stated} is what a default gives, and {ion} has {expected - 1} unpaired electrons",
        why=(
            f"{stated} is the lowest multiplicity of {facts.n_electrons} electrons; the ground level of {ion} is "
            f"{level.level} of {level.configuration}, multiplicity {expected} ({level.origin}, {level.source})."
        ),
        confidence=facts.ground_level_confidence,
        evidence={
            "multiplicity": stated,
            "ground_multiplicity": expected,
            "electrons": facts.n_electrons,
            "configuration": level.configuration,
            "level": level.level,
            "origin": level.origin,
        },
        repairs=(Repair(f"state multiplicity {expected}", (Edit("species.multiplicity", expected),), 0.9),),
        subject=f"{ion} {stated}",
    )


RULE = Rule("high-spin-default", Grade.DOUBT, judge)
