"""Restraint in five directions: mirrors, rings, kinds, and what more lashings do."""

from dataclasses import replace
from typing import get_args

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from model.physics import lashing
from model.physics.lashing import DIRECTIONS, Mirror, Row, hold

QUICK = settings(deadline=None, max_examples=50)

STRAP = Row((-1.0, 0.6, 0.0), (0.1, 0.35, 0.85), 1, 22e3, 44e3, 22e3)
FIELD = st.integers(1000, 50000).map(float)


def mm(least: int, most: int) -> st.SearchStrategy[float]:
    return st.integers(least, most).map(lambda value: value / 1000.0)


@st.composite
def rows(draw: st.DrawFn) -> Row:
    deck = draw(st.tuples(mm(-4000, 4000), mm(-1500, 1500), mm(-100, 0)))
    load = draw(st.tuples(mm(-3000, 3000), mm(-1200, 1200), mm(1, 2000)))
    return Row(
        deck, load, draw(st.integers(1, 6)), draw(FIELD), draw(FIELD), draw(FIELD),
        draw(st.sampled_from(["strap", "chain"])), draw(st.sampled_from(get_args(Mirror))),
        draw(st.sampled_from(["", "", "R1", "R2"])),
    )  # fmt: skip


SEVERAL = st.lists(rows(), max_size=6)


def test_row_holds_against_the_way_it_does_not_pull() -> None:
    held = hold([STRAP]).held
    length = np.linalg.norm(np.subtract(STRAP.deck, STRAP.load))
    assert held["forward"] == pytest.approx(22e3 * 1.1 / length)
    assert held["right"] == pytest.approx(22e3 * 0.25 / length)
    assert held["up"] == pytest.approx(22e3 * 0.85 / length)
    assert held["aft"] == held["left"] == 0.0


def test_weakest_part_counts_and_is_named() -> None:
    assert STRAP.weakest == "device"
    assert replace(STRAP, deck_fitting=10e3).weakest == "deck fitting"
    assert replace(STRAP, load_fitting=9e3).weakest == "load fitting"
    assert hold([replace(STRAP, load_fitting=11e3)]).held["up"] == pytest.approx(0.5 * hold([STRAP]).held["up"])


@QUICK
@given(rows(), st.sampled_from(["left-right", "fore-aft"]))
def test_mirror_is_the_row_written_out_on_the_other_side(row: Row, mirror: Mirror) -> None:
    flip = lashing.MIRRORED[mirror]
    one, two = replace(row, mirror=""), replace(row, mirror="", ring=row.ring and "other")
    x, y, z = (np.array(flip) * two.deck).tolist()
    u, v, w = (np.array(flip) * two.load).tolist()
    written = hold([one, replace(two, deck=(x, y, z), load=(u, v, w))]).held
    held = hold([replace(row, mirror=mirror)]).held
    assert held == pytest.approx(written)
    assert held["left"] == pytest.approx(held["right"]) or mirror == "fore-aft"
    assert held["forward"] == pytest.approx(held["aft"]) or mirror == "left-right"


def test_image_of_a_ring_is_a_ring_of_its_own() -> None:
    pair = hold([replace(STRAP, mirror="left-right", ring="L4", deck_fitting=22e3)])
    assert {pull.ring for pull in pair.pulls} == {"L4", "L4 (left-right)"}
    assert pair.overloaded == ()
    assert pair.held["up"] == pytest.approx(2.0 * hold([STRAP]).held["up"])


@QUICK
@given(SEVERAL)
def test_no_ring_is_asked_for_more_than_its_least_fitting(several: list[Row]) -> None:
    held = hold(several)
    for ring in {pull.ring for pull in held.pulls if pull.ring}:
        on_it = [pull for pull in held.pulls if pull.ring == ring]
        for way, unit in DIRECTIONS.items():
            used = [pull.vector * pull.scales[way] for pull in on_it]
            against = [vector for vector in used if vector @ np.array(unit) < 0.0]
            assert np.linalg.norm(np.sum(used, axis=0)) <= min(pull.fitting for pull in on_it) * (1 + 1e-9)
            assert np.linalg.norm(np.sum(against or [[0.0] * 3], axis=0)) <= min(p.fitting for p in on_it) * (1 + 1e-9)


def test_two_rows_on_one_ring_share_its_strength() -> None:
    other = replace(STRAP, load=(0.1, 0.85, 0.85))
    ringed = [replace(STRAP, ring="L4", deck_fitting=25e3), replace(other, ring="L4", deck_fitting=44e3)]
    held = hold(ringed)
    total = np.sum([pull.vector for pull in held.pulls], axis=0)
    assert held.overloaded == ("L4",)
    assert held.held["forward"] == pytest.approx(abs(total[0]) * 25e3 / np.linalg.norm(total))
    assert held.held["forward"] < hold([STRAP, other]).held["forward"]


def test_rows_that_pull_opposite_ways_do_not_let_each_other_off() -> None:
    # Forward motion loads the first row alone: its two lashings would put 44 kN on a ring of 22 kN.
    aft = Row((0.0, 0.0, 0.0), (2.0, 0.0, 0.5), 2, 22e3, 22e3, 22e3, ring="M")
    forward = replace(aft, load=(-2.0, 0.0, 0.5), count=1)
    alone = hold([aft]).held["forward"]
    assert alone == pytest.approx(22e3 * 2.0 / np.hypot(2.0, 0.5))
    assert hold([aft, forward]).held["forward"] <= alone * (1 + 1e-12)


@QUICK
@given(SEVERAL, rows())
def test_more_lashings_hold_no_less_unless_they_overload_their_ring(several: list[Row], new: Row) -> None:
    before, after = hold(several), hold([*several, new])
    for way in DIRECTIONS:
        if not after.overloaded:
            assert after.held[way] >= before.held[way] * (1 - 1e-12)
    free = hold([*several, replace(new, ring="its own")])
    for way in DIRECTIONS:
        assert free.held[way] >= before.held[way] * (1 - 1e-12)


def test_row_across_takes_from_a_row_along_where_their_ring_is_overloaded() -> None:
    along = Row((0.0, 0.0, 0.0), (2.0, 0.0, 0.001), 1, 20e3, 22e3, 22e3, ring="L4")
    across = replace(along, load=(0.1, 2.0, 0.001))
    held = hold([along, across])
    assert held.overloaded == ("L4",)
    assert held.held["forward"] < hold([along]).held["forward"]
    assert held.held["left"] < hold([across]).held["left"]


@QUICK
@given(SEVERAL)
def test_quarter_turn_turns_the_answer(several: list[Row]) -> None:
    plain = [replace(row, mirror="") for row in several]
    turned = [
        replace(row, deck=(-row.deck[1], row.deck[0], row.deck[2]), load=(-row.load[1], row.load[0], row.load[2]))
        for row in plain
    ]
    before, after = hold(plain).held, hold(turned).held
    for way, now in {"forward": "left", "left": "aft", "aft": "right", "right": "forward", "up": "up"}.items():
        assert after[now] == pytest.approx(before[way], abs=1e-6)


@QUICK
@given(SEVERAL, st.floats(0.1, 10.0))
def test_unit_of_length_does_not_matter_and_strengths_scale(several: list[Row], factor: float) -> None:
    scaled = [
        replace(
            row,
            deck=tuple(factor * x for x in row.deck),
            load=tuple(factor * x for x in row.load),
            device=factor * row.device,
            deck_fitting=factor * row.deck_fitting,
            load_fitting=factor * row.load_fitting,
        )
        for row in several
    ]
    plain = hold(several).held
    assert hold(scaled).held == pytest.approx({way: factor * force for way, force in plain.items()}, abs=1e-6)


@QUICK
@given(SEVERAL)
def test_kinds_add_up_and_mixing_is_more_than_a_tenth_each(several: list[Row]) -> None:
    held = hold(several)
    for way, force in held.held.items():
        parts = held.by_kind[way]
        assert sum(parts.values()) == pytest.approx(force)
        least = min(parts.get("strap", 0.0), parts.get("chain", 0.0))
        assert (way in held.mixed) == (least > 0.1 * force)


def test_mixed_kinds_are_named_by_direction() -> None:
    chain = replace(STRAP, kind="chain", device=44e3, load_fitting=44e3)
    assert hold([STRAP, chain]).mixed == ("forward", "right", "up")
    assert hold([replace(STRAP, device=2e3), chain]).mixed == ()
    assert hold([STRAP, STRAP]).mixed == ()


def test_deck_point_used_twice_without_one_ring_is_noticed() -> None:
    other = replace(STRAP, load=(0.1, 0.85, 0.85))
    assert hold([STRAP, other]).unnamed_sharing == ((0, 1),)
    assert hold([replace(STRAP, ring="L4"), other]).unnamed_sharing == ((0, 1),)
    assert hold([replace(STRAP, ring="L4"), replace(other, ring="L4")]).unnamed_sharing == ()
    middle = replace(STRAP, deck=(-1.0, 0.0, 0.0), mirror="left-right")
    assert hold([middle]).unnamed_sharing == ((0, 0),)
    assert hold([STRAP, replace(other, deck=(-1.1, 0.6, 0.0))]).unnamed_sharing == ()


@pytest.mark.parametrize(
    ("row", "words"),
    [
        (replace(STRAP, load=STRAP.deck), "row 2: deck point and load point are one"),
        (replace(STRAP, count=0), "row 2: count"),
        (replace(STRAP, device=0.0), "row 2: count and strengths"),
        (replace(STRAP, load_fitting=float("nan")), "row 2: count and strengths"),
        (replace(STRAP, load=(0.0, float("inf"), 1.0)), "row 2: deck point and load point"),
    ],
)
def test_rows_without_sense_are_refused_by_number(row: Row, words: str) -> None:
    with pytest.raises(ValueError, match=words):
        hold([STRAP, row])


def test_no_rows_hold_nothing() -> None:
    assert set(hold([]).held.values()) == {0.0}
    assert hold([]).mixed == ()


@QUICK
@given(st.floats(1e3, 1e5), st.floats(0.0, 1.5), st.floats(0.0, 1.5))
def test_angles_and_measured_lengths_give_the_same(pull: float, up: float, side: float) -> None:
    run = [np.cos(up) * np.cos(side), np.cos(up) * np.sin(side), np.sin(up)]
    by_angle = [
        lashing.pull_along(pull, up, side), lashing.pull_across(pull, up, side), lashing.pull_down(pull, up),
    ]  # fmt: skip
    assert [lashing.component(pull, 3.0 * x, 3.0) for x in run] == pytest.approx(by_angle)
    assert np.linalg.norm(by_angle) == pytest.approx(pull)


def test_ratio_is_held_over_needed() -> None:
    assert lashing.restraint_ratio(45e3, 1.5, 10e3) == pytest.approx(45e3 / lashing.restraint_needed(1.5, 10e3))


@pytest.mark.parametrize(("needed", "each", "count"), [(30.0, 10.0, 3), (30.1, 10.0, 4), (0.3, 0.1, 3)])
def test_whole_lashings_are_counted(needed: float, each: float, count: int) -> None:
    assert lashing.devices_needed(needed, each) == count


@QUICK
@given(st.lists(st.tuples(st.floats(1.0, 1e5), st.floats(1.0, 1e6)), min_size=1, max_size=5))
def test_unlike_lashings_never_hold_their_sum_unless_they_stretch_alike(parts: list[tuple[float, float]]) -> None:
    strengths, stiffnesses = zip(*parts, strict=True)
    assert lashing.held_together(strengths, stiffnesses) <= sum(strengths) * (1 + 1e-12)
    assert lashing.held_together(strengths, strengths) == pytest.approx(sum(strengths))
