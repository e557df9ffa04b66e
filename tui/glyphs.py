"""Every glyph the screens draw, with its ASCII twin, and text made safe for a screen of character cells.

Text from files and from keys goes through `Charset.clean` before it is shown: what would move the cursor, turn the
reading direction or hide itself becomes a visible sign. Widths are counted in cells, as the terminal does.
"""

from __future__ import annotations

import unicodedata
from collections.abc import Mapping
from dataclasses import dataclass, field

from rich.cells import cell_len

_MOST_MARKS = 2
"""Combining marks kept on one letter; more would climb out of the line."""

_ASCII_TWINS = {
    "±": "+/-", "°": "deg", "²": "2", "³": "3", "×": "x", "÷": "/", "·": ".", "µ": "u", "μ": "u", "−": "-", "–": "-",
    "—": "-", "‘": "'", "’": "'", "“": '"', "”": '"', "…": "~", "ß": "ss", "æ": "ae", "ø": "o", "Æ": "AE", "Ø": "O",
    "œ": "oe", "Œ": "OE", "ł": "l", "Ł": "L", "đ": "d", "ð": "d", "þ": "th", "→": "->", "≤": "<=", "≥": ">=",
    "√": "sqrt", "π": "pi", "ρ": "rho", "Δ": "d", "≈": "~", "½": "1/2", "¼": "1/4",
}  # fmt: skip


@dataclass(frozen=True)
class Charset:
    """One way of drawing: with the full range of glyphs, or in ASCII alone."""

    ascii: bool
    rule: str
    cut: str
    unknown: str
    here: str
    limit: str
    fill: str
    over: str
    empty: str
    end_left: str
    end_right: str
    zero: str
    divide: str
    twins: Mapping[str, str] = field(default_factory=dict, repr=False)

    def clean(self, text: str) -> str:
        """User text on one line without anything that could break or restyle the screen."""
        return "".join(self._kept(unicodedata.normalize("NFC", text)))

    def _kept(self, text: str) -> list[str]:
        kept: list[str] = []
        marks = 0
        for sign in text:
            kind = unicodedata.category(sign)
            if sign in "\t\n\r":
                kept.append(" ")
            elif kind in ("Mn", "Me"):
                marks += 1
                fits = kept and marks <= _MOST_MARKS and cell_len(sign) == 0 and not "\ufe00" <= sign <= "\ufe0f"
                kept.append(self._plain(sign) if fits else self.unknown)
                continue
            elif kind[0] == "C" or kind in ("Zl", "Zp") or cell_len(sign) == 0:
                kept.append(self.unknown)
            elif kind == "Zs":
                kept.append(" ")
            else:
                kept.append(self._plain(sign))
            marks = 0
        return kept

    def _plain(self, sign: str) -> str:
        if not self.ascii or sign.isascii():
            return sign
        if sign in self.twins:
            return self.twins[sign]
        bare = "".join(one for one in unicodedata.normalize("NFKD", sign) if one.isascii())
        return bare.strip() or ("" if unicodedata.combining(sign) else self.unknown)

    def own(self, text: str) -> str:
        """Text of the program itself, in this charset."""
        if not self.ascii or text.isascii():
            return text
        return "".join(self._plain(sign) for sign in text)


FULL = Charset(
    ascii=False, rule="─", cut="…", unknown="\ufffd", here="▸", limit="┃", fill="█", over="▒",
    empty="·", end_left="├", end_right="┤", zero="│", divide="│",
)  # fmt: skip
PLAIN = Charset(
    ascii=True, rule="-", cut="~", unknown="?", here=">", limit="|", fill="=", over="X", empty=".",
    end_left="[", end_right="]", zero=":", divide="|", twins=_ASCII_TWINS,
)  # fmt: skip


def charset(ascii_only: bool) -> Charset:
    """The charset of a mode."""
    return PLAIN if ascii_only else FULL


def width(text: str) -> int:
    """Cells a text takes."""
    return len(text) if text.isascii() else cell_len(text)


def clip(text: str, cells: int, chars: Charset) -> str:
    """A text in at most this many cells; a cut is shown by a sign at its end."""
    if width(text) <= cells:
        return text
    if cells <= 0:
        return ""
    kept, used = [], width(chars.cut)
    for sign in text:
        used += width(sign)
        if used > cells:
            break
        kept.append(sign)
    return "".join(kept).rstrip() + chars.cut


def clip_front(text: str, cells: int, chars: Charset) -> str:
    """A text in at most this many cells that keeps its end, for paths."""
    if width(text) <= cells:
        return text
    if cells <= 0:
        return ""
    kept, used = [], width(chars.cut)
    for sign in reversed(text):
        used += width(sign)
        if used > cells:
            break
        kept.append(sign)
    return chars.cut + "".join(reversed(kept))


def fill(text: str, cells: int, chars: Charset) -> str:
    """A text clipped or filled with blanks to exactly this many cells."""
    shown = clip(text, cells, chars)
    return shown + " " * (cells - width(shown))


def fill_left(text: str, cells: int, chars: Charset) -> str:
    """A text clipped or filled with blanks on its left to exactly this many cells."""
    shown = clip(text, cells, chars)
    return " " * (cells - width(shown)) + shown


def wrap(text: str, cells: int, indent: str = "") -> list[str]:
    """A text in lines of at most this many cells, broken at blanks, or inside a word longer than a line.

    Args:
        text: One paragraph.
        cells: Width of a line, at least one.
        indent: Blanks before every line but the first.
    """
    cells = max(cells, 1)
    if width(indent) >= cells:
        indent = ""
    lines: list[str] = []
    line = ""
    for word in text.split():
        if line.strip() and width(line) + 1 + width(word) > cells:
            lines.append(line)
            line = indent
        line += word if not line.strip() else f" {word}"
        while width(line) > cells:
            head = _head(line, cells)
            lines.append(head)
            line = indent + line[len(head) :]
    if line.strip() or not lines:
        lines.append(line)
    return lines


def _head(text: str, cells: int) -> str:
    """The longest beginning that fits; at least one sign."""
    used = 0
    for place, sign in enumerate(text):
        used += width(sign)
        if used > cells and place:
            return text[:place]
    return text
