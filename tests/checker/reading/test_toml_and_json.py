"""Decks in TOML and JSON: what is said of a broken one, word for word, and where."""

import pytest
from decks_as_text import ATOMS, HEAD, complaints, one_deck

from checker.reading.positions import place_in

NOT_A_VALUE = "is no value; put text in quotes, write numbers plainly, and true or false in lower case"
UNCLOSED_LINE = "a text in quotes is not closed on its line; put the same quote at its end"
NO_VALUE_IN_JSON = (
    "a value is missing here; write a number, true, false, null, a list, an object or text in double quotes"
)
FORTRAN = "has the exponent letter of Fortran, which only XYZ files may have; write"
NEEDS_A_LINE = "something follows the value; each key needs a line of its own, and text needs quotes"
NO_EQUALS = "a key stands here without = and a value; write key = value, or # before a comment"
TOO_DEEP = "lists or tables are nested too deep to be read; a deck needs no more than four levels"
TOO_MANY_DIGITS = "a whole number has too many digits to be read; the keys of a deck take at most 18"
KEY_MISSING = "a key in double quotes is missing here; no comma may stand after the last one"


@pytest.mark.parametrize(
    ("text", "line", "column", "message"),
    [
        pytest.param("x = CCSD(T)", 1, 5, f"'CCSD(T)' {NOT_A_VALUE}", id="text-without-quotes"),
        pytest.param("x = 1.0D+00", 1, 8, f"'1.0D+00' {FORTRAN} 1.0e+00", id="fortran-exponent"),
        pytest.param("x = [-1.d0]", 1, 8, f"'-1.d0' {FORTRAN} -1.0e0", id="fortran-exponent-in-a-list"),
        pytest.param("x = True", 1, 5, f"'True' {NOT_A_VALUE}", id="capital-true"),
        pytest.param(
            "x =",
            1,
            4,
            "a value is missing here; write a number, true, false, a list, or text in quotes",
            id="no-value",
        ),
        pytest.param("é = 1", 1, 1, None, id="bare-key-of-other-letters"),
        pytest.param("x", 1, 2, NO_EQUALS, id="no-equals-sign"),
        pytest.param("charge 0", 1, 8, NO_EQUALS, id="blank-for-equals-sign"),
        pytest.param("= 1", 1, 1, "no line of a deck begins like this; write key = value, [table] or # comment"),
        pytest.param("[a", 1, 3, "a table header is not closed; write [table]", id="open-header"),
        pytest.param("[[a]", 1, 4, "a table header is not closed; write [[table]]", id="open-double-header"),
        pytest.param(
            "\nx = [1",
            2,
            7,
            "a list is not closed here; put a comma between its items and ] at its end",
            id="list",
        ),
        pytest.param('x = "a\n"', 1, 7, UNCLOSED_LINE, id="open-text"),
        pytest.param("x = 1 2", 1, 7, NEEDS_A_LINE, id="two-values"),
        pytest.param('"é" = 1 "ü" = 2', 1, 9, NEEDS_A_LINE, id="columns-in-characters"),
        pytest.param(
            "x = 1\nx = 2", 2, 1, "x has been given before, on line 1; keep one of the two", id="key-twice"
        ),
        pytest.param(
            "[a]\n[b]\n[a]", 3, 2, "a has been given before, on line 1; keep one of the two", id="table-twice"
        ),
        pytest.param(
            "a = {b = 1, b = 2}",
            1,
            13,
            "b has been given before, on line 1; keep one of the two",
            id="inline-twice",
        ),
        pytest.param("x = " + "[" * 20_000, 1, 105, TOO_DEEP, id="20000-brackets"),
        pytest.param("a = 1\nx = " + "9" * 5_000, 2, 5, TOO_MANY_DIGITS, id="5000-digits"),
        pytest.param(
            r'x = "C:\q"',
            1,
            10,
            "a backslash in double quotes begins no known escape; put the text in single quotes",
            id="backslash",
        ),
    ],
)
def test_error_in_toml(text: str, line: int, column: int, message: str | None) -> None:
    (complaint,) = complaints(text, "a.deck.toml")
    assert (complaint.line, complaint.column) == (line, column)
    if message:
        assert complaint.message == message


@pytest.mark.parametrize(
    ("text", "line", "column", "message"),
    [
        pytest.param("[1]", 1, 1, "a JSON deck is an object of tables, so it must begin with { and end with }"),
        pytest.param("{", 1, 2, KEY_MISSING, id="open-object"),
        pytest.param('{"a": 1,}', 1, 9, KEY_MISSING, id="comma-after-the-last"),
        pytest.param(
            '{"a": 1, "b": {"c": 1,\n"c": 2}}',
            2,
            1,
            "c has been given before, on line 1; keep one of the two",
            id="key-twice",
        ),
        pytest.param('{"é": NaN}', 1, 7, "NaN is no number that JSON or a deck knows; write a finite number"),
        pytest.param(
            '{"a": "NaN", "b": -Infinity}',
            1,
            19,
            "-Infinity is no number that JSON or a deck knows; write a finite number",
            id="infinity",
        ),
        pytest.param('{"a": ' + "9" * 5_000 + "}", 1, 7, TOO_MANY_DIGITS, id="5000-digits"),
        pytest.param('{"a": ' + "[" * 200_000, 1, 106, TOO_DEEP, id="200000-brackets"),
        pytest.param('{"a": [0,\r1.5D-3]}', 2, 4, f"'1.5D-3' {FORTRAN} 1.5e-3", id="fortran-exponent"),
        pytest.param("\r\x01", 2, 1, NO_VALUE_IN_JSON, id="lone-carriage-return"),
        pytest.param('{"a" 1}', 1, 6, "a colon is missing between key and value before this place", id="no-colon"),
        pytest.param(
            '{"a": 1} x',
            1,
            10,
            "the deck has ended before this place; remove what follows its closing }",
            id="tail",
        ),
        pytest.param(
            '{"a": "\\ud800"}',
            1,
            8,
            "an escape \\uD... stands without its second half; write the character itself",
            id="half-a-character",
        ),
    ],
)
def test_error_in_json(text: str, line: int, column: int, message: str) -> None:
    (complaint,) = complaints(text, "a.deck.json")
    assert (complaint.line, complaint.column, complaint.message) == (line, column, message)


@pytest.mark.parametrize(
    ("raw", "line", "column", "message"),
    [
        pytest.param(
            b"",
            None,
            None,
            "the file is empty; a deck holds at least deck_version and [species], an XYZ file at least one frame",
            id="empty",
        ),
        pytest.param(
            HEAD.encode("utf-16"),
            None,
            None,
            "the file is encoded in UTF-16, but must be in UTF-8; save it again as UTF-8",
            id="utf-16",
        ),
        pytest.param(
            HEAD.encode("utf-16-be"),
            None,
            None,
            "the file is encoded in UTF-16, but must be in UTF-8; save it again as UTF-8",
            id="utf-16-without-mark",
        ),
        pytest.param(
            HEAD.encode("utf-32"),
            None,
            None,
            "the file is encoded in UTF-32, but must be in UTF-8; save it again as UTF-8",
            id="utf-32",
        ),
        pytest.param(
            "title = 'é'\nx = '".encode() + b"\xe9'",
            2,
            6,
            "the byte 0xE9 is not UTF-8 text; save the file again as UTF-8",
            id="latin-1",
        ),
        pytest.param(
            b"x = 1\ny\0",
            2,
            2,
            "a NUL byte stands here, so the file is binary or damaged; a deck is plain text in UTF-8",
            id="nul",
        ),
    ],
)
@pytest.mark.parametrize("name", ["a.deck.toml", "a.deck.json"])
def test_error_in_encoding(raw: bytes, line: int | None, column: int | None, message: str, name: str) -> None:
    (complaint,) = complaints(raw, name)
    assert (complaint.line, complaint.column, complaint.message) == (line, column, message)


def test_error_too_large() -> None:
    (complaint,) = complaints(b"#" * (64 * 1024**2 + 1), "a.deck.toml")
    assert complaint.message == (
        "the deck is larger than 64 MiB, the most that is read of one; "
        "put the atoms into an XYZ file and name it in species.geometry"
    )


def test_a_byte_order_mark_moves_no_column() -> None:
    text = "\ufeff" + HEAD + ATOMS
    assert one_deck(text).job.species.charge == 0
    (complaint,) = complaints("\ufeffx = ?", "a.deck.toml")
    assert (complaint.line, complaint.column) == (1, 5)


def test_line_ends_of_all_systems_count_once() -> None:
    assert place_in("a\r\nb\rc\nd", 7) == (4, 1)
