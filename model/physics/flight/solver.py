"""Flying a batch, again with more pieces where it is not accurate yet."""

from __future__ import annotations

from dataclasses import dataclass
from typing import cast

import numpy as np

from .density import air_between
from .inputs import Drop, FillingRule, as_array, change_values, check_structure, with_arrays
from .lobatto import Array
from .march import Flyer
from .notes import Columns
from .phases import TOLERANCE, Flight
from .pieces import Workshop
from .results import History, Motion
from .state import Load, Mask
from .track import Track
from .wind import Wind

DEEPEST = 64
"""Cases that are not accurate are flown again with 2, 4 ... so many times the pieces."""
CHUNK = 8192
"""Cases flown at once."""
BELOW_GROUND = 100.0
"""m; the density is known so far below the ground, where pieces end before they are cut off."""
EFFORT = 2000
"""Most work on one case, in iterations of a piece and alike. Flights that can be solved mostly take a fiftieth of it;
of cases as unlike as the tests know, none takes half."""
COMPANY = 8
"""Cases flown together differ and need more pieces than each alone: the work on a batch is at most so many times
that."""


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
    drop = with_arrays(drop)
    with np.errstate(all="ignore"):
        flown = _solve(drop, rule, 1, 1.0)
    track = flown.track if flown.accurate.all() else None
    return Motion(rule=rule, accurate=flown.accurate, track=track, **flown.found)


def history(drop: Drop, rule: FillingRule, count: int = 400) -> History:
    """`solve`, and the curves of a single case as about ``count`` points.

    Raises:
        ValueError: As `solve`, for more than one case, and for a case that cannot be solved to its accuracy.
    """
    return solve(drop, rule).history(count)


@dataclass(eq=False)
class _Flown:
    found: Columns
    accurate: Mask
    effort: float
    """Share of the work allowed that is left; of several chunks the most."""
    track: Track | None
    """Of a single case."""


def _solve(drop: Drop, rule: FillingRule, pieces: int, effort: float) -> _Flown:
    """Fly with a multiple of the pieces, and what is not accurate again with twice as many."""
    cases = len(as_array(drop.mass))
    flown = _fly_chunks(drop, rule, pieces, effort)
    if flown.accurate.all() or pieces == DEEPEST or flown.effort <= 0:
        return flown
    again = ~flown.accurate
    better = _solve(_choose(drop, again), rule, 2 * pieces, flown.effort)
    if cases == 1:
        return better
    flown.accurate[again] = better.accurate
    for key, value in better.found.items():
        flown.found[key][..., again] = value
    return flown


def _fly_chunks(drop: Drop, rule: FillingRule, pieces: int, effort: float) -> _Flown:
    """Fly every case once."""
    cases, workshop, parts = len(as_array(drop.mass)), Workshop(), []
    for first in range(0, cases, CHUNK):
        chunk = drop if cases <= CHUNK else _choose(drop, slice(first, first + CHUNK))
        allowed = EFFORT * min(len(as_array(chunk.mass)), COMPANY)
        workshop.effort = allowed * effort
        track = Track(drop) if cases == 1 else None
        found = _fly(chunk, rule, pieces, workshop, track)
        parts.append(_Flown(found, found["error"] < TOLERANCE, workshop.effort / allowed, track))
    flown = parts[0]
    if len(parts) > 1:
        flown.found = {key: np.concatenate([part.found[key] for part in parts], -1) for key in flown.found}
        flown.accurate = np.concatenate([part.accurate for part in parts])
        flown.effort = max(part.effort for part in parts)
    return flown


def _choose(drop: Drop, chosen: slice | Mask) -> Drop:
    return change_values(drop, lambda value: cast("Array", value)[chosen])


def _fly(drop: Drop, rule: FillingRule, pieces: int, workshop: Workshop, track: Track | None) -> Columns:
    ground, release = as_array(drop.ground_altitude), as_array(drop.release_height)
    air = air_between(drop.density, float(ground.min()) - BELOW_GROUND, float((ground + release).max()) + 1)
    load = Load(2 * as_array(drop.mass) / as_array(drop.density_factor), as_array(drop.load_drag_area), drop.gravity)
    flyer = Flyer(load, air, Wind(drop), ground, workshop)
    return Flight(drop, rule, flyer, pieces, track).run()
