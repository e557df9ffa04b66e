"""The opening line by line: from the air at release to what the load feels, with every method beside the motion."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass, replace
from functools import partial
from math import sqrt

from model.checks.case import Case
from model.checks.missing import CannotJudge, Failed, Missing
from model.checks.motion import Rule
from model.checks.opening import canopy_share, snatch_of
from model.checks.rows import CanopyRow, Filling
from model.checks.term import Procedure, Term, combine, derive, known, largest
from model.physics import canopy, drag, inflation, ludtke

STEEP = "the path is steeper than 45 deg there: a form without gravity reads low"
MOTION = "motion with gravity"
LIGHT = "ballistic parameter under 10: the load slows while the canopy fills, so this reads far too high"
SLOW = "ends its filling below the steady rate of descent: without gravity nothing holds the speed up"


@dataclass(frozen=True)
class WalkLine:
    """One line of the walk: a value with its way there, or what is missing for it.

    A line of a filling names it by ``stage`` (from 0 through all rows). ``method`` marks one of several ways to the
    same force; ``counts`` says whether it is within its range and so part of the quoted range of methods.
    """

    title: str
    term: Term | None
    missing: str = ""
    warning: str = ""
    stage: int | None = None
    method: bool = False
    counts: bool = True


@dataclass(frozen=True)
class Walk:
    """All lines in the order they are opened."""

    lines: tuple[WalkLine, ...]
    force: Term | None

    @property
    def range_of_methods(self) -> tuple[float, float] | None:
        """Least and largest method within its range over the motion, for the filling that pulls most.

        None where there is nothing to compare.
        """
        flown = {one.stage: one.term.value for one in self.lines if one.method and one.term and _is_motion(one)}
        if not flown:
            return None
        stage = max(flown, key=lambda key: flown[key])
        most = max(one.term.value for one in self.lines if one.term and one.stage == stage and _is_motion(one))
        shares = [
            one.term.value / most
            for one in self.lines
            if one.term is not None and one.method and one.counts and one.stage == stage
        ]
        return min(shares), max(shares)


def _is_motion(line: WalkLine) -> bool:
    return line.title.startswith(MOTION)


def walk(case: Case) -> Walk:
    """The walk of one rig; a line whose data are missing says so and the others stand."""
    lines = [
        _line("air at release", lambda: case.day.release_density),
        _line("true airspeed at release", lambda: case.motions.airspeed),
        *_fillings(case),
        _line("largest opening force", lambda: case.forces.opening),
        _line("the same without Cx", case.forces.plain),
        *_shares(case),
        _line(
            "what the load feels",
            lambda: derive(canopy.load_factor, case.forces.opening, case.masses.falling, unit="g"),
        ),
    ]
    return Walk(tuple(lines), _line("", lambda: case.forces.opening).term)


def _line(title: str, term: Callable[[], Term]) -> WalkLine:
    try:
        return WalkLine(title, term())
    except Missing as missing:
        return WalkLine(title, None, f"data missing: {missing}")
    except (CannotJudge, Failed) as reason:
        return WalkLine(title, None, str(reason))


def _fillings(case: Case) -> list[WalkLine]:
    try:
        motion = case.motions.motion("time")
        rows = case.rows
    except (Missing, CannotJudge) as reason:
        return [WalkLine("filling", None, f"data missing: {reason}" if isinstance(reason, Missing) else str(reason))]
    found: list[WalkLine] = []
    number = 0
    for one in rows:
        for filling in one.fillings:
            if bool(motion.started[number, 0]):
                found += _Stage(case, one, filling, number).lines()
            number += 1
    return found


class _Stage:
    """One filling of the walk."""

    def __init__(self, case: Case, one: CanopyRow, filling: Filling, number: int) -> None:
        self.case, self.one, self.filling, self.number = case, one, filling, number
        several = len(case.rows) > 1 or len(one.fillings) > 1
        self.of = f"{one.name}, filling {filling.number + 1}" if several else ""
        number_ = number
        flown = case.motions.flown
        self.speed = flown(
            "time", lambda motion: motion.start_speed[number_, 0], "V", "speed when the filling starts", "speed"
        )
        height = flown(
            "time", lambda motion: motion.start_height[number_, 0], "h", "height when the filling starts", "length"
        )
        altitude = combine(
            Procedure("z = z0 + h", lambda ground, over: ground + over, "definition"),
            [case.day.elevation, height], "z", "height above mean sea level", "length",
        )  # fmt: skip
        text = "density of the day's air at that height"
        self.density = case.day.aloft(lambda day, z: day.density(z), text, altitude, "rho", "density there", "density")

    def title(self, text: str) -> str:
        """A line's title, with the filling where there are several."""
        return f"{text}: {self.of}" if self.of else text

    def lines(self) -> list[WalkLine]:
        """The lines of this filling."""
        first = "speed at line stretch" if self.filling.number == 0 else "speed at disreef"
        plain = [
            _line(first, lambda: self.speed),
            _line("dynamic pressure", self.pressure),
            _line("filling time", self.filling_time),
            _line("ballistic parameter", self.ballistic),
            _line("reduction factor, growth against time", lambda: self.factor("time")),
        ]
        lines = [*plain, *self._closed_forms(), *self._motions()]
        return [replace(one, title=self.title(one.title), stage=self.number) for one in lines]

    def _closed_forms(self) -> list[WalkLine]:
        """The methods that leave gravity or the loss of speed out."""
        light = LIGHT if self.ballistic().value < inflation.INFINITE_MASS_LEAST else ""
        steep = self._steep()
        forms: list[tuple[str, Callable[[], Term], str, bool]] = [
            ("infinite mass", self.infinite_mass, light, not light),
            ("growth against time, no gravity", partial(self.peak, "time"), steep or self._slow(), not steep),
            ("growth against distance, no gravity", partial(self.peak, "distance"), steep, not steep),
            ("Ludtke area law, no gravity", self.ludtke, steep, not steep),
        ]
        return [
            replace(_line(name, term), method=True, warning=warning, counts=counts)
            for name, term, warning, counts in forms
        ]

    def _motions(self) -> list[WalkLine]:
        """The motion with gravity under every rule that is flown."""
        return [
            replace(_line(f"{MOTION}, {rule} rule", partial(self.flown, rule)), method=True)
            for rule in self.case.motions.rules
        ]

    def pressure(self) -> Term:
        """Dynamic pressure when the filling starts."""
        return derive(drag.dynamic_pressure, self.density, self.speed)

    def filling_time(self) -> Term:
        """Measured, or fill distance over speed."""
        if self.filling.measured_time is not None:
            return self.filling.measured_time
        return derive(canopy.filling_time, self.filling.distance, self.speed)

    def distance(self) -> Term:
        """Fill distance; with a measured time, the distance it would fill over at its first speed."""
        if self.filling.measured_time is None:
            return self.filling.distance
        how = Procedure("L = V tf", lambda speed, time: speed * time, "definition")
        return combine(
            how, [self.speed, self.filling.measured_time], "L", "fill distance of the measured time", "length"
        )

    def ballistic(self) -> Term:
        """A of this filling."""
        falling = self.case.masses.falling
        return derive(inflation.ballistic_parameter, falling, self.density, self.filling.area, self.distance())

    def factor(self, rule: str) -> Term:
        """X1 of one rule, through the fraction of the filling at which it peaks."""
        ballistic, exponent = self.ballistic(), self.filling.exponent
        timed = rule == "time"
        peaks = inflation.peak_fraction_time if timed else inflation.peak_fraction_distance
        fraction = derive(peaks, ballistic, exponent)
        integral = derive(inflation.power_area_integral, fraction, exponent)
        ratio = inflation.speed_ratio_time if timed else inflation.speed_ratio_distance
        return derive(
            inflation.force_ratio, derive(inflation.power_area, fraction, exponent), derive(ratio, integral, ballistic),
            symbol="X1",
        )  # fmt: skip

    def peak(self, rule: str) -> Term:
        """Peak force without gravity under one rule."""
        coefficient = self.filling.opening_coefficient
        return derive(inflation.peak_force, self.pressure(), self.filling.area, coefficient, self.factor(rule))

    def infinite_mass(self) -> Term:
        """Force were the speed not to drop while filling."""
        return derive(
            inflation.infinite_mass_force, self.pressure(), self.filling.area, self.filling.opening_coefficient
        )

    def ludtke(self) -> Term:
        """Peak force by Ludtke's area law; the area open before counts as its start."""
        before = known(self._open_before(), "eta", "root of the area ratio at the start", "number", "area open before")
        how = Procedure(
            "a = ((1 - eta) tau^3 + eta)^2, largest of a u^2", _ludtke_factor,
            "Ludtke, AIAA 73-477 (from memory)", "solid cloth", "gravity",
        )  # fmt: skip
        factor = combine(how, [self.ballistic(), before], "Xi", "shock factor", "number")
        coefficient = self.filling.opening_coefficient
        return derive(inflation.peak_force, self.pressure(), self.filling.area, coefficient, factor)

    def _open_before(self) -> float:
        if self.filling.number == 0:
            return 0.0
        before = self.one.fillings[self.filling.number - 1].area.value
        return min(sqrt(before / self.filling.area.value), 0.999)

    def flown(self, rule: Rule) -> Term:
        """Opening force of the filling in the motion."""
        number = self.number
        unit = self.one.row.strength.unit if self.one.row.strength else None
        return self.case.motions.flown(
            rule, lambda motion: motion.opening_force[number, 0], "F", "opening force in the motion", "force", unit
        )

    def _steep(self) -> str:
        motion = self.case.motions.motion("time")
        angle = float(motion.line_stretch_angle[self.one.index, 0])
        return STEEP if angle > inflation.STEEPEST_NO_GRAVITY else ""

    def _slow(self) -> str:
        """Whether the form against time ends its filling slower than the load can fall."""
        full = inflation.power_area_integral(1.0, self.filling.exponent.value)
        ends = self.speed.value * float(inflation.speed_ratio_time(full, self.ballistic().value))
        mass, density, area = self.case.masses.falling.value, self.density.value, self.filling.area.value
        return SLOW if ends < float(drag.terminal_speed(mass, density, area)) else ""


def _ludtke_factor(mass_ratio: float, start: float) -> float:
    return ludtke.ludtke_peak(mass_ratio, start)[1]


def _shares(case: Case) -> list[WalkLine]:
    """Worst canopy, snatch and the largest leg load."""
    found = []
    try:
        rows = case.rows
    except Missing:
        rows = ()
    for one in rows:
        found.append(_line(f"worst canopy of {one.name}", partial(canopy_share, case, one)))
        found.append(_line(f"snatch at line stretch, {one.name}", partial(snatch_of, case, one)))
    if case.rig.leg:
        found.append(
            _line("most loaded sling leg", lambda: largest(list(case.hanging.loads), "T", "largest load of one leg"))
        )
    return found
