"""Bodies of a known point group: generated ones for every family, and named molecules built by hand.

Distances and angles of the molecules are rounded (common practice, no source); they decide nothing but the group.
"""

from collections.abc import Iterable

import numpy as np
from numpy.typing import NDArray
from scipy.spatial.transform import Rotation

from checker.elements import number_of

Body = tuple[NDArray[np.int64], NDArray[np.float64]]
Row = tuple[str, float, float, float]

PLANE_XY = np.diag([1.0, 1.0, -1.0])
PLANE_XZ = np.diag([1.0, -1.0, 1.0])
PLANE_OF_DIAGONAL = np.array([[0.0, 1, 0], [1, 0, 0], [0, 0, 1]])
INVERSION = -np.eye(3)

FAMILIES = [
    "C1", "Cs", "Ci", "T", "Td", "Th", "O", "Oh", "I", "Ih",
    *(f"{kind}{n}{end}" for kind, end in (("C", ""), ("C", "v"), ("C", "h"), ("D", ""), ("D", "h"), ("D", "d"))
      for n in (2, 3, 4, 5, 6, 7, 8, 12)),
    *(f"S{n}" for n in (4, 6, 8, 10, 12)),
]  # fmt: skip


def about_z(angle: float) -> NDArray[np.float64]:
    """The turn about z by an angle in degrees."""
    return Rotation.from_euler("z", angle, degrees=True).as_matrix()


def operations_of(symbol: str) -> NDArray[np.float64]:
    """The matrices of a finite group, its rotations from scipy: they owe nothing to the code under test."""
    if symbol in ("C1", "Cs", "Ci"):
        return np.array([np.eye(3), *({"Cs": [PLANE_XY], "Ci": [INVERSION]}.get(symbol, []))])
    letters, n = symbol.rstrip("vdh0123456789"), int("".join(filter(str.isdigit, symbol)) or 0)
    end = symbol[-1] if symbol[-1] in "vdh" else ""
    rotations = Rotation.create_group({"S": f"C{n // 2}"}.get(letters, f"{letters}{n or ''}")).as_matrix()
    further = {
        "S": PLANE_XY @ about_z(360 / max(n, 1)), "Cv": PLANE_XZ, "Ch": PLANE_XY, "Dh": PLANE_XY,
        "Dd": PLANE_XY @ about_z(180 / max(n, 1)), "Td": PLANE_OF_DIAGONAL, "Th": INVERSION, "Oh": INVERSION,
        "Ih": INVERSION,
    }.get(letters + end)  # fmt: skip
    return rotations if further is None else np.concatenate([rotations, rotations @ further])


def built(symbol: str, least_gap: float = 0.9) -> Body:
    """Four kinds of atoms, each spread over the group from a place that has no symmetry of its own."""
    operations = operations_of(symbol)
    starts = np.array([[0.55, 0.31, 0.83], [0.21, 0.74, -0.35], [0.71, -0.13, 0.29], [-0.4, 0.62, -0.51]])
    shells = [operations @ start for start in starts]
    least = min(
        np.linalg.norm(s[:, None] - s[None] + 9 * np.eye(len(s))[:, :, None], axis=2).min() for s in shells
    )
    coordinates = np.concatenate(shells) * max(1.5, least_gap / least)
    return np.repeat([6, 7, 8, 9], len(operations)).astype(np.int64), coordinates


def body(rows: Iterable[Row]) -> Body:
    """Atomic numbers and coordinates of rows."""
    held = list(rows)
    numbers = [number_of(row[0]) for row in held]
    assert None not in numbers, held
    return np.array(numbers, dtype=np.int64), np.array([row[1:] for row in held], dtype=float)


def ring(symbol: str, n: int, radius: float, height: float = 0.0, start: float = 0.0) -> list[Row]:
    """Equal atoms in a ring about z; `start` in degrees from x."""
    angles = np.deg2rad(start + 360.0 * np.arange(n) / n)
    return [(symbol, float(radius * np.cos(a)), float(radius * np.sin(a)), height) for a in angles]


def spread(symbol: str, group: str, *place: float) -> list[Row]:
    """The atoms that a group makes of one, each place once."""
    places = np.unique(np.round(operations_of(group) @ np.array(place), 9) + 0.0, axis=0)
    return [(symbol, *map(float, place)) for place in places]


def at(symbol: str, *places: tuple[float, float, float]) -> list[Row]:
    """Atoms of one element at places."""
    return [(symbol, *place) for place in places]


def annulene(n: int, distance: float = 1.40) -> list[Row]:
    """A planar ring CnHn."""
    radius = distance / (2 * np.sin(np.pi / n))
    return ring("C", n, radius) + ring("H", n, radius + 1.09)


def sandwich(metal: str, n: int, height: float, twist: float) -> list[Row]:
    """A metal between two rings CnHn, the upper one turned by `twist` degrees."""
    radius = 1.43 / (2 * np.sin(np.pi / n))
    rows = at(metal, (0.0, 0.0, 0.0))
    for side, turn in ((-1, 0.0), (1, twist)):
        rows += ring("C", n, radius, side * height, turn) + ring("H", n, radius + 1.08, side * height, turn)
    return rows


def crown(symbol: str, n: int, radius: float, height: float) -> list[Row]:
    """A puckered ring, atoms up and down in turn."""
    return ring(symbol, n // 2, radius, height) + ring(symbol, n // 2, radius, -height, 360.0 / n)


def ethane(twist: float, upper: str = "HHH", lower: str = "HHH") -> list[Row]:
    """Two carbons with three ligands each; `twist` in degrees from eclipsed."""
    rows = at("C", (0, 0, 0.77), (0, 0, -0.77))
    for ligands, side, turn in ((upper, 1, twist), (lower, -1, 0.0)):
        for symbol, (_, x, y, z) in zip(ligands, ring("H", 3, 1.0, side * 1.17, turn), strict=True):
            far = {"H": 1.0, "F": 1.25, "Cl": 1.65}[{"f": "F", "c": "Cl"}.get(symbol, symbol)]
            rows.append(({"f": "F", "c": "Cl"}.get(symbol, symbol), far * x, far * y, z))
    return rows


def hexaaqua() -> list[Row]:
    """A metal with six waters, whose planes lie in the coordinate planes."""
    return at("Fe", (0, 0, 0)) + spread("O", "Th", 2.1, 0, 0) + spread("H", "Th", 2.7, 0.78, 0)


def tris_chelate() -> list[Row]:
    """A metal with three bidentate oxalates, as a propeller."""
    rows = at("Co", (0, 0, 0))
    for symbol, radius, width, tilt in (("O", 1.4, 1.3, 35.0), ("C", 2.6, 0.78, 35.0), ("O", 3.5, 1.35, 35.0)):
        for k in range(3):
            for side in (1, -1):
                across = side * width * np.array([0.0, np.cos(np.deg2rad(tilt)), np.sin(np.deg2rad(tilt))])
                rows.append((symbol, *map(float, about_z(120.0 * k) @ (np.array([radius, 0.0, 0.0]) + across))))
    return rows


def neopentane(twist: float) -> list[Row]:
    """C(CH3)4 with every methyl turned by `twist` degrees from staggered."""
    rows = at("C", (0, 0, 0)) + spread("C", "Td", 0.89, 0.89, 0.89)
    corner = np.array([1.0, 1, 1]) / 3**0.5
    for k in range(3):
        across = Rotation.from_rotvec(np.deg2rad(twist + 120 * k) * corner).apply(np.array([-1, -1, 2]) / 6**0.5)
        rows += spread("H", "T", *(1.9 * corner - 1.03 * across).tolist())
    return [row for i, row in enumerate(rows) if row not in rows[:i]]


def adamantane() -> list[Row]:
    """C10H16."""
    return (
        spread("C", "Td", 0.89, 0.89, 0.89) + spread("C", "Td", 1.77, 0, 0)
        + spread("H", "Td", 1.52, 1.52, 1.52) + spread("H", "Td", 2.41, 0.63, 0.63)
    )  # fmt: skip


GOLDEN = (1 + 5**0.5) / 2


def icosahedron(symbol: str, edge: float) -> list[Row]:
    """Twelve atoms at the corners."""
    corners = [np.roll([0.0, s, t * GOLDEN], k) * edge / 2 for s in (1, -1) for t in (1, -1) for k in range(3)]
    return [(symbol, *map(float, corner)) for corner in corners]


def dodecahedron(symbol: str, edge: float) -> list[Row]:
    """Twenty atoms at the corners."""
    signs = [(a, b, c) for a in (1, -1) for b in (1, -1) for c in (1, -1)]
    corners = [np.array(s, dtype=float) for s in signs]
    corners += [np.roll([0.0, s / GOLDEN, t * GOLDEN], k) for s in (1, -1) for t in (1, -1) for k in range(3)]
    return [(symbol, *map(float, corner * edge * GOLDEN / 2)) for corner in corners]


def shaken(of: Body, noise: float, seed: int) -> Body:
    """The body with every coordinate moved by up to `noise` angstrom divided by the square root of three."""
    moves = np.random.default_rng(seed).uniform(-noise, noise, size=of[1].shape) / 3**0.5
    return of[0], of[1] + moves


def moved(of: Body, seed: int) -> Body:
    """The body turned, shifted and with its atoms in another order."""
    rng = np.random.default_rng(seed)
    order = rng.permutation(len(of[0]))
    turn = Rotation.random(random_state=seed).as_matrix()
    return of[0][order], of[1][order] @ turn.T + rng.normal(size=3)
