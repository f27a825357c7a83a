"""Lazy, cached, read-only answers about one deck: all that a rule may ask.

A fact that cannot be worked out raises `NotDerivable` with the reason; the engine turns that into "not judged".
Facts only expose what `chemistry/` works out on plain values.
"""

import contextlib
from collections.abc import Mapping
from functools import cached_property
from typing import TYPE_CHECKING

import numpy as np
from numpy.typing import NDArray

from checker.chemistry import ledger as books
from checker.deck import Aside
from checker.elements import number_of, symbol_of, written_ion
from checker.errors import NotDerivable
from checker.findings import BasisBook, Edit, Expected, Ledger, SymmetryBook
from checker.geometry import ANGSTROM_PER_BOHR
from checker.model import Job

if TYPE_CHECKING:
    from checker.chemistry.basis_sets import Shells
    from checker.chemistry.configurations import GroundLevel
    from checker.chemistry.contacts import LengthSlip, Nearest
    from checker.chemistry.irreps import PointGroup
    from checker.chemistry.job_basis import JobBasis
    from checker.chemistry.parity import Cause
    from checker.chemistry.symmetry import Symmetry
    from checker.chemistry.valence import Valence
    from checker.irrep_facts import IrrepFacts

UNSTATED_MULTIPLICITY = "the deck states no multiplicity"
PLACE_DIGITS = 6  # of the coordinates that a repair writes
NEW_PLACE_DIGITS = 4  # of an atom that was not there, whose place is a proposal


class Facts:
    """What is known of a job. Atom indices count from 0; "real" atoms are those that are no ghosts."""

    def __init__(self, job: Job, asides: tuple[Aside, ...] = ()) -> None:
        self.job = job
        self.asides = asides

    @cached_property
    def numbers(self) -> NDArray[np.int64]:
        """(n,) atomic numbers of all atoms, ghosts included."""
        return self.job.species.atoms.numbers

    @cached_property
    def coordinates(self) -> NDArray[np.float64]:
        """(n, 3) angstrom, ghosts included."""
        return self.job.species.atoms.coordinates

    @cached_property
    def is_ghost(self) -> NDArray[np.bool_]:
        """(n,) True where the atom carries basis functions only."""
        mask = np.zeros(len(self.numbers), dtype=bool)
        mask[[number - 1 for number in self.job.species.ghost_atoms]] = True
        return mask

    @cached_property
    def real_indices(self) -> NDArray[np.int64]:
        """(m,) indices of the real atoms in the deck's order."""
        return np.flatnonzero(~self.is_ghost)

    @cached_property
    def real_numbers(self) -> NDArray[np.int64]:
        """(m,) atomic numbers of the real atoms."""
        return self.numbers[self.real_indices] if self.job.species.ghost_atoms else self.numbers

    @cached_property
    def real_coordinates(self) -> NDArray[np.float64]:
        """(m, 3) angstrom, the real atoms."""
        return self.coordinates[self.real_indices] if self.job.species.ghost_atoms else self.coordinates

    @cached_property
    def elements(self) -> tuple[int, ...]:
        """Atomic numbers of the real atoms that occur, ascending."""
        return tuple(np.flatnonzero(np.bincount(self.real_numbers)).tolist())  # np.unique would import numpy.ma

    def label(self, real_index: int) -> str:
        """Return how people name a real atom: symbol and its 1-based number in the deck, such as "O 3"."""
        index = int(self.real_indices[real_index])
        return f"{symbol_of(int(self.numbers[index]))} {index + 1}"

    def atom_key(self, real_index: int) -> str:
        """Return the deck key of a real atom, such as ``species.atoms[2]``."""
        return f"species.atoms[{int(self.real_indices[real_index])}]"

    @property
    def charge(self) -> int:
        """The stated charge of the species."""
        return self.job.species.charge

    @property
    def stated_multiplicity(self) -> int:
        """The stated 2S+1, whatever its value; not derivable where the deck leaves it out."""
        if self.job.species.multiplicity is None:
            raise NotDerivable(UNSTATED_MULTIPLICITY)
        return self.job.species.multiplicity

    @property
    def intent(self) -> str:
        """What the job is for; "ground" where the deck does not say."""
        return self.job.treatment.intent or "ground"

    @property
    def environment(self) -> str:
        """Where the species is; "gas" where the deck does not say."""
        return self.job.species.environment or "gas"

    @cached_property
    def replaced_per_atom(self) -> Mapping[int, int]:
        """Electrons replaced per atom by atomic number; not derivable where a named potential is unknown."""
        potential = self.job.core_potential
        if potential is None:
            return {}
        return {z: self._replaced(z) for z in self.elements}

    def _replaced(self, z: int) -> int:
        from checker.chemistry.core_potentials import electrons_replaced

        potential = self.job.core_potential
        assert potential is not None
        symbol = symbol_of(z)
        if symbol in potential.replaced:
            return potential.replaced[symbol]
        name = self.potential_set(symbol)
        if name is None:
            return 0
        known = electrons_replaced(name, z)
        if known is not None:
            return known
        if potential.replaced:  # the author listed what is replaced; the rest is all-electron
            return 0
        raise NotDerivable(
            f"how many electrons the core potential {name!r} replaces for {symbol} is not in the table; "
            "state core_potential.replaced"
        )

    def potential_set(self, symbol: str) -> str | None:
        """Return the set whose core potential an element has, None where the deck names none.

        Not derivable where it is to come from the basis and the deck names no basis.
        """
        potential, basis = self.job.core_potential, self.job.basis
        if potential is None or potential.name != "from-basis":
            return None if potential is None else potential.name
        if basis is None:
            raise NotDerivable("the core potential is to come from the basis, and the deck names no basis")
        return basis.for_element.get(symbol, basis.name)

    @cached_property
    def job_basis(self) -> "JobBasis":
        """Shells on all atoms, ghosts included; not derivable without a known basis that has all the elements."""
        from checker.chemistry.job_basis import job_basis

        basis = self.job.basis
        if basis is None:
            raise NotDerivable("the deck names no basis")
        for_element = {
            z: name for symbol, name in basis.for_element.items() if (z := number_of(symbol)) is not None
        }
        return job_basis(basis.name, for_element, basis.form, self.numbers)

    @property
    def basis_shells(self) -> "Mapping[int, tuple[Shells, ...]]":
        """Shells by atomic number, of all elements present; see `job_basis`."""
        return self.job_basis.shells

    @cached_property
    def n_functions(self) -> int:
        """Basis functions on all atoms, ghosts included; see `job_basis`."""
        return self.job_basis.n_functions

    @cached_property
    def basis_book(self) -> BasisBook | None:
        """The basis for the report, None where the deck names none."""
        if self.job.basis is None:
            return None
        try:
            form = self.job_basis.form
        except NotDerivable:
            return BasisBook(name=self.job.basis.name, form=self.job.basis.form)
        by_irrep = None
        with contextlib.suppress(NotDerivable):
            by_irrep = self.irreps.functions_of_report
        return BasisBook(name=self.job.basis.name, n_functions=self.n_functions, form=form, by_irrep=by_irrep)

    @cached_property
    def ledger(self) -> Ledger:
        """The electron books; what depends on an unknown core potential is None."""
        try:
            replaced: Mapping[int, int] | None = self.replaced_per_atom
        except NotDerivable:
            replaced = None
        species = self.job.species
        return books.ledger(self.numbers, self.is_ghost, species.charge, species.multiplicity, replaced)

    @cached_property
    def n_electrons(self) -> int:
        """Electrons that the job treats; not derivable where a named core potential is unknown."""
        n_electrons = self.ledger.n_electrons
        if n_electrons is None:
            _ = self.replaced_per_atom  # raises, with the reason
            raise AssertionError("the books are complete where the potentials are known")
        return n_electrons

    @cached_property
    def free_atom(self) -> int | None:
        """The atomic number, where the species is a single real atom; else None."""
        return int(self.real_numbers[0]) if len(self.real_numbers) == 1 else None

    @cached_property
    def ground_level(self) -> "GroundLevel":
        """The ground level of a free atom or ion; not derivable for molecules or where none is known."""
        if self.free_atom is None:
            raise NotDerivable("the species is no free atom")
        from checker.chemistry.configurations import ground_level  # tables that molecules do not need

        return ground_level(self.free_atom, self.charge)

    @cached_property
    def nearest(self) -> "Nearest | None":
        """Nearest neighbour of each real atom, in units of bond lengths; None where there are fewer than two."""
        from checker.chemistry.contacts import nearest_by_bond_length

        if len(self.real_numbers) < 2:
            return None
        return nearest_by_bond_length(self.real_numbers, self.real_coordinates)

    @cached_property
    def length_slip(self) -> "LengthSlip | None":
        """The sign that the lengths are in another unit than stated, or None."""
        from checker.chemistry.contacts import length_slip

        return None if self.nearest is None else length_slip(self.real_numbers, self.nearest)

    @cached_property
    def is_periodic(self) -> bool:
        """Whether the geometry is a piece of a crystal, whose bonds end at the faces of the cell."""
        atoms = self.job.species.atoms
        return any(atoms.periodic or ()) or (atoms.lattice is not None and atoms.periodic is None)

    @cached_property
    def valence(self) -> "Valence":
        """Bonds, open valences and implied charge of the real atoms; not derivable where they are no molecule."""
        from checker.chemistry.valence import assign_valences

        if self.is_periodic:
            raise NotDerivable("bonds end at the faces of the cell")
        if self.length_slip is not None:
            raise NotDerivable("the lengths seem to be in another unit than stated, so bonds cannot be told")
        return assign_valences(self.real_numbers, self.real_coordinates, numbering=self.real_indices + 1)

    @cached_property
    def parity_fails(self) -> bool:
        """Whether no state of the electrons has the stated multiplicity, because both are even or both odd."""
        return self.n_electrons % 2 == self.stated_multiplicity % 2

    @cached_property
    def parity_causes(self) -> "tuple[Cause, ...]":
        """The slips that may explain a failed parity, likeliest first; empty where parity holds."""
        from checker.chemistry.core_potentials import published_counts
        from checker.chemistry.parity import rank_causes

        if not self.parity_fails:
            return ()
        replaced = self.replaced_per_atom
        return rank_causes(
            self.real_numbers,
            self.real_coordinates,
            self.charge,
            self.stated_multiplicity,
            replaced=replaced,
            published={z: tuple(count.electrons for count in published_counts(z)) for z in replaced},
            valence=self.valence,
            numbering=self.real_indices + 1,
            unpaired_in_core=self.unpaired_in_core,
        )

    @cached_property
    def point_group(self) -> "PointGroup":
        """The group the job is to run in; not derivable where none is stated or there is no such group."""
        from checker.chemistry.irreps import point_group

        written = self.job.symmetry.point_group
        if written is None:
            raise NotDerivable("the deck states no point group")
        group = point_group(written)
        if group is None:
            raise NotDerivable(f"there is no point group {written!r}")
        return group

    @cached_property
    def symmetry(self) -> "Symmetry":
        """The geometry's point group and frame, ghosts told from atoms; not derivable where it is not settled.

        Isotopes are one kind of atom: electrons and their irreps do not see the masses.
        """
        return self._symmetry_of(2 * self.numbers + self.is_ghost)

    @cached_property
    def group_with_isotopes(self) -> str | None:
        """The point group with isotopes told apart, the one of vibrations; None where it is the same."""
        mass_numbers = self.job.species.atoms.mass_numbers
        if not mass_numbers.any():
            return None
        group = self._symmetry_of(8 * self.numbers + 2 * mass_numbers + self.is_ghost).group
        return None if group == self.symmetry.group else group

    def _symmetry_of(self, kinds: NDArray[np.int64]) -> "Symmetry":
        from checker.chemistry.symmetry import find_symmetry

        if self.is_periodic:
            raise NotDerivable("a geometry with a cell has no point group of its own")
        stated = self.job.symmetry
        choice = "C2v" if stated.point_group and stated.point_group.strip().casefold() == "c2v" else "D2"
        return find_symmetry(kinds, self.coordinates, axes=stated.axes, abelian_choice=choice)

    @cached_property
    def symmetry_book(self) -> SymmetryBook | None:
        """The symmetry for the report, None where it is not settled."""
        try:
            symmetry = self.symmetry
            stated = self.job.symmetry.point_group is not None
            labels = self.irreps.placement_of_report if stated else symmetry.abelian
        except NotDerivable:
            return None
        return SymmetryBook(
            point_group=symmetry.group,
            abelian_subgroup=symmetry.abelian_group,
            deviation_angstrom=symmetry.deviation_angstrom,
            labels_of=labels.group,
            frame_note=labels.frame_note,
            with_isotopes=self.group_with_isotopes,
        )

    def atoms_added(self, symbol: str, *places: tuple[float, float, float]) -> tuple[Edit, ...]:
        """Return the edits that add atoms of an element after those of the deck, at places in angstrom."""
        unit = ANGSTROM_PER_BOHR if self.job.species.length_unit == "bohr" else 1.0
        first = len(self.numbers)
        return tuple(
            Edit(f"species.atoms[{first + i}]", [symbol, *(round(x / unit, NEW_PLACE_DIGITS) for x in place)])
            for i, place in enumerate(places)
        )

    def atoms_at(self, coordinates: NDArray[np.float64]) -> tuple[Edit, ...]:
        """Return the edits that put all atoms of the deck, ghosts included, at other places (n, 3) angstrom."""
        unit = ANGSTROM_PER_BOHR if self.job.species.length_unit == "bohr" else 1.0
        places = (np.round(coordinates / unit, PLACE_DIGITS) + 0.0).tolist()
        isotopes = {2: "D", 3: "T"}
        symbols = [
            isotopes.get(mass, symbol_of(z))
            for mass, z in zip(self.job.species.atoms.mass_numbers.tolist(), self.numbers.tolist(), strict=True)
        ]
        return tuple(
            Edit(f"species.atoms[{i}]", [symbol, *place])
            for i, (symbol, place) in enumerate(zip(symbols, places, strict=True))
        )

    @cached_property
    def irreps(self) -> "IrrepFacts":
        """What the deck states by irrep, seen from the geometry's symmetry."""
        from checker.irrep_facts import IrrepFacts

        return IrrepFacts(self)

    @cached_property
    def expected(self) -> Expected:
        """The state we would expect; empty where we do not know."""
        try:
            multiplicity = self.ground_multiplicity
        except NotDerivable:
            return Expected()
        return Expected(multiplicity=multiplicity, multiplicity_confidence=self.ground_level_confidence)

    @cached_property
    def ground_multiplicity(self) -> int:
        """2S+1 of the ground level of a free atom or ion, as the job counts electrons.

        Not derivable for molecules, for ions whose surroundings decide, where the level has no LS name, and where
        unpaired f electrons sit in the core potential.
        """
        from checker.chemistry.core_potentials import f_unpaired

        level, ion = self.ground_level, written_ion(self.ground_level.atomic_number, self.charge)
        if self.environment in ("embedded", "crystal"):
            raise NotDerivable(f"{ion} is not free: in an environment of kind {self.environment!r} that decides")
        n_f = self.f_electrons_in_core
        if f_unpaired(n_f):
            raise NotDerivable(f"{n_f} f electrons of {ion} sit in its core potential, their spin is not counted")
        if level.multiplicity is None:
            raise NotDerivable(f"the ground level of {ion}, {level.level}, has no LS name and so no multiplicity")
        return level.multiplicity

    @property
    def ground_level_confidence(self) -> float:
        """How sure the ground level of a free atom is: measured, predicted or derived."""
        return {"measured": 0.99, "predicted": 0.8, "disputed": 0.6}.get(self.ground_level.origin, 0.9)

    @cached_property
    def f_electrons_in_core(self) -> int:
        """Open-shell f electrons per atom that a core potential replaces, at most over the elements present."""
        return max((self.f_in_core_of(z) for z in self.elements), default=0)

    @cached_property
    def unpaired_in_core(self) -> int:
        """Unpaired f electrons, of all atoms, that core potentials hold; not derivable as for `f_in_core_of`."""
        from checker.chemistry.core_potentials import f_unpaired

        if self.job.core_potential is None:
            return 0
        return sum(f_unpaired(self.f_in_core_of(z)) * int((self.real_numbers == z).sum()) for z in self.elements)

    def f_in_core_of(self, z: int) -> int:
        """Return the electrons of an open f shell that the core potential of one of the elements present holds.

        Not derivable where the potential is unknown, or where its size does not tell.
        """
        from checker.chemistry.core_potentials import f_electrons_in_core, published_counts

        if self.job.core_potential is None or not any(count.f_electrons_in_core for count in published_counts(z)):
            return 0
        return f_electrons_in_core(z, self._replaced(z), self.potential_set(symbol_of(z)))
