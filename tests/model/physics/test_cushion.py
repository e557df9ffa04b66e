"""Crush of the cushion: energy, stroke, bottoming, and advice that leads to a stack that fits."""

from math import isclose

import numpy as np
import pytest
from hypothesis import assume, given, settings
from hypothesis import strategies as st

from model.physics import cushion
from model.physics.cushion import CushionFit

QUICK = settings(deadline=None, max_examples=50)

weights = st.floats(500.0, 2e5)
speeds = st.floats(1.0, 40.0)
strokes = st.floats(0.02, 1.0)
nets = st.floats(0.5, 200.0)


@QUICK
@given(weights, speeds, nets)
def test_work_of_the_crush_is_the_energy_of_the_landing(weight: float, speed: float, net: float) -> None:
    force = cushion.crush_force_at(weight, net)
    stroke = cushion.needed_stroke(speed, net)
    assert cushion.crush_work(force, stroke) == pytest.approx(cushion.landing_energy(weight, speed, stroke))
    assert cushion.net_deceleration(force, weight) == pytest.approx(net)
    assert cushion.net_by_stroke(speed, stroke) == pytest.approx(net)
    assert cushion.felt_deceleration(net) == pytest.approx(force / weight)


@QUICK
@given(weights, speeds, strokes)
def test_least_force_uses_the_stroke_up(weight: float, speed: float, usable: float) -> None:
    force = cushion.least_crush_force(weight, speed, usable)
    net = cushion.net_deceleration(force, weight)
    assert cushion.crush_reserve(usable, cushion.needed_stroke(speed, net)) == pytest.approx(1.0, rel=1e-6)
    assert cushion.bottoming_speed(speed, net, usable) == pytest.approx(0.0, abs=1e-5 * speed)


@QUICK
@given(speeds, nets, strokes)
def test_speed_is_left_just_when_the_stack_bottoms(speed: float, net: float, usable: float) -> None:
    reserve = cushion.crush_reserve(usable, cushion.needed_stroke(speed, net))
    assume(not isclose(reserve, 1.0, rel_tol=1e-9))
    left = cushion.bottoming_speed(speed, net, usable)
    assert (left > 0.0) == (reserve < 1.0)
    assert left < speed
    if reserve < 1.0:  # energy: what the stroke took, and what is left
        assert left**2 == pytest.approx(speed**2 * (1.0 - reserve), rel=1e-6, abs=1e-9)


def test_stack_that_pushes_less_than_the_weight_never_stops_it() -> None:
    net = cushion.net_deceleration(4000.0, 5000.0)
    assert net < 0.0
    assert cushion.bottoming_speed(8.0, net, 0.3) > 8.0
    assert cushion.advise(4000.0, 5000.0, 8.0, 0.3).fit is CushionFit.CANNOT_STOP
    assert cushion.advise(5000.0, 5000.0, 8.0, 0.3).fit is CushionFit.CANNOT_STOP


@QUICK
@given(weights, nets, st.floats(1e5, 1e6))
def test_area_gives_the_wanted_deceleration(weight: float, net: float, stress: float) -> None:
    force = cushion.stack_force(stress, cushion.area_for(weight, net, stress))
    assert cushion.net_deceleration(force, weight) == pytest.approx(net, rel=1e-9)


@QUICK
@given(st.floats(100.0, 1e7), weights, speeds, strokes, st.none() | nets)
def test_advice_agrees_with_the_numbers(
    force: float, weight: float, speed: float, usable: float, limit: float | None
) -> None:
    advice = cushion.advise(force, weight, speed, usable, limit)
    net = cushion.net_deceleration(force, weight)
    hard = limit is not None and net > limit
    soft = net <= 0.0 or cushion.needed_stroke(speed, net) > usable
    edges = [advice.least_force, weight, *([] if advice.most_force is None else [advice.most_force])]
    assume(not any(isclose(force, edge, rel_tol=1e-9) for edge in edges))
    assert (advice.fit is CushionFit.FITS) == (not hard and not soft)
    assert (advice.fit in {CushionFit.TOO_HARD, CushionFit.TOO_HARD_AND_THIN}) == hard


@QUICK
@given(weights, speeds, strokes, nets, st.floats(0.01, 0.99))
def test_every_force_between_the_two_fits_and_no_force_where_they_cross(
    weight: float, speed: float, usable: float, limit: float, share: float
) -> None:
    window = cushion.advise(1.0, weight, speed, usable, limit)
    assert window.most_force is not None
    assume(not isclose(window.least_force, window.most_force, rel_tol=1e-6))
    between = window.least_force + share * (window.most_force - window.least_force)
    fit = cushion.advise(between, weight, speed, usable, limit).fit
    if window.least_force < window.most_force:
        assert fit is CushionFit.FITS
    else:
        assert fit in {CushionFit.TOO_HARD_AND_THIN, CushionFit.TOO_SOFT_KEEP_AREA}


def test_advice_tells_the_ways_apart() -> None:
    weight, speed = 1e4, 8.5
    soft = cushion.advise(8e4, weight, speed, 0.3, 40.0)
    assert soft.fit is CushionFit.TOO_SOFT
    assert soft.least_force == pytest.approx(weight * (1.0 + 8.5**2 / (2 * 9.80665 * 0.3)))
    assert cushion.advise(6e5, weight, speed, 0.3, 40.0).fit is CushionFit.TOO_HARD
    assert cushion.advise(6e5, weight, speed, 0.05, 40.0).fit is CushionFit.TOO_HARD_AND_THIN
    assert cushion.advise(8e4, weight, speed, 0.05, 40.0).fit is CushionFit.TOO_SOFT_KEEP_AREA
    assert cushion.advise(3e5, weight, speed, 0.3).fit is CushionFit.FITS
    # Both ends of the window fit: a stroke just used up, a deceleration at its limit.
    assert soft.most_force is not None
    for edge in (soft.least_force, soft.most_force):
        assert cushion.advise(edge, weight, speed, 0.3, 40.0).fit is CushionFit.FITS


@pytest.mark.parametrize(("thickness", "layers"), [(0.01, 1), (0.0762, 1), (0.0763, 2), (3 * 0.0762, 3), (0.3, 4)])
def test_layers_are_whole_and_exact_multiples_stay(thickness: float, layers: int) -> None:
    assert cushion.layers_needed(thickness, 0.0762) == layers


def test_thickness_leaves_the_stroke() -> None:
    assert cushion.usable_stroke(4, 0.0762, 0.7) == pytest.approx(0.21336)
    assert cushion.needed_thickness(0.21336, 0.7) == pytest.approx(4 * 0.0762)


def test_crush_centre_lies_between_the_rows_by_force() -> None:
    np.testing.assert_allclose(cushion.crush_centre([3e4, 1e4], [[1.0, 0.5], [-1.0, 0.5]]), [0.5, 0.5])
    np.testing.assert_allclose(cushion.crush_centre([2e4], [[0.3, -0.2]]), [0.3, -0.2])


@pytest.mark.parametrize("forces", [[], [0.0, 0.0]])
def test_crush_centre_without_force_is_refused(forces: list[float]) -> None:
    with pytest.raises(ValueError, match="crush force"):
        cushion.crush_centre(forces, np.zeros((len(forces), 2)))
