"""The workings of all steps of one rig, in words, for a report."""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Set
from dataclasses import dataclass, replace

from model.checks.finding import Checklist, Kind
from model.checks.term import Term, lines
from model.quantity import UnitSystem
from model.report.working import Line, working


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
    blocks: list[Workings] = []
    shown: set[WorkedLine] = set()
    for one in checklist.findings:
        if one.kind is Kind.COMPUTED and one.result is not None:
            found = {id(line.term): _worked(line) for line in working(one, system)}
            name = f"{one.title} ({one.key})"
            blocks.append(Workings(name, tuple(_not_yet_shown(one.result, found, shown)), one.notes))
            shown.update(found.values())
    return tuple(blocks)


def _not_yet_shown(result: Term, found: Mapping[int, WorkedLine], shown: Set[WorkedLine]) -> Iterator[WorkedLine]:
    """The lines of one step that no earlier step has shown, and its result; each says what it takes from earlier."""
    here: set[WorkedLine] = set()
    for term in lines(result):
        line = found[id(term)]
        if term is not result and (line in shown or line in here):
            continue
        here.add(line)
        before = [found[id(one)] for one in term.inputs if found[id(one)] in shown]
        if before and term.how is not None and "above" in term.how.text:
            taken = "; ".join(f"{one.symbol} = {one.value}" for one in before)
            line = replace(line, way=(*line.way, f"with, from earlier steps: {taken}"))
        yield line


def _worked(line: Line) -> WorkedLine:
    return WorkedLine(line.symbol, line.value, line.meaning, tuple(_way(line)))


def _way(line: Line) -> Iterator[str]:
    """How a line of a working came about, in words."""
    if line.origin:
        yield "by definition" if line.origin == "definition" else f"from {line.origin}"
    if line.formula:
        yield line.formula
    if line.numbers:
        yield f"= {line.numbers}"
    for name, said in (("holds", line.holds), ("leaves out", line.leaves_out), ("source", line.source)):
        if said:
            yield f"{name}: {said}"
    for note in line.term.notes:
        yield f"note: {note}"
