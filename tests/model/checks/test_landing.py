import math
from pathlib import Path

import pytest

from model.checks.finding import Verdict
from tests.model.checks.sample import G0, Raw, findings

RATE = math.sqrt(2 * 900 * G0 / (1.225 * 0.8 * math.pi * 100))


def pad(raw: Raw, **changes: object) -> None:
    raw["cushion"][0].update(changes)


def test_net_deceleration_stroke_and_fragility(tmp_path: Path) -> None:
    found = findings(tmp_path)
    net = 150e3 / (800 * G0) - 1
    assert found["landing.deceleration"].value == pytest.approx(net, rel=1e-12)
    assert found["landing.deceleration"].unit == "g0"
    assert found["landing.fragility"].value == pytest.approx(50 / net, rel=1e-12)
    needed = RATE**2 / (2 * G0 * net)
    assert found["landing.crush_reserve"].value == pytest.approx(3 * 0.1 * 0.7 / needed, rel=1e-5)


def test_a_platform_under_the_stack_is_not_stopped_by_it(tmp_path: Path) -> None:
    found = findings(tmp_path, lambda raw: pad(raw, lies="under the load"))
    assert found["landing.deceleration"].value == pytest.approx(150e3 / (700 * G0) - 1, rel=1e-12)


def test_rows_add_their_forces_and_the_thinnest_gives_the_stroke(tmp_path: Path) -> None:
    def two(raw: Raw) -> None:
        raw["cushion"].append(
            raw["cushion"][0] | {"name": "second", "layers": 2, "area": "0.1 m2", "at": ["-0.5 m", "0 m"]}
        )

    found = findings(tmp_path, two)
    net = 180e3 / (800 * G0) - 1
    assert found["landing.deceleration"].value == pytest.approx(net, rel=1e-12)
    assert found["landing.crush_reserve"].value == pytest.approx(2 * 0.1 * 0.7 / (RATE**2 / (2 * G0 * net)), rel=1e-5)
    middle = (0.1 * 150 - 0.5 * 30) / 180
    assert found["landing.centre"].value == pytest.approx(math.hypot(middle - 90 / 800, 30 / 800), rel=1e-9)


def test_a_stack_that_bottoms_never_leaves_deceleration_or_fragility_passing(tmp_path: Path) -> None:
    found = findings(tmp_path, lambda raw: pad(raw, layers=1))
    assert found["landing.crush_reserve"].verdict is Verdict.FAIL
    for key in ("landing.deceleration", "landing.fragility"):
        assert found[key].verdict is Verdict.FAIL
        assert "bottoms" in found[key].reason
        assert found[key].value is not None
        assert found[key].margin is None


def test_it_fails_them_without_any_limit_too(tmp_path: Path) -> None:
    found = findings(tmp_path, lambda raw: pad(raw, layers=1), lambda raw: raw["limits"].clear())
    assert found["landing.deceleration"].verdict is Verdict.FAIL
    assert found["landing.fragility"].verdict is Verdict.FAIL
    assert found["landing.crush_reserve"].verdict is Verdict.OPEN


def test_a_stack_weaker_than_the_weight_cannot_stop_the_load(tmp_path: Path) -> None:
    found = findings(tmp_path, lambda raw: pad(raw, area="0.02 m2"))
    for key in ("landing.deceleration", "landing.fragility", "landing.crush_reserve"):
        assert found[key].verdict is Verdict.FAIL
        assert "cannot stop" in found[key].reason
        assert found[key].margin is None
    assert found["landing.fragility"].value is None
    assert found["landing.crush_reserve"].value is None


def test_a_stack_that_is_too_hard_says_which_way_to_go(tmp_path: Path) -> None:
    step = findings(tmp_path, lambda raw: pad(raw, area="2 m2"))["landing.deceleration"]
    assert step.verdict is Verdict.FAIL
    assert "less area" in step.reason


def test_a_stack_that_is_too_soft_says_which_way_to_go(tmp_path: Path) -> None:
    step = findings(tmp_path, lambda raw: pad(raw, layers=1))["landing.deceleration"]
    assert "more" in step.reason


@pytest.mark.parametrize("field", ["crush_stress", "area", "lies", "layers", "layer_thickness", "usable_strain"])
def test_missing_fields_of_a_stack_are_named(tmp_path: Path, field: str) -> None:
    step = findings(tmp_path, lambda raw: raw["cushion"][0].pop(field))["landing.deceleration"]
    assert (step.verdict, step.reason) == (Verdict.OPEN, f"data missing: cushion 1 (pad) {field}")


def test_no_stacks_and_no_fragility_leave_steps_open(tmp_path: Path) -> None:
    assert findings(tmp_path, lambda raw: raw.pop("cushion"))["landing.deceleration"].reason == "data missing: cushion"
    assert findings(tmp_path, lambda raw: raw["item"][0].pop("fragility"))["landing.fragility"].verdict is Verdict.OPEN


def test_centre_under_the_platform_and_under_the_load(tmp_path: Path) -> None:
    under_platform = math.hypot(0.1 - 90 / 800, 30 / 800)
    assert findings(tmp_path)["landing.centre"].value == pytest.approx(under_platform, rel=1e-9)
    step = findings(tmp_path, lambda raw: pad(raw, lies="under the load"))["landing.centre"]
    assert step.value == pytest.approx(math.hypot(0.1 - 90 / 700, 30 / 700), rel=1e-9)


def test_centre_takes_a_measured_balance_point_less_what_does_not_lie_on_the_stack(tmp_path: Path) -> None:
    def balanced(raw: Raw) -> None:
        raw["platform"]["balanced_at"] = ["0.2 m", "0 m"]
        pad(raw, lies="under the load")

    # 900 kg at 0.2 m less canopies (100 kg) and platform (100 kg) in the middle: 700 kg at 180/700 m.
    assert findings(tmp_path, balanced)["landing.centre"].value == pytest.approx(180 / 700 - 0.1, rel=1e-9)


def test_speed_across_is_the_size_of_the_wind_at_the_ground(tmp_path: Path) -> None:
    assert findings(tmp_path, lambda raw: raw["drop"].update(surface_wind="-7 m/s"))["landing.speed_across"].value == 7

    def profile(raw: Raw) -> None:
        raw["drop"].pop("surface_wind")
        raw["drop"]["winds"] = [["0 m", "-5 m/s"], ["300 m", "9 m/s"]]

    assert findings(tmp_path, profile)["landing.speed_across"].value == 5


def test_overturning_by_the_energy_of_a_tipping_block(tmp_path: Path) -> None:
    b, high = 1.0, 1.1
    h = (100 * -0.05 + 600 * 0.5 + 100 * 0.2) / 800
    rise = math.sqrt((b / 2) ** 2 + h**2) - h
    inertia = (b / 2) ** 2 + h**2 + (b**2 + high**2) / 12
    speed = math.sqrt(2 * G0 * rise * inertia) / h
    assert findings(tmp_path)["landing.overturn"].value == pytest.approx(speed / 4, rel=1e-12)


def test_without_wind_overturning_stays_open(tmp_path: Path) -> None:
    step = findings(tmp_path, lambda raw: raw["drop"].update(surface_wind="0 m/s"))["landing.overturn"]
    assert step.verdict is Verdict.OPEN
    step = findings(tmp_path, lambda raw: raw["drop"].pop("surface_wind"))["landing.overturn"]
    assert step.reason == "data missing: drop.surface_wind"
