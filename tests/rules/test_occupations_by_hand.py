"""Occupations of many groups, each worked out by hand, through all rules on occupations and symmetry.

Level orders from memory: G. Herzberg, Electronic Spectra of Polyatomic Molecules (1966); C. C. J. Roothaan & R. S.
Mulliken, J. Chem. Phys. 16, 118 (1948) for benzene; L. E. Sutton's tables for the geometries.
"""

from typing import Any

import numpy as np
import pytest
from symmetric_bodies import Row, at, icosahedron, ring

from builders import job, report
from rules import ALL_RULES, occupation_capacity

RULES = [
    rule
    for rule in ALL_RULES
    if rule.id.startswith(("occupation-", "axis-", "degenerate-", "point-group-", "state-", "partner-"))
    and rule is not occupation_capacity.RULE
]

METHANE = at("C", (0, 0, 0)) + at("H", (0.63, 0.63, 0.63), (0.63, -0.63, -0.63), (-0.63, 0.63, -0.63),
                                  (-0.63, -0.63, 0.63))  # fmt: skip
METHANE_C2V = at("C", (0, 0, 0)) + at("H", (0.89, 0, 0.63), (-0.89, 0, 0.63), (0, 0.89, -0.63), (0, -0.89, -0.63))
SF6 = at("S", (0, 0, 0)) + at("F", *(1.56 * sign * row for row in np.eye(3) for sign in (1, -1)))
BENZENE = ring("C", 6, 1.397) + ring("H", 6, 2.48)
TURNED = ring("C", 6, 1.397, 0, 30) + ring("H", 6, 2.48, 0, 30)
BF3 = at("B", (0, 0, 0)) + ring("F", 3, 1.31)
AMMONIA = at("N", (0, 0, 0.12)) + ring("H", 3, 0.94, -0.27)
CHLOROMETHANE = at("C", (0, 0, 0)) + at("Cl", (0, 0, 1.78)) + ring("H", 3, 1.03, -0.35)
BORANE = icosahedron("B", 1.70) + icosahedron("H", 2.90)
VANADIUM = at("V", (0, 0, 0))

SF6_D2H = {"Ag": 11, "B1g": 2, "B2g": 2, "B3g": 2, "B1u": 6, "B2u": 6, "B3u": 6}
BENZENE_D2H = {"Ag": 6, "B1g": 3, "B2u": 4, "B3u": 5, "B1u": 1, "B2g": 1, "B3g": 1}
BENZENE_D6H = {"A1g": 3, "E2g": 3, "E1u": 3, "B1u": 2, "B2u": 1, "A2u": 1, "E1g": 1}
BORANE_D2H = {"Ag": 9, "B1g": 3, "B2g": 3, "B3g": 3, "Au": 1, "B1u": 6, "B2u": 6, "B3u": 6}
VANADIUM_CORE = {"Ag": 4, "B1u": 2, "B2u": 2, "B3u": 2}


def diatomic(first: str, second: str, length: float) -> list[Row]:
    return at(first, (0, 0, length / 2)) + at(second, (0, 0, -length / 2))


def less(of: dict[str, int], **taken: int) -> dict[str, int]:
    return {name: n - taken.get(name, 0) for name, n in of.items()}


def said(
    atoms: list[Row], state: tuple[int, int], group: str, occupations: dict[str, Any], axes: str = "as-given"
) -> list[tuple[str, str]]:
    of = job(atoms, *state, symmetry={"point_group": group, "axes": axes}, occupations=occupations)
    return [(f"{word.grade.word} {word.rule}", word.finding.message) for word in report(of, *RULES).findings]


@pytest.mark.parametrize(
    ("atoms", "group", "charge", "paired"),
    [
        pytest.param(METHANE, "Td", 0, {"A1": 2, "T2": 1}, id="methane_Td"),
        pytest.param(METHANE, "D2", 0, {"A": 2, "B1": 1, "B2": 1, "B3": 1}, id="methane_D2"),
        pytest.param(METHANE_C2V, "C2v", 0, {"A1": 3, "B1": 1, "B2": 1}, id="methane_C2v"),
        pytest.param(SF6, "Oh", 0, {"A1g": 5, "Eg": 3, "T1u": 5, "T2g": 1, "T1g": 1, "T2u": 1}, id="SF6_Oh"),
        pytest.param(SF6, "D2h", 0, SF6_D2H, id="SF6_D2h"),
        pytest.param(BENZENE, "D6h", 0, BENZENE_D6H, id="benzene_D6h"),
        pytest.param(BENZENE, "D2h", 0, BENZENE_D2H, id="benzene_D2h"),
        pytest.param(BF3, "D3h", 0, {"A1'": 4, "E'": 4, "A2''": 1, "E''": 1, "A2'": 1}, id="BF3_D3h"),
        pytest.param(AMMONIA, "C3v", 0, {"A1": 3, "E": 1}, id="ammonia_C3v"),
        pytest.param(AMMONIA, "Cs", 0, {"A'": 4, "A''": 1}, id="ammonia_Cs"),
        pytest.param(BORANE, "Ih", -2, {"Ag": 3, "T1u": 3, "T2u": 2, "Hg": 3, "Gu": 1}, id="B12H12_Ih"),
        pytest.param(BORANE, "D2h", -2, BORANE_D2H, id="B12H12_D2h"),
    ],
)
def test_closed_shells_pass(atoms: list[Row], group: str, charge: int, paired: dict[str, int]) -> None:
    assert said(atoms, (charge, 1), group, {"paired": paired}) == []


@pytest.mark.parametrize(
    ("atoms", "state", "group", "paired", "unpaired", "term"),
    [
        pytest.param(METHANE_C2V, (1, 2), "C2v", {"A1": 3, "B2": 1}, {"B1": 1}, "2T2", id="methane_cation"),
        pytest.param(SF6, (1, 2), "D2h", less(SF6_D2H, B1g=1), {"B1g": 1}, "2T1g", id="SF6_cation"),
        pytest.param(BENZENE, (1, 2), "D2h", less(BENZENE_D2H, B2g=1), {"B2g": 1}, "2E1g", id="benzene_cation"),
        pytest.param(BENZENE, (1, 2), "D2h", less(BENZENE_D2H, B3g=1), {"B3g": 1}, "2E1g", id="the_other_partner"),
        pytest.param(BENZENE, (-1, 2), "D2h", BENZENE_D2H, {"Au": 1}, "2E2u", id="benzene_anion"),
        pytest.param(CHLOROMETHANE, (1, 2), "Cs", {"A'": 10, "A''": 2}, {"A''": 1}, "2E", id="CH3Cl_cation"),
        pytest.param(diatomic("N", "O", 1.15), (0, 2), "C2v", {"A1": 5, "B1": 1, "B2": 1}, {"B2": 1}, "2Π",
                     id="NO"),
        pytest.param(diatomic("O", "H", 0.97), (0, 2), "C2v", {"A1": 3, "B2": 1}, {"B1": 1}, "2Π", id="OH"),
        pytest.param(VANADIUM, (0, 4), "D2h", VANADIUM_CORE, {"B1g": 1, "B2g": 1, "B3g": 1}, "4Fg", id="vanadium"),
    ],
)  # fmt: skip
def test_one_component_of_one_term_is_a_note(
    *,
    atoms: list[Row],
    state: tuple[int, int],
    group: str,
    paired: dict[str, int],
    unpaired: dict[str, int],
    term: str,
) -> None:
    ((rule, message),) = said(atoms, state, group, {"paired": paired, "unpaired": unpaired})
    assert rule == "note degenerate-partners"
    assert message.endswith(f": a {term} state, the same whichever partner is filled")


@pytest.mark.parametrize(
    ("atoms", "state", "occupations", "terms"),
    [
        pytest.param(SF6, (0, 1), {"paired": less(SF6_D2H, Ag=-1, B1u=1)}, "1A1g and 1Eg", id="t1u_of_SF6"),
        pytest.param(diatomic("O", "O", 1.21), (0, 1),
                     {"paired": {"Ag": 3, "B1u": 2, "B2u": 1, "B3u": 1, "B2g": 1}}, "1Σg+ and 1Δg", id="pi2"),
        pytest.param(BENZENE, (2, 1), {"paired": less(BENZENE_D2H, B2g=1)}, "1A1g and 1E2g", id="benzene_2+"),
        pytest.param(VANADIUM, (0, 4), {"paired": VANADIUM_CORE, "unpaired": {"Ag": 2, "B1g": 1}}, "4Pg and 4Fg",
                     id="vanadium"),
    ],
)  # fmt: skip
def test_several_terms_are_a_doubt(
    atoms: list[Row], state: tuple[int, int], occupations: dict[str, Any], terms: str
) -> None:
    ((rule, message),) = said(atoms, state, "D2h", occupations)
    assert rule == "doubt degenerate-partners"
    assert message.endswith(f"one determinant may mix {terms}")


def test_benzene_with_its_atoms_between_the_axes() -> None:
    """Where the C2' axes pass between atoms B1u and B2u change places, and E1u holds both B2u and B3u."""
    ((rule, message),) = said(TURNED, (0, 1), "D6h", {"paired": BENZENE_D6H})
    assert rule == "doubt axis-convention"
    assert "axes turned by 30 degrees about z (B2u for B1u, B1u for B2u)" in message


@pytest.mark.parametrize(
    ("axes", "paired", "rules"),
    [
        ("as-given", {"A1": 8, "B1": 5, "B2": 2, "A2": 1}, {"note point-group-mismatch"}),
        ("as-given", {"A1": 8, "B1": 2, "B2": 5, "A2": 1}, {"doubt axis-convention", "note point-group-mismatch"}),
        ("mulliken", {"A1": 8, "B1": 2, "B2": 5, "A2": 1}, set()),
        ("mulliken", {"A1": 8, "B1": 5, "B2": 2, "A2": 1}, {"doubt axis-convention"}),
    ],
)
def test_boron_trifluoride_in_c2v(axes: str, paired: dict[str, int], rules: set[str]) -> None:
    """In plane is a2', one of it, out of plane a2'' and e'': B2 and B1 where the molecule lies in yz."""
    assert {rule for rule, _ in said(BF3, (0, 1), "C2v", {"paired": paired}, axes)} == rules


@pytest.mark.parametrize(
    ("atoms", "group", "paired", "meant"),
    [
        (METHANE, "Td", {"A1": 2, "T2g": 1}, "T2 for T2g is meant"),
        (METHANE_C2V, "C2v", {"A1": 3, "B1u": 1, "B2": 1}, "B1 for B1u is meant"),
        (BENZENE, "D6h", {**less(BENZENE_D6H), "A2": 0}, "A2g for A2 is meant"),
        (AMMONIA, "C3v", {"A'": 3, "E": 1}, "A1 for A' is meant"),
    ],
)
def test_names_of_another_member_of_the_family(
    atoms: list[Row], group: str, paired: dict[str, int], meant: str
) -> None:
    of = job(atoms, 0, 1, symmetry={"point_group": group}, occupations={"paired": paired})
    findings = [word for word in report(of, *RULES).findings if word.rule == "occupation-irreps"]
    assert meant in [repair.say for word in findings for repair in word.finding.repairs]
