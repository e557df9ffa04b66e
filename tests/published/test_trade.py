"""What people in the trade know: the formulas must come out near it."""

import pytest

from model.physics import air, canopy, drag
from model.physics.day_air import DayAir

POUND, FOOT, KMH = 0.45359237, 0.3048, 1.0 / 3.6


def test_belly_down_skydiver_falls_at_about_two_hundred() -> None:
    # Area: the outline of a person lying down, traced on squared paper, about 850 in2 (Parachute Labs Inc., 1999, note
    # on frontal area). Drag coefficient: 1.0, the low end of 1.0 to 1.4 for a skydiver (diracdelta.co.uk, drag
    # coefficients), and 0.82, a cylinder ten diameters long across the flow (Aeronautical Engineer's Data Book,
    # fig. 5.13). None of them is worked back from a speed of fall.
    # Answer: belly down about 200 km/h (FAI, speed skydiving page), here read as 180 to 220.
    outline = 850.0 * 0.0254**2
    for coefficient in (0.82, 1.0):
        cds = drag.drag_area(coefficient, outline)
        speed = drag.terminal_speed(80.0, air.standard_density(2000.0), cds)
        assert 180.0 * KMH <= speed <= 220.0 * KMH
    # the table's high end comes out slower: its range is wider than that of the speeds
    assert drag.terminal_speed(80.0, air.standard_density(2000.0), drag.drag_area(1.4, outline)) < 180.0 * KMH


def test_fall_without_air_to_eight_hundred_and_fifty_starts_between_two_and_three_kilometres() -> None:
    # derived: h = V^2/(2 g0)
    height = drag.equivalent_fall_height(850.0 * KMH)
    assert 2000.0 < height < 3000.0
    assert drag.airless_fall_speed(height) == pytest.approx(850.0 * KMH, rel=1e-12)
    assert drag.airless_fall_speed(2000.0) < 850.0 * KMH < drag.airless_fall_speed(3000.0)


def test_low_velocity_landing_is_a_fall_of_under_thirteen_feet() -> None:
    # derived: 28.5 ft/s, h = V^2/(2 g0)
    assert round(float(drag.equivalent_fall_height(28.5 * FOOT)) / FOOT, 2) == 12.62


def test_density_altitude_is_near_the_field_rule() -> None:
    # common practice, no source: pressure altitude + 118.8 ft per °C over standard; 4,000 ft at 35 °C: 7,320 ft.
    # The rule is a straight line: 3 % over the exact value at 28 °C over standard, close near standard
    elevation = 4000.0 * FOOT
    got = DayAir.at(elevation, zone_temperature=35.0 + 273.15).density_altitude / FOOT
    standard = air.standard_temperature(air.geopotential_height(elevation))
    assert got == pytest.approx(4000.0 + 118.8 * (35.0 + 273.15 - standard), rel=0.03)
    assert got == pytest.approx(7320.0, rel=0.03)
    near = DayAir.at(elevation, zone_temperature=standard + 5.0).density_altitude / FOOT
    assert near == pytest.approx(4000.0 + 118.8 * 5.0, rel=0.005)


def test_rate_grows_past_the_low_velocity_limit_at_five_thousand_feet() -> None:
    # derived: 100 ft, CD0 0.75, 5,000 lb: 26.7 ft/s at sea level, 28.8 ft/s at 5,000 ft density altitude
    cds = drag.drag_area(0.75, drag.circle_area(100.0 * FOOT))
    for feet, rate in ((0.0, 26.7), (5000.0, 28.8)):
        assert drag.terminal_speed(5000.0 * POUND, air.standard_density(feet * FOOT), cds) / FOOT == pytest.approx(
            rate, abs=0.05
        )


def test_rate_of_boosters_scales_with_canopy_diameter() -> None:
    # NASA MSFC release 64-90: three of 115 ft, 88 ft/s at splashdown; three of 136 ft, 75 ft/s
    small, large = (
        drag.terminal_speed(7e4, 1.225, canopy.cluster_drag_area(3, 1.0, 0.6, drag.circle_area(feet * FOOT)))
        for feet in (115.0, 136.0)
    )
    assert 88.0 * large / small == pytest.approx(75.0, rel=0.02)


def test_two_of_three_canopies_fall_faster_by_the_root_of_three_halves() -> None:
    # Apollo 15, one of three mains out: 2.8 mph over the planned 19 to 22 mph (press; the plan from memory), 1.13 to
    # 1.15; the square-root law says 1.22, on the safe side by 6 to 9 %
    whole = canopy.cluster_drag_area(3, 1.0, 0.85, 565.0)
    ratio = drag.terminal_speed(5e3, 1.225, canopy.drag_area_one_out(whole, 3)) / drag.terminal_speed(5e3, 1.225, whole)
    assert ratio == pytest.approx(1.5**0.5, rel=1e-12)
    for planned in (19.0, 22.0):
        assert 1.05 < ratio / ((planned + 2.8) / planned) < 1.10


def test_ring_slot_container_canopy_is_a_high_velocity_one() -> None:
    # common practice, no source: high velocity is 70 to 90 ft/s; 26 ft ring-slot, CD0 0.60, 2,200 lb
    cds = drag.drag_area(0.60, drag.circle_area(26.0 * FOOT))
    assert 70.0 <= drag.terminal_speed(2200.0 * POUND, 1.225, cds) / FOOT <= 90.0


def test_indicated_airspeed_grows_to_true_by_two_percent_a_thousand_feet() -> None:
    # common practice, no source: true airspeed is 2 % over indicated for each 1,000 ft; the rule runs high, 1.5 to 2 %
    for feet in (2000.0, 5000.0, 10_000.0):
        surplus = air.true_airspeed(100.0, air.standard_density(feet * FOOT)) / 100.0 - 1.0
        assert 0.014 <= surplus / (feet / 1000.0) <= 0.02
