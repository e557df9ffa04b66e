import math

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from model.report.ticks import Step, round_step, ticks_around, ticks_within

numbers = st.floats(-1e12, 1e12, allow_nan=False)
spans = st.floats(1e-6, 1e12)
counts = st.integers(1, 12)


@settings(deadline=None, max_examples=60)
@given(numbers, spans, counts)
def test_steps_are_round_and_as_small_as_the_count_allows(low: float, span: float, most: int) -> None:
    high = low + span
    if high - low < 1e-9 * max(abs(low), abs(high)):
        return
    step = round_step(low, high, most)
    assert step.factor in (1, 2, 5)
    assert (high - low) / step.times(1) <= most * (1 + 1e-6)
    smaller = {1: Step(5, step.exponent - 1), 2: Step(1, step.exponent), 5: Step(2, step.exponent)}[step.factor]
    assert (high - low) / smaller.times(1) > most * (1 - 1e-6)


@settings(deadline=None, max_examples=60)
@given(numbers, spans, counts)
def test_labels_are_the_values_and_differ(low: float, span: float, most: int) -> None:
    high = low + span
    if high - low < 1e-9 * max(abs(low), abs(high)):
        return
    ticks = ticks_around(low, high, most)
    assert ticks[0].value <= low + span * 1e-5
    assert ticks[-1].value >= high - span * 1e-5
    assert 2 <= len(ticks) <= most + 2
    assert [float(tick.label.replace(",", "")) for tick in ticks] == [tick.value for tick in ticks]
    assert len({tick.label for tick in ticks}) == len(ticks)
    inside = ticks_within(low, high, most)
    assert len(inside) <= most + 1
    assert {tick.value for tick in inside} <= {tick.value for tick in ticks}


@pytest.mark.parametrize(
    ("low", "high", "most", "labels"),
    [
        (0.0, 133.0, 3, ["0", "50", "100", "150"]),
        (0.0, 4.99, 10, ["0", "0.5", "1.0", "1.5", "2.0", "2.5", "3.0", "3.5", "4.0", "4.5", "5.0"]),
        (-0.3, 0.1, 2, ["-0.4", "-0.2", "0", "0.2"]),
        (0.0, 12_000.0, 3, ["0", "5,000", "10,000", "15,000"]),
        (0.0, 3e9, 2, ["0", "2e9", "4e9"]),
        (0.0, 1.4e-8, 3, ["0", "5e-9", "1e-8", "1.5e-8"]),
        (-2500.0, -1200.0, 2, ["-3,000", "-2,000", "-1,000"]),
    ],
)
def test_labels_read_as_written_by_hand(low: float, high: float, most: int, labels: list[str]) -> None:
    assert [tick.label for tick in ticks_around(low, high, most)] == labels


def test_extreme_ranges_keep_finite_ticks() -> None:
    for low, high in [(-1e300, 1e300), (0.0, 1e-289), (1e299, 1e300)]:
        ticks = ticks_around(low, high, 4)
        assert all(math.isfinite(tick.value) for tick in ticks)
        assert len({tick.value for tick in ticks}) == len(ticks) >= 2
