"""Unit factors against printed tables and against an independent units library."""

import math

import pint
import pytest

from model.quantity import Dimension, from_unit, unit_names

# NIST SP 811 (2008), appendix B.8, conversion factors; values in bold there are exact and are quoted in full.
EXACT = [
    ("in", Dimension.LENGTH, 0.0254),
    ("ft", Dimension.LENGTH, 0.3048),
    ("yd", Dimension.LENGTH, 0.9144),
    ("ft2", Dimension.AREA, 0.09290304),
    ("in2", Dimension.AREA, 0.00064516),
    ("lb", Dimension.MASS, 0.45359237),
    ("oz", Dimension.MASS, 0.028349523125),
    ("lbf", Dimension.FORCE, 4.4482216152605),
    ("lb", Dimension.FORCE, 4.4482216152605),
    ("kgf", Dimension.FORCE, 9.80665),
    ("ft/s", Dimension.SPEED, 0.3048),
    ("ft/min", Dimension.SPEED, 0.00508),
    ("mph", Dimension.SPEED, 0.44704),
    ("kt", Dimension.SPEED, 1852 / 3600),
    ("g", Dimension.ACCELERATION, 9.80665),
    ("mbar", Dimension.PRESSURE, 100.0),
    ("bar", Dimension.PRESSURE, 1e5),
    ("h", Dimension.TIME, 3600.0),
    ("d", Dimension.TIME, 86400.0),
    ("yr", Dimension.TIME, 31557600.0),
]
# The same table where it prints seven or nine digits.
PRINTED = [
    ("psf", Dimension.PRESSURE, 47.880259, 9),
    ("psi", Dimension.PRESSURE, 6894.757, 7),
    ("inHg", Dimension.PRESSURE, 3386.389, 7),
    ("slug/ft3", Dimension.DENSITY, 515.3788, 7),
    ("kt", Dimension.SPEED, 0.5144444, 7),
    ("km/h", Dimension.SPEED, 0.2777778, 7),
    ("deg", Dimension.ANGLE, 0.01745329, 7),
]
PINT_NAMES = {
    "kg": "kilogram", "g": "gram", "t": "metric_ton", "lb": "pound", "oz": "ounce", "m": "metre", "cm": "centimetre",
    "mm": "millimetre", "km": "kilometre", "ft": "foot", "in": "inch", "yd": "yard", "m2": "metre**2",
    "cm2": "centimetre**2", "ft2": "foot**2", "in2": "inch**2", "m/s": "metre/second", "km/h": "kilometre/hour",
    "ft/s": "foot/second", "ft/min": "foot/minute", "kt": "knot", "mph": "mile/hour", "N": "newton",
    "kN": "kilonewton", "daN": "decanewton", "kgf": "kilogram_force", "lbf": "pound_force", "Pa": "pascal",
    "kPa": "kilopascal", "hPa": "hectopascal", "mbar": "millibar", "bar": "bar", "psi": "pound_force_per_square_inch",
    "psf": "pound_force/foot**2", "lb/ft2": "pound_force/foot**2", "inHg": "inch_Hg", "°C": "degC", "°F": "degF",
    "K": "kelvin", "s": "second", "min": "minute", "h": "hour", "d": "day", "yr": "365.25*day", "deg": "degree",
    "rad": "radian", "m/s2": "metre/second**2", "kg/m3": "kilogram/metre**3", "slug/ft3": "slug/foot**3",
    "%": "percent",
}  # fmt: skip
PINT_SI = {
    Dimension.MASS: "kilogram", Dimension.LENGTH: "metre", Dimension.AREA: "metre**2", Dimension.SPEED: "metre/second",
    Dimension.FORCE: "newton", Dimension.PRESSURE: "pascal", Dimension.TEMPERATURE: "kelvin", Dimension.TIME: "second",
    Dimension.ANGLE: "radian", Dimension.ACCELERATION: "metre/second**2", Dimension.DENSITY: "kilogram/metre**3",
    Dimension.NUMBER: "dimensionless",
}  # fmt: skip
EVERY_UNIT = [(unit, dimension) for dimension in Dimension for unit in unit_names(dimension)]


@pytest.fixture(scope="module")
def registry() -> pint.UnitRegistry:
    return pint.UnitRegistry(autoconvert_offset_to_baseunit=True)


@pytest.mark.parametrize(("unit", "dimension", "factor"), EXACT)
def test_exact_factors(unit: str, dimension: Dimension, factor: float) -> None:
    assert from_unit(1.0, unit, dimension) == factor


@pytest.mark.parametrize(("unit", "dimension", "factor", "digits"), PRINTED)
def test_printed_factors(unit: str, dimension: Dimension, factor: float, digits: int) -> None:
    half_unit = 0.5 * 10.0 ** (math.floor(math.log10(factor)) + 1 - digits)
    assert abs(from_unit(1.0, unit, dimension) - factor) <= half_unit * (1 + 1e-9)


@pytest.mark.parametrize(
    ("number", "unit", "kelvin"),
    [(0.0, "°C", 273.15), (100.0, "°C", 373.15), (32.0, "°F", 273.15), (212.0, "°F", 373.15), (-40.0, "°F", 233.15)],
)
def test_temperature_scales(number: float, unit: str, kelvin: float) -> None:
    # NIST SP 811 (2008), appendix B.8: T/K = t/°C + 273.15, T/K = (t/°F + 459.67)/1.8
    assert from_unit(number, unit, Dimension.TEMPERATURE) == kelvin


@pytest.mark.parametrize(("unit", "dimension"), EVERY_UNIT)
def test_every_unit_against_an_independent_library(
    registry: pint.UnitRegistry, unit: str, dimension: Dimension
) -> None:
    name = PINT_NAMES[unit]
    if (unit, dimension) == ("g", Dimension.ACCELERATION):
        name = "standard_gravity"
    if (unit, dimension) == ("lb", Dimension.FORCE):
        name = "pound_force"
    # The library builds its inch of mercury from a density and g0; SP 811 prints 3386.389 Pa.
    close = 1e-6 if unit == "inHg" else 1e-14
    for number in (1.0, 73.25):
        theirs = registry.Quantity(number, name) if name != "365.25*day" else registry.Quantity(365.25 * number, "day")
        expected = theirs.to(PINT_SI[dimension]).magnitude
        assert from_unit(number, unit, dimension) == pytest.approx(expected, rel=close)
