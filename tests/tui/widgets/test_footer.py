"""The footer as one row."""

from tui.commands import READING, Keys
from tui.rows import row_text, row_width
from tui.widgets.footer import footer


def test_only_whole_entries_are_shown_and_the_help_key_always() -> None:
    for screen in READING:
        entries = Keys().footer(screen)
        for cells in (60, 80, 120):
            shown = row_text(footer(entries, cells))
            assert row_width(footer(entries, cells)) <= cells
            assert shown.endswith("? keys")
            parts = {f"{key} {word}" for key, word in entries}
            assert {part.strip() for part in shown.split("   ")} <= parts


def test_the_most_wanted_entries_come_first() -> None:
    assert row_text(footer(Keys().footer("steps"), 80)).startswith(" enter next open   up/down step   w working")


def test_no_entries_make_an_empty_row() -> None:
    assert footer([], 80) == ()
