"""SI values to text."""

import math
import re
from fractions import Fraction

import pytest
from hypothesis import given
from hypothesis import strategies as st

from model.quantity import (
    Dimension,
    UnitSystem,
    difference_to_unit,
    from_unit,
    parse,
    scale_and_offset,
    show,
    show_apart,
    show_difference,
    show_quantity,
    to_unit,
    unit_for,
    unit_names,
)

LENGTH, SPEED, FORCE, NUMBER = Dimension.LENGTH, Dimension.SPEED, Dimension.FORCE, Dimension.NUMBER
DIMENSIONS = st.sampled_from(list(Dimension))
SANE = st.floats(1e-6, 1e9) | st.floats(-1e9, -1e-6) | st.just(0.0)


@pytest.mark.parametrize(
    ("text", "dimension", "shown"),
    [
        ("2150 lb", Dimension.MASS, "2,150 lb"),
        ("29.4 ft/s", SPEED, "29.4 ft/s"),
        ("29.40 ft/s", SPEED, "29.4 ft/s"),
        ("-120 ft", LENGTH, "-120 ft"),
        ("8 ft 6 in", LENGTH, "8 ft 6 in"),
        ("-8 ft 6 in", LENGTH, "-8 ft 6 in"),
        ("0 ft 6 in", LENGTH, "6 in"),
        ("0.0466", NUMBER, "0.0466"),
        ("95 %", NUMBER, "95 %"),
        ("28 °C", Dimension.TEMPERATURE, "28 °C"),
        ("-0.0 ft", LENGTH, "0 ft"),
        ("1234567 N", FORCE, "1,234,567 N"),
        ("1234.56 N", FORCE, "1,235 N"),
        ("0.000123456", NUMBER, "0.0001235"),
    ],
)
def test_a_written_value_is_shown_as_written(text: str, dimension: Dimension, shown: str) -> None:
    quantity = parse(text, dimension)
    assert show(quantity.value, dimension, quantity.unit) == shown


@pytest.mark.parametrize(
    ("number", "shown"),
    [("2.0005", "2.001"), ("2.00049", "2"), ("9.9995", "10"), ("99.995", "100"), ("0.99995", "1"), ("28.545", "28.55")],
)
def test_halves_round_up_as_the_user_wrote_them(number: str, shown: str) -> None:
    value = parse(f"{number} ft/s", SPEED).value
    assert show(value, SPEED, "ft/s") == f"{shown} ft/s"
    assert show(-value, SPEED, "ft/s") == f"-{shown} ft/s"


def test_inches_carry_into_feet() -> None:
    assert show(from_unit(95.9999, "in", LENGTH), LENGTH, "ft in") == "8 ft 0 in"


def test_sign_is_shown_on_demand_and_never_on_zero() -> None:
    assert show(1.0, LENGTH, "m", sign=True) == "+1 m"
    assert show(-1.0, LENGTH, "m", sign=True) == "-1 m"
    assert show(0.0, LENGTH, "m", sign=True) == show(-0.0, LENGTH, "m", sign=True) == "0 m"


def test_only_sizes_beyond_reason_get_an_exponent() -> None:
    assert show(1e-6, NUMBER, "") == "0.000001"
    assert show(1.5e-9, NUMBER, "") == "1.5e-9"
    assert show(1e14, NUMBER, "") == "100,000,000,000,000"
    assert show(1.23456e20, NUMBER, "") == "1.235e20"
    assert parse(show(1.5e-9, NUMBER, ""), NUMBER).value == 1.5e-9


@pytest.mark.parametrize("value", [5e-324, 1e-308, 1.7976931348623157e308])
def test_the_ends_of_the_float_range_are_shown(value: float) -> None:
    for dimension in Dimension:
        for unit in (*unit_names(dimension), *(["ft in"] if dimension is LENGTH else [])):
            assert 0 < len(show(value, dimension, unit)) < 40
            assert to_unit(value, unit, dimension) >= 0.0 or dimension is Dimension.TEMPERATURE


def test_what_is_not_finite_is_shown_and_does_not_raise() -> None:
    assert show(math.inf, LENGTH, "m") == "inf m"
    assert show_apart(math.nan, 1.0, LENGTH, "m") == ("nan m", "1 m")
    assert to_unit(math.inf, "°C", Dimension.TEMPERATURE) == math.inf
    assert math.isnan(from_unit(math.nan, "ft", LENGTH))
    assert difference_to_unit(-math.inf, "ft", LENGTH) == -math.inf
    assert show_difference(math.inf, LENGTH, "ft") == "inf ft"


def test_a_temperature_difference_has_no_ice_point() -> None:
    assert show_difference(5.0, Dimension.TEMPERATURE, "°F") == "9 °F"
    assert difference_to_unit(5.0, "°F", Dimension.TEMPERATURE) == pytest.approx(9.0)


@pytest.mark.parametrize(
    ("text", "dimension", "written", "si", "us"),
    [
        ("1,250 ft ± 50 ft", LENGTH, "1,250 ft ± 50 ft", "381 m ± 15.24 m", "1,250 ft ± 50 ft"),
        ("8 ft 6 in ± 1 in", LENGTH, "8 ft 6 in ± 1 in", "2.591 m ± 0.0254 m", "8.5 ft ± 0.08333 ft"),
        ("28 °C ± 3 °C", Dimension.TEMPERATURE, "28 °C ± 3 °C", "28 °C ± 3 °C", "82.4 °F ± 5.4 °F"),
        ("6,300 psf ± 8 %", Dimension.PRESSURE, "6,300 psf ± 8 %", "301.6 kPa ± 8 %", "6,300 psf ± 8 %"),
        ("30,000 lbf", FORCE, "30,000 lbf", "133.4 kN", "30,000 lbf"),
        ("130 kt", SPEED, "130 kt", "66.88 m/s", "219.4 ft/s"),
        ("0.75 ± 0.04", NUMBER, "0.75 ± 0.04", "0.75 ± 0.04", "0.75 ± 0.04"),
    ],
)
def test_quantities_in_each_unit_system(text: str, dimension: Dimension, written: str, si: str, us: str) -> None:
    quantity = parse(text, dimension)
    assert show_quantity(quantity) == written
    assert show_quantity(quantity, UnitSystem.SI) == si
    assert show_quantity(quantity, UnitSystem.US) == us


def test_the_unit_follows_the_size() -> None:
    assert unit_for(FORCE, UnitSystem.SI, size=9_999.0) == "N"
    assert unit_for(FORCE, UnitSystem.SI, size=-10_000.0) == "kN"
    assert unit_for(LENGTH, UnitSystem.US, size=0.5) == "in"
    assert unit_for(LENGTH, UnitSystem.US, size=1.0) == unit_for(LENGTH, UnitSystem.US, size=0.0) == "ft"
    assert unit_for(Dimension.TIME, UnitSystem.SI, size=60.0) == "s"
    assert unit_for(Dimension.TIME, UnitSystem.SI, size=86_400.0 * 33) == "d"
    assert unit_for(Dimension.TIME, UnitSystem.SI, size=86_400.0 * 4000) == "yr"
    assert unit_for(Dimension.PRESSURE, UnitSystem.US, size=1e6) == "psi"
    assert unit_for(LENGTH, UnitSystem.WRITTEN, "yd", 1.0) == "yd"
    assert unit_for(LENGTH, UnitSystem.WRITTEN, None) == unit_for(LENGTH, UnitSystem.WRITTEN, "kg") == "m"
    assert unit_for(LENGTH, UnitSystem.US, "yd", math.inf) == "ft"


@pytest.mark.parametrize(
    ("value", "bound", "shown"),
    [
        (28.54, 28.5, ("28.54 ft/s", "28.5 ft/s")),
        (28.504, 28.5, ("28.504 ft/s", "28.5 ft/s")),
        (28.5000001, 28.5, ("28.5000001 ft/s", "28.5 ft/s")),
        (28.5, 28.5, ("28.5 ft/s", "28.5 ft/s")),
        (28.4999, 28.5, ("28.4999 ft/s", "28.5 ft/s")),
    ],
)
def test_a_shown_number_does_not_contradict_its_verdict(value: float, bound: float, shown: tuple[str, str]) -> None:
    value, bound = (from_unit(number, "ft/s", SPEED) for number in (value, bound))
    assert show_apart(value, bound, SPEED, "ft/s") == shown


def read_back(text: str) -> Fraction:
    """The number a reader sees; feet and inches in inches."""
    sign = -1 if text.startswith("-") else 1
    numbers = [Fraction(part) for part in re.findall(r"[0-9.]+(?:e-?[0-9]+)?", text.replace(",", ""))[:2]]
    if " ft " in text and text.endswith(" in"):
        return sign * (12 * numbers[0] + numbers[1])
    return sign * numbers[0]


def a_unit_of(dimension: Dimension) -> st.SearchStrategy[str]:
    return st.sampled_from([*unit_names(dimension), *(["ft in"] if dimension is LENGTH else [])] or [""])


def order(a: Fraction | float, b: Fraction | float) -> int:
    return (a > b) - (a < b)


@given(DIMENSIONS, st.data(), SANE, st.integers(-3, 3), st.integers(1, 6))
def test_shown_numbers_compare_as_the_values_do(
    dimension: Dimension, data: st.DataObject, bound: float, steps: int, digits: int
) -> None:
    unit = data.draw(a_unit_of(dimension))
    if dimension is Dimension.TEMPERATURE:
        bound = abs(bound) + 1.0
    value = bound
    for _ in range(abs(steps)):
        value = math.nextafter(value, math.inf if steps > 0 else -math.inf)
    shown = show_apart(value, bound, dimension, unit, digits=digits)
    assert order(read_back(shown[0]), read_back(shown[1])) == order(value, bound)


@given(DIMENSIONS, st.data(), SANE, SANE)
def test_any_two_values_compare_as_shown(dimension: Dimension, data: st.DataObject, value: float, bound: float) -> None:
    unit = data.draw(st.sampled_from(unit_names(dimension) or [""]))
    shown = show_apart(value, bound, dimension, unit)
    assert order(read_back(shown[0]), read_back(shown[1])) == order(value, bound)


@given(DIMENSIONS, st.data(), SANE)
def test_there_and_back_again(dimension: Dimension, data: st.DataObject, value: float) -> None:
    unit = data.draw(st.sampled_from(unit_names(dimension) or ("",)))
    scale = abs(scale_and_offset(unit, dimension)[1]) + abs(value)
    again = from_unit(to_unit(value, unit, dimension), unit, dimension)
    assert again == pytest.approx(value, rel=1e-15, abs=4e-16 * scale)


@given(DIMENSIONS, st.data(), st.integers(0, 10**12), st.integers(-3, 8))
def test_shown_text_reads_back_as_the_same_value(
    dimension: Dimension, data: st.DataObject, digits: int, places: int
) -> None:
    unit = data.draw(st.sampled_from(unit_names(dimension) or ("",)))
    quantity = parse(f"{digits}e{-places} {unit}", dimension)
    again = parse(show(quantity.value, dimension, unit, digits=14), dimension)
    scale = abs(scale_and_offset(unit, dimension)[1])
    assert again.value == pytest.approx(quantity.value, rel=1e-13, abs=1e-13 * scale)


@given(DIMENSIONS, st.data(), SANE, st.integers(1, 20))
def test_no_minus_zero_and_no_trailing_zeros(
    dimension: Dimension, data: st.DataObject, value: float, digits: int
) -> None:
    unit = data.draw(st.sampled_from(unit_names(dimension) or ("",)))
    number = show(value, dimension, unit, digits=digits).split(" ")[0]
    assert not re.fullmatch(r"-0(\.0*)?", number)
    assert not re.search(r"\.\d*0$", number)


@given(st.sampled_from([d for d in Dimension if d is not Dimension.NUMBER]), st.data(), st.floats(0.01, 1e6))
def test_array_factors_agree_with_exact_ones(dimension: Dimension, data: st.DataObject, number: float) -> None:
    unit = data.draw(st.sampled_from(unit_names(dimension)))
    scale, offset = scale_and_offset(unit, dimension)
    assert number * scale + offset == pytest.approx(from_unit(number, unit, dimension), rel=1e-14)
