"""What was given on the command line, one after another: files, folders, standard input, texts."""

# paths stay text here, as a Path would rewrite what was given and raise where os.path answers no
# ruff: noqa: PTH112, PTH113, PTH118

import os
import sys
from collections.abc import Iterator, Sequence
from io import BytesIO
from itertools import chain
from typing import BinaryIO

from checker.deck import Deck, UnreadableDeck
from checker.errors import Complaint, UnreadableInput
from checker.reading.bare import read_bare
from checker.reading.confinement import Home, home_of_call, home_of_deck
from checker.reading.decks import read_deck
from checker.reading.files import chunks, open_regular, read_whole
from checker.reading.fill_in import FillIn
from checker.reading.folders import members
from checker.reading.kinds import KIND_BY_SUFFIX, Kind, kind_by_look, kind_by_name
from checker.reading.words import listed, shown_path

STANDARD_INPUT = "-"
HEAD_BYTES = 4096

_NO_DECK = (
    "no deck was found in this folder; looked for *.deck.toml, *.deck.json, and for *.xyz and *.extxyz files that "
    "state a charge on their comment line, or any with --charge"
)
_NO_INPUT = "standard input is closed, so there is no deck to read; give a path"
_TAKEN_FOR_TOML = (
    "; taken for a TOML deck, as {why} and the text begins neither with {{ nor with a number of atoms"
)


def read_paths(
    paths: Sequence[str], *, fill_in: FillIn, stdin: BinaryIO | None = None
) -> Iterator[Deck | UnreadableDeck]:
    """Read decks, XYZ files and folders of them, in the order given; at least one item each.

    Parameters
    ----------
    paths : ``-`` is standard input.
    fill_in : charge and multiplicity where neither deck nor comment line states them.
    stdin : what to read in place of the process's own standard input.

    """
    for path in paths:
        if path == STANDARD_INPUT:
            yield from _read_stdin(stdin, fill_in)
        elif os.path.isdir(path):
            yield from _read_folder(path, fill_in)
        else:
            yield from _read_file(path, fill_in)


def read_text(text: str | bytes, *, name: str, fill_in: FillIn) -> Iterator[Deck | UnreadableDeck]:
    """Read a deck or XYZ frames given as text; at least one item.

    The suffix of `name` tells the kind of text, else its beginning. Geometry files are read only where `name` is
    the path of a file, whose folder they are then looked for in.
    """
    raw = text.encode("utf-8", "surrogatepass") if isinstance(text, str) else text
    home = home_of_deck(name) if os.path.isfile(name) else None
    yield from _read_stream(BytesIO(raw), kind_by_name(name), shown_path(name), home, fill_in)


def _read_stdin(stdin: BinaryIO | None, fill_in: FillIn) -> Iterator[Deck | UnreadableDeck]:
    stream = stdin or getattr(sys.stdin, "buffer", None)
    if stream is None or stream.closed:
        yield UnreadableDeck(STANDARD_INPUT, (Complaint(_NO_INPUT, STANDARD_INPUT),))
        return
    yield from _read_stream(stream, None, STANDARD_INPUT, home_of_call(), fill_in)


def _read_folder(folder: str, fill_in: FillIn) -> Iterator[Deck | UnreadableDeck]:
    found = members(folder, charge_is_given=fill_in.charge is not None)
    if not found:
        name = shown_path(folder)
        yield UnreadableDeck(name, (Complaint(_NO_DECK, name),))
    for member in found:
        path = _joined(folder, member.path)
        if member.trouble:
            name = shown_path(path)
            yield UnreadableDeck(name, (Complaint(member.trouble, name),))
        else:
            yield from _read_file(path, fill_in)


def _joined(folder: str, path: str) -> str:
    """Return the path of a file in a folder, without a leading ``./`` of its own making."""
    if folder.rstrip("/" + os.sep) == ".":
        return path or folder
    return os.path.join(folder, path) if path else folder


def _read_file(path: str, fill_in: FillIn) -> Iterator[Deck | UnreadableDeck]:
    name = shown_path(path)
    try:
        stream = open_regular(path, name)
    except UnreadableInput as unreadable:
        yield UnreadableDeck(name, unreadable.complaints)
        return
    with stream:
        yield from _read_stream(stream, kind_by_name(path), name, home_of_deck(path), fill_in)


def _read_stream(
    stream: BinaryIO, kind: Kind | None, name: str, home: Home | None, fill_in: FillIn
) -> Iterator[Deck | UnreadableDeck]:
    """Read a stream of a known kind, or of one told by its beginning."""
    try:
        head = b"" if kind else stream.read(HEAD_BYTES)
        looks = kind or kind_by_look(head)
        raw = b"" if looks is Kind.XYZ else head + read_whole(stream, name)
    except OSError as error:
        message = f"reading failed: {(error.strerror or 'the device failed').lower()}"
        yield UnreadableDeck(name, (Complaint(message, name),))
    except UnreadableInput as unreadable:
        yield UnreadableDeck(name, unreadable.complaints)
    else:
        if looks is Kind.XYZ:
            yield from read_bare(chain([head] if head else [], chunks(stream)), name, fill_in)
        else:
            guess = "" if kind else _why_toml(looks, name)
            yield from read_deck(raw, looks, name, home=home, fill_in=fill_in, guess=guess)


def _why_toml(looks: Kind, name: str) -> str:
    """Return what to add to complaints about a text that is in none of our languages."""
    if looks is not Kind.TOML:
        return ""
    suffixes = listed(KIND_BY_SUFFIX)
    why = "standard input has no suffix" if name == STANDARD_INPUT else f"its name ends in none of {suffixes}"
    return _TAKEN_FOR_TOML.format(why=why)
