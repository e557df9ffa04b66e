"""The load path in words: a line or two a part, the weakest marked."""

from __future__ import annotations

from model.checks.case import Case
from model.quantity import Dimension, UnitSystem, show
from model.report.working import term_value
from model.study.load_path import Part, load_path, weakest

WEAKEST = "weakest"


def load_path_lines(case: Case, system: UnitSystem) -> list[str]:
    """Every part with its load at the largest opening force, its strength and its factor."""
    parts = load_path(case)
    least = weakest(parts)
    lines = ["Load path at the largest opening force, from the load up", ""]
    lines.append(f"  {'part':<34}{'load':>13}{'strength':>13}{'factor':>8}")
    for part in parts:
        lines += _part_lines(part, system, least is part)
    unknown = sum(part.factor is None for part in parts)
    lines.append("")
    if least is not None and least.factor is not None:
        lines.append(f"weakest of the parts known: {least.name}, factor {_factor(least)}")
    if unknown:
        lines.append(f"{unknown} of {len(parts)} lines lack data: one of those may be weaker")
    return lines


def _part_lines(part: Part, system: UnitSystem, least: bool) -> list[str]:
    mark = "> " if least else "  "
    if part.factor is None or part.load is None or part.strength is None:
        return [f"{mark}{part.name}", f"      OPEN  {part.missing}"]
    numbers = f"{term_value(part.load, system):>13}{term_value(part.strength, system):>13}{_factor(part):>8}"
    ending = f"  {WEAKEST}" if least else ""
    if len(part.name) > 33:
        return [f"{mark}{part.name}", f"  {'':<34}{numbers}{ending}"]
    return [f"{mark}{part.name:<34}{numbers}{ending}"]


def _factor(part: Part) -> str:
    return show(part.factor.value, Dimension.NUMBER, "") if part.factor else ""
