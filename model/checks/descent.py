"""Steps of the group descent: how fast and how far it comes down."""

from __future__ import annotations

from model.checks.case import Case
from model.checks.missing import CannotJudge, need
from model.checks.step import Outcome, Step
from model.checks.term import Term, derive
from model.physics import canopy


def _outcome(case: Case, result: Term) -> Outcome:
    return Outcome(result, measured=case.rates.measured, cautions=case.rates.cautions)


def _rate(case: Case) -> Outcome:
    return _outcome(case, case.rates.rate)


def _rate_one_out(case: Case) -> Outcome:
    rows = case.rates.open_at_end
    worst = max(rows, key=lambda one: one.full_area.value if one.row.role == "main" else 0.0)
    areas = [one.full_area for one in rows if one is not worst]
    if worst.row.count > 1:
        areas.append(derive(canopy.drag_area_one_out, worst.full_area, worst.count, of=f"{worst.name}, one canopy out"))
    if not areas:
        raise CannotJudge("nothing hangs open with one canopy out")
    return _outcome(case, case.rates.steady(areas, "one canopy out"))


def _from_motion(case: Case, attribute: str, symbol: str, meaning: str, dimension: str) -> Term:
    """A result of the flight with the larger loss of height."""
    rule = case.heights.rule
    return case.motions.flown(rule, lambda motion: getattr(motion, attribute)[0], symbol, meaning, dimension)


def _time(case: Case) -> Outcome:
    term = _from_motion(case, "touchdown_time", "t", "release to touchdown", "time")
    return Outcome(term, measured=case.rates.measured, cautions=case.forces.cautions)


def _drift(case: Case) -> Outcome:
    drop = case.rig.drop
    if not drop.winds:
        need(drop.surface_wind, "drop.surface_wind")
    term = _from_motion(case, "touchdown_distance", "x", "ground distance along the run-in, throw included", "length")
    return Outcome(term, measured=case.rates.measured, cautions=case.forces.cautions)


STEPS = (
    Step("descent.rate", "Rate of descent at the drop zone", "m/s", _rate, tables=("canopy",)),
    Step("descent.rate_one_out", "Rate of descent with one canopy out", "m/s", _rate_one_out, tables=("canopy",)),
    Step("descent.time", "Release to touchdown", "s", _time, for_information=True, tables=("canopy",)),
    Step("descent.drift", "Drift along the run-in", "m", _drift, for_information=True, tables=("canopy",)),
)
