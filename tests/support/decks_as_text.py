"""Short ways from the text of a deck to what reading makes of it."""

from checker.deck import Deck, UnreadableDeck
from checker.errors import Complaint
from checker.reading import FillIn, read_text

HEAD = "deck_version = 1\n[species]\ncharge = 0\n"
ATOMS = 'atoms = [["O", 0.0, 0.0, 0.0], ["H", 0, 0, 0.96]]\n'
FRAME = "2\ncharge=0 multiplicity=2\nO 0 0 0\nH 0 0 0.96\n"


def read(text: str | bytes, name: str = "a.deck.toml", **fill_in: int) -> list[Deck | UnreadableDeck]:
    """Read a text."""
    return list(read_text(text, name=name, fill_in=FillIn(**fill_in)))


def one_deck(text: str | bytes, name: str = "a.deck.toml", **fill_in: int) -> Deck:
    """Read a text that must be one good deck."""
    (deck,) = read(text, name, **fill_in)
    assert isinstance(deck, Deck), deck
    return deck


def complaints(text: str | bytes, name: str = "a.deck.toml", **fill_in: int) -> tuple[Complaint, ...]:
    """Read a text that must be one unreadable deck, and return what is complained of."""
    (deck,) = read(text, name, **fill_in)
    assert isinstance(deck, UnreadableDeck), deck
    return deck.complaints


def said(text: str | bytes, name: str = "a.deck.toml", **fill_in: int) -> list[tuple[int | None, int | None, str]]:
    """Return line, column and sentence of each complaint."""
    return [(c.line, c.column, c.message) for c in complaints(text, name, **fill_in)]
