"""Character tables, products, correlations and terms against published ones.

Sources, all from memory: F. A. Cotton, Chemical Applications of Group Theory, 3rd ed. (1990), appendix II (A:
characters, B: correlations); S. L. Altmann & P. Herzig, Point-Group Theory Tables, 2nd ed. (2011); E. B. Wilson,
J. C. Decius & P. C. Cross, Molecular Vibrations (1955), appendix X (products and correlations); G. Herzberg,
Spectra of Diatomic Molecules (1950), ch. VI, and Electronic Spectra of Polyatomic Molecules (1966), appendix. The
eight abelian groups also against the table that PySCF ships.
"""

import itertools

import numpy as np
import pytest

from checker.chemistry.characters import character_table, characters_at
from checker.chemistry.descent import abelian_correlation, correlation
from checker.chemistry.irreps import point_group
from checker.chemistry.point_groups import rotation
from checker.chemistry.products import antisymmetric_square, product, symmetric_square, terms_of_levels

t, s = (1 + 5**0.5) / 2, (1 - 5**0.5) / 2  # 2 cos 36 degrees and 2 cos 108 degrees
r = 2**0.5

TABLES = {
    "C2v": """      E C2 σ(xz) σ(yz)
        A1  1  1  1  1
        A2  1  1 -1 -1
        B1  1 -1  1 -1
        B2  1 -1 -1  1""",
    "C3": """       E C3 C3^2
        A   1  1  1
        E   2 -1 -1""",
    "C3v": """      E 2C3 3σv
        A1  1  1  1
        A2  1  1 -1
        E   2 -1  0""",
    "S4": """       E S4 C2 S4^3
        A   1  1  1  1
        B   1 -1  1 -1
        E   2  0 -2  0""",
    "D2d": """      E 2S4 C2 2C2' 2σd
        A1  1  1  1  1  1
        A2  1  1  1 -1 -1
        B1  1 -1  1  1 -1
        B2  1 -1  1 -1  1
        E   2  0 -2  0  0""",
    "D4d": """      E 2S8 2C4 2S8^3 C2 4C2' 4σd
        A1  1  1  1  1  1  1  1
        A2  1  1  1  1  1 -1 -1
        B1  1 -1  1 -1  1  1 -1
        B2  1 -1  1 -1  1 -1  1
        E1  2  r  0 -r -2  0  0
        E2  2  0 -2  0  2  0  0
        E3  2 -r  0  r -2  0  0""",
    "D3d": """      E 2C3 3C2' i 2S6 3σd
        A1g 1  1  1  1  1  1
        A2g 1  1 -1  1  1 -1
        Eg  2 -1  0  2 -1  0
        A1u 1  1  1 -1 -1 -1
        A2u 1  1 -1 -1 -1  1
        Eu  2 -1  0 -2  1  0""",
    "D2h": """      E C2(z) C2(y) C2(x) i σ(xy) σ(xz) σ(yz)
        Ag  1  1  1  1  1  1  1  1
        B1g 1  1 -1 -1  1  1 -1 -1
        B2g 1 -1  1 -1  1 -1  1 -1
        B3g 1 -1 -1  1  1 -1 -1  1
        Au  1  1  1  1 -1 -1 -1 -1
        B1u 1  1 -1 -1 -1 -1  1  1
        B2u 1 -1  1 -1 -1  1 -1  1
        B3u 1 -1 -1  1 -1  1  1 -1""",
    "D3h": """      E 2C3 3C2' σh 2S3 3σv
        A1'  1  1  1  1  1  1
        A2'  1  1 -1  1  1 -1
        E'   2 -1  0  2 -1  0
        A1'' 1  1  1 -1 -1 -1
        A2'' 1  1 -1 -1 -1  1
        E''  2 -1  0 -2  1  0""",
    "D4h": """      E 2C4 C2 2C2' 2C2'' i 2S4 σh 2σv 2σd
        A1g 1  1  1  1  1  1  1  1  1  1
        A2g 1  1  1 -1 -1  1  1  1 -1 -1
        B1g 1 -1  1  1 -1  1 -1  1  1 -1
        B2g 1 -1  1 -1  1  1 -1  1 -1  1
        Eg  2  0 -2  0  0  2  0 -2  0  0
        A1u 1  1  1  1  1 -1 -1 -1 -1 -1
        A2u 1  1  1 -1 -1 -1 -1 -1  1  1
        B1u 1 -1  1  1 -1 -1  1 -1 -1  1
        B2u 1 -1  1 -1  1 -1  1 -1  1 -1
        Eu  2  0 -2  0  0 -2  0  2  0  0""",
    "D6h": """      E 2C6 2C3 C2 3C2' 3C2'' i 2S3 2S6 σh 3σd 3σv
        A1g 1  1  1  1  1  1  1  1  1  1  1  1
        A2g 1  1  1  1 -1 -1  1  1  1  1 -1 -1
        B1g 1 -1  1 -1  1 -1  1 -1  1 -1  1 -1
        B2g 1 -1  1 -1 -1  1  1 -1  1 -1 -1  1
        E1g 2  1 -1 -2  0  0  2  1 -1 -2  0  0
        E2g 2 -1 -1  2  0  0  2 -1 -1  2  0  0
        A1u 1  1  1  1  1  1 -1 -1 -1 -1 -1 -1
        A2u 1  1  1  1 -1 -1 -1 -1 -1 -1  1  1
        B1u 1 -1  1 -1  1 -1 -1  1 -1  1 -1  1
        B2u 1 -1  1 -1 -1  1 -1  1 -1  1  1 -1
        E1u 2  1 -1 -2  0  0 -2 -1  1  2  0  0
        E2u 2 -1 -1  2  0  0 -2  1  1 -2  0  0""",
    "Td": """       E 8C3 3C2 6S4 6σd
        A1  1  1  1  1  1
        A2  1  1  1 -1 -1
        E   2 -1  2  0  0
        T1  3  0 -1  1 -1
        T2  3  0 -1 -1  1""",
    "Oh": """       E 8C3 6C2' 6C4 3C2 i 6S4 8S6 3σh 6σd
        A1g 1  1  1  1  1  1  1  1  1  1
        A2g 1  1 -1 -1  1  1 -1  1  1 -1
        Eg  2 -1  0  0  2  2  0 -1  2  0
        T1g 3  0 -1  1 -1  3  1  0 -1 -1
        T2g 3  0  1 -1 -1  3 -1  0 -1  1
        A1u 1  1  1  1  1 -1 -1 -1 -1 -1
        A2u 1  1 -1 -1  1 -1  1 -1 -1  1
        Eu  2 -1  0  0  2 -2  0  1 -2  0
        T1u 3  0 -1  1 -1 -3 -1  0  1  1
        T2u 3  0  1 -1 -1 -3  1  0  1 -1""",
    "Ih": """       E 12C5 12C5^2 20C3 15C2 i 12S10 12S10^3 20S6 15σ
        Ag  1  1  1  1  1  1  1  1  1  1
        T1g 3  t  s  0 -1  3  s  t  0 -1
        T2g 3  s  t  0 -1  3  t  s  0 -1
        Gg  4 -1 -1  1  0  4 -1 -1  1  0
        Hg  5  0  0 -1  1  5  0  0 -1  1
        Au  1  1  1  1  1 -1 -1 -1 -1 -1
        T1u 3  t  s  0 -1 -3 -s -t  0  1
        T2u 3  s  t  0 -1 -3 -t -s  0  1
        Gu  4 -1 -1  1  0 -4  1  1 -1  0
        Hu  5  0  0 -1  1 -5  0  0  1 -1""",
}
SYMBOLS = {"t": t, "-t": -t, "s": s, "-s": -s, "r": r, "-r": -r}


@pytest.mark.parametrize("symbol", TABLES)
def test_published_characters(symbol: str) -> None:
    """Every class by its published name, every row by its Mulliken symbol and in the published order."""
    head, *rows = (line.split() for line in TABLES[symbol].splitlines())
    table = character_table(symbol)
    assert sorted(head) == sorted(table.class_names)
    columns = [table.class_names.index(name) for name in head]
    assert [row[0] for row in rows] == [irrep.name for irrep in table.irreps]
    published = [[SYMBOLS.get(entry) or float(entry) for entry in row[1:]] for row in rows]
    assert np.allclose(table.characters[:, columns], published)


# At E, a turn by 25 degrees, σv, and for D∞h their products with i; c, d are 2 cos 25 and 2 cos 50 degrees.
LINEAR = {
    "C∞v": {"Σ+": "1 1 1", "Σ-": "1 1 -1", "Π": "2 c 0", "Δ": "2 d 0"},
    "D∞h": {
        "Σg+": "1 1 1 1 1 1", "Σg-": "1 1 -1 1 1 -1", "Πg": "2 c 0 2 c 0", "Δg": "2 d 0 2 d 0",
        "Σu+": "1 1 1 -1 -1 -1", "Σu-": "1 1 -1 -1 -1 1", "Πu": "2 c 0 -2 -c 0", "Δu": "2 d 0 -2 -d 0",
    },
}  # fmt: skip


@pytest.mark.parametrize("symbol", LINEAR)
def test_published_characters_of_linear_groups(symbol: str) -> None:
    """D∞h as published: S(angle) is i C(angle + 180 degrees), so that Πg has -2 cos there and Πu +2 cos."""
    turn, mirror = rotation((0, 0, 1), np.deg2rad(25)), np.diag([1.0, -1.0, 1.0])
    operations = np.array([np.eye(3), turn, mirror])
    if symbol == "D∞h":
        operations = np.concatenate([operations, -operations])
    group = point_group(symbol)
    assert group is not None
    at = dict(zip([irrep.name for irrep in group.irreps], characters_at(symbol, operations), strict=True))
    values = {"c": 2 * np.cos(np.deg2rad(25)), "d": 2 * np.cos(np.deg2rad(50))}
    values |= {f"-{name}": -number for name, number in values.items()}
    for name, row in LINEAR[symbol].items():
        assert at[name] == pytest.approx([values.get(entry) or float(entry) for entry in row.split()]), name
    if symbol == "D∞h":
        s_turn = np.diag([1.0, 1.0, -1.0]) @ turn
        assert characters_at(symbol, s_turn[None])[2, 0] == pytest.approx(-values["c"])  # Πg


def multiset(text: str) -> dict[str, int]:
    """``A1 + 2 E`` as a count; brackets for the antisymmetric part are left to the squares."""
    found: dict[str, int] = {}
    for part in text.split("+") if "Σ" not in text else text.split(" + "):
        words = part.split()
        found[words[-1]] = found.get(words[-1], 0) + (int(words[0]) if len(words) > 1 else 1)
    return found


# Molecular Vibrations, appendix X-8; Electronic Spectra of Polyatomic Molecules, appendix (linear).
PRODUCTS = {
    "C2v": {"A2 B1": "B2", "B1 B2": "A2", "A2 A2": "A1"},
    "D2h": {"B1g B2g": "B3g", "B1g B1u": "Au", "B2u B3u": "B1g", "Au B3g": "B3u", "B1u B2u": "B3g"},
    "D3h": {"E' E'": "A1' + A2' + E'", "E' E''": "A1'' + A2'' + E''", "A2' A2''": "A1''", "A2'' E'": "E''"},
    "D4h": {"Eg Eg": "A1g + A2g + B1g + B2g", "Eg Eu": "A1u + A2u + B1u + B2u", "B1g B2g": "A2g", "B1g Eu": "Eu"},
    "D6h": {"E1g E1g": "A1g + A2g + E2g", "E2u E2u": "A1g + A2g + E2g", "E1g E2u": "B1u + B2u + E1u",
            "B1g B2u": "A2u", "B1u E1g": "E2u", "A2u E1g": "E1u"},
    "Td": {"E E": "A1 + A2 + E", "E T1": "T1 + T2", "E T2": "T1 + T2", "T1 T1": "A1 + E + T1 + T2",
           "T1 T2": "A2 + E + T1 + T2", "T2 T2": "A1 + E + T1 + T2", "A2 T1": "T2", "A2 E": "E"},
    "Oh": {"Eg T2g": "T1g + T2g", "T1u T1u": "A1g + Eg + T1g + T2g", "T2g T1u": "A2u + Eu + T1u + T2u",
           "A2g A2u": "A1u", "Eg Eu": "A1u + A2u + Eu"},
    "Ih": {"T1g T1g": "Ag + T1g + Hg", "T1g T2g": "Gg + Hg", "T2g T2g": "Ag + T2g + Hg",
           "T1u Hg": "T1u + T2u + Gu + Hu", "Gg Gg": "Ag + T1g + T2g + Gg + Hg",
           "T1g Gg": "T2g + Gg + Hg", "Gg Hg": "T1g + T2g + Gg + 2 Hg",
           "Hg Hg": "Ag + T1g + T2g + 2 Gg + 2 Hg"},
    "C∞v": {"Σ- Σ-": "Σ+", "Π Π": "Σ+ + Σ- + Δ", "Π Δ": "Π + Φ", "Δ Δ": "Σ+ + Σ- + Γ", "Σ- Π": "Π"},
    "D∞h": {"Πg Πu": "Σu+ + Σu- + Δu", "Πg Πg": "Σg+ + Σg- + Δg", "Σu+ Πu": "Πg", "Πu Δg": "Πu + Φu"},
    "Kh": {"Pu Pu": "Sg + Pg + Dg", "Pu Dg": "Pu + Du + Fu", "Dg Dg": "Sg + Pg + Dg + Fg + Gg"},
}  # fmt: skip


@pytest.mark.parametrize(("symbol", "pair"), [(g, pair) for g, of in PRODUCTS.items() for pair in of])
def test_published_products(symbol: str, pair: str) -> None:
    a, b = pair.split()
    assert product(symbol, a, b) == multiset(PRODUCTS[symbol][pair]) == product(symbol, b, a)


@pytest.mark.parametrize(
    ("symbol", "name", "symmetric", "antisymmetric"),
    [
        ("C3v", "E", "A1 + E", "A2"), ("D3h", "E''", "A1' + E'", "A2'"), ("D4h", "Eu", "A1g + B1g + B2g", "A2g"),
        ("D6h", "E1g", "A1g + E2g", "A2g"), ("Td", "E", "A1 + E", "A2"), ("Td", "T2", "A1 + E + T2", "T1"),
        ("Oh", "T1u", "A1g + Eg + T2g", "T1g"), ("Ih", "T1u", "Ag + Hg", "T1g"),
        ("Ih", "Hg", "Ag + Gg + 2 Hg", "T1g + T2g + Gg"), ("D∞h", "Πg", "Σg+ + Δg", "Σg-"),
        ("C∞v", "Δ", "Σ+ + Γ", "Σ-"), ("Kh", "Dg", "Sg + Dg + Gg", "Pg + Fg"),
    ],
)  # fmt: skip
def test_published_squares(symbol: str, name: str, symmetric: str, antisymmetric: str) -> None:
    """H. A. Jahn & E. Teller, Proc. R. Soc. A 161, 220 (1937), for the symmetric squares (from memory)."""
    assert symmetric_square(symbol, name) == multiset(symmetric)
    assert antisymmetric_square(symbol, name) == multiset(antisymmetric)


# Cotton, appendix IIB; Molecular Vibrations, appendix X-8. D∞h and C∞v: Herzberg (1966), appendix.
CORRELATIONS = {
    "Td C2v": {"A1": "A1", "A2": "A2", "E": "A1 + A2", "T1": "A2 + B1 + B2", "T2": "A1 + B1 + B2"},
    "Td D2": {"A1": "A", "A2": "A", "E": "2 A", "T1": "B1 + B2 + B3", "T2": "B1 + B2 + B3"},
    "D2d C2v": {"A1": "A1", "A2": "A2", "B1": "A2", "B2": "A1", "E": "B1 + B2"},
    "D2d D2": {"A1": "A", "A2": "B1", "B1": "A", "B2": "B1", "E": "B2 + B3"},
    "Oh D2h": {"A1g": "Ag", "A2g": "Ag", "Eg": "2 Ag", "T1g": "B1g + B2g + B3g", "T2g": "B1g + B2g + B3g",
               "A2u": "Au", "Eu": "2 Au", "T1u": "B1u + B2u + B3u", "T2u": "B1u + B2u + B3u"},
    "D6h D2h": {"A1g": "Ag", "A2g": "B1g", "B1g": "B3g", "B2g": "B2g", "E1g": "B2g + B3g", "E2g": "Ag + B1g",
                "A1u": "Au", "A2u": "B1u", "B1u": "B3u", "B2u": "B2u", "E1u": "B2u + B3u", "E2u": "Au + B1u"},
    "D4h D2h": {"A1g": "Ag", "A2g": "B1g", "B1g": "Ag", "B2g": "B1g", "Eg": "B2g + B3g",
                "A2u": "B1u", "B2u": "B1u", "B1u": "Au", "Eu": "B2u + B3u"},
    "D∞h D2h": {"Σg+": "Ag", "Σg-": "B1g", "Σu+": "B1u", "Σu-": "Au", "Πg": "B2g + B3g", "Πu": "B2u + B3u",
                "Δg": "Ag + B1g", "Δu": "Au + B1u", "Φg": "B2g + B3g", "Φu": "B2u + B3u"},
    "C∞v C2v": {"Σ+": "A1", "Σ-": "A2", "Π": "B1 + B2", "Δ": "A1 + A2", "Φ": "B1 + B2"},
    "D3h C2v": {"A1'": "A1", "A2'": "B2", "E'": "A1 + B2", "A1''": "A2", "A2''": "B1", "E''": "A2 + B1"},
    "C3v Cs": {"A1": "A'", "A2": "A''", "E": "A' + A''"},
    "Kh D2h": {"Sg": "Ag", "Pu": "B1u + B2u + B3u", "Dg": "2 Ag + B1g + B2g + B3g",
               "Fu": "Au + 2 B1u + 2 B2u + 2 B3u"},
}  # fmt: skip


@pytest.mark.parametrize("pair", CORRELATIONS)
def test_published_correlations(pair: str) -> None:
    group, subgroup = pair.split()
    found = abelian_correlation(group, subgroup)
    assert {name: found[name] for name in CORRELATIONS[pair]} == {
        name: multiset(row) for name, row in CORRELATIONS[pair].items()
    }


def test_octahedral_to_tetragonal() -> None:
    """Cotton, appendix IIB: Oh to D4h to D2h."""
    published = {
        "A1g": "A1g", "A2g": "B1g", "Eg": "A1g + B1g", "T1g": "A2g + Eg", "T2g": "B2g + Eg",
        "A1u": "A1u", "A2u": "B1u", "Eu": "A1u + B1u", "T1u": "A2u + Eu", "T2u": "B2u + Eu",
    }  # fmt: skip
    assert dict(correlation("Oh", "D4h")) == {name: multiset(row) for name, row in published.items()}


def test_atomic_to_octahedral_and_linear() -> None:
    """C. J. Ballhausen, Introduction to Ligand Field Theory (1962), ch. 4 (from memory): d, f and g in Oh."""
    into = correlation("Kh", "Oh")
    assert into["Dg"] == multiset("Eg + T2g")
    assert into["Fu"] == multiset("A2u + T1u + T2u")
    assert into["Gg"] == multiset("A1g + Eg + T1g + T2g")
    assert correlation("Kh", "D∞h")["Dg"] == multiset("Σg+ + Πg + Δg")
    assert correlation("Kh", "D∞h")["Pg"] == multiset("Σg- + Πg")


@pytest.mark.parametrize(
    ("symbol", "electrons", "terms"),
    [
        ("D∞h", {"Πg": 2}, "3Σg- 1Δg 1Σg+"), ("D∞h", {"Πu": 1}, "2Πu"), ("D∞h", {"Πu": 3}, "2Πu"),
        ("C∞v", {"Δ": 2}, "3Σ- 1Γ 1Σ+"), ("C∞v", {"Π": 1, "Σ+": 1}, "3Π 1Π"),
        ("D∞h", {"Πu": 1, "Πg": 1}, "3Σu+ 3Σu- 3Δu 1Σu+ 1Σu- 1Δu"),
        ("Oh", {"T2g": 2}, "3T1g 1A1g 1Eg 1T2g"), ("Oh", {"Eg": 2}, "3A2g 1A1g 1Eg"),
        ("Oh", {"T2g": 3}, "4A2g 2Eg 2T1g 2T2g"), ("Oh", {"T2g": 1, "Eg": 1}, "3T1g 3T2g 1T1g 1T2g"),
        ("Td", {"T2": 2}, "3T1 1A1 1E 1T2"), ("C3v", {"E": 2}, "3A2 1A1 1E"),
        ("D4h", {"Eg": 2}, "3A2g 1A1g 1B1g 1B2g"), ("D6h", {"E1g": 3, "E2u": 1}, "3B1u 3B2u 3E1u 1B1u 1B2u 1E1u"),
        ("D3h", {"E''": 2}, "3A2' 1A1' 1E'"), ("Ih", {"T1u": 2}, "3T1g 1Ag 1Hg"),
        ("C2v", {"A1": 1, "B1": 1}, "3B1 1B1"),
    ],
)  # fmt: skip
def test_published_terms(symbol: str, electrons: dict[str, int], terms: str) -> None:
    """Herzberg (1950), tables 31 and 33, and (1966); Y. Tanabe & S. Sugano, J. Phys. Soc. Jpn. 9, 753 (1954)."""
    assert terms_of_levels(symbol, electrons) == {(int(name[0]), name[1:]): 1 for name in terms.split()}


@pytest.mark.parametrize("symbol", ["C1", "Ci", "Cs", "C2", "C2v", "C2h", "D2", "D2h"])
def test_abelian_tables_of_a_reference_library(symbol: str) -> None:
    """PySCF (Q. Sun et al., J. Chem. Phys. 153, 024109 (2020)), matched by the matrix of each operation."""
    param = pytest.importorskip("pyscf.symm.param")
    operations = np.array([param.D2H_OPS[name] for name in param.OPERATOR_TABLE[symbol]], dtype=float)
    group = point_group(symbol)
    assert group is not None
    ours = dict(zip([irrep.name for irrep in group.irreps], characters_at(symbol, operations), strict=True))
    theirs = {row[0].replace('"', "''"): row[1:] for row in param.CHARACTER_TABLE[symbol]}
    assert set(ours) == set(theirs)
    for name, row in theirs.items():
        assert ours[name] == pytest.approx(row), name


def test_every_irrep_of_an_abelian_group_squares_to_one() -> None:
    for symbol in ("C1", "Ci", "Cs", "C2", "C2v", "C2h", "D2", "D2h"):
        group = point_group(symbol)
        assert group is not None
        for a, b in itertools.product([irrep.name for irrep in group.irreps], repeat=2):
            assert (product(symbol, a, b) == {group.irreps[0].name: 1}) == (a == b)
