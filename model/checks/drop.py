"""The engine's drop from the numbers of a plan."""

from __future__ import annotations

from collections.abc import Callable, Mapping, Sequence
from functools import lru_cache

import numpy as np
from numpy.typing import NDArray

from model.checks.day import Day
from model.checks.missing import need
from model.checks.rows import CanopyRow
from model.physics.day_air import DayAir
from model.physics.flight import Drop, Filling, Row
from model.rig.canopy import WhenNextOpens
from model.rig.rig import Rig


@lru_cache(maxsize=64)
def _density(air: DayAir) -> Callable[[NDArray[np.float64]], NDArray[np.float64]]:
    """The air's density as the engine calls it; one object for each air, for the engine remembers its fit by it."""
    return lambda height: np.asarray(air.density(height))


def build(values: Mapping[str, float], rig: Rig, day: Day, rows: Sequence[CanopyRow]) -> Drop:
    """A drop from the values of `Motions.plan`."""
    weather = [values[f"air {i}"] for i in range(len(day.inputs))]
    winds = tuple((values[f"wind {i} height"], values[f"wind {i} speed"]) for i in range(len(day.winds())))
    return Drop(
        mass=values["mass"],
        airspeed=values["airspeed"],
        release_height=values["release_height"],
        load_drag_area=values["load_drag_area"],
        rows=tuple(_row(values, k, one, last=k == len(rows) - 1) for k, one in enumerate(rows)),
        density=_density(day.air(*weather)),
        ground_altitude=weather[0],
        winds=winds,
    )


def _row(values: Mapping[str, float], k: int, one: CanopyRow, *, last: bool) -> Row:
    def value(name: str) -> float | None:
        return values.get(f"row {k} {name}")

    leaving: WhenNextOpens = "stays" if last else need(one.row.when_next_opens, one.field("when_next_opens"))
    return Row(
        fillings=tuple(_filling(values, k, filling.number) for filling in one.fillings),
        line_stretch=value("line_stretch"),
        static_line=value("static_line"),
        opens_after=value("opens_after"),
        opens_at_height=value("opens_at_height"),
        deployment_time=value("deployment_time") or 0.0,
        when_next_opens=leaving,
    )


def _filling(values: Mapping[str, float], k: int, number: int) -> Filling:
    where = f"row {k} filling {number}"
    return Filling(
        area=values[f"{where} area"],
        fill_distance=values[f"{where} distance"],
        exponent=values[f"{where} exponent"],
        opening_coefficient=values[f"{where} coefficient"],
        cutter=values.get(f"{where} cutter", 0.0),
        filling_time=values.get(f"{where} time"),
    )
