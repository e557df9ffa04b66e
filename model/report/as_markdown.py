"""A report as Markdown; a user's text stands in it as text, whatever it holds."""

from __future__ import annotations

import re
from collections.abc import Iterator, Sequence

from model.report.curve import draw
from model.report.document import (
    Block,
    Facts,
    Items,
    Picture,
    Report,
    RigReport,
    StepRow,
    Steps,
    Words,
)
from model.report.prose import isolated, joined
from model.report.worked import Workings

# Every sign that can begin markup in the middle of a line; a link is made of bare text by its colon, dot or at sign.
_SIGNS = re.compile(r"([\\`*_{}\[\]<>#|~&!$^]|(?<=\w)[:@](?=\S)|(?<=www)\.)")
_BEGINS = re.compile(r"^(\d{1,9})([.)])(?=\s|$)|^([-+=])")
_COLUMNS = ("verdict", "step", "value", "limit", "source", "margin", "remarks")
_WIDTH, _HEIGHT = 76, 16


def escaped(text: str) -> str:
    """A text that Markdown shows as it is."""
    safe = _SIGNS.sub(r"\\\1", isolated(text))
    return _BEGINS.sub(lambda found: f"{found[1]}\\{found[2]}" if found[1] else f"\\{found[3]}", safe)


def markdown(report: Report) -> str:
    """The whole report."""
    lines = [f"# {escaped(report.title)}", ""]
    if report.overview is not None:
        lines += [*_table(("load", "steps"), report.overview.rows), ""]
    if report.unread is not None:
        lines += ["## Not reported: files that could not be used", "", *_list(report.unread.problems), ""]
    for rig in report.rigs:
        lines += [*_rig(rig)]
    return "\n".join(lines).rstrip("\n") + "\n"


def _rig(rig: RigReport) -> Iterator[str]:
    head = "  \n".join(f"*{escaped(part)}*" for part in rig.page_head)
    yield from (f"## {escaped(rig.title)}", "", head, "")
    yield from _blocks(rig.first)
    for section in rig.sections:
        yield from (f"### {section.title}", "", head, "")
        yield from _blocks(section.blocks)
    yield from ("---", "")


def _blocks(blocks: Sequence[Block]) -> Iterator[str]:
    for block in blocks:
        yield from _block(block)
        yield ""


def _block(block: Block) -> Iterator[str]:
    if isinstance(block, Words):
        yield f"**{escaped(block.text)}**" if block.loud else escaped(block.text)
    elif isinstance(block, Facts):
        yield from _table(("", ""), block.rows)
    elif isinstance(block, Items):
        yield from (f"#### {escaped(block.name)}", "", *_list(block.items))
    elif isinstance(block, Steps):
        yield from (f"#### {escaped(block.name)}", "", *_table(_COLUMNS, [_cells(one) for one in block.rows]))
    elif isinstance(block, Picture):
        yield from (f"#### {escaped(block.chart.title)}", "", "```text")
        yield from (line.rstrip() for line in draw(block.chart, _WIDTH, _HEIGHT, ascii=True))
        yield from ("```", "", *_list(block.said))
    else:
        yield from _workings(block)


def _list(items: Sequence[str]) -> list[str]:
    return [f"- {escaped(item)}" for item in items]


def _table(columns: Sequence[str], rows: Sequence[Sequence[str]]) -> Iterator[str]:
    yield "| " + " | ".join(columns) + " |"
    yield "|" + " --- |" * len(columns)
    for row in rows:
        yield "| " + " | ".join(map(escaped, row)) + " |"


def _cells(step: StepRow) -> tuple[str, ...]:
    numbers = (step.value, step.limit, step.source, step.margin)
    return (step.verdict, f"{step.title} ({step.key})", *numbers, joined(step.remarks))


def _workings(block: Workings) -> Iterator[str]:
    yield from (f"#### {escaped(block.name)}", "")
    for line in block.lines:
        yield f"- {escaped(f'{line.symbol} = {line.value}')}, {escaped(line.meaning)}"
        yield from (f"  - {escaped(one)}" for one in line.way)
    yield from _list([f"note: {note}" for note in block.notes])
