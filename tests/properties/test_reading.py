"""Whatever is fed in, reading raises nothing, loses nothing, and says what is wrong in plain words."""

import json
import re
from collections.abc import Iterator
from typing import Any

import numpy as np
from hypothesis import given, settings
from hypothesis import strategies as st

from builders import geometry
from checker.deck import Deck, UnreadableDeck
from checker.geometry import ANGSTROM_PER_BOHR
from checker.reading import FillIn, read_text
from checker.reading.comment import PLAIN_LAYOUT
from checker.reading.kinds import Kind
from checker.reading.known_keys import tables
from checker.reading.lines import LineStream
from checker.reading.places import DeckPlaces
from checker.reading.rows import _read_at_once as _read_rows_at_once
from checker.reading.rows import _sentence_on_row
from checker.reading.shape import build
from checker.reading.xyz_rows import _read_at_once, _read_one_by_one

# a third of what the profile says, as these cases cost more than arbitrary bytes
EXAMPLES = settings().max_examples // 3
NAMES = ("a.deck.toml", "a.deck.json", "a.xyz", "-")
KEYS = (
    "species.charge",
    "species.atoms[1]",
    "fragments[0].atoms[0]",
    "occupations.alpha.A''",
    "nothing.of.it",
    "",
)

TOML = b"""\
deck_version = 1
title = "caf\xc3\xa9"
[species]
charge = 0
multiplicity = 3
atoms = [["O", 0.0, 0.0, 0.6], ["O", 0.0, 0.0, -0.6]]
ghost_atoms = [1]
[occupations]
alpha = { Ag = 3, "A''" = 2 }
[treatment]
frozen_orbitals = { Ag = 1 }
[[fragments]]
atoms = [1, 2]
[[accepted]]
rule = "close-contact"
reason = 'known'
until = 2027-06-30
"""
JSON = b"""{"deck_version": 1, "species": {"charge": 0, "atoms": [["O", 0.0, 0, 6e-1], ["H", 0, 0, 1]]},
 "basis": {"name": "x", "for_element": {"I": "y"}}, "fragments": [{"atoms": [1]}]}"""
XYZ = b"""\
2
charge=0 multiplicity=2 Properties=species:S:1:pos:R:3 Lattice="1 0 0 0 1 0 0 0 1" pbc="F F F"
O 0.0 0.0 0.0
H 0.0D+00 0.0 0.96
1
charge=0
He 0 0 0
"""
SPLINTERS = st.sampled_from(
    [
        b"",
        b"\n",
        b"\r",
        b" ",
        b"\t",
        b"\x00",
        b"[",
        b"]]",
        b"{",
        b"}",
        b'"',
        b"'",
        b"=",
        b"#",
        b"\\",
        b"\\ud800",
        b"-",
        b"nan",
        b"inf",
        b"1e999",
        b"9" * 30,
        b"9" * 5000,
        b"true",
        b"null",
        b"0x",
        b"\xff",
        b"\xef\xbb\xbf",
        b"\xc3\xa9",
        b"atoms",
        b"charge=",
        b"2\n",
        b"[species]\n",
        b'["H", 0, 0, 0],',
        b"[" * 1000,
        b"x" * 70000,
        b"1.0D+00",
    ]
)


@st.composite
def mutated(draw: st.DrawFn) -> bytes:
    """Return a good text with up to four stretches cut out, doubled or replaced by splinters."""
    text = draw(st.sampled_from([TOML, JSON, XYZ]))
    for _ in range(draw(st.integers(1, 4))):
        start = draw(st.integers(0, len(text)))
        end = min(len(text), start + draw(st.sampled_from([0, 1, 2, 5, 20, 100])))
        middle = draw(SPLINTERS | st.just(text[start:end] * 2) | st.binary(max_size=4))
        text = text[:start] + middle + text[end:]
    return text


def check(text: bytes, name: str, fill_in: FillIn) -> None:
    """Insist on what holds for every input."""
    items = list(read_text(text, name=name, fill_in=fill_in))
    assert items
    for item in items:
        if isinstance(item, Deck):
            assert len(item.job.species.atoms) > 0
            assert np.isfinite(item.job.species.atoms.coordinates).all()
            assert all(item.places.find(key).file == name for key in KEYS)
        else:
            _check_complaints(item, name)


def _check_complaints(item: UnreadableDeck, name: str) -> None:
    assert item.complaints
    for complaint in item.complaints:
        assert complaint.file == name
        assert complaint.message
        assert complaint.message.isprintable(), complaint
        own_words = re.sub(r"'.*'", "", complaint.message.replace(complaint.key or " ", ""))  # not the author's
        assert not re.search(r"invalid|pydantic|input should|traceback|<class|\w+Error\b|!", own_words, re.I)
        assert (complaint.line or 1) >= 1
        assert (complaint.column or 1) >= 1


FILL_INS = st.builds(FillIn, charge=st.none() | st.integers(-2, 2), multiplicity=st.none() | st.integers(1, 3))


@given(mutated(), st.sampled_from(NAMES), FILL_INS)
def test_mutated_decks_raise_nothing(text: bytes, name: str, fill_in: FillIn) -> None:
    check(text, name, fill_in)


@given(st.binary(max_size=300), st.sampled_from(NAMES), FILL_INS)
def test_arbitrary_bytes_raise_nothing(text: bytes, name: str, fill_in: FillIn) -> None:
    check(text, name, fill_in)


VALUES: st.SearchStrategy[Any] = st.recursive(
    st.none() | st.booleans() | st.integers() | st.just(10**30) | st.floats() | st.text(max_size=5),
    lambda inner: st.lists(inner, max_size=3) | st.dictionaries(st.text(max_size=5), inner, max_size=3),
    max_leaves=8,
)


@st.composite
def decks_of_wrong_values(draw: st.DrawFn) -> dict[str, Any]:
    """Return a deck with known keys in their tables, and any values."""
    deck: dict[str, Any] = {"deck_version": 1, "species": {"charge": 0, "atoms": [["H", 0, 0, 0]]}}
    for name in draw(st.lists(st.sampled_from(sorted(tables())), min_size=1, max_size=4, unique=True)):
        keys = draw(st.lists(st.sampled_from(tables()[name]), max_size=4, unique=True))
        table = {key: draw(VALUES) for key in keys}
        if name:
            before = deck[name] if isinstance(deck.get(name), dict) else {}
            deck[name] = draw(st.sampled_from([table, [table], {**before, **table}]))
        else:
            deck |= table
    return deck


@settings(max_examples=EXAMPLES)
@given(decks_of_wrong_values())
def test_wrong_values_are_complained_of_in_plain_words(deck: dict[str, Any]) -> None:
    check(json.dumps(deck).replace("NaN", "1").replace("Infinity", "1").encode(), "a.json", FillIn())


@settings(max_examples=EXAMPLES)
@given(decks_of_wrong_values())
def test_every_kind_of_complaint_has_a_sentence_of_its_own(deck: dict[str, Any]) -> None:
    if isinstance(deck["species"], dict):
        deck["species"]["atoms"] = geometry("H")  # atoms are judged before
    built = build(deck)
    assert all("see the manual" not in fault.message for fault in (built if isinstance(built, list) else []))


WORDS = st.from_regex(r"[a-z_][a-z0-9_-]{0,6}", fullmatch=True)
QUOTED = st.text(
    st.characters(codec="utf-8", exclude_categories=("Cc", "Cs"), exclude_characters='"\\.[]'), min_size=1
)


@st.composite
def texts_with_known_places(draw: st.DrawFn) -> tuple[str, dict[str, tuple[int, int]]]:
    """Return a TOML text of tables, keys bare and quoted, and the place where each key was put."""
    lines: list[str] = []
    places: dict[str, tuple[int, int]] = {}
    for table in draw(st.lists(WORDS, min_size=1, max_size=3, unique=True)):
        places[table] = (len(lines) + 1, 2)
        lines.append(f"[{table}] # {draw(QUOTED)}")
        for key in draw(st.lists(WORDS | QUOTED, min_size=1, max_size=3, unique=True)):
            lines += [f"# {draw(QUOTED)}"] * draw(st.integers(0, 2))
            indent = " " * draw(st.integers(0, 3))
            first = indent + f'"{key}" = {{ "{draw(QUOTED)}é" = "{draw(QUOTED)}", inner = '
            places[f"{table}.{key}"] = (len(lines) + 1, len(indent) + 1)
            places[f"{table}.{key}.inner"] = (len(lines) + 1, len(first) - len("inner = ") + 1)
            places[f"{table}.{key}.inner[1]"] = (len(lines) + 1, len(first) + len("[1, ") + 1)
            lines.append(first + "[1, 2] }")
    return "\n".join(lines), places


@settings(max_examples=EXAMPLES)
@given(texts_with_known_places())
def test_keys_are_found_where_they_were_put(made: tuple[str, dict[str, tuple[int, int]]]) -> None:
    text, expected = made
    places = DeckPlaces("a.toml", text, Kind.TOML)
    spans = {key: places.find(key) for key in expected}
    assert {key: (span.line, span.column) for key, span in spans.items()} == expected


@settings(max_examples=EXAMPLES)
@given(st.text(st.sampled_from("ab\r\n"), max_size=40), st.lists(st.integers(1, 5), min_size=1))
def test_lines_do_not_depend_on_the_pieces_they_come_in(text: str, sizes: list[int]) -> None:
    raw = text.encode()

    def pieces() -> Iterator[bytes]:
        start = 0
        for size in sizes * (len(raw) + 1):
            if start >= len(raw):
                return
            yield raw[start : start + size]
            start += size

    whole = LineStream(iter([raw] if raw else [])).take(100)
    assert LineStream(pieces()).take(100) == whole
    assert whole == [line.encode() for line in re.split("\r\n|\r|\n", text)][: len(whole)]


ROWS = st.lists(
    st.builds(
        lambda s, xyz, tail, lead: (lead + " ".join([s, *map(repr, xyz)]) + tail).encode(),
        st.sampled_from(["H", "he", "FE", "D", "t", "8", "118"]),
        st.lists(st.floats(-1e6, 1e6), min_size=3, max_size=3),
        st.sampled_from(["", " ", " 1 x", "\t\xe9"]),
        st.sampled_from(["", "  ", "\t"]),
    ),
    min_size=1,
    max_size=5,
)


@settings(max_examples=EXAMPLES)
@given(ROWS)
def test_rows_read_at_once_as_one_by_one(rows: list[bytes]) -> None:
    at_once, one_by_one = _read_at_once(rows, PLAIN_LAYOUT), _read_one_by_one(rows, PLAIN_LAYOUT)
    assert at_once is not None
    assert at_once.n == one_by_one.n == len(rows)
    for first, second in zip(at_once[1:5], one_by_one[1:5], strict=True):
        np.testing.assert_array_equal(np.asarray(first), np.asarray(second))


@settings(max_examples=EXAMPLES)
@given(VALUES | st.lists(VALUES, min_size=4, max_size=4), st.sampled_from([1.0, ANGSTROM_PER_BOHR]))
def test_an_inline_row_has_a_sentence_exactly_where_it_cannot_be_read(row: object, scale: float) -> None:
    assert (_read_rows_at_once([row], scale) is None) == bool(_sentence_on_row(row, scale))
