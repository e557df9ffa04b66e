"""A report as one HTML file: no scripts, no links, no fonts of its own; reads on a screen and prints on A4 and Letter.

Each rig is one table whose head is repeated by the browser on every printed page.
"""

from __future__ import annotations

import re
from collections.abc import Iterator, Sequence
from html import escape

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
from model.report.prose import clean, runs_right_to_left
from model.report.svg import svg
from model.report.worked import Workings

STYLE = """
:root{color-scheme:light}
body{font:15px/1.4 sans-serif;color:#000;background:#fff;margin:0 auto;max-width:62em;padding:1em}
body{overflow-wrap:anywhere}
table{border-collapse:collapse;width:100%}
.page>thead td{border-bottom:2px solid #000;padding:0 0 .3em;font-size:12px}
.page td{vertical-align:top;padding:0}
.rows{margin:.3em 0 1em}
.rows caption{text-align:left;font-weight:bold;padding:.6em 0 .2em}
.rows th,.rows td{padding:.2em .5em .2em 0;text-align:left;vertical-align:top}
.rows th{font-weight:normal}
.rows thead th{border-bottom:1px solid #000;font-size:12px}
.rows tbody,.facts tr,.lines tr{border-bottom:1px solid #999}
.rows tr,.steps tbody{break-inside:avoid}
.steps,.lines,.facts,.page{table-layout:fixed}
.steps col:nth-child(1){width:8.5em}
.steps col:nth-child(3){width:14%}
.steps col:nth-child(4){width:21%}
.steps col:nth-child(5){width:12%}
.lines col:nth-child(1),.lines col:nth-child(2){width:28%}
.rows ul{margin:0;padding-left:1.1em}
.key{font:12px monospace}
.verdict{white-space:nowrap}
.verdict b{display:inline-block;padding:0 .35em;border:1px solid #000}
.FAIL b{border-width:3px;color:#8b0000}
.OPEN b{border-style:dashed;border-width:2px;color:#5a3d00}
.PASS b{border-color:#666;font-weight:normal}
.NOT b{border-style:dotted;border-color:#666;font-weight:normal}
.loud{font-weight:bold;border-left:4px solid #000;padding-left:.6em}
.facts th{width:13em}
h1,h2,h3,h4,caption{break-after:avoid}
figure{margin:0 0 1em;break-inside:avoid}
svg{max-width:100%;height:auto}
.way{margin:0;padding:0;list-style:none;font-size:13px}
@page{margin:14mm}
@media print{body{font-size:10pt;max-width:none;padding:0}.rig+.rig{break-before:page}}
""".strip()
_NAMES = re.compile(r"curve-[0-9a-f]{8}(?=-title|-text)")
POLICY = "default-src 'none'; style-src 'unsafe-inline'"
_COLUMNS = ("verdict", "step", "value", "limit and its source", "margin")


def html(report: Report) -> str:
    """The whole report as the text of one HTML file."""
    title = _t(report.title)
    body = "\n".join(_body(report))
    return (
        f'<!DOCTYPE html>\n<html lang="en">\n<head>\n<meta charset="utf-8">\n'
        f'<meta http-equiv="Content-Security-Policy" content="{POLICY}">\n'
        f'<meta name="viewport" content="width=device-width, initial-scale=1">\n'
        f"<title>{escape(clean(report.title))}</title>\n"
        f"<style>\n{STYLE}\n</style>\n</head>\n<body>\n<main>\n<h1>{title}</h1>\n{body}\n</main>\n</body>\n</html>\n"
    )


def _t(text: str) -> str:
    """A text as it may stand in HTML; one that runs from right to left keeps its direction to itself."""
    shown = escape(clean(text))
    return f"<bdi>{shown}</bdi>" if runs_right_to_left(text) else shown


def _body(report: Report) -> Iterator[str]:
    if report.overview is not None:
        yield _facts(report.overview, "Loads of this report")
    if report.unread is not None:
        yield "<h2>Not reported: files that could not be used</h2>"
        yield _list(report.unread.problems)
    for number, rig in enumerate(report.rigs, 1):
        yield from _rig(rig, f"rig-{number}")


def _rig(rig: RigReport, name: str) -> Iterator[str]:
    """A rig as a table of one column: its head comes again on each page, and a row a block lets pages part it."""
    yield f'<section class="rig" aria-labelledby="{name}">\n<table class="page" role="presentation">'
    head = "<br>".join(_t(part) for part in rig.page_head)
    yield f"<thead><tr><td>{head}</td></tr></thead>\n<tbody>"
    parts: list[tuple[str, Sequence[Block], str]] = [(f'<h2 id="{name}">{_t(rig.title)}</h2>', rig.first, "h3")]
    parts += [(f"<h3>{_t(section.title)}</h3>", section.blocks, "h4") for section in rig.sections]
    for number, (title, blocks, below) in enumerate(parts):
        for block in _blocks(blocks, f"{name}-{number}", below):
            yield f"<tr><td>{title}{block}</td></tr>"
            title = ""  # noqa: PLW2901
    yield "</tbody>\n</table>\n</section>"


def _blocks(blocks: Sequence[Block], rig: str, heading: str) -> Iterator[str]:
    for number, block in enumerate(blocks, 1):
        if isinstance(block, Words):
            yield f'<p class="loud">{_t(block.text)}</p>' if block.loud else f"<p>{_t(block.text)}</p>"
        elif isinstance(block, Facts):
            yield _facts(block, "About this load")
        elif isinstance(block, Items):
            yield f"<{heading}>{_t(block.name)}</{heading}>\n{_list(block.items)}"
        elif isinstance(block, Steps):
            yield _steps(block)
        elif isinstance(block, Picture):
            yield _picture(block, f"{rig}-curve-{number}")
        else:
            yield _workings(block)


def _picture(picture: Picture, name: str) -> str:
    """A curve under a name of its own: two rigs may have the same curve."""
    drawn = svg(picture.chart)
    for former in set(_NAMES.findall(drawn)):
        drawn = drawn.replace(former, name)
    said = "<br>".join(_t(one) for one in picture.said)
    return f"<figure>\n{drawn}<figcaption>{said}</figcaption>\n</figure>"


def _list(items: Sequence[str], kind: str = "") -> str:
    opening = f'<ul class="{kind}">' if kind else "<ul>"
    return f"{opening}{''.join(f'<li>{_t(item)}</li>' for item in items)}</ul>"


def _facts(facts: Facts, caption: str) -> str:
    rows = "\n".join(f'<tr><th scope="row">{_t(name)}</th><td>{_t(value)}</td></tr>' for name, value in facts.rows)
    return f'<table class="rows facts">\n<caption>{caption}</caption>\n<tbody>\n{rows}\n</tbody>\n</table>'


def _head(columns: Sequence[str]) -> str:
    widths = f"<colgroup>{'<col>' * len(columns)}</colgroup>"
    cells = "".join(f'<th scope="col">{column}</th>' for column in columns)
    return f"{widths}\n<thead><tr>{cells}</tr></thead>"


def _steps(steps: Steps) -> str:
    rows = "\n".join(map(_step, steps.rows))
    caption = f"<caption>{_t(steps.name)}</caption>"
    return f'<table class="rows steps">\n{caption}\n{_head(_COLUMNS)}\n{rows}\n</table>'


def _step(step: StepRow) -> str:
    """A step as a row, and what is to be said of it as a second one across the rest."""
    title = f'<th scope="row">{_t(step.title)}<br><span class="key">{_t(step.key)}</span></th>'
    limit = "<br>".join(_t(part) for part in (step.limit, step.source) if part)
    numbers = f"<td>{_t(step.value)}</td><td>{limit}</td><td>{_t(step.margin)}</td>"
    said = f'\n<tr><td></td><td colspan="4">{_list(step.remarks)}</td></tr>' if step.remarks else ""
    kind = step.verdict.split(" ", 1)[0]
    verdict = f'<td class="verdict"><b>{step.verdict}</b></td>'
    return f'<tbody class="{kind}">\n<tr>{verdict}{title}{numbers}</tr>{said}\n</tbody>'


def _workings(workings: Workings) -> str:
    rows = "\n".join(
        f'<tr><th scope="row">{_t(line.symbol)} = {_t(line.value)}</th><td>{_t(line.meaning)}</td>'
        f"<td>{_list(line.way, 'way')}</td></tr>"
        for line in workings.lines
    )
    notes = _list([f"note: {note}" for note in workings.notes]) if workings.notes else ""
    if not rows:
        return f"<h4>{_t(workings.name)}</h4>\n{notes}"
    caption = f"<caption>{_t(workings.name)}</caption>"
    head = _head(("value", "meaning", "how it comes about"))
    return f'<table class="rows lines">\n{caption}\n{head}\n<tbody>\n{rows}\n</tbody>\n</table>\n{notes}'
