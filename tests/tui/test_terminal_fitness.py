"""What the terminal can do."""

import pytest

from tui.terminal import refusal, too_small, wants_ascii, wants_no_colour

UTF8 = {"LANG": "en_GB.UTF-8"}


@pytest.mark.parametrize(
    ("environment", "plain"),
    [
        ({"TERM": "xterm-256color", **UTF8}, False),
        ({"TERM": "tmux-256color", "LC_ALL": "C.utf8"}, False),
        ({"TERM": "linux", **UTF8}, True),
        ({"TERM": "", **UTF8}, True),
        (UTF8, True),
        ({"TERM": "xterm"}, True),
        ({"TERM": "xterm", "LANG": "de_DE.ISO-8859-1"}, True),
        ({"TERM": "xterm", "LC_ALL": "C", **UTF8}, True),
        ({"TERM": "xterm", "LC_ALL": "", **UTF8}, False),
    ],
)
def test_ascii_is_chosen_where_glyphs_are_in_doubt(environment: dict[str, str], plain: bool) -> None:
    assert wants_ascii(environment, windows=False) is plain


def test_the_windows_console_draws_glyphs_only_in_its_new_terminal() -> None:
    assert wants_ascii({}, windows=True)
    assert not wants_ascii({"WT_SESSION": "x"}, windows=True)


def test_an_empty_no_color_counts() -> None:
    assert wants_no_colour({"NO_COLOR": ""})
    assert not wants_no_colour({})


def test_a_dumb_terminal_or_none_is_refused_in_one_line_that_names_plain_commands() -> None:
    for problem in (refusal({"TERM": "dumb"}, terminal=True), refusal({"TERM": "xterm"}, terminal=False)):
        assert problem is not None
        assert "\n" not in problem
        assert "rigslate check" in problem
    assert refusal({"TERM": "xterm"}, terminal=True) is None


def test_a_small_window_is_told_both_sizes() -> None:
    assert too_small(60, 20) is None
    for columns, rows in ((59, 20), (60, 19), (10, 5)):
        warning = too_small(columns, rows)
        assert warning is not None
        assert f"{columns} x {rows}" in warning
        assert "60 x 20" in warning
