"""open-valence: every main-group atom has its usual valence, or the stated electrons explain why not.

A hydrogen lost in an editor, or two of them, leaves an atom one bond short. If the electron count stays even, a
singlet can still be computed, of a molecule nobody meant. Bonds come from covalent radii, multiple bonds from
pairing what single bonds leave open, shortest first. An open valence is explained by an unpaired electron (CH3 as
a doublet), by the charge (CH3+, CH3O-), or by a second one on the same atom (a carbene); a radical pair is
explained by a triplet or by the intent "broken-symmetry". Two open atoms within 0.6 angstrom of a bond's length
are a bond partly broken, as in a transition state. That more electrons are unpaired than valences are open is a
matter of multiplicity-out-of-reach. Not judged where parity fails (spin-parity then names the atom),
where the bonds cannot be told, and in bare carbon or silicon clusters. Bonds to d- and f-block metals do not count
as valences.

Passes: CH3, charge 0, multiplicity 2; CH2, charge 0, multiplicity 1 or 3.
Speaks: ethane less one hydrogen at each carbon, C-C still 1.53 angstrom, charge 0, multiplicity 1.
Source: B. Cordero et al., Dalton Trans. 2008, 2832 for the radii; the tolerances are common practice, no source.
"""

from collections.abc import Iterator

from checker.chemistry.explained import Explanation, beyond_valence, unexplained_sites
from checker.chemistry.hydrogens import lost_hydrogens
from checker.facts import Facts
from checker.findings import Edit, Finding, Grade, NotJudged, Repair
from checker.registry import Rule

MOST_NAMED = 4
COUPLED_MEANT = ("broken-symmetry", "excited")


def judge(facts: Facts) -> Iterator[Finding | NotJudged]:
    """Speak of atoms short of or beyond their valence that charge and multiplicity do not explain."""
    if facts.free_atom is not None:
        return
    valence = facts.valence
    beyond = beyond_valence(valence, facts.charge)
    if beyond:
        yield _finding(facts, beyond)
    if not valence.lewis.open and not valence.lewis.stretched:
        return
    if facts.parity_fails:
        yield NotJudged("electron count and multiplicity do not fit, which spin-parity judges")
    elif facts.intent not in COUPLED_MEANT and (valence.implied_charge is None or facts.charge == 0):
        short = unexplained_sites(valence, facts.charge, facts.stated_multiplicity)
        if short:
            yield _finding(facts, short)


def _finding(facts: Facts, found: Explanation) -> Finding:
    names = ", ".join(facts.label(atom) for atom in found.atoms[:MOST_NAMED])
    names += f" and {len(found.atoms) - MOST_NAMED} more" if len(found.atoms) > MOST_NAMED else ""
    verb, are = ("has", "is") if len(found.atoms) == 1 else ("have", "are")
    state = f"charge {facts.charge} and multiplicity {facts.stated_multiplicity}"
    message = (
        f"{names} {verb} more neighbours than a usual structure allows; look for an atom too many"
        if found.beyond
        else f"{names} {are} short of a bond, and {state} do not account for it; look for a lost hydrogen "
        "or a stretched bond"
    )
    return Finding(
        at=facts.atom_key(found.atoms[0]),
        message=message,
        why=found.why,
        confidence=found.confidence,
        evidence={
            "atoms": [facts.label(atom) for atom in found.atoms[:MOST_NAMED]],
            "neighbours": [len(facts.valence.bonds.neighbours[atom]) for atom in found.atoms[:MOST_NAMED]],
        },
        repairs=(*_with_hydrogens(facts, found), *_as_coupled(facts, found)),
    )


def _with_hydrogens(facts: Facts, found: Explanation) -> tuple[Repair, ...]:
    """Offer to put a hydrogen back on each of the atoms, where the geometry has a place for it."""
    if found.beyond or len(found.atoms) > MOST_NAMED:
        return ()
    places = {lost.atom: lost.position for lost in lost_hydrogens(facts.valence) if lost.position is not None}
    if any(atom not in places for atom in found.atoms):
        return ()
    names = " and ".join(facts.label(atom) for atom in found.atoms)
    edits = facts.atoms_added("H", *(places[atom] for atom in found.atoms))
    return (Repair(f"add a hydrogen to {names}", edits, 0.8),)


def _as_coupled(facts: Facts, found: Explanation) -> tuple[Repair, ...]:
    """Offer to say that two radicals are coupled, as at the end of a bond that is drawn out."""
    if found.beyond or len(found.atoms) != 2 or facts.stated_multiplicity != 1:
        return ()
    edit = Edit("treatment.intent", "broken-symmetry")
    return (Repair("two coupled radicals are meant, as of a bond drawn out", (edit,), 0.2),)


RULE = Rule("open-valence", Grade.DOUBT, judge)
