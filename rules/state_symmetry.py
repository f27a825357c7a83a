"""state-symmetry: the wanted state must have the symmetry that the unpaired electrons give it.

In a single determinant of restricted orbitals the filled orbitals are totally symmetric together, so the state
has the product of the irreps that hold an odd number of unpaired electrons. Unpaired electrons of a degenerate
irrep are taken to share one level: half filled it has one irrep only. A state that no assignment allows halts;
one that needs them in different levels is a doubt. Silent for unrestricted orbitals, active spaces, excited
states and methods that are not recognised as of one determinant.

Passes: triplet O2 in D2h, unpaired B2g and B3g, state_irrep B1g.
Speaks: the same with state_irrep Ag.
Source: F. A. Cotton, Chemical Applications of Group Theory, 3rd ed., secs. 5.2 and 9.2 (from memory).
"""

from collections.abc import Iterator

from checker.chemistry.irrep_names import read_state
from checker.errors import NotDerivable
from checker.facts import Facts
from checker.findings import Edit, Finding, Grade, Json, NotJudged, Repair
from checker.registry import Rule

STATE = "treatment.state_irrep"


def judge(facts: Facts) -> Iterator[Finding | NotJudged]:
    """Compare the wanted irrep with the products of those that are singly occupied."""
    treatment = facts.job.treatment
    if treatment.state_irrep is None or not _one_determinant(facts):
        return
    from checker.chemistry.filling import state_irreps  # only decks that ask for a state need these
    from checker.chemistry.methods import kind_of

    if treatment.method is not None and kind_of(treatment.method) is None:
        yield NotJudged(f"whether {treatment.method!r} is a method of one determinant is not known")
        return
    wanted = read_state(facts.point_group, treatment.state_irrep).irrep
    if wanted is None:
        raise NotDerivable(f"{treatment.state_irrep} is no irrep of {facts.point_group.symbol}")
    unpaired = _unpaired(facts)
    expected = state_irreps(facts.point_group.symbol, unpaired)
    if wanted.name not in expected:
        possible = state_irreps(facts.point_group.symbol, unpaired, one_level=False)
        yield _other_symmetry(facts, wanted.name, unpaired, sorted(expected), wanted.name in possible)


def _one_determinant(facts: Facts) -> bool:
    treatment = facts.job.treatment
    if treatment.spin_treatment not in ("restricted", "restricted-open") or facts.job.active_space is not None:
        return False
    from checker.chemistry.methods import kind_of

    known = None if treatment.method is None else kind_of(treatment.method)
    return facts.intent != "excited" and known not in ("multiconfigurational", "excited states")


def _unpaired(facts: Facts) -> dict[str, int]:
    """Return the electrons by irrep that one spin has more than the other; both may lead in different irreps."""
    alpha, beta = facts.irreps.electrons
    difference = {name: alpha.get(name, 0) - beta.get(name, 0) for name in {**alpha, **beta}}
    return {name: abs(n) for name, n in difference.items() if n}


def _other_symmetry(
    facts: Facts, wanted: str, unpaired: dict[str, int], expected: list[str], possible: bool
) -> Finding:
    group = facts.point_group.symbol
    held = " ".join(f"{name}^{n}" if n > 1 else name for name, n in unpaired.items()) or "no unpaired electrons"
    return Finding(
        at=STATE,
        grade=Grade.DOUBT if possible else Grade.HALT,
        message=f"the occupation, {held}, makes a state of {' or '.join(expected)} in {group}, not of {wanted}",
        why="The symmetry of one determinant is the product of the irreps of its unpaired electrons.",
        confidence=0.9 if possible else 1.0,
        evidence={
            "point_group": group,
            "unpaired": dict[str, Json](unpaired),
            "state": wanted,
            "product": list[Json](expected),
        },
        repairs=tuple(Repair(f"ask for {name}", (Edit(STATE, name),), 0.7 / len(expected)) for name in expected),
    )


RULE = Rule("state-symmetry", Grade.HALT, judge)
