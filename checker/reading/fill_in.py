"""Charge and multiplicity said in up to three places, and which of them holds."""

from dataclasses import dataclass

from checker.deck import Aside


@dataclass(frozen=True, slots=True)
class FillIn:
    """The values of ``--charge`` and ``--multiplicity``; they hold only where the input itself states none."""

    charge: int | None = None
    multiplicity: int | None = None


def settle(
    key: str, *, deck: int | None, comment: int | None, option: int | None, said_in: str = ""
) -> tuple[int | None, tuple[Aside, ...]]:
    """Return the value that holds (deck before comment line before option), and what was said beside it.

    A comment line is an aside wherever the deck speaks too, an option only where it differs. `said_in` names the
    comment line.
    """
    asides = []
    if deck is not None and comment is not None:
        asides.append(Aside(f"species.{key}", comment, said_in))
    stated = comment if deck is None else deck
    if stated is None:
        return option, ()
    if option is not None and option != stated:
        asides.append(Aside(f"species.{key}", option, f"--{key}"))
    return stated, tuple(asides)
