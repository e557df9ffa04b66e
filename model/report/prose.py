"""Texts of a report, users' own among them: kept on their line, in their direction and within a width."""

from __future__ import annotations

import unicodedata
from collections.abc import Sequence

from model.report.canvas import text_width
from model.report.chart import plain

ISOLATE, POP = "\N{FIRST STRONG ISOLATE}", "\N{POP DIRECTIONAL ISOLATE}"
_RIGHT_TO_LEFT = ("R", "AL", "AN")


def clean(text: str) -> str:
    """A text on one line: runs of blanks are one blank, what would control a display is made visible."""
    return plain(" ".join(text.split()))


def runs_right_to_left(text: str) -> bool:
    """Whether a text holds letters or digits that turn the order of what stands beside them."""
    return any(unicodedata.bidirectional(char) in _RIGHT_TO_LEFT for char in text)


def isolated(text: str) -> str:
    """A clean text that keeps its writing direction to itself: numbers beside it stay in their order."""
    text = clean(text)
    return f"{ISOLATE}{text}{POP}" if runs_right_to_left(text) else text


def width_of(text: str) -> int:
    """Cells a text takes; direction marks take none."""
    return text_width(text.replace(ISOLATE, "").replace(POP, ""))


def fold(text: str, width: int, first: str = "", then: str = "") -> list[str]:
    """A text in lines of at most ``width`` cells, parted at blanks, and within a word that is longer than a line.

    Args:
        text: A clean text.
        width: Cells of a line, indents counted in; at least two more than the indents.
        first: What the first line begins with.
        then: What the others begin with.
    """
    lines: list[str] = []
    line, empty = first, True
    for word in text.split():
        if not empty and width_of(line) + 1 + width_of(word) <= width:
            line += " " + word
            continue
        if not empty:
            lines.append(line)
            line = then
        while width_of(line) + width_of(word) > width:
            taken = _fitting(word, width - width_of(line))
            lines.append(line + word[:taken])
            line, word = then, word[taken:]  # noqa: PLW2901
        line, empty = line + word, False
    return [*lines, line] if not empty or not lines else lines


def _fitting(word: str, room: int) -> int:
    """How many characters of a word fit; at least one."""
    taken, used = 0, 0
    for char in word:
        used += width_of(char)
        if used > room:
            break
        taken += 1
    return max(taken, 1)


def joined(parts: Sequence[str], between: str = "; ") -> str:
    """The parts that are there, in one line."""
    return between.join(part for part in parts if part)
