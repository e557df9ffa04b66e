"""Inspected steps: what the limit set asks and what the record answers."""

from __future__ import annotations

from model.checks.finding import Answer, Finding, Inspection, Kind, Verdict
from model.rig import limits
from model.rig.standing import Standing

NOT_YET = "not inspected yet"


def find(inspection: limits.Inspection, standing: Standing | None) -> Finding:
    """The finding of one inspection with its standing answer, if there is one."""
    entry = standing.entry if standing else None
    answer = None
    if entry is not None and standing is not None:
        answer = Answer(
            entry.answer or "",
            entry.who,
            entry.when,
            entry.second or "",
            entry.remark or "",
            entry.value or "",
            standing.stale,
        )
    verdict, reason = _verdict(inspection, answer)
    cautions = (inspection.caution,) if inspection.caution else ()
    return Finding(
        key=inspection.key,
        title=inspection.ask,
        kind=Kind.INSPECTED,
        group=inspection.key.split(".", 1)[0],
        verdict=verdict,
        reason=reason,
        cautions=cautions,
        inspection=_asked(inspection),
        answer=answer,
    )


def _asked(inspection: limits.Inspection) -> Inspection:
    return Inspection(
        inspection.ask,
        inspection.stage or "",
        bool(inspection.stop),
        bool(inspection.two_person),
        inspection.answer or "",
        inspection.caution or "",
        tuple(inspection.covers or ()),
    )


def _verdict(inspection: limits.Inspection, answer: Answer | None) -> tuple[Verdict, str]:
    if answer is None:
        return Verdict.OPEN, NOT_YET
    if answer.stale:
        return Verdict.OPEN, f"STALE: changed since {answer.who} answered '{answer.answer}'"
    if inspection.two_person and not answer.second:
        return Verdict.OPEN, "second name missing: two people must look"
    if inspection.two_person and answer.second.casefold().strip() == answer.who.casefold().strip():
        return Verdict.OPEN, "both names are the same: two people must look"
    if answer.answer == "pass":
        if inspection.answer and not answer.value:
            return Verdict.OPEN, f"value missing: {inspection.answer}"
        return Verdict.PASS, answer.remark
    if not answer.remark:
        return Verdict.OPEN, f"remark missing for '{answer.answer}'"
    if answer.answer == "fail":
        return Verdict.FAIL, answer.remark
    return Verdict.NOT_COUNTED, f"does not apply: {answer.remark}"
