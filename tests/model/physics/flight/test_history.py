"""Curves of a single flight."""

from __future__ import annotations

from dataclasses import fields, replace

import numpy as np
import pytest

from model.physics.flight import FillingRule, history, solve
from model.physics.flight.inputs import with_arrays
from model.physics.flight.phases import TOLERANCE
from model.physics.flight.pieces import Workshop
from model.physics.flight.solver import _fly
from model.physics.flight.track import Track

from .cases import RIGS, cloud, features, torture
from .reference import pick

RULES: tuple[FillingRule, ...] = ("time", "distance")
FEATURES = dict(features())


@pytest.mark.parametrize("rule", RULES)
@pytest.mark.parametrize("name", FEATURES)
def test_a_history_tells_the_same_as_the_results(name: str, rule: FillingRule) -> None:
    drop = FEATURES[name]
    motion, curve = solve(drop, rule), history(drop, rule, 3000)
    assert (np.diff(curve.time) >= 0).all()
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


@pytest.mark.parametrize("rule", RULES)
@pytest.mark.parametrize("name", ["three stages", "static line, wind in layers", "drogue stays, main at a time"])
def test_the_curves_are_those_of_the_flight_flown_again(name: str, rule: FillingRule) -> None:
    drop = FEATURES[name]
    again = with_arrays(drop)
    track = Track(again)
    with np.errstate(all="ignore"):
        _fly(again, rule, 1, Workshop(), track)
    once, twice = solve(drop, rule).history(700), track.history(700)
    for field in fields(once):
        assert getattr(once, field.name) == pytest.approx(getattr(twice, field.name), rel=1e-9, abs=1e-9), field.name


def test_a_flight_solved_in_a_second_attempt_has_the_curves_of_that() -> None:
    drop = torture(0.75, 100, 7)
    refined = 0
    for case in range(100):
        one = pick(drop, case)
        motion = solve(one, "time")
        first = with_arrays(one)
        with np.errstate(all="ignore"):
            found = _fly(first, "time", 1, Workshop(), None)
        if found["error"][0] > TOLERANCE > motion.error[0]:
            refined += 1
            assert motion.history(300).time[-1] == pytest.approx(motion.touchdown_time[0], rel=1e-14)
            assert motion.history(300).time[-1] != pytest.approx(found["touchdown_time"][0], rel=1e-14)
    assert refined > 0


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


def test_a_flight_that_is_not_accurate_has_no_curves() -> None:
    with pytest.raises(ValueError, match="not accurate"):
        history(replace(RIGS[2], mass=float("nan")), "time")


def test_released_on_the_ground() -> None:
    curve = history(replace(RIGS[2], release_height=0.0), "time")
    assert len(curve.time) == 1
    assert curve.canopy_force[0] == 0
