"""What a deck states by irrep, seen from the geometry's own symmetry: lazy, cached, read-only, part of `Facts`.

The group of the deck lies in the group of the body in one orientation, by which electrons and functions are
counted in either. A fact that cannot be worked out raises `NotDerivable` with the reason.
"""

import contextlib
from collections.abc import Callable, Mapping
from functools import cached_property
from typing import TYPE_CHECKING

import numpy as np
from numpy.typing import NDArray

from checker.chemistry.characters import known_group
from checker.chemistry.descent import Correlation, correlation
from checker.chemistry.filling import electron_correlation, fill_whole_levels, open_levels, terms_of
from checker.chemistry.functions import Form, levels_on_axis, levels_per_irrep
from checker.chemistry.irrep_names import read_orbital
from checker.chemistry.point_groups import INVERSION, indices_of, standard_operations
from checker.chemistry.relabelling import Relabelling, equivalent_relabellings, relabellings
from checker.errors import NotDerivable

if TYPE_CHECKING:
    from checker.chemistry.filling import OpenLevel
    from checker.chemistry.frames import Placement
    from checker.facts import Facts

Counts = Mapping[str, int]


class IrrepFacts:
    """Occupations and functions by irrep of the deck's group and of the body's."""

    def __init__(self, facts: "Facts") -> None:
        self._facts = facts

    @property
    def group(self) -> str:
        """The deck's group; not derivable where none is stated."""
        return self._facts.point_group.symbol

    @property
    def body_group(self) -> str:
        """The group of the geometry."""
        return self._facts.symmetry.group

    @cached_property
    def placement(self) -> "Placement":
        """The deck's group on the geometry; not derivable where it is no subgroup of what the geometry has."""
        symmetry = self._facts.symmetry
        placed = symmetry.subgroup(self.group, self._facts.job.symmetry.axes)
        if placed is None:
            raise NotDerivable(f"the geometry has the point group {symmetry.group}, {self.group} is not within it")
        return placed

    @cached_property
    def turn(self) -> NDArray[np.float64]:
        """(3, 3) takes coordinates in the standard frame of the body's group into that of the deck's."""
        return np.asarray(self.placement.frame @ self._facts.symmetry.frame.T)

    @cached_property
    def electrons_per_level(self) -> Correlation:
        """Electrons of one spin, by irrep of the deck's group, that fill a level of each irrep of the body's."""
        return electron_correlation(self.body_group, self.group, self.turn)

    @cached_property
    def states_per_level(self) -> Correlation:
        """What each irrep of a state of the body's group becomes in the deck's."""
        if self.body_group == self.group:
            return {irrep.name: {irrep.name: 1} for irrep in self._facts.point_group.irreps}
        return correlation(self.body_group, self.group, self.turn)

    @cached_property
    def electrons(self) -> tuple[dict[str, int], dict[str, int]]:
        """Alpha and beta electrons by irrep of the deck's group, zeros left out.

        Not derivable where the deck states none or one spin only, where a name is no irrep of the group or a
        number is negative, and where unpaired orbitals are more than 2S.
        """
        occupations = self._facts.job.occupations
        if occupations is None:
            raise NotDerivable("the deck states no occupations")
        if occupations.alpha is not None or occupations.beta is not None:
            return self._by_spin(occupations.alpha, occupations.beta)
        paired, unpaired = self.in_electrons(occupations.paired), self.in_electrons(occupations.unpaired)
        if sum(unpaired.values()) != self._facts.stated_multiplicity - 1:
            raise NotDerivable("which spin each of the unpaired orbitals holds is not stated")
        alpha = {name: paired.get(name, 0) + unpaired.get(name, 0) for name in {**paired, **unpaired}}
        return alpha, paired

    def _by_spin(self, alpha: Counts | None, beta: Counts | None) -> tuple[dict[str, int], dict[str, int]]:
        if (alpha is None or beta is None) and self._facts.stated_multiplicity != 1:
            raise NotDerivable("occupations are stated for one spin only")
        return self.read_counts(beta if alpha is None else alpha), self.read_counts(
            alpha if beta is None else beta
        )

    def read_counts(self, written: Counts | None) -> dict[str, int]:
        """Return counts under the irreps' own names, zeros left out; not derivable where one cannot be read."""
        found: dict[str, int] = {}
        for name, n in (written or {}).items():
            irrep = read_orbital(self._facts.point_group, name).irrep
            if irrep is None or n < 0:
                raise NotDerivable(f"{name} = {n} is no occupation in {self.group}")
            if n:
                found[irrep.name] = found.get(irrep.name, 0) + n
        return found

    def in_electrons(self, orbitals: Counts | None) -> dict[str, int]:
        """Return the electrons of one spin in levels: a level of T2 holds three."""
        dimensions = {irrep.name: irrep.dimension for irrep in self._facts.point_group.irreps}
        return {name: dimensions[name] * n for name, n in self.read_counts(orbitals).items()}

    @cached_property
    def functions(self) -> dict[str, int]:
        """Basis functions by irrep of the deck's group, a degenerate one with all its partners."""
        return self._functions_in(self.placement)

    def _functions_in(self, placement: "Placement") -> dict[str, int]:
        dimensions = {irrep.name: irrep.dimension for irrep in known_group(placement.group).irreps}
        levels = self._summed(lambda shells, form: self._levels(placement.group, placement, shells, form))
        return {name: dimensions[name] * n for name, n in levels.items()}

    @cached_property
    def placement_of_report(self) -> "Placement":
        """The deck's group where the geometry has it, else the abelian one: labels of the report are its own."""
        try:
            return self.placement
        except NotDerivable:
            return self._facts.symmetry.abelian

    @cached_property
    def functions_of_report(self) -> dict[str, int]:
        """Basis functions by irrep of the group of `placement_of_report`, degenerate ones with all partners."""
        return self._functions_in(self.placement_of_report)

    @cached_property
    def body_levels(self) -> dict[str, int]:
        """Levels of basis functions by irrep of the body's group."""
        placement = self._facts.symmetry.placement
        return self._summed(lambda shells, form: self._levels(self.body_group, placement, shells, form))

    @cached_property
    def minimal_body_levels(self) -> dict[str, int]:
        """Core and valence levels by irrep of the body's group, as a minimal basis would have them."""
        return self._levels(self.body_group, self._facts.symmetry.placement, self._minimal_shells, "spherical")

    @cached_property
    def _minimal_shells(self) -> NDArray[np.int64]:
        from checker.chemistry.minimal_shells import minimal_shells

        return minimal_shells(self._facts.numbers, self._facts.is_ghost)

    @cached_property
    def minimal_functions(self) -> dict[str, int]:
        """Core and valence functions by irrep of the deck's group, as a minimal basis would have them."""
        dimensions = {irrep.name: irrep.dimension for irrep in self._facts.point_group.irreps}
        levels = self._levels(self.group, self.placement, self._minimal_shells, "spherical")
        return {name: dimensions[name] * n for name, n in levels.items()}

    def _summed(self, levels: Callable[[NDArray[np.int64], Form], dict[str, int]]) -> dict[str, int]:
        """Add up the shells of either form."""
        basis = self._facts.job_basis
        found: dict[str, int] = {}
        forms: tuple[Form, ...] = ("spherical", "cartesian")
        for form in forms:
            for name, n in levels(basis.shells_per_atom(form), form).items():
                found[name] = found.get(name, 0) + n
        return found

    def _levels(
        self, symbol: str, placement: "Placement", shells: NDArray[np.int64], form: Form
    ) -> dict[str, int]:
        if symbol not in ("C∞v", "D∞h", "Kh"):
            return levels_per_irrep(symbol, standard_operations(symbol), placement.permutations, shells, form)
        inversion = int(indices_of(INVERSION, placement.operations))
        return levels_on_axis(symbol, placement.permutations[inversion] if inversion >= 0 else None, shells, form)

    @cached_property
    def _limits(self) -> tuple[dict[str, int] | None, ...]:
        """Levels of each irrep of the body's group: in a minimal picture, in a known basis, any number."""
        with contextlib.suppress(NotDerivable):
            return self.minimal_body_levels, self.body_levels, None
        return self.minimal_body_levels, None

    def readings(self, alpha: Counts, beta: Counts) -> tuple["OpenLevel", ...] | None:
        """Return the open levels that an occupation may mean, likeliest first; None where it fills whole levels.

        Readings within the cores and valence shells of the atoms go before those that need more.
        """
        if (alpha, beta) == self.electrons:
            return self.stated_readings
        return self._readings(alpha, beta)

    @cached_property
    def stated_readings(self) -> tuple["OpenLevel", ...] | None:
        """What the stated occupation may mean, as `readings` tells it."""
        return self._readings(*self.electrons)

    def _readings(self, alpha: Counts, beta: Counts) -> tuple["OpenLevel", ...] | None:
        into = self.electrons_per_level
        for most in self._limits:
            if fill_whole_levels(into, alpha, beta, most):
                return None
            found = open_levels(into, alpha, beta, most)
            if found:
                return found
        return ()

    def terms_of(self, level: "OpenLevel") -> tuple[str, ...]:
        """Return the terms of the body's group that a determinant with such an open level may belong to."""
        partners = self.electrons_per_level[level.irrep]
        return terms_of(self.body_group, level, self.group, partners, self.states_per_level)

    def is_consistent(self, alpha: Counts, beta: Counts) -> bool:
        """Tell whether an occupation fits the shells of its atoms and is of one term, as a ground state's is."""
        holds = self.minimal_functions
        if any(n > holds.get(name, 0) for counts in (alpha, beta) for name, n in counts.items()):
            return False
        readings = self.readings(alpha, beta)
        return readings is None or (readings != () and len(self.terms_of(readings[0])) == 1)

    @cached_property
    def other_axes(self) -> tuple[Relabelling, ...]:
        """Relabellings under which the stated occupation is consistent, where under the deck's own axes it is not.

        The names of each lead from the deck's labels to those that hold in the frame of `placement`.
        """
        alpha, beta = self.electrons
        if self.is_consistent(alpha, beta):
            return ()
        found: list[tuple[tuple[Counts, Counts], Relabelling]] = []
        for other in relabellings(self.group):
            if self._keeps_open_level(other):
                continue
            moved = (other.applied_to(alpha), other.applied_to(beta))
            if moved not in [known for known, _ in found] and self.is_consistent(*moved):
                found.append((moved, other))
        return tuple(other for _, other in found)

    def _keeps_open_level(self, other: Relabelling) -> bool:
        """Tell whether the level that seems partly filled has the same partners in the other axes.

        Then it is filled no more evenly there, and counts that look whole are those of some other levels.
        """
        if not self.stated_readings:
            return False
        partners = set(self.electrons_per_level[self.stated_readings[0].irrep])
        return {other.names[name] for name in partners} == partners

    @cached_property
    def equal_axes(self) -> tuple[Relabelling, ...]:
        """Relabellings of the deck's group that an operation of the body brings about."""
        return equivalent_relabellings(self.body_group, self.group, self.turn)
