"""How likely a charge and multiplicity are for a structure with given open valences.

A small model, not a theory: closed valences are likeliest, a radical at a site is less so, an electron taken from
or added to a closed structure less again; charges near zero are commoner than high ones. The numbers are weights
relative to each other, fitted by hand to the measured ranking (tests/benchmarks/parity_ranking.py).
"""

import math
from collections.abc import Iterator
from itertools import product

from checker.chemistry.valence import Tally
from checker.errors import NotDerivable

CHARGE_WEIGHTS = (1.0, 0.35, 0.12, 0.05, 0.02)
"""Of |charge| 0, 1, 2, 3 and more."""

RADICAL_AT_LONE_PAIRS = 0.6
RADICAL_AT_OXO_ANION = 0.15
"""Carboxylates, nitrates and sulfates are met as anions; their radicals are rare."""
RADICAL_AT_CARBON = 0.6
RADICAL_AT_CATION = 0.25
RADICAL_AT_METAL = 0.8
CARBON_ION = 0.3
HOLES = (1.0, 0.12, 0.01)
"""None, one, two electrons taken from closed valences."""
ELECTRONS = (1.0, 0.07, 0.004)
"""None, one, two electrons added where no valence is open."""
EXCITED = 0.05
"""A pair of electrons unpaired without a site that asks for it."""
COUPLED = 0.5
"""Two open sites coupled to a singlet, or left as a triplet: either."""
TRIPLET_PAIR = (0.15, 0.85)
"""O2 and its like: singlet, triplet."""
METAL_STATE = 0.3
"""Any state of a metal of variable charge: nothing is known of it here."""

NOT_THE_GROUND_LEVEL = 0.1
"""Weight of a multiplicity of a free atom that is not that of its ground level."""
UNUSUAL_CHARGE = 0.3
"""Weight of a charge that the free atom's element does not usually have."""

_MOST_OPEN = 3


def state_weight(tally: Tally, charge: int, multiplicity: int) -> float:
    """Return the relative weight, 0 to 1, of a charge and a multiplicity (2S+1) for the sites of a structure."""
    weight = CHARGE_WEIGHTS[min(abs(charge), len(CHARGE_WEIGHTS) - 1)]
    if tally.unknown:
        return weight * METAL_STATE
    return weight * max((way for way in _ways(tally, charge, multiplicity)), default=0.0)


def _ways(tally: Tally, charge: int, multiplicity: int) -> Iterator[float]:
    """Weight of each way to close some sites, leave others open, and take or add the electrons that remain."""
    for closed, n_open, weight in _closures(tally):
        holes, electrons = max(0, charge - closed), max(0, closed - charge)
        if holes < len(HOLES) and electrons < len(ELECTRONS):
            unpaired = n_open + holes + electrons
            weight *= HOLES[holes] * ELECTRONS[electrons]  # noqa: PLW2901
            yield weight * _spin_weight(tally, unpaired, multiplicity - 1)


Way = tuple[int, int, float]
"""Charge, open sites, weight."""


def _closures(tally: Tally) -> Iterator[Way]:
    """Yield the ways to close the sites; of many like sites, all are closed but for a few."""
    flexible = tally.flexible if tally.flexible <= _MOST_OPEN else tally.flexible % 2
    groups = (
        _radicals(tally.anions - tally.oxo_anions, -1, RADICAL_AT_LONE_PAIRS),
        _radicals(tally.oxo_anions, -1, RADICAL_AT_OXO_ANION),
        _radicals(tally.cations, 1, RADICAL_AT_CATION),
        _radicals(tally.subvalent, 1, RADICAL_AT_METAL),
        list(_either(flexible)),
    )
    for ways in product(*groups):
        charge = tally.base + sum(way[0] for way in ways)
        yield charge, sum(way[1] for way in ways), math.prod(way[2] for way in ways)


def _either(sites: int) -> Iterator[Way]:
    """Yield the ways to close sites that may become cations or anions, or to leave them open."""
    for plus in range(sites + 1):
        for minus in range(sites - plus + 1):
            n_open = sites - plus - minus
            yield plus - minus, n_open, float(CARBON_ION ** (plus + minus) * RADICAL_AT_CARBON**n_open)


def _radicals(sites: int, charge: int, weight: float) -> list[Way]:
    """Return the ways to leave some of these sites open; `charge` is what a closed one carries."""
    return [
        (charge * (sites - n_open), n_open, float(weight**n_open)) for n_open in range(min(sites, _MOST_OPEN) + 1)
    ]


def _spin_weight(tally: Tally, unpaired: int, wanted: int) -> float:
    """Weight of `wanted` unpaired electrons where the sites have `unpaired`; 0 for the wrong parity."""
    if (unpaired - wanted) % 2:
        return 0.0
    weight = 1.0
    if tally.paired_triplets and unpaired < 2:
        weight *= TRIPLET_PAIR[1 if wanted >= unpaired + 2 else 0]
        unpaired += 2 if wanted >= unpaired + 2 else 0
    if tally.carbenes and wanted >= unpaired:
        weight *= COUPLED
        unpaired += min(2 * tally.carbenes, wanted - unpaired)
    if wanted > unpaired:
        return weight * float(EXCITED ** ((wanted - unpaired) // 2))
    if unpaired > 1:
        weight *= COUPLED
    return weight


def free_atom_weight(z: int, charge: int, multiplicity: int) -> float:
    """Return the relative weight of a state of a free atom: usual charge, multiplicity of the ground level."""
    from checker.chemistry.configurations import usual_charges

    weight = CHARGE_WEIGHTS[min(abs(charge), len(CHARGE_WEIGHTS) - 1)]
    weight *= 1.0 if charge == 0 or charge in usual_charges(z) else UNUSUAL_CHARGE
    ground = ground_multiplicity(z, charge)
    if ground is None:
        return weight * NOT_THE_GROUND_LEVEL if charge <= z else 0.0
    return weight * (1.0 if ground == multiplicity else NOT_THE_GROUND_LEVEL)


def ground_multiplicity(z: int, charge: int) -> int | None:
    """Return 2S+1 of the ground level of a free atom, or None where it is not known."""
    from checker.chemistry.configurations import ground_level

    try:
        return ground_level(z, charge).multiplicity
    except NotDerivable:
        return None
