"""The flight of a single case as it was solved, piece by piece, and its curves."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass, field
from functools import partial

import numpy as np

from .glide import Glide
from .inputs import Drop, as_array
from .lobatto import Array, Lobatto, power_table
from .pieces import AreaAt, Piece
from .results import History


@dataclass(frozen=True, eq=False)
class Opening:
    """What is open during a stretch of one case's flight."""

    others: float
    """m2, of rows that do not fill."""
    coefficient: float
    """Opening coefficient of the row that fills."""
    filling: int
    """-1: none."""


NOTHING_FILLS = Opening(0.0, 1.0, -1)


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
class Track:
    """All that a single case flew, in order. Its pieces are kept as they are: curves are made only when asked for."""

    drop: Drop
    """Of arrays."""
    flown: list[Callable[[], Stretch]] = field(default_factory=list)

    def piece(self, piece: Piece, opening: Opening) -> None:
        """Add a piece; nobody may write into its arrays any more."""
        self.flown.append(partial(_of_piece, piece, opening))

    def glide(self, glide: Glide, area: Array) -> None:
        """Add a glide under a constant area, m2."""
        self.flown.append(partial(_of_glide, glide, area))

    def history(self, count: int) -> History:
        """The curves, half of the points by time and half by number of stretches."""
        drop, stretches = self.drop, [stretch() for stretch in self.flown]
        seconds = np.array([stretch.seconds for stretch in stretches])
        share = seconds / max(seconds.sum(), 1e-9) + 1 / max(len(stretches), 1)
        parts = [_sample(*one, count) for one in zip(stretches, share, strict=True)] or [_standing(drop)]
        t, way, z, u, w, area, weighted, filling = np.concatenate(parts, 1)
        t = np.maximum.accumulate(t)        # one stretch ends and the next starts at the same time but for rounding
        speed = np.hypot(u, w)
        density = float(as_array(drop.density_factor)[0]) * np.asarray(drop.density(z), float)
        pressure = 0.5 * density * speed * speed
        return History(
            time=t, height=z - float(as_array(drop.ground_altitude)[0]), distance=way, u=u, w=w, speed=speed,
            canopy_area=area, canopy_force=pressure * weighted, canopy_force_plain=pressure * area,
            filling=filling.astype(np.intp),
        )


def _sample(stretch: Stretch, share: float, count: int) -> Array:
    """Points of a stretch: t, x, z, u, w, open area, the same with the opening coefficient, filling; (8, points)."""
    x, opening = np.linspace(-1, stretch.last, max(3, round(count * share / 2))), stretch.opening
    area = np.broadcast_to(stretch.area_at(stretch.nodes.fraction(x)[:, None]), (len(x), 1))[:, 0]
    weighted = area + (opening.coefficient - 1) * (area - opening.others)
    return np.concatenate((stretch.at(x), [area, weighted, np.full(len(x), float(opening.filling))]))


def _standing(drop: Drop) -> Array:
    """A load released on the ground: one moment."""
    z, u = float(as_array(drop.ground_altitude)[0]), float(as_array(drop.airspeed)[0])
    return np.array([[0.0], [0.0], [z], [u], [0.0], [0.0], [0.0], [-1.0]])


def _of_piece(piece: Piece, opening: Opening) -> Stretch:
    start = piece.start
    moments, way = start.t + piece.elapsed, start.x + piece.along()
    rows = (moments, way, piece.z, piece.U * piece.unit, piece.P * piece.unit, piece.A)
    values = np.stack([np.broadcast_to(row, piece.A.shape)[:, 0] for row in rows])
    return Stretch(piece.nodes, values, piece.area_at, opening, 1.0)


def _of_glide(glide: Glide, area: Array) -> Stretch:
    rows = (glide.t, glide.x, glide.z, glide.u, glide.w, np.ones_like(glide.t))
    values = np.stack([row[:, 0] for row in rows])
    last = 1.0
    if glide.end.t[0] < glide.t[-1, 0]:
        depth = glide.z[0, 0] - glide.z[-1, 0]
        last = float(2 * (glide.z[0, 0] - glide.end.z[0]) / depth - 1)
    return Stretch(glide.nodes, values, _constant(area), NOTHING_FILLS, last)


def _constant(area: Array) -> Callable[[Array], Array]:
    return lambda tau: area
