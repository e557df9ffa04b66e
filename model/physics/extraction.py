"""Leaving the aircraft: pull of the extraction parachute, its ratio and line load, and the way to the ramp.

Forces in N, pressures in Pa, areas in m2, masses in kg, lengths in m.
"""

from __future__ import annotations

import numpy as np

from model.physics.formula import CONSTANTS, formula
from model.physics.types import Real

G0 = CONSTANTS["g0"]


@formula(
    "F = q CdS N",
    result="F | pull of the extraction parachutes | force",
    symbols={
        "pressure": "q | dynamic pressure | pressure",
        "drag_area": "CdS | drag area of one | area",
        "count": "N | extraction parachutes | number",
    },
    source="definition",
    leaves_out="the aircraft's wake, the parachute slowing as the load moves aft",
)
def extraction_force(pressure: Real, drag_area: Real, count: Real) -> Real:
    """Steady pull in N of the extraction parachutes in the air stream."""
    return pressure * drag_area * count


@formula(
    "r = q CdS N/(M g0)",
    result="r | extraction ratio | number",
    symbols={
        "pressure": "q | dynamic pressure | pressure",
        "drag_area": "CdS | drag area of one | area",
        "count": "N | extraction parachutes | number",
        "mass": "M | rigged mass | mass",
    },
    source="definition",
    leaves_out="friction on the rollers, the aircraft's wake",
)
def extraction_ratio(pressure: Real, drag_area: Real, count: Real, mass: Real) -> Real:
    """Pull of the extraction parachutes over the load's weight."""
    return pressure * drag_area * count / (mass * G0)


@formula(
    "P = q CdS N Cx",
    result="P | load of the extraction line | force",
    symbols={
        "pressure": "q | dynamic pressure | pressure",
        "drag_area": "CdS | drag area of one | area",
        "count": "N | extraction parachutes | number",
        "opening_coefficient": "Cx | opening force over steady force | number",
    },
    source="infinite-mass opening: the aircraft does not slow",
)
def extraction_line_load(pressure: Real, drag_area: Real, count: Real, opening_coefficient: Real) -> Real:
    """Largest load in N of the extraction line, as its parachutes open behind the aircraft."""
    return pressure * drag_area * count * opening_coefficient


@formula(
    "a = g0 (sin(d) - f cos(d))",
    result="a | acceleration along the rollers | acceleration",
    symbols={"angle": "d | slope of the deck | angle", "friction": "f | rolling friction | number"},
    source="mechanics",
)
def roller_acceleration(angle: Real, friction: Real) -> Real:
    """Acceleration in m/s2 of a load that rolls down a sloping deck by its weight; 0 or less where it stays."""
    return G0 * (np.sin(angle) - friction * np.cos(angle))


@formula(
    "t = sqrt(2 d/a)",
    result="t | time to the ramp | time",
    symbols={"distance": "d | way to the ramp | length", "acceleration": "a | acceleration | acceleration"},
    source="mechanics",
    holds="from rest, a over 0 and constant",
)
def exit_time(distance: Real, acceleration: Real) -> Real:
    """Time in s from rest to the ramp."""
    return np.sqrt(2.0 * distance / acceleration)
