"""rule-failed: every rule must come to its end on every deck.

The engine speaks for this rule when another one breaks down: that is a fault of the tool and not of the deck.
The rules that remain have spoken, but the question of the broken one is open; the exit status is 3. Please
report the deck together with the message.

Passes: any deck on which all rules ran.
Speaks: a deck on which a rule met a fault of its own.
Source: none; it is about the tool.
"""

from collections.abc import Iterator

from checker.facts import Facts
from checker.findings import Finding
from checker.registry import ENGINE_GRADES, Rule


def judge(facts: Facts) -> Iterator[Finding]:
    """Say nothing: only the engine sees a rule fail."""
    yield from ()


RULE = Rule("rule-failed", ENGINE_GRADES["rule-failed"], judge)
