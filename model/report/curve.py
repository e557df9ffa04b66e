"""A chart as lines of text: braille dots, or ASCII only.

The picture never carries a number alone: a cell is some per cent of the range, so peak, limit and margin belong beside
it as text. Signs tell everything that styles tell.
"""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass
from itertools import pairwise

from model.report.canvas import ASCII, Canvas, Glyphs, Run, text_width
from model.report.chart import Axis, Bound, Chart, Curve, Point, Role, parted, plain, thinned
from model.report.ticks import Tick, ticks_around, ticks_within

LEAST_WIDTH = 20
LEAST_HEIGHT = 5
# From this height on the title of the x axis has a row of its own.
_ROOMY_HEIGHT = 12

_DOTS = ((0x01, 0x08), (0x02, 0x10), (0x04, 0x20), (0x40, 0x80))
_DRAWN_LAST = ("starting", "second", "main")


def draw(chart: Chart, width: int, height: int, *, ascii: bool = False) -> list[str]:  # noqa: A002
    """A chart as ``height`` lines, each ``width`` cells wide.

    Args:
        chart: What to draw.
        width: Cells across.
        height: Lines.
        ascii: Whether to use ASCII only.
    """
    return ["".join(text for text, _ in runs) for runs in draw_runs(chart, width, height, ascii=ascii)]


def draw_runs(chart: Chart, width: int, height: int, *, ascii: bool = False) -> list[list[Run]]:  # noqa: A002
    """The lines of `draw`, each as runs of text with the style that they have in common."""
    canvas = Canvas(max(width, 0), max(height, 0), ascii)
    if width < LEAST_WIDTH or height < LEAST_HEIGHT:
        canvas.put(0, 0, "no room to plot", "title")
        return canvas.runs()
    layout = _lay_out(chart, width, height, canvas.glyphs)
    _draw_limits(canvas, layout)
    for role in _DRAWN_LAST:
        for curve in chart.curves:
            if curve.role == role:
                _draw_curve(canvas, chart, layout, curve)
    _draw_line_ends(canvas, layout)
    _draw_frame(canvas, chart, layout)
    _draw_marks(canvas, chart, layout)
    if not any(curve.pieces for curve in chart.curves):
        canvas.put(layout.left + 2, layout.top + layout.rows // 2, "no data", "title")
    return canvas.runs()


@dataclass(frozen=True)
class Scale:
    """The way from values to ``count`` dots; ``falling`` puts the highest value at dot 0."""

    low: float
    high: float
    count: int
    falling: bool = False

    def dots(self, values: Sequence[float]) -> list[int]:
        """The dot, from 0, that each value falls on."""
        factor = (self.count - 1) / (self.high - self.low)
        if self.falling:
            return [self.count - 1 - int((value - self.low) * factor + 0.5) for value in values]
        return [int((value - self.low) * factor + 0.5) for value in values]

    def dot(self, value: float) -> int:
        """The dot that one value falls on."""
        return self.dots([value])[0]


@dataclass(frozen=True)
class Layout:
    """Where things are: the plotting area in cells, and the scales in dots counted from its top left."""

    left: int
    top: int
    columns: int
    rows: int
    x: Scale
    y: Scale
    x_ticks: list[Tick]
    y_ticks: list[Tick]
    ends: dict[int, str]

    def column(self, x: float) -> int:
        """The canvas column of an x."""
        return self.left + self.x.dot(x) * self.columns // self.x.count

    def row(self, y: float) -> int:
        """The canvas row of a y."""
        return self.top + self.y.dot(y) * self.rows // self.y.count


def _lay_out(chart: Chart, width: int, height: int, glyphs: Glyphs) -> Layout:
    rows = height - 3 - (height >= _ROOMY_HEIGHT)
    y_ticks = ticks_around(*chart.y_range(), most=min(8, max(2, (rows - 1) // 3)))
    y = Scale(y_ticks[0].value, y_ticks[-1].value, rows * glyphs.down, falling=True)
    margin = max(len(tick.label) for tick in y_ticks)
    if margin > width // 3:
        y_ticks, margin = [], 0
    ends = _line_ends(chart, lambda value: 1 + y.dot(value) // glyphs.down, glyphs is ASCII)
    left = margin + 2
    columns = width - left - min(1 + max(map(text_width, ends.values()), default=0), width // 3)
    x = Scale(*chart.x_range(), columns * glyphs.across, chart.x_axis.falling)
    room = _label_room(chart.x_axis, width, height)
    x_ticks = _fitting_ticks(x.low, x.high, lambda value: left + x.dot(value) // glyphs.across, room)
    return Layout(left, 1, columns, rows, x, y, x_ticks, y_ticks, ends)


def _line_ends(chart: Chart, row_of: Callable[[float], int], ascii: bool) -> dict[int, str]:  # noqa: A002
    """What stands at the ends of the limit lines; limits too close to part share one."""
    texts: dict[int, list[str]] = {}
    for bound in sorted(chart.drawable_limits(), key=lambda bound: -bound.value):
        row = texts.setdefault(row_of(bound.value), [])
        if (text := plain(bound.text, ascii)) not in row:
            row.append(text)
    return {row: ", ".join(parts) for row, parts in texts.items()}


def _label_room(axis: Axis, width: int, height: int) -> int:
    """Cells that the labels under the x axis may fill; in a low picture the unit stands behind them."""
    return width if height >= _ROOMY_HEIGHT or not axis.heading else width - text_width(_behind(axis)) - 2


def _behind(axis: Axis) -> str:
    return axis.unit or axis.title


def _fitting_ticks(low: float, high: float, column: Callable[[float], int], room: int) -> list[Tick]:
    """As many ticks as have labels that stand clear of each other."""
    for most in range(10, 0, -1):
        ticks = ticks_within(low, high, most)
        places = sorted(_label_place(tick, column(tick.value)) for tick in ticks)
        clear = all(end + 2 <= start for (_, end), (start, _) in pairwise(places))
        if ticks and clear and places[0][0] >= 0 and places[-1][1] <= room:
            return ticks
    # Wide labels: the first one that fits beats none.
    for tick in ticks_within(low, high, 2):
        start, end = _label_place(tick, column(tick.value))
        if start >= 0 and end <= room:
            return [tick]
    return []


def _label_place(tick: Tick, column: int) -> tuple[int, int]:
    start = column - len(tick.label) // 2
    return start, start + len(tick.label)


def _draw_frame(canvas: Canvas, chart: Chart, layout: Layout) -> None:
    glyphs, base, side = canvas.glyphs, layout.top + layout.rows, layout.left - 1
    for row in range(layout.top, base):
        canvas.set(side, row, glyphs.side, "frame")
    canvas.put(side, base, glyphs.corner + glyphs.base * layout.columns, "frame")
    labelled: set[int] = set()
    ticks = layout.y_ticks
    for tick in ticks[:1] + ticks[:0:-1]:
        row = layout.row(tick.value)
        if row not in labelled:
            labelled.add(row)
            canvas.set(side, row, glyphs.side_tick, "frame")
            canvas.put(side - 1 - len(tick.label), row, tick.label, "tick")
    for tick in layout.x_ticks:
        column = layout.column(tick.value)
        canvas.set(column, base, glyphs.base_tick, "frame")
        canvas.put(_label_place(tick, column)[0], base + 1, tick.label, "tick")
    roomy = canvas.height >= _ROOMY_HEIGHT
    foot = plain(chart.x_axis.heading if roomy else _behind(chart.x_axis), canvas.ascii)
    canvas.put(max(0, canvas.width - text_width(foot)), base + 1 + roomy, foot, "title")
    canvas.put(0, 0, chart.y_axis.heading, "title")
    _draw_key(canvas, chart, text_width(plain(chart.y_axis.heading, canvas.ascii)))


def _draw_key(canvas: Canvas, chart: Chart, taken: int) -> None:
    """Say which curve is which, at the right of the first row, as far as there is room."""
    entries: list[tuple[Role, str]] = []
    for curve in chart.curves:
        if curve.label:
            entries.append((curve.role, plain(f"{canvas.glyphs.sign(curve.role) * 2} {curve.label}", canvas.ascii)))
    while entries and taken + sum(text_width(text) + 2 for _, text in entries) > canvas.width:
        entries.pop()
    column = canvas.width - sum(text_width(text) + 2 for _, text in entries) + 2
    for role, text in entries:
        canvas.put(column, 0, text, role)
        column += text_width(text) + 2


def _draw_limits(canvas: Canvas, layout: Layout) -> None:
    for row in layout.ends:
        canvas.put(layout.left, row, canvas.glyphs.limit * layout.columns, "limit")


def _draw_line_ends(canvas: Canvas, layout: Layout) -> None:
    """Write the limits' values; one that finds no room at the end stands on the line, and none is ever cut."""
    beside = layout.left + layout.columns + 1
    for row, text in layout.ends.items():
        start = min(beside, canvas.width - text_width(text))
        if start >= layout.left:
            canvas.put(start, row, text, "limit")


def _draw_curve(canvas: Canvas, chart: Chart, layout: Layout, curve: Curve) -> None:
    limits = [] if curve.role == "starting" else chart.drawable_limits()
    across, down = layout.x.count // layout.columns, layout.y.count // layout.rows
    cells: dict[tuple[int, int], int] = {}
    beyond: set[tuple[int, int]] = set()
    for piece in curve.pieces:
        points = parted(thinned(piece, layout.x.dots([x for x, _ in piece])), limits)
        for x, y, over in _dots(points, layout, limits):
            cell = (x // across, y // down)
            cells[cell] = cells.get(cell, 0) | _DOTS[y % down][x % across]
            if over:
                beyond.add(cell)
    sign = canvas.glyphs.sign(curve.role)
    for cell, dots in cells.items():
        char = chr(0x2800 + dots) if curve.role == "main" and not canvas.ascii else sign
        over = cell in beyond
        if over and canvas.ascii:
            char = canvas.glyphs.over
        canvas.set(layout.left + cell[0], layout.top + cell[1], char, "over" if over else curve.role)


def _dots(points: list[Point], layout: Layout, limits: Sequence[Bound]) -> list[tuple[int, int, bool]]:
    """The dots of a line through samples, each with whether it lies beyond a limit."""
    places = list(zip(layout.x.dots([x for x, _ in points]), layout.y.dots([y for _, y in points]), strict=True))
    heights = [points[0][1]] + [(y0 + y1) / 2 for (_, y0), (_, y1) in pairwise(points)]
    overs = [False] * len(points)
    for bound in limits:
        overs = [over or bound.is_broken_by(y) for over, y in zip(overs, heights, strict=True)]
    dots = [(*places[0], overs[0])]
    for (x, y), (x1, y1), over in zip(places[:-1], places[1:], overs[1:], strict=True):
        steps = max(abs(x1 - x), abs(y1 - y))
        for step in range(1, steps):
            dots.append(
                (
                    x + (2 * (x1 - x) * step + steps) // (2 * steps),
                    y + (2 * (y1 - y) * step + steps) // (2 * steps),
                    over,
                )
            )
        if steps or over:
            dots.append((x1, y1, over))
    return dots


def _draw_marks(canvas: Canvas, chart: Chart, layout: Layout) -> None:
    for mark in chart.drawable_marks():
        column, row = layout.column(mark.x), layout.row(mark.y)
        over = chart.breaks_a_limit(mark.y)
        # Among the crosses of an ASCII curve over its limit only the plus is seen as the peak.
        sign = canvas.glyphs.over if over and not canvas.ascii else canvas.glyphs.mark
        canvas.set(column, row, sign, "over" if over else "mark")
        _put_beside(canvas, layout, column, row, mark.text)


def _put_beside(canvas: Canvas, layout: Layout, column: int, row: int, text: str) -> None:
    """Write a mark's text next to it where it covers nothing; nowhere if there is no such place."""
    length = text_width(plain(text, canvas.ascii))
    right, left, centred = column + 2, column - 1 - length, column - length // 2
    for start, line in [(right, row), (left, row), (centred, row - 1), (right, row - 1), (left, row - 1)]:
        inside = layout.left <= start and start + length <= layout.left + layout.columns and layout.top <= line
        if length and inside and canvas.is_free(start - 1, line, length + 2):
            canvas.put(start, line, text, "mark")
            return
