"""Commands found by a word."""

from __future__ import annotations

from collections.abc import Iterator

from textual.widget import Widget
from textual.widgets import Input

from tui.commands import PALETTE, Command, on_screen
from tui.glyphs import clip, fill
from tui.rows import Row, Rows, Span, row
from tui.screens.base import BaseScreen, bindings
from tui.views.help import matches
from tui.widgets.field import Field
from tui.widgets.page import Page

_NOT_LISTED = frozenset(("app.palette",))


class PaletteScreen(BaseScreen):
    """A field and the commands that match it; Enter runs the marked one."""

    AUTO_FOCUS = "Input"
    BINDINGS = bindings(PALETTE)
    KIND = PALETTE

    def __init__(self, asked_from: BaseScreen) -> None:
        """Note the screen whose commands are listed and run."""
        super().__init__()
        self._asked_from = asked_from
        self._here = 0
        self._words = ""

    def panes(self) -> Iterator[Widget]:
        """A title, the field, the commands."""
        yield Page(id="columns")
        yield Field(id="words")
        yield Page(id="rule")
        yield Page(id="middle")

    @property
    def listed(self) -> list[Command]:
        """The commands that match."""
        return [
            command for command in on_screen(self._asked_from.KIND)
            if command.id not in _NOT_LISTED and matches(command, self._words)
        ]  # fmt: skip

    def draw_panes(self, cells: int) -> None:
        """Draw the commands."""
        self.put("columns", [row(Span(" Find a command: type a part of its name", "title"))])
        self.put("rule", [row(Span(self.chars.rule * cells, "rule"))])
        page = self.put("middle", self._rows(cells), keep=True)
        page.reveal(self._here)

    def _rows(self, cells: int) -> Rows:
        listed = self.listed
        self._here = max(0, min(self._here, len(listed) - 1))
        if not listed:
            return [row(Span("  No command of this name here.", "note"))]
        return [self._row(command, number == self._here, cells) for number, command in enumerate(listed)]

    def _row(self, command: Command, here: bool, cells: int) -> Row:
        key = fill(self.slate.keys.all_text(command), 16, self.chars)
        name = clip(command.name, cells - 20, self.chars)
        mark = f"{self.chars.here} " if here else "  "
        return row(Span(mark, "title"), Span(key, "key"), "  ", Span(name, "title" if here else "text"))

    def on_input_changed(self, event: Input.Changed) -> None:
        """List what matches the words."""
        self._words, self._here = event.value, 0
        self.draw()

    def on_input_submitted(self) -> None:
        """Enter in the field runs the marked command."""
        self.action_run()

    def action_line(self, by: int) -> None:
        """Mark the command above or below."""
        self._here = max(0, min(self._here + by, len(self.listed) - 1))
        self.draw()

    def action_run(self) -> None:
        """Go back and run the marked command."""
        listed = self.listed
        if not listed:
            self.say("No command matches; change the words, or go back with escape.")
            return
        chosen, screen = listed[self._here], self._asked_from
        self.slate.pop_screen()
        screen.hush()
        screen.call_after_refresh(screen.run_action, chosen.action)
