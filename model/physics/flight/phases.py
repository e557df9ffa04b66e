"""A batch from release to the ground, phase by phase."""

from __future__ import annotations

from dataclasses import replace

import numpy as np

from .glide import glide
from .inputs import Drop, Filling, FillingRule, Row, as_array
from .lobatto import Array
from .march import FEW_NODES, MANY_NODES, NODES, Course, Event, Flyer
from .notes import Columns, Notes
from .pieces import Piece
from .state import Mask, State
from .track import Track
from .trigger import NextRow

SPAN = 4.0
"""Longest piece, in units of V/g at the steady rate of descent; of a filling by distance in units of 1/k."""
LONG_SPAN = 10.0
"""The same with many nodes; a single case needs fewer calls so, and calls are all it costs."""
MANY_PIECES = 4
"""A batch takes them for a filling of more pieces of the usual kind than that."""
TOLERANCE = 5e-7
"""Accepted estimate of the relative error."""
HOLD_PIECES = 4000
"""Most pieces of one hold."""
LEAST = 1e-9
"""s, m or m/s; nothing is divided by less."""


def _deadline(until: Array) -> Event:
    """Stops at a time, s; inf never stops."""
    late = np.where(np.isinf(until), 1e30, until)
    return lambda piece: late - (piece.start.t + piece.elapsed)


def _count(spans: Array, longest: float) -> int:
    """How many pieces keep all cases within the longest span; lost cases (nan) have no say."""
    most = float(np.fmax.reduce(spans)) / longest
    return int(np.ceil(min(most, 1e6))) if most > 1 else 1


class Flight:
    """One batch; ``pieces`` multiplies the number of pieces of every phase."""

    def __init__(self, drop: Drop, rule: FillingRule, flyer: Flyer, pieces: int, track: Track | None) -> None:
        self.drop, self.rule, self.flyer, self.pieces = drop, rule, flyer, pieces
        self.ground, self.load, self.air, self.wind = flyer.ground, flyer.load, flyer.air, flyer.wind
        self.cases, self.notes = len(self.ground), Notes(drop, flyer, track)

    def run(self) -> Columns:
        """Fly; fields of `Motion` but rule and accurate."""
        state = self.free_fall()
        stretched = ~state.landed
        for number, row in enumerate(self.drop.rows):
            self.notes.note_line_stretch(number, state, stretched)
            following = self.drop.rows[number + 1] if number + 1 < len(self.drop.rows) else None
            ahead = NextRow(row, following, self.ground, np.where(stretched, state.t, 0.0))
            ahead.reached(state, stretched & (state.z <= ahead.trigger))
            state = self.fly_row(number, row, state, ahead, stretched)
            if following is not None:
                state, stretched = self.change_rows(number, row, state, ahead)
        return self.notes.results(state)

    def fly_row(self, number: int, row: Row, state: State, ahead: NextRow, stretched: Mask) -> State:
        """All fillings of a row, until it leaves, stops growing or lands."""
        line_stretch = np.where(stretched, state.t, np.inf)
        cutters = [line_stretch + (as_array(f.cutter) if i else 0.0) for i, f in enumerate(row.fillings)]
        nothing = np.full(self.cases, np.inf)
        for i, filling in enumerate(row.fillings):
            due = cutters[i] < ahead.leave if i else stretched
            start = due & ~state.landed
            following = cutters[i + 1] if i + 1 < len(cutters) else nothing
            state = self.fill(state, (number, i), filling, start, following, ahead)
            last = not ahead.exists and i + 1 == len(row.fillings)
            state = self.hold(state, following, ahead, last)
        return state

    def change_rows(self, number: int, row: Row, state: State, ahead: NextRow) -> tuple[State, Mask]:
        """From the moment the row before leaves or stops growing to line stretch of the next."""
        if row.when_next_opens == "goes at start":
            self.notes.open[number] = np.zeros(self.cases)
            ahead.at_start = False
            state = self.hold(state, np.full(self.cases, np.inf), ahead, False)
        elif row.when_next_opens == "goes at line stretch":
            self.notes.open[number] = np.zeros(self.cases)
        return state, ~state.landed

    def free_fall(self) -> State:
        """To line stretch of the first row: a given time, or a given distance from the aircraft flying on."""
        drop, row, zero = self.drop, self.drop.rows[0], np.zeros(self.cases)
        z = self.ground + as_array(drop.release_height)
        landed = z <= self.ground
        state = State(zero, zero, z, as_array(drop.airspeed), zero, zero, landed, self.wind.start(z))
        if row.line_stretch is None:
            return self.to_separation(state, as_array(row.static_line))
        rate = self.rate(z, zero)
        duration = np.minimum(np.maximum(as_array(row.line_stretch), 0), self.longest(state, rate))
        spans = duration * rate
        nodes = FEW_NODES if np.fmax.reduce(spans) < 1.5 else NODES
        course = Course(duration, self.ground, zero, nodes=nodes, pieces=self.pieces * _count(spans, SPAN))
        return self.flyer.fly(state, course, zero + 1, watch=self.notes.watch_free).state

    def to_separation(self, state: State, line: Array) -> State:
        """Free fall until load and aircraft are ``line``, m, apart."""
        drop, zero = self.drop, np.zeros(self.cases)
        top, over_ground = state.z, state.u + self.wind.at(state.z)

        def short(piece: Piece) -> Array:
            start = piece.start
            behind = over_ground * (start.t + piece.elapsed) - (start.x + piece.along())
            return line * line - behind * behind - (top - piece.z) ** 2

        braking = self.air(state.z) * as_array(drop.load_drag_area) * state.u**2 / self.load.doubled_mass
        guess = 1.1 * np.sqrt(2 * np.maximum(line, 0) / np.hypot(drop.gravity, braking))
        waiting = ~state.landed & (line > 0)
        for _ in range(200):
            if not waiting.any():
                break
            nodes = FEW_NODES if np.fmax.reduce(guess * self.rate(state.z, zero)) < 1.5 else NODES
            course = Course(guess, self.ground, zero, event=short, pieces=self.pieces, nodes=nodes)
            stop = self.flyer.fly(state, course, np.where(waiting, 1.0, 0.0), watch=self.notes.watch_free)
            state = stop.state
            waiting &= ~stop.at_event & ~state.landed
        return state.with_error(np.where(waiting, np.inf, 0.0))

    def fill(
        self, state: State, place: tuple[int, int], filling: Filling, start: Mask, following: Array, ahead: NextRow
    ) -> State:
        """One filling, cut short by the next cutter, the next row or the ground."""
        number, stage = place
        notes, record = self.notes, self.notes.fillings[number][stage]
        own, total, begun = notes.open[number], notes.total(), state.t
        nominal = self.filling_time(filling, state)
        by_distance = self.rule == "distance" and filling.filling_time is None
        notes.note_start(record, state, start, nominal)
        full = np.maximum(as_array(filling.fill_distance), LEAST) if by_distance else nominal
        added = as_array(filling.area) - own
        course = Course(full, ahead.floor, total, added, filling.exponent, by_distance)
        course = self.divide(course, state, start)
        watch = notes.watch_filling(record, number, filling, total - own)
        progress, begin, going = np.zeros(self.cases), None, start
        for _ in range(2):              # once more where the next row starts on the way, at its height
            until = np.minimum(following, ahead.leave)
            limit = np.where(going & (until > state.t), 1.0, progress)
            if not by_distance:
                limit = np.fmax(np.fmin(limit, (until - begun) / full), progress)
            late = _deadline(until) if by_distance and not np.isinf(until[going]).all() else None
            stop = self.flyer.fly(state, replace(course, floor=ahead.floor, event=late), limit, begin, watch)
            state, progress, begin = stop.state, stop.progress, stop.progress
            going = ahead.reached(state, stop.at_floor) & (ahead.leave > state.t) & (progress < 1)
            if not going.any():
                break
        notes.open[number] = np.where(start, own + added * progress**filling.exponent, own)
        notes.note_end(record, state, start, progress, notes.open[number] / as_array(filling.area))
        return state

    def filling_time(self, filling: Filling, state: State) -> Array:
        """Measured, or fill distance / speed, s."""
        if filling.filling_time is not None:
            return np.maximum(as_array(filling.filling_time), LEAST)
        return np.maximum(as_array(filling.fill_distance) / np.maximum(state.speed, LEAST), LEAST)

    def divide(self, course: Course, state: State, start: Mask) -> Course:
        """A filling in as many pieces as it needs at most, over the cases that fill."""
        area = course.base + (0.0 if course.added is None else course.added)
        if course.distance:
            spans = course.full * self.air(state.z) * (area + self.load.drag_area) / self.load.doubled_mass
            spans = np.maximum(spans, course.full * self.load.gravity / np.maximum(state.speed, 1) ** 2)
        else:
            rate = self.rate(state.z, area)
            spans = np.minimum(course.full, self.longest(state, rate)) * rate
        spans = np.where(start, spans, 0.0)
        usual = _count(spans, SPAN)
        enough = 1 if self.cases == 1 else MANY_PIECES
        if usual <= enough or course.exponent % 1:      # more nodes do not follow a fractional power better
            return replace(course, pieces=self.pieces * usual)
        return replace(course, pieces=self.pieces * _count(spans, LONG_SPAN), nodes=MANY_NODES)

    def hold(self, state: State, until: Array, ahead: NextRow, last: bool) -> State:
        """Constant area until a time, the next row or the ground; ``last``: look for the moment of slow descent."""
        area = self.notes.total()
        for count in range(HOLD_PIECES):
            floor = ahead.floor
            end = np.minimum(until, ahead.leave)
            waiting = ~state.landed & (end > state.t + 1e-9) & (state.z > floor)
            if not waiting.any():
                return state
            if count >= min(self.pieces, 8):
                state, waiting = self.try_glide(state, area, end, ahead, waiting)
                if not waiting.any():
                    continue
            rate = self.rate(state.z, area)
            spans = (end - state.t) * rate * (min(self.pieces, 8) / SPAN)
            evenly = (end - state.t) / np.maximum(np.ceil(spans), 1)
            duration = np.where(spans < 8, evenly, SPAN / min(self.pieces, 8) / rate)
            course = Course(duration, floor, area)
            stop = self.flyer.fly(state, course, np.where(waiting, 1.0, 0.0), watch=self.notes.watch_hold(last))
            state = stop.state
            ahead.reached(state, stop.at_floor)
        return state.with_error(np.where(waiting, np.inf, 0.0))

    def try_glide(self, state: State, area: Array, end: Array, ahead: NextRow, waiting: Mask) -> tuple[State, Mask]:
        """Glide with the cases for which it is accurate; the state, and the cases for which it is not."""
        layer = self.wind.layer(state.layer)
        floor = np.maximum(ahead.floor, layer.bottom)
        found = glide(state, area, floor, end, self.load, self.air, layer, FEW_NODES if self.pieces == 1 else NODES)
        worth = waiting & (found.error < TOLERANCE) & (state.z > floor)
        if not worth.any():
            return state, waiting
        self.notes.note_glide(found, area, worth)
        low = worth & found.at_floor
        kink, bottom = low & (floor > ahead.floor), low & (floor <= ahead.floor)
        after = found.end.where(worth, state)
        after = replace(
            after, layer=after.layer + kink, landed=after.landed | bottom & (ahead.floor <= self.ground),
            error=np.where(worth, np.maximum(after.error, found.error), after.error),
        )
        ahead.reached(after, bottom)
        return after, waiting & ~worth

    def rate(self, z: Array, area: Array) -> Array:
        """G / (steady rate of descent), 1/s."""
        return np.sqrt(self.air(z) * (area + self.load.drag_area) * (self.load.gravity / self.load.doubled_mass))

    def longest(self, state: State, rate: Array) -> Array:
        """A time, s, in which a load reaches the ground in any case."""
        return np.maximum(state.z - self.ground, 0) * rate * 1.5 / self.load.gravity + 5 / rate
