"""The table of basis sets, read on first use; a set's contents are unpacked when they are asked for."""

from functools import cache
from importlib.resources import files
from typing import NamedTuple

__all__ = ["BasisSetRow", "basis_set_rows"]


class BasisSetRow(NamedTuple):
    """A set of the catalogue (a tuple, as hundreds are made in a millisecond); see the head of ``basis_sets.csv``.

    Attributes
    ----------
    names : the set's published names; one as a rule.
    role : "orbital", "potential" (a core potential without functions) or the purpose of an auxiliary set.
    cartesian : angular momenta for which the set is made for cartesian functions.
    contents : the packed contents, elements and shells.

    """

    names: tuple[str, ...]
    role: str
    cartesian: tuple[int, ...]
    contents: str


@cache
def basis_set_rows() -> tuple[BasisSetRow, ...]:
    """Return all sets in the catalogue's order."""
    text = files("checker.tables").joinpath("basis_sets.csv").read_text(encoding="utf-8")
    _, *rows = (line.split("|") for line in text.splitlines() if not line.startswith("#"))
    return tuple(
        BasisSetRow(tuple(names.split("; ")), role, tuple(map(int, cartesian.split())), contents)
        for names, role, cartesian, contents in rows
    )
