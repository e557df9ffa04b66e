"""The screen of a terminal: bytes in, cells and replies out.

The character grid is pyte's; what pyte has no notion of is handled here: private modes, the alternate screen, the
Kitty keyboard, synchronized output, and sequences that it would print as text.
"""

from __future__ import annotations

import codecs
import copy
import re
from dataclasses import dataclass
from typing import Any

import pyte
from pyte.screens import wcwidth

_CONTROL = re.compile(
    r"\x1b\[(?P<private>[<=>?]?)(?P<numbers>[0-9;:]*)(?P<between>[ -/]*)(?P<final>[@-~])"
    r"|\x1b[PX^_](?:[^\x1b]|\x1b(?!\\))*\x1b\\"  # device control and other strings
    r"|\x1b\](?:[^\x07\x1b])*(?:\x07|\x1b\\)"  # operating system commands: title, clipboard
)
_UNFINISHED = re.compile(r"\x1b(?:\[[<-?0-9;: -/]*|[PX^_](?:[^\x1b]|\x1b(?!\\))*|\][^\x07\x1b]*\x1b?)?\Z")
_ALTERNATE = {47, 1047, 1049}
_SYNCHRONIZED = 2026


@dataclass(frozen=True)
class Cell:
    """One cell of the screen; colours are ``default``, a name or six hexadecimal digits."""

    char: str
    bold: bool
    italic: bool
    underline: bool
    reverse: bool
    fg: str
    bg: str


class Emulator:
    """A screen fed with what a program writes."""

    def __init__(self, columns: int, rows: int) -> None:
        """Start with a blank screen."""
        self._screen = pyte.Screen(columns, rows)
        self._stream = pyte.Stream(self._screen)
        self._decoder = codecs.getincrementaldecoder("utf-8")("replace")
        self._pending = ""
        self._reply = b""
        self._normal: tuple[dict[int, Any], Any] | None = None
        self._kitty_depth = 0
        self.modes: set[int] = {25}
        self.ever: set[int] = set()

    @property
    def kitty(self) -> bool:
        """Whether the program has the Kitty keyboard on."""
        return self._kitty_depth > 0

    @property
    def in_frame(self) -> bool:
        """Whether a synchronized frame has begun and not ended."""
        return _SYNCHRONIZED in self.modes

    @property
    def cursor(self) -> tuple[int, int]:
        """Row and column of the cursor, from 0."""
        return self._screen.cursor.y, self._screen.cursor.x

    def feed(self, data: bytes) -> bytes:
        """Take in output.

        Returns:
            What a terminal answers to the queries in it.
        """
        self._reply = b""
        text = self._pending + self._decoder.decode(data)
        unfinished = _UNFINISHED.search(text)
        cut = unfinished.start() if unfinished else len(text)
        text, self._pending = text[:cut], text[cut:]
        done = 0
        for match in _CONTROL.finditer(text):
            self._stream.feed(text[done : match.start()])
            done = match.end()
            if match["final"] is not None:
                self._control(match)
        self._stream.feed(text[done:])
        return self._reply

    def _control(self, match: re.Match[str]) -> None:
        private, numbers, between, final = match.group("private", "numbers", "between", "final")
        values = [int(part) for part in re.split("[;:]", numbers) if part]
        if private == "?" and between == "$" and final == "p":
            self._report_mode(values[0])
        elif private == "?" and not between and final in "hl":
            for mode in values:
                self._set_mode(mode, final == "h")
        elif final == "u" and private in (">", "<"):
            step = 1 if private == ">" else -(values[0] if values else 1)
            self._kitty_depth = max(0, self._kitty_depth + step)
        elif not private and final == "n" and values == [6]:
            row, column = self.cursor
            self._reply += f"\x1b[{row + 1};{column + 1}R".encode()
        elif not private and final == "c":
            self._reply += b"\x1b[?62;22c"
        elif not private and not between and final != "u":
            self._stream.feed(re.sub(":+", ";", match.group()))

    def _report_mode(self, mode: int) -> None:
        known = {25, 1049, 2004, _SYNCHRONIZED}
        state = 0 if mode not in known else 1 if mode in self.modes else 2
        self._reply += f"\x1b[?{mode};{state}$y".encode()

    def _set_mode(self, mode: int, on: bool) -> None:
        if on:
            self.ever.add(mode)
        if mode in _ALTERNATE and on != bool(self.modes & _ALTERNATE):
            self._alternate(on)
        if mode == 7:
            (self._screen.set_mode if on else self._screen.reset_mode)(7, private=True)
        (self.modes.add if on else self.modes.discard)(mode)

    def _alternate(self, on: bool) -> None:
        """Show the other screen; the normal one is kept meanwhile."""
        screen = self._screen
        if on:
            kept = {row: dict(line) for row, line in screen.buffer.items()}
            self._normal = (kept, copy.copy(screen.cursor))
            screen.erase_in_display(2)
        elif self._normal is not None:
            screen.erase_in_display(2)
            kept, screen.cursor = self._normal
            for row, line in kept.items():
                if row < screen.lines:
                    screen.buffer[row].update(line)
            screen.ensure_hbounds()
            screen.ensure_vbounds()
            self._normal = None

    def resize(self, columns: int, rows: int) -> None:
        """Change the size; what lies outside is lost."""
        self._screen.resize(rows, columns)

    def rows(self) -> list[str]:
        """The rows as text, without trailing blanks."""
        return [self._row(number).rstrip() for number in range(self._screen.lines)]

    def _row(self, number: int) -> str:
        line = self._screen.buffer[number]
        # The second cell of a wide character holds no text of its own.
        return "".join(line[column].data for column in range(self._screen.columns))

    def find(self, text: str) -> tuple[int, int] | None:
        """Row and column of the first place that shows a text."""
        for number in range(self._screen.lines):
            row = self._row(number)
            place = row.find(text)
            if place >= 0:
                return number, _width(row[:place])
        return None

    def cell(self, row: int, column: int) -> Cell:
        """One cell with its attributes."""
        if not (0 <= row < self._screen.lines and 0 <= column < self._screen.columns):
            raise IndexError(f"no cell at row {row}, column {column}")
        char = self._screen.buffer[row][column]
        return Cell(char.data, char.bold, char.italics, char.underscore, char.reverse, char.fg, char.bg)

    def cells(self, row: int, column: int, text: str) -> list[Cell]:
        """The cells that a text takes from a place on."""
        return [self.cell(row, column + offset) for offset in range(_width(text))]


def _width(text: str) -> int:
    return sum(max(0, wcwidth(character)) for character in text)
