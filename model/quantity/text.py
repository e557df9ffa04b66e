"""Quantity text to SI: `1,250 ft ± 50 ft`, `8 ft 6 in`, `28 °C ± 3 °C`, `0.75 ± 5 %`."""

from __future__ import annotations

import math
import re
from dataclasses import dataclass
from fractions import Fraction
from typing import NoReturn

from model.quantity.units import FEET_INCHES, UNITS, Dimension, canonical, dimensions_of, unit_names

LONGEST_TEXT = 200
"""A quantity text over this many characters is refused unread."""
LONGEST_FOUND = 60

_NUMBER = re.compile(r"[+-]?(?:[0-9][0-9,]*(?:\.[0-9,]*)?|\.[0-9]+)(?:[eE][+-]?[0-9]+)?")
_GROUPED = re.compile(r"[+-]?[1-9][0-9]{0,2}(?:,[0-9]{3})+(?:\.[0-9]*)?(?:[eE][+-]?[0-9]+)?")
_TOLERANCE = re.compile(r"±|\+/-")
_COMPOUND = re.compile(r"ft\s*([0-9].*?)\s*in", re.DOTALL)
_NUMBER_WORD = re.compile(r"[+-]?(?:nan|inf(?:inity)?)\b", re.IGNORECASE)
_SPACES = str.maketrans({"\u2212": "-", "\u00a0": " ", "\u202f": " ", "\u2009": " "})


class QuantityError(ValueError):
    """A text that is no quantity of the wanted dimension.

    Attributes:
        found: what was given, shortened for a message.
        expected: what is wanted, with the units that may be used.
        hint: what is probably meant, or empty.
    """

    def __init__(self, found: str, expected: str, hint: str = "") -> None:
        self.found = found
        self.expected = expected
        self.hint = hint
        super().__init__(f"found {found}, expected {expected}" + (f" ({hint})" if hint else ""))


@dataclass(frozen=True, slots=True)
class Quantity:
    """A value with what the user wrote.

    Attributes:
        value: SI (angle in rad, plain number as it is, temperature absolute in K).
        dimension: what it measures.
        unit: canonical unit as written, `ft in` for `8 ft 6 in`, empty for a plain number.
        tolerance: half-width of a 95 % interval in SI; of a temperature a difference in K.
        text: the text as the user wrote it.
        relative: whether the tolerance was written in per cent of the value.
    """

    value: float
    dimension: Dimension
    unit: str
    tolerance: float = 0.0
    text: str = ""
    relative: bool = False


def quoted(value: object) -> str:
    """What was found, for a message: text in quotes, everything shortened and without control characters."""
    try:
        shown = f'"{value}"' if isinstance(value, str) else str(value)
    except ValueError:  # an integer of thousands of digits has no text
        return "a number too large to show"
    shown = "".join(mark if mark.isprintable() else " " for mark in shown[: LONGEST_FOUND + 2])
    return shown if len(shown) <= LONGEST_FOUND else shown[: LONGEST_FOUND - 2] + "…"


def expectation(dimension: Dimension) -> str:
    """What is expected of a dimension, with the units it may be written in."""
    if dimension is Dimension.NUMBER:
        return dimension.named
    return f"{dimension.named} with its unit: {' '.join(unit_names(dimension))}"


def parse(text: str, dimension: Dimension) -> Quantity:
    """Read a quantity text.

    Args:
        text: `NUMBER UNIT`, optionally followed by `± NUMBER UNIT` or `± NUMBER %`.
        dimension: what it must measure; it settles `lb` and `g`.

    Raises:
        QuantityError: no number, no unit or another dimension's, a decimal comma, nan, an infinite or too large value.
    """
    if len(text) > LONGEST_TEXT:
        raise QuantityError(quoted(text), expectation(dimension), f"over {LONGEST_TEXT} characters")
    plain = text.translate(_SPACES)
    parts = _TOLERANCE.split(plain)
    reader = _Reader(text, dimension)
    if not plain.isprintable():
        reader.fail("it holds a control character")
    if len(parts) > 2:
        reader.fail("more than one tolerance")
    value, unit = reader.value(parts[0], in_tolerance=False)
    si = reader.as_float(_si(value, unit, dimension))
    if dimension is Dimension.TEMPERATURE and si < 0.0:
        reader.fail("colder than absolute zero")
    tolerance, relative = reader.tolerance(parts[1], si, unit) if len(parts) == 2 else (0.0, False)
    return Quantity(si, dimension, unit, tolerance, text, relative)


def parse_number(found: int | float | str) -> Quantity:
    """Read a plain number, given as a number or as text that may carry a tolerance: `2.5`, `"0.75 ± 0.04"`.

    Raises:
        QuantityError: not a number, nan or infinite.
    """
    if isinstance(found, str):
        return parse(found, Dimension.NUMBER)
    if isinstance(found, bool) or not isinstance(found, int | float):
        raise QuantityError(quoted(found), Dimension.NUMBER.named)
    try:
        value = float(found)
    except OverflowError:
        value = math.inf
    if not math.isfinite(value):
        raise QuantityError(quoted(found), Dimension.NUMBER.named, "not a finite number")
    return Quantity(value, Dimension.NUMBER, "", 0.0, quoted(found))


def _si(value: Fraction, unit: str, dimension: Dimension) -> Fraction:
    known = UNITS[dimension][unit]
    return value * known.factor + known.offset


class _Reader:
    """Reads the parts of one text; every failure names the whole text and the wanted dimension."""

    def __init__(self, text: str, dimension: Dimension) -> None:
        self.text = text
        self.dimension = dimension

    def fail(self, hint: str = "") -> NoReturn:
        raise QuantityError(quoted(self.text), expectation(self.dimension), hint)

    def as_float(self, exact: Fraction) -> float:
        try:
            value = float(exact)
        except OverflowError:
            self.fail("too large")
        if value == 0.0 and exact != 0:
            self.fail("too small to tell from zero")
        return value

    def value(self, part: str, *, in_tolerance: bool) -> tuple[Fraction, str]:
        """Number and canonical unit of one side of the ±; checks that the unit is one of the dimension."""
        number, rest = self._split(part, in_tolerance)
        unit = canonical(rest)
        compound = _COMPOUND.fullmatch(rest) if self.dimension is Dimension.LENGTH else None
        if compound:
            return self._feet_inches(number, compound.group(1)), FEET_INCHES
        value = self._number(number)
        if unit not in UNITS[self.dimension] or unit == FEET_INCHES:
            self._refuse_unit(number, unit, in_tolerance)
        return value, unit

    def tolerance(self, part: str, value: float, unit: str) -> tuple[float, bool]:
        """Half-width in SI and whether it was given in per cent."""
        number, rest = self._split(part, True)
        if rest.strip() == "%":
            return self._per_cent(self._number(number), value, unit), True
        if unit == "%":
            self.fail("write both as plain numbers, as in 0.95 ± 0.02")
        if not rest.strip() and unit:
            self.fail(f'the tolerance has no unit: "± {number} {unit.rsplit(maxsplit=1)[-1]}" or "± {number} %"')
        width, width_unit = self.value(part, in_tolerance=True)
        if width < 0:
            self.fail("a tolerance is not negative")
        return self.as_float(width * UNITS[self.dimension][width_unit].factor), False

    def _per_cent(self, share: Fraction, value: float, unit: str) -> float:
        if self.dimension is Dimension.TEMPERATURE:
            self.fail("a percentage of a temperature means nothing: give the tolerance in degrees")
        if unit == "%":
            self.fail("5 % of it, or 5 points? Write both as plain numbers, as in 0.95 ± 0.02")
        if share < 0:
            self.fail("a tolerance is not negative")
        if value == 0.0 and share != 0:
            self.fail("a percentage of zero is no tolerance: give it with a unit")
        return self.as_float(abs(Fraction(value)) * share / 100)

    def _split(self, part: str, in_tolerance: bool) -> tuple[str, str]:
        """The number's text and what follows it."""
        part = part.strip()
        match = _NUMBER.match(part)
        if match is None:
            self._refuse_number(part, in_tolerance)
        return match.group(), part[match.end() :].strip()

    def _refuse_number(self, part: str, in_tolerance: bool) -> NoReturn:
        if not part:
            self.fail("no tolerance after the ±" if in_tolerance else "empty" if not self.text.strip() else "no number")
        if _NUMBER_WORD.match(part):
            self.fail("not a finite number")
        self.fail("digits 0 to 9 only" if any(mark.isdigit() and not mark.isascii() for mark in part) else "no number")

    def _number(self, number: str) -> Fraction:
        """The exact value of a number's text."""
        if "," in number and not _GROUPED.fullmatch(number):
            whole = number.replace(",", ".", 1) if number.count(",") == 1 and "." not in number else ""
            self.fail("the decimal sign is a point" + (f': "{whole}"' if whole else ""))
        mantissa, _, exponent = number.replace(",", "").lower().partition("e")
        # A power of ten with a huge exponent takes for ever to build.
        if exponent and (len(exponent) > 5 or abs(int(exponent)) > 400):
            self.fail("its exponent is out of reach")
        return Fraction(mantissa) * Fraction(10) ** int(exponent or 0)

    def _feet_inches(self, feet: str, inches: str) -> Fraction:
        """Feet of `8 ft 6 in`; the sign holds for both parts."""
        match = _NUMBER.fullmatch(inches)
        if match is None:
            self.fail(f'write it as in "8 ft 6 in"; "{inches}" is no number')
        whole, rest = self._number(feet), self._number(inches)
        if whole.denominator != 1:
            self.fail("before inches the feet are a whole number")
        if not 0 <= rest < 12:
            self.fail("after feet the inches are under 12")
        size = abs(whole) + rest / 12
        return -size if feet.startswith("-") else size

    def _refuse_unit(self, number: str, unit: str, in_tolerance: bool) -> NoReturn:
        if not unit:
            self.fail("no unit" if not _TOLERANCE.search(self.text) or in_tolerance else "no unit before the ±")
        if unit == FEET_INCHES:
            self.fail('write feet and inches as in "8 ft 6 in"')
        others = dimensions_of(unit)
        if others:
            self.fail(f"{unit} is a unit of {' and '.join(other.value for other in others)}")
        if re.match(r"[0-9_]|['’][0-9]{3}\b", unit):
            self.fail('thousands are separated by a comma or not at all, as in "1,250"')
        if re.match(r"['\"′″’”]", unit):
            self.fail('write feet and inches as in "8 ft 6 in"')
        if any(mark.isdigit() and not mark.isascii() for mark in unit):
            self.fail("digits 0 to 9 only")
        self.fail(self._nearest_unit(unit))

    def _nearest_unit(self, unit: str) -> str:
        from difflib import get_close_matches  # only a mistake needs it

        names = unit_names(self.dimension)
        lowered = {name.lower(): name for name in names}
        near = [lowered[unit.lower()]] if unit.lower() in lowered else get_close_matches(unit, names, 1)
        shown = quoted(unit)
        return f"{shown} is no unit known here" + (f'; did you mean "{near[0]}"?' if near else "")
