"""A grid of characters with styles, and the two sets of characters that a picture is made of."""

from __future__ import annotations

import unicodedata
from dataclasses import dataclass
from itertools import groupby
from typing import Literal

from model.report.chart import Role, plain

Style = Literal["", "title", "frame", "tick", "limit", "starting", "second", "main", "over", "mark"]
Run = tuple[str, Style]


@dataclass(frozen=True)
class Glyphs:
    """The characters of a picture, and how many dots a cell has across and down."""

    across: int
    down: int
    side: str
    corner: str
    base: str
    base_tick: str
    side_tick: str
    limit: str
    starting: str
    second: str
    main: str
    over: str = "X"
    mark: str = "+"

    def sign(self, role: Role) -> str:
        """The character that stands for a curve."""
        return {"main": self.main, "second": self.second, "starting": self.starting}[role]


BRAILLE = Glyphs(2, 4, "│", "└", "─", "┴", "┤", "╌", "·", "o", "⠒")
ASCII = Glyphs(1, 1, "|", "+", "-", "+", "+", "-", ".", "o", "*")


class Canvas:
    """A grid of characters and their styles."""

    def __init__(self, width: int, height: int, ascii: bool) -> None:  # noqa: A002
        """Start blank."""
        self.width, self.height, self.ascii = width, height, ascii
        self.glyphs = ASCII if ascii else BRAILLE
        self.chars = [[" "] * width for _ in range(height)]
        self.styles: list[list[Style]] = [[""] * width for _ in range(height)]

    def set(self, column: int, row: int, char: str, style: Style) -> None:
        """Fill one cell; a place outside the grid is passed over."""
        if 0 <= column < self.width and 0 <= row < self.height:
            self.chars[row][column] = char
            self.styles[row][column] = style

    def put(self, column: int, row: int, text: str, style: Style) -> None:
        """Write a text from a cell on, as far as there is room."""
        for char in plain(text, self.ascii):
            wide = cell_width(char)
            if column + wide > self.width:
                return
            if wide:
                self.set(column, row, char, style)
            if wide == 2:
                self.set(column + 1, row, "", style)
            column += wide

    def is_free(self, column: int, row: int, length: int) -> bool:
        """Whether a text of some length would cover nothing."""
        inside = 0 <= row < self.height and column >= 0 and column + length <= self.width
        return inside and all(char == " " for char in self.chars[row][column : column + length])

    def runs(self) -> list[list[Run]]:
        """Row by row, the texts of one style."""
        lines: list[list[Run]] = []
        for chars, styles in zip(self.chars, self.styles, strict=True):
            groups = groupby(zip(styles, chars, strict=True), key=lambda cell: cell[0])
            lines.append([("".join(char for _, char in cells), style) for style, cells in groups])
        return lines


def cell_width(char: str) -> int:
    """How many cells a character takes."""
    if unicodedata.category(char) in ("Mn", "Me"):
        return 0
    return 2 if unicodedata.east_asian_width(char) in "WF" else 1


def text_width(text: str) -> int:
    """How many cells a text takes."""
    return sum(map(cell_width, text))
