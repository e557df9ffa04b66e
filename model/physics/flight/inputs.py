"""What a flight needs to know: a drop, its rows of canopies, and their fillings."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from dataclasses import dataclass, replace
from typing import Any, Literal, TypeAlias, cast

import numpy as np
from numpy.typing import NDArray

from .density import Density
from .lobatto import Array

Values: TypeAlias = float | NDArray[np.float64]
"""A number for all cases, or an array with one per case."""
FillingRule: TypeAlias = Literal["time", "distance"]
WhenNextOpens: TypeAlias = Literal["stays", "goes at start", "goes at line stretch"]

STANDARD_GRAVITY = 9.80665
"""m/s2."""
TROPOPAUSE = 6356766.0 * 11000.0 / (6356766.0 - 11000.0)
"""m, geometric altitude of the geopotential 11 km at which the standard temperature stops falling."""


@dataclass(frozen=True, eq=False)
class Filling:
    """One filling of a row: its only one, or that of one reefing stage.

    From the area S_0 of all that hangs open, of which S_own is the row's own, the drag area grows as
    S_0 + (area - S_own) tau^exponent.
    """

    area: Values
    """m2, drag area of all canopies of the row when this filling is complete."""
    fill_distance: Values
    """m, the nominal fill length."""
    exponent: float = 2.0
    opening_coefficient: Values = 1.0
    cutter: Values = 0.0
    """s after line stretch of this row; not used in a row's first filling."""
    filling_time: Values | None = None
    """s, measured; the filling then takes that time whatever the rule."""


@dataclass(frozen=True, eq=False)
class Row:
    """Canopies of one kind that open together; the first row has a line stretch or static line, others a trigger."""

    fillings: tuple[Filling, ...]
    line_stretch: Values | None = None
    """s after release."""
    static_line: Values | None = None
    """m between load and aircraft at line stretch; the aircraft flies on level at its speed over the ground."""
    opens_after: Values | None = None
    """s after release."""
    opens_at_height: Values | None = None
    """m above the ground; a height already passed opens at once."""
    deployment_time: Values = 0.0
    """s from opening to line stretch; later rows only."""
    when_next_opens: WhenNextOpens = "stays"


@dataclass(frozen=True, eq=False)
class Drop:
    """A load from release to the ground; SI. Numbers are for all cases or arrays with one per case."""

    mass: Values
    """kg, all that falls."""
    airspeed: Values
    """m/s, true, level, at release."""
    release_height: Values
    """m above the ground."""
    load_drag_area: Values
    """m2, of the load without canopies."""
    rows: tuple[Row, ...]
    """In order of opening."""
    density: Density
    ground_altitude: Values = 0.0
    """m, geometric, above mean sea level."""
    winds: tuple[tuple[Values, Values], ...] = ()
    """(height above ground in m, wind along the track in m/s, tailwind positive), heights rising; linear between."""
    density_factor: Values = 1.0
    density_kinks: tuple[float, ...] = (TROPOPAUSE,)
    """m, altitudes at which the slope of the density jumps."""
    gravity: float = STANDARD_GRAVITY


DROP_VALUES = ("mass", "airspeed", "release_height", "load_drag_area", "ground_altitude", "density_factor")
ROW_VALUES = ("line_stretch", "static_line", "opens_after", "opens_at_height", "deployment_time")
FILLING_VALUES = ("area", "fill_distance", "opening_coefficient", "cutter", "filling_time")
"""Numbers that may differ between cases."""


def change_values(drop: Drop, change: Callable[[Values], Values]) -> Drop:
    """A copy of a drop with ``change`` applied to every number that may differ between cases."""

    def each(thing: Filling | Row | Drop, names: tuple[str, ...]) -> dict[str, Any]:
        found = {name: cast("Values | None", getattr(thing, name)) for name in names}
        return {name: change(value) for name, value in found.items() if value is not None}

    rows = tuple(
        replace(row, fillings=tuple(replace(one, **each(one, FILLING_VALUES)) for one in row.fillings),
                **each(row, ROW_VALUES))
        for row in drop.rows
    )
    winds = tuple((change(height), change(wind)) for height, wind in drop.winds)
    return replace(drop, rows=rows, winds=winds, **each(drop, DROP_VALUES))


def _all_values(drop: Drop) -> Iterator[Values | None]:
    for name in DROP_VALUES:
        yield getattr(drop, name)
    for pair in drop.winds:
        yield from pair
    for row in drop.rows:
        for name in ROW_VALUES:
            yield getattr(row, name)
        for filling in row.fillings:
            for name in FILLING_VALUES:
                yield getattr(filling, name)


def count_cases(drop: Drop) -> int:
    """How many cases a drop holds.

    Raises:
        ValueError: If two arrays differ in length, one is empty or has more than one axis.
    """
    sizes = {1}
    for value in _all_values(drop):
        if value is None or isinstance(value, (float, int)):
            continue
        array = np.asarray(value, float)
        if array.ndim > 1:
            raise ValueError("values of a drop are numbers or arrays with one axis")
        sizes.add(array.size)
    if 0 in sizes:
        raise ValueError("a drop holds no case")
    if len(sizes - {1}) > 1:
        raise ValueError(f"arrays of a drop differ in length: {sorted(sizes - {1})}")
    return max(sizes)


def with_arrays(drop: Drop) -> Drop:
    """A copy of a drop with an array of one number per case for every number.

    Raises:
        ValueError: As `count_cases`.
    """
    cases = count_cases(drop)

    def spread(value: Values) -> Values:
        if isinstance(value, (float, int)):
            return np.full(cases, float(value))
        return np.ascontiguousarray(np.broadcast_to(np.asarray(value, float), cases))

    return change_values(drop, spread)


def check_structure(drop: Drop) -> None:
    """Refuse a drop whose rows cannot be flown in order.

    Raises:
        ValueError: No rows, a row without fillings, no start of a row or two, an unknown word.
    """
    if not drop.rows:
        raise ValueError("a drop needs a row of canopies")
    for number, row in enumerate(drop.rows, 1):
        starts = (row.line_stretch, row.static_line) if number == 1 else (row.opens_after, row.opens_at_height)
        if sum(start is not None for start in starts) != 1:
            wanted = "line_stretch or static_line" if number == 1 else "opens_after or opens_at_height"
            raise ValueError(f"row {number} needs {wanted}, one of them")
        if not row.fillings:
            raise ValueError(f"row {number} has no filling")
        if row.when_next_opens not in ("stays", "goes at start", "goes at line stretch"):
            raise ValueError(f"row {number}: unknown when_next_opens {row.when_next_opens!r}")


def as_array(value: Values | None) -> Array:
    """A value of a drop whose numbers are arrays already."""
    return cast("Array", value)
