"""Where the keys of a TOML or JSON text stand, from a parser that knows positions (tree-sitter).

It judges nothing: whether the text is well formed, the language's own parser has decided. Tables and lists are
opened only when a key inside them is asked for, so that a list of 100,000 atoms costs nothing until then, and
without recursion, so that 20,000 brackets cost no stack.
"""

import json
import tomllib
from dataclasses import dataclass
from typing import TYPE_CHECKING, NamedTuple

from checker.reading.faults import KeyPath
from checker.reading.kinds import Kind

if TYPE_CHECKING:
    from tree_sitter import Node


class Part(NamedTuple):
    """One name of a key as written, and its byte offset."""

    name: str
    at: int


class Twice(NamedTuple):
    """A key given twice, with both byte offsets."""

    name: str
    first: int
    second: int


class Entry:
    """A key, or an item of a list: its byte offset, its value, and what is known of the inside."""

    __slots__ = ("at", "children", "header", "items", "opened", "value")

    def __init__(self, at: int, value: "Node | None" = None) -> None:
        self.at = at
        self.value = value
        self.children: dict[str, Entry] = {}
        self.items: list[Entry] = []
        self.header: int | None = None
        self.opened = value is None


@dataclass(frozen=True, slots=True)
class Found:
    """The deepest entry on the way to a key; `whole` tells whether it is that key."""

    entry: Entry
    whole: bool


class Outline:
    """The keys of one text."""

    def __init__(self, source: bytes, kind: Kind) -> None:
        self.twice: list[Twice] = []
        top = _parse(source, kind)
        self.root = Entry(0)
        if kind is Kind.TOML:
            self._read_toml(top)
        else:
            self.root.value = next((node for node in top.children if node.type == "object"), None)
            self.root.opened = False

    def find(self, path: KeyPath) -> Found:
        """Return the entry of a path, or the nearest one above it."""
        entry = self.root
        for step in path:
            self._open(entry)
            inner = _item(entry, step) if isinstance(step, int) else entry.children.get(step)
            if inner is None:
                return Found(entry, whole=False)
            entry = inner
        return Found(entry, whole=True)

    def first_twice(self) -> Twice | None:
        """Return a key that stands twice in one table, whichever is met first; it opens every table."""
        entries = [self.root]
        while entries and not self.twice:
            entry = entries.pop()
            self._open(entry)
            entries.extend(entry.children.values())
            entries.extend(entry.items)
        return self.twice[0] if self.twice else None

    def _read_toml(self, document: "Node") -> None:
        for node in document.children:
            if node.type == "pair":
                self._add_pair(self.root, node)
            elif node.type in {"table", "table_array_element"} and len(node.children) > 1:
                table = self._table(_parts(node.children[1]), is_item=node.type == "table_array_element")
                for pair in node.children[2:]:
                    if pair.type == "pair":
                        self._add_pair(table, pair)

    def _table(self, parts: list[Part], *, is_item: bool) -> Entry:
        """Return the entry that a table header speaks of."""
        table = self.root
        for part in parts:
            if table.items:  # the header of a table inside an array of tables means the latest one
                table = table.items[-1]
            table = table.children.setdefault(part.name, Entry(part.at))
        name, at = parts[-1]
        if is_item:
            table.items.append(Entry(at))
            return table.items[-1]
        if table.header is not None or table.value is not None:
            self.twice.append(Twice(name, table.at, at))
        table.header = at
        return table

    def _add_pair(self, table: Entry, pair: "Node") -> None:
        if len(pair.children) < 3:
            return
        parts = _parts(pair.children[0])
        for part in parts[:-1]:
            table = table.children.setdefault(part.name, Entry(part.at))
        name, at = parts[-1]
        if name in table.children:
            self.twice.append(Twice(name, table.children[name].at, at))
        else:
            table.children[name] = Entry(at, pair.children[2])

    def _open(self, entry: Entry) -> None:
        """Note what stands inside a list, an inline table or an object, one level deep."""
        if entry.opened or entry.value is None:
            return
        entry.opened = True
        if entry.value.type == "array":
            entry.items = [
                Entry(node.start_byte, node) for node in entry.value.named_children if node.type != "comment"
            ]
        elif entry.value.type in {"inline_table", "object"}:
            for node in entry.value.children:
                if node.type == "pair":
                    self._add_pair(entry, node)


def _parse(source: bytes, kind: Kind) -> "Node":
    from tree_sitter import Language, Parser

    if kind is Kind.TOML:
        from tree_sitter_toml import language
    else:
        from tree_sitter_json import language
    return Parser(Language(language())).parse(source).root_node


def _item(entry: Entry, index: int) -> Entry | None:
    return entry.items[index] if index < len(entry.items) else None


def _parts(key: "Node") -> list[Part]:
    """Return the names of a key, outermost first; a dotted key is a chain that nests to the left."""
    parts = []
    while key.type == "dotted_key" and len(key.children) > 2:
        parts.append(_part(key.children[-1]))
        key = key.children[0]
    parts.append(_part(key))
    return parts[::-1]


def _part(key: "Node") -> Part:
    written = (key.text or b"").decode("utf-8", "replace")
    if key.type == "quoted_key":
        written = _unquoted_toml(written)
    elif key.type == "string":
        written = str(json.loads(written, strict=False))
    return Part(written, key.start_byte)


def _unquoted_toml(written: str) -> str:
    try:
        return next(iter(tomllib.loads(f"{written} = 0")))
    except tomllib.TOMLDecodeError:
        return written
