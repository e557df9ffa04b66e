"""Overturning: a rigid block that lands with speed across and tips over the edge of its base.

Lengths in m, speeds in m/s; the inertia is that of a box of unit mass and uniform density, in m2.
"""

from __future__ import annotations

import numpy as np

from model.physics.formula import CONSTANTS, formula
from model.physics.types import Real

G0 = CONSTANTS["g0"]
LEAVES_OUT = "the crush of the cushion, the pull of the canopies, slopes and soft ground: for ranking, not for proof"


@formula(
    "r = sqrt((b/2)^2 + h^2) - h",
    result="r | rise of the centre of gravity to the tipping point | length",
    symbols={
        "base": "b | smaller side of the base | length",
        "height": "h | centre of gravity over the deck | length",
    },
    source="geometry",
)
def tipping_rise(base: Real, height: Real) -> Real:
    """Rise in m of the centre of gravity from standing flat to standing over the edge."""
    return np.hypot(0.5 * base, height) - height


@formula(
    "J = (b/2)^2 + h^2 + (b^2 + H^2)/12",
    result="J | moment of inertia about the edge, for each unit of mass | area",
    symbols={
        "base": "b | smaller side of the base | length",
        "height": "h | centre of gravity over the deck | length",
        "rigged_height": "H | rigged height | length",
    },
    source="mechanics of a uniform box",
)
def tipping_inertia(base: Real, height: Real, rigged_height: Real) -> Real:
    """Moment of inertia about the edge of the base, for each unit of mass, in m2."""
    return (0.5 * base) ** 2 + height**2 + (base**2 + rigged_height**2) / 12.0


@formula(
    "v = sqrt(2 g0 r J)/h",
    result="v | least speed across that tips the load | speed",
    symbols={
        "rise": "r | rise of the centre of gravity to the tipping point | length",
        "inertia": "J | moment of inertia about the edge, for each unit of mass | area",
        "height": "h | centre of gravity over the deck | length",
    },
    source="derived: angular momentum about the edge kept in the impact, then energy",
    holds="h over 0",
    leaves_out=LEAVES_OUT,
)
def tipping_speed(rise: Real, inertia: Real, height: Real) -> Real:
    """Speed across in m/s at which a block caught by its lower edge just tips over; inf where h is not over 0."""
    over = np.asarray(height, dtype=np.float64) > 0.0
    speed = np.sqrt(2.0 * G0 * rise * inertia) / np.where(over, height, 1.0)
    return np.where(over, speed, np.inf)[()]


@formula(
    "f = b/(2 h)",
    result="f | load factor across that tips a load held by nothing | number",
    symbols={
        "base": "b | smaller side of the base | length",
        "height": "h | centre of gravity over the deck | length",
    },
    source="statics",
)
def static_tipping_factor(base: Real, height: Real) -> Real:
    """Sideways acceleration, in multiples of g0, at which an unlashed load begins to tip."""
    return base / (2.0 * height)
