"""One step of the checklist as rows of text."""

from __future__ import annotations

from collections.abc import Collection, Sequence
from typing import TYPE_CHECKING

from model.checks.registry import GROUP_TITLES
from model.physics.formula import Formula
from model.report import wording
from model.report.working import term_value, with_numbers
from tui.answering import Draft
from tui.caution import CAUTION
from tui.glyphs import Charset, clip, fill, fill_left, width
from tui.rows import EMPTY, Row, Span, ends, indented, paragraph, row, row_width
from tui.services import Remedy
from tui.stepping import groups, order, place
from tui.views.numbers import bar_numbers
from tui.widgets.bar import margin_bar
from tui.widgets.board import MARKS, Group, board

if TYPE_CHECKING:
    from model.checks.finding import Checklist, Finding
    from model.quantity import UnitSystem

_WIDEST_BAR = 54
_MOST_INPUTS = 6
"""Inputs named below a formula; a sum of many parts is left to the working."""


def head(checklist: Checklist, here: int, *, under_way: bool, cells: int, chars: Charset) -> list[Row]:
    """The rig's name and limit set; the verdict in words, counts, and which step is shown."""
    name = chars.clean(checklist.name)
    reference = chars.clean(checklist.reference)
    limits = clip(chars.clean(checklist.limit_set) or "no limit set", max(cells // 2 - 6, 12), chars)
    title = row(Span(f"{reference}  " if reference else "", "dim"), Span(name, "title"))
    listed = order(checklist.findings)
    count = f"step {listed.index(here) + 1} of {len(listed)}" if here in listed else "no steps"
    return [
        ends(title, row(Span(limits, "dim")), cells, chars),
        ends(_verdict(checklist, under_way, cells - len(count) - 2), row(Span(count, "text")), cells, chars),
    ]


def _verdict(checklist: Checklist, under_way: bool, cells: int) -> Row:
    if under_way:
        return row(Span("calculating", "note"), Span("   no verdict yet" if cells > 30 else "", "dim"))
    verdict = str(checklist.verdict)
    spans = [Span(f"{verdict} {MARKS[verdict][0]}", MARKS[verdict][1])]
    for word in ("PASS", "FAIL", "OPEN", "NOT COUNTED"):
        count = sum(finding.verdict == word for finding in checklist.findings)
        text = f"   {count} {word.lower()}"
        if count and row_width(tuple(spans)) + len(text) <= cells:
            spans.append(Span(text, "text"))
    return tuple(spans)


def board_rows(
    checklist: Checklist, here: int, answered: Collection[str], *, under_way: bool, cells: int, chars: Charset
) -> tuple[list[Row], int]:
    """The board of all steps, and the row the current one is in."""
    findings = checklist.findings
    listed = [
        Group(
            chars.clean(GROUP_TITLES.get(name, name)),
            tuple(
                "" if (under_way and findings[number].kind == "computed") or findings[number].key in answered
                else str(findings[number].verdict)
                for number in numbers
            ),
        )
        for name, numbers in groups(findings)
    ]  # fmt: skip
    return board(listed, place(findings, here) if findings else None, cells, chars)


def step_rows(
    finding: Finding,
    system: UnitSystem,
    remedies: Sequence[Remedy] | None,
    *,
    under_way: bool,
    cells: int,
    chars: Charset,
) -> list[Row]:
    """The step in the middle.

    Args:
        finding: The step.
        system: The unit system picked.
        remedies: What would make it pass; None while that is being worked out.
        under_way: Whether a newer result is still to come; then no number is shown.
        cells: Width of the pane.
        chars: How to draw.
    """
    rows = paragraph(chars.clean(finding.title), cells, "title")
    rows.append(row(Span(clip(chars.clean(finding.key), cells, chars), "dim")))
    rows.append(EMPTY)
    if finding.inspection is not None:
        return rows + _inspected(finding, cells, chars)
    if under_way:
        return [*rows, row(Span("calculating", "note"))]
    return rows + _computed(finding, system, remedies, cells, chars)


def _computed(
    finding: Finding, system: UnitSystem, remedies: Sequence[Remedy] | None, cells: int, chars: Charset
) -> list[Row]:
    sign, tone = MARKS[finding.verdict]
    value = chars.clean(wording.value_text(finding, system)) if finding.value is not None else "no value"
    margin = wording.margin_text(finding)
    line = row(Span(value, "title"), "   ", Span(f"{finding.verdict} {sign}", tone), f"   {margin}" if margin else "")
    rows = [line]
    if finding.limit is not None:
        rows += paragraph(chars.clean(wording.bound_text(finding, system)), cells, indent="  ")
    if finding.reason:
        rows += paragraph(chars.clean(finding.reason), cells, indent="  ")
    numbers = bar_numbers(finding, system)
    if numbers is not None:
        drawn = margin_bar(*numbers[:3], min(cells, _WIDEST_BAR), chars, lambda number: chars.own(numbers[3](number)))
        rows += [EMPTY, *drawn]
    rows += _cautions(finding.cautions, cells, chars)
    if finding.deviation:
        rows += [EMPTY, *paragraph(f"Deviation: {chars.clean(finding.deviation)}", cells, "note", "  ")]
    if finding.verdict == "FAIL":
        rows += _would_pass(remedies, cells, chars)
    rows += _because(finding, system, cells, chars)
    for note in finding.notes:
        rows += paragraph(chars.clean(note), cells, "dim", "  ")
    return [*rows, EMPTY, *paragraph(CAUTION, cells, "note")]


def _cautions(cautions: Sequence[str], cells: int, chars: Charset) -> list[Row]:
    rows: list[Row] = []
    for caution in cautions:
        rows += paragraph(f"Caution: {chars.clean(caution)}", cells, "note", "  ")
    return [EMPTY, *rows] if rows else []


def _would_pass(remedies: Sequence[Remedy] | None, cells: int, chars: Charset) -> list[Row]:
    if remedies is None:
        return [EMPTY, row(Span("Would pass with", "title")), row(Span("  calculating", "dim"))]
    if not remedies:
        return []
    rows: list[Row] = [EMPTY, row(Span("Would pass with", "title"))]
    texts = [(chars.clean(one.text), chars.clean(one.value), chars.clean(f"now {one.now}")) for one in remedies]
    text, value, now = (max(width(line[column]) for line in texts) for column in range(3))
    for name, new, old in texts:
        if text + value + now + 6 <= cells:
            rows.append(row(f"  {fill(name, text, chars)}  {fill_left(new, value, chars)}  ", Span(old, "dim")))
        else:
            rows += indented(paragraph(name, cells - 2, indent="  "), 2)
            rows += indented(paragraph(f"{new}, {old}", cells - 4), 4)
    return rows


def _because(finding: Finding, system: UnitSystem, cells: int, chars: Charset) -> list[Row]:
    """The formula with this rig's numbers, what they are, and where the formula comes from."""
    term = finding.result
    if term is None or term.how is None:
        return []
    lines = [term.how.text]
    if isinstance(term.how, Formula):
        lines.append(f"= {with_numbers(term.how, term, system)}")
    shown = term.inputs if len(term.inputs) <= _MOST_INPUTS + 1 else term.inputs[:_MOST_INPUTS]
    lines += [f"{one.symbol} = {term_value(one, system)}, {one.meaning}" for one in shown]
    if len(shown) < len(term.inputs):
        lines.append(f"and {len(term.inputs) - len(shown)} more, all in the working")
    lines += [f"source: {term.how.source}"] if term.how.source else []
    lines += [f"leaves out: {term.how.leaves_out}"] if term.how.leaves_out else []
    rows: list[Row] = [EMPTY, row(Span("Because", "title"))]
    for line in lines:
        rows += indented(paragraph(chars.clean(line), cells - 2, indent="  "), 2)
    return rows


def _inspected(finding: Finding, cells: int, chars: Charset) -> list[Row]:
    asked = finding.inspection
    assert asked is not None
    sign, tone = MARKS[finding.verdict]
    rows = [row(Span(f"{finding.verdict} {sign}", tone), "   ")]
    if finding.reason:
        rows[0] = (*rows[0], Span(clip(chars.clean(finding.reason), cells - len(finding.verdict) - 5, chars)))
    marks = [f"stage: {chars.clean(asked.stage)}"] if asked.stage else []
    marks += ["asked first"] if asked.stop else []
    marks += ["needs two persons"] if asked.two_person else []
    if marks:
        rows += paragraph(", ".join(marks), cells, "dim")
    if asked.ask != finding.title:
        rows += [EMPTY, *paragraph(chars.clean(asked.ask), cells)]
    if asked.caution:
        rows += [EMPTY, *paragraph(f"Caution: {chars.clean(asked.caution)}", cells, "note", "  ")]
    rows += _cautions([caution for caution in finding.cautions if caution != asked.caution], cells, chars)
    rows.append(EMPTY)
    answer = finding.answer
    if answer is None:
        rows.append(row(Span("No answer yet.", "dim")))
    else:
        rows.append(row(Span("Last answer", "title")))
        who = f"{answer.who} and {answer.second}" if answer.second else answer.who
        when = answer.when.strftime("%Y-%m-%d %H:%M %z").strip()
        given = f"{answer.answer}, {answer.value}" if answer.value else answer.answer
        rows += indented(paragraph(chars.clean(f"{given}, by {who}, {when}"), cells - 2), 2)
        if answer.remark:
            rows += indented(paragraph(chars.clean(f"remark: {answer.remark}"), cells - 2), 2)
        if answer.stale:
            stale = "STALE: what it was given on has changed since; look again"
            rows += indented(paragraph(stale, cells - 2, "note"), 2)
    for note in finding.notes:
        rows += paragraph(chars.clean(note), cells, "dim", "  ")
    return rows


def written_rows(draft: Draft, cells: int, chars: Charset) -> list[Row]:
    """That an answer is in the record."""
    words = "taken back" if draft.choice == "withdrawal" else f"'{draft.choice}'"
    who = f"{draft.who} and {draft.second}" if draft.second else draft.who or ""
    return paragraph(f"Written to the record: {words}, by {chars.clean(who)}.", cells, "title")
