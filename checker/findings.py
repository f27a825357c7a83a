"""What a judgement consists of: grades, findings, repairs and the report of a deck. All frozen."""

import enum
from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import TypeAlias

from checker.source import Span

Json: TypeAlias = bool | int | float | str | list["Json"] | dict[str, "Json"] | None


class Grade(enum.IntEnum):
    """How much a finding weighs; the order is that of the numbers."""

    NOTE = 1
    DOUBT = 2
    HALT = 3

    @property
    def word(self) -> str:
        """The grade as people and reports write it."""
        return self.name.lower()


class Verdict(enum.StrEnum):
    """What the findings of a deck come to."""

    CLEAR = "clear"
    DOUBTFUL = "doubtful"
    HALTED = "halted"
    UNREADABLE = "unreadable"


@dataclass(frozen=True, slots=True)
class Edit:
    """One change to a deck: the value that `key` is to have.

    Keys are dotted, list items counted from 0: ``species.multiplicity``, ``core_potential.replaced.I``,
    ``species.atoms[4]``. The value None removes the item; ``species.atoms[n]`` with n the number of atoms adds
    one. An atom's value is ``[symbol, x, y, z]`` in the deck's own length unit. Atoms that stand in a geometry
    file have the same keys. Several edits are made in the order given.
    """

    key: str
    value: Json


@dataclass(frozen=True, slots=True)
class Repair:
    """A way to mend a finding: one sentence, the edits that do it, how likely it is what was meant (0 to 1)."""

    say: str
    edits: tuple[Edit, ...]
    weight: float = 1.0


@dataclass(frozen=True, slots=True, kw_only=True)
class Finding:
    """What a rule has to say about one place of a deck.

    Attributes
    ----------
    at : the deck key it is about, such as ``species.multiplicity`` or ``species.atoms[3]``.
    message : one sentence: what was found and what was needed.
    why : the ground for it, one or two sentences.
    grade : None stands for the rule's own grade.
    confidence : 0 to 1.
    evidence : the numbers and names behind the sentence.
    subject : what makes this finding the same one after an unrelated edit; if empty, the whole numbers and
        words of the evidence do.

    """

    at: str
    message: str
    why: str
    grade: Grade | None = None
    confidence: float = 1.0
    evidence: Mapping[str, Json] = field(default_factory=dict)
    repairs: tuple[Repair, ...] = ()
    subject: str = ""


@dataclass(frozen=True, slots=True)
class NotJudged:
    """A question that a rule would answer, but cannot here. `rule` is filled in by the engine."""

    because: str
    rule: str = ""


@dataclass(frozen=True, slots=True)
class Accepted:
    """The author's word on a finding: the reason, and until when it holds (ISO date) if that was said."""

    reason: str
    until: str | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class PlacedFinding:
    """A finding with all that the engine knows of it: rule, grade, place, fingerprint, acceptance.

    `numbered` pairs each repair with its number in the deck's report, the N of ``check --apply N``.
    """

    rule: str
    grade: Grade
    fingerprint: str
    where: Span
    key: str
    finding: Finding
    accepted: Accepted | None = None
    numbered: tuple[tuple[int, Repair], ...] = ()


@dataclass(frozen=True, slots=True, kw_only=True)
class ElementBook:
    """The electron books of one element. Electrons replaced are those of all its atoms together."""

    symbol: str
    atomic_number: int
    atoms: int
    ghosts: int
    nuclear_charge: int
    core_electrons_replaced: int | None


@dataclass(frozen=True, slots=True, kw_only=True)
class Ledger:
    """The electron books of a species, in whole numbers; None is what cannot be worked out.

    electrons = nuclear_charge - core_electrons_replaced - charge; n_alpha + n_beta = n_electrons;
    n_unpaired = n_alpha - n_beta = multiplicity - 1.
    """

    nuclear_charge: int
    core_electrons_replaced: int | None
    ghost_atoms: int
    charge: int
    n_electrons: int | None
    n_alpha: int | None
    n_beta: int | None
    n_unpaired: int | None
    by_element: tuple[ElementBook, ...]


@dataclass(frozen=True, slots=True, kw_only=True)
class Expected:
    """The state that the tool would expect; None where it does not know. Confidence 0 to 1."""

    multiplicity: int | None = None
    multiplicity_confidence: float | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class BasisBook:
    """The basis of a job as the deck names it; None is what cannot be worked out.

    `form` is None where the functions of different angular momenta have different ones; `by_irrep` counts
    functions, in the group that `SymmetryBook.labels_of` names.
    """

    name: str
    n_functions: int | None = None
    form: str | None = None
    by_irrep: Mapping[str, int] | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class SymmetryBook:
    """The point group of the geometry, Schoenflies, and how far the geometry is from having it exactly.

    Attributes
    ----------
    deviation_angstrom : the largest distance an atom would have to move for the group.
    labels_of : the group whose labels the report uses: the deck's where the geometry has it, else the abelian one.
    frame_note : how the coordinates' axes were turned into those that these labels refer to, in words.
    next_higher : the next group above and its own deviation; None where none is near or it was not asked for.
    with_isotopes : the group with isotopes told apart, the one of vibrations; None where it is the same.
    """

    point_group: str
    abelian_subgroup: str
    deviation_angstrom: float
    labels_of: str
    frame_note: str
    next_higher: tuple[str, float] | None = None
    with_isotopes: str | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class DeckReport:
    """All that is said of one deck; findings stand worst first, then by line and rule, accepted ones last.

    `atoms_file` is the file that holds the rows of the atoms, the deck itself or its geometry file; None where
    no repair asks for it.
    """

    deck: str
    title: str | None
    verdict: Verdict
    findings: tuple[PlacedFinding, ...]
    not_judged: tuple[NotJudged, ...] = ()
    ledger: Ledger | None = None
    symmetry: SymmetryBook | None = None
    basis: BasisBook | None = None
    expected: Expected | None = None
    rule_failed: bool = False
    atoms_file: str | None = None

    @property
    def worst(self) -> Grade | None:
        """The highest grade that counts, or None."""
        return max((f.grade for f in self.findings if f.accepted is None), default=None)
