"""What a picture of a curve shows, before it becomes lines of text or SVG.

Numbers are in the units that the axes name; whoever makes a chart has converted them. Values that are not finite are
gaps in a curve.
"""

from __future__ import annotations

import unicodedata
from collections.abc import Iterable, Sequence
from dataclasses import dataclass
from functools import cached_property
from itertools import groupby, pairwise
from math import floor, log10
from typing import Literal

Point = tuple[float, float]
Role = Literal["main", "second", "starting"]

# Beyond this a difference of two values may overflow.
_LARGEST = 1e300
_SMALLEST_SPAN = 1e-290
_SPELLED = {"°C": "degC", "°F": "degF", "°": "deg", "±": "+/-", "×": "x", "·": " ", "…": "..."}


@dataclass(frozen=True)
class Curve:
    """Samples in drawing order.

    ``main`` is the curve in question, ``second`` another one of equal standing, ``starting`` the one that stood before
    inputs were moved: it is drawn fainter and is not held against the limits.
    """

    x: Sequence[float]
    y: Sequence[float]
    label: str = ""
    role: Role = "main"

    def __post_init__(self) -> None:
        if len(self.x) != len(self.y):
            raise ValueError(f"a curve needs as many x as y values, not {len(self.x)} and {len(self.y)}")

    @cached_property
    def pieces(self) -> list[list[Point]]:
        """The runs of samples that can be drawn, parted where a sample is not finite."""
        points = list(zip(map(float, self.x), map(float, self.y), strict=True))
        if all(-_LARGEST <= x <= _LARGEST and -_LARGEST <= y <= _LARGEST for x, y in points):
            return [points] if points else []
        pieces: list[list[Point]] = [[]]
        for x, y in points:
            if abs(x) <= _LARGEST and abs(y) <= _LARGEST:
                pieces[-1].append((x, y))
            elif pieces[-1]:
                pieces.append([])
        return [piece for piece in pieces if piece]


@dataclass(frozen=True)
class Axis:
    """What is measured along an axis.

    ``from_zero`` takes zero into view; a ``falling`` x axis runs from its high end to its low one.
    """

    title: str
    unit: str = ""
    from_zero: bool = False
    falling: bool = False

    @property
    def heading(self) -> str:
        """Title and unit; without brackets, which some displays take for markup."""
        return ", ".join(part for part in (self.title, self.unit) if part)


@dataclass(frozen=True)
class Bound:
    """A limit on y. ``label`` replaces the number at the end of its line."""

    value: float
    label: str = ""
    kind: Literal["max", "min"] = "max"

    @property
    def text(self) -> str:
        """What stands at the end of the line."""
        return self.label or f"{self.value:,.6g}"

    def is_broken_by(self, y: float) -> bool:
        """Whether a value lies on the wrong side; a value on the limit does not."""
        return y > self.value if self.kind == "max" else y < self.value


@dataclass(frozen=True)
class Mark:
    """A point to be found at a glance, such as a peak, with a short text that is shown where there is room."""

    x: float
    y: float
    text: str = ""


@dataclass(frozen=True)
class Chart:
    """Curves over one pair of axes, limits on y and marked points."""

    curves: Sequence[Curve]
    x_axis: Axis
    y_axis: Axis
    limits: Sequence[Bound] = ()
    marks: Sequence[Mark] = ()
    title: str = ""

    def drawable_limits(self) -> list[Bound]:
        """The limits whose line can be drawn."""
        return [bound for bound in self.limits if abs(bound.value) <= _LARGEST]

    def drawable_marks(self) -> list[Mark]:
        """The marks that have a place."""
        return [mark for mark in self.marks if abs(mark.x) <= _LARGEST and abs(mark.y) <= _LARGEST]

    def breaks_a_limit(self, y: float) -> bool:
        """Whether a value lies on the wrong side of any limit."""
        return any(bound.is_broken_by(y) for bound in self.limits)

    def x_range(self) -> tuple[float, float]:
        """The range of x in view: all samples and marks."""
        values = [x for curve in self.curves for piece in curve.pieces for x, _ in piece]
        return _range(values + [mark.x for mark in self.drawable_marks()], self.x_axis.from_zero)

    def y_range(self) -> tuple[float, float]:
        """The range of y in view: all samples and marks, and every limit."""
        values = [y for curve in self.curves for piece in curve.pieces for _, y in piece]
        values += [mark.y for mark in self.drawable_marks()] + [bound.value for bound in self.drawable_limits()]
        return _range(values, self.y_axis.from_zero)


def peak_of(curve: Curve, text: str = "") -> Mark | None:
    """A mark at the first largest y of a curve; none where there is nothing to draw."""
    points = [point for piece in curve.pieces for point in piece]
    if not points:
        return None
    x, y = max(points, key=lambda point: point[1])
    return Mark(x, y, text)


def _range(values: Sequence[float], from_zero: bool) -> tuple[float, float]:
    if not values:
        return 0.0, 1.0
    low, high = min(values), max(values)
    if from_zero:
        low, high = min(low, 0.0), max(high, 0.0)
    size = max(abs(low), abs(high))
    if high - low > max(1e-9 * size, _SMALLEST_SPAN):
        return low, high
    # All the same: the line runs through the middle, or along the bottom where it is zero.
    return (low - size / 2, low + size / 2) if size > _SMALLEST_SPAN else (0.0, 1.0)


def thinned(piece: list[Point], columns: Sequence[int]) -> list[Point]:
    """As few samples as look the same: of each run within one column the first, lowest, highest and last.

    Args:
        piece: Samples in drawing order.
        columns: The column of each.
    """
    kept: list[Point] = []
    start = 0
    for _, group in groupby(columns):
        end = start + sum(1 for _ in group)
        if end - start <= 4:
            kept += piece[start:end]
        else:
            heights = [y for _, y in piece[start:end]]
            lowest, highest = heights.index(min(heights)), heights.index(max(heights))
            kept += [piece[start + i] for i in sorted({0, lowest, highest, end - start - 1})]
        start = end
    return kept


def parted(piece: Sequence[Point], limits: Iterable[Bound]) -> list[Point]:
    """The same line with a sample added wherever it crosses a limit: each stretch is wholly within or beyond."""
    levels = sorted({bound.value for bound in limits})
    if not levels or len(piece) < 2:
        return list(piece)
    points = [piece[0]]
    for (x0, y0), (x1, y1) in pairwise(piece):
        crossed = [level for level in levels if y0 < level < y1 or y1 < level < y0]
        for level in crossed if y1 > y0 else reversed(crossed):
            points.append((x0 + (x1 - x0) * ((level - y0) / (y1 - y0)), level))
        points.append((x1, y1))
    return points


def plain(text: str, ascii: bool = False) -> str:  # noqa: A002
    """A text that keeps to its line: characters that control a display are made visible, spaces are plain.

    Args:
        text: Any text, also a user's.
        ascii: Whether to spell everything in ASCII.
    """
    hidden = "?" if ascii else "\N{REPLACEMENT CHARACTER}"
    shown = ""
    for char in text:
        category = unicodedata.category(char)
        shown += " " if category == "Zs" else hidden if category[0] == "C" or category[0] == "Z" else char
    if not ascii:
        return shown
    for sign, spelling in _SPELLED.items():
        shown = shown.replace(sign, spelling)
    letters = unicodedata.normalize("NFKD", shown)
    return "".join(char if char.isascii() else "?" for char in letters if not unicodedata.combining(char))


def short(number: float, limits: Iterable[Bound] = ()) -> str:
    """A number in four digits, or as many as it takes to stand on its own side of every limit."""
    bounds = list(limits)
    for digits in range(4, 17):
        text = _digits(number, digits)
        shown = float(text.replace(",", ""))
        if all(bound.is_broken_by(shown) == bound.is_broken_by(number) for bound in bounds):
            return text
    return f"{number!r}"


def _digits(number: float, digits: int) -> str:
    """A number in so many digits, without an exponent where its size is an everyday one."""
    if number == 0 or not 1e-6 <= abs(number) < 1e15:
        return f"{number:,.{digits}g}"
    places = max(digits - 1 - floor(log10(abs(number))), 0)
    text = f"{number:,.{places}f}"
    return text.rstrip("0").rstrip(".") if "." in text else text
