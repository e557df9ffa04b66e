"""A field for one line of text."""

from __future__ import annotations

from typing import ClassVar

from textual import events
from textual.binding import Binding, BindingType
from textual.widgets import Input


class Field(Input, inherit_bindings=False):
    """An input of one line, with editing keys that every terminal and multiplexer passes on."""

    BINDINGS: ClassVar[list[BindingType]] = [
        Binding("left", "cursor_left", "Left", show=False, id="field.left"),
        Binding("right", "cursor_right", "Right", show=False, id="field.right"),
        Binding("home", "home", "Start", show=False, id="field.home"),
        Binding("end", "end", "End", show=False, id="field.end"),
        Binding("backspace", "delete_left", "Delete left", show=False, id="field.backspace"),
        Binding("delete", "delete_right", "Delete right", show=False, id="field.delete"),
        Binding("enter", "submit", "Take it", show=False, id="field.enter"),
    ]

    def __init__(self, *, id: str | None = None, max_length: int = 0) -> None:  # noqa: A002
        """Make an empty field of one row; 0 is no greatest length."""
        super().__init__(compact=True, select_on_focus=False, id=id, max_length=max_length)
        # A steady cursor: blinking tells nothing and costs repaints.
        self.cursor_blink = False

    def check_action(self, action: str, parameters: tuple[object, ...]) -> bool | None:
        """No editing and no Enter while the window is too small to show the field."""
        return not self._unseen

    def on_key(self, event: events.Key) -> None:
        """Take no letter while the window is too small to show it."""
        self._pass_over(event)

    def on_paste(self, event: events.Paste) -> None:
        """Take no pasted text while the window is too small to show it."""
        self._pass_over(event)

    @property
    def _unseen(self) -> bool:
        return self.screen.has_class("-small")

    def _pass_over(self, event: events.Event) -> None:
        if self._unseen:
            event.prevent_default()
            event.stop()
