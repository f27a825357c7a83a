"""Atoms written in the deck itself: rows of element and x, y, z."""

import math
from collections.abc import Iterable, Sequence
from itertools import chain
from typing import Any

import numpy as np

from checker.geometry import ANGSTROM_PER_BOHR, Geometry
from checker.reading.faults import Fault, cut_short
from checker.reading.limits import MAX_COMPLAINTS_PER_LIST, MAX_COORDINATE_ANGSTROM
from checker.reading.symbols import Nuclide, nuclide, nuclide_of_number, sentence_on_number, sentence_on_symbol
from checker.reading.words import described, plural

ATOMS = ("species", "atoms")
_ROW = 'a row is ["O", x, y, z]'


def geometry_of_rows(rows: object, length_unit: object) -> Geometry | list[Fault]:
    """Return the geometry of inline atoms in angstrom, or what is wrong with them, row by row."""
    if not isinstance(rows, list):
        return [Fault(ATOMS, f"species.atoms is {described(rows)}, but must be a list of rows; {_ROW}")]
    if not rows:
        return [Fault(ATOMS, f"species.atoms is empty; a deck needs at least one atom, and {_ROW}")]
    scale = ANGSTROM_PER_BOHR if length_unit == "bohr" else 1.0
    read = _read_at_once(rows, scale)
    if read is not None:
        return read
    bad = [index for index, row in enumerate(rows) if _read_at_once([row], scale) is None]
    shown = bad[: MAX_COMPLAINTS_PER_LIST + 1]  # the last one marks where the rest begins
    faults = [Fault((*ATOMS, index), _sentence_on_row(rows[index], scale)) for index in shown]
    return cut_short(faults, "species.atoms", len(bad))


def geometry_of(nuclides: Iterable[Nuclide], coordinates: Any) -> Geometry:
    """Make a geometry of nuclides and (n, 3) coordinates in angstrom."""
    pairs = np.array(list(nuclides), dtype=np.int64)
    return Geometry(
        numbers=np.ascontiguousarray(pairs[:, 0]),
        coordinates=coordinates,
        mass_numbers=np.ascontiguousarray(pairs[:, 1]),
    )


def _read_at_once(rows: list[Any], scale: float) -> Geometry | None:
    """Read all rows column by column; None where any row is at fault."""
    if set(map(type, rows)) != {list} or set(map(len, rows)) != {4}:
        return None
    symbols, *axes = zip(*rows, strict=True)
    if not (_all_of(symbols, {str, int}) and all(_all_of(axis, {int, float}) for axis in axes)):
        return None
    distinct = set(symbols)
    known = {written: found for written in distinct if (found := _nuclide(written))}
    if len(known) < len(distinct):
        return None
    try:
        coordinates = np.array(axes, dtype=float).T * scale
    except OverflowError:  # a whole number beyond all floats
        return None
    if not np.abs(coordinates).max() <= MAX_COORDINATE_ANGSTROM:  # so written that NaN fails too
        return None
    return geometry_of((known[written] for written in symbols), np.ascontiguousarray(coordinates))


def _all_of(values: Sequence[object], types: set[type]) -> bool:
    return set(map(type, values)) <= types  # type, not isinstance: true is no number


def _nuclide(written: str | int) -> Nuclide | None:
    return nuclide(written) if isinstance(written, str) else nuclide_of_number(written)


def _sentence_on_row(row: object, scale: float) -> str:
    """Return what is wrong with a row, all in one sentence, or nothing."""
    if not isinstance(row, list):
        return f"the row of this atom is {described(row)}, but must be a list; {_ROW}"
    if len(row) != 4:
        return f"the row of this atom has {plural(len(row), 'item')}, but must have 4; {_ROW}"
    parts = chain([_sentence_on_element(row[0])], map(_sentence_on_coordinate, "xyz", row[1:], [scale] * 3))
    return "; ".join(filter(None, parts))


def _sentence_on_element(written: object) -> str:
    if isinstance(written, str):
        return "" if nuclide(written) else sentence_on_symbol(written)
    if isinstance(written, int) and not isinstance(written, bool):
        return "" if nuclide_of_number(written) else sentence_on_number(written)
    return f"the element is {described(written)}, but must be a symbol in quotes or an atomic number"


def _sentence_on_coordinate(axis: str, value: object, scale: float) -> str:
    if isinstance(value, bool) or not isinstance(value, int | float):
        unquoted = (
            f"; write {value.strip()}, without quotes" if isinstance(value, str) and _is_number(value) else ""
        )
        return f"{axis} is {described(value)}, but must be a number{unquoted}"
    if isinstance(value, float) and not math.isfinite(value):
        return f"{axis} is {value}, but must be a finite number"
    return sentence_on_size(axis, described(value)) if abs(value) > MAX_COORDINATE_ANGSTROM / scale else ""


def sentence_on_size(axis: str, shown: str) -> str:
    """Return the complaint about a coordinate beyond the limit."""
    return f"{axis} is {shown}, beyond {MAX_COORDINATE_ANGSTROM:,.0f} angstrom; correct the number"


def _is_number(text: str) -> bool:
    try:
        return len(text) < 30 and math.isfinite(float(text))
    except ValueError:
        return False
