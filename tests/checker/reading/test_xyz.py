"""XYZ files: what is read, what is said of a broken frame, and that the other frames survive."""

# sentences stand whole where they can, so that a search finds them
# ruff: noqa: E501

import numpy as np
import pytest
from decks_as_text import FRAME, one_deck, read, said

from checker.deck import Deck, UnreadableDeck

REST = "; the rest of the file was not read"
COUNT = "correct the count or the rows"


def verdicts(text: str | bytes) -> list[tuple[str, bool]]:
    """Return the name of each frame and whether it could be read."""
    return [(item.name, isinstance(item, Deck)) for item in read(text, "a.xyz")]


@pytest.mark.parametrize(
    "text",
    [
        pytest.param(FRAME, id="plain"),
        pytest.param(FRAME.rstrip("\n"), id="no-last-line-end"),
        pytest.param(FRAME.replace("\n", "\r\n"), id="crlf"),
        pytest.param(FRAME.replace("\n", "\r"), id="lone-cr"),
        pytest.param("\ufeff" + FRAME, id="byte-order-mark"),
        pytest.param("\n \n" + FRAME + "\n\n", id="blank-lines"),
        pytest.param(FRAME.replace(" 0 0 0\n", "\t0.0D+00\f0d0\t-0.0\n"), id="tabs-and-fortran-exponents"),
        pytest.param(FRAME.replace("O ", "8 ").replace("H", "h"), id="atomic-number-and-case"),
        pytest.param(FRAME.replace("0.96\n", "0.96 0.1 water 7\n"), id="extra-columns"),
        pytest.param(FRAME.replace("charge=0", 'note="charge=9" CHARGE = "0.0"'), id="quotes-and-case"),
        pytest.param(FRAME.replace("charge=0", "charge unknown, total_charge=4 charge=+0"), id="charge-in-prose"),
    ],
)
def test_reads_one_frame(text: str) -> None:
    species = one_deck(text, "a.xyz").job.species
    assert (species.charge, species.multiplicity) == (0, 2)
    assert species.atoms.numbers.tolist() == [8, 1]
    np.testing.assert_array_equal(species.atoms.coordinates, [[0, 0, 0], [0, 0, 0.96]])


def test_properties_tell_the_columns() -> None:
    text = '1\nProperties=id:I:1:species:S:1:forces:R:3:pos:R:3 Lattice="4 0 0 0 5 0 0 0 6" pbc="T T F" charge=1\n'
    deck = one_deck(text + "7 Na 9 9 9 1 2 3\n", "a.xyz")
    assert deck.job.species.atoms.coordinates.tolist() == [[1, 2, 3]]
    assert deck.job.species.atoms.lattice == (4, 0, 0, 0, 5, 0, 0, 0, 6)
    assert [*(deck.job.species.atoms.periodic or ())] == [True, True, False]
    assert (deck.places.find("species.atoms[0]").line, deck.places.find("species.atoms[0]").column) == (3, 3)


def test_properties_may_give_atomic_numbers() -> None:
    deck = one_deck("1\nProperties=pos:R:3:Z:I:1 charge=0\n1 2 3 26\n", "a.xyz")
    assert deck.job.species.atoms.numbers.tolist() == [26]


@pytest.mark.parametrize(
    ("text", "expected"),
    [
        pytest.param("x\n", [(1, 1, f"expected the number of atoms alone on this line, found 'x'{REST}")]),
        pytest.param("-3\n", [(1, 1, f"expected the number of atoms alone on this line, found '-3'{REST}")]),
        pytest.param("0\n\n", [(1, 1, "the count line says 0 atoms; a frame needs at least one")]),
        pytest.param(
            "3\n", [(1, 1, "the file ends after the number of atoms; a comment line and the atoms must follow")]
        ),
        pytest.param(
            "1000000000000\n\n",
            [(1, 1, f"the count line says 1000000000000 atoms, but at most 2,000,000 a frame are read{REST}")],
            id="more-atoms-than-memory",
        ),
        pytest.param(
            FRAME.replace("2\n", "3\n", 1),
            [(1, 1, f"the count line says 3 atoms, but 2 rows of atoms follow; {COUNT}")],
        ),
        pytest.param(
            FRAME.replace("2\n", "1\n", 1),
            [(1, 1, f"the count line says 1 atom, but 2 rows of atoms follow; {COUNT}")],
        ),
        pytest.param(
            FRAME.replace("O 0 0 0", "  Fe3+ 0 nan 1_0"),
            [
                (
                    3,
                    3,
                    "'Fe3+' is the element Fe with a label or charge; write Fe alone, as atoms are numbered in the "
                    "order they stand and the charge is said in species.charge; y is 'nan', but must be a finite "
                    "number; z is '1_0', but must be a number",
                )
            ],
            id="all-faults-of-a-row",
        ),
        pytest.param(
            FRAME.replace("O 0 0 0", "O 0 0"),
            [(3, 1, "the row of this atom has 3 columns, but needs 4: element, x, y, z")],
        ),
        pytest.param(
            FRAME.replace("charge=0", "é charge=1.5"),
            [(2, 3, "charge on the comment line is '1.5', but must be a whole number, such as charge=1")],
            id="half-a-charge-column-in-characters",
        ),
        pytest.param(
            FRAME.replace("charge=0", "charge=2-"),
            [(2, 1, "charge on the comment line is '2-', but must be a whole number; write charge=-2")],
        ),
        pytest.param(
            FRAME.replace("charge=0", "charge=0 charge=1"),
            [(2, 10, "the comment line says charge=0 and charge=1; keep one of the two")],
        ),
        pytest.param(
            FRAME.replace("charge=0", 'charge=0 Lattice="1 2"'),
            [(2, 10, "Lattice on the comment line is '1 2', but must be nine numbers in quotes")],
        ),
        pytest.param(
            FRAME.replace("charge=0", 'charge=0 pbc="T T"'),
            [(2, 10, "pbc on the comment line is 'T T', but must be three flags in quotes, such as \"F F F\"")],
        ),
        pytest.param(
            FRAME.replace("charge=0", "charge=0 Properties=species:S:1"),
            [
                (
                    2,
                    10,
                    "Properties on the comment line is 'species:S:1', but must name the columns, with species:S:1 or "
                    "Z:I:1 and pos:R:3 among them, such as Properties=species:S:1:pos:R:3",
                )
            ],
        ),
        pytest.param(
            FRAME.replace("charge=0 ", ""),
            [
                (
                    2,
                    1,
                    "the frame states no charge; write charge=0 (the total charge) on this comment line, or give "
                    "--charge 0",
                )
            ],
        ),
        pytest.param(
            "2\n" + "x" * 70_000,
            [(2, 1, f"the line is longer than 64 KiB, the most that is read of one{REST}")],
            id="endless-line",
        ),
        pytest.param(
            FRAME.encode().replace(b"O 0", b"O \0"),
            [
                (
                    3,
                    3,
                    f"a NUL byte stands here, so the file is binary or damaged; a deck is plain text in UTF-8{REST}",
                )
            ],
            id="nul",
        ),
        pytest.param(
            FRAME.encode().replace(b"O", b"\xc5"),
            [(3, 1, "the byte 0xC5 is not UTF-8 text; save the file again as UTF-8")],
            id="latin-1",
        ),
        pytest.param(
            FRAME.replace("O", "\u017f"),
            [(3, 1, "'\u017f' is no element; the nearest is S")],
            id="long-s",
        ),
        pytest.param(
            FRAME.encode("utf-16-le"),
            [(None, None, "the file is encoded in UTF-16, but must be in UTF-8; save it again as UTF-8")],
            id="utf-16",
        ),
    ],
)
def test_error_in_a_frame(text: str | bytes, expected: list[tuple[int | None, int | None, str]]) -> None:
    assert said(text, "a.xyz") == expected


@pytest.mark.parametrize(
    ("broken", "goes_on"),
    [
        pytest.param(FRAME.replace("H", "Xx"), True, id="unknown-element"),
        pytest.param(FRAME.replace("2\n", "3\n", 1), True, id="too-few-rows"),
        pytest.param(FRAME.replace("2\n", "1\n", 1), True, id="too-many-rows"),
        pytest.param(FRAME.replace("O 0 0 0\n", "O 0 0 0\n\n"), True, id="blank-line-among-the-rows"),
        pytest.param("garbage\n", False, id="no-count-line"),
        pytest.param("2\n" + "x" * 70_000 + "\n", False, id="endless-line"),
    ],
)
def test_a_broken_frame_does_not_lose_the_others(broken: str, goes_on: bool) -> None:
    found = verdicts(FRAME + broken + FRAME)
    assert found == [("a.xyz#1", True), ("a.xyz#2", False), ("a.xyz#3", True)][: 3 if goes_on else 2]
    broken_frame = read(FRAME + broken + FRAME, "a.xyz")[1]
    assert isinstance(broken_frame, UnreadableDeck)
    assert broken_frame.complaints[-1].message.endswith(REST) is not goes_on


def test_error_many_rows_are_cut_short_at_twenty() -> None:
    found = said("30\ncharge=0\n" + "zz 0 0 0\n" * 30, "a.xyz")
    assert len(found) == 21
    assert found[-1][2] == "and 10 more rows of this frame; mend the first ones and check again"


def test_a_frame_of_several_blocks_reads_like_a_small_one(monkeypatch: pytest.MonkeyPatch) -> None:
    from checker.reading import xyz

    whole = one_deck("7\ncharge=0\n" + "".join(f"C {i} 0 0\n" for i in range(7)), "a.xyz")
    monkeypatch.setattr(xyz, "BLOCK_ROWS", 3)
    parts = one_deck("7\ncharge=0\n" + "".join(f"C {i} 0 0\n" for i in range(7)), "a.xyz")
    np.testing.assert_array_equal(parts.job.species.atoms.coordinates, whole.job.species.atoms.coordinates)


def test_places_of_a_frame() -> None:
    _, second = read(FRAME + "\n" + FRAME.replace("O", "  O").replace("charge", "ü charge"), "a.xyz")
    assert isinstance(second, Deck)
    places = {
        key: (second.places.find(key).line, second.places.find(key).column)
        for key in (
            "species.charge",
            "species.multiplicity",
            "species.atoms[0]",
            "species.atoms[1]",
            "species.atoms",
        )
    }
    assert places == {
        "species.charge": (7, 3),
        "species.multiplicity": (7, 12),
        "species.atoms[0]": (8, 3),
        "species.atoms[1]": (9, 1),
        "species.atoms": (6, 1),
    }
