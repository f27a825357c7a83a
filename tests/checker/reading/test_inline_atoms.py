"""Atoms written in the deck."""

import numpy as np
import pytest
from decks_as_text import HEAD, complaints, one_deck, said

LABELS = ", as atoms are numbered in the order they stand and the charge is said in species.charge"
GHOST = "write the element whose basis functions it carries, and its number in ghost_atoms"


def test_symbols_in_any_case_isotopes_and_atomic_numbers() -> None:
    atoms = one_deck(
        HEAD + 'atoms = [["FE", 0, 0, 0], ["cl", 1, 0, 0], ["D", 2, 0, 0], ["t", 3, 0, 0], [8, 4, 0, 0]]'
    )
    assert atoms.job.species.atoms.numbers.tolist() == [26, 17, 1, 1, 8]
    assert atoms.job.species.atoms.mass_numbers.tolist() == [0, 0, 2, 3, 0]


def test_lengths_in_bohr_become_angstrom() -> None:
    """CODATA 2022: one bohr is 0.529177210544(82) angstrom."""
    deck = one_deck(HEAD + 'length_unit = "bohr"\natoms = [["H", 0, 0, 0], ["H", 0, 0, 2]]')
    np.testing.assert_allclose(deck.job.species.atoms.coordinates[1], [0, 0, 1.058354421088], rtol=1e-12)


@pytest.mark.parametrize(
    ("row", "message"),
    [
        ('["C1", 0, 0, 0]', f"'C1' is the element C with a label or charge; write C alone{LABELS}"),
        ('["Fe2+", 0, 0, 0]', f"'Fe2+' is the element Fe with a label or charge; write Fe alone{LABELS}"),
        ('["FE3", 0, 0, 0]', f"'FE3' is the element Fe with a label or charge; write Fe alone{LABELS}"),
        ('["X", 0, 0, 0]', f"'X' is no element; {GHOST}"),
        ('["Xx", 0, 0, 0]', f"'Xx' is no element; {GHOST}"),
        ('["ghost-O", 0, 0, 0]', f"'ghost-O' is no element; {GHOST}"),
        ("[0, 0, 0, 0]", f"no element has the atomic number 0; {GHOST}"),
        ('["13C", 0, 0, 0]', "'13C' names an isotope; write C, as only D and T are known by mass"),
        ('["carbon", 0, 0, 0]', "'carbon' is no element; the nearest is C"),
        ('["Sx", 0, 0, 0]', "'Sx' is no element; the nearest is S"),
        ('["zzz", 0, 0, 0]', "'zzz' is no element; write its symbol or its atomic number"),
        ('["\u017f", 0, 0, 0]', "'\u017f' is no element; the nearest is S"),
        ('["", 0, 0, 0]', "'' is no element; write its symbol or its atomic number"),
        ("[119, 0, 0, 0]", "no element has the atomic number 119; they run from 1 to 118"),
        ("[true, 0, 0, 0]", "the element is true, but must be a symbol in quotes or an atomic number"),
        ("[1.0, 0, 0, 0]", "the element is 1.0, but must be a symbol in quotes or an atomic number"),
        ('["H", true, 0, 0]', "x is true, but must be a number"),
        ('["H", 0, "1.0", 0]', "y is the text '1.0', but must be a number; write 1.0, without quotes"),
        ('["H", 0, 0, nan]', "z is nan, but must be a finite number"),
        ('["H", -inf, 0, 0]', "x is -inf, but must be a finite number"),
        ('["H", 0, 1e7, 0]', "y is 10000000.0, beyond 1,000,000 angstrom; correct the number"),
        (
            f'["H", 0, 1{"0" * 400}, 0]',
            "y is a whole number of more than 18 digits, beyond 1,000,000 angstrom; correct the number",
        ),
        ('["H", 0, 0]', 'the row of this atom has 3 items, but must have 4; a row is ["O", x, y, z]'),
        ("3", 'the row of this atom is 3, but must be a list; a row is ["O", x, y, z]'),
    ],
)
def test_error_in_a_row(row: str, message: str) -> None:
    text = f'{HEAD}atoms = [\n  ["O", 0, 0, 0],\n  {row},\n]\n'
    assert said(text) == [(6, 3, message)]
    assert complaints(text)[0].key == "species.atoms[1]"


@pytest.mark.parametrize(
    ("value", "message"),
    [
        ("[]", 'species.atoms is empty; a deck needs at least one atom, and a row is ["O", x, y, z]'),
        ("3", 'species.atoms is 3, but must be a list of rows; a row is ["O", x, y, z]'),
    ],
)
def test_error_no_rows(value: str, message: str) -> None:
    assert said(f"{HEAD}atoms = {value}\n") == [(4, 1, message)]


def test_error_many_rows_are_cut_short_at_twenty() -> None:
    found = said(HEAD + "atoms = [\n" + '["Xx", 0, 0, 0],\n' * 1_000 + "]\n")
    assert len(found) == 21
    assert found[-1] == (25, 1, "and 980 more faults in species.atoms; mend the first ones and check again")


def test_all_atoms_may_be_ghosts() -> None:
    assert one_deck(HEAD + 'ghost_atoms = [1]\natoms = [["He", 0, 0, 0]]').job.species.ghost_atoms == (1,)
