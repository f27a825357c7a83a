"""Ground levels of atoms and atomic ions: stored where a compilation names them, derived only where that is safe.

"ns leaves first" holds in the d block from charge 2+ on and fails for V+, Co+, Ni+, Y+, La+, Lu+, Hf+ and
others; Hund's first rule fails where two shells are open (Ce is 1G*4). So the neutral atoms, the singly charged
ions and the awkward others are stored (``checker/tables/ground_levels.csv``), and a derived level has at most one
open shell.

References: NIST Atomic Spectra Database; W. C. Martin et al., Ground Levels and Ionization Energies for the
Neutral Atoms (NIST); T. Andersen, H. K. Haugen, H. Hotop, J. Phys. Chem. Ref. Data 28, 1511 (1999). All from
memory; the tests compare them with libraries that read NIST.
"""

from collections.abc import Sequence
from dataclasses import dataclass

from checker import tables
from checker.chemistry.shells import (
    NOBLE_GAS_ELECTRONS,
    Occupation,
    capacity,
    electrons_in,
    open_subshells,
    parse_configuration,
    without_n,
    write_configuration,
)
from checker.chemistry.terms import hund_ground_level, max_unpaired, parse_level
from checker.elements import written_ion
from checker.errors import NotDerivable

__all__ = [
    "GroundLevel",
    "anion_is_bound",
    "ground_level",
    "most_unpaired",
    "usual_charges",
]

#: Subshells in the order in which positive ions from 2+ on fill them: (n, l).
ION_ORDER = ((1, 0), (2, 0), (2, 1), (3, 0), (3, 1), (3, 2), (4, 0), (4, 1), (4, 2), (5, 0), (5, 1))
ION_ORDER_ABOVE_4F = ((5, 2), (6, 0), (6, 1))
#: Beyond these the order of the subshells nears that of hydrogen, or LS names end; nothing is derived there.
MAX_DERIVED_CHARGE, MAX_LANTHANIDE_CHARGE, KRYPTON = 8, 4, 36
P_BLOCK = frozenset({*range(5, 10), *range(13, 18), *range(31, 36), *range(49, 54), *range(81, 86)})
LANTHANIDES = range(58, 72)
ACTINIDES = range(90, 104)
FIRST_WITH_FULL_4F = 72


@dataclass(frozen=True, slots=True, kw_only=True)
class GroundLevel:
    """The ground level of a free atom or ion.

    Attributes
    ----------
    configuration : with a noble-gas core, such as ``[Ar] 3d6 4s2``; empty for a bare nucleus.
    occupation : every subshell as (n, l, electrons).
    level : the published name: LS, jj, or J alone.
    term : the LS name with J, that of the leading component where the level is named otherwise; None if unknown.
    multiplicity : 2S+1 of the term; None where the term is unknown.
    origin : ``measured``, ``predicted`` or ``derived``.
    source : the compilation, or the rule by which the level was derived.
    bound : False where this ion would lose an electron in the gas phase.
    note : what is peculiar to it; often empty.

    """

    atomic_number: int
    charge: int
    configuration: str
    occupation: Occupation
    level: str
    term: str | None
    multiplicity: int | None
    origin: str
    source: str
    bound: bool = True
    note: str = ""


def ground_level(z: int, charge: int) -> GroundLevel:
    """Return the ground level of an atom (1 to 118) of a charge, stored or derived.

    Raises NotDerivable where nothing can be said honestly, with the reason.

    >>> ground_level(23, 1).configuration, ground_level(23, 1).term
    ('[Ar] 3d4', '5D0')
    """
    row = tables.ground_levels().get((z, charge))
    return _stored(row) if row is not None else _derived(z, charge)


def anion_is_bound(z: int, charge: int) -> bool | None:
    """Tell whether an atom holds its electrons in the gas phase; None where no measurement or estimate is known.

    No atom binds a second extra electron (Andersen, Haugen, Hotop 1999).
    """
    if charge >= 0:
        return True
    if charge <= -2:
        return False
    row = tables.ground_levels().get((z, charge))
    return None if row is None else row.bound


def usual_charges(z: int) -> tuple[int, ...]:
    """Return the usual charges of an element's ions, commonest first; empty where it has none.

    >>> usual_charges(26)
    (3, 2)
    """
    return tables.usual_charges().get(z, ())


def most_unpaired(occupation: Occupation) -> int:
    """Return how many electrons a configuration can leave unpaired at most."""
    return max_unpaired(without_n(occupation))


def _stored(row: tables.GroundLevelRow) -> GroundLevel:
    ion = written_ion(row.z, row.charge)
    if not row.bound:
        raise NotDerivable(f"{ion} is not stable: the extra electron is not bound ({row.source})")
    if not row.configuration:
        raise NotDerivable(f"the ground level of {ion} is not settled ({row.note})")
    term = row.leading_term or (row.level if row.level[0].isdigit() else None)
    return GroundLevel(
        atomic_number=row.z,
        charge=row.charge,
        configuration=row.configuration,
        occupation=parse_configuration(row.configuration),
        level=row.level,
        term=term,
        multiplicity=parse_level(term).term.multiplicity if term else None,
        origin=row.basis,
        source=row.source,
        note=row.note,
    )


def _derived(z: int, charge: int) -> GroundLevel:
    occupation, reason = _derived_occupation(z, charge)
    level = _single_shell_level(occupation)
    return GroundLevel(
        atomic_number=z,
        charge=charge,
        configuration=write_configuration(occupation),
        occupation=occupation,
        level=level,
        term=level,
        multiplicity=parse_level(level).term.multiplicity,
        origin="derived",
        source=reason,
        bound=charge >= 0,
    )


def _single_shell_level(occupation: Occupation) -> str:
    still_open = without_n(open_subshells(occupation))
    if not still_open:
        return "1S0"
    ((ell, electrons),) = still_open
    return hund_ground_level(ell, electrons).name


def _derived_occupation(z: int, charge: int) -> tuple[Occupation, str]:
    ion, n_electrons = written_ion(z, charge), z - charge
    if n_electrons < 0:
        raise NotDerivable(f"{ion} would have fewer electrons than none")
    if n_electrons == 0:
        return (), "a bare nucleus has no electrons"
    if charge < 0:
        return _anion(z, charge)
    if charge > MAX_DERIVED_CHARGE and z > KRYPTON:
        raise NotDerivable(f"no ground level of {ion} is stored, and none is derived for so high a charge")
    if n_electrons <= NOBLE_GAS_ELECTRONS["Xe"]:
        return _fill(ION_ORDER, n_electrons), "filled as positive ions fill (ns after (n-1)d), then Hund's rules"
    return _heavy_cation(z, n_electrons)


def _heavy_cation(z: int, n_electrons: int) -> tuple[Occupation, str]:
    outside_xe = n_electrons - NOBLE_GAS_ELECTRONS["Xe"]
    outside_rn = n_electrons - NOBLE_GAS_ELECTRONS["Rn"]
    xe, rn = parse_configuration("[Xe]"), parse_configuration("[Rn]")
    if z in LANTHANIDES and z - n_electrons <= MAX_LANTHANIDE_CHARGE:
        return _joined(xe, ((4, 3, outside_xe),)), "lanthanides from 3+ on: 4f only, then Hund's rules"
    if z >= FIRST_WITH_FULL_4F and outside_xe >= capacity(3) and outside_rn <= 0:
        rest = _fill(ION_ORDER_ABOVE_4F, outside_xe - capacity(3))
        return _joined(xe, ((4, 3, capacity(3)),), rest), "4f full, 6s after 5d, then Hund's rules"
    if z in ACTINIDES and 0 < outside_rn <= capacity(3):
        return _joined(rn, ((5, 3, outside_rn),)), "actinides from 3+ on: 5f only, then Hund's rules"
    if z > ACTINIDES[-1] and outside_rn == capacity(3):
        return _joined(rn, ((5, 3, outside_rn),)), "5f full, nothing outside it"
    ion = written_ion(z, z - n_electrons)
    raise NotDerivable(f"no ground level of {ion} is stored, and f, d and s lie too close to derive one")


def _anion(z: int, charge: int) -> tuple[Occupation, str]:
    """Return the filling of an embedded ion such as O2-; no free atom binds two extra electrons."""
    ion, n_electrons = written_ion(z, charge), z - charge
    next_noble = next((count for count in NOBLE_GAS_ELECTRONS.values() if count > z), 0)
    if charge == -1:
        raise NotDerivable(f"no ground level of {ion} is stored, and anions are not derived")
    if z not in P_BLOCK or n_electrons > next_noble:
        raise NotDerivable(f"{ion} has more electrons than its valence shell can take")
    noble = next(symbol for symbol, count in NOBLE_GAS_ELECTRONS.items() if count == next_noble)
    *core, (n, ell, full) = parse_configuration(f"[{noble}]")
    outer = (n, ell, full - (next_noble - n_electrons))
    return (*core, outer), "np filled as in the isoelectronic atom, then Hund's rules"


def _fill(order: Sequence[tuple[int, int]], n_electrons: int) -> Occupation:
    """Fill subshells one after the other, each to its capacity."""
    filled = []
    for n, ell in order:
        taken = min(n_electrons, capacity(ell))
        if taken:
            filled.append((n, ell, taken))
        n_electrons -= taken
    assert n_electrons == 0, "the order given holds all electrons"
    return tuple(sorted(filled))


def _joined(*parts: Occupation) -> Occupation:
    joined = tuple(sorted(subshell for part in parts for subshell in part if subshell[2]))
    assert electrons_in(joined) == sum(electrons_in(part) for part in parts)
    return joined
