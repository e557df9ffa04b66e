"""A finding's numbers as text, in the unit system picked."""

from __future__ import annotations

from collections.abc import Callable
from typing import TYPE_CHECKING

from model.quantity import FEET_INCHES, UnitSystem, from_unit, show, to_unit
from model.report.wording import shown_unit

if TYPE_CHECKING:
    from model.checks.finding import Finding

SYSTEM_NAMES = {
    UnitSystem.WRITTEN: "units as written",
    UnitSystem.SI: "SI units",
    UnitSystem.US: "US units",
}


def next_system(system: UnitSystem) -> UnitSystem:
    """The system after this one."""
    systems = list(UnitSystem)
    return systems[(systems.index(system) + 1) % len(systems)]


def bar_numbers(
    finding: Finding, system: UnitSystem
) -> tuple[float, float | None, float | None, Callable[[float], str]] | None:
    """Value, least, most and a way to write numbers, all in the unit shown; None where there is no value or limit."""
    if finding.value is None or finding.unit is None or finding.limit is None:
        return None
    dimension, unit, size = shown_unit(finding, system)
    unit = "ft" if unit == FEET_INCHES else unit
    limit = finding.limit

    def shown(number: float | None) -> float | None:
        return None if number is None else to_unit(number * size, unit, dimension)

    def text(number: float) -> str:
        return show(from_unit(number, unit, dimension), dimension, unit)

    value = shown(finding.value)
    assert value is not None
    return value, shown(limit.minimum), shown(limit.maximum), text
