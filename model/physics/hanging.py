"""A load hanging on its suspension legs: the tension of every leg, and what keeps it from a balance.

Coordinates: x forward, y to the left, z up from the deck. A leg runs from its attachment on the load to the apex
(the confluence point); it can only pull. Angles are in rad, forces in N, lengths in m.
"""

from __future__ import annotations

from enum import StrEnum
from math import cos, sin
from typing import NamedTuple

import numpy as np
from numpy.typing import ArrayLike, NDArray

from model.physics.sling import FEWEST_LEGS, Vector, axis_tilt, leg_angle, leg_length

TAUT = 1e-11
"""A leg under this share of the pull counts as slack: it is rounding, not load."""

RESIDUAL_ALLOWED = 1e-10
"""Largest unbalanced share of the pull that still counts as equilibrium."""

TURNS = {"aft": (-1.0, 0.0, 0.0), "forward": (1.0, 0.0, 0.0), "left": (0.0, 1.0, 0.0), "right": (0.0, -1.0, 0.0)}
"""Ways the pull is turned off its axis, by the direction it leans to."""


class Outcome(StrEnum):
    """What came of the search for leg tensions."""

    BALANCED = "balanced"
    TOO_FEW = "fewer than three legs"
    NOT_ABOVE = "apex not above the legs and the centre of gravity"
    OUTSIDE = "centre of gravity outside the legs"
    TWO_TAUT = "fewer than three legs taut"
    NO_BALANCE = "no set of taut legs balances the pull"


class Pull(NamedTuple):
    """One direction of the pull and what each leg carries of it.

    ``direction`` is a unit vector, ``tensions`` are in N with every leg carrying, 0 where slack, nan without a balance.
    """

    name: str
    direction: Vector
    tensions: Vector
    outcome: Outcome

    @property
    def slack(self) -> tuple[int, ...]:
        """Indices of the legs that hang slack."""
        return tuple(int(i) for i in np.flatnonzero(self.tensions == 0.0))


class Hang(NamedTuple):
    """A load hanging on its legs.

    Attributes:
        axis: Unit vector from the centre of gravity to the apex.
        directions: Unit vectors from each attachment to the apex, shape (n, 3).
        lengths: Leg lengths in m.
        angles: Angle of each leg over the deck plane in rad.
        tilt: Angle between the axis and the deck's normal in rad.
        pulls: The pull in line, then the turned ones.
    """

    axis: Vector
    directions: Vector
    lengths: Vector
    angles: Vector
    tilt: float
    pulls: tuple[Pull, ...]

    @property
    def worst(self) -> Pull:
        """The first pull without a balance, else the first with few taut legs, else the one that loads a leg most."""
        for outcome in (Outcome.TOO_FEW, Outcome.NOT_ABOVE, Outcome.OUTSIDE, Outcome.NO_BALANCE, Outcome.TWO_TAUT):
            for pull in self.pulls:
                if pull.outcome is outcome:
                    return pull
        return max(self.pulls, key=lambda pull: float(pull.tensions.max()))

    @property
    def outcome(self) -> Outcome:
        """The outcome that counts: balanced only if every pull is."""
        return self.worst.outcome

    @property
    def loads(self) -> Vector:
        """Largest tension of each leg over all pulls in N, every leg carrying; nan if a pull finds no balance."""
        loads: Vector = np.max([pull.tensions for pull in self.pulls], axis=0)
        return loads


def hang(
    attachments: ArrayLike,
    apex: ArrayLike,
    centre: ArrayLike,
    stiffness: ArrayLike,
    force: float,
    turn: float = 0.0,
) -> Hang:
    """Tension of every leg of a load that hangs in line with the pull, and with the pull turned off its axis.

    All legs and the pull meet in the apex, so the balance of forces is complete: no moment is left about it. Three legs
    are exact; more are springs on a rigid load, and those that would have to push hang slack.

    Args:
        attachments: Attachment points, shape (n, 3), in m.
        apex: Confluence point, shape (3,), in m.
        centre: Centre of gravity of what hangs below, shape (3,), in m.
        stiffness: Relative stiffness of each leg, shape (n,), over 0; with three legs it does not matter.
        force: Pull in N.
        turn: Angle in rad by which the pull also leans aft, forward, left and right; 0 for none.

    Raises:
        ValueError: If shapes do not match, or a number is not finite, or a stiffness or the force is not over 0.
    """
    points, top, middle, springs = _checked(attachments, apex, centre, stiffness, force)
    away = top - points
    lengths = np.asarray(leg_length(away[:, 0], away[:, 1], away[:, 2]), dtype=np.float64)
    line = top - middle
    if np.any(away[:, 2] <= 0.0) or line[2] <= 0.0:
        empty = np.full(len(points), np.nan)
        none = np.full(3, np.nan)
        pull = Pull("in line", none, empty, Outcome.NOT_ABOVE)
        return Hang(none, np.full_like(points, np.nan), lengths, empty, float("nan"), (pull,))
    directions = away / lengths[:, None]
    axis = line / np.linalg.norm(line)
    aims = {"in line": axis}
    if turn != 0.0:
        aims |= {name: _turned(axis, np.array(way), abs(turn)) for name, way in TURNS.items()}
    pulls = tuple(_pull(name, directions, springs, aim, force) for name, aim in aims.items())
    tilt = float(axis_tilt(line[0], line[1], line[2]))
    angles = np.asarray(leg_angle(away[:, 2], lengths), dtype=np.float64)
    return Hang(axis, directions, lengths, angles, tilt, pulls)


def _checked(
    attachments: ArrayLike, apex: ArrayLike, centre: ArrayLike, stiffness: ArrayLike, force: float
) -> tuple[Vector, Vector, Vector, Vector]:
    points, top, middle, springs = (
        np.asarray(given, dtype=np.float64) for given in (attachments, apex, centre, stiffness)
    )
    points = points.reshape(-1, 3)
    if top.shape != (3,) or middle.shape != (3,) or springs.shape != (len(points),):
        raise ValueError("attachments (n, 3), apex (3,), centre (3,) and stiffness (n,) do not match")
    if not all(bool(np.all(np.isfinite(given))) for given in (points, top, middle, springs, np.array(force))):
        raise ValueError("every point, stiffness and the force must be finite")
    if not (np.all(springs > 0.0) and force > 0.0):
        raise ValueError("every stiffness and the force must be over 0")
    return points, top, middle, springs


def _turned(axis: Vector, way: Vector, angle: float) -> Vector:
    across = way - (way @ axis) * axis
    turned: Vector = axis * cos(angle) + across / np.linalg.norm(across) * sin(angle)
    return turned


def _pull(name: str, directions: Vector, stiffness: Vector, aim: Vector, force: float) -> Pull:
    if len(directions) < FEWEST_LEGS:
        return Pull(name, aim, np.full(len(directions), np.nan), Outcome.TOO_FEW)
    shares = leg_shares(directions, stiffness, aim)
    if shares is None:
        outcome = Outcome.OUTSIDE if name == "in line" else Outcome.NO_BALANCE
        return Pull(name, aim, np.full(len(directions), np.nan), outcome)
    few = np.count_nonzero(shares) < FEWEST_LEGS
    return Pull(name, aim, shares * force, Outcome.TWO_TAUT if few else Outcome.BALANCED)


def leg_shares(directions: Vector, stiffness: Vector, aim: Vector) -> Vector | None:
    """Share of the pull that each leg carries as its tension, or None where pulling legs cannot balance it.

    The shares minimise the strain energy sum t^2/(2 k) under sum t d = aim, t >= 0. That is the rigid load on elastic
    legs with the slack ones dropped: t = k max(0, d . delta) with delta the shift of the load.

    Args:
        directions: Unit vectors along the legs, shape (n, 3).
        stiffness: Relative stiffness, shape (n,), over 0.
        aim: Unit vector of the pull, shape (3,).
    """
    weights = stiffness / stiffness.max()
    taut = _taut_set(directions, weights, aim)
    root = np.sqrt(weights[taut])
    # Least squares on the taut legs alone gives the least-energy shares without squaring the condition number.
    scaled, *_ = np.linalg.lstsq((directions[taut] * root[:, None]).T, aim, rcond=1e-13)
    shares = np.zeros(len(directions))
    shares[taut] = scaled * root
    if np.linalg.norm(directions.T @ shares - aim) > RESIDUAL_ALLOWED or shares.min() < -TAUT:
        return None
    shares[shares < TAUT] = 0.0
    return shares


def _taut_set(directions: Vector, weights: Vector, aim: Vector) -> NDArray[np.bool_]:
    """Newton's method with exact line search on the convex energy sum k max(0, d . delta)^2/2 - aim . delta.

    Each round solves the legs that are taut, drops those that would push and takes back those that pull again; the
    line search keeps it from going round in circles.
    """
    taut = np.ones(len(directions), dtype=np.bool_)
    shift = np.zeros(3)
    for _ in range(20 + 10 * len(directions)):
        springs = (directions[taut].T * weights[taut]) @ directions[taut]
        step = np.linalg.solve(springs + 1e-13 * np.eye(3), aim) - shift
        reach = _exact_step(directions @ shift, directions @ step, weights, float(aim @ step))
        if reach is None:
            break
        shift = shift + reach * step
        now = directions @ shift > 0.0
        if np.array_equal(now, taut) and abs(reach - 1.0) < 1e-9:
            break
        taut = now
    return taut


def _exact_step(stretch: Vector, change: Vector, weights: Vector, gain: float) -> float | None:
    """Where the slope of the energy along a step vanishes; None where it falls for ever."""
    turning = np.full(len(stretch), np.inf)
    moving = change != 0.0
    turning[moving] = -stretch[moving] / change[moving]
    marks = np.sort(turning[(turning > 0.0) & np.isfinite(turning)])
    low = 0.0
    for high in [*marks, np.inf]:
        probe = 0.5 * (low + high) if np.isfinite(high) else low + 1.0
        on = stretch + probe * change > 0.0
        rise = float(weights[on] @ change[on] ** 2)
        slope = float((weights[on] * change[on]) @ stretch[on]) - gain
        if rise > 0.0 and -slope <= rise * high:
            return max(low, -slope / rise)
        low = float(high)
    return None
