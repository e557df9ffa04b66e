"""One piece of a flight that is so long through the air. See `pieces` for the equations.

With sigma = path/length the drag factor is a quadrature, ln A = length * integral of k dsigma, and with H = hypot(U, P)
dt/dsigma = length A/H, dP/dsigma = g length A^2/H, dz/dsigma = -length P/H.
"""

from __future__ import annotations

import numpy as np

from .density import Air
from .lobatto import Array, Lobatto
from .pieces import AreaAt, Piece, Workshop, converge, end_of_piece, few_of, mean_of, ripple
from .state import Load, State
from .wind import Layer

SLOWEST = 1e-6
"""m/s; a flight through the air by distance is not followed below."""


def by_distance(
    start: State, length: Array, area_at: AreaAt, load: Load, air: Air, layer: Layer, nodes: Lobatto,
    workshop: Workshop,
) -> Piece:
    """Solve a piece that is so long through the air, m, (cases,)."""
    length = np.maximum(length, 1e-9)
    system = _System(start, length, area_at, load, air, layer, nodes, workshop)
    left = converge(system.step, system.sample, workshop)
    P, A, U, z, H, density, drive = system.P, system.A, system.U, system.z, system.H, system.density, system.drive
    pace = A / H * length
    rough = 0.02 * (ripple(nodes, drive, H[-1]) + ripple(nodes, pace, start.t + nodes.integral[-1] @ pace))
    np.multiply(system.per_density, density, out=drive)
    drive *= A                                          # now dA / dsigma
    rough += 0.02 * ripple(nodes, drive, A[-1]) + 0.1 * ripple(nodes, density, density[-1])
    end = end_of_piece(start, np.maximum(left, rough), nodes, layer, A, U, P, z, pace, 1.0)
    return Piece(nodes, start, end, area_at, layer, 1.0, A, U, P, drive, z, density, pace, load.gravity * pace)


class _System:
    """Node histories on their way to a solution; `drive` is dP / dsigma."""

    def __init__(
        self, start: State, length: Array, area_at: AreaAt, load: Load, air: Air, layer: Layer, nodes: Lobatto,
        workshop: Workshop,
    ) -> None:
        count, cases = len(nodes.x), len(length)
        self.start, self.length, self.air, self.layer, self.nodes = start, length, air, layer, nodes
        PA, source, self.drive, self.z, self.density, self.strength = workshop.get(count, cases)
        self.P, self.A, self.H = PA[:count], PA[count:], source[:count]
        self.per_density = (area_at(nodes.tau) + load.drag_area) * (length / load.doubled_mass)
        self.density[:] = air(start.z)
        self.U = start.u
        self.pull = load.gravity * length
        self.few = few_of(cases)
        self.jacobian = self.newton = self.from_start = np.empty(0)
        self.drag_factor()
        self.P[:] = _first_guess(start, self.pull * (nodes.integral @ (self.A * self.A)))

    def sample(self) -> Array:
        """Values that tell how far the iterations have come."""
        sample = np.empty((3, self.P.shape[1]))
        sample[0], sample[1], sample[2] = self.P[len(self.P) // 2], self.P[-1], self.density[-1]
        return sample

    def drag_factor(self) -> None:
        """A at the present heights."""
        np.multiply(self.per_density, self.density, out=self.strength)
        np.matmul(self.nodes.integral, self.strength, out=self.A)
        np.exp(self.A, out=self.A)

    def step(self, iteration: int) -> None:
        """One iteration of Newton's method on P, and the density of the new heights."""
        P, A, H, drive, scratch = self.P, self.A, self.H, self.drive, self.strength
        if iteration:
            self.drag_factor()
        _speed(P, self.U, H, drive)
        np.multiply(A, A, out=drive)
        drive *= self.pull
        drive /= H
        if iteration < 3:
            self.linearise()
        np.multiply(P, self.jacobian[:, None], out=scratch)
        np.subtract(drive, scratch, out=scratch)
        if P.shape[1] == 1:
            P[:] = np.linalg.solve(self.newton, self.nodes.integral @ scratch + self.start.w)
        else:
            np.matmul(self.newton, scratch, out=P)
            P += self.from_start * self.start.w
        _speed(P, self.U, H, scratch)
        np.divide(P, H, out=scratch)
        np.matmul(self.nodes.integral, scratch, out=self.z)
        self.z *= -self.length
        self.z += self.start.z
        if self.layer.slope is not None:
            scratch *= A
            self.U = self.start.u + (self.layer.slope * self.length) * (self.nodes.integral @ scratch)
        self.air(self.z, self.density, scratch)

    def linearise(self) -> None:
        """Matrices from what the mean Jacobian leaves of dP / dsigma, and P at the start, to P at all nodes."""
        few, nodes = self.few, self.nodes
        self.jacobian = mean_of(-self.drive[:, few] * self.P[:, few] / self.H[:, few] ** 2)
        self.newton = nodes.one - nodes.integral * self.jacobian
        if self.P.shape[1] == 1:        # solved as it is: one case does not pay for an inverse
            return
        inverse = np.asarray(np.linalg.inv(self.newton))
        self.newton, self.from_start = inverse @ nodes.integral, inverse.sum(1, keepdims=True)


def _speed(P: Array, U: Array, H: Array, scratch: Array) -> None:
    """H = hypot(P, U), not below the slowest; far quicker than the library's, which guards against overflow."""
    np.multiply(P, P, out=H)
    H += np.multiply(U, U, out=scratch) if U.ndim == 2 else U * U
    np.sqrt(H, out=H)
    np.maximum(H, SLOWEST, out=H)


def _first_guess(start: State, fallen: Array) -> Array:
    """P from dP = d fallen/hypot(U, P): exact where U or P alone is the speed."""
    square = start.u * start.u
    return start.w + np.sqrt(2 / (square + np.sqrt(square * square + fallen * fallen) + SLOWEST)) * fallen
