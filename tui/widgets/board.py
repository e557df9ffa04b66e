"""The group board: every step of the rig as one mark in its group's row."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from tui.glyphs import Charset, fill, width
from tui.rows import Row, Span, Tone

MARKS: dict[str, tuple[str, Tone]] = {
    "PASS": ("=", "pass"),
    "FAIL": ("X", "fail"),
    "OPEN": ("o", "open"),
    "NOT COUNTED": ("-", "dim"),
    "": (".", "dim"),
}
"""Mark and tone of each verdict; the empty one is a step under way."""


@dataclass(frozen=True, slots=True)
class Group:
    """A group of steps: its title and the verdict of each step, empty while under way."""

    title: str
    verdicts: tuple[str, ...]


def board(groups: Sequence[Group], here: tuple[int, int] | None, cells: int, chars: Charset) -> tuple[list[Row], int]:
    """The board's rows and the number of the row that holds the current step.

    A group with more steps than fit on its line goes on below it.

    Args:
        groups: The groups in order.
        here: Group and place in it of the current step, None where there is none.
        cells: Width of the board.
        chars: How to draw.
    """
    titles = min(max((width(group.title) for group in groups), default=0), max(cells // 2 - 1, 6))
    room = max((cells - titles - 1) // 2, 1)
    rows: list[Row] = []
    current = 0
    for number, group in enumerate(groups):
        for start in range(0, max(len(group.verdicts), 1), room):
            title = fill(group.title, titles, chars) if start == 0 else " " * titles
            marked = here is not None and here[0] == number
            spans = [Span(title, "title" if marked else "text"), Span(" ")]
            for place, verdict in enumerate(group.verdicts[start : start + room], start):
                sign, tone = MARKS[verdict]
                if here == (number, place):
                    current = len(rows)
                    spans += [Span(chars.here, "title"), Span(sign, "here")]
                else:
                    spans += [Span(" "), Span(sign, tone)]
            rows.append(tuple(spans))
    return rows, current
