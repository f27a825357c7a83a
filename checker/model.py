"""The deck as a frozen record. It judges form only: a chemically wrong value must reach a rule."""

import datetime
from collections.abc import Mapping
from types import MappingProxyType
from typing import Annotated, Any, Literal

from pydantic import (
    AfterValidator,
    BaseModel,
    BeforeValidator,
    ConfigDict,
    Discriminator,
    Field,
    PlainSerializer,
    Tag,
    model_validator,
)
from pydantic_core import PydanticCustomError

from checker.elements import number_of, symbol_of
from checker.geometry import Geometry

DECK_VERSION = 1
LARGEST_INTEGER = 2**63 - 1

Whole = Annotated[int, Field(strict=True, ge=-LARGEST_INTEGER - 1, le=LARGEST_INTEGER)]
NotNegative = Annotated[float, Field(strict=True, ge=0, allow_inf_nan=False)]
Text = Annotated[str, Field(strict=True)]


def _frozen(mapping: dict[str, Any]) -> MappingProxyType[str, Any]:
    return MappingProxyType(mapping)


def _by_symbol(mapping: dict[str, Any]) -> MappingProxyType[str, Any]:
    """Write element symbols as the periodic table does; complain of names that are none, or the same one twice."""
    by_symbol: dict[str, Any] = {}
    for name, value in mapping.items():
        z = number_of(name)
        if z is None or symbol_of(z) in by_symbol:
            raise PydanticCustomError("no_element", "a name is no element, or one that is named before")
        by_symbol[symbol_of(z)] = value
    return _frozen(by_symbol)


def _date(value: object) -> object:
    """Read an ISO date from text, as JSON has no dates."""
    if isinstance(value, str):
        try:
            return datetime.date.fromisoformat(value)
        except ValueError:
            raise PydanticCustomError("date_type", "no date") from None
    if isinstance(value, datetime.datetime):
        return value.date()
    return value


def _whole(value: object) -> object:
    """Refuse true and 1.0, which a literal 1 would let pass as they are equal to it."""
    if type(value) is not int:
        raise PydanticCustomError("literal_error", "no whole number", {"expected": str(DECK_VERSION)})
    return value


def _number_or_table(value: object) -> str:
    return _AS_TABLE if isinstance(value, Mapping) else _AS_NUMBER


# names of the branches of a choice; they show in pydantic's error paths and nowhere else
_AS_NUMBER, _AS_TABLE = "as a number", "as a table"
UNION_TAGS = (_AS_NUMBER, _AS_TABLE)

_as_dict = PlainSerializer(dict, return_type=dict)
CountByIrrep = Annotated[dict[Text, Whole], AfterValidator(_frozen), _as_dict]
CountByElement = Annotated[dict[Text, Whole], AfterValidator(_by_symbol), _as_dict]
TextByElement = Annotated[dict[Text, Text], AfterValidator(_by_symbol), _as_dict]
WholeOrByIrrep = Annotated[
    Annotated[Whole, Tag(_AS_NUMBER)] | Annotated[CountByIrrep, Tag(_AS_TABLE)], Discriminator(_number_or_table)
]
AtomNumbers = Annotated[tuple[Whole, ...], BeforeValidator(lambda v: tuple(v) if isinstance(v, list) else v)]


class Table(BaseModel):
    """What all tables of a deck share: frozen, and no key but the known ones.

    Validators are built when first asked for, as most tables are only ever read as a part of `Job`.
    """

    model_config = ConfigDict(frozen=True, extra="forbid", arbitrary_types_allowed=True, defer_build=True)


class Species(Table):
    """Which atoms, how many electrons, which spin."""

    charge: Whole
    multiplicity: Whole | None = None
    atoms: Geometry
    geometry: Text | None = None
    length_unit: Literal["angstrom", "bohr"] = "angstrom"
    ghost_atoms: AtomNumbers = ()
    environment: Literal["gas", "solution", "embedded", "crystal"] | None = None


class Symmetry(Table):
    """The point group the job is to run in."""

    point_group: Text | None = None
    axes: Literal["as-given", "mulliken"] = "as-given"


class Occupations(Table):
    """Electrons by irrep and spin, or orbitals by irrep that hold two electrons or one."""

    alpha: CountByIrrep | None = None
    beta: CountByIrrep | None = None
    paired: CountByIrrep | None = None
    unpaired: CountByIrrep | None = None

    @model_validator(mode="after")
    def _one_style(self) -> "Occupations":
        by_spin = self.alpha is not None or self.beta is not None
        by_pairs = self.paired is not None or self.unpaired is not None
        if by_spin and by_pairs:
            raise ValueError("alpha and beta stand beside paired and unpaired; keep one of the two styles")
        return self


class Treatment(Table):
    """How the state is to be computed."""

    spin_treatment: Literal["restricted", "restricted-open", "unrestricted"] | None = None
    method: Text | None = None
    hamiltonian: Literal["nonrelativistic", "x2c", "dkh", "zora", "four-component"] | None = None
    frozen_orbitals: WholeOrByIrrep | None = None
    state_irrep: Text | None = None
    roots: CountByIrrep | None = None
    intent: Literal["ground", "excited", "broken-symmetry", "vertical"] | None = None
    starts_from: Text | None = None


class ActiveSpace(Table):
    """Electrons and orbitals of a multiconfiguration treatment."""

    electrons: Whole
    orbitals: WholeOrByIrrep


class Basis(Table):
    """The basis set, by name."""

    name: Text
    form: Literal["spherical", "cartesian"] | None = None
    for_element: TextByElement = Field(default_factory=dict, validate_default=True)
    auxiliary: Text | None = None


class CorePotential(Table):
    """What core potentials replace. `replaced` counts electrons per atom."""

    name: Text | None = None
    replaced: CountByElement = Field(default_factory=dict, validate_default=True)

    @model_validator(mode="after")
    def _says_something(self) -> "CorePotential":
        if self.name is None and not self.replaced:
            raise ValueError("neither name nor replaced is given; give one, or leave the table out")
        return self


class Fragment(Table):
    """A spin-coupled centre. `atoms` are 1-based numbers."""

    atoms: AtomNumbers
    charge: Whole | None = None
    multiplicity: Whole | None = None
    spin: Literal["up", "down"] | None = None


class Resources(Table):
    """What the whole job may use."""

    memory_gb: NotNegative | None = None
    cores: Whole | None = None
    hours: NotNegative | None = None


class Acceptance(Table):
    """A finding that the author stands behind."""

    rule: Text
    reason: Annotated[Text, Field(min_length=1)]
    finding: Text | None = None
    until: Annotated[datetime.date, Field(strict=True), BeforeValidator(_date)] | None = None


class Job(Table):
    """A whole deck. Tables left out are made without validation, which would build validators of their own."""

    deck_version: Annotated[Literal[1], BeforeValidator(_whole)]
    title: Text | None = None
    species: Species
    symmetry: Symmetry = Symmetry.model_construct()
    occupations: Occupations | None = None
    treatment: Treatment = Treatment.model_construct()
    active_space: ActiveSpace | None = None
    basis: Basis | None = None
    core_potential: CorePotential | None = None
    fragments: tuple[Fragment, ...] = ()
    resources: Resources = Resources.model_construct()
    accepted: tuple[Acceptance, ...] = ()
