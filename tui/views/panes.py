"""The rules between panes, with each pane's number."""

from __future__ import annotations

from collections.abc import Sequence

from tui.glyphs import Charset, fill, width
from tui.rows import Row, Span


def pane_rule(panes: Sequence[tuple[int, str, int]], here: int, chars: Charset) -> Row:
    """A rule that names the panes below it; the one that takes the arrows is marked by a sign.

    Args:
        panes: Number, name and width of each pane from the left; number 0 is a rule without a name.
        here: Number of the marked pane.
        chars: How to draw.
    """
    spans: list[Span] = []
    for number, name, cells in panes:
        if not number:
            spans.append(Span(chars.rule * cells, "rule"))
            continue
        mark = chars.here if number == here else chars.rule
        label = f" {number} {name} "
        spans += [
            Span(chars.rule + mark, "title" if number == here else "rule"),
            Span(fill(label, min(width(label), cells - 2), chars), "title" if number == here else "dim"),
            Span(chars.rule * max(cells - 2 - width(label), 0), "rule"),
        ]
    return tuple(spans)
