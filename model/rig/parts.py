"""Models of the parts of a rig: platform, items, slings, cushions, lashings, ties, devices."""

from typing import Annotated, Literal, TypeAlias

from model.rig.fields import (
    Acceleration,
    Area,
    Count,
    Day,
    Efficiency,
    Force,
    Length,
    LengthOrZero,
    Line,
    Mass,
    Name,
    OffAxis,
    PlanPoint,
    Point,
    Pressure,
    TimeOrZero,
)
from model.rig.rule import Strict, choice, optional, required

MeasureFrom: TypeAlias = Annotated[Literal["middle", "front edge"], choice("middle", "front edge")]
Carries: TypeAlias = Annotated[Literal["all", "one canopy", "one leg"], choice("all", "one canopy", "one leg")]
Lies: TypeAlias = Annotated[
    Literal["under the platform", "under the load"], choice("under the platform", "under the load")
]
Mirror: TypeAlias = Annotated[Literal["left-right", "fore-aft"], choice("left-right", "fore-aft")]
LashingKind: TypeAlias = Annotated[Literal["strap", "chain"], choice("strap", "chain")]
DeviceKind: TypeAlias = Annotated[
    Literal["ground release", "opening device", "cutter"], choice("ground release", "opening device", "cutter")
]


class Platform(Strict):
    """What the load stands on."""

    kind: Line | None = optional("what it is, in free text")
    mass: Mass | None = optional("mass of the bare platform")
    length: Length | None = optional("along the aircraft")
    width: Length | None = optional("across the aircraft")
    height: Length | None = optional("highest point over the deck, canopies included")
    depth: LengthOrZero | None = optional("thickness of the deck")
    overhang_front: LengthOrZero | None = optional("how far the load stands out in front")
    overhang_rear: LengthOrZero | None = optional("how far the load stands out behind")
    overall_width: Length | None = optional("largest width where the load is wider than the platform")
    centre: Point | None = optional("its own centre of gravity")
    weighed: Mass | None = optional("the scale's reading of everything rigged; then it is the mass")
    balanced_at: PlanPoint | None = optional("measured balance point; replaces x and y of the sum")
    measure_from: MeasureFrom | None = optional("where x is measured from: the middle, or aft of the front edge")


class Item(Strict):
    """A part of the load; slings, honeycomb and plywood count too."""

    name: Name = required("what it is called in messages")
    mass: Mass | None = optional("its mass")
    centre: Point | None = optional("its centre of gravity")
    fragility: Acceleration | None = optional("largest net deceleration it may see (felt = net + 1)")


class Pack(Strict):
    """One packed canopy."""

    row: Count = required("the canopy row it belongs to, from 1")
    serial: Name = required("serial number, unique in the file")
    made: Day | None = optional("day of manufacture")
    packed: Day | None = optional("day it was packed")


class Suspension(Strict):
    """How the load hangs."""

    apex: Point | None = optional("confluence point of the legs")
    legs_carrying: Count | None = optional("how many legs are taken to share the load; there is no default")
    pull_off_axis: OffAxis | None = optional("the pull turned this far aft, forward, left and right as well")


class Leg(Strict):
    """One suspension leg."""

    name: Name = required("what it is called in messages")
    at: Point | None = optional("where it is attached to the load")
    length: Length | None = optional("attachment to confluence point, where the apex is not given")
    strength: Force | None = optional("of one thickness of the web")
    plies: Count | None = optional("thicknesses side by side; an n-loop sling has 2 n")
    joint_efficiency: Efficiency | None = optional("strength left at its worst end")
    attachment: Force | None = optional("strength of the lifting point")


class Link(Strict):
    """A part of the load path between canopies and legs."""

    name: Name = required("what it is called in messages")
    strength: Force | None = optional("of one")
    carries: Carries | None = optional("which load it carries")
    abreast: Count | None = optional("how many share that load side by side")


class Cushion(Strict):
    """Stacks of crushable material of one height."""

    name: Name = required("what it is called in messages")
    at: PlanPoint | None = optional("middle of its area")
    layers: Count | None = optional("layers one over another")
    layer_thickness: Length | None = optional("of one layer")
    area: Area | None = optional("area that crushes")
    crush_stress: Pressure | None = optional("stress at which it crushes")
    usable_strain: Efficiency | None = optional("share of its height it crushes by before it hardens")
    lies: Lies | None = optional("under the platform or under the load; the same for all rows")


class Lashing(Strict):
    """One or several like lashings."""

    name: Name = required("what it is called in messages")
    count: Count | None = optional("how many alike")
    mirror: Mirror | None = optional("adds the same row on the other side, on a ring of its own")
    deck: Point | None = optional("where it meets the deck")
    load: Point | None = optional("where it meets the load; it pulls from here toward the deck point")
    device: Force | None = optional("strength of strap or chain with its tensioner")
    deck_fitting: Force | None = optional("strength of the fitting on the deck")
    load_fitting: Force | None = optional("strength of the fitting on the load")
    deck_ring: Name | None = optional("ring it shares with the other rows that name it")
    kind: LashingKind | None = optional("strap or chain")


class Tie(Strict):
    """A tie that must hold up to one load and break by another."""

    name: Name = required("what it is called in messages")
    strands: Count | None = optional("strands that carry")
    strand_strength: Force | None = optional("least strength of one strand")
    strand_strength_most: Force | None = optional("greatest strength of one strand")
    knot_efficiency: Efficiency | None = optional("strength left at the knot")
    holds_at_least: Force | None = optional("load it must hold")
    breaks_by: Force | None = optional("load it must have broken by")


class Device(Strict):
    """A release, an opening device or a cutter."""

    name: Name = required("what it is called in messages")
    kind: DeviceKind | None = optional("ground release, opening device or cutter")
    serial: Name | None = optional("serial number, unique in the file")
    expires: Day | None = optional("last day of its life")
    arms_after: TimeOrZero | None = optional("from release to armed")


class LeftOut(Strict):
    """A part left out on purpose."""

    part: Name = required("a table, a group of steps or a step key")
    why: Name = required("the reason")
