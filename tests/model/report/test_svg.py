import math
import re
import xml.etree.ElementTree as ET

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from model.report.chart import Axis, Bound, Chart, Curve, Mark, peak_of
from model.report.svg import LEAST_HEIGHT, LEAST_WIDTH, svg
from model.report.ticks import ticks_around

SVG = "{http://www.w3.org/2000/svg}"
X = [i / 50 for i in range(251)]
NOW = Curve(X, [78.7 * (t / 1.1) ** 2 * math.exp(2 * (1 - t / 1.1)) for t in X], "now")
STARTING = Curve(X, [0.7 * y for y in NOW.y], "starting", "starting")
SECOND = Curve(X, [0.9 * y for y in NOW.y], "by distance", "second")
TIME, FORCE = Axis("time", "s"), Axis("force", "kN")
FULL = Chart([NOW, STARTING, SECOND], TIME, FORCE, [Bound(60)], [peak_of(NOW, "peak 78.7 kN")], "Opening force")


def parse(chart: Chart, width: int = 640, height: int = 360) -> ET.Element:
    return ET.fromstring(svg(chart, width, height))


def texts(root: ET.Element) -> list[str]:
    return [element.text or "" for element in root.iter(f"{SVG}text")]


def paths(root: ET.Element, kind: str) -> list[ET.Element]:
    return [element for element in root.iter(f"{SVG}path") if element.get("class") == kind]


def places(path: ET.Element) -> list[tuple[float, float]]:
    return [(float(x), float(y)) for x, y in re.findall(r"[ML](-?[\d.]+) (-?[\d.]+)", path.get("d") or "")]


def test_the_picture_is_named_and_described() -> None:
    root = parse(FULL)
    assert root.get("role") == "img"
    title, description = root.find(f"{SVG}title"), root.find(f"{SVG}desc")
    assert title is not None
    assert description is not None
    assert title.text == "Opening force"
    assert "now: from 0 to 78.7, highest at 1.1, beyond the limit." in (description.text or "")
    assert "Limit, at most: 60." in (description.text or "")
    assert (root.get("aria-labelledby") or "").split() == [title.get("id"), description.get("id")]


def test_pictures_on_one_page_have_names_of_their_own() -> None:
    assert parse(FULL).get("aria-labelledby") != parse(FULL, 700).get("aria-labelledby")
    assert svg(FULL) == svg(FULL)


def test_nothing_is_loaded_from_elsewhere_and_nothing_runs() -> None:
    text = svg(FULL)
    assert text.count("http") == text.count('xmlns="http://www.w3.org/2000/svg"') == 1
    for word in ("<script", "href", "url(", "@import", "font-face", "<style", "<image", "<use", "<foreignObject"):
        assert word not in text
    assert 'font-family="sans-serif"' in text
    assert not re.search(r"\son\w+=", text)


def test_lines_differ_without_colour() -> None:
    root = parse(FULL)
    looks = {
        kind: (paths(root, kind)[0].get("stroke-dasharray"), paths(root, kind)[0].get("stroke-width"))
        for kind in ("main", "second", "starting", "limit", "over", "frame")
    }
    assert len(set(looks.values())) == len(looks)


def test_the_stretch_beyond_the_limit_is_drawn_thicker_and_meets_the_limit_line() -> None:
    root = parse(FULL)
    limit = places(paths(root, "limit")[0])[0][1]
    for path in paths(root, "over"):
        assert all(y <= limit + 0.1 for _, y in places(path))
        assert places(path)[0][1] == pytest.approx(limit, abs=0.1)
        assert places(path)[-1][1] == pytest.approx(limit, abs=0.1)
    assert len(paths(root, "over")) == 2
    assert not paths(parse(Chart([NOW], TIME, FORCE, [Bound(79)])), "over")


def test_the_top_of_the_line_is_the_peak_on_the_scale_of_the_ticks() -> None:
    root = parse(Chart([NOW], TIME, FORCE))
    ticks = ticks_around(*Chart([NOW], TIME, FORCE).y_range(), most=6)
    scale = [element for element in root.iter(f"{SVG}text") if element.get("text-anchor") == "end"]
    labels = {element.text: float(element.get("y") or 0) - 4 for element in scale}
    low, high = labels[ticks[0].label], labels[ticks[-1].label]
    (curve,) = [path for path in paths(root, "main") if len(places(path)) > 2]
    top = min(y for _, y in places(curve))
    assert (top - low) / (high - low) == pytest.approx(max(NOW.y) / ticks[-1].value, abs=1e-3)


@pytest.mark.parametrize("size", [(LEAST_WIDTH, LEAST_HEIGHT), (640, 360), (1200, 300)])
def test_ticks_titles_and_limits_stay_inside_and_clear_of_each_other(size: tuple[int, int]) -> None:
    close = Chart([NOW, STARTING], TIME, FORCE, [Bound(60), Bound(61), Bound(133)], [peak_of(NOW)])
    boxes = []
    for element in parse(close, *size).iter(f"{SVG}text"):
        x, y, length = float(element.get("x") or 0), float(element.get("y") or 0), 6.5 * len(element.text or "")
        start = x - {"start": 0.0, "middle": length / 2, "end": length}[element.get("text-anchor") or "start"]
        assert start >= 0
        assert start + length <= size[0]
        assert 10 <= y <= size[1]
        boxes.append((start, start + length, y - 9, y))
    for i, (left, right, top, bottom) in enumerate(boxes):
        for other_left, other_right, other_top, other_bottom in boxes[i + 1 :]:
            assert right <= other_left or other_right <= left or bottom <= other_top or other_bottom <= top


def test_texts_of_users_are_data_not_markup() -> None:
    bad = '<b>&"]]>\x00\x1b\u202e\ufffe'
    chart = Chart([Curve([0, 1], [0, 1], bad)], Axis(bad, bad), Axis("y"), [Bound(1, bad)], [Mark(0, 0, bad)], bad)
    root = parse(chart)
    assert any('<b>&"]]>' in text for text in texts(root))
    assert not list(root.iter("b"))
    assert "\u202e" not in svg(chart)


def test_nothing_to_draw_is_said() -> None:
    for curve in (Curve([], []), Curve([math.nan], [1])):
        root = parse(Chart([curve], TIME, FORCE, [Bound(5)]))
        assert "no data" in texts(root)
        assert "5" in texts(root)


def test_a_picture_too_small_to_read_is_refused() -> None:
    with pytest.raises(ValueError, match="at least 240 x 150"):
        svg(FULL, LEAST_WIDTH - 1, 200)


values = st.one_of(st.floats(), st.floats(-1000, 1000))


@settings(deadline=None, max_examples=60)
@given(
    st.lists(st.tuples(values, values), max_size=30),
    st.lists(values, max_size=2),
    st.text(max_size=15),
    st.integers(LEAST_WIDTH, 1500),
    st.integers(LEAST_HEIGHT, 900),
)
def test_every_picture_is_well_formed_and_keeps_its_lines_inside(
    points: list[tuple[float, float]], limits: list[float], text: str, width: int, height: int
) -> None:
    curve = Curve([x for x, _ in points], [y for _, y in points], text)
    axis = Axis(text, text)
    chart = Chart([curve], axis, axis, [Bound(limit, text) for limit in limits], [Mark(0, 0, text)], text)
    root = parse(chart, width, height)
    for path in root.iter(f"{SVG}path"):
        if path.get("class") != "frame":
            assert all(-0.1 <= x <= width + 0.1 and -0.1 <= y <= height + 0.1 for x, y in places(path))
