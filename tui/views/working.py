"""A working as rows: what the step comes to, then every line that leads there."""

from __future__ import annotations

from collections.abc import Sequence

from model.checks.finding import Finding
from model.quantity import UnitSystem
from model.report.wording import bound_text, margin_text, value_text
from tui.glyphs import Charset, width, wrap
from tui.rows import EMPTY, Row, Span, Tone, paragraph, row
from tui.widgets.board import MARKS


def result_rows(finding: Finding, system: UnitSystem, cells: int, chars: Charset) -> list[Row]:
    """Title, value, verdict, margin and limit of a computed step, and its cautions."""
    sign, tone = MARKS[finding.verdict]
    margin = margin_text(finding)
    value = chars.clean(value_text(finding, system)) if finding.value is not None else "no value"
    rows = paragraph(chars.clean(finding.title), cells, "title")
    rows.append(row(Span(value, "title"), "   ", Span(f"{finding.verdict} {sign}", tone), f"   {margin}".rstrip()))
    said = [bound_text(finding, system), finding.reason]
    for text in dict.fromkeys(text for text in said if text):
        rows += paragraph(chars.clean(text), cells, indent="  ")
    for caution in finding.cautions:
        rows += paragraph(f"Caution: {chars.clean(caution)}", cells, "note", "  ")
    return [*rows, EMPTY]


def working_rows(lines: Sequence[str], cells: int, chars: Charset) -> list[Row]:
    """The lines of a working, indents kept; the values stand out from the way to them."""
    rows: list[Row] = []
    for line in lines:
        text = line.lstrip()
        blanks = min(len(line) - len(text), max(cells // 3, 1))
        tone: Tone = "dim" if blanks else "text"
        cleaned = chars.clean(text)
        wrapped = [cleaned] if width(cleaned) + blanks <= cells else wrap(cleaned, cells - blanks, "  ")
        rows += [row(Span(" " * blanks + part, tone)) for part in wrapped]
    return rows
