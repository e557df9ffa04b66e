"""Lashing against worked tables of the tie-down angle method and the sums of a standard."""

from math import radians

import pytest

from model.physics import lashing, sling, strength
from model.physics.lashing import Row, hold

# derived: cos v cos h, cos v sin h, sin v in per cent; 30/30 giving 75 is the classic teaching value, from memory.
ANGLES = [
    (0, 0, 100, 0, 0), (15, 15, 93.3, 25.0, 25.9), (30, 0, 86.6, 0, 50.0), (30, 30, 75.0, 43.3, 50.0),
    (45, 0, 70.7, 0, 70.7), (45, 45, 50.0, 50.0, 70.7), (60, 30, 43.3, 25.0, 86.6), (60, 60, 25.0, 43.3, 86.6),
]  # fmt: skip


@pytest.mark.parametrize(("up", "side", "along", "across", "down"), ANGLES)
def test_angle_table(up: float, side: float, along: float, across: float, down: float) -> None:
    v, h = radians(up), radians(side)
    assert lashing.pull_along(100.0, v, h) == pytest.approx(along, abs=0.05)
    assert lashing.pull_across(100.0, v, h) == pytest.approx(across, abs=0.05)
    assert lashing.pull_down(100.0, v) == pytest.approx(down, abs=0.05)


def test_chains_and_straps_that_a_load_needs() -> None:
    # derived: 4,800 lb at 3.0 g forward, 30/30: two chains of 10,000 lb or four straps of 5,000 lb.
    needed = lashing.restraint_needed(3.0, 4800.0)
    assert needed == pytest.approx(14400.0)
    angle = radians(30.0)
    chain = lashing.pull_along(10000.0, angle, angle)
    strap = lashing.pull_along(5000.0, angle, angle)
    assert (chain, strap) == pytest.approx((7500.0, 3750.0))
    assert needed / chain == pytest.approx(1.92)
    assert needed / strap == pytest.approx(3.84)
    assert lashing.devices_needed(needed, chain) == 2
    assert lashing.devices_needed(needed, strap) == 4
    assert lashing.pull_across(10000.0, angle, angle) == pytest.approx(4330.0, abs=0.5)
    assert lashing.pull_down(10000.0, angle) == pytest.approx(5000.0)


def test_pair_of_chains_from_measured_points() -> None:
    # The same pair, one a side, as rows with points: tan 30 deg up and sideways for 1 along.
    run, side, up = 0.75, 0.4330127018922193, 0.5
    pair = hold([Row((-run, side, 0.0), (0.0, 0.0, up), 1, 10000.0, 10000.0, 10000.0, "chain", "left-right")])
    assert pair.held["forward"] == pytest.approx(15000.0)
    assert pair.held["left"] == pair.held["right"] == pytest.approx(4330.0, abs=0.5)
    assert pair.held["up"] == pytest.approx(10000.0)
    assert lashing.restraint_ratio(pair.held["forward"], 3.0, 4800.0) == pytest.approx(15000.0 / 14400.0)
    assert pair.held["aft"] == 0.0


@pytest.mark.parametrize(("ring", "along", "across", "down"), [(10000.0, 3536, 2121, 2828), (2500.0, 1768, 1061, 1414)])
def test_strap_from_measured_lengths(ring: float, along: float, across: float, down: float) -> None:
    # derived: 5,000 lb, 60, 36 and 48 in: 84.85 in long. On a 2,500 lb ring the ring counts (FM 55-450-2, 6-2: no
    # tie-down is stronger than its fitting).
    length = sling.leg_length(60.0, 36.0, 48.0)
    assert length == pytest.approx(84.85, abs=0.005)
    pull = lashing.row_pull(1, 5000.0, ring, 10000.0)
    assert lashing.component(pull, 60.0, length) == pytest.approx(along, abs=0.5)
    assert lashing.component(pull, 36.0, length) == pytest.approx(across, abs=0.5)
    assert lashing.component(pull, 48.0, length) == pytest.approx(down, abs=0.5)
    held = hold([Row((-60.0, 36.0, 0.0), (0.0, 0.0, 48.0), 1, 5000.0, ring, 10000.0)]).held
    assert [held["forward"], held["right"], held["up"]] == pytest.approx([along, across, down], abs=0.5)


def test_strap_beside_a_chain_and_long_beside_short() -> None:
    # derived: strap stretching 10 % at 5,000 lb, chain 0.5 % at 10,000 lb, both 120 in: together 10,250 lb, not 15,000.
    strap = strength.stretch_stiffness(1, 5000.0, 0.10, 120.0)
    chain = strength.stretch_stiffness(1, 10000.0, 0.005, 120.0)
    assert strap == pytest.approx(417.0, abs=0.5)
    assert chain == pytest.approx(16667.0, abs=0.5)
    assert 10000.0 / chain == pytest.approx(0.60)
    assert lashing.held_together([5000.0, 10000.0], [strap, chain]) == pytest.approx(10250.0)
    # The same strap at 60 in and 120 in: 7,500 lb, not 10,000.
    short = strength.stretch_stiffness(1, 5000.0, 0.10, 60.0)
    assert lashing.held_together([5000.0, 5000.0], [short, strap]) == pytest.approx(7500.0)


def test_sideways_loads_of_the_standard() -> None:
    # MIL-STD-209K, appendix C: 20,000 lb at 1.5 g sideways = 30,000 lb; 12,000 lb at one end is stated, 18,000 follows.
    sideways = lashing.restraint_needed(1.5, 20000.0)
    assert sideways * sling.lever_share(15.0, 10.0) == pytest.approx(12000.0)
    assert sideways * sling.lever_share(10.0, 15.0) == pytest.approx(18000.0)
