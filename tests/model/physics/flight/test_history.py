"""Curves of a single flight."""

from __future__ import annotations

import numpy as np
import pytest

from model.physics.flight import FillingRule, history, solve

from .cases import RIGS, cloud, features

RULES: tuple[FillingRule, ...] = ("time", "distance")
FEATURES = dict(features())


@pytest.mark.parametrize("rule", RULES)
@pytest.mark.parametrize("name", FEATURES)
def test_a_history_tells_the_same_as_the_results(name: str, rule: FillingRule) -> None:
    drop = FEATURES[name]
    motion, curve = solve(drop, rule), history(drop, rule, 3000)
    assert (np.diff(curve.time) >= -1e-9).all()
    assert curve.time[0] == 0
    assert curve.time[-1] == pytest.approx(motion.touchdown_time[0], rel=1e-6)
    assert curve.distance[-1] == pytest.approx(motion.touchdown_distance[0], rel=1e-4)
    assert curve.height[0] == pytest.approx(drop.release_height)
    assert curve.height[-1] == pytest.approx(0, abs=1e-4)
    assert curve.speed == pytest.approx(np.hypot(curve.u, curve.w))
    for i in range(len(motion.started)):
        filling = curve.filling == i
        if motion.fill_time[i, 0] > 0.01:
            assert curve.canopy_force[filling].max() == pytest.approx(motion.fill_force[i, 0], rel=2e-4)
            assert curve.canopy_force_plain[filling].max() == pytest.approx(motion.fill_force_plain[i, 0], rel=2e-4)
            assert curve.time[filling][0] == pytest.approx(motion.start_time[i, 0])
            assert curve.time[filling][-1] == pytest.approx(motion.end_time[i, 0], rel=1e-6)
        else:
            assert not motion.started[i, 0] or motion.fill_time[i, 0] < 0.01


def test_heights_fall_and_areas_match() -> None:
    curve = history(RIGS[3], "time")
    assert (np.diff(curve.height) <= 1e-9).all()
    assert curve.canopy_area.max() == pytest.approx(1455.7)
    assert set(np.unique(curve.filling)) == {-1, 0, 1}
    assert curve.canopy_area[curve.time < 3.0].max() == 0
    held = (curve.filling == -1) & (curve.time > 3.7) & (curve.time < 5.4)
    assert curve.canopy_area[held] == pytest.approx(72.8)


@pytest.mark.parametrize("count", [1, 50, 400, 5000])
def test_about_as_many_points_as_asked(count: int) -> None:
    assert len(history(RIGS[2], "time", count).time) < 1.2 * count + 40


def test_a_history_is_that_of_one_case() -> None:
    with pytest.raises(ValueError, match="one case"):
        history(cloud(RIGS[2], 2, 1), "time")


def test_released_on_the_ground() -> None:
    from dataclasses import replace
    curve = history(replace(RIGS[2], release_height=0.0), "time")
    assert len(curve.time) == 1
    assert curve.canopy_force[0] == 0
