"""Where a hydrogen may have been lost, and which hydrogen may be one too many.

Provides `lost_hydrogens` and `surplus_hydrogens`: candidates with the sites that the structure would have after
the edit, and how well the geometry speaks for it (0 to about 1.2).
"""

from dataclasses import dataclass, replace

from checker.chemistry.lewis import CHALCOGENS, HALOGENS, PNICTOGENS
from checker.chemistry.sites import Kind, Site
from checker.chemistry.vacancy import has_twin, hydrogen_site, vacancy
from checker.chemistry.valence import Tally, Valence

MOST_CANDIDATES = 5
LEAST_ROOM = 0.40
"""An atom of a multiple bond is a candidate only where the geometry leaves this much room for a hydrogen."""

ALIKE = 0.4
"""The oxygens of an oxo-anion are alike; had one lost a hydrogen, its bond would be the longer."""

_MOST_LOOKED_AT = 400
_COUNTS = {
    Kind.ANION: "anions",
    Kind.FLEXIBLE: "flexible",
    Kind.CATION: "cations",
    Kind.SUBVALENT: "subvalent",
    Kind.CARBENE: "carbenes",
}
_SHAPES = {1: "one neighbour", 2: "two neighbours", 3: "three neighbours in a pyramid"}


@dataclass(frozen=True, slots=True, kw_only=True)
class HydrogenEdit:
    """A hydrogen to add to `atom`, or the hydrogen `atom` to delete.

    `fit` is the evidence of the geometry, `tally_after` the sites that the edit leaves, `reason` a clause whose
    subject is the atom (and whose last word is the atom `centre`, if there is one), `position` (x, y, z) in
    angstrom where a hydrogen would go.
    """

    atom: int
    fit: float
    tally_after: Tally
    reason: str
    centre: int | None = None
    position: tuple[float, float, float] | None = None


def lost_hydrogens(valence: Valence) -> list[HydrogenEdit]:
    """Return atoms that may have lost a hydrogen, best fit first."""
    after = {**_on_multiple_bonds(valence), **_on_open_sites(valence)}
    ranked = sorted(after.items(), key=lambda item: (-item[1][0], item[0]))
    return [_lost(valence, atom, fit, tally) for atom, (fit, tally) in ranked[:MOST_CANDIDATES]]


def surplus_hydrogens(valence: Valence) -> list[HydrogenEdit]:
    """Return hydrogens that may be one too many: on overfull atoms, bonded to nothing, or acidic."""
    found = [*_on_overfull_atoms(valence), *_lone_hydrogens(valence)]
    return found[:MOST_CANDIDATES]


def _room(valence: Valence, atom: int) -> float:
    room = vacancy(atom, valence.lewis.numbers, valence.lewis.coordinates, valence.bonds)
    return room * ALIKE if has_twin(atom, valence.lewis.numbers, valence.bonds) else room


def _on_open_sites(valence: Valence) -> dict[int, tuple[float, Tally]]:
    """Open atoms, and those that the open valence could be shifted to along the multiple bonds."""
    found: dict[int, tuple[float, Tally]] = {}
    for site in valence.sites[:_MOST_LOOKED_AT]:
        if site.kind not in _COUNTS or (site.kind is Kind.ANION and site.atom in valence.bonds.contacts):
            continue
        tally = _closed_by_one(valence, site)
        places = valence.lewis.pairing.alternatives(site.atom) if site.atom in valence.lewis.open else (site.atom,)
        for atom in places:
            fit = max(0.03, _room(valence, atom))
            if atom not in found or fit > found[atom][0]:
                found[atom] = (fit, tally)
    return found


def _closed_by_one(valence: Valence, site: Site) -> Tally:
    """Return the tally after a hydrogen has taken one open valence of this site."""
    name = _COUNTS[site.kind]
    tally = replace(valence.tally, **{name: getattr(valence.tally, name) - 1})
    tally = replace(tally, oxo_anions=min(tally.oxo_anions, tally.anions))
    if site.kind is Kind.CARBENE:
        return _opened(valence, tally, site.atom)
    return tally


def _opened(valence: Valence, tally: Tally, atom: int) -> Tally:
    """Return the tally with one more open valence, at this atom."""
    z = int(valence.lewis.numbers[atom])
    if z in PNICTOGENS | CHALCOGENS | HALOGENS:
        return replace(tally, anions=tally.anions + 1)
    return replace(tally, flexible=tally.flexible + 1)


def _on_multiple_bonds(valence: Valence) -> dict[int, tuple[float, Tally]]:
    """Atoms of multiple bonds with room for a hydrogen; its partner is then left open."""
    found: dict[int, tuple[float, Tally]] = {}
    for i, j in sorted(valence.lewis.pairing.bonds)[:_MOST_LOOKED_AT]:
        for atom, partner in ((i, j), (j, i)):
            room = _room(valence, atom)
            if room >= LEAST_ROOM:
                tally = replace(valence.tally, paired_triplets=0)
                found[atom] = (room, _opened(valence, tally, partner))
    return found


def _lost(valence: Valence, atom: int, fit: float, tally: Tally) -> HydrogenEdit:
    lewis = valence.lewis
    place = hydrogen_site(atom, lewis.numbers, lewis.coordinates, valence.bonds)
    degree = len(valence.bonds.neighbours[atom])
    shape = f"has {_SHAPES[degree]}" if degree in _SHAPES else "stands alone"
    if degree == 3 and fit < LEAST_ROOM:
        shape = "has three neighbours"
    x, y, z = (round(float(value), 4) for value in place)
    reason = f"{shape}, with room for a hydrogen"
    return HydrogenEdit(atom=atom, fit=fit, tally_after=tally, reason=reason, position=(x, y, z))


def _on_overfull_atoms(valence: Valence) -> list[HydrogenEdit]:
    """Take the longest X-H bond of each atom that has more bonds than its octet valence."""
    found = []
    numbers = valence.lewis.numbers
    for site in valence.sites:
        if site.kind not in {Kind.FIXED, Kind.BEYOND} or site.atom not in valence.lewis.excess or site.charge < 1:
            continue
        neighbours = zip(valence.bonds.lengths[site.atom], valence.bonds.neighbours[site.atom], strict=True)
        hydrogens = [(length, other) for length, other in neighbours if numbers[other] == 1]
        if hydrogens:
            tally = replace(valence.tally, base=valence.tally.base - 1)
            reason = f"is one of {len(valence.bonds.neighbours[site.atom])} neighbours of"
            fit = 0.9 if site.kind is Kind.BEYOND else 0.4
            found.append(
                HydrogenEdit(atom=max(hydrogens)[1], fit=fit, tally_after=tally, reason=reason, centre=site.atom)
            )
        if len(found) >= MOST_CANDIDATES:
            break
    return found


def _lone_hydrogens(valence: Valence) -> list[HydrogenEdit]:
    """Hydrogens that are bonded to nothing, in company."""
    found = []
    if len(valence.lewis.numbers) > 1:
        for site in valence.sites:
            alone = not valence.bonds.neighbours[site.atom] and site.atom not in valence.bonds.contacts
            if alone and site.kind is Kind.FLEXIBLE and valence.lewis.numbers[site.atom] == 1:
                tally = replace(valence.tally, flexible=valence.tally.flexible - 1)
                found.append(
                    HydrogenEdit(atom=site.atom, fit=1.0, tally_after=tally, reason="is bonded to nothing")
                )
                if len(found) >= MOST_CANDIDATES:
                    break
    return found
