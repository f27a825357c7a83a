"""Whether a stated charge and multiplicity account for the open valences and the charge that bonds imply.

Provides `unexplained_sites`, `beyond_valence`, `ChargeMismatch`, `charge_mismatch` and `may_be_sextet`.
"""

import itertools
import math
from collections.abc import Collection
from dataclasses import dataclass

from checker.chemistry.lewis import TETRELS
from checker.chemistry.sites import Kind
from checker.chemistry.valence import Tally, Valence
from checker.tables.structure import cordero_radii

ROOM_OF_A_LOST_ATOM = 0.75
"""Both ends of a bond of single length must have this much room before two lost hydrogens are suspected."""

ROOM_OF_A_CATION = 0.5
"""A carbenium ion is planar; an open atom with more room than this is none."""

PI_BONDS_PER_PAIR = 4
"""A conjugated system of this many multiple bonds may take up or give away two electrons (cyclooctatetraene)."""

PARTLY_BROKEN_ANGSTROM = 0.6
"""Two open atoms no farther apart than the sum of their radii and this are a bond of a transition state."""

BROKEN_ANGSTROM = 1.2
"""Up to here two open atoms may be the ends of a bond drawn out in a scan, rather than two anions."""

MOST_VERTICAL_ELECTRONS = 2
"""Electrons that a vertical state may have more or less than a closed structure: a dication, a radical ionised."""

MOST_SITES_PAIRED = 50
"""So many open atoms are no single bond breaking."""

_OPEN_KINDS = (Kind.ANION, Kind.FLEXIBLE, Kind.CATION)


@dataclass(frozen=True, slots=True)
class Explanation:
    """Atoms whose valence nothing explains; `why` is the ground, `confidence` 0 to 1."""

    atoms: tuple[int, ...]
    why: str
    confidence: float
    beyond: bool = False


@dataclass(frozen=True, slots=True)
class ChargeMismatch:
    """A stated charge that the bonds do not imply.

    `implied` is the charge of the closed valences, `from_bonding` whether open valences set it (or only ions and
    onium centres do), `sites` the atoms that carry it, with their charge, `confidence` 0 to 1.
    """

    implied: int
    from_bonding: bool
    sites: tuple[tuple[int, int], ...]
    confidence: float


def beyond_valence(valence: Valence, charge: int) -> Explanation | None:
    """Return atoms with more neighbours than any usual structure; CH5+ and its like pass by their charge."""
    atoms = tuple(site.atom for site in valence.sites if site.kind is Kind.BEYOND)
    if not atoms or (charge >= len(atoms) and all(valence.open_valences[atom] == -1 for atom in atoms)):
        return None
    return Explanation(
        atoms, "Bonds are told from distances; a second-row atom holds four at most.", 0.8, beyond=True
    )


def unexplained_sites(valence: Valence, charge: int, multiplicity: int) -> Explanation | None:
    """Return atoms short of a valence that charge and multiplicity (2S+1) do not explain, or None."""
    tally = valence.tally
    if tally.unknown or tally.beyond or tally.subvalent or valence.lewis.gave_up or valence.bonds.overlaps:
        return None
    explained = _accounts_for(
        tally,
        charge,
        multiplicity - 1,
        ion_pairs=_may_be_ion_pairs(valence),
        loose=_loose_pairs(valence, _OPEN_KINDS, PARTLY_BROKEN_ANGSTROM),
    )
    if tally.open and not explained:
        atoms = tuple(site.atom for site in valence.sites if site.kind in _OPEN_KINDS)
        roomiest = sorted(set(atoms), key=lambda atom: (-valence.lewis.room(atom), atom))
        why = "An open valence is an unpaired electron or a charge, and the stated ones do not suffice."
        return Explanation(tuple(sorted(roomiest[: _short_by(tally, charge, multiplicity)])), why, 0.7)
    if multiplicity == 1:
        return _stripped_bond(valence)
    return None


def charge_mismatch(
    valence: Valence, charge: int, multiplicity: int = 1, *, vertical: bool = False
) -> ChargeMismatch | None:
    """Return how a stated charge differs from the implied one, or None where it is usual or can be explained.

    One electron away is an ionised or attached state and passes, unless the electron would sit on a solvated metal
    ion or a saturated onium ion. So do two where a vertical state is meant, and OH+ or NH2+ as a triplet. Call it
    only where `valence.implied_charge` is known.
    """
    implied = valence.implied_charge
    assert implied is not None
    electrons = implied - charge
    if electrons < 0:
        electrons = min(0, electrons + 2 * _loose_pairs(valence, (Kind.ANION,), BROKEN_ANGSTROM))
    if vertical and abs(electrons) <= MOST_VERTICAL_ELECTRONS:
        return None
    if electrons == -2 and multiplicity == 3 and may_be_sextet(valence):
        return None
    if not electrons or (abs(electrons) == 1 and not (electrons == 1 and _holds_no_electron(valence))):
        return None
    if len(valence.lewis.pairing.bonds) >= PI_BONDS_PER_PAIR * (abs(electrons) // 2) > 0:
        return None
    sites = tuple((site.atom, site.charge) for site in valence.sites if site.charge)
    from_bonding = bool(valence.tally.anions or valence.tally.cations)
    return ChargeMismatch(implied, from_bonding, sites, 0.85 if abs(electrons) > 1 else 0.75)


def may_be_sextet(valence: Valence) -> bool:
    """Say whether one atom that closes as an anion could have six electrons instead: a triplet as in OH+, NH2+."""
    return valence.tally.anions == 1 and not valence.tally.oxo_anions


def _loose_pairs(valence: Valence, kinds: Collection[Kind], slack_angstrom: float) -> int:
    """Pair open atoms that are neither bonded nor share a neighbour, nearest first; return how many pairs."""
    atoms = sorted({site.atom for site in valence.sites if site.kind in kinds})
    if not 2 <= len(atoms) <= MOST_SITES_PAIRED:
        return 0
    lewis, neighbours = valence.lewis, valence.bonds.neighbours
    radii = cordero_radii()[lewis.numbers]
    close = []
    for i, j in itertools.combinations(atoms, 2):
        excess = math.dist(lewis.coordinates[i], lewis.coordinates[j]) - float(radii[i] + radii[j])
        if excess <= slack_angstrom and j not in neighbours[i] and not set(neighbours[i]) & set(neighbours[j]):
            close.append((excess, i, j))
    paired: set[int] = set()
    for _, i, j in sorted(close):
        if not paired & {i, j}:
            paired |= {i, j}
    return len(paired) // 2


def _may_be_ion_pairs(valence: Valence) -> bool:
    """Open sites may close as cation and anion by turns, but not those that a hydrogen was taken from."""
    flexible = (site.atom for site in valence.sites if site.kind is Kind.FLEXIBLE)
    return all(valence.lewis.room(atom) < ROOM_OF_A_CATION for atom in flexible)


def _accounts_for(tally: Tally, charge: int, unpaired: int, *, ion_pairs: bool, loose: int) -> bool:
    """Try every number of sites closed as anions and as cations; one electron more or fewer is let pass.

    `loose` pairs of the sites may be bonds in the making. More unpaired electrons than open sites come from bonds,
    and whether there can be so many is asked elsewhere.
    """
    sites = tally.open
    excess = charge - tally.base
    for spare in (0, 1, -1):
        for anions in range(min(tally.anions + tally.flexible, sites) + 1):
            cations = excess - spare + anions
            if not 0 <= cations <= tally.cations + tally.flexible or anions + cations > sites:
                continue
            if anions and cations and not ion_pairs:
                continue
            left = sites - anions - cations
            least = left + abs(spare) - 2 * loose
            if unpaired >= least and (unpaired - least) % 2 == 0:
                return True
    return False


def _short_by(tally: Tally, charge: int, multiplicity: int) -> int:
    """Open sites that neither the charge nor unpaired electrons use up; one at least."""
    used = abs(charge - tally.base) + multiplicity - 1
    return max(1, tally.anions + tally.flexible + tally.cations - used)


def _stripped_bond(valence: Valence) -> Explanation | None:
    """Two neighbours with room for a bond each, and only a bond of single length between them."""
    for i, j in valence.lewis.stretched:
        if min(valence.lewis.room(i), valence.lewis.room(j)) < ROOM_OF_A_LOST_ATOM:
            continue
        if not any(int(valence.lewis.numbers[atom]) in TETRELS for atom in (i, j)):
            continue
        length = valence.bonds.lengths[i][valence.bonds.neighbours[i].index(j)]
        why = f"Their bond of {length:.2f} angstrom is a single bond, and both have an empty direction."
        return Explanation((i, j), why, 0.7)
    return None


def _holds_no_electron(valence: Valence) -> bool:
    """Say whether an added electron would have to sit on a metal ion among neutral ligands, or an onium centre."""
    if valence.lewis.pairing.bonds or valence.tally.open or valence.tally.carbenes:
        return False
    return valence.tally.base > 0 and any(site.kind is Kind.FIXED and site.charge > 0 for site in valence.sites)
