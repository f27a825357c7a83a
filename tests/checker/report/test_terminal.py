"""The terminal report of several decks: what is put together, what is left out, and that it comes as it goes."""

import dataclasses
from collections.abc import Iterator

import pytest

from builders import job, report
from checker.findings import DeckReport, Finding, Grade
from checker.registry import Rule
from checker.report import RENDERERS, Look
from checker.report.terminal import MOST_DETAILS, MOST_LINES_A_FILE


def made(deck: str, grade: Grade | None = None, rule: str = "toy") -> DeckReport:
    """Return the report of a deck of that name, with one finding or none."""
    said = [Finding(at="species.charge", message="found", why="ground")] if grade else []
    judged = report(job("H", multiplicity=2), Rule(rule, grade or Grade.NOTE, lambda facts: iter(said)))
    return dataclasses.replace(judged, deck=deck)


def lines(*reports: DeckReport, **look: bool) -> list[str]:
    return "".join(RENDERERS["terminal"](reports, Look(**look))).splitlines()  # type: ignore[arg-type]


def test_frames_that_say_the_same_share_a_line() -> None:
    """A trajectory stays readable."""
    shown = lines(
        *(made(f"a.xyz#{i}") for i in (1, 2, 3)),
        made("a.xyz#4", Grade.HALT),
        *(made(f"a.xyz#{i}") for i in (5, 6)),
    )

    assert [line.split("  ")[-1].strip() for line in shown[:3]] == [
        "a.xyz#1 to #3, 3 frames",
        "toy",
        "a.xyz#5 to #6, 2 frames",
    ]


def test_decks_of_their_own_have_lines_of_their_own() -> None:
    """Only frames of one file are put together."""
    shown = lines(
        made("a.deck.toml"), made("b.deck.toml"), made("b.deck.toml#x"), made("c.xyz#1"), made("d.xyz#1")
    )

    assert len(shown) == 5 + 2
    assert shown[-1] == "5 decks: 5 clear"


def test_restless_frames_are_counted_where_they_are_no_longer_listed() -> None:
    """However long the file, the screen is not."""
    n_frames = 5 * MOST_LINES_A_FILE
    shown = lines(*(made(f"a.xyz#{i}", Grade.HALT if i % 2 else None) for i in range(n_frames)))

    assert len(shown) < 2 * MOST_LINES_A_FILE
    assert "              further frames of a.xyz are counted, not listed" in shown
    assert shown[-1] == f"{n_frames} decks: {n_frames // 2} clear, {n_frames // 2} halted"


def test_details_are_those_of_the_worst() -> None:
    """Halts before doubts, and so many; the rest is counted."""
    doubtful = [made(f"d{i}.deck.toml", Grade.DOUBT) for i in range(MOST_DETAILS + 3)]
    shown = lines(*doubtful, made("h.deck.toml", Grade.HALT))

    headings = [line for line in shown if " DOUBTFUL " in line or " HALTED " in line]
    assert headings[0].split()[-1] == "h.deck.toml"
    assert len(headings) == MOST_DETAILS
    assert any("4 more decks not clear" in line for line in shown)


def test_comes_as_it_goes() -> None:
    """The first line is there before the last deck is judged."""
    judged = []

    def stream() -> Iterator[DeckReport]:
        for i in range(10):
            judged.append(i)
            yield made(f"{i}.deck.toml")

    next(RENDERERS["terminal"](stream(), Look()))

    assert len(judged) < 4


@pytest.mark.parametrize(("stop_at", "n_lines"), [(Grade.NOTE, 3), (Grade.DOUBT, 2), (Grade.HALT, 1)])
def test_quiet_shows_what_stops(stop_at: Grade, n_lines: int) -> None:
    """And nothing else."""
    reports = [made(grade.word, grade) for grade in Grade] + [made("clear")]

    assert len("".join(RENDERERS["terminal"](reports, Look(stop_at=stop_at, quiet=True))).splitlines()) == n_lines


def test_no_decks_are_said_to_be_none() -> None:
    """Silence would look like success."""
    assert lines() == ["", "0 decks: nothing to judge"]


def test_rules_that_do_not_fit_beside_a_name_stand_below_it() -> None:
    """No line of the list is broken by the terminal."""
    rule = "a-rule-of-a-long-name-indeed"
    shown = lines(made("a.deck.toml", Grade.HALT, rule), made("b" * 50, Grade.HALT, rule))

    assert shown[:4] == [
        "\u25a0 halted      a.deck.toml",
        f"{'':16}{rule}",
        f"\u25a0 halted      {'b' * 50}",
        f"{'':16}{rule}",
    ]


def test_a_title_and_a_message_without_end_are_cut_short() -> None:
    """The screen stays readable; the JSON report has them whole."""
    said = Finding(at="species.charge", message="found " * 2000, why="ground")
    judged = report(job("H", multiplicity=2), Rule("toy", Grade.NOTE, lambda facts: iter([said])))
    shown = lines(dataclasses.replace(judged, title="x" * 100_000))

    assert sum(map(len, shown)) < 2000
    assert sum("--format json has it all" in line for line in shown) == 2


def test_where_only_ascii_is_to_be_had_greek_is_spelled_out() -> None:
    nitrogen = job([("N", 0.0, 0.0, 0.55), ("N", 0.0, 0.0, -0.55)], 0, 1)
    shown = lines(report(nitrogen), symbols=False)

    assert any(line.startswith("symmetry      Dinfh") for line in shown)
    assert all(line.isascii() for line in shown)
