import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from model.physics import drag, inflation, ludtke

BALLISTIC = st.floats(1e-4, 1e4)
EXPONENT = st.floats(0.3, 8.0)
FRACTION = st.floats(0.0, 1.0)
START = st.floats(0.0, 1.0)


@given(ballistic=BALLISTIC, exponent=EXPONENT)
def test_factor_lies_between_nothing_and_infinite_mass(ballistic: float, exponent: float) -> None:
    for factor in (inflation.factor_time(ballistic, exponent), inflation.factor_distance(ballistic, exponent)):
        assert 0.0 < factor <= 1.0


@given(ballistic=BALLISTIC, exponent=EXPONENT)
def test_filling_in_a_given_time_is_the_more_severe(ballistic: float, exponent: float) -> None:
    over_distance = inflation.factor_distance(ballistic, exponent)
    assert inflation.factor_time(ballistic, exponent) >= over_distance * (1.0 - 1e-12)


@given(ballistic=BALLISTIC, more=st.floats(1.0, 10.0), exponent=EXPONENT)
def test_factor_rises_with_the_ballistic_parameter(ballistic: float, more: float, exponent: float) -> None:
    for factor in (inflation.factor_time, inflation.factor_distance):
        assert factor(ballistic * more, exponent) >= factor(ballistic, exponent) * (1.0 - 1e-12)


@given(ballistic=BALLISTIC, exponent=EXPONENT, fraction=FRACTION)
def test_no_moment_of_the_filling_is_over_the_factor(ballistic: float, exponent: float, fraction: float) -> None:
    area, integral = inflation.power_area(fraction, exponent), inflation.power_area_integral(fraction, exponent)
    in_time = inflation.force_ratio(area, inflation.speed_ratio_time(integral, ballistic))
    assert in_time <= inflation.factor_time(ballistic, exponent) * (1.0 + 1e-12)
    over_distance = inflation.force_ratio(area, inflation.speed_ratio_distance(integral, ballistic))
    assert over_distance <= inflation.factor_distance(ballistic, exponent) * (1.0 + 1e-12)


@given(ballistic=BALLISTIC, start=START, fraction=FRACTION)
def test_no_moment_of_ludtke_s_law_is_over_its_peak(ballistic: float, start: float, fraction: float) -> None:
    at, largest = ludtke.ludtke_peak(ballistic, start)
    assert 0.0 <= at <= 1.0
    speed = inflation.speed_ratio_time(ludtke.ludtke_area_integral(fraction, start), ballistic)
    assert inflation.force_ratio(ludtke.ludtke_area(fraction, start), speed) <= largest * (1.0 + 1e-9)


@given(ballistic=BALLISTIC, start=st.floats(0.0, 0.95))
def test_ludtke_s_law_peaks_before_full_opening_below_its_limit(ballistic: float, start: float) -> None:
    at, _ = ludtke.ludtke_peak(ballistic, start)
    if at == 1.0:
        assert ballistic >= ludtke.ludtke_limit(start) * (1.0 - 1e-9)


@given(
    mass=st.floats(10.0, 2e4), density=st.floats(0.3, 1.3), area=st.floats(5.0, 2000.0), length=st.floats(5.0, 500.0),
    speed=st.floats(10.0, 120.0), by=st.floats(0.2, 5.0),
)  # fmt: skip
def test_force_over_a_fixed_fill_distance_scales_with_speed_squared(
    mass: float, density: float, area: float, length: float, speed: float, by: float
) -> None:
    ballistic = inflation.ballistic_parameter(mass, density, area, length)  # knows no speed
    factor = inflation.factor_time(ballistic, 2.0)
    slow, fast = (
        inflation.peak_force(drag.dynamic_pressure(density, v), area, 1.7, factor) for v in (speed, by * speed)
    )
    assert fast == pytest.approx(by**2 * slow, rel=1e-12)


@given(
    mass=st.floats(10.0, 2e4), more=st.floats(1.0, 3.0), area=st.floats(5.0, 2000.0), length=st.floats(5.0, 500.0),
    longer=st.floats(1.0, 3.0),
)  # fmt: skip
def test_heavier_opens_harder_and_slower_filling_opens_softer(
    mass: float, more: float, area: float, length: float, longer: float
) -> None:
    def force(mass: float, length: float) -> float:
        ballistic = inflation.ballistic_parameter(mass, 1.2, area, length)
        return float(inflation.peak_force(3000.0, area, 1.0, inflation.factor_time(ballistic, 2.0)))

    assert force(mass * more, length) >= force(mass, length) * (1.0 - 1e-12)
    assert force(mass, length * longer) <= force(mass, length) * (1.0 + 1e-12)


def test_infinite_mass_is_the_limit_of_a_heavy_load() -> None:
    factor = inflation.factor_time(1e7, 2.0)
    assert inflation.peak_force(3000.0, 50.0, 1.7, factor) == pytest.approx(
        inflation.infinite_mass_force(3000.0, 50.0, 1.7), rel=1e-6
    )
    # at its least ballistic parameter the infinite-mass force is still near, a fifth off at worst
    for exponent in (0.5, 1.0, 2.0, 6.0):
        assert 0.8 < inflation.factor_time(inflation.INFINITE_MASS_LEAST, exponent) < 1.0


def test_factors_take_arrays() -> None:
    ballistic, exponent = np.array([0.01, 0.5, 20.0]), np.array([1.0, 2.0, 0.5])
    for factor in (inflation.factor_time, inflation.factor_distance):
        at_once = factor(ballistic, exponent)
        np.testing.assert_allclose(
            at_once, [factor(float(a), float(j)) for a, j in zip(ballistic, exponent, strict=True)]
        )


def test_ludtke_with_all_open_at_the_start_peaks_at_the_start() -> None:
    assert ludtke.ludtke_peak(3.0, 1.0) == (0.0, 1.0)
