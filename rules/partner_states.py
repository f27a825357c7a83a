"""partner-states: the states asked for should hold every component of a degenerate state.

Where the geometry has a higher symmetry than the group of the deck, one degenerate state appears in several
irreps. Asking for one component alone leaves out its partner, and what is averaged over the states no longer
has the symmetry of the molecule. The rule seeks whole states of the full group that become exactly the irreps
asked for, and names the fewest that are missing. Not judged where the geometry lacks the stated group.

Passes: OH in C2v with roots B1 = 1 and B2 = 1; a Sigma+ state, A1 = 1.
Speaks: OH in C2v with B1 = 1 alone: add B2 = 1.
Source: F. A. Cotton, Chemical Applications of Group Theory, 3rd ed., appendix IIB (from memory).
"""

from collections.abc import Iterator, Mapping

from checker.chemistry.irrep_names import read_state
from checker.errors import NotDerivable
from checker.facts import Facts
from checker.findings import Edit, Finding, Grade, Json, Repair
from checker.registry import Rule

ROOTS = "treatment.roots"


def judge(facts: Facts) -> Iterator[Finding]:
    """Look for whole states of the full group."""
    written = facts.job.treatment.roots
    if not written:
        return
    roots = _read(facts, written)
    from checker.chemistry.filling import missing_partners

    additions = missing_partners(facts.irreps.states_per_level, roots)
    if additions:
        yield _incomplete(facts, written, roots, additions)


def _read(facts: Facts, written: Mapping[str, int]) -> dict[str, int]:
    found: dict[str, int] = {}
    for name, n in written.items():
        irrep = read_state(facts.point_group, name).irrep
        if irrep is None or n < 0:
            raise NotDerivable(f"{name} = {n} is no number of states in {facts.point_group.symbol}")
        found[irrep.name] = found.get(irrep.name, 0) + n
    return found


def _incomplete(
    facts: Facts, written: Mapping[str, int], roots: dict[str, int], additions: tuple[dict[str, int], ...]
) -> Finding:
    irreps = facts.irreps
    asked = _listed(roots)
    return Finding(
        at=ROOTS,
        message=f"{asked} in {irreps.group} is part of a degenerate state of {irreps.body_group}; "
        f"add {' or '.join(_listed(more) for more in additions)}",
        why="The components of a degenerate state have one energy; without all of them the result depends on the "
        "choice of axes.",
        confidence=0.9,
        evidence={
            "point_group": irreps.group,
            "full_group": irreps.body_group,
            "roots": dict[str, Json](roots),
            "missing": [dict[str, Json](more) for more in additions],
        },
        repairs=tuple(
            Repair(f"add {_listed(more)}", (Edit(ROOTS, _with(written, roots, more)),), 0.8 / len(additions))
            for more in additions
        ),
    )


def _listed(counts: Mapping[str, int]) -> str:
    return ", ".join(f"{name} = {n}" for name, n in counts.items() if n)


def _with(written: Mapping[str, int], roots: Mapping[str, int], more: Mapping[str, int]) -> dict[str, Json]:
    """Keep the author's spelling where nothing is added to an irrep."""
    kept: dict[str, Json] = dict(written) if not set(more) & set(roots) else dict(roots)
    for name, n in more.items():
        kept[name] = roots.get(name, 0) + n
    return kept


RULE = Rule("partner-states", Grade.DOUBT, judge)
