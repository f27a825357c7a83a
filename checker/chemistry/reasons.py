"""Why a slip is likely, in the words of chemistry: one clause each.

Provides `why_multiplicity`, `why_charge`, `why_doubled` and the record `Wording` that they speak from.
"""

from collections.abc import Callable, Sequence
from dataclasses import dataclass

from checker.chemistry.plausibility import ground_multiplicity
from checker.chemistry.valence import Valence

MOST_NAMED = 6

_COUNTS = ("no", "one", "two", "three", "four", "five", "six")


@dataclass(frozen=True)
class Wording:
    """The structure, the stated charge and multiplicity, and how an atom is called."""

    valence: Valence
    charge: int
    multiplicity: int
    label: Callable[[int], str]

    @property
    def free_atom(self) -> int | None:
        """The atomic number of a single atom, else None."""
        numbers = self.valence.lewis.numbers
        return int(numbers[0]) if len(numbers) == 1 else None


def why_multiplicity(of: Wording, multiplicity: int) -> str:
    """Return what speaks for another multiplicity."""
    valence = of.valence
    if of.free_atom is not None and ground_multiplicity(of.free_atom, of.charge) == multiplicity:
        return _ground_level(of.free_atom, of.charge, multiplicity)
    if multiplicity == 1 and valence.implied_charge == of.charge:
        return "all valences are closed, which makes a singlet"
    if multiplicity == valence.tally.open + 1 and valence.lewis.open:
        return f"{_open_atoms(of)}, {_unpaired(multiplicity - 1)}"
    return f"{_unpaired(multiplicity - 1)} would fit the electron count"


def why_charge(of: Wording, charge: int) -> str:
    """Return what speaks for another charge."""
    implied = of.valence.implied_charge
    written = f"charge {charge:+d}" if charge else "charge 0"
    if of.free_atom is not None:
        if ground_multiplicity(of.free_atom, charge) == of.multiplicity:
            return _ground_level(of.free_atom, charge, of.multiplicity)
    elif implied == charge:
        return f"closed valences give {written}"
    elif implied is not None and abs(charge) > abs(implied):
        return f"one electron {'fewer' if charge > implied else 'more'} than the closed valences hold"
    return f"{written} would fit multiplicity {of.multiplicity}"


def why_doubled(numbers: Sequence[int]) -> str:
    """Return the clause for atoms that lie on others, by the numbers people know them by."""
    named = ", ".join(map(str, numbers[:MOST_NAMED])) + (" ..." if len(numbers) > MOST_NAMED else "")
    if len(numbers) == 1:
        return f"atom {named} lies on another of its element"
    return f"atoms {named} lie on others of their element"


def _ground_level(z: int, charge: int, multiplicity: int) -> str:
    from checker.elements import written_ion

    return f"the ground level of {written_ion(z, charge)} has multiplicity {multiplicity}"


def _open_atoms(of: Wording) -> str:
    atoms = sorted(of.valence.lewis.open)
    names = ", ".join(of.label(atom) for atom in atoms[:MOST_NAMED])
    more = f" and {len(atoms) - MOST_NAMED} more" if len(atoms) > MOST_NAMED else ""
    return f"{names}{more} {'has an open valence' if len(atoms) == 1 else 'have open valences'}"


def _unpaired(n_unpaired: int) -> str:
    count = _COUNTS[n_unpaired] if n_unpaired < len(_COUNTS) else str(n_unpaired)
    return f"{count} unpaired electron{'' if n_unpaired == 1 else 's'}"
