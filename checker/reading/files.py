"""Opens files, regular ones only, and says in a sentence why one cannot be read."""

# paths stay text here, as a Path would rewrite what was given and raise where os.path answers no
# ruff: noqa: PTH114, PTH116

import errno
import os
import stat
from collections.abc import Iterator
from typing import BinaryIO

from checker.errors import Complaint, UnreadableInput
from checker.reading.limits import CHUNK_BYTES, MAX_DECK_BYTES

IS_A_FOLDER = "this is a folder, but must be a file"
_NO_FILE = "there is no such file; check the path"
_DANGLING = "this is a link to a file that does not exist; mend the link"
_ERRORS = {
    errno.ENOENT: _NO_FILE,
    errno.ENOTDIR: "a part of this path is a file, not a folder; check the path",
    errno.EACCES: "this user has no right to read the file; ask its owner, or change its rights",
    errno.EPERM: "this user has no right to read the file; ask its owner, or change its rights",
    errno.ELOOP: "this path leads through links that go in a circle; mend the links",
    errno.ENAMETOOLONG: "the path is longer than this system allows; check it",
    errno.EISDIR: IS_A_FOLDER,
}
_KINDS = (
    (stat.S_ISDIR, IS_A_FOLDER),
    (stat.S_ISFIFO, "this is a named pipe, but must be a file; to pipe a deck in, give - as its name"),
    (stat.S_ISSOCK, "this is a socket, but must be a file"),
    (stat.S_ISCHR, "this is a device, but must be a file; to pipe a deck in, give - as its name"),
    (stat.S_ISBLK, "this is a device, but must be a file"),
)


def open_regular(path: str, file: str) -> BinaryIO:
    """Open a regular file for reading; `file` is what complaints call it.

    Pipes, sockets and devices are told by their kind before they are opened, and once more after, so that one put
    there in between is not read and does not block.
    """
    try:
        _refuse_irregular(os.stat(path).st_mode, file)
        flags = (
            os.O_RDONLY | getattr(os, "O_NONBLOCK", 0) | getattr(os, "O_NOCTTY", 0) | getattr(os, "O_BINARY", 0)
        )
        stream = os.fdopen(os.open(path, flags), "rb")
    except (OSError, ValueError) as error:
        raise UnreadableInput(Complaint(sentence_on_failure(error, path), file)) from None
    try:
        _refuse_irregular(os.fstat(stream.fileno()).st_mode, file)
    except UnreadableInput:
        stream.close()
        raise
    return stream


def read_whole(stream: BinaryIO, file: str) -> bytes:
    """Return what a stream holds, at most one byte more than a deck may have."""
    try:
        return stream.read(MAX_DECK_BYTES + 1)
    except (OSError, ValueError) as error:
        raise UnreadableInput(Complaint(sentence_on_failure(error, file), file)) from None


def chunks(stream: BinaryIO) -> Iterator[bytes]:
    """Yield a stream piece by piece, as it comes."""
    read = getattr(stream, "read1", stream.read)
    while chunk := read(CHUNK_BYTES):
        yield chunk


def sentence_on_failure(error: OSError | ValueError, path: str) -> str:
    """Return why a path cannot be opened or read, and what to do."""
    if not isinstance(error, OSError):  # the path holds a NUL, or what no file name can hold
        return "the path holds a character that no file name has; check the path"
    if error.errno == errno.ENOENT and os.path.islink(path):
        return _DANGLING
    reason = (error.strerror or "unknown reason").lower()
    return _ERRORS.get(error.errno or 0, f"the file cannot be read: {reason}; check the path and its rights")


def _refuse_irregular(mode: int, file: str) -> None:
    for is_kind, message in _KINDS:
        if is_kind(mode):
            raise UnreadableInput(Complaint(message, file))
    if not stat.S_ISREG(mode):
        raise UnreadableInput(Complaint("this is no regular file; copy its content into one", file))
