"""Records that a batch fills in as it flies."""

from __future__ import annotations

from typing import Any

import numpy as np
from numpy.typing import NDArray

from .lobatto import Array
from .peaks import Peak


class FillingRecord:
    """Results of one filling, (cases,)."""

    def __init__(self, cases: int) -> None:
        unknown = np.full(cases, np.nan)
        self.started = np.zeros(cases, bool)
        self.full = np.zeros(cases, bool)
        self.landed_in = np.zeros(cases, bool)
        self.start_time = self.start_speed = self.start_height = self.nominal = self.end_time = unknown
        self.reached = self.path = self.top_speed = np.zeros(cases)
        self.force, self.plain, self.hold = Peak(cases), Peak(cases), Peak(cases)

    def columns(self) -> dict[str, NDArray[Any]]:
        """Fields of `Motion`."""

        def known(value: Array) -> Array:
            return np.where(self.started, value, np.nan)

        return {
            "started": self.started, "start_time": self.start_time, "start_speed": self.start_speed,
            "start_height": self.start_height, "nominal_fill_time": self.nominal, "end_time": self.end_time,
            "fill_time": self.end_time - self.start_time, "full": self.full, "reached": known(self.reached),
            "fill_path": known(self.path),
            "speed_ratio": np.maximum(self.top_speed / np.maximum(self.start_speed, 1e-9), 1),
            "fill_force": self.force.value, "fill_force_time": self.force.time,
            "fill_force_plain": self.plain.value, "fill_force_plain_time": self.plain.time,
            "hold_force": self.hold.value, "hold_force_time": self.hold.time,
        }


class RowRecord:
    """Results of one row, (cases,)."""

    def __init__(self, cases: int) -> None:
        unknown = np.full(cases, np.nan)
        self.time = self.height = self.speed = self.equivalent = self.angle = self.relative = unknown
        self.force = Peak(cases)

    def columns(self) -> dict[str, NDArray[Any]]:
        """Fields of `Motion`."""
        return {
            "line_stretch_time": self.time, "line_stretch_height": self.height, "line_stretch_speed": self.speed,
            "line_stretch_equivalent_speed": self.equivalent, "line_stretch_angle": self.angle,
            "line_stretch_relative_speed": self.relative, "row_force": self.force.value,
        }
