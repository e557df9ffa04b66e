"""Extraction and the way to the ramp."""

from math import atan, radians

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from model.physics import extraction

QUICK = settings(deadline=None, max_examples=50)


@QUICK
@given(st.floats(100.0, 6e3), st.floats(1.0, 100.0), st.integers(1, 3), st.floats(100.0, 3e4))
def test_ratio_is_the_pull_over_the_weight(pressure: float, area: float, count: int, mass: float) -> None:
    pull = extraction.extraction_force(pressure, area, count)
    assert extraction.extraction_ratio(pressure, area, count, mass) == pytest.approx(pull / (mass * 9.80665))
    assert extraction.extraction_line_load(pressure, area, count, 1.05) == pytest.approx(1.05 * pull)


@QUICK
@given(st.floats(1.0, 20.0), st.floats(0.2, 20.0))
def test_exit_time_covers_the_way(distance: float, acceleration: float) -> None:
    time = extraction.exit_time(distance, acceleration)
    assert 0.5 * acceleration * time**2 == pytest.approx(distance)


def test_load_stays_where_friction_holds_it() -> None:
    assert extraction.roller_acceleration(atan(0.03), 0.03) == pytest.approx(0.0, abs=1e-12)
    assert extraction.roller_acceleration(radians(1.0), 0.03) < 0.0
    assert np.all(np.diff(extraction.roller_acceleration(np.radians([2.0, 4.0, 7.0]), 0.03)) > 0.0)
