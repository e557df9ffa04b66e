"""The checklist, one step in the middle, every step of the rig at the left."""

from __future__ import annotations

from collections.abc import Iterator
from pathlib import Path
from typing import TYPE_CHECKING

from textual.containers import Horizontal
from textual.widget import Widget
from textual.widgets import Input

from tui import stepping
from tui.commands import STEPS
from tui.messages import Remedied
from tui.rows import EMPTY, Row, Rows, Span, paragraph, row
from tui.screens.base import bindings
from tui.screens.behind import BehindScreen
from tui.views.panes import pane_rule
from tui.widgets.page import Page

if TYPE_CHECKING:
    from model.checks.finding import Finding

GONE = "This rig's file is gone from the folder."
NO_STEPS, NO_STEPS_YET = "There are no steps.", "There are no steps yet."
RELEASES_NOTHING = "This releases nothing: local rules and licensed riggers decide."


class StepsScreen(BehindScreen):
    """Steps of one rig, gone through one by one; inspected steps are answered here."""

    BINDINGS = bindings(STEPS)
    KIND = STEPS

    def __init__(self, rig: Path) -> None:
        """Open a rig."""
        super().__init__(rig)
        self._here = 0
        self._last: Finding | None = None
        self._remedies: Remedied | None = None
        self._request = 0

    def panes(self) -> Iterator[Widget]:
        """Header, board and step."""
        yield Page(id="head")
        yield Page(id="rule")
        with Horizontal(id="body"):
            yield Page(id="board")
            yield Page(id="middle")
        yield Page(id="foot-rule")

    def on_mount(self) -> None:
        """Show what is known, and have the checklist made where it is not."""
        self._take_checklist()

    # -- state

    @property
    def findings(self) -> tuple[Finding, ...]:
        """The steps."""
        return self._checklist.findings if self._checklist is not None else ()

    @property
    def finding(self) -> Finding | None:
        """The step shown."""
        return self.findings[self._here] if self._here < len(self.findings) else None

    def rig_changed(self, rig: Path) -> None:
        """Take a new result of this rig; the step shown stays the one shown."""
        if rig == self.rig:
            self._take_checklist()
            self.draw_soon()

    def shelf_changed(self) -> None:
        """Stay with the rig, or say that its file is gone."""
        if self.rig in self.slate.shelf.entries:
            self._take_checklist()
        else:
            self._checklist = None
            self._drop_draft()
            self.say(GONE, "fail")
        self.draw_soon()

    def _take_checklist(self) -> None:
        entry = self.slate.shelf.entries.get(self.rig)
        if self.under_way or entry is None:
            return
        self._last = self.finding or self._last
        if entry.checklist is None:
            if entry.problems:
                self._checklist = None
            elif entry.summary is not None:
                self.slate.check([self.rig])
            return
        if entry.checklist is self._checklist:
            return
        self._checklist = entry.checklist
        if self._message[0] in (GONE, NO_STEPS, NO_STEPS_YET):
            self.hush()
        self._answered.clear()
        keys = [finding.key for finding in self.findings]
        last = self._last
        self._here = keys.index(last.key) if last is not None and last.key in keys else stepping.first(self.findings)
        asked = self.finding.inspection if self.finding is not None else None
        if self._draft is not None and (last is None or asked != last.inspection):
            self._drop_draft()
            self.say("This step has changed; the answer was dropped, nothing was written.")
        self._ask_remedies()

    def _ask_remedies(self) -> None:
        """Have what would pass worked out for a failing step; what was shown for another one goes."""
        self._remedies = None
        finding = self.finding
        if finding is not None and finding.verdict == "FAIL" and finding.inspection is None and not self.under_way:
            self._request += 1
            self.slate.ask_remedies(self._request, finding)

    def remedied(self, message: Remedied) -> None:
        """Show what would pass, if it is for the step shown."""
        if message.request == self._request:
            self._remedies = message
            if message.problem:
                self.say(f"What would pass is not known: {message.problem}")
            self.draw_soon()

    def units_changed(self) -> None:
        """Numbers in another unit."""
        self._ask_remedies()

    # -- drawing

    def draw_panes(self, cells: int) -> None:
        """Draw header, board and step."""
        board = 20 if cells < 72 else 25
        self.put("rule", [pane_rule([(1, "steps", board), (2, "this step", cells - board)], self._pane, self.chars)])
        self._draw_head(cells)
        self._draw_board(board)
        more = self.key_text("page.down")
        self.put("middle", self._middle(cells - board - 1), more=more, keep=True)
        name = (3, "answer", cells) if self.finding is not None and self.finding.inspection else (0, "", cells)
        self.put("foot-rule", [pane_rule([name], self._pane, self.chars)])
        self._draw_field(cells)

    def _draw_head(self, cells: int) -> None:
        # The views of a step need the model's numbers; they are loaded once there is a checklist.
        if self._checklist is None:
            name = self.chars.clean(self.rig.name)
            self.put("head", [row(Span(name, "title")), row(Span(self._state(), "note"))])
            return
        from tui.views import step as view

        under_way = self.under_way
        self.put("head", view.head(self._checklist, self._here, under_way=under_way, cells=cells, chars=self.chars))

    def _state(self) -> str:
        entry = self.slate.shelf.entries.get(self.rig)
        if entry is None and self.slate.shelf.entries:
            return GONE
        return "can't be read" if entry is not None and entry.problems and not self.under_way else "calculating"

    def _draw_board(self, cells: int) -> None:
        if self._checklist is None:
            self.put("board", [])
            return
        from tui.views import step as view

        rows, current = view.board_rows(
            self._checklist, self._here, self._answered, under_way=self.under_way, cells=cells - 1, chars=self.chars
        )
        page = self.put("board", rows, keep=True)
        page.reveal(current)

    def _middle(self, cells: int) -> Rows:
        if self._checklist is None:
            return self._no_checklist(cells)
        from tui.views import step as view

        finding = self.finding
        if finding is None:
            return paragraph("This rig has no steps.", cells)
        remedies = self._remedies.remedies if self._remedies is not None else None
        return view.step_rows(
            finding, self.slate.system, remedies, under_way=self.under_way, cells=cells, chars=self.chars
        )

    def _no_checklist(self, cells: int) -> Rows:
        entry = self.slate.shelf.entries.get(self.rig)
        if entry is None or self.under_way or not entry.problems:
            return []
        rows: list[Row] = [row(Span("This rig can't be read", "fail")), EMPTY]
        for problem in entry.problems:
            rows += [*paragraph(self.chars.clean(problem), cells, indent="  "), EMPTY]
        return rows + paragraph("It is read again as soon as the file is saved.", cells, "dim")

    # -- moving

    def _go(self, here: int) -> None:
        if self._draft is not None:
            self.say(f"An answer is chosen: Enter goes on with it, {self.key_text('app.back')} drops it.")
            return
        self.hush()
        self._written = None
        if here != self._here:
            self._here = here
            self.query_one("#middle", Page).scroll_by(-(10**6))
            self._ask_remedies()
        self.draw()

    def action_move(self, by: int) -> None:
        """Go to the step before or after; in the middle pane, move its lines."""
        if self._pane == 2:
            self.query_one("#middle", Page).scroll_by(by)
            return
        self._go(stepping.step(self.findings, self._here, by))

    def action_move_group(self, by: int) -> None:
        """Go to the group before or after."""
        self._go(stepping.step_group(self.findings, self._here, by) if self.findings else 0)

    def action_page(self, direction: int) -> None:
        """Move the lines of the step."""
        self.query_one("#middle", Page).scroll_page(direction)

    def action_edge(self, direction: int) -> None:
        """Go to the first or last step."""
        self._go(stepping.step(self.findings, self._here, direction * len(self.findings)))

    def action_enter(self) -> None:
        """Write a chosen answer, or go to the next open step."""
        finding = self.finding
        inspected = finding is not None and finding.inspection is not None
        if self._writing or (inspected and self.slate.repeated):
            return
        if self._asking is not None:
            # The field was left by Tab: back to it, with what was typed.
            self.action_pane(3)
            return
        if self._draft is not None:
            self._go_on()
            return
        self.next_open()

    def next_open(self) -> None:
        """Go to the next open step."""
        found = stepping.next_open(self.findings, self._here, self._answered) if self.findings else None
        if found is not None:
            self._go(found)
            return
        self._written = None
        here = self.finding
        if here is None:
            self.say(NO_STEPS_YET if self.under_way else NO_STEPS)
        elif stepping.is_open(here, self._answered):
            self.say("This is the only open step.")
        else:
            failing = [finding.key for finding in self.findings if finding.verdict == "FAIL"]
            self.say(
                f"No step is open; failing: {', '.join(failing)}." if failing
                else f"No step is open. {RELEASES_NOTHING}"
            )

    def action_pane(self, number: int) -> None:
        """Jump to a pane."""
        if number == 3 and not (self.finding is not None and self.finding.inspection):
            self.say("This step is computed; there is nothing to answer.")
            return
        self._pane = number
        self.hush()
        field = self.query_one(Input)
        if number == 3 and self._asking is not None:
            self.set_focus(field)
        else:
            self.set_focus(None)
        self.draw()

    def action_next_pane(self, by: int) -> None:
        """Go to the next pane."""
        last = 3 if self.finding is not None and self.finding.inspection else 2
        self.action_pane((self._pane - 1 + by) % last + 1)

    def action_back(self) -> None:
        """Drop a chosen answer; else leave the screen."""
        if self._draft is not None and not self._writing:
            self._drop_draft()
            self.say("Dropped; nothing was written.")
            return
        super().action_back()

    def action_next_rig(self) -> None:
        """Open the next rig that is not PASS."""
        found = self.slate.shelf.next_not_pass(self.rig)
        if self._draft is not None:
            self._go(self._here)
        elif found is None or found == self.rig:
            self.say("No other rig is known that is not PASS.")
        elif self.slate.shelf.entries[found].no_rig:
            self.say(f"{found.name} can't be read: {self.slate.shelf.entries[found].problems[0]}")
        else:
            self.slate.open_rig(found, instead=True)
