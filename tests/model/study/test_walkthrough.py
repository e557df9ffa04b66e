"""The walk through the opening: lines, methods and their range, and inputs that move."""

from dataclasses import replace
from math import exp
from pathlib import Path

import pytest

from model.checks.case import Case
from model.checks.checklist import check
from model.checks.term import lines
from model.rig.reading import load
from model.study.moving import inputs, moved, write_moved
from model.study.walkthrough import LIGHT, walk

RIGS = Path(__file__).parents[3] / "rigs"
NAMES = sorted(path.name for path in RIGS.glob("*.toml") if "record" not in path.name)


def _walk(name):
    return walk(check(RIGS / name).details)


def _by_title(found):
    return {line.title: line for line in found.lines}


def test_lines_follow_from_each_other_on_one_canopy():
    lines_ = _by_title(_walk("05-pump-warm.toml"))
    value = {title: line.term.value for title, line in lines_.items() if line.term}
    speed, pressure = value["speed at line stretch"], value["dynamic pressure"]
    density = 2 * pressure / speed**2
    time = lines_["filling time"].term
    distance = time.inputs[0].value
    assert value["filling time"] == pytest.approx(distance / speed, rel=1e-12)
    ballistic = lines_["ballistic parameter"].term
    mass, rho, area, length = (one.value for one in ballistic.inputs)
    assert rho == pytest.approx(density, rel=1e-12)
    assert value["ballistic parameter"] == pytest.approx(2 * mass / (rho * area * length), rel=1e-12)


def test_closed_forms_against_their_algebra():
    # j = 2 below the critical A: X1 = s^(2/3) (2/3)^2, s = 1.5 A (Pflanz; Knacke, NWC TP 6575, ch. 5, from memory).
    lines_ = _by_title(_walk("05-pump-warm.toml"))
    ballistic = lines_["ballistic parameter"].term.value
    assert ballistic < 2 / 3
    factor = (1.5 * ballistic) ** (2 / 3) * (2 / 3) ** 2
    assert lines_["reduction factor, growth against time"].term.value == pytest.approx(factor, rel=1e-12)
    full = lines_["infinite mass"].term.value
    assert lines_["growth against time, no gravity"].term.value == pytest.approx(full * factor, rel=1e-12)
    by_distance = ballistic ** (2 / 3) * exp(-2 / 3)
    assert lines_["growth against distance, no gravity"].term.value == pytest.approx(full * by_distance, rel=1e-12)


def test_infinite_mass_warns_and_is_left_out_of_the_range():
    found = _walk("05-pump-warm.toml")
    line = _by_title(found)["infinite mass"]
    assert line.warning == LIGHT
    assert not line.counts
    low, high = found.range_of_methods
    assert low <= 1.0 <= high < line.term.value / found.force.value


def test_the_largest_force_is_that_of_the_steps():
    checklist = check(RIGS / "06-reefed-truck.toml")
    step = next(one for one in checklist.findings if one.key == "opening.load_factor")
    found = walk(checklist.details)
    assert _by_title(found)["what the load feels"].term.value == step.value
    assert found.force.value == max(
        line.term.value for line in found.lines if line.title.startswith("motion with gravity")
    )


@pytest.mark.parametrize("name", NAMES)
def test_every_demo_rig_can_be_walked(name):
    found = _walk(name)
    assert found.lines
    for line in found.lines:
        assert (line.term is None) == bool(line.missing)
        if line.term is not None:
            seen = set()
            for term in lines(line.term):
                assert all(id(one) in seen for one in term.inputs)
                assert term.again() == term.value
                seen.add(id(term))


def test_moving_an_input_is_the_same_as_writing_it_in_the_file(tmp_path):
    loaded = load(RIGS / "06-reefed-truck.toml")
    case = Case(loaded.rig.rig, loaded.limits.limits)
    chosen = {one.loc: one for one in inputs(case)}
    changes = {
        ("platform", "weighed"): chosen["platform", "weighed"].value * 1.03,
        ("canopy", 0, "reefing", 0, "cutter"): 3.0,
        ("canopy", 0, "count"): 4.0,
    }
    shown = moved(loaded, changes, chosen)
    path = tmp_path / "moved.toml"
    write_moved(loaded, changes, chosen, path)
    written = load(path)
    forces = [walk(Case(one.rig.rig, one.limits.limits)).force.value for one in (shown, written)]
    assert forces[1] == pytest.approx(forces[0], rel=1e-5)
    assert "# " in path.read_text(encoding="utf-8")


def test_a_moved_input_keeps_its_tolerance(tmp_path):
    loaded = load(RIGS / "05-pump-warm.toml")
    chosen = {one.loc: one for one in inputs(Case(loaded.rig.rig, loaded.limits.limits))}
    at = ("drop", "release_height")
    assert loaded.rig.rig.drop.release_height.text == "1,250 ft ± 50 ft"
    changes = {at: chosen[at].value * 2}
    path = tmp_path / "moved.toml"
    write_moved(loaded, changes, chosen, path)
    height = load(path).rig.rig.drop.release_height
    assert height.text == "2,500 ft ± 50 ft"
    assert moved(loaded, changes, chosen).rig.rig.drop.release_height.tolerance == height.tolerance


def test_a_full_disk_leaves_no_half_file(tmp_path, monkeypatch):
    def full(_):
        raise OSError(28, "No space left on device")

    loaded = load(RIGS / "05-pump-warm.toml")
    chosen = {one.loc: one for one in inputs(Case(loaded.rig.rig, loaded.limits.limits))}
    monkeypatch.setattr("os.fsync", full)
    with pytest.raises(OSError, match="No space"):
        write_moved(loaded, {("drop", "airspeed"): 60.0}, chosen, tmp_path / "new.toml")
    assert list(tmp_path.iterdir()) == []


def test_the_old_file_stays_and_no_file_is_overwritten(tmp_path):
    loaded = load(RIGS / "05-pump-warm.toml")
    before = loaded.rig.path.read_bytes()
    chosen = {one.loc: one for one in inputs(Case(loaded.rig.rig, loaded.limits.limits))}
    path = tmp_path / "new.toml"
    write_moved(loaded, {("drop", "airspeed"): 60.0}, chosen, path)
    with pytest.raises(FileExistsError):
        write_moved(loaded, {("drop", "airspeed"): 61.0}, chosen, path)
    assert loaded.rig.path.read_bytes() == before


@pytest.mark.parametrize("name", NAMES)
def test_inputs_lie_within_their_bounds_and_step(name):
    loaded = load(RIGS / name)
    for one in inputs(Case(loaded.rig.rig, loaded.limits.limits if loaded.limits else None)):
        assert one.least <= one.value <= one.most, one
        assert one.step > 0
        assert one.text(one.value)


def test_a_rig_with_a_table_figure_can_have_it_moved():
    loaded = load(RIGS / "05-pump-warm.toml")
    canopy = loaded.rig.rig.canopy[0].model_copy(update={"fill_constant": None})
    rig = loaded.rig.rig.model_copy(update={"canopy": (canopy,)})
    changed = loaded._replace(rig=replace(loaded.rig, rig=rig))
    chosen = {one.loc: one for one in inputs(Case(rig, loaded.limits.limits))}
    assert chosen["canopy", 0, "fill_constant"].value == 8
    shown = moved(changed, {("canopy", 0, "fill_constant"): 10.0}, chosen)
    assert shown.rig.rig.canopy[0].fill_constant.value == 10.0
