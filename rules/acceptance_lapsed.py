"""acceptance-lapsed: every acceptance in a deck must match a finding and be in date.

The engine speaks for this rule after all others, when an `[[accepted]]` entry names a rule that does not
exist, has passed its date, or matches no finding. A lapsed entry hides nothing today, but may hide a new
finding tomorrow.

Passes: an acceptance of close-contact on a deck where close-contact speaks.
Speaks: an acceptance left behind after the geometry was mended; one with until = 2020-01-01.
Source: the deck format (hundsight explain deck).
"""

from collections.abc import Iterator

from checker.facts import Facts
from checker.findings import Finding
from checker.registry import ENGINE_GRADES, Rule


def judge(facts: Facts) -> Iterator[Finding]:
    """Say nothing: what is left unmatched is known when all rules have spoken."""
    yield from ()


RULE = Rule("acceptance-lapsed", ENGINE_GRADES["acceptance-lapsed"], judge)
