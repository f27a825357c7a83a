"""isolated-atom: no atom should stand by itself, far from all others.

A slipped digit in a coordinate, or a solvent molecule of which one atom was left behind, puts an atom out of
reach of the rest: it costs a calculation and means nothing. Five angstrom is farther than any contact of
ordinary atoms; noble gases and the metals of groups 1 and 2, whose ions and complexes reach far, are given
eight. An atom out there on purpose (both of two atoms, all atoms of a species, a fragment named in the deck)
is a note.

Passes: the water dimer, O-O 2.9 angstrom; Na-Ar at 5.0 angstrom.
Speaks: methane with one hydrogen at 10.9 angstrom instead of 1.09.
Source: common practice, no source; the farthest nearest neighbour in G2/97 is at 3.15 angstrom (Na2).
"""

from collections.abc import Iterator

import numpy as np

from checker.chemistry.contacts import Nearest
from checker.facts import Facts
from checker.findings import Finding, Grade
from checker.registry import Rule

FARTHEST_ANGSTROM = 5.0
FARTHEST_WIDE_ANGSTROM = 8.0
WIDE = frozenset({2, 10, 18, 36, 54, 86, 3, 11, 19, 37, 55, 87, 4, 12, 20, 38, 56, 88})
MOST_NAMED = 5


def judge(facts: Facts) -> Iterator[Finding]:
    """Speak once of all atoms that stand alone."""
    nearest = facts.nearest
    if nearest is None or nearest.distance.max() <= FARTHEST_ANGSTROM:
        return
    lonely = [atom for atom in np.flatnonzero(nearest.distance > FARTHEST_ANGSTROM).tolist() if _far(facts, atom)]
    if not lonely:
        return
    purpose = _purpose(facts, lonely)
    yield Finding(
        at=facts.atom_key(lonely[0]),
        grade=Grade.NOTE if purpose else Grade.DOUBT,
        message=_message(facts, nearest, lonely),
        why=purpose or f"Ordinary contacts end before {FARTHEST_ANGSTROM:g} angstrom; check the coordinates.",
        confidence=0.6 if purpose else 0.9,
        evidence={
            "atoms": [facts.label(atom) for atom in lonely[:MOST_NAMED]],
            "distances_angstrom": [round(float(nearest.distance[atom]), 3) for atom in lonely[:MOST_NAMED]],
            "isolated_atoms": len(lonely),
        },
    )


def _far(facts: Facts, atom: int) -> bool:
    assert facts.nearest is not None
    pair = {int(facts.real_numbers[atom]), int(facts.real_numbers[facts.nearest.partner[atom]])}
    return not (pair & WIDE) or float(facts.nearest.distance[atom]) > FARTHEST_WIDE_ANGSTROM


def _purpose(facts: Facts, lonely: list[int]) -> str:
    """Return why the atoms may stand alone on purpose, or an empty text."""
    if len(lonely) == len(facts.real_numbers):
        return "All atoms are separate: a dissociation limit is computed as one species, its spin being the sum's."
    alone = {fragment.atoms[0] for fragment in facts.job.fragments if len(fragment.atoms) == 1}
    if {int(facts.real_indices[atom]) + 1 for atom in lonely} <= alone:
        return "The deck names these atoms as fragments of their own."
    return ""


def _message(facts: Facts, nearest: Nearest, lonely: list[int]) -> str:
    names = ", ".join(facts.label(atom) for atom in lonely[:MOST_NAMED])
    if len(lonely) > MOST_NAMED:
        names += f" and {len(lonely) - MOST_NAMED} more"
    least = min(float(nearest.distance[atom]) for atom in lonely)
    verb, them = ("stands", "it") if len(lonely) == 1 else ("stand", "them")
    return (
        f"{names} {verb} {least:.1f} angstrom or more from every other atom; "
        f"correct the coordinates or leave {them} out"
    )


RULE = Rule("isolated-atom", Grade.DOUBT, judge)
