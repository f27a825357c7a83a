"""Keeps a deck from reading other people's files: which geometry files it may name.

A path in a deck is relative to the deck. With all links resolved it must lie in the deck's own folder, or in the
folder the call was made in, provided that the deck lies there too and that it is neither home folder nor root.
What is refused is refused before it is looked at, so that the answer does not tell whether the file exists.
"""

# paths stay text here, as a Path would rewrite what was given and raise where os.path answers no
# ruff: noqa: PTH109, PTH111, PTH116, PTH118, PTH120

import os
import re
from dataclasses import dataclass
from pathlib import Path
from typing import BinaryIO

from checker.errors import Complaint, UnreadableInput
from checker.reading.files import open_regular
from checker.reading.kinds import GEOMETRY_SUFFIXES
from checker.reading.limits import MAX_PATH_CHARACTERS
from checker.reading.words import listed, quoted, shown_path

_FORBIDDEN = (
    (re.compile(r".*[\0-\x1f\x7f]", re.DOTALL), "holds a control character"),
    (re.compile(r"[A-Za-z][A-Za-z0-9+.-]*://"), "is an address, but nothing is read from the network"),
    (re.compile(r"[A-Za-z]:"), "begins with a drive letter, but must be relative to the deck"),
    (re.compile(r"/"), "begins at the root, but must be relative to the deck"),
    (re.compile(r"~"), "begins with ~, but must be relative to the deck"),
)


@dataclass(frozen=True, slots=True)
class Home:
    """Where a deck lives.

    Attributes
    ----------
    folder : the folder that its paths are relative to, as given.
    roots : the real folders it may read from.

    """

    folder: str
    roots: tuple[str, ...]


def home_of_deck(path: str) -> Home:
    """Return the home of a deck in a file."""
    folder = os.path.dirname(path)
    own = os.path.realpath(folder or ".")
    call = call_folder()
    return Home(folder, (own, call) if call and is_within(own, call) else (own,))


def home_of_call() -> Home:
    """Return the home of a deck from standard input."""
    call = call_folder()
    return Home("", (call,) if call else ())


def call_folder() -> str | None:
    """Return the real folder the call was made in; None for the home folder and the root, which hold too much."""
    try:
        here = os.path.realpath(os.getcwd())
    except OSError:  # it was deleted
        return None
    too_wide = {os.path.realpath(os.path.expanduser("~")), Path(here).anchor}
    return None if here in too_wide else here


def is_within(path: str, folder: str) -> bool:
    """Return whether a real path is a real folder or lies in it."""
    return path == folder or path.startswith(folder.rstrip(os.sep) + os.sep)


def name_of_geometry(written: str, home: Home) -> str:
    """Return what reports call a geometry file: its path from where the deck's path begins."""
    return shown_path(os.path.join(home.folder, written) if home.folder else written)


def sentence_on_path(written: str) -> str | None:
    """Return what is wrong with a geometry path as text, or None."""
    start = f"species.geometry is {quoted(written)}, which"
    if not written.strip():
        return "species.geometry is empty; name an XYZ file beside the deck"
    if len(written) > MAX_PATH_CHARACTERS:  # resolving a path of a million folders takes hours
        return f"{start} is longer than {MAX_PATH_CHARACTERS:,} characters; name an XYZ file beside the deck"
    for pattern, why in _FORBIDDEN:
        if pattern.match(written):
            return f"{start} {why}; name an XYZ file beside the deck"
    if "\\" in written:
        return f"{start} holds a backslash; write folders with forward slashes"
    if not written.lower().endswith(GEOMETRY_SUFFIXES):
        return f"{start} does not end in {listed(GEOMETRY_SUFFIXES)}; name an XYZ file"
    return None


def open_geometry(written: str, home: Home) -> BinaryIO:
    """Open the geometry file of a deck, whose path as text is good.

    Raises
    ------
    UnreadableInput
        Where it leads out of the folders the deck may read from, or cannot be opened. The complaint is about the
        deck's key, not about a place in the file.

    """
    path = os.path.join(home.folder, written)
    real = _confined(path, written, home)
    try:
        stream = open_regular(real, written)
    except UnreadableInput as unreadable:
        message = unreadable.complaints[0].message.partition("; to pipe")[0]  # which holds for decks only
        raise _refusal(written, message) from None
    if os.path.realpath(path) != real or not _is_open(stream, real):
        stream.close()
        raise _refusal(written, "the path changed while the file was being opened; check again")
    return stream


def _confined(path: str, written: str, home: Home) -> str:
    real = os.path.realpath(path) if home.roots else ""
    if any(is_within(real, root) for root in home.roots):
        return real
    raise _refusal(
        written,
        "the path leads out of the folders that this deck may read from, its own and the one the check was called "
        "in; copy the file beside the deck",
    )


def _refusal(written: str, why: str) -> UnreadableInput:
    return UnreadableInput(Complaint(f"species.geometry is {quoted(written)}: {why}", written))


def _is_open(stream: BinaryIO, real: str) -> bool:
    try:
        return os.path.samestat(os.fstat(stream.fileno()), os.stat(real))
    except OSError:
        return False
