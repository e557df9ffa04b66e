import math
from pathlib import Path

import pytest

from model.checks.finding import Verdict
from tests.model.checks.sample import G0, Raw, drogue_first, extracted, findings


def value(folder: Path, key: str, *edits: object) -> float:
    def edit(raw: Raw) -> None:
        for one in edits:
            one(raw)  # type: ignore[operator]

    found = findings(folder, edit)[key]
    assert found.value is not None, found.reason
    return found.value


def not_weighed(raw: Raw) -> None:
    raw["platform"].pop("weighed")


def test_rigged_mass_is_the_sum_of_all_parts(tmp_path: Path) -> None:
    assert value(tmp_path, "load.mass", not_weighed) == 100 + 600 + 100 + 100
    assert value(tmp_path, "load.mass", extracted, not_weighed) == 920
    assert value(tmp_path, "load.mass", drogue_first, not_weighed) == 910


def test_several_canopies_weigh_count_times_one(tmp_path: Path) -> None:
    def three(raw: Raw) -> None:
        raw["canopy"][0] |= {"count": 3, "cluster_efficiency": 0.9, "uneven_share": 1.2}

    assert value(tmp_path, "load.mass", not_weighed, three) == 1100


def test_the_scale_goes_before_the_sum(tmp_path: Path) -> None:
    def heavier(raw: Raw) -> None:
        raw["platform"]["weighed"] = "945 kg"

    assert value(tmp_path, "load.mass", heavier) == 945
    assert value(tmp_path, "load.weighed", heavier) == pytest.approx(45 / 900)
    assert value(tmp_path, "load.suspended_per_canopy", heavier) == 845
    # The parts only place the centre of gravity.
    assert value(tmp_path, "balance.forward", heavier) == pytest.approx(90 / 900)


def test_without_a_scale_its_step_is_open(tmp_path: Path) -> None:
    step = findings(tmp_path, not_weighed)["load.weighed"]
    assert (step.verdict, step.reason) == (Verdict.OPEN, "data missing: platform.weighed")


def test_outer_sizes(tmp_path: Path) -> None:
    def wide(raw: Raw) -> None:
        raw["platform"] |= {"overall_width": "1.3 m", "overhang_front": "0.2 m", "overhang_rear": "0.1 m"}

    assert value(tmp_path, "load.height") == pytest.approx(1.1)
    assert value(tmp_path, "load.width") == 1.0
    assert value(tmp_path, "load.width", wide) == 1.3
    assert value(tmp_path, "load.length", wide) == pytest.approx(2.3)
    assert value(tmp_path, "load.base_loading", wide) == pytest.approx(900 * G0 / 2)


def test_suspended_mass_is_shared_by_all_mains_and_leaves_canopies_out(tmp_path: Path) -> None:
    def two(raw: Raw) -> None:
        raw["canopy"][0] |= {"count": 2, "cluster_efficiency": 0.9, "uneven_share": 1.2}
        raw["platform"]["weighed"] = "1,000 kg"

    assert value(tmp_path, "load.suspended_per_canopy", two) == 400
    assert value(tmp_path, "load.suspended_per_canopy", drogue_first) == 800


def test_an_extraction_parachute_is_rigged_and_falls_only_where_it_stays(tmp_path: Path) -> None:
    def stays(raw: Raw) -> None:
        raw["exit"]["extraction"]["stays"] = True

    assert value(tmp_path, "load.suspended_per_canopy", extracted) == 800
    assert value(tmp_path, "load.suspended_per_canopy", extracted, stays) == 820
    gone = value(tmp_path, "descent.rate", extracted)
    kept = value(tmp_path, "descent.rate", extracted, stays)
    assert kept / gone == pytest.approx(math.sqrt(920 / 900))


def test_an_extraction_without_its_parachute_is_no_sum(tmp_path: Path) -> None:
    def bare(raw: Raw) -> None:
        extracted(raw)
        not_weighed(raw)
        raw["exit"].pop("extraction")

    step = findings(tmp_path, bare)["load.mass"]
    assert (step.verdict, step.reason) == (Verdict.OPEN, "data missing: exit.extraction")


def test_whether_the_parachute_stays_must_be_said(tmp_path: Path) -> None:
    def silent(raw: Raw) -> None:
        extracted(raw)
        raw["exit"]["extraction"].pop("stays")

    found = findings(tmp_path, silent)
    assert found["load.mass"].value == 920
    assert found["descent.rate"].reason == "data missing: exit.extraction.stays"


def test_centre_of_gravity_by_moments(tmp_path: Path) -> None:
    assert value(tmp_path, "balance.forward") == pytest.approx(0.9 * 100 / 900)
    assert value(tmp_path, "balance.side") == pytest.approx(-0.3 * 100 / 900)
    height = (100 * -0.05 + 600 * 0.5 + 100 * 0.2 + 100 * 1.0) / 900
    assert value(tmp_path, "balance.slenderness") == pytest.approx((height + 0.1) / 1.0)


def test_slenderness_takes_the_smaller_side_and_needs_no_height_of_the_load(tmp_path: Path) -> None:
    def narrow(raw: Raw) -> None:
        raw["platform"].pop("height")
        raw["platform"]["length"] = "0.5 m"

    height = (100 * -0.05 + 600 * 0.5 + 100 * 0.2 + 100 * 1.0) / 900
    assert value(tmp_path, "balance.slenderness", narrow) == pytest.approx((height + 0.1) / 0.5)


def test_a_measured_balance_point_replaces_x_and_y_of_the_sum(tmp_path: Path) -> None:
    def balanced(raw: Raw) -> None:
        raw["platform"]["balanced_at"] = ["0.05 m", "0.02 m"]

    assert value(tmp_path, "balance.forward", balanced) == 0.05
    assert value(tmp_path, "balance.side", balanced) == 0.02
    assert value(tmp_path, "balance.slenderness", balanced) == value(tmp_path, "balance.slenderness")


def test_readings_from_the_front_edge(tmp_path: Path) -> None:
    def taped(raw: Raw) -> None:
        platform = raw["platform"]
        platform["measure_from"] = "front edge"
        places = [platform, *raw["item"], *raw["canopy"], raw["suspension"], *raw["leg"], *raw["cushion"]]
        for part in (*places, *raw["lashing"]):
            for key in ("centre", "at", "apex", "deck", "load"):
                if key in part:
                    part[key][0] = f"{1.0 - float(part[key][0].split()[0]):.6f} m"

    straight, measured = findings(tmp_path), findings(tmp_path, taped)
    for key, one in straight.items():
        if one.value is None or one.unit not in ("m", "1", "deg", "g0"):
            continue
        assert measured[key].value == pytest.approx(one.value, rel=1e-9, abs=1e-9), key


@pytest.mark.parametrize(
    ("edit", "key", "field"),
    [
        (lambda raw: raw["item"][1].pop("centre"), "balance.forward", "item 2 (tools) centre"),
        (lambda raw: raw["canopy"][0].pop("centre"), "balance.side", "canopy row 1 (main) centre"),
        (lambda raw: raw["platform"].pop("width"), "load.base_loading", "platform.width"),
        (lambda raw: raw.pop("platform"), "load.length", "platform"),
        (lambda raw: raw["item"][0].pop("mass"), "load.weighed", "item 1 (crate) mass"),
        (lambda raw: raw.pop("item"), "balance.forward", "item"),
    ],
)
def test_missing_fields_are_named(tmp_path: Path, edit: object, key: str, field: str) -> None:
    step = findings(tmp_path, edit)[key]  # type: ignore[arg-type]
    assert (step.verdict, step.reason, step.value) == (Verdict.OPEN, f"data missing: {field}", None)


def test_a_platform_left_out_on_purpose_still_weighs_what_is_given(tmp_path: Path) -> None:
    def spared(raw: Raw) -> None:
        not_weighed(raw)
        raw["left_out"] = [{"part": "platform", "why": "no base to judge"}]

    def bundle(raw: Raw) -> None:
        spared(raw)
        raw["platform"].pop("mass")

    found = findings(tmp_path, spared)
    assert found["load.mass"].value == 900
    assert found["load.width"].verdict is Verdict.NOT_COUNTED
    assert findings(tmp_path, bundle)["load.mass"].value == 800


def test_no_main_canopy_is_missing_data(tmp_path: Path) -> None:
    step = findings(tmp_path, lambda raw: raw["canopy"][0].update(role="drogue"))["load.suspended_per_canopy"]
    assert step.verdict is Verdict.OPEN


def second_main(raw: Raw) -> None:
    """Put a main before the main, both hanging open at the end; the first has no rating."""
    drogue_first(raw, "stays")
    raw["canopy"][0]["role"] = "main"


def test_every_main_row_is_held_to_its_own_rating(tmp_path: Path) -> None:
    step = findings(tmp_path, second_main)["load.suspended_per_canopy"]
    assert (step.value, step.verdict) == (400, Verdict.OPEN)
    assert step.reason == "data missing: canopy row 1 (main) rated_mass"

    def small(raw: Raw) -> None:
        second_main(raw)
        raw["canopy"][0]["rated_mass"] = ["20 kg", "300 kg"]

    step = findings(tmp_path, small)["load.suspended_per_canopy"]
    assert (step.verdict, step.limit and step.limit.maximum) == (Verdict.FAIL, 300)


def test_a_side_without_a_bound_is_said_where_the_value_lies_on_it(tmp_path: Path) -> None:
    def aft(raw: Raw) -> None:
        raw["item"][0]["centre"][0] = "-2 m"

    def forward_alone(raw: Raw) -> None:
        raw["limits"]["balance.forward"] = {"max": "0.1 m", "source": "rule 3"}

    step = findings(tmp_path, aft, forward_alone)["balance.forward"]
    assert step.value is not None
    assert (step.value < 0, step.verdict) == (True, Verdict.PASS)
    assert "the limit has no minimum" in step.cautions[0]
    two_sided = findings(tmp_path, lambda raw: raw["item"][0]["centre"].__setitem__(0, "-0.01 m"))["balance.forward"]
    assert not any("no minimum" in one for one in two_sided.cautions)
