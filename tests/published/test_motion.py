"""The motion engine against published closed forms, tables and independent integrations of the same equations."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest

from model.physics.flight import Drop, Filling, FillingRule, Row, history, solve
from tests.model.physics.flight.cases import RIGS
from tests.model.physics.flight.reference import isa

G0 = 9.80665
RHO = 1.225

# Derived: the equations of motion by an explicit Runge-Kutta method of order 8 at rtol 1e-13, agreed to 5e-12 by an
# implicit one, and for rig 2 to 12 figures by extrapolation in 25-digit arithmetic. Time rule, no opening coefficient.
# rig: speed at line stretch, fill times, peak force and time, time and height lost to 105 %, touchdown time, way, speed
DERIVED = {
    1: (29.6053808, (1.97261438,), 2355.124837, 2.6083737, 3.95362914, 41.1031821, 26.32637028, 76.2051556, 7.07433554),
    2: (56.7394869, (2.74940802,), 33236.44974, 3.18218898, 5.18489104, 65.6558674, 45.45189906, 199.950379,
        8.23803419),
    3: (60.0660334, (0.665933768, 3.51503756), 114090.4958, 3.66593377, 9.55564731, 186.167551, 64.9719956, 306.427802,
        7.39142168),
    6: (63.8317531, (1.19063,), 12344.56605, 2.48738093, 4.13352601, 55.9808258, 22.21797435, 249.369517, 25.0371511),
}


@pytest.mark.parametrize("number", DERIVED)
def test_reference_rigs(number: int) -> None:
    speed, fills, force, moment, slow, loss, touchdown, way, landing = DERIVED[number]
    drop = RIGS[number]
    motion = solve(drop, "time")
    best = motion.fill_force_plain[:, 0].argmax()
    assert motion.accurate[0]
    assert motion.line_stretch_speed[0, 0] == pytest.approx(speed, rel=1e-7)
    assert motion.fill_time[:, 0] == pytest.approx(fills, rel=2e-7)
    assert motion.fill_force_plain[best, 0] == pytest.approx(force, rel=1e-6)
    assert motion.fill_force_plain_time[best, 0] == pytest.approx(moment, rel=1e-5)
    assert motion.slow_time[0] == pytest.approx(slow, rel=1e-5)
    assert drop.release_height - motion.slow_height[0] == pytest.approx(loss, rel=1e-4)
    assert motion.touchdown_time[0] == pytest.approx(touchdown, rel=2e-6)
    assert motion.touchdown_distance[0] == pytest.approx(way, rel=5e-5)
    assert motion.touchdown_speed[0] == pytest.approx(landing, rel=2e-6)


def test_disreef_peak_of_rig_3() -> None:
    # derived, as above
    motion = solve(RIGS[3], "time")
    assert motion.fill_force_plain[1, 0] == pytest.approx(101363.8902, rel=1e-6)
    assert motion.fill_force_plain_time[1, 0] == pytest.approx(7.702349359, rel=2e-5)


def test_constant_wind_shifts_the_way_alone() -> None:
    # derived, as above: rig 2 in a tailwind of 8 m/s
    still, windy = (solve(replace(RIGS[2], winds=winds), "time") for winds in ((), ((0.0, 8.0),)))
    assert windy.touchdown_distance[0] == pytest.approx(563.5655714, rel=1e-6)
    assert windy.fill_force[0, 0] == pytest.approx(still.fill_force[0, 0], rel=1e-12)
    assert windy.touchdown_time[0] == pytest.approx(still.touchdown_time[0], rel=1e-12)


def test_power_law_wind() -> None:
    # derived, as above: rig 2 in a tailwind of 8 m/s (h/10 m)^0.143, here by 60 straight pieces
    heights = 400.0 * np.linspace(0.05, 1, 60) ** 1.5
    drop = replace(RIGS[2], winds=((0.0, 0.0), *((float(h), float(8 * (h / 10) ** 0.143)) for h in heights)))
    motion = solve(drop, "time")
    assert motion.accurate[0]
    assert motion.fill_force[0, 0] == pytest.approx(33401.77634, rel=2e-4)
    assert motion.touchdown_time[0] == pytest.approx(45.46717619, rel=2e-4)
    assert motion.touchdown_distance[0] == pytest.approx(740.3312017, rel=2e-3)
    assert drop.release_height - motion.slow_height[0] == pytest.approx(65.56358192, rel=2e-3)


def level(A: float, j: float, gravity: float, tf: float = 2.0, v0: float = 60.0, **changes: object) -> Drop:
    """A canopy alone that fills from level flight, with the ballistic parameter A = 2 m/(rho CdS v0 tf)."""
    mass = 1000.0
    area = 2 * mass / (RHO * A * v0 * tf)
    filling = replace(Filling(area, v0 * tf, j), **changes)     # type: ignore[arg-type]
    row = Row((filling,), line_stretch=0.0)
    return Drop(mass, v0, 2000.0, 0.0, (row,), lambda z: np.full_like(z, RHO), gravity=gravity)


def reduction(drop: Drop, rule: FillingRule) -> float:
    """Largest force while filling / (dynamic pressure at line stretch x full area)."""
    motion = solve(drop, rule)
    assert motion.accurate[0]
    filling = drop.rows[0].fillings[0]
    return float(motion.fill_force_plain[0, 0] / (0.5 * RHO * drop.airspeed**2 * filling.area))


@pytest.mark.parametrize("j", [0.5, 1.0, 2.0, 3.0, 6.0])
@pytest.mark.parametrize("A", [0.02, 0.1, 0.5, 1.0, 3.0, 10.0, 100.0])
def test_opening_force_reduction_without_gravity(A: float, j: float) -> None:
    # Derived: closed form of the Pflanz equations, drag area as a power of time or of the way; ODE at rtol 1e-12
    critical = (j + 2) / (j * (j + 1))
    by_time = (1 + 1 / (A * (j + 1))) ** -2
    if critical > A:
        by_time = (A * j * (j + 1) / (j + 2)) ** (j / (j + 1)) * ((j + 2) / (2 * j + 2)) ** 2
    by_distance = np.exp(-2 / ((j + 1) * A))
    if j * A / 2 < 1:
        by_distance = (j * A / 2) ** (j / (j + 1)) * np.exp(-j / (j + 1))
    drop = level(A, j, 1e-3)
    assert reduction(drop, "time") == pytest.approx(by_time, rel=2e-5)
    assert reduction(drop, "distance") == pytest.approx(by_distance, rel=2e-5)
    assert by_distance <= by_time


@pytest.mark.parametrize(("A", "j", "u"), [
    # Derived: u = v/v0 at tau = 0.25, 0.5, 0.75, 1 by the closed form, printed to six figures
    (0.1, 2, (0.950495, 0.705882, 0.415584, 0.230769)),
    (1.0, 2, (0.994819, 0.960000, 0.876712, 0.750000)),
    (1.0, 1, (0.969697, 0.888889, 0.780488, 0.666667)),
])
def test_speed_while_filling_without_gravity(A: float, j: float, u: tuple[float, ...]) -> None:
    curve = history(level(A, j, 1e-3), "time", 4000)
    filling = curve.filling == 0
    tau = curve.time[filling] / 2.0
    assert np.interp([0.25, 0.5, 0.75, 1.0], tau, curve.speed[filling] / 60.0) == pytest.approx(u, abs=3e-6)


@pytest.mark.parametrize(("A", "j", "way"), [
    # Derived: way through the air while filling / (v0 tf), hypergeometric closed form
    (0.1, 1, 0.514413), (1.0, 1, 0.870420), (0.1, 2, 0.674700), (1.0, 2, 0.929585), (0.5, 2, 0.877100),
    (0.2, 6, 0.933893),
])
def test_way_while_filling_without_gravity(A: float, j: float, way: float) -> None:
    assert solve(level(A, j, 1e-3), "time").fill_path[0, 0] / 120.0 == pytest.approx(way, rel=5e-6)


@pytest.mark.parametrize(("A", "j", "G", "X", "tau"), [
    # Derived: point mass opened in level flight, G = g tf/v0, largest force over the dynamic pressure at the start
    (0.1, 2, 0.2, 0.126944, 0.5349), (0.1, 2, 0.5, 0.134945, 0.5536), (0.5, 2, 0.2, 0.379607, 0.9263),
    (1, 2, 0.2, 0.585076, 1),
    (0.1, 1, 0.2, 0.145661, 0.2593), (0.5, 1, 0.2, 0.329591, 0.5902), (1, 1, 0.2, 0.473272, 0.8543),
    (0.1, 6, 0.2, 0.193094, 0.9137), (0.2, 6, 0.2, 0.351457, 1), (1, 6, 0.1, 0.772793, 1),
])
def test_opening_in_level_flight_with_gravity(A: float, j: float, G: float, X: float, tau: float) -> None:
    tf = 2.0
    drop = level(A, j, G0, tf, v0=G0 * tf / G)
    motion = solve(drop, "time")
    assert reduction(drop, "time") == pytest.approx(X, rel=2e-6, abs=6e-7)
    assert motion.fill_force_time[0, 0] / tf == pytest.approx(tau, abs=6e-5)


@pytest.mark.parametrize(("mass", "area", "v0", "tf", "j", "Cx", "force"), [
    # Derived: cases of opening in level flight at sea level, constant density, opening coefficient on the whole curve
    (997.9032, 224.1512, 66.87778, 2.33347, 2, 1.7, 80331.2),
    (2267.9619, 547.2441, 72.02222, 3.38562, 2, 1.7, 161991.3),
    (90.7185, 42.9039, 77.16667, 0.88478, 2, 1.7, 21233.7),
    (136.0777, 69.7189, 66.87778, 1.59515, 2, 1.4, 15099.2),
    (997.9032, 29.5950, 66.87778, 1.65895, 1, 1.05, 28149.0),
])
def test_worked_openings_with_gravity(
    mass: float, area: float, v0: float, tf: float, j: float, Cx: float, force: float
) -> None:
    row = Row((Filling(area, v0 * tf, j, Cx),), line_stretch=0.0)
    motion = solve(Drop(mass, v0, 2000.0, 0.0, (row,), lambda z: np.full_like(z, RHO)), "time")
    assert motion.fill_force[0, 0] == pytest.approx(force, rel=1e-5)
    assert motion.fill_force_plain[0, 0] == pytest.approx(force / Cx, rel=1e-5)
    assert motion.nominal_fill_time[0, 0] == pytest.approx(tf, rel=1e-12)


def test_drogue_on_a_heavy_load_still_gathers_speed_under_it() -> None:
    # derived, as above: 13,608 kg under 8.2087 m2 from 128.61 m/s; the force grows past three filling times
    row = Row((Filling(8.2087, 64.0085, 1.0, 1.05, filling_time=0.49769),), line_stretch=0.0)
    drop = Drop(13607.771, 128.61111, 3000.0, 0.0, (row,), lambda z: np.full_like(z, RHO))
    curve = history(drop, "time", 2000)
    inside = curve.time <= 3 * 0.49769
    assert 1.05 * curve.canopy_force_plain[inside].max() == pytest.approx(85416.2, rel=1e-4)
    motion = solve(drop, "time")
    assert motion.hold_force[0, 0] > motion.fill_force_plain[0, 0]
    assert motion.opening_force[0, 0] == motion.hold_force[0, 0]


@pytest.mark.parametrize(("seconds", "speed", "way"), [
    # Derived: v = Vt tanh(k t), s = (Vt^2/g) ln cosh(k t), k = g/Vt, Vt = 54 m/s
    (1, 9.70024, 4.87661), (3, 26.81766, 42.10539), (5, 38.88983, 108.70881), (10, 51.21591, 341.65900),
    (15, 53.53713, 605.17034),
])
def test_free_fall_from_rest(seconds: float, speed: float, way: float) -> None:
    load = 2 * 100.0 * G0 / (RHO * 54.0**2)
    row = Row((Filling(40.0, 60.0),), line_stretch=seconds)
    motion = solve(Drop(100.0, 0.0, 1000.0, load, (row,), lambda z: np.full_like(z, RHO)), "time")
    assert motion.line_stretch_speed[0, 0] == pytest.approx(speed, abs=6e-6)
    assert 1000 - motion.line_stretch_height[0, 0] == pytest.approx(way, abs=1e-5)
    assert motion.line_stretch_angle[0, 0] == pytest.approx(np.pi / 2)


@pytest.mark.parametrize(("mass", "area", "height", "ground"), [
    (1000, 200, 3000, 0), (1000, 40, 6000, 0), (500, 100, 1500, 2500),
])
def test_descent_is_faster_than_the_local_steady_rate(mass: float, area: float, height: float, ground: float) -> None:
    # Derived: v^2 = v0^2 (1 + eps (1 + 2.235 eps)), eps = v0^2 beta/(2 g), beta = -(d rho/dz)/rho: the air gets denser
    row = Row((Filling(area, 150.0),), line_stretch=1.0)
    motion = solve(Drop(mass, 60.0, height, 0.0, (row,), isa, ground_altitude=ground), "distance")
    low, here, high = (float(isa(np.array(ground + dz))) for dz in (-1.0, 0.0, 1.0))
    plain = np.sqrt(2 * mass * G0 / (here * area))
    eps = plain**2 * (low - high) / (2 * here) / (2 * G0)
    assert motion.touchdown_descent[0] == pytest.approx(plain * np.sqrt(1 + eps * (1 + 2.235 * eps)), rel=5e-6)


@pytest.mark.parametrize(("height", "seconds"), [(300, 37.2307), (1000, 122.0256), (3000, 348.6927), (5000, 553.2022)])
def test_time_of_a_steady_descent(height: float, seconds: float) -> None:
    # Derived: integral of dz/V(z), V = 8 m/s at sea level, standard atmosphere; the load itself is a little faster
    mass = 1000.0
    area = 2 * mass * G0 / (float(isa(np.array(0.0))) * 64.0)
    row = Row((Filling(area, 1.0),), line_stretch=0.1)
    curve = history(Drop(mass, 20.0, height + 200.0, 0.0, (row,), isa), "time", 4000)
    passing = np.interp(-height, -curve.height, curve.time)
    assert curve.time[-1] - passing == pytest.approx(seconds, rel=3e-4)
    assert curve.time[-1] - passing < seconds
