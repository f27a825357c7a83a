"""Each sample deck declares the findings it must give; it gives those and no others.

A declaration is a comment (in JSON, which has none, the title): ``must give: RULE GRADE at KEY``, GRADE being
``accepted`` where the deck accepts the finding, or ``must give: nothing``.
"""

import re
from pathlib import Path

import pytest

from builders import TODAY
from checker.api import check_path
from checker.cli import run
from checker.findings import DeckReport

FOLDER = Path(__file__).parent.parent / "sample_decks"
DECLARATION = re.compile(r"must give: (?:(nothing)|([a-z-]+) (halt|doubt|note|accepted) at ([\w.\[\]]+))")
ENDINGS = (".deck.toml", ".deck.json", ".xyz", ".extxyz")
DECKS = sorted(path for path in FOLDER.iterdir() if path.name.endswith(ENDINGS))


def declared(text: str) -> list[tuple[str, str, str]]:
    found = [match.groups() for match in DECLARATION.finditer(text)]
    assert found, "the deck declares nothing"
    return sorted((rule, grade, key) for nothing, rule, grade, key in found if not nothing)


def given(report: DeckReport) -> list[tuple[str, str, str]]:
    return sorted(
        (found.rule, "accepted" if found.accepted else found.grade.word, found.key) for found in report.findings
    )


def declarations(path: Path) -> list[list[tuple[str, str, str]]]:
    """The declared findings, one list a report: XYZ frames declare theirs on their comment lines."""
    text = path.read_text()
    if path.suffix not in (".xyz", ".extxyz"):
        return [declared(text)]
    return [declared(line) for line in text.splitlines() if "must give:" in line]


@pytest.mark.parametrize("path", DECKS, ids=lambda path: path.name)
def test_gives_what_it_declares_and_nothing_else(path: Path) -> None:
    reports = list(check_path(path, today=TODAY))
    assert [given(report) for report in reports] == declarations(path)


@pytest.mark.parametrize("path", DECKS, ids=lambda path: path.name)
def test_judges_all_that_applies(path: Path) -> None:
    """A crash of a rule would show here even in a deck that declares nothing."""
    assert not any(report.rule_failed for report in check_path(path, today=TODAY))


def test_the_readme_shows_what_is_printed(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    """The screen in README.md, between the command and the end of its block, is what the command prints."""
    readme = (FOLDER.parent / "README.md").read_text()
    shown = re.search(r"\$ hundsight (check (\S+))\n(.*?)\n```", readme, re.DOTALL)
    assert shown is not None
    monkeypatch.chdir(FOLDER.parent)
    monkeypatch.setenv("COLUMNS", "80")
    run(shown[1].split())
    assert capsys.readouterr().out.rstrip() == shown[3]
