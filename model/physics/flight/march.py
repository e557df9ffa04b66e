"""Flying a phase: piece after piece, layer of wind after layer, until it is over or something stops it."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass, replace

import numpy as np

from .by_distance import by_distance
from .by_time import by_time
from .density import Air
from .lobatto import Array, lobatto, root_after
from .pieces import AreaAt, Piece, Workshop
from .state import Growth, Load, Mask, State
from .wind import Layer, Wind

NODES, FEW_NODES, MANY_NODES = 14, 7, 24
"""Nodes of a piece; of a short free fall and of a glide; of a long filling."""
GRADE = 2
"""Grade of the first piece of a filling with a fractional exponent."""
MORE_LEGS = 300
"""Most legs of a phase beyond one for each layer."""
STEEP = 1.0
"""Legs are kept short where a wind, followed below its layer, would change more than so many rates of descent."""
AT_ONCE = 500
"""Most pieces of one leg."""

Watch = Callable[[Piece, Mask], None]
"""Called with every piece as it is flown, and the cases that fly it."""
Event = Callable[[Piece], Array]
"""Node history of something that stops a case when it falls below zero."""


@dataclass(frozen=True, eq=False)
class Course:
    """A phase to be flown: the area that opens, and what may stop it. Progress 0..1 is that of the filling."""

    full: Array
    """s, or m through the air with `distance`, from progress 0 to 1."""
    floor: Array
    """m, altitude."""
    base: Array
    """m2, open at progress 0."""
    added: Array | None = None
    """m2, opened at progress 1; None: the area is constant."""
    exponent: float = 1.0
    distance: bool = False
    event: Event | None = None
    nodes: int = NODES
    pieces: int = 1


@dataclass(frozen=True, eq=False)
class Stop:
    """How a phase ended."""

    state: State
    progress: Array
    at_floor: Mask
    at_event: Mask


class Flyer:
    """Flies courses for one batch."""

    def __init__(self, load: Load, air: Air, wind: Wind, ground: Array, workshop: Workshop) -> None:
        self.load, self.air, self.wind, self.ground, self.workshop = load, air, wind, ground, workshop

    def fly(
        self, state: State, course: Course, end: Array, begin: Array | None = None, watch: Watch | None = None
    ) -> Stop:
        """Fly from progress ``begin`` (None: 0) to ``end``, (cases,), or to the first stop."""
        progress = np.zeros_like(end) if begin is None else begin
        flying = (end > progress) & ~state.landed & (state.z > course.floor)
        at_floor = at_event = np.zeros_like(flying)
        for _ in range(len(self.wind.bottoms) + MORE_LEGS):
            if not flying.any():
                break
            layer = self.wind.layer(state.layer)
            floor = np.maximum(course.floor, layer.bottom) if self.wind.layered else course.floor
            left = np.where(flying, end - progress, 0.0)
            span = left if layer.slope is None else self._within_layer(state, course, layer.slope, floor, left)
            growth = Growth(course.base, course.added, course.exponent, begin, span)
            in_layer = replace(course, floor=floor) if self.wind.layered else course
            leg = self._leg(state, in_layer, span * course.full, growth, layer, watch)
            if self.workshop.effort < 0:
                return self._give_up(leg, progress, flying)
            progress = np.where(flying & (leg.progress == 1) & (span == left), end, progress + span * leg.progress)
            state, begin = leg.state, progress
            at_event = at_event | leg.at_event
            low = leg.at_floor & (floor <= course.floor)
            at_floor = at_floor | low
            kink = leg.at_floor & ~low
            flying = (kink | flying & (span < left) & ~leg.at_event & ~low) & (progress < end)
            if self.wind.layered:
                state = replace(state, layer=state.layer + kink)
        landed = state.landed | at_floor & (course.floor <= self.ground)
        state = replace(state, landed=landed, error=np.where(flying, np.inf, state.error))
        return Stop(state, progress, at_floor, at_event)

    def _give_up(self, leg: Stop, progress: Array, flying: Mask) -> Stop:
        """What flies is lost, and nothing more is done for it."""
        state = leg.state.with_error(np.where(flying, np.inf, 0.0))
        nowhere = np.zeros_like(flying)
        return Stop(replace(state, landed=state.landed | flying), progress, nowhere, nowhere)

    def _within_layer(self, state: State, course: Course, slope: Array, floor: Array, span: Array) -> Array:
        """Shorter spans where a steep wind, followed far below its layer, would carry the load off."""
        height = np.maximum(state.z - floor, 0)
        g = self.load.gravity
        vacuum = 2 * height / (state.w + np.sqrt(state.w**2 + 2 * g * height) + 1e-12)
        reach = 3 * vacuum + 1e-6
        full = course.full / np.maximum(state.speed, 1e-3) if course.distance else course.full
        steep = np.abs(slope) * (span * full - reach) > STEEP
        return np.where(steep, np.minimum(span, reach / full), span)

    def _leg(
        self, state: State, course: Course, length: Array, growth: Growth, layer: Layer, watch: Watch | None
    ) -> Stop:
        """One course within one layer of wind; progress counts 0..1 over the leg."""
        pieces = min(course.pieces, AT_ONCE)
        flying = length > 0
        reached, at_floor, at_event = np.zeros_like(length), np.zeros_like(flying), np.zeros_like(flying)
        for i in range(pieces):
            part = np.where(flying, length / pieces, 0.0)
            graded = i == 0 and growth.fractional
            piece = self._solve(state, course, part, _area_at(growth, i, pieces, None), layer, graded)
            fraction, by_event = self._crossing(piece, course, flying)
            if (fraction < 1).any():
                piece, fraction = self._cut(piece, course, part, growth, (i, pieces), layer, graded, fraction, by_event)
            if watch is not None:
                watch(piece, flying)
            state = piece.end.where(flying, state)
            reached = np.where(flying, (i + fraction) / pieces, reached)
            stopped = flying & (fraction < 1)
            at_event, at_floor = at_event | stopped & by_event, at_floor | stopped & ~by_event
            flying = flying & ~stopped
            if not flying.any() or self.workshop.effort < 0:
                break
        return Stop(state, reached, at_floor, at_event)

    def _solve(
        self, state: State, course: Course, part: Array, area_at: AreaAt, layer: Layer, graded: bool
    ) -> Piece:
        nodes = lobatto(course.nodes, GRADE if graded else 1)
        solve = by_distance if course.distance else by_time
        return solve(state, part, area_at, self.load, self.air, layer, nodes, self.workshop)

    def _crossing(self, piece: Piece, course: Course, flying: Mask) -> tuple[Array, Mask]:
        """Fraction of the piece at which each case stops (1: it does not), and whether the event stops it."""
        fraction = np.ones(len(course.floor))
        by_event = np.zeros(len(course.floor), bool)
        low = flying & (piece.end.z < course.floor)
        if low.any():
            fraction[low] = _first_root(piece, piece.z[:, low] - course.floor[low])
        if course.event is not None:
            history = course.event(piece)
            over = flying & (history[-1] < 0)
            if over.any():
                at = _first_root(piece, history[:, over])
                by_event[over] = at <= fraction[over]
                fraction[over] = np.fmin(fraction[over], at)
        return fraction, by_event

    def _cut(
        self, piece: Piece, course: Course, part: Array, growth: Growth, place: tuple[int, int], layer: Layer,
        graded: bool, fraction: Array, by_event: Mask,
    ) -> tuple[Piece, Array]:
        """The piece again, only as far as each case's stop, which is made exact on the way."""
        start, stopping = piece.start, fraction < 1
        missed = np.zeros_like(fraction)
        for _ in range(4):
            area_at = _area_at(growth, *place, fraction)
            piece = self._solve(start, course, part * fraction, area_at, layer, graded)
            history = piece.z - course.floor
            if course.event is not None and by_event.any():
                history = np.where(by_event, course.event(piece), history)
            slope = (piece.nodes.slope[-1] @ history) / piece.nodes.stretch[-1]
            miss = np.where(stopping, history[-1] / slope, 0.0)
            missed = np.abs(miss) * (piece.end.t - start.t) / np.maximum(piece.end.t, 1e-9)
            if not (missed > 1e-9).any():
                break
            fraction = np.where(stopping, np.clip(fraction * (1 - miss), 1e-12, 1 - 1e-15), fraction)
        return replace(piece, end=piece.end.with_error(missed)), fraction


def _area_at(growth: Growth, i: int, pieces: int, fraction: Array | None) -> AreaAt:
    if fraction is None:
        return lambda tau: growth.at((i + tau) / pieces)
    return lambda tau: growth.at((i + fraction * tau) / pieces)


def _first_root(piece: Piece, history: Array) -> Array:
    """Fraction of the piece where a history that ends below zero first gets there."""
    first = (history < 0).argmax(0)
    x = root_after(piece.nodes, history, np.clip(first - 1, 0, len(history) - 2))
    return np.clip(piece.nodes.fraction(x), 1e-12, 1 - 1e-15)
