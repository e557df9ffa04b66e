"""The keys."""

from __future__ import annotations

from tui.commands import HELP
from tui.rows import Row, Rows, Span, ends, row
from tui.screens.base import bindings
from tui.screens.text import TextScreen
from tui.views.help import help_rows


class HelpScreen(TextScreen):
    """All keys, those of the screen it was asked from first."""

    BINDINGS = bindings(HELP)
    KIND = HELP

    def __init__(self, asked_from: str) -> None:
        """Note the screen it was asked from."""
        super().__init__()
        self._asked_from = asked_from

    def title_row(self, cells: int) -> Row:
        """The title."""
        back = f"{self.key_text('app.back')} goes back"
        return ends(row(Span(" Keys", "title")), row(Span(f"{back} ", "dim")), cells, self.chars)

    def text_rows(self, cells: int) -> Rows:
        """The keys."""
        return help_rows(self._asked_from, self.slate.keys, cells, self.chars)

    def action_help(self) -> None:
        """Leave again; the key that opened it closes it."""
        self.action_back()
