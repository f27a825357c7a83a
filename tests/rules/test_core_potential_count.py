"""core-potential-count: counts that cannot be, that nobody uses, and f electrons in the core."""

from typing import Any

import pytest

from builders import job, run_rule, speak
from checker.errors import NotDerivable
from checker.findings import Edit, Finding, Grade, NotJudged
from rules.core_potential_count import RULE

METHYL_IODIDE = "C H H H I"
GD_AQUO = "Gd" + " O H H" * 9


def spoken(atoms: str, potential: dict[str, Any], **fields: Any) -> list[Finding]:
    return run_rule(RULE, job(atoms, core_potential=potential, **fields))


@pytest.mark.parametrize(
    ("atoms", "potential", "grades"),
    [
        pytest.param(METHYL_IODIDE, {"replaced": {"I": 28}}, [], id="small core"),
        pytest.param(METHYL_IODIDE, {"replaced": {"I": 46}}, [], id="large core"),
        pytest.param(METHYL_IODIDE, {"replaced": {"I": 36}}, [], id="shape-consistent core"),
        pytest.param(METHYL_IODIDE, {"replaced": {"I": 0}}, [], id="all-electron"),
        pytest.param(METHYL_IODIDE, {"replaced": {"I": 27}}, ["doubt"], id="one short"),
        pytest.param(METHYL_IODIDE, {"replaced": {"I": 30}}, ["doubt"], id="even and unknown"),
        pytest.param(METHYL_IODIDE, {"replaced": {"I": 53}}, ["halt"], id="as many as the nuclear charge"),
        pytest.param(METHYL_IODIDE, {"replaced": {"I": 60}}, ["halt"], id="more than the nuclear charge"),
        pytest.param(METHYL_IODIDE, {"replaced": {"I": -28}}, ["halt"], id="negative"),
        pytest.param(METHYL_IODIDE, {"replaced": {"Br": 28}}, ["doubt"], id="element not there"),
        pytest.param(METHYL_IODIDE, {"replaced": {"I": 28, "Br": 28}}, ["doubt"], id="one of two not there"),
        pytest.param(METHYL_IODIDE, {"name": "def2-ECP"}, [], id="named"),
        pytest.param(METHYL_IODIDE, {"name": "def2-ECP", "replaced": {"I": 28}}, [], id="named and stated"),
        pytest.param(METHYL_IODIDE, {"name": "def2-ECP", "replaced": {"I": 46}}, ["doubt"], id="in contradiction"),
        pytest.param(METHYL_IODIDE, {"name": "house-made", "replaced": {"I": 46}}, [], id="unknown but stated"),
        pytest.param("H H", {"replaced": {"H": 0}}, [], id="hydrogen all-electron"),
        pytest.param("Hf", {"replaced": {"Hf": 60}}, [], id="4f14 of Hf is a closed core"),
        pytest.param("Lu", {"replaced": {"Lu": 60}}, [], id="4f14 of Lu takes no spin"),
        pytest.param("U", {"replaced": {"U": 60}}, [], id="small core U"),
        pytest.param("U", {"replaced": {"U": 78}}, [], id="large core U"),
        pytest.param("U", {"replaced": {"U": 81}}, ["note"], id="5f3 in the core"),
    ],
)
def test_grades_of_counts(atoms: str, potential: dict[str, Any], grades: list[str]) -> None:
    found = spoken(atoms, potential)
    assert [(finding.grade or RULE.grade).word for finding in found] == grades


def test_no_core_potential_no_word() -> None:
    assert speak(RULE, job(METHYL_IODIDE)) == []


def test_a_ghost_may_have_a_count() -> None:
    assert spoken("I H", {"replaced": {"I": 28}}, species={"ghost_atoms": [1]}) == []


def test_an_unknown_count_names_the_published_ones_and_offers_the_nearest() -> None:
    (finding,) = spoken(METHYL_IODIDE, {"replaced": {"I": 27}})
    assert finding.at == "core_potential.replaced.I"
    assert finding.message == (
        "no known core potential of I replaces 27 electrons; published ones replace 28, 36 or 46"
    )
    assert [repair.edits for repair in finding.repairs] == [
        (Edit("core_potential.replaced.I", 28),),
        (Edit("core_potential.replaced.I", 36),),
    ]


def test_a_count_as_large_as_the_atom_leaves_nothing() -> None:
    (finding,) = spoken(METHYL_IODIDE, {"replaced": {"I": 53}})
    assert finding.message == "53 electrons of I are said to be replaced; the atom has 53, and some must be left"
    assert finding.repairs[0].edits == (Edit("core_potential.replaced.I", 46),)


def test_an_absent_element_is_taken_out() -> None:
    (finding,) = spoken(METHYL_IODIDE, {"replaced": {"Br": 28, "I": 28}})
    assert finding.message == "core_potential.replaced.Br = 28, and the geometry has no Br"
    assert finding.repairs[0].edits == (Edit("core_potential.replaced.Br", None),)


def test_with_the_last_count_its_table_goes_which_could_not_be_read_empty() -> None:
    (finding,) = spoken(METHYL_IODIDE, {"replaced": {"Br": 28}})
    assert finding.repairs[0].edits == (Edit("core_potential", None),)


def test_a_named_set_speaks_against_the_stated_count() -> None:
    (finding,) = spoken(
        METHYL_IODIDE,
        {"name": "from-basis", "replaced": {"I": 46}},
        basis={"name": "cc-pVTZ", "for_element": {"I": "cc-pVTZ-PP"}},
    )
    assert finding.message == "cc-pVTZ-PP replaces 28 electrons of I, and the deck states 46"


def test_an_octet_with_4f7_in_the_core_is_doubted() -> None:
    """Gd3+ with 53 replaced (Dolg et al. 1989): the seven f electrons are in the core, the rest is a singlet."""
    (finding,) = spoken(GD_AQUO, {"replaced": {"Gd": 53}}, charge=3, multiplicity=8)
    assert (finding.grade or RULE.grade) is Grade.DOUBT
    assert finding.message == (
        "53 electrons replaced for Gd put 4f7 into the core, so its spin is no longer counted, "
        "and multiplicity 8 seems to count it"
    )
    assert [repair.edits for repair in finding.repairs] == [
        (Edit("species.multiplicity", 1),),
        (Edit("core_potential.replaced.Gd", 28),),
    ]


def test_a_singlet_with_4f7_in_the_core_is_right_and_explained() -> None:
    (finding,) = spoken(GD_AQUO, {"replaced": {"Gd": 53}}, charge=3, multiplicity=1)
    assert finding.grade is Grade.NOTE
    assert finding.repairs == ()


def test_a_small_core_leaves_the_f_spin_in_the_books() -> None:
    assert spoken(GD_AQUO, {"replaced": {"Gd": 28}}, charge=3, multiplicity=8) == []


def test_one_f_spin_is_told_by_parity() -> None:
    """Ce3+, 47 replaced: 4f1 in the core. A doublet breaks the parity of the rest; that of Ce2+ does not."""
    free = spoken("Ce", {"replaced": {"Ce": 47}}, charge=3, multiplicity=2)
    radical = spoken("Ce", {"replaced": {"Ce": 47}}, charge=2, multiplicity=2)
    assert [(finding.grade or RULE.grade).word for finding in free + radical] == ["doubt", "note"]


def test_f_spins_of_several_atoms_add() -> None:
    """Two Dy3+ with 4f9 (five unpaired each) in the core: of multiplicity 11 nothing is left."""
    (finding,) = spoken("Dy Dy", {"replaced": {"Dy": 55}}, charge=6, multiplicity=11)
    assert finding.evidence["unpaired_in_core"] == 10
    assert finding.repairs[0].edits == (Edit("species.multiplicity", 1),)


def test_a_named_set_with_f_in_the_core_is_noted_at_its_name() -> None:
    (finding,) = spoken("Gd", {"name": "lcecp-1-TZVP"}, charge=3, multiplicity=1)
    assert (finding.at, finding.grade) == ("core_potential.name", Grade.NOTE)


def test_a_lanthanide_with_an_unknown_set_is_not_judged() -> None:
    with pytest.raises(NotDerivable, match=r"core_potential\.replaced"):
        speak(RULE, job("Gd", charge=3, multiplicity=8, core_potential={"name": "house-made"}))


def test_a_core_whose_size_does_not_tell_is_not_judged() -> None:
    (word,) = speak(RULE, job("Gd", charge=3, multiplicity=8, core_potential={"replaced": {"Gd": 54}}))
    assert isinstance(word, NotJudged)
    assert "0 f electrons or 8 f electrons" in word.because


def test_an_unknown_set_without_counts_is_not_judged() -> None:
    with pytest.raises(NotDerivable, match="'house-made'"):
        speak(RULE, job(METHYL_IODIDE, core_potential={"name": "house-made"}))
