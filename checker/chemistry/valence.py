"""Open valences and the charge that a closed-shell structure would have.

Every atom whose bonds do not use up its usual valence is a site (`checker.chemistry.sites`). The sum over the
sites is the implied charge, or None with the reason, where a site may close in more than one way.

Provides `assign_valences` and the records `Valence` and `Tally`.
"""

from dataclasses import dataclass

import numpy as np

from checker.chemistry.bonding import Bonds, perceive_bonds
from checker.chemistry.lewis import CHALCOGENS, LewisStructure
from checker.chemistry.neighbours import Floats, Ints
from checker.chemistry.sites import Kind, Site, collect_sites, is_beyond
from checker.chemistry.vacancy import has_twin
from checker.elements import name_of
from checker.tables.structure import ion_charges, is_covalent


@dataclass(frozen=True, slots=True)
class Tally:
    """The sites of a structure, counted; `base` is the charge before any open valence is closed.

    `oxo_anions` are those of the anions that share a centre with an atom of their kind, as in nitrate.
    """

    base: int
    anions: int = 0
    oxo_anions: int = 0
    flexible: int = 0
    cations: int = 0
    carbenes: int = 0
    subvalent: int = 0
    paired_triplets: int = 0
    unknown: int = 0
    beyond: int = 0

    @property
    def open(self) -> int:
        """Sites with one open valence: the unpaired electrons if none is closed by a charge."""
        return self.anions + self.flexible + self.cations + self.subvalent

    @property
    def lowest(self) -> int:
        """The lowest charge with all valences closed."""
        return self.base - self.anions - self.flexible + self.cations + self.subvalent

    @property
    def highest(self) -> int:
        """The highest charge with all valences closed, if no atom with lone pairs becomes a cation."""
        return self.lowest + 2 * self.flexible


@dataclass(frozen=True, slots=True, eq=False)
class Valence:
    """The outcome for a structure. Atom indices count from 0.

    Attributes
    ----------
    open_valences : (n,) int, valences short of the usual number, negative where beyond it.
    formal_charges : (n,) int, of the closed-shell structure; 0 where undecided.
    sites : every atom that carries a charge or an open valence.
    tally : the sites counted.
    implied_charge : of the closed-shell structure, or None.
    because : why there is none; empty otherwise.
    """

    bonds: Bonds
    lewis: LewisStructure
    open_valences: Ints
    formal_charges: Ints
    sites: tuple[Site, ...]
    tally: Tally
    implied_charge: int | None
    because: str

    @property
    def holds_metal_of_variable_charge(self) -> bool:
        """Whether a d- or f-block metal, or a metal without a usual charge, is there."""
        known = is_covalent() | (np.array(ion_charges()) > 0)
        return bool((~known[self.lewis.numbers]).any())


def assign_valences(
    numbers: Ints, coordinates: Floats, bonds: Bonds | None = None, *, numbering: Ints | None = None
) -> Valence:
    """Find open valences and the charge that closed valences imply.

    Parameters
    ----------
    numbers : (n,) int array of atomic numbers, real atoms only.
    coordinates : (n, 3) float array, angstrom.
    bonds : as found by `perceive_bonds`; found here if left out.
    numbering : (n,) the numbers that people know the atoms by; 1, 2, ... if left out.

    Raises
    ------
    NotDerivable
        If the atoms lie so dense that they are no molecule.
    """
    numbers = np.asarray(numbers, dtype=np.int64)
    coordinates = np.asarray(coordinates, dtype=np.float64)
    lewis = LewisStructure(numbers, coordinates, bonds or perceive_bonds(numbers, coordinates))
    sites = collect_sites(lewis)
    open_valences, formal = np.zeros(len(numbers), dtype=np.int64), np.zeros(len(numbers), dtype=np.int64)
    for atom, slots in lewis.open.items():
        open_valences[atom] = slots
    for atom, surplus in lewis.excess.items():
        open_valences[atom] = -surplus if is_beyond(lewis, atom) else 0
    for site in sites:
        formal[site.atom] += site.charge
    tally = _tally(lewis, sites)
    because = _why_ambiguous(lewis, sites, np.arange(1, len(numbers) + 1) if numbering is None else numbering)
    implied = None if because else tally.lowest
    return Valence(lewis.bonds, lewis, open_valences, formal, sites, tally, implied, because)


def _tally(lewis: LewisStructure, sites: tuple[Site, ...]) -> Tally:
    counts = dict.fromkeys(Kind, 0)
    for site in sites:
        counts[site.kind] += 1
    fixed = {Kind.FIXED, Kind.BEYOND}
    subvalent = sum(site.charge for site in sites if site.kind is Kind.SUBVALENT)
    return Tally(
        base=sum(site.charge for site in sites if site.kind in fixed),
        anions=counts[Kind.ANION],
        oxo_anions=sum(1 for site in sites if site.kind is Kind.ANION and _is_oxo(lewis, site.atom)),
        flexible=counts[Kind.FLEXIBLE],
        cations=counts[Kind.CATION],
        carbenes=counts[Kind.CARBENE],
        subvalent=subvalent,
        paired_triplets=_paired_triplets(lewis),
        unknown=counts[Kind.UNKNOWN],
        beyond=counts[Kind.BEYOND],
    )


def _is_oxo(lewis: LewisStructure, atom: int) -> bool:
    neighbours = lewis.bonds.neighbours
    return has_twin(atom, lewis.numbers, lewis.bonds) and len(neighbours[neighbours[atom][0]]) >= 3


def _paired_triplets(lewis: LewisStructure) -> int:
    """Free O2, S2, SO and their like: a double bond on paper, a triplet in fact."""
    return sum(
        1
        for i, j in lewis.pairing.bonds
        if int(lewis.numbers[i]) in CHALCOGENS
        and int(lewis.numbers[j]) in CHALCOGENS
        and len(lewis.bonds.neighbours[i]) == len(lewis.bonds.neighbours[j]) == 1
    )


def _why_ambiguous(lewis: LewisStructure, sites: tuple[Site, ...], number: Ints) -> str:
    """Return the reason why no single charge follows, or an empty string."""
    if lewis.bonds.overlaps:
        i, j, distance = lewis.bonds.overlaps[0]
        return f"atoms {number[i]} and {number[j]} lie {distance:.2f} angstrom apart"
    if lewis.gave_up:
        return "the multiple bonds could not be placed within the time allowed"
    reasons = {
        Kind.UNKNOWN: "has no charge of its own that the bonds would tell",
        Kind.BEYOND: "has more neighbours than a usual structure of the element",
        Kind.FLEXIBLE: "could be a cation, an anion or a radical",
        Kind.SUBVALENT: "has fewer anions round it than its usual charge",
    }
    for kind, reason in reasons.items():
        for site in sites:
            if site.kind is kind:
                return f"{name_of(int(lewis.numbers[site.atom]))} {number[site.atom]} {reason}"
    for i, j in lewis.stretched:
        return f"the bond between atoms {number[i]} and {number[j]} is too long for the double bond it would be"
    return ""
