"""Screens that are one page of lines."""

from __future__ import annotations

from collections.abc import Iterator

from textual.widget import Widget

from tui.rows import Row, Rows, Span, row
from tui.screens.base import BaseScreen
from tui.widgets.page import Page


class TextScreen(BaseScreen):
    """One page of lines, moved by arrows and paging keys."""

    def panes(self) -> Iterator[Widget]:
        """A title and the lines."""
        yield Page(id="columns")
        yield Page(id="rule")
        yield Page(id="middle")

    def title_row(self, cells: int) -> Row:
        """The line at the top."""
        return row()

    def text_rows(self, cells: int) -> Rows:
        """The lines."""
        return []

    def draw_panes(self, cells: int) -> None:
        """Draw title and lines."""
        self.put("columns", [self.title_row(cells)])
        self.put("rule", [row(Span(self.chars.rule * cells, "rule"))])
        rows = [row(" ", *line) for line in self.text_rows(cells - 2)]
        self.put("middle", rows, more=self.key_text("page.down"), keep=True)

    @property
    def page(self) -> Page:
        """The page of lines."""
        return self.query_one("#middle", Page)

    def action_line(self, by: int) -> None:
        """Move by a line."""
        self.hush()
        if not self.page.scroll_by(by):
            self.say("That is the last line." if by > 0 else "That is the first line.", "dim")

    def action_page(self, direction: int) -> None:
        """Move by a page."""
        self.page.scroll_page(direction)

    def action_edge(self, direction: int) -> None:
        """Go to the first or last line."""
        self.page.scroll_by(direction * len(self.page.rows))
