"""Runs rules over the facts of a deck and makes the report. It knows no rule and no output."""

import datetime
import json
from collections import Counter
from collections.abc import Callable, Iterable, Iterator
from dataclasses import dataclass, replace
from typing import TypeVar

from checker.deck import Deck, UnreadableDeck
from checker.errors import Complaint, NotDerivable
from checker.facts import Facts
from checker.findings import (
    Accepted,
    DeckReport,
    Finding,
    Grade,
    Json,
    NotJudged,
    PlacedFinding,
    SymmetryBook,
    Verdict,
)
from checker.model import Acceptance
from checker.registry import ENGINE_GRADES, Rule, RuleSet
from checker.source import Places, Span

FINGERPRINT_DIGITS = 6

Book = TypeVar("Book")


@dataclass(frozen=True, slots=True)
class _Spoken:
    """A finding and the rule that made it."""

    rule: str
    grade: Grade
    finding: Finding


def judge(deck: Deck, rules: RuleSet, today: datetime.date) -> DeckReport:
    """Judge a deck by the rules. `today` decides which acceptances have expired."""
    facts = Facts(deck.job, deck.asides)
    spoken: list[_Spoken] = []
    not_judged: list[NotJudged] = []
    for rule in rules:
        for word in _hear(rule, facts):
            if isinstance(word, NotJudged):
                not_judged.append(word)
            else:
                spoken.append(word)
    ledger = _book("electron books", lambda: facts.ledger, spoken)
    symmetry = _book("symmetry", lambda: _symmetry(facts, deck), spoken)
    basis = _book("basis", lambda: facts.basis_book, spoken)
    expected = _book("expected state", lambda: facts.expected, spoken)
    placed = _place(spoken, deck.places)
    placed, lapsed = _accept(placed, deck, rules, today)
    findings = _number_repairs(_sorted([*placed, *lapsed], rules))
    return DeckReport(
        deck=deck.name,
        title=deck.job.title,
        verdict=_verdict(findings),
        findings=findings,
        not_judged=tuple(dict.fromkeys(not_judged)),
        ledger=ledger,
        symmetry=symmetry,
        basis=basis,
        expected=expected,
        rule_failed=any(finding.rule == "rule-failed" for finding in findings),
        atoms_file=_atoms_file(deck) if any(finding.numbered for finding in findings) else None,
    )


def _atoms_file(deck: Deck) -> str:
    """Return the file that the rows of the atoms stand in; only repairs ask for it, as it needs the places."""
    return deck.places.find("species.atoms[0]").file


def _symmetry(facts: Facts, deck: Deck) -> SymmetryBook | None:
    """Return the symmetry; the group above, which takes longest of all, not for frames by the thousand."""
    book = facts.symmetry_book
    if book is None or deck.is_one_of_many:
        return book
    return replace(book, next_higher=facts.symmetry.next_higher)


def unreadable(deck: UnreadableDeck) -> DeckReport:
    """Return the report of a deck that could not be read: one finding that holds every complaint."""
    first = deck.complaints[0]
    n_more = len(deck.complaints) - 1
    finding = Finding(
        at=first.key or "",
        message=first.message if not n_more else f"{first.message} (and {n_more} more)",
        why="Nothing is judged of a deck that cannot be read as a whole.",
        evidence={"complaints": [_complaint_record(complaint) for complaint in deck.complaints]},
        subject="; ".join(sorted(complaint.message for complaint in deck.complaints)),
    )
    placed = PlacedFinding(
        rule="deck-unreadable",
        grade=ENGINE_GRADES["deck-unreadable"],
        fingerprint=fingerprint("deck-unreadable", finding),
        where=Span(first.file, first.line, first.column),
        key=finding.at,
        finding=finding,
    )
    return DeckReport(deck=deck.name, title=deck.title, verdict=Verdict.UNREADABLE, findings=(placed,))


def fingerprint(rule_id: str, finding: Finding, occurrence: int = 0) -> str:
    """Return the fingerprint of a finding, hexadecimal.

    It depends on the rule, the key and what the finding is about (its subject, else the evidence without real
    numbers), not on where in the file it stands, on wording, or on the last digits of a distance.
    """
    import hashlib

    matter = finding.subject or json.dumps(_without_reals(dict(finding.evidence)), sort_keys=True)
    text = json.dumps([rule_id, finding.at, matter, occurrence])
    return hashlib.sha256(text.encode()).hexdigest()[:FINGERPRINT_DIGITS]


def _hear(rule: Rule, facts: Facts) -> Iterator[_Spoken | NotJudged]:
    """Yield what a rule says; a crash of the rule becomes a finding of its own."""
    try:
        for word in rule.judge(facts):
            if isinstance(word, NotJudged):
                yield replace(word, rule=rule.id)
            else:
                yield _Spoken(rule.id, rule.grade if word.grade is None else word.grade, word)
    except NotDerivable as reason:
        yield NotJudged(reason.because, rule.id)
    except Exception as fault:
        yield _Spoken("rule-failed", ENGINE_GRADES["rule-failed"], _rule_failed(rule, fault))


def _rule_failed(rule: Rule, fault: Exception) -> Finding:
    return Finding(
        at="",
        message=f"the rule {rule.id} broke down on this deck ({type(fault).__name__}: {fault})",
        why="This is a fault of the tool, not of the deck; the other rules have spoken.",
        evidence={"rule": rule.id, "fault": type(fault).__name__},
    )


def _book(name: str, work_out: Callable[[], Book], spoken: list[_Spoken]) -> Book | None:
    """Return a book of the report; a crash on the way to it becomes a finding, so that other decks are judged."""
    try:
        return work_out()
    except Exception as fault:
        finding = Finding(
            at="",
            message=f"the {name} of this deck could not be worked out ({type(fault).__name__}: {fault})",
            why="This is a fault of the tool, not of the deck; the rules have spoken.",
            evidence={"book": name, "fault": type(fault).__name__},
        )
        spoken.append(_Spoken("rule-failed", ENGINE_GRADES["rule-failed"], finding))
        return None


def _place(spoken: Iterable[_Spoken], places: Places) -> list[PlacedFinding]:
    seen: Counter[str] = Counter()
    placed = []
    for word in spoken:
        first = fingerprint(word.rule, word.finding)
        mark = fingerprint(word.rule, word.finding, seen[first]) if seen[first] else first
        seen[first] += 1
        placed.append(
            PlacedFinding(
                rule=word.rule,
                grade=word.grade,
                fingerprint=mark,
                where=places.find(word.finding.at),
                key=word.finding.at,
                finding=word.finding,
            )
        )
    return placed


def _accept(
    placed: list[PlacedFinding], deck: Deck, rules: RuleSet, today: datetime.date
) -> tuple[list[PlacedFinding], list[PlacedFinding]]:
    """Mark the findings that the author accepted; return them all, and the acceptances that have lapsed."""
    lapsed: list[_Spoken] = []
    for index, acceptance in enumerate(deck.job.accepted):
        at = f"accepted[{index}]"
        if acceptance.rule not in rules:
            lapsed.append(_lapse(at, acceptance, "no rule has that name"))
        elif acceptance.until is not None and acceptance.until < today:
            lapsed.append(_lapse(at, acceptance, f"it expired on {acceptance.until.isoformat()}"))
        else:
            matched = [_covers(acceptance, finding) for finding in placed]
            if not any(matched):
                others = any(finding.rule == acceptance.rule for finding in placed)
                because = "its finding is another one now" if others else "no finding needs it any more"
                lapsed.append(_lapse(at, acceptance, because))
            placed = [
                _accepted(finding, acceptance) if hit else finding
                for finding, hit in zip(placed, matched, strict=True)
            ]
    return placed, _place(lapsed, deck.places)


def _covers(acceptance: Acceptance, finding: PlacedFinding) -> bool:
    return acceptance.rule == finding.rule and acceptance.finding in (None, finding.fingerprint)


def _accepted(finding: PlacedFinding, acceptance: Acceptance) -> PlacedFinding:
    until = None if acceptance.until is None else acceptance.until.isoformat()
    return replace(finding, accepted=Accepted(acceptance.reason, until))


def _lapse(at: str, acceptance: Acceptance, because: str) -> _Spoken:
    finding = Finding(
        at=at,
        message=f"the acceptance of {acceptance.rule} has lapsed: {because}; remove it or renew it",
        why="An acceptance that matches nothing hides the next finding of its rule.",
        evidence={"rule": acceptance.rule, "finding": acceptance.finding, "because": because},
    )
    return _Spoken("acceptance-lapsed", ENGINE_GRADES["acceptance-lapsed"], finding)


def _sorted(placed: list[PlacedFinding], rules: RuleSet) -> list[PlacedFinding]:
    order = {rule.id: index for index, rule in enumerate(rules)}
    return sorted(
        placed,
        key=lambda f: (
            f.accepted is not None,
            -f.grade,
            f.where.line or 0,
            order.get(f.rule, len(order)),
            f.key,
        ),
    )


def _number_repairs(placed: list[PlacedFinding]) -> tuple[PlacedFinding, ...]:
    """Give numbers to the repairs of all findings in the order of the report, from 1."""
    numbered = []
    n_before = 0
    for finding in placed:
        repairs = finding.finding.repairs
        numbered.append(replace(finding, numbered=tuple(enumerate(repairs, start=n_before + 1))))
        n_before += len(repairs)
    return tuple(numbered)


def _verdict(placed: Iterable[PlacedFinding]) -> Verdict:
    worst = max((finding.grade for finding in placed if finding.accepted is None), default=Grade.NOTE)
    return {Grade.HALT: Verdict.HALTED, Grade.DOUBT: Verdict.DOUBTFUL}.get(worst, Verdict.CLEAR)


def _complaint_record(complaint: Complaint) -> Json:
    return {
        "message": complaint.message,
        "file": complaint.file,
        "line": complaint.line,
        "column": complaint.column,
        "key": complaint.key,
    }


def _without_reals(value: Json) -> Json:
    if isinstance(value, dict):
        return {key: _without_reals(item) for key, item in value.items() if not isinstance(item, float)}
    if isinstance(value, list):
        return [_without_reals(item) for item in value if not isinstance(item, float)]
    return value
