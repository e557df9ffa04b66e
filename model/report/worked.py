"""The workings of all steps of one rig, in words, for a report."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass, replace

from model.checks.finding import Checklist, Finding, Kind
from model.checks.term import lines
from model.quantity import UnitSystem
from model.report.working import Line, origin_text, working


@dataclass(frozen=True)
class WorkedLine:
    """One line of a working, and in words how it came about."""

    symbol: str
    value: str
    meaning: str
    way: tuple[str, ...]


@dataclass(frozen=True)
class Workings:
    """The lines behind one step."""

    name: str
    lines: tuple[WorkedLine, ...]
    notes: tuple[str, ...]


def workings(checklist: Checklist, system: UnitSystem) -> tuple[Workings, ...]:
    """The working of every computed step that has a number; a line that several steps share stands once."""
    shown: set[WorkedLine] = set()
    return tuple(
        Workings(f"{one.title} ({one.key})", fresh_lines(one, system, shown), one.notes)
        for one in checklist.findings
        if one.kind is Kind.COMPUTED and one.result is not None
    )


def fresh_lines(finding: Finding, system: UnitSystem, shown: set[WorkedLine]) -> tuple[WorkedLine, ...]:
    """The lines of one step that are not shown yet, and its result; each says what it takes from earlier ones.

    Args:
        finding: A step with a number.
        system: Units shown.
        shown: What earlier steps have shown; the lines of this one are added.
    """
    found = {id(line.term): _worked(line) for line in working(finding, system)}
    fresh: dict[WorkedLine, None] = {}
    for term in lines(finding.result) if finding.result else ():
        line = found[id(term)]
        if line in shown and term is not finding.result:
            continue
        before = dict.fromkeys(found[id(one)] for one in term.inputs if found[id(one)] in shown)
        if before and term.how is not None and "above" in term.how.text:
            taken = "; ".join(f"{one.symbol} = {one.value}" for one in before)
            line = replace(line, way=(*line.way, f"with, from earlier steps: {taken}"))
        fresh[line] = None
    shown.update(found.values())
    return tuple(fresh)


def _worked(line: Line) -> WorkedLine:
    return WorkedLine(line.symbol, line.value, line.meaning, tuple(_way(line)))


def _way(line: Line) -> Iterator[str]:
    """How a line of a working came about, in words."""
    if line.origin:
        yield origin_text(line)
    if line.formula:
        yield line.formula
    if line.numbers:
        yield f"= {line.numbers}"
    for name, said in (("holds", line.holds), ("leaves out", line.leaves_out), ("source", line.source)):
        if said:
            yield f"{name}: {said}"
    for note in line.term.notes:
        yield f"note: {note}"
