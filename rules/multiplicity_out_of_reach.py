"""multiplicity-out-of-reach: the multiplicity must not ask for more unpaired electrons than can be.

2S+1 is at least 1, and 2S at most the number of electrons: anything else halts. Within that, a ground state
that needs more unpaired electrons than the valence shells hold, or than a molecule of non-metals holds
without breaking a bond, is doubted: V electrons in K valence orbitals leave min(V, 2K - V) unpaired, and each
bond takes two of both out of the count. Silent where an excited or vertical state is meant, where the bonds
do not fit into the valence space (hypervalent and electron-deficient molecules), and for free atoms whose
ground level is known, as atom-ground-term speaks of those.

Passes: O2, multiplicity 3; ethylene, multiplicity 3 (a diradical keeps its single bonds).
Speaks: H2O, multiplicity 0 or 13 (halt); methane, multiplicity 9, and water, multiplicity 3 (doubt).
Source: common practice, no source.
"""

from collections.abc import Iterator

from checker.chemistry.ledger import is_reachable
from checker.chemistry.valence_space import count_bonds, most_unpaired
from checker.errors import NotDerivable
from checker.facts import Facts
from checker.findings import Edit, Finding, Grade, Repair
from checker.registry import Rule

EXCITED_MEANT = ("excited", "vertical")
NON_METALS = frozenset({1, 2, 5, 6, 7, 8, 9, 10, 14, 15, 16, 17, 18, 32, 33, 34, 35, 36, 52, 53, 54, 85, 86})


def judge(facts: Facts) -> Iterator[Finding]:
    """Speak where there is no such state, then where the valence shells do not hold it."""
    multiplicity = facts.stated_multiplicity
    n_electrons = facts.n_electrons
    if multiplicity < 1:
        yield _below_one(n_electrons, multiplicity)
    elif n_electrons >= 0 and multiplicity - 1 > n_electrons:
        yield _too_many(n_electrons, multiplicity)
    elif multiplicity > 2 and is_reachable(n_electrons, multiplicity) and facts.intent not in EXCITED_MEANT:
        yield from _beyond_valence(facts, multiplicity)


def _below_one(n_electrons: int, multiplicity: int) -> Finding:
    return Finding(
        at="species.multiplicity",
        message=f"multiplicity {multiplicity} is none: 2S+1 is at least 1; state 2S+1, not 2S or S",
        why="S counts half the unpaired electrons, so 2S+1 is 1 for none, 2 for one, 3 for two.",
        evidence={"multiplicity": multiplicity, "electrons": n_electrons},
        repairs=_in_reach(n_electrons, 1 + n_electrons % 2),
    )


def _too_many(n_electrons: int, multiplicity: int) -> Finding:
    return Finding(
        at="species.multiplicity",
        message=f"multiplicity {multiplicity} needs {multiplicity - 1} unpaired electrons, and the number of "
        f"electrons is {n_electrons}; lower the multiplicity",
        why="No more electrons can be unpaired than there are.",
        evidence={"multiplicity": multiplicity, "electrons": n_electrons},
        repairs=_in_reach(n_electrons, 1 + n_electrons % 2),
    )


def _in_reach(n_electrons: int, multiplicity: int) -> tuple[Repair, ...]:
    if n_electrons < 0:
        return ()
    return (Repair(f"state multiplicity {multiplicity}", (Edit("species.multiplicity", multiplicity),), 0.5),)


def _beyond_valence(facts: Facts, multiplicity: int) -> Iterator[Finding]:
    if _is_known_atom(facts):
        return
    numbers = facts.real_numbers.tolist()
    in_shells = most_unpaired(numbers, facts.charge)
    if len(numbers) > 1 and NON_METALS.issuperset(facts.elements):
        most = most_unpaired(numbers, facts.charge, count_bonds(facts.valence.bonds))
        holds, confidence = "the molecule holds without breaking a bond", 0.8
    else:
        most, holds, confidence = in_shells, "the valence shells of the atoms hold", 0.9
    if most is not None and multiplicity - 1 > most:
        beyond_all = in_shells is not None and multiplicity - 1 > in_shells
        yield _doubt(facts, most, holds, 0.9 if beyond_all else confidence)


def _is_known_atom(facts: Facts) -> bool:
    if facts.free_atom is None:
        return False
    try:
        return facts.ground_multiplicity > 0
    except NotDerivable:
        return False


def _doubt(facts: Facts, most: int, holds: str, confidence: float) -> Finding:
    multiplicity = facts.stated_multiplicity
    return Finding(
        at="species.multiplicity",
        grade=Grade.DOUBT,
        message=f"multiplicity {multiplicity} needs {multiplicity - 1} unpaired electrons, and {holds} {most} at "
        "most; lower it, or say that an excited state is meant",
        why="V electrons in K valence orbitals leave min(V, 2K - V) unpaired; a bond holds two of both.",
        confidence=confidence,
        evidence={"multiplicity": multiplicity, "most_unpaired": most, "electrons": facts.n_electrons},
        repairs=(
            *_in_reach(facts.n_electrons, most + 1),
            Repair("an excited state is meant", (Edit("treatment.intent", "excited"),), 0.3),
        ),
    )


RULE = Rule("multiplicity-out-of-reach", Grade.HALT, judge)
