"""Overturning of a landing load against derived figures and the motion of the block itself."""

from math import atan2, cos, hypot

import pytest
from scipy.integrate import solve_ivp

from model.physics import overturn

INCH, FOOT, KNOT, G0 = 0.0254, 0.3048, 1852.0 / 3600.0, 9.80665

# derived: rigid uniform block, in. Base, centre of gravity, rigged height; ft/s, kt.
FIGURES = [(108, 40, 80, 23.4, 13.9), (108, 60, 120, 16.4, 9.7), (48, 30, 60, 9.9, 5.9)]


def _tipping(base: float, height: float, rigged: float) -> float:
    inertia = overturn.tipping_inertia(base, height, rigged)
    return float(overturn.tipping_speed(overturn.tipping_rise(base, height), inertia, height))


@pytest.mark.parametrize(("base", "height", "rigged", "feet", "knots"), FIGURES)
def test_tipping_speeds(base: float, height: float, rigged: float, feet: float, knots: float) -> None:
    speed = _tipping(base * INCH, height * INCH, rigged * INCH)
    assert speed / FOOT == pytest.approx(feet, abs=0.06)
    assert speed / KNOT == pytest.approx(knots, abs=0.06)


@pytest.mark.parametrize(("height", "factor"), [(40.0, 1.35), (60.0, 0.90)])
def test_load_factor_that_tips_an_unlashed_load(height: float, factor: float) -> None:
    # derived: base 108 in; 0.90 is below a sideways restraint factor of 1.5, so lashings must hold the moment.
    assert overturn.static_tipping_factor(108.0, height) == pytest.approx(factor)


@pytest.mark.parametrize(("base", "height", "rigged"), [(2.74, 1.0, 2.0), (1.2, 0.8, 1.5), (2.0, 0.4, 1.1)])
@pytest.mark.parametrize(("share", "tips"), [(0.999, False), (1.001, True)])
def test_block_caught_by_its_edge(base: float, height: float, rigged: float, share: float, tips: bool) -> None:
    # Independent: the impact keeps the angular momentum about the edge, then the block turns about it as a pendulum.
    inertia = (base / 2) ** 2 + height**2 + (base**2 + rigged**2) / 12.0
    speed = share * _tipping(base, height, rigged)
    radius, start = hypot(base / 2, height), atan2(height, base / 2)

    def motion(_time: float, state: list[float]) -> list[float]:
        return [state[1], -G0 * radius * cos(state[0]) / inertia]

    def over(_time: float, state: list[float]) -> float:
        return state[0] - atan2(1.0, 0.0)

    def back(_time: float, state: list[float]) -> float:
        return state[1]

    over.terminal = back.terminal = True  # type: ignore[attr-defined]
    turned = solve_ivp(motion, (0.0, 60.0), [start, speed * height / inertia], events=[over, back], rtol=1e-10)
    assert (len(turned.t_events[0]) == 1) is tips
    assert (len(turned.t_events[1]) == 1) is not tips
