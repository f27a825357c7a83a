"""From the text of a deck to plain tables, lists and values, by the language's own parser."""

import json
import re
import tomllib
from typing import Any, NoReturn

from checker.errors import UnreadableInput
from checker.reading.faults import complaint
from checker.reading.kinds import Kind
from checker.reading.outline import Outline
from checker.reading.places import DeckPlaces
from checker.reading.positions import place_in
from checker.reading.words import printable, quoted, shortened
from checker.source import Span

NESTED_TOO_DEEP = "lists or tables are nested too deep to be read; a deck needs no more than four levels"
INTEGER_TOO_LONG = "a whole number has too many digits to be read; the keys of a deck take at most 18"
NOT_A_TABLE = "a JSON deck is an object of tables, so it must begin with { and end with }"

DEEPEST_SHOWN = 100
LONGEST_NUMBER = 70

_BRACKET = re.compile(r"[\[\]{}]")
_PLACE = re.compile(r" \(at (?:line (\d+), column (\d+)|end of document)\)$")
_LONG_INTEGER = re.compile(r"[0-9][0-9_]{4299,}")
_FORTRAN = re.compile(r"(?<![\w.\"'])[+-]?[0-9]{1,30}(?:\.[0-9]{0,30})?[dD][+-]?[0-9]{1,4}(?![\w.])")
_TWICE = ("Cannot overwrite", "Cannot declare", "Duplicate inline", "Cannot mutate", "Cannot redefine")

# what tomllib says, and what that means for the author of a deck
_TOML_SENTENCES = {
    "Invalid statement": "no line of a deck begins like this; write key = value, [table] or # comment",
    "Expected newline": "something follows the value; each key needs a line of its own, and text needs quotes",
    "Expected '='": "a key stands here without = and a value; write key = value, or # before a comment",
    "Expected ']'": "a table header is not closed; write [table]",
    "Expected ']]'": "a table header is not closed; write [[table]]",
    "Invalid initial character": "a key is missing here; write key = value, and a key with other characters than "
    "letters, digits, - and _ in quotes",
    "Unclosed array": "a list is not closed here; put a comma between its items and ] at its end",
    "Unclosed inline table": "a table in braces is not closed here; put a comma between its keys and } at its end",
    "Unescaped '\\'": "a backslash in double quotes begins no known escape; put the text in single quotes",
    "Invalid hex value": "an escape in this text lacks hexadecimal digits; put the text in single quotes",
    "Escaped character": "an escape in this text names no character; put the text in single quotes",
    "Unterminated string": "a text in quotes is not closed; put the same quote at its end",
    'Expected "\'"': "a text in single quotes is not closed on its line; put a single quote at its end",
    "Expected '\"'": "a text in double quotes is not closed on its line; put a double quote at its end",
    "Expected": "a text in quotes is not closed; put the same quotes at its end",
    "Invalid date": "no such date exists; write it as 2027-06-30",
}

# what json says, likewise
_JSON_SENTENCES = {
    "Expecting value": "a value is missing here; write a number, true, false, null, a list, an object or text in "
    "double quotes",
    "Expecting ',' delimiter": "a comma or a closing bracket is missing before this place",
    "Expecting ':' delimiter": "a colon is missing between key and value before this place",
    "Expecting property name": "a key in double quotes is missing here; no comma may stand after the last one",
    "Illegal trailing comma": "a comma stands after the last item; remove it",
    "Extra data": "the deck has ended before this place; remove what follows its closing }",
    "Invalid control character": "a line end, a tab or another control character stands inside a text; write it "
    "as an escape such as \\n",
    "Unterminated string": "a text that begins here is not closed; put a double quote at its end",
    "Invalid \\escape": "a backslash begins an escape that JSON does not have; write two backslashes",
    "Invalid \\uXXXX": "an escape \\u needs four hexadecimal digits",
}
_NO_SENTENCE = (
    "the text cannot be read as {kind} from here on; compare the line with the worked deck in the manual"
)


def mapping_of(places: DeckPlaces) -> dict[str, Any]:
    """Return the deck as plain tables; raise UnreadableInput at the place where its language is broken."""
    try:
        found = _toml(places) if places.kind is Kind.TOML else _json(places)
    except RecursionError:
        _refuse(places, NESTED_TOO_DEEP, *place_in(places.text, _where_too_deep(places.text)))
    except ValueError:  # the one left: int() refuses thousands of digits
        long = _LONG_INTEGER.search(places.text)
        _refuse(places, INTEGER_TOO_LONG, *place_in(places.text, long.start() if long else 0))
    if not isinstance(found, dict):
        _refuse(places, NOT_A_TABLE, 1, 1)
    return found


def _where_too_deep(text: str) -> int:
    """Return where brackets are first nested beyond all need; those inside texts are counted along."""
    depth = 0
    for bracket in _BRACKET.finditer(text):
        depth += 1 if bracket[0] in "[{" else -1
        if depth > DEEPEST_SHOWN:
            return bracket.start()
    return 0


def _toml(places: DeckPlaces) -> dict[str, Any]:
    try:
        return tomllib.loads(places.text)
    except tomllib.TOMLDecodeError as error:
        _refuse_toml(places, str(error))


def _refuse_toml(places: DeckPlaces, said: str) -> NoReturn:
    at = _PLACE.search(said)
    if at and at[1]:
        line, column = int(at[1]), int(at[2])
    else:
        line, column = place_in(places.text, len(places.text.rstrip()))
    if said.startswith(_TWICE):
        _refuse_twice(places, line, column)
    if said.startswith("Invalid value"):
        _refuse(places, _no_toml_value(places.text, line, column), line, column)
    fortran = _fortran_number(_line(places.text, line), column)
    if fortran:
        _refuse(places, fortran, line, column)
    if said.startswith(("Illegal character", "Found invalid character")):
        _refuse(places, _stray_character(said), line, column)
    _refuse(places, _sentence(said, _TOML_SENTENCES, "TOML"), line, column)


def _line(text: str, line: int) -> str:
    """Return a line as tomllib counts them, which is not by a lone CR; nothing where it is beyond the last."""
    lines = text.replace("\r\n", "\n").split("\n")
    return lines[line - 1] if line <= len(lines) else ""


def _no_toml_value(text: str, line: int, column: int) -> str:
    rest = _line(text, line)[column - 1 :]
    word = re.split(r"[\s,#\]}]", rest, maxsplit=1)[0]
    if not word:
        return "a value is missing here; write a number, true, false, a list, or text in quotes"
    return (
        f"{quoted(word)} is no value; put text in quotes, write numbers plainly, and true or false in lower case"
    )


def _fortran_number(text: str, column: int) -> str | None:
    """Return what to write for a number with the exponent letter of Fortran, where reading stopped at that.

    `column`, from 1, is where it stopped.
    """
    number = next((n for n in _FORTRAN.finditer(text) if n.start() < column <= n.end() + 1), None)
    if number is None:
        return None
    in_e = re.sub("[dD]", "e", number[0].replace(".d", ".0d").replace(".D", ".0d"))
    return f"{quoted(number[0])} has the exponent letter of Fortran, which only XYZ files may have; write {in_e}"


def _stray_character(said: str) -> str:
    written = re.search(r"character ('.*?'|\".*?\") \(", said)
    if written and written[1] == r"'\n'":
        return "a text in quotes is not closed on its line; put the same quote at its end"
    character = printable(written[1]) if written else "here"
    return f"the character {character} may not stand here; remove it, or write it as an escape in double quotes"


def _json(places: DeckPlaces) -> Any:
    try:
        found = json.loads(places.text, object_pairs_hook=_once, parse_constant=_no_constant)
    except json.JSONDecodeError as error:
        place = place_in(places.text, error.pos)
        before = max(error.pos - LONGEST_NUMBER, 0)
        near = places.text[before : error.pos + LONGEST_NUMBER]
        fortran = _fortran_number(near, error.pos - before + 1)
        _refuse(places, fortran or _sentence(error.msg, _JSON_SENTENCES, "JSON"), *place)
    except _Twice:
        _refuse_twice(places, 1, 1)
    except _NoConstant as constant:
        at = re.search(rf"(?<![\w\"]){re.escape(constant.name)}\b", places.text)
        place = place_in(places.text, at.start() if at else 0)
        _refuse(places, f"{constant.name} is no number that JSON or a deck knows; write a finite number", *place)
    if r"\ud" in places.text.lower():
        _refuse_half_characters(found, places)
    return found


class _Twice(Exception):
    """An object of a JSON text has a key twice."""


class _NoConstant(Exception):
    """A JSON text holds NaN or an infinity."""

    def __init__(self, name: str) -> None:
        super().__init__(name)
        self.name = name


def _once(pairs: list[tuple[str, Any]]) -> dict[str, Any]:
    table = dict(pairs)
    if len(table) < len(pairs):
        raise _Twice
    return table


def _no_constant(name: str) -> NoReturn:
    raise _NoConstant(name)


def _refuse_half_characters(found: Any, places: DeckPlaces) -> None:
    """Refuse half of a surrogate pair, which no report could print."""
    try:
        json.dumps(found, ensure_ascii=False).encode()
    except UnicodeEncodeError:
        offset = places.text.lower().index(r"\ud")
        message = "an escape \\uD... stands without its second half; write the character itself"
        _refuse(places, message, *place_in(places.text, offset))


def _refuse_twice(places: DeckPlaces, line: int, column: int) -> NoReturn:
    twice = Outline(places.text.encode(), places.kind).first_twice()
    if twice is None:
        message = "this key or table has been given before; keep one of the two"
        _refuse(places, message, line, column)
    at, before = places.span(twice.second), places.span(twice.first)
    message = f"{shortened(twice.name)} has been given before, on line {before.line}; keep one of the two"
    raise UnreadableInput(complaint(at, message))


def _sentence(said: str, sentences: dict[str, str], kind: str) -> str:
    for beginning in sorted(sentences, key=len, reverse=True):
        if said.startswith(beginning):
            return sentences[beginning]
    return _NO_SENTENCE.format(kind=kind)


def _refuse(places: DeckPlaces, message: str, line: int, column: int) -> NoReturn:
    raise UnreadableInput(complaint(Span(places.file, line, column), message))
