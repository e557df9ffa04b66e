"""Steps of the group descent: how fast and how far it comes down."""

from __future__ import annotations

from collections.abc import Sequence

from model.checks.case import Case
from model.checks.missing import CannotJudge, need
from model.checks.rows import CanopyRow
from model.checks.step import Outcome, Step
from model.checks.term import Term, derive, largest, total
from model.physics import canopy, drag


def rate_is_measured(case: Case) -> bool:
    """Whether every canopy that hangs open at the end has a measured rate that is used."""
    return all(one.measured_rate_used for one in case.open_at_end)


def measured_cautions(rows: Sequence[CanopyRow]) -> tuple[str, ...]:
    """Cautions for measured rates that stand but are not used."""
    return tuple(
        f"{one.name}: measured rate not used, its mass is more than 10 % from this one's"
        for one in rows
        if one.row.measured is not None and one.row.measured.rate is not None and not one.measured_rate_used
    )


def end_area(case: Case) -> Term:
    """Drag area of what hangs open at the end."""
    areas = [one.full_area for one in case.open_at_end]
    return areas[0] if len(areas) == 1 else total(areas, "CdS", "drag area of what hangs open at the end")


def rate(case: Case) -> Term:
    """Steady rate of descent in the air of the zone."""
    return derive(drag.terminal_speed, case.masses.falling, case.day.density, end_area(case), of="air of the zone")


def _rate(case: Case) -> Outcome:
    return Outcome(rate(case), measured=rate_is_measured(case), cautions=measured_cautions(case.open_at_end))


def several_mains(rig_counts: Sequence[int]) -> bool:
    """Whether one of several mains could be missing."""
    return sum(rig_counts) > 1


def _rate_one_out(case: Case) -> Outcome:
    rows = case.open_at_end
    worst = max(rows, key=lambda one: one.full_area.value if one.row.role == "main" else 0.0)
    if worst.row.count == 1:
        rest = [one for one in rows if one is not worst]
        areas = [one.full_area for one in rest]
        if not areas:
            raise CannotJudge("nothing hangs open with one canopy out")
    else:
        missing = derive(canopy.drag_area_one_out, worst.full_area, worst.count, of=f"{worst.name}, one canopy out")
        areas = [missing if one is worst else one.full_area for one in rows]
    area = areas[0] if len(areas) == 1 else total(areas, "CdS", "drag area with one canopy out")
    result = derive(drag.terminal_speed, case.masses.falling, case.day.density, area, of="one canopy out")
    return Outcome(result, measured=rate_is_measured(case), cautions=measured_cautions(rows))


def _from_motion(case: Case, attribute: str, symbol: str, meaning: str, dimension: str) -> Term:
    """A result of the flight with the larger loss of height."""
    rule = case.heights.rule
    return case.motions.flown(rule, lambda motion: getattr(motion, attribute)[0], symbol, meaning, dimension)


def _time(case: Case) -> Outcome:
    term = _from_motion(case, "touchdown_time", "t", "release to touchdown", "time")
    return Outcome(term, measured=rate_is_measured(case), cautions=case.forces.cautions)


def _drift(case: Case) -> Outcome:
    drop = case.rig.drop
    if not drop.winds:
        need(drop.surface_wind, "drop.surface_wind")
    term = _from_motion(case, "touchdown_distance", "x", "ground distance along the run-in, throw included", "length")
    return Outcome(term, measured=rate_is_measured(case), cautions=case.forces.cautions)


def vertical_at_touchdown(case: Case) -> Term:
    """The larger of the steady rate and the vertical speed at touchdown of the motion."""
    flown = case.motions.both(lambda motion: motion.touchdown_descent[0], "w", "vertical speed at touchdown", "speed")
    return largest([rate(case), *flown], "v", "speed at landing")


STEPS = (
    Step("descent.rate", "Rate of descent at the drop zone", "m/s", _rate, tables=("canopy",)),
    Step("descent.rate_one_out", "Rate of descent with one canopy out", "m/s", _rate_one_out, tables=("canopy",)),
    Step("descent.time", "Release to touchdown", "s", _time, for_information=True, tables=("canopy",)),
    Step("descent.drift", "Drift along the run-in", "m", _drift, for_information=True, tables=("canopy",)),
)
