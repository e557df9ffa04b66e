"""Strength against load along the path from load to canopy."""

from math import isnan, sqrt

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from model.physics import strength

QUICK = settings(deadline=None, max_examples=50)

positive = st.floats(1e-2, 1e5)


def test_leg_is_web_times_thicknesses_times_joint() -> None:
    assert strength.leg_strength(40e3, 4, 0.8) == pytest.approx(128e3)


def test_ratio_is_the_factor_of_safety() -> None:
    assert strength.strength_ratio(strength.link_strength(20e3, 2), 16e3) == 2.5


@QUICK
@given(positive, st.integers(1, 8), st.floats(1.0, 3.0), positive)
def test_part_of_one_canopy_sees_the_larger_of_opening_and_snatch(
    force: float, count: int, uneven: float, snatch: float
) -> None:
    opening = strength.canopy_load(force, count, uneven)
    assert opening >= force / count
    assert strength.one_canopy_load(force, count, uneven, snatch) == max(opening, snatch)


def test_lines_too_short_for_the_canopy_have_no_angle() -> None:
    assert isnan(strength.line_angle(20.0, 7.0))
    assert isnan(strength.line_angle(20.0, 5.0))
    angles = strength.line_angle(20.0, np.array([5.0, 7.1, 20.0]))
    assert np.isnan(angles).tolist() == [True, False, False]


@QUICK
@given(st.floats(1.0, 40.0), st.floats(0.4, 3.0))
def test_cone_loads_lines_more_than_an_even_share(diameter: float, ratio: float) -> None:
    angle = strength.line_angle(diameter, ratio * diameter)
    load = strength.line_load(9e4, 3, 1.2, 64, angle)
    assert load == pytest.approx(9e4 * 1.2 / 3 / 64 / sqrt(1.0 - (0.35 / ratio) ** 2))
    assert load > strength.canopy_load(9e4, 3, 1.2) / 64


@QUICK
@given(st.floats(1.0, 500.0), st.floats(1.0, 500.0))
def test_reduced_mass_is_under_the_lighter_and_the_same_both_ways(one: float, other: float) -> None:
    reduced = strength.reduced_mass(one, other)
    assert reduced == pytest.approx(strength.reduced_mass(other, one))
    assert reduced < min(one, other)


@QUICK
@given(st.floats(0.1, 60.0), st.floats(1e2, 1e6), st.floats(0.5, 500.0))
def test_snatch_stores_the_energy_of_the_two_bodies(speed: float, stiffness: float, mass: float) -> None:
    force = strength.snatch_force(speed, stiffness, mass)
    stretch = strength.snatch_stretch(speed, stiffness, mass)
    assert force == pytest.approx(stiffness * stretch)
    assert 0.5 * force * stretch == pytest.approx(0.5 * mass * speed**2)


def test_stiffness_reaches_the_strength_at_the_stretch_at_break() -> None:
    stiffness = strength.stretch_stiffness(64, 2000.0, 0.3, 15.5)
    assert stiffness * 0.3 * 15.5 == pytest.approx(strength.lines_strength(64, 2000.0))


def test_required_strength_has_no_margin_left() -> None:
    factor = strength.design_factor(1.5, 1.05, 0.8, 0.95, 0.95, 0.95)
    each = strength.required_strength(8e4, factor, 64)
    assert strength.safety_margin(each * 64, 8e4, factor) == pytest.approx(0.0, abs=1e-12)
    assert strength.safety_margin(each * 63, 8e4, factor) < 0.0


@QUICK
@given(st.integers(1, 16), st.floats(1.0, 3e3), st.floats(0.3, 1.0), st.floats(1.0, 1.5))
def test_tie_never_holds_more_than_its_most(strands: int, least: float, knot: float, spread: float) -> None:
    assert strength.tie_strength(strands, least, knot) <= strength.tie_strength_most(strands, least * spread)
