"""Idealised molecules: a centre with equal ligands round it, and a few written-out ones.

Bond lengths are rounded from common handbook values (common practice, no source); they decide nothing finer than
"single or multiple bond".
"""

import numpy as np
from numpy.typing import NDArray

from checker.elements import number_of

Structure = tuple[NDArray[np.int64], NDArray[np.float64]]

_SINE = 3**0.5 / 2
DIRECTIONS: dict[str, list[tuple[float, float, float]]] = {
    "linear": [(0, 0, 1), (0, 0, -1)],
    "bent": [(0.85, 0.5, 0), (-0.85, 0.5, 0)],
    "trigonal": [(1, 0, 0), (-0.5, _SINE, 0), (-0.5, -_SINE, 0)],
    "pyramid": [(0.94, 0, 0.33), (-0.47, 0.81, 0.33), (-0.47, -0.81, 0.33)],
    "tetrahedron": [(1, 1, 1), (1, -1, -1), (-1, 1, -1), (-1, -1, 1)],
    "seesaw": [(0, 0, 1), (0, 0, -1), (0.77, 0.64, 0), (-0.77, 0.64, 0)],
    "square": [(1, 0, 0), (-1, 0, 0), (0, 1, 0), (0, -1, 0)],
    "bipyramid": [(0, 0, 1), (0, 0, -1), (1, 0, 0), (-0.5, _SINE, 0), (-0.5, -_SINE, 0)],
    "octahedron": [(1, 0, 0), (-1, 0, 0), (0, 1, 0), (0, -1, 0), (0, 0, 1), (0, 0, -1)],
}


def star(centre: str, ligand: str, shape: str, length: float) -> Structure:
    """A centre with equal ligands at one distance (angstrom)."""
    rows = [(ligand, length * np.array(way) / np.linalg.norm(way)) for way in DIRECTIONS[shape]]
    return structure([(centre, 0.0, 0.0, 0.0), *((symbol, *place.tolist()) for symbol, place in rows)])


def structure(rows: list[tuple[str, float, float, float]]) -> Structure:
    """Atomic numbers and coordinates from rows of symbol, x, y, z."""
    numbers = [number_of(row[0]) for row in rows]
    assert None not in numbers, rows
    return np.array(numbers, dtype=np.int64), np.array([row[1:] for row in rows], dtype=float).reshape(-1, 3)


def rows(of: Structure) -> list[tuple[str, float, float, float]]:
    """Rows of symbol, x, y, z."""
    from checker.elements import symbol_of

    return [(symbol_of(int(z)), *map(float, place)) for z, place in zip(*of, strict=True)]


def without(of: Structure, *atoms: int) -> Structure:
    """The structure without the atoms of these indices."""
    kept = np.setdiff1d(np.arange(len(of[0])), atoms)
    return of[0][kept], of[1][kept]


def joined(*parts: Structure, apart: float = 8.0) -> Structure:
    """Structures side by side along x."""
    numbers = np.concatenate([numbers for numbers, _ in parts])
    return numbers, np.vstack([places + np.array([apart * i, 0.0, 0.0]) for i, (_, places) in enumerate(parts)])


def sodium_with_six_waters() -> Structure:
    """An octahedral aqua ion, Na-O 2.40 angstrom."""
    atoms: list[tuple[str, float, float, float]] = [("Na", 0.0, 0.0, 0.0)]
    for way in DIRECTIONS["octahedron"]:
        axis = np.array(way, dtype=float)
        across = np.cross(axis, [0.3, 0.5, 0.7])
        across /= np.linalg.norm(across)
        for symbol, place in (("O", 2.4), ("H", 2.99), ("H", 2.99)):
            side = {"O": 0.0, "H": 0.76}[symbol] * (-1 if len(atoms) % 3 == 0 else 1)
            atoms.append((symbol, *(place * axis + side * across).tolist()))
    return structure(atoms)
