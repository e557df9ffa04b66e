"""Units and their exact factors.

Each factor is composed from the few that are exact by definition (NIST SP 811, appendix B); no factor is typed twice.
Factors are kept as fractions, so that the same length written in feet, inches or yards becomes the same SI float.
"""

from __future__ import annotations

import math
from enum import StrEnum
from fractions import Fraction
from typing import NamedTuple


class Dimension(StrEnum):
    """What a quantity measures; `temperature` is absolute, in K."""

    MASS = "mass"
    LENGTH = "length"
    AREA = "area"
    SPEED = "speed"
    FORCE = "force"
    PRESSURE = "pressure"
    TEMPERATURE = "temperature"
    TIME = "time"
    ANGLE = "angle"
    ACCELERATION = "acceleration"
    DENSITY = "density"
    NUMBER = "number"

    @property
    def named(self) -> str:
        """The word with its article, for messages: `a length`, `an area`."""
        if self is Dimension.NUMBER:
            return "a plain number"
        return f"{'an' if self.value[0] in 'aeiou' else 'a'} {self.value}"


class Unit(NamedTuple):
    """A unit: SI value = number x factor + offset; the offset is in SI and only temperatures have one."""

    factor: Fraction
    offset: Fraction = Fraction(0)


_GRAVITY = Fraction("9.80665")
_INCH = Fraction("0.0254")
_FOOT = 12 * _INCH
_POUND = Fraction("0.45359237")
_POUND_FORCE = _POUND * _GRAVITY
_KILOGRAM_FORCE = _GRAVITY
_NAUTICAL_MILE = Fraction(1852)
_MILE = 5280 * _FOOT
_HOUR = Fraction(3600)
_DAY = 24 * _HOUR
_SLUG = _POUND_FORCE / _FOOT  # lbf s2/ft
_ICE_POINT = Fraction("273.15")
_PSF = _POUND_FORCE / _FOOT**2
_INCH_OF_MERCURY = Fraction("3386.389")  # conventional; SP 811 prints it rounded to seven digits
_DEGREE = Fraction(math.pi) / 180  # the only one that no fraction is exact for
_RANKINE = Fraction(5, 9)

FEET_INCHES = "ft in"
"""The unit of a length written like `8 ft 6 in`."""

_FACTORS: dict[Dimension, dict[str, Fraction]] = {
    Dimension.MASS: {
        "kg": Fraction(1), "g": Fraction(1, 1000), "t": Fraction(1000), "lb": _POUND, "oz": _POUND / 16,
    },
    Dimension.LENGTH: {
        "m": Fraction(1), "cm": Fraction(1, 100), "mm": Fraction(1, 1000), "km": Fraction(1000),
        "ft": _FOOT, "in": _INCH, "yd": 3 * _FOOT,
    },
    Dimension.AREA: {"m2": Fraction(1), "cm2": Fraction(1, 10000), "ft2": _FOOT**2, "in2": _INCH**2},
    Dimension.SPEED: {
        "m/s": Fraction(1), "km/h": 1000 / _HOUR, "ft/s": _FOOT, "ft/min": _FOOT / 60,
        "kt": _NAUTICAL_MILE / _HOUR, "mph": _MILE / _HOUR,
    },
    Dimension.FORCE: {
        "N": Fraction(1), "kN": Fraction(1000), "daN": Fraction(10), "kgf": _KILOGRAM_FORCE,
        "lbf": _POUND_FORCE, "lb": _POUND_FORCE,
    },
    Dimension.PRESSURE: {
        "Pa": Fraction(1), "kPa": Fraction(1000), "hPa": Fraction(100), "mbar": Fraction(100), "bar": Fraction(100_000),
        "psi": _POUND_FORCE / _INCH**2, "psf": _PSF, "lb/ft2": _PSF, "inHg": _INCH_OF_MERCURY,
    },
    Dimension.TEMPERATURE: {"°C": Fraction(1), "°F": _RANKINE, "K": Fraction(1)},
    Dimension.TIME: {
        "s": Fraction(1), "min": Fraction(60), "h": _HOUR, "d": _DAY, "yr": Fraction("365.25") * _DAY,
    },
    Dimension.ANGLE: {"deg": _DEGREE, "rad": Fraction(1)},
    Dimension.ACCELERATION: {"g": _GRAVITY, "m/s2": Fraction(1)},
    Dimension.DENSITY: {"kg/m3": Fraction(1), "slug/ft3": _SLUG / _FOOT**3},
    Dimension.NUMBER: {"": Fraction(1), "%": Fraction(1, 100)},
}

_OFFSETS = {"°C": _ICE_POINT, "°F": _ICE_POINT - 32 * _RANKINE}

UNITS: dict[Dimension, dict[str, Unit]] = {
    dimension: {name: Unit(factor, _OFFSETS.get(name, Fraction(0))) for name, factor in factors.items()}
    for dimension, factors in _FACTORS.items()
}
"""Every unit of every dimension by its canonical name."""
UNITS[Dimension.LENGTH][FEET_INCHES] = UNITS[Dimension.LENGTH]["ft"]

_ALIASES = {
    "degC": "°C", "degF": "°F", "deg C": "°C", "deg F": "°F", "° C": "°C", "° F": "°F", "ºC": "°C", "ºF": "°F",
    "℃": "°C", "℉": "°F", "°": "deg", "º": "deg", "lbf/ft2": "lb/ft2",
}  # fmt: skip
_SPELLINGS = str.maketrans({"²": "2", "³": "3", "^": None})


def canonical(text: str) -> str:
    """The canonical spelling of a unit as typed (`ft²`, `ft^2` and `ft2` are one); unknown text comes back trimmed."""
    name = " ".join(text.translate(_SPELLINGS).split())
    return _ALIASES.get(name, name)


def unit_names(dimension: Dimension) -> tuple[str, ...]:
    """The units a quantity of this dimension may be written in."""
    return tuple(name for name in UNITS[dimension] if name and name != FEET_INCHES)


def dimensions_of(unit: str) -> tuple[Dimension, ...]:
    """The dimensions that know a unit; empty for an unknown one."""
    return tuple(dimension for dimension, units in UNITS.items() if unit in units)


def scale_and_offset(unit: str, dimension: Dimension) -> tuple[float, float]:
    """Factor and offset of a unit as floats, for arrays: SI = number x factor + offset.

    Raises:
        KeyError: the dimension has no such unit.
    """
    known = UNITS[dimension][unit]
    return float(known.factor), float(known.offset)


def to_unit(value_si: float, unit: str, dimension: Dimension) -> float:
    """An SI value in another unit, rounded once; nan and inf stay what they are.

    Raises:
        KeyError: the dimension has no such unit.
    """
    known = UNITS[dimension][unit]
    if not math.isfinite(value_si):
        return value_si
    return _rounded((Fraction(value_si) - known.offset) / known.factor)


def from_unit(value: float, unit: str, dimension: Dimension) -> float:
    """A number of a unit as SI value, rounded once; nan and inf stay what they are.

    Raises:
        KeyError: the dimension has no such unit.
    """
    known = UNITS[dimension][unit]
    if not math.isfinite(value):
        return value
    return _rounded(Fraction(value) * known.factor + known.offset)


def difference_to_unit(difference_si: float, unit: str, dimension: Dimension) -> float:
    """A difference or tolerance in SI as a number of a unit: 5 K are 9 °F, and no ice point comes in.

    Raises:
        KeyError: the dimension has no such unit.
    """
    known = UNITS[dimension][unit]
    if not math.isfinite(difference_si):
        return difference_si
    return _rounded(Fraction(difference_si) / known.factor)


def _rounded(exact: Fraction) -> float:
    """The nearest float; a size no float holds becomes infinite instead of an exception."""
    try:
        return float(exact)
    except OverflowError:
        return math.inf if exact > 0 else -math.inf
