"""The door for other programs: judge decks given as text or by path."""

import datetime
from collections.abc import Iterable, Iterator
from functools import cache
from pathlib import Path
from typing import BinaryIO

from checker import engine
from checker.deck import Deck, UnreadableDeck
from checker.findings import DeckReport
from checker.reading import FillIn, read_paths, read_text
from checker.registry import RuleSet


@cache
def all_rules() -> RuleSet:
    """Return the shipped rules."""
    from rules import ALL_RULES

    return RuleSet(ALL_RULES)


def check_text(
    text: str | bytes, *, name: str = "-", fill_in: FillIn | None = None, today: datetime.date | None = None
) -> list[DeckReport]:
    """Judge the deck or the XYZ frames in a text; one report a frame.

    Parameters
    ----------
    text : a deck in TOML or JSON, or XYZ.
    name : what the text is called in the report.
    fill_in : charge and multiplicity where the text states none.
    today : decides which acceptances have expired; by default the date of the clock.
    """
    return list(_judged(read_text(text, name=name, fill_in=fill_in or FillIn()), today))


def check_path(
    *paths: str | Path,
    fill_in: FillIn | None = None,
    today: datetime.date | None = None,
    stdin: BinaryIO | None = None,
) -> Iterator[DeckReport]:
    """Judge decks, XYZ files and folders of them, in the order given, one report after another.

    The path ``-`` stands for `stdin`, by default the standard input of the process.
    """
    decks = read_paths([str(path) for path in paths], fill_in=fill_in or FillIn(), stdin=stdin)
    return _judged(decks, today)


def _judged(decks: Iterable[Deck | UnreadableDeck], today: datetime.date | None) -> Iterator[DeckReport]:
    day = today or datetime.date.today()  # the one look at the clock
    rules = all_rules()
    for deck in decks:
        if isinstance(deck, UnreadableDeck):
            yield engine.unreadable(deck)
        else:
            yield engine.judge(deck, rules, day)
