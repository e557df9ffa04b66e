"""Drag: areas, steady speed, and vertical fall with and without air at constant density."""

from __future__ import annotations

import numpy as np

from model.physics.formula import CONSTANTS, formula
from model.physics.types import Real, real

FRONT_FACE_COEFFICIENT = 1.05
"""Drag coefficient of a box, face on, on the area of its face (Hoerner, Fluid-Dynamic Drag, ch. 3)."""

_G0 = CONSTANTS["g0"]
_FALL = "derived: vertical fall, drag as speed squared, constant density"


@formula(
    "S0 = pi D0^2/4",
    result="S0 | nominal area | area",
    symbols={"diameter": "D0 | nominal diameter | length"},
    source="definition",
)
def circle_area(diameter: Real) -> Real:
    """Give the area, m2, of a circle of a diameter, m: the nominal area of a canopy.

    Source: definition.
    """
    return np.pi * diameter**2 / 4.0


@formula(
    "CdS = CD0 S0",
    result="CdS | drag area | area",
    symbols={
        "drag_coefficient": "CD0 | drag coefficient on the nominal area | number",
        "area": "S0 | nominal area | area",
    },
    source="definition",
)
def drag_area(drag_coefficient: Real, area: Real) -> Real:
    """Give the drag area, m2, of an area, m2, with a drag coefficient.

    Source: definition.
    """
    return drag_coefficient * area


@formula(
    "D0 = sqrt(4 CdS/(pi CD0))",
    result="D0 | nominal diameter | length",
    symbols={
        "drag_area": "CdS | drag area of one canopy | area",
        "drag_coefficient": "CD0 | drag coefficient on the nominal area | number",
    },
    source="definition",
)
def nominal_diameter(drag_area: Real, drag_coefficient: Real) -> Real:
    """Give the nominal diameter, m, of a canopy with a drag area, m2, and a drag coefficient.

    Source: definition.
    """
    return real(np.sqrt(4.0 * drag_area / (np.pi * drag_coefficient)))


@formula(
    "V = sqrt(2 m g0/(rho CdS))",
    result="V | steady rate of descent | speed",
    symbols={
        "mass": "m | falling mass | mass",
        "density": "rho | air density | density",
        "drag_area": "CdS | drag area | area",
    },
    source="Knacke, NWC TP 6575, ch. 4",
    holds="steady, straight down",
    leaves_out="glide, oscillation, rising and sinking air",
)
def terminal_speed(mass: Real, density: Real, drag_area: Real) -> Real:
    """Give the speed, m/s, at which drag carries the weight.

    Args:
        mass: Falling mass, canopies included, kg.
        density: Air density, kg/m3.
        drag_area: Drag area of all that hangs in the air, m2.

    Returns:
        Speed, m/s. Source: Knacke, NWC TP 6575, ch. 4.
    """
    return real(np.sqrt(2.0 * mass * _G0 / (density * drag_area)))


@formula(
    "q = rho V^2/2",
    result="q | dynamic pressure | pressure",
    symbols={"density": "rho | air density | density", "speed": "V | true airspeed | speed"},
    source="definition",
)
def dynamic_pressure(density: Real, speed: Real) -> Real:
    """Give the dynamic pressure, Pa, of air of a density, kg/m3, at a speed, m/s.

    Source: definition.
    """
    return density * speed**2 / 2.0


@formula(
    "CdA = 1.05 b h",
    result="CdA | drag area of the load | area",
    symbols={"width": "b | width of the front face | length", "height": "h | height of the front face | length"},
    source="Hoerner, Fluid-Dynamic Drag, ch. 3: box, face on",
    holds="a bluff load, front face to the wind",
)
def front_face_drag_area(width: Real, height: Real) -> Real:
    """Give the drag area, m2, of a box-shaped load with a front face of a width and a height, m.

    Source: Hoerner, Fluid-Dynamic Drag, ch. 3.
    """
    return FRONT_FACE_COEFFICIENT * width * height


@formula(
    "v = Vt tanh(g0 t/Vt)",
    result="v | speed of fall | speed",
    symbols={"time": "t | time from rest | time", "terminal": "Vt | terminal speed | speed"},
    source=_FALL,
    holds="straight down from rest",
    leaves_out="speed along the track, change of density with height",
)
def fall_speed(time: Real, terminal: Real) -> Real:
    """Give the speed, m/s, a time, s, after a fall from rest toward a terminal speed, m/s.

    Source: derived: vertical fall, drag as speed squared, constant density.
    """
    return terminal * real(np.tanh(_G0 * time / terminal))


@formula(
    "s = (Vt^2/g0) ln(cosh(g0 t/Vt))",
    result="s | distance fallen | length",
    symbols={"time": "t | time from rest | time", "terminal": "Vt | terminal speed | speed"},
    source=_FALL,
    holds="straight down from rest",
    leaves_out="speed along the track, change of density with height",
)
def fall_distance(time: Real, terminal: Real) -> Real:
    """Give the distance, m, fallen in a time, s, from rest toward a terminal speed, m/s.

    Source: derived: vertical fall, drag as speed squared, constant density.
    """
    angle = _G0 * time / terminal
    # ln cosh x = ln(e^x + e^-x) - ln 2, which does not overflow for a long fall
    return terminal**2 / _G0 * real(np.logaddexp(angle, -angle) - np.log(2.0))


@formula(
    "v = Vt/tanh(g0 t/Vt + atanh(Vt/v0))",
    result="v | speed | speed",
    symbols={
        "time": "t | time | time",
        "terminal": "Vt | terminal speed | speed",
        "speed": "v0 | speed at the start | speed",
    },
    source=_FALL,
    holds="straight down, faster than terminal speed at the start",
    leaves_out="canopy filling, speed along the track, change of density with height",
)
def slowing_speed(time: Real, terminal: Real, speed: Real) -> Real:
    """Give the speed, m/s, a time, s, after a start straight down at over the terminal speed.

    Args:
        time: Time, s.
        terminal: Terminal speed, m/s.
        speed: Speed at the start, m/s, over the terminal speed.

    Returns:
        Speed, m/s. Source: derived: vertical fall, drag as speed squared, constant density.
    """
    return terminal / real(np.tanh(_G0 * time / terminal + np.arctanh(terminal / speed)))


@formula(
    "s = (Vt^2/g0) ln(sinh(g0 t/Vt + atanh(Vt/v0))/sinh(atanh(Vt/v0)))",
    result="s | distance fallen | length",
    symbols={
        "time": "t | time | time",
        "terminal": "Vt | terminal speed | speed",
        "speed": "v0 | speed at the start | speed",
    },
    source=_FALL,
    holds="straight down, faster than terminal speed at the start",
    leaves_out="canopy filling, speed along the track, change of density with height",
)
def slowing_distance(time: Real, terminal: Real, speed: Real) -> Real:
    """Give the distance, m, covered in a time, s, after a start straight down at over the terminal speed.

    Args:
        time: Time, s.
        terminal: Terminal speed, m/s.
        speed: Speed at the start, m/s, over the terminal speed.

    Returns:
        Distance, m. Source: derived: vertical fall, drag as speed squared, constant density.
    """
    start = real(np.arctanh(terminal / speed))
    gained = _G0 * time / terminal
    # sinh(x + c)/sinh c = e^x (1 - e^-2(x + c))/(1 - e^-2c), which does not overflow for a long fall
    ratio = real(np.expm1(-2.0 * (gained + start)) / np.expm1(-2.0 * start))
    return terminal**2 / _G0 * (gained + real(np.log(ratio)))


@formula(
    "h = v^2/(2 g0)",
    result="h | equal fall without air | length",
    symbols={"speed": "v | speed at the ground | speed"},
    source="energy balance",
)
def equivalent_fall_height(speed: Real) -> Real:
    """Give the height, m, of a fall from rest without air that ends at a speed, m/s.

    Source: energy balance.
    """
    return speed**2 / (2.0 * _G0)


@formula(
    "v = sqrt(2 g0 h)",
    result="v | speed at the ground | speed",
    symbols={"height": "h | height of fall | length"},
    source="energy balance",
    leaves_out="air",
)
def airless_fall_speed(height: Real) -> Real:
    """Give the speed, m/s, at the end of a fall from rest without air from a height, m.

    Source: energy balance.
    """
    return real(np.sqrt(2.0 * _G0 * height))
