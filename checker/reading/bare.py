"""Bare XYZ files as decks: the atoms, and charge and multiplicity from the comment line or the options."""

from collections.abc import Iterator

from checker.deck import Deck, UnreadableDeck
from checker.errors import Complaint
from checker.model import DECK_VERSION, Job
from checker.reading.fill_in import FillIn, settle
from checker.reading.frames import frames_of, numbered
from checker.reading.xyz import BrokenFrame, Frame

_NO_CHARGE = (
    "the frame states no charge; write charge=0 (the total charge) on this comment line, or give --charge 0"
)


def read_bare(pieces: Iterator[bytes], name: str, fill_in: FillIn) -> Iterator[Deck | UnreadableDeck]:
    """Read an XYZ file that comes piece by piece: one item a frame."""
    for frame_name, item in numbered(name, frames_of(pieces, name)):
        if isinstance(item, BrokenFrame):
            yield UnreadableDeck(frame_name, item.complaints)
        else:
            yield _deck(frame_name, item, fill_in)


def _deck(name: str, frame: Frame, fill_in: FillIn) -> Deck | UnreadableDeck:
    said = frame.comment
    charge, asides = settle("charge", deck=None, comment=said.charge, option=fill_in.charge, said_in=frame.said_in)
    if charge is None:
        at = frame.places.find("species.charge")
        return UnreadableDeck(name, (Complaint(_NO_CHARGE, at.file, at.line, at.column, "species.charge"),))
    multiplicity, more = settle(
        "multiplicity", deck=None, comment=said.multiplicity, option=fill_in.multiplicity, said_in=frame.said_in
    )
    species = {"charge": charge, "multiplicity": multiplicity, "atoms": frame.geometry}
    job = Job.model_validate({"deck_version": DECK_VERSION, "species": species})
    return Deck(name, job, frame.places, asides + more)
