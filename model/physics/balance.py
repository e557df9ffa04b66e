"""Balance and outline of a load: centre of gravity, loading of its base, slenderness, rigged height and length.

Points have their origin at the middle of the platform deck, x forward, y to the left, z up.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike, NDArray

from model.physics.formula import CONSTANTS, formula
from model.physics.types import Real

_G0 = CONSTANTS["g0"]


def centre_of_gravity(masses: ArrayLike, points: ArrayLike) -> NDArray[np.float64]:
    """Find the centre of gravity of parts.

    Args:
        masses: Masses, kg, shape (..., n).
        points: Their centres, m, shape (..., n, 3).

    Returns:
        The centre, m, shape (..., 3).

    Raises:
        ValueError: If the parts have no mass together.
    """
    weights = np.asarray(masses, dtype=np.float64)
    total = weights.sum(axis=-1)
    if not np.all(total > 0.0):
        raise ValueError("parts without mass have no centre of gravity")
    moments = (weights[..., np.newaxis] * np.asarray(points, dtype=np.float64)).sum(axis=-2)
    centre: NDArray[np.float64] = moments / total[..., np.newaxis]
    return centre


def remove_parts(
    mass: float, centre: ArrayLike, masses: ArrayLike, points: ArrayLike
) -> tuple[float, NDArray[np.float64]]:
    """Take parts out of a whole by their moments.

    Args:
        mass: Mass of the whole, kg.
        centre: Centre of gravity of the whole, m, shape (3,).
        masses: Masses of the parts that go, kg, shape (n,).
        points: Their centres, m, shape (n, 3).

    Returns:
        Mass of what is left, kg, and its centre of gravity, m, shape (3,).

    Raises:
        ValueError: If nothing is left.
    """
    gone = np.atleast_1d(np.asarray(masses, dtype=np.float64))
    places = np.asarray(points, dtype=np.float64).reshape(len(gone), 3)
    whole = np.asarray(centre, dtype=np.float64)
    left = float(mass - gone.sum())
    if left <= 1e-12 * mass:
        raise ValueError("no mass is left when the parts are taken out")
    return left, (mass * whole - gone @ places) / left


@formula(
    "x = K/M",
    result="x | place of the centre of gravity | length",
    symbols={"moment": "K | sum of mass times place | kg m", "mass": "M | sum of masses | mass"},
    source="definition of the centre of gravity",
)
def centre_coordinate(moment: Real, mass: Real) -> Real:
    """Give one coordinate, m, of the centre of gravity from the sum of mass times place, kg m, and the mass, kg.

    Source: definition.
    """
    return moment / mass


@formula(
    "w = M g0/(l b)",
    result="w | loading of the base | pressure",
    symbols={
        "mass": "M | rigged mass | mass",
        "length": "l | length of the base | length",
        "width": "b | width of the base | length",
    },
    source="definition",
)
def base_loading(mass: Real, length: Real, width: Real) -> Real:
    """Give the weight of a mass, kg, over the base, Pa, that a length and a width, m, make.

    Source: definition.
    """
    return mass * _G0 / (length * width)


@formula(
    "H = h + d",
    result="H | height over the underside | length",
    symbols={"height": "h | height over the deck | length", "depth": "d | thickness of the deck | length"},
    source="definition",
)
def height_over_underside(height: Real, depth: Real) -> Real:
    """Give a height over the platform's underside, m, from the height over its deck and the deck's thickness, m.

    Source: definition.
    """
    return height + depth


@formula(
    "L = l + f + r",
    result="L | rigged length | length",
    symbols={
        "length": "l | length of the platform | length",
        "front": "f | overhang at the front | length",
        "rear": "r | overhang at the rear | length",
    },
    source="definition",
)
def rigged_length(length: Real, front: Real, rear: Real) -> Real:
    """Give the length of a rigged load, m, from the platform's length and the overhangs at front and rear, m.

    Source: definition.
    """
    return length + front + rear


@formula(
    "s = h/b",
    result="s | slenderness | number",
    symbols={
        "height": "h | height of the centre of gravity over the underside | length",
        "base": "b | smaller side of the base | length",
    },
    source="definition",
)
def slenderness(height: Real, base: Real) -> Real:
    """Give the height of the centre of gravity over the underside, m, by the smaller side of the base, m.

    Source: definition.
    """
    return height / base


@formula(
    "d = (Mw - Ms)/Ms",
    result="d | scale's reading over the sum of parts | number",
    symbols={"weighed": "Mw | scale's reading | mass", "parts": "Ms | sum of parts | mass"},
    source="definition",
)
def weighed_misfit(weighed: Real, parts: Real) -> Real:
    """Give the share by which the scale's reading, kg, lies over the sum of parts, kg.

    Source: definition.
    """
    return (weighed - parts) / parts


@formula(
    "m_L = ms/N",
    result="m_L | suspended mass for each canopy | mass",
    symbols={"suspended": "ms | suspended mass | mass", "count": "N | number of main canopies | number"},
    source="definition",
    leaves_out="uneven sharing",
)
def mass_per_canopy(suspended: Real, count: Real) -> Real:
    """Give the suspended mass, kg, for each of a number of canopies.

    Source: definition.
    """
    return suspended / count


@formula(
    "W = m g0",
    result="W | weight | force",
    symbols={"mass": "m | mass | mass"},
    source="definition",
)
def weight(mass: Real) -> Real:
    """Weight of a mass, N."""
    return mass * _G0
