"""The basis of a deck as its facts give it: ghosts carry functions, elements may have sets of their own."""

import pytest

from builders import job
from checker.errors import NotDerivable
from checker.facts import Facts
from checker.findings import BasisBook


def facts(atoms: str, ghosts: tuple[int, ...] = (), **basis: object) -> Facts:
    tables = {"basis": basis} if basis else {}
    return Facts(job(atoms, species={"ghost_atoms": ghosts}, **tables))


def test_functions_of_water() -> None:
    water = facts("O H H", name="cc-pVDZ")
    assert water.n_functions == 24
    assert sorted(water.basis_shells) == [1, 8]
    assert water.basis_book == BasisBook(
        name="cc-pVDZ", n_functions=24, form="spherical", by_irrep={"A1": 13, "A2": 1, "B1": 5, "B2": 5}
    )


def test_ghosts_carry_functions() -> None:
    assert facts("O H H O H H", ghosts=(4, 5, 6), name="cc-pVDZ").n_functions == 48
    assert sorted(facts("O Ne", ghosts=(2,), name="cc-pVDZ").basis_shells) == [8, 10]


def test_an_element_may_have_a_set_of_its_own() -> None:
    mixed = facts("C H H H I", name="def2-SVP", for_element={"I": "def2-TZVP"})
    assert mixed.n_functions == 14 + 3 * 5 + 50  # 3s2p1d, 2s1p, 6s5p3d2f


def test_a_stated_form_is_taken() -> None:
    assert facts("O H H", name="6-31G(d)").basis_book == BasisBook(
        name="6-31G(d)", n_functions=19, form="cartesian", by_irrep={"A1": 12, "A2": 1, "B1": 3, "B2": 3}
    )
    assert facts("O H H", name="6-31G(d)", form="spherical").n_functions == 18


def test_what_is_not_known_is_said() -> None:
    unknown = facts("O H H", name="house-made", form="cartesian")
    with pytest.raises(NotDerivable, match="'house-made' is not in the catalogue"):
        _ = unknown.n_functions
    assert unknown.basis_book == BasisBook(name="house-made", form="cartesian")
    with pytest.raises(NotDerivable, match=r"cc-pVTZ of the catalogue has no I"):
        _ = facts("I", name="cc-pVTZ").n_functions
    with pytest.raises(NotDerivable, match="names no basis"):
        _ = facts("O H H").basis_shells
    assert facts("O H H").basis_book is None
