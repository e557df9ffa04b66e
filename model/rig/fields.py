"""Field types of the models; each is a type with the one rule that reads it."""

import math
import unicodedata
from datetime import date, datetime
from typing import Annotated, Any, TypeAlias

from model.quantity import Dimension, Quantity, QuantityError
from model.rig.rule import FieldError, Rule, described, not_negative, positive, quantity

LONGEST_LINE, LONGEST_NOTE = 200, 20_000
"""Characters of a text of one line, and of a note."""


def _whole(least: int, most: int = 10_000) -> Rule:
    expected = f"a whole number of at least {least}"

    def read(found: Any) -> int:
        if not isinstance(found, int) or isinstance(found, bool) or found < least:
            raise FieldError(described(found), expected)
        if found > most:
            raise FieldError(described(found), expected, f"at most {most:,}")
        return found

    return Rule(read)


def _text(longest: int, *, lines: bool = False, empty: bool = False) -> Rule:
    expected = "a text" if lines else "a text of one line"

    def read(found: Any) -> str:
        if not isinstance(found, str):
            raise FieldError(described(found), expected, "in quotes")
        if not found.strip() and not empty:
            raise FieldError(described(found), expected, "it is empty")
        if len(found) > longest:
            raise FieldError(described(found), expected, f"at most {longest:,} characters")
        if not lines and found != found.strip():
            raise FieldError(described(found), expected, "without blanks at its ends")
        for mark in found:
            if _unprintable(mark) and not (lines and mark in "\n\r\t"):
                raise FieldError(described(found), expected, f"it holds the control character U+{ord(mark):04X}")
        return found

    return Rule(read)


def _unprintable(mark: str) -> bool:
    """Whether a character could move the cursor, hide or reorder what a terminal shows."""
    kind = unicodedata.category(mark)
    return kind[0] == "C" or kind in ("Zl", "Zp")


def _date(found: Any) -> date:
    if not isinstance(found, date) or isinstance(found, datetime):
        hint = "without quotes" if isinstance(found, str) else "without a time" if isinstance(found, datetime) else ""
        raise FieldError(described(found), "a date such as 2026-09-16", hint)
    return found


def _flag(found: Any) -> bool:
    if not isinstance(found, bool):
        raise FieldError(described(found), "true or false", "without quotes" if found in ("true", "false") else "")
    return found


def _point(names: str) -> Rule:
    """A list of lengths, one for each axis."""
    expected = f"a list of {len(names)} lengths [{', '.join(names)}]"

    def read(found: Any) -> tuple[Quantity, ...]:
        if not isinstance(found, list) or len(found) != len(names):
            count = f"a list of {len(found)}" if isinstance(found, list) else described(found)
            raise FieldError(count, expected)
        return tuple(_element(value, name, SIGNED_LENGTH) for name, value in zip(names, found, strict=True))

    return Rule(read)


def _pair(low: Rule, expected: str) -> Rule:
    """Two quantities, least and most."""

    def read(found: Any) -> tuple[Quantity, Quantity]:
        if not isinstance(found, list) or len(found) != 2:
            raise FieldError(described(found), expected)
        least, most = _element(found[0], "least", low), _element(found[1], "most", low)
        if least.value > most.value:
            raise FieldError(f"{described(found[0])} and {described(found[1])}", expected, "the least is over the most")
        return least, most

    return Rule(read)


def _element(found: Any, name: str, rule: Rule) -> Quantity:
    """One element of a list; its message says which."""
    try:
        value: Quantity = rule.read(found)
    except QuantityError as error:
        raise FieldError(f"{error.found} for {name}", error.expected, error.hint) from None
    return value


def _winds(found: Any) -> tuple[tuple[Quantity, Quantity], ...]:
    expected = 'a list of [height, speed] with rising heights, such as [["0 ft", "9 kt"], ["3,000 ft", "22 kt"]]'
    if not isinstance(found, list) or not found:
        raise FieldError(described(found) if found else "an empty list", expected)
    profile: list[tuple[Quantity, Quantity]] = []
    for count, row in enumerate(found, 1):
        if not isinstance(row, list) or len(row) != 2:
            raise FieldError(f"{described(row)} for wind {count}", expected)
        height = _element(row[0], f"the height of wind {count}", NOT_NEGATIVE_LENGTH)
        speed = _element(row[1], f"the speed of wind {count}", SIGNED_SPEED)
        if profile and height.value <= profile[-1][0].value:
            raise FieldError(f"{described(row[0])} for the height of wind {count}", expected)
        profile.append((height, speed))
    return tuple(profile)


SIGNED_LENGTH = quantity(Dimension.LENGTH)
NOT_NEGATIVE_LENGTH = not_negative(Dimension.LENGTH)
SIGNED_SPEED = quantity(Dimension.SPEED)
_MASS = positive(Dimension.MASS)
_DEGREE = math.pi / 180.0

Mass: TypeAlias = Annotated[Quantity, _MASS]
MassRange: TypeAlias = Annotated[
    tuple[Quantity, Quantity], _pair(not_negative(Dimension.MASS), "a list of two masses [least, most]")
]
Length: TypeAlias = Annotated[Quantity, positive(Dimension.LENGTH)]
LengthOrZero: TypeAlias = Annotated[Quantity, NOT_NEGATIVE_LENGTH]
Elevation: TypeAlias = Annotated[
    Quantity, quantity(Dimension.LENGTH, least=-500.0, most=20_000.0, words="a height between -500 m and 20 km")
]
Point: TypeAlias = Annotated[tuple[Quantity, Quantity, Quantity], _point("xyz")]
PlanPoint: TypeAlias = Annotated[tuple[Quantity, Quantity], _point("xy")]
Area: TypeAlias = Annotated[Quantity, positive(Dimension.AREA)]
AreaOrZero: TypeAlias = Annotated[Quantity, not_negative(Dimension.AREA)]
Speed: TypeAlias = Annotated[Quantity, positive(Dimension.SPEED)]
SpeedOrZero: TypeAlias = Annotated[Quantity, not_negative(Dimension.SPEED)]
Wind: TypeAlias = Annotated[Quantity, SIGNED_SPEED]
Winds: TypeAlias = Annotated[tuple[tuple[Quantity, Quantity], ...], Rule(_winds)]
Force: TypeAlias = Annotated[Quantity, positive(Dimension.FORCE)]
Pressure: TypeAlias = Annotated[Quantity, positive(Dimension.PRESSURE)]
AltimeterSetting: TypeAlias = Annotated[
    Quantity, quantity(Dimension.PRESSURE, least=85_000.0, most=110_000.0, words="a pressure between 850 and 1,100 hPa")
]
AirTemperature: TypeAlias = Annotated[
    Quantity,
    quantity(Dimension.TEMPERATURE, least=183.15, most=333.15, words="a temperature between -90 °C and 60 °C"),
]
Time: TypeAlias = Annotated[Quantity, positive(Dimension.TIME)]
TimeOrZero: TypeAlias = Annotated[Quantity, not_negative(Dimension.TIME)]
OffAxis: TypeAlias = Annotated[
    Quantity, quantity(Dimension.ANGLE, least=0.0, under=90.0 * _DEGREE, words="an angle from 0 to under 90 deg")
]
Acceleration: TypeAlias = Annotated[Quantity, positive(Dimension.ACCELERATION)]
Density: TypeAlias = Annotated[Quantity, positive(Dimension.DENSITY)]
Number: TypeAlias = Annotated[Quantity, positive(Dimension.NUMBER)]
DragCoefficient: TypeAlias = Annotated[
    Quantity, quantity(Dimension.NUMBER, over=0.0, most=5.0, words="a plain number over 0, at most 5")
]
Stretch: TypeAlias = Annotated[
    Quantity, quantity(Dimension.NUMBER, over=0.0, most=2.0, words="a stretch over 0, at most 2 (0.3 is 30 %)")
]
Efficiency: TypeAlias = Annotated[
    Quantity, quantity(Dimension.NUMBER, over=0.0, most=1.0, words="a number over 0, at most 1")
]
ClusterEfficiency: TypeAlias = Annotated[
    Quantity, quantity(Dimension.NUMBER, over=0.0, most=1.2, words="a number over 0, at most 1.2")
]
DragRatio: TypeAlias = Annotated[
    Quantity, quantity(Dimension.NUMBER, over=0.0, under=1.0, words="a ratio over 0 and under 1")
]
UnevenShare: TypeAlias = Annotated[Quantity, quantity(Dimension.NUMBER, least=1.0, words="a number of 1 or over")]
Multiple: TypeAlias = Annotated[
    Quantity, quantity(Dimension.NUMBER, least=0.0, words="a multiple of weight, 0 or over", exact=True)
]
Count: TypeAlias = Annotated[int, _whole(1)]
Revision: TypeAlias = Annotated[int, _whole(0, 1_000_000)]
Name: TypeAlias = Annotated[str, _text(LONGEST_LINE)]
Line: TypeAlias = Annotated[str, _text(LONGEST_LINE, empty=True)]
Sentence: TypeAlias = Annotated[str, _text(2_000)]
Note: TypeAlias = Annotated[str, _text(LONGEST_NOTE, lines=True, empty=True)]
Day: TypeAlias = Annotated[date, Rule(_date)]
Flag: TypeAlias = Annotated[bool, Rule(_flag)]


def _format(found: Any) -> int:
    if isinstance(found, bool) or found != 1 or not isinstance(found, int):
        raise FieldError(described(found), "format 1", "this version reads no other")
    return 1


Format: TypeAlias = Annotated[int, Rule(_format)]
