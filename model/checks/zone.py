"""Steps of the group zone: the air of the place."""

from __future__ import annotations

from model.checks.case import Case
from model.checks.step import Outcome, Step


def _density_altitude(case: Case) -> Outcome:
    return Outcome(case.day.density_altitude)


STEPS = (
    Step("zone.density_altitude", "Density altitude of the drop zone", "m", _density_altitude, for_information=True),
)
