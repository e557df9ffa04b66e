"""A number together with how it came about.

Every value of the checklist is a `Term`: given (a field of the rig file, a figure of the canopy table, a constant) or
derived by a formula or a procedure from other terms. A step's working is the list of all terms that lead to its value;
because derived terms are evaluated only here, the lines shown and the number judged cannot differ.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator, Sequence
from dataclasses import dataclass
from typing import Any, NamedTuple

from model.checks.missing import need
from model.physics.formula import Formula
from model.quantity import Dimension, Quantity, UnitSystem, unit_for

DIMENSIONS = frozenset(str(dimension) for dimension in Dimension)
US_UNITS = frozenset(
    {"lb", "oz", "ft", "in", "ft in", "yd", "ft2", "in2", "ft/s", "ft/min", "mph", "lbf", "psi", "psf", "slug/ft3"}
)


class Procedure(NamedTuple):
    """What leads to a term where no closed formula does: a sum, a largest value, the motion, a set of equations."""

    text: str
    function: Callable[..., float]
    source: str = ""
    holds: str = ""
    leaves_out: str = ""


How = Formula[..., Any] | Procedure


@dataclass(frozen=True, eq=False)
class Term:
    """One value with its symbol, meaning, dimension and origin.

    ``value`` is in SI. ``unit`` is the unit the user wrote, if any. A given term has an ``origin``; a derived one has
    ``how`` and its ``inputs``, in the order of the arguments. ``cautions`` are its own and those of all it
    follows from: they go with every step that uses it.
    ``from_file`` marks a quantity of the rig file, which may be moved.
    """

    value: float
    symbol: str
    meaning: str
    dimension: str
    unit: str | None = None
    origin: str = ""
    how: How | None = None
    inputs: tuple[Term, ...] = ()
    notes: tuple[str, ...] = ()
    tolerance: float = 0.0
    relative: bool = False
    cautions: tuple[str, ...] = ()
    from_file: bool = False

    def again(self) -> float:
        """The value worked out anew from the inputs' values; a given term returns its value."""
        if self.how is None:
            return self.value
        function = self.how.function
        return float(function(*(term.value for term in self.inputs)))


def given(quantity: Quantity, symbol: str, meaning: str, origin: str) -> Term:
    """A term read from a file."""
    return Term(
        quantity.value,
        symbol,
        meaning,
        str(quantity.dimension),
        quantity.unit,
        origin,
        tolerance=quantity.tolerance,
        relative=quantity.relative,
        from_file=True,
    )


def known(
    value: float, symbol: str, meaning: str, dimension: str, origin: str, unit: str | None = None, caution: str = ""
) -> Term:
    """A term from a table or a definition, in SI."""
    return Term(value, symbol, meaning, dimension, unit, origin, cautions=(caution,) if caution else ())


def read(quantity: Quantity | None, symbol: str, meaning: str, field: str) -> Term:
    """A term from a field of the rig file, or `Missing` with the field's name."""
    return given(need(quantity, field), symbol, meaning, field)


def read_count(count: int | None, symbol: str, meaning: str, field: str) -> Term:
    """A whole number from a field of the rig file, or `Missing` with the field's name."""
    return known(float(need(count, field)), symbol, meaning, "number", field)


def _carried(inputs: Sequence[Term]) -> tuple[str, ...]:
    """The cautions of several terms, each once."""
    return tuple(dict.fromkeys(caution for term in inputs for caution in term.cautions))


def _like(inputs: Sequence[Term], dimension: str, value: float) -> str | None:
    """The unit to show a derived term in: that of an input of its kind, else one of the system the inputs stand in."""
    if dimension == Dimension.NUMBER:
        return None
    units = [(term.dimension, term.unit) for term in inputs if term.unit]
    for kind, unit in units:
        if kind == dimension:
            return unit
    if dimension in DIMENSIONS and any(unit in US_UNITS for _, unit in units):
        return unit_for(Dimension(dimension), UnitSystem.US, None, value)
    return None


def derive(
    how: Formula[..., Any],
    *inputs: Term,
    of: str = "",
    symbol: str = "",
    unit: str | None = None,
    notes: Sequence[str] = (),
) -> Term:
    """Evaluate a formula on terms, in the order of its arguments.

    Args:
        how: The formula.
        inputs: One term for each argument.
        of: What the result belongs to, added to its meaning ("row 1 (main)").
        symbol: Symbol of the result where it differs from the formula's own.
        unit: Unit to show the result in, where the user wrote one.
        notes: Lines shown below it.
    """
    value = float(how.function(*(term.value for term in inputs)))
    meaning = f"{how.result.meaning}, {of}" if of else how.result.meaning
    dimension = how.result.dimension
    unit = unit or _like(inputs, dimension, value)
    return Term(
        value,
        symbol or how.result.text,
        meaning,
        dimension,
        unit,
        "",
        how,
        inputs,
        tuple(notes),
        cautions=_carried(inputs),
    )


SAME = Procedure("the line above", lambda value: value, "definition")
LESS = Procedure("difference of the lines above", lambda whole, *parts: whole - sum(parts), "definition")


def combine(
    how: Procedure,
    inputs: Sequence[Term],
    symbol: str,
    meaning: str,
    dimension: str,
    unit: str | None = None,
    notes: Sequence[str] = (),
) -> Term:
    """Evaluate a procedure on terms."""
    value = float(how.function(*(term.value for term in inputs)))
    unit = unit or _like(inputs, dimension, value)
    return Term(
        value, symbol, meaning, dimension, unit, "", how, tuple(inputs), tuple(notes), cautions=_carried(inputs)
    )


def _sum(*values: float) -> float:
    return sum(values)


SUM = Procedure("sum of the lines above", _sum, "definition")
LARGEST = Procedure("largest of the lines above", lambda *values: max(values), "definition")
LEAST = Procedure("least of the lines above", lambda *values: min(values), "definition")


def total(terms: Sequence[Term], symbol: str, meaning: str, unit: str | None = None) -> Term:
    """Sum of terms of one dimension."""
    return combine(SUM, terms, symbol, meaning, terms[0].dimension, unit or terms[0].unit)


def largest(terms: Sequence[Term], symbol: str, meaning: str) -> Term:
    """Largest of terms of one dimension; a single term is returned as it is."""
    return terms[0] if len(terms) == 1 else combine(LARGEST, terms, symbol, meaning, terms[0].dimension, terms[0].unit)


def least(terms: Sequence[Term], symbol: str, meaning: str) -> Term:
    """Least of terms of one dimension; a single term is returned as it is."""
    return terms[0] if len(terms) == 1 else combine(LEAST, terms, symbol, meaning, terms[0].dimension, terms[0].unit)


def lines(result: Term) -> Iterator[Term]:
    """All terms that lead to ``result``, each after those it follows from, ``result`` last."""
    seen: set[int] = set()

    def walk(term: Term) -> Iterator[Term]:
        if id(term) in seen:
            return
        seen.add(id(term))
        for one in term.inputs:
            yield from walk(one)
        yield term

    yield from walk(result)
