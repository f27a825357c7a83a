"""The frames of an XYZ stream, and the names that frames get."""

from collections.abc import Iterable, Iterator
from itertools import chain
from typing import TypeVar

from checker.errors import Complaint
from checker.reading.decoding import BYTE_ORDER_MARK, not_in, wide_encoding
from checker.reading.lines import LineStream
from checker.reading.xyz import BrokenFrame, Frame, read_frames

Item = TypeVar("Item")


def frames_of(pieces: Iterator[bytes], file: str) -> Iterator[Frame | BrokenFrame]:
    """Yield the frames of an XYZ file that comes piece by piece; at least one item."""
    try:
        head = next(pieces, b"")
    except OSError:
        head = b""  # the stream fails again when its lines are asked for
    wide = wide_encoding(head)
    if wide is not None:
        yield BrokenFrame((Complaint(not_in(wide), file),))
        return
    yield from read_frames(LineStream(chain([head.removeprefix(BYTE_ORDER_MARK)], pieces)), file)


def numbered(name: str, items: Iterable[Item]) -> Iterator[tuple[str, Item]]:
    """Pair items with the names of their decks: the name alone for a single one, else ``name#1``, ``name#2``, ...

    >>> list(numbered("a.xyz", "pq"))
    [('a.xyz#1', 'p'), ('a.xyz#2', 'q')]
    """
    rest = iter(items)
    ahead = [item for _, item in zip(range(2), rest, strict=False)]
    if len(ahead) == 1:
        yield name, ahead[0]
        return
    for number, item in enumerate(chain(ahead, rest), start=1):
        yield f"{name}#{number}", item
