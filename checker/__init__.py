"""Preflight checks for quantum-chemistry job decks."""

__version__ = "0.1.0"
