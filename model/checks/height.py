"""Steps of the group height: what opening costs, and what is left of the release height."""

from __future__ import annotations

from model.checks.case import Case
from model.checks.heights import NO_SWING
from model.checks.step import Outcome, Step
from model.checks.term import Term


def _outcome(case: Case, result: Term) -> Outcome:
    cautions = (NO_SWING,) if case.heights.swing is None else ()
    measured = all(one.every_time_measured for one in case.rows)
    return Outcome(result, cautions=(*cautions, *case.forces.cautions), notes=case.forces.notes(), measured=measured)


def _opening_loss(case: Case) -> Outcome:
    return _outcome(case, case.heights.loss)


def _reserve(case: Case) -> Outcome:
    return _outcome(case, case.heights.reserve)


STEPS = (
    Step("height.opening_loss", "Height lost while opening", "m", _opening_loss, tables=("canopy",)),
    Step("height.reserve", "Height left when open", "m", _reserve, tables=("canopy",)),
)
