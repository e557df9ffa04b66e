"""Measured figures: what they replace, when they are used, and what needs them."""

import math
from pathlib import Path

import pytest

from model.checks.finding import Verdict
from tests.model.checks.sample import G0, Edit, Raw, drogue_first, findings

RATE = {"source": "report 7", "rate": "8 m/s", "rate_mass": "900 kg", "rate_density": "1.2 kg/m3"}
FORCE = {
    "source": "report 7",
    "opening_force": "45 kN",
    "opening_force_mass": "900 kg",
    "opening_force_speed": "55 m/s",
}
TIME = {"source": "report 7", "filling_time": "4 s"}


def measured(figures: dict[str, str]) -> Edit:
    return lambda raw: raw["canopy"][0].update(measured=dict(figures))


def test_a_measured_rate_replaces_the_drag_coefficient(tmp_path: Path) -> None:
    area = 2 * 900 * G0 / (1.2 * 64)
    step = findings(tmp_path, measured(RATE))["descent.rate"]
    assert step.value == pytest.approx(math.sqrt(2 * 900 * G0 / (1.225 * area)), rel=1e-6)


@pytest.mark.parametrize(
    ("mass", "used"), [("818.2 kg", True), ("818 kg", False), ("1,000 kg", True), ("1,001 kg", False)]
)
def test_it_is_used_within_a_tenth_of_its_mass(tmp_path: Path, mass: str, used: bool) -> None:
    estimate = findings(tmp_path)["descent.rate"].value
    step = findings(tmp_path, measured(RATE | {"rate_mass": mass}))["descent.rate"]
    assert (step.value != pytest.approx(estimate, rel=1e-9)) is used
    assert any("measured rate not used" in one for one in step.cautions) is not used


def test_a_measured_force_is_taken_as_it_is(tmp_path: Path) -> None:
    found = findings(tmp_path, measured(FORCE))
    assert found["opening.load_factor"].value == pytest.approx(45e3 / (900 * G0), rel=1e-12)
    assert found["opening.canopy"].value == pytest.approx(150 / 45, rel=1e-12)
    assert found["suspension.link"].value == pytest.approx(150 / 45, rel=1e-12)


@pytest.mark.parametrize(
    "off", [{"opening_force_mass": "1,010 kg"}, {"opening_force_speed": "75 m/s"}, {"opening_force_speed": "45 m/s"}]
)
def test_it_is_not_used_outside_a_tenth_of_its_mass_or_speed(tmp_path: Path, off: dict[str, str]) -> None:
    estimate = findings(tmp_path)["opening.load_factor"].value
    step = findings(tmp_path, measured(FORCE | off))["opening.load_factor"]
    assert step.value == pytest.approx(estimate, rel=1e-12)
    assert any("measured force not used" in one for one in step.cautions)


@pytest.mark.parametrize(("leaves", "said"), [("stays", True), ("goes at line stretch", False)])
def test_a_measured_force_beside_a_row_that_stays_is_said(tmp_path: Path, leaves: str, said: bool) -> None:
    def both(raw: Raw) -> None:
        drogue_first(raw, leaves)
        speeds = {"opening_force_mass": "910 kg", "opening_force_speed": "45 m/s"}
        raw["canopy"][1] |= {"measured": FORCE | speeds}

    step = findings(tmp_path, both)["opening.load_factor"]
    assert not any("measured force not used" in one for one in step.cautions)
    assert any("without the pull of canopy row 1 (drogue), which stays" in one for one in step.cautions) is said


def test_a_measured_filling_time_leaves_one_rule(tmp_path: Path) -> None:
    short = findings(tmp_path, measured(TIME | {"filling_time": "2 s"}))["opening.load_factor"]
    long = findings(tmp_path, measured(TIME))["opening.load_factor"]
    assert short.value is not None
    assert long.value is not None
    assert short.value > long.value
    assert not any("filling estimate" in one for one in long.cautions)


NEEDED = {
    "descent.rate": RATE,
    "descent.time": RATE,
    "landing.deceleration": RATE,
    "landing.fragility": RATE,
    "landing.crush_reserve": RATE,
    "landing.centre": RATE,
    "landing.overturn": RATE,
    "landing.speed_across": RATE,
    "height.opening_loss": TIME,
    "height.reserve": TIME,
    "device.early": TIME,
    "device.late": TIME,
    "opening.load_factor": FORCE,
    "opening.canopy": FORCE,
    "opening.speed": FORCE,
    "opening.snatch": FORCE,
    "opening.line": FORCE,
    "suspension.leg": FORCE,
    "suspension.attachment": FORCE,
    "suspension.link": FORCE,
    "suspension.leg_angle": FORCE,
    "suspension.tilt": FORCE,
}


@pytest.mark.parametrize(("limit", "figures"), NEEDED.items())
def test_a_step_that_needs_a_measured_figure_is_open_until_it_stands(
    tmp_path: Path, limit: str, figures: dict[str, str]
) -> None:
    def needs(raw: Raw) -> None:
        raw["limits"][limit]["needs_measured"] = True

    key = {"device.early": "device.release.early", "device.late": "device.release.late"}.get(limit, limit)
    without = findings(tmp_path, limits=needs)[key]
    assert without.verdict is Verdict.OPEN
    assert without.reason == "needs a measured figure; the estimate is within the limit"
    assert without.value is not None
    assert findings(tmp_path, measured(figures), needs)[key].verdict is Verdict.PASS


@pytest.mark.parametrize("key", [key for key, figures in NEEDED.items() if figures is FORCE])
def test_forces_are_content_with_a_time_for_every_filling(tmp_path: Path, key: str) -> None:
    def needs(raw: Raw) -> None:
        raw["limits"][key]["needs_measured"] = True

    assert findings(tmp_path, measured(TIME), needs)[key].verdict is Verdict.PASS


def test_a_time_for_one_of_two_fillings_is_not_enough(tmp_path: Path) -> None:
    def reefed(raw: Raw) -> None:
        raw["canopy"][0] |= {"measured": dict(TIME), "reefing": [{
            "drag_ratio": 0.1, "cutter": "6 s", "fill_constant": 17, "growth_exponent": 1, "opening_coefficient": 1.0,
        }]}  # fmt: skip

    def whole(raw: Raw) -> None:
        reefed(raw)
        raw["canopy"][0]["reefing"][0]["measured"] = {"source": "report 7", "filling_time": "1.5 s"}

    def needs(raw: Raw) -> None:
        raw["limits"]["height.reserve"]["needs_measured"] = True

    assert findings(tmp_path, reefed, needs)["height.reserve"].verdict is Verdict.OPEN
    assert findings(tmp_path, whole, needs)["height.reserve"].verdict is Verdict.PASS


def test_the_open_estimate_says_on_which_side_it_lies(tmp_path: Path) -> None:
    def needs(raw: Raw) -> None:
        raw["limits"]["opening.load_factor"] = {"max": "2 g", "source": "rule", "needs_measured": True}

    step = findings(tmp_path, limits=needs)["opening.load_factor"]
    assert (step.verdict, step.margin) == (Verdict.OPEN, None)
    assert step.reason == "needs a measured figure; the estimate is outside the limit"
