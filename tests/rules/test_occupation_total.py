"""occupation-total. Each id states the electrons N of the deck and those occupied."""

from typing import Any

import pytest

from builders import job, run_rule
from checker.errors import NotDerivable
from checker.findings import Edit, Finding
from rules.occupation_total import RULE

ALPHA_O2 = {"Ag": 3, "B1u": 2, "B2u": 1, "B3u": 1, "B2g": 1, "B3g": 1}
BETA_O2 = {"Ag": 3, "B1u": 2, "B2u": 1, "B3u": 1}
IODIDE_CORE = {"replaced": {"I": 28}}


def judged(
    atoms: str,
    charge: int,
    multiplicity: int | None,
    group: str | None,
    occupations: dict[str, Any],
    **tables: Any,
) -> list[Finding]:
    symmetry = {"point_group": group}
    return run_rule(RULE, job(atoms, charge, multiplicity, symmetry=symmetry, occupations=occupations, **tables))


@pytest.mark.parametrize(
    ("atoms", "charge", "multiplicity", "group", "occupations"),
    [
        pytest.param("O O", 0, 3, "D2h", {"alpha": ALPHA_O2, "beta": BETA_O2}, id="oxygen-16"),
        pytest.param("O O", 0, 3, None, {"alpha": ALPHA_O2, "beta": BETA_O2}, id="no_group_needed-16"),
        pytest.param("O H H", 0, 1, "C2v", {"paired": {"A1": 3, "B1": 1, "B2": 1}}, id="water-10"),
        pytest.param("O H H", 0, None, "C2v", {"paired": {"A1": 3, "B1": 1, "B2": 1}}, id="no_multiplicity-10"),
        pytest.param("C H H H H", 0, 1, "Td", {"paired": {"A1": 2, "T2": 1}}, id="methane_T2_is_three-10"),
        pytest.param("N N", 0, 1, "Dinfh", {"paired": {"Sigmag": 3, "Sigmau": 2, "Piu": 1}}, id="linear-14"),
        pytest.param("O O", 0, 3, "Dinfh", {"paired": {"Σg+": 3, "Σu+": 2, "Πu": 1}, "unpaired": {"Πg": 1}},
                     id="oxygen_linear-16"),
        pytest.param("N", 0, 4, "Kh", {"paired": {"s": 2}, "unpaired": {"p": 1}}, id="nitrogen_atom-7"),
        pytest.param("C H H", 0, 1, "C2v", {"paired": {"A1": 2, "B2": 1}, "unpaired": {"A1": 1, "B1": 1}},
                     id="open_shell_singlet-8"),
        pytest.param("H", 0, 2, "C1", {"alpha": {"A": 1}}, id="hydrogen_has_no_beta-1"),
        pytest.param("H", 1, 1, "C1", {"alpha": {}, "beta": {}}, id="proton-0"),
        pytest.param("H", 0, 2, "C1", {}, id="nothing_said"),
    ],
)  # fmt: skip
def test_sums_that_fit_pass(
    atoms: str, charge: int, multiplicity: int | None, group: str | None, occupations: dict[str, Any]
) -> None:
    assert judged(atoms, charge, multiplicity, group, occupations) == []


@pytest.mark.parametrize(
    ("species", "group", "occupations", "at"),
    [
        pytest.param(("O O", 0, 3), "D2h", {"alpha": BETA_O2, "beta": BETA_O2}, "alpha", id="14_of_16"),
        pytest.param(("O O", 0, 1), "D2h", {"alpha": ALPHA_O2, "beta": BETA_O2}, "alpha", id="triplet"),
        pytest.param(("O O", 0, 3), "D2h", {"alpha": ALPHA_O2}, "alpha", id="beta"),
        pytest.param(("O H H", 0, 1), "C2v", {"paired": {"A1": 3, "B1": 1}}, "paired", id="8_of_10"),
        pytest.param(("C H H H H", 0, 1), "Td", {"paired": {"A1": 2, "T2": 3}}, "paired", id="T2"),
        pytest.param(("C H H", 0, 3), "C2v", {"paired": {"A1": 3, "B2": 1}}, "unpaired", id="closed"),
        pytest.param(("N O", 0, 2), "Cinfv", {"paired": {"Σ+": 5, "Π": 1}, "unpaired": {"Π": 1}}, "paired",
                     id="16_of_15_pi_counts_whole"),
    ],
)  # fmt: skip
def test_sums_that_do_not_fit_halt(
    species: tuple[str, int, int], group: str, occupations: dict[str, Any], at: str
) -> None:
    assert [f.at for f in judged(*species, group, occupations)] == [f"occupations.{at}"]


def test_says_the_sum_the_books_and_the_gap() -> None:
    (finding,) = judged("O H H", 0, 1, "C2v", {"paired": {"A1": 3, "B1": 1}})
    assert finding.message == ("4 paired and 0 unpaired orbitals make 8 electrons, and the job has 10; add 2")


def test_the_spin_of_the_occupations_is_a_repair() -> None:
    (finding,) = judged("O O", 0, 1, "D2h", {"alpha": ALPHA_O2, "beta": BETA_O2})
    assert finding.message.startswith("9 alpha and 7 beta electrons differ by 2, and multiplicity 1 needs 0 more")
    assert finding.repairs[0].edits == (Edit("species.multiplicity", 3),)


def test_alpha_and_beta_swapped_are_swapped_back() -> None:
    (finding,) = judged("O O", 0, 3, "D2h", {"alpha": BETA_O2, "beta": ALPHA_O2})
    assert finding.repairs[0].edits == (Edit("occupations.alpha", ALPHA_O2), Edit("occupations.beta", BETA_O2))


def test_electrons_of_the_core_are_recognised() -> None:
    occupied = {"alpha": {"A": 27}, "beta": {"A": 27}}
    (finding,) = judged("I", -1, 1, "C1", occupied, core_potential=IODIDE_CORE)
    assert (
        finding.why == "The difference is the 28 electrons that core potentials replace; those are not occupied."
    )
    assert judged("I", -1, 1, "C1", {"alpha": {"A": 13}, "beta": {"A": 13}}, core_potential=IODIDE_CORE) == []


def test_frozen_orbitals_that_were_left_out_are_recognised() -> None:
    (finding,) = judged(
        "O H H", 0, 1, "C2v", {"paired": {"A1": 2, "B1": 1, "B2": 1}}, treatment={"frozen_orbitals": 1}
    )
    assert finding.why == "The difference is the 2 electrons of the frozen orbitals; those are counted too."


def test_the_charge_that_the_occupations_fit_is_a_repair() -> None:
    (finding,) = judged("O H", -1, 2, "C1", {"alpha": {"A": 5}, "beta": {"A": 4}})
    assert finding.repairs[0].edits == (Edit("species.charge", 0),)


def test_a_missing_beta_of_a_singlet_is_like_alpha() -> None:
    (finding,) = judged("O H H", 0, 1, "C1", {"alpha": {"A": 5}})
    assert finding.message == "alpha holds 5 electrons and beta is not given; state beta with the other 5 of 10"
    assert finding.repairs[0].edits == (Edit("occupations.beta", {"A": 5}),)


def test_a_degenerate_open_shell_is_pointed_to_an_abelian_group() -> None:
    occupations = {"paired": {"Σ+": 4, "Π": 1}, "unpaired": {"Π": 1}}
    (finding,) = judged("N O", 1, 1 + 4, "Cinfv", occupations)
    assert finding.message.startswith("2 orbitals are unpaired, and multiplicity 5 needs 4")
    assert "abelian subgroup" in finding.why


@pytest.mark.parametrize(
    ("group", "occupations", "because"),
    [
        pytest.param("C3v", {"paired": {"Q": 5}}, "Q is no irrep of C3v", id="unknown_name"),
        pytest.param("C2v", {"paired": {"A1": -5}}, "negative", id="negative"),
        pytest.param(None, {"paired": {"A1": 5}}, "states no point group", id="orbitals_need_a_group"),
        pytest.param("D2x", {"paired": {"A1": 5}}, "no point group", id="unknown_group"),
    ],
)
def test_what_cannot_be_summed_is_not_judged(group: str | None, occupations: dict[str, Any], because: str) -> None:
    with pytest.raises(NotDerivable, match=because):
        judged("O H H", 0, 1, group, occupations)


def test_unknown_books_are_not_judged() -> None:
    with pytest.raises(NotDerivable):
        judged("I", -1, 1, "C1", {"alpha": {"A": 13}}, core_potential={"name": "of-our-own"})


def test_a_wrong_name_of_sure_dimension_is_still_counted() -> None:
    (finding,) = judged("S H H", 0, 1, "C2v", {"paired": {"A1": 5, "B1u": 1, "B2": 2}})
    assert finding.message.endswith("make 16 electrons, and the job has 18; add 2")
    assert judged("S H H", 0, 1, "C2v", {"paired": {"A1": 5, "B1u": 2, "Q": 2}}) == []
