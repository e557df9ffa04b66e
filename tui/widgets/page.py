"""A pane that shows rows of spans, with a part of them in sight."""

from __future__ import annotations

from rich.segment import Segment
from textual import events
from textual.geometry import Size
from textual.message import Message
from textual.strip import Strip
from textual.widget import Widget

from tui.glyphs import PLAIN, Charset
from tui.rows import EMPTY, Row, Rows, Span, clip_row, row_width
from tui.tones import Look, look

_BARE = look(dark=True, colour=False)


class Page(Widget):
    """Rows of text, each clipped to the pane with a visible sign.

    Where more rows follow than fit, the last line says how many and which key shows them. The owner sets the rows with
    `show` and remakes them when `Resized` arrives.
    """

    class Resized(Message):
        """The pane has another size, its rows have to be made anew."""

    def __init__(self, *, id: str | None = None, classes: str | None = None, focusable: bool = False) -> None:  # noqa: A002
        """Make an empty page.

        Args:
            id: Its id on the screen.
            classes: Its style classes.
            focusable: Whether it is a pane that can be jumped to.
        """
        super().__init__(id=id, classes=classes)
        self.can_focus = focusable
        self._rows: Rows = ()
        self._top = 0
        self._chars: Charset = PLAIN
        self._look: Look = _BARE
        self._more = ""

    def show(self, rows: Rows, *, chars: Charset, look: Look, more: str = "", keep: bool = False) -> None:
        """Show rows.

        Args:
            rows: The rows.
            chars: The charset they are made with.
            look: The style of each tone.
            more: How to see what does not fit, "page down" for example; empty where the owner cuts rows itself.
            keep: Stay at the place scrolled to.
        """
        before = (self._rows, self._chars, self._look, self._more, self._top)
        self._rows, self._chars, self._look, self._more = tuple(rows), chars, look, more
        self._top = min(self._top, self._last_top()) if keep else 0
        if self.styles.auto_dimensions and len(before[0]) != len(self._rows):
            self.refresh(layout=True)
        elif before != (self._rows, self._chars, self._look, self._more, self._top):
            self.refresh()

    def get_content_height(self, container: Size, viewport: Size, width: int) -> int:
        """As high as its rows, where the stylesheet leaves the height open."""
        return len(self._rows)

    def get_content_width(self, container: Size, viewport: Size) -> int:
        """As wide as its widest row, where the stylesheet leaves the width open."""
        return max((row_width(spans) for spans in self._rows), default=0)

    @property
    def rows(self) -> Rows:
        """The rows shown, those out of sight too."""
        return self._rows

    @property
    def top(self) -> int:
        """Number of rows scrolled past."""
        return self._top

    def scroll_by(self, lines: int) -> bool:
        """Move the part in sight; False where there is nothing further."""
        top = max(0, min(self._top + lines, self._last_top()))
        moved = top != self._top
        self._top = top
        if moved:
            self.refresh()
        return moved

    def scroll_page(self, direction: int) -> bool:
        """Move by a page less two lines of overlap."""
        return self.scroll_by(direction * max(self.size.height - 2, 1))

    def reveal(self, place: int) -> None:
        """Bring a row into sight, with one neighbour on each side."""
        height = max(self.size.height, 1)
        top = self._top
        if place - 1 < top:
            top = place - 1
        elif place + 1 >= top + height:
            top = place + 2 - height
        self._top = max(0, min(top, self._last_top()))
        self.refresh()

    def _last_top(self) -> int:
        return max(0, len(self._rows) - self.size.height)

    def on_resize(self, _: events.Resize) -> None:
        """Have the rows made for the new size."""
        self.post_message(self.Resized())

    def render_line(self, y: int) -> Strip:
        """One line of the pane."""
        cells, height = self.size.width, self.size.height
        base = self._look["text"]
        spans = self._line(y, height)
        spans = clip_row(spans, cells, self._chars)
        segments = [Segment(self._chars.own(span.text), self._look[span.tone]) for span in spans]
        missing = cells - row_width(spans)
        if missing > 0:
            segments.append(Segment(" " * missing, base))
        return Strip(segments, cells)

    def _line(self, y: int, height: int) -> Row:
        place = self._top + y
        hidden = len(self._rows) - (self._top + height)
        if self._more and height > 2 and y == height - 1 and hidden > 0:
            return (Span(f"{self._chars.cut} {hidden + 1} more lines: {self._more}", "dim"),)
        if self._more and height > 2 and y == 0 and self._top > 0:
            return (Span(f"{self._chars.cut} {self._top + 1} lines above", "dim"),)
        return self._rows[place] if place < len(self._rows) else EMPTY
