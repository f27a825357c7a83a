"""Rows of atoms written in the style of the rows around them."""

import re

from checker.errors import RepairRefused
from checker.findings import Json
from checker.report.plain import number

FEWEST_DECIMALS = 3  # a style with fewer would move the atom
_TOKEN = re.compile(r"([\s,\[]*)(\"[A-Za-z]+\"|'[A-Za-z]+'|[A-Za-z]+|[-+]?\d+\.\d+)")


def atom_of(value: Json) -> tuple[str, list[float]]:
    """Return symbol and coordinates of an atom as an edit gives it."""
    if isinstance(value, list) and len(value) == 4 and isinstance(value[0], str):
        coordinates = [float(x) for x in value[1:] if isinstance(x, int | float)]
        if len(coordinates) == 3:
            return value[0], coordinates
    raise RepairRefused("the repair's atom is not a symbol with three coordinates")


def in_style_of(template: str, value: Json) -> str | None:
    """Return the row `template` with another atom in it: the same columns, quotes and number of decimals.

    None where the numbers of the template are not written alike, or too coarsely to hold the atom's place.
    """
    symbol, coordinates = atom_of(value)
    tokens = list(_TOKEN.finditer(template))[:4]
    decimals = {len(token[2].partition(".")[2]) for token in tokens[1:]}
    if len(tokens) != 4 or len(decimals) != 1 or min(decimals) < FEWEST_DECIMALS:
        return None
    n_decimals = decimals.pop()
    quote = tokens[0][2][0] if tokens[0][2][0] in "\"'" else ""
    row = f"{tokens[0][1]}{quote}{symbol}{quote}"
    for token, coordinate in zip(tokens[1:], coordinates, strict=True):
        row += token[1].strip()
        space = " " if token[1][-1:].isspace() else ""
        written = f"{round(coordinate, n_decimals) + 0.0:.{n_decimals}f}"
        row += space + written.rjust(token.end() - len(row) - len(space))
    return row + template[tokens[-1].end() :]


def in_no_style(value: Json) -> tuple[str, list[str]]:
    """Return symbol and coordinates as text of their own precision."""
    symbol, coordinates = atom_of(value)
    return symbol, [number(x) for x in coordinates]
