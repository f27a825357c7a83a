"""length-unit: bond lengths must make sense in the stated unit.

Every atom's distance to its nearest neighbour is divided by the sum of the covalent radii. In molecules the
median of these ratios is near 1; bohr read as angstrom gives about 1.9, angstrom read as bohr about 0.53. One
distance is never judged, nor are pairs that need be no bond: noble gases, two metals, two hydrogens. A
structure with a single proper bond is in angstrom, however loose the rest. Three atoms stretched to twice
their bond lengths in a scan look the same as a wrong unit: the confidence grows with the number of atoms.

Passes: water with O-H 0.96 angstrom; three argon atoms at 3.8; water stretched by 15 %.
Speaks: water with O-H 1.81 and length_unit = "angstrom"; water with O-H 0.96 and length_unit = "bohr".
Source: radii of B. Cordero et al., Dalton Trans. 2008, 2832; limits measured over ASE's G2 set (120 of 120
found, no false alarm at scalings from 0.9 to 1.15).
"""

from collections.abc import Iterator

from checker.chemistry.contacts import LengthSlip
from checker.facts import Facts
from checker.findings import Edit, Finding, Grade, Repair
from checker.geometry import ANGSTROM_PER_BOHR
from checker.registry import Rule


def judge(facts: Facts) -> Iterator[Finding]:
    """Speak where the distances are a molecule's in the other unit only."""
    slip = facts.length_slip
    if slip is None:
        return
    found, meant = ("angstrom", "bohr") if slip.too_long else ("bohr", "angstrom")
    stated = facts.job.species.length_unit
    yield Finding(
        at="species.length_unit",
        message=f"the nearest neighbours stand at {slip.median_ratio:.2f} times a bond's length; "
        f"as {meant} they would stand at {_as_meant(slip):.2f}; {_way_out(facts, meant)}",
        why=f"The median over {slip.n_atoms} atoms is that of a molecule whose {meant} were read as {found}.",
        confidence=slip.confidence,
        evidence={
            "stated_unit": stated,
            "median_ratio": round(slip.median_ratio, 4),
            "ratio_in_other_unit": round(_as_meant(slip), 4),
            "atoms": slip.n_atoms,
        },
        repairs=_repairs(facts, meant, slip.confidence),
        subject=f"{found} for {meant}",
    )


def _as_meant(slip: LengthSlip) -> float:
    return slip.median_ratio * (ANGSTROM_PER_BOHR if slip.too_long else 1 / ANGSTROM_PER_BOHR)


def _way_out(facts: Facts, meant: str) -> str:
    factor = ANGSTROM_PER_BOHR if meant == "bohr" else 1 / ANGSTROM_PER_BOHR
    if facts.job.species.length_unit == meant:
        return f"multiply the coordinates by {factor:.6f}, as the unit has been converted twice"
    bare = f" (an XYZ file without a deck is in angstrom: multiply by {factor:.6f})" if meant == "bohr" else ""
    return f'set length_unit = "{meant}"{bare}'


def _repairs(facts: Facts, meant: str, weight: float) -> tuple[Repair, ...]:
    if facts.job.species.length_unit == meant:
        return ()
    return (Repair(f"the coordinates are in {meant}", (Edit("species.length_unit", meant),), weight),)


RULE = Rule("length-unit", Grade.DOUBT, judge)
