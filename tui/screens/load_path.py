"""The load path on one page: where the load would part first."""

from __future__ import annotations

from dataclasses import dataclass
from pathlib import Path

from textual.message import Message

from model.quantity import UnitSystem
from model.report.load_path import load_path_lines
from tui.caution import CAUTION
from tui.commands import LOAD_PATH
from tui.rows import EMPTY, Row, Rows, Span, ends, paragraph, row
from tui.screens.base import bindings
from tui.screens.text import TextScreen
from tui.views.load_path import load_path_rows
from tui.workers import unexpected


@dataclass
class PathFound(Message):
    """The lines of the load path, with the number of the request and the width they are made for."""

    request: int
    lines: tuple[str, ...]
    problem: str = ""


class LoadPathScreen(TextScreen):
    """Every part from the load up, with its load, strength and factor."""

    BINDINGS = bindings(LOAD_PATH)
    KIND = LOAD_PATH

    def __init__(self, rig: Path) -> None:
        """Show the load path of a rig."""
        super().__init__()
        self._rig = rig
        self._request = 0
        self._asked: tuple[object, int, UnitSystem] | None = None
        self._lines: tuple[str, ...] = ()
        self._note = "calculating"

    def draw_panes(self, cells: int) -> None:
        """Have the lines made for this width and these units, and draw what there is."""
        self._ask(cells - 2)
        super().draw_panes(cells)

    def _ask(self, cells: int) -> None:
        entry = self.slate.shelf.entries.get(self._rig)
        checklist = entry.checklist if entry is not None else None
        if checklist is None or self.slate.book.under_way(self._rig):
            self._request += 1
            self._asked, self._lines = None, ()
            problems = entry.problems if entry is not None and not self.slate.book.under_way(self._rig) else ()
            self._note = "; ".join(problems) or "calculating"
            return
        wanted = (checklist, cells, self.slate.system)
        if self._asked is not None and self._asked[0] is checklist and self._asked[1:] == wanted[1:]:
            return
        self._asked, self._lines, self._note = wanted, (), "calculating"
        self._request += 1
        request, case, system = self._request, checklist.details, self.slate.system

        def work() -> None:
            try:
                message = PathFound(request, tuple(load_path_lines(case, system, cells)))
            except Exception as error:
                message = PathFound(request, (), unexpected(error))
            self.post_message(message)

        self.slate.run_worker(work, thread=True, group="load path", exit_on_error=False)

    def on_path_found(self, message: PathFound) -> None:
        """Show the lines, if they are the latest asked for."""
        if message.request == self._request:
            self._lines, self._note = message.lines, message.problem
            self.draw_soon()

    def rig_changed(self, rig: Path) -> None:
        """Another result: other lines."""
        if rig == self._rig:
            self.draw_soon()

    def title_row(self, cells: int) -> Row:
        """Which rig it is."""
        right = row(Span(f"{self.chars.clean(self._rig.name)} ", "dim"))
        return ends(row(Span(" Load path", "title")), right, cells, self.chars)

    def text_rows(self, cells: int) -> Rows:
        """The lines, and that they are an estimate."""
        if not self._lines:
            return paragraph(self.chars.clean(self._note), cells, "note")
        return [*load_path_rows(self._lines, cells, self.chars), EMPTY, *paragraph(CAUTION, cells, "note")]
