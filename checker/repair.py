"""Writes a repair into a deck, keeping all else as it was, and takes it back if the deck is then unreadable."""

import stat
from dataclasses import dataclass, replace
from pathlib import Path

from checker.deck import UnreadableDeck
from checker.errors import RepairRefused
from checker.files import write_whole
from checker.findings import DeckReport, Edit, Repair
from checker.reading import FillIn, read_paths
from checker.reading.kinds import Kind, kind_by_look, kind_by_name

BYTE_ORDER_MARK = b"\xef\xbb\xbf"
ATOM_KEY = "species.atoms["


@dataclass(frozen=True, slots=True)
class Written:
    """What was done: the files changed, the repair's own sentence, and the options that still fill in."""

    files: tuple[str, ...]
    say: str
    fill_in: FillIn


@dataclass(frozen=True, slots=True)
class _Change:
    path: Path
    before: bytes
    after: bytes


def apply_repair(path: str, report: DeckReport, number: int, fill_in: FillIn) -> Written:
    """Write repair `number` of the report into the deck at `path`; edits of atoms go to the file that holds them.

    Raises RepairRefused, with the reason and the way out, where that cannot be done; every file is then as it was.
    """
    repair = _numbered(report, number)
    atoms_file = path if report.atoms_file in {None, report.deck} else str(report.atoms_file)
    _refuse_to_renumber(path, repair, fill_in)
    changes = [_change(file, edits) for file, edits in _by_file(path, atoms_file, repair).items()]
    left = _without_edited(fill_in, repair)
    done: list[_Change] = []
    try:
        for change in changes:
            _write(change.path, change.after)
            done.append(change)
        _insist_on_readable(path, left)
    except BaseException:
        for change in done:
            _write(change.path, change.before)
        raise
    return Written(tuple(str(change.path) for change in changes), repair.say, left)


def _numbered(report: DeckReport, number: int) -> Repair:
    repairs = {n: repair for finding in report.findings for n, repair in finding.numbered}
    if not repairs:
        raise RepairRefused(f"{report.deck} has no repairs to write; nothing was changed")
    if number not in repairs:
        numbers = "1" if len(repairs) == 1 else f"1 to {max(repairs)}"
        raise RepairRefused(f"{report.deck} has no repair {number}; its repairs are numbered {numbers}")
    if not repairs[number].edits:
        raise RepairRefused(f"repair {number} of {report.deck} is advice and has nothing to write")
    return repairs[number]


def _refuse_to_renumber(path: str, repair: Repair, fill_in: FillIn) -> None:
    """Refuse to take an atom out where the deck names later ones by number and the repair does not see to that."""
    gone = [int(edit.key[len(ATOM_KEY) : -1]) for edit in repair.edits if _is_atom(edit) and edit.value is None]
    if not gone:
        return
    for read in read_paths([path], fill_in=fill_in):
        if isinstance(read, UnreadableDeck):
            continue
        lists = {f"fragments[{i}].atoms": fragment.atoms for i, fragment in enumerate(read.job.fragments)}
        lists["species.ghost_atoms"] = read.job.species.ghost_atoms
        seen_to = {edit.key for edit in repair.edits}
        if any(number > min(gone) for key, named in lists.items() if key not in seen_to for number in named):
            raise RepairRefused(
                f"{path} names atoms by number in ghost_atoms or fragments, and taking atom {min(gone) + 1} out "
                "would shift them; make this change by hand"
            )


def _is_atom(edit: Edit) -> bool:
    return edit.key.startswith(ATOM_KEY)


def _by_file(path: str, atoms_file: str, repair: Repair) -> dict[str, list[Edit]]:
    """Group the edits by the file they go to, keeping their order."""
    by_file: dict[str, list[Edit]] = {}
    for edit in repair.edits:
        goes_along = _is_atom(edit) or (atoms_file != path and _only_in_comment(path, atoms_file, edit))
        by_file.setdefault(atoms_file if goes_along else path, []).append(edit)
    return by_file


def _only_in_comment(deck: str, geometry: str, edit: Edit) -> bool:
    """Tell whether the value is stated by the comment line of the geometry file and not by the deck."""
    from checker.reading.places import DeckPlaces
    from checker.repair_xyz import states

    if edit.key not in {"species.charge", "species.multiplicity"}:
        return False
    raw = _read(Path(deck))
    places = DeckPlaces(deck, _text(raw), _kind(Path(deck), raw))
    return places.value_range(edit.key) is None and states(_text(_read(Path(geometry))), edit.key)


def _change(file: str, edits: list[Edit]) -> _Change:
    path = Path(file)
    raw = _read(path)
    mark = raw[: len(BYTE_ORDER_MARK)] if raw.startswith(BYTE_ORDER_MARK) else b""
    return _Change(path, raw, mark + _mended(_text(raw), _kind(path, raw), edits, file).encode())


def _mended(text: str, kind: Kind, edits: list[Edit], file: str) -> str:
    if kind is Kind.TOML:
        from checker.repair_toml import mended
    elif kind is Kind.JSON:
        from checker.repair_json import mended
    else:
        from checker.repair_xyz import mended
    try:
        return mended(text, edits)
    except RepairRefused as refusal:
        raise RepairRefused(f"{file}: {refusal}; nothing was changed") from None


def _kind(path: Path, raw: bytes) -> Kind:
    return kind_by_name(path.name) or kind_by_look(raw)


def _read(path: Path) -> bytes:
    """Return the bytes of a plain file; a link may not lead out of the folder it stands in."""
    home = path.parent.resolve()
    if path.is_symlink() and not path.resolve().is_relative_to(home):
        raise RepairRefused(f"{path} is a link to a file outside its folder; mend the file it leads to")
    try:
        if not stat.S_ISREG(path.stat().st_mode):
            raise RepairRefused(f"{path} is no plain file; save the deck to one first")
        return path.read_bytes()
    except OSError as error:
        raise RepairRefused(f"{path} cannot be read again: {(error.strerror or str(error)).lower()}") from None


def _text(raw: bytes) -> str:
    return raw.removeprefix(BYTE_ORDER_MARK).decode("utf-8", "strict")


def _write(path: Path, content: bytes) -> None:
    try:
        write_whole(path, [content])
    except OSError as error:
        reason = (error.strerror or str(error)).lower()
        raise RepairRefused(f"{path} cannot be written: {reason}; nothing was changed") from None


def _insist_on_readable(deck: str, fill_in: FillIn) -> None:
    for read in read_paths([deck], fill_in=fill_in):
        if isinstance(read, UnreadableDeck):
            complaint = read.complaints[0].message
            raise RepairRefused(
                f"{deck} was left as it was, as it could not be read with this repair: {complaint}"
            )


def _without_edited(fill_in: FillIn, repair: Repair) -> FillIn:
    """Return the options that still have something to fill in; what the repair states they may not contradict."""
    keys = {edit.key for edit in repair.edits if edit.value is not None}
    return replace(
        fill_in,
        charge=None if "species.charge" in keys else fill_in.charge,
        multiplicity=None if "species.multiplicity" in keys else fill_in.multiplicity,
    )
