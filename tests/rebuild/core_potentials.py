"""Rebuild checker/tables/core_potentials.csv. Run by hand: ``python tests/rebuild/core_potentials.py``.

Takes every orbital and core-potential set of the catalogue that the library `basis_set_exchange` ships, with the
elements it covers and the electrons it replaces, and adds the families below, which the catalogue lacks; those are
from memory. Sets with the same numbers share a row. The test `tests/outside/test_core_potentials.py` compares the
shipped table with the installed catalogue again.
"""

import csv
import io
from collections import defaultdict
from pathlib import Path

import basis_set_exchange

TABLE = Path(__file__).parents[2] / "checker" / "tables" / "core_potentials.csv"
HEADER = """\
# Electrons that published core potentials replace, per atom; edition 1, 2026-12-01; unit: electrons.
# From the catalogue of the library basis_set_exchange {version} and, where the source is a paper, from memory.
# Rebuilt by tests/rebuild/core_potentials.py. replaced: ELEMENTS:ELECTRONS, 0 is an all-electron element.
# below_open_f: core electrons below an f shell that is held in the core too; the rest of the core is that shell.
"""
#: Families with f electrons in the core, as the catalogue names them, and their core electrons below the f shell.
F_IN_CORE = {"lcecp": 46}

Numbers = dict[int, int]


def trivalent(first: int, last: int, below: int, n_f_of_first: int) -> Numbers:
    """Return the counts of a series that holds one f electron more with each element."""
    return {z: below + n_f_of_first + z - first for z in range(first, last + 1)}


def ranges(*parts: tuple[int, int, int]) -> Numbers:
    """Return {z: electrons} of (first, last, electrons)."""
    return {z: electrons for first, last, electrons in parts for z in range(first, last + 1)}


def minus_valence(*parts: tuple[int, int, int]) -> Numbers:
    """Return {z: electrons replaced} of (first, last, valence electrons of the first), one more with each z."""
    return {z: first - valence for first, last, valence in parts for z in range(first, last + 1)}


DUNNING_PP = "; ".join(
    f"{head}{n}Z-PP" for head in ("cc-pV", "aug-cc-pV", "cc-pwCV", "aug-cc-pwCV") for n in "DTQ5"
)
HGH = "Hartwigsen, Goedecker, Hutter, Phys. Rev. B 58, 3641 (1998)"
HULSEN = "Hülsen, Weigand, Dolg, Theor. Chem. Acc. 122, 23 (2009)"
DOLG = "Dolg, Stoll, Savin, Preuss, Theor. Chim. Acta 75, 173 (1989)"
MORITZ = "Moritz, Cao, Dolg, Theor. Chem. Acc. 117, 297 (2007)"
FROM_MEMORY: tuple[tuple[str, Numbers, int | None, str], ...] = (
    (DUNNING_PP, ranges((19, 20, 10), (37, 38, 28), (55, 56, 46), (87, 88, 78), (90, 92, 60)), None,
     "Hill, Peterson, J. Chem. Phys. 147, 244106 (2017); Peterson, ibid. 142, 074105 (2015)"),
    ("LANL1", ranges((11, 18, 10), (19, 30, 18), (31, 36, 28), (37, 48, 36), (49, 54, 46), (55, 57, 54),
                     (72, 80, 68), (81, 83, 78)), None, "Hay, Wadt, J. Chem. Phys. 82, 270 and 284 (1985)"),
    ("BFD", ranges((3, 10, 2), (11, 18, 10), (21, 30, 10), (31, 36, 28), (49, 54, 46), (81, 86, 78)), None,
     "Burkatzki, Filippi, Dolg, J. Chem. Phys. 126, 234105 (2007); 129, 164115 (2008)"),
    ("ccECP", ranges((3, 10, 2), (11, 30, 10), (31, 36, 28)), None,
     "Bennett et al., J. Chem. Phys. 147, 224106 (2017) and its sequels"),
    ("HGH large core", minus_valence((3, 10, 1), (11, 18, 1), (19, 28, 1), (29, 30, 1), (31, 36, 3), (37, 46, 1),
                                     (47, 48, 1), (49, 54, 3), (55, 56, 1), (57, 71, 11), (72, 72, 12),
                                     (73, 78, 5), (79, 80, 1), (81, 86, 3)), None, HGH),
    ("HGH small core", minus_valence((3, 4, 3), (11, 12, 9), (19, 28, 9), (29, 31, 11), (37, 46, 9), (47, 49, 11),
                                     (55, 56, 9), (57, 71, 11), (72, 78, 12), (79, 81, 11)), None, HGH),
    ("Dolg trivalent", trivalent(57, 71, 46, 0), 46, DOLG),
    ("Dolg divalent", trivalent(57, 70, 46, 1), 46, DOLG),
    ("Dolg tetravalent", {58: 46, 59: 47, 60: 48, 65: 53, 66: 54}, 46, HULSEN),
    ("Moritz trivalent", trivalent(89, 103, 78, 0), 78, MORITZ),
    ("Moritz divalent", trivalent(94, 102, 78, 6), 78, "Moritz, Dolg, Theor. Chem. Acc. 121, 297 (2008)"),
    ("Moritz tetravalent", trivalent(90, 98, 78, 0), 78, "Moritz, Dolg, Theor. Chem. Acc. 121, 297 (2008)"),
    ("Stuttgart superheavy", ranges((104, 118, 92)), None,
     "Hangele, Dolg, Hanrath, Cao, Schwerdtfeger, J. Chem. Phys. 136, 214105 (2012)"),
)  # fmt: skip


def from_catalogue() -> dict[str, Numbers]:
    """Return {set name: {z: electrons replaced}} of the catalogue's orbital sets and core potentials."""
    found = {}
    for entry in basis_set_exchange.get_metadata().values():
        if entry["role"] != "orbital":
            continue
        replaced = {int(z): 0 for z in entry["versions"][entry["latest_version"]]["elements"]}
        if any("ecp" in kind for kind in entry["function_types"]):
            elements = basis_set_exchange.get_basis(entry["display_name"])["elements"]
            replaced |= {int(z): held.get("ecp_electrons", 0) for z, held in elements.items()}
        found[entry["display_name"]] = replaced
    return found


def below_open_f(name: str) -> int | None:
    """Return the core electrons below an f shell that the set holds in its core, else None."""
    return next((below for prefix, below in F_IN_CORE.items() if name.startswith(prefix)), None)


def compact(replaced: Numbers) -> str:
    """Write {z: electrons} as ranges."""
    runs: list[list[int]] = []
    for z, electrons in sorted(replaced.items()):
        if runs and runs[-1][1] == z - 1 and runs[-1][2] == electrons:
            runs[-1][1] = z
        else:
            runs.append([z, z, electrons])
    return " ".join(f"{a}:{e}" if a == b else f"{a}-{b}:{e}" for a, b, e in runs)


def table() -> str:
    """Return the whole file."""
    version = basis_set_exchange.version()
    source = f"basis_set_exchange {version}"
    shared: dict[tuple[str, int | None], list[str]] = defaultdict(list)
    for name, replaced in from_catalogue().items():
        shared[compact(replaced), below_open_f(name)].append(name)
    rows = [("; ".join(sorted(names)), numbers, below, source) for (numbers, below), names in shared.items()]
    rows.sort(key=lambda row: (set(row[1].split(":")[1:]) == {"0"}, row[0]))
    rows += [(names, compact(held), below, f"{cited}, from memory") for names, held, below, cited in FROM_MEMORY]
    out = io.StringIO()
    out.write(HEADER.format(version=version))
    writer = csv.writer(out, lineterminator="\n")
    writer.writerow(["names", "replaced", "below_open_f", "source"])
    for names, numbers, below, cited in rows:
        writer.writerow([names, numbers, "" if below is None else below, cited])
    return out.getvalue()


if __name__ == "__main__":
    TABLE.write_text(table(), encoding="utf-8")
