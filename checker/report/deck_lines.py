"""Repairs as the lines that a deck needs, ready to paste."""

import json
from collections.abc import Callable, Generator, Iterator

from checker.findings import DeckReport, Edit, Json, Repair
from checker.report.plain import number, plain, split_key, toml_key, toml_value

COMMENT_KEYS = ("species.charge", "species.multiplicity")  # what a comment line of XYZ can state


def deck_lines(repair: Repair, report: DeckReport) -> list[str]:
    """Return what to write into the deck, in the language of the file: TOML, JSON or XYZ."""
    n_atoms = _n_atoms(report)
    of_atoms = [edit for edit in repair.edits if _is_atom(edit)]
    of_values = [part for edit in repair.edits if not _is_atom(edit) for part in _by_line(edit)]
    lines = [*_value_lines(of_values, _language(report.deck))]
    if of_atoms:
        file = report.atoms_file or report.deck
        lines += _atom_lines(of_atoms, n_atoms, _language(file), "" if file == _file(report.deck) else file)
    return [plain(line) for line in lines]


def _file(deck: str) -> str:
    """Return the file of a deck's name, without the number of a frame."""
    head, mark, frame = deck.rpartition("#")
    return head if mark and frame.isdigit() else deck


def _language(name: str) -> str:
    lowered = _file(name).lower()
    if lowered.endswith(".json"):
        return "json"
    return "xyz" if lowered.endswith((".xyz", ".extxyz")) else "toml"


def _is_atom(edit: Edit) -> bool:
    return edit.key.startswith("species.atoms[") and edit.key.endswith("]")


def _by_line(edit: Edit) -> list[Edit]:
    """Take an edit that gives a whole table apart into one for each of its keys."""
    if "." in edit.key or not isinstance(edit.value, dict):
        return [edit]
    return [Edit(f"{edit.key}.{toml_key(name)}", value) for name, value in edit.value.items()]


def _n_atoms(report: DeckReport) -> int | None:
    if report.ledger is None:
        return None
    return sum(book.atoms + book.ghosts for book in report.ledger.by_element)


def _value_lines(edits: list[Edit], language: str) -> Iterator[str]:
    if language == "xyz":
        edits = yield from _comment_words(edits)
        if edits:
            yield "in a deck that names this file as its geometry:"
    write = _json_lines if language == "json" else _toml_lines
    tables: dict[tuple[str | int, ...], list[tuple[tuple[str | int, ...], Json]]] = {}
    for edit in edits:
        steps = split_key(edit.key)
        n_head = _table_depth(steps)
        tables.setdefault(steps[:n_head], []).append((steps[n_head:], edit.value))
    for table, entries in tables.items():
        yield from write(table, entries)


def _comment_words(edits: list[Edit]) -> Generator[str, None, list[Edit]]:
    """Yield what the comment line of an XYZ file is to say, and return the edits that it has no words for."""
    of_comment = [edit for edit in edits if edit.key in COMMENT_KEYS]
    words = [f"{edit.key.rpartition('.')[2]}={edit.value}" for edit in of_comment if edit.value is not None]
    gone = [edit.key.rpartition(".")[2] for edit in of_comment if edit.value is None]
    if words:
        yield f"comment line: {' '.join(words)}"
    if gone:
        yield f"comment line: without {', '.join(gone)}"
    return [edit for edit in edits if edit.key not in COMMENT_KEYS]


def _table_depth(steps: tuple[str | int, ...]) -> int:
    """Return how many steps of a key name its table: one, or two in a list of tables."""
    if len(steps) == 1:
        return 0
    return 2 if isinstance(steps[1], int) else 1


def _toml_lines(table: tuple[str | int, ...], entries: list[tuple[tuple[str | int, ...], Json]]) -> Iterator[str]:
    if len(table) == 2:
        yield f"[[{table[0]}]]  # number {int(table[1]) + 1}"
    elif table and any(steps for steps, _ in entries):
        yield f"[{table[0]}]"
    yield from _entries(entries, toml_key, toml_value, " = ", "# without {}")


def _json_lines(table: tuple[str | int, ...], entries: list[tuple[tuple[str | int, ...], Json]]) -> Iterator[str]:
    place = f'in "{table[0]}"' if table else ""
    if len(table) == 2:
        place += f", number {int(table[1]) + 1}"
    if place:
        yield f"{place}:"
    yield from _entries(entries, json.dumps, json.dumps, ": ", "without {}")


def _entries(
    entries: list[tuple[tuple[str | int, ...], Json]],
    key: Callable[[str], str],
    value: Callable[[Json], str],
    joint: str,
    without: str,
) -> Iterator[str]:
    """Yield `name = value` lines; entries of one inner table share a line, removals are said in words."""
    merged: dict[str, Json] = {}
    for steps, new in entries:
        if not steps or new is None:
            yield without.format(".".join(str(step) for step in steps) or "this table")
        elif len(steps) == 1:
            merged[str(steps[0])] = new
        else:
            inner = merged.setdefault(str(steps[0]), {})
            assert isinstance(inner, dict)
            inner[".".join(str(step) for step in steps[1:])] = new
    for name, new in merged.items():
        yield f"{key(name)}{joint}{value(new)}"


def _atom_lines(edits: list[Edit], n_atoms: int | None, language: str, elsewhere: str) -> Iterator[str]:
    """Yield rows to write, each under a line that says where; rows are counted from 1 as in the messages."""
    mark = "# " if language == "toml" else ""
    home = f"{elsewhere}, " if elsewhere else ("" if language == "xyz" else "atoms, ")
    n_before = n_atoms
    for edit in edits:
        index = int(edit.key[len("species.atoms[") : -1])
        is_new = n_atoms is not None and index >= n_atoms
        if edit.value is None:
            yield f"{mark}{home}without row {index + 1}"
        else:
            yield f"{mark}{home}{'new row at the end' if is_new else f'row {index + 1}'}:"
            yield _row(edit.value, language)
        if n_atoms is not None:
            n_atoms += is_new - (edit.value is None)
    if language == "xyz" and n_atoms is not None and n_atoms != n_before:
        yield f"{home}count line: {n_atoms}"


def _row(value: Json, language: str) -> str:
    assert isinstance(value, list)
    symbol, *coordinates = value
    numbers = [number(float(x)) for x in coordinates if isinstance(x, int | float)]
    if language == "xyz":
        return "  ".join([str(symbol), *numbers])
    comma = "," if language == "toml" else ""
    return f"[{json.dumps(symbol)}, {', '.join(numbers)}]{comma}"
