"""The opening line by line as rows: every line with its value, the opened one with the way there."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

from model.checks.term import Term
from model.quantity import UnitSystem
from model.report.working import origin_text, term_line, term_value
from model.study.measured import Comparison
from model.study.walkthrough import MOTION, Walk, WalkLine
from tui.glyphs import Charset, fill, width, wrap
from tui.openings import Shot
from tui.rows import Row, Span, Tone, ends, indented, paragraph, row

VALUE = 14
"""Columns of a value; more where lines have the whole width."""
_NUMBER = 3
_BROAD = 50
_MOST_INPUTS = 6
"""Inputs named below a formula; a motion takes many more."""
METHODS = "methods, and their share of the motion"
MEASURED = "measured, beside the estimate it replaces"
TRUST = "how far apart the methods are"

Said = tuple[str, Tone]


@dataclass(frozen=True)
class Entry:
    """One line: what it is called, its value, a second word under it, and what it says when opened."""

    head: str
    title: str
    value: str
    second: str = ""
    line: WalkLine | None = None
    comparison: Comparison | None = None


def entries(shot: Shot) -> list[Entry]:
    """All lines of the screen, in the order they are opened."""
    found = [_walked(shot.walk, line, shot.system) for line in shot.walk.lines]
    found += [_compared(one, shot.system) for one in shot.comparisons]
    spread = shot.walk.range_of_methods
    if spread is not None or shot.notes or shot.cautions:
        found.append(Entry(TRUST, "range of methods", range_text(shot.walk) or "none"))
    return found


def range_text(walk: Walk) -> str:
    """Least and largest method within its range, as shares of the motion."""
    spread = walk.range_of_methods
    return f"{spread[0]:.0%} to {spread[1]:.0%}".replace("%", " %") if spread is not None else ""


def _walked(walk: Walk, line: WalkLine, system: UnitSystem) -> Entry:
    title, _, of = line.title.partition(": ")
    head = ", ".join(part for part in (of, METHODS if line.method else "") if part)
    value = term_value(line.term, system) if line.term is not None else "no value"
    second = ""
    most = max((one.term.value for one in walk.lines if one.term and one.stage == line.stage and _flown(one)),
               default=0.0)  # fmt: skip
    if line.method and line.term is not None and most > 0:
        share = f"{line.term.value / most * 100:,.0f} %"
        second = share if line.counts else f"{share}, not counted"
    return Entry(head, title, value, second, line)


def _flown(line: WalkLine) -> bool:
    return line.method and line.title.startswith(MOTION)


def _compared(one: Comparison, system: UnitSystem) -> Entry:
    ratio = one.ratio
    second = f"estimate {ratio * 100:.0f} %" if ratio is not None else "no estimate"
    return Entry(MEASURED, one.name, term_value(one.measured, system), second, None, one)


def line_rows(
    shot: Shot, listed: list[Entry], opened: int, *, stale: bool, cells: int, chars: Charset
) -> tuple[list[Row], int, int]:
    """Every line, the opened one with its way; also its first and last row.

    Args:
        shot: What was worked out.
        listed: Its lines.
        opened: The line that is open.
        stale: Whether newer numbers are on their way; then these are drawn faint.
        cells: Width of the pane.
        chars: How to draw.
    """
    rows: list[Row] = []
    head, first, last = "", 0, 0
    for number, entry in enumerate(listed):
        if entry.head != head:
            head = entry.head
            if head:
                rows += [row(Span(line, "dim")) for line in wrap(chars.clean(head), cells, "  ")]
        here = number == opened
        first = len(rows) if here else first
        rows += _entry_rows(entry, number + 1, here=here, stale=stale, cells=cells, chars=chars)
        if here:
            for text, tone in _opened(shot, entry):
                rows += indented(paragraph(chars.clean(text), cells - 4, tone, "  "), 4)
            last = len(rows) - 1
    return rows, first, last


def _entry_rows(entry: Entry, number: int, *, here: bool, stale: bool, cells: int, chars: Charset) -> list[Row]:
    """Title and value, the value in its column however long the title is."""
    tone: Tone = "title" if here else "text"
    figures: Tone = "dim" if stale or (entry.line is not None and entry.line.term is None) else tone
    column = VALUE + 4 if cells > _BROAD else VALUE
    room = cells - 1 - _NUMBER - 1 - column - 1
    title = wrap(chars.clean(entry.title), max(room, 8), "  ")
    value, below = chars.clean(entry.value), chars.clean(entry.second)
    mark = chars.here if here else " "
    start = f"{mark}{number:>{_NUMBER - 1}} "
    # A value wider than its column has a line of its own.
    wide = width(value) > column
    first = row(Span("" if wide else value, figures))
    rows = [ends(row(Span(start, tone), Span(title[0], tone)), first, cells, chars)]
    rest = title[1:]
    for second in [text for text in (value if wide else "", below) if text]:
        beside = rest.pop(0) if rest else ""
        if width(beside) + width(second) + 2 > cells - _NUMBER:
            rows.append(row(Span(" " * _NUMBER + beside, tone)))
            beside = ""
        rows.append(ends(row(Span(" " * _NUMBER + beside, tone)), row(Span(second, figures)), cells, chars))
    return rows + [row(Span(" " * _NUMBER + part, tone)) for part in rest]


def _opened(shot: Shot, entry: Entry) -> Iterator[Said]:
    """What an opened line says, paragraph by paragraph."""
    if entry.line is not None:
        yield from _line_said(entry.line, shot.system)
    elif entry.comparison is not None:
        yield from _comparison_said(entry.comparison, shot.system)
    else:
        yield from _trust_said(shot)


def _line_said(line: WalkLine, system: UnitSystem) -> Iterator[Said]:
    if line.missing:
        yield line.missing, "note"
    if line.term is not None:
        yield from _term_said(line.term, system)
    if line.warning:
        yield f"Caution: {line.warning}", "note"
    if line.term is not None:
        for caution in line.term.cautions:
            yield f"Caution: {caution}", "note"


def _term_said(term: Term, system: UnitSystem) -> Iterator[Said]:
    said = term_line(term, system)
    yield f"{said.symbol}: {said.meaning}", "dim"
    if said.origin:
        yield origin_text(said), "text"
    if said.formula:
        yield said.formula, "text"
    if said.numbers:
        yield f"= {said.numbers}", "text"
    shown = term.inputs[:_MOST_INPUTS]
    for one in shown:
        yield f"{one.symbol} = {term_value(one, system)}, {one.meaning}", "dim"
    if len(shown) < len(term.inputs):
        yield f"and {len(term.inputs) - len(shown)} more, all in the working of the step", "dim"
    for name, text in (("holds", said.holds), ("leaves out", said.leaves_out), ("source", said.source)):
        if text:
            yield f"{name}: {text}", "text"
    for note in term.notes:
        yield note, "dim"


def _comparison_said(one: Comparison, system: UnitSystem) -> Iterator[Said]:
    yield f"measured: {term_value(one.measured, system)}, source: {one.source}", "text"
    if one.estimate is None:
        yield f"estimate: {one.missing}", "note"
    else:
        off = one.estimate.value / one.measured.value - 1
        way = "too high" if off > 0 else "too low"
        yield f"estimate: {term_value(one.estimate, system)}, {abs(off) * 100:.1f} % {way}", "text"
        yield from _term_said(one.estimate, system)
    if not one.used:
        yield "Caution: not used here, mass or speed is more than 10 % from that of the measurement", "note"


def _trust_said(shot: Shot) -> Iterator[Said]:
    if shot.walk.range_of_methods is not None:
        yield "least and largest of the methods within their range, over the motion that pulls most", "text"
    out = [line for line in shot.walk.lines if line.method and not line.counts]
    for line in out:
        yield f"not counted: {line.title}; {line.warning}", "text"
    for note in shot.notes:
        yield note, "text"
    for caution in shot.cautions:
        yield f"Caution: {caution}", "note"


def moved_row(name: str, now: str, filed: str, *, here: bool, moved: bool, cells: int, chars: Charset) -> Row:
    """One input: its name, where it stands, and where it stands in the file if that is elsewhere."""
    broad = cells > _BROAD + VALUE
    value, tail = (VALUE, 2 * VALUE) if broad else (10, 15)
    room = max(cells - 3 - value - tail, 10)
    tone: Tone = "title" if here else "text"
    start = Span(f"{chars.here if here else ' '} {fill(chars.clean(name), room, chars)} ", tone)
    shown = Span(fill(chars.clean(now), value, chars), "key" if moved else tone)
    said = f"{'moved, ' if broad else ''}file {chars.clean(filed)}" if moved else "as in the file" if broad else ""
    return row(start, shown, Span(f" {said}", "dim"))
