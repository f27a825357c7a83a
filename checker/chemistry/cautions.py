"""Species that call for a word of caution: radioactive, acutely toxic, energetic.

Elements and substances stand in ``tables/cautions.csv``. Groups are told from the bonds: nitro (on carbon,
nitrogen or an ester's oxygen), azide, organic peroxide and perchlorate count as energetic where the molecule
has fewer than six carbon atoms for each (common practice, no source); phosphorus bonded to oxygen, to
fluorine and to an organic rest is the pattern of very toxic esters. The list is short on purpose; silence is
no clearance.
"""

from collections import Counter
from collections.abc import Iterable, Iterator
from dataclasses import dataclass
from functools import cache

from checker.chemistry.attachment import hill_formula
from checker.chemistry.bonding import Bonds
from checker.chemistry.neighbours import Ints
from checker.elements import name_of, number_of
from checker.tables import read_rows

LARGEST_SYSTEM = 2_000
"""Above this number of atoms only elements are looked at: single molecules of a solution are not searched for."""

CARBONS_PER_GROUP = 6
TRITIUM = 3
_C, _N, _O, _F, _SI, _P, _CL = 6, 7, 8, 9, 14, 15, 17


@dataclass(frozen=True, slots=True)
class Caution:
    """Why a species calls for caution: the kind (radioactive, toxic, energetic) and what it is, in words."""

    kind: str
    what: str


def of_elements(numbers: Iterable[int]) -> list[Caution]:
    """Return the cautions of the elements present, by atomic number."""
    return [_of_elements()[z] for z in sorted(set(numbers)) if z in _of_elements()]


def of_molecules(numbers: Ints, bonds: Bonds, *, by_formula: bool = True) -> list[Caution]:
    """Return the cautions of substances by formula and of groups by their bonds, each once.

    Formulas are those of neutral substances: nitrite is no nitrogen dioxide.
    """
    formulas = _of_formulas() if by_formula else {}
    whole = formulas.get(hill_formula(numbers))
    if whole is not None:  # bonds to metals join no molecules, so carbonyls are known as a whole only
        return [whole]
    found: dict[Caution, None] = {}
    listed = numbers.tolist()
    for molecule in _molecules(bonds):
        known = formulas.get(hill_formula(numbers[molecule]))
        for caution in [known] if known else _of_groups(listed, bonds, molecule):
            found[caution] = None
    return list(found)


def may_hold_some(elements: Iterable[int]) -> bool:
    """Tell whether these elements can make any listed substance or group, so that molecules are worth a look."""
    present = set(elements)
    return any(needed <= present for needed in _needed_elements())


@cache
def _of_elements() -> dict[int, Caution]:
    return {
        z: Caution(row["kind"], f"{name_of(z)} is {row['what']}")
        for row in read_rows("cautions.csv")
        if row["by"] == "element"
        for symbol in row["keys"].split()
        if (z := number_of(symbol))
    }


@cache
def _of_formulas() -> dict[str, Caution]:
    rows = (row for row in read_rows("cautions.csv") if row["by"] == "formula")
    return {row["keys"]: Caution(row["kind"], f"the formula is that of {row['what']}") for row in rows}


@cache
def _needed_elements() -> tuple[frozenset[int], ...]:
    substances = {frozenset(_elements_of(formula)) for formula in _of_formulas()}
    groups = [{_C, _N}, {_C, _O}, {_C, _N, _O}, {_N, _CL, _O}, {_C, _O, _F, _P}]
    smallest = substances | {frozenset(group) for group in groups}
    return tuple(s for s in smallest if not any(other < s for other in smallest))


def _elements_of(formula: str) -> Iterator[int]:
    symbols = "".join(f" {letter}" if letter.isupper() else letter for letter in formula if not letter.isdigit())
    for symbol in symbols.split():
        z = number_of(symbol)
        assert z is not None, formula
        yield z


def _molecules(bonds: Bonds) -> Iterator[list[int]]:
    seen: set[int] = set()
    for atom in range(len(bonds.neighbours)):
        if atom not in seen:
            molecule = bonds.component(atom)
            seen.update(molecule)
            yield molecule


def _of_groups(numbers: list[int], bonds: Bonds, molecule: list[int]) -> Iterator[Caution]:
    groups = Counter(group for atom in molecule if (group := _energetic_group(numbers, bonds, atom)))
    n_carbon = sum(numbers[atom] == _C for atom in molecule)
    if groups and n_carbon < CARBONS_PER_GROUP * groups.total():
        yield Caution("energetic", f"it is rich in {' and '.join(sorted(groups))} groups")
    if any(_is_toxic_phosphorus(numbers, bonds, atom) for atom in molecule):
        yield Caution("toxic", "it has the pattern of a phosphorus ester fluoride")


def _energetic_group(numbers: list[int], bonds: Bonds, atom: int) -> str | None:
    """Return the name of the energetic group that this atom is the centre of, or None."""
    z = numbers[atom]
    if z == _N:
        return _nitrogen_group(numbers, bonds, atom)
    if z == _O:
        return "peroxide" if _starts_peroxide(numbers, bonds, atom) else None
    if z == _CL and [numbers[other] for other in bonds.neighbours[atom]] == [_O] * 4:
        return "perchlorate"
    return None


def _nitrogen_group(numbers: list[int], bonds: Bonds, atom: int) -> str | None:
    around = bonds.neighbours[atom]
    ends = [other for other in around if numbers[other] == _O and len(bonds.neighbours[other]) == 1]
    rest = [other for other in around if other not in ends]
    if len(ends) == 2 and len(rest) == 1 and _is_organic_end(numbers, bonds, rest[0], atom):
        return "nitro"
    if [numbers[other] for other in around] == [_N, _N]:
        terminal = [len(bonds.neighbours[other]) == 1 for other in around]
        if terminal.count(True) == 1:
            return "azide"
    return None


def _is_organic_end(numbers: list[int], bonds: Bonds, atom: int, other_than: int) -> bool:
    """Tell whether a nitro group sits on carbon, on an amine's nitrogen, or on the oxygen of an ester."""
    beyond = {numbers[other] for other in bonds.neighbours[atom] if other != other_than}
    return numbers[atom] == _C or (numbers[atom] in (_N, _O) and _C in beyond)


def _starts_peroxide(numbers: list[int], bonds: Bonds, atom: int) -> bool:
    """Tell whether this is the first of two joined oxygens of which one at least bears carbon or silicon."""
    for other in bonds.neighbours[atom]:
        if numbers[other] == _O and other > atom:
            outer = [o for o in (*bonds.neighbours[atom], *bonds.neighbours[other]) if o not in (atom, other)]
            return len(outer) == 2 and any(numbers[o] in (_C, _SI) for o in outer)
    return False


def _is_toxic_phosphorus(numbers: list[int], bonds: Bonds, atom: int) -> bool:
    if numbers[atom] != _P:
        return False
    around = bonds.neighbours[atom]
    has_ends = {_O, _F} <= {numbers[other] for other in around if len(bonds.neighbours[other]) == 1}
    return has_ends and any(
        numbers[other] == _C or _C in {numbers[o] for o in bonds.neighbours[other]} for other in around
    )
