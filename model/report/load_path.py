"""The load path in words: a line or two a part, the weakest marked."""

from __future__ import annotations

from model.checks.case import Case
from model.quantity import Dimension, UnitSystem, show
from model.report.working import term_value
from model.study.load_path import Part, load_path, weakest

WEAKEST = "weakest"
_NUMBERS = (13, 13, 8)
"""Columns of load, strength and factor."""
_ENDING = len(WEAKEST) + 2
_LEAST_NAME = 24
"""Columns below which a part's name stands on a line of its own."""


def load_path_lines(case: Case, system: UnitSystem, columns: int = 80) -> list[str]:
    """Every part with its load at the largest opening force, its strength and its factor.

    Args:
        case: The rig.
        system: Units shown.
        columns: Width of a line; narrow ones give a part's name a line of its own.
    """
    parts = load_path(case)
    least = weakest(parts)
    name = max(columns - 2 - sum(_NUMBERS) - _ENDING, 0)
    name = name if name >= _LEAST_NAME else 0
    lines = ["Load path at the largest opening force, from the load up", ""]
    lines.append(f"  {'part' if name else '':<{name}}{_numbers('load', 'strength', 'factor')}")
    for part in parts:
        lines += _part_lines(part, system, name, weak=least is part)
    unknown = sum(part.factor is None and not part.fails for part in parts)
    lines.append("")
    if least is not None and least.factor is not None:
        lines.append(f"weakest of the parts known: {least.name}, factor {_factor(least)}")
    if unknown:
        lines.append(f"{unknown} of {len(parts)} lines lack data: one of those may be weaker")
    return lines


def _numbers(*texts: str) -> str:
    return "".join(f"{text:>{cells}}" for text, cells in zip(texts, _NUMBERS, strict=True))


def _part_lines(part: Part, system: UnitSystem, name: int, *, weak: bool) -> list[str]:
    mark = "> " if weak else "  "
    if part.factor is None or part.load is None or part.strength is None:
        return [f"{mark}{part.name}", f"      {'FAIL' if part.fails else 'OPEN'}  {part.missing}"]
    numbers = _numbers(term_value(part.load, system), term_value(part.strength, system), _factor(part))
    ending = f"  {WEAKEST}" if weak else ""
    if len(part.name) >= name:
        return [f"{mark}{part.name}", f"  {'':<{name}}{numbers}{ending}"]
    return [f"{mark}{part.name:<{name}}{numbers}{ending}"]


def _factor(part: Part) -> str:
    return show(part.factor.value, Dimension.NUMBER, "") if part.factor else ""
