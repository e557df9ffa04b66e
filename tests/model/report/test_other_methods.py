"""The other ways to an opening force, below the working of an opening step."""

from pathlib import Path

import pytest

from model.checks.checklist import check
from model.quantity import UnitSystem
from model.report.other_methods import other_methods_lines
from model.study.walkthrough import walk

RIGS = Path(__file__).parents[3] / "rigs"


def _lines(name, key):
    checklist = check(RIGS / name)
    finding = next(one for one in checklist.findings if one.key == key)
    return checklist, other_methods_lines(finding, checklist.details, UnitSystem.WRITTEN)


def test_every_method_stands_with_what_it_leaves_out():
    _, lines = _lines("05-pump-warm.toml", "opening.load_factor")
    text = "\n".join(lines)
    for method in (
        "infinite mass",
        "growth against time",
        "growth against distance",
        "Ludtke",
        "time rule",
        "distance rule",
    ):
        assert method in text
    assert "leaves out gravity" in text
    assert "reads far too high" in text
    assert all(len(line) <= 76 for line in lines)


def test_the_range_is_that_of_the_methods_that_hold():
    checklist, lines = _lines("05-pump-warm.toml", "opening.canopy")
    low, high = walk(checklist.details).range_of_methods
    assert lines[-1] == f"  methods within their range: {low * 100:.0f} % to {high * 100:.0f} % of the motion"


@pytest.mark.parametrize("key", ["load.mass", "descent.rate", "height.reserve"])
def test_other_steps_have_none(key):
    assert _lines("05-pump-warm.toml", key)[1] == []


def test_a_rig_whose_motion_cannot_be_flown_has_none():
    assert _lines("09-half-entered.toml", "opening.load_factor")[1] == []
