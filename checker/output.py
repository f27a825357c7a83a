"""Where text goes: the terminal, a pipe or a file, and what each can show."""

import os
import shutil
import sys
from collections.abc import Iterable
from pathlib import Path

from checker.errors import HundsightError
from checker.files import write_whole
from checker.findings import Grade
from checker.progress import Progress
from checker.report import Look
from checker.report.plain import plain

PLAIN_WIDTH = 80


_NO_STDOUT = "standard output is closed, so there is nowhere to write; open it, or give --output FILE"


class ReaderLeft(HundsightError):
    """The program that read our output through a pipe wants no more of it."""


class NotWritten(HundsightError):
    """Standard output takes nothing, with the reason."""


def text_width() -> int:
    """Return the width of the terminal; of a pipe what COLUMNS says, else 80."""
    return shutil.get_terminal_size((PLAIN_WIDTH, 24)).columns


def look_of_stdout(stop_at: Grade, *, quiet: bool) -> Look:
    """Return what standard output can show."""
    encoding = (getattr(sys.stdout, "encoding", None) or "utf-8").lower().replace("-", "")
    return Look(
        stop_at=stop_at,
        width=text_width(),
        colour=_wants_colour(),
        symbols=encoding.startswith("utf"),
        quiet=quiet,
    )


def look_of_file(stop_at: Grade, *, quiet: bool) -> Look:
    """Return what a file can show: no colour, and the width that COLUMNS says, else 80."""
    columns = os.environ.get("COLUMNS", "")
    width = int(columns) if columns.isdecimal() and int(columns) else PLAIN_WIDTH
    return Look(stop_at=stop_at, width=width, quiet=quiet)


def progress(n_files: int, *, quiet: bool) -> Progress:
    """Return the line of progress; it stays away unless standard error is a terminal that can take it back."""
    shows = sys.stderr is not None and sys.stderr.isatty() and os.environ.get("TERM") != "dumb" and not quiet
    return Progress(sys.stderr if shows else None, n_files)


def to_stdout(pieces: Iterable[str], progress: Progress | None = None) -> None:
    """Write pieces to standard output as they come; what its encoding lacks is written out as an escape.

    Raises ReaderLeft where the other end of a pipe is closed, NotWritten where nothing can be written.
    """
    if sys.stdout is None:
        raise NotWritten(_NO_STDOUT)
    encoding = getattr(sys.stdout, "encoding", None) or "utf-8"
    same_screen = sys.stdout.isatty()
    for piece in pieces:
        if progress is not None and same_screen:
            progress.hide()
        _put(piece if piece.isascii() else piece.encode(encoding, "backslashreplace").decode(encoding))
    if progress is not None:
        progress.hide()
    _put("", flush=True)


def _put(text: str, *, flush: bool = False) -> None:
    try:
        sys.stdout.write(text)
        if flush:
            sys.stdout.flush()
    except BrokenPipeError:
        raise ReaderLeft from None
    except OSError as error:
        reason = (error.strerror or str(error)).lower()
        raise NotWritten(f"standard output cannot be written: {reason}; the report is not complete") from None


def to_file(file: str, pieces: Iterable[str], progress: Progress | None = None) -> None:
    """Write pieces to a file in UTF-8, whole or not at all; raise HundsightError if it cannot be written."""
    try:
        write_whole(Path(file), (piece.encode("utf-8", "backslashreplace") for piece in pieces))
    except OSError as error:
        reason = (error.strerror or str(error)).lower()
        raise HundsightError(
            f"--output {file}: {reason}; give a file in a folder that can be written to"
        ) from None
    finally:
        if progress is not None:
            progress.hide()


def _wants_colour() -> bool:
    """Tell whether colour is welcome: on a terminal, unless NO_COLOR (no-color.org) or TERM=dumb is set."""
    if sys.stdout is None or not sys.stdout.isatty():
        return False
    return not os.environ.get("NO_COLOR") and os.environ.get("TERM") != "dumb"


def to_stderr(sentence: str) -> None:
    """Write one sentence about the call, not about a deck, to standard error."""
    if sys.stderr is not None:  # closed by the caller, who wants to hear nothing
        sys.stderr.write(f"{plain(sentence)}\n")
