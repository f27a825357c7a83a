"""point-group-mismatch: the geometry must have the stated point group, its elements where the labels expect them.

A job can run in the group of its geometry or in any group within that; in another one its irreps mean nothing. The
geometry is searched for every operation that moves no atom by more than 0.01 angstrom from its place in an exactly
symmetric body; where the stated group comes within 0.1 angstrom, point-group-near-miss speaks instead. Where
the group is there but not along the coordinate axes, as `axes = "as-given"` has it, a note says how the labels'
axes lie and gives the turned geometry.

Passes: water in C2v or Cs; benzene in D2h; N2 in D∞h.
Speaks: water in D2h (halt); water in C2v with its twofold axis along x and occupations by irrep (note).
Source: R. S. Mulliken, J. Chem. Phys. 23, 1997 (1955) for the axes; the tolerance is common practice, no source.
"""

from collections.abc import Iterator

from checker.chemistry.frames import AXES_AS_GIVEN, LABELS_WITHOUT_AXES, Placement
from checker.chemistry.relabelling import relabellings
from checker.facts import Facts
from checker.findings import Edit, Finding, Grade, Json, Repair
from checker.registry import Rule

NEAR_ANGSTROM = 0.1
MOST_ATOMS_TURNED = 200
"""A repair that rewrites more atoms than this is better made where the geometry comes from."""

KEY = "symmetry.point_group"


def judge(facts: Facts) -> Iterator[Finding]:
    """Place the stated group on the geometry."""
    if facts.job.symmetry.point_group is None:
        return
    stated, symmetry = facts.point_group, facts.symmetry
    placed = symmetry.subgroup(stated.symbol, facts.job.symmetry.axes)
    if placed is not None:
        yield from _off_axis(facts, placed)
    elif symmetry.nearest_with(stated.symbol, NEAR_ANGSTROM) is None:
        yield _mismatch(facts)


def _mismatch(facts: Facts) -> Finding:
    stated, symmetry = facts.point_group, facts.symmetry
    shared = symmetry.shared_with(stated.symbol)
    evidence: dict[str, Json] = {
        "stated": stated.symbol,
        "geometry": symmetry.group,
        "shared": shared,
        "tolerance_angstrom": symmetry.tolerance,
    }
    return Finding(
        at=KEY,
        message=f"the geometry has the point group {symmetry.group}, and {stated.symbol} is not within it",
        why=f"{stated.symbol} does not come about even if every atom is moved by {NEAR_ANGSTROM:g} angstrom; "
        f"the largest group that both have is {shared}.",
        confidence=0.98,
        evidence=evidence,
        repairs=tuple(_other_groups(facts, shared)),
    )


def _other_groups(facts: Facts, shared: str) -> Iterator[Repair]:
    """Offer what the deck's group and the geometry share, then what the geometry has."""
    symmetry = facts.symmetry
    own = symmetry.abelian_group if facts.point_group.is_abelian else symmetry.group
    further = "; the irreps of the deck have then to be named anew" if _states_irreps(facts) else ""
    for group, weight in ({shared: 0.5} | ({own: 0.4} if own != shared else {})).items():
        yield Repair(f"run it in {group}{further}", (Edit(KEY, group),), weight)


def _off_axis(facts: Facts, placed: Placement) -> Iterator[Finding]:
    """Tell how the labels' axes lie where the coordinates' own are not theirs."""
    named = _states_irreps(facts)
    in_place = placed.frame_note in (AXES_AS_GIVEN, LABELS_WITHOUT_AXES)
    if facts.job.symmetry.axes != "as-given" or in_place or facts.point_group.is_continuous:
        return
    exchanged = placed.frame_note.startswith("axes exchanged")
    if not relabellings(placed.group) or (exchanged and not named):
        return
    yield Finding(
        at=KEY,
        message=f"{placed.group} does not lie along the coordinate axes as its labels need; {placed.frame_note}",
        why="Labels are bound to axes: the principal axis is z. A program that keeps the axes as given names the "
        "irreps otherwise, or finds a lower group.",
        grade=Grade.NOTE,
        evidence={"point_group": placed.group, "frame": placed.frame_note},
        subject=f"{placed.group} off the axes",
        repairs=_turned(facts, placed),
    )


def _turned(facts: Facts, placed: Placement) -> tuple[Repair, ...]:
    if len(facts.numbers) > MOST_ATOMS_TURNED:
        return ()
    center = facts.symmetry.center
    turned = (facts.coordinates - center) @ placed.frame.T + center
    return (Repair("turn the geometry to the axes of the labels", facts.atoms_at(turned), 0.8),)


def _states_irreps(facts: Facts) -> bool:
    """Tell whether anything in the deck is named by irrep."""
    job = facts.job
    by_irrep = (job.treatment.frozen_orbitals, job.active_space and job.active_space.orbitals)
    return (
        job.occupations is not None
        or job.treatment.state_irrep is not None
        or job.treatment.roots is not None
        or any(value is not None and not isinstance(value, int) for value in by_irrep)
    )


RULE = Rule("point-group-mismatch", Grade.HALT, judge)
