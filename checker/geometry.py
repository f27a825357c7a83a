"""A geometry as arrays: one row an atom."""

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

ANGSTROM_PER_BOHR = 0.529177210544
"""The Bohr radius, CODATA 2022: 0.529177210544(82) angstrom."""


@dataclass(frozen=True, slots=True, eq=False)
class Geometry:
    """Atoms in the order of the deck, ghosts among them.

    Attributes
    ----------
    numbers : (n,) int64, atomic numbers.
    coordinates : (n, 3) float64, angstrom.
    mass_numbers : (n,) int64, 0 for the natural mixture, 2 and 3 for D and T.
    lattice : the nine numbers of a cell in angstrom, if the file gives one.
    periodic : the three periodic flags, if the file gives them.

    """

    numbers: NDArray[np.int64]
    coordinates: NDArray[np.float64]
    mass_numbers: NDArray[np.int64]
    lattice: tuple[float, ...] | None = None
    periodic: tuple[bool, bool, bool] | None = None

    def __post_init__(self) -> None:
        for array in (self.numbers, self.coordinates, self.mass_numbers):
            array.setflags(write=False)

    def __len__(self) -> int:
        return len(self.numbers)
