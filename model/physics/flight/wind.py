"""Wind along the track as a function of height: layers with a constant slope, counted from the top."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from .inputs import Drop, as_array
from .lobatto import Array

THINNEST = 0.1
"""m; a wind that changes within less, or jumps, changes over that."""


@dataclass(frozen=True, eq=False)
class Layer:
    """The layer each case is in; its linear law may be used a little beyond its ends."""

    level: Array
    """m, altitude at which the wind is `speed`."""
    speed: Array
    """m/s."""
    slope: Array | None
    """1/s, growth with height; None where it is zero for all cases."""
    bottom: Array
    """m, altitude; -inf for the lowest layer."""

    def at(self, z: Array) -> Array:
        """Wind, m/s, at altitudes z, m."""
        return self.speed if self.slope is None else self.speed + self.slope * (z - self.level)


class Wind:
    """All layers of all cases; (layers, cases). Kinks of the density part layers too."""

    def __init__(self, drop: Drop) -> None:
        ground = as_array(drop.ground_altitude)
        nothing = np.zeros_like(ground)
        winds = drop.winds or ((nothing, nothing),)
        rising = [as_array(height) for height, _ in winds]
        for i in range(1, len(rising)):
            rising[i] = np.maximum(rising[i], rising[i - 1] + THINNEST)
        heights = np.stack(rising[::-1]) + ground
        speeds = np.stack([as_array(speed) for _, speed in reversed(winds)])
        self.sheared = bool((speeds != speeds[0]).any())
        top = float((ground + as_array(drop.release_height)).max())
        for kink in drop.density_kinks:
            if float(ground.min()) < kink < top:
                heights, speeds = _with_level(heights, speeds, kink)
        self.layered = self.sheared or len(heights) > len(winds)
        thickness = np.maximum(heights[:-1] - heights[1:], 1e-9)
        slopes = (speeds[:-1] - speeds[1:]) / thickness
        still = np.zeros((1, len(ground)))
        self.tops = heights
        self.levels = np.concatenate((heights, heights[-1:]))
        self.speeds = np.concatenate((speeds, speeds[-1:]))
        self.slopes = np.concatenate((still, slopes, still))
        self.bottoms = np.concatenate((heights, still - np.inf))
        self.only_layer = Layer(ground, speeds[-1], None, nothing - np.inf)

    def start(self, z: Array) -> NDArray[np.intp]:
        """The layer just below altitudes z, m."""
        return np.asarray((self.tops >= z - 1e-9).sum(0), np.intp)

    def layer(self, index: NDArray[np.intp]) -> Layer:
        """The layers of so many cases, by their numbers."""
        if not self.layered:
            return self.only_layer
        case = np.arange(len(index))
        slope = self.slopes[index, case]
        found = slope if slope.any() else None
        return Layer(self.levels[index, case], self.speeds[index, case], found, self.bottoms[index, case])

    def at(self, z: Array) -> Array:
        """Wind, m/s, at altitudes z (cases,), m."""
        return self.layer(self.start(z)).at(z)


def _with_level(heights: Array, speeds: Array, level: float) -> tuple[Array, Array]:
    """Heights (falling) and wind speeds with one more level put in, which changes no wind."""
    at = np.where(level >= heights[0], speeds[0], speeds[-1])
    for high, low, fast, slow in zip(heights[:-1], heights[1:], speeds[:-1], speeds[1:], strict=True):
        between = (level < high) & (level >= low)
        part = np.where(between, (level - low) / np.where(high > low, high - low, 1), 0)
        at = np.where(between, slow + (fast - slow) * part, at)
    heights, speeds = np.concatenate((heights, np.full_like(at, level)[None])), np.concatenate((speeds, at[None]))
    order = np.argsort(-heights, axis=0, kind="stable")
    return np.take_along_axis(heights, order, 0), np.take_along_axis(speeds, order, 0)
