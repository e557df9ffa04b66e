"""Steady descent under a constant area, as a series in height.

In steady descent w^2 = (g - d(w^2)/dh/2)/k, h the height fallen, by repeated substitution; what is left of the settling
fades in closed form. It costs the same for ten metres and for ten kilometres.
"""

from __future__ import annotations

from dataclasses import dataclass, replace

import numpy as np

from .density import Air
from .lobatto import Array, Lobatto, lobatto, root_after, values_at
from .state import Load, Mask, State
from .wind import Layer


@dataclass(frozen=True, eq=False)
class Glide:
    """Node histories over the height fallen, and the state in which it ends."""

    nodes: Lobatto
    end: State
    t: Array
    x: Array
    z: Array
    u: Array
    w: Array
    pressure: Array
    """Dynamic pressure, Pa, without a case's density factor."""
    error: Array
    at_floor: Mask

    def largest_pressure(self) -> tuple[Array, Array]:
        """Largest dynamic pressure up to the end, Pa, and its time, s."""
        until = self.t <= self.end.t * (1 + 1e-15)
        value = np.where(until, self.pressure, 0.0)
        case, best = np.arange(value.shape[1]), value.argmax(0)
        slope = self.nodes.slope @ self.pressure
        left = np.clip(best - (slope[best, case] < 0), 0, len(value) - 2)
        x = root_after(self.nodes, slope, left)
        inside, time = values_at(self.nodes, x, self.pressure, self.t)
        wins = (inside > value[best, case]) & (time <= self.end.t)
        return np.where(wins, inside, value[best, case]), np.where(wins, time, self.t[best, case])


def glide(
    start: State, area: Array, floor: Array, until: Array, load: Load, air: Air, layer: Layer, count: int
) -> Glide:
    """Descend to an altitude ``floor``, m, or to the time ``until``, s, whichever comes first.

    The result is good only as far as `error`, an estimate of the relative error in time, says.
    """
    nodes, g = lobatto(count), load.gravity
    depth = np.maximum(start.z - floor, 1e-6)
    z = start.z - depth * nodes.tau
    density = air(z)
    k = density * ((area + load.drag_area) / load.doubled_mass)
    square = before = g / k
    for _ in range(3):
        lean = 1.0 if layer.slope is None else np.sqrt(1 + square * (layer.slope / g) ** 2)
        before, square = square, (g - (nodes.slope @ square) / (2 * depth)) / (k * lean)
    steady = np.sqrt(square)
    plain_time = depth * (nodes.integral @ (1 / steady))
    across = np.zeros_like(square) if layer.slope is None else layer.slope * square / g     # steady u
    rush, slide = start.w - steady[0], start.u - across[0]      # these fade at 2 g/w and g/w
    faded = 1 - np.exp(-g / steady[0] * plain_time)
    left = (1 - faded) ** 2
    mixed = -across[0] * slide / steady[0]
    saved = (rush - mixed - slide**2 / (4 * steady[0])) / (2 * g) * (1 - left) + mixed / g * faded
    saved = saved + plain_time * left * (slide / steady[0]) ** 2 / 4
    t = start.t + plain_time - saved
    way = depth * (nodes.integral @ ((layer.at(z) + across) / steady))
    x = start.x + way + slide * steady[0] / g * faded - saved * layer.at(start.z)
    w, u = steady + (rush - mixed) * left + mixed * (1 - faded), across + slide * (1 - faded)
    w -= g / 2 * (slide / steady[0]) ** 2 * plain_time * left
    error = np.abs(square / before - 1).max(0) + np.abs(nodes.last @ (1 / steady)).sum(0) * steady[-1]
    small = np.abs(slide) / steady[0]
    neglected = (rush / steady[0]) ** 2 + small**4 + small**2 * np.abs(across[0]) / steady[0]
    error += neglected * steady[0] / (g * t[-1]) + 0.1 * neglected * left[-1]      # in time, and in speed at the end
    pressure = 0.5 * density * (u * u + w * w)
    end = State(t[-1], x[-1], z[-1], u[-1], w[-1], start.error, start.landed, start.layer)
    late = t[-1] > until
    result = Glide(nodes, end, t, x, z, u, w, pressure, error, ~late)
    return _cut_short(result, until, late) if late.any() else result


def _cut_short(glide: Glide, until: Array, late: Mask) -> Glide:
    """A glide that ends at a time, s, in the cases ``late``."""
    histories, old = (glide.t, glide.x, glide.z, glide.u, glide.w), glide.end
    first = (glide.t >= until).argmax(0)
    at = root_after(glide.nodes, glide.t - until, np.clip(first - 1, 0, len(glide.t) - 2))
    inside = values_at(glide.nodes, at, *histories)
    t, x, z, u, w = (np.where(late, value, history[-1]) for value, history in zip(inside, histories, strict=True))
    return replace(glide, end=State(t, x, z, u, w, old.error, old.landed, old.layer))
