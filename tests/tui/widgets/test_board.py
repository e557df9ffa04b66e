"""The group board as rows of text."""

from tui.glyphs import FULL, PLAIN
from tui.rows import row_text, row_width
from tui.widgets.board import Group, board

GROUPS = (
    Group("load", ("PASS", "PASS")),
    Group("descent", ("PASS", "FAIL", "OPEN", "NOT COUNTED", "")),
    Group("looked at", ("OPEN",) * 9),
)


def test_each_verdict_has_its_mark_and_the_current_step_is_pointed_at() -> None:
    rows, current = board(GROUPS, (1, 1), 24, PLAIN)
    assert [row_text(line) for line in rows] == [
        "load       = =",
        "descent    =>X o - .",
        "looked at  o o o o o o o",
        "           o o",
    ]
    assert current == 1


def test_a_long_group_goes_on_below_and_its_row_is_named() -> None:
    _, current = board(GROUPS, (2, 7), 24, FULL)
    assert current == 3


def test_rows_stay_within_the_board() -> None:
    for cells in range(14, 40):
        rows, _ = board((Group("a very long group title indeed", ("OPEN",) * 30), *GROUPS), None, cells, FULL)
        assert all(row_width(line) <= cells for line in rows)


def test_no_groups_make_no_rows() -> None:
    assert board((), None, 24, FULL) == ([], 0)
