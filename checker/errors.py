"""What can go wrong, as types with fields; the text shown to people is made from the fields."""

from dataclasses import dataclass


class HundsightError(Exception):
    """Every failure that the tool foresees."""


class NotDerivable(HundsightError):
    """A question of chemistry that cannot be answered honestly, with the reason.

    Rules let it pass through: the engine turns it into "not judged, because ...".
    """

    def __init__(self, because: str) -> None:
        super().__init__(because)
        self.because = because


@dataclass(frozen=True, slots=True)
class Complaint:
    """One thing in an input that cannot be read.

    ``message`` is one sentence: what was found, what was expected, how to mend it. ``line`` and ``column``
    count from 1, the column in characters; None where the file as a whole is meant.
    """

    message: str
    file: str
    line: int | None = None
    column: int | None = None
    key: str | None = None

    def __str__(self) -> str:
        place = ":".join(str(part) for part in (self.file, self.line, self.column) if part is not None)
        return f"{place}: {self.message}"


class UnreadableInput(HundsightError):
    """A deck, geometry file or argument that cannot be read, with every complaint about it."""

    def __init__(self, *complaints: Complaint) -> None:
        super().__init__("; ".join(str(complaint) for complaint in complaints))
        self.complaints = complaints


class RepairRefused(HundsightError):
    """A repair that cannot be written into the deck, with the reason and the way out."""


class UnknownRule(HundsightError):
    """A rule id that no rule has."""

    def __init__(self, rule_id: str, nearest: str | None) -> None:
        hint = f"; the nearest is {nearest}" if nearest else ""
        super().__init__(f"no rule is called {rule_id!r}{hint}")
        self.rule_id = rule_id
        self.nearest = nearest
