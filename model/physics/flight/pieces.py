"""One piece of a flight, solved for all cases at once.

A planar point mass; u along the track and w downward are speeds relative to the air, V = hypot(u, w):

    z' = -w    x' = u + W(z)    u' = -k V u + w dW/dz    w' = g - k V w    k = density * drag area / (2 mass)

With the drag factor A(t) = exp(integral of k V dt), U = u A and P = w A the equations become exactly

    A' = k hypot(U, P)    P' = g A    U' = P dW/dz

in which nothing decays and nothing is singular, so that polynomials through a few nodes hold whole phases. Pieces by
time and by distance are solved by Newton's method with the mean Jacobian of the batch: a small matrix per iteration.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from functools import cached_property

import numpy as np

from .lobatto import Array, Lobatto
from .state import State
from .wind import Layer

ITERATIONS = 16
CONVERGED = 1.5e-7
"""Iterations end when the next change is estimated to be less, relative."""
SETUP = 5
"""Iterations that cost as much as all else about a piece."""

AreaAt = Callable[[Array], Array]
"""Area of the open canopies, m2, at fractions of a piece."""


class Workshop:
    """Work arrays by shape, and how much work may still be done.

    The histories of a piece live in the arrays until the next piece is solved; those of a single case stay.
    """

    def __init__(self) -> None:
        self.arrays: dict[tuple[int, int], list[Array]] = {}
        self.effort = np.inf
        """Iterations left."""

    def get(self, nodes: int, cases: int) -> list[Array]:
        """Arrays with 2 n, n + 2, n, n, n, n rows."""
        if cases == 1:
            return _new(nodes, 1)
        found = self.arrays.get((nodes, cases))
        if found is None:
            if len(self.arrays) > 7:
                self.arrays.clear()
            found = self.arrays[nodes, cases] = _new(nodes, cases)
        return found


def _new(nodes: int, cases: int) -> list[Array]:
    return [np.empty((rows, cases)) for rows in (2 * nodes, nodes + 2, nodes, nodes, nodes, nodes)]


@dataclass(frozen=True, eq=False)
class Piece:
    """Node histories of a solved piece. Speeds are `unit` U/A and `unit` P/A."""

    nodes: Lobatto
    start: State
    end: State
    area_at: AreaAt
    layer: Layer
    unit: Array | float
    """m/s."""
    A: Array
    U: Array
    P: Array
    drive: Array
    """dA / dtau."""
    z: Array
    density: Array
    """kg/m3, without a case's density factor."""
    pace: Array
    """Seconds per unit of tau: (cases,) or, of a piece followed by distance, (nodes, cases)."""
    pull: Array | float
    """dP / dtau = pull A."""

    @cached_property
    def square(self) -> Array:
        """U^2 + P^2."""
        square = self.P * self.P
        square += self.U * self.U
        return square

    @cached_property
    def square_slope(self) -> Array:
        """Slope of that square over tau."""
        slope = 2 * self.P * self.A * self.pull
        if self.layer.slope is not None:
            slope += 2 * self.U * self.P * (self.layer.slope * self.pace)
        return slope

    @cached_property
    def elapsed(self) -> Array:
        """Seconds since the start of the piece, (nodes, cases)."""
        if self.pace.ndim == 1:
            return self.pace * self.nodes.tau
        elapsed: Array = self.nodes.integral @ self.pace
        return elapsed

    def along(self) -> Array:
        """Way along the track over the ground since the start of the piece, m, (nodes, cases)."""
        over_ground = self.U / self.A * self.unit + self.layer.at(self.z)
        along: Array = self.nodes.integral @ (self.pace * over_ground)
        return along

    def through_air(self) -> Array:
        """Way through the air over the whole piece, m, (cases,)."""
        way: Array = self.nodes.integral[-1] @ (np.sqrt(self.square) / self.A * self.pace)
        return way * self.unit


def converge(step: Callable[[int], None], sample: Callable[[], Array], workshop: Workshop) -> Array:
    """Iterate until samples settle; an estimate of what is left to change, relative, (cases,)."""
    before = sample()
    change = left = np.ones(before.shape[1])
    for iteration in range(ITERATIONS):
        workshop.effort -= 1
        step(iteration)
        after = sample()
        change, previous = np.abs(after / before - 1).sum(0), change
        before = after
        shrinks = np.fmin(change / previous, 0.9)
        left = change * shrinks / (1 - shrinks)
        if iteration and not np.fmax.reduce(left) >= CONVERGED:     # nan: all cases are lost
            break
    workshop.effort -= SETUP
    return left


def end_of_piece(
    start: State, error: Array, nodes: Lobatto, layer: Layer, A: Array, U: Array, P: Array, z: Array, pace: Array,
    unit: Array | float,
) -> State:
    """The state at the end of a piece."""
    u = U / A * unit
    x = start.x + nodes.integral[-1] @ (pace * (u + layer.at(z)))
    t = start.t + (pace if pace.ndim == 1 else nodes.integral[-1] @ pace)
    w = P[-1] / A[-1] * unit
    return State(t, x, z[-1].copy(), u[-1], w, np.maximum(start.error, error), start.landed, start.layer)


def few_of(cases: int) -> slice:
    """Cases that stand for all in the Jacobian."""
    return slice(None, None, max(1, cases // 64))


def mean_of(jacobian: Array) -> Array:
    """Mean over the cases; a lost case must not spoil the others."""
    jacobian[~(np.abs(jacobian) < 1e9)] = 0
    mean: Array = jacobian @ np.full(jacobian.shape[1], 1 / jacobian.shape[1])
    return mean


def ripple(nodes: Lobatto, history: Array, scale: Array) -> Array:
    """The highest Legendre coefficients of a history against a scale."""
    found: Array = np.abs(nodes.last @ history).sum(0) / scale
    return found
