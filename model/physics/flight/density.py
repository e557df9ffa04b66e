"""A polynomial that stands for the air's density over a range of heights: some nanoseconds a value."""

from __future__ import annotations

from collections.abc import Callable
from functools import cache, lru_cache

import numpy as np

from .lobatto import Array

Density = Callable[[Array], Array]
"""Density, kg/m3, at geometric altitudes, m; shape in, shape out."""

CLOSE = 5e-9
"""Largest relative difference between the polynomial and the density it stands for."""
GRID = 250.0
"""m; ranges are widened to multiples of it, so that neighbouring flights share a fit."""


class Air:
    """Density by a fitted polynomial, or by the density itself where no polynomial is close enough.

    Below the range the density at its lower end is used: pieces of a flight may reach below the ground before they are
    cut off there.
    """

    def __init__(self, density: Density, low: float, high: float) -> None:
        self.density, self.low, self.middle = density, low, (low + high) / 2
        self.coefficients = _fit(density, low, high)

    def __call__(self, z: Array, out: Array | None = None, scratch: Array | None = None) -> Array:
        """Density, kg/m3, at altitudes z, m; ``out`` and ``scratch`` save the allocation of new arrays."""
        above = np.maximum(z, self.low, out=scratch)
        if self.coefficients is None:
            value = np.asarray(self.density(above), float)
            if out is None:
                return value
            out[...] = value
            return out
        above -= self.middle
        value = np.multiply(self.coefficients[-1], above, out=out)
        for coefficient in self.coefficients[-2:0:-1]:
            value += coefficient
            value *= above
        value += self.coefficients[0]
        return value


def _fit(density: Density, low: float, high: float) -> list[float] | None:
    middle, half = (low + high) / 2, (high - low) / 2
    probe = np.linspace(-1, 1, 101)
    exact = np.asarray(density(middle + half * probe), float)
    for degree in range(3, 10):
        at, inverse = _chebyshev(degree)
        series = inverse @ np.asarray(density(middle + half * at), float)
        if np.abs(np.polyval(series[::-1], probe) / exact - 1).max() < CLOSE:
            return [float(c) for c in series / half ** np.arange(degree + 1)]
    return None


@cache
def _chebyshev(degree: int) -> tuple[Array, Array]:
    """Points to interpolate in, and the matrix from values there to a power series."""
    at = np.cos(np.pi * (np.arange(degree + 1) + 0.5) / (degree + 1))
    return at, np.linalg.inv(np.vander(at, increasing=True))


@lru_cache(maxsize=32)
def _cached(density: Density, low: float, high: float) -> Air:
    return Air(density, low, high)


def air_between(density: Density, low: float, high: float) -> Air:
    """The density over a range of altitudes, m, that holds ``low`` and ``high``."""
    low, high = float(np.floor(low / GRID) * GRID), float(np.ceil(high / GRID) * GRID)
    try:
        return _cached(density, low, high)
    except TypeError:       # a callable that cannot be hashed
        return Air(density, low, high)
