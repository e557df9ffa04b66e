"""One piece of a flight that lasts so many seconds. See `pieces` for the equations."""

from __future__ import annotations

import numpy as np

from .density import Air
from .lobatto import Array, Lobatto
from .pieces import AreaAt, Piece, Workshop, converge, end_of_piece, few_of, mean_of, ripple
from .state import Load, State
from .wind import Layer


def by_time(
    start: State, duration: Array, area_at: AreaAt, load: Load, air: Air, layer: Layer, nodes: Lobatto,
    workshop: Workshop,
) -> Piece:
    """Solve a piece that lasts so many seconds, (cases,)."""
    duration = np.maximum(duration, 1e-9)               # a piece that does not happen lasts a nanosecond
    system = _System(start, duration, area_at, load, air, layer, nodes, workshop)
    left = converge(system.step, system.sample, workshop)
    P, A, U, z, density = system.P, system.A, system.U, system.z, system.density
    rough = 0.02 * ripple(nodes, system.drive, A[-1]) + 0.1 * ripple(nodes, density, density[-1])
    end = end_of_piece(start, np.maximum(left, rough), nodes, layer, A, U, P, z, duration, system.fall)
    return Piece(nodes, start, end, area_at, layer, system.fall, A, U, P, system.drive, z, density, duration, 1.0)


class _System:
    """Node histories on their way to a solution; speeds in units of g duration: P' = A, A' = strength hypot(U, P)."""

    def __init__(
        self, start: State, duration: Array, area_at: AreaAt, load: Load, air: Air, layer: Layer, nodes: Lobatto,
        workshop: Workshop,
    ) -> None:
        count, cases = len(nodes.x), len(duration)
        self.start, self.duration, self.air, self.layer, self.nodes = start, duration, air, layer, nodes
        self.PA, self.source, self.drive, self.z, self.density, self.strength = workshop.get(count, cases)
        self.P, self.A, self.scratch = self.PA[:count], self.PA[count:], self.source[:count]
        self.fall = load.gravity * duration
        self.depth = self.fall * duration
        self.U = start.u / self.fall
        self.side = self.U * self.U
        self.source[count], self.source[count + 1] = start.w / self.fall, 1
        np.add(self.source[count], nodes.tau, out=self.P)       # first guess: no drag
        self.A[:] = 1
        self.per_density = (area_at(nodes.tau) + load.drag_area) * (self.depth / load.doubled_mass)
        self.density[:] = air(start.z)
        np.multiply(self.per_density, self.density, out=self.strength)
        self.few = few_of(cases)
        self.jacobian = self.to_PA = np.empty(0)

    def sample(self) -> Array:
        """Values that tell how far the iterations have come."""
        count = len(self.P)
        sample = np.empty((4, self.P.shape[1]))
        sample[0], sample[1], sample[2], sample[3] = self.P[count // 2], self.P[-1], self.A[-1], self.density[-1]
        return sample

    def step(self, iteration: int) -> None:
        """One iteration of Newton's method on P and A, and the density of the new heights."""
        P, drive, scratch, nodes = self.P, self.drive, self.scratch, self.nodes
        np.multiply(P, P, out=drive)
        drive += self.side
        np.sqrt(drive, out=drive)
        if iteration < 2:
            few = self.few
            self.jacobian = mean_of(P[:, few] / (drive[:, few] + 1e-30) * self.strength[..., few])
            self.to_PA = _newton(nodes, self.jacobian)
        drive *= self.strength
        np.multiply(P, self.jacobian[:, None], out=scratch)
        np.subtract(drive, scratch, out=scratch)
        np.matmul(self.to_PA, self.source, out=self.PA)
        np.divide(P, self.A, out=scratch)
        np.matmul(nodes.integral, scratch, out=self.z)
        self.z *= -self.depth
        self.z += self.start.z
        if self.layer.slope is not None:
            self.U = self.start.u / self.fall + (self.layer.slope * self.duration) * (nodes.integral @ P)
            self.side = self.U * self.U
        self.air(self.z, self.density, scratch)
        np.multiply(self.per_density, self.density, out=self.strength)


def _newton(nodes: Lobatto, jacobian: Array) -> Array:
    """Matrix from what the mean Jacobian leaves of the drive, and P and A at the start, to P and A at all nodes."""
    count = len(nodes.x)
    to_PA = np.empty((2 * count, count + 2))
    to_P, to_A = to_PA[:count], to_PA[count:]
    np.matmul(np.linalg.inv(nodes.one - nodes.twice * jacobian), nodes.with_start, out=to_P)
    np.matmul(nodes.integral * jacobian, to_P, out=to_A)
    to_A[:, :count] += nodes.integral
    to_A[:, count + 1] += 1
    return to_PA
