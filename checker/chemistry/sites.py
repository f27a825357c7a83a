"""Sites: the atoms that carry a charge or an open valence in the closed-shell structure.

What an atom may carry once all shells are closed depends on its kind: oxygen, nitrogen or a halogen becomes an
anion; carbon may become an anion or a cation; two open valences on one carbon are a carbene; onium, borate,
hypervalent and metal centres have the charge that comes with their bonds.

Provides `collect_sites`, `is_beyond` and the records `Site` and `Kind`.
"""

import enum
from dataclasses import dataclass

import numpy as np

from checker.chemistry.lewis import CHALCOGENS, HALOGENS, PNICTOGENS, TETRELS, TRIELS, LewisStructure
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


def collect_sites(lewis: LewisStructure) -> tuple[Site, ...]:
    """Return the sites of a structure, ordered by atom."""
    return tuple(_Sites(lewis).collect())


def is_beyond(lewis: LewisStructure, atom: int) -> bool:
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
        self.bare: set[int] = set()
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
        elif z in TETRELS and self._in_bare_cluster(atom):
            self._add(atom, Kind.UNKNOWN, 0)
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

    def _in_bare_cluster(self, atom: int) -> bool:
        """Tell bare carbon or silicon (C2, C3, Si4), whose ends pair in other ways than by usual valences."""
        seen, waiting = {atom}, [atom]
        while waiting:
            for other in self.bonds.neighbours[waiting.pop()]:
                if other in self.bare:
                    return True
                if int(self.numbers[other]) not in TETRELS:
                    return False
                if other not in seen:
                    seen.add(other)
                    waiting.append(other)
        self.bare |= seen
        return True

    def _kind_of_one(self, atom: int, z: int) -> Kind:
        """One open valence: atoms with lone pairs and bare carbon ends close as anions, others either way."""
        if atom in self.lewis.cations:
            return Kind.CATION
        if self._may_well_be_a_cation(atom, z):
            return Kind.FLEXIBLE
        if z in PNICTOGENS | CHALCOGENS | HALOGENS:
            return Kind.ANION
        if atom in self.bonds.contacts:
            return Kind.ANION
        other = self.bonds.neighbours[atom][0]
        in_pair_of_two = self._degree(other) == 1 and int(self.numbers[other]) in TETRELS
        is_bare_end = z in TETRELS and self._degree(atom) == 1 and not in_pair_of_two
        return Kind.ANION if is_bare_end else Kind.FLEXIBLE

    def _may_well_be_a_cation(self, atom: int, z: int) -> bool:
        """Doubt the anion where the cation is as common: NO, linear NO2, diazonium, nitroxides, phosphenium."""
        if z in PNICTOGENS - {7}:
            return True
        if self._degree(atom) != 1:
            return False
        (other,) = self.bonds.neighbours[atom]
        z_other = int(self.numbers[other])
        if self._degree(other) == 1:
            pair = {z, z_other}
            return bool(pair & PNICTOGENS) and bool(pair & CHALCOGENS)
        if z_other != 7 or other in self.lewis.donors:
            return False
        return self.lewis.is_linear(other) if self._degree(other) == 2 else z == 8 and self._degree(other) == 3

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
        if is_beyond(self.lewis, atom):
            cluster = z in TRIELS
            self._add(atom, Kind.UNKNOWN if cluster else Kind.BEYOND, 0 if cluster else surplus)
            return
        if z == 1:
            self._add(atom, Kind.FIXED, surplus)  # a bridge between two borate-like centres: H+ of B2H6
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
