"""Largest forces and speeds within a flight: roots of node polynomials, never the largest of some samples."""

from __future__ import annotations

import numpy as np

from .density import Air
from .lobatto import Array, root_after, values_at
from .pieces import AreaAt, Piece
from .state import Mask


class Peak:
    """The largest value of every case so far, and its time."""

    def __init__(self, cases: int) -> None:
        self.value, self.time = np.zeros(cases), np.full(cases, np.nan)

    def note(self, value: Array, time: Array, mask: Mask) -> None:
        """Take in values of the cases in ``mask``."""
        better = mask & (value > self.value)
        self.value = np.where(better, value, self.value)
        self.time = np.where(better, time, self.time)


def largest_force(piece: Piece, air: Air, area_at: AreaAt | None, flying: Mask) -> tuple[Array, Array]:
    """Largest density V^2/2 x area within a piece, N, and its time, s; with no area that of density V^2/2, Pa."""
    area = 1.0 if area_at is None else area_at(piece.nodes.tau)
    best, time, x, chosen = _largest(piece, piece.density * area, flying)
    if chosen is not None:
        A, U, P, z = values_at(piece.nodes, x, *_of(chosen, piece.A, piece.U, piece.P, piece.z))
        speed_square = (U * U + P * P) / (A * A)
        inside = air(z) * speed_square
        if area_at is not None:
            inside = inside * _spread(area_at, piece.nodes.fraction(x), chosen)
        best, time = _better(best, time, inside, _moment(piece, x, chosen), chosen)
    return 0.5 * piece.unit**2 * best, piece.start.t + time


def largest_speed(piece: Piece, flying: Mask) -> Array:
    """Largest speed through the air within a piece, m/s."""
    best, time, x, chosen = _largest(piece, None, flying)
    if chosen is not None:
        A, U, P = values_at(piece.nodes, x, *_of(chosen, piece.A, piece.U, piece.P))
        best, _ = _better(best, time, (U * U + P * P) / (A * A), _moment(piece, x, chosen), chosen)
    return np.sqrt(best) * piece.unit


def _largest(piece: Piece, weight: Array | None, flying: Mask) -> tuple[Array, Array, Array, Mask | None]:
    """The largest weight (U^2 + P^2)/A^2: best node value and time; x of cases (the mask) with more between.

    Only the weight is differentiated as a polynomial: U^2 + P^2 and A grow by powers of ten within a piece, and the
    slope of such a polynomial is lost in rounding at its small end.
    """
    nodes, A, square = piece.nodes, piece.A, piece.square
    value = square / (A * A)
    rising = piece.square_slope * A - 2 * square * piece.drive          # has the sign of d value
    if weight is not None:
        value *= weight
        rising = nodes.stretch * weight * rising + (nodes.slope @ weight) * (square * A)
    case, best = np.arange(A.shape[1]), value.argmax(0)
    climbs = rising[best, case]
    last = len(A) - 1
    inner = flying & ~((best == 0) & (climbs <= 0)) & ~((best == last) & (climbs >= 0))
    at_node = value[best, case]
    time = piece.pace * nodes.tau[best, 0] if piece.pace.ndim == 1 else piece.elapsed[best, case]
    if not inner.any():
        return at_node, time, at_node, None
    left = np.clip(best - (climbs < 0), 0, last - 1)
    if not inner.all():
        rising, A, left = rising[:, inner], A[:, inner], left[inner]
    x = root_after(nodes, rising / A, left)
    return at_node, time, x, inner


def _of(chosen: Mask, *histories: Array) -> list[Array]:
    """The chosen columns."""
    return list(histories) if chosen.all() else [history[..., chosen] for history in histories]


def _moment(piece: Piece, x: Array, chosen: Mask) -> Array:
    if piece.pace.ndim == 1:
        return piece.pace[chosen] * piece.nodes.fraction(x)
    return values_at(piece.nodes, x, piece.elapsed[:, chosen])[0]


def _spread(area_at: AreaAt, tau: Array, chosen: Mask) -> Array:
    """Area of the chosen cases at one fraction each."""
    everywhere = np.zeros(len(chosen))
    everywhere[chosen] = tau
    area = np.asarray(area_at(everywhere))
    return area[chosen]


def _better(best: Array, time: Array, inside: Array, moment: Array, chosen: Mask) -> tuple[Array, Array]:
    more = np.zeros(len(best))
    more[chosen] = inside
    moments = np.zeros(len(best))
    moments[chosen] = moment
    wins = more > best
    return np.where(wins, more, best), np.where(wins, moments, time)
