"""Steps of the group balance: where the centre of gravity lies."""

from __future__ import annotations

from model.checks.case import Case
from model.checks.load import side
from model.checks.step import Outcome, Step
from model.checks.term import Term, derive, least, total
from model.physics import balance

FORWARD_OF_MIDDLE = "positive: forward of the middle of the platform; negative: aft"
LEFT_OF_MIDDLE = "positive: left of the middle of the platform; negative: right"


def _forward(case: Case) -> Outcome:
    return Outcome(case.masses.centre(0), notes=(FORWARD_OF_MIDDLE,))


def _side_step(case: Case) -> Outcome:
    return Outcome(case.masses.centre(1), notes=(LEFT_OF_MIDDLE,))


def smaller_side(case: Case) -> Term:
    """The smaller side of the base."""
    return least([side(case, "length"), side(case, "width")], "b", "smaller side of the base")


def _slenderness(case: Case) -> Outcome:
    centre = case.masses.centre(2)
    over = total([centre, case.motions.depth], "h", "centre of gravity over the platform's underside")
    return Outcome(derive(balance.slenderness, over, smaller_side(case)))


STEPS = (
    Step("balance.forward", "Centre of gravity forward of the middle", "m", _forward),
    Step("balance.side", "Centre of gravity left of the middle", "m", _side_step),
    Step(
        "balance.slenderness", "Height of the centre of gravity over the base", "1", _slenderness, tables=("platform",)
    ),
)
