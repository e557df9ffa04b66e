"""Suspension legs against the lever rule of a standard, sling angle tables, and an independent solver."""

from itertools import product
from math import degrees, radians, sin

import numpy as np
import pytest
from scipy.optimize import linprog, nnls

from model.physics import sling, strength
from model.physics.hanging import Hang, Outcome, hang

# MIL-STD-209K, appendix C: 20,000 lb, centre of gravity 15 and 10 from the two ends, 5 and 10 from the two sides,
# 2.0 g = 40,000 lb shared by the lever rule.
APPENDIX_C_LOAD = 2.0 * 20000.0
APPENDIX_C_CORNERS = [((10, 15), (5, 10), 16000), ((15, 10), (5, 10), 10667),
                      ((10, 15), (10, 5), 8000), ((15, 10), (10, 5), 5333)]  # fmt: skip


@pytest.mark.parametrize(("ends", "sides", "pounds"), APPENDIX_C_CORNERS)
def test_corner_loads_of_the_standard(ends: tuple[float, float], sides: tuple[float, float], pounds: float) -> None:
    corner = APPENDIX_C_LOAD * sling.corner_share(*ends, *sides)
    assert corner == pytest.approx(pounds, abs=0.5)
    # The same appendix, ultimate loads: 1.5 times.
    assert 1.5 * corner == pytest.approx(1.5 * pounds, abs=0.75)


@pytest.mark.parametrize("height", [8.0, 15.0, 40.0, 1e5])
@pytest.mark.parametrize("stiffness", [(1.0, 1.0, 1.0, 1.0), (1.0, 2.0, 0.7, 1.3)])
def test_elastic_legs_meet_the_pair_sums_of_the_standard(height: float, stiffness: tuple[float, ...]) -> None:
    # A rigid load on four legs has one way of sharing free; statics fixes only what each end and each side carries.
    points = np.array([[x, y, 0.0] for x, y in product((10.0, -15.0), (5.0, -10.0))])
    hung = hang(points, [0.0, 0.0, height], [0.0, 0.0, -1.0], stiffness, APPENDIX_C_LOAD)
    plumb = hung.loads * hung.directions[:, 2]
    assert plumb[:2].sum() == pytest.approx(24000.0, rel=1e-9)
    assert plumb[2:].sum() == pytest.approx(16000.0, rel=1e-9)
    assert plumb[[0, 2]].sum() == pytest.approx(26666.67, rel=1e-6)
    assert plumb[[1, 3]].sum() == pytest.approx(13333.33, rel=1e-6)


def test_elastic_legs_share_the_corners_otherwise_than_the_lever_rule() -> None:
    points = np.array([[x, y, 0.0] for x, y in product((10.0, -15.0), (5.0, -10.0))])
    hung = hang(points, [0.0, 0.0, 1e5], [0.0, 0.0, -1.0], [1.0] * 4, APPENDIX_C_LOAD)
    lever = [APPENDIX_C_LOAD * sling.corner_share(*ends, *sides) for ends, sides, _ in APPENDIX_C_CORNERS]
    # Plumb springs on a rigid plate: derived by hand: a quarter, and what tilts it: 15,333 lb.
    assert hung.loads[0] == pytest.approx(APPENDIX_C_LOAD * (0.25 + 2.5 / 50.0 + 2.5 / 30.0), rel=1e-6)
    assert lever[0] == pytest.approx(16000.0)
    assert hung.loads[0] < lever[0]


# derived: 1/sin(b); the 60 and 45 deg rows are in every sling angle table of the trade.
@pytest.mark.parametrize(("angle", "factor"), [(75, 1.035), (60, 1.155), (45, 1.414), (30, 2.000)])
def test_sling_angle_factors(angle: float, factor: float) -> None:
    assert sling.angle_factor(radians(angle)) == pytest.approx(factor, abs=5e-4)


def _four_legs(angle: float) -> Hang:
    points = np.array([[x, y, 0.0] for x, y in product((1.0, -1.0), (0.75, -0.75))])
    rise = 1.25 * np.tan(radians(angle))
    return hang(points, [0.0, 0.0, rise], [0.0, 0.0, -0.3], [1.0] * 4, 5000.0)


def test_four_legs_at_sixty_degrees_and_the_two_leg_rule() -> None:
    # derived: 5,000 lb; two carrying is common practice, from memory of ASME B30.9.
    tension = sling.equal_leg_tension(5000.0, 4, radians(60.0))
    assert tension == pytest.approx(1443.0, abs=0.5)
    assert _four_legs(60.0).loads.tolist() == pytest.approx([tension] * 4)
    assert sling.carrying_load(tension, 4, 2) == pytest.approx(2887.0, abs=0.5)
    assert sling.carrying_load(tension, 4, 2) == pytest.approx(5000.0 / (2.0 * sin(radians(60.0))))


def test_centre_of_gravity_nearer_the_front_pair() -> None:
    # derived: 5,000 lb, 40 in from the front pair and 60 in from the rear, legs at 60 deg: 1,732 and 1,155 lb each.
    front = 5000.0 * sling.lever_share(40.0, 60.0)
    assert front == pytest.approx(3000.0)
    assert sling.equal_leg_tension(front, 2, radians(60.0)) == pytest.approx(1732.0, abs=0.5)
    assert sling.equal_leg_tension(5000.0 - front, 2, radians(60.0)) == pytest.approx(1155.0, abs=0.5)


def test_free_tilt_of_a_load_off_centre() -> None:
    # derived: 3 in off, apex 120 in above; 5 deg lets the centre be 10.5 in off.
    assert degrees(sling.free_tilt(3.0, 120.0)) == pytest.approx(1.43, abs=0.005)
    assert degrees(sling.free_tilt(10.5, 120.0)) == pytest.approx(5.0, abs=0.01)


def test_two_loop_sling_of_the_strongest_web() -> None:
    # derived: web of 15,000 lb (PIA-W-4088, type XXVI), two loops are four thicknesses, joint 0.80, factor 5 to 1.
    whole = strength.leg_strength(15000.0, 4, 1.0)
    left = strength.leg_strength(15000.0, 4, 0.80)
    assert (whole, left) == pytest.approx((60000.0, 48000.0))
    assert left / 5.0 == pytest.approx(9600.0)
    assert strength.strength_ratio(left, 9600.0) == pytest.approx(5.0)


def test_opening_force_on_four_legs() -> None:
    # derived: 10,000 lb at three times its weight, four legs at 60 deg: 8,660 lb each.
    assert sling.equal_leg_tension(3.0 * 10000.0, 4, radians(60.0)) == pytest.approx(8660.0, abs=0.5)


def _leg_sets(count: int) -> list[tuple[np.ndarray, np.ndarray, np.ndarray, np.ndarray]]:
    random = np.random.default_rng(20261201)
    sets = []
    for _ in range(count):
        legs = int(random.integers(3, 9))
        points = np.c_[random.uniform(-3, 3, legs), random.uniform(-1.5, 1.5, legs), random.uniform(0, 1.5, legs)]
        apex = np.array([random.uniform(-1, 1), random.uniform(-0.5, 0.5), random.uniform(1.8, 8.0)])
        centre = np.array([random.uniform(-2.5, 2.5), random.uniform(-1.3, 1.3), random.uniform(-1, 1)])
        sets.append((points, apex, centre, 10.0 ** random.uniform(-1, 1, legs)))
    return sets


def test_least_energy_shares_agree_with_an_independent_solver() -> None:
    # Lawson and Hanson's non-negative least squares, with equilibrium held by a large weight.
    balanced = slack = 0
    for points, apex, centre, stiffness in _leg_sets(400):
        hung = hang(points, apex, centre, stiffness, 1.0)
        root = np.sqrt(stiffness)
        tall = np.vstack([1e6 * hung.directions.T * root, np.eye(len(points))])
        scaled, _ = nnls(tall, np.concatenate([1e6 * hung.axis, np.zeros(len(points))]))
        if hung.outcome is Outcome.OUTSIDE:
            assert np.linalg.norm(hung.directions.T @ (scaled * root) - hung.axis) > 1e-6
            continue
        balanced += 1
        slack += len(hung.worst.slack) > 0
        np.testing.assert_allclose(hung.loads, scaled * root, atol=2e-6)
    assert balanced > 100
    assert slack > 50


def test_a_load_hangs_just_when_a_linear_program_finds_pulling_legs() -> None:
    found = {True: 0, False: 0}
    for points, apex, centre, stiffness in _leg_sets(150):
        hung = hang(points, apex, centre, stiffness, 1.0)
        program = linprog(np.ones(len(points)), A_eq=hung.directions.T, b_eq=hung.axis, bounds=(0.0, None))
        hangs = hung.outcome is not Outcome.OUTSIDE
        assert hangs == program.success
        found[hangs] += 1
    assert min(found.values()) > 30
