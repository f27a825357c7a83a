"""Ground levels: stored first, derived where safe, refused otherwise. Levels typed here: NIST, from memory."""

import pytest
from hypothesis import given
from hypothesis import strategies as st

from checker import tables
from checker.chemistry.configurations import (
    anion_is_bound,
    ground_level,
    most_unpaired,
    usual_charges,
)
from checker.chemistry.shells import electrons_in
from checker.elements import number_of, written_ion
from checker.errors import NotDerivable


def z(symbol: str) -> int:
    number = number_of(symbol)
    assert number is not None
    return number


@pytest.mark.parametrize(
    ("symbol", "charge", "configuration", "term"),
    [
        pytest.param("V", 1, "[Ar] 3d4", "5D0", id="V+ not 3d3 4s"),
        pytest.param("Co", 1, "[Ar] 3d8", "3F4", id="Co+ not 3d7 4s"),
        pytest.param("Ni", 1, "[Ar] 3d9", "2D5/2", id="Ni+ not 3d8 4s"),
        pytest.param("Fe", 1, "[Ar] 3d6 4s", "6D9/2", id="Fe+ keeps 4s"),
        pytest.param("Y", 1, "[Kr] 5s2", "1S0", id="Y+ keeps both 5s"),
        pytest.param("La", 1, "[Xe] 5d2", "3F2", id="La+ has no 6s"),
        pytest.param("Lu", 1, "[Xe] 4f14 6s2", "1S0", id="Lu+ keeps both 6s"),
        pytest.param("Hf", 1, "[Xe] 4f14 5d 6s2", "2D3/2", id="Hf+ keeps both 6s"),
        pytest.param("La", 2, "[Xe] 5d", "2D3/2", id="La2+ not 4f"),
        pytest.param("Ce", 2, "[Xe] 4f2", "3H4", id="Ce2+"),
        pytest.param("Gd", 2, "[Xe] 4f7 5d", "9D*2", id="Gd2+ not 4f8"),
        pytest.param("Lu", 2, "[Xe] 4f14 6s", "2S1/2", id="Lu2+ not 5d"),
        pytest.param("Th", 2, "[Rn] 5f 6d", "3H*4", id="Th2+"),
        pytest.param("Th", 3, "[Rn] 5f", "2F*5/2", id="Th3+"),
        pytest.param("Eu", 3, "[Xe] 4f6", "7F0", id="Eu3+"),
        pytest.param("Sc", -1, "[Ar] 3d 4s2 4p", "1D*2", id="Sc- takes a 4p electron"),
        pytest.param("Cu", -1, "[Ar] 3d10 4s2", "1S0", id="Cu-"),
    ],
)
def test_ions_that_a_filling_order_would_get_wrong(
    symbol: str, charge: int, configuration: str, term: str
) -> None:
    found = ground_level(z(symbol), charge)
    assert (found.configuration, found.term, found.origin) == (configuration, term, "measured")


@pytest.mark.parametrize(
    ("symbol", "charge", "configuration", "term"),
    [
        ("Ti", 4, "[Ne] 3s2 3p6", "1S0"),
        ("Cr", 4, "[Ar] 3d2", "3F2"),
        ("Mn", 4, "[Ar] 3d3", "4F3/2"),
        ("Fe", 6, "[Ar] 3d2", "3F2"),
        ("Re", 4, "[Xe] 4f14 5d3", "4F3/2"),
        ("Ir", 4, "[Xe] 4f14 5d5", "6S5/2"),
        ("Pt", 4, "[Xe] 4f14 5d6", "5D4"),
        ("Al", 3, "[He] 2s2 2p6", "1S0"),
        ("Sn", 2, "[Kr] 4d10 5s2", "1S0"),
        ("Pb", 4, "[Xe] 4f14 5d10", "1S0"),
        ("Tb", 4, "[Xe] 4f7", "8S*7/2"),
        ("U", 4, "[Rn] 5f2", "3H4"),
        ("Rf", 4, "[Rn] 5f14", "1S0"),
    ],
)
def test_derived_levels_say_that_they_are(symbol: str, charge: int, configuration: str, term: str) -> None:
    found = ground_level(z(symbol), charge)
    assert (found.configuration, found.term) == (configuration, term)
    assert found.origin == "derived"
    assert found.source


def test_a_bare_nucleus_is_a_singlet_without_electrons() -> None:
    found = ground_level(1, 1)
    assert (found.configuration, found.occupation, found.multiplicity) == ("", (), 1)


def test_an_embedded_dianion_has_a_level_and_is_not_bound() -> None:
    oxide = ground_level(z("O"), -2)
    assert (oxide.configuration, oxide.term, oxide.bound) == ("[He] 2s2 2p6", "1S0", False)
    assert ground_level(z("C"), -2).term == "3P2"


@pytest.mark.parametrize(
    ("symbol", "charge", "because"),
    [
        pytest.param("N", -1, "N- is not stable: the extra electron is not bound", id="unbound"),
        pytest.param("Os", 2, "not settled", id="disputed"),
        pytest.param("Nd", -1, "anions are not derived", id="unstored anion"),
        pytest.param("O", -3, "more electrons than its valence shell can take", id="too many electrons"),
        pytest.param("Na", -2, "more electrons than its valence shell can take", id="s block dianion"),
        pytest.param("He", 3, "fewer electrons than none", id="too few electrons"),
        pytest.param("Xe", 20, "so high a charge", id="high charge"),
        pytest.param("W", 10, "so high a charge", id="high charge of a heavy atom"),
        pytest.param("Hf", 5, "too close to derive", id="4f against 5p"),
        pytest.param("Rf", 2, "too close to derive", id="superheavy"),
    ],
)
def test_what_cannot_be_said_is_refused_with_the_reason(symbol: str, charge: int, because: str) -> None:
    with pytest.raises(NotDerivable, match=because):
        ground_level(z(symbol), charge)


def test_a_level_without_ls_name_has_no_multiplicity() -> None:
    flerovium = ground_level(114, 0)
    assert (flerovium.level, flerovium.term, flerovium.multiplicity) == ("J=0", None, None)


def test_a_jj_level_takes_the_multiplicity_of_its_leading_component() -> None:
    uranium = ground_level(z("U"), 0)
    assert (uranium.level, uranium.term, uranium.multiplicity) == ("(9/2,3/2)*6", "5L*6", 5)


@given(st.integers(1, 118), st.integers(-3, 12))
def test_an_answer_is_whole_or_refused(atomic_number: int, charge: int) -> None:
    try:
        found = ground_level(atomic_number, charge)
    except NotDerivable as refused:
        assert written_ion(atomic_number, charge) in refused.because
        return
    assert electrons_in(found.occupation) == atomic_number - charge
    if found.multiplicity is not None:
        assert (found.multiplicity - 1 - electrons_in(found.occupation)) % 2 == 0
        assert 1 <= found.multiplicity <= most_unpaired(found.occupation) + 1


def test_bound_and_unbound_anions() -> None:
    bound = [anion_is_bound(z(symbol), -1) for symbol in ("H", "F", "Na", "Ca", "N", "Be", "Ne", "Nd", "U")]
    assert bound == [True, True, True, True, False, False, False, None, True]
    assert anion_is_bound(z("O"), -2) is False
    assert anion_is_bound(z("O"), 0) is True


def test_usual_charges_are_commonest_first_and_empty_for_helium() -> None:
    assert usual_charges(z("Na")) == (1,)
    assert usual_charges(z("Fe")) == (3, 2)
    assert usual_charges(z("Cl"))[0] == -1
    assert usual_charges(z("He")) == ()


def test_the_table_is_read_once() -> None:
    assert tables.ground_levels() is tables.ground_levels()
