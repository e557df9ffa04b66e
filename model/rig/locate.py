"""On which line of a TOML text each key stands.

The parser of the standard library gives values without their places, so a second, light scan finds them. It runs only
when there is something to report, and only on text that the parser has accepted: it checks nothing.
"""

from __future__ import annotations

import tomllib
from bisect import bisect_right
from functools import lru_cache
from typing import TypeAlias

Loc: TypeAlias = tuple[str | int, ...]
"""A place in the data: keys, and row numbers from 0."""

_BLANK = " \t\r\n"
_BARE = frozenset("ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789_-")


@lru_cache(maxsize=8)
def locate(text: str) -> dict[Loc, int]:
    """Line of every table, row, key and list element, counted from 1."""
    return _Scan(text).lines


def line_of(text: str, loc: Loc) -> int:
    """Line of a place; of what it belongs to where the place itself is missing."""
    lines = locate(text)
    for end in range(len(loc), 0, -1):
        if loc[:end] in lines:
            return lines[loc[:end]]
    return 1


class _Scan:
    """One pass over an accepted text."""

    def __init__(self, text: str) -> None:
        self.text = text + "\n"
        self.at = 0
        self.ends = [place for place, mark in enumerate(self.text) if mark == "\n"]
        self.lines: dict[Loc, int] = {}
        self.row_counts: dict[Loc, int] = {}
        table: Loc = ()
        while self._skip_blank():
            if self.text[self.at] == "[":
                table = self._header()
            else:
                self._pair(table)

    def _note(self, loc: Loc) -> None:
        self.lines.setdefault(loc, bisect_right(self.ends, self.at - 1) + 1)

    def _skip_blank(self) -> bool:
        """Go to the next mark that means something; False at the end."""
        while self.at < len(self.text):
            mark = self.text[self.at]
            if mark == "#":
                self.at = self.text.index("\n", self.at)
            elif mark not in _BLANK:
                return True
            else:
                self.at += 1
        return False

    def _header(self) -> Loc:
        rows = self.text.startswith("[[", self.at)
        start = self.at
        self.at += 2 if rows else 1
        parts = self._key()
        end, self.at = self.text.index("]", self.at) + (2 if rows else 1), start
        loc: Loc = ()
        for count, part in enumerate(parts, 1):
            loc += (part,)
            self._note(loc)
            if rows and count == len(parts):
                number = self.row_counts.get(loc, 0)
                self.row_counts[loc] = number + 1
                loc += (number,)
            elif loc in self.row_counts:
                loc += (self.row_counts[loc] - 1,)
            self._note(loc)
        self.at = end
        return loc

    def _pair(self, table: Loc) -> None:
        """A key, its value, and everything inside the value."""
        start = self.at
        loc, parts = table, self._key()
        end, self.at = self.at, start
        for part in parts:
            loc += (part,)
            self._note(loc)
        self.at = self.text.index("=", end) + 1
        self._value(loc)

    def _key(self) -> list[str]:
        """The parts of a dotted key."""
        parts: list[str] = []
        while True:
            self._skip_blank()
            start = self.at
            if self.text[start] in "\"'":
                self._string()
                parts.append(tomllib.loads(f"k = {self.text[start : self.at]}")["k"])
            else:
                while self.text[self.at] in _BARE:
                    self.at += 1
                parts.append(self.text[start : self.at])
            self._skip_blank()
            if self.text[self.at] != ".":
                return parts
            self.at += 1

    def _value(self, loc: Loc) -> None:
        self._skip_blank()
        mark = self.text[self.at]
        if mark in "\"'":
            self._string()
        elif mark == "[":
            self._list(loc)
        elif mark == "{":
            self._inline(loc)
        else:
            while self.text[self.at] not in ",]}#\n":
                self.at += 1

    def _list(self, loc: Loc) -> None:
        self.at += 1
        number = 0
        while self._skip_blank() and self.text[self.at] != "]":
            if self.text[self.at] == ",":
                self.at += 1
                continue
            self._note((*loc, number))
            self._value((*loc, number))
            number += 1
        self.at += 1

    def _inline(self, loc: Loc) -> None:
        self.at += 1
        while self._skip_blank() and self.text[self.at] != "}":
            if self.text[self.at] == ",":
                self.at += 1
            else:
                self._pair(loc)
        self.at += 1

    def _string(self) -> None:
        """Go past a string of any of the four kinds."""
        quote = self.text[self.at]
        if self.text.startswith(quote * 3, self.at):
            self._long_string(quote * 3)
            return
        self.at += 1
        while self.text[self.at] != quote:
            self.at += 2 if quote == '"' and self.text[self.at] == "\\" else 1
        self.at += 1

    def _long_string(self, quotes: str) -> None:
        self.at += 3
        while not self.text.startswith(quotes, self.at):
            self.at += 2 if quotes[0] == '"' and self.text[self.at] == "\\" else 1
        self.at += 3
        while self.text[self.at] == quotes[0]:  # up to two quotes may stand right before the closing three
            self.at += 1
