"""Models of the canopies of a rig: a row per kind, its lines, reefing and measured figures."""

from typing import Annotated, Any, Literal, TypeAlias

from model.rig.canopy_table import type_names
from model.rig.fields import (
    Area,
    ClusterEfficiency,
    Count,
    Density,
    DragCoefficient,
    DragRatio,
    Force,
    Length,
    LengthOrZero,
    Mass,
    MassRange,
    Name,
    Number,
    Point,
    Speed,
    SpeedOrZero,
    Stretch,
    Time,
    TimeOrZero,
    UnevenShare,
)
from model.rig.rule import FieldError, Rule, Strict, choice, described, nearest, optional, required, rows


def _type(found: Any) -> str:
    names = type_names()
    if not isinstance(found, str) or found not in names:
        hint = (nearest(found, names) if isinstance(found, str) else "") or f"known: {', '.join(names)}"
        raise FieldError(described(found), "a type of the canopy table", hint)
    return found


CanopyType: TypeAlias = Annotated[str, Rule(_type)]
Role: TypeAlias = Annotated[Literal["drogue", "main"], choice("drogue", "main")]
WhenNextOpens: TypeAlias = Annotated[
    Literal["stays", "goes at start", "goes at line stretch"],
    choice("stays", "goes at start", "goes at line stretch"),
]


class Lines(Strict):
    """Suspension lines of one canopy."""

    count: Count | None = optional("how many lines")
    strength: Force | None = optional("of one line")
    stretch: Stretch | None = optional("stretch at break as a share of its length")


class ReefingMeasured(Strict):
    """Measured figures of one reefing stage."""

    source: Name = required("where they come from")
    filling_time: Time | None = optional("of this stage; replaces fill length over speed")


class Reefing(Strict):
    """One reefing stage, in order of cutting."""

    drag_ratio: DragRatio | None = optional("reefed drag area over full drag area")
    cutter: Time | None = optional("from the line stretch of this row")
    fill_constant: Number | None = optional("n of this filling")
    growth_exponent: Number | None = optional("j of this filling")
    opening_coefficient: Number | None = optional("Cx of this filling")
    measured: ReefingMeasured | None = optional("measured figures of this stage")


class Measured(Strict):
    """Measured figures of a canopy row that replace estimates."""

    source: Name = required("where they come from")
    rate: Speed | None = optional("steady rate of descent; gives the drag area of the row")
    rate_mass: Mass | None = optional("mass that came down at that rate")
    rate_density: Density | None = optional("air density at that rate")
    filling_time: Time | None = optional("of the last filling; replaces fill length over speed")
    opening_force: Force | None = optional("all canopies of the row together")
    opening_force_mass: Mass | None = optional("mass it was measured with")
    opening_force_speed: Speed | None = optional("equivalent airspeed at line stretch it was measured at")


class Canopy(Strict):
    """A row of like canopies; rows stand in order of opening."""

    role: Role = required("drogue or main")
    type: CanopyType = required("a row of the canopy table; figures given here override it")
    count: Count = required("how many")
    diameter: Length | None = optional("nominal diameter D0")
    drag_area: Area | None = optional("of one, in place of the diameter")
    line_length: Length | None = optional("suspension lines")
    riser_length: LengthOrZero | None = optional("riser")
    mass: Mass | None = optional("of each")
    centre: Point | None = optional("where they lie when rigged")
    drag_coefficient: DragCoefficient | None = optional("CD0 on the nominal area")
    opening_coefficient: Number | None = optional("Cx of the last filling")
    fill_constant: Number | None = optional("n of the last filling")
    growth_exponent: Number | None = optional("j of the last filling")
    cluster_efficiency: ClusterEfficiency | None = optional("drag of the cluster over the sum of singles")
    uneven_share: UnevenShare | None = optional("worst canopy's load over the even share")
    rated_mass: MassRange | None = optional("suspended mass for each, least and most")
    rated_speed: Speed | None = optional("highest airspeed it may be opened at")
    strength: Force | None = optional("largest opening force each may see")
    snatch_speed: SpeedOrZero | None = optional("load against canopy at line stretch")
    lines: Lines | None = optional("its suspension lines")
    reefing: tuple[Reefing, ...] = rows("reefing stages, in order")
    measured: Measured | None = optional("measured figures of the row")
    opens_after: TimeOrZero | None = optional("later rows: from release")
    opens_at_height: Length | None = optional("later rows: true height above the zone")
    opens_at_set_height: Length | None = optional("later rows: what a pressure device is set to, above the zone")
    deployment_time: TimeOrZero | None = optional("later rows: from that moment to line stretch")
    when_next_opens: WhenNextOpens | None = optional("what becomes of this row when the next one opens")
