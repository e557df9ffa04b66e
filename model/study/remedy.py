"""What would make a failed step pass: the nearest value of each single input at which it does."""

from __future__ import annotations

import math
from collections.abc import Mapping
from typing import NamedTuple

from model.checks.finding import Finding, Kind, Verdict
from model.checks.step import value_in_unit
from model.checks.term import DIMENSIONS, Term, lines
from model.quantity import Dimension, UnitSystem, from_unit, show, to_unit, unit_for
from model.study.again import evaluate

STEPS = (0.005, 0.01, 0.02, 0.04, 0.08, 0.15, 0.25, 0.4, 0.6)
"""Relative changes tried on either side of an input; a remedy further off is no advice."""
MOST = 3
TRIED = 5
"""Inputs that are searched through; the others need a larger change, judged by a small one."""
PROBE = 0.001
LEAST_USE = 3 * STEPS[-1]
"""An input that would have to change by more, judged by a small change, is not searched."""
HALVINGS = 12
NOT_CHOSEN = ("Q", "Td")
"""Symbols of what nobody can choose: altimeter setting and dew point."""
KELVIN_SCALE, HEIGHT_SCALE = 40.0, 1500.0
"""What a change of 1 means for a temperature (K) and for a height of the ground (m), which have no natural zero."""


class Remedy(NamedTuple):
    """One input and the value at which the step would pass."""

    meaning: str
    needed: str
    now: str


def what_would_pass(finding: Finding, system: UnitSystem = UnitSystem.WRITTEN) -> list[Remedy]:
    """The smallest single changes that would make a failed computed step pass, the smallest first.

    Every other input stays as it is. A step that fails for more than its limit has no such change: empty.
    """
    result, limit = finding.result, finding.limit
    if finding.kind is not Kind.COMPUTED or finding.verdict is not Verdict.FAIL or result is None or limit is None:
        return []
    if finding.value is None or finding.margin is None or limit.holds(finding.value):
        return []
    found = []
    for term, direction in _candidates(finding, result):
        change = _nearest(finding, result, term, direction)
        if change is not None:
            found.append((abs(change), _worded(finding, result, term, change, system)))
    found.sort(key=lambda one: one[0])
    return [remedy for _, remedy in found if remedy is not None][:MOST]


def _candidates(finding: Finding, result: Term) -> list[tuple[Term, float]]:
    """The inputs that look nearest to a remedy, judged by a small change of each, with the direction to go."""
    value, needed = _value(finding, result, {}), _needed(finding)
    judged: list[tuple[float, int, Term, float]] = []
    for term in _inputs(result):
        slope = (_value(finding, result, {term: _moved(term, PROBE)}) - value) / PROBE
        if math.isfinite(slope) and slope != 0 and abs(needed / slope) <= LEAST_USE:
            judged.append((abs(needed / slope), len(judged), term, math.copysign(1.0, needed / slope)))
    return [(term, direction) for _, _, term, direction in sorted(judged)[:TRIED]]


def _needed(finding: Finding) -> float:
    """By how much the value would have to change, in the step's unit."""
    limit, value = finding.limit, finding.value
    assert limit is not None
    assert value is not None
    if limit.maximum is not None and value > limit.maximum:
        return limit.maximum - value
    return (limit.minimum or 0.0) - value


def _inputs(result: Term) -> list[Term]:
    """The measured or chosen quantities of the rig file that the value rests on."""
    return [
        term
        for term in lines(result)
        if term.how is None and term.from_file and term.dimension in DIMENSIONS and term.symbol not in NOT_CHOSEN
    ]


def _moved(term: Term, change: float) -> float:
    """The input's value after a relative change."""
    if term.dimension == "temperature":
        return term.value + change * KELVIN_SCALE
    if term.symbol == "z0":
        return term.value + change * HEIGHT_SCALE
    return term.value * (1 + change)


def _value(finding: Finding, result: Term, changed: Mapping[Term, float]) -> float:
    """The step's value with some inputs changed; nan where it cannot be worked out."""
    try:
        again = evaluate(result, changed)
    except (ValueError, ZeroDivisionError, OverflowError):
        return math.nan
    return value_in_unit(again, result.dimension, finding.unit or "1")


def _passes(finding: Finding, result: Term, term: Term, value: float) -> bool:
    assert finding.limit is not None
    again = _value(finding, result, {term: value})
    return math.isfinite(again) and finding.limit.holds(again)


def _nearest(finding: Finding, result: Term, term: Term, direction: float) -> float | None:
    """The smallest relative change of one input, in one direction, at which the step passes; None within no reach."""
    for before, step in zip((0.0, *STEPS), STEPS, strict=False):
        if _passes(finding, result, term, _moved(term, direction * step)):
            low, high = before, step
            for _ in range(HALVINGS):
                middle = (low + high) / 2
                if _passes(finding, result, term, _moved(term, direction * middle)):
                    high = middle
                else:
                    low = middle
            return direction * high
    return None


def _worded(finding: Finding, result: Term, term: Term, change: float, system: UnitSystem) -> Remedy | None:
    """The remedy in words, rounded to the side on which the step passes."""
    dimension = Dimension(term.dimension)
    unit = unit_for(dimension, system, term.unit, term.value)
    plain = "in" if unit == "ft in" else unit
    exact = to_unit(_moved(term, change), plain, dimension)
    rising = _moved(term, change) > term.value
    for digits in (3, 4, 5, 6):
        places = digits - 1 - math.floor(math.log10(abs(exact))) if exact else digits
        scale = 10.0**places
        rounded = (math.ceil if rising else math.floor)(exact * scale) / scale
        value = from_unit(rounded, plain, dimension)
        if _passes(finding, result, term, value):
            bound = "at least" if rising else "at most"
            return Remedy(
                term.meaning,
                f"{bound} {show(value, dimension, plain, digits=digits)}",
                show(term.value, dimension, unit),
            )
    return None
