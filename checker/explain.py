"""What `hundsight explain` says: the page of a rule, the catalogue of rules, the schemas of deck and report."""

import difflib
import re
import textwrap
from importlib import resources

from checker.errors import HundsightError
from checker.findings import Grade
from checker.registry import Rule, RuleSet

SCHEMAS = ("deck", "report")
LATER = ("recipe", "policy")
GRADE_MEANINGS = {
    Grade.HALT: "no such state exists, or the job cannot mean what the deck says",
    Grade.DOUBT: "the state exists, but it is probably not the one meant, or the job will not do what is wanted",
    Grade.NOTE: "worth knowing before spending the hours",
}


WIDEST = 100
_ENTRY = re.compile(r"\s|[A-Z][a-z]+( [a-z]+)?: ")


def page(name: str, rules: RuleSet, width: int) -> str:
    """Return what there is to read under a name: a rule's manual page, or a JSON Schema.

    Raises HundsightError, with the nearest name, where nothing has that name.
    """
    wanted = name.strip().lower().replace("_", "-")
    if wanted in SCHEMAS:
        return schema(wanted)
    if wanted in LATER:
        raise HundsightError(f"{wanted!r} is not explained in this version; there is {_listed(SCHEMAS)}")
    if wanted in rules:
        return _manual(rules.named(wanted), width)
    nearest = difflib.get_close_matches(wanted, names(rules), n=1)
    hint = f"the nearest is {nearest[0]}; " if nearest else ""
    raise HundsightError(f"nothing is called {name!r}; {hint}hundsight explain lists all there is")


def names(rules: RuleSet) -> list[str]:
    """Return all that can be explained."""
    return [*(rule.id for rule in rules), *SCHEMAS]


def schema(name: str) -> str:
    """Return the JSON Schema of "deck" or "report" as text."""
    return resources.files("checker.report").joinpath(f"{name}.schema.json").read_text("utf-8")


def catalogue(rules: RuleSet, width: int) -> str:
    """Return all rules in reading order, with grade and title, wrapped to `width`."""
    id_width = max((len(rule.id) for rule in rules), default=0)
    lines = [
        line
        for rule in rules
        for line in textwrap.wrap(
            f"{rule.id:<{id_width}}  {rule.grade.word:<5}  {rule.title}",
            max(width, id_width + 40),
            subsequent_indent=" " * (id_width + 9),
        )
    ]
    meanings = [
        textwrap.fill(f"{grade.word:<5}  {GRADE_MEANINGS[grade]}", max(width, 40), subsequent_indent=" " * 7)
        for grade in sorted(Grade, reverse=True)
    ]
    closing = "hundsight explain RULE gives a rule's ground, a worked case and its source."
    schemas = f"hundsight explain {' and explain '.join(SCHEMAS)} print the JSON Schema of each."
    return "\n".join([*lines, "", *meanings, "", closing, schemas]) + "\n"


def _manual(rule: Rule, width: int) -> str:
    paragraphs = rule.manual.split("\n\n")
    wrapped = [_reflowed(paragraph, width) for paragraph in paragraphs]
    grade = _reflowed(
        f"Grade: {rule.grade.word}, unless a finding says otherwise: {GRADE_MEANINGS[rule.grade]}.", width
    )
    return "\n\n".join([*wrapped, grade]) + "\n"


def _reflowed(paragraph: str, width: int) -> str:
    """Fill a paragraph to the width; entries such as "Passes: ..." and indented lines begin lines of their own."""
    entries: list[str] = []
    for line in paragraph.splitlines():
        if entries and not _ENTRY.match(line):
            entries[-1] += " " + line.strip()
        else:
            entries.append(line)
    return "\n".join(
        textwrap.fill(entry, min(width, WIDEST), subsequent_indent="  " if _ENTRY.match(entry) else "")
        for entry in entries
    )


def _listed(words: tuple[str, ...]) -> str:
    return " and ".join(words)
