"""The page of the terminal report: a column of labels, a column of text, wrapped to the width."""

import textwrap
from collections.abc import Iterator

from checker.findings import Grade, Verdict
from checker.report import Look

LABEL_WIDTH = 12
GAP = "  "
WIDEST = 120  # longer lines are hard to follow
NARROWEST = 40

# Boxes as in an orbital diagram, filled by weight; the second form is for terminals that know ASCII only.
_GLYPHS = {
    "halt": ("■", "#"),
    "doubt": ("◧", "="),
    "note": ("□", "-"),
    "accepted": ("▣", "+"),
    "unreadable": ("⊠", "x"),
}
_VERDICT_GLYPHS = {
    Verdict.HALTED: "halt",
    Verdict.DOUBTFUL: "doubt",
    Verdict.CLEAR: "note",
    Verdict.UNREADABLE: "unreadable",
}
# Groups and irreps as they are written, and read, where only ASCII is to be had.
_SPELLED_OUT = str.maketrans(
    {"∞": "inf", "Σ": "Sigma", "Π": "Pi", "Δ": "Delta", "Φ": "Phi", "Γ": "Gamma", "Η": "Eta", "Ι": "Iota"}
)
# Weight is shown by weight of type; the one colour marks what is there to be pasted.
_STYLES = {"halt": "bold reverse", "doubt": "bold", "name": "bold", "label": "dim", "paste": "cyan"}

Segment = tuple[str, str]


class Page:
    """Makes lines of text for a place of a given look."""

    def __init__(self, look: Look) -> None:
        self._look = look
        self._text_width = max(NARROWEST, min(look.width, WIDEST)) - LABEL_WIDTH - len(GAP)
        self._paint = _Painter() if look.colour else None

    def glyph(self, name: str) -> str:
        """Return the box for a grade or for "accepted"."""
        symbol, ascii_form = _GLYPHS[name]
        return symbol if self._look.symbols else ascii_form

    @property
    def text_width(self) -> int:
        """The characters that a line has beside its label."""
        return self._text_width

    def mark(self, verdict: Verdict) -> str:
        """Return the box for a verdict."""
        return self.glyph(_VERDICT_GLYPHS[verdict])

    def entry(
        self, label: str, text: str, style: str = "", label_style: str = "label", indent: str = ""
    ) -> Iterator[str]:
        """Yield a label with its text beside it, wrapped; words that are too long, such as paths, stay whole."""
        wrapped = textwrap.wrap(
            text,
            self._text_width,
            initial_indent=indent,
            subsequent_indent=indent,
            break_long_words=False,
            break_on_hyphens=False,
        ) or [""]
        yield self.line((label, label_style), (wrapped[0], style))
        for rest in wrapped[1:]:
            yield self.line(("", ""), (rest, style))

    def paragraph(self, text: str) -> Iterator[str]:
        """Yield text from the left edge on, wrapped, its further lines in the column of text."""
        indent = " " * (LABEL_WIDTH + len(GAP))
        width = self._text_width + len(indent)
        for line in textwrap.wrap(
            text, width, subsequent_indent=indent, break_long_words=False, break_on_hyphens=False
        ):
            yield self.free((line, ""))

    def line(self, label: Segment, *segments: Segment) -> str:
        """Return one line: the label in its column, then the segments as they are."""
        padding = " " * (LABEL_WIDTH - len(label[0])) + GAP
        return self.free((label[0], label[1]), (padding, ""), *segments)

    def free(self, *segments: Segment) -> str:
        """Return one line of segments outside the columns."""
        if not self._look.symbols:
            segments = tuple((text.translate(_SPELLED_OUT), style) for text, style in segments)
        if self._paint is None:
            return "".join(text for text, _ in segments).rstrip() + "\n"
        return "".join(self._paint(text, style) for text, style in segments).rstrip() + "\n"


def grade_style(grade: Grade) -> str:
    """Return the style of a grade."""
    return grade.word if grade.word in _STYLES else ""


def verdict_style(verdict: Verdict) -> str:
    """Return the style of a verdict."""
    return {Verdict.HALTED: "halt", Verdict.UNREADABLE: "halt", Verdict.DOUBTFUL: "doubt"}.get(verdict, "name")


class _Painter:
    """Paints text by style name with the sixteen colours that every terminal has."""

    def __init__(self) -> None:
        from rich.color import ColorSystem
        from rich.style import Style

        self._styles = {name: Style.parse(style) for name, style in _STYLES.items()}
        self._system = ColorSystem.STANDARD

    def __call__(self, text: str, style: str) -> str:
        if style not in self._styles or not text.strip():
            return text
        return self._styles[style].render(text, color_system=self._system)
