"""The load path as rows of text."""

from __future__ import annotations

from collections.abc import Sequence

from model.report.load_path import WEAKEST
from tui.glyphs import Charset, width, wrap
from tui.rows import Row, Span, Tone, row


def load_path_rows(lines: Sequence[str], cells: int, chars: Charset) -> list[Row]:
    """The lines with their columns kept; the weakest part stands out by its sign and word, then by its tone."""
    rows: list[Row] = []
    weak = False
    for line in lines:
        text = chars.clean(line)
        weak = line.startswith("> ") or (weak and line.endswith(WEAKEST))
        tone: Tone = "fail" if weak else "note" if line.lstrip().startswith("OPEN") else "text"
        blanks = " " * (len(text) - len(text.lstrip()))
        parts = [text] if width(text) <= cells else [blanks + part for part in wrap(text, cells - len(blanks), "  ")]
        rows += [row(Span(part, tone)) for part in parts]
    return rows
