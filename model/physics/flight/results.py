"""What a flight tells."""

from __future__ import annotations

from dataclasses import dataclass, field
from typing import TYPE_CHECKING

import numpy as np
from numpy.typing import NDArray

from .inputs import FillingRule
from .lobatto import Array
from .state import Mask

if TYPE_CHECKING:
    from .track import Track


@dataclass(frozen=True, eq=False)
class Motion:
    """Results of a batch: arrays (cases,), (rows, cases) or (fillings, cases); fillings count through all rows. SI.

    Where a load never gets to a row's line stretch or a filling's start, its values there are nan, its forces 0.
    """

    rule: FillingRule
    accurate: Mask
    """False: not solved to tolerance; every number of that case is to be treated as missing."""
    error: Array
    """Estimate of the largest relative error."""

    line_stretch_time: Array
    """(rows, cases), s after release; so all line_stretch_*."""
    line_stretch_height: Array
    """m above the ground."""
    line_stretch_speed: Array
    """m/s, true."""
    line_stretch_equivalent_speed: Array
    """m/s, true speed x sqrt(density/1.225)."""
    line_stretch_angle: Array
    """rad, path through the air below the horizontal."""
    line_stretch_relative_speed: Array
    """m/s, of the load against the aircraft flying on."""
    row_force: Array
    """(rows, cases), N, largest dynamic pressure x area of that row alone, its opening coefficient while it fills."""

    started: Mask
    """(fillings, cases); so all to `hold_force_time`. False: landed before, or the next row came before it."""
    start_time: Array
    start_speed: Array
    start_height: Array
    """m above the ground."""
    nominal_fill_time: Array
    """s, fill distance / start speed, or the measured filling time."""
    fill_time: Array
    """s, until it is full or cut short."""
    end_time: Array
    full: Mask
    reached: Array
    """Area of the row at the end of the filling / area of the whole filling."""
    fill_path: Array
    """m, way through the air while filling."""
    speed_ratio: Array
    """Largest speed while filling / start speed."""
    fill_force: Array
    """N, all canopies, with the opening coefficient on the row that fills; largest while it fills."""
    fill_force_time: Array
    fill_force_plain: Array
    """N, the same without the opening coefficient."""
    fill_force_plain_time: Array
    hold_force: Array
    """N, largest from the end of the filling to the start of the next one or the ground; no opening coefficient."""
    hold_force_time: Array

    slow_time: Array
    """(cases,), s, first moment after the last filling at 1.05 x the local steady rate or less; else nan."""
    slow_height: Array
    """m above the ground."""
    touchdown_time: Array
    touchdown_distance: Array
    """m along the track, over the ground."""
    touchdown_speed: Array
    """m/s, through the air."""
    touchdown_descent: Array
    """m/s, vertical."""
    landed_early: Mask
    """Landed before the end of its last filling."""
    landed_in: NDArray[np.intp]
    """-1: before the first line stretch; 2 i: while filling i; 2 i + 1: after filling i."""

    track: Track | None = field(default=None, repr=False)
    """What a single case flew, if it is accurate."""

    def history(self, count: int = 400) -> History:
        """The curves of a single case as about ``count`` points, corners and jumps among them; nothing is flown again.

        Raises:
            ValueError: For more than one case, or a case that is not accurate.
        """
        if len(self.accurate) != 1:
            raise ValueError("a history is that of one case")
        if self.track is None:
            raise ValueError("a flight that is not accurate has no history")
        return self.track.history(count)

    @property
    def opening_force(self) -> Array:
        """Larger of `fill_force` and `hold_force`, N, (fillings, cases)."""
        return np.maximum(self.fill_force, self.hold_force)

    @property
    def opening_force_plain(self) -> Array:
        """The same without opening coefficients, N, (fillings, cases)."""
        return np.maximum(self.fill_force_plain, self.hold_force)


@dataclass(frozen=True, eq=False)
class History:
    """One case from release to the ground: one-axis arrays, time not decreasing, SI. A jump stands twice."""

    time: Array
    height: Array
    """m above the ground."""
    distance: Array
    """m along the track, over the ground."""
    u: Array
    """m/s along the track, relative to the air."""
    w: Array
    """m/s downward."""
    speed: Array
    """m/s, through the air."""
    canopy_area: Array
    """m2, drag area of all open canopies."""
    canopy_force: Array
    """N, with the opening coefficient of the row that fills."""
    canopy_force_plain: Array
    """N, without."""
    filling: NDArray[np.intp]
    """Number of the filling under way, from 0; -1 where nothing fills."""
