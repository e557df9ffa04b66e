from datetime import date
from pathlib import Path

import pytest

from model.checks.finding import Verdict
from model.checks.small_parts import age_in_years
from tests.model.checks.sample import Raw, drogue_first, findings


def test_ties_hold_with_the_knot_and_break_without_it(tmp_path: Path) -> None:
    found = findings(tmp_path)
    assert found["tie.bag tie.holds"].value == pytest.approx(2 * 400 * 0.6)
    assert found["tie.bag tie.breaks"].value == pytest.approx(2 * 500)


def test_a_tie_that_is_too_strong_fails(tmp_path: Path) -> None:
    found = findings(tmp_path, lambda raw: raw["tie"][0].update(strands=3))
    assert found["tie.bag tie.breaks"].verdict is Verdict.FAIL
    assert found["tie.bag tie.holds"].verdict is Verdict.PASS


def test_a_tie_without_its_limits_is_open(tmp_path: Path) -> None:
    found = findings(tmp_path, lambda raw: [raw["tie"][0].pop(key) for key in ("holds_at_least", "breaks_by")])
    assert found["tie.bag tie.holds"].verdict is Verdict.OPEN
    assert found["tie.bag tie.breaks"].verdict is Verdict.OPEN


@pytest.mark.parametrize(
    ("field", "key"), [("strand_strength", "holds"), ("knot_efficiency", "holds"), ("strand_strength_most", "breaks")]
)
def test_missing_fields_of_a_tie_are_named(tmp_path: Path, field: str, key: str) -> None:
    found = findings(tmp_path, lambda raw: raw["tie"][0].pop(field))
    assert found[f"tie.bag tie.{key}"].reason == f"data missing: tie 1 (bag tie) {field}"


def test_names_with_dots_keep_their_steps(tmp_path: Path) -> None:
    found = findings(tmp_path, lambda raw: raw["tie"][0].update(name="no. 4"))
    assert found["tie.no. 4.holds"].verdict is Verdict.PASS


def test_only_ground_releases_are_early_or_late(tmp_path: Path) -> None:
    found = findings(tmp_path, lambda raw: raw["device"][0].update(kind="cutter"))
    assert "device.release.early" not in found
    assert "device.release.late" not in found
    assert found["device.release.expires"].verdict is Verdict.PASS


def test_a_device_of_unknown_kind_may_be_a_ground_release(tmp_path: Path) -> None:
    found = findings(tmp_path, lambda raw: raw["device"][0].pop("kind"))
    for key in ("early", "late"):
        assert found[f"device.release.{key}"].reason == "data missing: device 1 (release) kind"


def test_arming_too_early_or_too_late_fails(tmp_path: Path) -> None:
    assert (
        findings(tmp_path, lambda raw: raw["device"][0].update(arms_after="5 s"))["device.release.early"].verdict
        is Verdict.FAIL
    )
    assert (
        findings(tmp_path, lambda raw: raw["device"][0].update(arms_after="58 s"))["device.release.late"].verdict
        is Verdict.FAIL
    )
    step = findings(tmp_path, lambda raw: raw["device"][0].pop("arms_after"))["device.release.early"]
    assert step.reason == "data missing: device 1 (release) arms_after"


@pytest.mark.parametrize(
    ("expires", "days", "verdict"),
    [
        (date(2026, 9, 16), 0, Verdict.PASS),
        (date(2026, 9, 15), -1, Verdict.FAIL),
        (date(2028, 9, 16), 731, Verdict.PASS),
    ],
)
def test_life_left_on_the_day_of_the_drop(tmp_path: Path, expires: date, days: int, verdict: Verdict) -> None:
    step = findings(tmp_path, lambda raw: raw["device"][0].update(expires=expires))["device.release.expires"]
    assert (step.value, step.unit, step.verdict) == (days, "d", verdict)


def test_one_limit_holds_for_all_packs(tmp_path: Path) -> None:
    found = findings(tmp_path, drogue_first)
    for serial in ("A-1", "D-1"):
        assert found[f"service.repack.{serial}"].value == 31
        assert found[f"service.repack.{serial}"].limit is not None


def test_repack_counts_days_over_a_leap_day(tmp_path: Path) -> None:
    def leap(raw: Raw) -> None:
        raw["drop"]["date"] = date(2028, 3, 1)
        raw["pack"][0]["packed"] = date(2028, 2, 28)

    assert findings(tmp_path, leap)["service.repack.A-1"].value == 2


@pytest.mark.parametrize(
    ("made", "on", "age"),
    [
        (date(2016, 9, 16), date(2026, 9, 16), 10),
        (date(2016, 9, 17), date(2026, 9, 16), 9 + 364 / 365),
        (date(2026, 9, 16), date(2026, 9, 16), 0),
        (date(2020, 2, 29), date(2021, 2, 28), 365 / 366),
        (date(2020, 2, 29), date(2021, 3, 1), 1),
        (date(2020, 2, 29), date(2024, 2, 29), 4),
        (date(2020, 2, 29), date(2024, 2, 28), 3 + 364 / 365),
        (date(2019, 5, 1), date(2020, 4, 30), 365 / 366),
        (date(1, 1, 1), date(9999, 12, 31), 9998 + 364 / 365),
    ],
)
def test_age_in_calendar_years(made: date, on: date, age: float) -> None:
    assert age_in_years(made, on) == pytest.approx(age, abs=1e-12)


def test_twelve_years_to_the_day_pass_a_limit_of_twelve_years_and_a_day_more_fails(tmp_path: Path) -> None:
    found = findings(tmp_path, lambda raw: raw["pack"][0].update(made=date(2014, 9, 16)))
    assert found["service.age.A-1"].verdict is Verdict.PASS
    assert found["service.age.A-1"].value == 12
    found = findings(tmp_path, lambda raw: raw["pack"][0].update(made=date(2014, 9, 15)))
    assert found["service.age.A-1"].verdict is Verdict.FAIL


def test_fewer_packs_than_canopies_are_open(tmp_path: Path) -> None:
    def three(raw: Raw) -> None:
        raw["canopy"][0] |= {"count": 3, "cluster_efficiency": 0.9, "uneven_share": 1.2}

    assert findings(tmp_path)["service.packs"].verdict is Verdict.PASS
    step = findings(tmp_path, three)["service.packs"]
    assert step.verdict is Verdict.OPEN
    assert "2 of 3 packs" in step.reason
    assert step.value == pytest.approx(1 / 3)
    assert findings(tmp_path, lambda raw: raw.pop("pack"))["service.packs"].verdict is Verdict.OPEN


def test_missing_dates_are_named(tmp_path: Path) -> None:
    found = findings(tmp_path, lambda raw: [raw["pack"][0].pop(key) for key in ("made", "packed")])
    assert found["service.repack.A-1"].reason == "data missing: pack 1 (A-1) packed"
    assert found["service.age.A-1"].reason == "data missing: pack 1 (A-1) made"
