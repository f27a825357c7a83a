"""What kind of text an input is: told by the suffix, else by how it begins."""

import enum
import re
from pathlib import PurePath

from checker.reading.decoding import BYTE_ORDER_MARK

_COUNT_LINE = re.compile(rb"[ \t]*[0-9]+[ \t\f\v]*[\r\n]")


class Kind(enum.Enum):
    """The languages a deck is written in."""

    TOML = "TOML"
    JSON = "JSON"
    XYZ = "XYZ"


KIND_BY_SUFFIX = {".toml": Kind.TOML, ".json": Kind.JSON, ".xyz": Kind.XYZ, ".extxyz": Kind.XYZ}
GEOMETRY_SUFFIXES = (".xyz", ".extxyz")


def kind_by_name(name: str) -> Kind | None:
    """Return the kind that the suffix of a file name tells, or None."""
    return KIND_BY_SUFFIX.get(PurePath(name).suffix.lower())


def kind_by_look(head: bytes) -> Kind:
    """Return the kind that the beginning of a text tells: an object, a number alone on its line, else TOML."""
    text = head.removeprefix(BYTE_ORDER_MARK).lstrip()
    if text.startswith(b"{"):
        return Kind.JSON
    return Kind.XYZ if _COUNT_LINE.match(text + b"\n") else Kind.TOML
