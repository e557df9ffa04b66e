"""Findings: what a step of the checklist comes to, and the rules that judge a value against a limit."""

from __future__ import annotations

from dataclasses import dataclass, replace
from datetime import datetime
from enum import StrEnum
from math import pi
from typing import Any, NamedTuple

from model.checks.term import Term
from model.physics.formula import CONSTANTS

CLOSE = 0.05
"""A step that passes by less than this margin carries a caution."""


class Verdict(StrEnum):
    """What a step or a rig comes to; always shown as this word first."""

    PASS = "PASS"
    FAIL = "FAIL"
    OPEN = "OPEN"
    NOT_COUNTED = "NOT COUNTED"


class Kind(StrEnum):
    """How a step is settled: by the program or by somebody looking."""

    COMPUTED = "computed"
    INSPECTED = "inspected"


class StepUnit(NamedTuple):
    """The unit in which a step's value, limit and record stand, with its size in SI."""

    text: str
    dimension: str
    size: float


STEP_UNITS = {
    unit.text: unit
    for unit in (
        StepUnit("kg", "mass", 1.0),
        StepUnit("m", "length", 1.0),
        StepUnit("m/s", "speed", 1.0),
        StepUnit("N", "force", 1.0),
        StepUnit("Pa", "pressure", 1.0),
        StepUnit("s", "time", 1.0),
        StepUnit("g0", "acceleration", CONSTANTS["g0"]),
        StepUnit("deg", "angle", pi / 180),
        StepUnit("d", "time", 86400.0),
        StepUnit("yr", "time", 365.25 * 86400.0),
        StepUnit("1", "number", 1.0),
    )
}


class Limit(NamedTuple):
    """A bound that a user set, in the step's unit, with its source. ``shown_in`` is the unit it was written in."""

    minimum: float | None
    maximum: float | None
    source: str
    shown_in: str | None = None

    def holds(self, value: float) -> bool:
        """Whether the value lies within the bounds, the bounds themselves included."""
        above = self.minimum is None or value >= self.minimum
        return above and (self.maximum is None or value <= self.maximum)

    def margin(self, value: float) -> float | None:
        """How far the value is from the nearer bound, as a share of that bound; negative exactly when it fails.

        Bounds of different sign, or one of two bounds 0, are measured by half the distance between them. A lone bound
        of 0 has no margin: None.
        """
        low, high = self.minimum, self.maximum
        gaps = []
        if low is not None:
            gaps.append((value - low, abs(low)))
        if high is not None:
            gaps.append((high - value, abs(high)))
        if low is not None and high is not None and low * high <= 0:
            half = abs(high - low) / 2
            gaps = [(gap, half) for gap, _ in gaps]
        if not gaps or any(size == 0 for _, size in gaps):
            return None
        return min(gap / size for gap, size in gaps)


class Ruling(NamedTuple):
    """What the limit set says of a step: its limit, and whether it counts and needs a measured figure."""

    limit: Limit | None = None
    judged: bool = True
    needs_measured: bool = False
    source: str = ""


class Answer(NamedTuple):
    """The standing answer of an inspected step."""

    answer: str
    who: str
    when: datetime
    second: str = ""
    remark: str = ""
    value: str = ""
    stale: bool = False


class Inspection(NamedTuple):
    """What an inspected step asks, as the limit set writes it."""

    ask: str
    stage: str = ""
    stop: bool = False
    two_person: bool = False
    wants_value: str = ""
    caution: str = ""
    covers: tuple[str, ...] = ()


@dataclass(frozen=True, eq=False)
class Finding:
    """The result of one step.

    ``value`` and the bounds of ``limit`` are in ``unit`` (a key of `STEP_UNITS`, None for an inspected step).
    ``result`` is the term that holds the value; the working is read from it. ``shown_in`` is the unit the user reads it
    in when units are shown as written.
    """

    key: str
    title: str
    kind: Kind
    group: str
    verdict: Verdict
    reason: str = ""
    value: float | None = None
    unit: str | None = None
    limit: Limit | None = None
    margin: float | None = None
    cautions: tuple[str, ...] = ()
    result: Term | None = None
    shown_in: str | None = None
    deviation: str | None = None
    inspection: Inspection | None = None
    answer: Answer | None = None
    notes: tuple[str, ...] = ()

    @property
    def method(self) -> str:
        """Name and source of the formula the value comes from, or where it is given."""
        if self.result is None:
            return ""
        how = self.result.how
        if how is None:
            return f"as given: {self.result.origin}"
        return f"{how.text}; {how.source}" if how.source else how.text


class Signature(NamedTuple):
    """A signature of the record, and whether the content changed since."""

    who: str
    when: datetime
    stale: bool


@dataclass(frozen=True, eq=False)
class Checklist:
    """All findings of one rig, in the order they are stepped through.

    ``details`` is the case behind them, ``content`` the raw values of rig file and limit set they were made from.
    """

    file: str
    name: str
    reference: str
    revision: int | None
    limit_set: str
    findings: tuple[Finding, ...]
    signatures: tuple[Signature, ...] = ()
    stale: tuple[str, ...] = ()
    notes: tuple[str, ...] = ()
    details: Any = None
    content: Any = None

    @property
    def digests(self) -> tuple[str, str]:
        """Digest of the rigging and of everything in both files; empty without the content they are taken of."""
        if self.content is None:
            return "", ""
        from model.rig.digest import full_digest, rigging_digest

        rig, limits = self.content
        return rigging_digest(rig, limits), full_digest(rig, limits)

    @property
    def verdict(self) -> Verdict:
        """FAIL when any step fails, else OPEN when any is open, else PASS."""
        return overall([finding.verdict for finding in self.findings])

    def count(self, verdict: Verdict) -> int:
        """How many steps came to a verdict."""
        return sum(finding.verdict is verdict for finding in self.findings)

    @property
    def worst(self) -> Finding | None:
        """The counted computed step with the least margin."""
        counted = [f for f in self.findings if f.margin is not None and f.verdict in (Verdict.PASS, Verdict.FAIL)]
        return min(counted, key=lambda finding: finding.margin or 0.0, default=None)


COMPUTED_ALONE = "inspected steps left out: computed steps alone"


def computed_alone(checklist: Checklist) -> Checklist:
    """The checklist without its inspected steps, which it says."""
    findings = tuple(one for one in checklist.findings if one.kind is Kind.COMPUTED)
    return replace(checklist, findings=findings, notes=(*checklist.notes, COMPUTED_ALONE))


def overall(verdicts: list[Verdict]) -> Verdict:
    """The verdict of several: FAIL over OPEN over PASS. Nothing counted at all is OPEN, never PASS."""
    if Verdict.FAIL in verdicts:
        return Verdict.FAIL
    if Verdict.OPEN in verdicts or Verdict.PASS not in verdicts:
        return Verdict.OPEN
    return Verdict.PASS
