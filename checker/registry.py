"""Rules and sets of rules."""

import difflib
import inspect
from collections.abc import Callable, Iterable, Iterator
from dataclasses import dataclass

from checker.errors import UnknownRule
from checker.facts import Facts
from checker.findings import Finding, Grade, NotJudged

Judge = Callable[[Facts], Iterator[Finding | NotJudged]]

#: Findings that the engine makes itself; their files in rules/ hold the manual page and judge nothing.
ENGINE_GRADES = {"deck-unreadable": Grade.HALT, "rule-failed": Grade.DOUBT, "acceptance-lapsed": Grade.NOTE}


@dataclass(frozen=True, slots=True)
class Rule:
    """A rule: its id, the grade its findings have unless they say otherwise, and the function that judges.

    `judge` may yield findings and, for what it cannot answer, `NotJudged`; a `NotDerivable` raised by a fact
    ends it and is reported as not judged.
    """

    id: str
    grade: Grade
    judge: Judge

    @property
    def manual(self) -> str:
        """The rule's page: the docstring of its file."""
        return inspect.getdoc(inspect.getmodule(self.judge)) or ""

    @property
    def title(self) -> str:
        """What the rule demands, one line."""
        return self.manual.partition("\n")[0].partition(": ")[2]


class RuleSet:
    """Rules in reading order, with unique ids."""

    def __init__(self, rules: Iterable[Rule]) -> None:
        self._by_id: dict[str, Rule] = {}
        for rule in rules:
            if rule.id in self._by_id:
                raise ValueError(f"two rules are called {rule.id!r}")
            self._by_id[rule.id] = rule

    def __iter__(self) -> Iterator[Rule]:
        return iter(self._by_id.values())

    def __len__(self) -> int:
        return len(self._by_id)

    def __contains__(self, rule_id: object) -> bool:
        return rule_id in self._by_id

    def named(self, rule_id: str) -> Rule:
        """Return the rule of that id; raise `UnknownRule` with the nearest one otherwise."""
        try:
            return self._by_id[rule_id]
        except KeyError:
            nearest = difflib.get_close_matches(rule_id, self._by_id, n=1)
            raise UnknownRule(rule_id, nearest[0] if nearest else None) from None
