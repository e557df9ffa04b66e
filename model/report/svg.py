"""A chart as one standalone SVG picture: no scripts, no links, no fonts of its own, clear in black and white."""

from __future__ import annotations

import re
import zlib
from collections.abc import Iterator
from dataclasses import dataclass
from itertools import groupby, pairwise
from xml.sax.saxutils import escape

from model.report.chart import Bound, Chart, Curve, Mark, Point, Role, parted, peak_of, plain, short, thinned
from model.report.ticks import Tick, ticks_around, ticks_within

LEAST_WIDTH = 240
LEAST_HEIGHT = 150

_FONT_SIZE = 12
# A digit of a sans-serif font is a good half as wide as it is high; wide letters are more.
_LETTER = 7.0
_LINE = 18
# The piece of line before a label in the key, with the gaps around it.
_SAMPLE = 50
# What XML cannot hold even escaped, beyond what `plain` has replaced.
_UNWRITABLE = re.compile("[\ufffe\uffff\ud800-\udfff]")

# Each kind of line differs by its dashes and weight; the shade only helps.
_STROKES: dict[Role | str, str] = {
    "main": 'stroke="#000" stroke-width="2"',
    "second": 'stroke="#000" stroke-width="1.5" stroke-dasharray="9 4"',
    "starting": 'stroke="#666" stroke-width="1.5" stroke-dasharray="2 4"',
    "over": 'stroke="#a00000" stroke-width="4.5"',
    "limit": 'stroke="#000" stroke-width="1" stroke-dasharray="12 4 2 4"',
    "frame": 'stroke="#000" stroke-width="1"',
    "grid": 'stroke="#ddd" stroke-width="1"',
}


@dataclass(frozen=True)
class _Frame:
    """The plotting area in pixels, the ranges in view and their ticks."""

    left: float
    top: float
    right: float
    bottom: float
    x_range: tuple[float, float]
    x_ticks: list[Tick]
    y_ticks: list[Tick]
    falling: bool

    def x(self, value: float) -> float:
        """Pixels from the left for an x."""
        low, high = self.x_range
        share = (value - low) / (high - low)
        return self.left + (self.right - self.left) * (1.0 - share if self.falling else share)

    def y(self, value: float) -> float:
        """Pixels from the top for a y."""
        low, high = self.y_ticks[0].value, self.y_ticks[-1].value
        return self.bottom - (self.bottom - self.top) * ((value - low) / (high - low))


def svg(chart: Chart, width: int = 640, height: int = 360) -> str:
    """A chart as the text of an SVG element that also stands alone as a file.

    Args:
        chart: What to draw.
        width: Pixels across, at least `LEAST_WIDTH`.
        height: Pixels down, at least `LEAST_HEIGHT`.

    Raises:
        ValueError: if the picture would be too small to read.
    """
    if width < LEAST_WIDTH or height < LEAST_HEIGHT:
        raise ValueError(f"a picture needs at least {LEAST_WIDTH} x {LEAST_HEIGHT} pixels, not {width} x {height}")
    frame = _lay_out(chart, width, height)
    body = "\n".join(_body(chart, frame, width, height))
    title, description = _text(_title(chart)), _text(describe(chart))
    # Several pictures may share one page: names are made from what is in them.
    name = f"curve-{zlib.crc32((title + description + body).encode()):08x}"
    return (
        f'<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 {width} {height}" width="{width}" height="{height}" '
        f'role="img" aria-labelledby="{name}-title {name}-text" font-family="sans-serif" font-size="{_FONT_SIZE}">\n'
        f'<title id="{name}-title">{title}</title>\n<desc id="{name}-text">{description}</desc>\n{body}\n</svg>\n'
    )


def describe(chart: Chart) -> str:
    """What the picture shows, in words, for who cannot see it."""
    sentences = []
    for curve in chart.curves:
        peak = peak_of(curve)
        name = curve.label or "curve"
        if peak is None:
            sentences.append(f"{name}: no data.")
            continue
        low = min(y for piece in curve.pieces for _, y in piece)
        ends = f"from {short(low, chart.limits)} to {short(peak.y, chart.limits)}"
        beyond = curve.role != "starting" and (chart.breaks_a_limit(low) or chart.breaks_a_limit(peak.y))
        sentences.append(f"{name}: {ends}, highest at {short(peak.x)}{', beyond the limit' if beyond else ''}.")
    for bound in chart.limits:
        sentences.append(f"Limit, {'at most' if bound.kind == 'max' else 'at least'}: {bound.text}.")
    for mark in chart.drawable_marks():
        sentences.append(
            f"Marked: {short(mark.y, chart.limits)} at {short(mark.x)}{', ' + mark.text if mark.text else ''}."
        )
    return " ".join(sentences) or "No data."


def _title(chart: Chart) -> str:
    return chart.title or f"{chart.y_axis.heading} against {chart.x_axis.heading}"


def _text(text: str) -> str:
    return escape(_UNWRITABLE.sub("\N{REPLACEMENT CHARACTER}", plain(text)))


def _number(pixels: float) -> str:
    return f"{pixels:.1f}".removesuffix(".0")


def _lay_out(chart: Chart, width: int, height: int) -> _Frame:
    top, bottom = 2.5 * _LINE, height - 2.5 * _LINE
    y_ticks = ticks_around(*chart.y_range(), most=max(2, min(8, int((bottom - top) / 40))))
    left = 14 + _LETTER * max(len(tick.label) for tick in y_ticks)
    ends = max((len(bound.text) for bound in chart.drawable_limits()), default=0)
    right = width - min(12 + _LETTER * ends, width / 3)
    low, high = chart.x_range()
    for most in range(10, 0, -1):
        x_ticks = ticks_within(low, high, most)
        widest = max((len(tick.label) for tick in x_ticks), default=0) * _LETTER + 12
        if len(x_ticks) * widest <= right - left or most == 1:
            break
    return _Frame(left, top, right, bottom, (low, high), x_ticks, y_ticks, chart.x_axis.falling)


def _body(chart: Chart, frame: _Frame, width: int, height: int) -> Iterator[str]:
    yield f'<rect width="{width}" height="{height}" fill="#fff"/>'
    yield from _axes(chart, frame, width, height)
    yield from _limits(chart, frame, width)
    for role in ("starting", "second", "main"):
        for curve in chart.curves:
            if curve.role == role:
                yield from _lines(chart, frame, curve)
    for mark in chart.drawable_marks():
        yield from _mark(chart, frame, mark)
    if not any(curve.pieces for curve in chart.curves):
        yield _words((frame.left + frame.right) / 2, (frame.top + frame.bottom) / 2, "no data", "middle")
    yield from _key(chart, width)


def _words(x: float, y: float, text: str, anchor: str = "start") -> str:
    return f'<text x="{_number(x)}" y="{_number(y)}" text-anchor="{anchor}">{_text(text)}</text>'


def _path(points: list[tuple[float, float]], kind: Role | str) -> str:
    steps = " ".join(f"{'L' if i else 'M'}{_number(x)} {_number(y)}" for i, (x, y) in enumerate(points))
    ends = 'stroke-linejoin="round" stroke-linecap="round"'
    return f'<path class="{kind}" d="{steps}" fill="none" {ends} {_STROKES[kind]}/>'


def _axes(chart: Chart, frame: _Frame, width: int, height: int) -> Iterator[str]:
    for tick in frame.y_ticks:
        y = frame.y(tick.value)
        yield _path([(frame.left, y), (frame.right, y)], "grid")
        yield _words(frame.left - 7, y + 4, tick.label, "end")
    for tick in frame.x_ticks:
        x = frame.x(tick.value)
        yield _path([(x, frame.bottom), (x, frame.bottom + 5)], "frame")
        yield _words(x, frame.bottom + _LINE, tick.label, "middle")
    yield _path([(frame.left, frame.top), (frame.left, frame.bottom), (frame.right, frame.bottom)], "frame")
    yield _words(8, _LINE - 2, chart.y_axis.heading)
    yield _words(width - 8, height - 8, chart.x_axis.heading, "end")


def _limits(chart: Chart, frame: _Frame, width: int) -> Iterator[str]:
    """Lines with their values at the right edge, those that lie close moved apart downward."""
    lowest_taken = 0.0
    for bound in sorted(chart.drawable_limits(), key=lambda bound: -bound.value):
        y = frame.y(bound.value)
        yield _path([(frame.left, y), (frame.right, y)], "limit")
        lowest_taken = max(y + 4, lowest_taken + _FONT_SIZE + 2)
        # At the very edge, so that a long text runs into the picture and not out of it.
        yield _words(width - 6, lowest_taken, bound.text, "end")


def _lines(chart: Chart, frame: _Frame, curve: Curve) -> Iterator[str]:
    limits = [] if curve.role == "starting" else chart.drawable_limits()
    for piece in curve.pieces:
        points = parted(thinned(piece, [int(frame.x(x)) for x, _ in piece]), limits)
        if len(points) == 1:
            points *= 2
        for over, stretch in _stretches(points, limits):
            places = [(frame.x(x), frame.y(y)) for x, y in stretch]
            if over:
                yield _path(places, "over")
            yield _path(places, curve.role)


def _stretches(points: list[Point], limits: list[Bound]) -> Iterator[tuple[bool, list[Point]]]:
    """The line in stretches that lie within the limits or beyond them."""
    steps = [(any(bound.is_broken_by((a[1] + b[1]) / 2) for bound in limits), a, b) for a, b in pairwise(points)]
    for over, group in groupby(steps, key=lambda step: step[0]):
        pairs = list(group)
        yield over, [pairs[0][1], *(end for _, _, end in pairs)]


def _mark(chart: Chart, frame: _Frame, mark: Mark) -> Iterator[str]:
    """A plus, or a cross where a limit is broken, with its text above."""
    x, y = frame.x(mark.x), frame.y(mark.y)
    if chart.breaks_a_limit(mark.y):
        yield _path([(x - 6, y - 6), (x + 6, y + 6)], "frame")
        yield _path([(x - 6, y + 6), (x + 6, y - 6)], "frame")
    else:
        yield _path([(x - 7, y), (x + 7, y)], "frame")
        yield _path([(x, y - 7), (x, y + 7)], "frame")
    if mark.text:
        half = len(mark.text) * _LETTER / 2
        centre = max(frame.left + half, min(frame.right - half, x))
        yield _words(centre, y - 11, mark.text, "middle")


def _key(chart: Chart, width: int) -> Iterator[str]:
    """Which line is which, at the right of the first row, as far as there is room."""
    entries = [(curve.role, curve.label, len(curve.label) * _LETTER) for curve in chart.curves if curve.label]
    room = width - 24 - len(chart.y_axis.heading) * _LETTER
    while entries and sum(length + _SAMPLE for _, _, length in entries) > room:
        entries.pop()
    x = width - 8 - sum(length + _SAMPLE for _, _, length in entries)
    for role, label, length in entries:
        yield _path([(x + 14, _LINE - 6), (x + 42, _LINE - 6)], role)
        x += length + _SAMPLE
        yield _words(x, _LINE - 2, label, "end")
