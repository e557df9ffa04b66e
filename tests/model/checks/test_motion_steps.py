"""Steps that rest on the motion, against flights set up by hand and figures worked out here."""

import math
from dataclasses import replace
from pathlib import Path

import numpy as np
import pytest

from model.checks.finding import Verdict
from model.physics.day_air import DayAir
from model.physics.flight import Drop, Filling, Motion, Row, solve
from tests.model.checks.sample import G0, Raw, drogue_first, extracted, findings

RHO0 = 1.225
AREA = 0.8 * math.pi * 100.0
RULES = ("time", "distance")


def by_hand(height: float = 500.0) -> Drop:
    """The sample's drop, from the numbers of its file."""
    air = DayAir.at(0.0)
    filling = Filling(area=AREA, fill_distance=8 * 20.0, exponent=2.0, opening_coefficient=1.7)
    return Drop(
        mass=900.0,
        airspeed=60.0 * math.sqrt(RHO0 / float(air.density(height))),
        release_height=height,
        load_drag_area=2.0,
        rows=(Row((filling,), static_line=5.0 + 16.0 + 1.0),),
        density=lambda z: np.asarray(air.density(z)),
        winds=((0.0, 4.0),),
    )


def flights(drop: Drop) -> list[Motion]:
    return [solve(drop, rule) for rule in RULES]


def force(drop: Drop) -> float:
    return max(float(one.opening_force.max()) for one in flights(drop))


def test_opening_steps_take_the_rule_with_the_larger_force(tmp_path: Path) -> None:
    found, pull = findings(tmp_path), force(by_hand())
    assert found["opening.load_factor"].value == pytest.approx(pull / (900 * G0), rel=1e-12)
    assert found["opening.canopy"].value == pytest.approx(150e3 / pull, rel=1e-12)
    assert found["suspension.link"].value == pytest.approx(150e3 / pull, rel=1e-12)
    cone = math.asin(0.35 * 20 / 16)
    assert found["opening.line"].value == pytest.approx(2500 / (pull / (64 * math.cos(cone))), rel=1e-12)


def test_height_steps_take_the_rule_with_the_larger_loss_and_add_the_swing(tmp_path: Path) -> None:
    found, flown = findings(tmp_path), flights(by_hand())
    worst = min(flown, key=lambda one: float(one.slow_height[0]))
    swing = 0.6 * (16 + 1) * math.cos(float(worst.line_stretch_angle[0, 0]))
    loss = 500 - float(worst.slow_height[0]) + swing
    assert found["height.opening_loss"].value == pytest.approx(loss, rel=1e-12)
    assert found["height.reserve"].value == pytest.approx(500 - loss, rel=1e-12)
    assert found["descent.time"].value == pytest.approx(float(worst.touchdown_time[0]), rel=1e-12)
    assert found["descent.drift"].value == pytest.approx(float(worst.touchdown_distance[0]), rel=1e-12)
    assert found["device.release.early"].value == pytest.approx(15 / float(worst.end_time[-1, 0]), rel=1e-12)
    assert found["device.release.late"].value == pytest.approx(float(worst.touchdown_time[0]) / 15, rel=1e-12)


def test_no_swing_without_a_line_length_and_a_caution(tmp_path: Path) -> None:
    def known_stretch(raw: Raw) -> None:
        raw["exit"]["line_stretch"] = "1.5 s"
        raw["canopy"][0].pop("line_length")

    step = findings(tmp_path, known_stretch)["height.opening_loss"]
    drop = replace(by_hand(), rows=(replace(by_hand().rows[0], static_line=None, line_stretch=1.5),))
    low = min(float(one.slow_height[0]) for one in flights(drop))
    assert step.value == pytest.approx(500 - low, rel=1e-12)
    assert any("swing" in one for one in step.cautions)


def test_rate_of_descent_is_the_closed_form_in_the_air_of_the_zone(tmp_path: Path) -> None:
    assert findings(tmp_path)["descent.rate"].value == pytest.approx(math.sqrt(2 * 900 * G0 / (RHO0 * AREA)), rel=1e-6)


def test_a_drag_area_in_place_of_a_diameter_gives_the_same(tmp_path: Path) -> None:
    def area(raw: Raw) -> None:
        raw["canopy"][0].pop("diameter")
        raw["canopy"][0]["drag_area"] = f"{AREA!r} m2"

    known, other = findings(tmp_path), findings(tmp_path, area)
    for key in ("descent.rate", "opening.load_factor", "opening.line", "height.opening_loss"):
        assert other[key].value == pytest.approx(known[key].value, rel=1e-9), key


def test_cluster_and_one_canopy_out(tmp_path: Path) -> None:
    def three(raw: Raw) -> None:
        raw["canopy"][0] |= {"count": 3, "cluster_efficiency": 0.9, "uneven_share": 1.25}

    found = findings(tmp_path, three)
    cluster = 3 * 0.9 * AREA
    assert found["descent.rate"].value == pytest.approx(math.sqrt(2 * 900 * G0 / (RHO0 * cluster)), rel=1e-6)
    out = 2 * 0.9 * AREA
    assert found["descent.rate_one_out"].value == pytest.approx(math.sqrt(2 * 900 * G0 / (RHO0 * out)), rel=1e-6)
    pull = found["opening.load_factor"].value
    assert pull is not None
    assert found["opening.canopy"].value == pytest.approx(150e3 / (pull * 900 * G0 / 3 * 1.25), rel=1e-12)


def test_one_out_exists_only_for_more_than_one_main(tmp_path: Path) -> None:
    assert "descent.rate_one_out" not in findings(tmp_path)
    assert "descent.rate_one_out" not in findings(tmp_path, drogue_first)


def test_the_canopy_that_is_out_is_one_of_the_row_with_the_largest_area(tmp_path: Path) -> None:
    def unlike(raw: Raw) -> None:
        drogue_first(raw, "stays")
        raw["canopy"][0] |= {"role": "main", "diameter": "6 m"}

    found = findings(tmp_path, unlike)
    small = 0.5 * math.pi * 9
    assert found["descent.rate"].value == pytest.approx(math.sqrt(2 * 910 * G0 / (RHO0 * (AREA + small))), rel=1e-6)
    assert found["descent.rate_one_out"].value == pytest.approx(math.sqrt(2 * 910 * G0 / (RHO0 * small)), rel=1e-6)


@pytest.mark.parametrize(("leaves", "own"), [("stays", 0.5 * math.pi * 2.25), ("goes at start", 0.0)])
def test_a_drogue_counts_at_the_end_only_where_it_stays(tmp_path: Path, leaves: str, own: float) -> None:
    step = findings(tmp_path, lambda raw: drogue_first(raw, leaves))["descent.rate"]
    assert step.value == pytest.approx(math.sqrt(2 * 910 * G0 / (RHO0 * (AREA + own))), rel=1e-6)


def test_missing_cluster_figures_leave_steps_open(tmp_path: Path) -> None:
    found = findings(tmp_path, lambda raw: raw["canopy"][0].update(count=2))
    assert found["descent.rate"].reason == "data missing: canopy row 1 (main) cluster_efficiency"


def test_snatch_force_from_the_given_speed(tmp_path: Path) -> None:
    stiffness = 64 * 2500 / (0.3 * 16)
    reduced = 100 * 800 / 900
    snatch = 20 * math.sqrt(stiffness * reduced)
    assert findings(tmp_path)["opening.snatch"].value == pytest.approx(64 * 2500 / snatch, rel=1e-12)


def test_snatch_speed_of_a_static_line_is_the_load_against_the_aircraft(tmp_path: Path) -> None:
    step = findings(tmp_path, lambda raw: raw["canopy"][0].pop("snatch_speed"))["opening.snatch"]
    speed = float(flights(by_hand())[0].line_stretch_relative_speed[0, 0])
    snatch = speed * math.sqrt(64 * 2500 / (0.3 * 16) * 100 * 800 / 900)
    assert step.value == pytest.approx(64 * 2500 / snatch, rel=1e-12)


def test_snatch_speed_must_be_given_elsewhere(tmp_path: Path) -> None:
    def timer(raw: Raw) -> None:
        raw["exit"] |= {"canopy_pulled_by": "timer", "line_stretch": "2 s"}
        raw["canopy"][0].pop("snatch_speed")

    def later(raw: Raw) -> None:
        drogue_first(raw)
        raw["canopy"][1].pop("snatch_speed")

    def drawn(raw: Raw) -> None:
        extracted(raw)
        raw["canopy"][0].pop("snatch_speed")

    assert findings(tmp_path, timer)["opening.snatch"].reason == "data missing: canopy row 1 (main) snatch_speed"
    assert findings(tmp_path, later)["opening.snatch"].reason == "data missing: canopy row 2 (main) snatch_speed"
    assert findings(tmp_path, drawn)["opening.snatch"].reason == "data missing: canopy row 1 (main) snatch_speed"


def test_without_any_snatch_the_step_is_open(tmp_path: Path) -> None:
    step = findings(tmp_path, lambda raw: raw["canopy"][0].update(snatch_speed="0 m/s"))["opening.snatch"]
    assert step.verdict is Verdict.OPEN
    assert "no snatch" in step.reason


def test_lines_shorter_than_the_mouth_are_said(tmp_path: Path) -> None:
    step = findings(tmp_path, lambda raw: raw["canopy"][0].update(line_length="5 m"))["opening.line"]
    assert step.verdict is Verdict.OPEN
    assert "shorter" in step.reason


def test_equivalent_airspeed_at_line_stretch(tmp_path: Path) -> None:
    speed = max(float(one.line_stretch_equivalent_speed[0, 0]) for one in flights(by_hand()))
    step = findings(tmp_path)["opening.speed"]
    assert step.value == pytest.approx(speed, rel=1e-12)
    assert step.limit is not None
    assert step.limit.maximum == 75


def test_every_row_is_held_to_its_own_rated_speed(tmp_path: Path) -> None:
    def slow_drogue(raw: Raw) -> None:
        drogue_first(raw)
        raw["canopy"][0]["rated_speed"] = "40 m/s"

    step = findings(tmp_path, slow_drogue)["opening.speed"]
    assert step.verdict is Verdict.FAIL
    assert step.limit is not None
    assert step.limit.maximum == 40


def test_the_limit_set_holds_for_a_row_without_a_rated_speed(tmp_path: Path) -> None:
    def unrated(raw: Raw) -> None:
        drogue_first(raw)
        raw["canopy"][0].pop("rated_speed")

    def low(raw: Raw) -> None:
        raw["limits"]["opening.speed"]["max"] = "50 m/s"

    def none(raw: Raw) -> None:
        raw["limits"].pop("opening.speed")

    assert findings(tmp_path, unrated, low)["opening.speed"].verdict is Verdict.FAIL
    step = findings(tmp_path, unrated, none)["opening.speed"]
    assert (step.verdict, step.reason) == (Verdict.OPEN, "data missing: canopy row 1 (drogue) rated_speed")


def test_no_rated_speed_and_no_limit_is_no_limit_set(tmp_path: Path) -> None:
    step = findings(
        tmp_path, lambda raw: raw["canopy"][0].pop("rated_speed"), lambda raw: raw["limits"].pop("opening.speed")
    )["opening.speed"]
    assert (step.verdict, step.reason) == (Verdict.OPEN, "no limit set")


def test_a_load_that_lands_first_fails_every_step_that_rests_on_opening(tmp_path: Path) -> None:
    found = findings(tmp_path, lambda raw: raw["drop"].update(release_height="40 m"))
    for key, one in found.items():
        if one.group in ("opening", "suspension", "height") or key == "device.release.early":
            assert (one.verdict, one.reason) == (Verdict.FAIL, "lands before it is open"), key
            assert one.margin is None, key
    assert found["opening.load_factor"].value is None
    assert found["height.reserve"].value is None
    assert found["suspension.leg_angle"].value == pytest.approx(72.28, abs=0.01)


def test_it_fails_them_whatever_else_is_missing(tmp_path: Path) -> None:
    def bare(raw: Raw) -> None:
        raw["drop"]["release_height"] = "40 m"
        for key in ("strength", "lines", "rated_speed"):
            raw["canopy"][0].pop(key)

    found = findings(tmp_path, bare)
    for key in ("opening.canopy", "opening.line", "opening.snatch", "opening.speed"):
        assert found[key].verdict is Verdict.FAIL, key


def test_a_load_that_opens_but_is_still_fast_at_the_ground_fails_the_height_steps(tmp_path: Path) -> None:
    quick = replace(by_hand().rows[0].fillings[0], fill_distance=2 * 20.0)
    for height in range(10, 80):
        drop = by_hand(float(height))
        flown = flights(replace(drop, rows=(replace(drop.rows[0], fillings=(quick,)),)))
        if not any(one.landed_early[0] for one in flown) and any(np.isnan(one.slow_height[0]) for one in flown):
            break
    else:
        pytest.fail("no such height")

    def low(raw: Raw) -> None:
        raw["drop"]["release_height"] = f"{height} m"
        raw["canopy"][0]["fill_constant"] = 2

    found = findings(tmp_path, low)
    assert found["height.opening_loss"].verdict is Verdict.FAIL
    assert "1.05" in found["height.opening_loss"].reason
    assert found["opening.load_factor"].value is not None


def test_a_load_that_never_slows_to_the_rate_lands_faster_than_it(tmp_path: Path) -> None:
    found = findings(tmp_path, lambda raw: raw["drop"].update(release_height="40 m"))
    assert found["landing.crush_reserve"].verdict is Verdict.FAIL


def test_a_cutter_before_its_filling_ends_says_the_area_reached(tmp_path: Path) -> None:
    def reefed(raw: Raw) -> None:
        raw["canopy"][0]["reefing"] = [{
            "drag_ratio": 0.3, "cutter": "0.5 s", "fill_constant": 17, "growth_exponent": 1, "opening_coefficient": 1.0,
        }]  # fmt: skip

    found = findings(tmp_path, reefed)
    cut = [one for one in found["opening.load_factor"].cautions if "cut short at" in one]
    assert len(cut) == 1
    assert cut[0].startswith("canopy row 1 (main): filling 1")


def test_a_cutter_that_is_early_under_one_rule_alone_is_said_too(tmp_path: Path) -> None:
    # Filling at falling speed takes longer by distance than by time: between the two only one rule is cut short.
    stage = {"drag_ratio": 0.3, "fill_constant": 17, "growth_exponent": 1, "opening_coefficient": 1.0}
    first = Filling(area=0.3 * AREA, fill_distance=17 * 20 * math.sqrt(0.3), exponent=1.0)
    last = Filling(area=AREA, fill_distance=8 * 20 * math.sqrt(0.7), opening_coefficient=1.7, cutter=30.0)
    drop = by_hand()
    flown = flights(replace(drop, rows=(replace(drop.rows[0], fillings=(first, last)),)))
    times = sorted(float(one.fill_time[0, 0]) for one in flown)
    assert times[1] > times[0] + 0.1
    between = sum(times) / 2

    def reefed(raw: Raw) -> None:
        raw["canopy"][0]["reefing"] = [stage | {"cutter": f"{between} s"}]

    assert any("cut short at" in one for one in findings(tmp_path, reefed)["opening.load_factor"].cautions)


def test_a_stretched_filling_estimate_carries_a_caution(tmp_path: Path) -> None:
    assert not any("outside its range" in one for one in findings(tmp_path)["opening.load_factor"].cautions)
    slow = findings(tmp_path, lambda raw: raw["drop"].update(airspeed="20 m/s"))["opening.load_factor"]
    assert any("filling estimate outside its range" in one for one in slow.cautions)


def test_a_figure_of_the_table_carries_a_caution_and_is_the_middle_of_its_range(tmp_path: Path) -> None:
    step = findings(tmp_path, lambda raw: raw["canopy"][0].pop("drag_coefficient"))["descent.rate"]
    assert any("table figure, from memory" in one for one in step.cautions)
    area = (0.75 + 0.80) / 2 * math.pi * 100
    assert step.value == pytest.approx(math.sqrt(2 * 900 * G0 / (RHO0 * area)), rel=1e-6)


def test_no_figure_in_the_table_leaves_it_open(tmp_path: Path) -> None:
    def other(raw: Raw) -> None:
        raw["canopy"][0]["type"] = "other"
        raw["canopy"][0].pop("fill_constant")

    step = findings(tmp_path, other)["opening.load_factor"]
    assert step.verdict is Verdict.OPEN
    assert "canopy row 1 (main) fill_constant" in step.reason


def test_canopies_outside_the_handbook_class_say_so(tmp_path: Path) -> None:
    assert not any("class" in one for one in findings(tmp_path)["opening.canopy"].cautions)
    light = findings(tmp_path, lambda raw: raw["canopy"][0].update(diameter="40 m"))["opening.canopy"]
    assert any("outside the class of the handbook figures" in one for one in light.cautions)


def test_extraction_takes_the_speed_lost_off_before_release(tmp_path: Path) -> None:
    def slower(raw: Raw) -> None:
        extracted(raw)
        raw["exit"]["extraction"]["speed_lost"] = "10 m/s"

    def other(raw: Raw) -> None:
        extracted(raw)
        raw["drop"]["airspeed"] = "50 m/s"

    less, direct = findings(tmp_path, slower), findings(tmp_path, other)
    assert less["opening.load_factor"].value == pytest.approx(direct["opening.load_factor"].value, rel=1e-9)
    pull = 0.5 * RHO0 * 60**2 * 0.6 * math.pi * 6.25
    assert less["extraction.ratio"].value == pytest.approx(pull / (920 * G0), rel=1e-12)
    assert less["extraction.line"].value == pytest.approx(80e3 / (pull * 1.05), rel=1e-12)
    assert less["extraction.attachment"].value == pytest.approx(60e3 / (pull * 1.05), rel=1e-12)


def test_extraction_steps_exist_only_with_that_method(tmp_path: Path) -> None:
    assert not any(key.startswith("extraction.") for key in findings(tmp_path))
    assert sum(key.startswith("extraction.") for key in findings(tmp_path, extracted)) == 3


@pytest.mark.parametrize(
    ("edit", "field"),
    [
        (lambda raw: raw.pop("exit"), "exit"),
        (lambda raw: raw["exit"].pop("method"), "exit.method"),
        (lambda raw: raw["exit"].pop("canopy_pulled_by"), "exit.canopy_pulled_by"),
        (lambda raw: raw["exit"].pop("static_line"), "exit.static_line"),
        (lambda raw: raw["drop"].pop("airspeed"), "drop.airspeed"),
        (lambda raw: raw["drop"].pop("zone_elevation"), "drop.zone_elevation"),
        (lambda raw: raw["drop"].pop("release_height"), "drop.release_height"),
        (lambda raw: raw["canopy"][0].pop("diameter"), "canopy row 1 (main) diameter"),
        (lambda raw: raw["canopy"][0].pop("mass"), "canopy row 1 (main) mass"),
    ],
)
def test_fields_the_motion_needs_are_named(tmp_path: Path, edit: object, field: str) -> None:
    def bare(raw: Raw) -> None:
        edit(raw)  # type: ignore[operator]
        if "mass" in field:
            raw["platform"].pop("weighed")

    step = findings(tmp_path, bare)["opening.load_factor"]
    assert (step.verdict, step.reason) == (Verdict.OPEN, f"data missing: {field}")


def test_deployment_time_of_a_later_row_is_needed(tmp_path: Path) -> None:
    def bare(raw: Raw) -> None:
        drogue_first(raw)
        raw["canopy"][1].pop("deployment_time")

    step = findings(tmp_path, bare)["height.reserve"]
    assert step.reason == "data missing: canopy row 2 (main) deployment_time"


def test_a_set_height_is_turned_into_a_true_one_by_the_mean_temperature(tmp_path: Path) -> None:
    """Warm air: the device opens higher, set x mean temperature / standard mean (common practice, no source)."""

    def fixed(raw: Raw) -> None:
        drogue_first(raw)
        raw["drop"] |= {"release_height": "3,000 m", "zone_temperature": "35 °C"}
        raw["canopy"][1].pop("opens_after")
        raw["canopy"][1]["opens_at_set_height"] = "1,000 m"

    # Geopotential of 1,000 m is 999.843 m; a lapse of 6.5 K/km makes the standard mean 288.15 - 3.24949 K.
    standard = 288.15 - 0.0065 * (6356766 * 1000 / (6356766 + 1000)) / 2
    height = 1000 * (standard + 20.0) / standard

    def true(raw: Raw) -> None:
        fixed(raw)
        raw["canopy"][1].pop("opens_at_set_height")
        raw["canopy"][1]["opens_at_height"] = f"{height!r} m"

    set_to, opened = findings(tmp_path, fixed), findings(tmp_path, true)
    for key in ("height.opening_loss", "descent.time", "opening.load_factor"):
        assert set_to[key].value == pytest.approx(opened[key].value, rel=1e-6), key


def test_drift_needs_a_wind_and_is_negative_against_it(tmp_path: Path) -> None:
    step = findings(tmp_path, lambda raw: raw["drop"].pop("surface_wind"))["descent.drift"]
    assert step.reason == "data missing: drop.surface_wind"
    headwind = findings(tmp_path, lambda raw: raw["drop"].update(surface_wind="-12 m/s"))["descent.drift"]
    assert headwind.value is not None
    assert headwind.value < 0


def test_the_load_factor_without_the_opening_coefficient_stands_in_brackets(tmp_path: Path) -> None:
    plain = max(float(one.opening_force_plain.max()) for one in flights(by_hand())) / (900 * G0)
    step = findings(tmp_path)["opening.load_factor"]
    assert f"(without the opening coefficient {plain:.4g} g)" in step.notes
    assert step.value == pytest.approx(plain * 1.7, rel=1e-3)
