"""The shelf: all rig files of a folder, with what they come to."""

from __future__ import annotations

from collections.abc import Iterator
from pathlib import Path

from textual.widget import Widget

from tui.commands import RIGS
from tui.rows import Row, Rows, Span, paragraph, row
from tui.screens.base import BaseScreen, bindings
from tui.shelf import Entry
from tui.views import rigs as view
from tui.views.panes import pane_rule
from tui.widgets.page import Page


class RigsScreen(BaseScreen):
    """Rigs by path, each with verdict, least margin and signatures."""

    BINDINGS = bindings(RIGS)
    KIND = RIGS

    def __init__(self) -> None:
        """Start at the first rig."""
        super().__init__()
        self._here: Path | None = None
        self._top = 0
        self._pane = 1

    def panes(self) -> Iterator[Widget]:
        """Title and counts, the shelf, the marked rig."""
        yield Page(id="head")
        yield Page(id="rule")
        yield Page(id="columns")
        yield Page(id="middle")
        yield Page(id="foot-rule")
        yield Page(id="detail")

    @property
    def entries(self) -> list[Entry]:
        """The rigs in order."""
        return self.slate.shelf.rows

    @property
    def here(self) -> Entry | None:
        """The marked rig."""
        entries = self.slate.shelf.entries
        if self._here not in entries:
            self._here = next(iter(entries), None)
        return entries.get(self._here) if self._here is not None else None

    def _place(self) -> int:
        return list(self.slate.shelf.entries).index(self._here) if self.here is not None and self._here else 0

    # -- drawing

    def draw_panes(self, cells: int) -> None:
        """Draw the shelf."""
        chars, entries = self.chars, self.entries
        self.put("head", view.head(str(self.slate.root), entries, self.slate.book.left, cells, chars))
        self.put("columns", [view.column_heads(cells, chars)])
        shelf = self._shelf(cells)
        self.put("middle", shelf)
        self.put("rule", [pane_rule([(1, self._in_sight(len(shelf)), cells)], self._pane, chars)])
        self.put("foot-rule", [pane_rule([(2, "this rig", cells)], self._pane, chars)])
        here = self.here
        under_way = here is not None and self.slate.book.under_way(here.path)
        rows = view.detail(here, under_way=under_way, cells=cells - 1, chars=chars)
        more = self.key_text("page.down") if self._pane == 2 else f"{self.key_text('pane.second')}, then page down"
        self.put("detail", [row(" ", *line) for line in rows], more=more, keep=True)

    def _shelf(self, cells: int) -> Rows:
        """The rows in sight; the others are not made."""
        height = self.query_one("#middle", Page).size.height
        entries = self.entries
        if not entries:
            return self._empty(cells)
        here = self._place()
        self._top = max(min(self._top, here, len(entries) - height), here - height + 1, 0)
        shown = entries[self._top : self._top + height]
        self.slate.book.prefer([entry.path for entry in ([self.here] if self.here else []) + shown])
        rows: list[Row] = []
        for entry in shown:
            under_way = self.slate.book.under_way(entry.path)
            marked = entry.path == self._here
            rows.append(view.shelf_row(entry, here=marked, under_way=under_way, cells=cells, chars=self.chars))
        return rows

    def _in_sight(self, shown: int) -> str:
        """The title of the shelf, with which rigs are in sight where not all are."""
        count = len(self.entries)
        return "rigs" if shown >= count else f"rigs {self._top + 1} to {self._top + shown} of {count}"

    def _empty(self, cells: int) -> Rows:
        if self.slate.folder_problems:
            rows: list[Row] = []
            for problem in self.slate.folder_problems:
                rows += paragraph(self.chars.clean(problem), cells - 2, "fail")
            return [row(" ", *line) for line in rows]
        return [row(Span(" reading the folder", "dim"))]

    # -- what the app tells

    def rig_changed(self, rig: Path) -> None:
        """Draw again before long."""
        self.draw_soon()

    def shelf_changed(self) -> None:
        """Draw the new rows."""
        self.draw()

    # -- commands

    def _mark(self, place: int) -> None:
        entries = self.entries
        self.hush()
        if entries:
            self._here = entries[max(0, min(place, len(entries) - 1))].path
            self.query_one("#detail", Page).scroll_by(-(10**6))
        self.draw()

    def action_move(self, by: int) -> None:
        """Mark the rig above or below; in the lower pane, move its lines."""
        if self._pane == 2:
            self.query_one("#detail", Page).scroll_by(by)
            return
        self._mark(self._place() + by)

    def action_page(self, direction: int) -> None:
        """Move by a page."""
        if self._pane == 2:
            self.query_one("#detail", Page).scroll_page(direction)
            return
        height = max(self.query_one("#middle", Page).size.height - 1, 1)
        self._mark(self._place() + direction * height)

    def action_edge(self, direction: int) -> None:
        """Mark the first or last rig."""
        self._mark(0 if direction < 0 else len(self.entries))

    def action_open(self) -> None:
        """Open the marked rig."""
        here = self.here
        if here is None:
            self.say("There is no rig to open.")
        elif here.no_rig:
            self.say("This file is no rig; its message stands in pane 2.")
        else:
            self.slate.open_rig(here.path)

    def action_next_rig(self) -> None:
        """Mark the next rig that is not PASS."""
        after = self.here.path if self.here else None
        found = self.slate.shelf.next_not_pass(after)
        if found is None:
            left = self.slate.book.left
            self.say("No rig but PASS so far; some are still calculating." if left else "Every rig is PASS.")
            return
        self._mark(list(self.slate.shelf.entries).index(found))
        if found == after:
            self.say("This is the only rig that is not PASS.")

    def action_pane(self, number: int) -> None:
        """Jump to a pane."""
        self._pane = number
        self.hush()
        self.draw()

    def action_next_pane(self, by: int) -> None:
        """Go to the other pane."""
        self.action_pane(3 - self._pane)
