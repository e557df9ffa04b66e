"""Measured figures beside the estimates they replace."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

from model.checks.case import Case
from model.checks.missing import CannotJudge, Failed, Missing
from model.checks.rows import CanopyRow
from model.checks.term import Term, derive, given
from model.physics import canopy, drag
from model.quantity import Quantity


@dataclass(frozen=True)
class Comparison:
    """One measured figure with the estimate it replaces; ``estimate`` is None where its data are missing."""

    name: str
    source: str
    measured: Term
    estimate: Term | None
    used: bool
    missing: str = ""

    @property
    def ratio(self) -> float | None:
        """Estimate over measured figure."""
        return self.estimate.value / self.measured.value if self.estimate else None


def without_measured(case: Case) -> Case:
    """The same rig as if nothing had been measured."""
    rows = tuple(
        one.model_copy(
            update={
                "measured": None,
                "reefing": tuple(stage.model_copy(update={"measured": None}) for stage in one.reefing),
            }
        )
        for one in case.rig.canopy
    )
    return Case(case.rig.model_copy(update={"canopy": rows}), case.limits)


def comparisons(case: Case) -> tuple[Comparison, ...]:
    """Every measured figure of the rig beside its estimate."""
    if not any(one.measured or any(stage.measured for stage in one.reefing) for one in case.rig.canopy):
        return ()
    plain = without_measured(case)
    found: list[Comparison] = []
    for one, bare in zip(case.rows, plain.rows, strict=True):
        found += _rate(one, bare)
        found += _times(one, plain, bare)
        found += _force(case, one, plain, bare)
    return tuple(found)


def _compare(name: str, source: str, measured: Term, estimate: Iterator[Term], used: bool) -> Comparison:
    try:
        return Comparison(name, source, measured, next(estimate), used)
    except Missing as missing:
        return Comparison(name, source, measured, None, used, f"data missing: {missing}")
    except (CannotJudge, Failed) as reason:
        return Comparison(name, source, measured, None, used, str(reason))


def _given(one: CanopyRow, quantity: Quantity, symbol: str, meaning: str, field: str) -> Term:
    return given(quantity, symbol, f"{meaning}, {one.name}", one.field(field))


def _rate(one: CanopyRow, bare: CanopyRow) -> Iterator[Comparison]:
    figures = one.row.measured
    if figures is None or figures.rate is None or figures.rate_mass is None or figures.rate_density is None:
        return
    mass = _given(one, figures.rate_mass, "m", "mass of the measured descent", "measured.rate_mass")
    density = _given(one, figures.rate_density, "rho", "density of the measured descent", "measured.rate_density")
    measured = _given(one, figures.rate, "v", "measured rate of descent", "measured.rate")

    def estimate() -> Iterator[Term]:
        yield derive(drag.terminal_speed, mass, density, bare.full_area, of=bare.name)

    yield _compare(f"rate of descent, {one.name}", figures.source, measured, estimate(), one.measured_rate_used)


def _times(one: CanopyRow, plain: Case, bare: CanopyRow) -> Iterator[Comparison]:
    before = sum(len(row.row.reefing) + 1 for row in plain.rows[: bare.index])
    measured_figures = [stage.measured for stage in one.row.reefing] + [one.row.measured]
    for i, figures in enumerate(measured_figures):
        if figures is None or figures.filling_time is None:
            continue
        measured = _given(one, figures.filling_time, "tf", f"measured filling time {i + 1}", "measured.filling_time")

        def estimate(i: int = i) -> Iterator[Term]:
            speed = plain.motions.flown(
                "time", lambda motion: motion.start_speed[before + i, 0], "V", "speed when the filling starts", "speed"
            )
            yield derive(canopy.filling_time, bare.fillings[i].distance, speed)

        yield _compare(f"filling time {i + 1}, {one.name}", figures.source, measured, estimate(), used=True)


def _force(case: Case, one: CanopyRow, plain: Case, bare: CanopyRow) -> Iterator[Comparison]:
    figures = one.row.measured
    if figures is None or figures.opening_force is None:
        return
    measured = _given(one, figures.opening_force, "Fr", "measured opening force", "measured.opening_force")
    used = case.forces.measured(one) is not None

    def estimate() -> Iterator[Term]:
        yield plain.forces.of_row(bare)

    yield _compare(f"opening force, {one.name}", figures.source, measured, estimate(), used)
