"""What reading hands on: a deck that could be read, or the complaints about one that could not."""

from dataclasses import dataclass

from checker.errors import Complaint
from checker.model import Job
from checker.source import Places


@dataclass(frozen=True, slots=True)
class Aside:
    """A value said a second time, beside the deck: by a comment line (`said_in` names it) or an option.

    `key` is ``species.charge`` or ``species.multiplicity``.
    """

    key: str
    value: int
    said_in: str


@dataclass(frozen=True, slots=True)
class Deck:
    """A deck that could be read. `name` is its path as given, with ``#3`` for the third frame of several."""

    name: str
    job: Job
    places: Places
    asides: tuple[Aside, ...] = ()

    @property
    def is_one_of_many(self) -> bool:
        """Whether it is one frame of a file that holds several."""
        return self.name.rpartition("#")[2].isdigit() and "#" in self.name


@dataclass(frozen=True, slots=True)
class UnreadableDeck:
    """A deck that could not be read, with all there is to complain of."""

    name: str
    complaints: tuple[Complaint, ...]
    title: str | None = None
