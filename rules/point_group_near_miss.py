"""point-group-near-miss: the geometry must have the stated point group more closely than programs look for it.

A little noise, from an optimisation or a format with few decimals, breaks a symmetry: the job stops, or runs in a
lower group without a word, and irreps stated in the deck then mean other orbitals. Spoken of as a doubt where the
stated group is lacking at 0.01 angstrom but comes about within 0.1; as a note where it is there but off by more
than 0.001 angstrom, or where the deck uses all the symmetry that there is and more lies within 0.02 angstrom. The
repair gives symmetrised coordinates; a distortion that is meant should be kept.

Passes: water in C2v whose two bonds differ by 0.0002 angstrom; a deck that states no group.
Speaks: water in C2v whose two bonds differ by 0.06 angstrom (doubt), or by 0.01 (note).
Source: H. Zabrodsky, S. Peleg, D. Avnir, J. Am. Chem. Soc. 114, 7843 (1992) for the nearest symmetric shape; the
thresholds are common practice, no source.
"""

from collections.abc import Iterator

import numpy as np
from numpy.typing import NDArray

from checker.facts import Facts
from checker.findings import Finding, Grade, Repair
from checker.registry import Rule

NEAR_ANGSTROM = 0.1
NOTICED_ANGSTROM = 0.001
"""Coordinates of three decimals are symmetric to a little less than this."""

HIGHER_ANGSTROM = 0.02
MOST_ATOMS_MOVED = 200
"""A repair that rewrites more atoms than this is better made where the geometry comes from."""

KEY = "symmetry.point_group"


def judge(facts: Facts) -> Iterator[Finding]:
    """Measure how far the geometry is from the stated group, and from the next one above."""
    if facts.job.symmetry.point_group is None:
        return
    stated, symmetry = facts.point_group.symbol, facts.symmetry
    held = symmetry.symmetrised_to(stated, facts.job.symmetry.axes)
    if held is None:
        near = symmetry.nearest_with(stated, NEAR_ANGSTROM)
        if near is not None:
            yield _lacking(facts, *near)
        return
    if held[1] > NOTICED_ANGSTROM:
        yield _loose(facts, *held)
    if stated in (symmetry.group, symmetry.abelian_group):
        yield from _more_to_use(facts)


def _lacking(facts: Facts, coordinates: NDArray[np.float64], deviation: float) -> Finding:
    stated, symmetry = facts.point_group.symbol, facts.symmetry
    return Finding(
        at=KEY,
        message=f"the geometry has {stated} only within {deviation:.3f} angstrom; it has {symmetry.group} "
        f"at {symmetry.tolerance:g} angstrom",
        why=f"Programs look for symmetry more closely than that: the job would stop, or run in {symmetry.group} "
        "with other labels.",
        confidence=0.9,
        evidence={"stated": stated, "geometry": symmetry.group, "deviation_angstrom": round(deviation, 4)},
        repairs=_symmetrised(facts, stated, coordinates, 0.7),
    )


def _loose(facts: Facts, coordinates: NDArray[np.float64], deviation: float) -> Finding:
    stated = facts.point_group.symbol
    return Finding(
        at=KEY,
        message=f"the geometry has {stated} only within {deviation:.4f} angstrom",
        why="A program with a narrower tolerance sees less symmetry than the deck states.",
        grade=Grade.NOTE,
        confidence=0.7,
        evidence={"stated": stated, "deviation_angstrom": round(deviation, 5)},
        subject=f"{stated} not exact",
        repairs=_symmetrised(facts, stated, coordinates, 0.7),
    )


def _more_to_use(facts: Facts) -> Iterator[Finding]:
    symmetry = facts.symmetry
    if symmetry.next_higher is None or symmetry.next_higher[1] > HIGHER_ANGSTROM:
        return
    higher, deviation = symmetry.next_higher
    near = symmetry.nearest_with(higher, HIGHER_ANGSTROM)
    yield Finding(
        at=KEY,
        message=f"the geometry has {symmetry.group} and is within {deviation:.3f} angstrom of {higher}",
        why=f"If the difference is noise, {higher} saves time and keeps degenerate orbitals degenerate; "
        "if it is a distortion that is meant, all is well.",
        grade=Grade.NOTE,
        confidence=0.4,
        evidence={"geometry": symmetry.group, "higher": higher, "deviation_angstrom": round(deviation, 4)},
        repairs=() if near is None else _symmetrised(facts, higher, near[0], 0.3),
    )


def _symmetrised(facts: Facts, group: str, coordinates: NDArray[np.float64], weight: float) -> tuple[Repair, ...]:
    if len(facts.numbers) > MOST_ATOMS_MOVED:
        return ()
    return (Repair(f"move the atoms to where {group} is exact", facts.atoms_at(coordinates), weight),)


RULE = Rule("point-group-near-miss", Grade.DOUBT, judge)
