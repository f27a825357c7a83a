"""occupation-capacity: no irrep can hold more electrons of one spin than the basis has functions of it.

The functions of each irrep follow from the shells of the basis and the places of the atoms; a degenerate irrep
counts all its partners, T2 three for each level. An occupation beyond that names a state that the job cannot
build. Not judged where the basis is unknown, the geometry lacks the stated group, or a name is no irrep of it.

Passes: water in C2v and a minimal basis (A1 4, B1 1, B2 2) with A1 = 3, B1 = 1, B2 = 1.
Speaks: the same with B1 = 2.
Source: F. A. Cotton, Chemical Applications of Group Theory, 3rd ed., secs. 6.2-6.3 (from memory).
"""

from collections.abc import Iterator

from checker.facts import Facts
from checker.findings import Finding, Grade
from checker.registry import Rule


def judge(facts: Facts) -> Iterator[Finding]:
    """Compare every irrep of every table with its functions."""
    for key, electrons in _tables(facts):
        functions = facts.irreps.functions
        for name, n in electrons.items():
            if n > functions.get(name, 0):
                yield _too_many(facts, key, name, n, functions.get(name, 0))


def _tables(facts: Facts) -> Iterator[tuple[str, dict[str, int]]]:
    """Yield the keys that occupy orbitals and the electrons of one spin in each irrep."""
    occupations = facts.job.occupations
    if occupations is None:
        return
    for key, table in (("occupations.alpha", occupations.alpha), ("occupations.beta", occupations.beta)):
        if table is not None:
            yield key, facts.irreps.read_counts(table)
    if occupations.paired is not None or occupations.unpaired is not None:
        paired, unpaired = (facts.irreps.in_electrons(t) for t in (occupations.paired, occupations.unpaired))
        total = {name: paired.get(name, 0) + unpaired.get(name, 0) for name in {**paired, **unpaired}}
        yield "occupations.paired" if occupations.paired else "occupations.unpaired", total


def _too_many(facts: Facts, key: str, name: str, n_occupied: int, n_functions: int) -> Finding:
    basis = facts.job.basis
    assert basis is not None
    group = facts.irreps.group
    orbitals = f"1 orbital of {name} is" if n_occupied == 1 else f"{n_occupied} orbitals of {name} are"
    functions = "1 function" if n_functions == 1 else f"{n_functions or 'no'} functions"
    return Finding(
        at=key,
        message=f"{orbitals} occupied in {group}, and {basis.name} has {functions} of it",
        why="Each orbital is made of the functions of its irrep, and there are as many orbitals as functions.",
        evidence={"point_group": group, "irrep": name, "occupied": n_occupied, "functions": n_functions},
    )


RULE = Rule("occupation-capacity", Grade.HALT, judge)
