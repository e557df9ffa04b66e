"""When the next row opens, case by case."""

from __future__ import annotations

import numpy as np

from .inputs import Row, as_array
from .lobatto import Array
from .state import Mask, State


class NextRow:
    """Start of opening, line stretch, and the moment at which the row before leaves or stops growing."""

    def __init__(self, before: Row, row: Row | None, ground: Array, line_stretch: Array) -> None:
        never = np.full_like(ground, np.inf)
        self.ground, self.exists = ground, row is not None
        self.start, self.delay, self.trigger = never, np.zeros_like(ground), ground
        self.at_start = before.when_next_opens == "goes at start"
        if row is None:
            return
        self.delay = np.maximum(as_array(row.deployment_time), 0)
        if row.opens_after is not None:
            self.start = np.maximum(as_array(row.opens_after), line_stretch)
        else:
            self.trigger = ground + np.maximum(as_array(row.opens_at_height), 0)

    @property
    def line_stretch(self) -> Array:
        """Seconds after release; inf where not known yet."""
        return self.start + self.delay

    @property
    def leave(self) -> Array:
        """Seconds after release, the moment that ends the fillings of the row before; inf where not known yet."""
        return self.start if self.at_start else self.line_stretch

    @property
    def floor(self) -> Array:
        """Altitude, m, not to pass before the next row starts, or the ground."""
        return np.where(np.isinf(self.start), self.trigger, self.ground)

    def reached(self, state: State, where: Mask) -> Mask:
        """Start the next row where a case is at or below its trigger height; the cases that start now."""
        low = where & np.isinf(self.start) & ~state.landed & self.exists & (self.trigger > self.ground)
        self.start = np.where(low, state.t, self.start)
        return low
