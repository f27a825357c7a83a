"""Edits of an XYZ file of one frame: words of the comment line, rows of atoms, and the count above them."""

import re

from checker.errors import RepairRefused
from checker.findings import Edit, Json
from checker.repair_rows import in_no_style, in_style_of
from checker.report.deck_lines import COMMENT_KEYS

_ATOM = re.compile(r"species\.atoms\[(\d{1,9})\]\Z")
_COLUMNS = re.compile(r"(?i)(?<!\S)properties\s*=\s*(\S+)")
_PLAIN_COLUMNS = re.compile(r"(?i)\"?species:S:1:pos:R:3\"?\Z")
_N_HEAD = 2  # the count line and the comment line


def states(text: str, key: str) -> bool:
    """Tell whether the comment line of the first frame states a key, ``species.charge`` or ``.multiplicity``."""
    lines = text.splitlines(keepends=True)
    return len(lines) >= _N_HEAD and _word(key).search(lines[1]) is not None


def mended(text: str, edits: list[Edit]) -> str:
    """Return the text with the edits made and every other character kept.

    Raises RepairRefused for keys that an XYZ file cannot hold and for files of several frames.
    """
    lines = text.splitlines(keepends=True)
    if len(lines) < _N_HEAD or not lines[0].strip().isdigit():
        raise RepairRefused("the file no longer begins with a count line and a comment line")
    if any(line.strip() for line in lines[_N_HEAD + int(lines[0]) :]):
        raise RepairRefused("the file holds several frames; split the one to be mended off into a file of its own")
    for edit in edits:
        atom = _ATOM.match(edit.key)
        if atom:
            _edit_atom(lines, int(atom[1]), edit.value)
        elif edit.key in COMMENT_KEYS:
            lines[1] = _with_word(lines[1], edit)
        else:
            raise RepairRefused(
                f"an XYZ file has no place for {edit.key}; write a deck that names the file as its geometry"
            )
    return "".join(lines)


def _word(key: str) -> re.Pattern[str]:
    return re.compile(rf"(?i)(?<!\S){key.rpartition('.')[2]}\s*=\s*(\"[^\"]*\"|'[^']*'|[^\s\"']+)")


def _with_word(line: str, edit: Edit) -> str:
    """Return the comment line with a `key=value` word replaced, taken out, or added at its end."""
    body, end = _split_end(line)
    found = _word(edit.key).search(body)
    name = edit.key.rpartition(".")[2]
    if edit.value is None:
        return (_word(edit.key).sub("", body, count=1).strip() if found else body) + end
    if found:
        return f"{body[: found.start(1)]}{edit.value}{body[found.end(1) :]}{end}"
    joint = "" if not body or body[-1].isspace() else " "
    return f"{body}{joint}{name}={edit.value}{end}"


def _edit_atom(lines: list[str], index: int, value: Json) -> None:
    n_atoms = int(lines[0])
    at = _N_HEAD + index
    columns = _COLUMNS.search(lines[1])
    if columns and not _PLAIN_COLUMNS.match(columns[1]):
        raise RepairRefused("the rows hold more than element and coordinates; change the row by hand")
    if value is None and index < n_atoms:
        del lines[at]
        _count(lines, n_atoms - 1)
    elif value is not None and index < n_atoms:
        end = _split_end(lines[at])[1]
        lines[at] = _row(_split_end(lines[at])[0], value) + end
    elif value is not None and index == n_atoms:
        _append(lines, value)
        _count(lines, n_atoms + 1)
    else:
        raise RepairRefused(f"there is no atom {index + 1}, as the file has {n_atoms}")


def _append(lines: list[str], value: Json) -> None:
    """Add a row after the last atom, with the line ends that the file has."""
    at = _N_HEAD + int(lines[0])
    body, end = _split_end(lines[at - 1])
    lines[at - 1] = body + (end or _split_end(lines[0])[1])
    template = body if at > _N_HEAD else ""
    lines.insert(at, _row(template, value) + end)


def _row(template: str, value: Json) -> str:
    if len(template.split()) > 4:
        raise RepairRefused("the rows hold more than element and coordinates; change the row by hand")
    symbol, coordinates = in_no_style(value)
    return in_style_of(template, value) or "  ".join([symbol, *coordinates])


def _count(lines: list[str], n_atoms: int) -> None:
    lines[0] = re.sub(r"\d+", str(n_atoms), lines[0], count=1)


def _split_end(line: str) -> tuple[str, str]:
    body = line.rstrip("\r\n")
    return body, line[len(body) :]
