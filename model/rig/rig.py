"""The rig file, format 1: one load as rigged."""

from typing import Annotated, Literal, TypeAlias

from model.quantity import Quantity
from model.rig.canopy import Canopy, CanopyType
from model.rig.fields import (
    AirTemperature,
    AltimeterSetting,
    AreaOrZero,
    Count,
    Day,
    DragCoefficient,
    Elevation,
    Flag,
    Force,
    Format,
    Length,
    Line,
    Mass,
    Name,
    Note,
    Number,
    Revision,
    SpeedOrZero,
    TimeOrZero,
    Wind,
    Winds,
)
from model.rig.parts import (
    Cushion,
    Device,
    Item,
    Lashing,
    LeftOut,
    Leg,
    Link,
    Pack,
    Platform,
    Suspension,
    Tie,
)
from model.rig.rule import Strict, choice, optional, required, rows

ExitMethod: TypeAlias = Annotated[Literal["gravity", "extraction"], choice("gravity", "extraction")]
PulledBy: TypeAlias = Annotated[Literal["static line", "timer"], choice("static line", "timer")]


class About(Strict):
    """Which load this is."""

    name: Name = required("what it is called")
    reference: Line | None = optional("its number in the books")
    revision: Revision | None = optional("counts the changes")
    rigged_by: Line | None = optional("who rigged it")
    rigged_on: Day | None = optional("when it was rigged")
    notes: Note | None = optional("free text")


class Drop(Strict):
    """Where, when and how high it is dropped."""

    date: Day = required("dates are judged against this day")
    release_height: Length | None = optional("above the drop zone")
    airspeed: SpeedOrZero | None = optional("indicated, at release")
    zone_elevation: Elevation | None = optional("drop zone above mean sea level")
    zone_temperature: AirTemperature | None = optional("at the zone; standard day where missing")
    altimeter_setting: AltimeterSetting | None = optional("reduced to sea level; 1013.25 hPa where missing")
    dew_point: AirTemperature | None = optional("at the zone; dry air where missing")
    surface_wind: Wind | None = optional("along the run-in, tailwind positive")
    release_wind: Wind | None = optional("at release height; linear between")
    winds: Winds | None = optional("pairs of height above the zone and wind, in place of the other two")


class Extraction(Strict):
    """The parachute that draws the load out."""

    type: CanopyType | None = optional("a row of the canopy table")
    count: Count | None = optional("how many")
    diameter: Length | None = optional("nominal diameter D0")
    drag_coefficient: DragCoefficient | None = optional("CD0 on the nominal area")
    opening_coefficient: Number | None = optional("Cx")
    mass: Mass | None = optional("all of it")
    stays: Flag | None = optional("whether it stays with the load after release; then it adds mass only")
    line_strength: Force | None = optional("of the extraction line")
    attachment: Force | None = optional("of the fitting on the load")
    speed_lost: SpeedOrZero | None = optional("indicated airspeed lost before the ramp; 0 where missing")


class Exit(Strict):
    """How it leaves the aircraft; t = 0 is the moment it does."""

    method: ExitMethod | None = optional("gravity or extraction")
    canopy_pulled_by: PulledBy | None = optional("static line or timer")
    static_line: Length | None = optional("length of the static line")
    line_stretch: TimeOrZero | None = optional("known time from release; replaces the estimate")
    load_drag_area: AreaOrZero | None = optional("of the bare load; an estimate where missing")
    extraction: Extraction | None = optional("with method extraction")


class Rig(Strict):
    """One load as rigged."""

    format: Format = required("1")
    limits: Name | None = optional("path of the limit set, from this file")
    rig: About = required("which load this is")
    drop: Drop = required("where, when and how high")
    exit: Exit | None = optional("how it leaves the aircraft")
    platform: Platform | None = optional("what it stands on")
    item: tuple[Item, ...] = rows("parts of the load")
    canopy: tuple[Canopy, ...] = rows("canopies, one row per kind, in order of opening")
    pack: tuple[Pack, ...] = rows("packed canopies")
    suspension: Suspension | None = optional("how it hangs")
    leg: tuple[Leg, ...] = rows("suspension legs")
    link: tuple[Link, ...] = rows("rest of the load path")
    cushion: tuple[Cushion, ...] = rows("crushable stacks")
    lashing: tuple[Lashing, ...] = rows("lashings")
    tie: tuple[Tie, ...] = rows("ties that break")
    device: tuple[Device, ...] = rows("releases, opening devices, cutters")
    left_out: tuple[LeftOut, ...] = rows("parts left out on purpose")


TABLES = tuple(name for name in Rig.model_fields if name not in ("format", "limits"))
"""Names of the tables of a rig file."""


def point(rig: Rig, place: tuple[Quantity, Quantity, Quantity]) -> tuple[float, float, float]:
    """A place in deck coordinates: origin at the middle of the deck, x forward, y left, z up.

    Args:
        rig: the rig, which says where x is measured from.
        place: x, y, z as read from the file.

    Returns:
        x, y, z in m.
    """
    return (along(rig, place[0]), place[1].value, place[2].value)


def plan_point(rig: Rig, place: tuple[Quantity, Quantity]) -> tuple[float, float]:
    """A place in plan, as `point` without its height; m."""
    return (along(rig, place[0]), place[1].value)


def along(rig: Rig, reading: Quantity) -> float:
    """The x of a reading in deck coordinates, m; measured aft of the front edge it is half the length less it."""
    platform = rig.platform
    if platform is None or platform.measure_from != "front edge" or platform.length is None:
        return reading.value
    return platform.length.value / 2.0 - reading.value
