"""Rebuild checker/tables/basis_sets.csv. Run by hand, a minute: ``python tests/rebuild/basis_sets.py``.

Takes every set of the catalogue that the library `basis_set_exchange` ships, in its latest version: for each
element the primitive and the contracted functions by angular momentum. A combined shell (sp) counts in each of its
angular momenta, a general contraction with each of its columns. Sets of one content and role that are each other's
second name share a row. The electrons replaced by core potentials stand in core_potentials.csv, not here.
The test `tests/outside/test_basis_sets.py` compares the shipped table with the installed catalogue again.
"""

from collections import Counter, defaultdict
from pathlib import Path
from typing import Any

import basis_set_exchange

TABLE = Path(__file__).parents[2] / "checker" / "tables" / "basis_sets.csv"
HEADER = """\
# Shells of basis sets; edition 1, 2026-12-01; unit: functions per atom, radial parts only (one p shell is 1p).
# From the catalogue of the library basis_set_exchange {version}. Rebuilt by tests/rebuild/basis_sets.py.
# Columns are divided by |; several names of one set by a semicolon and a space.
# cartesian: angular momenta for which the set is made for cartesian functions; spherical for the others.
# contents: ELEMENTS:PRIMITIVE/CONTRACTED by atomic number, 1+3-10 is 1 and 3 to 10; - is a core potential alone.
"""
LETTERS = "spdfghiklm"
POTENTIAL_ONLY = "potential"

Entry = dict[str, Any]


def counts(shells: list[Entry]) -> tuple[Counter[int], Counter[int]]:
    """Return primitive and contracted functions by angular momentum."""
    primitive: Counter[int] = Counter()
    contracted: Counter[int] = Counter()
    for shell in shells:
        momenta, columns = shell["angular_momentum"], len(shell["coefficients"])
        if len(momenta) > 1 and len(momenta) != columns:
            raise ValueError(f"a combined shell {momenta} has {columns} columns")
        for momentum in momenta:
            primitive[momentum] += len(shell["exponents"])
            contracted[momentum] += columns if len(momenta) == 1 else 1
    return primitive, contracted


def written(shells: list[Entry]) -> str:
    """Return shells as 9s4p1d/3s2p1d, primitive before contracted."""
    primitive, contracted = counts(shells)
    return "/".join(
        "".join(f"{found[momentum]}{LETTERS[momentum]}" for momentum in sorted(found))
        for found in (primitive, contracted)
    )


def ranges(numbers: list[int]) -> str:
    """Write ascending numbers as 1+3-10."""
    runs: list[list[int]] = []
    for number in numbers:
        if runs and runs[-1][1] == number - 1:
            runs[-1][1] = number
        else:
            runs.append([number, number])
    return "+".join(str(a) if a == b else f"{a}-{b}" for a, b in runs)


def contents(elements: dict[str, Entry]) -> str:
    """Return the elements of a set, grouped by what they have."""
    groups: dict[str, list[int]] = defaultdict(list)
    for z in sorted(elements, key=int):
        shells = elements[z].get("electron_shells")
        groups[written(shells) if shells else "-"].append(int(z))
    return " ".join(f"{ranges(numbers)}:{shells}" for shells, numbers in groups.items())


def cartesian(elements: dict[str, Entry]) -> str:
    """Return the angular momenta that are cartesian for most of the elements that have them.

    The catalogue mixes both forms within one angular momentum in 6-311G* and its relatives only: Na to Ar are
    marked cartesian there and the other elements spherical, which no calculation does.
    """
    votes: Counter[int] = Counter()
    for held in elements.values():
        forms = {
            (momentum, shell["function_type"] == "gto_cartesian")
            for shell in held.get("electron_shells", ())
            for momentum in shell["angular_momentum"]
            if momentum > 1
        }
        for momentum, is_cartesian in forms:
            votes[momentum] += 1 if is_cartesian else -1
    return " ".join(str(momentum) for momentum in sorted(votes) if votes[momentum] > 0)


def rows() -> list[tuple[str, str, str, str]]:
    """Return (names, role, cartesian, contents) of all sets, in the catalogue's order."""
    catalogue = basis_set_exchange.get_metadata().values()
    shared: dict[tuple[str, ...], list[str]] = {}
    for entry in catalogue:
        name = entry["display_name"]
        elements = basis_set_exchange.get_basis(name)["elements"]
        has_shells = any("electron_shells" in held for held in elements.values())
        role = entry["role"] if has_shells else POTENTIAL_ONLY
        same_set = min([name, *entry["other_names"]])
        shared.setdefault((same_set, role, cartesian(elements), contents(elements)), []).append(name)
    return [("; ".join(names), *held) for (_, *held), names in shared.items()]


def table() -> str:
    """Return the whole file."""
    lines = ["|".join(row) for row in (("names", "role", "cartesian", "contents"), *rows())]
    return HEADER.format(version=basis_set_exchange.version()) + "\n".join(lines) + "\n"


if __name__ == "__main__":
    TABLE.write_text(table(), encoding="utf-8")
