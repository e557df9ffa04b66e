"""The load path on one page."""

from pathlib import Path

import pytest

from model.checks.checklist import check
from model.quantity import UnitSystem
from model.report.load_path import load_path_lines
from model.study.load_path import load_path, weakest

RIGS = Path(__file__).parents[3] / "rigs"


def _case(name):
    return check(RIGS / name)


def test_factors_are_those_of_the_steps():
    checklist = _case("06-reefed-truck.toml")
    values = {one.key: one.value for one in checklist.findings}
    parts = load_path(checklist.details)
    by_name = {part.name: part.factor.value for part in parts if part.factor}
    legs = [value for name, value in by_name.items() if name.startswith("leg ")]
    links = [value for name, value in by_name.items() if name.startswith("link ")]
    attachments = [value for name, value in by_name.items() if name.startswith("attachment")]
    assert min(legs) == values["suspension.leg"]
    assert min(links) == values["suspension.link"]
    assert min(attachments) == values["suspension.attachment"]
    assert by_name["canopy of canopy row 1 (main)"] == values["opening.canopy"]


def test_each_factor_is_strength_over_load():
    for part in load_path(_case("06-reefed-truck.toml").details):
        assert part.factor is not None
        assert part.factor.value == pytest.approx(part.strength.value / part.load.value, rel=1e-15)


def test_the_least_is_marked_and_named():
    checklist = _case("06-reefed-truck.toml")
    least = weakest(load_path(checklist.details))
    lines = load_path_lines(checklist.details, UnitSystem.WRITTEN)
    marked = [line for line in lines if line.startswith("> ")]
    assert len(marked) == 1
    assert least.name in marked[0]
    assert any(line.startswith("weakest of the parts known: " + least.name) for line in lines)


def test_missing_data_is_said_and_no_part_is_called_sound():
    lines = load_path_lines(_case("09-half-entered.toml").details, UnitSystem.WRITTEN)
    assert any("data missing" in line for line in lines)
    assert any("one of those may be weaker" in line for line in lines)


@pytest.mark.parametrize("name", sorted(path.name for path in RIGS.glob("*.toml") if "record" not in path.name))
@pytest.mark.parametrize("system", list(UnitSystem))
def test_every_demo_rig_has_its_page_within_eighty_columns(name, system):
    lines = load_path_lines(_case(name).details, system)
    assert all(len(line) <= 80 for line in lines if "data missing" not in line)
