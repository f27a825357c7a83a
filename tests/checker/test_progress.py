"""The line of progress: when it shows, and that it goes."""

import io

import pytest

from checker.progress import CLEAR_LINE, PATIENCE_SECONDS, Progress


@pytest.fixture
def clock(monkeypatch: pytest.MonkeyPatch) -> list[float]:
    """Return the time, to be set by hand."""
    now = [100.0]
    monkeypatch.setattr("checker.progress.time.monotonic", lambda: now[0])
    return now


def test_stays_away_for_a_second(clock: list[float]) -> None:
    """Short runs are not disturbed."""
    stream = io.StringIO()
    progress = Progress(stream)
    clock[0] += PATIENCE_SECONDS / 2

    progress.count("a", clear=True)
    progress.hide()

    assert stream.getvalue() == ""


def test_counts_decks_and_goes_without_trace(clock: list[float]) -> None:
    """The line is cleared before other text."""
    stream = io.StringIO()
    progress = Progress(stream)
    progress.count("a", clear=True)
    clock[0] += PATIENCE_SECONDS

    progress.count("a", clear=False)
    progress.hide()
    progress.hide()

    assert stream.getvalue() == f"{CLEAR_LINE}2 decks judged, 1 not clear{CLEAR_LINE}"


def test_draws_a_bar_where_the_files_are_counted(clock: list[float]) -> None:
    """Frames of a file do not fill it twice."""
    stream = io.StringIO()
    progress = Progress(stream, n_files=4)
    clock[0] += PATIENCE_SECONDS

    for file in ("a", "b", "b"):
        clock[0] += 1
        progress.count(file, clear=True)

    assert stream.getvalue().endswith(f"{'=' * 12}{'.' * 12} 2 of 4 files, 3 decks judged, 0 not clear")


def test_no_stream_no_line() -> None:
    """Pipes get none."""
    progress = Progress(None)
    progress.count("a", clear=True)
    progress.hide()
