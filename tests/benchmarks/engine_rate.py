"""Trajectories per second on one core, against a loop over a general integrator in the same run.

python -m tests.benchmarks.engine_rate [cases]
"""

from __future__ import annotations

import os

os.environ.setdefault("OPENBLAS_NUM_THREADS", "1")

import sys
import time
from collections.abc import Callable
from typing import Any

import numpy as np
from scipy.integrate import solve_ivp

from model.physics.flight import Drop, FillingRule, history, solve
from tests.model.physics.flight.cases import RIGS, cloud
from tests.model.physics.flight.reference import isa, pick

RULES: tuple[FillingRule, ...] = ("time", "distance")


def seconds(work: Callable[[], Any], repeats: int) -> float:
    """Least processor time of some repeats; other programs on the machine do not count."""
    work()
    best = float("inf")
    for _ in range(repeats):
        start = time.process_time()
        work()
        best = min(best, time.process_time() - start)
    return best


def general(drop: Drop) -> float:
    """One trajectory under the time rule by solve_ivp (RK45, rtol 1e-6) in phases; the largest force of 201 points."""
    row, y, t, force, area = drop.rows[0], np.array([0.0, drop.release_height, drop.airspeed, 0.0]), 0.0, 0.0, 0.0

    def leg(until: float, grow: Callable[[float], float]) -> Any:
        def right(t: float, y: Any) -> list[float]:
            v = np.hypot(y[2], y[3])
            k = isa(y[1]) * (grow(t) + drop.load_drag_area) / (2 * drop.mass)
            return [y[2], -y[3], -k * v * y[2], drop.gravity - k * v * y[3]]

        def ground(t: float, y: Any) -> float:
            return float(y[1])

        ground.terminal = True      # type: ignore[attr-defined]
        return solve_ivp(right, (t, until), y, rtol=1e-6, atol=1e-8, events=ground, dense_output=True)

    s = leg(float(row.line_stretch), lambda t: 0.0)         # type: ignore[arg-type]
    t, y = s.t[-1], s.y[:, -1]
    stretch = t
    for stage, filling in enumerate(row.fillings):
        if stage:
            s = leg(stretch + float(filling.cutter), lambda t, a=area: a)       # type: ignore[misc]
            t, y = s.t[-1], s.y[:, -1]
        full = filling.fill_distance / np.hypot(y[2], y[3])

        def grow(now: float, a: float = area, f: Any = filling, t0: float = t, full: float = full) -> float:
            return float(a + (f.area - a) * (max(now - t0, 0.0) / full) ** f.exponent)

        s = leg(t + full, grow)
        for now in np.linspace(s.t[0], s.t[-1], 201):
            _, z, u, w = s.sol(now)
            force = max(force, 0.5 * isa(z) * (u * u + w * w) * grow(now))
        t, y, area = s.t[-1], s.y[:, -1], filling.area
    leg(t + 5000, lambda t: area)
    return force


def main() -> None:
    """Print the table."""
    cases = int(sys.argv[1]) if len(sys.argv) > 1 else 100_000
    print(f"processor time of one core; batch of {cases:,} within 5 % of the rig")
    heads = ("rig", "rule", "one flight", "history", "batch", "batch/s", "loop/s", "ratio")
    print(" ".join(f"{head:>{width}}" for head, width in zip(heads, (4, 9, 11, 9, 9, 9, 7, 7), strict=True)))
    for number in (1, 2, 3, 6):
        drop = cloud(RIGS[number], cases, 1)
        some = [pick(drop, i) for i in range(20)]
        loop = len(some) / seconds(lambda some=some: [general(one) for one in some], 1)     # type: ignore[misc]
        for rule in RULES:
            single = seconds(lambda n=number, r=rule: solve(RIGS[n], r), 30)                # type: ignore[misc]
            curve = seconds(lambda n=number, r=rule: history(RIGS[n], r), 10)               # type: ignore[misc]
            whole = seconds(lambda d=drop, r=rule: solve(d, r), 2)                          # type: ignore[misc]
            rate = cases / whole
            print(f"{number:>4} {rule:>9} {single * 1e3:>8.2f} ms {curve * 1e3:>6.2f} ms {whole:>7.2f} s {rate:>9,.0f} "
                  f"{loop:>7.0f} {rate / loop:>7,.0f}", flush=True)


if __name__ == "__main__":
    main()
