"""Quantity text to SI, and every way it can be refused."""

import math
import string

import pytest
from hypothesis import given
from hypothesis import strategies as st

from model.quantity import Dimension, Quantity, QuantityError, from_unit, parse, parse_number, unit_names

LENGTH, MASS, FORCE = Dimension.LENGTH, Dimension.MASS, Dimension.FORCE
NUMBER, TEMPERATURE = Dimension.NUMBER, Dimension.TEMPERATURE


def refusal(text: str, dimension: Dimension = LENGTH) -> QuantityError:
    with pytest.raises(QuantityError) as caught:
        parse(text, dimension)
    return caught.value


@pytest.mark.parametrize(
    ("text", "dimension", "value", "unit", "tolerance"),
    [
        ("1,250 ft ± 50 ft", LENGTH, 381.0, "ft", 15.24),
        ("1250ft+/-50ft", LENGTH, 381.0, "ft", 15.24),
        ("1,250.5 m", LENGTH, 1250.5, "m", 0.0),
        (".5 m", LENGTH, 0.5, "m", 0.0),
        ("1e3 mm", LENGTH, 1.0, "mm", 0.0),
        ("  8 ft  6 in ", LENGTH, 2.5908, "ft in", 0.0),
        ("8 ft 6 in ± 1 in", LENGTH, 2.5908, "ft in", 0.0254),
        ("-1 ft 6.5 in", LENGTH, -0.4699, "ft in", 0.0),
        ("-0 ft 6 in", LENGTH, -0.1524, "ft in", 0.0),
        ("\u22125 in", LENGTH, -0.127, "in", 0.0),
        ("14 ft²", Dimension.AREA, 1.30064256, "ft2", 0.0),
        ("14 ft^2", Dimension.AREA, 1.30064256, "ft2", 0.0),
        ("6,300 psf ± 8 %", Dimension.PRESSURE, 301645.6315761158, "psf", 24131.650526089263),
        ("6,300 lb/ft2", Dimension.PRESSURE, 301645.6315761158, "lb/ft2", 0.0),
        ("28 °C ± 3 °C", TEMPERATURE, 301.15, "°C", 3.0),
        ("28 degC ± 9 °F", TEMPERATURE, 301.15, "°C", 5.0),
        ("-40 °F", TEMPERATURE, 233.15, "°F", 0.0),
        ("10 lb", MASS, 4.5359237, "lb", 0.0),
        ("10 lb", FORCE, 44.482216152605, "lb", 0.0),
        ("500 g", MASS, 0.5, "g", 0.0),
        ("2 g", Dimension.ACCELERATION, 19.6133, "g", 0.0),
        ("180 deg", Dimension.ANGLE, math.pi, "deg", 0.0),
        ("0.75 ± 0.04", NUMBER, 0.75, "", 0.04),
        ("0.75 ± 5 %", NUMBER, 0.75, "", 0.0375),
        ("95 %", NUMBER, 0.95, "%", 0.0),
        ("-10 ft ± 5 %", LENGTH, -3.048, "ft", 0.1524),
        ("10\u00a0ft", LENGTH, 3.048, "ft", 0.0),
    ],
)
def test_text_becomes_si(text: str, dimension: Dimension, value: float, unit: str, tolerance: float) -> None:
    quantity = parse(text, dimension)
    assert quantity.value == pytest.approx(value, rel=1e-15)
    assert quantity.tolerance == pytest.approx(tolerance, rel=1e-14)
    assert (quantity.unit, quantity.dimension, quantity.text) == (unit, dimension, text)
    assert quantity.relative == ("± 8 %" in text or "± 5 %" in text)


@pytest.mark.parametrize(
    ("text", "dimension", "hint"),
    [
        ("12", LENGTH, "no unit"),
        ("", LENGTH, "empty"),
        ("   ", LENGTH, "empty"),
        ("ft", LENGTH, "no number"),
        ("0,750 m", LENGTH, 'the decimal sign is a point: "0.750"'),
        ("1,25 m", LENGTH, '"1.25"'),
        ("0,75", NUMBER, '"0.75"'),
        ("1.250,5 m", LENGTH, "the decimal sign is a point"),
        ("1,2500 m", LENGTH, "the decimal sign is a point"),
        ("1250,000 m", LENGTH, "the decimal sign is a point"),
        ("1,250,5 m", LENGTH, "the decimal sign is a point"),
        ("1, m", LENGTH, "the decimal sign is a point"),
        ("1 250 ft", LENGTH, "thousands are separated by a comma"),
        ("1_000 ft", LENGTH, "thousands are separated by a comma"),
        ("1'250 ft", LENGTH, "thousands are separated by a comma"),
        ("80 kg", LENGTH, "kg is a unit of mass"),
        ("80 g", LENGTH, "g is a unit of mass and acceleration"),
        ("0.75 ft", NUMBER, "ft is a unit of length"),
        ("12 FT", LENGTH, 'did you mean "ft"?'),
        ("12 feet", LENGTH, "no unit known here"),
        ("8' 6\"", LENGTH, 'write feet and inches as in "8 ft 6 in"'),
        ("8 ft 6", LENGTH, "no unit known here"),
        ("8.5 ft 6 in", LENGTH, "whole number"),
        ("8 ft 14 in", LENGTH, "under 12"),
        ("8 ft -6 in", LENGTH, "no unit known here"),
        ("8 ft 6 in", MASS, "no unit known here"),
        ("8 ft in", LENGTH, "write feet and inches"),
        ("nan ft", LENGTH, "not a finite number"),
        ("-inf ft", LENGTH, "not a finite number"),
        ("Infinity ft", LENGTH, "not a finite number"),
        ("1e308 km", LENGTH, "too large"),
        ("1e999999999999 ft", LENGTH, "exponent"),
        ("1e-400 mm", LENGTH, "too small"),
        ("١٢ ft", LENGTH, "digits 0 to 9 only"),
        ("1٢ ft", LENGTH, "digits 0 to 9 only"),
        ("５ ft", LENGTH, "digits 0 to 9 only"),
        ("5 ft ± 3", LENGTH, '"± 3 ft" or "± 3 %"'),
        ("8 ft 6 in ± 1", LENGTH, '"± 1 in"'),
        ("5 ± 3 ft", LENGTH, "no unit before the ±"),
        ("5 ft ±", LENGTH, "no tolerance after the ±"),
        ("± 5 ft", LENGTH, "no number"),
        ("5 ft ± -1 ft", LENGTH, "not negative"),
        ("5 ft ± -1 %", LENGTH, "not negative"),
        ("5 ft ± 1 kg", LENGTH, "kg is a unit of mass"),
        ("5 ft ± 1 ft ± 1 ft", LENGTH, "more than one tolerance"),
        ("5 ft ± nan ft", LENGTH, "not a finite number"),
        ("0 ft ± 5 %", LENGTH, "a percentage of zero"),
        ("28 °C ± 5 %", TEMPERATURE, "a percentage of a temperature"),
        ("95 % ± 2 %", NUMBER, "5 points"),
        ("95 % ± 0.02", NUMBER, "plain numbers"),
        ("-300 °C", TEMPERATURE, "absolute zero"),
        ("1" * 300 + " ft", LENGTH, "characters"),
        ("5\nft", LENGTH, "control character"),
        ("5 ft\x1b[2J", LENGTH, "control character"),
        ("5 ft; rm", LENGTH, "no unit known here"),
    ],
)
def test_refusals_say_what_is_meant(text: str, dimension: Dimension, hint: str) -> None:
    error = refusal(text, dimension)
    assert hint in error.hint
    assert error.expected.startswith(dimension.named)
    assert str(error) == f"found {error.found}, expected {error.expected} ({error.hint})"
    assert str(error).isprintable()


def test_units_allowed_are_listed() -> None:
    assert refusal("80 kg").expected == "a length with its unit: m cm mm km ft in yd"
    assert refusal("80 kg", NUMBER).expected == "a plain number"


def test_found_is_short_and_printable() -> None:
    assert len(refusal("\x1b[2J" + "x" * 150).found) <= 60
    assert refusal("\x1b[2J").found == '" [2J"'


@pytest.mark.parametrize(("found", "value"), [(8, 8.0), (1.05, 1.05), ("2,410", 2410.0), ("0.3", 0.3), (-2, -2.0)])
def test_plain_numbers(found: float | str, value: float) -> None:
    assert parse_number(found) == Quantity(value, NUMBER, "", 0.0, str(found))


@pytest.mark.parametrize("found", [math.nan, math.inf, 10**400, True, None, [1]])
def test_plain_numbers_refused(found: float) -> None:
    with pytest.raises(QuantityError, match="a plain number"):
        parse_number(found)


@given(st.sampled_from(list(Dimension)), st.data())
def test_any_unit_gives_what_its_factor_says(dimension: Dimension, data: st.DataObject) -> None:
    unit = data.draw(st.sampled_from(unit_names(dimension) or ("",)))
    number = data.draw(st.integers(0, 10**7).map(lambda n: n / 1000))
    assert parse(f"{number} {unit}", dimension).value == pytest.approx(from_unit(number, unit, dimension), rel=1e-15)


@given(st.integers(0, 10**6))
def test_a_length_is_the_same_in_every_unit_it_is_written_in(inches: int) -> None:
    texts = [f"{inches} in", f"{inches // 12} ft {inches % 12} in", f"{inches * 254 / 100:.2f} cm"]
    assert len({parse(text, LENGTH).value for text in texts}) == 1


@given(st.text(st.sampled_from(string.digits + " ,.-+±%eftinkgm/²°'\"_\u2212\n\x00٣"), max_size=40))
def test_junk_is_a_quantity_or_an_error(text: str) -> None:
    for dimension in Dimension:
        try:
            quantity = parse(text, dimension)
        except QuantityError:
            continue
        assert math.isfinite(quantity.value)
        assert quantity.tolerance >= 0.0
