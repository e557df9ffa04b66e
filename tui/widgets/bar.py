"""The margin bar: where a value stands between the limits, as rows of text."""

from __future__ import annotations

import math
from collections.abc import Callable, Sequence
from dataclasses import dataclass

from tui.glyphs import Charset, clip, width
from tui.rows import Row, Span, Tone, row

_ROOM = 0.12
"""Share of the span left free beyond the outermost number."""
_ZOOM = 0.25
"""Two bounds closer together than this share of the larger are not shown from zero."""


@dataclass(frozen=True, slots=True)
class Scale:
    """The numbers at both ends of a bar and the number it is filled from."""

    low: float
    high: float
    origin: float

    def cell(self, number: float, cells: int) -> int:
        """The cell a number falls in, 0 to cells - 1."""
        share = (number - self.low) / (self.high - self.low)
        return min(max(int(share * cells), 0), cells - 1)


def scale_for(value: float, bounds: Sequence[float]) -> Scale:
    """Round ends that hold the value and its bounds, from zero where that still shows them apart."""
    numbers = [value, *bounds]
    least, most = min(numbers), max(numbers)
    close = len(bounds) > 1 and most - least < _ZOOM * max(abs(least), abs(most))
    if not close:
        least, most = min(least, 0.0), max(most, 0.0)
    span = (most - least) or abs(most) or 1.0
    step = _round_step(span / 8)
    low, high = least, most
    if least or 0.0 in bounds:
        low = math.floor((least - _ROOM * span) / step) * step
    if most or 0.0 in bounds:
        high = math.ceil((most + _ROOM * span) / step) * step
    if least >= 0 and min(numbers) > 0:
        low = max(low, 0.0)
    return Scale(low, high, min(max(0.0, low), high))


def _round_step(size: float) -> float:
    power = 10.0 ** math.floor(math.log10(size))
    return next(step * power for step in (1, 2, 5, 10) if step * power >= size * 0.999999)


def margin_bar(
    value: float,
    minimum: float | None,
    maximum: float | None,
    cells: int,
    chars: Charset,
    text: Callable[[float], str],
) -> list[Row]:
    """The bar and the numbers below it.

    The filled part ends at the value; what is over the greatest or short of the least is drawn with a sign of its own,
    and always takes at least one cell, however small it is.

    Args:
        value: The value, in the unit shown.
        minimum: The least allowed, if there is one.
        maximum: The greatest allowed, if there is one.
        cells: Width of the bar, at least 12.
        chars: How to draw.
        text: A number as text with its unit.
    """
    bounds = [bound for bound in (minimum, maximum) if bound is not None]
    if not bounds or not all(math.isfinite(number) for number in (value, *bounds)):
        return []
    scale = scale_for(value, bounds)
    inner = max(cells, 12) - 2
    ticks = {bound: min(max(scale.cell(bound, inner), 1), inner - 2) for bound in bounds}
    if minimum is not None and maximum is not None and ticks[minimum] >= ticks[maximum] - 1:
        ticks[minimum] = max(1, ticks[maximum] - 2)
        ticks[maximum] = max(ticks[maximum], ticks[minimum] + 2)
    here = _value_cell(value, minimum, maximum, scale.cell(value, inner), ticks)
    bar = _cells(here, scale.cell(scale.origin, inner), inner, chars)
    if maximum is not None and value > maximum:
        bar[ticks[maximum] + 1 : here + 1] = [Span(chars.over, "fail")] * (here - ticks[maximum])
    if minimum is not None and value < minimum:
        # Filled leftwards from zero, the value's own cell is past the limit; filled rightwards it is short of it.
        start = max(here if scale.cell(scale.origin, inner) > here else here + 1, 0)
        bar[start : ticks[minimum]] = [Span(chars.over, "fail")] * (ticks[minimum] - start)
    for tick in ticks.values():
        bar[tick] = Span(chars.limit, "title")
    named = []
    if minimum is not None:
        named.append((ticks[minimum] + 1, f"min {text(minimum)}"))
    if maximum is not None:
        named.append((ticks[maximum] + 1, f"max {text(maximum)}"))
    return [
        row(Span(chars.end_left, "rule"), *_joined(bar), Span(chars.end_right, "rule")),
        *_labels(named, (text(scale.low), text(scale.high)), inner + 2, chars),
    ]


def _value_cell(
    value: float, minimum: float | None, maximum: float | None, cell: int, ticks: dict[float, int]
) -> int:
    """The value's cell, on the right side of each limit whatever the rounding to cells says."""
    if maximum is not None:
        cell = max(cell, ticks[maximum] + 1) if value > maximum else min(cell, ticks[maximum])
    if minimum is not None:
        # A value short of the least keeps a cell free between its end and the tick.
        cell = max(min(cell, ticks[minimum] - 2), -1) if value < minimum else max(cell, ticks[minimum])
    return cell


def _cells(here: int, origin: int, inner: int, chars: Charset) -> list[Span]:
    bar = [Span(chars.empty, "rule")] * inner
    if 0 < origin < inner - 1:
        bar[origin] = Span(chars.zero, "rule")
    first, last = min(origin, here), max(origin, here)
    for place in range(max(first, 0), last + 1):
        bar[place] = Span(chars.fill, "text")
    if here < 0:
        bar[0] = Span(chars.empty, "rule")
    return bar


def _joined(bar: list[Span]) -> list[Span]:
    """Neighbours of one tone as one span."""
    joined: list[Span] = []
    for span in bar:
        if joined and joined[-1].tone == span.tone:
            joined[-1] = Span(joined[-1].text + span.text, span.tone)
        else:
            joined.append(span)
    return joined


def _labels(named: list[tuple[int, str]], ends: tuple[str, str], cells: int, chars: Charset) -> list[Row]:
    lines: list[list[tuple[int, str, Tone]]] = [[], []]
    for place, label in named:
        shown = clip(label, cells, chars)
        start = min(max(place - width(shown) // 2, 0), cells - width(shown))
        line = 0 if _free(lines[0], start, width(shown)) else 1
        lines[line].append((start, shown, "title"))
    for start, label in ((0, ends[0]), (cells - width(ends[1]), ends[1])):
        if start >= 0 and _free(lines[0], start, width(label)):
            lines[0].append((start, label, "dim"))
    return [_placed(line) for line in lines if line]


def _free(line: list[tuple[int, str, Tone]], start: int, cells: int) -> bool:
    return all(start + cells + 1 < other or start > other + width(text) + 1 for other, text, _ in line)


def _placed(line: list[tuple[int, str, Tone]]) -> Row:
    spans: list[Span] = []
    at = 0
    for start, label, tone in sorted(line):
        spans += [Span(" " * (start - at)), Span(label, tone)]
        at = start + width(label)
    return tuple(spans)
