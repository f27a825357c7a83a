"""Where a value stands in the text it was read from."""

from dataclasses import dataclass
from typing import Protocol


@dataclass(frozen=True, slots=True)
class Span:
    """A place in a file. ``line`` and ``column`` count from 1, the column in characters; None: the whole file."""

    file: str
    line: int | None = None
    column: int | None = None


class Places(Protocol):
    """Finds the place of a deck key."""

    def find(self, key: str) -> Span:
        """Return the place of `key`, or of the nearest table or file that would hold it.

        Keys are dotted, list items counted from 0 in brackets: ``species.charge``, ``species.atoms[3]``,
        ``fragments[0].charge``. An atom's key leads to the file that holds its coordinates.
        """
        ...


@dataclass(frozen=True, slots=True)
class WholeFile:
    """The places of an input whose parts cannot be told apart: every key leads to the file."""

    file: str

    def find(self, key: str) -> Span:
        """Return the file, whatever the key."""
        return Span(self.file)
