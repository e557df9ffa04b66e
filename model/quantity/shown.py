"""SI values to text in a unit, with enough digits that a shown number never contradicts a comparison."""

from __future__ import annotations

import math
from enum import StrEnum
from fractions import Fraction
from functools import lru_cache

from model.quantity.text import Quantity
from model.quantity.units import FEET_INCHES, UNITS, Dimension, from_unit

_SNAP = 15
"""Digits to which every decimal text survives the way through a float."""
_MOST_DIGITS = 60
_PLAIN_FROM, _PLAIN_TO = -6, 15
"""Powers of ten between which a number is written without an exponent."""
_MOST_FEET_INCHES = 10**12
"""Feet from which the inches are left out."""


class UnitSystem(StrEnum):
    """How values are shown."""

    WRITTEN = "written"
    SI = "si"
    US = "us"


_SI_UNITS = {
    Dimension.MASS: "kg", Dimension.LENGTH: "m", Dimension.AREA: "m2", Dimension.SPEED: "m/s", Dimension.FORCE: "N",
    Dimension.PRESSURE: "Pa", Dimension.TEMPERATURE: "°C", Dimension.TIME: "s", Dimension.ANGLE: "deg",
    Dimension.ACCELERATION: "g", Dimension.DENSITY: "kg/m3", Dimension.NUMBER: "",
}  # fmt: skip
_US_UNITS = _SI_UNITS | {
    Dimension.MASS: "lb", Dimension.LENGTH: "ft", Dimension.AREA: "ft2", Dimension.SPEED: "ft/s",
    Dimension.FORCE: "lbf", Dimension.PRESSURE: "psf", Dimension.TEMPERATURE: "°F", Dimension.DENSITY: "slug/ft3",
}  # fmt: skip


def unit_for(
    dimension: Dimension, system: UnitSystem, written: str | None = None, size: float | None = None
) -> str:
    """The unit a value is shown in.

    Args:
        dimension: what it measures.
        system: as written, SI or US; as written without a written unit is SI.
        written: the unit the user wrote, if there is one.
        size: SI value, which settles between a small and a large unit (N and kN, in and ft).
    """
    if system is UnitSystem.WRITTEN and written is not None and written in UNITS[dimension]:
        return written
    unit = (_US_UNITS if system is UnitSystem.US else _SI_UNITS)[dimension]
    if size is None or not math.isfinite(size):
        return unit
    return _sized(dimension, unit, abs(size))


def _sized(dimension: Dimension, unit: str, size: float) -> str:
    """The unit of the same family in which this size reads well."""
    if unit == "N" and size >= 10_000.0:
        return "kN"
    if unit == "Pa" and size >= 1_000.0:
        return "kPa"
    if unit == "psf" and size >= from_unit(100.0, "psi", dimension):
        return "psi"
    if unit == "ft" and 0.0 < size < from_unit(3.0, "ft", dimension):
        return "in"
    if dimension is Dimension.TIME and size >= from_unit(2.0, "d", dimension):
        return "yr" if size >= from_unit(2.0, "yr", dimension) else "d"
    return unit


def show(value_si: float, dimension: Dimension, unit: str, *, digits: int = 4, sign: bool = False) -> str:
    """A value as text in a unit: `2,150 lb`, `29.4 ft/s`, `8 ft 6 in`, `0.0466`.

    Args:
        value_si: SI value.
        dimension: what it measures.
        unit: canonical unit of that dimension; `ft in` for feet and inches.
        digits: significant digits; a whole number is never cut short, trailing zeros after the point are dropped.
        sign: whether a positive value gets its plus.

    Raises:
        KeyError: the dimension has no such unit.
    """
    known = UNITS[dimension][unit]
    if not math.isfinite(value_si):
        return _with_unit(str(value_si), unit)
    return _show_exact((Fraction(value_si) - known.offset) / known.factor, unit, digits, sign)


def show_difference(difference_si: float, dimension: Dimension, unit: str, *, digits: int = 4) -> str:
    """A difference or tolerance as text: a temperature difference without the ice point.

    Raises:
        KeyError: the dimension has no such unit.
    """
    known = UNITS[dimension][unit]
    if not math.isfinite(difference_si):
        return _with_unit(str(difference_si), unit)
    return _show_exact(Fraction(difference_si) / known.factor, unit, digits, False)


def show_quantity(
    quantity: Quantity, system: UnitSystem = UnitSystem.WRITTEN, *, digits: int = 4
) -> str:
    """A quantity with its tolerance: `1,250 ft ± 50 ft`; a tolerance written in per cent stays in per cent."""
    dimension = quantity.dimension
    unit = unit_for(dimension, system, quantity.unit, quantity.value)
    shown = show(quantity.value, dimension, unit, digits=digits)
    if not quantity.tolerance:
        return shown
    if quantity.relative:
        share = Fraction(quantity.tolerance) / abs(Fraction(quantity.value))
        return f"{shown} ± {_show_exact(share * 100, '%', digits, False)}"
    if unit == FEET_INCHES:
        unit = "in"
    return f"{shown} ± {show_difference(quantity.tolerance, dimension, unit, digits=digits)}"


@lru_cache(maxsize=256)  # value and limit of a step are put into words one after the other
def show_apart(value: float, bound: float, dimension: Dimension, unit: str, *, digits: int = 4) -> tuple[str, str]:
    """Two values with enough digits that the texts compare as the values do.

    28.54 against 28.5 is never shown as 28.5 against 28.5, and equal values are shown alike.

    Args:
        value: SI value.
        bound: SI value it is compared with.
        dimension: what both measure.
        unit: canonical unit of that dimension.
        digits: significant digits to begin with.

    Raises:
        KeyError: the dimension has no such unit.
    """
    shown = show(value, dimension, unit, digits=digits), show(bound, dimension, unit, digits=digits)
    if not (math.isfinite(value) and math.isfinite(bound)) or value == bound:
        return shown
    known = UNITS[dimension][unit]
    exact = [(Fraction(si) - known.offset) / known.factor for si in (value, bound)]
    enough = digits
    while enough < _MOST_DIGITS:
        first, second = (_read(number, unit, enough) for number in exact)
        if first != second and (first < second) == (value < bound):
            break
        enough += 1
    if enough == digits:
        return shown
    return show(value, dimension, unit, digits=enough), show(bound, dimension, unit, digits=enough)


def _show_exact(number: Fraction, unit: str, digits: int, sign: bool) -> str:
    if unit == FEET_INCHES:
        if abs(number) < _MOST_FEET_INCHES:
            return _feet_inches(number, digits, sign)
        unit = "ft"
    return _with_unit(_sign(number, sign, rounded := _round(abs(number), digits)) + _plain(rounded), unit)


def _with_unit(number: str, unit: str) -> str:
    return f"{number} {unit}" if unit else number


def _sign(number: Fraction, plus: bool, rounded: Fraction) -> str:
    if rounded == 0:
        return ""
    return "-" if number < 0 else "+" if plus else ""


def _read(number: Fraction, unit: str, digits: int) -> Fraction:
    """The number that a reader of the shown text has before them."""
    inches = unit == FEET_INCHES and abs(number) < _MOST_FEET_INCHES
    size = _round(abs(number) * 12, digits) / 12 if inches else _round(abs(number), digits)
    return -size if number < 0 else size


def _power(number: Fraction) -> int:
    """The power of ten of the first digit of a positive number."""
    top, bottom = number.numerator, number.denominator
    power = len(str(top)) - len(str(bottom))
    scaled = (top, bottom * 10**power) if power >= 0 else (top * 10**-power, bottom)
    return power if scaled[0] >= scaled[1] else power - 1


def _round(number: Fraction, digits: int) -> Fraction:
    """A non-negative number at this many significant digits, halves up; whole digits before the point all stay."""
    if number == 0:
        return number
    if digits < _SNAP:
        # What a user wrote comes back from a float a hair off; rounding halves needs the decimal they meant.
        number = _round_places(number, _SNAP - 1 - _power(number))
    power = _power(number)
    places = digits - 1 - power
    return _round_places(number, max(places, 0) if power < _PLAIN_TO else places)


def _round_places(number: Fraction, places: int) -> Fraction:
    top, bottom = number.numerator, number.denominator
    if places >= 0:
        return Fraction((2 * top * 10**places + bottom) // (2 * bottom), 10**places)
    unit = 10**-places
    return Fraction((2 * top + bottom * unit) // (2 * bottom * unit) * unit)


def _plain(number: Fraction) -> str:
    """The digits of a non-negative number whose decimal expansion ends."""
    if number == 0:
        return "0"
    power = _power(number)
    if _PLAIN_FROM <= power < _PLAIN_TO:
        return _decimal(number)
    return f"{_decimal(number / Fraction(10) ** power)}e{power}"


def _decimal(number: Fraction) -> str:
    whole, rest = divmod(number.numerator, number.denominator)
    places = ""
    while rest:
        digit, rest = divmod(rest * 10, number.denominator)
        places += str(digit)
    return f"{whole:,}" + (f".{places}" if places else "")


def _feet_inches(feet: Fraction, digits: int, sign: bool) -> str:
    inches = _round(abs(feet) * 12, digits)
    whole, rest = divmod(inches, 12)
    size = f"{_plain(rest)} in" if not whole else f"{_plain(Fraction(whole))} ft {_plain(rest)} in"
    return _sign(feet, sign, inches) + size
