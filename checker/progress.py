"""A line on the terminal that tells how far a long run is; it appears after a second and goes when it is done."""

import time
from typing import TextIO

PATIENCE_SECONDS = 1.0
BETWEEN_SECONDS = 0.1
BAR_WIDTH = 24
CLEAR_LINE = "\r\x1b[K"


class Progress:
    """Counts decks; `n_files` draws a bar where the number of files is known and greater than one."""

    def __init__(self, stream: TextIO | None, n_files: int | None = None) -> None:
        self._stream = stream
        self._n_files = n_files if n_files and n_files > 1 else None
        self._files: set[str] = set()
        self._n_decks = 0
        self._n_not_clear = 0
        self._start = time.monotonic()
        self._last = 0.0
        self._visible = False

    def count(self, file: str, *, clear: bool) -> None:
        """Count one deck of a file, and show the line if it is time to."""
        if self._stream is None:
            return
        self._n_decks += 1
        self._n_not_clear += not clear
        if self._n_files is not None:
            self._files.add(file)
        now = time.monotonic()
        if now - self._start >= PATIENCE_SECONDS and now - self._last >= BETWEEN_SECONDS:
            self._last = now
            self._show()

    def hide(self) -> None:
        """Take the line away, so that other text can be written."""
        if self._visible and self._stream is not None:
            self._stream.write(CLEAR_LINE)
            self._stream.flush()
            self._visible = False

    def _show(self) -> None:
        assert self._stream is not None
        self._stream.write(f"{CLEAR_LINE}{self._bar()}{self._n_decks} decks judged, {self._n_not_clear} not clear")
        self._stream.flush()
        self._visible = True

    def _bar(self) -> str:
        if self._n_files is None:
            return ""
        done = min(len(self._files), self._n_files)
        filled = BAR_WIDTH * done // self._n_files
        return f"{'=' * filled}{'.' * (BAR_WIDTH - filled)} {done} of {self._n_files} files, "
