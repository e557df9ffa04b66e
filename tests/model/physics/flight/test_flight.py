"""What holds for every flight, in a batch or alone, whatever is put in."""

from __future__ import annotations

import subprocess
import sys
import warnings
from dataclasses import fields, replace
from typing import Any

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from model.physics.flight import Drop, Filling, FillingRule, Motion, Row, solve

from .cases import DROGUE, MAIN, REEFED, RIGS, cloud, features, rows, torture
from .reference import isa, pick

RULES: tuple[FillingRule, ...] = ("time", "distance")
MAY_BE_UNKNOWN = {"slow_time", "slow_height"}


def numbers(motion: Motion) -> dict[str, Any]:
    return {f.name: getattr(motion, f.name) for f in fields(motion) if f.name not in ("rule", "error", "track")}


@pytest.mark.parametrize("rule", RULES)
def test_a_case_is_the_same_alone_and_in_a_batch(rule: FillingRule) -> None:
    drop = cloud(rows(RIGS[2], DROGUE, REEFED, release_height=1500, winds=((0.0, 3.0), (700.0, 9.0))), 60, 3)
    batch = solve(drop, rule)
    for case in (0, 31, 59):
        alone = solve(pick(drop, case), rule)
        for name, value in numbers(alone).items():
            found = numbers(batch)[name][..., case]
            assert found == pytest.approx(value[..., 0], rel=2e-5, abs=1e-9, nan_ok=True), name


@pytest.mark.parametrize("rule", RULES)
def test_chunks_do_not_matter(rule: FillingRule, monkeypatch: pytest.MonkeyPatch) -> None:
    drop = cloud(RIGS[3], 50, 4)
    whole = solve(drop, rule)
    monkeypatch.setattr("model.physics.flight.solver.CHUNK", 16)
    parts = solve(drop, rule)
    assert parts.opening_force == pytest.approx(whole.opening_force, rel=1e-6)
    assert parts.touchdown_time == pytest.approx(whole.touchdown_time, rel=1e-6)
    assert parts.opening_force.shape == (2, 50)


def test_very_unlike_cases_are_all_solved() -> None:
    for exponent in (0.5, 1.0, 2.0, 6.0):
        for rule in RULES:
            assert solve(torture(exponent, 200, 9), rule).accurate.all()


@pytest.mark.parametrize("rule", RULES)
def test_more_pieces_change_nothing(rule: FillingRule, monkeypatch: pytest.MonkeyPatch) -> None:
    from model.physics.flight import phases
    drop = cloud(rows(RIGS[2], DROGUE, MAIN, release_height=1500), 20, 5)
    plain = solve(drop, rule)
    monkeypatch.setattr(phases, "LONG_SPAN", 4.0)
    monkeypatch.setattr(phases, "SPAN", 1.5)
    fine = solve(drop, rule)
    assert plain.opening_force == pytest.approx(fine.opening_force, rel=1e-6)
    assert plain.row_force == pytest.approx(fine.row_force, rel=1e-6)
    assert plain.touchdown_time == pytest.approx(fine.touchdown_time, rel=2e-6)


def test_a_case_that_is_not_solved_is_reported() -> None:
    from_rest = rows(RIGS[2], replace(RIGS[2].rows[0], line_stretch=0.0), airspeed=np.array([0.0, 60.0]))
    motion = solve(from_rest, "distance")
    assert list(motion.accurate) == [False, True]
    assert motion.error[0] > 1e-6 > motion.error[1]


@pytest.mark.parametrize("rule", RULES)
@pytest.mark.parametrize(("name", "change"), [
    ("no mass", {"mass": 0.0}), ("unknown mass", {"mass": float("nan")}), ("no gravity", {"gravity": 0.0}),
    ("from space", {"release_height": 1e7}), ("negative density", {"density": lambda z: z * 0 - 1.0}),
    ("unknown density near the ground", {"density": lambda z: np.where(z < 100, np.nan, isa(z))}),
    ("density that jumps", {"density": lambda z: isa(z) * (1 + 0.2 * np.sign(np.sin(z)))}),
    ("negative area", {"rows": (Row((Filling(-5.0, 100.0),), line_stretch=2.0),)}),
    ("endless filling", {"rows": (Row((Filling(233.0, 1e9),), line_stretch=2.0),)}),
    ("endless area", {"rows": (Row((Filling(np.inf, 100.0),), line_stretch=2.0),)}),
])
def test_a_case_that_cannot_be_solved_is_given_up_soon(
    name: str, change: dict[str, Any], rule: FillingRule, monkeypatch: pytest.MonkeyPatch
) -> None:
    from model.physics.flight.march import Flyer
    solve_piece, pieces = Flyer._solve, []

    def counted(self: Flyer, *args: Any) -> Any:
        pieces.append(1)
        return solve_piece(self, *args)

    monkeypatch.setattr(Flyer, "_solve", counted)
    motion = solve(replace(RIGS[2], **change), rule)
    assert not motion.accurate[0], name
    assert motion.error[0] > 1e-6
    assert len(pieces) < 300


def test_a_hopeless_case_does_not_spoil_the_rest() -> None:
    heights, mass = np.array([400.0, 400.0, 500.0]), np.array([1000.0, 0.0, 1000.0])
    motion = solve(replace(RIGS[2], release_height=heights, mass=mass), "distance")
    assert list(motion.accurate) == [True, False, True]
    alone = solve(RIGS[2], "distance")
    assert motion.opening_force[0, 0] == pytest.approx(alone.opening_force[0, 0], rel=1e-6)
    assert motion.touchdown_time[0] == pytest.approx(alone.touchdown_time[0], rel=2e-6)


def test_a_wild_density_is_reported_and_does_not_spoil_the_rest() -> None:
    def density(z: Any) -> Any:
        return np.where(z > 1000, np.nan, isa(z))

    drop = replace(RIGS[2], density=density, release_height=np.array([400.0, 3000.0]))
    motion = solve(drop, "time")
    assert list(motion.accurate) == [True, False]
    assert motion.touchdown_time[0] == pytest.approx(45.45189906, rel=2e-6)


def test_density_factor_is_a_factor_on_the_density() -> None:
    factor = np.array([0.9, 1.0, 1.1])
    together = solve(replace(RIGS[2], density_factor=factor), "time")
    for case, value in enumerate(factor):
        alone = solve(replace(RIGS[2], density=lambda z, f=float(value): f * isa(z)), "time")
        assert together.opening_force[0, case] == pytest.approx(alone.opening_force[0, 0], rel=1e-6)
        assert together.line_stretch_equivalent_speed[0, case] == pytest.approx(
            alone.line_stretch_equivalent_speed[0, 0], rel=1e-6)
        assert together.slow_height[case] == pytest.approx(alone.slow_height[0], rel=1e-6)


def test_opening_coefficient_is_on_the_row_that_fills_only() -> None:
    plain = solve(rows(RIGS[2], replace(DROGUE, when_next_opens="stays"), MAIN, release_height=1500), "time")
    area = DROGUE.fillings[0].area
    pressure_of_drogue = plain.row_force[0, 0] / area
    assert plain.fill_force[0, 0] == pytest.approx(1.05 * plain.fill_force_plain[0, 0], rel=1e-12)
    assert plain.fill_force_plain[1, 0] < plain.fill_force[1, 0] < 1.7 * plain.fill_force_plain[1, 0]
    assert plain.row_force[1, 0] < plain.fill_force[1, 0]
    assert pressure_of_drogue * area >= plain.fill_force_plain[0, 0]


def test_a_drogue_that_leaves_takes_its_area_along() -> None:
    for leaves, held in (("stays", 245.0), ("goes at start", 233.0), ("goes at line stretch", 233.0)):
        drogue = replace(DROGUE, when_next_opens=leaves)
        drop = rows(RIGS[2], drogue, MAIN, release_height=1500)
        motion = solve(drop, "time")
        steady = 2 * 1000 * 9.80665 / (isa(0.0) * (held + 3.0))
        assert motion.touchdown_descent[0] == pytest.approx(np.sqrt(steady), rel=1e-3)


def test_without_the_drogue_the_load_gathers_speed_until_line_stretch() -> None:
    start, line_stretch = (
        solve(rows(RIGS[2], replace(DROGUE, when_next_opens=leaves), replace(MAIN, deployment_time=3.0),
                   release_height=2000, mass=300.0), "time")
        for leaves in ("goes at start", "goes at line stretch"))
    assert start.line_stretch_time[1, 0] == line_stretch.line_stretch_time[1, 0] == pytest.approx(12.0)
    assert start.line_stretch_speed[1, 0] > line_stretch.line_stretch_speed[1, 0] + 5


def test_a_row_that_opens_cuts_the_stages_of_the_row_before() -> None:
    motion = solve(dict(features())["main before the drogue's cutter"], "time")
    assert list(motion.started[:, 0]) == [True, False, True]
    assert np.isnan(motion.start_time[1, 0])
    assert motion.fill_force[1, 0] == 0
    assert not motion.landed_early[0]


def test_an_early_cutter_starts_from_the_area_reached() -> None:
    motion = solve(dict(features())["cutter before the end of filling"], "time")
    assert not motion.full[0, 0]
    assert motion.full[1, 0]
    assert motion.reached[0, 0] == pytest.approx(motion.fill_time[0, 0] / motion.nominal_fill_time[0, 0], rel=1e-9)
    assert motion.start_time[1, 0] == pytest.approx(motion.end_time[0, 0], rel=1e-12)


@pytest.mark.parametrize("rule", RULES)
def test_a_measured_filling_time_holds_under_both_rules(rule: FillingRule) -> None:
    motion = solve(dict(features())["measured filling time"], rule)
    assert motion.fill_time[0, 0] == pytest.approx(1.8, rel=1e-9)
    assert motion.nominal_fill_time[0, 0] == 1.8


def test_the_way_while_filling_is_the_fill_distance_under_the_distance_rule() -> None:
    motion = solve(cloud(RIGS[3], 20, 6), "distance")
    lengths = np.stack([np.broadcast_to(f.fill_distance, 20) for f in cloud(RIGS[3], 20, 6).rows[0].fillings])
    assert motion.fill_path == pytest.approx(lengths, rel=1e-9)


@pytest.mark.parametrize(("height", "landed_in"), [(15.0, -1), (60.0, 0), (100.0, 1), (400.0, 1)])
def test_where_it_lands(height: float, landed_in: int) -> None:
    motion = solve(replace(RIGS[2], release_height=height), "time")
    assert motion.landed_in[0] == landed_in
    assert motion.landed_early[0] == (landed_in < 1)
    assert np.isnan(motion.slow_time[0]) == (landed_in < 1)
    assert motion.accurate[0]


def test_released_on_the_ground_or_below() -> None:
    motion = solve(replace(RIGS[2], release_height=np.array([0.0, -5.0])), "time")
    assert motion.landed_early.all()
    assert (motion.touchdown_time == 0).all()


def test_relative_speed_at_line_stretch_is_that_against_the_aircraft() -> None:
    wind = ((0.0, 2.0), (400.0, 12.0))
    row = replace(RIGS[2].rows[0], line_stretch=None, static_line=18.0)
    motion = solve(rows(RIGS[2], row, winds=wind), "time")
    moment = float(motion.line_stretch_time[0, 0])
    later = solve(rows(RIGS[2], replace(row, static_line=None, line_stretch=moment + 1e-4), winds=wind), "time")
    assert motion.line_stretch_relative_speed[0, 0] == pytest.approx(
        later.line_stretch_relative_speed[0, 0], rel=1e-3)
    angle, speed = motion.line_stretch_angle[0, 0], motion.line_stretch_speed[0, 0]
    assert motion.line_stretch_relative_speed[0, 0] >= speed * np.sin(angle)


@pytest.mark.parametrize(("wrong", "message"), [
    ({"rows": ()}, "needs a row"),
    ({"rows": (Row((), line_stretch=1.0),)}, "no filling"),
    ({"rows": (Row((Filling(10.0, 10.0),)),)}, "row 1 needs line_stretch or static_line"),
    ({"rows": (RIGS[2].rows[0], RIGS[2].rows[0])}, "row 2 needs opens_after or opens_at_height"),
    ({"mass": np.ones(3), "airspeed": np.ones(2)}, "differ in length"),
    ({"mass": np.ones((2, 2))}, "one axis"),
    ({"mass": np.ones(0)}, "no case"),
    ({"rows": (replace(RIGS[2].rows[0], when_next_opens="leaves"),)}, "unknown when_next_opens"),
])
def test_a_drop_that_cannot_be_flown_is_refused(wrong: dict[str, Any], message: str) -> None:
    with pytest.raises(ValueError, match=message):
        solve(replace(RIGS[2], **wrong), "time")


def test_unknown_rule() -> None:
    with pytest.raises(ValueError, match="unknown filling rule"):
        solve(RIGS[2], "length")        # type: ignore[arg-type]


def test_importing_the_engine_loads_no_scipy_and_needs_numpy_alone() -> None:
    code = "import sys, model.physics.flight; print([m for m in ('scipy', 'pydantic', 'textual') if m in sys.modules])"
    found = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)
    assert found.stdout.strip() == "[]"


some = st.floats


@st.composite
def drops(draw: st.DrawFn) -> Drop:
    """Anything a person might type, sensible or not, but with some speed at line stretch."""
    mass = draw(some(5, 20000))

    def filling(stage: int) -> Filling:
        measured = draw(st.none() | some(0.05, 10.0))
        exponent = draw(st.sampled_from([0.5, 1.0, 1.5, 2.0, 3.0]))
        area, length = mass * 9.8 / draw(some(5, 5000)), draw(some(1, 500))
        return Filling(area, length, exponent, draw(some(1, 2)), stage * draw(some(0, 8)), measured)

    def row(number: int) -> Row:
        stages = tuple(filling(stage) for stage in range(draw(st.integers(1, 2))))
        leaves = draw(st.sampled_from(["stays", "goes at start", "goes at line stretch"]))
        if number == 0:
            start: dict[str, Any] = draw(some(0.3, 30).map(lambda v: {"line_stretch": v})
                                         | some(1, 60).map(lambda v: {"static_line": v}))
        else:
            start = draw(some(0, 300).map(lambda v: {"opens_after": v})
                         | some(0, 4000).map(lambda v: {"opens_at_height": v}))
            start["deployment_time"] = draw(some(0, 20))
        return Row(stages, when_next_opens=leaves, **start)

    heights = sorted(draw(st.lists(some(0, 4000), max_size=4, unique=True)))
    winds = tuple((height, draw(some(-25, 25))) for height in heights)
    return Drop(
        mass, draw(some(0, 150)), draw(some(1, 5000)), mass * draw(some(1e-4, 1e-2)),
        tuple(row(number) for number in range(draw(st.integers(1, 3)))), isa, draw(some(-100, 4000)), winds)


@settings(max_examples=25, deadline=None, derandomize=True)
@given(drops(), st.sampled_from(RULES))
def test_whatever_is_put_in(drop: Drop, rule: FillingRule) -> None:
    with warnings.catch_warnings():
        warnings.simplefilter("error")
        motion = solve(drop, rule)
    started, reached_rows = motion.started[:, 0], ~np.isnan(motion.line_stretch_time[:, 0])
    assert motion.accurate[0]
    for name, value in numbers(motion).items():
        if name in MAY_BE_UNKNOWN or value.dtype == bool:
            continue
        used = value
        if value.ndim == 2 and name.startswith("line_stretch"):
            used = value[reached_rows, 0]
        elif value.ndim == 2 and name != "row_force":
            used = value[started, 0]
        assert np.isfinite(used).all(), name
    times = motion.start_time[started, 0]
    assert (np.diff(times) >= -1e-9).all()
    assert (motion.end_time[started, 0] <= motion.touchdown_time[0] + 1e-9).all()
    assert (motion.speed_ratio[started, 0] >= 1).all()
    assert motion.touchdown_descent[0] <= np.sqrt(2 * 9.81 * drop.release_height) + 1e-6
    assert (motion.fill_force_plain >= 0).all()
