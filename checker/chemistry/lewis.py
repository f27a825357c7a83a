"""The closed-shell structure in the making: multiple bonds, lone-pair donors, the place of what stays open.

Works on the bonds between main-group atoms. An octet atom with b bonds has the formal charge G - 8 + b (G its
valence electrons), so the charge of a structure is settled once its multiple bonds are: each adds two electrons'
worth. Where an atom with a lone pair stands next to two open valences (nitro, nitrate, azide, ozone, carbon
monoxide), it gives the lone pair to a multiple bond and turns into a cation.
Source: G. N. Lewis, J. Am. Chem. Soc. 38, 762 (1916); the octet bookkeeping is textbook matter.
"""

import math

from checker.chemistry.bonding import Bonds
from checker.chemistry.neighbours import Floats, Ints
from checker.chemistry.pi_bonds import MOST_MULTIPLE_BONDS, Edge, Pairing
from checker.chemistry.vacancy import LINEAR_SUM, bond_order, direction_sum, vacancy
from checker.tables.structure import first_valences, is_covalent

SHORT_ENOUGH_ORDER = 1.15
"""A bond whose length speaks for less than this is taken as single, unless no other pairing exists."""

CATION_ORDER = 1.45
"""A bond from an open atom to a lone-pair donor of at least this order is that of an iminium or oxonium ion."""

PLANAR_SUM = 0.35
"""Three unit vectors that add up to less than this are taken as planar."""

HETERO_BONUS = 0.3
"""Among the atoms that could be left open, one with lone pairs is preferred by this much vacancy."""

PNICTOGENS = frozenset({7, 15, 33, 51})
CHALCOGENS = frozenset({8, 16, 34, 52})
HALOGENS = frozenset({9, 17, 35, 53})
TETRELS = frozenset({6, 14, 32, 50})
TRIELS = frozenset({5, 13, 31, 49})
SECOND_ROW = frozenset({5, 6, 7, 8, 9})
_LONE_PAIRS = PNICTOGENS | CHALCOGENS | HALOGENS


class LewisStructure:
    """Multiple bonds and what stays open.

    Attributes
    ----------
    open : valences left open, by atom; only those that are.
    excess : single bonds beyond the octet valence, by atom.
    donors : atoms that gave a lone pair to a multiple bond: formal charge +1 each.
    cations : open atoms next to a donor over a short bond: carbenium centres of iminium and like ions.
    stretched : multiple bonds that had to be put on bonds of single length.
    gave_up : True where the pairing ran out of its budget.
    """

    def __init__(self, numbers: Ints, coordinates: Floats, bonds: Bonds) -> None:
        self.numbers, self.coordinates, self.bonds = numbers, coordinates, bonds
        lacking = (first_valences()[numbers] - bonds.degrees()) * is_covalent()[numbers]
        self._slots = {int(i): int(lacking[i]) for i in (lacking > 0).nonzero()[0]}
        self.excess = {int(i): -int(lacking[i]) for i in (lacking < 0).nonzero()[0]}
        self.donors: list[int] = []
        self.cations: set[int] = set()
        self.stretched: list[Edge] = []
        self.pairing = Pairing(self._slots)
        if self._slots:
            self._solve()
        self.open = {atom: slots for atom, slots in self.pairing.left.items() if slots}
        self.gave_up = self.pairing.gave_up

    def order(self, i: int, j: int) -> float:
        """Return the bond order that the length of a bond speaks for."""
        length = self.bonds.lengths[i][self.bonds.neighbours[i].index(j)]
        return bond_order(int(self.numbers[i]), int(self.numbers[j]), length)

    def room(self, atom: int) -> float:
        """Return the vacancy of an atom (see `checker.chemistry.vacancy`)."""
        return vacancy(atom, self.numbers, self.coordinates, self.bonds)

    def lopsided(self, atom: int) -> float:
        """Return the length of the sum of the unit vectors to the neighbours: 0 for a regular centre."""
        return math.hypot(*direction_sum(atom, self.coordinates, self.bonds))

    def is_planar(self, atom: int) -> bool:
        """Say whether the directions to three neighbours lie in a plane."""
        return self.lopsided(atom) < PLANAR_SUM

    def _solve(self) -> None:
        short, long = self._unsaturated_bonds()
        self.pairing.add_edges(short)
        self.pairing.pair_greedily()
        self.pairing.pair_by_paths()
        if any(self.pairing.left.values()):
            self._give_lone_pairs()
            self._use_long_bonds(long)
            self._settle()

    def _unsaturated_bonds(self) -> tuple[list[Edge], list[Edge]]:
        """Bonds that may become multiple: those short enough, the shortest for its kind first, and the others."""
        ranked = []
        for i in self._slots:
            for j in self.bonds.neighbours[i]:
                if i < j and j in self._slots and self.numbers[i] != 1 and self.numbers[j] != 1:
                    ranked.append((-self.order(i, j), (i, j)))
        ranked.sort()
        short = [edge for order, edge in ranked if -order >= SHORT_ENOUGH_ORDER]
        return short, [edge for _, edge in ranked[len(short) :]]

    def _use_long_bonds(self, long: list[Edge]) -> None:
        if not long or not any(self.pairing.left.values()):
            return
        self.pairing.add_edges(long)
        self.pairing.pair_by_paths()
        self.stretched = [edge for edge in long if self.pairing.between(*edge)]

    def _give_lone_pairs(self) -> None:
        acceptors: dict[int, list[int]] = {}
        for atom, slots in self.pairing.left.items():
            if slots and self.numbers[atom] != 1:
                for other in self.bonds.neighbours[atom]:
                    acceptors.setdefault(other, []).extend([atom] * slots)
        for donor, takers in acceptors.items():
            if self._may_donate(donor) and self._is_wanted(donor, takers):
                self._donate(donor, takers)

    def _may_donate(self, atom: int) -> bool:
        """Say whether a neutral atom has a lone pair to give; below the second row only where flat or bent."""
        z = int(self.numbers[atom])
        degree = len(self.bonds.neighbours[atom])
        bonds_made = degree + self.pairing.bonds_of(atom)
        if z in PNICTOGENS:
            return bonds_made == 3 and not self.pairing.left.get(atom) and (z == 7 or self._flat(atom, degree))
        if z in CHALCOGENS:
            return bonds_made == 2 or (z != 8 and bonds_made == 3 and degree == 3 and self.is_planar(atom))
        return False

    def _flat(self, atom: int, degree: int) -> bool:
        return degree < 3 or self.is_planar(atom)

    def _is_wanted(self, donor: int, takers: list[int]) -> bool:
        """Say whether one slot beside the donor can take the multiple bond and another the negative charge."""
        hetero = [taker for taker in takers if int(self.numbers[taker]) in _LONE_PAIRS]
        if not hetero:
            return len(takers) > 1 and takers.count(takers[0]) > 1 and len(self.bonds.neighbours[takers[0]]) == 1
        if int(self.numbers[donor]) in SECOND_ROW or any(
            self.numbers[taker] != self.numbers[donor] for taker in takers
        ):
            return True  # a chain of one heavy element may be neutral or a dianion, and only its lengths tell
        return all(self.order(donor, taker) >= SHORT_ENOUGH_ORDER for taker in takers)

    def _donate(self, donor: int, takers: list[int]) -> None:
        """Open a slot at the donor and pair it, keeping one taker's slot for the negative charge."""
        self.pairing.add_slot(donor)
        self.pairing.add_edges((donor, other) for other in self.bonds.neighbours[donor] if other in self._slots)
        if self._pair_with_taker(donor, takers) or self._pair_elsewhere(donor, takers):
            self.donors.append(donor)
        else:
            self.pairing.left[donor] -= 1

    def _pair_with_taker(self, donor: int, takers: list[int]) -> bool:
        """Pair the donor with the neediest atom beside it, carbon before others, if another slot stays open."""
        free = [taker for taker in takers if self.pairing.between(donor, taker) < MOST_MULTIPLE_BONDS]
        if len(takers) < 2 or not free:
            return False
        best = max(
            free, key=lambda taker: (takers.count(taker), int(self.numbers[taker]) not in _LONE_PAIRS, -taker)
        )
        self.pairing.shift([donor, best])
        return True

    def _pair_elsewhere(self, donor: int, takers: list[int]) -> bool:
        """Pair the donor along the multiple bonds with an open atom farther off, as in pyridine N-oxide."""
        self.pairing.left[takers[0]] -= 1
        found = self.pairing.extend_from(donor)
        self.pairing.left[takers[0]] += 1
        return found

    def _settle(self) -> None:
        """Move each open slot to the atom where lengths and angles say it is; mark stabilised cations."""
        for atom in sorted(atom for atom, slots in self.pairing.left.items() if slots):
            if self.numbers[atom] == 1 or not self.pairing.left[atom]:
                continue
            paths = self.pairing.alternatives(atom)
            best = max(paths, key=lambda other: (round(self._openness(other), 3), other == atom, -other))
            if best != atom:
                self.pairing.shift(paths[best])
            if self.pairing.left[best] == 1 and self._openness(best) < 0.5 and any(map(self._is_cationic, paths)):
                self.cations.add(best)

    def _openness(self, atom: int) -> float:
        z = int(self.numbers[atom])
        return self.room(atom) + (HETERO_BONUS if z in _LONE_PAIRS else 0.0)

    def _is_cationic(self, atom: int) -> bool:
        """Say whether a planar carbon has a short bond to a saturated donor, as in an iminium ion."""
        if int(self.numbers[atom]) != 6 or len(self.bonds.neighbours[atom]) != 3 or not self.is_planar(atom):
            return False
        return any(
            self._saturated_donor(other) and self.order(atom, other) >= CATION_ORDER
            for other in self.bonds.neighbours[atom]
        )

    def _saturated_donor(self, atom: int) -> bool:
        z, degree = int(self.numbers[atom]), len(self.bonds.neighbours[atom])
        return (z == 7 and degree == 3) or (z in {8, 16} and degree == 2)

    def is_linear(self, atom: int) -> bool:
        """Say whether an atom with two neighbours lies on the line between them."""
        return self.lopsided(atom) < LINEAR_SUM
