"""Write the worked opening and its pictures from the program's own output: ``python -m docs.make_example``."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import replace
from pathlib import Path

from docs.blocks import FOLDER, table
from model.checks.case import Case
from model.checks.checklist import check
from model.checks.finding import Checklist, Finding
from model.quantity import UnitSystem
from model.report.as_markdown import escaped
from model.report.document import step_row
from model.report.flight_charts import flight_charts
from model.report.paper import facts
from model.report.svg import svg
from model.report.wording import CAUTION, percent
from model.report.worked import WorkedLine, fresh_lines
from model.report.working import working
from model.study.walkthrough import Walk, WalkLine, walk

PAGE, PICTURES = "example.md", "pictures"
RIG = Path("rigs", "04-pump-cool.toml")
STEP = "opening.load_factor"
SHOWN = UnitSystem.WRITTEN
ELSEWHERE = {"most loaded sling leg": "suspension.leg"}
"""Lines of the walk that rest on much else than the opening."""
HEAD = f"""# An opening, worked line by line

The load is the borehole pump of the demo scenario, `{RIG.as_posix()}`: an invented load under one canopy,
released over a zone near the sea. Every number below is the program's own; `python -m docs.make_example` writes this
page and its pictures, and a test makes both again and compares. The lines behind the number that is judged are printed
by `rigslate working {RIG.as_posix()} {STEP}`; the opening screen (`o`) moves its inputs.

{CAUTION}
"""


def example() -> Mapping[Path, str]:
    """The page and its pictures by path."""
    checklist = check(FOLDER.parent / RIG)
    names = ("force", "descent", "area")
    found = {f"{PICTURES}/opening-{name}.svg": one for name, one in zip(names, _charts(checklist), strict=True)}
    pictures = {FOLDER / name: picture for name, (picture, _) in found.items()}
    drawn = "\n\n".join(f"![{said}]({name})\n\n{said}." for name, (_, said) in found.items())
    return {FOLDER / PAGE: _page(checklist, drawn), **pictures}


def _charts(checklist: Checklist) -> Iterator[tuple[str, str]]:
    for one in flight_charts(checklist, SHOWN).charts:
        yield svg(one.chart), f"{one.chart.title}. {'; '.join(one.said)}"


def _page(checklist: Checklist, pictures: str) -> str:
    case: Case = checklist.details
    found = walk(case)
    parts = [
        HEAD,
        "## The drop\n",
        table(("", ""), [[name, escaped(value)] for name, value in facts(checklist, SHOWN, "") if name in _DROP]),
        "## Line by line\n",
        "A line stands where it is first needed; later ones rest on it.\n",
        *_lines(checklist, found),
        "## The methods side by side\n",
        *_methods(checklist, found),
        "## What the steps make of it\n",
        _steps(checklist),
        "## The curves\n",
        pictures + "\n",
    ]
    return "\n".join(parts)


_DROP = ("load", "reference", "drop date", "release height", "indicated airspeed", "zone elevation", "zone temperature",
         "altimeter setting", "dew point", "surface wind", "wind at release", "limit set")  # fmt: skip


def _step(checklist: Checklist) -> Finding:
    return next(one for one in checklist.findings if one.key == STEP)


def _value(checklist: Checklist, line: WalkLine) -> str:
    """The value of a line, as its working ends."""
    return working(replace(_step(checklist), result=line.term), SHOWN)[-1].value


def _lines(checklist: Checklist, found: Walk) -> Iterator[str]:
    shown: set[WorkedLine] = set()
    for number, line in enumerate(found.lines, 1):
        if line.term is None:
            yield f"### {number}. {escaped(line.title)}: {escaped(line.missing)}\n"
            continue
        yield f"### {number}. {escaped(line.title)}: {_value(checklist, line)}\n"
        fresh = fresh_lines(replace(_step(checklist), result=line.term), SHOWN, shown)
        elsewhere = ELSEWHERE.get(line.title)
        if elsewhere:
            yield f"Its lines: `rigslate working {RIG.as_posix()} {elsewhere}`.\n"
            continue
        yield "```text"
        for one in fresh:
            yield f"{one.symbol} = {one.value}   {one.meaning}"
            yield from (f"    {way}" for way in one.way)
        yield "```\n"
        if line.warning:
            yield f"Outside its range: {escaped(line.warning)}.\n"


def _methods(checklist: Checklist, found: Walk) -> Iterator[str]:
    """Every way to the same force, with what speaks against it."""
    methods = [one for one in found.lines if one.method and one.term is not None]
    yield table(
        ("method", "peak", "holds here"),
        [[escaped(one.title), _value(checklist, one), escaped(one.warning) or "yes"] for one in methods],
    )
    shares = found.range_of_methods
    if shares is not None:
        low, high = map(percent, shares)
        yield f"Methods within their range come to {low} to {high} of the larger motion.\n"
    yield from (f"{escaped(note)}.\n" for note in _step(checklist).notes)


def _steps(checklist: Checklist) -> str:
    rows = [step_row(one, SHOWN) for one in checklist.findings if one.group == "opening" and one.result is not None]
    return table(
        ("verdict", "step", "value", "limit", "source", "margin"),
        [
            [one.verdict, escaped(one.title), one.value, one.limit, escaped(one.source), escaped(one.margin)]
            for one in rows
        ],
    )


if __name__ == "__main__":
    for path, text in example().items():
        path.parent.mkdir(exist_ok=True)
        path.write_text(text, encoding="utf-8", newline="\n")
