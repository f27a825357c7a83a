"""electron-count: the charge must leave a number of electrons that the atoms can have.

electrons = nuclear charges - electrons replaced by core potentials - charge. A negative count is no state. An
anion of K nuclei with total nuclear charge Z binds fewer than 2Z + K electrons, whatever its geometry, so a
charge of -(Z + K) or below halts in the gas phase and is doubted elsewhere. A molecule with more than two
positive charges an atom is doubted. Ghost atoms carry neither charge nor electrons: a charge that fits the
species with its ghosts counted as real, and not without them, belonged to the ghosts.

Passes: a bare proton, charge +1 (N = 0); Cl beside a ghost Na, charge -1.
Speaks: H2O, charge +12; Cl beside a ghost Na, charge 0, multiplicity 1 (the charge of NaCl).
Source: E. H. Lieb, Phys. Rev. A 29, 3018 (1984) for the bound on anions; two charges an atom is common
practice, no source.
"""

from collections.abc import Iterator

from checker.chemistry.valence import Valence, assign_valences
from checker.errors import NotDerivable
from checker.facts import Facts
from checker.findings import Edit, Finding, Grade, Json, Repair
from checker.registry import Rule

MOST_POSITIVE_PER_ATOM = 2


def judge(facts: Facts) -> Iterator[Finding]:
    """Speak of counts that cannot be, and of charges that ghosts left behind."""
    if not len(facts.real_numbers):
        yield from _no_real_atom(facts)
        return
    n_electrons = facts.n_electrons
    if n_electrons < 0:
        yield _negative(facts)
        return
    if facts.job.species.ghost_atoms:
        yield from _charge_of_ghosts(facts)
    if -facts.charge >= facts.ledger.nuclear_charge + len(facts.real_numbers):
        yield _unbound(facts)
    elif len(facts.real_numbers) > 1 and facts.charge > MOST_POSITIVE_PER_ATOM * len(facts.real_numbers):
        yield _stripped(facts)
    elif n_electrons == 0 and facts.free_atom != 1:
        yield _no_electron(facts)


def _evidence(facts: Facts) -> dict[str, Json]:
    return {
        "charge": facts.charge,
        "nuclear_charge": facts.ledger.nuclear_charge,
        "core_electrons_replaced": facts.ledger.core_electrons_replaced,
        "electrons": facts.ledger.n_electrons,
    }


def _no_real_atom(facts: Facts) -> Iterator[Finding]:
    n_ghosts = len(facts.numbers)
    if not n_ghosts:
        return  # a deck without atoms cannot be read
    wanted = f", so none carries the charge {facts.charge:+d}" if facts.charge else ", so there is no electron"
    yield Finding(
        at="species.ghost_atoms",
        grade=Grade.HALT if facts.charge else Grade.DOUBT,
        message=f"all {n_ghosts} atoms are ghosts{wanted}; take the atoms that are real out of ghost_atoms",
        why="Ghost atoms have basis functions, but neither charge nor electrons.",
        evidence=_evidence(facts),
    )


def _negative(facts: Facts) -> Finding:
    nuclear, replaced = facts.ledger.nuclear_charge, facts.ledger.core_electrons_replaced or 0
    repairs: tuple[Repair, ...] = ()
    if replaced > nuclear:
        at = "core_potential"
        message = f"core potentials replace {replaced} electrons, and the neutral atoms have {nuclear}"
    else:
        there = nuclear - replaced
        message = f"charge {facts.charge:+d} removes more electrons than the {there} there are; lower the charge"
        at, repairs = "species.charge", _usual_charge(facts)
    return Finding(
        at=at,
        message=message,
        why="The number of electrons would be negative.",
        evidence=_evidence(facts),
        repairs=repairs,
    )


def _usual_charge(facts: Facts) -> tuple[Repair, ...]:
    """Offer the charge that the bonds imply, or none at all."""
    implied = _implied(facts)
    charge = 0 if implied is None else implied
    says = "a neutral species is meant" if charge == 0 else f"closed valences give {charge:+d}"
    return (Repair(says, (Edit("species.charge", charge),), 0.5),)


def _implied(facts: Facts) -> int | None:
    try:
        return _closed(facts.valence)
    except NotDerivable:
        return None


def _unbound(facts: Facts) -> Finding:
    nuclear = facts.ledger.nuclear_charge
    n_bound = 2 * nuclear + len(facts.real_numbers)
    return Finding(
        at="species.charge",
        grade=Grade.HALT if facts.environment == "gas" else Grade.DOUBT,
        message=f"charge {facts.charge} puts {nuclear - facts.charge} electrons on nuclei of charge {nuclear}, "
        f"which bind fewer than {n_bound}; raise the charge",
        why="K nuclei of total charge Z bind fewer than 2Z + K electrons in free space (Lieb 1984).",
        evidence=_evidence(facts),
        repairs=_usual_charge(facts),
    )


def _stripped(facts: Facts) -> Finding:
    n_atoms = len(facts.real_numbers)
    return Finding(
        at="species.charge",
        grade=Grade.DOUBT,
        message=f"charge {facts.charge:+d} on {n_atoms} atoms leaves {facts.n_electrons} electrons; a "
        "molecule with more than two charges an atom flies apart, so check the charge",
        why="No molecule is known with so many positive charges for its size.",
        confidence=0.9,
        evidence=_evidence(facts),
        repairs=_usual_charge(facts),
    )


def _no_electron(facts: Facts) -> Finding:
    what = "a bare nucleus" if facts.free_atom is not None else "bare nuclei"
    return Finding(
        at="species.charge",
        grade=Grade.NOTE,
        message=f"charge {facts.charge:+d} leaves no electron: the job computes {what}",
        why="There is nothing but the repulsion of point charges to compute.",
        evidence=_evidence(facts),
    )


def _charge_of_ghosts(facts: Facts) -> Iterator[Finding]:
    """Speak where the charge is that of the whole, ghosts included.

    Known from closed valences of both parts, or from the parity, where the ghosts' electrons mend it. A neutral
    part of a neutral whole, and a radical whose multiplicity fits, are meant as they stand.
    """
    multiplicity = facts.job.species.multiplicity
    if multiplicity is None:
        return
    parity_fails = facts.n_electrons % 2 == multiplicity % 2
    real, ghosts = _implied(facts), _implied_by_ghosts(facts)
    known = real is not None and ghosts is not None and ghosts != 0 and facts.charge == real + ghosts
    odd_ghosts = int(facts.numbers[facts.is_ghost].sum()) % 2 == 1
    if parity_fails and (known or (odd_ghosts and None in (real, ghosts))):
        yield _left_behind(facts, real if known else None, Grade.HALT)
    elif known and not parity_fails and facts.charge and ghosts is not None and ghosts % 2 == 0:
        yield _left_behind(facts, real, Grade.DOUBT)


def _implied_by_ghosts(facts: Facts) -> int | None:
    try:
        return _closed(assign_valences(facts.numbers[facts.is_ghost], facts.coordinates[facts.is_ghost]))
    except NotDerivable:
        return None


def _closed(valence: Valence) -> int | None:
    """Return the charge of closed valences; metals of groups 1, 2 and 12 are ions even without their anions."""
    tally = valence.tally
    if tally.unknown or tally.beyond or tally.open > tally.subvalent:
        return valence.implied_charge
    return tally.lowest


def _left_behind(facts: Facts, implied: int | None, grade: Grade) -> Finding:
    multiplicity = facts.stated_multiplicity
    charges = (facts.charge - 1, facts.charge + 1) if implied is None else (implied,)
    repairs = [
        Repair(
            f"the atoms that are real carry {charge:+d}" if charge else "the atoms that are real are neutral",
            (Edit("species.charge", charge),),
            0.8 / len(charges),
        )
        for charge in charges
    ]
    n_ghosts = len(facts.job.species.ghost_atoms)
    those = "the ghost atom" if n_ghosts == 1 else f"the {n_ghosts} ghost atoms"
    return Finding(
        at="species.charge",
        grade=grade,
        message=f"charge {facts.charge} with multiplicity {multiplicity} fits the species with {those} counted "
        "as real, and not what remains; give the charge of the real atoms alone",
        why="Ghost atoms carry neither charge nor electrons; a charge that belonged to them goes with them.",
        confidence=0.85 if implied is not None else 0.7,
        evidence={**_evidence(facts), "implied_charge": implied, "ghost_atoms": n_ghosts},
        repairs=tuple(repairs),
    )


RULE = Rule("electron-count", Grade.HALT, judge)
