"""Which files of a folder are decks."""

# paths stay text here, as a Path would rewrite what was given and raise where os.path answers no
# ruff: noqa: PTH114, PTH118, PTH120

import os
import tomllib
from collections.abc import Iterator
from dataclasses import dataclass

from checker.errors import UnreadableInput
from checker.reading.comment import read_comment
from checker.reading.confinement import is_within, sentence_on_path
from checker.reading.decoding import decoded
from checker.reading.files import open_regular, read_whole
from checker.reading.kinds import GEOMETRY_SUFFIXES, Kind, kind_by_name
from checker.reading.limits import MAX_LINE_BYTES
from checker.reading.mapping import mapping_of
from checker.reading.places import DeckPlaces

DECK_SUFFIXES = (".deck.toml", ".deck.json")
NOT_LISTED = "this user has no right to list the folder, so the decks in it were not read"
LINK_LEADS_OUT = "this link leads out of the folder, so it was not read; give the file itself to have it judged"


@dataclass(frozen=True, slots=True)
class Member:
    """A deck found in a folder, by path from the folder; `trouble` is why it is not to be read, if so."""

    path: str
    trouble: str | None = None


def members(folder: str, *, charge_is_given: bool) -> list[Member]:
    """Return the decks in a folder and the folders in it, sorted by path.

    Decks, and XYZ files that no deck there names as its geometry and whose comment line states a charge, unless a
    charge is given from outside. Names that begin with a dot are skipped, links to folders not followed.
    """
    found: list[Member] = []
    geometries: list[str] = []
    for path, trouble in _files(folder):
        if trouble or path.lower().endswith(DECK_SUFFIXES):
            found.append(Member(path, trouble or _link_trouble(folder, path)))
        elif path.lower().endswith(GEOMETRY_SUFFIXES) and _link_trouble(folder, path) is None:
            geometries.append(path)
    if geometries:
        named = set().union(*(_named_by(os.path.join(folder, m.path)) for m in found if not m.trouble))
        found += [
            Member(path)
            for path in geometries
            if os.path.realpath(os.path.join(folder, path)) not in named
            and (charge_is_given or _states_charge(os.path.join(folder, path)))
        ]
    return sorted(found, key=lambda member: member.path)


def _files(folder: str) -> Iterator[tuple[str, str | None]]:
    """Yield the path of each file from the folder; with a sentence, that of a folder that cannot be listed."""
    waiting = [""]
    while waiting:
        inner = waiting.pop()
        try:
            with os.scandir(os.path.join(folder, inner)) as entries:
                for entry in entries:
                    if entry.name.startswith("."):
                        continue
                    path = f"{inner}/{entry.name}" if inner else entry.name
                    if entry.is_dir(follow_symlinks=False):
                        waiting.append(path)
                    elif not (entry.is_symlink() and entry.is_dir()):
                        yield path, None
        except OSError:
            yield inner, NOT_LISTED


def _link_trouble(folder: str, path: str) -> str | None:
    whole = os.path.join(folder, path)
    if os.path.islink(whole) and not is_within(os.path.realpath(whole), os.path.realpath(folder)):
        return LINK_LEADS_OUT
    return None


def _named_by(deck: str) -> set[str]:
    """Return the real path of the geometry file that a deck names, if it can be told."""
    try:
        with open_regular(deck, deck) as stream:
            raw = read_whole(stream, deck)
        if b"geometry" not in raw:  # most decks have their atoms inside, and are not parsed for nothing
            return set()
        species = mapping_of(DeckPlaces(deck, decoded(raw, deck), kind_by_name(deck) or Kind.TOML)).get("species")
    except (UnreadableInput, tomllib.TOMLDecodeError):  # complained of when it is read as a deck
        return set()
    written = species.get("geometry") if isinstance(species, dict) else None
    if not isinstance(written, str) or sentence_on_path(written):
        return set()
    return {os.path.realpath(os.path.join(os.path.dirname(deck), written))}


def _states_charge(path: str) -> bool:
    """Return whether the first comment line of an XYZ file speaks of a charge, rightly or not."""
    try:
        with open_regular(path, path) as stream:
            head = stream.read(2 * MAX_LINE_BYTES)
    except (UnreadableInput, OSError):
        return False
    lines = head.lstrip().splitlines()
    comment = read_comment(lines[1].decode("utf-8", "replace")) if len(lines) > 1 else None
    return comment is not None and (
        comment.charge is not None or any(fault.key == "species.charge" for fault in comment.faults)
    )
