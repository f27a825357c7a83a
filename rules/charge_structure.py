"""charge-structure: the charge agrees with the one that bonds and valences imply.

A slip of two in the charge, or of one together with the multiplicity, keeps the parity of the electrons, and only
the structure can tell it. Formal charges follow from the bonds: open valences at oxygen, nitrogen or a halogen
close as anions, onium and metal ions have their usual charge. One electron more or fewer is a radical ion and
passes, unless it would sit on a metal ion with neutral ligands or on an ammonium ion; so do OH+ and its like as
triplets, bonds that are partly broken, and two electrons where the intent is "vertical". Not judged where the
structure leaves a choice (a carbon that may be cation, anion or radical, bare carbon chains), where a metal of
variable charge or a bond between metals is there, and for free atoms, which have rules of their own.

Passes: NO3, charge -1, multiplicity 1; NO3, charge 0, multiplicity 2 (the radical); B2H6, charge 0.
Speaks: NO3, charge +1, multiplicity 1; Na with six waters, charge 0, multiplicity 2.
Source: formal charges as in any textbook; usual charges after Greenwood & Earnshaw, Chemistry of the Elements, 2nd
ed. (from memory).
"""

from collections.abc import Iterator

from checker.chemistry.explained import ChargeMismatch, charge_mismatch, may_be_sextet
from checker.facts import Facts
from checker.findings import Edit, Finding, Grade, NotJudged, Repair
from checker.registry import Rule

MOST_NAMED = 6


def judge(facts: Facts) -> Iterator[Finding | NotJudged]:
    """Speak where the stated charge is not the implied one, and no radical ion either."""
    if facts.free_atom is not None:
        return
    valence = facts.valence
    if valence.implied_charge is None:
        yield NotJudged(f"the bonds imply no single charge: {valence.because}")
        return
    if facts.parity_fails:
        yield NotJudged("electron count and multiplicity do not fit, which spin-parity judges")
        return
    vertical = facts.intent == "vertical"
    found = charge_mismatch(valence, facts.charge, facts.stated_multiplicity, vertical=vertical)
    if found is not None:
        yield _finding(facts, found)


def _finding(facts: Facts, found: ChargeMismatch) -> Finding:
    ground = "bonding implies" if found.from_bonding else "closed valences give"
    implied = _signed(found.implied)
    return Finding(
        at="species.charge",
        message=f"{ground} {implied}, and the deck states {_signed(facts.charge)}",
        why=_why(facts, found),
        confidence=found.confidence,
        evidence={
            "charge": facts.charge,
            "implied_charge": found.implied,
            "sites": [f"{facts.label(atom)} {_signed(charge)}" for atom, charge in found.sites[:MOST_NAMED]],
        },
        repairs=(
            Repair(f"set the charge to {implied}, with closed valences", _edits(facts, found), 0.8),
            *_as_triplet(facts, found),
        ),
    )


def _why(facts: Facts, found: ChargeMismatch) -> str:
    if not found.sites:
        return "All valences are closed without a charge on any atom."
    sites = ", ".join(f"{facts.label(atom)} {_signed(charge)}" for atom, charge in found.sites[:MOST_NAMED])
    more = len(found.sites) - MOST_NAMED
    return f"Formal charges: {sites}{f' and {more} more' if more > 0 else ''}."


def _edits(facts: Facts, found: ChargeMismatch) -> tuple[Edit, ...]:
    """Set the implied charge, and a singlet where the stated multiplicity does not fit the electrons left."""
    charge = Edit("species.charge", found.implied)
    if (found.implied - facts.charge) % 2 == 0:
        return (charge,)
    return charge, Edit("species.multiplicity", 1)


def _as_triplet(facts: Facts, found: ChargeMismatch) -> tuple[Repair, ...]:
    """Offer the triplet that OH+, NH2+ and their like are, where the deck has them as singlets."""
    if facts.charge != found.implied + 2 or facts.stated_multiplicity != 1 or not may_be_sextet(facts.valence):
        return ()
    return (Repair("keep the charge, as a triplet", (Edit("species.multiplicity", 3),), 0.2),)


def _signed(charge: int) -> str:
    return f"{charge:+d}" if charge else "0"


RULE = Rule("charge-structure", Grade.DOUBT, judge)
