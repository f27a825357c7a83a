"""The basis of a whole job: a set for all elements, other sets for some, one form. Ghosts count like any atom."""

from collections.abc import Mapping
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from checker.chemistry.basis_sets import BasisSet, Form, Shells, basis_set, nearest_names
from checker.elements import symbol_of
from checker.errors import NotDerivable

__all__ = ["JobBasis", "job_basis"]


@dataclass(frozen=True, eq=False, slots=True)
class JobBasis:
    """The shells on the atoms of a job.

    Attributes
    ----------
    numbers : (n,) atomic numbers of all atoms, ghosts included.
    shells : by atomic number, by rising l.
    forms : the form of the shells of each l that occurs.

    """

    numbers: NDArray[np.int64]
    shells: Mapping[int, tuple[Shells, ...]]
    forms: Mapping[int, Form]

    @property
    def form(self) -> Form | None:
        """The form of all shells of d and above; None where it differs with l. Spherical where there are none."""
        found = {form for momentum, form in self.forms.items() if momentum > 1}
        if not found:
            return "spherical"
        return found.pop() if len(found) == 1 else None

    @property
    def n_functions(self) -> int:
        """Basis functions on all atoms."""
        n_atoms = np.bincount(self.numbers)
        return sum(
            int(n_atoms[z]) * shell.n_functions(self.forms[shell.angular_momentum])
            for z, shells in self.shells.items()
            for shell in shells
        )

    def shells_per_atom(self, form: Form) -> NDArray[np.int64]:
        """Return the contracted shells of a form, shape (n, l_max + 1) by atom and l."""
        by_element = np.zeros((max(self.shells, default=0) + 1, max(self.forms, default=0) + 1), dtype=np.int64)
        for z, shells in self.shells.items():
            for shell in shells:
                if self.forms[shell.angular_momentum] == form:
                    by_element[z, shell.angular_momentum] = shell.n_contracted
        return by_element[self.numbers]


def job_basis(
    name: str, for_element: Mapping[int, str], form: Form | None, numbers: NDArray[np.int64]
) -> JobBasis:
    """Return the basis of a job.

    Parameters
    ----------
    name : the set of all elements but those of `for_element`, which gives others by atomic number.
    form : as stated; None stands for the sets' own.
    numbers : (n,) atomic numbers of all atoms, ghosts included.

    Raises NotDerivable where a set is unknown, expands no orbitals or lacks an element, and where no form is
    stated and the sets are made for different ones.
    """
    elements = np.flatnonzero(np.bincount(numbers)).tolist()
    sets = {z: _orbital_set(for_element.get(z, name)) for z in elements}
    for z, used in sets.items():
        if not used.shells.get(z):
            raise NotDerivable(f"the basis set {used.name} of the catalogue has no {symbol_of(z)}")
    shells = {z: used.shells[z] for z, used in sets.items()}
    return JobBasis(numbers, shells, _forms(sets, shells, form))


def _orbital_set(name: str) -> BasisSet:
    found = basis_set(name)
    if found is None:
        alike = nearest_names(name)
        hint = f"; near it are {', '.join(alike)}" if alike else ""
        raise NotDerivable(f"the basis set {name!r} is not in the catalogue{hint}")
    if found.role == "potential":
        raise NotDerivable(f"{found.name} is a core potential, no basis set")
    if found.is_auxiliary:
        raise NotDerivable(f"{found.name} is an auxiliary set ({found.role}), it expands no orbitals")
    return found


def _forms(
    sets: Mapping[int, BasisSet], shells: Mapping[int, tuple[Shells, ...]], form: Form | None
) -> dict[int, Form]:
    """Return the form by l; s and p functions are the same in both."""
    found: dict[int, tuple[Form, str]] = {}
    for z, used in sets.items():
        for shell in shells[z]:
            momentum = shell.angular_momentum
            mine = used.form_at(momentum, form) if momentum > 1 else "spherical"
            agreed, other = found.setdefault(momentum, (mine, used.name))
            if agreed != mine:
                raise NotDerivable(
                    f"{other} is made for {agreed} functions and {used.name} for {mine} ones; state basis.form"
                )
    return {momentum: agreed for momentum, (agreed, _) in sorted(found.items())}
