"""Text made safe for the screen, and widths in cells."""

import unicodedata

import pytest
from hypothesis import given
from hypothesis import strategies as st

from tui.glyphs import FULL, PLAIN, clip, clip_front, fill, fill_left, width, wrap

ANY_TEXT = st.text(st.characters(), max_size=60)


@pytest.mark.parametrize(
    ("dirty", "clean"),
    [
        ("a\x1b[31mb", "a\ufffd[31mb"),
        ("one\ttwo\nthree", "one two three"),
        ("left\u202eright", "left\ufffdright"),
        ("join\u200der", "join\ufffder"),
        ("\x07bell", "\ufffdbell"),
        ("pump [bold]x[/bold]", "pump [bold]x[/bold]"),
        ("\u05e9\u05dc\u05d5\u05dd", "\u05e9\u05dc\u05d5\u05dd"),
        ("漢字", "漢字"),
        ("e\u0301", "é"),
    ],
)
def test_user_text_keeps_letters_and_shows_what_would_break_the_line(dirty: str, clean: str) -> None:
    assert FULL.clean(dirty) == clean


def test_a_pile_of_combining_marks_is_cut_down() -> None:
    cleaned = FULL.clean("q" + "\u0323" * 40)
    assert sum(unicodedata.combining(sign) > 0 for sign in cleaned) == 2


@given(ANY_TEXT)
def test_no_text_leaves_a_control_or_direction_sign(text: str) -> None:
    for sign in FULL.clean(text):
        assert unicodedata.category(sign) not in ("Cc", "Cf", "Cs", "Zl", "Zp")


@given(ANY_TEXT)
def test_the_ascii_form_of_any_text_is_ascii(text: str) -> None:
    assert PLAIN.clean(text).isascii()
    assert PLAIN.own(text).isascii()


def test_ascii_keeps_the_meaning_of_units_and_letters() -> None:
    assert PLAIN.clean("28 °C ± 3 °C, Åsgård, 2 m²") == "28 degC +/- 3 degC, Asgard, 2 m2"


def test_every_glyph_of_the_ascii_charset_is_one_ascii_sign() -> None:
    for name in ("rule", "cut", "unknown", "here", "limit", "fill", "over", "empty", "end_left", "end_right", "zero"):
        assert width(getattr(FULL, name)) == 1
        assert getattr(PLAIN, name).isascii()
        assert len(getattr(PLAIN, name)) == 1


@given(ANY_TEXT, st.integers(0, 30))
def test_clipped_text_fits_and_says_that_it_was_cut(text: str, cells: int) -> None:
    for chars in (FULL, PLAIN):
        cleaned = chars.clean(text)
        for cut, shown in ((clip, clip(cleaned, cells, chars)), (clip_front, clip_front(cleaned, cells, chars))):
            assert width(shown) <= cells
            if width(cleaned) > cells > 0:
                assert chars.cut in shown, cut


@given(ANY_TEXT, st.integers(1, 30))
def test_filled_text_takes_exactly_its_cells(text: str, cells: int) -> None:
    cleaned = FULL.clean(text)
    assert width(fill(cleaned, cells, FULL)) == cells
    assert width(fill_left(cleaned, cells, FULL)) == cells


@given(ANY_TEXT, st.integers(2, 30), st.sampled_from(["", "  "]))
def test_wrapped_text_fits_and_loses_nothing(text: str, cells: int, indent: str) -> None:
    cleaned = FULL.clean(text)
    lines = wrap(cleaned, cells, indent)
    assert all(width(line) <= cells for line in lines)
    assert "".join("".join(lines).split()) == "".join(cleaned.split())


def test_wide_signs_count_two_cells() -> None:
    assert clip("漢字漢字", 5, FULL) == "漢字…"
    assert wrap("漢字漢字", 5) == ["漢字", "漢字"]
