import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from model.physics import canopy, drag

FOOT, PSF = 0.3048, 47.88025898033584


@given(mass=st.floats(5.0, 30_000.0), density=st.floats(0.05, 1.5), rate=st.floats(1.0, 60.0))
def test_measured_rate_comes_back_from_its_drag_area(mass: float, density: float, rate: float) -> None:
    area = canopy.drag_area_from_rate(mass, density, rate)
    assert drag.terminal_speed(mass, density, area) == pytest.approx(rate, rel=1e-12)


@given(count=st.integers(2, 8), area=st.floats(1.0, 4000.0))
def test_one_out_leaves_the_share_of_the_others(count: int, area: float) -> None:
    left = canopy.drag_area_one_out(area, count)
    assert left == pytest.approx(area - area / count, rel=1e-12)
    slower, faster = drag.terminal_speed(1000.0, 1.2, area), drag.terminal_speed(1000.0, 1.2, left)
    assert faster / slower == pytest.approx(math.sqrt(count / (count - 1)), rel=1e-12)


def test_single_canopy_out_leaves_nothing() -> None:
    assert canopy.drag_area_one_out(224.0, 1) == 0.0


def test_cluster_of_one_is_the_canopy() -> None:
    assert canopy.cluster_drag_area(1, 1.0, 0.75, 298.9) == pytest.approx(0.75 * 298.9, rel=1e-15)
    assert canopy.cluster_drag_area(3, 0.95, 0.75, 700.0) == pytest.approx(3 * 0.95 * 0.75 * 700.0, rel=1e-15)


@given(
    constant=st.floats(1.0, 20.0),
    diameter=st.floats(1.0, 40.0),
    ratios=st.tuples(st.floats(0.01, 1.0), st.floats(0.01, 1.0)).map(sorted),
)
def test_squares_of_the_stages_fill_distances_add_up_to_the_whole(
    constant: float, diameter: float, ratios: list[float]
) -> None:
    stages = zip([*ratios, 1.0], [0.0, *ratios], strict=True)
    parts = [canopy.fill_distance(constant, diameter, after, before) for after, before in stages]
    whole = canopy.fill_distance(constant, diameter, 1.0, 0.0)
    assert whole == pytest.approx(constant * diameter, rel=1e-15)
    assert math.hypot(*parts) == pytest.approx(whole, rel=1e-12)


def test_reefed_area_is_a_share() -> None:
    assert canopy.reefed_drag_area(0.05, 547.0) == pytest.approx(27.35, rel=1e-15)


def test_swing_allowance_is_full_on_a_level_path_and_none_straight_down() -> None:
    assert canopy.swing_allowance(15.0, 1.0, 0.0) == pytest.approx(0.6 * 16.0, rel=1e-15)
    assert canopy.swing_allowance(15.0, 1.0, math.pi / 2) == pytest.approx(0.0, abs=1e-14)
    assert canopy.swing_allowance(15.0, 0.0, math.pi / 3) == pytest.approx(4.5, rel=1e-12)


# the two-body sums for cargo that the 0.6 is taken from: system length ft, extra height ft by the two filling rules
@pytest.mark.parametrize(("length", "extra"), [(26.0, 16.0), (64.0, 31.0), (154.0, 63.0)])
def test_swing_allowance_covers_the_two_body_sums(length: float, extra: float) -> None:
    allowed = canopy.swing_allowance(length, 0.0, math.radians(10.0))
    assert 0.95 * extra <= allowed <= 1.5 * extra


@pytest.mark.parametrize(
    ("feet", "psf", "inside"),
    [(28.0, 0.5, True), (100.0, 2.0, True), (64.0, 0.9, True), (27.9, 0.9, False), (100.1, 0.9, False),
     (64.0, 0.49, False), (64.0, 2.01, False)],
)  # fmt: skip
def test_class_of_the_handbook_constants_takes_its_ends_in(feet: float, psf: float, inside: bool) -> None:
    assert canopy.in_handbook_class(feet * FOOT, psf * PSF) is inside


def test_canopy_loading_is_weight_over_drag_area() -> None:
    assert canopy.canopy_loading(1000.0, 200.0) == pytest.approx(49.03325, rel=1e-12)


def test_filling_takes_longer_when_slower() -> None:
    assert canopy.filling_time(156.0, 52.0) == 3.0
    assert canopy.filling_time(156.0, 26.0) == 6.0
