"""What a deck states by irrep, seen from the geometry: groups, functions, electrons, readings."""

from typing import Any

import pytest

from builders import job
from checker.errors import NotDerivable
from checker.facts import Facts
from checker.irrep_facts import IrrepFacts

Atoms = list[tuple[str, float, float, float]]
WATER: Atoms = [("O", 0.0, 0.0, 0.1173), ("H", 0.0, 0.7572, -0.4692), ("H", 0.0, -0.7572, -0.4692)]
NITROGEN: Atoms = [("N", 0.0, 0.0, 0.549), ("N", 0.0, 0.0, -0.549)]
N2 = {"Ag": 3, "B1u": 2, "B2u": 1, "B3u": 1}


def irreps(atoms: Atoms, group: str | None, multiplicity: int | None = 1, **tables: Any) -> IrrepFacts:
    return Facts(job(atoms, 0, multiplicity, symmetry={"point_group": group}, **tables)).irreps


@pytest.mark.parametrize(
    ("occupations", "alpha", "beta"),
    [
        pytest.param(
            {"alpha": {"A1": 3, "B1": 1}, "beta": {"a1": 3}}, {"A1": 3, "B1": 1}, {"A1": 3}, id="by_spin"
        ),
        pytest.param({"alpha": {"A1": 3, "B2": 0}}, {"A1": 3}, {"A1": 3}, id="one_spin_of_a_singlet"),
        pytest.param({"paired": {"A1": 3}}, {"A1": 3}, {"A1": 3}, id="paired"),
    ],
)
def test_electrons_of_either_style(
    occupations: dict[str, Any], alpha: dict[str, int], beta: dict[str, int]
) -> None:
    assert irreps(WATER, "C2v", occupations=occupations).electrons == (alpha, beta)


def test_unpaired_levels_count_their_partners() -> None:
    occupations = {"paired": {"Σg+": 3, "Σu+": 2, "Πu": 1}, "unpaired": {"Πg": 1}}
    alpha, beta = irreps(NITROGEN, "D∞h", multiplicity=3, occupations=occupations).electrons
    assert alpha == {"Σg+": 3, "Σu+": 2, "Πu": 2, "Πg": 2}
    assert beta == {"Σg+": 3, "Σu+": 2, "Πu": 2}


@pytest.mark.parametrize(
    ("multiplicity", "occupations", "because"),
    [
        pytest.param(1, None, "states no occupations", id="none"),
        pytest.param(3, {"alpha": {"A1": 5}}, "one spin only", id="one_spin_of_a_triplet"),
        pytest.param(1, {"paired": {"A1": 4}, "unpaired": {"A1": 1, "B1": 1}}, "which spin", id="open_singlet"),
        pytest.param(1, {"paired": {"B1g": 5}}, "B1g = 5 is no occupation in C2v", id="other_group"),
        pytest.param(1, {"paired": {"A1": -5}}, "A1 = -5 is no occupation", id="negative"),
    ],
)
def test_what_is_not_settled_is_said(multiplicity: int, occupations: dict[str, Any] | None, because: str) -> None:
    with pytest.raises(NotDerivable, match=because):
        _ = irreps(WATER, "C2v", multiplicity, occupations=occupations).electrons


def test_functions_of_the_report_fall_back_on_the_abelian_group() -> None:
    """Without a stated group, or with one that the geometry lacks, functions are those of the abelian group."""
    basis = {"name": "cc-pVDZ"}
    expected = {"A1": 11, "A2": 2, "B1": 4, "B2": 7}  # 24 functions, as the report's contract shows them
    assert irreps(WATER, "C2v", basis=basis).functions == expected
    for group in (None, "D2h", "C2v"):
        assert irreps(WATER, group, basis=basis).functions_of_report == expected


def test_a_degenerate_irrep_counts_all_its_partners() -> None:
    along = irreps(NITROGEN, "D∞h", basis={"name": "cc-pVDZ"})
    assert along.functions == {"Σg+": 6, "Πg": 6, "Δg": 2, "Σu+": 6, "Πu": 6, "Δu": 2}
    assert along.body_levels == {"Σg+": 6, "Πg": 3, "Δg": 1, "Σu+": 6, "Πu": 3, "Δu": 1}


def test_mixed_forms_are_added_up() -> None:
    """Six cartesian d functions on one element hold an s more than five spherical ones."""
    cartesian = irreps(NITROGEN, "D∞h", basis={"name": "cc-pVDZ", "form": "cartesian"})
    assert cartesian.functions["Σg+"] == cartesian.functions["Σu+"] == 7


def test_readings_of_a_stated_occupation() -> None:
    whole = irreps(NITROGEN, "D2h", occupations={"paired": N2})
    assert whole.body_group == "D∞h"
    assert whole.stated_readings is None
    assert whole.other_axes == ()
    assert [other.words for other in whole.equal_axes] == ["x and y exchanged"]
    half = irreps(NITROGEN, "D2h", 2, occupations={"alpha": {**N2, "B2g": 1}, "beta": N2})
    assert half.stated_readings is not None
    assert half.stated_readings[0].irrep == "Πg"
