"""Round tick values for an axis, and their labels; the one place where a scale is divided."""

from __future__ import annotations

import math
from dataclasses import dataclass

# Past these a label in full would be longer than it is clear.
_LARGEST_IN_FULL = 10_000_000
_MOST_DECIMALS = 6


@dataclass(frozen=True)
class Tick:
    """One mark of a scale: where it is and what stands beside it."""

    value: float
    label: str


@dataclass(frozen=True)
class Step:
    """The distance between ticks, ``factor`` x 10^``exponent`` with a factor of 1, 2 or 5."""

    factor: int
    exponent: int

    def times(self, count: int) -> float:
        """``count`` steps as the nearest float; no rounding error adds up along the scale."""
        if self.exponent < 0:
            return float(count * self.factor / 10**-self.exponent)
        return float(count * self.factor * 10**self.exponent)

    def label(self, count: int) -> str:
        """``count`` steps in decimal digits, exactly."""
        digits = str(abs(count * self.factor))
        sign = "-" if count < 0 else ""
        if count == 0:
            return "0"
        if abs(self.times(count)) >= _LARGEST_IN_FULL or -self.exponent > _MOST_DECIMALS:
            power = len(digits) - 1 + self.exponent
            rest = digits[1:].rstrip("0")
            return f"{sign}{digits[0]}{'.' + rest if rest else ''}e{power}"
        if self.exponent >= 0:
            return f"{sign}{int(digits) * 10**self.exponent:,}"
        padded = digits.rjust(1 - self.exponent, "0")
        return f"{sign}{int(padded[: self.exponent]):,}.{padded[self.exponent :]}"


def round_step(low: float, high: float, most: int) -> Step:
    """The smallest round step that divides a range into at most ``most`` intervals.

    Args:
        low: Lower end, finite.
        high: Upper end, finite, greater than ``low``.
        most: Largest number of intervals, at least 1.
    """
    least = (high - low) / most * (1.0 - 1e-9)
    exponent = math.floor(math.log10(least))
    for factor in (1, 2, 5):
        if Step(factor, exponent).times(1) >= least:
            return Step(factor, exponent)
    return Step(1, exponent + 1)


def ticks_within(low: float, high: float, most: int) -> list[Tick]:
    """Ticks at all round values inside a range, as `round_step` divides it."""
    step = round_step(low, high, most)
    size = step.times(1)
    first, last = math.ceil(low / size - 1e-6), math.floor(high / size + 1e-6)
    return [Tick(step.times(count), step.label(count)) for count in range(first, last + 1)]


def ticks_around(low: float, high: float, most: int) -> list[Tick]:
    """Ticks from the round value at or below a range to the one at or above it, as `round_step` divides it."""
    step = round_step(low, high, most)
    size = step.times(1)
    first, last = math.floor(low / size + 1e-6), math.ceil(high / size - 1e-6)
    return [Tick(step.times(count), step.label(count)) for count in range(first, last + 1)]
