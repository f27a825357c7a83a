"""The keys a deck may have, read off the model, and what an unknown one was probably meant to be."""

from functools import cache
from types import MappingProxyType
from typing import Any, get_args

from checker.model import Job, Table
from checker.reading.faults import KeyPath
from checker.reading.words import listed, nearest, quoted

# so close that the key is a slip of the pen rather than one that strayed from another table
SLIP = 0.85


@cache
def tables() -> MappingProxyType[str, tuple[str, ...]]:
    """Return the keys of each table by its name; "" is the top of the deck."""
    found = {"": tuple(Job.model_fields)}
    for name, field in Job.model_fields.items():
        table = _table_in(field.annotation)
        if table is not None:
            found[name] = tuple(table.model_fields)
    return MappingProxyType(found)


@cache
def lists_of_tables() -> frozenset[str]:
    """Return the names of the tables that may stand several times, in double brackets."""
    return frozenset(name for name in tables() if name and isinstance(Job.model_fields[name].default, tuple))


def suggestion(table: KeyPath, key: str) -> str | None:
    """Return the key of the same table that an unknown one was meant to be, or None."""
    here = tables()[_name(table)]
    close = nearest(key, here, SLIP)
    return close or (None if _homes(key) else nearest(key, here))


def sentence_on_unknown(table: KeyPath, key: str) -> str:
    """Return the complaint about an unknown key: the nearest known one, or the table it belongs to."""
    meant = suggestion(table, key)
    where = f"in {header(_name(table))}" if table else "at the top of a deck"
    start = f"the key {quoted(key)} is not known {where}"
    if meant:
        return f"{start}; the nearest is {meant}"
    homes = _homes(key) - {_name(table)}
    if homes:
        return f"{start}; {key.lower()} {_belongs(key.lower(), homes)}"
    elsewhere = {other: near for other, keys in tables().items() if (near := nearest(key, keys, SLIP))}
    if elsewhere:
        other, near = next(iter(elsewhere.items()))
        return f"{start}; the nearest is {near}, which {_belongs(near, {other})}"
    known = listed(tables()[_name(table)], "and")
    return f"{start}; remove it, or use one of {known}"


def header(name: str) -> str:
    """Return a table's header as a deck writes it."""
    return f"[[{name}]]" if name in lists_of_tables() else f"[{name}]"


def _name(table: KeyPath) -> str:
    return str(table[0]) if table else ""


def _homes(key: str) -> set[str]:
    """Return the tables that have such a key."""
    return {name for name, keys in tables().items() if key.lower() in keys}


def _belongs(key: str, homes: set[str]) -> str:
    if homes == {""}:
        if key in tables():
            return f"is a table of its own, {header(key)}"
        return "belongs at the top of the deck, before the first table"
    order = [header(name) for name in tables() if name in homes and name]
    return f"belongs in {listed(order)}"


def _table_in(annotation: Any) -> type[Table] | None:
    """Return the table that a field holds, alone, optional or several times."""
    if isinstance(annotation, type) and issubclass(annotation, Table):
        return annotation
    return next((table for part in get_args(annotation) if (table := _table_in(part))), None)
