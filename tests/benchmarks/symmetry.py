"""What the symmetry of a geometry costs, warm, in processor time of this process; run as a script.

Floors: 5 ms for 30 atoms, with frame, abelian group and the next higher group; 1 s for 1,000 atoms. A busy machine
doubles processor time, so each figure stands beside that of a fixed piece of array work: the ratio is what counts.
"""

import statistics
import time
from collections.abc import Callable
from functools import partial

import numpy as np
from ase.build import molecule
from ase.cluster import Icosahedron, Octahedron

from checker.chemistry.symmetry import find_symmetry

REPEATS = 15
Floats = np.ndarray


def seconds(run: Callable[[], object]) -> float:
    run()
    taken = []
    for _ in range(REPEATS):
        start = time.process_time()
        run()
        taken.append(time.process_time() - start)
    return statistics.median(taken)


def array_work() -> None:
    """A hundred decompositions of 48 small matrices: about 30 ms where nothing else runs."""
    matrices = np.random.default_rng(0).normal(size=(48, 3, 3))
    for _ in range(100):
        np.linalg.svd(matrices)


def whole(kinds: Floats, places: Floats) -> None:
    found = find_symmetry(kinds, places)
    _ = found.placement, found.abelian, found.next_higher


def chain(n_carbon: int, shake: float) -> tuple[Floats, Floats]:
    """CnH2n+2 in the zigzag form; shaken it has no symmetry."""
    i = np.arange(n_carbon)
    side = 0.42 * (-1.0) ** i
    carbons = np.stack([1.27 * i, side, 0 * side], axis=1)
    hydrogens = [carbons + np.stack([0 * side, 1.5 * side, 0 * side + s], axis=1) for s in (0.89, -0.89)]
    ends = carbons[[0, -1]] + [[-0.89, -0.63, 0], [0.89, -0.63 * (-1.0) ** (n_carbon - 1), 0]]
    places = np.concatenate([carbons, *hydrogens, ends])
    kinds = np.array([6] * n_carbon + [1] * (2 * n_carbon + 2))
    return kinds, places + np.random.default_rng(1).normal(scale=shake or 1e-12, size=places.shape)


def ring(n: int) -> tuple[Floats, Floats]:
    angles = 2 * np.pi * np.arange(n) / n
    return np.full(n, 6), 0.25 * n * np.stack([np.cos(angles), np.sin(angles), 0 * angles], axis=1)


def gas(n: int) -> tuple[Floats, Floats]:
    return np.full(n, 6), np.random.default_rng(2).uniform(-12, 12, size=(n, 3))


def crystal(n: int) -> tuple[Floats, Floats]:
    grid = np.stack(np.meshgrid(*[np.arange(n)] * 3), axis=-1).reshape(-1, 3)
    return np.full(len(grid), 29), 2.6 * grid.astype(float)


def main() -> None:
    ase = {"benzene": molecule("C6H6"), "C60": molecule("C60"), "Au38": Octahedron("Au", 4, 1)}
    bodies = {
        "20 atoms, C1": chain(6, 0.1), "32 atoms, C2h": chain(10, 0.0), "32 atoms, C1": chain(10, 0.1),
        **{name: (atoms.numbers, atoms.positions) for name, atoms in ase.items()},
        "ring of 30": ring(30), "Cu561": (Icosahedron("Cu", 6).numbers, Icosahedron("Cu", 6).positions),
        "gas of 1,000": gas(1000), "cube of 1,000": crystal(10),
    }  # fmt: skip
    for name, (kinds, places) in bodies.items():
        group, all_of_it = seconds(partial(find_symmetry, kinds, places)), seconds(partial(whole, kinds, places))
        unit = seconds(array_work)
        found = find_symmetry(kinds, places).group
        print(
            f"{name:>15}: {found:5} group {1e3 * group:7.2f} ms, with frames and the next higher "
            f"{1e3 * all_of_it:7.2f} ms ({all_of_it / unit:.2f} of the array work's {1e3 * unit:.1f} ms)"
        )


if __name__ == "__main__":
    main()
