"""Rows of atoms in an XYZ file: all at once where they are well formed, else one by one with a sentence each."""

import math
import re
from collections.abc import Sequence
from functools import lru_cache
from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from checker.reading.comment import Layout
from checker.reading.decoding import not_utf8
from checker.reading.limits import MAX_COMPLAINTS_PER_LIST, MAX_COORDINATE_ANGSTROM
from checker.reading.reals import real, reals
from checker.reading.rows import sentence_on_size
from checker.reading.symbols import Nuclide, nuclide, sentence_on_number, sentence_on_symbol
from checker.reading.words import plural, quoted


class Rows(NamedTuple):
    """The atoms of some rows. Where `faults` (row from 0, sentence) is not empty, the arrays are."""

    n: int
    numbers: NDArray[np.int64]
    mass_numbers: NDArray[np.int64]
    coordinates: NDArray[np.float64]
    columns: NDArray[np.int32]
    faults: tuple[tuple[int, str], ...] = ()


class Atom(NamedTuple):
    """One atom: its element, and x, y, z as written in the file."""

    nuclide: Nuclide
    xyz: tuple[float, float, float]


def read_rows(rows: list[bytes], layout: Layout) -> Rows:
    """Read rows up to the first that is blank or a count line; `n` tells how many that are."""
    return _read_at_once(rows, layout) or _read_one_by_one(rows, layout)


def is_count_line(line: bytes) -> bool:
    """Return whether a line is a whole number and nothing else."""
    return line.strip().isdigit()


def read_row(row: bytes, layout: Layout) -> Atom | None:
    """Return the atom of a row, or None where anything is wrong with it."""
    tokens = row.split()
    if len(tokens) < layout.width:
        return None
    found = _nuclide(tokens[layout.element])
    try:
        x, y, z = (real(token) for token in tokens[layout.x : layout.x + 3])
    except ValueError:
        return None
    # so written that NaN fails too
    within = abs(x) <= MAX_COORDINATE_ANGSTROM and abs(y) <= MAX_COORDINATE_ANGSTROM
    return Atom(found, (x, y, z)) if found and within and abs(z) <= MAX_COORDINATE_ANGSTROM else None


def _sentence_on_row(row: bytes, layout: Layout) -> str:
    """Return all that is wrong with a row at fault, in one sentence."""
    tokens = row.split()
    if len(tokens) < layout.width:
        needed = "element, x, y, z" if layout.width == 4 else "the columns that Properties names"
        return f"the row of this atom has {plural(len(tokens), 'column')}, but needs {layout.width}: {needed}"
    try:
        written = tokens[layout.element].decode()
    except UnicodeDecodeError as error:
        return not_utf8(error.object[error.start])
    parts = ["" if nuclide(written) else _sentence_on_element(written)]
    parts += map(_sentence_on_coordinate, "xyz", tokens[layout.x : layout.x + 3])
    return "; ".join(filter(None, parts))


def _read_at_once(rows: list[bytes], layout: Layout) -> Rows | None:
    """Read all rows column by column; None where any is at fault, blank or a count line."""
    split = [row.split() for row in rows]
    if not split or min(map(len, split)) < layout.width:
        return None
    columns = list(zip(*split, strict=False))  # a row may have columns of its own at its end
    symbols = columns[layout.element]
    distinct = set(symbols)
    known = {written: found for written in distinct if (found := _nuclide(written))}
    if len(known) < len(distinct):
        return None
    xs, ys, zs = columns[layout.x : layout.x + 3]
    try:
        axes = np.array(reals(xs + ys + zs)).reshape(3, len(rows))
    except ValueError:
        return None
    if not np.abs(axes).max() <= MAX_COORDINATE_ANGSTROM:  # so written that NaN fails too
        return None
    return _rows([known[written] for written in symbols], np.ascontiguousarray(axes.T), rows, layout)


def _rows(found: Sequence[Nuclide], coordinates: NDArray[np.float64], rows: list[bytes], layout: Layout) -> Rows:
    numbers, mass_numbers = zip(*found, strict=True)
    return Rows(
        len(found),
        np.array(numbers, dtype=np.int64),
        np.array(mass_numbers, dtype=np.int64) if any(mass_numbers) else np.zeros(len(found), dtype=np.int64),
        coordinates,
        np.array(_columns(rows, layout.element), dtype=np.int32),
    )


def _read_one_by_one(rows: list[bytes], layout: Layout) -> Rows:
    atoms: list[Atom] = []
    faults: list[tuple[int, str]] = []
    n = 0
    for row in rows:
        if not row.strip() or is_count_line(row):
            break
        atom = read_row(row, layout)
        if atom:
            atoms.append(atom)
        else:  # only the first sentences are shown, and a sentence costs time
            faults.append((n, _sentence_on_row(row, layout) if len(faults) < MAX_COMPLAINTS_PER_LIST else ""))
        n += 1
    if faults or not atoms:
        return Rows(n, *_no_arrays(), tuple(faults))
    return _rows([atom.nuclide for atom in atoms], np.array([atom.xyz for atom in atoms]), rows[:n], layout)


def _columns(rows: list[bytes], element: int) -> list[int]:
    """Return the column, from 1 and in characters, where the element of each row begins."""
    if not element:
        return [len(row) - len(row.lstrip()) + 1 for row in rows]
    before = re.compile(rb"\s*(?:\S+\s+){%d}" % element)
    ends = [found.end() if (found := before.match(row)) else 0 for row in rows]
    return [len(row[:end].decode("utf-8", "replace")) + 1 for row, end in zip(rows, ends, strict=True)]


@lru_cache(maxsize=4096)
def _nuclide(written: bytes) -> Nuclide | None:
    return nuclide(written.decode()) if written.isascii() else None


def _sentence_on_element(written: str) -> str:
    if written.isascii() and written.isdigit():
        return sentence_on_number(int(written[:9]))
    return sentence_on_symbol(written)


def _sentence_on_coordinate(axis: str, token: bytes) -> str:
    shown = quoted(token.decode("utf-8", "replace"))
    try:
        value = real(token)
    except ValueError:
        return f"{axis} is {shown}, but must be a number"
    if not math.isfinite(value):
        return f"{axis} is {shown}, but must be a finite number"
    return sentence_on_size(axis, shown) if abs(value) > MAX_COORDINATE_ANGSTROM else ""


def _no_arrays() -> tuple[NDArray[np.int64], NDArray[np.int64], NDArray[np.float64], NDArray[np.int32]]:
    return np.zeros(0, np.int64), np.zeros(0, np.int64), np.zeros((0, 3)), np.zeros(0, np.int32)
