"""Chemistry on plain values: no deck, no screen, no file."""
