"""The working of a step as lines: every value that leads to it, with its formula, this rig's numbers and the source."""

from __future__ import annotations

import re
from collections.abc import Iterator
from dataclasses import dataclass

from model.checks.finding import Finding
from model.checks.term import DIMENSIONS, Procedure, Term, lines
from model.physics.formula import CONSTANTS, Formula
from model.quantity import Dimension, UnitSystem, show, unit_for

FUNCTIONS = (
    "sqrt",
    "exp",
    "ln",
    "sin",
    "cos",
    "tan",
    "asin",
    "acos",
    "atan",
    "sinh",
    "cosh",
    "tanh",
    "atanh",
    "hypot",
    "min",
    "max",
    "abs",
)
TOKEN = re.compile(r"\s*([A-Za-z_][A-Za-z_0-9]*|\d+\.?\d*(?:e[+-]?\d+)?|[-+*/^(),=])")


@dataclass(frozen=True, slots=True)
class Line:
    """One line of a working: ``symbol = value``, its meaning, and how it came about."""

    term: Term
    symbol: str
    value: str
    meaning: str
    formula: str = ""
    numbers: str = ""
    origin: str = ""
    source: str = ""
    holds: str = ""
    leaves_out: str = ""


def term_value(term: Term, system: UnitSystem) -> str:
    """A term's value in words, in the chosen units."""
    if term.dimension == Dimension.NUMBER and term.unit:
        return f"{show(term.value, Dimension.NUMBER, '')} {term.unit}"
    if term.dimension in DIMENSIONS:
        dimension = Dimension(term.dimension)
        return show(term.value, dimension, unit_for(dimension, system, term.unit, term.value))
    return f"{show(term.value, Dimension.NUMBER, '')} {term.dimension}".strip()


def working(finding: Finding, system: UnitSystem) -> list[Line]:
    """All lines that lead to a finding's value, the value itself last; empty for an inspected step."""
    if finding.result is None:
        return []
    return [term_line(term, system) for term in lines(finding.result)]


def term_line(term: Term, system: UnitSystem) -> Line:
    """One term as a line of a working."""
    how, value = term.how, term_value(term, system)
    if how is None:
        return Line(term, term.symbol, value, term.meaning, origin=term.origin)
    if isinstance(how, Procedure):
        return Line(term, term.symbol, value, term.meaning, how.text, "", "", how.source, how.holds, how.leaves_out)
    return Line(
        term, term.symbol, value, term.meaning, how.text, with_numbers(how, term, system), "", how.source, how.holds,
        how.leaves_out,
    )  # fmt: skip


DIMENSIONED = re.compile(r"\d{4,}|\d+\.\d{2,}")
"""A constant with a dimension of its own: such a formula holds in SI base units and shows its numbers in them."""
BASE_UNITS = {
    "mass": "kg", "length": "m", "area": "m2", "speed": "m/s", "force": "N", "pressure": "Pa", "temperature": "K",
    "time": "s", "angle": "rad", "acceleration": "m/s2", "density": "kg/m3", "number": "",
}  # fmt: skip


def _in_base_units(term: Term, _: UnitSystem) -> str:
    if term.dimension not in BASE_UNITS:
        return term_value(term, UnitSystem.SI)
    return show(term.value, Dimension(term.dimension), BASE_UNITS[term.dimension], digits=6)


def with_numbers(how: Formula[..., object], term: Term, system: UnitSystem) -> str:
    """The right side of a formula with this rig's numbers and units in place of its symbols."""
    wanted = _in_base_units if DIMENSIONED.search(how.text) else term_value
    values = {
        symbol.text: show(one.value, Dimension.NUMBER, "") if symbol.dimension == "number" else wanted(one, system)
        for symbol, one in zip(how.symbols.values(), term.inputs, strict=True)
    }
    written = "".join(_written(how.text.split("=", 1)[1], values))
    return written.replace("( ", "(").strip()


def _written(text: str, values: dict[str, str]) -> Iterator[str]:
    factor_before, before = False, "("
    tokens = [match.group(1) for match in TOKEN.finditer(text)]
    for token, following in zip(tokens, [*tokens[1:], ""], strict=True):
        starts = token == "(" or token[0].isalnum()
        if starts and factor_before:
            yield " x "
        if token in FUNCTIONS:
            yield token
            factor_before, before = False, token
            continue
        if token[0].isalpha():
            number = values.get(token, _constant(token))
            yield f"({number})" if (following == "^" and " " in number) or number.startswith("-") else number
        else:
            signs = token == "-" and before in "(,"
            yield token if signs else f" {token} " if token in "+-*=" else f"{token} " if token == "," else token
        factor_before, before = token == ")" or token[0].isalnum(), token


def _constant(token: str) -> str:
    return (
        show(CONSTANTS[token], Dimension.NUMBER, "") + (" m/s2" if token == "g0" else "")
        if token in CONSTANTS
        else token
    )


def origin_text(line: Line) -> str:
    """Where a given value comes from."""
    if line.origin == "definition":
        return "by definition"
    return line.origin


def working_text(finding: Finding, system: UnitSystem) -> list[str]:
    """A working as plain lines."""
    found: list[str] = []
    for line in working(finding, system):
        found.append(f"{line.symbol} = {line.value}   {line.meaning}")
        if line.origin:
            found.append(f"    {origin_text(line)}")
        if line.formula:
            found.append(f"    {line.formula}")
        if line.numbers:
            found.append(f"    = {line.numbers}")
        for name, text in (("holds", line.holds), ("leaves out", line.leaves_out), ("source", line.source)):
            if text:
                found.append(f"    {name}: {text}")
        found += [f"    note: {note}" for note in line.term.notes]
    found += [f"note: {note}" for note in finding.notes]
    return found
