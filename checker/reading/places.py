"""Where the keys of a deck stand, be it text, an XYZ frame, or both together."""

import re
from dataclasses import dataclass
from functools import cached_property
from typing import TYPE_CHECKING

import numpy as np
from numpy.typing import NDArray

from checker.reading.faults import KeyPath
from checker.reading.kinds import Kind
from checker.reading.positions import LineTable
from checker.source import Span

if TYPE_CHECKING:
    from checker.reading.outline import Outline

_STEP = re.compile(r"\[(\d{1,9})\]|([^.\[\]]+)")
_ATOM = re.compile(r"species\.atoms\[(\d{1,9})\]")


def path_of(key: str) -> KeyPath:
    """Split a dotted key into its steps.

    >>> path_of("fragments[0].atoms[2]")
    ('fragments', 0, 'atoms', 2)
    """
    return tuple(int(index) if index else name for index, name in _STEP.findall(key))


class DeckPlaces:
    """The places of a deck in TOML or JSON. The text is parsed for positions when the first is asked for.

    `text` is without a byte order mark; offsets count from its first character.
    """

    def __init__(self, file: str, text: str, kind: Kind) -> None:
        self.file = file
        self.text = text
        self.kind = kind

    def find(self, key: str) -> Span:
        """Return the place of a key, or of the nearest table or key above it; line 1 if there is none."""
        return self.locate(path_of(key))

    def locate(self, path: KeyPath) -> Span:
        """Return the place of a key given as steps, which may then hold dots and brackets of their own."""
        return self.span(self._outline.find(path).entry.at)

    def value_range(self, key: str) -> tuple[int, int] | None:
        """Return where the value of `key` begins and ends in `text`; None if it has no text of its own."""
        found = self._outline.find(path_of(key))
        if not found.whole or found.entry.value is None:
            return None
        node = found.entry.value
        return self._lines.characters(node.start_byte), self._lines.characters(node.end_byte)

    def span(self, offset: int) -> Span:
        """Return the place of a byte offset."""
        return Span(self.file, *self._lines.place(offset))

    @cached_property
    def _lines(self) -> LineTable:
        return LineTable(self.text.encode())

    @cached_property
    def _outline(self) -> "Outline":
        from checker.reading.outline import Outline

        return Outline(self._lines.source, self.kind)


@dataclass(frozen=True, slots=True, eq=False)
class FramePlaces:
    """The places of an XYZ frame.

    Attributes
    ----------
    first_line : the line of the number of atoms; the comment line and the atoms follow it.
    said : column, by lower-case key, of what the comment line says.
    atom_columns : (n,) column of each atom's element.

    """

    file: str
    first_line: int
    said: dict[str, int]
    atom_columns: NDArray[np.int32]

    def find(self, key: str) -> Span:
        """Return the line of an atom, of a word on the comment line, or of the frame."""
        atom = _ATOM.match(key)
        if atom and int(atom[1]) < len(self.atom_columns):
            index = int(atom[1])
            return Span(self.file, self.first_line + 2 + index, int(self.atom_columns[index]))
        if key in {"species.charge", "species.multiplicity"}:  # said there, or to be said there
            return Span(self.file, self.first_line + 1, self.said.get(key.removeprefix("species."), 1))
        return Span(self.file, self.first_line, 1)


@dataclass(frozen=True, slots=True)
class DeckAndFramePlaces:
    """The places of a deck whose atoms stand in a geometry file.

    `from_comment` names the keys that only the comment line states.
    """

    deck: DeckPlaces
    frame: FramePlaces
    from_comment: frozenset[str] = frozenset()

    def find(self, key: str) -> Span:
        """Return the place of a key: atoms in the geometry file, all else in the deck that names it."""
        if key in self.from_comment or _ATOM.match(key):
            return self.frame.find(key)
        return self.deck.find("species.geometry" if key == "species.atoms" else key)
