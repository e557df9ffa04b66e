"""Three demo rigs flown anew by an integrator of the test's own.

Derived: the planar equations of motion by scipy's DOP853 at rtol 1e-9, air integrated from the hydrostatic equation.
Every figure is the one written in the rig file; nothing of the program's physics is used.
"""

from __future__ import annotations

from collections.abc import Callable
from math import cos, hypot, pi, sqrt

import numpy as np
import pytest
from numpy.typing import NDArray
from scipy.integrate import solve_ivp

from tests.demo.scenario import value

LB, FT, IN, KT, LBF, G0 = 0.45359237, 0.3048, 0.0254, 1852 / 3600, 4.4482216152605, 9.80665
GAS = 8314.32 / 28.9644
EARTH = 6_356_766.0

State = NDArray[np.float64]
Area = Callable[[float, State], float]
Event = Callable[[float, State], float]


def close(found: float, expected: float, rel: float = 2e-5) -> None:
    assert found == pytest.approx(expected, rel=rel)


class Air:
    """Density over a zone: standard lapse with an offset, dry hydrostatic pressure, a constant share of vapour."""

    def __init__(self, elevation: float, celsius: float, setting: float, dew_point: float | None, top: float) -> None:
        n = G0 / (GAS * 0.0065)
        at_zone = 0.0065 * self.level(elevation)
        pressure = 101_325.0 * ((setting / 1013.25) ** (1 / n) - at_zone / 288.15) ** n
        vapour = 0.0 if dew_point is None else 611.21 * np.exp(17.502 * dew_point / (240.97 + dew_point)) / pressure
        self.zone, self.offset = elevation, celsius + 273.15 - (288.15 - at_zone)
        heights = np.linspace(0, top, 1001)
        solved = solve_ivp(self._falls, (0, top), [pressure], t_eval=heights, rtol=1e-11, atol=1e-6, method="DOP853")
        logs = np.log(solved.y[0] * (1 - 0.378 * vapour) / (GAS * self.temperature(heights)))
        self._curve = np.polynomial.Polynomial.fit(heights, logs, 6)

    @staticmethod
    def level(z: float) -> float:
        return EARTH * z / (EARTH + z)

    def temperature(self, h: NDArray[np.float64] | float) -> NDArray[np.float64]:
        z = np.asarray(h) + self.zone
        return np.asarray(288.15 - 0.0065 * EARTH * z / (EARTH + z) + self.offset)

    def _falls(self, h: float, p: State) -> list[float]:
        gravity = G0 * (EARTH / (EARTH + self.zone + h)) ** 2
        return [-p[0] * gravity / (GAS * float(self.temperature(h)))]

    def density(self, h: float) -> float:
        return float(np.exp(self._curve(h)))


class Fall:
    """A load under way: state is height, ground distance, air-relative speeds along and down, path through the air."""

    def __init__(
        self, air: Air, mass: float, load_area: float, height: float, indicated: float, winds: list[tuple[float, float]]
    ) -> None:
        self.air, self.mass, self.load_area, self.height = air, mass, load_area, height
        self.wind_heights, self.wind_speeds = zip(*winds, strict=True)
        speed = indicated * sqrt(1.225 / air.density(height))
        self.aircraft = speed + self.wind(height)
        self.time, self.state = 0.0, np.array([height, 0.0, speed, 0.0, 0.0])
        self.open = 0.0
        self.force = 0.0

    def wind(self, h: float) -> float:
        return float(np.interp(h, self.wind_heights, self.wind_speeds))

    def shear(self, h: float) -> float:
        layers = zip(self.wind_heights, self.wind_heights[1:], self.wind_speeds, self.wind_speeds[1:], strict=False)
        slopes = ((v1 - v0) / (h1 - h0) for h0, h1, v0, v1 in layers if h0 <= h < h1)
        return next(slopes, 0.0)

    @property
    def speed(self) -> float:
        return hypot(float(self.state[2]), float(self.state[3]))

    def fly(self, area: Area, until: Event, factor: float = 1.0, step: float = 0.05) -> None:
        """On to an event; keeps the largest canopy force, the one of a filling times its coefficient."""

        def moves(t: float, y: State) -> list[float]:
            h, _, u, w, _ = y
            v = hypot(u, w)
            k = self.air.density(h) * (area(t, y) + self.load_area) / (2 * self.mass)
            return [-w, u + self.wind(h), -k * v * u + w * self.shear(h), G0 - k * v * w, v]

        until.terminal = True  # type: ignore[attr-defined]
        solved = solve_ivp(
            moves, (self.time, self.time + 400), self.state, events=[until], rtol=1e-9, atol=1e-9, method="DOP853",
            max_step=step,
        )  # fmt: skip
        for t, y in zip(solved.t, solved.y.T, strict=True):
            pull = 0.5 * self.air.density(y[0]) * (y[2] ** 2 + y[3] ** 2) * area(t, y)
            self.force = max(self.force, factor * pull)
        self.time, self.state = solved.t[-1], solved.y[:, -1]

    def hang(self, until: Event, step: float = 0.05) -> None:
        steady = self.open
        self.fly(lambda t, y: steady, until, step=step)

    def stretch_line(self, length: float) -> None:
        """On to the moment when load and aircraft are so far apart."""
        self.hang(lambda t, y: hypot(self.aircraft * t - y[1], self.height - y[0]) - length)

    def fill(self, area: float, distance: float, exponent: float, factor: float, rule: str) -> None:
        began, path, start, before = self.time, self.state[4], self.speed, self.open

        def share(t: float, y: State) -> float:
            return float((t - began) * start / distance if rule == "time" else (y[4] - path) / distance)

        def grows(t: float, y: State) -> float:
            return float(before + (area - before) * min(1.0, max(0.0, share(t, y))) ** exponent)

        self.fly(grows, lambda t, y: share(t, y) - 1, factor, step=0.01)
        self.open = area

    def slow_down(self) -> None:
        """On to 1.05 of the steady rate, if it is not that slow already."""

        def over(t: float, y: State) -> float:
            steady = sqrt(2 * self.mass * G0 / (self.air.density(y[0]) * (self.open + self.load_area)))
            return hypot(y[2], y[3]) - 1.05 * steady

        if over(self.time, self.state) > 0:
            self.hang(over)

    def land(self) -> None:
        self.hang(lambda t, y: float(y[0]), step=0.5)


def circle(diameter: float) -> float:
    return pi * diameter**2 / 4


class Flown:
    """The numbers of one rig under one filling rule."""

    def __init__(self, fall: Fall, angle: float, full: float) -> None:
        fall.slow_down()
        self.angle, self.full, self.loss = angle, full, fall.height - fall.state[0]
        fall.land()
        self.load_factor = fall.force / (fall.mass * G0)
        self.time, self.distance = fall.time, fall.state[1]


def grain(rule: str) -> tuple[Flown, float, float]:
    air = Air(820 * FT, 14, 1018, None, 400)
    winds = [(0.0, -7 * KT), (1100 * FT, -15 * KT)]
    fall = Fall(air, 1996 * LB, 1.05 * 48 * IN * 67 * IN, 1100 * FT, 130 * KT, winds)
    fall.stretch_line(15 * FT + 51 * FT + 5 * FT)
    _, _, u, w, _ = fall.state
    equivalent = fall.speed * sqrt(air.density(fall.state[0]) / 1.225)
    leaving = hypot(u + fall.wind(fall.state[0]) - fall.aircraft, w)
    angle = float(np.arctan2(w, u))
    fall.fill(0.75 * circle(64 * FT), 8 * 64 * FT, 2, 1.7, rule)
    return Flown(fall, angle, fall.time), equivalent, leaving


def truck(rule: str) -> Flown:
    air = Air(1640 * FT, 18, 1012, 10, 500)
    winds = [(0.0, -8 * KT), (1500 * FT, -20 * KT)]
    fall = Fall(air, (12_260 - 58) * LB, 80 * FT**2, 1500 * FT, 140 * KT, winds)
    whole = 3 * 0.95 * 0.80 * circle(100 * FT)
    fall.hang(lambda t, y: t - 2.4)
    angle = float(np.arctan2(fall.state[3], fall.state[2]))
    fall.fill(0.05 * whole, 17 * 100 * FT * sqrt(0.05), 1, 1.0, rule)
    fall.hang(lambda t, y: t - 2.4 - 4)
    fall.fill(whole, 4.5 * 100 * FT * sqrt(0.95), 0.5, 1.4, rule)
    return Flown(fall, angle, fall.time)


class TestGrainContainer:
    NAME = "02-grain-container"

    def test_opening_and_landing(self) -> None:
        (timed, equivalent, leaving), (spaced, _, _) = grain("time"), grain("distance")
        close(value(self.NAME, "opening.speed"), equivalent)
        # The larger force is that of the time rule, the larger loss that of the distance rule.
        assert timed.load_factor > spaced.load_factor
        assert spaced.loss > timed.loss
        close(value(self.NAME, "opening.load_factor"), timed.load_factor)
        swing = 0.6 * (51 + 5) * FT * cos(spaced.angle)
        close(value(self.NAME, "height.opening_loss"), spaced.loss + swing, rel=1e-4)
        close(value(self.NAME, "height.reserve"), 1100 * FT - spaced.loss - swing, rel=1e-4)
        close(value(self.NAME, "descent.time"), spaced.time)
        close(value(self.NAME, "descent.drift"), spaced.distance, rel=1e-4)
        # Snatch: the load's speed against the aircraft, on 64 lines of 550 lbf that stretch 30 % in 51 ft.
        canopy, load = 122 * LB, (1996 - 122) * LB
        spring = 64 * 550 * LBF / (0.30 * 51 * FT)
        snatch = leaving * sqrt(spring * canopy * load / (canopy + load))
        close(value(self.NAME, "opening.snatch"), 64 * 550 * LBF / snatch)


class TestTruck:
    NAME = "06-reefed-truck"

    def test_opening_and_landing(self) -> None:
        timed, spaced = truck("time"), truck("distance")
        close(value(self.NAME, "opening.load_factor"), max(timed.load_factor, spaced.load_factor))
        assert spaced.loss > timed.loss
        swing = 0.6 * (95 + 40) * FT * cos(spaced.angle)
        close(value(self.NAME, "height.opening_loss"), spaced.loss + swing, rel=1e-4)
        close(value(self.NAME, "device.ground release.early"), 27 / spaced.full)
        close(value(self.NAME, "device.ground release.late"), spaced.time / 27)
        close(value(self.NAME, "descent.drift"), spaced.distance, rel=1e-4)


class TestHighBox:
    NAME = "07-high-box"

    def test_drogue_then_main_by_a_set_height(self) -> None:
        air = Air(1150, 22, 1014, 8, 3100)
        winds = [(0.0, -3.0), (1000.0, -7.0), (3000.0, -12.0)]
        fall = Fall(air, 838, 1.05 * 1.2 * 1.525, 3000, 120 * KT, winds)
        fall.stretch_line(6 + 3.6 + 4)
        fall.fill(0.52 * circle(3.2), 14 * 3.2, 1, 1.05, "distance")
        # A pressure device is right in standard air; in warm air it opens higher, as the mean temperatures are.
        layer = air.temperature(np.linspace(0, 600, 1001))
        opens = 600 * np.mean(layer) / np.mean(layer - air.offset)
        fall.hang(lambda t, y: float(y[0] - opens), step=0.5)
        began = fall.time
        fall.hang(lambda t, y: t - began - 1.4)
        equivalent = fall.speed * sqrt(air.density(fall.state[0]) / 1.225)
        close(value(self.NAME, "opening.speed"), equivalent)
        fall.open = 0.0  # the drogue draws the main out and goes with the bag
        fall.fill(0.75 * circle(19.5), 8 * 19.5, 2, 1.7, "distance")
        found = Flown(fall, 0.0, fall.time)
        close(value(self.NAME, "descent.time"), found.time)
        close(value(self.NAME, "descent.drift"), found.distance, rel=2e-4)
        assert value(self.NAME, "height.opening_loss") == pytest.approx(found.loss, abs=0.5)  # less the swing
