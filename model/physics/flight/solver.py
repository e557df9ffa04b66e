"""Flying a batch, again with more pieces where it is not accurate yet."""

from __future__ import annotations

from typing import cast

import numpy as np

from .density import air_between
from .inputs import Drop, FillingRule, Values, as_array, change_values, check_structure, count_cases
from .lobatto import Array
from .march import Flyer
from .notes import Columns
from .phases import TOLERANCE, Flight
from .pieces import Buffers
from .record import Recorder, Stretch
from .results import History, Motion
from .state import Load, Mask
from .wind import Wind

DEEPEST = 64
"""Cases that are not accurate are flown again with 2, 4 ... so many times the pieces."""
CHUNK = 8192
"""Cases flown at once."""
BELOW_GROUND = 100.0
"""m; the density is known so far below the ground, where pieces end before they are cut off."""


def solve(drop: Drop, rule: FillingRule) -> Motion:
    """Fly every case of a drop from release to the ground.

    Args:
        drop: The cases; SI.
        rule: Canopies fill in a time ("time", fill distance / speed at the start) or over a path through the air
            ("distance", the fill distance); a filling with a measured time always takes that.

    Raises:
        ValueError: Rows that cannot be flown in order, arrays of different lengths, an unknown rule.
    """
    if rule not in ("time", "distance"):
        raise ValueError(f"unknown filling rule {rule!r}")
    check_structure(drop)
    drop = _as_arrays(drop, count_cases(drop))
    with np.errstate(all="ignore"):
        found, accurate, _ = _solve(drop, rule, 1)
    return Motion(rule=rule, accurate=accurate, **found)


def history(drop: Drop, rule: FillingRule, count: int = 400) -> History:
    """The flight of a single case as about ``count`` points, corners and jumps among them.

    Raises:
        ValueError: As `solve`, and for more than one case.
    """
    if rule not in ("time", "distance"):
        raise ValueError(f"unknown filling rule {rule!r}")
    check_structure(drop)
    if count_cases(drop) != 1:
        raise ValueError("a history is that of one case")
    drop = _as_arrays(drop, 1)
    recorder = Recorder()
    with np.errstate(all="ignore"):
        _, _, pieces = _solve(drop, rule, 1)
        _fly(drop, rule, pieces, Buffers(), recorder)
        return _points(drop, recorder.stretches, count)


def _as_arrays(drop: Drop, cases: int) -> Drop:
    def spread(value: Values) -> Values:
        return np.ascontiguousarray(np.broadcast_to(np.asarray(value, float), cases))

    return change_values(drop, spread)


def _solve(drop: Drop, rule: FillingRule, pieces: int) -> tuple[Columns, Mask, int]:
    """Results, which cases are accurate, and the largest multiple of pieces that was flown."""
    cases, buffers = len(as_array(drop.mass)), Buffers()
    parts = []
    for first in range(0, cases, CHUNK):
        chosen = slice(first, first + CHUNK)
        chunk = drop if cases <= CHUNK else _choose(drop, chosen)
        parts.append(_fly(chunk, rule, pieces, buffers))
    found = parts[0]
    if len(parts) > 1:
        found = {key: np.concatenate([part[key] for part in parts], -1) for key in found}
    accurate = found["error"] < TOLERANCE
    if not accurate.all() and pieces < DEEPEST:
        again = ~accurate
        better, accurate[again], pieces = _solve(_choose(drop, again), rule, 2 * pieces)
        for key, value in better.items():
            found[key][..., again] = value
    return found, accurate, pieces


def _choose(drop: Drop, chosen: slice | Mask) -> Drop:
    return change_values(drop, lambda value: cast("Array", value)[chosen])


def _fly(drop: Drop, rule: FillingRule, pieces: int, buffers: Buffers, recorder: Recorder | None = None) -> Columns:
    ground, release = as_array(drop.ground_altitude), as_array(drop.release_height)
    air = air_between(drop.density, float(ground.min()) - BELOW_GROUND, float((ground + release).max()) + 1)
    load = Load(2 * as_array(drop.mass) / as_array(drop.density_factor), as_array(drop.load_drag_area), drop.gravity)
    flyer = Flyer(load, air, Wind(drop), ground, buffers)
    return Flight(drop, rule, flyer, pieces, recorder).run()


def _points(drop: Drop, stretches: list[Stretch], count: int) -> History:
    """Evaluate stretches, half of the points by time and half by number of stretches."""
    ground, factor = float(as_array(drop.ground_altitude)[0]), float(as_array(drop.density_factor)[0])
    seconds = np.array([stretch.seconds for stretch in stretches])
    share = seconds / max(seconds.sum(), 1e-9) + 1 / max(len(stretches), 1)
    rows, areas, weighted, filling = [], [], [], []
    for stretch, part in zip(stretches, share, strict=True):
        x = np.linspace(-1, stretch.last, max(3, round(count * part / 2)))
        rows.append(stretch.at(x))
        area = np.asarray(stretch.area_at(stretch.nodes.fraction(x)[:, None]))
        area = np.broadcast_to(area, (len(x), 1))[:, 0]
        opening = stretch.opening
        areas.append(area)
        weighted.append(area + (opening.coefficient - 1) * (area - opening.others))
        filling.append(np.full(len(x), opening.filling))
    t, way, z, u, w = np.concatenate(rows, 1) if rows else _standing(drop)
    area = np.concatenate(areas) if rows else np.zeros(1)
    speed = np.hypot(u, w)
    pressure = 0.5 * factor * np.asarray(drop.density(z), float) * speed * speed
    return History(
        time=t, height=z - ground, distance=way, u=u, w=w, speed=speed, canopy_area=area,
        canopy_force=pressure * (np.concatenate(weighted) if rows else area), canopy_force_plain=pressure * area,
        filling=np.concatenate(filling) if rows else np.full(1, -1),
    )


def _standing(drop: Drop) -> Array:
    """A load released on the ground: one moment."""
    return np.array([[0.0], [0.0], as_array(drop.ground_altitude), as_array(drop.airspeed), [0.0]])
