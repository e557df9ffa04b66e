"""Steady descent, free fall and drag areas against worked tables and an outside drag library."""

import math

import fluids
import numpy as np
import pytest
from scipy.integrate import quad

from model.physics import air, canopy, drag
from model.physics.day_air import DayAir

POUND, FOOT = 0.45359237, 0.3048

# Derived from V = sqrt(2 W/(rho CD0 S0)) (Knacke, NWC TP 6575, ch. 4), sea level 1.225 kg/m3: diameter ft, mass lb,
# CD0, S0 ft2, CdS ft2, CdS m2, V m/s, V ft/s
RATES = [
    (64, 2200, 0.70, 3216.991, 2251.894, 209.2078, 8.7390, 28.6713),
    (64, 2200, 0.75, 3216.991, 2412.743, 224.1512, 8.4427, 27.6991),
    (64, 2200, 0.80, 3216.991, 2573.593, 239.0946, 8.1746, 26.8196),
    (100, 5000, 0.75, 7853.982, 5890.486, 547.2441, 8.1458, 26.7251),
    (100, 5000, 0.80, 7853.982, 6283.185, 583.7270, 7.8872, 25.8765),
    (100, 4500, 0.75, 7853.982, 5890.486, 547.2441, 7.7278, 25.3537),
    (34, 500, 0.75, 907.920, 680.940, 63.2614, 7.5763, 24.8565),
    (35, 300, 0.78, 962.113, 750.448, 69.7189, 5.5902, 18.3405),
    (35, 360, 0.78, 962.113, 750.448, 69.7189, 6.1237, 20.0910),
    (28, 200, 0.75, 615.752, 461.814, 42.9039, 5.8184, 19.0894),
    (28, 250, 0.75, 615.752, 461.814, 42.9039, 6.5052, 21.3426),
    (24, 200, 0.75, 452.389, 339.292, 31.5213, 6.7882, 22.2709),
    (26, 2200, 0.60, 530.929, 318.557, 29.5950, 23.2350, 76.2303),
]


@pytest.mark.parametrize(("feet", "pounds", "cd0", "s0", "cds_ft2", "cds", "rate", "rate_ft"), RATES)
def test_rate_of_descent_table(
    feet: float, pounds: float, cd0: float, s0: float, cds_ft2: float, cds: float, rate: float, rate_ft: float
) -> None:
    area = drag.circle_area(feet * FOOT)
    assert area / FOOT**2 == pytest.approx(s0, abs=6e-4)
    found = drag.drag_area(cd0, area)
    assert found / FOOT**2 == pytest.approx(cds_ft2, abs=6e-4)
    assert found == pytest.approx(cds, abs=6e-5)
    speed = drag.terminal_speed(pounds * POUND, 1.225, found)
    assert speed == pytest.approx(rate, abs=6e-5)
    assert speed / FOOT == pytest.approx(rate_ft, abs=6e-5)
    assert canopy.drag_area_from_rate(pounds * POUND, 1.225, speed) == pytest.approx(found, rel=1e-12)
    assert drag.nominal_diameter(found, cd0) == pytest.approx(feet * FOOT, rel=1e-12)


def test_sizing_of_a_canopy_for_a_rate() -> None:
    # derived: 1000 kg at 8.5 m/s, sea level
    cds = canopy.drag_area_from_rate(1000.0, 1.225, 8.5)
    assert cds == pytest.approx(221.6036, abs=6e-5)
    assert drag.nominal_diameter(cds, 0.75) == pytest.approx(19.3960, abs=6e-5)
    assert drag.nominal_diameter(cds, 0.75) / FOOT == pytest.approx(63.6353, abs=6e-5)


@pytest.mark.parametrize(
    ("feet", "pounds", "rate", "cd0"),
    [
        (64, 2200, 28, 0.7340),
        (100, 5000, 25, 0.8571),
        (28, 200, 20, 0.6833),
        (35, 360, 22, 0.6505),
        (35, 360, 24, 0.5466),
    ],
)
def test_drag_coefficient_that_a_quoted_rate_implies(feet: float, pounds: float, rate: float, cd0: float) -> None:
    # derived from rates quoted for service canopies, sea level
    cds = canopy.drag_area_from_rate(pounds * POUND, 1.225, rate * FOOT)
    assert cds / drag.circle_area(feet * FOOT) == pytest.approx(cd0, abs=6e-5)


def test_largest_mass_under_a_rate() -> None:
    # derived: CD0 0.75, sea level, 28.5 ft/s: 5,686 lb under 100 ft, 2,329 lb under 64 ft
    for feet, pounds in ((100.0, 5686.0), (64.0, 2329.0)):
        cds = drag.drag_area(0.75, drag.circle_area(feet * FOOT))
        assert drag.terminal_speed(pounds * POUND, 1.225, cds) / FOOT == pytest.approx(28.5, abs=0.003)


@pytest.mark.parametrize(
    ("feet", "factor"), [(2000, 1.030), (3000, 1.045), (5000, 1.077), (7500, 1.119), (10000, 1.164)]
)
def test_rate_grows_with_height_as_in_planning_tables(feet: float, factor: float) -> None:
    # derived from sigma = (1 - 6.8756e-6 h)^4.2559, the standard troposphere in feet
    sea, there = (drag.terminal_speed(1000.0, air.standard_density(at * FOOT), 200.0) for at in (0.0, feet))
    assert there / sea == pytest.approx(factor, abs=6e-4)


def test_load_s_own_drag_slows_a_little() -> None:
    # derived: 1000 kg on 224.1512 m2, and with a face of 1.2 m x 1.2 m at 1.05 (Hoerner, Fluid-Dynamic Drag, ch. 3)
    face = drag.front_face_drag_area(1.2, 1.2)
    assert face == pytest.approx(1.512, rel=1e-12)
    assert drag.terminal_speed(1000.0, 1.225, 224.1512) == pytest.approx(8.45156, abs=6e-6)
    assert drag.terminal_speed(1000.0, 1.225, 224.1512 + face) == pytest.approx(8.42320, abs=6e-6)


@pytest.mark.parametrize(("height", "seconds"), [(300, 37.2307), (1000, 122.0256), (3000, 348.6927), (5000, 553.2022)])
def test_time_of_descent_at_eight_metres_a_second(height: float, seconds: float) -> None:
    # derived: t = integral of dz/V(z), V = 8 m/s at sea level
    cds = canopy.drag_area_from_rate(1000.0, air.standard_density(0.0), 8.0)
    found, _ = quad(lambda z: 1.0 / drag.terminal_speed(1000.0, air.standard_density(z), cds), 0.0, height, epsabs=1e-9)
    assert found == pytest.approx(seconds, abs=1e-4)


@pytest.mark.parametrize(
    ("mass", "cds", "altitude", "density", "rate"),
    [(1000, 200, 2000, 1.006519, 9.873263), (1000, 200, 1000, 1.111511, 9.395099),
     (1000, 200, 7000, 0.5899471, 12.899339), (1000, 200, 5000, 0.7363396, 11.544902),
     (5000, 1500, 1000, 1.111511, 7.670509), (1000, 40, 5000, 0.7363396, 25.852862),
     (1000, 40, 1000, 1.111511, 21.026955), (500, 100, 2600, 0.9471784, 10.178275)],
)  # fmt: skip
def test_fall_into_denser_air_is_little_faster_than_steady(
    mass: float, cds: float, altitude: float, density: float, rate: float
) -> None:
    # RocketPy 1.13.0, one parachute, standard atmosphere, apparent mass made tiny: its density and speed. First order:
    # V^2 = V0^2 (1 + e), e = V0^2 beta/(2 g0), beta = -(d rho/dz)/rho; then e (1 + 2.235 e)
    steady = drag.terminal_speed(mass, density, cds)
    beta = -(air.standard_density(altitude + 1.0) - air.standard_density(altitude - 1.0)) / 2.0 / density
    surplus = steady**2 * beta / (2.0 * 9.80665)
    assert rate == pytest.approx(steady * math.sqrt(1.0 + surplus * (1.0 + 2.235 * surplus)), rel=5e-5)
    assert rate == pytest.approx(steady, rel=2e-3)
    assert density == pytest.approx(air.standard_density(altitude), rel=1.6e-4)


@pytest.mark.parametrize(
    ("speed_kmh", "at_sea", "at_3000"),
    [(200, 0.4150, 0.5591), (290, 0.1974, 0.2659), (500, 0.0664, 0.0895), (530, 0.0591, 0.0796)],
)
def test_drag_area_of_a_falling_person(speed_kmh: float, at_sea: float, at_3000: float) -> None:
    # derived for 80 kg from fall speeds of the FAI speed skydiving page
    for altitude, expected in ((0.0, at_sea), (3000.0, at_3000)):
        found = canopy.drag_area_from_rate(80.0, air.standard_density(altitude), speed_kmh / 3.6)
        assert found == pytest.approx(expected, abs=6e-5)


@pytest.mark.parametrize(
    ("time", "speed", "distance"),
    [(1, 9.70024, 4.87661), (3, 26.81766, 42.10539), (5, 38.88983, 108.70881), (10, 51.21591, 341.65900),
     (15, 53.53713, 605.17034)],
)  # fmt: skip
def test_fall_from_rest(time: float, speed: float, distance: float) -> None:
    # derived: V = Vt tanh(g t/Vt), Vt = 54 m/s
    assert drag.fall_speed(time, 54.0) == pytest.approx(speed, abs=6e-6)
    assert drag.fall_distance(time, 54.0) == pytest.approx(distance, abs=6e-6)


@pytest.mark.parametrize(("time", "share"), [(10.08664, 0.95), (14.57371, 0.99)])
def test_time_to_a_share_of_terminal_speed(time: float, share: float) -> None:
    # derived: Vt = 54 m/s
    assert drag.fall_speed(time, 54.0) / 54.0 == pytest.approx(share, abs=1e-7)


@pytest.mark.parametrize(
    ("time", "speed", "distance"),
    [(0.25, 18.753957, 7.484944), (0.5, 12.454294, 11.237156), (1, 9.092518, 16.408946), (2, 8.088593, 24.803978)],
)
def test_slowing_under_an_open_canopy(time: float, speed: float, distance: float) -> None:
    # derived: V = Vt coth(g t/Vt + atanh(Vt/V0)), Vt = 8 m/s, V0 = 54 m/s
    assert drag.slowing_speed(time, 8.0, 54.0) == pytest.approx(speed, abs=6e-7)
    assert drag.slowing_distance(time, 8.0, 54.0) == pytest.approx(distance, abs=6e-7)


@pytest.mark.parametrize(
    ("diameter", "solid", "altitude"),
    [(0.05, 2600.0, 0.0), (0.05, 2600.0, 3000.0), (0.02, 1200.0, 7600.0), (0.01, 7850.0, 0.0)],
)
def test_terminal_speed_of_a_sphere(diameter: float, solid: float, altitude: float) -> None:
    # fluids 1.3 (Caleb Bell), v_terminal with its sphere drag correlation; it counts buoyancy, so the mass here is less
    outside = fluids.ATMOSPHERE_1976(altitude)
    speed = fluids.v_terminal(D=diameter, rhop=solid, rho=outside.rho, mu=outside.mu)
    coefficient = fluids.drag_sphere(fluids.Reynolds(V=speed, D=diameter, rho=outside.rho, mu=outside.mu))
    apparent = (solid - outside.rho) * math.pi * diameter**3 / 6.0
    found = drag.terminal_speed(
        apparent, air.standard_density(altitude), drag.drag_area(coefficient, drag.circle_area(diameter))
    )
    assert found == pytest.approx(speed, rel=1e-9)


@pytest.mark.parametrize(("time", "tolerance"), [(1.0, 4e-4), (5.0, 1e-3), (20.0, 1e-3)])
def test_fall_of_a_sphere(time: float, tolerance: float) -> None:
    # fluids 1.3 (Caleb Bell), integrate_drag_sphere, a drag coefficient that changes with speed; here its last value
    outside = fluids.ATMOSPHERE_1976(0.0)
    speed, distance = fluids.integrate_drag_sphere(
        D=0.05, rhop=2600.0, rho=outside.rho, mu=outside.mu, t=time, V=0.0, distance=True
    )
    coefficient = fluids.drag_sphere(fluids.Reynolds(V=speed, D=0.05, rho=outside.rho, mu=outside.mu))
    cds = drag.drag_area(coefficient, drag.circle_area(0.05))
    terminal = drag.terminal_speed((2600.0 - outside.rho) * math.pi * 0.05**3 / 6.0, outside.rho, cds)
    assert drag.fall_speed(time, terminal) == pytest.approx(speed, rel=tolerance)
    assert drag.fall_distance(time, terminal) == pytest.approx(distance, rel=tolerance)


@pytest.mark.parametrize(
    ("feet_per_second", "feet"),
    [(20, 6.2162), (22, 7.5216), (24, 8.9513), (25, 9.7128), (28, 12.1837), (28.5, 12.6228)],
)
def test_landing_speed_as_a_fall_without_air(feet_per_second: float, feet: float) -> None:
    # derived: h = V^2/(2 g0)
    assert drag.equivalent_fall_height(feet_per_second * FOOT) / FOOT == pytest.approx(feet, abs=6e-5)


@pytest.mark.parametrize(
    ("count", "rate"),
    [(1, 26.7251), (2, 27.1923), (3, 27.4693), (4, 27.6676), (5, 27.8224), (6, 27.9495), (8, 28.1512)],
)
def test_cluster_falls_faster_by_its_efficiency(count: int, rate: float) -> None:
    # derived: 100 ft, CD0 0.75, 5,000 lb each, efficiency N^-0.05 (AFFDL-TR-78-151, from memory), sea level
    cds = canopy.cluster_drag_area(count, count**-0.05, 0.75, drag.circle_area(100.0 * FOOT))
    assert drag.terminal_speed(count * 5000.0 * POUND, 1.225, cds) / FOOT == pytest.approx(rate, abs=6e-5)


def test_three_canopies_of_given_efficiency() -> None:
    # derived: three 100 ft, 13,000 lb, efficiency 0.95, sea level
    cds = canopy.cluster_drag_area(3, 0.95, 0.75, drag.circle_area(100.0 * FOOT))
    assert drag.terminal_speed(13000.0 * POUND, 1.225, cds) / FOOT == pytest.approx(25.5261, abs=6e-5)


@pytest.mark.parametrize(
    ("feet", "constant", "knots", "seconds"),
    [(64, 8, 130, 2.33347), (100, 8, 140, 3.38562), (28, 8, 150, 0.88478), (35, 10, 130, 1.59515)],
)
def test_filling_time(feet: float, constant: float, knots: float, seconds: float) -> None:
    # derived: tf = n D0/V (Knacke, NWC TP 6575, ch. 5, from memory)
    distance = canopy.fill_distance(constant, feet * FOOT, 1.0, 0.0)
    assert canopy.filling_time(distance, knots * 1852.0 / 3600.0) == pytest.approx(seconds, abs=6e-6)


def test_pressure_setting_moves_the_acting_height_with_temperature() -> None:
    # common practice, no source: a barometric height is 4 % off for each 10 °C off standard
    standard = DayAir.at(0.0)
    warm = DayAir.at(0.0, zone_temperature=298.15)
    assert standard.true_height(600.0) == pytest.approx(600.0, rel=1e-12)
    assert warm.true_height(600.0) / 600.0 - 1.0 == pytest.approx(0.04, abs=0.006)
    # the exact height at which the warm air has the pressure that the standard air has 600 m up
    heights = np.linspace(0.0, 1000.0, 100_001)
    exact = np.interp(-standard.pressure(600.0), -warm.pressure(heights), heights)
    assert warm.true_height(600.0) == pytest.approx(exact, rel=1e-3)
