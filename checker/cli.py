"""The command line: the only place that prints, reads the environment or decides on an exit status."""

import gc
import os
import sys
from collections.abc import Callable, Sequence
from typing import Annotated, BinaryIO

import typer

from checker import __version__
from checker.errors import HundsightError, UnreadableInput
from checker.output import NotWritten, ReaderLeft

CLEAN, STOPPED, UNREADABLE, FAULT, INTERRUPTED = 0, 1, 2, 3, 130
PROGRAM = "hundsight"
FORMATS = ("terminal", "json")

HELP = """\
Checks quantum-chemistry job decks before the hours are spent.

It reads a deck, keeps its electron books, and says what does not add up: with the ground for it, the evidence,
and repairs ready to paste.

\b
  hundsight check water.deck.toml         one deck, judged in full
  hundsight check decks/                  every deck of a folder
  hundsight explain spin-parity           what a rule asks for, and why
"""
CHECK_HELP = """\
Judge decks: is this the electronic state that was meant, and can it exist at all?

DECK is a deck, an XYZ file, a folder of them, or - for standard input.

\b
  hundsight check water.deck.toml
  hundsight check water.deck.toml --apply 1      write repair 1 into it
  hundsight check decks/ trajectory.xyz          a line each, worst in detail
  hundsight check ion.xyz --charge -1 --multiplicity 2
  hundsight check decks/ --format json --output report.json
"""
EXPLAIN_HELP = """\
Tell what a rule asks for, on what ground, with a worked case; without a name, list all rules.

\b
  hundsight explain                 all rules, with grade and title
  hundsight explain spin-parity     one of them
  hundsight explain report          the JSON Schema of check --format json
  hundsight explain deck            the JSON Schema of a deck
"""
EXIT_STATUS = """\
\b
Exit status:
  0    nothing at or above --stop-at
  1    something is
  2    a deck or an argument could not be read
  3    a fault of hundsight itself
  130  interrupted
"""

_USAGE_ERRORS = typer.BadParameter.__mro__[1]  # the class of all errors about arguments, which has no public name

app = typer.Typer(
    name=PROGRAM,
    rich_markup_mode=None,
    pretty_exceptions_enable=False,
    context_settings={"help_option_names": ["-h", "--help"]},
)


def main() -> None:
    """Run the command line of this process and exit with its status."""
    os.environ.setdefault("PYDANTIC_DISABLE_PLUGINS", "__all__")  # none is wanted, and looking for them takes time
    gc.disable()  # nothing made by imports is garbage; _end_of_imports turns it on again
    sys.exit(run(sys.argv[1:]))


def run(argv: Sequence[str], stdin: BinaryIO | None = None) -> int:
    """Run the command line on the arguments and return the exit status; only shell completion exits by itself.

    Parameters
    ----------
    argv : the arguments, without the program's name.
    stdin : what the deck `-` is read from; by default this process's own standard input.
    """
    try:
        command = typer.main.get_command(app)
        status = command.main(list(argv) or ["--help"], prog_name=PROGRAM, standalone_mode=False, obj=stdin)
    except (KeyboardInterrupt, typer.Abort):
        return INTERRUPTED
    except ReaderLeft:
        _close_quietly()
        return INTERRUPTED
    except NotWritten as failure:
        _close_quietly()
        return _complain(str(failure))
    except UnreadableInput as unreadable:
        return _complain(*map(str, unreadable.complaints))
    except HundsightError as known:
        return _complain(str(known))
    except Exception as fault:
        sentence = _usage_sentence(fault)
        return _complain(sentence) if sentence else _own_fault(fault)
    return int(status or CLEAN) if argv else UNREADABLE


def _end_of_imports() -> None:
    """Load the rules, then let the garbage collector begin, with what is loaded by now left out of its rounds."""
    from checker.api import all_rules

    if not gc.isenabled():
        all_rules()
        gc.freeze()
        gc.enable()


def _print_version(wanted: bool) -> None:
    if wanted:
        print(f"{PROGRAM} {__version__}")
        raise typer.Exit


def _complete_name(incomplete: str) -> list[str]:
    from checker import explain
    from checker.api import all_rules

    return [name for name in explain.names(all_rules()) if name.startswith(incomplete)]


def _one_of(*words: str) -> Callable[[str], list[str]]:
    return lambda incomplete: [word for word in words if word.startswith(incomplete)]


Decks = Annotated[
    list[str] | None,
    typer.Argument(metavar="DECK", hidden=True, show_default=False),
]
Format = Annotated[
    str,
    typer.Option("--format", metavar="FORMAT", help="terminal or json.", autocompletion=_one_of(*FORMATS)),
]
OutputFile = Annotated[
    str | None, typer.Option("--output", metavar="FILE", help="Write the report there, not to the screen.")
]
StopAt = Annotated[
    str,
    typer.Option(
        "--stop-at",
        metavar="GRADE",
        help="note, doubt or halt: from which grade on the exit status is 1.",
        autocompletion=_one_of("note", "doubt", "halt"),
    ),
]
Charge = Annotated[
    str | None, typer.Option("--charge", metavar="CHARGE", help="The charge, where the input states none.")
]
Multiplicity = Annotated[
    str | None,
    typer.Option("--multiplicity", metavar="2S+1", help="As --charge, for the multiplicity."),
]
Quiet = Annotated[bool, typer.Option("--quiet", help="A line for each deck that stops, and nothing else.")]
Apply = Annotated[
    str | None, typer.Option("--apply", metavar="N", help="Write repair N of the report into the deck.")
]
Name = Annotated[
    str | None,
    typer.Argument(
        metavar="NAME",
        hidden=True,
        show_default=False,
        autocompletion=_complete_name,
    ),
]
Version = Annotated[
    bool, typer.Option("--version", help="Print the version and exit.", callback=_print_version, is_eager=True)
]


@app.callback(help=HELP, epilog="Next: hundsight check --help, and hundsight explain for all rules.")
def _root(*, version: Version = False) -> None:
    """Hold the options of the program as a whole."""


@app.command(help=CHECK_HELP, short_help="Judge decks before they are submitted.", epilog=EXIT_STATUS)
def check(
    context: typer.Context,
    decks: Decks = None,
    *,
    form: Format = "terminal",
    output: OutputFile = None,
    stop_at: StopAt = "doubt",
    charge: Charge = None,
    multiplicity: Multiplicity = None,
    quiet: Quiet = False,
    apply: Apply = None,
) -> int:
    """Judge decks and return the exit status."""
    from checker import checking

    _end_of_imports()
    wish = checking.wish(
        decks=decks or [],
        form=form,
        output=output,
        stop_at=stop_at,
        charge=charge,
        multiplicity=multiplicity,
        quiet=quiet,
        apply=apply,
        stdin=context.obj,
    )
    outcome = checking.apply_and_check(wish) if wish.apply else checking.check(wish)
    if outcome.rule_failed:
        return FAULT
    if outcome.unreadable:
        return UNREADABLE
    return STOPPED if outcome.stopped else CLEAN


@app.command(help=EXPLAIN_HELP, short_help="Tell what a rule asks for, and why.")
def explain(name: Name = None) -> int:
    """Print the page of a name, or the catalogue."""
    from checker import explain as pages
    from checker.api import all_rules
    from checker.output import text_width, to_stdout

    rules = all_rules()
    to_stdout([pages.catalogue(rules, text_width()) if name is None else pages.page(name, rules, text_width())])
    return CLEAN


def _complain(*sentences: str) -> int:
    from checker.output import to_stderr

    for sentence in sentences:
        to_stderr(f"{PROGRAM}: {sentence}")
    return UNREADABLE


def _usage_sentence(error: Exception) -> str | None:
    """Return what is wrong with the arguments, if that is what typer's error is about; else None."""
    if not isinstance(error, _USAGE_ERRORS):
        return None
    option = getattr(error, "option_name", None)
    context = getattr(error, "ctx", None)
    help_command = f"{context.command_path if context else PROGRAM} --help"
    if type(error).__name__ == "NoSuchOption":
        nearest = getattr(error, "possibilities", None)
        hint = f"the nearest is {nearest[0]}" if nearest else f"{help_command} lists them"
        return f"no option is called {option}; {hint}"
    said = str(getattr(error, "message", error)).replace(". Did you mean ", "; the nearest is ").rstrip(".?")
    return f"{said[:1].lower()}{said[1:]}; {help_command} shows what can be asked for"


def _own_fault(fault: Exception) -> int:
    """Say that something of ours broke, and what to report; with HUNDSIGHT_TRACEBACK set, the whole way to it."""
    import traceback

    from checker.output import to_stderr

    if os.environ.get("HUNDSIGHT_TRACEBACK"):
        traceback.print_exception(fault)
        return FAULT
    frame = traceback.extract_tb(fault.__traceback__)[-1]
    place = f"{os.path.basename(frame.filename)}, line {frame.lineno}"  # noqa: PTH119 - a name, not a path
    to_stderr(f"{PROGRAM}: this is a fault of {PROGRAM} {__version__}, not of your deck.")
    to_stderr(f"{type(fault).__name__} in {place}: {fault}")
    to_stderr("Please report these lines together with the deck; HUNDSIGHT_TRACEBACK=1 shows the way to it.")
    return FAULT


def _close_quietly() -> None:
    """Let nothing more be written to where nothing can be written, so that leaving is quiet too."""
    try:
        os.dup2(os.open(os.devnull, os.O_WRONLY), sys.stdout.fileno())
    except (OSError, ValueError, AttributeError):
        return  # no stream of the system, such as a test's
