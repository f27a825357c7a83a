"""deck-unreadable: every deck must be readable as a whole.

The engine speaks for this rule: it gathers all complaints of the reading into one finding, each with file,
line and column, what was found, what was expected and how to mend it. Nothing else is judged of such a deck,
the other decks of the call are judged as usual, and the exit status is 2.

Passes: a deck with deck_version = 1, a charge and atoms.
Speaks: a deck with a misspelt key, an element that does not exist, or a coordinate that is no number.
Source: the deck format (hundsight explain deck).
"""

from collections.abc import Iterator

from checker.facts import Facts
from checker.findings import Finding
from checker.registry import ENGINE_GRADES, Rule


def judge(facts: Facts) -> Iterator[Finding]:
    """Say nothing: there are no facts of an unreadable deck, and the engine reports it."""
    yield from ()


RULE = Rule("deck-unreadable", ENGINE_GRADES["deck-unreadable"], judge)
