"""atom-ground-term: a free atom or ion is expected in the multiplicity of its ground level.

The levels of atoms and ions are known from spectra. Filling rules mislead: Pd is 4d10, W 5d4 6s2, V+ 3d4, and the
free cerium atom a singlet. The levels are therefore looked up; only where none is stored and one shell is open are
they derived by Hund's rules, which the evidence then says. Silent where another state is meant
(`treatment.intent` is excited or broken-symmetry) and where no state has the stated multiplicity at all, which
spin-parity and multiplicity-out-of-reach say. Not judged where unpaired f electrons sit in a core potential, where
the level has no LS name, where an anion is not bound, and for ions embedded in a crystal.

Passes: Fe, charge +2, multiplicity 5 (3d6 5D4).
Speaks: C, charge 0, multiplicity 1 (2p2 3P0 is a triplet).
Source: NIST Atomic Spectra Database and the compilations named in checker/tables/README.md (from memory).
"""

from collections.abc import Iterator

from checker.chemistry.ledger import is_reachable
from checker.elements import written_ion
from checker.facts import Facts
from checker.findings import Edit, Finding, Grade, Repair
from checker.registry import Rule

OTHER_STATE_MEANT = ("excited", "broken-symmetry")


def judge(facts: Facts) -> Iterator[Finding]:
    """Speak where a free atom's stated multiplicity is not that of its ground level."""
    if facts.free_atom is None or facts.intent in OTHER_STATE_MEANT:
        return
    stated = facts.stated_multiplicity
    expected = facts.ground_multiplicity
    if stated == expected or not is_reachable(facts.n_electrons, stated):
        return
    level = facts.ground_level
    ion = written_ion(level.atomic_number, level.charge)
    yield Finding(
        at="species.multiplicity",
        message=f"the ground level of {ion} is {level.level} with multiplicity {expected}, not {stated}",
        why=f"Its configuration is {level.configuration}; the level is {level.origin} ({level.source}).",
        confidence=facts.ground_level_confidence,
        evidence={
            "multiplicity": stated,
            "ground_multiplicity": expected,
            "configuration": level.configuration,
            "level": level.level,
            "term": level.term,
            "origin": level.origin,
            "source": level.source,
        },
        repairs=(
            Repair(
                f"ask for the ground level, multiplicity {expected}", _set("species.multiplicity", expected), 0.9
            ),
            Repair("say that another state is meant", _set("treatment.intent", "excited"), 0.1),
        ),
        subject=f"{ion} {stated}",
    )


def _set(key: str, value: int | str) -> tuple[Edit, ...]:
    return (Edit(key, value),)


RULE = Rule("atom-ground-term", Grade.DOUBT, judge)
