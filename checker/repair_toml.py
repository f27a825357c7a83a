"""Edits of a deck in TOML, by a library that keeps comments, order and spacing."""

import math
import re
import tomllib
from typing import Any

from checker.errors import RepairRefused
from checker.findings import Edit, Json
from checker.repair_rows import in_style_of
from checker.report.plain import split_key, toml_value

MOST_ROUNDING = 10.0**-3  # a row in the deck's style may round the coordinates of an edit by less than this


def mended(text: str, edits: list[Edit]) -> str:
    """Return the text with the edits made and every other character kept.

    Raises RepairRefused where the edit cannot be made without touching anything else.
    """
    new = text
    for edit in edits:
        new = _edited(new, edit)
    if "\r\n" in text and not re.search(r"(?<!\r)\n", text):
        new = re.sub(r"(?<!\r)\n", "\r\n", new)
    wanted = tomllib.loads(text)
    for edit in edits:
        change(wanted, split_key(edit.key), edit.value)
    if not same(tomllib.loads(new), wanted):
        raise RepairRefused("the layout does not allow this repair to be written in; make the change by hand")
    return new


def change(plain: Any, steps: tuple[str | int, ...], value: Json) -> None:
    """Make an edit in plain mappings and lists; tables that are missing are made."""
    for step in steps[:-1]:
        plain = plain.setdefault(step, {}) if isinstance(step, str) else plain[step]
    last = steps[-1]
    try:
        if value is None:
            del plain[last]
        elif isinstance(last, int) and last == len(plain):
            plain.append(value)
        else:
            plain[last] = value
    except (KeyError, IndexError):
        raise RepairRefused(f"there is no {last!r} to change") from None


def same(one: Any, other: Any) -> bool:
    """Tell whether two decks say the same, up to the rounding of coordinates."""
    if isinstance(one, dict) and isinstance(other, dict):
        return one.keys() == other.keys() and all(same(one[key], other[key]) for key in one)
    if isinstance(one, list) and isinstance(other, list):
        return len(one) == len(other) and all(same(a, b) for a, b in zip(one, other, strict=True))
    if isinstance(one, float) or isinstance(other, float):
        numbers = isinstance(one, int | float) and isinstance(other, int | float)
        return numbers and math.isclose(one, other, rel_tol=0, abs_tol=MOST_ROUNDING)
    return bool(one == other) and type(one) is type(other)


def _edited(text: str, edit: Edit) -> str:
    import tomlkit

    steps = split_key(edit.key)
    beside_charge = _beside_charge(text, edit)
    if beside_charge is not None:
        return beside_charge
    document = tomlkit.parse(text)
    holder: Any = document
    value = edit.value
    for depth, step in enumerate(steps[:-1]):
        if isinstance(step, str) and step not in holder and holder is document:
            holder[step] = tomlkit.table()
        elif isinstance(step, str) and step not in holder and value is not None:
            value = _nested(steps[depth + 1 :], value)
            steps = steps[: depth + 1]
            break
        holder = holder[step]
    if value is None:
        change(holder, steps[-1:], None)
    else:
        _put(holder, steps[-1], value)
    return tomlkit.dumps(document)


def _nested(steps: tuple[str | int, ...], value: Json) -> Json:
    """Return the value inside tables of its own, one for each step."""
    for step in reversed(steps):
        value = {str(step): value}
    return value


def _put(holder: Any, last: str | int, value: Json) -> None:
    import tomlkit

    is_row = isinstance(last, int) and isinstance(value, list)
    template = holder[min(last, len(holder) - 1)].as_string() if is_row and len(holder) else ""
    item = tomlkit.value((in_style_of(template, value) if is_row else None) or toml_value(value))
    if isinstance(last, int) and last >= len(holder):
        holder.append(item)
    else:
        holder[last] = item


def _beside_charge(text: str, edit: Edit) -> str | None:
    """Write a multiplicity that the deck lacks on a line after the charge, where readers look for it."""
    from checker.reading.kinds import Kind
    from checker.reading.places import DeckPlaces

    places = DeckPlaces("", text, Kind.TOML)
    charge = places.value_range("species.charge")
    if edit.key != "species.multiplicity" or edit.value is None or charge is None:
        return None
    if places.value_range(edit.key) is not None:
        return None
    start = max(text.rfind("\n", 0, charge[0]), text.rfind("\r", 0, charge[0])) + 1
    line = re.match(r"([ \t]*(?:species[ \t]*\.[ \t]*)?)charge([ \t]*)=([ \t]*)", text[start : charge[0]])
    rest = re.compile(r"[ \t]*(?:#[^\r\n]*)?(\r\n|\n)").match(text, charge[1])
    if line is None or rest is None:
        return None
    aligned = "multiplicity".ljust(len("charge" + line[2]))
    key = aligned if len(aligned) > len("multiplicity") else "multiplicity" + line[2][:1]
    return f"{text[: rest.end()]}{line[1]}{key}={line[3]}{toml_value(edit.value)}{rest[1]}{text[rest.end() :]}"
