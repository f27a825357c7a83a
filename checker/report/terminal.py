"""The report for people at a terminal: one deck in full; of several a line each and the worst in detail."""

from collections import Counter
from collections.abc import Iterable, Iterator
from dataclasses import dataclass, field
from itertools import chain, islice

from checker.findings import DeckReport, Grade, Verdict
from checker.report import Look
from checker.report.card import card, findings, heading
from checker.report.layout import Page, Segment, verdict_style
from checker.report.plain import VERDICT_ORDER, counted, plain

MOST_DETAILS = 10  # decks shown in detail after the list of several
MOST_FINDINGS_EACH = 5
MOST_LINES_A_FILE = 60
NAME_WIDTH = 44


def render(reports: Iterable[DeckReport], look: Look) -> Iterator[str]:
    """Yield the text piece by piece; of very many decks no more than a few reports are held."""
    page = Page(look)
    stream = iter(reports)
    first = list(islice(stream, 2))
    if look.quiet:
        yield from _quiet(chain(first, stream), page, look.stop_at)
    elif len(first) == 1:
        yield from card(first[0], page)
    else:
        yield from _several(chain(first, stream), page)


@dataclass(slots=True)
class _Run:
    """Frames of one file that follow each other and say the same; or a single deck."""

    kind: tuple[object, ...]
    first: DeckReport
    last: DeckReport
    n: int = 1


@dataclass(slots=True)
class _Details:
    """The first decks of each verdict that are worth showing in detail, and how many there were."""

    kept: dict[Verdict, list[_Run]] = field(default_factory=dict)
    n_decks: int = 0

    def note(self, run: _Run) -> None:
        if run.first.verdict is Verdict.CLEAR:
            return
        self.n_decks += run.n
        kept = self.kept.setdefault(run.first.verdict, [])
        same = next((other for other in kept if _file_of_frame(run.first) and other.kind == run.kind), None)
        if same is not None:
            same.n += run.n
        elif len(kept) < MOST_DETAILS:
            kept.append(run)

    def worst(self) -> list[_Run]:
        in_order = (self.kept.get(verdict, []) for verdict in reversed(VERDICT_ORDER))
        return list(chain.from_iterable(in_order))[:MOST_DETAILS]


@dataclass(frozen=True, slots=True)
class _Lines:
    """How many lines a file of frames has had."""

    file: str = ""
    n: int = 0


def _next_line(run: _Run, before: _Lines) -> _Lines:
    file = _file_of_frame(run.first)
    return _Lines(file, before.n + 1 if file and file == before.file else 1)


def _several(reports: Iterable[DeckReport], page: Page) -> Iterator[str]:
    counts: Counter[Verdict] = Counter()
    details = _Details()
    lines = _Lines()
    for run in _runs(reports):
        counts[run.first.verdict] += run.n
        details.note(run)
        lines = _next_line(run, lines)
        if lines.n <= MOST_LINES_A_FILE:
            yield from _run_lines(run, page)
        elif lines.n == MOST_LINES_A_FILE + 1:
            yield from page.entry("", f"further frames of {plain(lines.file)} are counted, not listed")
    if details.n_decks:
        yield from _detailed(details, page)
    yield "\n"
    said = ", ".join(f"{counts[verdict]} {verdict}" for verdict in VERDICT_ORDER if counts[verdict])
    yield page.free((f"{counted(counts.total(), 'deck')}: {said or 'nothing to judge'}", "name"))


def _runs(reports: Iterable[DeckReport]) -> Iterator[_Run]:
    run: _Run | None = None
    for report in reports:
        kind = _kind(report)
        if run is not None and _file_of_frame(report) and run.kind == kind:
            run.last, run.n = report, run.n + 1
            continue
        if run is not None:
            yield run
        run = _Run(kind, report, report)
    if run is not None:
        yield run


def _kind(report: DeckReport) -> tuple[object, ...]:
    """Return what makes two frames of a file one line: file, verdict, and the rules that speak against it."""
    file = _file_of_frame(report)
    return (file, report.verdict, *(_spoken(report) if report.verdict is not Verdict.CLEAR else ()))


def _file_of_frame(report: DeckReport) -> str:
    """Return the file of a deck that is one frame of several, else nothing."""
    file, _, number = report.deck.rpartition("#")
    return file if number.isdigit() else ""


def _spoken(report: DeckReport) -> list[str]:
    """Return the rules whose findings count, in the report's order."""
    return list(dict.fromkeys(finding.rule for finding in report.findings if finding.accepted is None))


def _run_lines(run: _Run, page: Page) -> Iterator[str]:
    """Yield the line of a run, with its rules below the name where they do not fit beside it."""
    name, rules = _name(run), ", ".join(_rules(run))
    if not rules or max(len(name), NAME_WIDTH) + len(rules) + 2 <= page.text_width:
        yield _run_line(run, page)
    else:
        yield page.line(_label(run, page), (name, ""))
        yield from page.entry("", rules, indent="  ")


def _run_line(run: _Run, page: Page) -> str:
    name, rules = _name(run), ", ".join(_rules(run))
    return page.line(_label(run, page), (f"{name:<{NAME_WIDTH}}  {rules}", ""))


def _label(run: _Run, page: Page) -> Segment:
    verdict = run.first.verdict
    return f"{page.mark(verdict)} {verdict}", verdict_style(verdict) if verdict is not Verdict.CLEAR else ""


def _name(run: _Run) -> str:
    name = plain(run.first.deck)
    return name if run.n == 1 else f"{name} to #{run.last.deck.rpartition('#')[2]}, {run.n} frames"


def _rules(run: _Run) -> list[str]:
    """Return what a run's line says of its findings."""
    report = run.first
    if report.verdict is Verdict.UNREADABLE:
        return [_first_complaint(report)]
    n_accepted = sum(finding.accepted is not None for finding in report.findings)
    return _spoken(report) + ([f"{n_accepted} accepted"] if n_accepted and run.n == 1 else [])


def _first_complaint(report: DeckReport) -> str:
    complaints = report.findings[0].finding.evidence.get("complaints")
    return counted(len(complaints) if isinstance(complaints, list) else 1, "complaint")


def _detailed(details: _Details, page: Page) -> Iterator[str]:
    """Yield the findings of the worst decks; notes are left to the report of a single deck."""
    worst = details.worst()
    for run in worst:
        yield "\n"
        yield from heading(run.first, page)
        if run.n > 1:
            yield from page.entry("", f"the first of {run.n} frames that say the same")
        yield from findings(run.first, page, MOST_FINDINGS_EACH, Grade.DOUBT)
    yield from _what_next(worst, details.n_decks - sum(run.n for run in worst), page)


def _what_next(worst: list[_Run], n_left: int, page: Page) -> Iterator[str]:
    """Yield what to do after a list, where there is more to see or to mend than it shows."""
    has_findings = any(run.first.verdict is not Verdict.UNREADABLE for run in worst)
    if has_findings or n_left:
        yield "\n"
    if has_findings:
        yield from page.entry("next", "check a deck by itself to see all there is to say of it, or to --apply N")
    if n_left:
        yield from page.entry(
            "" if has_findings else "next", f"{counted(n_left, 'more deck')} not clear; --format json has them all"
        )


def _quiet(reports: Iterable[DeckReport], page: Page, stop_at: Grade) -> Iterator[str]:
    for run in _runs(reports):
        if run.first.rule_failed or (run.first.worst or 0) >= stop_at:
            yield _run_line(run, page)
