"""core_potentials.csv: every row sourced, counts possible, names unambiguous, file small."""

from importlib.resources import files

from checker import tables
from checker.chemistry.core_potentials import _plain

ROWS = tables.core_potentials()


def test_every_row_is_sourced_and_the_file_small() -> None:
    assert all(row.source.startswith("basis_set_exchange") or row.source.endswith("from memory") for row in ROWS)
    assert len(files(tables).joinpath("core_potentials.csv").read_bytes()) < 100_000


def test_a_core_leaves_an_electron_and_is_even_unless_it_holds_f_electrons() -> None:
    for row in ROWS:
        for z, electrons in row.replaced.items():
            assert 0 <= electrons < z, (row.names, z)
            assert electrons % 2 == 0 or row.below_open_f is not None, (row.names, z)


def test_f_in_core_holds_0_to_14_f_electrons() -> None:
    held = [row for row in ROWS if row.below_open_f is not None]
    assert len(held) >= 9
    for row in held:
        for z, electrons in row.replaced.items():
            assert row.below_open_f is not None
            assert 0 <= electrons - row.below_open_f <= 14, (row.names, z)


def test_two_sets_never_share_a_name_as_people_write_it() -> None:
    """A name may stand in two rows, if it is the same set with other elements."""
    written: dict[str, str] = {}
    covered: dict[str, set[int]] = {}
    for row in ROWS:
        for name in row.names:
            assert written.setdefault(_plain(name), name) == name
            assert not covered.setdefault(name, set()) & set(row.replaced), name
            covered[name] |= set(row.replaced)
    assert len(covered) > 600
