"""The lines of a stream, a chunk at a time, so that a file of any size is read in little memory."""

from collections.abc import Iterator

from checker.reading.decoding import NUL_BYTE
from checker.reading.limits import MAX_LINE_BYTES

TOO_LONG = f"the line is longer than {MAX_LINE_BYTES // 1024} KiB, the most that is read of one"


class BadLine(Exception):
    """A line that cannot be read, reached in its turn; nothing after it can be read either."""

    def __init__(self, message: str, line: int | None, column: int | None = None) -> None:
        super().__init__(message)
        self.message = message
        self.line = line
        self.column = column


class LineStream:
    """Lines as bytes without their ends (LF, CR LF or lone CR), numbered from 1.

    `number` is that of the next line. A read that fails, a NUL byte and an endless line raise BadLine when their
    turn comes, after all the lines before them.
    """

    def __init__(self, chunks: Iterator[bytes]) -> None:
        self.number = 1
        self._chunks = chunks
        self._lines: list[bytes] = []
        self._next = 0
        self._tail = b""
        self._bad: BadLine | None = None
        self._ended = False

    def take(self, n: int) -> list[bytes]:
        """Return the next `n` lines, or as many as there are."""
        while len(self._lines) - self._next < n and self._read_on():
            pass
        taken = self._lines[self._next : self._next + n]
        if len(taken) < n and self._bad:
            raise self._bad
        self._next += len(taken)
        self.number += len(taken)
        return taken

    def give_back(self, n: int) -> None:
        """Put the last `n` lines that were just taken back in front."""
        self._next -= n
        self.number -= n

    def peek(self) -> bytes | None:
        """Return the next line without taking it; None at the end and before a line that cannot be read."""
        while self._next == len(self._lines):
            if not self._read_on():
                return None
        return self._lines[self._next]

    def skip_blank(self) -> bool:
        """Go to the next line that is not blank; return whether there is one, readable or not."""
        while True:
            while self._next < len(self._lines):
                if self._lines[self._next].strip():
                    return True
                self._next += 1
                self.number += 1
            if not self._read_on():
                return self._bad is not None

    def _read_on(self) -> bool:
        """Add the lines of the next chunk; return False where there is nothing more to read."""
        if self._ended:
            return False
        chunk = self._next_chunk()
        text = self._tail + chunk
        held = b""
        if chunk and text.endswith(b"\r"):  # the LF that belongs to it may come with the next chunk
            text, held = text[:-1], b"\r"
        if b"\r" in text:
            text = text.replace(b"\r\n", b"\n").replace(b"\r", b"\n")
        lines = text.split(b"\n")
        self._tail = lines.pop() + held
        if not chunk and self._tail:
            lines.append(self._tail)
        self._append(lines, has_nul=b"\0" in text)
        return True

    def _next_chunk(self) -> bytes:
        try:
            chunk = next(self._chunks, b"")
        except OSError as error:
            self._bad = BadLine(f"reading stopped here: {(error.strerror or 'the device failed').lower()}", None)
            chunk = b""
        self._ended = not chunk
        return chunk

    def _append(self, lines: list[bytes], *, has_nul: bool) -> None:
        """Keep the lines up to the first that cannot be read."""
        first = self.number + len(self._lines) - self._next
        self._lines = self._lines[self._next :]
        self._next = 0
        suspects = [*lines, self._tail]
        if has_nul or max(map(len, suspects)) > MAX_LINE_BYTES:
            index = next(i for i, line in enumerate(suspects) if len(line) > MAX_LINE_BYTES or b"\0" in line)
            self._bad = _bad_line(suspects[index], first + index)
            self._ended = True
            lines = lines[:index]
        self._lines += lines


def _bad_line(line: bytes, number: int) -> BadLine:
    nul = line.find(b"\0")
    if 0 <= nul < MAX_LINE_BYTES:
        return BadLine(NUL_BYTE, number, len(line[:nul].decode("utf-8", "replace")) + 1)
    return BadLine(TOO_LONG, number, 1)
