"""Short ways to a job, its facts and what one rule says of it."""

import datetime
from typing import Any

import numpy as np

from checker.deck import Aside, Deck
from checker.elements import mass_number_of, number_of
from checker.engine import judge
from checker.facts import Facts
from checker.findings import DeckReport, Finding, NotJudged
from checker.geometry import Geometry
from checker.model import Job
from checker.registry import Rule, RuleSet
from checker.source import WholeFile

TODAY = datetime.date(2026, 12, 1)


def geometry(atoms: str | list[tuple[str, float, float, float]], **fields: Any) -> Geometry:
    """Make a geometry from rows, or from symbols alone ("O H H"), which then stand 3 angstrom apart in a row."""
    if isinstance(atoms, str):
        atoms = [(symbol, 0.0, 0.0, 3.0 * i) for i, symbol in enumerate(atoms.split())]
    numbers = [number_of(row[0]) for row in atoms]
    assert None not in numbers, atoms
    return Geometry(
        numbers=np.array(numbers, dtype=np.int64),
        coordinates=np.array([row[1:] for row in atoms], dtype=float).reshape(-1, 3),
        mass_numbers=np.array([mass_number_of(row[0]) for row in atoms], dtype=np.int64),
        **fields,
    )


def job(
    atoms: str | list[tuple[str, float, float, float]] | Geometry,
    charge: int = 0,
    multiplicity: int | None = None,
    species: dict[str, Any] | None = None,
    **tables: Any,
) -> Job:
    """Make a job. `species` holds further keys of that table, `tables` the other tables of a deck."""
    held = atoms if isinstance(atoms, Geometry) else geometry(atoms)
    stated = {"charge": charge, "multiplicity": multiplicity, "atoms": held, **(species or {})}
    return Job.model_validate({"deck_version": 1, "species": stated, **tables})


def speak(rule: Rule, of: Job, *asides: Aside) -> list[Finding | NotJudged]:
    """Return all that a rule says of a job; a fact that is not derivable raises."""
    return list(rule.judge(Facts(of, asides)))


def run_rule(rule: Rule, of: Job, *asides: Aside) -> list[Finding]:
    """Return the findings of a rule."""
    return [word for word in speak(rule, of, *asides) if isinstance(word, Finding)]


def report(of: Job, *rules: Rule, asides: tuple[Aside, ...] = (), today: datetime.date = TODAY) -> DeckReport:
    """Judge a job as the engine does, by the rules given."""
    return judge(Deck("made.deck.toml", of, WholeFile("made.deck.toml"), asides), RuleSet(rules), today)
