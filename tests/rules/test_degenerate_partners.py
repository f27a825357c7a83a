"""degenerate-partners. Each id names the species and what is open; terms are Herzberg's (1950), from memory."""

from typing import Any

import pytest

from builders import job, run_rule, speak
from checker.findings import Finding, Grade, NotJudged
from rules.degenerate_partners import RULE

Atoms = list[tuple[str, float, float, float]]
N2: dict[str, int] = {"Ag": 3, "B1u": 2, "B2u": 1, "B3u": 1}
CO_LIKE: dict[str, int] = {"A1": 5, "B1": 1, "B2": 1}
METHANE_D2: dict[str, int] = {"A": 2, "B1": 1, "B2": 1, "B3": 1}
METHANE: Atoms = [
    ("C", 0.0, 0.0, 0.0),
    *(("H", 0.63 * x, 0.63 * y, 0.63 * x * y) for x in (1, -1) for y in (1, -1)),
]


def along_z(first: str, second: str, length: float) -> Atoms:
    return [(first, 0.0, 0.0, length / 2), (second, 0.0, 0.0, -length / 2)]


def with_more(base: dict[str, int], **further: int) -> dict[str, int]:
    return {name: base.get(name, 0) + further.get(name, 0) for name in {**base, **further}}


def judged(
    atoms: Atoms, state: tuple[int, int], group: str, alpha: dict[str, int], beta: dict[str, int], **tables: Any
) -> list[Finding]:
    occupations = {"alpha": alpha, "beta": beta}
    return run_rule(RULE, job(atoms, *state, symmetry={"point_group": group}, occupations=occupations, **tables))


O2, NO, OH, C = (
    along_z("O", "O", 1.2078),
    along_z("N", "O", 1.151),
    along_z("O", "H", 0.97),
    [("C", 0.0, 0.0, 0.0)],
)
P = {"Ag": 2}


@pytest.mark.parametrize(
    ("atoms", "state", "group", "alpha", "beta"),
    [
        pytest.param(along_z("N", "N", 1.098), (0, 1), "D2h", N2, N2, id="dinitrogen_closed"),
        pytest.param(O2, (0, 3), "D2h", with_more(N2, B2g=1, B3g=1), N2, id="dioxygen_triplet"),
        pytest.param(O2, (0, 3), "Dinfh", {"Σg+": 3, "Σu+": 2, "Πu": 2, "Πg": 2}, {"Σg+": 3, "Σu+": 2, "Πu": 2},
                     id="dioxygen_in_its_own_group"),
        pytest.param(along_z("C", "O", 1.13), (0, 1), "C2v", CO_LIKE, CO_LIKE, id="carbon_monoxide"),
        pytest.param(METHANE, (0, 1), "D2", METHANE_D2, METHANE_D2, id="methane_in_D2"),
        pytest.param([("O", 0.0, 0.0, 0.1), ("H", 0.0, 0.76, -0.5), ("H", 0.0, -0.76, -0.5)], (0, 1), "C2v",
                     {"A1": 3, "A2": 1, "B2": 1}, {"A1": 3, "A2": 1, "B2": 1}, id="water_has_nothing_degenerate"),
        pytest.param(METHANE, (0, 1), "C1", {"A": 5}, {"A": 5}, id="methane_without_symmetry"),
        pytest.param([("N", 0.0, 0.0, 0.0)], (0, 4), "D2h", {**P, "B1u": 1, "B2u": 1, "B3u": 1}, P,
                     id="nitrogen_atom_half_filled"),
    ],
)  # fmt: skip
def test_whole_levels_pass(
    *, atoms: Atoms, state: tuple[int, int], group: str, alpha: dict[str, int], beta: dict[str, int]
) -> None:
    assert judged(atoms, state, group, alpha, beta) == []


@pytest.mark.parametrize(
    ("atoms", "state", "group", "alpha", "beta", "term"),
    [
        pytest.param(NO, (0, 2), "C2v", with_more(CO_LIKE, B1=1), CO_LIKE, "2Π", id="nitric_oxide_pi1"),
        pytest.param(NO, (0, 2), "C2v", with_more(CO_LIKE, B2=1), CO_LIKE, "2Π", id="nitric_oxide_the_other"),
        pytest.param(OH, (0, 2), "C2v", {"A1": 3, "B1": 1, "B2": 1}, {"A1": 3, "B1": 1}, "2Π", id="hydroxyl_pi3"),
        pytest.param(OH, (0, 2), "Cinfv", {"Σ+": 3, "Π": 2}, {"Σ+": 3, "Π": 1}, "2Π", id="hydroxyl_in_its_group"),
        pytest.param(O2, (1, 2), "D2h", with_more(N2, B2g=1), N2, "2Πg", id="dioxygen_cation"),
        pytest.param(C, (0, 3), "D2h", {**P, "B1u": 1, "B2u": 1}, P, "3Pg", id="carbon_p2_xy"),
        pytest.param(C, (0, 3), "D2h", {**P, "B1u": 1, "B3u": 1}, P, "3Pg", id="carbon_p2_xz"),
        pytest.param([("B", 0.0, 0.0, 0.0)], (0, 2), "D2h", {**P, "B3u": 1}, P, "2Pu", id="boron_p1"),
        pytest.param(METHANE, (1, 2), "D2", METHANE_D2, {"A": 2, "B1": 1, "B2": 1}, "2T2", id="methane_cation"),
    ],
)  # fmt: skip
def test_one_term_whichever_partner_is_a_note(
    *, atoms: Atoms, state: tuple[int, int], group: str, alpha: dict[str, int], beta: dict[str, int], term: str
) -> None:
    (finding,) = judged(atoms, state, group, alpha, beta)
    assert finding.grade is Grade.NOTE
    assert f"a {term} state, the same whichever partner is filled" in finding.message


@pytest.mark.parametrize(
    ("atoms", "state", "group", "alpha", "beta", "terms"),
    [
        pytest.param(O2, (0, 1), "D2h", with_more(N2, B2g=1), with_more(N2, B2g=1), "1Σg+ and 1Δg", id="pi2"),
        pytest.param(O2, (0, 1), "D2h", with_more(N2, B2g=1), with_more(N2, B3g=1), "3Σg- and 1Δg",
                     id="pi2_opposite_spins"),
        pytest.param([("O", 0.0, 0.0, 0.0)], (0, 1), "D2h", {**P, "B1u": 1, "B2u": 1}, {**P, "B1u": 1, "B2u": 1},
                     "1Sg and 1Dg", id="oxygen_atom_closed"),
        pytest.param(along_z("C", "H", 1.12), (1, 3), "C2v", {"A1": 2, "B1": 1, "A2": 0}, {"A1": 2, "B2": 1},
                     "3Σ- and 1Δ", id="ch_cation_two_partners"),
    ],
)  # fmt: skip
def test_mixed_terms_are_a_doubt(
    *, atoms: Atoms, state: tuple[int, int], group: str, alpha: dict[str, int], beta: dict[str, int], terms: str
) -> None:
    (finding,) = judged(atoms, state, group, alpha, beta)
    assert finding.grade is None
    assert finding.message.endswith(f"one determinant may mix {terms}")


def test_says_which_level_and_what_its_partners_are_called_here() -> None:
    (finding,) = judged(NO, (0, 2), "C2v", with_more(CO_LIKE, B1=1), CO_LIKE)
    assert finding.message == (
        "a Π level of C∞v, here B1 + B2, holds 1 electron: a 2Π state, the same whichever partner is filled"
    )
    assert finding.evidence["terms"] == ["2Π"]


def test_names_the_counts_where_several_levels_are_partly_filled() -> None:
    (finding,) = judged(O2, (0, 3), "D2h", with_more(N2, B2g=1, B2u=1), {**N2, "B3u": 0, "Ag": 4})
    assert finding.message.startswith("these counts in D2h are no whole levels of D∞h")


def test_an_active_space_is_not_judged() -> None:
    occupations = {"alpha": with_more(N2, B2g=1), "beta": with_more(N2, B2g=1)}
    tables = {"symmetry": {"point_group": "D2h"}, "active_space": {"electrons": 8, "orbitals": 6}}
    (word,) = speak(RULE, job(O2, 0, 1, occupations=occupations, **tables))
    assert word == NotJudged("the open levels may be those of the active space")


def test_silent_where_other_axes_explain_it() -> None:
    along_x = [("N", 0.549, 0.0, 0.0), ("N", -0.549, 0.0, 0.0)]
    assert judged(along_x, (0, 1), "D2h", N2, N2) == []


def test_silent_without_occupations() -> None:
    assert run_rule(RULE, job(O2, 0, 3, symmetry={"point_group": "D2h"})) == []


def test_beside_another_open_shell_no_term_of_the_level_alone_is_named() -> None:
    """An excited triplet of hydrogen cyanide, pi to pi*, and one of lithium fluoride, pi to sigma*."""
    hcn: Atoms = [("H", 0.0, 0.0, -1.07), ("C", 0.0, 0.0, 0.0), ("N", 0.0, 0.0, 1.16)]
    alpha, beta = {"A1": 5, "B1": 1, "B2": 2}, {"A1": 5, "B1": 1}
    (mixed,) = judged(hcn, (0, 3), "C2v", alpha, beta)
    assert mixed.message.endswith("one determinant may mix several terms")
    lif = along_z("Li", "F", 1.57)
    (pure,) = judged(lif, (0, 3), "C2v", {"A1": 5, "B1": 1, "B2": 1}, {"A1": 4, "B1": 1})
    assert "a degenerate state, the same whichever partner is filled" in pure.message
