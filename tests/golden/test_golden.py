"""Whole screens and files as users get them, compared character by character.

Every deck in tests/golden/decks (and a call with all of them) is reported in each format and width; the texts lie
in tests/golden/expected. After a change that is meant, write them anew and read the difference before committing:

    HUNDSIGHT_UPDATE_GOLDEN=1 python -m pytest tests/golden && git diff tests/golden
"""

import os
from pathlib import Path

import pytest

from checker.cli import run

HERE = Path(__file__).parent
DECKS = HERE / "decks"
EXPECTED = HERE / "expected"
UPDATE = bool(os.environ.get("HUNDSIGHT_UPDATE_GOLDEN"))

CALLS = {
    **{path.name.partition(".")[0]: [path.name] for path in sorted(DECKS.iterdir())},
    "several": ["clear.deck.toml", "halted.deck.toml", "unreadable.deck.toml", "frames.xyz", "accepted.deck.toml"],
}
STATUS = {"halted": 1, "doubtful": 1, "frames": 1, "unreadable": 2, "several": 2}
LOOKS = {
    "terminal-80.txt": (80, []),
    "terminal-120.txt": (120, []),
    "quiet.txt": (80, ["--quiet"]),
    "json": (80, ["--format", "json"]),
}


@pytest.mark.parametrize("look", LOOKS)
@pytest.mark.parametrize("call", CALLS)
def test_report_is_as_it_was(
    call: str, look: str, capsys: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch
) -> None:
    """Each call gives the text on file, on standard output alone."""
    width, options = LOOKS[look]
    monkeypatch.chdir(DECKS)
    monkeypatch.setenv("COLUMNS", str(width))

    status = run(["check", *CALLS[call], *options])
    out, err = capsys.readouterr()

    file = EXPECTED / f"{call}.{look}"
    if UPDATE:
        file.write_text(out, encoding="utf-8", newline="")
    assert (status, err) == (STATUS.get(call, 0), "")
    assert out == file.read_text(encoding="utf-8")


@pytest.mark.parametrize("file", sorted(EXPECTED.iterdir()), ids=lambda file: str(file.name))
def test_no_screen_holds_control_characters_or_trailing_space(file: Path) -> None:
    """What is piped to a file can be read, compared and pasted."""
    text = file.read_text(encoding="utf-8")

    assert all(line.isprintable() and line == line.rstrip() for line in text.splitlines())


@pytest.mark.parametrize("width", [80, 120])
@pytest.mark.parametrize("call", CALLS)
def test_no_line_is_wider_than_the_screen(call: str, width: int) -> None:
    """Text is wrapped to the width; no deck here has a word that is longer."""
    lines = (EXPECTED / f"{call}.terminal-{width}.txt").read_text(encoding="utf-8").splitlines()

    assert max(map(len, lines)) <= width


def test_every_expected_file_belongs_to_a_call() -> None:
    """No text is left behind that nothing is compared with."""
    assert {file.name for file in EXPECTED.iterdir()} == {f"{call}.{look}" for call in CALLS for look in LOOKS}
