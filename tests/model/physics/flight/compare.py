"""Differences between the engine and the plain integration."""

from __future__ import annotations

import numpy as np

from model.physics.flight import Drop, FillingRule, solve

from .reference import fly, pick

LIMITS = {
    "line_stretch_time": 1e-6, "line_stretch_speed": 1e-6, "start_time": 2e-6, "fill_time": 2e-6, "fill_path": 2e-6,
    "speed_ratio": 1e-6, "fill_force": 1e-6, "fill_force_plain": 1e-6, "hold_force": 1e-6, "row_force": 1e-6,
    "touchdown_time": 2e-6, "touchdown_distance": 1e-4, "touchdown_speed": 1e-5, "touchdown_descent": 1e-5,
    "slow_time": 1e-4, "loss": 1e-4,
}
"""Largest accepted relative differences."""


def differences(drop: Drop, rule: FillingRule, cases: list[int]) -> dict[str, float]:
    """Largest relative differences of some cases; the whole batch is flown at once. inf: nan, or not accurate."""
    motion = solve(drop, rule)
    worst = dict.fromkeys(LIMITS, 0.0)
    for case in cases:
        one = pick(drop, case)
        truth = fly(one, rule)
        height = float(one.release_height)
        for name in LIMITS:
            if name == "loss":
                ours, theirs = height - motion.slow_height[case], height - truth.get("slow_height", np.nan)
            else:
                ours, theirs = getattr(motion, name)[..., case], truth.get(name, np.nan)
            ours, theirs = np.atleast_1d(ours), np.atleast_1d(np.asarray(theirs, float))
            if name not in truth and name not in ("loss", "slow_time"):
                theirs = np.zeros(0)
            if ours.size > theirs.size:         # rows and fillings that the flight does not get to
                spare = ours[theirs.size:] if name.startswith("line") else ours[~motion.started[:, case]]
                ours = ours[:theirs.size] if name.startswith("line") else ours[motion.started[:, case]]
                assert not np.nan_to_num(spare).any(), (name, spare)
            if ours.size == 0:
                assert np.isnan(theirs).all()
                continue
            assert ours.size == theirs.size, (name, ours, theirs)
            same = np.isnan(ours) & np.isnan(theirs)
            gap = np.where(same, 0.0, np.abs(ours - theirs) / np.maximum(np.abs(theirs), 1e-6))
            worst[name] = max(worst[name], float(np.where(np.isnan(gap), np.inf, gap).max()))
        if not motion.accurate[case]:
            worst["touchdown_time"] = np.inf
    return worst


def missed(worst: dict[str, float]) -> dict[str, float]:
    """Those over their limits."""
    return {name: value for name, value in worst.items() if not value <= LIMITS[name]}
