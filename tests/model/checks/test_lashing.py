import math
from pathlib import Path

import pytest

from model.checks.finding import Verdict
from tests.model.checks.sample import G0, Raw, extracted, findings

WEIGHT = 800 * G0
AFT_REACH = math.sqrt(1.2**2 + 0.9**2)
FORE_REACH = math.sqrt(1.2**2 + 0.2**2 + 0.9**2)


def test_held_against_each_direction_over_what_is_asked(tmp_path: Path) -> None:
    found = findings(tmp_path)
    # Two straps of 20 kN on either side; the forward pair pulls aft, so it holds against forward.
    forward = 2 * 2 * 20e3 * 1.2 / AFT_REACH
    aft = 2 * 2 * 20e3 * 1.2 / FORE_REACH
    side = 2 * 20e3 * 0.2 / FORE_REACH
    down = 4 * 20e3 * 0.9 * (1 / AFT_REACH + 1 / FORE_REACH)
    assert found["lashing.forward"].value == pytest.approx(forward / (3.0 * WEIGHT), rel=1e-12)
    assert found["lashing.aft"].value == pytest.approx(aft / (1.5 * WEIGHT), rel=1e-12)
    assert found["lashing.left"].value == pytest.approx(side / (1.5 * WEIGHT), rel=1e-12)
    assert found["lashing.right"].value == pytest.approx(side / (1.5 * WEIGHT), rel=1e-12)
    assert found["lashing.up"].value == pytest.approx(down / (2.0 * WEIGHT), rel=1e-12)


def test_the_weakest_of_device_and_fittings_counts_and_says_so(tmp_path: Path) -> None:
    step = findings(tmp_path, lambda raw: raw["lashing"][0].update(load_fitting="5 kN"))["lashing.forward"]
    assert step.value == pytest.approx(4 * 5e3 * 1.2 / AFT_REACH / (3 * WEIGHT), rel=1e-12)
    assert any("load fitting" in one for one in step.cautions)


def test_the_extraction_parachute_is_not_lashed(tmp_path: Path) -> None:
    bare, drawn = findings(tmp_path), findings(tmp_path, extracted)
    assert drawn["lashing.up"].value == pytest.approx(bare["lashing.up"].value, rel=1e-12)


def test_without_restraint_factors_or_a_limit_it_is_open(tmp_path: Path) -> None:
    step = findings(tmp_path, limits=lambda raw: raw.pop("restraint"))["lashing.forward"]
    assert step.verdict is Verdict.OPEN
    assert "restraint" in step.reason
    step = findings(tmp_path, limits=lambda raw: raw["limits"].pop("lashing.forward"))["lashing.forward"]
    assert (step.verdict, step.reason) == (Verdict.OPEN, "no limit set")
    assert step.value is not None
    step = findings(tmp_path, limits=lambda raw: raw["restraint"].pop("aft"))["lashing.aft"]
    assert step.verdict is Verdict.OPEN
    assert "restraint.aft" in step.reason


def test_a_missing_strength_is_named(tmp_path: Path) -> None:
    step = findings(tmp_path, lambda raw: raw["lashing"][1].pop("deck_fitting"))["lashing.up"]
    assert step.reason == "data missing: lashing 2 (aft pair) deck_fitting"
    assert findings(tmp_path, lambda raw: raw.pop("lashing"))["lashing.up"].reason == "data missing: lashing"


def test_straps_and_chains_that_share_a_direction_fail(tmp_path: Path) -> None:
    step = findings(tmp_path)["lashing.mixed"]
    assert (step.verdict, step.value, step.unit, step.margin) == (Verdict.PASS, None, None, None)
    step = findings(tmp_path, lambda raw: raw["lashing"][1].update(kind="chain"))["lashing.mixed"]
    # Both pairs hold against up; each alone holds against forward or aft.
    assert step.verdict is Verdict.FAIL
    assert "up" in step.reason
    assert "forward" not in step.reason


def test_up_to_a_tenth_of_another_kind_is_not_mixed(tmp_path: Path) -> None:
    def few(raw: Raw) -> None:
        raw["lashing"].append(raw["lashing"][0] | {"name": "small chain", "kind": "chain", "device": "1 kN"})

    assert findings(tmp_path, few)["lashing.mixed"].verdict is Verdict.PASS


def test_lashings_on_one_ring_share_its_strength(tmp_path: Path) -> None:
    def ring(raw: Raw) -> None:
        raw["lashing"] = raw["lashing"][:1]
        raw["lashing"][0] |= {"deck_ring": "L4", "deck_fitting": "25 kN", "mirror": "left-right"}

    # Each side: two straps of 20 kN on a ring of 25 kN.
    step = findings(tmp_path, ring)["lashing.forward"]
    assert step.value == pytest.approx(2 * 25e3 * 1.2 / AFT_REACH / (3 * WEIGHT), rel=1e-12)
    assert any("ring" in one for one in step.cautions)
