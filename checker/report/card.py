"""The terminal report of one deck: verdict, findings, electron books, what was not judged."""

from collections.abc import Iterator

from checker.findings import (
    BasisBook,
    DeckReport,
    ElementBook,
    Expected,
    Grade,
    Json,
    Ledger,
    PlacedFinding,
    SymmetryBook,
    Verdict,
)
from checker.report.layout import Page, grade_style, verdict_style
from checker.report.plain import counted, evidence, grade_counts, plain, signed

MOST_FINDINGS = 40
LONGEST_EVIDENCE = 400
LONGEST_TITLE = 200
INDENT = "    "
EXACT_ANGSTROM = 0.0001
"""Smaller deviations from a point group are not told apart; coordinates have no more digits that count."""


def card(report: DeckReport, page: Page) -> Iterator[str]:
    """Yield the whole report of one deck."""
    yield from heading(report, page)
    yield from findings(report, page, MOST_FINDINGS)
    if report.findings and report.ledger is not None:
        yield "\n"
    if report.ledger is not None:
        yield from _books(report.ledger, page, short=report.verdict is Verdict.CLEAR)
    if report.symmetry is not None:
        yield from page.entry("symmetry", _symmetry(report.symmetry))
        if report.symmetry.point_group != "C1":
            yield from page.entry("", _labels(report.symmetry))
    if report.basis is not None:
        yield from page.entry("basis", plain(_basis(report.basis, report.symmetry)))
    if report.expected is not None:
        yield from _expected(report.expected, page)
    yield from _not_judged(report, page)
    if any(finding.numbered for finding in report.findings if finding.accepted is None):
        yield "\n"
        yield from page.entry("next", "--apply N writes repair N into the deck and judges it again")


def heading(report: DeckReport, page: Page) -> Iterator[str]:
    """Yield the verdict, the deck's name and title, and how many findings of which grade there are."""
    label = f"{page.mark(report.verdict)} {report.verdict.upper()}"
    yield page.line((label, verdict_style(report.verdict)), (plain(report.deck), "name"))
    if report.title:
        yield from page.entry("", _shortened(plain(report.title), LONGEST_TITLE))
    count = _count(report)
    if count:
        yield from page.entry("", count)


def findings(report: DeckReport, page: Page, most: int, lowest: Grade = Grade.NOTE) -> Iterator[str]:
    """Yield the findings in the report's order, as many as `most`, none below the grade `lowest`.

    Where notes are left out, so are the findings that the author accepted.
    """
    shown = [f for f in report.findings if f.grade >= lowest and (lowest is Grade.NOTE or f.accepted is None)]
    for finding in shown[:most]:
        yield "\n"
        if finding.rule == "deck-unreadable":
            yield from _complaints(finding, page)
        elif finding.accepted is not None:
            yield from _accepted(finding, page)
        else:
            yield from _finding(finding, report, page)
    n_more = len(shown) - most
    if n_more > 0:
        yield "\n"
        yield from page.entry("", f"and {counted(n_more, 'more finding')}; --format json has them all")


def _count(report: DeckReport) -> str:
    if report.verdict is Verdict.UNREADABLE:
        return "could not be read, so nothing was judged"
    counted_ones = grade_counts(finding.grade for finding in report.findings if finding.accepted is None)
    n_accepted = sum(finding.accepted is not None for finding in report.findings)
    return ", ".join(part for part in (counted_ones, f"{n_accepted} accepted" if n_accepted else "") if part)


def _finding(placed: PlacedFinding, report: DeckReport, page: Page) -> Iterator[str]:
    said = placed.finding
    style = grade_style(placed.grade)
    label = f"{page.glyph(placed.grade.word)} {placed.grade.word}"
    message = _shortened(plain(said.message))
    yield from page.entry(label, message, style if placed.grade is not Grade.HALT else "name", style)
    yield from page.entry("place", _place(placed))
    yield from page.entry("ground", _shortened(plain(said.why)))
    if said.evidence:
        yield from page.entry("evidence", _shortened(evidence(said.evidence.items())))
    sure = f", confidence {said.confidence:.2g}" if said.confidence < 1 else ""
    yield from page.entry("rule", f"{placed.rule}{sure}, finding {placed.fingerprint}")
    for n, repair in placed.numbered:
        share = f"{_percent(repair.weight)} likely: " if len(placed.numbered) > 1 else ""
        yield from page.entry(f"repair {n}", share + plain(repair.say))
        from checker.report.deck_lines import deck_lines

        for line in deck_lines(repair, report):
            yield page.line(("", ""), (INDENT + line, "paste"))


def _accepted(placed: PlacedFinding, page: Page) -> Iterator[str]:
    assert placed.accepted is not None
    until = f" (until {placed.accepted.until})" if placed.accepted.until else ""
    yield from page.entry(f"{page.glyph('accepted')} accepted", plain(placed.finding.message), label_style="")
    yield from page.entry("place", _place(placed))
    yield from page.entry("reason", plain(placed.accepted.reason) + until)
    yield from page.entry("rule", f"{placed.rule}, a {placed.grade.word}, finding {placed.fingerprint}")


def _complaints(placed: PlacedFinding, page: Page) -> Iterator[str]:
    """Yield each complaint on a line of its own, its place first, so that editors can jump to it."""
    complaints = placed.finding.evidence["complaints"]
    assert isinstance(complaints, list)
    for complaint in complaints:
        assert isinstance(complaint, dict)
        spot = _spot(complaint["file"], complaint["line"], complaint["column"])
        yield from page.paragraph(f"{spot}: {plain(str(complaint['message']))}")


def _place(placed: PlacedFinding) -> str:
    spot = _spot(placed.where.file, placed.where.line, placed.where.column)
    return f"{spot} {plain(placed.key)}".rstrip()


def _spot(file: Json, line: Json, column: Json) -> str:
    return ":".join(plain(str(part)) for part in (file, line, column) if part is not None)


def _shortened(text: str, longest: int = LONGEST_EVIDENCE) -> str:
    return text if len(text) <= longest else f"{text[:longest]} ... (--format json has it all)"


def _percent(weight: float) -> str:
    return f"{100 * weight:.0f} %" if weight >= 0.01 else "below 1 %"


def _books(ledger: Ledger, page: Page, *, short: bool) -> Iterator[str]:
    label = "books"
    if not short or ledger.ghost_atoms or ledger.core_electrons_replaced != 0:
        for line in _book_table(ledger):
            yield page.line((label, "label"), (line, ""))
            label = ""
        yield from page.entry(label, _balance(ledger))
    else:
        species = f"{_formula(ledger.by_element)}, charge {signed(ledger.charge)}"
        yield from page.entry(label, f"{species}: {_electrons(ledger)}")


def _book_table(ledger: Ledger) -> list[str]:
    """Return one row an element and one for all, columns of numbers flush right."""
    rows = [["element", "atoms", "ghosts", "nuclear charge", "in core potentials"]]
    for book in ledger.by_element:
        replaced = book.core_electrons_replaced
        rows.append([book.symbol, *map(_cell, (book.atoms, book.ghosts, book.nuclear_charge, replaced))])
    total = (sum(b.atoms for b in ledger.by_element), ledger.ghost_atoms, ledger.nuclear_charge)
    rows.append(["all", *map(_cell, (*total, ledger.core_electrons_replaced))])
    widths = [max(len(row[i]) for row in rows) for i in range(len(rows[0]))]
    return [
        "  ".join([row[0].ljust(widths[0]), *(row[i].rjust(widths[i]) for i in range(1, len(row)))])
        for row in rows
    ]


def _cell(count: int | None) -> str:
    return "unknown" if count is None else str(count)


def _balance(ledger: Ledger) -> str:
    """Return the sum of the books in words and numbers."""
    if ledger.n_electrons is None:
        return (
            f"nuclear charge {ledger.nuclear_charge}, charge {signed(ledger.charge)}; electrons unknown, "
            "because what the core potentials replace is"
        )
    core = f" less {ledger.core_electrons_replaced} in core potentials" if ledger.core_electrons_replaced else ""
    total = f"nuclear charge {ledger.nuclear_charge}{core}, charge {signed(ledger.charge)}"
    return f"{total}: {_electrons(ledger)}"


def _electrons(ledger: Ledger) -> str:
    assert ledger.n_electrons is not None
    if ledger.n_alpha is None:
        split = "alpha and beta cannot be stated"
    else:
        split = f"{ledger.n_alpha} alpha, {ledger.n_beta} beta, {ledger.n_unpaired} unpaired"
    return f"{counted(ledger.n_electrons, 'electron')}, {split}"


def _formula(books: tuple[ElementBook, ...]) -> str:
    """Return the formula in Hill's order: carbon, hydrogen, then by the alphabet; without carbon all by it."""
    counts = {book.symbol: book.atoms for book in books if book.atoms}
    first = [symbol for symbol in ("C", "H") if symbol in counts] if "C" in counts else []
    order = first + sorted(counts.keys() - set(first))
    return "".join(symbol + (str(counts[symbol]) if counts[symbol] > 1 else "") for symbol in order)


def _symmetry(book: SymmetryBook) -> str:
    """Return the group and how exact it is, the group above, and the one of the isotopes."""
    own = book.point_group
    if own != "C1":
        own += f" within {max(book.deviation_angstrom, EXACT_ANGSTROM):.4f} angstrom"
    if book.next_higher is not None:
        group, deviation = book.next_higher
        own += f", next above it {group} within {deviation:.4f}"
    return own if book.with_isotopes is None else f"{own}; {book.with_isotopes} with isotopes told apart"


def _labels(book: SymmetryBook) -> str:
    """Return the abelian group, and in which group and frame labels are given."""
    if book.labels_of == book.abelian_subgroup != book.point_group:
        return f"labels of the abelian group {book.labels_of}: {book.frame_note}"
    abelian = f"abelian group {book.abelian_subgroup}; " if book.abelian_subgroup != book.point_group else ""
    return f"{abelian}labels of {book.labels_of}: {book.frame_note}"


def _basis(book: BasisBook, symmetry: SymmetryBook | None) -> str:
    """Return the size of the basis, and where its functions have irreps how many of each that occurs."""
    if book.n_functions is None:
        return f"{book.name}: functions unknown"
    size = ", ".join(part for part in (counted(book.n_functions, "function"), book.form) if part)
    occurring = ", ".join(f"{name} {n}" for name, n in (book.by_irrep or {}).items() if n)
    if symmetry is None or symmetry.labels_of == "C1" or not occurring:
        return f"{book.name}: {size}"
    return f"{book.name}: {size}; in {symmetry.labels_of} {occurring}"


def _expected(expected: Expected, page: Page) -> Iterator[str]:
    if expected.multiplicity is None:
        return
    sure = expected.multiplicity_confidence
    share = "" if sure is None else f" (confidence {sure:.2g})"
    yield from page.entry("expected", f"multiplicity {expected.multiplicity}{share}")


def _not_judged(report: DeckReport, page: Page) -> Iterator[str]:
    """Yield the rules that could not answer, together where the reason is the same."""
    rules_by_reason: dict[str, list[str]] = {}
    for word in report.not_judged:
        rules_by_reason.setdefault(word.because, []).append(word.rule)
    label = "not judged"
    for because, rules in rules_by_reason.items():
        yield from page.entry(label, f"{', '.join(dict.fromkeys(rules))}: {plain(because)}")
        label = ""
