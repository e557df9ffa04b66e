"""The opening line by line, with its curve, and inputs that keys move."""

from __future__ import annotations

from collections.abc import Iterator
from pathlib import Path

from textual.containers import Horizontal
from textual.widget import Widget

from model.checks.finding import Finding
from tui.caution import CAUTION
from tui.commands import OPENING
from tui.glyphs import clip
from tui.moves import step_text
from tui.openings import ModelOpenings, Openings
from tui.rows import EMPTY, Row, Rows, Span, ends, paragraph, row
from tui.screens.base import bindings
from tui.screens.walked import WalkedScreen
from tui.views.opening import line_rows, moved_row
from tui.views.opening_curve import PLOTS, Seen, curve_rows, said_rows
from tui.widgets.page import Page

_WIDE = 72
"""Columns from which lines and curve stand side by side."""
CAUTIONS = (
    CAUTION,
    "An estimate: rules, manual and licensed riggers go first.",
)
_TALL = 22
"""Lines from which four inputs are in sight, not three."""


class OpeningScreen(WalkedScreen):
    """Lines at the left, curve at the right, inputs below."""

    BINDINGS = bindings(OPENING)
    KIND = OPENING

    def __init__(self, rig: Path, openings: Openings | None = None) -> None:
        """Open the walk through a rig's opening."""
        super().__init__(rig, openings or ModelOpenings())
        self._plot = 0
        self._wide_curve = False
        self._drawn = (-1, 0)

    def panes(self) -> Iterator[Widget]:
        """Title, lines and curve, inputs."""
        yield Page(id="columns")
        yield Page(id="rule")
        with Horizontal(id="body"):
            yield Page(id="lines")
            yield Page(id="curve")
        yield Page(id="foot-rule")
        yield Page(id="inputs")

    # -- drawing

    def draw_panes(self, cells: int) -> None:
        """Draw everything."""
        self.put("columns", [self._title(cells)])
        self.put("rule", [row(Span(self.chars.rule * cells, "rule"))])
        both = cells >= _WIDE and not self._wide_curve and self._shot is not None
        left = cells // 2 + 1 if both else cells
        height = max(self.query_one("#body").size.height, 5)
        self._place(left if both else 0)
        if not self._wide_curve:
            self._draw_lines(left - 1)
        self._draw_curve(cells - left - 1 if both else cells - 2, height, both=both)
        self._draw_inputs(cells)
        self.draw_field(cells)

    def _title(self, cells: int) -> Row:
        name = self._start.checklist.name if self._start is not None else self.rig.name
        left = row(Span(" Opening  ", "title"), self.chars.clean(name))
        state = Span("calculating  ", "note") if self.calculating else Span("")
        place = f"line {self._at + 1} of {len(self._listed)}" if self._listed else ""
        return ends(left, row(state, Span(place, "dim")), cells - 1, self.chars)

    def _place(self, left: int) -> None:
        """Lines and curve side by side, or one below the other, or the curve alone."""
        body, lines, curve = self.query_one("#body"), self.query_one("#lines", Page), self.query_one("#curve", Page)
        lines.display = not self._wide_curve
        body.styles.layout = "horizontal" if left or self._wide_curve else "vertical"
        lines.styles.width = left or "1fr"
        curve.styles.height = "1fr" if left or self._wide_curve else "auto"

    def _draw_lines(self, cells: int) -> None:
        if self._shot is None:
            self.put("lines", self._nothing(cells))
            return
        rows, first, last = line_rows(
            self._shot, self._listed, self._at, stale=self.calculating, cells=cells - 1, chars=self.chars
        )
        page = self.put("lines", [row(" ", *line) for line in rows], more=self.key_text("opening.page_down"), keep=True)
        if self._drawn != (self._at, len(rows)):
            page.reveal(last)
            page.reveal(first)
        self._drawn = self._at, len(rows)

    def _nothing(self, cells: int) -> Rows:
        if not self._problems:
            return [row(Span(" calculating", "note"))]
        title = "No result with these values" if self._start is not None else "This rig can't be read"
        rows: list[Row] = [row(Span(f" {title}", "fail")), EMPTY]
        for problem in self._problems:
            rows += [row(" ", *line) for line in paragraph(self.chars.clean(problem), cells - 1, indent="  ")]
        return rows

    @property
    def _limited(self) -> Finding | None:
        found = self._start.checklist.findings if self._start is not None else ()
        return next((one for one in found if one.key == "opening.load_factor"), None)

    def _draw_curve(self, cells: int, height: int, *, both: bool) -> None:
        """The curve with its numbers; where there is no room for it, its numbers alone."""
        if self._shot is None or self._filed is None:
            self.put("curve", self._nothing(cells) if self._wide_curve else [])
            return
        moved = bool(self.changes)
        seen = Seen(self._shot, self._filed, self._plot, self._limited, moved=moved, stale=self.calculating)
        rows: list[Row] = []
        if self._wide_curve and self._listed:
            here = self._listed[self._at]
            text = f"{self._at + 1} {here.title}: {here.value}" + (f", {here.second}" if here.second else "")
            rows.append(row(Span(clip(self.chars.clean(text), cells, self.chars), "title")))
        if both or self._wide_curve:
            rows += curve_rows(seen, cells, height - len(rows), self.chars, flowing=self._wide_curve)
        else:
            rows += said_rows(seen, cells, self.chars, flowing=True, legend=False)
        self.put("curve", [row(" ", *line) for line in rows], more=self.key_text("opening.page_down"), keep=True)

    def _draw_inputs(self, cells: int) -> None:
        moves, system = self._moves, self.slate.system
        one = moves.input
        step = "no input can be moved"
        if one is not None:
            size = step_text(one, system, big=moves.big)
            switch = f"{self.key_text('opening.big')} {'smaller' if moves.big else 'bigger'}"
            step = f"input {moves.chosen + 1} of {len(moves.inputs)}, step {size}, {switch}"
        label = f"{self.chars.rule} {self.chars.own(step)} "
        moved = f" {len(self.changes)} moved " if self.changes else ""
        tail = self.chars.rule * max(cells - len(label) - len(moved), 0)
        self.put("foot-rule", [row(Span(label, "title"), Span(tail, "rule"), Span(moved, "key"))])
        height = 4 if self.size.height >= _TALL else 3
        first = max(0, min(moves.chosen - 1, len(moves.inputs) - height + 1))
        shown = list(enumerate(moves.inputs))[first : first + height - 1]
        rows = [
            moved_row(
                found.name, found.text(moves.value(found), system), found.text(found.value, system),
                here=number == moves.chosen, moved=moves.is_moved(found), cells=cells - 1, chars=self.chars,
            )
            for number, found in shown
        ]  # fmt: skip
        rows += [EMPTY] * (height - 1 - len(rows))
        caution = next((text for text in CAUTIONS if len(text) < cells), CAUTIONS[-1])
        rows.append(row(Span(f" {caution}", "note")))
        page = self.put("inputs", rows)
        page.styles.height = height

    # -- keys

    def action_next_line(self, by: int) -> None:
        """Open the next line, or the one before."""
        at = max(0, min(self._at + by, len(self._listed) - 1))
        if at == self._at or not self._listed:
            said = "That is the last line." if by > 0 else "That is the first line."
            if not self._listed:
                said = "Still calculating." if self.calculating else "There are no lines."
            self.say(said, "dim")
            return
        self._at = at
        self.hush()
        self.draw()

    def action_edge(self, direction: int) -> None:
        """Open the first or last line."""
        self._at = 0 if direction < 0 else max(len(self._listed) - 1, 0)
        self.hush()
        self.draw()

    def action_page(self, direction: int) -> None:
        """Move the lines, or the words under a wide curve."""
        self.query_one("#curve" if self._wide_curve else "#lines", Page).scroll_page(direction)

    def action_choose(self, by: int) -> None:
        """Choose another input."""
        self._moves.choose(by)
        self.hush()
        self.draw()

    def action_change(self, direction: int) -> None:
        """Move the chosen input by a step."""
        self.hush()
        if self._start is None or self._moves.input is None:
            self.say("Still calculating." if self._opening else "No input can be moved.")
        elif self._moves.change(direction, self.slate.system):
            self._ask()
        else:
            self.say("That is as far as this input goes.", "dim")

    def action_big(self) -> None:
        """Switch between plain and big steps."""
        self._moves.big = not self._moves.big
        self.hush()
        self.draw()

    def action_put_back(self) -> None:
        """Put all inputs back to the file's values."""
        if self._moves.put_back():
            self.say("All inputs are as in the file.", "dim")
            self._ask()
        else:
            self.say("Nothing is moved.", "dim")

    def action_whole_width(self) -> None:
        """Give the curve the whole width, or take it back."""
        self._wide_curve = not self._wide_curve
        self.hush()
        self.draw()

    def action_plot(self) -> None:
        """Show the next plot."""
        self._plot = (self._plot + 1) % len(PLOTS)
        self.say(f"Curve: {PLOTS[self._plot]}.", "dim")
