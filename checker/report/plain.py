"""Text from a deck made safe to show, and numbers and keys as people write them."""

import json
import math
import re
from collections.abc import Iterable

from checker.findings import Grade, Json, Verdict

VERDICT_ORDER = (Verdict.CLEAR, Verdict.DOUBTFUL, Verdict.HALTED, Verdict.UNREADABLE)

_BARE_KEY = re.compile(r"[A-Za-z0-9_-]+\Z")
_KEY_STEP = re.compile(r"\[(\d+)\]|\"((?:[^\"\\]|\\.)*)\"|([^.\[\]\"]+)")


def plain(text: str) -> str:
    r"""Return `text` with every character that does not print written out.

    Control characters, characters that change the direction of writing and broken surrogates are among them.

    >>> plain("water\x1b[2J")
    'water\\x1b[2J'
    """
    if text.isprintable():
        return text
    return "".join(c if c.isprintable() else c.encode("unicode_escape").decode("ascii") for c in text)


def counted(n: int, singular: str, plural: str = "") -> str:
    """Return a number with its noun: "1 deck", "2 decks"."""
    return f"{n} {singular if n == 1 else plural or singular + 's'}"


def signed(charge: int) -> str:
    """Return a charge as chemists write the number: "+1", "-2", "0"."""
    return f"{charge:+d}" if charge else "0"


def shown(value: Json) -> str:
    """Return a value of the evidence in words: yes and no, lists with commas, reals to six digits."""
    if value is None:
        return "unknown"
    if isinstance(value, bool):
        return "yes" if value else "no"
    if isinstance(value, float):
        return f"{value:.6g}"
    if isinstance(value, list):
        return ", ".join(shown(item) for item in value) or "none"
    if isinstance(value, dict):
        return ", ".join(f"{plain(key)} {shown(item)}" for key, item in value.items()) or "none"
    return plain(str(value))


def evidence(found: Iterable[tuple[str, Json]]) -> str:
    """Return the evidence as one line: "electrons 9; multiplicity 1". What is not known is left out."""
    return "; ".join(f"{plain(key.replace('_', ' '))} {shown(value)}" for key, value in found if value is not None)


def grade_counts(grades: Iterable[Grade]) -> str:
    """Return how many of each grade there are, worst first: "1 halt, 2 notes"."""
    heard = list(grades)
    counts = ((grade, heard.count(grade)) for grade in sorted(Grade, reverse=True))
    return ", ".join(counted(n, grade.word) for grade, n in counts if n)


def split_key(key: str) -> tuple[str | int, ...]:
    """Split a deck key into names and list indices.

    >>> split_key("species.atoms[4]")
    ('species', 'atoms', 4)
    """
    return tuple(
        int(index) if index else (json.loads(f'"{quoted}"') if quoted else bare)
        for index, quoted, bare in _KEY_STEP.findall(key)
    )


def toml_key(name: str) -> str:
    """Return a name as a TOML key, quoted where it must be."""
    return name if _BARE_KEY.match(name) else toml_value(name)


def toml_value(value: Json) -> str:
    """Return a value as TOML on one line. None has no TOML and is not expected here."""
    if isinstance(value, bool):
        return "true" if value else "false"
    if isinstance(value, float):
        return number(value)
    if isinstance(value, str):
        return json.dumps(value, ensure_ascii=not value.isprintable())
    if isinstance(value, list):
        return f"[{', '.join(toml_value(item) for item in value)}]"
    if isinstance(value, dict):
        return f"{{ {', '.join(f'{toml_key(key)} = {toml_value(item)}' for key, item in value.items())} }}"
    return str(value)


def number(value: float) -> str:
    """Return a real number of a deck, to eight decimals at most; at least one, so that it stays a real number.

    >>> number(0.5700000000001), number(2.0), number(-0.0)
    ('0.57', '2.0', '0.0')
    """
    if not math.isfinite(value):
        return str(value)
    written = f"{value:.8f}".rstrip("0")
    written = written + "0" if written.endswith(".") else written
    return "0.0" if float(written) == 0 else written
