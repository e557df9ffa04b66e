"""How findings are put into words: values, limits, margins, verdicts. Screens and reports say it alike."""

from __future__ import annotations

from model.checks.finding import STEP_UNITS, Checklist, Finding, Kind, Verdict
from model.quantity import Dimension, UnitSystem, show, show_apart, unit_for

CAUTION = (
    "A computed check is an estimate. Local rules, the technical manual and the judgement of licensed riggers go "
    "before it; nothing here releases a load."
)
COUNTED = (Verdict.PASS, Verdict.FAIL, Verdict.OPEN, Verdict.NOT_COUNTED)
OWN_UNITS = {"d": "d", "yr": "yr"}


def shown_unit(finding: Finding, system: UnitSystem) -> tuple[Dimension, str, float]:
    """Dimension, unit and size of the step unit in which a finding's value and limit are shown."""
    step = STEP_UNITS[finding.unit or "1"]
    dimension = Dimension(step.dimension)
    size = step.size
    if finding.unit in OWN_UNITS:
        return dimension, OWN_UNITS[finding.unit], size
    value = finding.value if finding.value is not None else _bound(finding)
    si = value * size if value is not None else None
    return dimension, unit_for(dimension, system, finding.shown_in, si), size


def _bound(finding: Finding) -> float | None:
    limit = finding.limit
    return None if limit is None else limit.maximum if limit.maximum is not None else limit.minimum


def _value_and_bounds(finding: Finding, system: UnitSystem) -> tuple[str, str, str]:
    """Value, minimum and maximum as texts that compare as the numbers do; empty where there is none."""
    dimension, unit, size = shown_unit(finding, system)
    limit = finding.limit
    low = limit.minimum * size if limit and limit.minimum is not None else None
    high = limit.maximum * size if limit and limit.maximum is not None else None
    value = finding.value * size if finding.value is not None else None

    def alone(number: float | None, digits: int = 4) -> str:
        return "" if number is None else show(number, dimension, unit, digits=digits)

    if value is None or (low is None and high is None):
        return alone(value), alone(low), alone(high)
    digits = 4
    while digits < 18:
        texts = [
            show_apart(value, bound, dimension, unit, digits=digits) if bound is not None else ("", "")
            for bound in (low, high)
        ]
        values = {text[0] for text in texts if text[0]}
        if len(values) == 1:
            return values.pop(), texts[0][1], texts[1][1]
        digits += 1
    return alone(value, digits), alone(low, digits), alone(high, digits)


def value_text(finding: Finding, system: UnitSystem) -> str:
    """The value with its unit, empty where there is none."""
    return _value_and_bounds(finding, system)[0]


def limit_text(finding: Finding, system: UnitSystem) -> str:
    """The bounds in words: ``at most 28.5 ft/s``; empty where there is no limit."""
    _, low, high = _value_and_bounds(finding, system)
    if low and high:
        return f"{low} to {high}"
    return f"at most {high}" if high else f"at least {low}" if low else ""


def bound_text(finding: Finding, system: UnitSystem) -> str:
    """The limit with its source, or that there is none."""
    text = limit_text(finding, system)
    if not text or finding.limit is None:
        return "no limit set" if finding.kind is Kind.COMPUTED else ""
    return f"limit {text}, {finding.limit.source}"


def percent(share: float) -> str:
    """A share in per cent with two figures: a small one is never shown as 0."""
    size = abs(share) * 100
    if size >= 10:
        return f"{size:,.0f} %"
    for places in range(1, 16):
        if size == 0 or round(size, places) > 0:
            return f"{size:.{places}f} %"
    return f"{size:.2g} %"


def margin_text(finding: Finding) -> str:
    """The margin in words: ``margin 12 %``, ``short by 3 %``; empty where there is none."""
    if finding.margin is None:
        return ""
    return f"short by {percent(finding.margin)}" if finding.margin < 0 else f"margin {percent(finding.margin)}"


def counts_text(checklist: Checklist) -> str:
    """How many steps came to what: ``21 pass, 1 fail, 12 open, 2 not counted``."""
    return ", ".join(f"{checklist.count(verdict)} {verdict.lower()}" for verdict in COUNTED)


def answer_text(finding: Finding) -> str:
    """The standing answer with who and when; empty where there is none."""
    answer = finding.answer
    if answer is None:
        return ""
    who = answer.who + (f" and {answer.second}" if answer.second else "")
    value = f" {answer.value}," if answer.value else ""
    stale = ", STALE" if answer.stale else ""
    return f"answered '{answer.answer}',{value} by {who}, {answer.when:%Y-%m-%d %H:%M}{stale}"
