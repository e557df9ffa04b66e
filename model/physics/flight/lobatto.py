"""Polynomials through Lobatto nodes, for many cases at once.

A history is an array of shape (nodes, cases); a column holds one case. Nodes lie on x = -1..1; the fraction of a piece
is tau = ((x + 1)/2)^grade: a grade above 1 crowds the nodes at the start, where fractional powers are not smooth.
"""

from __future__ import annotations

from dataclasses import dataclass
from functools import cache

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]
FEW = 20
"""Of so few points powers are taken one by one: the number of calls counts, not that of the points."""


@dataclass(frozen=True, eq=False)
class Lobatto:
    """Constants of one set of nodes; theta = (x + 1)/2."""

    x: Array
    """Nodes, (nodes,)."""
    tau: Array
    """The same as fractions of the piece, (nodes, 1)."""
    stretch: Array
    """d tau / d theta, (nodes, 1)."""
    integral: Array
    """Node values -> integral over tau from 0 to each node, (nodes, nodes)."""
    twice: Array
    """Node values -> the integral of that integral."""
    slope: Array
    """Node values -> d / d theta."""
    powers: Array
    """Node values -> coefficients of a power series in x."""
    last: Array
    """Node values -> the last two Legendre coefficients, (2, nodes)."""
    one: Array
    """The unit matrix."""
    with_start: Array
    """`twice`, and two columns more: what a value and a slope at the start are at the nodes, (nodes, nodes + 2)."""
    grade: int

    def fraction(self, x: Array) -> Array:
        """Tau at some x."""
        theta = (x + 1) / 2
        return theta**self.grade if self.grade > 1 else theta


@cache
def lobatto(nodes: int, grade: int = 1) -> Lobatto:
    """The constants for so many nodes (at least 4) and a grade (1: even)."""
    x = _places(nodes)
    values, integrals, slopes = _legendre(x)
    to_legendre = np.asarray(np.linalg.inv(values), np.float64)
    integral: Array = integrals @ to_legendre / 2
    slope: Array = slopes @ to_legendre * 2
    theta = (x + 1) / 2
    tau, stretch = theta**grade, grade * theta ** (grade - 1)
    integral = integral * stretch
    powers = np.asarray(np.linalg.inv(np.vander(x, increasing=True)), np.float64)
    twice = integral @ integral
    with_start = np.column_stack((twice, np.ones(nodes), tau))
    return Lobatto(
        x, tau[:, None], stretch[:, None], integral, twice, slope, powers, to_legendre[-2:].copy(), np.eye(nodes),
        with_start, grade,
    )


def _places(nodes: int) -> Array:
    """The nodes: both ends and the extrema of the Legendre polynomial of degree nodes - 1.

    The extrema are the zeros of a Jacobi polynomial: the eigenvalues of a tridiagonal matrix (Golub, Welsch 1969).
    """
    k = np.arange(1.0, nodes - 2)
    beside = np.sqrt(k * (k + 2) / ((2 * k + 1) * (2 * k + 3)))
    inner = np.linalg.eigvalsh(np.diag(beside, 1) + np.diag(beside, -1))
    half = (inner - inner[::-1]) / 2  # the nodes lie alike on both sides of 0
    x: Array = np.concatenate(([-1.0], half, [1.0]))
    return x


def _legendre(x: Array) -> tuple[Array, Array, Array]:
    """Legendre polynomials of degree 0 .. len(x) - 1 at x: values, integrals from -1, slopes; a column a degree."""
    count = len(x)
    values, slopes = np.ones((count, count + 1)), np.zeros((count, count + 1))
    values[:, 1], slopes[:, 1] = x, 1.0
    for k in range(1, count):
        values[:, k + 1] = ((2 * k + 1) * x * values[:, k] - k * values[:, k - 1]) / (k + 1)
        slopes[:, k + 1] = slopes[:, k - 1] + (2 * k + 1) * values[:, k]
    integrals = np.empty((count, count))
    integrals[:, 0] = x + 1
    integrals[:, 1:] = (values[:, 2:] - values[:, :-2]) / (2 * np.arange(1.0, count) + 1)
    return values[:, :-1], integrals, slopes[:, :-1]


def power_table(x: Array, count: int) -> Array:
    """Powers 0 .. count - 1 of x (cases,) as an array (count, cases)."""
    if len(x) < FEW:
        return x ** np.arange(float(count))[:, None]
    table = np.empty((count, len(x)))
    table[0] = 1
    for i in range(1, count):
        np.multiply(table[i - 1], x, out=table[i])
    return table


def dot(a: Array, b: Array) -> Array:
    """Sums of products down the columns."""
    result: Array = np.einsum("ij,ij->j", a, b)
    return result


def values_at(nodes: Lobatto, x: Array, *histories: Array) -> list[Array]:
    """The node polynomials at one x per case; a history without nodes (constant in time) is passed through."""
    weights = nodes.powers.T @ power_table(x, len(nodes.x))
    return [dot(weights, history) if history.ndim == 2 else history for history in histories]


def root_after(nodes: Lobatto, values: Array, left: NDArray[np.intp], steps: int = 4) -> Array:
    """The x where a node polynomial is zero between node ``left`` and the next one, by Newton's method with a bracket.

    The answer never leaves that interval; where there is no change of sign it is some point of it.
    """
    if values.shape[1] == 1:
        return np.array([_root_of_one(nodes, values[:, 0], int(left[0]), steps)])
    case = np.arange(values.shape[1])
    low, high = nodes.x[left], nodes.x[left + 1]
    at_low, at_high = values[left, case], values[left + 1, case]
    x = np.fmin(np.fmax(low + (high - low) * (at_low / (at_low - at_high)), low), high)
    series = nodes.powers @ values
    slopes = series[1:] * np.arange(1.0, len(series))[:, None]
    for _ in range(steps):
        table = power_table(x, len(series))
        value = dot(series, table)
        before = value * at_low > 0
        low, high = np.where(before, x, low), np.where(before, high, x)
        x = x - value / dot(slopes, table[:-1])
        x = np.where((x >= low) & (x <= high), x, 0.5 * (low + high))
    return x


def _root_of_one(nodes: Lobatto, values: Array, left: int, steps: int) -> float:
    """`root_after` for one case: the same on plain numbers, which are quicker than arrays of one."""
    low, high = float(nodes.x[left]), float(nodes.x[left + 1])
    at_low, at_high = float(values[left]), float(values[left + 1])
    x = 0.5 * (low + high)
    if at_low != at_high:
        x = min(high, max(low, low + (high - low) * (at_low / (at_low - at_high))))     # low where it is nan
    series: list[float] = (nodes.powers @ values).tolist()
    for _ in range(steps):
        value = slope = 0.0
        for coefficient in reversed(series):
            slope = slope * x + value
            value = value * x + coefficient
        if value * at_low > 0:
            low = x
        else:
            high = x
        x = x - value / slope if slope else low - 1
        if not low <= x <= high:
            x = 0.5 * (low + high)
    return x
