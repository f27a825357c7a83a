"""The command line: exit status, what goes to standard output and what to standard error."""

import io
import json
import os
import subprocess
import sys
from collections.abc import Iterator
from pathlib import Path

import pytest

from checker import __version__, api, checking
from checker.cli import main, run
from checker.facts import Facts
from checker.findings import Finding, Grade
from checker.registry import Rule, RuleSet

ROOT = Path(__file__).parent.parent
WATER = """\
deck_version = 1
[species]
charge = 0
multiplicity = 1
atoms = [["O", 0.0, 0.0, 0.1173], ["H", 0.0, 0.7572, -0.4692], ["H", 0.0, -0.7572, -0.4692]]
"""
XYZ = "3\n\nO 0.0 0.0 0.1173\nH 0.0 0.7572 -0.4692\nH 0.0 -0.7572 -0.4692\n"


@pytest.fixture(autouse=True)
def folder(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> Path:
    """Stand in an empty folder with four decks: clear, halted, unreadable and bare."""
    monkeypatch.chdir(tmp_path)
    monkeypatch.delenv("COLUMNS", raising=False)
    (tmp_path / "clear.deck.toml").write_text(WATER)
    (tmp_path / "halted.deck.toml").write_text(WATER.replace("charge = 0", "charge = 1"))
    (tmp_path / "broken.deck.toml").write_text("deck_version = ")
    (tmp_path / "bare.xyz").write_text(XYZ)
    return tmp_path


def use_rules(monkeypatch: pytest.MonkeyPatch, *rules: Rule) -> None:
    monkeypatch.setattr(api, "all_rules", lambda: RuleSet(rules))


def noting(grade: Grade) -> Rule:
    said = Finding(at="species.charge", message="found", why="ground")
    return Rule("toy", grade, lambda facts: iter([said]))


def crash(facts: Facts) -> Iterator[Finding]:
    raise ZeroDivisionError("on purpose")
    yield


class TestStatus:
    @pytest.mark.parametrize(
        ("argv", "status"),
        [
            pytest.param(["clear.deck.toml"], 0, id="clear"),
            pytest.param(["halted.deck.toml"], 1, id="halted"),
            pytest.param(["broken.deck.toml"], 2, id="unreadable"),
            pytest.param(["missing.deck.toml"], 2, id="missing"),
            pytest.param(["broken.deck.toml", "halted.deck.toml"], 2, id="unreadable_wins"),
            pytest.param(["clear.deck.toml", "halted.deck.toml"], 1, id="one_is_enough"),
            pytest.param(["bare.xyz"], 2, id="bare_without_charge"),
            pytest.param(["bare.xyz", "--charge", "0", "--multiplicity", "1"], 0, id="bare_filled_in"),
            pytest.param(["bare.xyz", "--charge", "-1", "--multiplicity", "1"], 1, id="negative_number"),
            pytest.param(["bare.xyz", "--charge=-1", "--multiplicity=1"], 1, id="negative_number_with_equals"),
            pytest.param(["halted.deck.toml", "--quiet"], 1, id="quiet"),
            pytest.param(["halted.deck.toml", "--format", "json"], 1, id="json"),
            pytest.param(["broken.deck.toml", "--format", "json"], 2, id="json_unreadable"),
        ],
    )
    def test_of_check(self, argv: list[str], status: int) -> None:
        """The status says what the worst deck came to."""
        assert run(["check", *argv]) == status

    @pytest.mark.parametrize("found", list(Grade))
    @pytest.mark.parametrize("stop_at", list(Grade))
    def test_stops_at_the_grade_asked_for(
        self, found: Grade, stop_at: Grade, monkeypatch: pytest.MonkeyPatch
    ) -> None:
        """A finding counts if its grade is the one asked for or a higher one."""
        use_rules(monkeypatch, noting(found))

        assert run(["check", "clear.deck.toml", "--stop-at", found.word]) == 1
        assert run(["check", "clear.deck.toml", "--stop-at", stop_at.word]) == (found >= stop_at)

    def test_an_accepted_finding_does_not_count(self, folder: Path, monkeypatch: pytest.MonkeyPatch) -> None:
        """The author stands behind it."""
        use_rules(monkeypatch, noting(Grade.HALT))
        (folder / "clear.deck.toml").write_text(WATER + '[[accepted]]\nrule = "toy"\nreason = "meant so"\n')

        assert run(["check", "clear.deck.toml", "--stop-at", "note"]) == 0

    def test_a_rule_that_breaks_down_wins_over_all(
        self, monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
    ) -> None:
        """The others still speak, and the status says that it was our fault."""
        use_rules(monkeypatch, Rule("broken", Grade.NOTE, crash), noting(Grade.HALT))

        assert run(["check", "clear.deck.toml", "broken.deck.toml"]) == 3
        out = capsys.readouterr().out
        assert "the rule broken broke down" in out
        assert "toy" in out

    def test_a_fault_of_ours_is_one_paragraph(
        self, monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
    ) -> None:
        """It says what to report; the traceback is there for those who ask."""
        monkeypatch.setattr(checking, "check", crash_of_ours)

        assert run(["check", "clear.deck.toml"]) == 3
        err = capsys.readouterr().err
        assert f"a fault of hundsight {__version__}, not of your deck" in err
        assert "RuntimeError in test_cli.py, line" in err
        assert "Traceback" not in err

        monkeypatch.setenv("HUNDSIGHT_TRACEBACK", "1")
        assert run(["check", "clear.deck.toml"]) == 3
        assert "Traceback" in capsys.readouterr().err

    def test_interrupted(self, monkeypatch: pytest.MonkeyPatch) -> None:
        """Control-C has a status of its own, and says nothing."""
        monkeypatch.setattr(checking, "check", interrupt)

        assert run(["check", "clear.deck.toml"]) == 130

    def test_main_leaves_with_the_status(self, monkeypatch: pytest.MonkeyPatch) -> None:
        """As the console script does."""
        monkeypatch.setattr(sys, "argv", ["hundsight", "check", "halted.deck.toml"])

        with pytest.raises(SystemExit) as left:
            main()

        assert left.value.code == 1


def crash_of_ours(wish: object) -> None:
    raise RuntimeError("on purpose")


def interrupt(wish: object) -> None:
    raise KeyboardInterrupt


class TestArguments:
    @pytest.mark.parametrize(
        ("argv", "said"),
        [
            pytest.param(["check"], "check: no deck is given", id="no_deck"),
            pytest.param(["check", "x", "--charge", "abc"], "--charge: 'abc' is no whole number", id="charge"),
            pytest.param(["check", "x", "--charge", "0.5"], "--charge: '0.5' is no whole number", id="half"),
            pytest.param(["check", "x", "--charge", "9" * 5000], "is no whole number", id="huge"),
            pytest.param(["check", "x", "--multiplicity", ""], "--multiplicity: '' is no", id="empty"),
            pytest.param(["check", "x", "--stop-at", "never"], "write note or doubt or halt", id="stop_at"),
            pytest.param(["check", "x", "--format", "pdf"], "'pdf' is no format", id="format"),
            pytest.param(
                ["check", "x", "--format", "sarif"], "not available in this version", id="format_of_later"
            ),
            pytest.param(["check", "x", "--apply", "0"], "counted from 1", id="apply_zero"),
            pytest.param(["check", "x", "--apply", "one"], "--apply: 'one' is no whole number", id="apply_word"),
            pytest.param(["check", "x", "--foramt", "json"], "--foramt; the nearest is --format", id="option"),
            pytest.param(["check", "x", "--charge"], "'--charge' requires an argument", id="no_value"),
            pytest.param(["chek"], "the nearest is 'check'", id="command"),
            pytest.param(["explain", "spin-party"], "the nearest is spin-parity", id="rule"),
            pytest.param(["explain", "policy"], "not explained in this version", id="page_of_later"),
            pytest.param(["explain", "a", "b"], "unexpected extra argument", id="too_many"),
            pytest.param(["check", "x\x1b[2J", "--charge", "\x1b[2J"], r"'\x1b[2J' is no whole", id="hostile"),
        ],
    )
    def test_error_is_a_sentence_on_standard_error(
        self, argv: list[str], said: str, capsys: pytest.CaptureFixture[str]
    ) -> None:
        """Nothing is judged, nothing stands on standard output, and the status is 2."""
        assert run(argv) == 2

        out, err = capsys.readouterr()
        assert out == ""
        assert said in err
        assert err.startswith("hundsight: ")
        assert "\x1b" not in err
        assert "!" not in err

    def test_every_complaint_about_the_call_is_made_at_once(self, capsys: pytest.CaptureFixture[str]) -> None:
        """One run is enough to learn them all."""
        assert run(["check", "--charge", "x", "--format", "pdf"]) == 2

        assert len(capsys.readouterr().err.splitlines()) == 3

    @pytest.mark.parametrize("argv", [["--help"], ["check", "--help"], ["check", "-h"], ["explain", "--help"]])
    def test_help_teaches_by_example(self, argv: list[str], capsys: pytest.CaptureFixture[str]) -> None:
        """Each page shows commands to try."""
        assert run(argv) == 0

        assert capsys.readouterr().out.count("    hundsight ") >= 3

    def test_help_of_check_tells_the_exit_status(self, capsys: pytest.CaptureFixture[str]) -> None:
        """Scripts depend on it."""
        run(["check", "--help"])

        out = capsys.readouterr().out
        assert all(f"\n    {status} " in out for status in (0, 1, 2, 3, 130))

    def test_no_command_shows_the_help_but_is_no_success(self, capsys: pytest.CaptureFixture[str]) -> None:
        """A script that lost its arguments must not pass."""
        assert run([]) == 2

        assert "hundsight check" in capsys.readouterr().out

    def test_version(self, capsys: pytest.CaptureFixture[str]) -> None:
        """Name and number."""
        assert run(["--version"]) == 0

        assert capsys.readouterr().out == f"hundsight {__version__}\n"

    def test_completion_knows_the_rules(
        self, monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
    ) -> None:
        """The shell offers what explain knows."""
        monkeypatch.setenv("_HUNDSIGHT_COMPLETE", "complete_bash")
        monkeypatch.setenv("COMP_WORDS", "hundsight explain spin-p")
        monkeypatch.setenv("COMP_CWORD", "2")

        with pytest.raises(SystemExit):
            run([])

        assert capsys.readouterr().out.split() == ["spin-parity"]


class TestOutput:
    def test_standard_input_is_a_deck_too(self, capsys: pytest.CaptureFixture[str]) -> None:
        """A deck need not be a file."""
        assert run(["check", "-", "--format", "json"], stdin=io.BytesIO(WATER.encode())) == 0

        assert json.loads(capsys.readouterr().out)["decks"][0]["deck"] == "-"

    def test_a_file_gets_what_the_screen_would(self, folder: Path, capsys: pytest.CaptureFixture[str]) -> None:
        """Byte for byte, and the screen stays empty."""
        run(["check", "halted.deck.toml", "clear.deck.toml"])
        shown = capsys.readouterr().out

        assert run(["check", "halted.deck.toml", "clear.deck.toml", "--output", "report.txt"]) == 1

        assert (folder / "report.txt").read_text(encoding="utf-8") == shown
        assert capsys.readouterr() == ("", "")

    def test_error_a_file_that_cannot_be_written(self, folder: Path, capsys: pytest.CaptureFixture[str]) -> None:
        """A sentence with the way out."""
        assert run(["check", "clear.deck.toml", "--output", "no/such/folder/x"]) == 2

        assert "--output no/such/folder/x: no such file or directory; give a file" in capsys.readouterr().err

    @pytest.mark.skipif(not Path("/dev/full").exists(), reason="this system has no /dev/full")
    @pytest.mark.parametrize(
        ("redirection", "status", "said"),
        [
            pytest.param(">&-", 2, "standard output is closed, so there is nowhere to write", id="output-closed"),
            pytest.param(">/dev/full", 2, "standard output cannot be written: no space left", id="disk-full"),
            pytest.param(">/dev/null 2>&-", 0, "", id="errors-closed"),
            pytest.param("--output out.txt >&-", 0, "", id="output-closed-but-not-needed"),
        ],
    )
    def test_error_a_stream_that_takes_nothing(
        self, redirection: str, status: int, said: str, monkeypatch: pytest.MonkeyPatch
    ) -> None:
        """It is the call's fault, not ours, and there is no traceback of the interpreter's own either."""
        monkeypatch.setenv("PYTHONPATH", str(ROOT))
        call = f'"{sys.executable}" -m checker check clear.deck.toml {redirection}'
        ended = subprocess.run(["/bin/sh", "-c", call], capture_output=True, text=True, check=False)

        assert ended.returncode == status, ended.stderr
        assert said in ended.stderr
        assert len(ended.stderr.splitlines()) == bool(said)

    def test_error_half_a_report_is_never_left(self, folder: Path, monkeypatch: pytest.MonkeyPatch) -> None:
        """What was there before stays, whatever happens on the way."""
        (folder / "report.txt").write_text("before")
        before = sorted(os.listdir(folder))  # noqa: PTH208
        monkeypatch.setattr(checking, "_reports", broken_stream)

        assert run(["check", "clear.deck.toml", "--output", "report.txt"]) == 3

        assert (folder / "report.txt").read_text() == "before"
        assert sorted(os.listdir(folder)) == before  # noqa: PTH208

    def test_quiet_tells_only_the_decks_that_stop(self, capsys: pytest.CaptureFixture[str]) -> None:
        """A line each."""
        run(["check", "clear.deck.toml", "halted.deck.toml", "--quiet"])

        (line,) = capsys.readouterr().out.splitlines()
        assert "halted.deck.toml" in line

    def test_what_a_poor_encoding_lacks_is_written_out(
        self, folder: Path, monkeypatch: pytest.MonkeyPatch
    ) -> None:
        """ASCII boxes, and escapes for the rest."""
        (folder / "clear.deck.toml").write_text(f'title = "\u00fc"\n{WATER}', encoding="utf-8")
        raw = io.BytesIO()
        monkeypatch.setattr(sys, "stdout", io.TextIOWrapper(raw, encoding="ascii"))

        assert run(["check", "clear.deck.toml"]) == 0

        assert raw.getvalue().startswith(b"- CLEAR       clear.deck.toml\n              \\xfc\n")

    def test_a_terminal_gets_colour_unless_no_color_is_set(self, monkeypatch: pytest.MonkeyPatch) -> None:
        """And the words are the same without it."""
        coloured = on_a_terminal(monkeypatch)
        monkeypatch.setenv("NO_COLOR", "1")
        plain = on_a_terminal(monkeypatch)

        assert "\x1b[" in coloured
        assert "\x1b" not in plain
        assert plain.splitlines()[0].split()[1] in coloured


def on_a_terminal(monkeypatch: pytest.MonkeyPatch) -> str:
    raw = io.BytesIO()
    stream = io.TextIOWrapper(raw, encoding="utf-8")
    monkeypatch.setattr(stream, "isatty", lambda: True)
    with monkeypatch.context() as patched:
        patched.setattr(sys, "stdout", stream)
        patched.setenv("TERM", "xterm")
        run(["check", "halted.deck.toml"])
    return raw.getvalue().decode()


def broken_stream(wish: object) -> Iterator[object]:
    raise RuntimeError("on purpose")
    yield


class TestApply:
    def test_mends_the_deck_and_judges_it_again(self, folder: Path, capsys: pytest.CaptureFixture[str]) -> None:
        """The report is that of the mended deck."""
        assert run(["check", "halted.deck.toml", "--apply", "1"]) == 0

        out, err = capsys.readouterr()
        assert (folder / "halted.deck.toml").read_text() == WATER
        assert "CLEAR" in out
        assert err.startswith("repair 1 written into halted.deck.toml: ")

    def test_without_it_nothing_is_written(self, folder: Path) -> None:
        """Checking is reading."""
        before = (folder / "halted.deck.toml").read_bytes()

        run(["check", "halted.deck.toml"])

        assert (folder / "halted.deck.toml").read_bytes() == before

    @pytest.mark.parametrize(
        ("decks", "said"),
        [
            pytest.param(["-"], "save the deck to one instead of piping it in", id="standard_input"),
            pytest.param(["halted.deck.toml", "clear.deck.toml"], "one deck at a time", id="several"),
            pytest.param(["clear.deck.toml"], "has no repairs to write", id="none"),
            pytest.param(["frames.xyz"], "split off into a file of its own", id="frames"),
        ],
    )
    def test_error_says_why_not(
        self, decks: list[str], said: str, folder: Path, capsys: pytest.CaptureFixture[str]
    ) -> None:
        """And nothing is written."""
        (folder / "frames.xyz").write_text(XYZ.replace("\n\n", "\ncharge=1 multiplicity=1\n") * 2)

        assert run(["check", *decks, "--apply", "1"], stdin=io.BytesIO(WATER.encode())) == 2
        assert said in capsys.readouterr().err

    def test_error_a_number_that_is_not_there(self, capsys: pytest.CaptureFixture[str]) -> None:
        """The numbers that are get named."""
        assert run(["check", "halted.deck.toml", "--apply", "99"]) == 2

        assert "its repairs are numbered 1 to " in capsys.readouterr().err

    def test_an_unreadable_deck_is_reported(self, capsys: pytest.CaptureFixture[str]) -> None:
        """There is nothing to mend before it can be read."""
        assert run(["check", "broken.deck.toml", "--apply", "1"]) == 2

        assert "UNREADABLE" in capsys.readouterr().out


class TestExplain:
    def test_without_a_name_lists_every_rule(self, capsys: pytest.CaptureFixture[str]) -> None:
        """With its grade, in reading order."""
        assert run(["explain"]) == 0

        out = capsys.readouterr().out
        starts = [line.split()[:2] for line in out.splitlines() if line and not line.startswith(" ")]
        rules = [[rule.id, rule.grade.word] for rule in api.all_rules()]
        assert starts[: len(rules)] == rules

    def test_a_rule_is_explained_by_its_own_page(self, capsys: pytest.CaptureFixture[str]) -> None:
        """Title, worked cases, source and grade; underscores are forgiven."""
        assert run(["explain", "spin_parity"]) == 0

        out = capsys.readouterr().out
        assert out.startswith("spin-parity: ")
        assert all(f"\n{word}: " in out for word in ("Passes", "Speaks", "Source", "Grade"))

    @pytest.mark.parametrize("name", ["deck", "report"])
    def test_schemas_are_printed_as_they_are(self, name: str, capsys: pytest.CaptureFixture[str]) -> None:
        """So that they can be piped."""
        assert run(["explain", name]) == 0

        assert json.loads(capsys.readouterr().out)["$schema"].endswith("2020-12/schema")


class TestProcess:
    """What only a process of its own can show."""

    def start(self, *argv: str, **options: object) -> subprocess.Popen[bytes]:
        return subprocess.Popen(
            [sys.executable, "-m", "checker", *argv],
            env={**os.environ, "PYTHONPATH": str(ROOT)},
            stdout=subprocess.PIPE,
            stderr=subprocess.PIPE,
        )

    def test_python_dash_m_works(self) -> None:
        """Status and text are those of the console script."""
        process = self.start("check", "halted.deck.toml")
        out, err = process.communicate()

        assert (process.returncode, err) == (1, b"")
        assert "HALTED" in out.decode()

    def test_a_reader_that_leaves_early_is_no_fault(self, folder: Path) -> None:
        """Nothing is said on standard error."""
        (folder / "many.xyz").write_text(XYZ.replace("\n\n", "\ncharge=0 multiplicity=1\n") * 3000)
        process = self.start("check", "many.xyz", "--format", "json")
        assert process.stdout is not None
        assert process.stderr is not None
        process.stdout.read(10)
        process.stdout.close()

        assert process.stderr.read() == b""
        process.stderr.close()
        assert process.wait() == 130

    def test_json_needs_neither_rich_nor_scipy(self) -> None:
        """Heavy imports are for those who need them."""
        code = (
            "import sys; from checker.cli import run; run(['check', 'halted.deck.toml', '--format', 'json']);"
            "heavy = {'rich', 'scipy', 'tomlkit', 'jsonschema'} & set(sys.modules);"
            "sys.exit(repr(heavy) if heavy else 0)"
        )
        done = subprocess.run(
            [sys.executable, "-c", code],
            env={**os.environ, "PYTHONPATH": str(ROOT)},
            capture_output=True,
            check=False,
        )

        assert (done.returncode, done.stderr) == (0, b"")
