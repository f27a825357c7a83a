"""Elements by symbol and number; `periodictable` is the source, so only what we add is tested."""

import pytest

from checker.elements import covalent_radius, mass_number_of, name_of, number_of, numbers_by_symbol, symbol_of


@pytest.mark.parametrize(
    ("written", "z"), [("Cl", 17), ("CL", 17), ("cl", 17), ("D", 1), ("t", 1), (" O ", 8), ("Og", 118)]
)
def test_symbols_in_any_case_and_isotopes(written: str, z: int) -> None:
    assert number_of(written) == z


@pytest.mark.parametrize("written", ["", "Xx", "C1", "Fe2+", "8"])
def test_what_is_no_symbol_is_none(written: str) -> None:
    assert number_of(written) is None


def test_isotopes_have_mass_numbers() -> None:
    assert [mass_number_of(symbol) for symbol in ("D", "t", "H", "O")] == [2, 3, 0, 0]


def test_every_element_round_trips() -> None:
    assert len(numbers_by_symbol()) == 118
    assert all(number_of(symbol_of(z)) == z for z in range(1, 119))


@pytest.mark.parametrize("z", [0, -1, 119])
def test_error_no_such_number(z: int) -> None:
    with pytest.raises(ValueError, match="no element has the atomic number"):
        symbol_of(z)


def test_names_and_radii() -> None:
    """Cordero et al., Dalton Trans. 2008, 2832, table 2: C sp3 0.76, Fe low-spin 1.32 angstrom."""
    assert name_of(26) == "iron"
    assert covalent_radius(6) == pytest.approx(0.76)
    assert covalent_radius(26) == pytest.approx(1.32)
    assert covalent_radius(110) is None
