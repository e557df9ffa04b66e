"""A rig's opening and descent as charts: force, drag area and rate of descent under every filling rule flown."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass
from math import isfinite
from typing import TYPE_CHECKING

from model.checks.case import Case
from model.checks.finding import Checklist
from model.checks.missing import CannotJudge, Failed, Missing
from model.checks.motion import Rule
from model.checks.opening import canopy_share
from model.physics.formula import CONSTANTS
from model.quantity import Dimension, UnitSystem, show, show_apart, to_unit, unit_for
from model.report.chart import Axis, Bound, Chart, Curve, Mark

if TYPE_CHECKING:
    from model.physics.flight import History, Motion
    from model.physics.flight.lobatto import Array

_TAIL = 0.5
"""How much of the time from line stretch to the last full canopy is shown after it."""


@dataclass(frozen=True)
class Drawn:
    """A chart and its numbers in words, each with its unit: the picture never carries a number alone."""

    chart: Chart
    said: tuple[str, ...]


@dataclass(frozen=True)
class FlightCharts:
    """The charts of one rig, or the reason why there are none."""

    charts: tuple[Drawn, ...]
    reason: str = ""


def case_history(case: Case, rule: Rule) -> History:
    """The flight of a rig from release to the ground, as samples.

    Raises:
        Missing: A field that the motion needs is absent.
        CannotJudge: The motion could not be solved to its accuracy.
    """
    return case.motions.motion(rule).history()


def flight_charts(checklist: Checklist, system: UnitSystem) -> FlightCharts:
    """Canopy force against time, rate of descent against height, drag area against time; in the shown units."""
    case: Case = checklist.details
    try:
        flights = {rule: case_history(case, rule) for rule in case.motions.rules}
        motions = {rule: case.motions.motion(rule) for rule in case.motions.rules}
    except Missing as missing:
        return FlightCharts((), f"data missing: {missing}")
    except (CannotJudge, Failed) as cannot:
        return FlightCharts((), str(cannot))
    drawing = _Drawing(checklist, case, system, flights, motions)
    return FlightCharts((drawing.force(), drawing.descent(), drawing.area()))


class _Drawing:
    """Charts of one rig's flights."""

    def __init__(
        self,
        checklist: Checklist,
        case: Case,
        system: UnitSystem,
        flights: dict[Rule, History],
        motions: dict[Rule, Motion],
    ) -> None:
        self.case, self.system, self.flights, self.motions = case, system, flights, motions
        self.findings = {one.key: one for one in checklist.findings}
        peaks = {rule: float(motion.opening_force[:, 0].max()) for rule, motion in motions.items()}
        self.hardest = max(peaks, key=lambda rule: peaks[rule])
        self.until = max(_shown_until(motion) for motion in motions.values())

    def _unit(self, dimension: Dimension, written: str | None, size: float) -> str:
        unit = unit_for(dimension, self.system, written, size)
        return {"ft in": "ft", "in": "ft"}.get(unit, unit) if dimension is Dimension.LENGTH else unit

    def _curves(self, x: Callable[[History], Array], y: Callable[[History], Array], main: Rule) -> list[Curve]:
        return [
            Curve(x(flight).tolist(), y(flight).tolist(), f"{rule} rule", "main" if rule == main else "second")
            for rule, flight in self.flights.items()
        ]

    def _opening(self, values: Callable[[History], Array]) -> Callable[[History], Array]:
        """The part of a flight in which canopies open."""
        return lambda flight: values(flight)[flight.time <= self.until]

    def force(self) -> Drawn:
        """Canopy force, opening coefficient in, against time."""
        row = self.case.rows[-1].row
        peak, moment = _largest_force(self.motions[self.hardest])
        written = row.strength.unit if row.strength else self._written("N")
        unit = self._unit(Dimension.FORCE, written, peak)

        def shown(newton: float) -> float:
            return to_unit(newton, unit, Dimension.FORCE)

        limits = self._force_bounds()
        bounds = [Bound(shown(force), label) for force, label in limits]
        text = _apart(peak, [force for force, _ in limits], Dimension.FORCE, unit)
        never = "no canopy pulls before the load lands"
        mark = Mark(moment, shown(peak), f"peak {text} at {moment:.2f} s" if isfinite(moment) else never)
        curves = self._curves(
            self._opening(lambda flight: flight.time),
            self._opening(lambda flight: _converted(flight.canopy_force, unit, Dimension.FORCE)),
            self.hardest,
        )
        axes = Axis("time after release", "s", from_zero=True), Axis("canopy force", unit, from_zero=True)
        said = [f"{self.hardest} rule: {mark.text}"]
        said += [f"limit {label} is reached at {show(force, Dimension.FORCE, unit)}" for force, label in limits]
        if self.case.forces.measured_all():
            said.append("measured: a filling time shapes the curve; a measured force stands in the steps alone")
        chart = Chart(curves, *axes, bounds, [mark], f"Canopy force against time, {unit}")
        return Drawn(chart, tuple(said))

    def _force_bounds(self) -> Sequence[tuple[float, str]]:
        """Forces at which a limit is reached, each with what sets it."""
        found = []
        load_factor = self.findings.get("opening.load_factor")
        if load_factor and load_factor.limit and load_factor.limit.maximum is not None:
            most = load_factor.limit.maximum
            found.append((most * CONSTANTS["g0"] * self.case.masses.falling.value, f"{most:,.4g} g"))
        strength = self._strength_bound()
        return [*found, strength] if strength else found

    def _strength_bound(self) -> tuple[float, str] | None:
        """Force at which the worst canopy reaches its strength over the factor asked for; of a single row."""
        rows, step = self.case.rows, self.findings.get("opening.canopy")
        least = step.limit.minimum if step and step.limit else None
        if len(rows) != 1 or rows[0].row.strength is None:
            return None
        try:
            share = canopy_share(self.case, rows[0]).value / self.case.forces.of_row(rows[0]).value
        except (Missing, CannotJudge, Failed, ZeroDivisionError):
            return None
        force = rows[0].row.strength.value / share / (least or 1.0)
        return force, f"strength/{least:,.4g}" if least else "strength"

    def descent(self) -> Drawn:
        """Rate of descent against height above the zone."""
        step = self.findings.get("descent.rate")
        written = step.shown_in if step else None
        motion = self.motions[self.hardest]
        touchdown = float(motion.touchdown_descent[0])
        rate = self._unit(Dimension.SPEED, written, touchdown)
        height = self._unit(Dimension.LENGTH, self.case.day.release_height.unit, self.case.day.release_height.value)
        curves = self._curves(
            lambda flight: _converted(flight.height, height, Dimension.LENGTH),
            lambda flight: _converted(flight.w, rate, Dimension.SPEED),
            self.hardest,
        )
        at_ground = to_unit(touchdown, rate, Dimension.SPEED)
        mark = Mark(0.0, at_ground, f"at touchdown {show(touchdown, Dimension.SPEED, rate)}")
        axes = Axis("height above the zone", height, from_zero=True, falling=True), Axis("rate of descent", rate, True)
        chart = Chart(curves, *axes, (), [mark], f"Rate of descent against height, {rate}")
        return Drawn(chart, (f"{self.hardest} rule: {mark.text}, drag of the load itself counted in",))

    def area(self) -> Drawn:
        """Drag area of all open canopies against time."""
        row = self.case.rows[-1]
        unit = self._unit(Dimension.AREA, self._written("m2"), row.full_area.value)
        curves = self._curves(
            self._opening(lambda flight: flight.time),
            self._opening(lambda flight: _converted(flight.canopy_area, unit, Dimension.AREA)),
            self.hardest,
        )
        axes = Axis("time after release", "s", from_zero=True), Axis("drag area of the canopies", unit, from_zero=True)
        chart = Chart(curves, *axes, title=f"Drag area against time, {unit}")
        return Drawn(chart, (f"{row.name}, full: {show(row.full_area.value, Dimension.AREA, unit)}",))

    def _written(self, like: str) -> str | None:
        """A unit of the system that the canopy's diameter was written in, where none was written for this."""
        written = self.case.rows[-1].diameter.unit
        return {"N": "lbf", "m2": "ft2"}[like] if written in ("ft", "in", "ft in", "yd") else None


def _converted(values: Array, unit: str, dimension: Dimension) -> Array:
    """Values that have no offset of zero, in a unit."""
    return values * to_unit(1.0, unit, dimension)


def _apart(value: float, bounds: Sequence[float], dimension: Dimension, unit: str) -> str:
    """A value with its unit, on its own side of every bound."""
    texts = [show_apart(value, bound, dimension, unit)[0] for bound in bounds]
    return max(texts, key=len, default=show(value, dimension, unit))


def _largest_force(motion: Motion) -> tuple[float, float]:
    """The largest opening force of a flight, N, and when it comes, s."""
    number = int(motion.opening_force[:, 0].argmax())
    filling = float(motion.fill_force[number, 0]) >= float(motion.hold_force[number, 0])
    moment = motion.fill_force_time if filling else motion.hold_force_time
    return float(motion.opening_force[number, 0]), float(moment[number, 0])


def _shown_until(motion: Motion) -> float:
    """The time up to which the opening is shown: a while after the last filling, or touchdown."""
    landed = float(motion.touchdown_time[0])
    first = float(motion.line_stretch_time[0, 0])
    last = max((float(end) for end in motion.end_time[:, 0] if isfinite(end)), default=first)
    return min(landed, last + _TAIL * (last - first)) if last > first else landed
