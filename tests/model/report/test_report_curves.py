"""The curves of a report: what they show agrees with the steps."""

from __future__ import annotations

from pathlib import Path

import numpy as np
import pytest

from model.checks.case import Case
from model.checks.checklist import check
from model.checks.finding import Checklist, Verdict
from model.quantity import Dimension, UnitSystem, parse
from model.report.chart import Bound, Chart
from model.report.flight_charts import case_history, flight_charts
from tests.model.report.report_cases import DEMO, PUMP, RIGS, checked

FLOWN = [path for path in DEMO if path.stem != "09-half-entered"]


def force_chart(path: Path, system: UnitSystem = UnitSystem.WRITTEN) -> Chart:
    return flight_charts(checked(path), system).charts[0].chart


@pytest.mark.parametrize("path", FLOWN, ids=lambda path: path.stem)
def test_the_peak_is_the_force_that_the_load_factor_rests_on(path: Path) -> None:
    case: Case = checked(path).details
    chart = force_chart(path, UnitSystem.SI)
    unit = {"N": 1.0, "kN": 1000.0}[chart.y_axis.unit]
    [peak] = chart.marks
    motions = [case.motions.motion(rule) for rule in case.motions.rules]
    assert peak.y * unit == pytest.approx(max(float(motion.opening_force.max()) for motion in motions), rel=1e-12)
    if not case.forces.measured_all():
        assert peak.y * unit == pytest.approx(case.forces.opening.value, rel=1e-12)
    highest = max(y for curve in chart.curves for y in curve.y)
    assert highest == pytest.approx(peak.y, rel=5e-3)
    assert highest <= peak.y * (1 + 1e-9)


@pytest.mark.parametrize("path", FLOWN, ids=lambda path: path.stem)
def test_a_peak_beyond_a_limit_is_a_step_that_fails(path: Path) -> None:
    checklist = checked(path)
    chart = force_chart(path)
    steps = {finding.key: finding for finding in checklist.findings}
    assert chart.limits
    for bound in chart.limits:
        key = "opening.load_factor" if bound.text.endswith(" g") else "opening.canopy"
        assert bound.is_broken_by(chart.marks[0].y) == (steps[key].verdict is Verdict.FAIL), bound


def test_a_force_beyond_its_limits_breaks_both_lines(tmp_path: Path) -> None:
    (tmp_path / "limits").mkdir()
    limits = (RIGS / "limits" / "tarn-low.toml").read_text(encoding="utf-8")
    limits = limits.replace('"opening.load_factor" = { max = "9 g"', '"opening.load_factor" = { max = "7 g"')
    (tmp_path / "limits" / "tarn-low.toml").write_text(limits, encoding="utf-8")
    rig = tmp_path / "pump.toml"
    rig.write_text(PUMP.read_text(encoding="utf-8").replace("32,000 lbf", "20,000 lbf"), encoding="utf-8")
    checklist = check(rig)
    chart = flight_charts(checklist, UnitSystem.WRITTEN).charts[0].chart
    verdicts = {finding.key: finding.verdict for finding in checklist.findings}
    assert verdicts["opening.load_factor"] is verdicts["opening.canopy"] is Verdict.FAIL
    assert [bound.label for bound in chart.limits] == ["7 g", "strength/1.5"]
    assert all(bound.is_broken_by(chart.marks[0].y) for bound in chart.limits)


def test_no_limit_set_means_no_line_but_the_strength_that_the_file_gives(tmp_path: Path) -> None:
    rig = tmp_path / "pump.toml"
    rig.write_text(PUMP.read_text(encoding="utf-8").replace('limits = "limits/tarn-low.toml"\n', ""), encoding="utf-8")
    chart = flight_charts(check(rig), UnitSystem.WRITTEN).charts[0].chart
    assert chart.limits == [Bound(pytest.approx(32_000.0), "strength")]


def test_both_rules_are_drawn_and_the_one_that_pulls_harder_leads() -> None:
    chart = force_chart(PUMP)
    assert [(curve.label, curve.role) for curve in chart.curves] == [("time rule", "main"), ("distance rule", "second")]


def test_a_measured_filling_time_leaves_one_curve() -> None:
    chart = force_chart(RIGS / "10-measured-water.toml")
    assert [curve.label for curve in chart.curves] == ["time rule"]


@pytest.mark.parametrize(
    ("system", "units"),
    [
        (UnitSystem.WRITTEN, ["lbf", "ft/s", "ft2"]),
        (UnitSystem.US, ["lbf", "ft/s", "ft2"]),
        (UnitSystem.SI, ["kN", "m/s", "m2"]),
    ],
)
def test_axes_and_numbers_stand_in_the_chosen_units(system: UnitSystem, units: list[str]) -> None:
    found = flight_charts(checked(PUMP), system).charts
    assert [one.chart.y_axis.unit for one in found] == units
    assert found[1].chart.x_axis.unit == ("m" if system is UnitSystem.SI else "ft")
    dimensions = (Dimension.FORCE, Dimension.SPEED, Dimension.AREA)
    for one, unit, dimension in zip(found, units, dimensions, strict=True):
        assert unit in one.said[0]
        if one.chart.marks:
            [mark] = one.chart.marks
            words = mark.text.removeprefix("peak ").removeprefix("at touchdown ").split(" at ")[0]
            assert parse(words, dimension).value == pytest.approx(parse(f"{mark.y} {unit}", dimension).value, rel=1e-3)


def test_the_opening_fills_the_picture_and_the_fall_goes_down_to_the_ground() -> None:
    force, descent, area = (one.chart for one in flight_charts(checked(PUMP), UnitSystem.SI).charts)
    case: Case = checked(PUMP).details
    landed = max(float(case.motions.motion(rule).touchdown_time[0]) for rule in case.motions.rules)
    assert force.x_range()[1] < landed / 2
    assert area.x_range() == force.x_range()
    assert descent.x_range() == pytest.approx((0.0, 381.0))
    assert descent.x_axis.falling


def test_a_history_is_the_motion_of_the_steps() -> None:
    case: Case = checked(PUMP).details
    for rule in case.motions.rules:
        flight, motion = case_history(case, rule), case.motions.motion(rule)
        assert flight.time[-1] == pytest.approx(float(motion.touchdown_time[0]), rel=1e-9)
        assert flight.w[-1] == pytest.approx(float(motion.touchdown_descent[0]), rel=1e-9)
        assert np.all(np.diff(flight.time) >= -1e-12)  # ends of one stretch and the next: alike but for rounding


def test_missing_data_are_named_in_place_of_curves() -> None:
    found = flight_charts(checked(RIGS / "09-half-entered.toml"), UnitSystem.WRITTEN)
    assert found.charts == ()
    assert found.reason.startswith("data missing: ")


def released_at(folder: Path, height: str) -> Checklist:
    """The pump released at another height."""
    (folder / "limits").mkdir()
    limits = (RIGS / "limits" / "tarn-low.toml").read_text(encoding="utf-8")
    (folder / "limits" / "tarn-low.toml").write_text(limits, encoding="utf-8")
    rig = folder / "low.toml"
    rig.write_text(PUMP.read_text(encoding="utf-8").replace("1,250 ft ± 50 ft", height), encoding="utf-8")
    return check(rig)


def test_a_load_that_lands_before_line_stretch_has_no_peak_and_says_so(tmp_path: Path) -> None:
    force = flight_charts(released_at(tmp_path, "20 ft"), UnitSystem.WRITTEN).charts[0]
    assert force.chart.drawable_marks() == []
    assert force.said[0] == "time rule: no canopy pulls before the load lands"


def test_a_load_that_lands_before_it_is_open_still_has_curves_and_no_strength_line(tmp_path: Path) -> None:
    checklist = released_at(tmp_path, "60 ft")
    assert next(one for one in checklist.findings if one.key == "opening.canopy").verdict is Verdict.FAIL
    found = flight_charts(checklist, UnitSystem.WRITTEN)
    assert len(found.charts) == 3
    assert [bound.label for bound in found.charts[0].chart.limits] == ["9 g"]
