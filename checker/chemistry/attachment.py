"""Whether an anion holds its electrons in the gas phase.

Three grounds: a small multiply charged anion, in which the electrons repel each other more than the nuclei bind
them; a molecule with closed valences and no multiple bond, lone heavy halogen or empty orbital to take an extra
electron; a molecule known from electron transmission spectroscopy to form a temporary anion only.
Sources: A. I. Boldyrev, J. Simons, J. Chem. Phys. 98, 4745 (1993) and X.-B. Wang, L.-S. Wang, Annu. Rev. Phys.
Chem. 60, 105 (2009) for multiply charged anions; K. D. Jordan, P. D. Burrow, Chem. Rev. 87, 557 (1987) for
temporary anions (all from memory).

Provides `unbound_because`, `hill_formula` and `written_formula`.
"""

from collections import Counter
from dataclasses import dataclass

from checker.chemistry.neighbours import Ints
from checker.chemistry.valence import Valence
from checker.elements import symbol_of
from checker.tables.structure import attachment_energies, is_covalent

LARGEST_SMALL_DIANION = 5
"""Atoms other than hydrogen: sulfate and carbonate are unbound, as is all of their size without a metal."""

LARGEST_SMALL_TRIANION = 12
"""Atoms other than hydrogen of an anion with three charges or more; a guess on the safe side, no source."""

LARGEST_SATURATED = 12
"""Atoms other than hydrogen; larger saturated molecules may hold an electron by their polarisability or dipole."""

_IUPAC_ORDER = "B Ge Si C Sb As P N H Po Te Se S At I Br Cl O F".split()
_SATURATED_ELEMENTS = frozenset({1, 6, 7, 8, 9, 14, 15, 16})
_REPELLING = frozenset({7, 8, 9, 15, 16})


@dataclass(frozen=True, slots=True)
class Unbound:
    """Why electrons are not bound: the ground in one sentence, confidence 0 to 1, an energy if one is known."""

    why: str
    confidence: float
    attachment_ev: float | None = None


def unbound_because(numbers: Ints, charge: int, valence: Valence) -> Unbound | None:
    """Return why a gas-phase anion would lose electrons, or None where nothing speaks against it."""
    if charge >= 0:
        return None
    heavy = int((numbers != 1).sum())
    if charge <= -2:
        return _crowded(numbers, charge, heavy)
    if valence.implied_charge != 0 or valence.tally.open or valence.tally.carbenes:
        return None
    energy = attachment_energies().get(hill_formula(numbers))
    if energy is not None:
        why = f"Electron transmission finds the anion {energy:.1f} eV above the neutral molecule and an electron."
        return Unbound(why, 0.8, energy)
    if heavy <= LARGEST_SATURATED and _is_saturated(numbers, valence):
        return Unbound("All valences are closed by single bonds, and no low-lying empty orbital is left.", 0.85)
    return None


def hill_formula(numbers: Ints) -> str:
    """Return the formula in Hill order: carbon, hydrogen, then by symbol; without carbon all by symbol."""
    counts = Counter(symbol_of(z) for z in numbers.tolist())
    first = [symbol for symbol in ("C", "H") if symbol in counts] if "C" in counts else []
    order = [*first, *sorted(set(counts) - set(first))]
    return "".join(f"{symbol}{counts[symbol] if counts[symbol] > 1 else ''}" for symbol in order)


def written_formula(numbers: Ints) -> str:
    """Return the formula as chemists write it: organic molecules in Hill order, others in the IUPAC sequence.

    Source: Nomenclature of Inorganic Chemistry, IUPAC Recommendations 2005, table VI (from memory).

    >>> import numpy as np
    >>> written_formula(np.array([8, 8, 16, 8, 8])), written_formula(np.array([1, 1, 1, 7]))
    ('SO4', 'NH3')
    """
    present = set(numbers.tolist())
    if {1, 6} <= present:
        return hill_formula(numbers)
    rank = {symbol: place for place, symbol in enumerate(_IUPAC_ORDER)}
    counts = Counter(symbol_of(z) for z in numbers.tolist())
    order = sorted(counts, key=lambda symbol: (rank.get(symbol, -1), symbol))
    return "".join(f"{symbol}{counts[symbol] if counts[symbol] > 1 else ''}" for symbol in order)


def _crowded(numbers: Ints, charge: int, heavy: int) -> Unbound | None:
    most = LARGEST_SMALL_DIANION if charge == -2 else LARGEST_SMALL_TRIANION
    if heavy > most or not is_covalent()[numbers].all():
        return None
    why = "The charges repel each other more than so small an anion can bind; water, ions or a crystal hold it."
    return Unbound(why, 0.9)


def _is_saturated(numbers: Ints, valence: Valence) -> bool:
    """One molecule of light elements, with single bonds only, none of them between two atoms with lone pairs."""
    if valence.lewis.pairing.bonds or valence.lewis.excess:
        return False
    if not _SATURATED_ELEMENTS.issuperset(numbers.tolist()) or len(valence.bonds.component(0)) != len(numbers):
        return False
    return not any(
        int(numbers[i]) in _REPELLING and int(numbers[j]) in _REPELLING
        for i, others in enumerate(valence.bonds.neighbours)
        for j in others
    )
