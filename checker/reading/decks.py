"""Puts a deck together: its form, its atoms, and what the comment line and the options add."""

from collections.abc import Iterator
from dataclasses import dataclass, replace
from functools import cache
from typing import Any, BinaryIO

import numpy as np

from checker.deck import Aside, Deck, UnreadableDeck
from checker.errors import Complaint, UnreadableInput
from checker.geometry import ANGSTROM_PER_BOHR, Geometry
from checker.model import Job
from checker.reading.atom_numbers import faults_of_numbers
from checker.reading.confinement import Home, name_of_geometry, open_geometry, sentence_on_path
from checker.reading.decoding import decoded
from checker.reading.faults import Fault, complaint, in_order, key_text
from checker.reading.files import chunks
from checker.reading.fill_in import FillIn, settle
from checker.reading.frames import frames_of, numbered
from checker.reading.kinds import Kind
from checker.reading.mapping import mapping_of
from checker.reading.places import DeckAndFramePlaces, DeckPlaces
from checker.reading.rows import ATOMS, geometry_of_rows
from checker.reading.shape import build
from checker.reading.xyz import BrokenFrame, Frame

GEOMETRY = ("species", "geometry")
CHARGE = ("species", "charge")
NO_ATOMS = "species has neither atoms nor geometry; add rows of atoms, or the name of an XYZ file as geometry"
BOTH = "species has both atoms and geometry; keep one of the two"
NO_FOLDER = "the deck is a text without a folder, so no geometry file can be read; write the atoms into the deck"
NO_CHARGE = (
    "neither the deck nor the comment line of its geometry file states a charge; add the total charge, such as "
    "charge = 0, to [species]"
)


def read_deck(
    raw: bytes, kind: Kind, name: str, *, home: Home | None, fill_in: FillIn, guess: str = ""
) -> Iterator[Deck | UnreadableDeck]:
    """Read a deck in TOML or JSON: one item, or one for each frame of its geometry file.

    `home` is None where the deck has no folder to read geometry files from. `guess` is added to what is said of a
    text that is not in the language it was taken for.
    """
    try:
        places = DeckPlaces(name, decoded(raw, name), kind)
    except UnreadableInput as unreadable:
        yield UnreadableDeck(name, unreadable.complaints)
        return
    try:
        mapping = mapping_of(places)
    except UnreadableInput as unreadable:
        yield UnreadableDeck(name, tuple(replace(c, message=c.message + guess) for c in unreadable.complaints))
        return
    yield from _Assembly(name, places, mapping, home, fill_in).decks()


@dataclass(frozen=True, slots=True)
class _Assembly:
    """A deck whose text is well formed, on its way to a job."""

    name: str
    places: DeckPlaces
    mapping: dict[str, Any]
    home: Home | None
    fill_in: FillIn

    def decks(self) -> Iterator[Deck | UnreadableDeck]:
        """Yield the deck, or one deck a frame."""
        if "geometry" in self._species and "atoms" not in self._species:
            yield from self._with_geometry_file()
        else:
            yield self._with_inline_atoms()

    @property
    def _species(self) -> dict[str, Any]:
        species = self.mapping.get("species")
        return species if isinstance(species, dict) else {}

    def _with_inline_atoms(self) -> Deck | UnreadableDeck:
        built = build(self._form(self.fill_in.charge))
        faults = built if isinstance(built, list) else []
        if "geometry" in self._species:
            faults.append(Fault(GEOMETRY, BOTH))
        if "atoms" not in self._species and isinstance(self.mapping.get("species"), dict):
            faults.append(Fault(ATOMS, NO_ATOMS))
        if "atoms" in self._species:
            read = geometry_of_rows(self._species["atoms"], self._species.get("length_unit"))
            faults += read if isinstance(read, list) else faults_of_numbers(self.mapping, len(read))
            if isinstance(built, Job) and isinstance(read, Geometry) and not faults:
                job, asides = self._settled(built, read, None)
                return Deck(self.name, job, self.places, asides)
        return self._unreadable(self.name, faults)

    def _with_geometry_file(self) -> Iterator[Deck | UnreadableDeck]:
        built = build(self._form(0))  # the comment line may state the charge
        faults = built if isinstance(built, list) else []
        written = self._species["geometry"]
        if isinstance(written, str):
            try:
                stream, file = self._open(written)
            except UnreadableInput as unreadable:
                faults.append(Fault(GEOMETRY, unreadable.complaints[0].message))
            else:
                with stream:
                    yield from self._with_frames(built, frames_of(chunks(stream), file))
                return
        yield self._unreadable(self.name, faults)

    def _open(self, written: str) -> tuple[BinaryIO, str]:
        """Open the geometry file; return it and what reports call it."""
        sentence = sentence_on_path(written)
        if sentence is not None:
            raise UnreadableInput(Complaint(sentence, self.name))
        if self.home is None:
            raise UnreadableInput(Complaint(NO_FOLDER, self.name))
        return open_geometry(written, self.home), name_of_geometry(written, self.home)

    def _with_frames(
        self, built: Job | list[Fault], frames: Iterator[Frame | BrokenFrame]
    ) -> Iterator[Deck | UnreadableDeck]:
        if isinstance(built, Job):
            for name, item in numbered(self.name, frames):
                yield self._with_frame(name, built, item)
            return
        first = next(frames)  # no deck comes of this, but all complaints are to be made at once
        if isinstance(first, BrokenFrame):
            yield self._unreadable(self.name, built, first.complaints)
        else:
            yield self._unreadable(self.name, [*built, *self._faults_with(first)])

    def _with_frame(self, name: str, job: Job, item: Frame | BrokenFrame) -> Deck | UnreadableDeck:
        if isinstance(item, BrokenFrame):
            return self._unreadable(name, [], item.complaints)
        faults = self._faults_with(item)
        if faults:
            return self._unreadable(name, faults)
        in_angstrom = _scaled(item.geometry) if job.species.length_unit == "bohr" else item.geometry
        settled, asides = self._settled(job, in_angstrom, item)
        only_there = frozenset(f"species.{key}" for key in item.comment.columns if self._species.get(key) is None)
        return Deck(name, settled, DeckAndFramePlaces(self.places, item.places, only_there), asides)

    def _faults_with(self, frame: Frame) -> list[Fault]:
        """Return what is wrong with the deck once it has the atoms and the comment line of a frame."""
        faults = faults_of_numbers(self.mapping, len(frame.geometry))
        if "charge" not in self._species and frame.comment.charge is None and self.fill_in.charge is None:
            faults.append(Fault(CHARGE, NO_CHARGE))
        return faults

    def _settled(self, job: Job, geometry: Geometry, frame: Frame | None) -> tuple[Job, tuple[Aside, ...]]:
        """Return the job with its atoms, charge and multiplicity, and what was said of these a second time."""
        update: dict[str, Any] = {"atoms": geometry}
        asides: tuple[Aside, ...] = ()
        for key in ("charge", "multiplicity"):
            update[key], beside = settle(
                key,
                deck=self._species.get(key),
                comment=getattr(frame.comment, key) if frame else None,
                option=getattr(self.fill_in, key),
                said_in=frame.said_in if frame else "",
            )
            asides += beside
        return job.model_copy(update={"species": job.species.model_copy(update=update)}), asides

    def _form(self, charge: int | None) -> dict[str, Any]:
        """Return the deck with atoms that stand in for its own, and a charge if it states none."""
        if not isinstance(self.mapping.get("species"), dict):
            return self.mapping
        species = {**self._species, "atoms": _stand_in()}
        if charge is not None:
            species.setdefault("charge", charge)
        return {**self.mapping, "species": species}

    def _unreadable(self, name: str, faults: list[Fault], more: tuple[Complaint, ...] = ()) -> UnreadableDeck:
        complaints = [complaint(self.places.locate(at), message, key_text(at)) for at, message in faults]
        title = self.mapping.get("title")
        return UnreadableDeck(name, in_order([*complaints, *more]), title if isinstance(title, str) else None)


@cache
def _stand_in() -> Geometry:
    """Return a geometry for the model to hold while the form of the other keys is judged."""
    return Geometry(np.ones(1, np.int64), np.zeros((1, 3)), np.zeros(1, np.int64))


def _scaled(geometry: Geometry) -> Geometry:
    """Return a geometry that was read in bohr in angstrom."""
    lattice = geometry.lattice and tuple(ANGSTROM_PER_BOHR * length for length in geometry.lattice)
    return replace(geometry, coordinates=geometry.coordinates * ANGSTROM_PER_BOHR, lattice=lattice)
