"""Going through the steps."""

from tests.tui.fakes import findings
from tui import stepping

STEPS = findings()
KEYS = [finding.key for finding in STEPS]


def at(key: str) -> int:
    return KEYS.index(key)


def test_it_begins_at_the_first_open_step_else_at_a_failing_one() -> None:
    assert stepping.first(STEPS) == at("opening.load_factor")
    closed = tuple(finding for finding in STEPS if finding.verdict != "OPEN")
    assert closed[stepping.first(closed)].key == "descent.rate"
    assert stepping.first(()) == 0


def test_the_next_open_step_starts_over_after_the_last() -> None:
    assert stepping.next_open(STEPS, at("opening.load_factor")) == at("canopy.bag_ties")
    assert stepping.next_open(STEPS, at("lashing.tight")) == at("opening.load_factor")


def test_a_step_answered_a_moment_ago_is_not_open() -> None:
    assert stepping.next_open(STEPS, at("opening.load_factor"), {"canopy.bag_ties"}) == at("canopy.release")


def test_without_another_open_step_there_is_no_next() -> None:
    closed = tuple(finding for finding in STEPS if finding.verdict != "OPEN")
    assert stepping.next_open(closed, 0) is None


def test_steps_and_groups_stop_at_both_ends() -> None:
    last = len(STEPS) - 1
    assert stepping.step(STEPS, 0, -1) == 0
    assert stepping.step(STEPS, last, 1) == last
    assert stepping.step_group(STEPS, 0, -1) == 0
    assert stepping.step_group(STEPS, 0, 1) == at("balance.forward")
    assert stepping.step_group(STEPS, last, 1) == last


def test_steps_of_one_group_stand_together_even_where_the_list_splits_them() -> None:
    mixed = (STEPS[0], STEPS[3], STEPS[1])
    assert stepping.order(mixed) == [0, 2, 1]
    assert stepping.place(mixed, 2) == (0, 1)
