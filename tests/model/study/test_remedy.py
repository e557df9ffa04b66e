"""What would make a failed step pass, against the whole check run again with that change."""

from pathlib import Path

import pytest

from model.checks.checklist import check, check_loaded
from model.checks.finding import Verdict
from model.quantity import Dimension, Quantity, parse
from model.rig.reading import Loaded, load
from model.rig.walk import with_quantities
from model.study.remedy import what_would_pass

RIGS = Path(__file__).parents[3] / "rigs"
WARM = RIGS / "05-pump-warm.toml"


def _finding(path, key):
    return next(one for one in check(path).findings if one.key == key)


def _again(loc, text, dimension):
    loaded = load(WARM)
    rig = with_quantities(loaded.rig.rig, {loc: parse(text, dimension)})
    changed = type(loaded.rig)(**{**vars(loaded.rig), "rig": rig})
    findings = check_loaded(Loaded(changed, loaded.limits)).findings
    return next(one for one in findings if one.key == "descent.rate")


def _number(text):
    return text.removeprefix("at most ").removeprefix("at least ")


def test_the_advice_holds_in_the_whole_check_and_is_near_the_edge():
    finding = _finding(WARM, "descent.rate")
    assert finding.verdict is Verdict.FAIL
    advice = {one.meaning: one for one in what_would_pass(finding)}
    mass = advice["rigged mass, weighed"]
    assert mass.needed.startswith("at most ")
    at = ("platform", "weighed")
    assert _again(at, _number(mass.needed), Dimension.MASS).verdict is Verdict.PASS
    pounds = float(_number(mass.needed).removesuffix(" lb").replace(",", ""))
    assert _again(at, f"{pounds * 1.005} lb", Dimension.MASS).verdict is Verdict.FAIL


def test_advice_is_the_closed_form_for_the_rate_of_descent():
    # V grows with the square root of the mass, so the mass that just passes is m (limit/V)^2.
    finding = _finding(WARM, "descent.rate")
    mass = next(one for one in what_would_pass(finding) if one.meaning == "rigged mass, weighed")
    exact = 2084 * (finding.limit.maximum / finding.value) ** 2
    shown = float(_number(mass.needed).removesuffix(" lb").replace(",", ""))
    assert exact * 0.995 <= shown <= exact


def test_a_passing_step_needs_no_advice():
    assert what_would_pass(_finding(RIGS / "04-pump-cool.toml", "descent.rate")) == []


def test_a_step_that_fails_for_more_than_its_limit_gets_none():
    # The thin honeycomb bottoms: no single number put right turns that verdict by its limit alone.
    for finding in check(RIGS / "13-thin-honeycomb.toml").findings:
        if finding.verdict is Verdict.FAIL and finding.margin is None:
            assert what_would_pass(finding) == []


@pytest.mark.parametrize("name", sorted(path.name for path in RIGS.glob("*.toml") if "record" not in path.name))
def test_every_advice_names_value_and_unit(name):
    for finding in check(RIGS / name).findings:
        for one in what_would_pass(finding):
            assert one.needed.startswith(("at most ", "at least "))
            assert one.now
            assert one.needed.removeprefix("at most ").removeprefix("at least ") != one.now


def test_quantities_of_the_file_are_not_changed_by_asking():
    finding = _finding(WARM, "descent.rate")
    before = [term.value for term in finding.result.inputs]
    what_would_pass(finding)
    assert [term.value for term in finding.result.inputs] == before
    assert isinstance(parse("1 lb", Dimension.MASS), Quantity)
