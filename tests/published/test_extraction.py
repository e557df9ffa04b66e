"""Extraction ratios against a published parachute table; exits and base loading against worked figures."""

from math import radians

import pytest

from model.physics import air, balance, drag, extraction

POUND, FOOT, KNOT = 0.45359237, 0.3048, 1852.0 / 3600.0
LBF, PSF = POUND * 9.80665, POUND * 9.80665 / FOOT**2
RINGSLOT = 0.55
"""Drag coefficient of a ringslot extraction parachute, from memory of Knacke, NWC TP 6575, table 5-2."""

# Weights lb, count and diameter ft: FM 4-20.102 (June 2006), table 9-1. Pull at 130 kt, ratios at both ends: derived.
TABLE_9_1 = [
    (2520, 8000, 1, 15, 5561, 2.21, 0.70), (7000, 17000, 1, 22, 11962, 1.71, 0.70),
    (16000, 30000, 1, 28, 19377, 1.21, 0.65), (28000, 42000, 2, 28, 38754, 1.38, 0.92),
]  # fmt: skip


def _pressure(knots: float) -> float:
    return float(drag.dynamic_pressure(air.SEA_LEVEL_DENSITY, knots * KNOT))


@pytest.mark.parametrize(("light", "heavy", "count", "feet", "pull", "most", "least"), TABLE_9_1)
def test_weights_of_the_table_give_usable_ratios(
    light: float, heavy: float, count: int, feet: float, pull: float, most: float, least: float
) -> None:
    area = drag.drag_area(RINGSLOT, drag.circle_area(feet * FOOT))
    force = extraction.extraction_force(_pressure(130.0), area, count)
    assert force / LBF == pytest.approx(pull, rel=2e-4)
    ratios = [extraction.extraction_ratio(_pressure(130.0), area, count, pounds * POUND) for pounds in (light, heavy)]
    assert ratios == pytest.approx([most, least], abs=0.006)
    # The heavy ends sit at the usual floor of 0.7 g or just about it (from memory).
    assert 0.6 < ratios[1] < 1.0 < ratios[0]
    assert extraction.extraction_line_load(_pressure(130.0), area, count, 1.05) == pytest.approx(1.05 * force)


def test_pull_grows_with_the_square_of_the_airspeed() -> None:
    # derived: 57.2 psf at 130 kt; 16 % more at 140 kt, 33 % at 150 kt. 2739.490 and 3647.250 Pa: 1.225 kg/m3.
    assert _pressure(130.0) == pytest.approx(2739.490, abs=1e-3)
    assert _pressure(150.0) == pytest.approx(3647.250, abs=1e-3)
    assert _pressure(130.0) / PSF == pytest.approx(57.2, abs=0.05)
    assert _pressure(140.0) / _pressure(130.0) == pytest.approx(1.16, abs=0.005)
    assert _pressure(150.0) / _pressure(130.0) == pytest.approx(1.33, abs=0.005)


@pytest.mark.parametrize(("net", "seconds"), [(0.5, 2.23), (0.7, 1.88), (1.0, 1.58), (1.5, 1.29)])
def test_exit_over_forty_feet(net: float, seconds: float) -> None:
    # derived: from rest at a constant net acceleration.
    assert extraction.exit_time(40.0 * FOOT, net * 9.80665) == pytest.approx(seconds, abs=0.006)


def test_gravity_release_down_a_sloping_deck() -> None:
    # derived: 7 deg, friction 0.03: 2.96 ft/s2, 40 ft in 5.2 s.
    acceleration = extraction.roller_acceleration(radians(7.0), 0.03)
    assert acceleration / FOOT == pytest.approx(2.96, abs=0.005)
    assert extraction.exit_time(40.0 * FOOT, acceleration) == pytest.approx(5.2, abs=0.05)


@pytest.mark.parametrize(("length", "width", "pounds"), [(42, 48, 392), (48, 48, 448), (48, 96, 896)])
def test_least_base_loading_of_a_container(length: float, width: float, pounds: float) -> None:
    # 28 lb/ft2 for containers: FM 4-20.147 (2003), ch. 4; weights derived.
    inch = FOOT / 12.0
    assert balance.base_loading(pounds * POUND, length * inch, width * inch) / PSF == pytest.approx(28.0)
