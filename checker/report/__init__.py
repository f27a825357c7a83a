"""Renderers: reports in, text out. They know no rule, read no file and print nothing.

A renderer takes the reports one after another and yields pieces of text as they come, so that very many decks
need little memory. Each module is imported when its renderer is first asked for.
"""

from collections.abc import Callable, Iterable, Iterator
from dataclasses import dataclass

from checker.findings import DeckReport, Grade


@dataclass(frozen=True, slots=True, kw_only=True)
class Look:
    """What a renderer may know of where its text goes.

    `width` in characters; `colour` and `symbols` tell whether escape codes and characters beyond ASCII are
    welcome; `quiet` asks for the decks that stop, and nothing else.
    """

    stop_at: Grade = Grade.DOUBT
    width: int = 80
    colour: bool = False
    symbols: bool = True
    quiet: bool = False


Renderer = Callable[[Iterable[DeckReport], Look], Iterator[str]]


def _terminal(reports: Iterable[DeckReport], look: Look) -> Iterator[str]:
    from checker.report.terminal import render

    return render(reports, look)


def _json(reports: Iterable[DeckReport], look: Look) -> Iterator[str]:
    from checker.report.json_report import render

    return render(reports, look)


RENDERERS: dict[str, Renderer] = {"terminal": _terminal, "json": _json}
