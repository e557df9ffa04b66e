"""The facts at the head of a report, and what has to be said apart from the checklist."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from model.checks.case import Case
from model.checks.checklist import LEFT_OUT
from model.checks.finding import Checklist, Finding, Signature, Verdict
from model.checks.missing import row
from model.quantity import Quantity, UnitSystem, show_quantity
from model.rig.canopy import Measured, ReefingMeasured
from model.rig.rig import Drop
from model.rig.source import shown_path

Fact = tuple[str, str]


def signature_texts(checklist: Checklist) -> tuple[str, ...]:
    """The signatures in the order of their times, the same moment on every clock; empty where there is none."""
    return tuple(map(_signature, sorted(checklist.signatures, key=lambda one: one.when)))


def _signature(one: Signature) -> str:
    return f"signed by {one.who}, {one.when:%Y-%m-%d %H:%M %z}" + (", STALE: changed since" if one.stale else "")


def facts(checklist: Checklist, system: UnitSystem, program: str) -> tuple[Fact, ...]:
    """Which rig, by whom, for which drop, against which limits."""
    rigging, everything = checklist.digests
    found = [
        ("load", checklist.name),
        ("reference", checklist.reference or "none"),
        ("revision", "none" if checklist.revision is None else str(checklist.revision)),
        ("file", shown_path(checklist.file)),
    ]
    if isinstance(checklist.details, Case):
        found += _of_case(checklist.details, system)
    else:
        found.append(("limit set", checklist.limit_set or "none"))
    return (*found, ("digest of all", everything), ("digest of the rigging", rigging), ("made with", program))


def _of_case(case: Case, system: UnitSystem) -> Iterator[Fact]:
    about, limits = case.rig.rig, case.limits
    rigged = ", ".join(str(part) for part in (about.rigged_by, about.rigged_on) if part)
    yield "rigged", rigged or "not said"
    yield from _drop(case.rig.drop, system)
    if limits is None:
        yield "limit set", "none"
    else:
        issued = [f"by {limits.set.issued_by}" if limits.set.issued_by else "", f"{limits.set.issued_on or ''}"]
        said = " ".join(part for part in issued if part)
        yield "limit set", limits.set.name + (f", issued {said}" if said else "")
    if about.notes and about.notes.strip():
        yield "notes", " / ".join(line.strip() for line in about.notes.splitlines() if line.strip())


def _drop(drop: Drop, system: UnitSystem) -> Iterator[Fact]:
    def told(quantity: Quantity | None, otherwise: str) -> str:
        return show_quantity(quantity, system) if quantity is not None else otherwise

    yield "drop date", str(drop.date)
    yield "release height", told(drop.release_height, "not given")
    yield "indicated airspeed", told(drop.airspeed, "not given")
    yield "zone elevation", told(drop.zone_elevation, "not given")
    yield "zone temperature", told(drop.zone_temperature, "not given: standard day")
    yield "altimeter setting", told(drop.altimeter_setting, "not given: 1013.25 hPa")
    yield "dew point", told(drop.dew_point, "not given: dry air")
    if drop.winds:
        layers = [f"{show_quantity(speed, system)} at {show_quantity(height, system)}" for height, speed in drop.winds]
        yield "wind along the run-in", ", ".join(layers)
    else:
        yield "surface wind", told(drop.surface_wind, "not given")
        if drop.release_wind is not None:
            yield "wind at release", told(drop.release_wind, "")


APART = (
    (Verdict.NOT_COUNTED, LEFT_OUT, "Left out on purpose"),
    (Verdict.NOT_COUNTED, "not judged", "Computed, not judged by the limit set"),
    (Verdict.NOT_COUNTED, "does not apply", "Looked at: does not apply"),
    (Verdict.NOT_COUNTED, "for information", "For information, no limit set"),
    (Verdict.NOT_COUNTED, "", "Not counted for another reason"),
    (Verdict.OPEN, "needs a measured figure", "Open until a measured figure stands"),
)
"""What stands apart: verdict, how its reason begins, and what such steps are called; the first that fits holds."""


def apart(checklist: Checklist, system: UnitSystem) -> list[tuple[str, tuple[str, ...]]]:
    """What a supervisor looks at first: changes, deviations, what does not count and why, measured figures."""
    found = [("Changed since it was signed or answered", tuple(_changed(checklist)))]
    deviations = tuple(f"{one.verdict} {one.key}: {one.deviation}" for one in checklist.findings if one.deviation)
    found.append(("Deviations", deviations))
    steps = list(checklist.findings)
    for verdict, beginning, name in APART:
        these = [one for one in steps if one.verdict is verdict and one.reason.startswith(beginning)]
        taken = {one.key for one in these}
        steps = [one for one in steps if one.key not in taken]
        found.append((name, tuple(_by_reason(these))))
    if isinstance(checklist.details, Case):
        found.append(("Measured figures in the rig file", tuple(_measured(checklist.details, system))))
    return [(name, items) for name, items in found if items]


def _by_reason(findings: Sequence[Finding]) -> Iterator[str]:
    """Steps that share a reason, which stands once."""
    for reason in dict.fromkeys(one.reason for one in findings):
        steps = ", ".join(f"{one.title} ({one.key})" for one in findings if one.reason == reason)
        yield f"{reason}: {steps}"


def _changed(checklist: Checklist) -> Iterator[str]:
    stale = sorted((one for one in checklist.signatures if one.stale), key=lambda one: one.when)
    if stale:
        yield "STALE: the rig file or its limit set is not what was signed; limits may have changed, so compare both"
    yield from (_signature(one) for one in stale)
    yield from (f"STALE answer to {key}: what it stands on has changed" for key in checklist.stale)


def _measured(case: Case, system: UnitSystem) -> Iterator[str]:
    for index, canopy in enumerate(case.rig.canopy):
        stages = [(f"reefing {i + 1} ", stage.measured) for i, stage in enumerate(canopy.reefing)]
        for stage, figures in [*stages, ("", canopy.measured)]:
            if figures is not None:
                shown = "; ".join(_figures(figures, system)) or "no figure"
                yield f"{row('canopy row', index, canopy.role, stage).strip()}: {shown}; source: {figures.source}"


def _figures(figures: Measured | ReefingMeasured, system: UnitSystem) -> Iterator[str]:
    for name in type(figures).model_fields:
        value = getattr(figures, name)
        if isinstance(value, Quantity):
            yield f"{name.replace('_', ' ')} {show_quantity(value, system)}"
