"""Data tables: CSV files beside this module, read on first use into frozen rows.

README.md says where each file comes from, in which edition, and how it is rebuilt.
"""

import csv
from collections.abc import Mapping
from dataclasses import dataclass
from functools import cache
from importlib.resources import files
from types import MappingProxyType


@dataclass(frozen=True, slots=True)
class GroundLevelRow:
    """A stored ground level; empty strings are what is not known. See the head of ``ground_levels.csv``."""

    z: int
    symbol: str
    charge: int
    configuration: str
    level: str
    leading_term: str
    bound: bool
    basis: str
    source: str
    note: str


@dataclass(frozen=True, slots=True)
class PotentialRow:
    """Sets that replace the same electrons; see the head of ``core_potentials.csv``.

    Attributes
    ----------
    names : the sets' published names.
    replaced : electrons replaced, by atomic number; 0 for an all-electron element of the set.
    below_open_f : electrons of the core below an f shell that the core holds too; None where it holds no open one.
    source : where the row comes from.

    """

    names: tuple[str, ...]
    replaced: Mapping[int, int]
    below_open_f: int | None
    source: str


def read_rows(file_name: str) -> list[dict[str, str]]:
    """Return the rows of a table of this package by column name; lines that begin with # are comments."""
    text = files(__name__).joinpath(file_name).read_text(encoding="utf-8")
    return list(csv.DictReader(line for line in text.splitlines() if not line.startswith("#")))


@cache
def ground_levels() -> Mapping[tuple[int, int], GroundLevelRow]:
    """Return the stored ground levels by (atomic number, charge)."""
    rows = (_ground_level(row) for row in read_rows("ground_levels.csv"))
    return MappingProxyType({(row.z, row.charge): row for row in rows})


@cache
def usual_charges() -> Mapping[int, tuple[int, ...]]:
    """Return the usual ionic charges by atomic number, commonest first; elements without any are left out."""
    rows = read_rows("usual_charges.csv")
    return MappingProxyType({int(row["z"]): tuple(map(int, row["charges"].split())) for row in rows})


@cache
def core_potentials() -> tuple[PotentialRow, ...]:
    """Return the published sets and the electrons their core potentials replace."""
    return tuple(_potential(row) for row in read_rows("core_potentials.csv"))


def _ground_level(row: dict[str, str]) -> GroundLevelRow:
    return GroundLevelRow(
        z=int(row["z"]),
        symbol=row["symbol"],
        charge=int(row["charge"]),
        configuration=row["configuration"],
        level=row["level"],
        leading_term=row["leading_term"],
        bound=row["bound"] == "yes",
        basis=row["basis"],
        source=row["source"],
        note=row["note"],
    )


def _potential(row: dict[str, str]) -> PotentialRow:
    return PotentialRow(
        names=tuple(row["names"].split("; ")),
        replaced=MappingProxyType(_expand_ranges(row["replaced"])),
        below_open_f=int(row["below_open_f"]) if row["below_open_f"] else None,
        source=row["source"],
    )


def _expand_ranges(text: str) -> dict[int, int]:
    """Return {atomic number: electrons} of a text such as ``1-36:0 37-54:28 57:46``."""
    replaced: dict[int, int] = {}
    for part in text.split():
        elements, _, electrons = part.partition(":")
        first, _, last = elements.partition("-")
        replaced.update(dict.fromkeys(range(int(first), int(last or first) + 1), int(electrons)))
    return replaced
