"""A report as plain text of 78 columns, whole or in pages for a printer."""

from __future__ import annotations

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
from model.report.prose import fold, isolated, joined, width_of
from model.report.worked import WorkedLine, Workings

WIDTH = 78
PAGE = 56
"""Lines of a page: fits A4 and Letter at six lines an inch with their margins."""
_NAMES = 24

Lines = list[str]


def text(report: Report) -> str:
    """The whole report without pages, for a screen or a pipe."""
    parts = [_front(report), *([*_head(rig), "", *_unpaged(rig)] for rig in report.rigs)]
    return "\n\n".join("\n".join(part) for part in parts if part) + "\n"


def pages(report: Report) -> str:
    """The report in pages parted by form feeds; every page of a rig begins with what identifies it."""
    found = ["\n".join(page) for page in _in_pages(_front_blocks(report), [])] if _front(report) else []
    for rig in report.rigs:
        head = _head(rig)
        sheets = _in_pages(list(_blocks(rig)), head)
        total = len(sheets)
        found += [
            "\n".join([*head[:-1], f"page {number} of {total}", head[-1], "", *sheet])
            for number, sheet in enumerate(sheets, 1)
        ]
    return "\f".join(page + "\n" for page in found)


def _front_blocks(report: Report) -> list[Lines]:
    """Overview and mistakes, before the first rig."""
    blocks: list[Lines] = []
    if report.overview is not None:
        blocks += [[isolated(report.title), ""], *([line, f"    {isolated(counts)}"] for line, counts in (
            ("\n".join(fold(isolated(name), WIDTH, "", "    ")), counts) for name, counts in report.overview.rows
        ))]  # fmt: skip
    if report.unread is not None:
        blocks.append(["", "Not reported: files that could not be used"])
        blocks += [fold(isolated(problem), WIDTH, "  - ", "    ") for problem in report.unread.problems]
    return blocks


def _front(report: Report) -> Lines:
    return [line for block in _front_blocks(report) for line in block]


def _head(rig: RigReport) -> Lines:
    return [*(line for part in rig.page_head for line in fold(isolated(part), WIDTH, "", "  ")), "=" * WIDTH]


def _unpaged(rig: RigReport) -> Lines:
    lines = [line for block in _blocks(rig) for line in block]
    return [*lines, "", *_head(rig)[:-1], "end of this rig"]


def _in_pages(blocks: Sequence[Lines], head: Lines) -> list[Lines]:
    """Blocks on pages: one that fits on a page is not parted."""
    room = max(PAGE - len(head) - 2, 10)
    sheets: list[Lines] = [[]]
    for block in blocks:
        if sheets[-1] and len(sheets[-1]) + len(block) > room and (len(block) <= room or len(sheets[-1]) > room - 8):
            sheets.append([])
        for line in block:
            if len(sheets[-1]) >= room:
                sheets.append([])
            if sheets[-1] or line:
                sheets[-1].append(line)
    return sheets


def _blocks(rig: RigReport) -> Iterator[Lines]:
    """Everything of a rig in blocks that stay together."""
    for block in rig.first:
        yield from _block(block)
    for section in rig.sections:
        title = section.title.upper()
        following = [lines for block in section.blocks for lines in _block(block)]
        yield ["", "", title, "-" * len(title), *(following[0] if following else [])]
        yield from following[1:]


def _block(block: Block) -> Iterator[Lines]:
    if isinstance(block, Words):
        yield ["", *fold(isolated(block.text), WIDTH)]
    elif isinstance(block, Facts):
        yield ["", *(line for name, value in block.rows for line in _fact(name, value))]
    elif isinstance(block, Items):
        items = [fold(isolated(item), WIDTH, "  - ", "    ") for item in block.items]
        yield ["", block.name, *items[0]]
        yield from items[1:]
    elif isinstance(block, Steps):
        steps = [_step(one) for one in block.rows]
        yield ["", isolated(block.name), *steps[0]]
        yield from steps[1:]
    elif isinstance(block, Picture):
        said = [line for one in block.said for line in fold(isolated(one), WIDTH, "  ", "    ")]
        yield ["", block.chart.title, "", *(line.rstrip() for line in draw(block.chart, WIDTH, 16, ascii=True)), *said]
    else:
        yield from _workings(block)


def _fact(name: str, value: str) -> Lines:
    return fold(isolated(value), WIDTH, f"  {name:<{_NAMES}}", " " * (_NAMES + 2))


def _step(step: StepRow) -> Lines:
    """Verdict and title, then what the step comes to, then what is to be said of it."""
    indent = " " * 14
    limited = f"limit {step.limit}" if step.source else step.limit
    limit = joined([limited, step.source], ", ")
    numbers = joined([isolated(part) for part in (step.value, limit, step.margin)])
    lines = fold(isolated(step.title), WIDTH, f"  {step.verdict:<12}", indent)
    for one in (numbers, *map(isolated, step.remarks), isolated(f"key: {step.key}")):
        if one:
            lines += fold(one, WIDTH, indent, indent + "  ")
    return lines


def _workings(block: Workings) -> Iterator[Lines]:
    yield ["", *fold(isolated(block.name), WIDTH)]
    for line in block.lines:
        yield _line(line)
    for note in block.notes:
        yield fold(isolated(f"note: {note}"), WIDTH, "  ", "    ")


def _line(line: WorkedLine) -> Lines:
    head = f"{line.symbol} = {line.value}"
    gap = " " * max(2, 26 - width_of(head))
    lines = fold(isolated(line.meaning), WIDTH, f"  {head}{gap}", " " * 28) if width_of(head) < WIDTH // 2 else [
        *fold(isolated(f"{head}   {line.meaning}"), WIDTH, "  ", "    ")
    ]  # fmt: skip
    for one in line.way:
        lines += fold(isolated(one), WIDTH, "      ", "        ")
    return lines
