"""One piece of a flight, solved for all cases at once.

A planar point mass; u along the track and w downward are speeds relative to the air, V = hypot(u, w):

    z' = -w    x' = u + W(z)    u' = -k V u + w dW/dz    w' = g - k V w    k = density * drag area / (2 mass)

With the drag factor A(t) = exp(integral of k V dt), U = u A and P = w A the equations become exactly

    A' = k hypot(U, P)    P' = g A    U' = P dW/dz

in which nothing decays and nothing is singular, so that polynomials through a few nodes hold whole phases. Both forms
below are solved by Newton's method with the mean Jacobian of the batch: a small constant matrix per iteration.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from functools import cached_property

import numpy as np

from .density import Air
from .lobatto import Array, Lobatto
from .state import Load, State
from .wind import Layer

ITERATIONS = 16
CONVERGED = 1.5e-7
"""Iterations end when the next change is estimated to be less, relative."""
SLOWEST = 1e-6
"""m/s; a flight through the air by distance is not followed below."""

AreaAt = Callable[[Array], Array]
"""Area of the open canopies, m2, at fractions of a piece."""


class Buffers:
    """Work arrays by shape; the histories of a piece live in them until the next piece is solved."""

    def __init__(self) -> None:
        self.arrays: dict[tuple[int, int], list[Array]] = {}

    def get(self, nodes: int, cases: int) -> list[Array]:
        """Arrays with 2 n, n + 2, n, n, n, n rows."""
        found = self.arrays.get((nodes, cases))
        if found is None:
            if len(self.arrays) > 7:
                self.arrays.clear()
            found = [np.empty((rows, cases)) for rows in (2 * nodes, nodes + 2, nodes, nodes, nodes, nodes)]
            self.arrays[nodes, cases] = found
        return found


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


def by_time(
    start: State, duration: Array, area_at: AreaAt, load: Load, air: Air, layer: Layer, nodes: Lobatto,
    buffers: Buffers,
) -> Piece:
    """Solve a piece that lasts so many seconds, (cases,)."""
    count, cases = len(nodes.x), len(duration)
    PA, source, drive, z, density, strength = buffers.get(count, cases)
    P, A, scratch = PA[:count], PA[count:], source[:count]
    duration = np.maximum(duration, 1e-9)               # a piece that does not happen lasts a nanosecond
    fall = load.gravity * duration
    depth = fall * duration
    U = start.u / fall                                  # now P' = A and A' = strength hypot(U, P)
    source[count], source[count + 1] = start.w / fall, 1
    np.add(source[count], nodes.tau, out=P)             # first guess: no drag
    A[:] = 1
    per_density = (area_at(nodes.tau) + load.drag_area) * (depth / load.doubled_mass)
    density[:] = air(start.z)
    np.multiply(per_density, density, out=strength)
    side = U * U
    change = left = np.ones(cases)
    few = slice(None, None, max(1, cases // 64))        # cases that stand for all in the Jacobian
    jacobian, to_PA = np.empty(count), np.empty((2 * count, count + 2))
    for iteration in range(ITERATIONS):
        if iteration < 2:
            each = P[:, few] / (np.sqrt(P[:, few] ** 2 + side[..., few]) + 1e-30) * strength[..., few]
            jacobian = _mean(each)
            to_PA = _newton(nodes, jacobian)
        before = _sample(PA, density)
        np.multiply(P, P, out=drive)
        drive += side
        np.sqrt(drive, out=drive)
        drive *= strength
        np.multiply(P, jacobian[:, None], out=scratch)
        np.subtract(drive, scratch, out=scratch)
        np.matmul(to_PA, source, out=PA)
        np.divide(P, A, out=scratch)
        np.matmul(nodes.integral, scratch, out=z)
        z *= -depth
        z += start.z
        if layer.slope is not None:
            U = start.u / fall + (layer.slope * duration) * (nodes.integral @ P)
            side = U * U
        air(z, density, scratch)
        np.multiply(per_density, density, out=strength)
        change, previous = np.abs(_sample(PA, density) / before - 1).sum(0), change
        left = _left(change, previous)
        if iteration and np.fmax.reduce(left) < CONVERGED:
            break
    ripple = 0.02 * _ripple(nodes, drive, A[-1]) + 0.1 * _ripple(nodes, density, density[-1])
    end = _end(start, np.maximum(left, ripple), nodes, layer, A, U, P, z, duration, fall)
    return Piece(nodes, start, end, area_at, layer, fall, A, U, P, drive, z, density, duration, 1.0)


def _newton(nodes: Lobatto, jacobian: Array) -> Array:
    """Matrix from what the mean Jacobian leaves of the drive, and P and A at the start, to P and A at all nodes."""
    count = len(nodes.x)
    source = np.column_stack((nodes.twice, np.ones(count), nodes.tau))
    to_P = np.linalg.inv(np.eye(count) - nodes.twice * jacobian) @ source
    to_A = (nodes.integral * jacobian) @ to_P
    to_A[:, :count] += nodes.integral
    to_A[:, count + 1] += 1
    return np.concatenate((to_P, to_A))


def by_distance(
    start: State, length: Array, area_at: AreaAt, load: Load, air: Air, layer: Layer, nodes: Lobatto,
    buffers: Buffers,
) -> Piece:
    """Solve a piece that is so long through the air, m, (cases,).

    With sigma = path/length the drag factor is a quadrature, ln A = length * integral of k dsigma, and with
    H = hypot(U, P) dt/dsigma = length A/H, dP/dsigma = g length A^2/H, dz/dsigma = -length P/H.
    """
    count, cases = len(nodes.x), len(length)
    PA, source, drive, z, density, strength = buffers.get(count, cases)
    P, A, H = PA[:count], PA[count:], source[:count]
    length = np.maximum(length, 1e-9)
    per_density = (area_at(nodes.tau) + load.drag_area) * (length / load.doubled_mass)
    density[:] = air(start.z)
    U = start.u
    pull = load.gravity * length
    change = left = np.ones(cases)
    few = slice(None, None, max(1, cases // 64))
    jacobian: Array = np.empty(count)
    newton: Array = np.eye(count)
    for iteration in range(ITERATIONS):
        np.multiply(per_density, density, out=strength)
        np.matmul(nodes.integral, strength, out=A)
        np.exp(A, out=A)
        if iteration == 0:
            P[:] = _first_guess(start, U, pull * (nodes.integral @ (A * A)))
        before = _sample(PA, density)
        _speed(P, U, H, drive)
        np.multiply(A, A, out=drive)
        drive *= pull
        drive /= H
        if iteration < 3:
            jacobian = _mean(-drive[:, few] * P[:, few] / H[:, few] ** 2)
            newton = np.asarray(np.linalg.inv(np.eye(count) - nodes.integral * jacobian))
        np.multiply(P, jacobian[:, None], out=strength)
        np.subtract(drive, strength, out=strength)
        np.matmul(newton @ nodes.integral, strength, out=P)
        P += newton.sum(1, keepdims=True) * start.w
        _speed(P, U, H, strength)
        np.divide(P, H, out=strength)
        np.matmul(nodes.integral, strength, out=z)
        z *= -length
        z += start.z
        if layer.slope is not None:
            strength *= A
            U = start.u + (layer.slope * length) * (nodes.integral @ strength)
        air(z, density, strength)
        change, previous = np.abs(_sample(PA, density) / before - 1).sum(0), change
        left = _left(change, previous)
        if iteration and np.fmax.reduce(left) < CONVERGED:
            break
    pace = A / H * length
    ripple = 0.02 * (_ripple(nodes, drive, H[-1]) + _ripple(nodes, pace, start.t + nodes.integral[-1] @ pace))
    np.multiply(per_density, density, out=drive)
    drive *= A                                          # now dA / dsigma
    ripple += 0.02 * _ripple(nodes, drive, A[-1]) + 0.1 * _ripple(nodes, density, density[-1])
    end = _end(start, np.maximum(left, ripple), nodes, layer, A, U, P, z, pace, 1.0)
    return Piece(nodes, start, end, area_at, layer, 1.0, A, U, P, drive, z, density, pace, load.gravity * pace)


def _end(
    start: State, error: Array, nodes: Lobatto, layer: Layer, A: Array, U: Array, P: Array, z: Array, pace: Array,
    unit: Array | float,
) -> State:
    """The state at the end of a piece."""
    u = U / A * unit
    x = start.x + nodes.integral[-1] @ (pace * (u + layer.at(z)))
    t = start.t + (pace if pace.ndim == 1 else nodes.integral[-1] @ pace)
    w = P[-1] / A[-1] * unit
    return State(t, x, z[-1].copy(), u[-1], w, np.maximum(start.error, error), start.landed, start.layer)


def _speed(P: Array, U: Array, H: Array, scratch: Array) -> None:
    """H = hypot(P, U), not below the slowest; far quicker than the library's, which guards against overflow."""
    np.multiply(P, P, out=H)
    H += np.multiply(U, U, out=scratch) if U.ndim == 2 else U * U
    np.sqrt(H, out=H)
    np.maximum(H, SLOWEST, out=H)


def _first_guess(start: State, U: Array, fallen: Array) -> Array:
    """P from dP = d fallen/hypot(U, P): exact where U or P alone is the speed."""
    square = U * U
    return start.w + np.sqrt(2 / (square + np.sqrt(square * square + fallen * fallen) + SLOWEST)) * fallen


def _mean(jacobian: Array) -> Array:
    """Mean over the cases; a lost case must not spoil the others."""
    jacobian[~(np.abs(jacobian) < 1e9)] = 0
    mean: Array = jacobian @ np.full(jacobian.shape[1], 1 / jacobian.shape[1])
    return mean


def _sample(PA: Array, density: Array) -> Array:
    """Values that tell how far the iterations have come."""
    count = len(density)
    return np.concatenate((PA[[count // 2, count - 1, -1]], density[-1:]))


def _left(change: Array, previous: Array) -> Array:
    """What is left to change, judged from the last two changes."""
    shrinks = np.fmin(change / previous, 0.9)
    left: Array = change * shrinks / (1 - shrinks)
    return left


def _ripple(nodes: Lobatto, history: Array, scale: Array) -> Array:
    """The highest Legendre coefficients of a history against a scale."""
    ripple: Array = np.abs(nodes.last @ history).sum(0) / scale
    return ripple
