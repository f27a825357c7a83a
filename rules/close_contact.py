"""close-contact: two atoms must not be closer than any bond.

The distance is measured in units of a bond's length, the sum of the covalent radii. Molecules of main-group
elements stay above 0.77 (CN in G2/97), multiply bonded metal pairs above 0.57 (V2); below 0.55 a coordinate
is wrong, and two nuclei within 0.1 angstrom are one atom written twice, or a ghost laid on a real atom. Two
hydrogens are doubted below 0.5 angstrom (H2 has 0.74). Where all lengths are short by the same factor,
length-unit speaks instead.

Passes: N2 at 1.10 angstrom (0.77 of the radii); Cr2 at 1.68 (0.60).
Speaks: O2 at 0.60 angstrom (0.45 of the radii); a hydrogen pasted twice.
Source: radii of B. Cordero et al., Dalton Trans. 2008, 2832; limits measured over ASE's G2 set, metals from
memory.
"""

from collections.abc import Iterator

import numpy as np
from numpy.typing import NDArray

from checker.chemistry.contacts import Nearest, nearest_by_bond_length
from checker.facts import Facts
from checker.findings import Edit, Finding, Grade, Repair
from checker.registry import Rule

LEAST_RATIO = 0.55
LEAST_HYDROGENS_ANGSTROM = 0.5
COINCIDENT_ANGSTROM = 0.1
MOST_REMOVED = 50


def judge(facts: Facts) -> Iterator[Finding]:
    """Speak once of the real atoms that are too close, and once of ghosts laid on atoms."""
    if facts.nearest is not None:
        yield from _real_atoms(facts, facts.nearest)
    if facts.job.species.ghost_atoms:
        yield from _ghosts(facts)


def _real_atoms(facts: Facts, nearest: Nearest) -> Iterator[Finding]:
    close = nearest.ratio < LEAST_RATIO
    close |= (facts.real_numbers == 1) & (nearest.distance < LEAST_HYDROGENS_ANGSTROM)
    if not close.any():
        return
    coincident = nearest.distance < COINCIDENT_ANGSTROM
    if facts.length_slip is not None and not coincident.any():
        return
    pairs = _pairs(close, nearest)
    worst = int(nearest.ratio.argmin())
    first, second = sorted((worst, int(nearest.partner[worst])))
    distance = float(nearest.distance[worst])
    yield Finding(
        at=facts.atom_key(second),
        grade=Grade.HALT if coincident.any() else Grade.DOUBT,
        message=_message(facts, first, second, distance, len(pairs)),
        why=f"They stand at {nearest.ratio[worst]:.2f} of the sum of their covalent radii; no bond is below "
        f"{LEAST_RATIO}.",
        confidence=1.0 if coincident.any() else 0.95,
        evidence={
            "atoms": [facts.label(first), facts.label(second)],
            "distance_angstrom": round(distance, 4),
            "ratio": round(float(nearest.ratio[worst]), 4),
            "contacts": len(pairs),
        },
        repairs=_without_copies(facts, _pairs(coincident, nearest)),
    )


def _message(facts: Facts, first: int, second: int, distance: float, n_pairs: int) -> str:
    pair = f"{facts.label(first)} and {facts.label(second)}"
    more = "" if n_pairs == 1 else f", the worst of {n_pairs} such pairs"
    if distance < COINCIDENT_ANGSTROM:
        return f"{pair} stand on one point{more}; remove one of them or correct its coordinates"
    return f"{pair} are {distance:.2f} angstrom apart, closer than any bond{more}; correct the coordinates"


def _pairs(close: NDArray[np.bool_], nearest: Nearest) -> list[tuple[int, int]]:
    atoms = np.flatnonzero(close)
    pairs = np.sort(np.stack([atoms, nearest.partner[atoms]], axis=1), axis=1)
    return [(int(i), int(j)) for i, j in np.unique(pairs, axis=0)]


def _without_copies(facts: Facts, pairs: list[tuple[int, int]]) -> tuple[Repair, ...]:
    """Offer to remove the second of two like atoms that stand on one point; from the last on, as keys move up."""
    copies = sorted({j for i, j in pairs if facts.real_numbers[i] == facts.real_numbers[j]}, reverse=True)
    if not copies or len(copies) > MOST_REMOVED:
        return ()
    names = ", ".join(facts.label(copy) for copy in reversed(copies))
    edits = tuple(Edit(facts.atom_key(copy), None) for copy in copies)
    return (Repair(f"remove {names}, written twice", edits, 0.8),)


def _ghosts(facts: Facts) -> Iterator[Finding]:
    """Speak where a ghost shares its point with another atom: the same functions stand there twice."""
    nearest = nearest_by_bond_length(facts.numbers, facts.coordinates) if len(facts.numbers) > 1 else None
    if nearest is None:
        return
    on_atom = facts.is_ghost & (nearest.distance < COINCIDENT_ANGSTROM)
    if not on_atom.any():
        return
    ghost = int(np.flatnonzero(on_atom)[0])
    other = int(nearest.partner[ghost])
    more = "" if on_atom.sum() == 1 else f" ({int(on_atom.sum())} ghosts stand so)"
    yield Finding(
        at=f"species.atoms[{ghost}]",
        grade=Grade.DOUBT,
        message=f"the ghost atom {ghost + 1} stands on atom {other + 1}{more}; its functions are there already",
        why="Basis functions given twice at one point are linearly dependent.",
        confidence=0.95,
        evidence={"ghost": ghost + 1, "atom": other + 1, "ghosts": int(on_atom.sum())},
    )


RULE = Rule("close-contact", Grade.DOUBT, judge)
