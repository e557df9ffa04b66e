"""Landing on honeycomb: crush force, net and felt deceleration, stroke, bottoming, and which way to change the stack.

Decelerations are multiples of standard gravity. *Net* is what the load's motion shows; *felt* is net + 1, what the
stack pushes with over the weight. Forces in N, areas in m2, lengths in m, speeds in m/s.
"""

from __future__ import annotations

from enum import StrEnum
from math import ceil
from typing import NamedTuple

import numpy as np
from numpy.typing import ArrayLike, NDArray

from model.physics.formula import CONSTANTS, formula
from model.physics.types import Real

G0 = CONSTANTS["g0"]
WORK_ENERGY = "work and energy at a constant crush force"


@formula(
    "P = c A",
    result="P | crush force of the row | force",
    symbols={"stress": "c | crush stress | pressure", "area": "A | area of the stack | area"},
    source="definition",
)
def stack_force(stress: Real, area: Real) -> Real:
    """Crush force of one row of stacks in N; rows add."""
    return stress * area


@formula(
    "G = P/W - 1",
    result="G | net deceleration in g | number",
    symbols={"force": "P | crush force of all rows | force", "weight": "W | weight over the stack | force"},
    source=WORK_ENERGY,
    holds="P over W",
    leaves_out="the rise of the crush force with speed, air trapped under the load, a swinging load",
)
def net_deceleration(force: Real, weight: Real) -> Real:
    """Net upward deceleration in multiples of g0; 0 or less where the stack cannot stop the load."""
    return force / weight - 1.0


@formula(
    "N = G + 1",
    result="N | felt deceleration in g | number",
    symbols={"net": "G | net deceleration in g | number"},
    source="definition",
)
def felt_deceleration(net: Real) -> Real:
    """What the load feels: the stack's push over the weight."""
    return net + 1.0


@formula(
    "s = v^2/(2 g0 G)",
    result="s | stroke needed to stop | length",
    symbols={"speed": "v | speed at touchdown | speed", "net": "G | net deceleration in g | number"},
    source=WORK_ENERGY,
    holds="G over 0",
)
def needed_stroke(speed: Real, net: Real) -> Real:
    """Stroke in m that stops the load at a net deceleration."""
    return speed**2 / (2.0 * G0 * net)


@formula(
    "G = v^2/(2 g0 s)",
    result="G | net deceleration in g | number",
    symbols={"speed": "v | speed at touchdown | speed", "stroke": "s | stroke | length"},
    source=WORK_ENERGY,
)
def net_by_stroke(speed: Real, stroke: Real) -> Real:
    """Least constant net deceleration, in multiples of g0, that stops the load within a stroke."""
    return speed**2 / (2.0 * G0 * stroke)


@formula(
    "s_u = n t x",
    result="s_u | usable stroke | length",
    symbols={
        "layers": "n | layers | number",
        "thickness": "t | thickness of one layer | length",
        "strain": "x | share of the thickness that can crush | number",
    },
    source="definition",
)
def usable_stroke(layers: Real, thickness: Real, strain: Real) -> Real:
    """Stroke in m that a stack offers before it bottoms."""
    return layers * thickness * strain


@formula(
    "r = s_u/s",
    result="r | crush reserve | number",
    symbols={"usable": "s_u | usable stroke of the thinnest row | length", "stroke": "s | stroke needed | length"},
    source="definition",
)
def crush_reserve(usable: Real, stroke: Real) -> Real:
    """Usable over needed stroke; below 1 the stack bottoms."""
    return usable / stroke


@formula(
    "A = W (G + 1)/c",
    result="A | area for a wanted deceleration | area",
    symbols={
        "weight": "W | weight over the stack | force",
        "net": "G | net deceleration wanted, in g | number",
        "stress": "c | crush stress | pressure",
    },
    source=WORK_ENERGY,
)
def area_for(weight: Real, net: Real, stress: Real) -> Real:
    """Stack area in m2 that gives a wanted net deceleration."""
    return weight * (net + 1.0) / stress


@formula(
    "t = s/x",
    result="t | thickness needed | length",
    symbols={
        "stroke": "s | stroke needed | length",
        "strain": "x | share of the thickness that can crush | number",
    },
    source="definition",
)
def needed_thickness(stroke: Real, strain: Real) -> Real:
    """Thickness in m that offers a stroke."""
    return stroke / strain


@formula(
    "E = P s",
    result="E | work of the crush | J",
    symbols={"force": "P | crush force | force", "stroke": "s | stroke | length"},
    source=WORK_ENERGY,
)
def crush_work(force: Real, stroke: Real) -> Real:
    """Energy in J that a stack takes up over a stroke."""
    return force * stroke


@formula(
    "E = W v^2/(2 g0) + W s",
    result="E | energy of the landing | J",
    symbols={
        "weight": "W | weight over the stack | force",
        "speed": "v | speed at touchdown | speed",
        "stroke": "s | stroke | length",
    },
    source=WORK_ENERGY,
)
def landing_energy(weight: Real, speed: Real, stroke: Real) -> Real:
    """Energy in J to be taken up: of the speed, and of the weight sinking through the stroke."""
    return weight * speed**2 / (2.0 * G0) + weight * stroke


@formula(
    "v_b = sqrt(max(v^2 - 2 g0 G s_u, 0))",
    result="v_b | speed left when the stack bottoms | speed",
    symbols={
        "speed": "v | speed at touchdown | speed",
        "net": "G | net deceleration in g | number",
        "usable": "s_u | usable stroke | length",
    },
    source=WORK_ENERGY,
)
def bottoming_speed(speed: Real, net: Real, usable: Real) -> Real:
    """Speed in m/s with which the load strikes the crushed stack; 0 where the stroke is enough."""
    return np.sqrt(np.maximum(speed**2 - 2.0 * G0 * net * usable, 0.0))


@formula(
    "P = W (1 + v^2/(2 g0 s_u))",
    result="P | least crush force that does not bottom | force",
    symbols={
        "weight": "W | weight over the stack | force",
        "speed": "v | speed at touchdown | speed",
        "usable": "s_u | usable stroke | length",
    },
    source=WORK_ENERGY,
)
def least_crush_force(weight: Real, speed: Real, usable: Real) -> Real:
    """Crush force in N that just stops the load within the usable stroke."""
    return weight * (1.0 + speed**2 / (2.0 * G0 * usable))


@formula(
    "P = W (G + 1)",
    result="P | crush force at a net deceleration | force",
    symbols={
        "weight": "W | weight over the stack | force",
        "net": "G | net deceleration in g | number",
    },
    source=WORK_ENERGY,
)
def crush_force_at(weight: Real, net: Real) -> Real:
    """Crush force in N that gives a net deceleration: the most a stack may push under a limit."""
    return weight * (net + 1.0)


class CushionFit(StrEnum):
    """How a stack fits its load, and so which way to change it."""

    FITS = "fits"
    CANNOT_STOP = "crush force no larger than the weight: more area"
    TOO_SOFT = "bottoms: more area, or more layers"
    TOO_SOFT_KEEP_AREA = "bottoms: more layers"
    TOO_HARD = "too hard: less area"
    TOO_HARD_AND_THIN = "too hard: less area, with more layers"


class CushionAdvice(NamedTuple):
    """What would make a stack fit.

    Attributes:
        fit: How the stack fits, and the way to go.
        least_force: Crush force in N below which it bottoms in the present stroke.
        most_force: Crush force in N above which the deceleration passes its limit; None without a limit.
    """

    fit: CushionFit
    least_force: float
    most_force: float | None


def advise(force: float, weight: float, speed: float, usable: float, net_limit: float | None = None) -> CushionAdvice:
    """Say whether a stack is too soft, too hard or too thin, and between which crush forces it would fit.

    Args:
        force: Crush force of all rows in N.
        weight: Weight over the stack in N, over 0.
        speed: Speed at touchdown in m/s.
        usable: Usable stroke of the thinnest row in m, over 0.
        net_limit: Largest net deceleration allowed in multiples of g0, the least of the limit and every fragility; None
            where nothing limits it.
    """
    least = float(least_crush_force(weight, speed, usable))
    most = None if net_limit is None else float(crush_force_at(weight, net_limit))
    # With least over most no area will do at this thickness: only more layers open a window.
    closed = most is not None and least > most
    if most is not None and force > most:
        fit = CushionFit.TOO_HARD_AND_THIN if closed else CushionFit.TOO_HARD
    elif force <= weight:
        fit = CushionFit.CANNOT_STOP
    elif force < least:
        fit = CushionFit.TOO_SOFT_KEEP_AREA if closed else CushionFit.TOO_SOFT
    else:
        fit = CushionFit.FITS
    return CushionAdvice(fit, least, most)


def layers_needed(thickness: float, layer: float) -> int:
    """Whole layers of a given thickness (m) that make up a needed thickness (m); exact multiples are not rounded up."""
    return max(1, ceil(thickness / layer * (1.0 - 1e-12)))


def crush_centre(forces: ArrayLike, places: ArrayLike) -> NDArray[np.float64]:
    """Centre of the crush force in plan.

    Args:
        forces: Crush force of each row in N, shape (n,), not negative.
        places: Middle of each row in m, shape (n, 2).

    Returns:
        The centre in m, shape (2,).

    Raises:
        ValueError: Without a row, or where no row has a force.
    """
    weights = np.asarray(forces, dtype=np.float64)
    total = float(weights.sum())
    if not total > 0.0:
        raise ValueError("a crush centre needs a crush force over 0")
    centre: NDArray[np.float64] = weights @ np.asarray(places, dtype=np.float64).reshape(-1, 2) / total
    return centre
