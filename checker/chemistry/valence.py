"""Open valences and the charge that a closed-shell structure would have.

Every atom whose bonds do not use up its usual valence is a *site*. What a site may carry once all shells are
closed depends on its kind: oxygen, nitrogen or a halogen becomes an anion; carbon may become an anion or a cation
and is then ambiguous; two open valences on one carbon are a carbene and carry nothing; onium, borate and metal
ions have their fixed charge. The sum over the sites is the implied charge, or None with the reason.

Provides `assign_valences` and the records `Valence`, `Site` and `Tally`.
"""

import enum
from dataclasses import dataclass

import numpy as np

from checker.chemistry.bonding import Bonds, perceive_bonds
from checker.chemistry.lewis import CHALCOGENS, HALOGENS, PNICTOGENS, TETRELS, TRIELS, LewisStructure
from checker.chemistry.neighbours import Floats, Ints
from checker.chemistry.vacancy import has_twin
from checker.elements import name_of
from checker.tables.structure import ion_charges, is_covalent, usual_valences, valence_electrons

_TRIEL_ION = 3
_FOURTH_ROW = 32
_TRUE_METALS = frozenset({49, 50})
_SEESAW_SUM = 0.6


class Kind(enum.Enum):
    """What a site is."""

    ANION = "anion"  # one open valence at an atom with lone pairs: -1 when closed, a radical when not
    FLEXIBLE = "flexible"  # one open valence that may close as a cation or an anion, or stay a radical
    CATION = "cation"  # one open valence next to a donor: +1 when closed
    CARBENE = "carbene"  # two open valences on one atom: no charge
    FIXED = "fixed"  # a charge that comes with the bonds: onium, borate, hypervalent or metal ion
    SUBVALENT = "subvalent"  # a metal with fewer anions round it than its usual charge
    BEYOND = "beyond"  # more bonds than any known structure of the element has
    UNKNOWN = "unknown"  # a metal of variable charge, a bond between metals, a cluster


@dataclass(frozen=True, slots=True)
class Site:
    """An atom that carries a charge or an open valence in the closed-shell structure.

    `charge` is the one counted; for a subvalent metal and for kinds without one it is what the sum starts from.
    """

    atom: int
    kind: Kind
    charge: int


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
    sites = tuple(_Sites(lewis).collect())
    open_valences, formal = np.zeros(len(numbers), dtype=np.int64), np.zeros(len(numbers), dtype=np.int64)
    for atom, slots in lewis.open.items():
        open_valences[atom] = slots
    for atom, surplus in lewis.excess.items():
        open_valences[atom] = -surplus if _is_beyond(lewis, atom) else 0
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


def _is_beyond(lewis: LewisStructure, atom: int) -> bool:
    """More neighbours than a second-row atom can hold, or than any valence of a heavier one."""
    z, degree = int(lewis.numbers[atom]), len(lewis.bonds.neighbours[atom])
    if z == 1:
        return not all(int(lewis.numbers[other]) in TRIELS for other in lewis.bonds.neighbours[atom])
    if z in {5, 6, 7}:
        return degree > 4
    if z in {8, 9}:
        return degree > (3 if z == 8 else 2)
    return degree > max(6, *usual_valences()[z])


class _Sites:
    """Turns the open and surplus valences of a structure into sites."""

    def __init__(self, lewis: LewisStructure) -> None:
        self.lewis = lewis
        self.numbers = lewis.numbers
        self.bonds = lewis.bonds
        self.anions_beside: dict[int, int] = {}
        self.sites: list[Site] = []

    def collect(self) -> list[Site]:
        """Return the sites, ordered by atom."""
        for atom in self.lewis.donors:
            self._add(atom, Kind.FIXED, 1)
        for atom, slots in self.lewis.open.items():
            self._open_site(atom, slots)
        self._claim_anions()
        for atom, surplus in self.lewis.excess.items():
            self._surplus_site(atom, surplus)
        for atom in np.flatnonzero(~is_covalent()[self.numbers]).tolist():
            self._metal_site(atom)
        return sorted(self.sites, key=lambda site: site.atom)

    def _add(self, atom: int, kind: Kind, charge: int) -> None:
        self.sites.append(Site(atom, kind, charge))

    def _degree(self, atom: int) -> int:
        return len(self.bonds.neighbours[atom])

    def _open_site(self, atom: int, slots: int) -> None:
        z = int(self.numbers[atom])
        if not self._degree(atom):
            self._lone_atom(atom, z, slots)
        elif slots == 1:
            kind = self._kind_of_one(atom, z)
            self._add(atom, kind, {Kind.ANION: -1, Kind.CATION: 1}.get(kind, 0))
        elif slots % 2:
            self._add(atom, Kind.FLEXIBLE, 0)
            self._add(atom, Kind.CARBENE, 0)
        elif atom in self.bonds.contacts and z in PNICTOGENS | CHALCOGENS:
            for _ in range(slots):
                self._add(atom, Kind.ANION, -1)
        else:
            self._add(atom, Kind.CARBENE, 0)

    def _kind_of_one(self, atom: int, z: int) -> Kind:
        """One open valence: atoms with lone pairs and bare carbon ends close as anions, others either way."""
        if atom in self.lewis.cations:
            return Kind.CATION
        if self._in_nitrogen_oxide(atom):
            return Kind.FLEXIBLE
        if z in PNICTOGENS | CHALCOGENS | HALOGENS:
            return Kind.ANION
        if atom in self.bonds.contacts:
            return Kind.ANION
        other = self.bonds.neighbours[atom][0]
        in_pair_of_two = self._degree(other) == 1 and int(self.numbers[other]) in TETRELS
        is_bare_end = z in TETRELS and self._degree(atom) == 1 and not in_pair_of_two
        return Kind.ANION if is_bare_end else Kind.FLEXIBLE

    def _in_nitrogen_oxide(self, atom: int) -> bool:
        """NO and linear NO2: nitrosyl and nitryl cations are as common as the anions."""
        centre = atom if int(self.numbers[atom]) == 7 else self.bonds.neighbours[atom][0]
        if int(self.numbers[centre]) != 7:
            return False
        others = self.bonds.neighbours[centre]
        if any(int(self.numbers[other]) != 8 or self._degree(other) != 1 for other in others):
            return False
        return len(others) == 1 or (len(others) == 2 and self.lewis.is_linear(centre))

    def _lone_atom(self, atom: int, z: int, slots: int) -> None:
        """Judge an atom without a covalent bond: an ion if it has company."""
        beside_metal = atom in self.bonds.contacts
        if z in HALOGENS or (beside_metal and z in {1} | PNICTOGENS | CHALCOGENS):
            for _ in range(slots):
                self._add(atom, Kind.ANION, -1)
        elif z in _TRUE_METALS and len(self.numbers) > 1:
            self._add(atom, Kind.UNKNOWN, 0)
        elif z in TRIELS - {5} and len(self.numbers) > 1 and not beside_metal:
            self._add(atom, Kind.FIXED, _TRIEL_ION)
        elif slots == 1:
            self._add(atom, Kind.FLEXIBLE, 0)
        else:
            for _ in range(slots // 2):
                self._add(atom, Kind.CARBENE, 0)
            if slots % 2:
                self._add(atom, Kind.FLEXIBLE, 0)

    def _claim_anions(self) -> None:
        """Count, for each centre with surplus bonds, the open atoms beside it: S-O of a sulfone is S+ and O-."""
        for site in self.sites:
            if site.kind is Kind.ANION:
                for other in self.bonds.neighbours[site.atom]:
                    if other in self.lewis.excess:
                        self.anions_beside[other] = self.anions_beside.get(other, 0) + 1
                        break

    def _surplus_site(self, atom: int, surplus: int) -> None:
        z, degree = int(self.numbers[atom]), self._degree(atom)
        if self._may_hide_a_lone_pair(atom, z, degree):
            self._add(atom, Kind.UNKNOWN, 0)
            return
        if _is_beyond(self.lewis, atom):
            cluster = z in TRIELS
            self._add(atom, Kind.UNKNOWN if cluster else Kind.BEYOND, 0 if cluster else surplus)
            return
        charge = min(surplus, valence_electrons()[z] - degree)
        if z in TRIELS | TETRELS:
            charge = -abs(charge) if z != 6 else surplus
        while charge - self.anions_beside.get(atom, 0) >= 2:
            charge -= 2  # a lone pair stays at the centre: SF4, ClF3, XeF2
        if charge - self.anions_beside.get(atom, 0) == 1 and self._either_way(z, degree):
            self._add(atom, Kind.FIXED, charge - 1)
            self._add(atom, Kind.FLEXIBLE, 0)
        else:
            spare = self._is_polyhalide(atom, z, degree) or self._is_seesaw(atom, z, degree)
            self._add(atom, Kind.FIXED, charge - 2 * spare)

    def _either_way(self, z: int, degree: int) -> bool:
        """Hypervalent centres with an odd electron to settle: SF5, BrF4 may be cation, anion or radical."""
        return (z in CHALCOGENS and degree == 5) or (z in HALOGENS and degree in {4, 6})

    def _may_hide_a_lone_pair(self, atom: int, z: int, degree: int) -> bool:
        """Doubt heavy centres that keep a lone pair unseen: SnCl4 2-, TeCl6 2-, SbCl6 3-, complexes of In+."""
        heavy_halides = any(int(self.numbers[other]) in HALOGENS - {9} for other in self.bonds.neighbours[atom])
        return z in _TRUE_METALS or (z >= _FOURTH_ROW and degree >= 5 and heavy_halides)

    def _is_seesaw(self, atom: int, z: int, degree: int) -> bool:
        """Tell a tetrahalide anion of phosphorus and its kin, a seesaw, from the tetrahedral cation."""
        return z in PNICTOGENS - {7} and degree == 4 and self.lewis.lopsided(atom) > _SEESAW_SUM

    def _is_polyhalide(self, atom: int, z: int, degree: int) -> bool:
        """Tell a linear trihalide, whose middle has a lone pair more, from a bent halonium ion."""
        return z in HALOGENS and degree == 2 and self.lewis.is_linear(atom)

    def _metal_site(self, atom: int) -> None:
        charge = ion_charges()[int(self.numbers[atom])]
        beside = self.bonds.contacts.get(atom, ())
        if not charge or any(not is_covalent()[self.numbers[other]] for other in beside):
            self._add(atom, Kind.UNKNOWN, 0)
            return
        anionic = sum(1 for site in self.sites if site.kind is Kind.ANION and site.atom in beside)
        missing = charge - anionic if anionic or not beside else 0
        self._add(atom, Kind.FIXED, charge - max(0, missing))
        if missing > 0:
            self._add(atom, Kind.SUBVALENT, missing)
