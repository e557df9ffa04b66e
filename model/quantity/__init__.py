"""Quantities: text with a unit and a tolerance to SI floats and back, with one table of exact factors."""

from model.quantity.shown import UnitSystem, show, show_apart, show_difference, show_quantity, unit_for
from model.quantity.text import Quantity, QuantityError, expectation, parse, parse_number, quoted
from model.quantity.units import (
    FEET_INCHES,
    Dimension,
    canonical,
    difference_to_unit,
    dimensions_of,
    from_unit,
    scale_and_offset,
    to_unit,
    unit_names,
)

__all__ = [
    "FEET_INCHES",
    "Dimension",
    "Quantity",
    "QuantityError",
    "UnitSystem",
    "canonical",
    "difference_to_unit",
    "dimensions_of",
    "expectation",
    "from_unit",
    "parse",
    "parse_number",
    "quoted",
    "scale_and_offset",
    "show",
    "show_apart",
    "show_difference",
    "show_quantity",
    "to_unit",
    "unit_for",
    "unit_names",
]
