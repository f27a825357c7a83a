"""The command `check`: what was asked for, the decks judged one after another, and what came of it."""

import re
from collections.abc import Iterator
from dataclasses import dataclass, replace
from itertools import islice
from pathlib import Path
from typing import BinaryIO

from checker import api, output
from checker.errors import Complaint, RepairRefused, UnreadableInput
from checker.findings import DeckReport, Grade, Verdict
from checker.reading import FillIn
from checker.report import RENDERERS, Look

NO_DECK = "no deck is given; name decks, XYZ files or folders, or - for standard input"
LATER_FORMATS = ("sarif", "junit", "markdown", "html")
_WHOLE_NUMBER = re.compile(r"[+-]?\d{1,18}\Z", re.ASCII)


@dataclass(frozen=True, slots=True, kw_only=True)
class Wish:
    """What `check` is asked to do, read and found in order."""

    decks: tuple[str, ...]
    form: str
    output: str | None
    stop_at: Grade
    fill_in: FillIn
    quiet: bool
    apply: int | None
    stdin: BinaryIO | None


@dataclass(slots=True)
class Outcome:
    """What the reports came to, as far as the exit status goes."""

    stopped: bool = False
    unreadable: bool = False
    rule_failed: bool = False

    def note(self, report: DeckReport, stop_at: Grade) -> None:
        """Take one more report into account."""
        self.unreadable |= report.verdict is Verdict.UNREADABLE
        self.rule_failed |= report.rule_failed
        self.stopped |= report.worst is not None and report.worst >= stop_at


def wish(
    *,
    decks: list[str],
    form: str,
    output: str | None,
    stop_at: str,
    charge: str | None,
    multiplicity: str | None,
    quiet: bool,
    apply: str | None,
    stdin: BinaryIO | None,
) -> Wish:
    """Read the arguments of `check`; raise UnreadableInput with a complaint about each that is out of order."""
    complaints: list[Complaint] = []
    if not decks:
        complaints.append(Complaint(NO_DECK, "check"))
    n_apply = _whole_number("--apply", apply, complaints)
    if n_apply is not None and n_apply < 1:
        complaints.append(Complaint(f"repairs are counted from 1, so there is none numbered {n_apply}", "--apply"))
    asked = Wish(
        decks=tuple(decks),
        form=_form(form, complaints),
        output=output,
        stop_at=_grade(stop_at, complaints),
        fill_in=FillIn(
            _whole_number("--charge", charge, complaints),
            _whole_number("--multiplicity", multiplicity, complaints),
        ),
        quiet=quiet,
        apply=n_apply,
        stdin=stdin,
    )
    if complaints:
        raise UnreadableInput(*complaints)
    return asked


def check(asked: Wish) -> Outcome:
    """Judge the decks and write the report as it grows."""
    outcome = Outcome()
    bar = output.progress(len(asked.decks), quiet=asked.quiet)

    def watched() -> Iterator[DeckReport]:
        for report in _reports(asked):
            outcome.note(report, asked.stop_at)
            bar.count(report.deck.rpartition("#")[0] or report.deck, clear=report.verdict is Verdict.CLEAR)
            yield report

    pieces = RENDERERS[asked.form](watched(), _look(asked))
    if asked.output is None:
        output.to_stdout(pieces, bar)
    else:
        output.to_file(asked.output, pieces, bar)
    return outcome


def apply_and_check(asked: Wish) -> Outcome:
    """Write the repair asked for into the one deck, then judge that again and report."""
    from checker.repair import apply_repair

    if asked.decks == ("-",):
        raise RepairRefused("--apply writes into a file; save the deck to one instead of piping it in")
    reports = list(islice(_reports(asked), 2))
    if len(reports) != 1:
        raise RepairRefused(
            "--apply mends one deck at a time, and here there are several; name one deck. "
            "A frame of several must be split off into a file of its own first"
        )
    if reports[0].verdict is Verdict.UNREADABLE:
        return check(replace(asked, apply=None))  # shows what is unreadable
    assert asked.apply is not None
    path = asked.decks[0] if Path(asked.decks[0]).is_file() else reports[0].deck  # a folder may hold the one deck
    written = apply_repair(path, reports[0], asked.apply, asked.fill_in)
    output.to_stderr(f"repair {asked.apply} written into {', '.join(written.files)}: {written.say}")
    return check(replace(asked, apply=None, fill_in=written.fill_in))


def _reports(asked: Wish) -> Iterator[DeckReport]:
    return api.check_path(*asked.decks, fill_in=asked.fill_in, stdin=asked.stdin)


def _look(asked: Wish) -> Look:
    look = output.look_of_stdout if asked.output is None else output.look_of_file
    return look(asked.stop_at, quiet=asked.quiet)


def _form(word: str, complaints: list[Complaint]) -> str:
    if word not in RENDERERS:
        there_is = " and ".join(RENDERERS)
        lack = "is not available in this version" if word in LATER_FORMATS else "is no format"
        complaints.append(Complaint(f"{word!r} {lack}; there is {there_is}", "--format"))
    return word


def _grade(word: str, complaints: list[Complaint]) -> Grade:
    grades = {grade.word: grade for grade in Grade}
    if word not in grades:
        complaints.append(Complaint(f"{word!r} is no grade; write {' or '.join(grades)}", "--stop-at"))
    return grades.get(word, Grade.DOUBT)


def _whole_number(option: str, text: str | None, complaints: list[Complaint]) -> int | None:
    if text is None:
        return None
    if not _WHOLE_NUMBER.match(text.strip()):
        complaints.append(Complaint(f"{text!r} is no whole number; write one such as 1 or -2", option))
        return None
    return int(text)
