"""The main job end to end on a rig file: its numbers against figures worked out from the named sources alone."""

import math
from pathlib import Path

import pytest

from tests.model.checks.sample import Raw, findings

G0 = 9.80665
POUND, FOOT, KNOT = 0.45359237, 0.3048, 1852 / 3600


def test_standard_day_density_gives_the_rate_of_descent(tmp_path: Path) -> None:
    """Density at 1,500 m: 1.0581 kg/m3 (U.S. Standard Atmosphere 1976, table I); rate: Knacke, NWC TP 6575, ch. 5."""
    step = findings(tmp_path, lambda raw: raw["drop"].update(zone_elevation="1,500 m"))["descent.rate"]
    rate = math.sqrt(2 * 900 * G0 / (1.0581 * 0.8 * math.pi * 10**2))
    assert step.value == pytest.approx(rate, rel=5e-5)


def test_density_altitude_of_a_standard_day_is_the_height_of_the_zone(tmp_path: Path) -> None:
    """Definition of the density altitude, U.S. Standard Atmosphere 1976."""
    step = findings(tmp_path, lambda raw: raw["drop"].update(zone_elevation="2,500 m"))["zone.density_altitude"]
    assert step.value == pytest.approx(2500, abs=1e-6)


def test_least_base_loading(tmp_path: Path) -> None:
    """28 lb/ft2 on 4 ft x 4 ft is 448 lb (least base loading of containers, FM 4-20.147, 2003, ch. 4)."""

    def board(raw: Raw) -> None:
        raw["platform"] |= {"length": "4 ft", "width": "4 ft", "weighed": "448 lb"}

    step = findings(tmp_path, board)["load.base_loading"]
    assert step.value == pytest.approx(28 * POUND * G0 / FOOT**2, rel=1e-12)


def test_twelve_inches_of_honeycomb_stop_a_standard_descent_at_eighteen_g(tmp_path: Path) -> None:
    """28.5 ft/s on 12 in that crush by 70 %: 18.0 g (energy of the crush, common practice, no source)."""
    net = (28.5 * FOOT) ** 2 / (2 * G0 * 12 * 0.0254 * 0.7)
    assert net == pytest.approx(18.0, abs=0.05)
    weight = 800 * G0

    def pad(raw: Raw) -> None:
        raw["cushion"][0] |= {
            "layers": 4, "layer_thickness": "3 in", "area": "1 m2", "crush_stress": f"{weight * (net + 1)!r} Pa",
        }  # fmt: skip
        # A drag area that gives 28.5 ft/s at sea level: CdS = 2 m g0/(rho v^2).
        raw["canopy"][0].pop("diameter")
        raw["canopy"][0]["drag_area"] = f"{2 * 900 * G0 / (1.225 * (28.5 * FOOT) ** 2)!r} m2"
        raw["drop"]["release_height"] = "1,000 m"

    found = findings(tmp_path, pad)
    assert found["descent.rate"].value == pytest.approx(28.5 * FOOT, rel=1e-6)
    assert found["landing.deceleration"].value == pytest.approx(18.0, abs=0.05)
    # The motion ends at the same rate, so the pad is used up to its last bit.
    assert found["landing.crush_reserve"].value == pytest.approx(1.0, rel=1e-4)


def test_true_airspeed_at_release_drives_the_opening(tmp_path: Path) -> None:
    """130 kt indicated at 3,000 m: density 0.90925 kg/m3 (U.S. Standard Atmosphere 1976, table I), true 150.9 kt."""

    def high(raw: Raw) -> None:
        raw["drop"] |= {"zone_elevation": "2,000 m", "release_height": "1,000 m", "airspeed": "130 kt"}
        raw["exit"]["line_stretch"] = "0 s"

    found = findings(tmp_path, high)
    # At release line stretch is at once, so the equivalent airspeed is the indicated one.
    assert found["opening.speed"].value == pytest.approx(130 * KNOT, rel=1e-9)


def test_sling_angle_and_the_load_of_equal_legs(tmp_path: Path) -> None:
    """Four equal legs at 60 deg carry 1.155/4 of the load each (sling angle factors, trade tables)."""

    def centred(raw: Raw) -> None:
        for one in raw["item"]:
            one["centre"] = ["0 m", "0 m", "0.5 m"]
        rise = math.tan(math.radians(60)) * math.hypot(0.8, 0.4) + 0.2
        raw["suspension"] |= {"apex": ["0 m", "0 m", f"{rise!r} m"], "legs_carrying": 4}

    found = findings(tmp_path, centred)
    pull = found["opening.load_factor"].value
    assert pull is not None
    assert found["suspension.leg_angle"].value == pytest.approx(60.0, rel=1e-12)
    assert found["suspension.leg"].value == pytest.approx(64e3 / (1.155 / 4 * pull * 900 * G0), rel=3e-4)
