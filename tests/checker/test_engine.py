"""The engine, with toy rules: it must not depend on what the shipped rules say."""

import datetime
from collections.abc import Iterator

import pytest

from builders import TODAY, job, report
from checker import engine
from checker.deck import UnreadableDeck
from checker.errors import Complaint, NotDerivable
from checker.facts import Facts
from checker.findings import DeckReport, Edit, Finding, Grade, NotJudged, Repair, Verdict
from checker.registry import Rule


def saying(rule_id: str, grade: Grade, *words: Finding | NotJudged) -> Rule:
    def judge(_facts: Facts) -> Iterator[Finding | NotJudged]:
        yield from words

    return Rule(rule_id, grade, judge)


def raising(rule_id: str, fault: Exception) -> Rule:
    def judge(_facts: Facts) -> Iterator[Finding | NotJudged]:
        yield finding("said before the fault")
        raise fault

    return Rule(rule_id, Grade.DOUBT, judge)


def finding(message: str = "something", at: str = "species", **fields: object) -> Finding:
    return Finding(at=at, message=message, why="a ground", **fields)  # type: ignore[arg-type]


WATER = job("O H H", 0, 1)


def accepting(rule: str, **fields: object) -> dict[str, object]:
    return {"rule": rule, "reason": "meant", **fields}


def judged(*rules: Rule, accepted: list[dict[str, object]] | None = None) -> DeckReport:
    return report(job("O H H", 0, 1, accepted=accepted or []), *rules)


@pytest.mark.parametrize(
    ("grades", "verdict"),
    [
        ([], Verdict.CLEAR),
        ([Grade.NOTE], Verdict.CLEAR),
        ([Grade.NOTE, Grade.DOUBT], Verdict.DOUBTFUL),
        ([Grade.HALT, Grade.DOUBT], Verdict.HALTED),
    ],
)
def test_the_worst_grade_makes_the_verdict(grades: list[Grade], verdict: Verdict) -> None:
    rules = [saying(f"toy-{i}", grade, finding()) for i, grade in enumerate(grades)]

    assert judged(*rules).verdict is verdict


def test_findings_stand_worst_first_then_in_reading_order() -> None:
    told = judged(
        saying("first", Grade.NOTE, finding()),
        saying("second", Grade.HALT, finding()),
        saying("third", Grade.DOUBT, finding(), finding("graded up", grade=Grade.HALT)),
    )

    assert [(f.rule, f.grade) for f in told.findings] == [
        ("second", Grade.HALT),
        ("third", Grade.HALT),
        ("third", Grade.DOUBT),
        ("first", Grade.NOTE),
    ]


def test_what_is_not_derivable_is_not_judged_and_keeps_what_was_said() -> None:
    told = judged(raising("toy", NotDerivable("the stars are out")))

    assert [(n.rule, n.because) for n in told.not_judged] == [("toy", "the stars are out")]
    assert [f.rule for f in told.findings] == ["toy"]


def test_a_rule_that_crashes_is_a_finding_and_the_others_speak() -> None:
    told = judged(raising("broken", ZeroDivisionError("by zero")), saying("toy", Grade.NOTE, finding()))

    assert told.rule_failed
    assert {f.rule for f in told.findings} == {"rule-failed", "broken", "toy"}
    (failed,) = (f for f in told.findings if f.rule == "rule-failed")
    assert failed.finding.message == "the rule broken broke down on this deck (ZeroDivisionError: by zero)"


def test_a_rule_may_say_what_it_does_not_judge() -> None:
    told = judged(saying("toy", Grade.NOTE, NotJudged("too large")))

    assert [(n.rule, n.because) for n in told.not_judged] == [("toy", "too large")]


def test_repairs_are_numbered_through_the_report() -> None:
    mend = Repair("mend", (Edit("species.charge", 1),))
    told = judged(
        saying("later", Grade.NOTE, finding(repairs=(mend,))),
        saying("sooner", Grade.HALT, finding(repairs=(mend, mend))),
    )

    assert [[number for number, _ in f.numbered] for f in told.findings] == [[1, 2], [3]]


class TestFingerprint:
    def mark(self, *findings: Finding, rule: str = "toy") -> list[str]:
        return [f.fingerprint for f in judged(saying(rule, Grade.NOTE, *findings)).findings]

    def test_is_six_hexadecimal_digits(self) -> None:
        (mark,) = self.mark(finding())

        assert len(mark) == 6
        assert int(mark, 16) >= 0

    def test_ignores_wording_and_real_numbers(self) -> None:
        one = finding("0.412 angstrom", evidence={"atoms": [1, 2], "distance": 0.412})
        other = finding("about 0.41", evidence={"atoms": [1, 2], "distance": 0.413})

        assert self.mark(one) == self.mark(other)

    @pytest.mark.parametrize(
        "other",
        [finding(evidence={"atoms": [1, 3]}), finding(at="species.charge", evidence={"atoms": [1, 2]})],
        ids=["matter", "key"],
    )
    def test_differs_with_matter_and_key(self, other: Finding) -> None:
        assert self.mark(finding(evidence={"atoms": [1, 2]})) != self.mark(other)

    def test_differs_with_the_rule(self) -> None:
        assert self.mark(finding()) != self.mark(finding(), rule="other")

    def test_tells_equal_findings_of_one_deck_apart(self) -> None:
        one, two = self.mark(finding(), finding())

        assert one != two


class TestAcceptance:
    rule = saying("toy", Grade.HALT, finding(evidence={"atoms": [1]}), finding(evidence={"atoms": [2]}))

    def marks(self) -> list[str]:
        return [f.fingerprint for f in judged(self.rule).findings]

    def test_by_rule_covers_all_its_findings(self) -> None:
        told = judged(self.rule, accepted=[accepting("toy")])

        assert told.verdict is Verdict.CLEAR
        assert [f.accepted.reason for f in told.findings if f.accepted] == ["meant", "meant"]

    def test_by_fingerprint_covers_one(self) -> None:
        told = judged(self.rule, accepted=[accepting("toy", finding=self.marks()[0])])

        assert told.verdict is Verdict.HALTED
        assert sum(f.accepted is not None for f in told.findings) == 1

    def test_holds_on_its_last_day(self) -> None:
        told = judged(self.rule, accepted=[accepting("toy", until=TODAY)])

        assert told.verdict is Verdict.CLEAR

    def test_lapses_the_day_after(self) -> None:
        told = judged(self.rule, accepted=[accepting("toy", until=TODAY - datetime.timedelta(days=1))])

        assert told.verdict is Verdict.HALTED
        assert told.findings[-1].finding.message == (
            "the acceptance of toy has lapsed: it expired on 2026-11-30; remove it or renew it"
        )

    @pytest.mark.parametrize(
        ("acceptance", "because"),
        [
            pytest.param(accepting("quiet"), "no finding needs it any more", id="rule-silent"),
            pytest.param(accepting("toy", finding="000000"), "its finding is another one now", id="other-finding"),
            pytest.param(accepting("nonesuch"), "no rule has that name", id="unknown-rule"),
        ],
    )
    def test_unused_is_named_at_its_place(self, acceptance: dict[str, object], because: str) -> None:
        told = judged(self.rule, saying("quiet", Grade.NOTE), accepted=[acceptance])

        (lapsed,) = (f for f in told.findings if f.rule == "acceptance-lapsed")
        assert (lapsed.key, lapsed.grade) == ("accepted[0]", Grade.NOTE)
        assert because in lapsed.finding.message

    def test_of_one_finding_by_two_acceptances_lapses_neither(self) -> None:
        told = judged(self.rule, accepted=[accepting("toy"), accepting("toy", finding=self.marks()[0])])

        assert {f.rule for f in told.findings} == {"toy"}


@pytest.mark.parametrize(
    ("book", "name"), [("basis_book", "basis"), ("symmetry_book", "symmetry"), ("expected", "expected state")]
)
def test_a_book_that_crashes_is_a_finding_and_the_rest_is_reported(
    book: str, name: str, monkeypatch: pytest.MonkeyPatch
) -> None:
    def crash(_facts: Facts) -> None:
        raise ZeroDivisionError("by zero")

    monkeypatch.setattr(Facts, book, property(crash))
    told = judged(saying("toy", Grade.NOTE, finding()))

    assert told.rule_failed
    assert {f.rule for f in told.findings} == {"rule-failed", "toy"}
    assert (
        told.findings[0].finding.message
        == f"the {name} of this deck could not be worked out (ZeroDivisionError: by zero)"
    )
    assert told.ledger is not None


def test_the_fingerprint_of_an_unreadable_deck_does_not_depend_on_the_order_of_its_complaints() -> None:
    one, two = Complaint("one fault", "a", 1), Complaint("another fault", "a", 2)
    marks = {
        engine.unreadable(UnreadableDeck("a", order)).findings[0].fingerprint for order in ((one, two), (two, one))
    }

    assert len(marks) == 1
