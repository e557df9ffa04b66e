"""Where every case is at one moment."""

from __future__ import annotations

from dataclasses import dataclass, replace

import numpy as np
from numpy.typing import NDArray

from .lobatto import Array

Mask = NDArray[np.bool_]


@dataclass(frozen=True, eq=False)
class State:
    """All cases at the end of a piece; SI."""

    t: Array
    """s after release."""
    x: Array
    """m along the track, over the ground."""
    z: Array
    """m, altitude."""
    u: Array
    """m/s along the track, relative to the air."""
    w: Array
    """m/s downward."""
    error: Array
    """Largest estimate of a relative error so far."""
    landed: Mask
    """No phase lasts any time after landing."""
    layer: NDArray[np.intp]
    """Layer of the wind."""

    @property
    def speed(self) -> Array:
        """Speed through the air, m/s."""
        return np.hypot(self.u, self.w)

    def where(self, chosen: Mask, other: State) -> State:
        """This state for the chosen cases, the other one for the rest."""
        if chosen.all():
            return self
        names = ("t", "x", "z", "u", "w", "error", "landed", "layer")
        return State(*(np.where(chosen, getattr(self, name), getattr(other, name)) for name in names))

    def with_error(self, error: Array) -> State:
        """The same with the larger of two error estimates."""
        return replace(self, error=np.maximum(self.error, error))


@dataclass(frozen=True, eq=False)
class Load:
    """What does not change during a flight, and the area that a leg opens."""

    doubled_mass: Array
    """kg, 2 m / density factor."""
    drag_area: Array
    """m2, of the load."""
    gravity: float


class Growth:
    """Area of the open canopies over a leg, as a function of the fraction s = 0..1 of the leg.

    area(s) = base + added (begin + span s)^exponent. With ``begin`` None the leg starts where the filling
    starts, and the power is that of a number instead of one per case.
    """

    def __init__(
        self, base: Array, added: Array | None = None, exponent: float = 1.0,
        begin: Array | None = None, span: Array | float = 1.0,
    ) -> None:
        self.base, self.added, self.exponent, self.begin, self.span = base, added, exponent, begin, span
        self.scaled = None if added is None else added * span**exponent

    def at(self, s: Array | float) -> Array:
        """Area, m2, at fractions s: a number, a column (nodes, 1), (cases,) or (nodes, cases)."""
        if self.added is None or self.scaled is None:
            return self.base
        if self.begin is None:
            return self.base + self.scaled * s**self.exponent
        area: Array = self.base + self.added * (self.begin + self.span * s) ** self.exponent
        return area

    @property
    def fractional(self) -> bool:
        """Whether the growth is not smooth at its start."""
        return self.added is not None and self.exponent % 1 != 0
