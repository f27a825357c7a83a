"""From bytes to text: UTF-8, with or without a byte order mark, and nothing else."""

from checker.errors import Complaint, UnreadableInput
from checker.reading.limits import MAX_DECK_BYTES
from checker.reading.positions import LineTable

BYTE_ORDER_MARK = b"\xef\xbb\xbf"
EMPTY = "the file is empty; a deck holds at least deck_version and [species], an XYZ file at least one frame"
NUL_BYTE = "a NUL byte stands here, so the file is binary or damaged; a deck is plain text in UTF-8"

_MARKS = {
    b"\xff\xfe\x00\x00": "UTF-32",
    b"\x00\x00\xfe\xff": "UTF-32",
    b"\xff\xfe": "UTF-16",
    b"\xfe\xff": "UTF-16",
}


def decoded(raw: bytes, file: str) -> str:
    """Return the text without its byte order mark; raise UnreadableInput where it is no UTF-8 text or too long."""
    if len(raw) > MAX_DECK_BYTES:
        raise UnreadableInput(Complaint(too_large(), file))
    wide = wide_encoding(raw)
    if wide is not None:
        raise UnreadableInput(Complaint(not_in(wide), file))
    body = raw.removeprefix(BYTE_ORDER_MARK)
    if not body.strip():
        raise UnreadableInput(Complaint(EMPTY, file))
    nul = body.find(b"\0")
    if nul >= 0:
        raise UnreadableInput(Complaint(NUL_BYTE, file, *LineTable(body).place(nul)))
    try:
        return body.decode("utf-8")
    except UnicodeDecodeError as error:
        place = LineTable(body).place(error.start)
        raise UnreadableInput(Complaint(not_utf8(body[error.start]), file, *place)) from None


def wide_encoding(raw: bytes) -> str | None:
    """Return the name of an encoding of two or four bytes a character, seen from its mark or its NUL bytes."""
    for mark, name in _MARKS.items():
        if raw.startswith(mark):
            return name
    # without a mark: the first characters of a deck are ASCII, so their NUL bytes tell the width
    pattern = tuple(byte == 0 for byte in raw[:4])
    if pattern in ((False, True, True, True), (True, True, True, False)):
        return "UTF-32"
    if pattern in ((False, True, False, True), (True, False, True, False)):
        return "UTF-16"
    return None


def not_in(encoding: str) -> str:
    """Return the sentence about a text in a wide encoding."""
    return f"the file is encoded in {encoding}, but must be in UTF-8; save it again as UTF-8"


def not_utf8(byte: int) -> str:
    """Return the sentence about a byte that is no UTF-8."""
    return f"the byte 0x{byte:02X} is not UTF-8 text; save the file again as UTF-8"


def too_large() -> str:
    """Return the sentence about a deck above the limit."""
    return (
        f"the deck is larger than {MAX_DECK_BYTES // 1024**2} MiB, the most that is read of one; "
        "put the atoms into an XYZ file and name it in species.geometry"
    )
