"""Legs and links against statics solved here with numpy."""

import math
from pathlib import Path

import numpy as np
import pytest

from model.checks.finding import Finding, Verdict
from model.rig.errors import InputError
from tests.model.checks.sample import G0, Raw, findings

APEX = np.array([0.0, 0.0, 3.0])
CENTRE = np.array([0.9 * 100 / 800, -0.3 * 100 / 800, (100 * -0.05 + 600 * 0.5 + 100 * 0.2) / 800])
CORNERS = np.array([[0.8, 0.4, 0.2], [0.8, -0.4, 0.2], [-0.8, 0.4, 0.2], [-0.8, -0.4, 0.2]])


def pull(found: dict[str, Finding]) -> float:
    factor = found["opening.load_factor"].value
    assert factor is not None
    return factor * 900 * G0


def elastic(points: np.ndarray, aim: np.ndarray) -> np.ndarray:
    """Shares of springs of equal strength: t = k d.delta with sum t d = aim."""
    away = APEX - points
    lengths = np.linalg.norm(away, axis=1)
    ways = away / lengths[:, None]
    springs = 1.0 / lengths
    delta = np.linalg.solve((ways * springs[:, None]).T @ ways, aim)
    shares: np.ndarray = springs * (ways @ delta)
    return shares


def axis() -> np.ndarray:
    line = APEX - CENTRE
    return line / np.linalg.norm(line)


def test_four_legs_share_as_springs_and_few_are_taken_to_carry(tmp_path: Path) -> None:
    found = findings(tmp_path)
    shares = elastic(CORNERS, axis())
    assert np.all(shares > 0)
    load = shares.max() * pull(found) * 4 / 2
    assert found["suspension.leg"].value == pytest.approx(40e3 * 2 * 0.8 / load, rel=1e-9)
    assert found["suspension.attachment"].value == pytest.approx(60e3 / load, rel=1e-9)


def test_three_legs_are_exact(tmp_path: Path) -> None:
    def three(raw: Raw) -> None:
        raw["leg"].pop()
        raw["leg"][2]["at"] = ["-0.8 m", "0 m", "0.2 m"]
        raw["suspension"]["legs_carrying"] = 3

    found = findings(tmp_path, three)
    points = np.array([[0.8, 0.4, 0.2], [0.8, -0.4, 0.2], [-0.8, 0.0, 0.2]])
    away = APEX - points
    ways = away / np.linalg.norm(away, axis=1)[:, None]
    tensions = np.linalg.solve(ways.T, axis()) * pull(found)
    assert found["suspension.leg"].value == pytest.approx(40e3 * 2 * 0.8 / tensions.max(), rel=1e-9)


def test_the_pull_turned_off_its_axis_counts_where_it_is_worse(tmp_path: Path) -> None:
    found = findings(tmp_path, lambda raw: raw["suspension"].update(pull_off_axis="5 deg"))
    turns = [axis()]
    for way in ([-1, 0, 0], [1, 0, 0], [0, 1, 0], [0, -1, 0]):
        across = np.array(way) - (np.array(way) @ axis()) * axis()
        across /= np.linalg.norm(across)
        turns.append(axis() * math.cos(math.radians(5)) + across * math.sin(math.radians(5)))
    shares = [elastic(CORNERS, one) for one in turns]
    assert all(np.all(one > 0) for one in shares)
    load = max(one.max() for one in shares) * pull(found) * 2
    assert found["suspension.leg"].value == pytest.approx(64e3 / load, rel=1e-9)


def test_a_pull_that_leaves_two_legs_taut_fails(tmp_path: Path) -> None:
    step = findings(tmp_path, lambda raw: raw["suspension"].update(pull_off_axis="60 deg"))["suspension.leg"]
    assert (step.verdict, step.value) == (Verdict.FAIL, None)
    assert step.reason


def test_a_centre_of_gravity_outside_the_legs_fails(tmp_path: Path) -> None:
    def outside(raw: Raw) -> None:
        for one in raw["item"]:
            one["centre"][0] = "-1.5 m"

    step = findings(tmp_path, outside)["suspension.leg"]
    assert (step.verdict, step.value) == (Verdict.FAIL, None)
    assert "outside" in step.reason


@pytest.mark.parametrize("count", [1, 2])
def test_fewer_than_three_legs_leave_the_steps_open_with_the_reason(tmp_path: Path, count: int) -> None:
    found = findings(
        tmp_path, lambda raw: raw.update(leg=raw["leg"][:count], suspension={"apex": raw["suspension"]["apex"]})
    )
    for key in ("leg", "attachment", "leg_angle", "tilt"):
        step = found[f"suspension.{key}"]
        assert step.verdict is Verdict.OPEN
        assert "fewer than three legs" in step.reason


def test_a_slack_leg_is_no_division_by_zero(tmp_path: Path) -> None:
    def heavy_corner(raw: Raw) -> None:
        raw["item"][0]["centre"] = ["0.55 m", "0.25 m", "0.5 m"]
        raw["item"][1]["centre"] = ["0.55 m", "0.25 m", "0.5 m"]
        raw["platform"]["centre"] = ["0.55 m", "0.25 m", "0.5 m"]

    step = findings(tmp_path, heavy_corner)["suspension.leg"]
    assert step.verdict in (Verdict.PASS, Verdict.FAIL)


def test_leg_angle_and_tilt(tmp_path: Path) -> None:
    found = findings(tmp_path)
    assert found["suspension.leg_angle"].value == pytest.approx(math.degrees(math.atan2(2.8, math.hypot(0.8, 0.4))))
    tilt = math.degrees(math.atan2(math.hypot(CENTRE[0], CENTRE[1]), 3.0 - CENTRE[2]))
    assert found["suspension.tilt"].value == pytest.approx(tilt)


def test_angles_need_no_strengths_and_no_motion(tmp_path: Path) -> None:
    def bare(raw: Raw) -> None:
        raw.pop("exit")
        for leg in raw["leg"]:
            leg.pop("strength")

    found = findings(tmp_path, bare)
    assert found["suspension.leg_angle"].verdict is Verdict.PASS
    assert found["suspension.tilt"].verdict is Verdict.PASS


def test_tilt_takes_a_measured_balance_point_less_the_canopies(tmp_path: Path) -> None:
    step = findings(tmp_path, lambda raw: raw["platform"].update(balanced_at=["0.09 m", "0.045 m"]))["suspension.tilt"]
    # 900 kg at the measured point, 100 kg of canopies over the middle: the rest is at 9/8 of it.
    tilt = math.degrees(math.atan2(math.hypot(0.09, 0.045) * 9 / 8, 3.0 - CENTRE[2]))
    assert step.value == pytest.approx(tilt, rel=1e-9)


def lengths(raw: Raw, factors: tuple[float, ...] = (1, 1, 1, 1)) -> None:
    raw["suspension"].pop("apex")
    true = math.sqrt(0.8**2 + 0.4**2 + 2.8**2)
    for leg, factor in zip(raw["leg"], factors, strict=True):
        leg["length"] = f"{true * factor:.9f} m"


def test_the_confluence_point_from_measured_lengths(tmp_path: Path) -> None:
    given, measured = findings(tmp_path), findings(tmp_path, lengths)
    for key in ("suspension.leg", "suspension.leg_angle", "suspension.tilt"):
        assert measured[key].value == pytest.approx(given[key].value, rel=1e-6), key


def test_lengths_that_misfit_are_an_error_that_says_by_how_much(tmp_path: Path) -> None:
    with pytest.raises(InputError) as error:
        findings(tmp_path, lambda raw: lengths(raw, (1.1, 1, 1, 1)))
    text = str(error.value)
    assert "leg 1" in text or "leg" in text
    assert "%" in text


def test_lengths_over_attachments_in_one_line_are_an_error_not_a_crash(tmp_path: Path) -> None:
    def line(raw: Raw) -> None:
        lengths(raw)
        for i, leg in enumerate(raw["leg"]):
            leg["at"] = [f"{0.1 * i} m", "0 m", "0.2 m"]

    with pytest.raises(InputError):
        findings(tmp_path, line)


def test_a_missing_length_is_named(tmp_path: Path) -> None:
    def one_short(raw: Raw) -> None:
        lengths(raw)
        raw["leg"][2].pop("length")

    step = findings(tmp_path, one_short)["suspension.leg_angle"]
    assert step.reason == "data missing: suspension.apex, or leg 3 (rear left) length"


def test_missing_strengths_are_named(tmp_path: Path) -> None:
    step = findings(tmp_path, lambda raw: raw["leg"][1].pop("strength"))["suspension.leg"]
    assert step.reason == "data missing: leg 2 (front right) strength"
    step = findings(tmp_path, lambda raw: raw["suspension"].pop("legs_carrying"))["suspension.leg"]
    assert step.reason == "data missing: suspension.legs_carrying"


def test_links_carry_all_one_canopy_or_one_leg(tmp_path: Path) -> None:
    def links(raw: Raw) -> None:
        raw["canopy"][0] |= {"count": 2, "cluster_efficiency": 0.9, "uneven_share": 1.3}
        raw["platform"]["weighed"] = "1,000 kg"
        raw["link"] = [{"name": "x", "strength": "100 kN", "carries": carries, "abreast": abreast}]

    def least(folder: Path) -> float:
        found = findings(folder, links)
        value = found["suspension.link"].value
        factor = found["opening.load_factor"].value
        assert value is not None
        assert factor is not None
        return 100e3 * abreast / value / (factor * 1000 * G0)

    carries, abreast = "all", 2
    assert least(tmp_path) == pytest.approx(1.0, rel=1e-9)
    carries, abreast = "one canopy", 1
    assert least(tmp_path) == pytest.approx(1.3 / 2, rel=1e-9)
    carries = "one leg"
    assert least(tmp_path) == pytest.approx(2 * elastic(CORNERS, axis()).max(), rel=1e-9)


def test_a_link_of_one_canopy_carries_its_snatch_where_that_is_more(tmp_path: Path) -> None:
    def hard(raw: Raw) -> None:
        raw["canopy"][0]["snatch_speed"] = "60 m/s"
        raw["link"][0]["carries"] = "one canopy"

    snatch = 60 * math.sqrt(64 * 2500 / (0.3 * 16) * 100 * 800 / 900)
    assert findings(tmp_path, hard)["suspension.link"].value == pytest.approx(150e3 / snatch, rel=1e-9)


def test_no_links_leave_the_step_open(tmp_path: Path) -> None:
    assert findings(tmp_path, lambda raw: raw.pop("link"))["suspension.link"].reason == "data missing: link"
