"""A checklist as plain text: reads well on 80 columns, in a pipe, in a log and in a screen reader."""

from __future__ import annotations

from itertools import groupby
from textwrap import shorten, wrap

from model.checks.checklist import NO_INSPECTIONS
from model.checks.finding import COMPUTED_ALONE, Checklist, Finding, Kind, Verdict
from model.checks.registry import group_title
from model.quantity import UnitSystem
from model.report import wording

WIDTH = 78


def heading(checklist: Checklist) -> list[str]:
    """Which rig, which limits, what it comes to."""
    revision = f", revision {checklist.revision}" if checklist.revision is not None else ""
    name = f"{checklist.reference}{revision}: {checklist.name}" if checklist.reference else checklist.name + revision
    lines = [*wrap(name, WIDTH), f"file: {checklist.file}"]
    lines += wrap(f"limits: {checklist.limit_set or 'none'}", WIDTH)
    for note in checklist.notes:
        lines += wrap(f"note: {note}", WIDTH)
    lines.append(f"{checklist.verdict}: {wording.counts_text(checklist)}")
    lines += signed(checklist)
    return lines


def signed(checklist: Checklist) -> list[str]:
    """The signatures in time order, or that there is none."""
    if not checklist.signatures:
        return ["not signed"]
    return [
        f"signed by {one.who}, {one.when:%Y-%m-%d %H:%M}" + (", STALE: changed since" if one.stale else "")
        for one in checklist.signatures
    ]


def step_lines(finding: Finding, system: UnitSystem) -> list[str]:
    """One step: the verdict and its title, then value, limit, margin, reason and cautions."""
    lines = wrap(f"{finding.verdict:<12}{finding.title}", WIDTH, initial_indent="  ", subsequent_indent=" " * 14)
    details = []
    if finding.kind is Kind.COMPUTED:
        value = wording.value_text(finding, system)
        limit = wording.bound_text(finding, system) if finding.limit else ""
        margin = wording.margin_text(finding)
        details.append("; ".join(part for part in (value, limit, margin) if part))
    details.append(wording.answer_text(finding))
    details.append(finding.reason if finding.reason not in ("", details[0]) else "")
    details += [f"caution: {caution}" for caution in finding.cautions]
    if finding.deviation:
        details.append(f"deviation: {finding.deviation}")
    details.append(f"key: {finding.key}")
    for detail in details:
        if detail:
            lines += wrap(detail, WIDTH, initial_indent=" " * 14, subsequent_indent=" " * 16)
    return lines


def checklist_text(checklist: Checklist, system: UnitSystem) -> str:
    """The whole checklist of one rig."""
    lines = heading(checklist)
    for group, members in groupby(checklist.findings, key=lambda one: one.group):
        lines += ["", group_title(group)]
        for finding in members:
            lines += step_lines(finding, system)
    return "\n".join(lines)


def brief_line(checklist: Checklist) -> str:
    """One line a rig."""
    worst = checklist.worst
    least = f", least margin {_signed_percent(worst)} at {worst.key}" if worst else ""
    counts = ", ".join(f"{checklist.count(one)} {one.lower()}" for one in (Verdict.PASS, Verdict.FAIL, Verdict.OPEN))
    alone = "".join(f", {note}" for note in (COMPUTED_ALONE, NO_INSPECTIONS) if note in checklist.notes)
    return f"{checklist.verdict}  {checklist.file}  {checklist.name}: {counts}{least}{alone}"


def _signed_percent(finding: Finding) -> str:
    margin = finding.margin or 0.0
    return ("-" if margin < 0 else "") + wording.percent(margin)


def summary_line(checklist: Checklist) -> str:
    """Verdict, file and the steps that fail, for the end of a long list; no wider than the page."""
    failed = [one.key for one in checklist.findings if one.verdict is Verdict.FAIL]
    opened = checklist.count(Verdict.OPEN)
    said = f"fails {', '.join(failed)}" if failed else f"{opened} open" if opened else "nothing open"
    return shorten(f"{checklist.verdict}  {checklist.file}: {said}", WIDTH, placeholder=" ...")
