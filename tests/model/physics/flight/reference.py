"""A plain integration of one case, to hold the batch engine against. It shares nothing with the engine but the inputs.

The equations of motion as they stand, x, z, u, w and the way through the air, by an explicit Runge-Kutta method of
order 8 at rtol 1e-12; every corner (cutter, trigger, line stretch, kink of the wind) ends a run.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass, field
from typing import Any

import numpy as np
from scipy.integrate import solve_ivp
from scipy.optimize import brentq, minimize_scalar

from model.physics.flight import Drop, Filling, Row
from model.physics.flight.inputs import change_values

G_SLOW = 1.05


def pick(drop: Drop, i: int) -> Drop:
    """Case i of a drop, as floats."""
    return change_values(drop, lambda v: float(v if np.ndim(v) == 0 else v[i]))


def isa(z: Any, offset: float = 0.0, pressure: float = 101325.0) -> Any:
    """Closed form of the U.S. Standard Atmosphere 1976 to 20 km, geometric altitude; a constant temperature offset."""
    warm, lapse, gas = 288.15, 0.0065, 8314.32 / 28.9644
    h = 6356766.0 * z / (6356766.0 + z)
    cold = warm - lapse * 11000.0
    t = np.maximum(warm - lapse * h, cold)
    p = pressure * (t / warm) ** (9.80665 / (gas * lapse))
    p = p * np.exp(np.minimum(11000.0 - h, 0.0) * 9.80665 / (gas * cold))
    return p / (gas * (t + offset))


@dataclass
class Run:
    """One stretch without a corner."""

    area: Callable[[float, Any], float]
    solution: Any
    t0: float
    t1: float


@dataclass
class Reference:
    """One flight; results by the names of `Motion`, lists over rows and fillings."""

    drop: Drop
    rule: str
    t: float = 0.0
    y: Any = None
    landed: bool = False
    open: list[float] = field(default_factory=list)
    out: dict[str, Any] = field(default_factory=dict)

    def wind_law(self, z: float) -> tuple[Callable[[float], float], float, float]:
        """Wind, its slope, and the lower end of the layer just below z."""
        ground = float(self.drop.ground_altitude)
        winds = [(float(h) + ground, float(w)) for h, w in self.drop.winds] or [(ground, 0.0)]
        below = [(h, w) for h, w in winds if h < z - 1e-7]
        above = [(h, w) for h, w in winds if h >= z - 1e-7]
        if not below:
            return (lambda _: above[0][1]), 0.0, -np.inf
        if not above:
            return (lambda _: below[-1][1]), 0.0, below[-1][0]
        (h0, w0), (h1, w1) = below[-1], above[0]
        slope = (w1 - w0) / (h1 - h0)
        return (lambda z: w0 + slope * (z - h0)), slope, h0

    def go(
        self, area: Callable[[float, Any], float], until: float, floor: float, stop: Any = None
    ) -> tuple[list[Run], str]:
        """Fly to a time, down to an altitude, or to where ``stop(t, y)`` falls through zero."""
        d, runs = self.drop, []
        for _ in range(100):
            if self.landed or until <= self.t + 1e-12:
                return runs, "time"
            if self.y[1] <= floor + 1e-9:
                return runs, "floor"
            wind, slope, bottom = self.wind_law(self.y[1])

            def right(t: float, y: Any, wind: Any = wind, slope: float = slope) -> Any:
                _, z, u, w, _ = y
                v = np.hypot(u, w)
                density = float(d.density(np.array(z))) * float(d.density_factor)
                k = density * (area(t, y) + d.load_drag_area) / (2 * d.mass)
                return [u + wind(z), -w, -k * v * u + w * slope, d.gravity - k * v * w, v]

            low = max(floor, bottom)
            events = [lambda t, y, low=low: y[1] - low]
            if stop is not None:
                events.append(stop)
            for event in events:
                event.terminal, event.direction = True, -1
            s = solve_ivp(
                right, (self.t, min(until, self.t + 5000)), self.y, "DOP853", rtol=1e-12, atol=1e-11, events=events,
                dense_output=True,
            )
            runs.append(Run(area, s.sol, self.t, s.t[-1]))
            self.t, self.y = s.t[-1], s.y[:, -1]
            if stop is not None and len(s.t_events[1]):
                return runs, "stop"
            if len(s.t_events[0]):
                self.y[1] = low
                if low == floor:
                    self.landed = floor <= float(d.ground_altitude) + 1e-9
                    return runs, "floor"
        return runs, "time"

    def largest(self, runs: list[Run], value: Callable[[Run, float], float]) -> tuple[float, float]:
        """Largest value over some runs, and its time."""
        best, when = 0.0, np.nan
        for run in runs:
            if run.t1 <= run.t0:
                continue
            even = np.linspace(0, 1, 201)
            grid = np.unique(run.t0 + (run.t1 - run.t0) * np.concatenate((even, even**3)))
            if run.t1 - run.t0 > 20:
                grid = np.unique(np.concatenate((grid, np.linspace(run.t0, run.t0 + 20, 301))))
            values = np.array([value(run, t) for t in grid])
            i = int(values.argmax())
            if values[i] > best:
                best, when = values[i], grid[i]
            around = grid[max(i - 1, 0)], grid[min(i + 1, len(grid) - 1)]
            found = minimize_scalar(
                lambda t, run=run: -value(run, t), bounds=around, method="bounded", options={"xatol": 1e-10}
            )
            if -found.fun > best:
                best, when = -found.fun, found.x
        return best, when

    def pressure(self, run: Run, t: float) -> float:
        """Dynamic pressure, Pa."""
        _, z, u, w, _ = run.solution(t)
        return 0.5 * float(self.drop.density(np.array(z))) * float(self.drop.density_factor) * (u * u + w * w)

    def fly(self) -> dict[str, Any]:
        """The whole flight."""
        d = self.drop
        ground = float(d.ground_altitude)
        self.y = np.array([0.0, ground + d.release_height, d.airspeed, 0.0, 0.0])
        self.open = [0.0] * len(d.rows)
        self.out = {"row_force": [0.0] * len(d.rows), "hold_force": [], "fill_force": [], "fill_force_plain": []}
        first = d.rows[0]
        if first.line_stretch is not None:
            self.go(lambda t, y: 0.0, float(first.line_stretch), ground)
        else:
            wind, _, _ = self.wind_law(self.y[1])
            v, top, line = d.airspeed + wind(self.y[1]), self.y[1], float(first.static_line)
            self.go(lambda t, y: 0.0, 1000.0, ground, lambda t, y: line - np.hypot(v * t - y[0], top - y[1]))
        for number, row in enumerate(d.rows):
            if self.landed:
                break
            self.note("line_stretch_time", self.t)
            self.note("line_stretch_speed", np.hypot(self.y[2], self.y[3]))
            self.fly_row(number, row)
        self.out.update(touchdown_time=self.t, touchdown_distance=self.y[0], touchdown_speed=np.hypot(*self.y[2:4]),
                        touchdown_descent=self.y[3])
        return self.out

    def note(self, name: str, value: float) -> None:
        """Append a value."""
        self.out.setdefault(name, []).append(value)

    def fly_row(self, number: int, row: Row) -> None:
        """All fillings of a row, up to line stretch of the next."""
        d, ground, start = self.drop, float(self.drop.ground_altitude), self.t
        following = d.rows[number + 1] if number + 1 < len(d.rows) else None
        at_start = row.when_next_opens == "goes at start"
        opens, trigger = np.inf, ground
        if following is not None and following.opens_after is not None:
            opens = max(float(following.opens_after), self.t)
        elif following is not None:
            trigger = ground + float(following.opens_at_height)
            opens = self.t if self.y[1] <= trigger else np.inf
        delay = float(following.deployment_time) if following is not None else 0.0

        def advance(area: Any, until: float, stop: Any = None) -> tuple[list[Run], str]:
            nonlocal opens
            leave = opens if at_start else opens + delay
            runs, why = self.go(area, min(until, leave), trigger if np.isinf(opens) else ground, stop)
            if why == "floor" and not self.landed and np.isinf(opens):
                opens = self.t
                if not at_start:
                    more, why = self.go(area, min(until, opens + delay), ground, stop)
                    runs += more
            return runs, why

        for i, filling in enumerate(row.fillings):
            leave = opens if at_start else opens + delay
            if self.landed or (i and start + float(filling.cutter) >= leave):
                break
            last = following is None and i + 1 == len(row.fillings)
            until = start + float(row.fillings[i + 1].cutter) if i + 1 < len(row.fillings) else np.inf
            self.fill(number, filling, until, advance)
            self.hold(until, advance, last)
        if following is not None and not self.landed:
            if row.when_next_opens != "stays":
                self.open[number] = 0.0
            if at_start:
                total = sum(self.open)
                runs, _ = self.go(lambda t, y: total, opens + delay, ground)
                self.note_hold(runs)

    def fill(self, number: int, filling: Filling, until: float, advance: Any) -> None:
        """One filling."""
        own, total = self.open[number], sum(self.open)
        others, t0, path0 = total - own, self.t, self.y[4]
        speed = np.hypot(self.y[2], self.y[3])
        added, j, cx = filling.area - own, filling.exponent, filling.opening_coefficient
        by_time = self.rule == "time" or filling.filling_time is not None
        full = filling.filling_time if filling.filling_time is not None else filling.fill_distance / speed

        def progress(t: float, y: Any) -> float:
            part = (t - t0) / full if by_time else (y[4] - path0) / filling.fill_distance
            return float(min(max(part, 0.0), 1.0))

        def area(t: float, y: Any) -> float:
            return float(total + added * progress(t, y) ** j)

        stop = None if by_time else lambda t, y: filling.fill_distance - (y[4] - path0)
        runs, _ = advance(area, min(until, t0 + full) if by_time else until, stop)
        self.open[number] = own + added * progress(self.t, self.y) ** j
        for name, weight in (("fill_force", cx), ("fill_force_plain", 1.0)):
            force, _ = self.largest(
                runs, lambda r, t, c=weight: self.pressure(r, t) * (c * (r.area(t, r.solution(t)) - others) + others)
            )
            self.out[name].append(force)
        for other in range(len(self.open)):
            force, _ = self.largest(runs, lambda r, t, o=other: self.pressure(r, t) * (
                cx * (r.area(t, r.solution(t)) - others) if o == number else self.open[o]))
            self.out["row_force"][other] = max(self.out["row_force"][other], force)
        top, _ = self.largest(runs, lambda r, t: float(np.hypot(*r.solution(t)[2:4])))
        self.note("speed_ratio", max(top, speed) / speed)
        self.note("fill_path", self.y[4] - path0)
        self.note("fill_time", self.t - t0)
        self.note("start_time", t0)
        density = float(self.drop.density(np.array(self.y[1]))) * self.drop.density_factor
        self.out["hold_force"].append(0.5 * density * (self.y[2] ** 2 + self.y[3] ** 2) * sum(self.open))

    def note_hold(self, runs: list[Run]) -> None:
        """Forces under constant areas."""
        pressure, _ = self.largest(runs, self.pressure)
        self.out["hold_force"][-1] = max(self.out["hold_force"][-1], pressure * sum(self.open))
        for i, area in enumerate(self.open):
            self.out["row_force"][i] = max(self.out["row_force"][i], pressure * area)

    def hold(self, until: float, advance: Any, last: bool) -> None:
        """Constant area; after the last filling also the moment of slow descent."""
        total = sum(self.open)
        runs, _ = advance(lambda t, y: total, until)
        self.note_hold(runs)
        if not last:
            return
        d, ground = self.drop, float(self.drop.ground_altitude)

        def excess(run: Run, t: float) -> float:
            steady = 2 * d.gravity * d.mass / (total + d.load_drag_area)
            return float(2 * self.pressure(run, t) - G_SLOW**2 * steady)
        self.out.update(slow_time=np.nan, slow_height=np.nan)
        for run in runs:
            grid = np.unique(np.concatenate((np.linspace(run.t0, min(run.t0 + 60, run.t1), 1001),
                                             np.linspace(run.t0, run.t1, 501))))
            slow = np.array([excess(run, t) for t in grid]) <= 0
            if slow.any():
                i = int(slow.argmax())
                when = grid[0] if i == 0 else brentq(lambda t, r=run: excess(r, t), grid[i - 1], grid[i], xtol=1e-13)
                self.out.update(slow_time=when, slow_height=run.solution(when)[1] - ground)
                return


def fly(drop: Drop, rule: str) -> dict[str, Any]:
    """Results of a single case, by the names of `Motion`."""
    return Reference(drop, rule).fly()
