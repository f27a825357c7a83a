"""Subshells and configurations as plain values: reading, writing and counting.

An occupation is a tuple of (n, l, electrons), ascending in (n, l), without empty subshells. A subshell of l has
2l+1 spatial functions and n-l-1 radial nodes, and each function takes one alpha and one beta electron (common
practice, no source).
"""

import re
from collections.abc import Iterable
from functools import cache

L_SYMBOLS = "spdfgh"
NOBLE_GAS_CORES = {
    "He": "1s2",
    "Ne": "[He] 2s2 2p6",
    "Ar": "[Ne] 3s2 3p6",
    "Kr": "[Ar] 3d10 4s2 4p6",
    "Xe": "[Kr] 4d10 5s2 5p6",
    "Rn": "[Xe] 4f14 5d10 6s2 6p6",
}
#: Electrons that each noble-gas core holds.
NOBLE_GAS_ELECTRONS = {"He": 2, "Ne": 10, "Ar": 18, "Kr": 36, "Xe": 54, "Rn": 86}
_SUBSHELL = re.compile(rf"(?P<n>\d)(?P<l>[{L_SYMBOLS}])(?P<electrons>\d{{1,2}})?")
_CORE = re.compile(r"\[(?P<symbol>[A-Z][a-z])\]")

Occupation = tuple[tuple[int, int, int], ...]


def functions_in_subshell(ell: int) -> int:
    """Return the spatial functions of a subshell, 2l+1."""
    return 2 * ell + 1


def capacity(ell: int) -> int:
    """Return how many electrons a subshell holds, 2(2l+1)."""
    return 2 * functions_in_subshell(ell)


def radial_nodes(n: int, ell: int) -> int:
    """Return the radial nodes of a subshell, n-l-1; raise ValueError where there is no such subshell."""
    if not 0 <= ell < n:
        raise ValueError(f"there is no subshell with n = {n} and l = {ell}")
    return n - ell - 1


@cache
def parse_configuration(text: str) -> Occupation:
    """Return the full occupation of a configuration; a subshell without a number holds one electron.

    Raises ValueError naming the part that cannot be read. The empty text is the empty occupation.

    >>> parse_configuration("[He] 2s2 2p")
    ((1, 0, 2), (2, 0, 2), (2, 1, 1))
    """
    held: dict[tuple[int, int], int] = {}
    for part in text.split():
        for n, ell, electrons in _part(part):
            if (n, ell) in held:
                raise ValueError(f"{part!r} fills a subshell twice in {text!r}")
            held[n, ell] = electrons
    return tuple((n, ell, electrons) for (n, ell), electrons in sorted(held.items()))


def write_configuration(occupation: Occupation) -> str:
    """Return a configuration as written, with the largest noble-gas core that is full and not the whole of it.

    >>> write_configuration(parse_configuration("1s2 2s2 2p6 3s"))
    '[Ne] 3s'
    """
    core, outside = _split_core(occupation)
    parts = [f"[{core}]"] if core else []
    parts += [f"{n}{L_SYMBOLS[ell]}{electrons if electrons > 1 else ''}" for n, ell, electrons in outside]
    return " ".join(parts)


def electrons_in(occupation: Occupation) -> int:
    """Return the number of electrons."""
    return sum(electrons for _, _, electrons in occupation)


def electrons_per_shell(occupation: Occupation) -> dict[int, int]:
    """Return the electrons of each principal quantum number that holds any."""
    per_shell: dict[int, int] = {}
    for n, _, electrons in occupation:
        per_shell[n] = per_shell.get(n, 0) + electrons
    return per_shell


def open_subshells(occupation: Occupation) -> Occupation:
    """Return the subshells that are not full."""
    return tuple((n, ell, electrons) for n, ell, electrons in occupation if electrons < capacity(ell))


def without_n(subshells: Iterable[tuple[int, int, int]]) -> list[tuple[int, int]]:
    """Return (l, electrons) of subshells, all that their terms depend on."""
    return [(ell, electrons) for _, ell, electrons in subshells]


def _part(part: str) -> Occupation:
    core = _CORE.fullmatch(part)
    if core is not None and core["symbol"] in NOBLE_GAS_CORES:
        return parse_configuration(NOBLE_GAS_CORES[core["symbol"]])
    found = _SUBSHELL.fullmatch(part)
    if found is None:
        raise ValueError(f"{part!r} is no subshell such as 3d6 and no noble-gas core such as [Ar]")
    n, ell, electrons = int(found["n"]), L_SYMBOLS.index(found["l"]), int(found["electrons"] or 1)
    if not ell < n or not 1 <= electrons <= capacity(ell):
        raise ValueError(f"no atom has the subshell {part!r}")
    return ((n, ell, electrons),)


def _split_core(occupation: Occupation) -> tuple[str, Occupation]:
    for symbol in reversed(NOBLE_GAS_CORES):
        core = set(parse_configuration(f"[{symbol}]"))
        if core < set(occupation):
            return symbol, tuple(subshell for subshell in occupation if subshell not in core)
    return "", occupation
