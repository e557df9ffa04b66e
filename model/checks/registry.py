"""All computed steps, in the order they are stepped through, and the keys a limit may name."""

from __future__ import annotations

from collections.abc import Iterable

from model.checks import balance, descent, extraction, height, landing, lashing, load, opening, suspension, zone
from model.checks.finding import STEP_UNITS
from model.checks.small_parts import device_steps, service_steps, tie_steps
from model.checks.step import Step
from model.quantity import Dimension
from model.rig.rig import Rig

GROUP_TITLES = {
    "load": "load",
    "balance": "balance",
    "zone": "zone air",
    "descent": "descent",
    "opening": "opening",
    "height": "height",
    "extraction": "extraction",
    "suspension": "hanging",
    "landing": "landing",
    "lashing": "lashing",
    "tie": "ties",
    "device": "devices",
    "service": "dates",
}
"""Groups in the order they are stepped through, and what they are called on screens and in reports."""

FIXED: tuple[Step, ...] = (
    *load.STEPS,
    *balance.STEPS,
    *zone.STEPS,
    *descent.STEPS,
    *opening.STEPS,
    *height.STEPS,
    *extraction.STEPS,
    *suspension.STEPS,
    *landing.STEPS,
    *lashing.STEPS,
)
BY_ROW = {
    "device.early": "1",
    "device.late": "1",
    "device.expires": "d",
    "service.packs": "1",
    "service.repack": "d",
    "service.age": "yr",
}
"""Units of limits that hold for a step of every row."""


def steps(rig: Rig) -> list[Step]:
    """The computed steps of one rig."""
    mains = sum(one.count for one in rig.canopy if one.role == "main")
    extracted = rig.exit is not None and rig.exit.method == "extraction"
    fixed = [
        step
        for step in FIXED
        if (step.key != "descent.rate_one_out" or mains > 1) and (step.group != "extraction" or extracted)
    ]
    return [*fixed, *tie_steps(rig), *device_steps(rig), *service_steps(rig)]


_UNITS = {key: step.unit or "1" for step in reversed(FIXED) for key in (step.limited_by, step.key)}


def unit_of(key: str) -> str | None:
    """The step unit that a limit key stands in; None for a key no computed step has."""
    if key in _UNITS:
        return _UNITS[key]
    if key.startswith("tie.") and key.endswith((".holds", ".breaks")):
        return "N"
    return BY_ROW.get(key)


def dimension_of(key: str) -> Dimension | None:
    """The dimension a limit of this key is written in."""
    unit = unit_of(key)
    return Dimension(STEP_UNITS[unit].dimension) if unit else None


def known_keys() -> Iterable[str]:
    """Every key that a limit may name, for the nearest one in a message."""
    return [*(step.limited_by for step in FIXED), *BY_ROW]


def group_title(group: str) -> str:
    """What a group is called; one that only inspections form is called by its own name."""
    return GROUP_TITLES.get(group, group.replace("_", " "))
