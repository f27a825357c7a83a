"""LS terms by counting microstates, against published tables; Hund's rules; level names."""

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from checker.chemistry.terms import (
    L_LETTERS,
    Level,
    Shell,
    Term,
    has_level,
    hund_ground_level,
    max_unpaired,
    n_states,
    parse_level,
    terms_of,
    written_j,
)

# Condon & Shortley, The Theory of Atomic Spectra (1935), table 1 of chap. 7, from memory; "2D 2D" occurs twice.
PUBLISHED_TERMS = {
    (0, 1): "2S",
    (0, 2): "1S",
    (1, 1): "2P*",
    (1, 2): "1S 1D 3P",
    (1, 3): "2P* 2D* 4S*",
    (2, 1): "2D",
    (2, 2): "1S 1D 1G 3P 3F",
    (2, 3): "2P 2D 2D 2F 2G 2H 4P 4F",
    (2, 4): "1S 1S 1D 1D 1F 1G 1G 1I 3P 3P 3D 3F 3F 3G 3H 5D",
    (2, 5): "2S 2P 2D 2D 2D 2F 2F 2G 2G 2H 2I 4P 4D 4F 4G 6S",
    (3, 1): "2F*",
    (3, 2): "1S 1D 1G 1I 3P 3F 3H",
    (3, 3): "2P* 2D* 2D* 2F* 2F* 2G* 2G* 2H* 2H* 2I* 2K* 2L* 4S* 4D* 4F* 4G* 4I*",
}
# R. D. Cowan, The Theory of Atomic Structure and Spectra (1981), table 4-5, from memory: LS terms, levels.
PUBLISHED_NUMBERS = {
    (2, 2): (5, 9),
    (2, 3): (8, 19),
    (2, 4): (16, 34),
    (2, 5): (16, 37),
    (3, 2): (7, 13),
    (3, 3): (17, 41),
    (3, 4): (47, 107),
    (3, 5): (73, 198),
    (3, 6): (119, 295),
    (3, 7): (119, 327),
}

subshells = st.integers(0, 3).flatmap(lambda ell: st.tuples(st.just(ell), st.integers(0, 4 * ell + 2)))


@pytest.mark.parametrize(("shell", "published"), PUBLISHED_TERMS.items(), ids=str)
def test_terms_of_one_shell_are_the_published_ones(shell: Shell, published: str) -> None:
    counted = sorted(term.name for term, n in terms_of([shell]).items() for _ in range(n))
    assert counted == sorted(published.split())


@pytest.mark.parametrize(("shell", "numbers"), PUBLISHED_NUMBERS.items(), ids=str)
def test_numbers_of_terms_and_levels_are_the_published_ones(shell: Shell, numbers: tuple[int, int]) -> None:
    terms = terms_of([shell])
    assert (sum(terms.values()), sum(n * len(term.twice_j) for term, n in terms.items())) == numbers


def test_terms_of_two_open_shells_add_as_vectors() -> None:
    """4f 5d: F and D give P to H, singlet and triplet each once (Condon & Shortley, chap. 7)."""
    expected = {f"{multiplicity}{letter}*" for multiplicity in (1, 3) for letter in "PDFGH"}
    assert {term.name for term in terms_of([(3, 1), (2, 1)])} == expected


@given(st.lists(subshells, max_size=3))
def test_terms_hold_every_microstate(shells: list[Shell]) -> None:
    held = sum(n * term.multiplicity * (2 * term.orbital + 1) for term, n in terms_of(shells).items())
    assert held == n_states(shells) == math.prod(math.comb(4 * ell + 2, n) for ell, n in shells)


@given(subshells)
def test_holes_have_the_terms_of_electrons(shell: Shell) -> None:
    """Apart from the parity of an odd shell, where the number of electrons changes by an even one."""
    ell, n = shell
    assert terms_of([shell]) == terms_of([(ell, 4 * ell + 2 - n)])


@given(subshells)
def test_hunds_term_has_the_highest_multiplicity_and_then_the_highest_l(shell: Shell) -> None:
    ground = hund_ground_level(*shell)
    assert has_level([shell], ground)
    assert ground.term == max(terms_of([shell]))
    assert ground.term.multiplicity == max_unpaired([shell]) + 1


@given(subshells)
def test_hunds_j_is_the_lowest_to_half_filling_and_the_highest_beyond(shell: Shell) -> None:
    ell, n = shell
    ground = hund_ground_level(ell, n)
    end = max if n > 2 * ell + 1 else min
    assert ground.twice_j == end(ground.term.twice_j)


@pytest.mark.parametrize(("ell", "n"), [(0, 3), (1, 7), (2, 11), (2, -1)])
def test_a_shell_holds_no_more_than_its_capacity(ell: int, n: int) -> None:
    with pytest.raises(ValueError, match=f"holds no {n} electrons"):
        hund_ground_level(ell, n)


@given(st.integers(0, 10), st.integers(0, len(L_LETTERS) - 1), st.booleans(), st.integers(0, 20))
def test_a_level_name_reads_back(twice_s: int, orbital: int, odd: bool, twice_j: int) -> None:
    level = Level(Term(twice_s + 1, orbital, odd), twice_j)
    assert parse_level(level.name) == level


@pytest.mark.parametrize("text", ["", "5D", "5J4", "(4,3/2)11/2", "J=0", "D4", "5D4 ", "4S*3/4"])
def test_other_text_is_no_level_name(text: str) -> None:
    with pytest.raises(ValueError, match="no LS level name"):
        parse_level(text)


def test_j_is_written_whole_or_as_halves() -> None:
    assert [written_j(n) for n in range(4)] == ["0", "1/2", "1", "3/2"]


def test_max_unpaired_counts_holes_beyond_half_filling() -> None:
    assert max_unpaired([(3, 7), (2, 1), (0, 1)]) == 9
    assert max_unpaired([(2, 8), (1, 6)]) == 2
