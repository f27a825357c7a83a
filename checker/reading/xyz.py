"""XYZ files, plain and extended: a stream of frames, each read or complained of on its own.

A frame at fault does not lose the ones behind it: reading goes on at the next count line wherever there is one.
"""

from collections.abc import Iterator
from dataclasses import dataclass, field

import numpy as np
from numpy.typing import NDArray

from checker.errors import Complaint
from checker.geometry import Geometry
from checker.reading.comment import PLAIN_LAYOUT, Comment, Layout, layout_of, read_comment
from checker.reading.decoding import EMPTY, not_utf8
from checker.reading.faults import in_order
from checker.reading.limits import BLOCK_ROWS, MAX_COMPLAINTS_PER_LIST, MAX_FRAME_ATOMS
from checker.reading.lines import BadLine, LineStream
from checker.reading.places import FramePlaces
from checker.reading.words import plural, shortened
from checker.reading.xyz_rows import Rows, is_count_line, read_row, read_rows

REST_NOT_READ = "; the rest of the file was not read"


@dataclass(frozen=True, slots=True, eq=False)
class Frame:
    """A frame that could be read, in the file's own length unit."""

    geometry: Geometry
    comment: Comment
    places: FramePlaces

    @property
    def said_in(self) -> str:
        """How reports name the comment line."""
        return f"line {self.places.first_line + 1} of {self.places.file}"


@dataclass(frozen=True, slots=True)
class BrokenFrame:
    """A frame that could not be read."""

    complaints: tuple[Complaint, ...]


class _OutOfStep(Exception):
    """Where the next frame begins cannot be told."""


@dataclass(slots=True)
class _Draft:
    """A frame while it is read."""

    file: str
    first_line: int
    n_atoms: int = 0
    n_rows: int = 0
    comment: Comment = field(default_factory=Comment)
    parts: list[Rows] = field(default_factory=list)
    complaints: list[Complaint] = field(default_factory=list)
    n_rows_at_fault: int = 0

    def complain(self, message: str, line: int | None, column: int | None = 1, key: str | None = None) -> None:
        self.complaints.append(Complaint(message, self.file, line, column, key))

    def add(self, part: Rows, rows: list[bytes]) -> None:
        """Add the atoms of a block of rows, or the complaints about it."""
        for index, message in part.faults:
            self.n_rows_at_fault += 1
            if self.n_rows_at_fault <= MAX_COMPLAINTS_PER_LIST:
                atom = self.n_rows + index
                indent = len(rows[index]) - len(rows[index].lstrip())
                self.complain(message, self.first_line + 2 + atom, indent + 1, f"species.atoms[{atom}]")
        self.n_rows += part.n
        self.parts.append(part)

    def finished(self) -> Frame | BrokenFrame:
        """Return the frame, or all there is to complain of."""
        n_left = self.n_rows_at_fault - MAX_COMPLAINTS_PER_LIST
        if n_left > 0:
            message = f"and {plural(n_left, 'more row')} of this frame; mend the first ones and check again"
            self.complain(message, self.first_line + 1 + self.n_rows)
        if self.complaints:
            return BrokenFrame(in_order(self.complaints))
        numbers, mass_numbers, coordinates, columns = _joined(self.parts)
        geometry = Geometry(numbers, coordinates, mass_numbers, self.comment.lattice, self.comment.periodic)
        places = FramePlaces(self.file, self.first_line, self.comment.columns, columns)
        return Frame(geometry, self.comment, places)


def read_frames(lines: LineStream, file: str) -> Iterator[Frame | BrokenFrame]:
    """Yield the frames of an XYZ file one by one; at least one item."""
    if not lines.skip_blank():
        yield BrokenFrame((Complaint(EMPTY, file),))
    while lines.skip_blank():
        draft = _Draft(file, lines.number)
        in_step = _read_into(draft, lines)
        yield draft.finished()
        if not in_step:
            return


def _read_into(draft: _Draft, lines: LineStream) -> bool:
    """Read a frame; return whether the lines stand at the next one."""
    try:
        _read_frame(draft, lines)
    except BadLine as bad:
        draft.complain(bad.message + REST_NOT_READ, bad.line, bad.column)
        return False
    except _OutOfStep:
        return False
    return True


def _read_frame(draft: _Draft, lines: LineStream) -> None:
    draft.n_atoms = _read_count(draft, lines)
    (comment_line,) = lines.take(1) or (None,)
    if comment_line is None:
        draft.complain(
            "the file ends after the number of atoms; a comment line and the atoms must follow", draft.first_line
        )
        return
    layout = _read_comment_line(draft, comment_line)
    _read_atoms(draft, lines, layout)
    if draft.n_rows == draft.n_atoms:
        n_surplus = _skip_surplus(lines, layout)
        if not n_surplus:
            return
        draft.complain(_disagreement(draft, draft.n_rows + n_surplus), draft.first_line)
    else:
        draft.complain(_disagreement(draft, draft.n_rows), draft.first_line)
    _seek_count_line(lines)


def _read_count(draft: _Draft, lines: LineStream) -> int:
    (line,) = lines.take(1)
    written = line.strip()
    if is_count_line(line) and len(written) <= 18 and 0 < int(written) <= MAX_FRAME_ATOMS:
        return int(written)
    column = len(line) - len(line.lstrip()) + 1
    shown = shortened(written.decode("utf-8", "replace"))
    if is_count_line(line) and not written.strip(b"0"):
        draft.complain("the count line says 0 atoms; a frame needs at least one", draft.first_line, column)
        return 0
    if is_count_line(line):
        most = f"at most {MAX_FRAME_ATOMS:,} a frame are read"
        message = f"the count line says {shown} atoms, but {most}{REST_NOT_READ}"
    else:
        message = f"expected the number of atoms alone on this line, found '{shown}'{REST_NOT_READ}"
    draft.complain(message, draft.first_line, column)
    raise _OutOfStep


def _read_comment_line(draft: _Draft, line: bytes) -> Layout:
    try:
        text = line.decode()
    except UnicodeDecodeError as error:
        column = len(line[: error.start].decode()) + 1
        draft.complain(not_utf8(line[error.start]), draft.first_line + 1, column)
        text = line.decode("utf-8", "replace")
    draft.comment = read_comment(text)
    for fault in draft.comment.faults:
        draft.complain(fault.message, draft.first_line + 1, fault.column, fault.key)
    layout = draft.comment.properties and layout_of(draft.comment.properties)
    return layout or PLAIN_LAYOUT


def _read_atoms(draft: _Draft, lines: LineStream, layout: Layout) -> None:
    """Read the rows of a frame block by block, up to one that is no atom."""
    while draft.n_rows < draft.n_atoms:
        rows = lines.take(min(draft.n_atoms - draft.n_rows, BLOCK_ROWS))
        if not rows:
            return
        part = read_rows(rows, layout)
        draft.add(part, rows)
        if part.n < len(rows):
            lines.give_back(len(rows) - part.n)
            return


def _skip_surplus(lines: LineStream, layout: Layout) -> int:
    """Skip and count the atom rows behind those of the count line."""
    n_surplus = 0
    while lines.skip_blank():
        row = lines.peek()
        if row is None or read_row(row, layout) is None:
            break
        lines.take(1)
        n_surplus += 1
    return n_surplus


def _seek_count_line(lines: LineStream) -> None:
    """Go to the next line that can be a count line, or to the end."""
    while lines.skip_blank():
        line = lines.peek()
        if line is not None and is_count_line(line):
            return
        lines.take(1)


def _disagreement(draft: _Draft, n_rows: int) -> str:
    verb = "follows" if n_rows == 1 else "follow"
    said = plural(draft.n_atoms, "atom")
    return (
        f"the count line says {said}, but {plural(n_rows, 'row')} of atoms {verb}; correct the count or the rows"
    )


def _joined(
    parts: list[Rows],
) -> tuple[NDArray[np.int64], NDArray[np.int64], NDArray[np.float64], NDArray[np.int32]]:
    if len(parts) == 1:
        (part,) = parts
        return part.numbers, part.mass_numbers, part.coordinates, part.columns
    return (
        np.concatenate([part.numbers for part in parts]),
        np.concatenate([part.mass_numbers for part in parts]),
        np.concatenate([part.coordinates for part in parts]),
        np.concatenate([part.columns for part in parts]),
    )
