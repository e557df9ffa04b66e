"""The curves of the opening as rows, with their numbers in words below."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, replace
from typing import TYPE_CHECKING

from model.checks.finding import Finding
from model.quantity import Dimension, to_unit
from model.report.canvas import ASCII, BRAILLE, Style
from model.report.chart import Chart, Curve
from model.report.curve import LEAST_HEIGHT, draw_runs
from model.report.wording import bound_text, margin_text, value_text
from tui.glyphs import Charset, width
from tui.openings import Shot
from tui.rows import Row, Span, Tone, paragraph, row
from tui.views.opening import range_text

if TYPE_CHECKING:
    from model.report.flight_charts import Drawn

PLOTS = ("force against time", "rate of descent against height", "drag area against time")
_DIMENSIONS = (
    (Dimension.TIME, Dimension.FORCE), (Dimension.LENGTH, Dimension.SPEED), (Dimension.TIME, Dimension.AREA),
)  # fmt: skip
_TONES: dict[Style, Tone] = {
    "": "text", "title": "dim", "frame": "rule", "tick": "dim", "limit": "open", "starting": "dim", "second": "key",
    "main": "title", "over": "fail", "mark": "title",
}  # fmt: skip


@dataclass(frozen=True)
class Seen:
    """What a plot is drawn from.

    ``limited`` is the step that limits the opening force, if there is one; ``moved`` says whether any input is moved,
    then the file's curve stands behind; ``stale`` whether newer numbers are on their way.
    """

    shot: Shot
    filed: Shot
    plot: int
    limited: Finding | None
    moved: bool
    stale: bool


def curve_rows(seen: Seen, cells: int, height: int, chars: Charset, *, flowing: bool) -> list[Row]:
    """One plot over the numbers that belong to it, which flow in one paragraph or have a line each."""
    shot = seen.shot
    if not shot.charts.charts:
        return [row(Span("No curve", "title")), *paragraph(chars.clean(shot.charts.reason), cells, "note")]
    said = said_rows(seen, cells, chars, flowing=flowing)
    chart = shot.charts.charts[seen.plot].chart
    if seen.moved and seen.plot < len(seen.filed.charts.charts):
        chart = _over(chart, seen.filed.charts.charts[seen.plot].chart, seen.plot)
    lines = max(height - len(said), LEAST_HEIGHT)
    rows: list[Row] = []
    for runs in draw_runs(chart, cells, lines, ascii=chars.ascii):
        rows.append(tuple(Span(text, "dim" if seen.stale else _TONES[style]) for text, style in runs))
    return rows + said


def _over(chart: Chart, filed: Chart, plot: int) -> Chart:
    """A chart with the main curve of the file's values behind it, in the same units."""
    across, up = _DIMENSIONS[plot]
    x = to_unit(1.0, chart.x_axis.unit, across) / to_unit(1.0, filed.x_axis.unit, across)
    y = to_unit(1.0, chart.y_axis.unit, up) / to_unit(1.0, filed.y_axis.unit, up)
    main = next((curve for curve in filed.curves if curve.role == "main"), None)
    if main is None:
        return chart
    behind = Curve([x * one for one in main.x], [y * one for one in main.y], "as in the file", "starting")
    return replace(chart, curves=[behind, *chart.curves])


def said_rows(seen: Seen, cells: int, chars: Charset, *, flowing: bool, legend: bool = True) -> list[Row]:
    """The numbers of a plot in words, below a legend of which sign draws which curve."""
    if not seen.shot.charts.charts:
        return []
    drawn = seen.shot.charts.charts[seen.plot]
    said = [_legend(drawn, chars, moved=seen.moved)] if legend else []
    said += [_shorter(text) for text in drawn.said]
    said += _beyond(drawn.chart)
    if seen.plot == 0:
        said += _limit_said(seen)
    if seen.moved and seen.plot < len(seen.filed.charts.charts):
        filed = seen.filed.charts.charts[seen.plot]
        said.append("file: " + (filed.chart.marks[0].text if filed.chart.marks else filed.said[0]))
    tone: Tone = "dim" if seen.stale else "text"
    return (_flowing if flowing else _listed)([chars.clean(text) for text in said], cells, tone)


def _listed(said: Sequence[str], cells: int, tone: Tone) -> list[Row]:
    return [line for text in said for line in paragraph(text, cells, tone, "  ")]


def _flowing(said: Sequence[str], cells: int, tone: Tone) -> list[Row]:
    """As many texts on a line as there is room for, none broken that fits a line."""
    lines: list[str] = []
    for text in said:
        if lines and width(lines[-1]) + 2 + width(text) <= cells:
            lines[-1] += f"; {text}"
        else:
            lines.append(text)
    return _listed(lines, cells, tone)


def _beyond(chart: Chart) -> list[str]:
    """The limits that the marked peak lies beyond, in words: a sign on the curve alone is easily overlooked."""
    if not chart.marks:
        return []
    peak = chart.marks[0].y
    return [f"OVER the limit {bound.text}" for bound in chart.limits if bound.is_broken_by(peak)]


def _shorter(text: str) -> str:
    return text.replace(" is reached at ", ": ")


def _limit_said(seen: Seen) -> list[str]:
    """How the load factor stands to its limit, and how far apart the methods are."""
    shot, limited = seen.shot, seen.limited
    said: list[str] = []
    if shot.felt is None:
        said.append(f"load factor: {shot.walk.lines[-1].missing or 'no value'}")
    elif limited is not None and limited.limit is not None and shot.margin is not None:
        now = replace(limited, value=shot.felt, margin=shot.margin)
        said.append(f"load factor {value_text(now, shot.system)}: {margin_text(now)}")
    elif limited is not None:
        now = replace(limited, value=shot.felt)
        said.append(f"load factor {value_text(now, shot.system)}: {bound_text(now, shot.system)}")
    spread = range_text(shot.walk)
    return [*said, f"methods: {spread} of the motion"] if spread else said


def _legend(drawn: Drawn, chars: Charset, *, moved: bool) -> str:
    """Which sign draws which curve."""
    glyphs = ASCII if chars.ascii else BRAILLE
    labelled = [curve for curve in drawn.chart.curves if curve.label]
    parts = [f"{glyphs.sign(curve.role)} {curve.label.removesuffix(' rule')}" for curve in labelled]
    return ", ".join([*parts, f"{glyphs.sign('starting')} file"] if moved else parts)
