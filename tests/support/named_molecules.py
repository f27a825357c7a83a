"""Named molecules with their published point groups, built by hand.

Sources of the groups: C, F. A. Cotton, Chemical Applications of Group Theory, 3rd ed. (1990), chapter 3;
H, G. Herzberg, Electronic Spectra of Polyatomic Molecules (1966); F, P. W. Fowler, D. E. Manolopoulos, An Atlas of
Fullerenes (1995); S, H. S. M. Coxeter, Regular Polytopes, 3rd ed. (1973); all from memory. P: common practice, no
source.
"""

from itertools import permutations, product

import numpy as np
from scipy.spatial import ConvexHull
from symmetric_bodies import (
    Row,
    about_z,
    adamantane,
    annulene,
    at,
    crown,
    dodecahedron,
    ethane,
    hexaaqua,
    icosahedron,
    neopentane,
    ring,
    sandwich,
    spread,
    tris_chelate,
)

_WATER: list[Row] = [("O", 0, 0, 0.117), ("H", 0, 0.757, -0.467), ("H", 0, -0.757, -0.467)]


def _disulfane() -> list[Row]:
    return [("O", 0.7, 0, 0), ("O", -0.7, 0, 0), ("H", 0.9, 0.7, 0.6), ("H", -0.9, 0.7, -0.6)]


def _trihydroxide(tilt: float) -> list[Row]:
    """B(OH)3; `tilt` lifts the hydrogens out of the plane."""
    hydrogens = [(s, x, y, tilt) for s, x, y, _ in ring("H", 3, 1.85, start=25)]
    return at("B", (0, 0, 0)) + ring("O", 3, 1.37) + hydrogens


def _hexahydroxybenzene() -> list[Row]:
    return ring("C", 6, 1.40) + ring("O", 6, 2.76) + ring("H", 6, 3.1, start=16)


def _biphenyl(twist: float) -> list[Row]:
    half: list[Row] = [
        ("C", 0.0, 0.0, 0.75), ("C", 1.21, 0.0, 1.45), ("C", -1.21, 0.0, 1.45), ("C", 1.21, 0.0, 2.85),
        ("C", -1.21, 0.0, 2.85), ("C", 0.0, 0.0, 3.55), ("H", 2.15, 0.0, 0.91), ("H", -2.15, 0.0, 0.91),
        ("H", 2.15, 0.0, 3.39), ("H", -2.15, 0.0, 3.39), ("H", 0.0, 0.0, 4.64),
    ]  # fmt: skip
    turned = [(s, *map(float, about_z(twist) @ (x, y, -z))) for s, x, y, z in half]
    return half + [(s, a, b, c) for s, a, b, c in turned]


def _cyclooctatetraene() -> list[Row]:
    tub = [(s, x, y, z) for s, x, y, z in spread("C", "D2d", 1.55, 0.66, 0.39)]
    return tub + spread("H", "D2d", 2.35, 1.05, 0.05)


def _tetrahydroxide() -> list[Row]:
    return at("Si", (0, 0, 0)) + spread("O", "S4", 0.94, 0.94, 0.94) + spread("H", "S4", 1.62, 1.05, 1.35)


def _phosphoric_acid() -> list[Row]:
    arms = ring("O", 3, 1.45, -0.62) + ring("H", 3, 1.95, -0.05, start=22)
    return at("P", (0, 0, 0)) + at("O", (0, 0, 1.47)) + arms


def _ferrocene_like(twist: float) -> list[Row]:
    return sandwich("Fe", 5, 1.66, twist)


def _dimanganese() -> list[Row]:
    rows = at("Mn", (0, 0, 1.45), (0, 0, -1.45))
    for side, turn in ((1, 0.0), (-1, 45.0)):
        rows += at("C", (0, 0, side * 3.25)) + at("O", (0, 0, side * 4.4))
        rows += ring("C", 4, 1.85, side * 1.6, turn) + ring("O", 4, 3.0, side * 1.7, turn)
    return rows


def _cubane() -> list[Row]:
    return spread("C", "Oh", 0.785, 0.785, 0.785) + spread("H", "Oh", 1.42, 1.42, 1.42)


def _carbonyl(metal: str, group: str, place: tuple[float, float, float]) -> list[Row]:
    carbon, oxygen = (tuple(c * f for c in place) for f in (1.0, 1.62))
    return at(metal, (0, 0, 0)) + spread("C", group, *carbon) + spread("O", group, *oxygen)


def _nitro_complex() -> list[Row]:
    return at("Co", (0, 0, 0)) + spread("N", "Th", 1.95, 0, 0) + spread("O", "Th", 2.55, 1.08, 0)


def _chair() -> list[Row]:
    axial = ring("H", 3, 1.47, 1.33) + ring("H", 3, 1.47, -1.33, 60)
    equatorial = ring("H", 3, 2.5, -0.1) + ring("H", 3, 2.5, 0.1, 60)
    return crown("C", 6, 1.47, 0.25) + axial + equatorial


def _snub_cube() -> list[Row]:
    """The 24 vertices of the right-handed snub cube, edge about 1.4 angstrom."""
    t = 1.8392867552141612  # t^3 = t^2 + t + 1
    rows: list[Row] = []
    for order in permutations(range(3)):
        is_even = np.linalg.det(np.eye(3)[list(order)]) > 0
        for signs in product((1, -1), repeat=3):
            if (np.prod(signs) > 0) is not is_even:
                place = np.array([1.0, 1 / t, t])[list(order)] * np.array(signs) * 0.86
                rows.append(("C", *map(float, place)))
    return rows


def _fullerene_140() -> list[Row]:
    """The dual of the icosahedron whose faces are divided by the lattice vector (2, 1): its 140 faces."""
    corners = np.array([row[1:] for row in icosahedron("C", 1.0)])
    side = min(np.linalg.norm(corners[0] - corners[1:], axis=1))
    points = list(corners)
    for face in ConvexHull(corners).simplices:
        a, b, c = corners[face]
        if np.dot(np.cross(b - a, c - a), a) < 0:
            b, c = c, b
        assert np.isclose(np.linalg.norm(a - b), side)
        for u, v, w in ((4, 2, 1), (1, 4, 2), (2, 1, 4)):
            points.append((u * a + v * b + w * c) / 7)
    unit = np.array([point / np.linalg.norm(point) for point in points])
    faces = unit[ConvexHull(unit).simplices].mean(axis=1)
    return [("C", *map(float, 5.9 * place / np.linalg.norm(place))) for place in faces]


#: Name, group, source, atoms.
NAMED: list[tuple[str, str, str, list[Row]]] = [
    ("bromochlorofluoromethane", "C1", "C", [
        ("C", 0, 0, 0), ("H", 0.63, 0.63, 0.63), ("F", 0.78, -0.78, -0.78), ("Cl", -1.02, 1.02, -1.02),
        ("Br", -1.12, -1.12, 1.12)]),
    ("hypochlorous acid", "Cs", "P", [("O", 0, 0, 0), ("H", 0.9, 0.3, 0), ("Cl", -0.4, 1.6, 0)]),
    ("thionyl chloride", "Cs", "C", at("S", (0, 0, 0)) + at("O", (0, 1.2, 0.75))
        + at("Cl", (1.5, -0.8, 0.9), (-1.5, -0.8, 0.9))),
    ("meso-1,2-dichloro-1,2-difluoroethane, anti", "Ci", "C", ethane(60, "Hfc", "fcH")),
    ("hydrogen peroxide", "C2", "C", _disulfane()),
    ("phosphoric acid", "C3", "P", _phosphoric_acid()),
    ("boric acid, hydrogens lifted", "C3", "P", _trihydroxide(0.4)),
    ("water", "C2v", "C", _WATER),
    ("ozone", "C2v", "H", [("O", 0, 0, 0.44), ("O", 0, 1.09, -0.22), ("O", 0, -1.09, -0.22)]),
    ("sulfur tetrafluoride", "C2v", "C", at("S", (0, 0, 0)) + at(
        "F", (1.64, 0, -0.2), (-1.64, 0, -0.2), (0, 1.2, 0.97), (0, -1.2, 0.97))),
    ("chlorine trifluoride", "C2v", "C", at("Cl", (0, 0, 0))
        + at("F", (0, 0, 1.6), (0, 1.7, -0.07), (0, -1.7, -0.07))),
    ("cis-difluoroethene", "C2v", "P", at("C", (0, 0.66, 0), (0, -0.66, 0))
        + at("F", (0, 1.4, 1.1), (0, -1.4, 1.1)) + at("H", (0, 1.2, -0.95), (0, -1.2, -0.95))),
    ("ammonia", "C3v", "C", at("N", (0, 0, 0.12)) + ring("H", 3, 0.94, -0.27)),
    ("phosphoryl chloride", "C3v", "C", at("P", (0, 0, 0)) + at("O", (0, 0, 1.45)) + ring("Cl", 3, 1.9, -0.6)),
    ("methyl chloride", "C3v", "H", at("C", (0, 0, 0)) + at("Cl", (0, 0, 1.78)) + ring("H", 3, 1.03, -0.35)),
    ("bromine pentafluoride", "C4v", "C", at("Br", (0, 0, 0))
        + at("F", (0, 0, 1.69)) + ring("F", 4, 1.77, -0.15)),
    ("xenon oxide tetrafluoride", "C4v", "P", at("Xe", (0, 0, 0)) + at("O", (0, 0, 1.7))
        + ring("F", 4, 1.9, -0.05)),
    ("cyclopentadienylindium", "C5v", "P", annulene(5, 1.43) + at("In", (0, 0, 2.3))),
    ("benzene with a lithium cation above", "C6v", "P", annulene(6) + at("Li", (0, 0, 1.9))),
    ("trans-1,2-dichloroethene", "C2h", "C", at("C", (0.66, 0, 0), (-0.66, 0, 0))
        + at("Cl", (1.6, 1.45, 0), (-1.6, -1.45, 0)) + at("H", (1.2, -0.95, 0), (-1.2, 0.95, 0))),
    ("trans-diazene", "C2h", "P", at("N", (0.62, 0, 0), (-0.62, 0, 0)) + at("H", (0.9, 1.0, 0), (-0.9, -1.0, 0))),
    ("boric acid", "C3h", "C", _trihydroxide(0.0)),
    ("hexahydroxybenzene, concerted", "C6h", "P", _hexahydroxybenzene()),
    ("biphenyl, twisted", "D2", "C", _biphenyl(40)),
    ("ethene, twisted", "D2", "P", spread("C", "D2", 0, 0, 0.67) + spread("H", "D2", 0.9, 0.2, 1.24)),
    ("ethane, between staggered and eclipsed", "D3", "C", ethane(20)),
    ("tris(oxalato)cobaltate(3-)", "D3", "C", tris_chelate()),
    ("ethene", "D2h", "C", spread("C", "D2h", 0, 0, 0.67) + spread("H", "D2h", 0.92, 0, 1.24)),
    ("diborane", "D2h", "C", spread("B", "D2h", 0, 0, 0.88) + spread("H", "D2h", 0.97, 0, 0)
        + spread("H", "D2h", 0, 1.04, 1.45)),
    ("naphthalene", "D2h", "C", spread("C", "D2h", 0, 0, 0.71) + spread("C", "D2h", 0, 1.24, 1.4)
        + spread("C", "D2h", 0, 2.43, 0.7) + spread("H", "D2h", 0, 1.24, 2.49)
        + spread("H", "D2h", 0, 3.37, 1.24)),
    ("boron trifluoride", "D3h", "C", at("B", (0, 0, 0)) + ring("F", 3, 1.31)),
    ("phosphorus pentafluoride", "D3h", "C", at("P", (0, 0, 0)) + ring("F", 3, 1.53)
        + at("F", (0, 0, 1.58), (0, 0, -1.58))),
    ("cyclopropane", "D3h", "P", ring("C", 3, 0.87) + ring("H", 3, 1.45, 0.91) + ring("H", 3, 1.45, -0.91)),
    ("ethane, eclipsed", "D3h", "C", ethane(0)),
    ("xenon tetrafluoride", "D4h", "C", at("Xe", (0, 0, 0)) + ring("F", 4, 1.95)),
    ("tetrachloroplatinate(2-)", "D4h", "C", at("Pt", (0, 0, 0)) + ring("Cl", 4, 2.32, start=45)),
    ("trans-dichlorotetraamminecobalt, N and Cl only", "D4h", "P", at("Co", (0, 0, 0)) + ring("N", 4, 1.97)
        + at("Cl", (0, 0, 2.27), (0, 0, -2.27))),
    ("cyclopentadienide", "D5h", "C", annulene(5, 1.42)),
    ("ferrocene, eclipsed", "D5h", "P", _ferrocene_like(0)),
    ("iodine heptafluoride", "D5h", "C", at("I", (0, 0, 0)) + ring("F", 5, 1.86)
        + at("F", (0, 0, 1.82), (0, 0, -1.82))),
    ("benzene", "D6h", "C", annulene(6)),
    ("dibenzenechromium", "D6h", "C", sandwich("Cr", 6, 1.61, 0)),
    ("tropylium", "D7h", "P", annulene(7)),
    ("cyclooctatetraene dianion", "D8h", "P", annulene(8)),
    ("uranocene", "D8h", "P", sandwich("U", 8, 1.92, 0)),
    ("allene", "D2d", "C", at("C", (0, 0, 0), (0, 0, 1.31), (0, 0, -1.31)) + at(
        "H", (0.93, 0, 1.87), (-0.93, 0, 1.87), (0, 0.93, -1.87), (0, -0.93, -1.87))),
    ("cyclooctatetraene", "D2d", "P", _cyclooctatetraene()),
    ("ethane, staggered", "D3d", "C", ethane(60)),
    ("cyclohexane, chair", "D3d", "C", _chair()),
    ("cyclooctasulfur", "D4d", "C", crown("S", 8, 2.35, 0.5)),
    ("decacarbonyldimanganese", "D4d", "C", _dimanganese()),
    ("ferrocene, staggered", "D5d", "C", _ferrocene_like(36)),
    ("dibenzenechromium, staggered", "D6d", "P", sandwich("Cr", 6, 1.61, 30)),
    ("orthosilicic acid", "S4", "P", _tetrahydroxide()),
    ("neopentane, methyls turned", "T", "P", neopentane(20)),
    ("methane", "Td", "C", at("C", (0, 0, 0)) + spread("H", "Td", 0.63, 0.63, 0.63)),
    ("white phosphorus", "Td", "C", spread("P", "Td", 0.78, 0.78, 0.78)),
    ("tetracarbonylnickel", "Td", "C", _carbonyl("Ni", "Td", (1.06, 1.06, 1.06))),
    ("neopentane", "Td", "P", neopentane(0)),
    ("adamantane", "Td", "C", adamantane()),
    ("hexaaquairon, waters in the coordinate planes", "Th", "P", hexaaqua()),
    ("hexanitrocobaltate(3-)", "Th", "C", _nitro_complex()),
    ("sulfur hexafluoride", "Oh", "C", at("S", (0, 0, 0)) + spread("F", "Oh", 1.56, 0, 0)),
    ("hexacarbonylchromium", "Oh", "C", _carbonyl("Cr", "Oh", (1.91, 0, 0))),
    ("cubane", "Oh", "P", _cubane()),
    ("snub cube of carbon", "O", "S", _snub_cube()),
    ("fullerene C140", "I", "F", _fullerene_140()),
    ("closo-dodecaborate(2-)", "Ih", "C", icosahedron("B", 1.78) + icosahedron("H", 3.05)),
    ("dodecahedrane", "Ih", "P", dodecahedron("C", 1.54) + dodecahedron("H", 2.32)),
    ("hydrogen cyanide", "C∞v", "C", at("H", (0, 0, -1.07)) + at("C", (0, 0, 0)) + at("N", (0, 0, 1.16))),
    ("carbonyl sulfide", "C∞v", "H", at("O", (0, 0, -1.16)) + at("C", (0, 0, 0)) + at("S", (0, 0, 1.56))),
    ("carbon monoxide", "C∞v", "C", at("C", (0, 0, 0)) + at("O", (0, 0, 1.13))),
    ("nitrous oxide", "C∞v", "H", at("N", (0, 0, -1.13), (0, 0, 0)) + at("O", (0, 0, 1.19))),
    ("carbon dioxide", "D∞h", "C", at("C", (0, 0, 0)) + at("O", (0, 0, 1.16), (0, 0, -1.16))),
    ("acetylene", "D∞h", "C", at("C", (0, 0, 0.6), (0, 0, -0.6)) + at("H", (0, 0, 1.66), (0, 0, -1.66))),
    ("dihydrogen", "D∞h", "C", at("H", (0, 0, 0.37), (0, 0, -0.37))),
    ("triiodide", "D∞h", "P", at("I", (0, 0, 0), (0, 0, 2.92), (0, 0, -2.92))),
    ("neon", "Kh", "P", at("Ne", (0.3, 0.2, 0.1))),
]  # fmt: skip
