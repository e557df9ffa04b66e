import math
from itertools import pairwise

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from model.report.chart import Axis, Bound, Chart, Curve, Mark, parted, peak_of, plain, short, thinned

X, Y = Axis("time", "s"), Axis("force", "kN")


def test_values_that_are_not_finite_part_a_curve() -> None:
    curve = Curve([0, 1, 2, 3, math.nan, 5], [1, 2, math.nan, math.inf, 4, 5])
    assert curve.pieces == [[(0.0, 1.0), (1.0, 2.0)], [(5.0, 5.0)]]
    assert Curve([math.nan], [1]).pieces == []
    assert Curve([], []).pieces == []


def test_samples_must_pair_up() -> None:
    with pytest.raises(ValueError, match="not 2 and 1"):
        Curve([1, 2], [1])


def test_ranges_take_in_samples_marks_and_limits() -> None:
    chart = Chart([Curve([1, 2], [3, 4])], X, Y, [Bound(9), Bound(-1, kind="min")], [Mark(5, 3.5)])
    assert chart.x_range() == (1, 5)
    assert chart.y_range() == (-1, 9)
    assert Chart([Curve([1, 2], [3, 4])], X, Axis("a", from_zero=True)).y_range() == (0, 4)
    assert Chart([Curve([1, 2], [3, 4])], X, Y, [Bound(math.inf), Bound(math.nan)]).y_range() == (3, 4)


@pytest.mark.parametrize(
    ("values", "expected"),
    [([], (0, 1)), ([0, 0], (0, 1)), ([8], (4, 12)), ([-8, -8], (-12, -4)), ([1.0, 1.0 + 1e-15], (0.5, 1.5))],
)
def test_a_range_of_no_extent_is_opened(values: list[float], expected: tuple[float, float]) -> None:
    chart = Chart([Curve(list(range(len(values))), values)], X, Y)
    assert chart.y_range() == pytest.approx(expected)


def test_the_peak_is_the_first_largest_sample() -> None:
    assert peak_of(Curve([0, 1, 2, 3], [1, 7, math.nan, 7]), "top") == Mark(1, 7, "top")
    assert peak_of(Curve([0], [math.nan])) is None


def test_a_value_on_a_limit_keeps_it() -> None:
    assert not Bound(5).is_broken_by(5)
    assert Bound(5).is_broken_by(math.nextafter(5, 6))
    assert not Bound(5, kind="min").is_broken_by(5)
    assert Bound(5, kind="min").is_broken_by(4.9)
    assert Bound(1250.25).text == "1,250.25"


@settings(deadline=None, max_examples=60)
@given(st.lists(st.floats(-100, 100), min_size=1, max_size=300), st.integers(1, 20))
def test_thinning_keeps_ends_and_extremes_of_every_column(heights: list[float], columns: int) -> None:
    piece = [(float(i), y) for i, y in enumerate(heights)]
    places = [i * columns // len(piece) for i in range(len(piece))]
    kept = thinned(piece, places)
    assert len(kept) <= 4 * columns
    assert kept == [point for point in piece if point in set(kept)]
    for column in set(places):
        before = [y for (_, y), place in zip(piece, places, strict=True) if place == column]
        after = [y for x, y in kept if places[int(x)] == column]
        assert (min(after), max(after), after[0], after[-1]) == (min(before), max(before), before[0], before[-1])


@settings(deadline=None, max_examples=60)
@given(st.lists(st.floats(-100, 100), min_size=2, max_size=50), st.floats(-90, 90), st.floats(-90, 90))
def test_no_stretch_of_a_parted_line_crosses_a_limit(heights: list[float], one: float, other: float) -> None:
    piece = [(float(i), y) for i, y in enumerate(heights)]
    points = parted(piece, [Bound(one), Bound(other, kind="min")])
    for (x0, y0), (x1, y1) in pairwise(points):
        assert x0 <= x1
        assert all((y0 - level) * (y1 - level) >= 0 for level in (one, other))
    assert points[0] == piece[0]
    assert points[-1] == piece[-1]


def test_texts_keep_to_their_line_and_have_an_ascii_form() -> None:
    assert plain("a\n\x1b[31mb\u202ec\u2028d") == "a��[31mb�c�d"
    assert plain("28 °C ± 3 m²·é 高\x07", ascii=True) == "28 degC +/- 3 m2 e ??"
    assert plain("a\u00a0b\u3000c") == "a b c"
    assert plain("[kN] [/]") == "[kN] [/]"
    assert plain("\ud800") == "\N{REPLACEMENT CHARACTER}"


def test_a_short_number_stays_on_its_side_of_a_limit() -> None:
    assert short(28.5413, [Bound(30)]) == "28.54"
    assert short(133.0004, [Bound(133)]) == "133.0004"
    assert short(math.nextafter(133, 134), [Bound(133)]) == repr(math.nextafter(133, 134))
    assert short(1249.6, [Bound(1250, kind="min")]) == "1,249.6"
