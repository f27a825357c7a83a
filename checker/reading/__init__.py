"""From text to decks: TOML, JSON and XYZ, with the place of every value and every complaint at once."""
