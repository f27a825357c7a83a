"""axis-convention: irreps must be named by the axes that the geometry has.

B1u of D2h goes with z, B2u with y, B3u with x, and B1 of C2v with the plane xz: turn the molecule and the same
state has other names. The rule speaks where the stated occupation cannot be a ground state as labelled (more
orbitals in an irrep than the cores and valence shells of the atoms have there, or degenerate partners filled
unevenly) and is a good one when the axes are called otherwise. It gives the renamed occupation and the turned
geometry. Choices of axes that the molecule itself makes equal, x and y of a linear one, are the same state and
never flagged, nor is a level filled in part that has the same partners in the other axes. Not judged
where the occupation or the group is not settled.

Passes: N2 along z in D2h with Ag = 3, B1u = 2, B2u = 1, B3u = 1.
Speaks: the same occupation with N2 along x: there it is B3u = 2 and B1u = 1.
Source: R. S. Mulliken, J. Chem. Phys. 23, 1997 (1955); the limit by valence shells is common practice, no source.
"""

from collections.abc import Iterator, Mapping
from typing import TYPE_CHECKING

from checker.chemistry.irrep_names import read_orbital, read_state
from checker.facts import Facts
from checker.findings import Edit, Finding, Grade, Json, Repair
from checker.registry import Rule

if TYPE_CHECKING:
    from checker.chemistry.relabelling import Relabelling

MOST_ATOMS_TURNED = 200
"""A repair that rewrites more atoms than this is better made where the geometry comes from."""


def judge(facts: Facts) -> Iterator[Finding]:
    """Ask for other axes under which the occupation makes sense, where it does not under these."""
    if facts.job.occupations is None:
        return
    others = facts.irreps.other_axes
    if others:
        yield _other_axes(facts, others)


def _other_axes(facts: Facts, others: "tuple[Relabelling, ...]") -> Finding:
    irreps = facts.irreps
    alpha, beta = irreps.electrons
    first = others[0]
    renamed = {old: new for old, new in first.names.items() if old != new and (alpha | beta).get(old)}
    words = ", ".join(f"{new} for {old}" for old, new in renamed.items())
    return Finding(
        at="occupations",
        message=f"the occupation fits this geometry only with {first.words} ({words})",
        why=f"Labels hold for the {_frame_words(facts)}; with these the occupation is that of no ground state.",
        confidence=_confidence(facts, len(others)),
        evidence={
            "point_group": irreps.group,
            "full_group": irreps.body_group,
            "alpha": dict[str, Json](alpha),
            "beta": dict[str, Json](beta),
            "renamed": dict[str, Json](renamed),
            "choices": len(others),
        },
        repairs=tuple(repair for other in others for repair in _repairs(facts, other, 1 / len(others))),
    )


def _confidence(facts: Facts, n_choices: int) -> float:
    """Return more where partners of a level are at odds than where the valence shells alone speak."""
    surest = 0.7 if facts.irreps.stated_readings is None else 0.95
    return surest if n_choices == 1 else 0.8 * surest


def _frame_words(facts: Facts) -> str:
    note = facts.irreps.placement.frame_note
    return "coordinates' own axes" if note == "axes as given" else f"frame with {note}"


def _repairs(facts: Facts, other: "Relabelling", share: float) -> Iterator[Repair]:
    yield Repair(f"rename the irreps, {other.words}", tuple(_renamed(facts, other)), 0.6 * share)
    if facts.job.symmetry.axes == "as-given" and len(facts.numbers) <= MOST_ATOMS_TURNED:
        yield Repair("keep the names and turn the geometry", _turned(facts, other), 0.4 * share)


def _renamed(facts: Facts, other: "Relabelling") -> Iterator[Edit]:
    """Rename every table of the deck that is labelled by the same axes."""
    occupations, treatment, active = facts.job.occupations, facts.job.treatment, facts.job.active_space
    tables = {
        f"occupations.{name}": getattr(occupations, name) for name in ("alpha", "beta", "paired", "unpaired")
    }
    tables["treatment.frozen_orbitals"] = treatment.frozen_orbitals
    tables["active_space.orbitals"] = None if active is None else active.orbitals
    tables["treatment.roots"] = treatment.roots
    for key, table in tables.items():
        if isinstance(table, Mapping):
            edited = {_new_name(facts, name, other): n for name, n in table.items()}
            if list(edited) != list(table):
                yield Edit(key, dict[str, Json](edited))
    if treatment.state_irrep is not None:
        name = _new_name(facts, treatment.state_irrep, other)
        if name != treatment.state_irrep:
            yield Edit("treatment.state_irrep", name)


def _new_name(facts: Facts, written: str, other: "Relabelling") -> str:
    """Return the new name, or the written one where it is unknown or stays."""
    irrep = read_orbital(facts.point_group, written).irrep or read_state(facts.point_group, written).irrep
    return written if irrep is None or other.names[irrep.name] == irrep.name else other.names[irrep.name]


def _turned(facts: Facts, other: "Relabelling") -> tuple[Edit, ...]:
    """Turn the molecule about its centre so that the axes which the labels speak of are x, y and z."""
    center = facts.symmetry.center
    turn = other.turn.T @ facts.irreps.placement.frame
    return facts.atoms_at((facts.coordinates - center) @ turn.T + center)


RULE = Rule("axis-convention", Grade.DOUBT, judge)
