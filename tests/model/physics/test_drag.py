import math

import numpy as np
import pytest
from hypothesis import assume, given
from hypothesis import strategies as st

from model.physics import air, drag
from model.physics.day_air import DayAir

MASS = st.floats(5.0, 30_000.0)
AREA = st.floats(0.1, 3000.0)
DENSITY = st.floats(0.05, 1.5)
SPEED = st.floats(0.5, 200.0)
TIME = st.floats(0.0, 3600.0, allow_subnormal=False)


@given(mass=MASS, more=st.floats(0.0, 10_000.0), density=DENSITY, area=AREA)
def test_heavier_never_falls_slower(mass: float, more: float, density: float, area: float) -> None:
    assert drag.terminal_speed(mass + more, density, area) >= drag.terminal_speed(mass, density, area)


@given(
    mass=MASS,
    area=AREA,
    low=st.floats(air.LOWEST_ZONE, 5000.0),
    up=st.floats(0.0, 4000.0),
    offset=st.floats(-30.0, 30.0),
    setting=st.floats(95_000.0, 105_000.0),
)
def test_higher_zone_never_falls_slower(
    mass: float, area: float, low: float, up: float, offset: float, setting: float
) -> None:
    # the same kind of day at both zones: as much over standard, the same altimeter setting
    speeds = []
    for elevation in (low, low + up):
        standard = air.standard_temperature(air.geopotential_height(elevation))
        day = DayAir.at(elevation, standard + offset, setting)
        speeds.append(drag.terminal_speed(mass, day.zone_density, area))
    assert speeds[1] >= speeds[0] * (1.0 - 1e-14)


@given(mass=MASS, density=DENSITY, area=AREA, by=st.floats(0.2, 5.0))
def test_terminal_speed_scales_with_roots(mass: float, density: float, area: float, by: float) -> None:
    speed = drag.terminal_speed(mass, density, area)
    assert drag.terminal_speed(by * mass, density, area) == pytest.approx(math.sqrt(by) * speed, rel=1e-12)
    assert drag.terminal_speed(mass, by * density, area) == pytest.approx(speed / math.sqrt(by), rel=1e-12)
    assert drag.terminal_speed(mass, density, by * area) == pytest.approx(speed / math.sqrt(by), rel=1e-12)


@given(mass=MASS, density=DENSITY, area=AREA)
def test_drag_at_terminal_speed_is_the_weight(mass: float, density: float, area: float) -> None:
    pressure = drag.dynamic_pressure(density, drag.terminal_speed(mass, density, area))
    assert pressure * area == pytest.approx(mass * 9.80665, rel=1e-12)


@given(diameter=st.floats(0.5, 80.0), coefficient=st.floats(0.2, 2.0))
def test_nominal_diameter_undoes_the_drag_area(diameter: float, coefficient: float) -> None:
    area = drag.drag_area(coefficient, drag.circle_area(diameter))
    assert drag.nominal_diameter(area, coefficient) == pytest.approx(diameter, rel=1e-13)


@given(time=TIME, terminal=SPEED)
def test_fall_from_rest_stays_between_no_air_and_terminal(time: float, terminal: float) -> None:
    speed, distance = drag.fall_speed(time, terminal), drag.fall_distance(time, terminal)
    assert np.isfinite([speed, distance]).all()
    assert 0.0 <= speed <= min(terminal, 9.80665 * time) * (1.0 + 1e-12)
    slack = 1e-12 * terminal**2
    assert -slack <= distance <= min(terminal * time, 9.80665 * time**2 / 2.0) + slack


@given(time=TIME, terminal=st.floats(1.0, 100.0), ratio=st.floats(1.001, 100.0))
def test_slowing_goes_down_to_terminal_speed_and_no_further(time: float, terminal: float, ratio: float) -> None:
    start = ratio * terminal
    speed, distance = drag.slowing_speed(time, terminal, start), drag.slowing_distance(time, terminal, start)
    assert np.isfinite([speed, distance]).all()
    assert terminal <= speed * (1.0 + 1e-12)
    assert speed <= start * (1.0 + 1e-9)
    slack = 1e-9 * terminal**2
    assert terminal * time - slack <= distance <= start * time + slack


@given(time=st.floats(0.01, 30.0), terminal=st.floats(3.0, 80.0), ratio=st.floats(1.05, 10.0))
def test_speeds_are_the_slopes_of_the_distances(time: float, terminal: float, ratio: float) -> None:
    step = 1e-4 * time
    assume(9.80665 * step / terminal < 0.05)
    fallen = [drag.fall_distance(time + side * step, terminal) for side in (-1, 1)]
    assert (fallen[1] - fallen[0]) / (2 * step) == pytest.approx(drag.fall_speed(time, terminal), rel=2e-4, abs=1e-6)
    covered = [drag.slowing_distance(time + side * step, terminal, ratio * terminal) for side in (-1, 1)]
    assert (covered[1] - covered[0]) / (2 * step) == pytest.approx(
        drag.slowing_speed(time, terminal, ratio * terminal), rel=2e-4
    )


@given(speed=st.floats(0.0, 500.0))
def test_fall_without_air_undoes_its_height(speed: float) -> None:
    assert drag.airless_fall_speed(drag.equivalent_fall_height(speed)) == pytest.approx(speed, rel=1e-12)


def test_front_face_of_a_box() -> None:
    assert drag.front_face_drag_area(2.0, 1.5) == pytest.approx(1.05 * 3.0, rel=1e-15)
