"""Canopies: drag areas of clusters and reefed stages, filling, and the loads the handbook constants are meant for."""

from __future__ import annotations

import numpy as np

from model.physics.formula import CONSTANTS, formula
from model.physics.types import Real, real

HANDBOOK_DIAMETERS = (28 * 0.3048, 100 * 0.3048)
"""Nominal diameters, m, of the solid cloth canopies that the handbook filling constants are meant for (judgement)."""
HANDBOOK_LOADINGS = (0.5 * 47.88025898033584, 2.0 * 47.88025898033584)
"""Their canopy loadings, Pa (0.5 to 2 lb/ft2; judgement)."""
SWING_SHARE = 0.6
"""Height a load loses while it swings down under its canopies, per system length, level flight."""

_G0 = CONSTANTS["g0"]


@formula(
    "CdS = N eta CD0 S0",
    result="CdS | drag area of the cluster | area",
    symbols={
        "count": "N | canopies of the row | number",
        "efficiency": "eta | cluster efficiency | number",
        "drag_coefficient": "CD0 | drag coefficient on the nominal area | number",
        "area": "S0 | nominal area of one canopy | area",
    },
    source="definition of cluster efficiency",
)
def cluster_drag_area(count: Real, efficiency: Real, drag_coefficient: Real, area: Real) -> Real:
    """Give the drag area, m2, of a number of equal canopies side by side.

    Args:
        count: Number of canopies.
        efficiency: Drag of the cluster over the sum of its single canopies' drag; 1 for one canopy.
        drag_coefficient: Drag coefficient of one canopy on its nominal area.
        area: Nominal area of one canopy, m2.

    Returns:
        Drag area, m2. Source: definition of cluster efficiency.
    """
    return count * efficiency * drag_coefficient * area


@formula(
    "CdSr = eps CdS",
    result="CdSr | drag area while reefed | area",
    symbols={"drag_ratio": "eps | drag ratio of the stage | number", "drag_area": "CdS | drag area unreefed | area"},
    source="definition of the drag ratio",
)
def reefed_drag_area(drag_ratio: Real, drag_area: Real) -> Real:
    """Give the drag area, m2, of a reefing stage with a drag ratio, from the unreefed drag area, m2.

    Source: definition of the drag ratio.
    """
    return drag_ratio * drag_area


@formula(
    "CdS = 2 m g0/(rho v^2)",
    result="CdS | drag area from the measured rate | area",
    symbols={
        "mass": "m | falling mass of the measured drop | mass",
        "density": "rho | air density of the measured drop | density",
        "rate": "v | measured rate of descent | speed",
    },
    source="Knacke, NWC TP 6575, ch. 4, solved for the drag area",
    holds="masses near the measured one; drag area falls with a higher rate",
    leaves_out="the load's own drag, which the measured rate holds already",
)
def drag_area_from_rate(mass: Real, density: Real, rate: Real) -> Real:
    """Give the drag area, m2, that a measured steady rate of descent shows.

    Args:
        mass: Falling mass of the measured drop, kg.
        density: Air density of the measured drop, kg/m3.
        rate: Measured rate of descent, m/s.

    Returns:
        Drag area, m2. Source: Knacke, NWC TP 6575, ch. 4, solved for the drag area.
    """
    return 2.0 * mass * _G0 / (density * rate**2)


@formula(
    "CdS1 = CdS (N - 1)/N",
    result="CdS1 | drag area with one canopy out | area",
    symbols={
        "drag_area": "CdS | drag area of the row with all open | area",
        "count": "N | canopies of the row | number",
    },
    source="derived: the others keep their efficiency",
    holds="at least two canopies",
)
def drag_area_one_out(drag_area: Real, count: Real) -> Real:
    """Give the drag area, m2, of a row of canopies of which one does not open.

    Args:
        drag_area: Drag area of the row with all open, m2.
        count: Number of canopies in the row.

    Returns:
        Drag area, m2. Source: derived, the others keep their efficiency.
    """
    return drag_area * (count - 1.0) / count


@formula(
    "L = n D0 sqrt(eps - eps0)",
    result="L | fill distance | length",
    symbols={
        "fill_constant": "n | fill constant of the stage | number",
        "diameter": "D0 | nominal diameter | length",
        "drag_ratio": "eps | drag ratio of the stage, 1 unreefed | number",
        "drag_ratio_before": "eps0 | drag ratio of the stage before, 0 if none | number",
    },
    source="Knacke, NWC TP 6575, ch. 5 (from memory)",
    holds="drag ratio over that of the stage before",
    leaves_out="cloth porosity, the way of packing",
)
def fill_distance(fill_constant: Real, diameter: Real, drag_ratio: Real, drag_ratio_before: Real) -> Real:
    """Give the distance, m, over which one filling is taken to happen at the speed of its start.

    Args:
        fill_constant: Fill constant of the stage, in nominal diameters.
        diameter: Nominal diameter, m.
        drag_ratio: Drag ratio that the stage reaches; 1 unreefed.
        drag_ratio_before: Drag ratio of the stage before it; 0 for the first.

    Returns:
        Fill distance, m. Source: Knacke, NWC TP 6575, ch. 5 (from memory).
    """
    return fill_constant * diameter * real(np.sqrt(drag_ratio - drag_ratio_before))


@formula(
    "tf = L/V",
    result="tf | filling time | time",
    symbols={"fill_distance": "L | fill distance | length", "speed": "V | speed at the start of the filling | speed"},
    source="Knacke, NWC TP 6575, ch. 5 (from memory)",
)
def filling_time(fill_distance: Real, speed: Real) -> Real:
    """Give the time, s, of a filling over a distance, m, from the speed, m/s, at its start.

    Source: Knacke, NWC TP 6575, ch. 5 (from memory).
    """
    return fill_distance / speed


@formula(
    "w = m g0/CdS",
    result="w | canopy loading | pressure",
    symbols={"mass": "m | mass under the canopies | mass", "drag_area": "CdS | drag area | area"},
    source="definition",
)
def canopy_loading(mass: Real, drag_area: Real) -> Real:
    """Give the canopy loading, Pa, of a mass, kg, under a drag area, m2.

    Source: definition.
    """
    return mass * _G0 / drag_area


@formula(
    "dh = 0.6 (l + r) max(0, cos(gamma))",
    result="dh | swing allowance | length",
    symbols={
        "line_length": "l | line length | length",
        "riser_length": "r | riser length | length",
        "path_angle": "gamma | path angle below the horizontal at line stretch | angle",
    },
    source="derived: motion of load and canopy as two points, 0.4 to 0.6 of the length for cargo",
    leaves_out="collapse and glide after opening",
)
def swing_allowance(line_length: Real, riser_length: Real, path_angle: Real) -> Real:
    """Give the height, m, that a load loses more than a point mass, because it swings down under its canopies.

    Canopy and load start behind each other along the path; on a path straight down there is nothing to swing, and
    a path past the vertical takes nothing back.

    Args:
        line_length: Suspension line length, m.
        riser_length: Riser length, m; 0 if none.
        path_angle: Angle of the path below the horizontal at line stretch, rad.

    Returns:
        Height, m. Source: derived from the motion of load and canopy as two points.
    """
    return SWING_SHARE * (line_length + riser_length) * real(np.maximum(0.0, np.cos(path_angle)))


def in_handbook_class(diameter: float, loading: float) -> bool:
    """Tell whether a solid cloth canopy is of the class that the handbook filling constants are meant for.

    Args:
        diameter: Nominal diameter, m.
        loading: Suspended weight over drag area, Pa.

    Returns:
        True within `HANDBOOK_DIAMETERS` and `HANDBOOK_LOADINGS`, ends included (to rounding).
    """
    grain = 1e-9
    return all(
        low * (1 - grain) <= value <= high * (1 + grain)
        for value, (low, high) in ((diameter, HANDBOOK_DIAMETERS), (loading, HANDBOOK_LOADINGS))
    )


@formula(
    "G = F/(m g0)",
    result="G | opening load factor | number",
    symbols={"force": "F | largest opening force | force", "mass": "m | falling mass | mass"},
    source="definition",
)
def load_factor(force: Real, mass: Real) -> Real:
    """Opening force over weight, in g0."""
    return force / (mass * _G0)
