"""Names of irreps: what is read as it stands, what is another spelling, what a wrong one may have meant."""

import pytest

from checker.chemistry.irrep_names import (
    agreeing_irreps,
    find_irrep,
    find_orbital_irrep,
    nearest_irreps,
    parse_label,
    respelled_irrep,
)
from checker.chemistry.irreps import Irrep, PointGroup, common_groups, point_group


def group(symbol: str) -> PointGroup:
    found = point_group(symbol)
    assert found is not None
    return found


def name(irrep: Irrep | None) -> str | None:
    return None if irrep is None else irrep.name


@pytest.mark.parametrize("symbol", common_groups())
def test_every_irrep_is_found_by_its_own_names_in_any_case(symbol: str) -> None:
    of = group(symbol)
    for irrep in of.irreps:
        for written in (irrep.name, irrep.plain_name, irrep.name.lower(), irrep.plain_name.upper()):
            assert find_irrep(of, written) is irrep
            assert respelled_irrep(of, written) is irrep
            assert nearest_irreps(of, written)[0] is irrep


@pytest.mark.parametrize(
    ("symbol", "written", "meant"),
    [
        pytest.param("Cs", 'A"', "A''", id="double_quote_for_two_primes"),
        pytest.param("Cs", "A′", "A'", id="typographic_prime"),
        pytest.param("Cs", "A″", "A''", id="typographic_double_prime"),
        pytest.param("D3h", "E”", "E''", id="curly_quote"),
    ],
)
def test_marks_that_look_like_primes_are_primes(symbol: str, written: str, meant: str) -> None:
    assert name(find_irrep(group(symbol), written)) == meant


@pytest.mark.parametrize(
    ("symbol", "written", "meant"),
    [
        pytest.param("Cs", "A´", "A'", id="accent_for_prime"),
        pytest.param("D3h", "A'1", "A1'", id="prime_before_number"),
        pytest.param("C2v", "b₁", "B1", id="subscript"),
        pytest.param("C2v", "B_{2}", "B2", id="marked_up"),
        pytest.param("D2h", "Bg1", "B1g", id="parity_before_number"),
        pytest.param("Dinfh", "Σ+g", "Σg+", id="sign_before_parity"),
        pytest.param("Dinfh", "∑g⁺", "Σg+", id="sum_sign_and_superscript"),
        pytest.param("Dinfh", "Sigma_u−", "Σu-", id="minus_sign"),
        pytest.param("Cinfv", "∆", "Δ", id="increment_sign_for_delta"),
        pytest.param("Td", "F2", "T2", id="older_letter"),
    ],
)
def test_other_spellings_are_understood_but_not_taken_as_they_stand(symbol: str, written: str, meant: str) -> None:
    assert find_irrep(group(symbol), written) is None
    assert name(respelled_irrep(group(symbol), written)) == meant


@pytest.mark.parametrize(
    ("symbol", "written", "offered"),
    [
        pytest.param("C2v", "B1g", "B1", id="parity_too_many"),
        pytest.param("D2h", "B1", "B1g B1u", id="parity_missing"),
        pytest.param("C2h", "B1g", "Bg", id="number_too_many"),
        pytest.param("D2", "A1", "A", id="A_of_D2_has_no_number"),
        pytest.param("D3h", "A1", "A1' A1''", id="primes_missing"),
        pytest.param("C2v", "A3", "A1 A2", id="no_such_number"),
        pytest.param("C2v", "A", "A1 A2", id="number_missing"),
        pytest.param("Dinfh", "Sigma+", "Σg+ Σu+", id="linear_parity_missing"),
        pytest.param("Cinfv", "Πg", "Π", id="no_inversion_centre"),
        pytest.param("C2v", "Q7x", "", id="nothing_like_it"),
        pytest.param("C2v", "", "", id="nothing_written"),
        pytest.param("C2v", "B11", "B1 B2", id="doubled_digit"),
    ],
)
def test_wrong_names_get_the_nearest(symbol: str, written: str, offered: str) -> None:
    assert find_irrep(group(symbol), written) is None
    assert respelled_irrep(group(symbol), written) is None
    assert [irrep.name for irrep in nearest_irreps(group(symbol), written)] == offered.split()


@pytest.mark.parametrize(
    ("symbol", "written", "found"),
    [
        ("Cinfv", "σ", "Σ+"), ("Cinfv", "Sigma", "Σ+"), ("Dinfh", "sigma_u", "Σu+"), ("Dinfh", "Sigma", None),
        ("Kh", "s", "Sg"), ("Kh", "p", "Pu"), ("Kh", "D", "Dg"), ("Kh", "Pg", "Pg"), ("D2h", "B1", None),
        ("Td", "T", None), ("C2v", "a1", "A1"),
    ],
)  # fmt: skip
def test_orbitals_of_linear_molecules_and_atoms_need_fewer_marks(
    symbol: str, written: str, found: str | None
) -> None:
    assert name(find_orbital_irrep(group(symbol), written)) == found


def test_a_name_with_fewer_marks_agrees_with_all_that_have_them() -> None:
    assert [irrep.name for irrep in agreeing_irreps(group("D2h"), "B1")] == ["B1g", "B1u"]
    assert agreeing_irreps(group("D2h"), "E") == ()


@pytest.mark.parametrize("written", ["", "1A", "Agu", "A1g2", "A'g'", "+", "\x00", "A1!", "AA"])
def test_what_is_no_symbol_has_no_label(written: str) -> None:
    assert parse_label(written) is None
