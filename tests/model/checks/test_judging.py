import math
from pathlib import Path

import pytest
from hypothesis import given
from hypothesis import strategies as st

from model.checks.finding import Limit, Verdict, overall
from model.checks.step import tighter
from tests.model.checks.sample import Raw, findings

BOUNDS = st.one_of(st.none(), st.just(0.0), st.floats(-1e6, 1e6))


def test_margin_of_a_maximum_is_the_gap_over_it() -> None:
    assert Limit(None, 28.5, "x").margin(27.075) == pytest.approx(0.05)
    assert Limit(None, 28.5, "x").margin(29.925) == pytest.approx(-0.05)


def test_margin_of_a_minimum_is_the_gap_over_it() -> None:
    assert Limit(2.5, None, "x").margin(3.0) == pytest.approx(0.2)


def test_margin_of_two_bounds_is_the_lesser() -> None:
    assert Limit(2.0, 10.0, "x").margin(3.0) == pytest.approx(0.5)
    assert Limit(2.0, 10.0, "x").margin(9.0) == pytest.approx(0.1)


def test_negative_bounds_count_by_their_size() -> None:
    assert Limit(None, -2.0, "x").margin(-3.0) == pytest.approx(0.5)
    assert Limit(-4.0, None, "x").margin(-5.0) == pytest.approx(-0.25)


def test_bounds_of_different_sign_or_one_of_two_0_are_measured_by_half_their_distance() -> None:
    assert Limit(-3.0, 1.0, "x").margin(0.5) == pytest.approx(0.25)
    assert Limit(0.0, 4.0, "x").margin(1.0) == pytest.approx(0.5)
    assert Limit(-4.0, 0.0, "x").margin(-0.5) == pytest.approx(0.25)


def test_a_lone_bound_of_0_has_no_margin() -> None:
    assert Limit(0.0, None, "x").margin(5.0) is None
    assert Limit(None, 0.0, "x").margin(5.0) is None
    assert Limit(0.0, 0.0, "x").margin(0.0) is None


@given(BOUNDS, BOUNDS, st.floats(-1e6, 1e6))
def test_margin_is_negative_exactly_when_the_limit_does_not_hold(
    low: float | None, high: float | None, value: float
) -> None:
    limit = Limit(low, high, "x")
    margin = limit.margin(value)
    if margin is not None:
        assert (margin < 0) is (not limit.holds(value))


@given(st.floats(1e-3, 1e6))
def test_one_step_of_the_last_digit_past_a_bound_fails(bound: float) -> None:
    limit = Limit(None, bound, "x")
    past = math.nextafter(bound, math.inf)
    assert limit.holds(bound)
    assert not limit.holds(past)
    margin = limit.margin(past)
    assert margin is not None
    assert margin < 0


def test_tighter_takes_the_largest_minimum_and_the_smallest_maximum_with_both_sources() -> None:
    limit = tighter([Limit(1.0, 9.0, "rig file"), Limit(2.0, 10.0, "rule")])
    assert limit is not None
    assert (limit.minimum, limit.maximum) == (2.0, 9.0)
    assert limit.source == "rule; rig file"
    assert tighter([Limit(None, None, "x")]) is None


def test_verdict_of_several() -> None:
    assert overall([Verdict.PASS, Verdict.OPEN, Verdict.FAIL]) is Verdict.FAIL
    assert overall([Verdict.PASS, Verdict.OPEN, Verdict.NOT_COUNTED]) is Verdict.OPEN
    assert overall([Verdict.PASS, Verdict.NOT_COUNTED]) is Verdict.PASS
    assert overall([Verdict.NOT_COUNTED]) is Verdict.OPEN
    assert overall([]) is Verdict.OPEN


def test_a_step_without_a_limit_is_open_and_shows_its_value(tmp_path: Path) -> None:
    step = findings(tmp_path, limits=lambda raw: raw["limits"].pop("load.mass"))["load.mass"]
    assert (step.verdict, step.reason, step.value, step.margin) == (Verdict.OPEN, "no limit set", 900.0, None)


@pytest.mark.parametrize("key", ["zone.density_altitude", "descent.time", "descent.drift"])
def test_three_steps_are_for_information_where_no_limit_is_set(tmp_path: Path, key: str) -> None:
    step = findings(tmp_path, limits=lambda raw: raw["limits"].pop(key, None))[key]
    assert step.verdict is Verdict.NOT_COUNTED
    assert step.value is not None


def test_they_count_with_a_limit(tmp_path: Path) -> None:
    def low(raw: Raw) -> None:
        raw["limits"]["zone.density_altitude"] = {"max": "-10 m", "source": "rule"}
        raw["limits"]["descent.time"] = {"max": "10 s", "source": "rule"}

    found = findings(tmp_path, limits=low)
    assert found["zone.density_altitude"].verdict is Verdict.FAIL
    assert found["descent.time"].verdict is Verdict.FAIL


def test_an_unjudged_step_is_shown_and_not_counted(tmp_path: Path) -> None:
    def spare(raw: Raw) -> None:
        raw["limits"]["load.mass"] = {"max": "100 kg", "judged": False, "source": "house rule 3"}

    step = findings(tmp_path, limits=spare)["load.mass"]
    assert step.verdict is Verdict.NOT_COUNTED
    assert "house rule 3" in step.reason
    assert step.value == 900.0
    assert step.margin is None


def test_an_unjudged_step_without_its_data_is_not_counted_either(tmp_path: Path) -> None:
    def spare(raw: Raw) -> None:
        raw["limits"]["landing.overturn"] = {"judged": False, "source": "house rule 3"}

    step = findings(tmp_path, lambda raw: raw["drop"].pop("surface_wind"), spare)["landing.overturn"]
    assert step.verdict is Verdict.NOT_COUNTED
    assert "drop.surface_wind" in step.reason


def test_a_pass_by_less_than_five_hundredths_carries_a_caution(tmp_path: Path) -> None:
    def near(raw: Raw) -> None:
        raw["limits"]["load.mass"] = {"max": "940 kg", "source": "rule"}
        raw["limits"]["load.height"] = {"max": "1.2 m", "source": "rule"}

    found = findings(tmp_path, limits=near)
    assert any("margin under 5" in one for one in found["load.mass"].cautions)
    assert not any("margin" in one for one in found["load.height"].cautions)


def test_limits_of_the_rig_file_count_without_the_limit_set(tmp_path: Path) -> None:
    def bare(raw: Raw) -> None:
        raw["limits"].clear()

    found = findings(tmp_path, limits=bare)
    rated = found["load.suspended_per_canopy"]
    assert (rated.verdict, rated.limit) == (Verdict.PASS, Limit(200.0, 1000.0, "rig file", "kg"))
    assert rated.margin == pytest.approx(0.2)
    assert found["opening.speed"].limit == Limit(None, 75.0, "rig file", "m/s")
    assert found["tie.bag tie.holds"].limit == Limit(300.0, None, "rig file", "N")
    assert found["tie.bag tie.breaks"].limit == Limit(None, 1200.0, "rig file", "N")


def test_the_tighter_of_rig_file_and_limit_set_counts_either_way(tmp_path: Path) -> None:
    def both(raw: Raw) -> None:
        raw["limits"]["load.suspended_per_canopy"] = {"max": "790 kg", "source": "rule 12"}
        raw["limits"]["tie.bag tie.holds"] = {"min": "200 N", "source": "rule 13"}

    found = findings(tmp_path, limits=both)
    assert found["load.suspended_per_canopy"].verdict is Verdict.FAIL
    assert found["load.suspended_per_canopy"].limit == Limit(200.0, 790.0, "rig file; rule 12", "kg")
    assert found["tie.bag tie.holds"].limit == Limit(300.0, None, "rig file", "N")


def test_without_a_limit_set_nothing_of_it_passes_and_that_is_said(tmp_path: Path) -> None:
    from tests.model.checks.sample import checklist

    found = checklist(tmp_path, lambda raw: raw.pop("limits"))
    assert found.verdict is Verdict.OPEN
    assert found.limit_set == ""
    assert any("no limit set" in note for note in found.notes)


@pytest.mark.parametrize(("text", "key", "bound"), [
    ("20 g", "opening.load_factor", 20.0), ("9 g", "opening.load_factor", 9.0), ("40 deg", "suspension.tilt", 40.0),
    ("7 deg", "suspension.tilt", 7.0), ("120 d", "service.repack", 120.0), ("12 yr", "service.age", 12.0),
])  # fmt: skip
def test_a_bound_in_the_unit_of_its_step_is_the_number_that_was_written(
    tmp_path: Path, text: str, key: str, bound: float
) -> None:
    def limit(raw: Raw) -> None:
        raw["limits"][key] = {"max": text, "source": "rule"}

    found = findings(tmp_path, limits=limit)
    limits = [one.limit for one in found.values() if one.key.startswith(key)]
    assert limits
    assert all(one is not None and one.maximum == bound for one in limits)


def test_a_limit_for_a_tie_that_is_not_there_is_said(tmp_path: Path) -> None:
    from model.checks.checklist import check

    rigs = Path(__file__).parents[3] / "rigs"
    text = (rigs / "limits" / "tarn-low.toml").read_text(encoding="utf-8")
    (tmp_path / "limits").mkdir()
    extra = '"tie.relase tie.holds" = { min = "60 lbf", source = "house rule 1" }\n'
    at = text.index('"load.mass"')
    (tmp_path / "limits" / "tarn-low.toml").write_text(text[:at] + extra + text[at:], encoding="utf-8")
    rig = tmp_path / "05-pump-warm.toml"
    rig.write_text((rigs / rig.name).read_text(encoding="utf-8"), encoding="utf-8")
    assert any("tie.relase tie.holds" in note for note in check(rig).notes)
    assert not any("no such tie" in note for note in check(rigs / rig.name).notes)
