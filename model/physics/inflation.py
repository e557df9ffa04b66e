"""Opening force in closed form: infinite mass, and drag area growing with time or with distance.

All of them leave gravity out and take the density as constant, so they hold for a path near level; the motion to the
ground does not. One pair of laws, how area grows and how speed follows from the area's integral, gives every form:

    force ratio X = a u^2,  u = 1/(1 + I/A) filling in a given time,  u = exp(-I/A) filling over a given distance,

with a the open share of the drag area, I its integral over the share of the filling gone by, A the ballistic parameter.
"""

from __future__ import annotations

import math

import numpy as np

from model.physics.formula import formula
from model.physics.types import Real, real

INFINITE_MASS_LEAST = 10.0
"""Ballistic parameter under which the infinite-mass force misleads."""
STEEPEST_NO_GRAVITY = math.pi / 4
"""Path angle below the horizontal, rad, over which the forms without gravity fall short."""

NO_GRAVITY = "gravity, added mass, change of density with height, area open before the filling"
_PFLANZ = "Pflanz 1942; Knacke, NWC TP 6575, ch. 5 (from memory)"
_FRACTION = "tau | share of the filling gone by | number"
_EXPONENT = "j | growth exponent | number"
_BALLISTIC = "A | ballistic parameter | number"


@formula(
    "F = q CdS Cx",
    result="F | opening force at infinite mass | force",
    symbols={
        "dynamic_pressure": "q | dynamic pressure at line stretch | pressure",
        "drag_area": "CdS | drag area | area",
        "opening_coefficient": "Cx | opening coefficient | number",
    },
    source="Knacke, NWC TP 6575, ch. 5 (from memory)",
    holds="ballistic parameter over 10: a load that does not slow while the canopy fills",
    leaves_out="slowing while the canopy fills",
)
def infinite_mass_force(dynamic_pressure: Real, drag_area: Real, opening_coefficient: Real) -> Real:
    """Give the opening force, N, of a canopy on a load too heavy to slow while it fills.

    Args:
        dynamic_pressure: Dynamic pressure at line stretch, Pa.
        drag_area: Drag area of the open canopies, m2.
        opening_coefficient: Opening coefficient Cx.

    Returns:
        Force, N. Source: Knacke, NWC TP 6575, ch. 5 (from memory).
    """
    return dynamic_pressure * drag_area * opening_coefficient


@formula(
    "A = 2 m/(rho CdS L)",
    result="A | ballistic parameter | number",
    symbols={
        "mass": "m | falling mass | mass",
        "density": "rho | air density | density",
        "drag_area": "CdS | drag area | area",
        "fill_distance": "L | fill distance, speed at line stretch times filling time | length",
    },
    source=_PFLANZ,
)
def ballistic_parameter(mass: Real, density: Real, drag_area: Real, fill_distance: Real) -> Real:
    """Give the ballistic parameter: the load's mass against the air that the filling canopy works on.

    Args:
        mass: Falling mass, kg.
        density: Air density, kg/m3.
        drag_area: Drag area of the open canopies, m2.
        fill_distance: Fill distance, m; the speed at line stretch times the filling time where that is known.

    Returns:
        The parameter, a number. Source: Pflanz 1942.
    """
    return 2.0 * mass / (density * drag_area * fill_distance)


@formula(
    "Ac = (j + 2)/(j (j + 1))",
    result="Ac | ballistic parameter from which the peak is at full opening | number",
    symbols={"exponent": _EXPONENT},
    source="derived from " + _PFLANZ,
    holds="filling in a given time",
    leaves_out=NO_GRAVITY,
)
def critical_ballistic_parameter(exponent: Real) -> Real:
    """Give the ballistic parameter from which the force peaks at full opening, for a growth exponent.

    Source: derived from Pflanz 1942.
    """
    return (exponent + 2.0) / (exponent * (exponent + 1.0))


@formula(
    "a = tau^j",
    result="a | open share of the drag area | number",
    symbols={"fraction": _FRACTION, "exponent": _EXPONENT},
    source=_PFLANZ,
    holds="0 <= tau <= 1",
)
def power_area(fraction: Real, exponent: Real) -> Real:
    """Give the open share of the drag area at a share of the filling, for a growth exponent.

    Source: Pflanz 1942.
    """
    return real(np.power(fraction, exponent))


@formula(
    "I = tau^(j + 1)/(j + 1)",
    result="I | integral of the open share | number",
    symbols={"fraction": _FRACTION, "exponent": _EXPONENT},
    source="derived from " + _PFLANZ,
    holds="0 <= tau <= 1",
)
def power_area_integral(fraction: Real, exponent: Real) -> Real:
    """Give the integral of the open share up to a share of the filling, for a growth exponent.

    Source: derived from Pflanz 1942.
    """
    return real(np.power(fraction, exponent + 1.0)) / (exponent + 1.0)


@formula(
    "u = 1/(1 + I/A)",
    result="u | speed over the speed at line stretch | number",
    symbols={"integral": "I | integral of the open share | number", "ballistic": _BALLISTIC},
    source=_PFLANZ,
    holds="filling in a given time, path near level",
    leaves_out=NO_GRAVITY,
)
def speed_ratio_time(integral: Real, ballistic: Real) -> Real:
    """Give the speed over the speed at line stretch, for a canopy that fills in a given time.

    Args:
        integral: Integral of the open share of the drag area over the share of the filling time.
        ballistic: Ballistic parameter.

    Returns:
        The ratio. Source: Pflanz 1942.
    """
    return 1.0 / (1.0 + integral / ballistic)


@formula(
    "u = exp(-I/A)",
    result="u | speed over the speed at line stretch | number",
    symbols={"integral": "I | integral of the open share | number", "ballistic": _BALLISTIC},
    source="derived: filling over a given distance",
    holds="filling over a given distance, path near level",
    leaves_out=NO_GRAVITY,
)
def speed_ratio_distance(integral: Real, ballistic: Real) -> Real:
    """Give the speed over the speed at line stretch, for a canopy that fills over a given distance.

    Args:
        integral: Integral of the open share of the drag area over the share of the fill distance.
        ballistic: Ballistic parameter.

    Returns:
        The ratio. Source: derived.
    """
    return real(np.exp(-integral / ballistic))


@formula(
    "X = a u^2",
    result="X | force over that of infinite mass | number",
    symbols={
        "area_ratio": "a | open share of the drag area | number",
        "speed_ratio": "u | speed over the speed at line stretch | number",
    },
    source="definition",
)
def force_ratio(area_ratio: Real, speed_ratio: Real) -> Real:
    """Give the force over that of infinite mass, from the open share of the drag area and the speed ratio.

    Source: definition.
    """
    return area_ratio * speed_ratio**2


@formula(
    "tau = min(1, (j (j + 1) A/(j + 2))^(1/(j + 1)))",
    result="tau | share of the filling time at the peak | number",
    symbols={"ballistic": _BALLISTIC, "exponent": _EXPONENT},
    source="derived from " + _PFLANZ,
    holds="filling in a given time, path near level",
    leaves_out=NO_GRAVITY,
)
def peak_fraction_time(ballistic: Real, exponent: Real) -> Real:
    """Give the share of the filling time at which the force peaks.

    Args:
        ballistic: Ballistic parameter.
        exponent: Growth exponent.

    Returns:
        The share, at most 1. Source: derived from Pflanz 1942.
    """
    raised = exponent * (exponent + 1.0) * ballistic / (exponent + 2.0)
    return real(np.minimum(1.0, np.power(raised, 1.0 / (exponent + 1.0))))


@formula(
    "tau = min(1, (j A/2)^(1/(j + 1)))",
    result="tau | share of the fill distance at the peak | number",
    symbols={"ballistic": _BALLISTIC, "exponent": _EXPONENT},
    source="derived: filling over a given distance",
    holds="filling over a given distance, path near level",
    leaves_out=NO_GRAVITY,
)
def peak_fraction_distance(ballistic: Real, exponent: Real) -> Real:
    """Give the share of the fill distance at which the force peaks.

    Args:
        ballistic: Ballistic parameter.
        exponent: Growth exponent.

    Returns:
        The share, at most 1. Source: derived.
    """
    return real(np.minimum(1.0, np.power(exponent * ballistic / 2.0, 1.0 / (exponent + 1.0))))


@formula(
    "F = q CdS Cx X1",
    result="F | opening force | force",
    symbols={
        "dynamic_pressure": "q | dynamic pressure at line stretch | pressure",
        "drag_area": "CdS | drag area | area",
        "opening_coefficient": "Cx | opening coefficient | number",
        "factor": "X1 | largest force over that of infinite mass | number",
    },
    source=_PFLANZ,
    holds="path near level",
    leaves_out=NO_GRAVITY,
)
def peak_force(dynamic_pressure: Real, drag_area: Real, opening_coefficient: Real, factor: Real) -> Real:
    """Give the opening force, N, from the largest force ratio of a filling.

    Args:
        dynamic_pressure: Dynamic pressure at line stretch, Pa.
        drag_area: Drag area of the open canopies, m2.
        opening_coefficient: Opening coefficient Cx.
        factor: Largest force over that of infinite mass.

    Returns:
        Force, N. Source: Pflanz 1942.
    """
    return infinite_mass_force(dynamic_pressure, drag_area, opening_coefficient) * factor


@formula(
    "Xm = A (1 - u)",
    result="Xm | mean force over that of infinite mass | number",
    symbols={"ballistic": _BALLISTIC, "speed_ratio": "u | speed at full opening over that at line stretch | number"},
    source="derived: impulse equals the momentum lost",
    holds="filling in a given time, path near level",
    leaves_out=NO_GRAVITY,
)
def mean_force_ratio(ballistic: Real, speed_ratio: Real) -> Real:
    """Give the mean force of a filling, over time, over that of infinite mass.

    Args:
        ballistic: Ballistic parameter.
        speed_ratio: Speed at full opening over the speed at line stretch.

    Returns:
        The ratio. Source: derived, impulse equals the momentum lost.
    """
    return ballistic * (1.0 - speed_ratio)


def factor_time(ballistic: Real, exponent: Real) -> Real:
    """Give the largest force ratio X1 of a canopy that fills in a given time.

    Args:
        ballistic: Ballistic parameter.
        exponent: Growth exponent.

    Returns:
        X1, 0 to 1. Source: Pflanz 1942.
    """
    peak = peak_fraction_time(ballistic, exponent)
    return force_ratio(power_area(peak, exponent), speed_ratio_time(power_area_integral(peak, exponent), ballistic))


def factor_distance(ballistic: Real, exponent: Real) -> Real:
    """Give the largest force ratio X1 of a canopy that fills over a given distance.

    Args:
        ballistic: Ballistic parameter.
        exponent: Growth exponent.

    Returns:
        X1, 0 to 1. Source: derived.
    """
    peak = peak_fraction_distance(ballistic, exponent)
    return force_ratio(power_area(peak, exponent), speed_ratio_distance(power_area_integral(peak, exponent), ballistic))
