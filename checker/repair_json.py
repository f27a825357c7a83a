"""Edits of a deck in JSON, cut into its text so that the layout stays."""

import json
import re
from typing import Any

from checker.errors import RepairRefused
from checker.findings import Edit, Json
from checker.reading.kinds import Kind
from checker.reading.places import DeckPlaces
from checker.repair_rows import in_style_of
from checker.repair_toml import change, same
from checker.report.plain import split_key

Steps = tuple[str | int, ...]


def mended(text: str, edits: list[Edit]) -> str:
    """Return the text with the edits made and every other character kept; raise RepairRefused where none fits."""
    new = text
    wanted = json.loads(text)
    for edit in edits:
        steps = split_key(edit.key)
        value = edit.value
        while value is not None and len(steps) > 1 and not _holds(json.loads(new), steps[:-1]):
            value, steps = {str(steps[-1]): value}, steps[:-1]
        new = _edited(new, steps, value)
        change(wanted, split_key(edit.key), edit.value)
    if not same(json.loads(new), wanted):
        raise RepairRefused("the layout does not allow this repair to be written in; make the change by hand")
    return new


def _holds(plain: Any, steps: Steps) -> bool:
    for step in steps:
        try:
            plain = plain[step]
        except (KeyError, IndexError, TypeError):
            return False
    return True


def _edited(text: str, steps: Steps, value: Json) -> str:
    holder: Any = json.loads(text)
    for step in steps[:-1]:
        holder = holder[step]
    deck = _Text(text, steps[:-1], list(holder) if isinstance(holder, dict) else list(range(len(holder))))
    if value is None:
        return deck.without(steps[-1])
    if steps[-1] in deck.names:
        return deck.with_value(steps[-1], value)
    return deck.with_new(steps[-1], value)


class _Text:
    """A JSON text, looked at around the items of one object or list."""

    def __init__(self, text: str, holder: Steps, names: list[Any]) -> None:
        self.text = text
        self.holder = holder
        self.names = names
        self._places = DeckPlaces("", text, Kind.JSON)

    def with_value(self, name: str | int, value: Json) -> str:
        start, end = self._value(name)
        return self.text[:start] + self._written(name, value) + self.text[end:]

    def with_new(self, name: str | int, value: Json) -> str:
        """Add an item: a multiplicity after the charge, all else at the end, spaced as the others are."""
        if not self.names:
            start, end = self._range(self.holder)
            inner = self._member(name, value)
            return (
                self.text[:start] + (f"[{inner}]" if isinstance(name, int) else f"{{{inner}}}") + self.text[end:]
            )
        after = "charge" if name == "multiplicity" and "charge" in self.names else self.names[-1]
        end = self._value(after)[1]
        return f"{self.text[:end]},{self._gap()}{self._member(name, value)}{self.text[end:]}"

    def without(self, name: str | int) -> str:
        if name not in self.names:
            raise RepairRefused(f"there is no {name!r} to take out")
        at = self.names.index(name)
        if at + 1 < len(self.names):
            return self.text[: self._start(name)] + self.text[self._start(self.names[at + 1]) :]
        start = self._value(self.names[at - 1])[1] if at else self._start(name)
        return self.text[:start] + self.text[self._value(name)[1] :]

    def _member(self, name: str | int, value: Json) -> str:
        written = self._written(name, value)
        return written if isinstance(name, int) else f"{json.dumps(name)}: {written}"

    def _written(self, name: str | int, value: Json) -> str:
        """Return a value as text; a row of a list of atoms in the style of its neighbour."""
        if isinstance(name, int) and isinstance(value, list) and self.names:
            start, end = self._value(min(name, len(self.names) - 1))
            styled = in_style_of(self.text[start:end], value)
            if styled is not None:
                return styled
        return json.dumps(value, ensure_ascii=False)

    def _gap(self) -> str:
        """Return what stands before the last item: a line end and indentation, or a space."""
        before = self.text[: self._start(self.names[-1])]
        found = re.search(r"(?:\r\n|\n|\r)?[ \t]*\Z", before)
        gap = found[0] if found else ""
        return gap if gap.strip(" \t") or len(self.names) > 1 else " "

    def _start(self, name: str | int) -> int:
        """Return where an item begins: its key in an object, its value in a list."""
        if isinstance(name, int):
            return self._value(name)[0]
        place = self._places.locate((*self.holder, name))
        assert place.line is not None and place.column is not None
        lines = re.split(r"(?<=\n)|(?<=\r)(?!\n)", self.text)
        return sum(len(line) for line in lines[: place.line - 1]) + place.column - 1

    def _value(self, name: str | int) -> tuple[int, int]:
        return self._range((*self.holder, name))

    def _range(self, steps: Steps) -> tuple[int, int]:
        key = "".join(f"[{step}]" if isinstance(step, int) else f".{step}" for step in steps).removeprefix(".")
        found = self._places.value_range(key)
        if found is None:
            raise RepairRefused(f"{key} is not found in the text")
        return found
