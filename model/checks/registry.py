"""All computed steps, in the order they are stepped through, and the keys a limit may name."""

from __future__ import annotations

from collections.abc import Iterable

from model.checks import balance, descent, height, load, opening, zone
from model.checks.case import Case
from model.checks.finding import STEP_UNITS
from model.checks.step import Step
from model.quantity import Dimension

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
)


def steps(case: Case) -> list[Step]:
    """The computed steps of one rig."""
    mains = sum(one.count for one in case.rig.canopy if one.role == "main")
    return [step for step in FIXED if step.key != "descent.rate_one_out" or mains > 1]


def unit_of(key: str) -> str | None:
    """The step unit that a limit key stands in; None for a key no computed step has."""
    for step in FIXED:
        if key in (step.key, step.limited_by):
            return step.unit
    return None


def dimension_of(key: str) -> Dimension | None:
    """The dimension a limit of this key is written in."""
    unit = unit_of(key)
    return Dimension(STEP_UNITS[unit].dimension) if unit else None


def known_keys() -> Iterable[str]:
    """Every key that a limit may name, for the nearest one in a message."""
    return [step.limited_by for step in FIXED]


def group_title(group: str) -> str:
    """What a group is called; one that only inspections form is called by its own name."""
    return GROUP_TITLES.get(group, group.replace("_", " "))
