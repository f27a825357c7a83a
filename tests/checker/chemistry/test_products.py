"""Reduction, direct products and terms: invariants here, published tables in tests/outside/test_characters.py."""

import itertools

import numpy as np
import pytest

from checker.chemistry.characters import sample
from checker.chemistry.irreps import common_groups, point_group
from checker.chemistry.products import (
    antisymmetric_square,
    product,
    reduce,
    symmetric_square,
    terms_of_levels,
)
from checker.chemistry.terms import terms_of
from checker.errors import NotDerivable

FINITE = [s for s in common_groups() if "∞" not in s and s != "Kh"]


def dimensions(symbol: str) -> dict[str, int]:
    group = point_group(symbol)
    assert group is not None
    return {irrep.name: irrep.dimension for irrep in group.irreps}


@pytest.mark.parametrize("symbol", FINITE)
def test_products_keep_the_dimension_and_do_not_care_for_order(symbol: str) -> None:
    d = dimensions(symbol)
    for a, b in itertools.combinations_with_replacement(d, 2):
        found = product(symbol, a, b)
        assert sum(n * d[name] for name, n in found.items()) == d[a] * d[b]
        assert found == product(symbol, b, a)


@pytest.mark.parametrize("symbol", [*FINITE, "C∞v", "D∞h"])
def test_the_square_is_its_symmetric_and_its_antisymmetric_part(symbol: str) -> None:
    d = dimensions(symbol)
    for name in [name for name in d if name[0] not in "ΗΙΚΛ"]:
        even, odd = symmetric_square(symbol, name), antisymmetric_square(symbol, name)
        both = {k: even.get(k, 0) + odd.get(k, 0) for k in d if k in even or k in odd}
        assert both == product(symbol, name, name)
        assert sum(n * d[k] for k, n in odd.items()) == d[name] * (d[name] - 1) // 2


def test_products_of_three_and_of_none() -> None:
    assert product("C2v", "A2", "B1", "B2") == {"A1": 1}
    assert product("D2h", "B1g", "B2u", "B3u") == {"Ag": 1}
    assert product("C2v") == {"A1": 1}


def test_error_for_what_is_no_representation() -> None:
    with pytest.raises(ValueError, match="not the characters of a representation of C2v"):
        reduce("C2v", np.array([1.0, 0.0, 0.0, 0.0]))
    with pytest.raises(ValueError, match="not the characters"):
        reduce("C2v", -np.ones(4))
    with pytest.raises(ValueError, match="C2v has no irrep 'B1g'"):
        product("C2v", "B1g")


def test_momenta_beyond_the_list_are_said_not_to_be_known() -> None:
    with pytest.raises(NotDerivable, match="higher angular momenta"):
        product("C∞v", "Λ", "Λ")


def test_reduction_forgives_operations_that_are_not_quite_exact() -> None:
    exact = sample("C2v").characters[2] + sample("C2v").characters[0]
    assert reduce("C2v", exact + 1e-5) == {"A1": 1, "B1": 1}


@pytest.mark.parametrize(("ell", "letter"), [(0, "Sg"), (1, "Pu"), (2, "Dg")])
def test_terms_of_an_atom_are_those_counted_from_microstates(ell: int, letter: str) -> None:
    """Two ways to one answer: characters of the full rotation group, and M_L with M_S."""
    for n in range(2 * (2 * ell + 1) + 1):
        by_counting = {
            (term.multiplicity, "SPDFGHIKLMNOQ"[term.orbital] + ("u" if term.odd else "g")): count
            for term, count in terms_of([(ell, n)]).items()
        }
        assert terms_of_levels("Kh", {letter: n}) == by_counting


@pytest.mark.parametrize(
    ("symbol", "electrons"),
    [
        ("Td", {"T2": 3, "E": 1}),
        ("Oh", {"T2g": 4}),
        ("D6h", {"E1g": 2, "E2u": 1}),
        ("C3", {"E": 2}),
        ("Ih", {"Hu": 3}),
    ],
)
def test_terms_hold_every_determinant_once(symbol: str, electrons: dict[str, int]) -> None:
    d = dimensions(symbol)
    n_determinants = 1
    for name, n in electrons.items():
        n_determinants *= len(list(itertools.combinations(range(2 * d[name]), n)))
    terms = terms_of_levels(symbol, electrons)
    assert sum(multiplicity * d[name] * n for (multiplicity, name), n in terms.items()) == n_determinants


def test_closed_levels_are_totally_symmetric() -> None:
    assert terms_of_levels("Td", {"T2": 6, "E": 4, "A1": 0}) == {(1, "A1"): 1}
    assert terms_of_levels("D∞h", {}) == {(1, "Σg+"): 1}


def test_error_for_more_electrons_than_a_level_holds() -> None:
    with pytest.raises(ValueError, match="a level of E in C3v holds no 5 electrons"):
        terms_of_levels("C3v", {"E": 5})
