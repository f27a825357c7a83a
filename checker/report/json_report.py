"""The report for programs: JSON as report.schema.json says, ASCII, the same bytes on each run.

One line a finding, so that reports can be compared line by line, and written deck by deck, so that very many
need little memory.
"""

import json
import math
from collections import Counter
from collections.abc import Iterable, Iterator, Mapping
from typing import Any

from checker import __version__
from checker.findings import BasisBook, DeckReport, Json, Ledger, PlacedFinding, Repair, SymmetryBook, Verdict
from checker.report import Look
from checker.report.plain import VERDICT_ORDER

REPORT_VERSION = 1
SHARE_DECIMALS = 4  # weights and confidences
EVIDENCE_DIGITS = 6
_SURROGATE = "\\ud"
LENGTH_DECIMALS = 6  # angstrom
EDIT_DECIMALS = 8  # coordinates as they go into a deck


def render(reports: Iterable[DeckReport], look: Look) -> Iterator[str]:
    """Yield the report in pieces: the head, each deck, the summary."""
    head = {"report_version": REPORT_VERSION, "hundsight": __version__, "stop_at": look.stop_at.word}
    yield f'{_text(head)[:-1]},\n "decks": ['
    counts: Counter[Verdict] = Counter()
    for report in reports:
        yield ",\n" if counts else "\n"
        yield _deck_text(report)
        counts[report.verdict] += 1
    summary = {"decks": counts.total(), **{verdict.value: counts[verdict] for verdict in VERDICT_ORDER}}
    yield f'],\n "summary": {_text(summary)}}}\n'


def deck_record(report: DeckReport) -> dict[str, Any]:
    """Return the report of a deck as plain values, in the order of the schema."""
    return {
        "deck": report.deck,
        "title": report.title,
        "verdict": report.verdict.value,
        "findings": [_finding(finding) for finding in report.findings],
        "not_judged": [{"rule": word.rule, "because": word.because} for word in report.not_judged],
        "ledger": None if report.ledger is None else _ledger(report.ledger),
        "symmetry": None if report.symmetry is None else _symmetry(report.symmetry),
        "basis": None if report.basis is None else _basis(report.basis),
        "expected": None if report.expected is None else _expected(report),
    }


def _symmetry(book: SymmetryBook) -> dict[str, Any]:
    higher = book.next_higher
    return {
        "point_group": book.point_group,
        "abelian_subgroup": book.abelian_subgroup,
        "deviation_angstrom": round(book.deviation_angstrom, LENGTH_DECIMALS),
        "labels_of": book.labels_of,
        "frame": book.frame_note,
        "next_higher": None
        if higher is None
        else {"point_group": higher[0], "deviation_angstrom": round(higher[1], LENGTH_DECIMALS)},
        "with_isotopes": book.with_isotopes,
    }


def _basis(book: BasisBook) -> dict[str, Any]:
    by_irrep = None if book.by_irrep is None else dict(book.by_irrep)
    return {"name": book.name, "functions": book.n_functions, "form": book.form, "by_irrep": by_irrep}


def _deck_text(report: DeckReport) -> str:
    record = deck_record(report)
    findings = _listed(record.pop("findings"))
    not_judged = _listed(record.pop("not_judged"))
    head = _text({key: record.pop(key) for key in ("deck", "title", "verdict")})[1:-1]
    tail = ",\n   ".join(f'"{key}": {_text(value)}' for key, value in record.items())
    return f'  {{{head},\n   "findings": {findings},\n   "not_judged": {not_judged},\n   {tail}}}'


def _listed(records: list[dict[str, Any]]) -> str:
    """Return a list with one record a line."""
    lines = ",\n    ".join(_text(record) for record in records)
    return f"[\n    {lines}]" if records else "[]"


def _text(value: object) -> str:
    """Return a value as JSON on one line; the few that JSON has no words for are cleaned first."""
    try:
        text = json.dumps(value, allow_nan=False)
    except (TypeError, ValueError):
        return json.dumps(_clean(value), allow_nan=False)
    return json.dumps(_clean(value)) if _SURROGATE in text else text


def _clean(value: Any) -> Json:
    """Return a value that JSON can hold: no NaN, no broken surrogates, no numbers of other libraries."""
    if isinstance(value, str):
        return value if value.isascii() else value.encode("utf-8", "backslashreplace").decode("utf-8")
    if isinstance(value, Mapping):
        return {str(_clean(str(key))): _clean(item) for key, item in value.items()}
    if isinstance(value, list | tuple):
        return [_clean(item) for item in value]
    if value is None or isinstance(value, bool | int):
        return value
    if isinstance(value, float):
        return value if math.isfinite(value) else None
    return _clean(value.item()) if hasattr(value, "item") else str(_clean(str(value)))


def _finding(placed: PlacedFinding) -> dict[str, Any]:
    said = placed.finding
    return {
        "rule": placed.rule,
        "grade": placed.grade.word,
        "confidence": round(said.confidence, SHARE_DECIMALS),
        "fingerprint": placed.fingerprint,
        "message": said.message,
        "why": said.why,
        "where": {
            "file": placed.where.file,
            "key": placed.key,
            "line": placed.where.line,
            "column": placed.where.column,
        },
        "evidence": _rounded(dict(said.evidence)),
        "repairs": [_repair(n, repair) for n, repair in placed.numbered],
        "accepted": None
        if placed.accepted is None
        else {"reason": placed.accepted.reason, "until": placed.accepted.until},
    }


def _repair(n: int, repair: Repair) -> dict[str, Any]:
    return {
        "number": n,
        "say": repair.say,
        "edits": [{"key": edit.key, "value": _edit_value(edit.value)} for edit in repair.edits],
        "weight": round(repair.weight, SHARE_DECIMALS),
    }


def _edit_value(value: Json) -> Json:
    if isinstance(value, float):
        return round(value, EDIT_DECIMALS) + 0.0  # + 0.0 turns -0.0 into 0.0
    if isinstance(value, list):
        return [_edit_value(item) for item in value]
    if isinstance(value, dict):
        return {key: _edit_value(item) for key, item in value.items()}
    return value


def _rounded(value: Json) -> Json:
    """Round the reals of the evidence, whose last digits differ between machines."""
    if isinstance(value, float):
        return float(f"{value:.{EVIDENCE_DIGITS}g}") + 0.0
    if isinstance(value, list):
        return [_rounded(item) for item in value]
    if isinstance(value, dict):
        return {key: _rounded(item) for key, item in value.items()}
    return value


def _ledger(ledger: Ledger) -> dict[str, Any]:
    return {
        "nuclear_charge": ledger.nuclear_charge,
        "core_electrons_replaced": ledger.core_electrons_replaced,
        "ghost_atoms": ledger.ghost_atoms,
        "charge": ledger.charge,
        "electrons": ledger.n_electrons,
        "alpha": ledger.n_alpha,
        "beta": ledger.n_beta,
        "unpaired": ledger.n_unpaired,
        "by_element": [
            {
                "element": book.symbol,
                "atomic_number": book.atomic_number,
                "atoms": book.atoms,
                "ghost_atoms": book.ghosts,
                "nuclear_charge": book.nuclear_charge,
                "core_electrons_replaced": book.core_electrons_replaced,
            }
            for book in ledger.by_element
        ],
    }


def _expected(report: DeckReport) -> dict[str, Any]:
    assert report.expected is not None
    sure = report.expected.multiplicity_confidence
    return {
        "multiplicity": report.expected.multiplicity,
        "multiplicity_confidence": None if sure is None else round(sure, SHARE_DECIMALS),
        "occupations": None,
        "occupations_confidence": None,
    }
