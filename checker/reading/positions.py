"""Offsets in a text to lines and columns. A line ends with LF, CR LF or a lone CR."""

import re
from bisect import bisect_right
from functools import cached_property

_LINE_END = re.compile(rb"\r\n|\r|\n")


class LineTable:
    """The lines of a UTF-8 text. Offsets are in bytes, as parsers count; columns in characters, as people do."""

    def __init__(self, source: bytes) -> None:
        self.source = source

    @cached_property
    def _starts(self) -> list[int]:
        return [0, *(end.end() for end in _LINE_END.finditer(self.source))]

    def place(self, offset: int) -> tuple[int, int]:
        """Return line and column, from 1, of a byte offset."""
        line = bisect_right(self._starts, offset)
        before = self.source[self._starts[line - 1] : offset]
        return line, len(before.decode("utf-8", "replace")) + 1

    def characters(self, offset: int) -> int:
        """Return how many characters stand before a byte offset."""
        return len(self.source[:offset].decode("utf-8", "replace"))


def place_in(text: str, offset: int) -> tuple[int, int]:
    """Return line and column, from 1, of a character offset."""
    before = text[:offset].replace("\r\n", "\n").replace("\r", "\n")
    return before.count("\n") + 1, len(before) - before.rfind("\n")
