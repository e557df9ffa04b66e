"""The footer: as many whole entries of the command list as fit on one line."""

from __future__ import annotations

from collections.abc import Sequence

from tui.glyphs import width
from tui.rows import Row, Span, row

_GAP = 3


def footer(entries: Sequence[tuple[str, str]], cells: int) -> Row:
    """The footer's row.

    Args:
        entries: Key and word, the most wanted first; the last one always stays.
        cells: Width of the line.
    """
    if not entries:
        return row()
    last = entries[-1]
    room = cells - 1 - _cells(last)
    kept: list[tuple[str, str]] = []
    for entry in entries[:-1]:
        needed = _cells(entry) + _GAP
        if needed > room:
            break
        kept.append(entry)
        room -= needed
    spans: list[Span] = [Span(" ")]
    for place, (key, word) in enumerate([*kept, last]):
        if place:
            spans.append(Span(" " * _GAP))
        spans += [Span(key, "key"), Span(f" {word}", "dim")]
    return tuple(spans)


def _cells(entry: tuple[str, str]) -> int:
    return width(entry[0]) + 1 + width(entry[1])
