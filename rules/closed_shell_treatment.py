"""closed-shell-treatment: the spin treatment must suit the number of unpaired electrons.

A restricted closed-shell treatment puts two electrons into each orbital: with an unpaired electron there is
no such state. A restricted open-shell or unrestricted treatment of a closed shell gives the same state for
more hours, which is worth a note, unless the deck says that broken symmetry or an open-shell singlet is
wanted. With an active space the unpaired electrons are its matter, and the treatment of the orbitals is not
judged. Where the multiplicity has the wrong parity, spin-parity speaks first.

Passes: O2, multiplicity 3, unrestricted; water, multiplicity 1, restricted.
Speaks: O2, multiplicity 3, restricted (halt); water, multiplicity 1, unrestricted (note).
Source: Szabo & Ostlund, Modern Quantum Chemistry, sec. 2.5 and 3.8 (from memory).
"""

from collections.abc import Iterator

from checker.chemistry.ledger import is_reachable
from checker.facts import Facts
from checker.findings import Edit, Finding, Grade, NotJudged, Repair
from checker.registry import Rule

TREATMENT = "treatment.spin_treatment"


def judge(facts: Facts) -> Iterator[Finding | NotJudged]:
    """Compare the treatment with the unpaired electrons of the state and of the occupations."""
    treatment = facts.job.treatment.spin_treatment
    if treatment is None:
        return
    if treatment == "restricted":
        yield from _restricted(facts)
    elif facts.job.species.multiplicity == 1 and _is_plain_closed_shell(facts):
        yield _spent_on_a_closed_shell(facts, treatment)


def _restricted(facts: Facts) -> Iterator[Finding | NotJudged]:
    n_unpaired = _n_unpaired(facts)
    n_open = _n_open_in_occupations(facts)
    if n_unpaired == 0 and n_open == 0:
        return
    if facts.job.active_space is not None:
        yield NotJudged("the unpaired electrons may be those of the active space")
    elif n_unpaired:
        plural = "electron" if n_unpaired == 1 else "electrons"
        yield _impossible(
            facts,
            f"the state has {n_unpaired} unpaired {plural}, and a restricted treatment leaves none",
            n_unpaired,
        )
    else:
        yield _impossible(
            facts, "the occupations leave orbitals singly occupied, and a restricted treatment pairs all", n_open
        )


def _n_unpaired(facts: Facts) -> int:
    """Return the unpaired electrons of the state as far as the deck settles them; wrong parity settles nothing."""
    multiplicity, n_electrons = facts.job.species.multiplicity, facts.ledger.n_electrons
    if multiplicity is None:
        return 0 if n_electrons is None else n_electrons % 2
    if n_electrons is not None and not is_reachable(n_electrons, multiplicity):
        return 0
    return max(0, multiplicity - 1)


def _n_open_in_occupations(facts: Facts) -> int:
    """Return a count of what stands singly occupied: unpaired orbitals, or alpha and beta that differ."""
    occupations = facts.job.occupations
    if occupations is None:
        return 0
    if occupations.alpha is not None and occupations.beta is not None:
        alpha, beta = ({k.casefold(): n for k, n in t.items()} for t in (occupations.alpha, occupations.beta))
        return sum(abs(alpha.get(name, 0) - beta.get(name, 0)) for name in {*alpha, *beta})
    return sum(max(0, n) for n in (occupations.unpaired or {}).values())


def _is_plain_closed_shell(facts: Facts) -> bool:
    n_electrons = facts.ledger.n_electrons
    if n_electrons is None or n_electrons < 2 or n_electrons % 2 == 1:
        return False
    spins_meant = facts.intent in ("broken-symmetry", "excited") or bool(facts.job.fragments)
    return not spins_meant and facts.job.active_space is None and _n_open_in_occupations(facts) == 0


def _impossible(facts: Facts, message: str, n_unpaired: int) -> Finding:
    repairs = [
        Repair("keep the spin, share the orbitals of both spins", (Edit(TREATMENT, "restricted-open"),), 0.5),
        Repair("keep the spin, give each spin its orbitals", (Edit(TREATMENT, "unrestricted"),), 0.4),
    ]
    n_electrons = facts.ledger.n_electrons
    if facts.job.species.multiplicity not in (None, 1) and n_electrons is not None and n_electrons % 2 == 0:
        repairs.append(Repair("keep the treatment, ask for a singlet", (Edit("species.multiplicity", 1),), 0.1))
    return Finding(
        at=TREATMENT,
        message=f'{message}; set spin_treatment = "restricted-open" or "unrestricted"',
        why="A restricted closed-shell determinant holds every orbital twice, so it has no unpaired electron.",
        evidence={
            "spin_treatment": "restricted",
            "multiplicity": facts.job.species.multiplicity,
            "electrons": n_electrons,
            "singly_occupied": n_unpaired,
        },
        repairs=tuple(repairs),
    )


def _spent_on_a_closed_shell(facts: Facts, treatment: str) -> Finding:
    repairs = [Repair("a closed shell is meant", (Edit(TREATMENT, "restricted"),), 0.6)]
    if treatment == "unrestricted":
        says = "a broken-symmetry singlet is meant"
        repairs.append(Repair(says, (Edit("treatment.intent", "broken-symmetry"),), 0.3))
    return Finding(
        at=TREATMENT,
        grade=Grade.NOTE,
        message=f"{treatment} on a singlet without open shells gives the restricted state for more hours; "
        "say restricted, or say what is to be open",
        why="From equal orbitals for both spins the iterations do not leave the closed shell by themselves.",
        confidence=0.8,
        evidence={"spin_treatment": treatment, "multiplicity": 1, "electrons": facts.ledger.n_electrons},
        repairs=tuple(repairs),
    )


RULE = Rule("closed-shell-treatment", Grade.HALT, judge)
