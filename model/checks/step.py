"""A step of the checklist and how its outcome is judged."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from math import isfinite, ulp
from typing import NamedTuple

from model.checks.case import Case
from model.checks.finding import CLOSE, STEP_UNITS, Finding, Kind, Limit, Ruling, Verdict
from model.checks.missing import CannotJudge, Failed, Missing
from model.checks.term import Term
from model.quantity import Quantity

NO_NUMBER = "no number comes out of these data"
ONE_SIDED = "below 0 and the limit has no minimum: nothing holds it on this side"


class Row(NamedTuple):
    """One of several values that a step judges, each against limits of its own; ``lacks`` names the field for them."""

    result: Term
    own_limits: tuple[Limit, ...]
    lacks: str


class Outcome(NamedTuple):
    """What a computed step comes to before a limit is laid against it."""

    result: Term
    own_limits: tuple[Limit, ...] = ()
    cautions: tuple[str, ...] = ()
    notes: tuple[str, ...] = ()
    fails: str = ""
    measured: bool = False
    opens: str = ""
    outside: str = ""
    """Which way to go where the value is outside its limit."""
    passes: str = ""
    """Why it passes without a limit; such a step is all or nothing and has no margin."""
    rows: tuple[Row, ...] = ()
    """Where each row of the rig has limits of its own; the one that decides takes the place of ``result``."""


class Step(NamedTuple):
    """One computed step. ``limit_key`` names the limits that hold for it where it is not the key itself."""

    key: str
    title: str
    unit: str | None
    compute: Callable[[Case], Outcome]
    for_information: bool = False
    limit_key: str = ""
    tables: tuple[str, ...] = ()

    @property
    def group(self) -> str:
        """The part of the key before its first dot."""
        return self.key.split(".", 1)[0]

    @property
    def limited_by(self) -> str:
        """Key of the limit that holds for this step."""
        return self.limit_key or self.key


def in_step_unit(term: Term, unit: str) -> float:
    """A term's value in a step's unit; a plain number (a load factor, an age) stands in it already."""
    return value_in_unit(term.value, term.dimension, unit)


def value_in_unit(value: float, dimension: str, unit: str) -> float:
    """A value of some dimension in a step's unit."""
    known = STEP_UNITS[unit]
    return value / known.size if dimension == known.dimension else value


def bound_in_unit(value: float, unit: str) -> float:
    """A bound in SI in a step's unit: the short number that was written, where it differs by rounding alone."""
    size = STEP_UNITS[unit].size
    exact = value / size
    written = float(f"{exact:.14g}")
    return written if abs(written - exact) <= 2 * ulp(exact) else exact


def own_limit(unit: str, least: Quantity | None = None, most: Quantity | None = None) -> Limit:
    """A limit written in the rig file."""
    written = most or least
    low, high = (bound_in_unit(one.value, unit) if one else None for one in (least, most))
    return Limit(low, high, "rig file", written.unit if written else None)


def tighter(limits: list[Limit]) -> Limit | None:
    """The tighter of several limits: the largest minimum and the smallest maximum."""
    lows = [limit for limit in limits if limit.minimum is not None]
    highs = [limit for limit in limits if limit.maximum is not None]
    if not lows and not highs:
        return None
    low = max(lows, key=lambda limit: limit.minimum or 0.0, default=None)
    high = min(highs, key=lambda limit: limit.maximum or 0.0, default=None)
    binding = [limit for limit in (low, high) if limit is not None]
    source = "; ".join(dict.fromkeys(limit.source for limit in binding))
    return Limit(low.minimum if low else None, high.maximum if high else None, source, binding[-1].shown_in)


def worst(rows: Sequence[Row], unit: str, ruling: Ruling) -> tuple[Row, str]:
    """The row that decides a step, and why it leaves the step open, if it does.

    A row that fails goes before one without a limit, that one before the least margin. Where no row has a limit, it is
    the largest value.
    """
    places = []
    for one in rows:
        value = in_step_unit(one.result, unit)
        limit = tighter([*one.own_limits, *([ruling.limit] if ruling.limit else [])])
        if limit is None:
            places.append((1, -value, one))
        else:
            margin = limit.margin(value)
            places.append((2 if limit.holds(value) else 0, margin if margin is not None else 0.0, one))
    rank, _, found = min(places, key=lambda place: place[:2])
    limited = any(place[0] != 1 for place in places)
    return found, f"data missing: {found.lacks}" if rank == 1 and limited else ""


def judge(step: Step, case: Case, ruling: Ruling) -> Finding:
    """Work a step out and lay its limit against it."""
    try:
        outcome = step.compute(case)
    except Missing as missing:
        return _without_value(step, ruling, Verdict.OPEN, f"data missing: {missing}")
    except CannotJudge as cannot:
        return _without_value(step, ruling, Verdict.OPEN, str(cannot))
    except Failed as failed:
        return _without_value(step, ruling, Verdict.FAIL, str(failed))
    except ArithmeticError:
        return _without_value(step, ruling, Verdict.OPEN, NO_NUMBER)
    if outcome.rows:
        row, opens = worst(outcome.rows, step.unit or "1", ruling)
        outcome = outcome._replace(result=row.result, own_limits=row.own_limits, opens=opens)
    value = in_step_unit(outcome.result, step.unit or "1")
    limit = tighter([*outcome.own_limits, *([ruling.limit] if ruling.limit else [])])
    judged = limit is not None and isfinite(value) and not outcome.passes
    margin = limit.margin(value) if limit and judged else None
    verdict, reason = _verdict(step, outcome, ruling, limit, value)
    if outcome.fails or (margin is not None and (margin < 0) is not (verdict is Verdict.FAIL)):
        # A margin is negative exactly when the step fails; it says nothing where something else decides.
        margin = None
    said = [*outcome.cautions, *outcome.result.cautions]
    if margin is not None and 0 <= margin < CLOSE and verdict is Verdict.PASS:
        said.insert(0, f"margin under {CLOSE:.0%}")
    if limit is not None and limit.minimum is None and value < 0 and verdict is Verdict.PASS:
        # A step with a sign, such as forward and aft, needs a bound on either side.
        said.insert(0, ONE_SIDED)
    return Finding(
        key=step.key,
        title=step.title,
        kind=Kind.COMPUTED,
        group=step.group,
        verdict=verdict,
        reason=reason,
        value=value if isfinite(value) and step.unit else None,
        unit=step.unit,
        limit=limit,
        margin=margin,
        cautions=tuple(dict.fromkeys(said)),
        result=outcome.result,
        shown_in=(limit.shown_in if limit else None) or outcome.result.unit,
        notes=outcome.notes,
    )


def _verdict(step: Step, outcome: Outcome, ruling: Ruling, limit: Limit | None, value: float) -> tuple[Verdict, str]:
    if not ruling.judged:
        return Verdict.NOT_COUNTED, _unjudged(ruling)
    if not isfinite(value):
        return Verdict.OPEN, NO_NUMBER
    if outcome.fails:
        return Verdict.FAIL, outcome.fails
    if outcome.opens:
        return Verdict.OPEN, outcome.opens
    if limit is None:
        if outcome.passes:
            return Verdict.PASS, outcome.passes
        if step.for_information:
            return Verdict.NOT_COUNTED, "for information: no limit set"
        return Verdict.OPEN, "no limit set"
    holds = limit.holds(value)
    if ruling.needs_measured and not outcome.measured:
        estimate = "the estimate is within the limit" if holds else "the estimate is outside the limit"
        return Verdict.OPEN, f"needs a measured figure; {estimate}"
    return (Verdict.PASS, "") if holds else (Verdict.FAIL, outcome.outside)


def _unjudged(ruling: Ruling) -> str:
    return f"not judged: {ruling.source}" if ruling.source else "not judged: the limit set leaves it out"


def _without_value(step: Step, ruling: Ruling, verdict: Verdict, reason: str) -> Finding:
    if not ruling.judged:
        verdict, reason = Verdict.NOT_COUNTED, f"{_unjudged(ruling)} ({reason})"
    return Finding(
        key=step.key,
        title=step.title,
        kind=Kind.COMPUTED,
        group=step.group,
        verdict=verdict,
        reason=reason,
        unit=step.unit,
        limit=ruling.limit,
        shown_in=ruling.limit.shown_in if ruling.limit else None,
    )
