"""From text to decks: TOML, JSON and XYZ, with the place of every value and every complaint at once."""

from checker.reading.fill_in import FillIn
from checker.reading.inputs import read_paths, read_text

__all__ = ["FillIn", "read_paths", "read_text"]
