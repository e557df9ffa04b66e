"""The lines behind a number."""

from __future__ import annotations

from pathlib import Path
from typing import TYPE_CHECKING

from tui.commands import WORKING
from tui.messages import Worked
from tui.rows import Row, Rows, Span, ends, row
from tui.screens.base import bindings
from tui.screens.text import TextScreen

if TYPE_CHECKING:
    from model.checks.finding import Checklist, Finding


class WorkingScreen(TextScreen):
    """The working of one step as lines of text."""

    BINDINGS = bindings(WORKING)
    KIND = WORKING

    def __init__(self, rig: Path, key: str) -> None:
        """Show the working of a step of a rig."""
        super().__init__()
        self._rig = rig
        self._key = key
        self._lines: tuple[str, ...] = ()
        self._request = 0
        self._note = "calculating"

    def on_mount(self) -> None:
        """Have the lines made."""
        self._ask()

    def _ask(self) -> None:
        """Have the lines made for what the rig is now."""
        self._lines = ()
        self._note = "calculating"
        self._request += 1
        if self.slate.book.under_way(self._rig):
            return
        checklist, finding = self._checklist, self._finding
        if checklist is None or finding is None or finding.result is None:
            self._note = "there is no number to work out now"
            return
        self.slate.ask_working(self._request, checklist, finding)

    @property
    def _checklist(self) -> Checklist | None:
        entry = self.slate.shelf.entries.get(self._rig)
        return entry.checklist if entry is not None else None

    @property
    def _finding(self) -> Finding | None:
        checklist = self._checklist
        return next((one for one in checklist.findings if one.key == self._key), None) if checklist else None

    def worked(self, message: Worked) -> None:
        """Show the lines, if they are the latest asked for."""
        if message.request == self._request:
            self._lines, self._note = message.lines, ""
            self.draw_soon()

    def rig_changed(self, rig: Path) -> None:
        """Another result: other lines."""
        if rig == self._rig:
            self._ask()
            self.draw_soon()

    def units_changed(self) -> None:
        """Lines in another unit."""
        self._ask()

    def title_row(self, cells: int) -> Row:
        """Which step it is."""
        right = row(Span(f"{self.chars.clean(self._rig.name)} ", "dim"))
        return ends(row(Span(f" Working of {self.chars.clean(self._key)}", "title")), right, cells, self.chars)

    def text_rows(self, cells: int) -> Rows:
        """The lines."""
        from tui.views.working import result_rows, working_rows

        finding = self._finding
        if finding is None or self.slate.book.under_way(self._rig):
            return [row(Span(self._note, "note"))]
        head = result_rows(finding, self.slate.system, cells, self.chars)
        if not self._lines:
            return [*head, row(Span(self._note, "note"))]
        return [*head, *working_rows(self._lines, cells, self.chars)]
