"""Steps of the group lashing: what holds the load to the platform, in five directions."""

from __future__ import annotations

from collections.abc import Callable

from model.checks.case import Case
from model.checks.missing import CannotJudge, Failed, need
from model.checks.step import Outcome, Step
from model.checks.term import derive, known
from model.physics import balance, lashing


def _direction(direction: str) -> Callable[[Case], Outcome]:
    def compute(case: Case) -> Outcome:
        lashings = case.lashings
        restraint = case.limits.restraint if case.limits else None
        if restraint is None:
            raise CannotJudge("no limit set: the limit set has no [restraint]")
        factor = need(getattr(restraint, direction), f"restraint.{direction}")
        origin = f"limit set, restraint.{direction}, {restraint.source}"
        term = known(factor.value, "a", f"restraint factor {direction}", "number", origin)
        if term.value == 0:
            raise CannotJudge(f"restraint.{direction} is 0: nothing is asked for")
        weight = derive(balance.weight, case.masses.lashed, of="lashed")
        result = derive(lashing.restraint_ratio, lashings.held(direction), term, weight)
        return Outcome(result, cautions=lashings.cautions())

    return compute


def _mixed(case: Case) -> Outcome:
    held = case.lashings.hold()
    if held.mixed:
        raise Failed(
            f"straps and chains share a direction: {', '.join(held.mixed)}; the stiffer chain takes the load first"
        )
    count = known(0.0, "n", "directions shared by straps and chains", "number", "lashing rows")
    return Outcome(count, passes="no direction is shared by straps and chains")


STEPS = (
    *(
        Step(
            f"lashing.{direction}",
            f"Held against {direction} over what is asked for",
            "1",
            _direction(direction),
            tables=("lashing",),
        )
        for direction in ("forward", "aft", "left", "right", "up")
    ),
    Step("lashing.mixed", "Straps and chains apart", None, _mixed, tables=("lashing",)),
)
