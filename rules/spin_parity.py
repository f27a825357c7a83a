"""spin-parity: the electron count and the multiplicity must have opposite parity.

N electrons leave an even or odd number unpaired exactly as N is even or odd, and 2S+1 is that number plus one.

Passes: H2O, charge 0, multiplicity 1 (N = 10).
Speaks: H2O, charge +1, multiplicity 1 (N = 9).
Source: Szabo & Ostlund, Modern Quantum Chemistry, sec. 2.5 (from memory).
"""

from collections.abc import Iterator

from checker.facts import Facts
from checker.findings import Finding, Grade
from checker.registry import Rule


def judge(facts: Facts) -> Iterator[Finding]:
    """Speak where no state of that many electrons has the stated multiplicity."""
    n_electrons = facts.n_electrons
    multiplicity = facts.stated_multiplicity
    if n_electrons % 2 != multiplicity % 2:
        return
    needed = "odd" if n_electrons % 2 == 0 else "even"
    yield Finding(
        at="species.multiplicity",
        message=f"{n_electrons} electrons need an {needed} multiplicity, not {multiplicity}",
        why=f"{n_electrons} electrons leave an {'even' if n_electrons % 2 == 0 else 'odd'} number unpaired.",
        evidence={"electrons": n_electrons, "multiplicity": multiplicity},
    )


RULE = Rule("spin-parity", Grade.HALT, judge)
