"""Tables behind bonds and valences, loaded on first use: bond radii, usual valences, ion charges, unbound anions.

Those by element are tuples or arrays indexed by atomic number (entry 0 unused), so that an array of atomic
numbers can look its values up in one step.
"""

import csv
from collections.abc import Iterator
from functools import cache
from importlib import resources
from typing import TypeVar

import numpy as np
from numpy.typing import NDArray

from checker.elements import MAX_ATOMIC_NUMBER, covalent_radius

Scalar = TypeVar("Scalar", bound=np.generic)

RADIUS_WITHOUT_SOURCE = 1.70
"""Covalent radius in angstrom of the elements above curium, for which the source gives none."""


@cache
def cordero_radii() -> NDArray[np.float64]:
    """Covalent radii in angstrom by atomic number (Cordero et al., Dalton Trans. 2008, 2832), shape (119,)."""
    radii = [covalent_radius(z) or RADIUS_WITHOUT_SOURCE for z in range(1, MAX_ATOMIC_NUMBER + 1)]
    return _read_only(np.array([0.0, *radii]))


@cache
def bond_radii() -> tuple[tuple[float | None, float | None, float | None], ...]:
    """Single-, double- and triple-bond radii in angstrom by atomic number (Pyykko and co-workers)."""
    table: list[tuple[float | None, float | None, float | None]] = [(None, None, None)] * (MAX_ATOMIC_NUMBER + 1)
    for row in _rows("bond_radii.csv"):
        single, double, triple = (
            float(row[name]) if row[name] else None for name in ("single", "double", "triple")
        )
        table[int(row["number"])] = (single, double, triple)
    return tuple(table)


@cache
def usual_valences() -> tuple[tuple[int, ...], ...]:
    """Usual covalent valences by atomic number, that of the octet first; empty for metals treated as ions."""
    table: list[tuple[int, ...]] = [()] * (MAX_ATOMIC_NUMBER + 1)
    for row in _rows("usual_valences.csv"):
        table[int(row["number"])] = tuple(int(word) for word in row["valences"].split())
    return tuple(table)


@cache
def valence_electrons() -> tuple[int, ...]:
    """Valence electrons of the covalent main-group elements by atomic number; 0 for the others."""
    table = [0] * (MAX_ATOMIC_NUMBER + 1)
    for row in _rows("usual_valences.csv"):
        table[int(row["number"])] = int(row["valence_electrons"])
    return tuple(table)


@cache
def first_valences() -> NDArray[np.int64]:
    """Return the octet valence by atomic number, shape (119,); 0 for noble gases and metals treated as ions."""
    return _read_only(np.array([valences[0] if valences else 0 for valences in usual_valences()]))


@cache
def ion_charges() -> tuple[int, ...]:
    """Charge of the metals that occur as one ion only, by atomic number; 0 for all others."""
    table = [0] * (MAX_ATOMIC_NUMBER + 1)
    for row in _rows("ion_charges.csv"):
        table[int(row["number"])] = int(row["charge"])
    return tuple(table)


@cache
def attachment_energies() -> dict[str, float]:
    """Return molecules that bind no extra electron: energy of the temporary anion in eV by Hill formula."""
    return {row["formula"]: float(row["attachment_energy"]) for row in _rows("unbound_anions.csv")}


@cache
def is_covalent() -> NDArray[np.bool_]:
    """Return True for the elements whose bonds are counted as covalent valences, shape (119,)."""
    return _read_only(np.array([bool(valences) for valences in usual_valences()]))


def _rows(name: str) -> Iterator[dict[str, str]]:
    text = resources.files("checker.tables").joinpath(name).read_text(encoding="utf-8")
    return csv.DictReader(line for line in text.splitlines() if not line.startswith("#"))


def _read_only(array: NDArray[Scalar]) -> NDArray[Scalar]:
    array.setflags(write=False)
    return array
