"""The margin bar as rows of text."""

import pytest
from hypothesis import assume, given
from hypothesis import strategies as st

from tui.glyphs import FULL, PLAIN, Charset
from tui.rows import row_text, row_width
from tui.widgets.bar import margin_bar, scale_for


def speed(number: float) -> str:
    return f"{number:.6g} ft/s"


def drawn(value: float, minimum: float | None, maximum: float | None, chars: Charset = PLAIN) -> list[str]:
    return [row_text(line) for line in margin_bar(value, minimum, maximum, 50, chars, speed)]


def test_a_value_over_the_greatest_is_filled_to_the_tick_and_crossed_beyond_it() -> None:
    bar, labels = drawn(29.4, None, 28.5)
    assert bar == "[=======================================|X.......]"
    assert labels == "0 ft/s                            max 28.5 ft/s"


def test_a_value_short_of_the_least_is_crossed_up_to_the_tick() -> None:
    bar, labels = drawn(0.5, 2.5, None)
    assert bar.startswith("[=========XX")
    assert "X|" in bar
    assert "min 2.5 ft/s" in labels


def test_a_value_at_the_end_of_a_short_bar_stays_within_it() -> None:
    rows = margin_bar(0.0, 0.125, 1.0, 12, PLAIN, speed)
    assert row_text(rows[0]) == "[X|......|.]"


def test_a_value_between_two_bounds_has_no_cross() -> None:
    bar, labels = drawn(1.2, -4, 6)
    assert "X" not in bar
    assert bar.count("|") == 2
    assert "min -4 ft/s" in labels
    assert "max 6 ft/s" in labels


def test_without_a_limit_or_a_number_there_is_no_bar() -> None:
    assert drawn(1.0, None, None) == []
    assert drawn(float("nan"), None, 2.0) == []
    assert drawn(float("inf"), None, 2.0) == []


def test_full_glyphs_and_ascii_draw_the_same_cells() -> None:
    full, plain = drawn(29.4, None, 28.5, FULL)[0], drawn(29.4, None, 28.5)[0]
    twins = dict(zip(full, plain, strict=True))
    assert "".join(twins[sign] for sign in full) == plain
    assert plain.isascii()


SIZES = st.floats(-1e6, 1e6).filter(lambda number: number == 0 or abs(number) > 1e-6)


@given(SIZES, st.none() | SIZES, st.none() | SIZES, st.integers(12, 80))
def test_the_bar_never_contradicts_the_verdict(
    value: float, minimum: float | None, maximum: float | None, cells: int
) -> None:
    assume(minimum is not None or maximum is not None)
    assume(minimum is None or maximum is None or minimum < maximum)
    rows = margin_bar(value, minimum, maximum, cells, PLAIN, speed)
    fails = (minimum is not None and value < minimum) or (maximum is not None and value > maximum)
    assert ("X" in row_text(rows[0])) == fails
    assert row_text(rows[0]).count("|") == (minimum is not None) + (maximum is not None)
    assert all(row_width(line) <= cells for line in rows)
    assert row_width(rows[0]) == cells


@pytest.mark.parametrize(("value", "bounds"), [(5.0, [4.0]), (-5.0, [4.0]), (0.0, [0.0]), (100.0, [95.0, 105.0])])
def test_the_scale_holds_every_number(value: float, bounds: list[float]) -> None:
    scale = scale_for(value, bounds)
    assert scale.low < scale.high
    assert all(scale.low <= number <= scale.high for number in (value, *bounds))


def test_close_bounds_are_not_drawn_from_zero() -> None:
    assert scale_for(100.0, [95.0, 105.0]).low > 50
    assert scale_for(29.4, [28.5]).low == 0
