"""ground_levels.csv and usual_charges.csv: every row sourced, whole and possible."""

from collections import Counter

import pytest

from checker import tables
from checker.chemistry.shells import electrons_in, open_subshells, parse_configuration, without_n
from checker.chemistry.terms import has_level, hund_ground_level, parse_level
from checker.elements import MAX_ATOMIC_NUMBER, symbol_of

ROWS = tables.read_rows("ground_levels.csv")
LEVELS = list(tables.ground_levels().values())
SETTLED = [row for row in LEVELS if row.configuration]
SOURCES = {
    "NIST ground levels",
    "NIST ASD",
    "Blaise & Wyart 1992",
    "Andersen 1999",
    "superheavy calculations",
    "affinity measured 2020",
    "anion photoelectron spectra",
}


def ion_id(row: tables.GroundLevelRow) -> str:
    return f"{row.symbol}{row.charge:+d}"


def test_no_atom_of_a_charge_stands_twice() -> None:
    assert [key for key, n in Counter((row["z"], row["charge"]) for row in ROWS).items() if n > 1] == []
    assert len(ROWS) == len(LEVELS) > 400


@pytest.mark.parametrize("charge", [0, 1])
def test_every_neutral_atom_and_singly_charged_cation_is_stored(charge: int) -> None:
    first = 1 + charge  # a bare proton has no level
    stored = {row.z for row in SETTLED if row.charge == charge}
    assert stored == set(range(first, MAX_ATOMIC_NUMBER + 1))


def test_every_row_names_its_symbol_basis_and_source() -> None:
    for row in LEVELS:
        assert row.symbol == symbol_of(row.z), row
        assert row.basis in {"measured", "predicted", "disputed"}, row
        assert row.source in SOURCES, row


@pytest.mark.parametrize("row", SETTLED, ids=ion_id)
def test_electrons_sum_to_nuclear_charge_less_charge(row: tables.GroundLevelRow) -> None:
    assert electrons_in(parse_configuration(row.configuration)) == row.z - row.charge


@pytest.mark.parametrize("row", [row for row in SETTLED if row.level[0].isdigit() or row.leading_term], ids=ion_id)
def test_the_configuration_has_the_level(row: tables.GroundLevelRow) -> None:
    level = parse_level(row.leading_term or row.level)
    assert has_level(without_n(parse_configuration(row.configuration)), level)


@pytest.mark.parametrize("row", [row for row in SETTLED if row.leading_term], ids=ion_id)
def test_the_leading_term_has_the_j_and_parity_of_the_level(row: tables.GroundLevelRow) -> None:
    """A jj name ends in parity and J: (9/2,1/2)*4."""
    parity_and_j = row.level.partition(")")[2]
    leading = parse_level(row.leading_term)
    assert leading.name.endswith(parity_and_j)
    assert leading.term.odd == ("*" in parity_and_j)


def test_where_one_shell_is_open_the_level_is_that_of_hunds_rules() -> None:
    """Hund's three rules hold for every ground level of a single open shell in the table."""
    checked = 0
    for row in SETTLED:
        still_open = without_n(open_subshells(parse_configuration(row.configuration)))
        if len(still_open) != 1 or not row.level[0].isdigit():
            continue
        checked += 1
        assert row.level == hund_ground_level(*still_open[0]).name, row
    assert checked > 200


def test_an_unbound_ion_has_no_level_and_a_reason() -> None:
    unbound = [row for row in LEVELS if not row.bound]
    assert len(unbound) > 10
    for row in unbound:
        assert (row.configuration, row.level) == ("", ""), row
        assert row.charge == -1 and row.note, row


def test_usual_charges_name_their_symbol_and_do_not_repeat() -> None:
    for row in tables.read_rows("usual_charges.csv"):
        charges = row["charges"].split()
        assert row["symbol"] == symbol_of(int(row["z"]))
        assert charges and len(set(charges)) == len(charges) and "0" not in charges, row
    assert len(tables.usual_charges()) > 100
