"""How a field is read: one validator a field, and one message that says what may stand there.

A field gets its own plain validator instead of pydantic's unions and constraints: their branch names would end up in
key paths, and their messages know nothing of units.
"""

from collections.abc import Callable, Sequence
from datetime import date
from typing import Any, Final

from pydantic import BaseModel, ConfigDict, Field
from pydantic_core import core_schema

from model.quantity import Dimension, Quantity, QuantityError, expectation, parse, parse_number, quoted

SMALLEST, LARGEST = 1e-9, 1e12
"""Sizes in SI beyond which a value other than 0 is a slip of the pen; products of several stay finite floats."""


class _Lost:
    """Stands where a value could not be read, so that the rest of the file can still be checked."""

    def __deepcopy__(self, memo: object) -> "_Lost":
        return self


LOST: Final = _Lost()


class FieldError(QuantityError):
    """A value that may not stand in its field."""


class Rule:
    """The validator of one field, in the form pydantic builds fastest."""

    def __init__(self, read: Callable[[Any], Any]) -> None:
        self.read = read

    def __call__(self, found: Any) -> Any:
        """Read a value; a value lost before stays lost."""
        return None if found is LOST else self.read(found)

    def __get_pydantic_core_schema__(self, source: Any, handler: Any) -> core_schema.CoreSchema:
        return core_schema.no_info_plain_validator_function(self)


class Strict(BaseModel):
    """Base of every model: unknown keys refused, nothing converted, nothing changed later."""

    model_config = ConfigDict(extra="forbid", strict=True, frozen=True, allow_inf_nan=False, defer_build=True)


def optional(description: str) -> Any:
    """A field that may be missing."""
    return Field(default=None, description=description)


def required(description: str) -> Any:
    """A field that must be there."""
    return Field(description=description)


def rows(description: str) -> Any:
    """A table of rows, empty where the file has none; not strict, for a strict tuple refuses the lists of TOML."""
    return Field(default=(), strict=False, description=description)


def described(found: object) -> str:
    """What was found, for a message."""
    if isinstance(found, bool):
        return "true" if found else "false"
    if isinstance(found, dict):
        return "a table"
    if isinstance(found, list | tuple):
        return "a list"
    if isinstance(found, date):
        return found.isoformat()
    return quoted(found)


def nearest(word: str, known: Sequence[str]) -> str:
    """A hint naming the nearest known word, or nothing."""
    if len(word) > 60:
        return ""
    from difflib import get_close_matches  # only a mistake needs it

    near = get_close_matches(word.lower(), [name.lower() for name in known], 1, 0.6)
    return f'did you mean "{next(name for name in known if name.lower() == near[0])}"?' if near else ""


def quantity(
    dimension: Dimension,
    *,
    over: float | None = None,
    least: float | None = None,
    under: float | None = None,
    most: float | None = None,
    words: str = "",
    exact: bool = False,
) -> Rule:
    """A rule that reads a quantity and keeps it in its range.

    Args:
        dimension: what it measures.
        over: SI value it must be above.
        least: smallest SI value.
        under: SI value it must be below.
        most: largest SI value.
        words: the range in words, such as `a length over 0`.
        exact: whether a tolerance is refused.
    """
    expected = words or dimension.named

    def read(found: Any) -> Quantity:
        value = _read_quantity(found, dimension)
        reach = value.value - value.tolerance
        if (over is not None and value.value <= over) or (least is not None and value.value < least):
            raise FieldError(described(found), expected)
        if (under is not None and value.value >= under) or (most is not None and value.value > most):
            raise FieldError(described(found), expected)
        if (over == 0.0 and reach <= 0.0) or (least == 0.0 and reach < 0.0):
            raise FieldError(described(found), expected, "its tolerance reaches beyond")
        if value.value != 0.0 and not SMALLEST <= abs(value.value) <= LARGEST:
            raise FieldError(described(found), expected, "out of any reach")
        if exact and value.tolerance:
            raise FieldError(described(found), f"{expected} without a tolerance")
        return value

    return Rule(read)


def _read_quantity(found: Any, dimension: Dimension) -> Quantity:
    if dimension is Dimension.NUMBER:
        if not isinstance(found, int | float | str):
            raise FieldError(described(found), expectation(dimension))
        return parse_number(found)
    if not isinstance(found, str):
        bare = isinstance(found, int | float) and not isinstance(found, bool)
        raise FieldError(described(found), expectation(dimension), "in quotes, with its unit" if bare else "in quotes")
    return parse(found, dimension)


def choice(*words: str) -> Rule:
    """A rule for one of a few words."""
    expected = " or ".join(f'"{word}"' for word in words)

    def read(found: Any) -> str:
        if not isinstance(found, str):
            raise FieldError(described(found), expected)
        if found not in words:
            raise FieldError(described(found), expected, nearest(found, words))
        return found

    return Rule(read)


def positive(dimension: Dimension) -> Rule:
    """A quantity over 0."""
    return quantity(dimension, over=0.0, words=f"{dimension.named} over 0")


def not_negative(dimension: Dimension) -> Rule:
    """A quantity of 0 or over."""
    return quantity(dimension, least=0.0, words=f"{dimension.named} of 0 or over")
