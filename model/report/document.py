"""What a report says, in which order, before it becomes plain text, Markdown or HTML."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from itertools import groupby

from model.checks.case import Case
from model.checks.finding import Checklist, Finding, Kind, Verdict
from model.checks.registry import group_title
from model.quantity import UnitSystem
from model.report import wording
from model.report.chart import Chart
from model.report.flight_charts import flight_charts
from model.report.paper import apart, facts, signature_texts
from model.report.worked import Workings, workings
from model.rig.errors import InputProblem

SIGNATURES_A_PAGE = 4


@dataclass(frozen=True)
class Words:
    """A paragraph; a ``loud`` one stands out."""

    text: str
    loud: bool = False


@dataclass(frozen=True)
class Facts:
    """Names and what stands for them."""

    rows: tuple[tuple[str, str], ...]


@dataclass(frozen=True)
class Items:
    """A list under a name."""

    name: str
    items: tuple[str, ...]


@dataclass(frozen=True)
class StepRow:
    """One step in words; what there is none of is empty."""

    verdict: str
    title: str
    key: str
    value: str
    limit: str
    source: str
    margin: str
    remarks: tuple[str, ...]


@dataclass(frozen=True)
class Steps:
    """Steps of the checklist."""

    name: str
    rows: tuple[StepRow, ...]


@dataclass(frozen=True)
class Picture:
    """A curve with its numbers in words."""

    chart: Chart
    said: tuple[str, ...]


Block = Words | Facts | Items | Steps | Picture | Workings


@dataclass(frozen=True)
class Section:
    """Blocks under a heading."""

    title: str
    blocks: tuple[Block, ...]


@dataclass(frozen=True)
class RigReport:
    """One rig. ``page_head`` stands on every page."""

    title: str
    verdict: str
    counts: str
    page_head: tuple[str, ...]
    first: tuple[Block, ...]
    sections: tuple[Section, ...]


@dataclass(frozen=True)
class Unread:
    """Files that could not be used, with the mistakes found."""

    problems: tuple[str, ...]


@dataclass(frozen=True)
class Report:
    """All rigs of one report, in the order they are asked for."""

    title: str
    rigs: tuple[RigReport, ...]
    unread: Unread | None = None

    @property
    def overview(self) -> Facts | None:
        """What each of several rigs comes to."""
        if len(self.rigs) < 2:
            return None
        return Facts(tuple((f"{one.verdict}: {one.title}", one.counts) for one in self.rigs))


@dataclass(frozen=True)
class Options:
    """How a report is made. ``program`` is the name and version that stand on every page."""

    program: str
    system: UnitSystem = UnitSystem.WRITTEN
    with_workings: bool = False


def report(checklists: Sequence[Checklist], problems: Sequence[InputProblem], options: Options) -> Report:
    """The report on some rigs.

    Args:
        checklists: One a rig, with their details.
        problems: What was wrong with files that could not be used.
        options: Units, workings, program version.
    """
    rigs = tuple(rig_report(one, options) for one in checklists)
    title = f"Rigging check: {rigs[0].title}" if len(rigs) == 1 else f"Rigging checks of {len(rigs)} loads"
    return Report(title, rigs, Unread(tuple(map(str, problems))) if problems else None)


def rig_report(checklist: Checklist, options: Options) -> RigReport:
    """The report on one rig."""
    revision = f", revision {checklist.revision}" if checklist.revision is not None else ""
    title = f"{checklist.reference}{revision}: {checklist.name}" if checklist.reference else checklist.name + revision
    counts = wording.counts_text(checklist)
    first: list[Block] = [Words(f"{checklist.verdict}: {counts}", loud=True), Items("Signatures", _signed(checklist))]
    first += [Words(wording.CAUTION, loud=True), Facts(facts(checklist, options.system, options.program))]
    first += [Words(line) for note in checklist.notes for line in note.splitlines() if line.strip()]
    sections = [
        Section("To settle first", _to_settle(checklist, options.system)),
        Section("Said apart", tuple(Items(*one) for one in apart(checklist, options.system))),
        Section("Curves", _curves(checklist, options.system)),
        Section("Checklist", _steps(checklist, options.system)),
    ]
    if options.with_workings:
        sections.append(Section("Workings", _workings(checklist, options.system)))
    head = _page_head(checklist, title, options.program)
    kept = tuple(one for one in sections if one.blocks)
    return RigReport(title, str(checklist.verdict), counts, head, tuple(first), kept)


def _signed(checklist: Checklist) -> tuple[str, ...]:
    return signature_texts(checklist) or ("not signed",)


def _page_head(checklist: Checklist, title: str, program: str) -> tuple[str, ...]:
    signed = _signed(checklist)
    if len(signed) > SIGNATURES_A_PAGE:
        earlier = f"{len(signed) - SIGNATURES_A_PAGE} earlier signatures on the first page"
        signed = (earlier, *signed[-SIGNATURES_A_PAGE:])
    digest = f"digest {checklist.digests[1][:16]}" if checklist.digests[1] else "no digest"
    limits = f"limits: {checklist.limit_set or 'none'}"
    return (f"{checklist.verdict}: {title}", f"{digest}; {limits}; {program}", "; ".join(signed))


def step_row(finding: Finding, system: UnitSystem) -> StepRow:
    """A step in words."""
    computed = finding.kind is Kind.COMPUTED
    value = wording.value_text(finding, system) if computed else finding.answer.value if finding.answer else ""
    limit = wording.limit_text(finding, system)
    remarks = [finding.reason, "" if computed else wording.answer_text(finding)]
    remarks += [f"caution: {one}" for one in finding.cautions]
    remarks.append(f"deviation: {finding.deviation}" if finding.deviation else "")
    unsaid = finding.verdict is not Verdict.PASS and "no limit set" not in finding.reason
    if computed and finding.limit is None and unsaid:
        limit = "no limit set"
    return StepRow(
        verdict=str(finding.verdict),
        title=finding.title,
        key=finding.key,
        value=value,
        limit=limit,
        source=finding.limit.source if finding.limit else "",
        margin=wording.margin_text(finding),
        remarks=tuple(one for one in remarks if one),
    )


def _to_settle(checklist: Checklist, system: UnitSystem) -> tuple[Block, ...]:
    """What fails, then what is open: first what a number or a limit leaves open, then what nobody has looked at."""
    found = checklist.findings
    failed = [one for one in found if one.verdict is Verdict.FAIL]
    opened = [one for one in found if one.verdict is Verdict.OPEN]
    computed = [one for one in opened if one.kind is Kind.COMPUTED]
    looked_at = [one for one in opened if one.kind is Kind.INSPECTED]
    blocks: list[Block] = []
    for name, members in (("Fails", failed), ("Open: computed", computed)):
        if members:
            blocks.append(Steps(name, tuple(step_row(one, system) for one in members)))
    if looked_at:
        blocks.append(Items("Open: to look at", tuple(_asked(one) for one in looked_at)))
    return tuple(blocks) or (Words("Nothing fails and nothing is open."),)


def _asked(finding: Finding) -> str:
    marks = ""
    if finding.inspection is not None:
        marks = ", stops the work" if finding.inspection.stop else ""
        marks += ", two people" if finding.inspection.two_person else ""
    return f"OPEN {finding.key}{marks}: {finding.title} ({finding.reason})"


def _curves(checklist: Checklist, system: UnitSystem) -> tuple[Block, ...]:
    if not isinstance(checklist.details, Case):
        return ()
    found = flight_charts(checklist, system)
    if found.reason:
        return (Words(f"No curves: {found.reason}"),)
    return tuple(Picture(one.chart, one.said) for one in found.charts)


def _steps(checklist: Checklist, system: UnitSystem) -> tuple[Block, ...]:
    groups = groupby(checklist.findings, key=lambda one: one.group)
    return tuple(Steps(group_title(group), tuple(step_row(one, system) for one in rows)) for group, rows in groups)


def _workings(checklist: Checklist, system: UnitSystem) -> tuple[Block, ...]:
    found = workings(checklist, system)
    if not found:
        return (Words("No step has a working: the data are missing."),)
    return (Words("A line that several steps share stands once, where it is first needed."), *found)
