"""What a batch notes down as it flies: results of rows and fillings, and the moment of slow descent."""

from __future__ import annotations

from typing import Any

import numpy as np
from numpy.typing import NDArray

from .glide import Glide
from .inputs import Drop, Filling, as_array
from .lobatto import Array, root_after, values_at
from .march import Flyer, Watch
from .peaks import largest_force, largest_speed
from .pieces import AreaAt, Piece
from .record import FillingRecord, RowRecord
from .state import Mask, State
from .track import NOTHING_FILLS, Opening, Track

Columns = dict[str, NDArray[Any]]
SLOW = 1.05
"""Ratio of the speed to the steady rate at which a load counts as slowed down."""
SEA_LEVEL_DENSITY = 1.225
"""kg/m3, that equivalent airspeed refers to."""


class Notes:
    """Records of one batch."""

    def __init__(self, drop: Drop, flyer: Flyer, track: Track | None) -> None:
        self.drop, self.track = drop, track
        self.ground, self.load, self.air, self.wind = flyer.ground, flyer.load, flyer.air, flyer.wind
        self.cases = len(self.ground)
        self.factor = as_array(drop.density_factor)
        self.rows = [RowRecord(self.cases) for _ in drop.rows]
        self.fillings = [[FillingRecord(self.cases) for _ in row.fillings] for row in drop.rows]
        self.flat = [record for row in self.fillings for record in row]
        self.open = [np.zeros(self.cases) for _ in drop.rows]
        """Area of each row, m2, that is open now."""
        self.latest = np.full(self.cases, -1)
        """Number of the last filling that started, case by case."""
        self.slow_time, self.slow_height = np.full((2, self.cases), np.nan)

    def total(self) -> Array:
        """Area of all open canopies, m2."""
        total: Array = np.sum(self.open, axis=0)
        return total

    def number_of(self, record: FillingRecord) -> int:
        """Number of a filling, counted through all rows."""
        return next(i for i, one in enumerate(self.flat) if one is record)

    def note_line_stretch(self, number: int, state: State, where: Mask) -> None:
        """Record a row's line stretch."""
        record, drop = self.rows[number], self.drop
        release = self.ground + as_array(drop.release_height)
        aircraft = as_array(drop.airspeed) + self.wind.at(release)
        behind = aircraft - state.u - self.wind.layer(state.layer).at(state.z)

        def known(value: Array) -> Array:
            return np.where(where, value, np.nan)

        record.time, record.height, record.speed = known(state.t), known(state.z - self.ground), known(state.speed)
        density = self.air(state.z) * self.factor
        record.equivalent = known(state.speed * np.sqrt(density / SEA_LEVEL_DENSITY))
        record.angle = known(np.arctan2(state.w, state.u))
        record.relative = known(np.hypot(behind, state.w))

    def note_start(self, record: FillingRecord, state: State, start: Mask, nominal: Array) -> None:
        """Record the start of a filling."""
        record.started = start
        record.start_time, record.start_speed = np.where(start, state.t, np.nan), np.where(start, state.speed, np.nan)
        record.start_height = np.where(start, state.z - self.ground, np.nan)
        record.nominal = np.where(start, nominal, np.nan)
        record.top_speed = np.where(start, state.speed, 0.0)
        record.force.time = record.plain.time = record.start_time

    def note_end(self, record: FillingRecord, state: State, start: Mask, progress: Array, reached: Array) -> None:
        """Record the end of a filling, and the force at that moment as the first of the hold."""
        record.end_time = np.where(start, state.t, np.nan)
        record.full, record.reached = start & (progress >= 1), np.where(start, reached, 0.0)
        record.landed_in = start & state.landed & (progress < 1)
        self.latest = np.where(start, self.number_of(record), self.latest)
        record.hold.time = record.end_time
        pressure = 0.5 * self.air(state.z) * self.factor * (state.u**2 + state.w**2)
        self.note_hold(pressure, state.t, start)

    def note_hold(self, pressure: Array, time: Array, where: Mask) -> None:
        """Record a dynamic pressure, Pa, under constant areas."""
        force = pressure * self.total()
        for index, record in enumerate(self.flat):
            of_this = where & (self.latest == index)
            if of_this.any():
                record.hold.note(force, time, of_this)
        for row, area in zip(self.rows, self.open, strict=True):
            if area.any():
                row.force.note(pressure * area, time, where)

    def note_glide(self, glide: Glide, area: Array, where: Mask) -> None:
        """Record the largest dynamic pressure of a glide."""
        pressure, time = glide.largest_pressure()
        self.note_hold(pressure * self.factor, time, where)
        if self.track is not None:
            self.track.glide(glide, area)

    def watch_free(self, piece: Piece, flying: Mask) -> None:
        """Nothing is open: only a track takes note."""
        if self.track is not None and flying[0]:
            self.track.piece(piece, NOTHING_FILLS)

    def watch_filling(self, record: FillingRecord, number: int, filling: Filling, others: Array) -> Watch:
        """What to note of every piece of a filling; ``others`` is what else hangs open, m2."""
        coefficient, index = as_array(filling.opening_coefficient), self.number_of(record)
        row, alone = self.rows[number], not others.any()

        def watch(piece: Piece, flying: Mask) -> None:
            def force_of(area_at: AreaAt | None) -> tuple[Array, Array]:
                force, time = largest_force(piece, self.air, area_at, flying)
                return force * self.factor, time

            def own(tau: Array) -> Array:
                return coefficient * (piece.area_at(tau) - others)

            plain, time = force_of(piece.area_at)
            record.plain.note(plain, time, flying)
            if alone:
                record.force.note(coefficient * plain, time, flying)
                row.force.note(coefficient * plain, time, flying)
            else:
                record.force.note(*force_of(lambda tau: own(tau) + others), flying)
                row.force.note(*force_of(own), flying)
                pressure, time = force_of(None)
                for other, area in zip(self.rows, self.open, strict=True):
                    if other is not row and area.any():
                        other.force.note(pressure * area, time, flying)
            top = np.maximum(record.top_speed, largest_speed(piece, flying))
            record.top_speed = np.where(flying, top, record.top_speed)
            record.path = np.where(flying, record.path + piece.through_air(), record.path)
            if self.track is not None and flying[0]:
                self.track.piece(piece, Opening(float(others[0]), float(coefficient[0]), index))

        return watch

    def watch_hold(self, last: bool) -> Watch:
        """What to note of every piece of a hold."""

        def watch(piece: Piece, flying: Mask) -> None:
            pressure, time = largest_force(piece, self.air, None, flying)
            self.note_hold(pressure * self.factor, time, flying)
            if last:
                self.note_slow(piece, flying & np.isnan(self.slow_time))
            if self.track is not None and flying[0]:
                self.track.piece(piece, NOTHING_FILLS)

        return watch

    def note_slow(self, piece: Piece, wanted: Mask) -> None:
        """Record where V first is `SLOW` times the steady rate or less."""
        if not wanted.any():
            return
        nodes, area = piece.nodes, piece.area_at(piece.nodes.tau)
        scale = (area + self.load.drag_area) * (piece.unit**2 / (self.load.gravity * self.load.doubled_mass))
        excess = piece.density * scale * piece.square - SLOW**2 * piece.A * piece.A
        slow = excess <= 0
        first = slow.argmax(0)
        wanted = wanted & slow.any(0)
        x = root_after(nodes, excess, np.clip(first - 1, 0, len(excess) - 2), steps=2)
        x = np.where(first == 0, -1.0, x)
        height = values_at(nodes, x, piece.z)[0] - self.ground
        self.slow_time = np.where(wanted, piece.start.t + piece.pace * nodes.fraction(x), self.slow_time)
        self.slow_height = np.where(wanted, height, self.slow_height)

    def results(self, state: State) -> Columns:
        """Everything recorded, by the fields of `Motion`."""
        found: Columns = {}
        for records in (self.rows, self.flat):
            columns = [record.columns() for record in records]
            found |= {name: np.array([column[name] for column in columns]) for name in columns[0]}
        landed_in = np.full(self.cases, -1, np.intp)
        for index, record in enumerate(self.flat):
            landed_in = np.where(record.started, 2 * index + ~record.landed_in, landed_in)
        last = self.flat[-1]
        error = np.where(state.landed & ~np.isnan(state.error), state.error, np.inf)
        return found | {
            "slow_time": self.slow_time, "slow_height": self.slow_height, "touchdown_time": state.t,
            "touchdown_distance": state.x, "touchdown_speed": state.speed, "touchdown_descent": state.w,
            "landed_early": ~last.started | last.landed_in, "landed_in": landed_in, "error": error,
        }
