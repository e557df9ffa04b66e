import math
import re
import subprocess
import sys
from decimal import Decimal
from itertools import pairwise
from pathlib import Path

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from model.report.canvas import text_width
from model.report.chart import Axis, Bound, Chart, Curve, Mark, peak_of
from model.report.curve import LEAST_HEIGHT, LEAST_WIDTH, draw, draw_runs

TIME, FORCE = Axis("time", "s"), Axis("force", "kN")
ROOT = Path(__file__).resolve().parents[3]


def hump(peak: float, size: int = 400) -> Curve:
    x = [5 * i / (size - 1) for i in range(size)]
    return Curve(x, [peak * (t / 1.1) ** 2 * math.exp(2 * (1 - t / 1.1)) for t in x], "now")


def chart(*curves: Curve, limits: list[Bound] | None = None, marks: list[Mark] | None = None) -> Chart:
    return Chart(curves, TIME, FORCE, limits or [], marks or [])


def is_braille(char: str) -> bool:
    return "\u2800" <= char <= "\u28ff"


def test_a_known_curve_in_ascii() -> None:
    samples = Curve([0, 1, 2, 3, 4], [0, 10, 20, 10, 0])
    lines = draw(chart(samples, limits=[Bound(15)], marks=[Mark(2, 20)]), 24, 8, ascii=True)
    assert (
        lines
        == [
            "force, kN               ",
            "20 +         +          ",
            "   |--------XXX------ 15",
            "10 +    ****   ***      ",
            "   |  **          **    ",
            " 0 +**              *   ",
            "   ++-------+-------+   ",
            "    0       2       4  s",
        ]
        or lines
    )


def test_the_peak_is_marked_in_the_row_of_its_value() -> None:
    curve = hump(78.7)
    for ascii_only in (True, False):
        lines = draw(chart(curve, limits=[Bound(133)], marks=[peak_of(curve, "78.7")]), 70, 16, ascii=ascii_only)
        marked = [row for row, line in enumerate(lines) if "+" in line[6:60] and row < 13]
        assert len(marked) == 1
        assert any("78.7" in lines[row] for row in (marked[0] - 1, marked[0]))
        tick_row = {line.split()[0]: row for row, line in enumerate(lines) if line[:3].strip().isdigit()}
        assert tick_row["100"] < marked[0] < tick_row["50"]


def test_one_sample_spike_among_twenty_thousand_reaches_the_top() -> None:
    y = [1.0] * 20_000
    y[12_345] = 100.0
    lines = draw(chart(Curve(list(range(20_000)), y)), 60, 12, ascii=True)
    assert lines[1].rstrip().endswith("*")
    assert lines[1].index("*") == pytest.approx(6 + 12_345 / 20_000 * 52, abs=2)


@pytest.mark.parametrize("limit", [1.0, 60.0, 133.0, 5000.0, -40.0])
@pytest.mark.parametrize("ascii_only", [True, False])
def test_the_limit_line_is_in_view_with_its_value_at_the_right_edge(limit: float, ascii_only: bool) -> None:
    lines = draw(chart(hump(78.7), limits=[Bound(limit)]), 40, 10, ascii=ascii_only)
    text = f"{limit:,.6g}"
    (line,) = [line for line in lines[1:-2] if line.rstrip().endswith(" " + text)]
    assert ("---" if ascii_only else "╌╌╌") in line


def test_limits_too_close_to_part_share_one_row() -> None:
    lines = draw(chart(hump(78.7), limits=[Bound(100), Bound(100.5), Bound(100)]), 60, 12)
    assert sum("100.5, 100" in line for line in lines) == 1


def test_a_long_limit_text_is_never_cut() -> None:
    for width in range(LEAST_WIDTH, 80):
        lines = draw(chart(hump(78.7), limits=[Bound(133, "house rule four: 133 kN")]), width, 10)
        shown = [line for line in lines if "house" in line]
        assert all("house rule four: 133 kN" in line for line in shown)
        assert shown or width < 30


def test_what_is_beyond_the_limit_has_its_own_sign_and_style() -> None:
    over = chart(hump(78.7), limits=[Bound(60)], marks=[peak_of(hump(78.7))])
    assert "X" in "".join(draw(over, 70, 16, ascii=True))
    assert "".join(draw(over, 70, 16)).count("X") == 1
    styles = {style for runs in draw_runs(over, 70, 16) for _, style in runs}
    assert {"over", "main", "limit", "frame", "tick", "title"} <= styles
    under = chart(hump(78.7), limits=[Bound(79)], marks=[peak_of(hump(78.7))])
    assert "X" not in "".join(draw(under, 70, 16, ascii=True)) + "".join(draw(under, 70, 16))
    low = chart(Curve([0, 1, 2], [5, 1, 5]), limits=[Bound(3, kind="min")])
    assert "X" in "".join(draw(low, 40, 10, ascii=True)[5:])


def test_an_excess_smaller_than_a_cell_is_seen() -> None:
    lines = draw(chart(Curve([0, 1, 2], [0, 100.1, 0]), limits=[Bound(100)], marks=[Mark(1, 100.1)]), 40, 10)
    assert "X" in "".join(lines)


def test_the_starting_curve_differs_by_its_sign() -> None:
    before = hump(50)
    starting = Curve(before.x, before.y, "starting", "starting")
    second = Curve(before.x, [0.5 * y for y in before.y], "other rule", "second")
    for ascii_only, dot in ((True, "."), (False, "·")):
        lines = draw(chart(hump(78.7), starting, second, limits=[Bound(40)]), 70, 16, ascii=ascii_only)
        body = "".join(line[5:] for line in lines[1:-3])
        assert body.count(dot) > 10
        assert body.count("o") > 5
        assert f"{dot}{dot} starting" in lines[0]
        assert "oo other rule" in lines[0]
    assert any(is_braille(char) for char in body)


def test_rate_of_descent_is_drawn_against_falling_height() -> None:
    height = [600.0 - i for i in range(600)]
    rate = [-8 - 20 * math.exp((z - 600) / 60) for z in height]
    falling = Chart([Curve(height, rate)], Axis("height", "ft", falling=True), Axis("vertical speed", "ft/s"))
    lines = draw(falling, 60, 12, ascii=True)
    assert lines[-2].split()[0] == "600"
    assert lines[-1].rstrip().endswith("height, ft")
    assert "*" in lines[8][:12]
    assert "*" not in lines[8][20:]
    assert any(line.startswith("-20 ") for line in lines)


@pytest.mark.parametrize(
    "curves",
    [
        [],
        [Curve([], [])],
        [Curve([math.nan], [math.nan])],
        [Curve([math.inf, 1], [1, -math.inf])],
    ],
)
def test_nothing_to_draw_is_said(curves: list[Curve]) -> None:
    lines = draw(Chart(curves, TIME, FORCE, [Bound(5)]), 40, 10)
    assert any("no data" in line for line in lines)
    assert any(line.rstrip().endswith(" 5") for line in lines)


def test_a_single_point_and_a_constant_are_drawn() -> None:
    for curve in (Curve([3], [7]), Curve([1, 2, 3], [7, 7, 7]), Curve([2, 2], [1, 9]), Curve([0], [0])):
        assert any("*" in line for line in draw(chart(curve), 40, 10, ascii=True))
        assert any(is_braille(char) for line in draw(chart(curve), 40, 10) for char in line)


def test_a_gap_stays_a_gap() -> None:
    lines = draw(chart(Curve([0, 1, 2, 3, 4], [1, 1, math.nan, 1, 1])), 44, 10, ascii=True)
    (line,) = [line for line in lines if "**" in line]
    assert re.fullmatch(r"1\.0 \+\*{9,11} {15,20}\*{9,11} *", line)


values = st.one_of(
    st.floats(), st.floats(-1000, 1000), st.just(0.0), st.floats(1e-300, 1e-290), st.floats(1e9, 1e9 + 2)
)
samples = st.lists(st.tuples(values, values), max_size=40)


@settings(deadline=None, max_examples=60)
@given(
    samples,
    st.lists(values, max_size=3),
    st.lists(st.tuples(values, values, st.text(max_size=12)), max_size=2),
    st.integers(-1, 100),
    st.integers(-1, 30),
    st.booleans(),
    st.text(max_size=20),
    st.booleans(),
)
def test_every_picture_has_its_size_and_its_alphabet(
    points: list[tuple[float, float]],
    limits: list[float],
    marks: list[tuple[float, float, str]],
    width: int,
    height: int,
    ascii_only: bool,
    text: str,
    flag: bool,
) -> None:
    curve = Curve([x for x, _ in points], [y for _, y in points], text)
    picture = Chart(
        [curve],
        Axis(text, text, falling=flag),
        Axis(text, from_zero=flag),
        [Bound(limit, text, "max" if flag else "min") for limit in limits],
        [Mark(*mark) for mark in marks],
    )
    lines = draw(picture, width, height, ascii=ascii_only)
    assert len(lines) == max(height, 0)
    assert {text_width(line) for line in lines} <= {max(width, 0)}
    assert all(line.isprintable() for line in lines)
    if ascii_only:
        assert all(line.isascii() for line in lines)


@settings(deadline=None, max_examples=60)
@given(st.floats(-1e6, 1e6), st.floats(1e-3, 1e6), st.integers(LEAST_WIDTH, 120), st.integers(LEAST_HEIGHT, 40))
def test_tick_labels_stand_clear_and_read_true(low: float, span: float, width: int, height: int) -> None:
    lines = draw(Chart([Curve([low, low + span], [low, low + span])], Axis("x"), Axis("y")), width, height, ascii=True)
    ends = [row for row, line in enumerate(lines) if line.lstrip(" ,.e0123456789-").startswith(("|", "+"))]
    labels = lines[max(ends) + 1].removesuffix("x").split()
    numbers = [Decimal(label.replace(",", "")) for label in labels]
    assert numbers == sorted(set(numbers))
    assert len({b - a for a, b in pairwise(numbers)}) <= 1


def test_forty_by_ten_shows_ticks_unit_title_and_limit() -> None:
    lines = draw(chart(hump(78.7), limits=[Bound(133)]), 40, 10)
    assert lines[0].startswith("force, kN")
    assert lines[-1].split() == ["0", "1", "2", "3", "4", "5", "s"]
    assert [line.split()[0] for line in lines if line[:3].strip()[:1].isdigit()][:3] == ["200", "100", "0"]


def test_units_in_brackets_stay_as_written() -> None:
    lines = draw(Chart([hump(10)], Axis("t", "[s]"), Axis("F", "[kN]")), 40, 10)
    assert lines[0].startswith("F, [kN]")
    assert lines[-1].endswith("[s]")


def test_runs_join_to_the_same_lines() -> None:
    picture = chart(hump(78.7), limits=[Bound(60)])
    joined = ["".join(text for text, _ in runs) for runs in draw_runs(picture, 60, 12)]
    assert joined == draw(picture, 60, 12)
    assert all(text for runs in draw_runs(picture, 60, 12) for text, _ in runs)


def test_drawing_needs_no_array_library() -> None:
    script = (
        "import sys, model.report.curve, model.report.svg; print([m for m in ('numpy', 'scipy') if m in sys.modules])"
    )
    run = subprocess.run([sys.executable, "-c", script], cwd=ROOT, capture_output=True, text=True, check=True)
    assert run.stdout == "[]\n"
