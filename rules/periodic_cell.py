"""periodic-cell: a geometry with a cell is a piece of a crystal, not a molecule.

A frame of an extended XYZ file may carry a lattice and periodic flags. Read as a molecule, a cell cut from a
crystal has broken bonds at its faces, and its electron count is that of the cell. A lattice whose three flags
are all false is the box around a molecule, and only worth a note.

Passes: a frame without a lattice.
Speaks: a frame with a lattice and the flags T T T; a frame with a lattice and no flags.
Source: common practice, no source.
"""

from collections.abc import Iterator

from checker.facts import Facts
from checker.findings import Finding, Grade, Json
from checker.registry import Rule


def judge(facts: Facts) -> Iterator[Finding]:
    """Speak where the geometry has periodic flags set, or a lattice."""
    atoms = facts.job.species.atoms
    if atoms.lattice is None and not any(atoms.periodic or ()):
        return
    evidence: dict[str, Json] = {
        "lattice": None if atoms.lattice is None else list(atoms.lattice),
        "periodic": None if atoms.periodic is None else list(atoms.periodic),
    }
    if atoms.periodic is not None and not any(atoms.periodic):
        yield Finding(
            at="species.atoms",
            grade=Grade.NOTE,
            message="the geometry carries a lattice, which is not used: all three periodic flags are false",
            why="The atoms are judged as one molecule in free space.",
            evidence=evidence,
        )
        return
    flags = "no periodic flags" if atoms.periodic is None else "periodic flags set"
    lattice = "a lattice" if atoms.lattice is not None else "no lattice"
    yield Finding(
        at="species.atoms",
        message=f"the geometry has {lattice} and {flags}, so it is a periodic cell, and a deck describes a "
        "molecule; cut out a molecule or cluster, or drop lattice and flags if the atoms are whole as they stand",
        why="Bonds that cross the faces of a cell are broken in a molecule, and the charge is that of the cell.",
        confidence=0.9 if atoms.periodic is None else 1.0,
        evidence=evidence,
    )


RULE = Rule("periodic-cell", Grade.HALT, judge)
