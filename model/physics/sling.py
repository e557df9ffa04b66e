"""Suspension legs, line by line: length, angle, stiffness, equal legs, the lever rule; the apex from measured lengths.

Coordinates: x forward, y to the left, z up from the deck. A leg runs from its attachment on the load to the apex
(the confluence point). What legs that differ carry together is in `model.physics.hanging`.
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np
from numpy.typing import ArrayLike, NDArray

from model.physics.formula import formula
from model.physics.types import Real

Vector = NDArray[np.float64]

FEWEST_LEGS = 3
MISFIT_ALLOWED = 0.01
"""Largest share by which a measured leg length may differ from the geometry that fits all of them best."""


@formula(
    "L = sqrt(x^2 + y^2 + z^2)",
    result="L | length of the leg | length",
    symbols={
        "forward": "x | apex forward of the attachment | length",
        "side": "y | apex to the left of the attachment | length",
        "rise": "z | apex above the attachment | length",
    },
    source="geometry",
)
def leg_length(forward: Real, side: Real, rise: Real) -> Real:
    """Length of a leg in m from the attachment to the apex, from its three components in m."""
    return np.sqrt(forward**2 + side**2 + rise**2)


@formula(
    "b = asin(z/L)",
    result="b | angle of the leg over the deck plane | angle",
    symbols={"rise": "z | apex above the attachment | length", "length": "L | length of the leg | length"},
    source="geometry",
)
def leg_angle(rise: Real, length: Real) -> Real:
    """Angle of a leg over the deck plane in rad."""
    return np.arcsin(rise / length)


@formula(
    "a = atan(hypot(x, y)/z)",
    result="a | tilt of the pull axis from the deck's normal | angle",
    symbols={
        "forward": "x | apex forward of the centre of gravity | length",
        "side": "y | apex to the left of the centre of gravity | length",
        "rise": "z | apex above the centre of gravity | length",
    },
    source="geometry",
    holds="the apex above the centre of gravity",
)
def axis_tilt(forward: Real, side: Real, rise: Real) -> Real:
    """Angle in rad between the deck's normal and the line from the centre of gravity to the apex."""
    return np.arctan2(np.hypot(forward, side), rise)


@formula(
    "k = n s/L",
    result="k | stiffness of the leg against the others | N/m",
    symbols={
        "strength": "s | strength of one thickness of the web | force",
        "plies": "n | thicknesses side by side | number",
        "length": "L | length of the leg | length",
    },
    source="derived: webs of one kind stretch alike at the same share of their strength",
    leaves_out="the stretch itself, which is alike for all legs and cancels; knots and fittings",
)
def leg_stiffness(strength: Real, plies: Real, length: Real) -> Real:
    """Relative stiffness of a leg in N per m, at a stretch that is alike for all."""
    return plies * strength / length


@formula(
    "T_c = T n/c",
    result="T_c | load of the leg with few legs carrying | force",
    symbols={
        "tension": "T | tension with all legs carrying | force",
        "legs": "n | number of legs | number",
        "carrying": "c | legs taken to carry | number",
    },
    source="common practice for a rigid load on more legs than can share, from memory of ASME B30.9",
    holds="1 <= c <= n",
)
def carrying_load(tension: Real, legs: Real, carrying: Real) -> Real:
    """Load of a leg in N when only some of the legs are taken to carry."""
    return tension * legs / carrying


@formula(
    "f = 1/sin(b)",
    result="f | leg load over the load of a plumb leg | number",
    symbols={"angle": "b | angle of the leg over the horizontal | angle"},
    source="statics",
)
def angle_factor(angle: Real) -> Real:
    """Factor by which a leg at an angle (rad, over the horizontal) carries more than a plumb one."""
    return 1.0 / np.sin(angle)


@formula(
    "T = W/(n sin(b))",
    result="T | tension of each leg | force",
    symbols={
        "load": "W | load on all legs | force",
        "legs": "n | number of legs that carry | number",
        "angle": "b | angle of the legs over the horizontal | angle",
    },
    source="statics",
    holds="equal legs, centre of gravity in the middle",
)
def equal_leg_tension(load: Real, legs: Real, angle: Real) -> Real:
    """Tension in N of each of n equal legs."""
    return load / (legs * np.sin(angle))


@formula(
    "T = W L/(n h)",
    result="T | tension of each leg | force",
    symbols={
        "load": "W | load on all legs | force",
        "legs": "n | number of legs that carry | number",
        "length": "L | length of the leg | length",
        "rise": "h | apex above the attachments | length",
    },
    source="statics",
    holds="equal legs, centre of gravity in the middle",
)
def equal_leg_tension_by_length(load: Real, legs: Real, length: Real, rise: Real) -> Real:
    """Tension in N of each of n equal legs, from measured lengths in place of the angle."""
    return load * length / (legs * rise)


@formula(
    "s = b/(a + b)",
    result="s | share of the pair | number",
    symbols={
        "own": "a | distance of the pair from the centre of gravity | length",
        "other": "b | distance of the other pair | length",
    },
    source="lever rule",
    holds="a level load, plumb pulls",
)
def lever_share(own: Real, other: Real) -> Real:
    """Share of the load that one of two pairs carries, from their distances in m from the centre of gravity."""
    return other / (own + other)


@formula(
    "s = b d/((a + b) (c + d))",
    result="s | share of the corner | number",
    symbols={
        "own_end": "a | distance of the corner's end from the centre of gravity | length",
        "other_end": "b | distance of the other end | length",
        "own_side": "c | distance of the corner's side | length",
        "other_side": "d | distance of the other side | length",
    },
    source="lever rule taken twice, as in MIL-STD-209K, appendix C",
    holds="a level load, plumb pulls, every side shared alike at both ends",
    leaves_out="the stretch of the legs: four legs on a rigid load are free to share otherwise",
)
def corner_share(own_end: Real, other_end: Real, own_side: Real, other_side: Real) -> Real:
    """Share of the load that one of four corners carries by the lever rule taken twice."""
    return other_end * other_side / ((own_end + other_end) * (own_side + other_side))


@formula(
    "a = atan(e/z)",
    result="a | tilt of the hanging load | angle",
    symbols={
        "offset": "e | centre of gravity off the line under the apex | length",
        "rise": "z | apex above the centre of gravity | length",
    },
    source="statics",
    holds="equal legs, the load free to swing in line",
)
def free_tilt(offset: Real, rise: Real) -> Real:
    """Tilt in rad of a load that hangs freely with its centre of gravity off the middle."""
    return np.arctan(offset / rise)


class Apex(NamedTuple):
    """Where measured legs meet: the point (3,) in m, and per leg (computed - measured)/measured length."""

    point: Vector
    misfits: Vector

    @property
    def worst(self) -> float:
        """Largest size of a misfit."""
        return float(np.abs(self.misfits).max())


def apex_from_lengths(attachments: ArrayLike, lengths: ArrayLike) -> Apex:
    """Find the apex above the load from the measured length of every leg.

    Three legs fix the point exactly where their lengths can meet at all; more legs are fitted by least squares. Of the
    two mirrored points the one above the attachments is taken.

    Args:
        attachments: Attachment points, shape (n, 3), in m.
        lengths: Leg lengths, shape (n,), in m.

    Returns:
        The point and the misfit of every leg. Judging the misfit (`MISFIT_ALLOWED`) is the caller's part.

    Raises:
        ValueError: With fewer than three legs, a length that is not over 0, or attachments in one line.
    """
    points = np.asarray(attachments, dtype=np.float64)
    measured = np.asarray(lengths, dtype=np.float64)
    if len(points) < FEWEST_LEGS:
        raise ValueError("an apex needs three legs or more")
    if not np.all(measured > 0.0):
        raise ValueError("every leg needs a length over 0")
    middle = points.mean(axis=0)
    _, sizes, axes = np.linalg.svd(points - middle)
    if sizes[1] <= 1e-9 * max(sizes[0], float(measured.max())):
        raise ValueError("the attachments lie in one line")
    starts = _apex_starts(points - middle, measured, sizes, axes)
    found = [_fit_apex(points - middle, measured, start) for start in starts]
    highest = (points - middle)[:, 2].max()
    point = min(found, key=lambda at: (bool(at[2] <= highest), _misfit(points - middle, measured, at), -at[2]))
    computed = np.linalg.norm(points - middle - point, axis=1)
    return Apex(point + middle, (computed - measured) / measured)


def _misfit(points: Vector, measured: Vector, at: Vector) -> float:
    # Rounded so that two mirrored points of equal fit compare equal and the upper one is taken.
    gaps = np.linalg.norm(points - at, axis=1) - measured
    return round(float(np.sqrt(np.mean(gaps**2))) / float(measured.max()), 9)


def _apex_starts(points: Vector, measured: Vector, sizes: Vector, axes: Vector) -> list[Vector]:
    # With the middle at the origin, the sphere equations less their mean are linear in the point.
    square = (points**2).sum(axis=1) - measured**2
    right = 0.5 * (square - square.mean())
    in_plane = points @ axes[:2].T
    plan, *_ = np.linalg.lstsq(in_plane, right, rcond=None)
    base = plan @ axes[:2]
    height = np.sqrt(max(float(np.mean(measured**2 - ((points - base) ** 2).sum(axis=1))), 0.0))
    height = max(height, 1e-3 * float(measured.max()))
    starts = [base + height * axes[2], base - height * axes[2]]
    if len(sizes) > 2 and sizes[2] > 1e-6 * sizes[0]:
        full, *_ = np.linalg.lstsq(points, right, rcond=None)
        starts.append(full)
    return starts


def _fit_apex(points: Vector, measured: Vector, start: Vector) -> Vector:
    """Levenberg-Marquardt on the length gaps, which are at most a few per cent for a load that can be rigged."""
    at, damping = start, 1e-3
    away = at - points
    reach = np.linalg.norm(away, axis=1)
    for _ in range(100):
        gaps = reach - measured
        slopes = away / np.maximum(reach, 1e-12)[:, None]
        normal = slopes.T @ slopes
        step = np.linalg.solve(normal + damping * np.eye(3), -slopes.T @ gaps)
        new_away = at + step - points
        new_reach = np.linalg.norm(new_away, axis=1)
        if ((new_reach - measured) ** 2).sum() <= (gaps**2).sum():
            at, away, reach, damping = at + step, new_away, new_reach, damping * 0.1
        else:
            damping = max(damping, 1e-15) * 10.0
        if np.abs(step).max() <= 1e-14 * measured.max():
            break
    return at
