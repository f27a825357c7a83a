"""Electrons that core potentials replace, by name and by count, and the f electrons some hold."""

import pytest

from checker.chemistry.core_potentials import (
    electrons_replaced,
    f_electrons_in_core,
    f_unpaired,
    f_unpaired_in_core,
    is_known_set,
    nearest_counts,
    published_counts,
)
from checker.errors import NotDerivable

IODINE, GD, TB, LU, U = 53, 64, 65, 71, 92


@pytest.mark.parametrize(
    ("name", "z", "replaced"),
    [
        ("def2-TZVP", IODINE, 28),
        ("DEF2TZVP", IODINE, 28),
        ("def2 tzvp", IODINE, 28),
        ("def2-ecp", IODINE, 28),
        ("def2_ECP", 6, 0),
        ("def2-TZVP", 26, 0),
        ("LANL2DZ", IODINE, 46),
        ("lanl2dz", 8, 0),
        ("cc-pVTZ-PP", IODINE, 28),
        ("cc-pvtz-pp", 6, 0),
        ("cc-pVTZ-PP", 19, 10),
        ("cc-pVTZ", 17, 0),
        ("6-31g*", 8, 0),
        ("ECP28MDF", IODINE, 28),
        ("def2-TZVP", U, None),
        ("cc-pVTZ", U, None),
        ("ECP60MWB", IODINE, None),
        ("house-made", IODINE, None),
        ("", IODINE, None),
    ],
)
def test_names_are_read_as_people_write_them(name: str, z: int, replaced: int | None) -> None:
    assert electrons_replaced(name, z) == replaced


def test_a_known_set_that_lacks_an_element_is_known() -> None:
    assert is_known_set("def2-TZVP")
    assert is_known_set("ecp28mdf")
    assert not is_known_set("house-made")


def test_counts_of_iodine_are_those_of_its_potentials() -> None:
    counts = {count.electrons for count in published_counts(IODINE)}
    assert counts == {28, 36, 46}


def test_hydrogen_has_none() -> None:
    assert published_counts(1) == ()
    assert nearest_counts(1, 2) == ()


@pytest.mark.parametrize(("replaced", "nearest"), [(27, 28), (30, 28), (45, 46), (54, 46), (0, 28)])
def test_the_nearest_count_comes_first(replaced: int, nearest: int) -> None:
    assert nearest_counts(IODINE, replaced)[0].electrons == nearest


def test_each_number_of_electrons_comes_once_without_f_electrons_if_it_can() -> None:
    """54 for Tb is [Xe] as well as 46 and 4f8."""
    found = nearest_counts(TB, 54)
    assert [count.electrons for count in found] == [54, 53, 55, 46, 28]
    assert found[0].f_electrons_in_core == 0


@pytest.mark.parametrize(
    ("z", "replaced", "n_f", "unpaired"),
    [
        pytest.param(GD, 53, 7, 7, id="trivalent Gd"),
        pytest.param(GD, 28, 0, 0, id="small core: 4f7 is counted"),
        pytest.param(58, 47, 1, 1, id="trivalent Ce"),
        pytest.param(TB, 55, 9, 5, id="divalent Tb"),
        pytest.param(LU, 60, 14, 0, id="trivalent Lu, 4f closed"),
        pytest.param(72, 60, 0, 0, id="Hf: 4f is a closed core"),
        pytest.param(U, 81, 3, 3, id="trivalent U"),
        pytest.param(U, 60, 0, 0, id="small core U: 5f is counted"),
        pytest.param(U, 78, 0, 0, id="large core U: 5f is counted"),
        pytest.param(IODINE, 28, 0, 0, id="no f shell"),
    ],
)
def test_f_electrons_in_the_core(z: int, replaced: int, n_f: int, unpaired: int) -> None:
    assert (f_electrons_in_core(z, replaced), f_unpaired_in_core(z, replaced)) == (n_f, unpaired)


def test_the_name_decides_where_two_kinds_of_core_are_as_large() -> None:
    """54 for Tb: [Xe] with 4f counted, or 46 and 4f8."""
    with pytest.raises(NotDerivable, match=r"54 electrons of Tb hold 0 f electrons or 8 f electrons"):
        f_electrons_in_core(TB, 54)
    assert f_electrons_in_core(TB, 54, "CRENBL") == 0
    assert f_electrons_in_core(TB, 54, "lcecp-1-TZVP") == 8


def test_a_name_that_contradicts_the_count_does_not_decide() -> None:
    """def2 replaces 28 for Gd; where the deck states 53 the count speaks."""
    assert f_electrons_in_core(GD, 53, "def2-TZVP") == 7
    assert f_electrons_in_core(GD, 53, "ECP53MWB") == 7


def test_f_spin_follows_hund() -> None:
    assert [f_unpaired(n) for n in (0, 1, 7, 8, 13, 14)] == [0, 1, 7, 6, 1, 0]
