"""Overturning of a block: limits that a formula must keep."""

from math import isinf

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from model.physics import overturn

QUICK = settings(deadline=None, max_examples=50)

length = st.floats(0.2, 10.0)


def tipping(base: float, height: float, rigged: float) -> float:
    inertia = overturn.tipping_inertia(base, height, rigged)
    return float(overturn.tipping_speed(overturn.tipping_rise(base, height), inertia, height))


@QUICK
@given(length, length, st.floats(1.0, 2.5), st.floats(1.01, 2.0))
def test_wider_base_tips_later_and_size_goes_with_the_root(
    base: float, height: float, over: float, more: float
) -> None:
    speed = tipping(base, height, over * height)
    assert tipping(base * more, height, over * height) > speed
    assert tipping(base * more, height * more, over * height * more) == pytest.approx(speed * more**0.5)


@QUICK
@given(length, length)
def test_block_falls_on_from_its_tipping_point(base: float, height: float) -> None:
    rise = overturn.tipping_rise(base, height)
    assert height + rise == pytest.approx(np.hypot(base / 2, height))
    assert rise > 0.0


def test_centre_at_the_deck_or_below_never_tips() -> None:
    assert isinf(tipping(2.0, 0.0, 1.0))
    assert isinf(tipping(2.0, -0.1, 1.0))
    speeds = overturn.tipping_speed(np.array([0.5, 0.4]), np.array([1.0, 1.0]), np.array([-0.2, 0.5]))
    assert np.isinf(speeds).tolist() == [True, False]


@QUICK
@given(length, length)
def test_static_factor_is_the_slope_of_the_line_to_the_edge(base: float, height: float) -> None:
    factor = overturn.static_tipping_factor(base, height)
    assert np.arctan(factor) == pytest.approx(np.arctan2(base / 2, height))
