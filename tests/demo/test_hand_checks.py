"""Numbers of the demo rigs by arithmetic of the test's own.

Every figure is the one written in the rig file; the arithmetic stands beside it and uses no formula of the program.
Sources of the formulas: air, U.S. Standard Atmosphere 1976 with the altimeter setting taken to the zone by its
troposphere law, vapour pressure by Buck (1981); the rest is statics and the definition of a drag area.
"""

from __future__ import annotations

from datetime import date
from math import asin, atan2, cos, degrees, exp, hypot, pi, radians, sin, sqrt
from typing import ClassVar

import numpy as np
import pytest

from tests.demo.scenario import finding, value

LB, FT, IN, KT, LBF, G0 = 0.45359237, 0.3048, 0.0254, 1852 / 3600, 4.4482216152605, 9.80665
PSF = LBF / FT**2


def close(found: float, expected: float) -> None:
    assert found == pytest.approx(expected, rel=1e-6, abs=1e-12)


def density(elevation: float, celsius: float, setting: float, dew_point: float | None = None) -> float:
    """Air at a zone, kg/m3, from its elevation in m, temperature and dew point in degC and altimeter setting in hPa."""
    gas = 8314.32 / 28.9644
    n = G0 / (gas * 0.0065)
    height = 6_356_766.0 * elevation / (6_356_766.0 + elevation)
    pressure: float = 101_325.0 * ((setting / 1013.25) ** (1 / n) - 0.0065 * height / 288.15) ** n
    vapour = 0.0 if dew_point is None else 611.21 * exp(17.502 * dew_point / (240.97 + dew_point))
    return (pressure - 0.378 * vapour) / (gas * (celsius + 273.15))


def rate(mass: float, drag_area: float, rho: float) -> float:
    """Steady descent, m/s."""
    return sqrt(2 * mass * G0 / (rho * drag_area))


def round_area(diameter: float) -> float:
    return pi * diameter**2 / 4


class TestMedicalBundle:
    NAME = "01-medical-bundle"
    # Masses in lb, heights of their centres over the deck in in.
    PARTS: ClassVar[dict[str, float]] = {
        "skid": 18, "dressings": 142, "vials": 58, "honeycomb": 5, "sling": 14, "legs": 9, "canopy": 21,
    }  # fmt: skip
    Z: ClassVar[dict[str, float]] = {
        "skid": -0.375, "dressings": 17, "vials": 19, "honeycomb": 4.5, "sling": 15, "legs": 26, "canopy": 28,
    }  # fmt: skip

    def test_mass_and_the_scale(self) -> None:
        assert sum(self.PARTS.values()) == 267
        close(value(self.NAME, "load.mass"), 268 * LB)
        close(value(self.NAME, "load.weighed"), 1 / 267)

    def test_centre_of_gravity(self) -> None:
        # Only the vials stand off the middle: 58 lb at 0.5 in.
        close(value(self.NAME, "balance.forward"), 58 * 0.5 / 267 * IN)
        assert value(self.NAME, "balance.side") == 0
        height = sum(self.PARTS[part] * self.Z[part] for part in self.PARTS) / 267
        # Over the underside of the 0.75 in skid, against its width of 24 in.
        close(value(self.NAME, "balance.slenderness"), (height + 0.75) / 24)

    def test_rate_of_descent(self) -> None:
        rho = density(1180 * FT, 16, 1016, 9)
        close(value(self.NAME, "descent.rate"), rate(268 * LB, 0.75 * round_area(28 * FT), rho))

    def test_landing(self) -> None:
        # Over the stack: all but skid and canopy. 0.9 ft2 at 6,200 lb/ft2 pushes with 5,580 lbf.
        over = 268 - 21 - 18
        net = 0.9 * 6200 / over - 1
        close(value(self.NAME, "landing.deceleration"), net)
        close(value(self.NAME, "landing.fragility"), 35 / net)
        # The speed of descent.rate: three layers of 3 in at 70 % stop it with so much to spare.
        needed = value(self.NAME, "descent.rate") ** 2 / (2 * G0 * net)
        assert value(self.NAME, "landing.crush_reserve") == pytest.approx(3 * 3 * IN * 0.7 / needed, rel=1e-3)

    def test_suspension(self) -> None:
        # Legs from (13, 9, 22) in to (0, 0, 58) in.
        close(value(self.NAME, "suspension.leg_angle"), degrees(asin(36 / sqrt(13**2 + 9**2 + 36**2))))
        without = {part: mass for part, mass in self.PARTS.items() if part != "canopy"}
        mass = sum(without.values())
        height = sum(without[part] * self.Z[part] for part in without) / mass
        close(value(self.NAME, "suspension.tilt"), degrees(atan2(58 * 0.5 / mass, 58 - height)))

    def test_tie(self) -> None:
        close(value(self.NAME, "tie.bag closing tie.holds"), 2 * 50 * 0.6 * LBF)
        close(value(self.NAME, "tie.bag closing tie.breaks"), 2 * 65 * LBF)

    def test_dates(self) -> None:
        drop = date(2026, 11, 26)
        close(value(self.NAME, "service.repack.R-4471"), (drop - date(2026, 9, 28)).days)
        close(value(self.NAME, "service.age.R-4471"), 5 + (drop - date(2026, 3, 10)).days / 365)


class TestGrainContainer:
    NAME = "02-grain-container"

    def test_mass_and_loading(self) -> None:
        close(value(self.NAME, "load.mass"), 1996 * LB)
        close(value(self.NAME, "load.weighed"), 1996 / (62 + 1680 + 32 + 58 + 36 + 122) - 1)
        close(value(self.NAME, "load.base_loading"), 1996 / 16 * PSF)
        close(value(self.NAME, "load.suspended_per_canopy"), (1996 - 122) * LB)
        close(value(self.NAME, "load.height"), 67 * IN)

    def test_rate_of_descent(self) -> None:
        rho = density(820 * FT, 14, 1018)
        close(value(self.NAME, "descent.rate"), rate(1996 * LB, 0.75 * round_area(64 * FT), rho))

    def test_a_centred_load_hangs_on_two_legs_of_four(self) -> None:
        # Legs from (22, 22, 54) in to (0, 0, 112) in; each of two carries F/(2 sin b).
        sine = 58 / sqrt(22**2 + 22**2 + 58**2)
        force = value(self.NAME, "opening.load_factor") * 1996 * LBF
        close(value(self.NAME, "suspension.leg_angle"), degrees(asin(sine)))
        close(value(self.NAME, "suspension.leg"), 6000 * 4 * 0.8 * LBF / (force / (2 * sine)))
        close(value(self.NAME, "suspension.attachment"), 20000 * LBF / (force / (2 * sine)))
        close(value(self.NAME, "suspension.link"), 36000 * LBF / force)

    def test_canopy_and_line(self) -> None:
        force = value(self.NAME, "opening.load_factor") * 1996 * LBF
        close(value(self.NAME, "opening.canopy"), 32000 * LBF / force)
        # Half cone angle: sin = 0.35 x 64/51.
        cosine = sqrt(1 - (0.35 * 64 / 51) ** 2)
        close(value(self.NAME, "opening.line"), 550 * LBF / (force / (64 * cosine)))

    def test_overturning(self) -> None:
        # A block 48 in wide, 67 in high over its underside; its centre without the canopy, over the deck.
        parts = {-0.5: 62, 31.0: 1680, 4.5: 32, 30.0: 58, 56.0: 36}
        h = sum(z * mass for z, mass in parts.items()) / sum(parts.values()) * IN
        half, height = 24 * IN, 67 * IN
        rise = hypot(half, h) - h
        inertia = half**2 + h**2 + ((2 * half) ** 2 + height**2) / 12
        close(value(self.NAME, "landing.overturn"), sqrt(2 * G0 * rise * inertia) / h / (7 * KT))


class TestTruck:
    NAME = "06-reefed-truck"
    FALLING = (12_260 - 58) * LB  # the extraction parachute does not stay

    def test_masses(self) -> None:
        parts = 1880 + 8150 + 620 + 165 + 210 + 260 + 190 + 3 * 240 + 58
        close(value(self.NAME, "load.weighed"), 12_260 / parts - 1)
        close(value(self.NAME, "load.suspended_per_canopy"), (self.FALLING - 720 * LB) / 3)

    def test_centre_of_gravity(self) -> None:
        moments = 8150 * 4 - 620 * 52 - 720 * 20
        close(value(self.NAME, "balance.forward"), moments / (1880 + 8150 + 620 + 165 + 210 + 260 + 190 + 720) * IN)

    def test_rate_of_descent_whole_and_one_out(self) -> None:
        rho = density(1640 * FT, 18, 1012, 10)
        one = 0.95 * 0.80 * round_area(100 * FT)
        close(value(self.NAME, "descent.rate"), rate(self.FALLING, 3 * one, rho))
        close(value(self.NAME, "descent.rate_one_out"), rate(self.FALLING, 2 * one, rho))

    def test_extraction(self) -> None:
        pull = 0.5 * 1.225 * (140 * KT) ** 2 * 0.56 * round_area(22 * FT)
        close(value(self.NAME, "extraction.ratio"), pull / (12_260 * LB * G0))
        close(value(self.NAME, "extraction.line"), 45_000 * LBF / (pull * 1.05))
        close(value(self.NAME, "extraction.attachment"), 36_000 * LBF / (pull * 1.05))

    def test_lashing(self) -> None:
        # Every chain holds 10,000 lbf; each row stands on both sides. Runs in in: along, across, down.
        along_forward, along_aft, across = (56, 16, 36), (48, 16, 36), (0, 24, 34)

        def share(run: tuple[int, int, int], axis: int) -> float:
            return run[axis] / sqrt(sum(part**2 for part in run))

        lashed = 12_260 - 1880 - 58
        close(value(self.NAME, "lashing.forward"), 3 * 2 * 10_000 * share(along_forward, 0) / (3.5 * lashed))
        close(value(self.NAME, "lashing.aft"), 2 * 2 * 10_000 * share(along_aft, 0) / (2.0 * lashed))
        side = 10_000 * (3 * share(along_forward, 1) + 2 * share(along_aft, 1) + 2 * share(across, 1))
        close(value(self.NAME, "lashing.left"), side / (1.5 * lashed))
        close(value(self.NAME, "lashing.right"), side / (1.5 * lashed))
        up = 2 * 10_000 * (3 * share(along_forward, 2) + 2 * share(along_aft, 2) + 2 * share(across, 2))
        close(value(self.NAME, "lashing.up"), up / (2.0 * lashed))

    def test_landing(self) -> None:
        # All rows have one crush stress, so the crush centre is that of the areas.
        over = 12_260 - 58 - 720 - 1880
        close(value(self.NAME, "landing.deceleration"), 30 * 6200 / over - 1)
        crush = (9 * 62 + 12 * 2 - 9 * 60) / 30
        load = (8150 * 4 - 620 * 52) / (8150 + 620 + 165 + 210 + 260 + 190)
        close(value(self.NAME, "landing.centre"), (crush - load) * IN)

    def test_legs_in_the_worst_of_five_pulls(self) -> None:
        # Elastic legs of one strength: t = k d (d . delta), k = 1/length, so that the sum of t d is F e.
        mass = 1880 + 8150 + 620 + 165 + 210 + 260 + 190
        moments = {-1.5: 1880, 44: 8150, 50: 620, 8: 165, 12: 210, 16: 260, 66: 190}
        centre = np.array([(8150 * 4 - 620 * 52) / mass, 0, sum(z * part for z, part in moments.items()) / mass])
        apex = np.array([-2.0, 0.0, 236.0])
        runs = apex - np.array([[x, y, 58.0] for x in (72, -72) for y in (36, -36)])
        lengths = np.linalg.norm(runs, axis=1)
        ways = runs / lengths[:, None]
        axis = (apex - centre) / np.linalg.norm(apex - centre)
        pulls = [axis]
        for aside in ([1.0, 0, 0], [-1.0, 0, 0], [0, 1.0, 0], [0, -1.0, 0]):
            across = np.array(aside) - np.dot(aside, axis) * axis
            pulls.append(cos(radians(10)) * axis + sin(radians(10)) * across / np.linalg.norm(across))
        stiff = (ways / lengths[:, None]).T @ ways
        loads = np.array([(ways @ np.linalg.solve(stiff, pull)) / lengths for pull in pulls])
        assert (loads > 0).all()  # no leg goes slack
        force = value(self.NAME, "opening.load_factor") * self.FALLING * G0
        most = force * loads.max()  # four legs carry
        close(value(self.NAME, "suspension.leg"), 15_000 * 6 * 0.8 * LBF / most)
        close(value(self.NAME, "suspension.tilt"), degrees(atan2(hypot(axis[0], axis[1]), axis[2])))
        # The links: plate under all, riser under the worst of three canopies, clevis under the worst leg.
        riser = force / 3 * 1.35
        close(
            value(self.NAME, "suspension.link"),
            min(150_000 * LBF / force, 60_000 * LBF / riser, 60_000 * LBF / most),
        )


class TestHighZone:
    NAME = "08-high-zone"

    def test_rate_of_descent_in_thin_air(self) -> None:
        rho = density(3400, 30, 1015, 2)
        assert rho == pytest.approx(0.764, abs=0.001)  # 38 % less than the standard air at the sea
        close(value(self.NAME, "descent.rate"), rate(1378 * LB, 0.76 * round_area(64 * FT), rho))

    def test_density_altitude(self) -> None:
        # Where the standard air has that density: rho0 (1 - 0.0065 H/288.15)^(n - 1), H turned geometric.
        gas = 8314.32 / 28.9644
        n = G0 / (gas * 0.0065)
        ratio = density(3400, 30, 1015, 2) / (101_325 / (gas * 288.15))
        height = (1 - ratio ** (1 / (n - 1))) * 288.15 / 0.0065
        close(value(self.NAME, "zone.density_altitude"), 6_356_766 * height / (6_356_766 - height))


class TestMeasuredWater:
    NAME = "10-measured-water"

    def test_the_measured_rate_gives_the_drag_area(self) -> None:
        # 2,080 lb came down at 28.3 ft/s in air of 1.196 kg/m3.
        drag_area = 2 * 2080 * LB * G0 / (1.196 * (28.3 * FT) ** 2)
        assert drag_area / round_area(64 * FT) == pytest.approx(0.696, abs=0.001)  # against 0.78 as entered
        close(value(self.NAME, "descent.rate"), rate(2098 * LB, drag_area, density(820 * FT, 17, 1015)))

    def test_the_measured_force_is_taken_as_it_is(self) -> None:
        close(value(self.NAME, "opening.load_factor"), 16_400 / 2098)
        close(value(self.NAME, "opening.canopy"), 32_000 / 16_400)


class TestGenerator:
    NAME = "11-generator-si"

    def test_readings_from_the_front_edge(self) -> None:
        # Moments aft of the front edge, then half of the 3.2 m less the result: forward of the middle.
        parts = {1.58: 1180, 1.9: 190, 1.6: 260 + 32 + 38 + 24 + 26 + 2 * 56}
        aft = sum(x * mass for x, mass in parts.items()) / sum(parts.values())
        close(value(self.NAME, "balance.forward"), 1.6 - aft)

    def test_rate_of_descent_whole_and_one_out(self) -> None:
        rho = density(250, 12, 1017, 6)
        one = 0.96 * 0.75 * round_area(19.5)
        close(value(self.NAME, "descent.rate"), rate(1868, 2 * one, rho))
        close(value(self.NAME, "descent.rate_one_out"), rate(1868, one, rho))

    def test_lashing(self) -> None:
        lashed = (1868 - 260) * G0
        chain_forward = 45_000 * 0.75 / hypot(0.75, 0.06)
        close(value(self.NAME, "lashing.forward"), 2 * chain_forward / (3.5 * lashed))
        chain_aft = 45_000 * 0.8 / hypot(0.8, 0.06)
        close(value(self.NAME, "lashing.aft"), 2 * chain_aft / (2.0 * lashed))
        close(value(self.NAME, "lashing.left"), 4 * 22_000 * 0.6 / hypot(0.6, 0.8) / (1.5 * lashed))


class TestPumps:
    def test_the_air_alone_makes_the_difference(self) -> None:
        cool, warm = density(30 * FT, 8, 1021, 4), density(2950 * FT, 31, 1009, 14)
        found = [value(name, "descent.rate") for name in ("04-pump-cool", "05-pump-warm")]
        close(found[0], rate(2084 * LB, 0.75 * round_area(64 * FT), cool))
        close(found[1] / found[0], sqrt(cool / warm))
        assert found[0] < 28 * FT < found[1]


class TestSmallFails:
    def test_flat_slings(self) -> None:
        # Legs from (62, 20, 24) in to (0, 0, 76) in.
        close(value("12-flat-slings", "suspension.leg_angle"), degrees(asin(52 / sqrt(62**2 + 20**2 + 52**2))))

    def test_thin_honeycomb(self) -> None:
        net = 6.4 * 6200 / (1871 - 122 - 96) - 1
        close(value("13-thin-honeycomb", "landing.deceleration"), net)
        stroke = value("13-thin-honeycomb", "descent.rate") ** 2 / (2 * G0 * net)
        assert value("13-thin-honeycomb", "landing.crush_reserve") == pytest.approx(2 * 3 * IN * 0.7 / stroke, rel=2e-2)

    def test_overdue_pack(self) -> None:
        found = finding("15-overdue-pack", "service.repack.R-2203")
        assert found.value == (date(2026, 12, 11) - date(2026, 1, 8)).days == 337
        assert (date(2026, 11, 20) - date(2026, 1, 8)).days < 330  # in date when it was rigged
