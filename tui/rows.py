"""Rows of a page: text in spans, each with a tone that says what it is, never how it is coloured."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from typing import Literal, NamedTuple

from tui.glyphs import Charset, clip, width, wrap

Tone = Literal["text", "title", "dim", "pass", "fail", "open", "here", "key", "note", "rule"]


class Span(NamedTuple):
    """A piece of a row."""

    text: str
    tone: Tone = "text"


Row = tuple[Span, ...]
Rows = Sequence[Row]

EMPTY: Row = ()


def row(*parts: str | Span) -> Row:
    """A row of spans; plain strings are of the tone `text`."""
    return tuple(part if isinstance(part, Span) else Span(part) for part in parts if part)


def row_width(spans: Row) -> int:
    """Cells a row takes."""
    return sum(width(span.text) for span in spans)


def row_text(spans: Row) -> str:
    """A row's text without its tones."""
    return "".join(span.text for span in spans)


def clip_row(spans: Row, cells: int, chars: Charset) -> Row:
    """A row in at most this many cells; a cut is shown by a sign."""
    if row_width(spans) <= cells:
        return spans
    kept: list[Span] = []
    left = cells
    for span in spans:
        taken = width(span.text)
        if taken < left:
            kept.append(span)
            left -= taken
            continue
        kept.append(Span(clip(span.text + "  ", left, chars), span.tone))
        break
    return tuple(kept)


def ends(left: Row, right: Row, cells: int, chars: Charset) -> Row:
    """A row with one part at its left and one at its right end; the left one gives way."""
    right = clip_row(right, cells, chars)
    room = cells - row_width(right)
    left = clip_row(left, max(room - 2, 0) if right else room, chars)
    return (*left, Span(" " * (room - row_width(left))), *right)


def paragraph(text: str, cells: int, tone: Tone = "text", indent: str = "") -> list[Row]:
    """A wrapped paragraph."""
    return [row(Span(line, tone)) for line in wrap(text, cells, indent)]


def indented(rows: Iterable[Row], blanks: int) -> list[Row]:
    """Rows moved to the right."""
    return [(Span(" " * blanks), *spans) if spans else spans for spans in rows]
