"""Atoms named by number: ghosts and fragments. Their numbers must exist, and name an atom once."""

from collections.abc import Iterator, Mapping
from typing import Any

from checker.reading.faults import Fault, KeyPath, cut_short
from checker.reading.words import described, plural


def faults_of_numbers(mapping: Mapping[str, Any], n_atoms: int) -> list[Fault]:
    """Return what is wrong with the atom numbers of a deck. Values of the wrong kind are left to the model."""
    faults = []
    species = mapping.get("species")
    if isinstance(species, Mapping):
        at: KeyPath = ("species", "ghost_atoms")
        ghosts = list(_faults_of_list(species.get("ghost_atoms"), at, n_atoms, {}))
        faults += cut_short(ghosts, "species.ghost_atoms")
    fragments = mapping.get("fragments")
    if isinstance(fragments, list):
        faults += cut_short(list(_faults_of_fragments(fragments, n_atoms)), "the fragments")
    return faults


def _faults_of_fragments(fragments: list[Any], n_atoms: int) -> Iterator[Fault]:
    owners: dict[int, str] = {}
    for index, fragment in enumerate(fragments):
        if isinstance(fragment, Mapping):
            if fragment.get("atoms") == []:
                message = f"fragments[{index}].atoms is empty; list the fragment's atoms by number"
                yield Fault(("fragments", index, "atoms"), message)
            here: dict[int, str] = {}
            yield from _faults_of_list(fragment.get("atoms"), ("fragments", index, "atoms"), n_atoms, here, owners)
            owners |= dict.fromkeys(here, f"fragments[{index}]")


def _faults_of_list(
    numbers: object, at: KeyPath, n_atoms: int, seen: dict[int, str], owners: Mapping[int, str] | None = None
) -> Iterator[Fault]:
    """Complain of numbers out of range, repeated, or owned by another fragment; note in `seen` the good ones."""
    for index, number in enumerate(numbers if isinstance(numbers, list) else ()):
        if isinstance(number, bool) or not isinstance(number, int):
            continue
        if not 1 <= number <= n_atoms:
            message = (
                f"there is no atom {described(number)}; the deck has {plural(n_atoms, 'atom')}, numbered from 1"
            )
            yield Fault((*at, index), message)
        elif number in seen:
            yield Fault((*at, index), f"atom {number} is listed twice; keep one of the two")
        elif owners and number in owners:
            message = f"atom {number} is already in {owners[number]}; an atom belongs to one fragment"
            yield Fault((*at, index), message)
        else:
            seen[number] = ""
