"""What every screen shares: bindings from the command list, footer, messages, and the word about small windows."""

from __future__ import annotations

from collections.abc import Iterator
from pathlib import Path
from typing import TYPE_CHECKING, ClassVar, cast

from textual import events
from textual.app import ComposeResult
from textual.binding import Binding, BindingType
from textual.screen import Screen
from textual.widget import Widget

from tui import terminal
from tui.commands import on_screen
from tui.glyphs import Charset
from tui.messages import Remedied, Worked, Written
from tui.rows import Rows, Tone, paragraph, row
from tui.widgets.footer import footer
from tui.widgets.page import Page

if TYPE_CHECKING:
    from tui.app import RigslateApp

_NARROW = 72


def bindings(kind: str) -> list[BindingType]:
    """The bindings of a screen, from the command list."""
    return [
        Binding(",".join(command.keys), command.action, command.name, show=False, id=command.id,
                priority=command.fixed, tooltip=command.help)
        for command in on_screen(kind)
    ]  # fmt: skip


class BaseScreen(Screen[None], inherit_bindings=False):
    """A screen drawn from rows."""

    AUTO_FOCUS = ""
    KIND: ClassVar[str] = ""

    def __init__(self) -> None:
        """Start without a message."""
        super().__init__()
        self._message: tuple[str, Tone] = ("", "text")
        self._drawing = False

    @property
    def slate(self) -> RigslateApp:
        """The app, with its own type."""
        return cast("RigslateApp", self.app)

    @property
    def chars(self) -> Charset:
        """The charset picked."""
        return self.slate.chars

    def compose(self) -> ComposeResult:
        """The screen's own panes, then messages, footer and the word about small windows."""
        yield from self.panes()
        yield Page(id="say")
        yield from self.below()
        yield Page(id="foot")
        yield Page(id="small")

    def panes(self) -> Iterator[Widget]:
        """The panes above the message line."""
        yield from ()

    def below(self) -> Iterator[Widget]:
        """What stands between the message line and the footer."""
        yield from ()

    def check_action(self, action: str, parameters: tuple[object, ...]) -> bool | None:
        """Nothing but leaving acts while the window is too small to show what happens."""
        return action == "quit" or not self.has_class("-small")

    # -- drawing

    def draw(self) -> None:
        """Draw everything anew."""
        cells = self.size.width
        if not cells or not self.is_attached:
            return
        warning = terminal.too_small(self.size.width, self.size.height)
        self.set_class(warning is not None, "-small")
        if warning is not None:
            self.put("small", paragraph(self.chars.own(warning), cells, "note"))
            return
        self.set_class(cells < _NARROW, "-narrow")
        self.draw_panes(cells)
        self.draw_message(cells)
        self.put("foot", [footer(self.footer_entries(), cells)])

    def footer_entries(self) -> list[tuple[str, str]]:
        """Key and word of the footer's entries."""
        return self.slate.keys.footer(self.KIND)

    def draw_panes(self, cells: int) -> None:
        """Draw the screen's own panes."""

    def draw_message(self, cells: int) -> None:
        """Draw the message line."""
        text, tone = self._message
        rows = paragraph(self.chars.clean(text), cells - 1, tone) if text else []
        self.put("say", [row(" ", *line) for line in rows])

    def put(self, pane: str, rows: Rows, *, more: str = "", keep: bool = False) -> Page:
        """Show rows in a pane."""
        page = self.query_one(f"#{pane}", Page)
        page.show(rows, chars=self.chars, look=self.slate.look, more=more, keep=keep)
        return page

    @property
    def about_to_draw(self) -> bool:
        """Whether a drawing is on its way."""
        return self._drawing

    def draw_soon(self) -> None:
        """Draw within a moment; several requests make one drawing."""
        if not self._drawing:
            self._drawing = True
            self.set_timer(0.03, self._draw_now)

    def _draw_now(self) -> None:
        self._drawing = False
        self.draw()

    def on_page_resized(self) -> None:
        """Make the rows for the new size."""
        if not self._drawing:
            self._drawing = True
            self.call_after_refresh(self._draw_now)

    def on_screen_resume(self, _: events.ScreenResume) -> None:
        """Show what changed while another screen was in front."""
        self.draw()

    def say(self, text: str, tone: Tone = "note") -> None:
        """Show a message until the next key."""
        self._message = (text, tone)
        self.draw_soon()

    def hush(self) -> None:
        """Take the message away."""
        self._message = ("", "text")

    # -- what the app tells

    def rig_changed(self, rig: Path) -> None:
        """A rig has a new result, or one is under way."""

    def shelf_changed(self) -> None:
        """Rigs were found, or are gone."""

    def remedied(self, message: Remedied) -> None:
        """What would make a step pass is worked out."""

    def worked(self, message: Worked) -> None:
        """The lines of a working are made."""

    def written(self, message: Written) -> None:
        """An answer was written, or could not be."""

    def units_changed(self) -> None:
        """Another unit system was picked."""

    # -- commands of every screen

    def key_text(self, command: str) -> str:
        """The key of a command as shown."""
        return self.slate.keys.text(command)

    def action_back(self) -> None:
        """Leave this screen."""
        if len(self.slate.screen_stack) > 1:
            self.slate.pop_screen()
        else:
            self.say(f"This is the first screen; {self.key_text('app.quit')} leaves the program.")

    def action_units(self) -> None:
        """Go on to the next unit system."""
        self.slate.next_units()

    def action_glyphs(self) -> None:
        """Switch between full glyphs and ASCII."""
        self.slate.switch_glyphs()

    def action_light(self) -> None:
        """Switch between light and dark."""
        self.slate.switch_theme()

    def action_help(self) -> None:
        """Show the keys."""
        from tui.screens.help import HelpScreen

        self.slate.push_screen(HelpScreen(self.KIND))

    def action_palette(self) -> None:
        """Show the commands of this screen."""
        from tui.screens.palette import PaletteScreen

        self.slate.push_screen(PaletteScreen(self))

    def action_quit(self) -> None:
        """Leave the program."""
        self.slate.exit(0)
