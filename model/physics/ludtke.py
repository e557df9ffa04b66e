"""Opening force in closed form by Ludtke's area law for solid cloth, filling in a given time.

The speed and force ratios are those of `model.physics.inflation`, with the area and its integral of this law.
"""

from __future__ import annotations

import numpy as np

from model.physics.formula import formula
from model.physics.inflation import NO_GRAVITY, force_ratio, speed_ratio_time
from model.physics.types import Real

_LUDTKE = "Ludtke, AIAA 73-477 and NSWC TR 87-96 (from memory)"
_FRACTION = "tau | share of the filling gone by | number"
_START = "eta | root of the share of drag area open at line stretch | number"


@formula(
    "a = ((1 - eta) tau^3 + eta)^2",
    result="a | open share of the drag area | number",
    symbols={"fraction": _FRACTION, "start": _START},
    source=_LUDTKE,
    holds="solid cloth, 0 <= tau <= 1",
)
def ludtke_area(fraction: Real, start: Real) -> Real:
    """Give the open share of the drag area at a share of the filling, by Ludtke's law for solid cloth.

    Args:
        fraction: Share of the filling gone by, 0 to 1.
        start: Root of the share of the drag area open at line stretch, 0 to 1.

    Returns:
        The share. Source: Ludtke, AIAA 73-477 and NSWC TR 87-96 (from memory).
    """
    return ((1.0 - start) * fraction**3 + start) ** 2


@formula(
    "I = (1 - eta)^2 tau^7/7 + eta (1 - eta) tau^4/2 + eta^2 tau",
    result="I | integral of the open share | number",
    symbols={"fraction": _FRACTION, "start": _START},
    source="derived from " + _LUDTKE,
    holds="solid cloth, 0 <= tau <= 1",
)
def ludtke_area_integral(fraction: Real, start: Real) -> Real:
    """Give the integral of the open share up to a share of the filling, by Ludtke's law.

    Args:
        fraction: Share of the filling gone by, 0 to 1.
        start: Root of the share of the drag area open at line stretch, 0 to 1.

    Returns:
        The integral. Source: derived from Ludtke, AIAA 73-477 and NSWC TR 87-96 (from memory).
    """
    grown = 1.0 - start
    return grown**2 * fraction**7 / 7.0 + start * grown * fraction**4 / 2.0 + start**2 * fraction


@formula(
    "Al = 1/(3 (1 - eta)) - ((1 - eta)^2/7 + eta (1 - eta)/2 + eta^2)",
    result="Al | Ludtke's ballistic parameter from which the peak is at full opening | number",
    symbols={"start": _START},
    source="derived from " + _LUDTKE,
    holds="solid cloth, eta under 1",
    leaves_out=NO_GRAVITY,
)
def ludtke_limit(start: Real) -> Real:
    """Give the ballistic parameter from which the force peaks at full opening, by Ludtke's law.

    Args:
        start: Root of the share of the drag area open at line stretch, 0 to under 1.

    Returns:
        The parameter. Source: derived from Ludtke, AIAA 73-477 and NSWC TR 87-96 (from memory).
    """
    return 1.0 / (3.0 * (1.0 - start)) - ludtke_area_integral(1.0, start)


def ludtke_peak(ballistic: float, start: float) -> tuple[float, float]:
    """Find the largest force ratio by Ludtke's law, filling in a given time.

    The force may fall first (the area open at line stretch slows the load), then rise and fall again; the larger of the
    starting value and the later peak counts.

    Args:
        ballistic: Ballistic parameter.
        start: Root of the share of the drag area open at line stretch, 0 to 1.

    Returns:
        The share of the filling time at the peak, and the force ratio there. Source: Ludtke, AIAA 73-477 and NSWC TR
        87-96 (from memory).
    """

    def ratio(fraction: float) -> float:
        speed = speed_ratio_time(ludtke_area_integral(fraction, start), ballistic)
        return float(force_ratio(ludtke_area(fraction, start), speed))

    def rising(fraction: Real) -> Real:
        """Have the sign of the force's slope."""
        side = (1.0 - start) * fraction**3 + start
        return 3.0 * (1.0 - start) * fraction**2 * (ballistic + ludtke_area_integral(fraction, start)) - side**3

    grid = np.linspace(0.0, 1.0, 401)
    slopes = np.asarray(rising(grid))
    peaks = [0.0, 1.0]
    for at in np.flatnonzero((slopes[:-1] > 0.0) & (slopes[1:] <= 0.0)):
        low, high = float(grid[at]), float(grid[at + 1])
        for _ in range(60):
            middle = (low + high) / 2.0
            low, high = (middle, high) if rising(middle) > 0.0 else (low, middle)
        peaks.append(high)
    best = max(peaks, key=ratio)
    return best, ratio(best)
