"""A rig file in, a checklist out."""

from __future__ import annotations

import os
from collections.abc import Mapping, Sequence
from dataclasses import replace
from functools import lru_cache
from pathlib import Path
from typing import TYPE_CHECKING

from model.checks import inspected, registry
from model.checks.case import Case
from model.checks.finding import Checklist, Finding, Limit, Ruling, Signature, Verdict
from model.checks.inputs import verify
from model.checks.step import Step, bound_in_unit, judge
from model.rig.errors import InputError, InputProblem
from model.rig.limits import Bounds, LimitFile, LimitSet, resolve
from model.rig.reading import Loaded, load, record_path
from model.rig.rig import TABLES
from model.rig.standing import standing

if TYPE_CHECKING:
    from model.rig.entry import Entry

LEFT_OUT = "left out on purpose, "
NO_INSPECTIONS = "the limit set asks for no inspection: computed steps alone"


def check(path: Path) -> Checklist:
    """Read a rig with its limit set and its record, and check it.

    Raises:
        InputError: Where a file cannot be used; it holds every problem found.
    """
    loaded = load(path)
    problems: list[InputProblem] = []
    try:
        entries: Sequence[Entry] = _entries(path)
    except InputError as error:
        problems += error.problems
        entries = ()
    try:
        checklist = check_loaded(loaded, entries)
    except InputError as error:
        problems += error.problems
    if problems:
        raise InputError(problems)
    return checklist


def _entries(path: Path) -> Sequence[Entry]:
    """The record of a rig; what reads and writes records is loaded only where there is one."""
    if not os.path.lexists(record_path(path)):
        return ()
    from model.rig.record import read_record

    return read_record(record_path(path))


def check_loaded(loaded: Loaded, entries: Sequence[Entry] = ()) -> Checklist:
    """Check a rig that has been read.

    Raises:
        InputError: For what only physics or the limit set can tell to be wrong.
    """
    rig_file, limits = loaded.rig, loaded.limits
    problems: list[InputProblem] = []
    rulings: Mapping[str, Ruling] = {}
    try:
        rulings = _rulings(limits)
    except InputError as error:
        problems += error.problems
    problems += verify(rig_file)
    steps = registry.steps(rig_file.rig)
    problems += _taken_keys(limits, {step.key for step in steps})
    if problems:
        raise InputError(problems)
    case = Case(rig_file.rig, limits.limits if limits else None, rulings)
    limits_raw = limits.raw if limits else None
    standings = standing(entries, rig_file.raw, limits_raw)
    findings = [judge(step, case, rulings.get(step.limited_by, Ruling())) for step in steps]
    if limits is not None:
        findings += [inspected.find(one, standings.answers.get(one.key)) for one in limits.limits.inspection]
    _known_parts(loaded, findings)
    tables = {step.key: step.tables for step in steps}
    findings = [_left_out(finding, case, tables.get(finding.key, ())) for finding in _ordered(findings)]
    settled = [*standings.answers.items(), *standings.deviations.items()]
    deviations = {key: one.entry.remark for key, one in standings.deviations.items()}
    findings = [replace(one, deviation=deviations.get(one.key)) for one in findings]
    return Checklist(
        file=str(rig_file.path),
        name=rig_file.rig.rig.name,
        reference=rig_file.rig.rig.reference or "",
        revision=rig_file.rig.rig.revision,
        limit_set=limits.limits.set.name if limits else "",
        findings=tuple(findings),
        signatures=tuple(Signature(one.entry.who, one.entry.when, one.stale) for one in standings.signatures),
        stale=tuple(dict.fromkeys(key for key, one in settled if one.stale)),
        notes=(
            *_notes(limits.limits if limits else None),
            *_left_out_notes(case, findings),
            *_unused_ties(rulings, steps),
        ),
        details=case,
        content=(rig_file.raw, limits_raw),
    )


def _taken_keys(limits: LimitFile | None, computed: set[str]) -> list[InputProblem]:
    """Inspections with the key of a step computed for a row of this rig; those of fixed steps are refused before."""
    if limits is None:
        return []
    return [
        limits.problem(("inspection", i, "key"), f'"{one.key}"', "a key that no computed step of the rig has")
        for i, one in enumerate(limits.limits.inspection)
        if one.key in computed and registry.dimension_of(one.key) is None
    ]


def _notes(limits: LimitSet | None) -> tuple[str, ...]:
    if limits is None:
        return ("no limit set is named in the rig file: the rig can't PASS",)
    notes = (limits.set.note,) if limits.set.note else ()
    return notes if limits.inspection else (*notes, NO_INSPECTIONS)


def _left_out_notes(case: Case, findings: Sequence[Finding]) -> list[str]:
    """What was left out on purpose and how many steps that takes out, so that nobody overlooks it."""
    notes = []
    for part in case.rig.left_out:
        reason = f"{LEFT_OUT}{part.part}: {part.why}"
        count = sum(one.reason == reason for one in findings)
        notes.append(f"{reason} (takes {count} step{'' if count == 1 else 's'} out)")
    return notes


def _unused_ties(rulings: Mapping[str, Ruling], steps: Sequence[Step]) -> list[str]:
    """Limits on ties that this rig does not have: a set shared by several rigs, or a name mistyped."""
    here = {step.limited_by for step in steps}
    return [
        f"the limit set has a limit for {key}, and this rig has no such tie"
        for key in rulings
        if key.startswith("tie.") and key not in here
    ]


@lru_cache(maxsize=8)
def _rulings(limits: LimitFile | None) -> Mapping[str, Ruling]:
    """What the limit set says, by limit key, in step units."""
    if limits is None:
        return {}
    bounds = resolve(limits, registry.dimension_of, registry.known_keys())
    return {key: _ruling(key, one) for key, one in bounds.items()}


def _ruling(key: str, bounds: Bounds) -> Ruling:
    unit = registry.unit_of(key) or "1"
    low, high = (bound_in_unit(one.value, unit) if one else None for one in (bounds.low, bounds.high))
    written = bounds.high or bounds.low
    limit = Limit(low, high, bounds.source, written.unit) if written else None
    return Ruling(limit, bounds.judged, bounds.needs_measured, bounds.source)


def _ordered(findings: list[Finding]) -> list[Finding]:
    """By group; in each first the stopping inspections, then what is computed, then the other inspections."""
    order = list(registry.GROUP_TITLES)
    order += [one.group for one in findings if one.group not in order]

    def place(finding: Finding) -> tuple[int, int]:
        asked = finding.inspection
        return order.index(finding.group), 1 if asked is None else 0 if asked.stop else 2

    return sorted(findings, key=place)


def _known_parts(loaded: Loaded, findings: Sequence[Finding]) -> None:
    """Refuse a left-out part that names no table, no group and no step."""
    known = {*TABLES, *(one.group for one in findings), *(one.key for one in findings)}
    problems = [
        loaded.rig.problem(
            ("left_out", i, "part"), f'"{one.part}"', "a table, a group of steps or a step key", _near(one.part, known)
        )
        for i, one in enumerate(loaded.rig.rig.left_out)
        if one.part not in known
    ]
    if problems:
        raise InputError(problems)


def _near(part: str, known: set[str]) -> str:
    from model.rig.rule import nearest

    return nearest(part, sorted(known))


def _left_out(finding: Finding, case: Case, tables: tuple[str, ...]) -> Finding:
    names = {finding.key, finding.group, *tables}
    for part in case.rig.left_out:
        if part.part in names:
            return replace(
                finding,
                verdict=Verdict.NOT_COUNTED,
                reason=f"{LEFT_OUT}{part.part}: {part.why}",
                value=None,
                margin=None,
                cautions=(),
                result=None,
                notes=(),
            )
    return finding


__all__ = ["Checklist", "Step", "check", "check_loaded"]
