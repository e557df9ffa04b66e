"""Inputs moved by steps, and which job counts."""

from pathlib import Path

import pytest
from hypothesis import given
from hypothesis import strategies as st

from model.quantity import Dimension, UnitSystem, from_unit, to_unit
from model.study.moving import Input
from tests.tui.opening_rigs import DEMO, REEFED, TWO_ROWS, WARM
from tui.moves import Moves, step_in_unit, step_text, stepped
from tui.openings import LatestJob, ModelOpenings, Start
from tui.screens.moved_file import new_path

WRITTEN = UnitSystem.WRITTEN
AIRSPEED = Input("indicated airspeed", ("drop", "airspeed"), from_unit(130, "kt", Dimension.SPEED), Dimension.SPEED,
                 "kt", 0.5, 0.0, 200.0)  # fmt: skip
WARMTH = Input("zone temperature", ("drop", "zone_temperature"), 304.15, Dimension.TEMPERATURE, "°C", 1.0, 223.15,
               328.15)  # fmt: skip
COUNT = Input("canopies", ("canopy", 0, "count"), 2.0, Dimension.NUMBER, "", 1.0, 1.0, 12.0, whole=True)


def start(name: str) -> Start:
    return ModelOpenings().open(DEMO / name, WRITTEN)


def test_a_step_is_a_round_number_of_the_unit_shown() -> None:
    assert step_text(AIRSPEED, WRITTEN, big=False) == "1 kt"
    assert step_text(AIRSPEED, WRITTEN, big=True) == "10 kt"
    assert step_text(AIRSPEED, UnitSystem.SI, big=False) == "0.5 m/s"
    assert step_text(WARMTH, UnitSystem.US, big=False) == "1 °F"
    assert step_text(COUNT, WRITTEN, big=False) == "1"


@pytest.mark.parametrize("name", [WARM, REEFED, TWO_ROWS])
@pytest.mark.parametrize("system", list(UnitSystem))
def test_every_input_of_a_rig_moves_both_ways_and_comes_back_to_the_file(name: str, system: UnitSystem) -> None:
    moves = Moves(start(name).inputs)
    for one in moves.inputs:
        assert moves.input is one
        ways = 0
        for direction in (1, -1):
            before = moves.value(one)
            if moves.change(direction, system):
                ways += 1
                assert (moves.value(one) - before) * direction > 0
                assert moves.is_moved(one)
                moves.change(-direction, system)
            assert not moves.is_moved(one)
            assert moves.value(one) == one.value
        assert ways
        moves.choose(1)
    assert moves.chosen == 0
    assert not moves.changes


@given(presses=st.lists(st.sampled_from([1, -1]), max_size=60))
def test_steps_do_not_drift(presses: list[int]) -> None:
    moves = Moves([AIRSPEED])
    for direction in presses:
        moves.change(direction, WRITTEN)
    assert to_unit(moves.value(AIRSPEED), "kt", Dimension.SPEED) == pytest.approx(130 + sum(presses), abs=1e-8)
    assert moves.is_moved(AIRSPEED) == (sum(presses) != 0)


@given(steps=st.integers(-10_000, 10_000), system=st.sampled_from(list(UnitSystem)))
def test_no_step_leaves_the_range(steps: int, system: UnitSystem) -> None:
    for one in (AIRSPEED, WARMTH, COUNT):
        assert one.least <= stepped(one, one.value, steps, system) <= one.most


def test_the_end_of_a_range_is_said_once_it_is_reached() -> None:
    moves = Moves([COUNT])
    assert [moves.change(-1, WRITTEN) for _ in range(3)] == [True, False, False]
    assert moves.value(COUNT) == 1.0


def test_a_value_outside_the_usual_range_is_not_pulled_in() -> None:
    far = Input("rigged mass", ("platform", "weighed"), 2e6, Dimension.MASS, "kg", 100.0, 1.0, 1e6)
    assert stepped(far, 2e6, -1, WRITTEN) < 2e6
    assert stepped(far, 2e6, 1, WRITTEN) == 2e6


def test_a_step_of_a_temperature_is_one_degree_of_the_unit_shown() -> None:
    assert step_in_unit(WARMTH, UnitSystem.US) == 1.0
    assert stepped(WARMTH, WARMTH.value, 1, WRITTEN) == pytest.approx(305.15)
    assert stepped(WARMTH, WARMTH.value, 9, UnitSystem.US) == pytest.approx(309.15)


def test_nothing_can_be_moved_where_nothing_is_known() -> None:
    moves = Moves([])
    moves.choose(1)
    assert moves.input is None
    assert not moves.change(1, WRITTEN)
    assert not moves.put_back()


def test_only_the_latest_request_is_worked_off_and_counts() -> None:
    jobs = LatestJob()
    assert jobs.ask({("a",): 1.0}, WRITTEN)
    first = jobs.take()
    assert first is not None
    assert not jobs.ask({("a",): 2.0}, WRITTEN)
    assert not jobs.ask({("a",): 3.0}, WRITTEN)
    assert not jobs.is_latest(first[0])
    last = jobs.take()
    assert last is not None
    assert last[1] == {("a",): 3.0}
    assert jobs.is_latest(last[0])
    assert jobs.take() is None
    assert jobs.ask({}, WRITTEN)


def test_a_dropped_request_is_neither_worked_off_nor_counted() -> None:
    jobs = LatestJob()
    jobs.ask({}, WRITTEN)
    taken = jobs.take()
    jobs.ask({("a",): 1.0}, WRITTEN)
    jobs.drop()
    assert taken is not None
    assert not jobs.is_latest(taken[0])
    assert jobs.take() is None


def test_a_new_file_is_a_rig_file_beside_the_rig() -> None:
    rig = Path("rigs") / "a.toml"
    assert new_path(rig, " b ") == Path("rigs") / "b.toml"
    assert new_path(rig, "b.v2") == Path("rigs") / "b.v2.toml"
    assert new_path(rig, "sub/b.toml") == Path("rigs") / "sub" / "b.toml"
    for typed in ("", "  ", "a\x1bb", "b.record.toml", ".hidden", "b.record"):
        assert isinstance(new_path(rig, typed), str)
