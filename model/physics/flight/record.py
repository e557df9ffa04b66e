"""Records that a batch fills in as it flies, and the history of a single case."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass, field
from typing import Any

import numpy as np
from numpy.typing import NDArray

from .glide import Glide
from .lobatto import Array, Lobatto, power_table
from .peaks import Peak
from .pieces import AreaAt, Piece


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


@dataclass(frozen=True, eq=False)
class Opening:
    """What is open during a stretch of one case's flight."""

    others: float
    """m2, of rows that do not fill."""
    coefficient: float
    """Opening coefficient of the row that fills."""
    filling: int
    """-1: none."""


@dataclass(frozen=True, eq=False)
class Stretch:
    """Node values of a stretch of one case's flight: t, x, z, and u A, w A, A; (6, nodes)."""

    nodes: Lobatto
    values: Array
    area_at: AreaAt
    opening: Opening
    last: float
    """The x (-1..1) at which the stretch ends."""

    @property
    def seconds(self) -> float:
        """How long it lasts."""
        return float(self.at(np.array([self.last]))[0, 0] - self.values[0, 0])

    def at(self, x: Array) -> Array:
        """Values t, x, z, u, w at some x, (5, points)."""
        values = self.values @ (self.nodes.powers.T @ power_table(x, len(self.nodes.x)))
        values = np.where(x == -1, self.values[:, :1], np.where(x == 1, self.values[:, -1:], values))   # no rounding
        t, way, z, U, W, A = values
        return np.stack([t, way, z, U / A, W / A])


@dataclass(eq=False)
class Recorder:
    """Collects the stretches of one case."""

    stretches: list[Stretch] = field(default_factory=list)

    def piece(self, piece: Piece, opening: Opening) -> None:
        """Add a piece."""
        start = piece.start
        moments, way = start.t + piece.elapsed, start.x + piece.along()
        rows = (moments, way, piece.z, piece.U * piece.unit, piece.P * piece.unit, piece.A)
        values = np.stack([np.broadcast_to(row, piece.A.shape)[:, 0] for row in rows])
        self.stretches.append(Stretch(piece.nodes, values, piece.area_at, opening, 1.0))

    def glide(self, glide: Glide, area: Array, opening: Opening) -> None:
        """Add a glide."""
        rows = (glide.t, glide.x, glide.z, glide.u, glide.w, np.ones_like(glide.t))
        values = np.stack([row[:, 0] for row in rows])
        last = 1.0
        if glide.end.t[0] < glide.t[-1, 0]:
            depth = glide.z[0, 0] - glide.z[-1, 0]
            last = float(2 * (glide.z[0, 0] - glide.end.z[0]) / depth - 1)
        self.stretches.append(Stretch(glide.nodes, values, _constant(area), opening, last))


def _constant(area: Array) -> Callable[[Array], Array]:
    return lambda tau: area
