"""Leg geometry line by line, and the apex found from measured lengths."""

from math import degrees, pi, radians

import numpy as np
import pytest
from hypothesis import assume, given, settings
from hypothesis import strategies as st

from model.physics import sling

QUICK = settings(deadline=None, max_examples=50)

CORNERS = np.array([[1.1, 0.5, 0.7], [1.1, -0.5, 0.7], [-1.1, 0.5, 0.7], [-1.1, -0.5, 0.7]])
coordinate = st.floats(-3.0, 3.0)


def lengths_to(apex: np.ndarray, points: np.ndarray) -> np.ndarray:
    return np.linalg.norm(apex - points, axis=1)


@pytest.mark.parametrize("count", [3, 4])
def test_apex_is_found_from_exact_lengths(count: int) -> None:
    apex = np.array([0.2, -0.1, 3.4])
    found = sling.apex_from_lengths(CORNERS[:count], lengths_to(apex, CORNERS[:count]))
    np.testing.assert_allclose(found.point, apex, atol=1e-10)
    assert found.worst < 1e-12


@QUICK
@given(
    st.lists(st.tuples(coordinate, coordinate, st.floats(0.0, 1.5)), min_size=3, max_size=8),
    st.tuples(coordinate, coordinate, st.floats(2.0, 9.0)),
)
def test_apex_above_any_spread_of_attachments_is_found_again(points: list[tuple[float, ...]], top: tuple) -> None:
    attachments, apex = np.array(points), np.array(top)
    spread = np.linalg.svd(attachments - attachments.mean(axis=0), compute_uv=False)
    assume(spread[1] > 0.3)
    found = sling.apex_from_lengths(attachments, lengths_to(apex, attachments))
    assert found.worst < 1e-9
    assert found.point[2] >= apex[2] - 1e-4  # the other of two mirrored points may lie above the attachments too
    if np.ptp(attachments[:, 2]) == 0.0:
        np.testing.assert_allclose(found.point, apex, atol=1e-5)


def test_upper_of_the_two_mirrored_points_is_taken() -> None:
    found = sling.apex_from_lengths(CORNERS[:3], [3.0, 3.0, 3.0])
    assert found.point[2] > CORNERS[0, 2]


def test_upper_point_is_taken_although_the_lower_one_fits_better() -> None:
    points = CORNERS + np.array([[0, 0, 0.02], [0, 0, -0.02], [0, 0, 0.0], [0, 0, 0.0]])
    below = np.array([0.0, 0.0, -2.5])
    found = sling.apex_from_lengths(points, lengths_to(below, points))
    assert found.point[2] > 3.0
    assert 0.0 < found.worst < 0.02


def test_turned_and_shifted_load_has_its_apex_turned_and_shifted() -> None:
    lengths = [3.0, 3.02, 2.9, 2.91]
    angle = 0.7
    turn = np.array([[np.cos(angle), -np.sin(angle), 0.0], [np.sin(angle), np.cos(angle), 0.0], [0.0, 0.0, 1.0]])
    shift = np.array([40.0, -7.0, 2.0])
    plain = sling.apex_from_lengths(CORNERS, lengths)
    moved = sling.apex_from_lengths(CORNERS @ turn.T + shift, lengths)
    np.testing.assert_allclose(moved.point, turn @ plain.point + shift, atol=1e-8)
    np.testing.assert_allclose(moved.misfits, plain.misfits, atol=1e-8)


def test_misfit_says_which_leg_and_by_how_much() -> None:
    apex = np.array([0.0, 0.0, 3.5])
    lengths = lengths_to(apex, CORNERS)
    lengths[1] *= 1.08
    found = sling.apex_from_lengths(CORNERS, lengths)
    # Four corners share the gap in turn: + - - + on the legs of a rectangle.
    assert found.worst == pytest.approx(0.02, rel=0.1)
    assert found.worst > sling.MISFIT_ALLOWED
    assert found.misfits[1] < 0.0


def test_least_squares_fit_cannot_be_bettered_nearby() -> None:
    measured = np.array([3.0, 3.05, 2.9, 2.97])
    best = sling.apex_from_lengths(CORNERS, measured).point
    cost = ((lengths_to(best, CORNERS) - measured) ** 2).sum()
    for step in 1e-4 * np.vstack([np.eye(3), -np.eye(3)]):
        assert ((lengths_to(best + step, CORNERS) - measured) ** 2).sum() > cost


def test_three_lengths_too_short_to_meet_misfit() -> None:
    found = sling.apex_from_lengths(CORNERS[:3], [0.6, 0.6, 0.6])
    assert found.worst > sling.MISFIT_ALLOWED


@pytest.mark.parametrize(
    ("points", "lengths", "words"),
    [
        (CORNERS[:2], [3.0, 3.0], "three legs"),
        (CORNERS[:3], [3.0, 0.0, 3.0], "over 0"),
        (CORNERS[:3], [3.0, float("nan"), 3.0], "over 0"),
        (np.array([[0.0, 0, 0], [1, 0, 0], [2, 0, 0]]), [3.0, 3.0, 3.0], "one line"),
        (np.zeros((3, 3)), [3.0, 3.0, 3.0], "one line"),
    ],
)
def test_legs_that_fix_no_apex_are_refused(points: np.ndarray, lengths: list[float], words: str) -> None:
    with pytest.raises(ValueError, match=words):
        sling.apex_from_lengths(points, lengths)


def test_angle_length_and_tilt_agree() -> None:
    length = sling.leg_length(3.0, 4.0, 12.0)
    assert length == 13.0
    assert sling.leg_angle(12.0, length) == pytest.approx(np.arctan2(12.0, 5.0))
    assert sling.axis_tilt(3.0, 4.0, 12.0) == pytest.approx(pi / 2 - np.arctan2(12.0, 5.0))
    assert sling.axis_tilt(0.0, 0.0, 2.0) == 0.0


@QUICK
@given(st.floats(1e3, 1e6), st.integers(2, 8), st.floats(5.0, 90.0))
def test_equal_legs_by_angle_and_by_length_agree(load: float, legs: int, angle: float) -> None:
    b = radians(angle)
    by_angle = sling.equal_leg_tension(load, legs, b)
    assert by_angle == pytest.approx(load / legs * sling.angle_factor(b))
    assert by_angle == pytest.approx(sling.equal_leg_tension_by_length(load, legs, 1.0, np.sin(b)))
    assert by_angle * legs * np.sin(b) == pytest.approx(load)


@QUICK
@given(st.tuples(*[st.floats(0.01, 50.0)] * 4))
def test_shares_of_all_corners_make_up_the_load(distances: tuple[float, float, float, float]) -> None:
    a, b, c, d = distances
    corners = [sling.corner_share(*ends, *sides) for ends in ((a, b), (b, a)) for sides in ((c, d), (d, c))]
    assert sum(corners) == pytest.approx(1.0)
    assert corners[0] + corners[1] == pytest.approx(sling.lever_share(a, b))


def test_few_legs_carrying_take_more() -> None:
    assert sling.carrying_load(1000.0, 4, 2) == 2000.0
    assert sling.carrying_load(1000.0, 4, 4) == 1000.0


def test_stiffness_follows_web_and_length() -> None:
    assert sling.leg_stiffness(2e4, 4, 2.0) == 2.0 * sling.leg_stiffness(2e4, 2, 2.0)
    assert sling.leg_stiffness(2e4, 2, 4.0) == 0.5 * sling.leg_stiffness(2e4, 2, 2.0)


def test_free_tilt_is_small_for_small_offsets() -> None:
    assert degrees(sling.free_tilt(0.01, 3.0)) == pytest.approx(degrees(0.01 / 3.0), rel=1e-4)
